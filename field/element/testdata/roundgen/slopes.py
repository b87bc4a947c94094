"""Seeded round cases of ../round.json: polarization with a slope."""
from head import cyl, tube, write
cyl('low.3',1.0,.15,'s',12)
cyl('low.31',1.0,.155,'s',12)
cyl('low.8',1.0,.4,'s',12)
cyl('low1.45',1.0,.725,'s',12)
tube('low.5',.4,1.,.25,'s',12)
tube('low.2',.85,1.,.1,'s',12)
tube('wall.09',.91,1.,.1,'s',12)
tube('wall.05low',.95,1.,.2,'xs',12)
cyl('tall4',.5,1.0,'s',12)
write()
