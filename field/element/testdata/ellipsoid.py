"""Writes ellipsoid.json: ellipsoids of extreme axes with affine polarization p = P + G x.

Usage: ellipsoid.py OUT.json. Everything with mpmath to 60 digits at float64 inputs taken exactly, written with 25 digits.
Potential of the density x_j (Ferrers 1877, Dyson 1891, from memory; phi agrees with quadrature of dipoles over the volume
to 14 digits, and with verify/testdata/triples/ellipsoid-affine.json):

    V_j = (a_j^2 abc/4) x_j int_lambda^inf U(s)/((a_j^2 + s) D(s)) ds,   U = 1 - sum x_i^2/(a_i^2 + s),   D = sqrt(prod (a_i^2 + s)),

phi = sum P_j x_j (abc/2) int ds/((a_j^2 + s) D) - sum G_ij d_i V_j. The integrals by the trapezoidal rule in log s, g by differences
of phi, both to 30 digits.
"""
import json, random, math, sys
from mpmath import mp, mpf, sqrt, exp, log, nstr
mp.dps = 60
STEP = mpf(1)/5

def root(a2, x):
    f = lambda l: sum(x[i]**2/(a2[i]+l) for i in range(3))
    if f(mpf(0)) <= 1: return mpf(0)
    lam = max([mpf(0)]+[x[i]**2-a2[i] for i in range(3)])
    for _ in range(500):
        g = f(lam); g2 = sum(x[i]**2/(a2[i]+lam)**2 for i in range(3))
        st = g*(g-1)/g2
        lam += st
        if abs(st) < mpf(10)**-57*(lam+min(a2)): break
    return lam

def integrals(A):
    """I_i = int_0^inf dt/((A_i+t) D), I_ij likewise with both factors."""
    lo = log(min(A))-95; hi = log(max(A))+65
    n = int((hi-lo)/STEP)
    I = [mpf(0)]*3; J = [[mpf(0)]*3 for _ in range(3)]
    e, ratio = exp(lo), exp(STEP)
    for _ in range(n):
        w = [1/(v+e) for v in A]
        f = e*sqrt(w[0]*w[1]*w[2])
        for i in range(3):
            q = f*w[i]; I[i] += q
            for j in range(i, 3): J[i][j] += q*w[j]
        e *= ratio
    for i in range(3):
        I[i] *= STEP
        for j in range(i, 3): J[i][j] *= STEP; J[j][i] = J[i][j]
    return I, J

def potential(a, P, G, x):
    a2 = [v*v for v in a]
    lam = root(a2, x)
    I, J = integrals([v+lam for v in a2])
    abc = a[0]*a[1]*a[2]
    phi = sum(abc/2*P[j]*x[j]*I[j] for j in range(3))
    for i in range(3):
        for j in range(3):
            d = -2*x[i]*x[j]*J[i][j]
            if i == j: d += I[j]-sum(x[k]**2*J[j][k] for k in range(3))
            phi -= G[i][j]*a2[j]*abc/4*d
    return phi

def field(a, P, G, x, small):
    h = small*mpf(10)**-12
    c = lambda i, s: potential(a, P, G, [x[k]+(s*h if k == i else 0) for k in range(3)])
    return [-(8*(c(i, 1)-c(i, -1))-(c(i, 2)-c(i, -2)))/(12*h) for i in range(3)]

if __name__ == '__main__':
    random.seed(11)
    bodies = {'needle': [1/1024, 1/1000, 1.0], 'flat': [1.0, 0.875, 0.001], 'blade': [1.0, 0.03125, 0.001], 'leaf': [1.0, 1.0, 1e-3],
        'hair': [1e-3, 1e-3, 1.0], 'nearly-sphere': [1.0, 1.0+2.0**-40, 1.0-2.0**-20], 'nearly-prolate': [0.5, 0.5+2.0**-30, 1.25],
        'triaxial': [2.0, 0.75, 1.25], 'oblate': [1.0, 1.0, 0.03125]}
    P = [0.25, -0.5, 1.0]
    G = [[0.5, -1.25, 0.75], [2.0, -0.25, 1.5], [-1.0, 0.625, 1.75]]
    cases = []
    for name, a in bodies.items():
        am = [mpf(v) for v in a]
        size, least = max(a), min(a)
        pts = []
        dirs = [[1, 0, 0], [0, 1, 0], [0, 0, 1], [0.8, 0.6, 0.01], [1e-3, 1e-4, 1]]+[[random.gauss(0, 1) for _ in range(3)] for _ in range(2)]
        for k, d in enumerate(dirs):
            n = math.sqrt(sum(v*v for v in d)); s = [a[i]*d[i]/n for i in range(3)]
            nn = [s[i]/a[i]**2 for i in range(3)]; m = math.sqrt(sum(v*v for v in nn)); nn = [v/m for v in nn]
            heights = [[1e-12, -1e-6, 1e-4, 0.1], [-1e-12, 1e-9, 1e-3, 10.0], [1e-12, 1e-6, 1e-2, 1.0]][k % 3]
            for h in heights: pts.append([s[i]+h*size*nn[i] for i in range(3)])
            pts.append([(30.0, 1e3, 1e6)[k % 3]*size*d[i]/n for i in range(3)])
        pts.append([0.5*v for v in a]); pts.append([0.0, 0.0, 0.0])
        ph, gs = [], []
        for x in pts:
            xm = [mpf(v) for v in x]
            a2 = [v*v for v in am]
            off = abs(sum(xm[i]**2/a2[i] for i in range(3))-1)*mpf(least)**2 # below the distance from the surface
            ph.append(nstr(potential(am, P, G, xm), 25))
            gs.append([nstr(v, 25) for v in field(am, P, G, xm, off)])
        cases.append({'id': name, 'axes': a, 'p': P, 'gradient': G, 'points': pts, 'phi': ph, 'g': gs})
        print(name, len(pts), flush=True)
    json.dump(cases, open(sys.argv[1], 'w'), separators=(',', ':'))
