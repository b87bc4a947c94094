"""Seeded round cases of ../round.json: compact bodies and extreme ones."""
from head import A, U, add, body, write
for nm,r,h in (('compact',0.9,0.7),('plate1e-3',1.1,0.55e-3),('plate1e-5',1.1,0.55e-5),('plate.04',1.0,.02),('plate.12',1.0,.06),('rod30',.3,9.),('rod1e3',0.02,10.)):
    add('cyl-%s-z'%nm,body(type='cylinder',radius=r,half_length=h),U(0,0,1.0),0,r,h)
    add('cyl-%s-x'%nm,body(type='cylinder',radius=r,half_length=h),U(0.8,-0.6,0.0),0,r,h)
    add('cyl-%s-s'%nm,body(type='cylinder',radius=r,half_length=h),A(1.5),0,r,h)
for nm,r1,r2,h in (('compact',.4,.9,.7),('wall.05',.95,1.,.6),('wall.12',.88,1.,.6),('wall1e-3',1.0,1.001,.8),('wall1e-6',1.0,1.000001,.8),('hole1e-4',1e-4,1.,.5),('wallrod',.02,.0200001,10.),('ringthin',1.,1.001,.5e-4),('ringthin2',1.,1.0001,.5e-3),('washer',.4,1.,1e-5)):
    add('tube-%s-z'%nm,body(type='tube',r1=r1,r2=r2,half_length=h),U(0,0,1.0),r1,r2,h)
    add('tube-%s-x'%nm,body(type='tube',r1=r1,r2=r2,half_length=h),U(0.8,-0.6,0.0),r1,r2,h)
    add('tube-%s-s'%nm,body(type='tube',r1=r1,r2=r2,half_length=h),A(1.5),r1,r2,h)
write()
