"""Writes cone.json: truncated cones with affine polarization p = P + G (x - About) without divergence, at points off
the surface.

Usage: cone.py OUT.json. Direct integration with mpmath, 22 digits at float64 inputs taken exactly: charge on wall and ends by
Gauss-Legendre of 16 nodes in panels that shrink by 3 towards the point, which leaves 4e-18 of a panel. Values are written with
17 digits.
"""
import json, math, sys
from mpmath import mp, mpf, sqrt, log, sin, cos, pi, nstr
mp.dps = 22

def rule(n):
    out = []
    for k in range(n):
        x = mp.cos(pi*(k+mpf(3)/4)/(n+mpf(1)/2))
        for _ in range(8):
            p0, p1 = mpf(1), x
            for j in range(1, n): p0, p1 = p1, ((2*j+1)*x*p1-j*p0)/(j+1)
            d = n*(x*p1-p0)/(x*x-1); x -= p1/d
        out.append((x, 2/((1-x*x)*d*d)))
    return out

def panels(lo, hi, at, least):
    """Ends of panels that shrink by 3 towards the place at down to the length least."""
    ends = {lo, hi}
    for sign in (-1, 1):
        step = mpf(hi-lo)
        while step > least/3: # a panel next to the place is no longer than its distance
            x = at+sign*step
            if lo < x < hi: ends.add(x)
            step /= 3
    if lo < at < hi: ends.add(mpf(at))
    return sorted(ends)

def nodes(R, ends):
    return [((a+b)/2+(b-a)/2*x, (b-a)/2*w) for a, b in zip(ends, ends[1:]) for x, w in R]

def value(body, P, G, about, X, least, n):
    R = rule(n)
    a0, a1, h = [mpf(v) for v in body]
    half = h/2
    X = [mpf(v) for v in X]
    rho, az = sqrt(X[0]**2+X[1]**2), mp.atan2(X[1], X[0])
    G = [[mpf(v) for v in row] for row in G]
    P = [mpf(P[i])-sum(G[i][j]*mpf(about[j]) for j in range(3)) for i in range(3)]
    def p(y): return [P[i]+G[i][0]*y[0]+G[i][1]*y[1]+G[i][2]*y[2] for i in range(3)]
    phi, g = mpf(0), [mpf(0)]*3
    def add(q, y):
        nonlocal phi
        d = [X[i]-y[i] for i in range(3)]
        r2 = d[0]*d[0]+d[1]*d[1]+d[2]*d[2]
        r = sqrt(r2); f = q/r
        phi += f
        f /= r2
        for i in range(3): g[i] += f*d[i]
    small = least/max(rho, least)
    turn = nodes(R, panels(-pi, pi, mpf(0), small))
    turn = [(cos(az+t), sin(az+t), cos(t), w) for t, w in turn]
    l = sqrt(h*h+(a1-a0)**2); nr, nz = h/l, (a0-a1)/l
    foot = ((rho-a0)*(a1-a0)+(X[2]+half)*h)/l
    for s, ws in nodes(R, panels(mpf(0), l, min(max(foot, mpf(0)), l), least)):
        a, z = a0+(a1-a0)*s/l, -half+h*s/l
        for c, sn, _, w in turn:
            y = [a*c, a*sn, z]; v = p(y)
            add(ws*w*a*(nr*(c*v[0]+sn*v[1])+nz*v[2]), y)
    for a, z, out in ((a0, -half, -1), (a1, half, 1)):
        if a == 0: continue
        for r, wr in nodes(R, panels(mpf(0), a, min(rho, a), least)):
            for c, sn, _, w in turn:
                y = [r*c, r*sn, z]
                add(out*wr*w*r*p(y)[2], y)
    return phi/(4*pi), [v/(4*pi) for v in g]

if __name__ == '__main__':
    P, about = [0.25, -0.5, 1.0], [0.125, 0.0, 0.25]
    G = [[0.5, -1.25, 0.75], [2.0, -0.25, 1.5], [-1.0, 0.625, -0.25]]
    cases = []
    for body in ((0.5, 1.25, 0.75), (1.0, 0.0, 1.0), (1.0, 0.875, 0.0625)):
        a0, a1, h = body
        l = math.hypot(h, a1-a0); nr, nz = h/l, (a0-a1)/l
        pts = []
        for t, d, az in ((0.5, 0.03125, 0.4), (0.25, -0.0234375, 2.0), (0.75, 0.25, -1.0), (1.0, 1.5, -2.5)):
            r, z = a0+t*(a1-a0)+d*nr, h*(t-0.5)+d*nz
            pts.append(([r*math.cos(az), r*math.sin(az), z], abs(d)))
        pts.append(([0.3*a0, 0.2*a0, -h/2-0.0625], 0.0625))
        ph, gs = [], []
        for x, least in pts:
            phi, g = value(body, P, G, about, x, least, 16)
            ph.append(nstr(phi, 17)); gs.append([nstr(v, 17) for v in g])
            print(body, x, ph[-1], gs[-1], flush=True)
        cases.append({'cone': body, 'p': P, 'about': about, 'gradient': G, 'points': [x for x, _ in pts], 'phi': ph, 'g': gs})
    json.dump(cases, open(sys.argv[1], 'w'), separators=(',', ':'))
