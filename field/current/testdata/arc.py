#!/usr/bin/env python3
"""A of the bent tube of TestArcGuideEdges (radii 1 and 2, height 1, azimuths 0 to 90 degrees, half a weber by radian), close to the
edges of its ends: the charge of the ends integrated along z in closed form and along s by quadrature in 30 digits, cut at powers of
ten from the foot of the point, and c/s along phi in the bore. Usage: arc.py
"""
from mpmath import mp, mpf, quad, sqrt, pi, sin, cos, log, asinh, nstr
mp.dps=30
c=mpf('0.5'); s0,s1,h=mpf(1),mpf(2),mpf('0.5')
def gsheet(x, e, sign):
    # g = 1/4pi int sigma (x-r)/R^3 ; r = s e + z k. inner z closed: int dz/(q^2+(Z-z)^2)^{3/2}
    X=x; br=sorted(set([s0,s1,max(s0,min(s1,X[0]*e[0]+X[1]*e[1]))]))
    foot=X[0]*e[0]+X[1]*e[1]
    perp=X[0]*e[1]-X[1]*e[0]
    pts=[s0,s1]
    for d in [mpf(10)**-k for k in range(1,13)]:
        for sg in (1,-1):
            t=foot+sg*d
            if s0<t<s1: pts.append(t)
    if s0<foot<s1: pts.append(foot)
    pts=sorted(set(pts))
    def comp(i):
        def f(s):
            q2=(foot-s)**2+perp**2
            u=X[2]+h; v=X[2]-h
            Iu=lambda t: t/(q2*sqrt(q2+t*t))
            if i<2:
                return sign*c/s*(X[i]-s*e[i])*(Iu(u)-Iu(v))
            return sign*c/s*(-(1/sqrt(q2+u*u)-1/sqrt(q2+v*v)))
        return quad(f,pts)/(4*pi)
    return [comp(i) for i in range(3)]
pts=[(1.5,-1e-3,0.25),(1.5,1e-6,0.25),(1.25,-1e-9,0.0),(1.0-1e-6,-1e-6,0.1),(2.0+1e-9,-1e-9,0.1),(1.5,1e-6,0.5-1e-6),(1.999999,1e-3,0.499)]
for p in pts:
    x=[mpf(t) for t in p]
    a=gsheet(x,(mpf(1),mpf(0)),-1); b=gsheet(x,(mpf(0),mpf(1)),1)
    g=[i+j for i,j in zip(a,b)]
    r2=x[0]**2+x[1]**2
    if 1<sqrt(r2)<2 and x[0]>0 and x[1]>0 and abs(x[2])<h:
        g[0]-=c*x[1]/r2; g[1]+=c*x[0]/r2
    print(p,[nstr(t,20) for t in g])
