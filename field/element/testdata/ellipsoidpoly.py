"""Writes ellipsoidpoly.json: ellipsoids with polynomial polarization, phi and g at float64 inputs taken exactly.

Usage: ellipsoidpoly.py OUT.json. With mpmath to 50 digits, written with 25. Potential of a polynomial density f (Dyson 1891, from
memory), a_i the semi-axes, A_i = a_i^2 + s, U = 1 - sum x_i^2/A_i, D = sqrt(A_1 A_2 A_3):

    V[f] = (abc/4) int_lambda^inf ds/D sum_k U^(k+1)/(4^k k! (k+1)!) (L^k f)(x_i a_i^2/A_i),   L = sum (s a_i^2/A_i) d_i^2,

phi = -sum d_i V[p_i]; the integral by the trapezoidal rule in log(s - lambda), g by differences of phi. Points marked "checked" were
compared when this was written with
    phi = -(1/4pi) int p.(r-x)/|r-x|^3 dV
in polar coordinates, about x inside (radially exact) and about the centre outside, by Gauss and trapezoidal rules in double
precision: all agree to 1e-11.
"""
import json, random, math, sys
from mpmath import mp, mpf, sqrt, exp, log, nstr, factorial
import numpy as np
mp.dps = 50
STEP = mpf(1)/4

def falling(n, k):
    v = 1
    for i in range(k): v *= n-i
    return v

def terms(p, a):
    """phi = (abc/4) int ds/D sum c b^q e^n U^u al_l with b = s/A, al = a^2/A, e = al x/a, from the terms of p."""
    out = {}
    def put(c, q, n, u, l):
        key = (q, n, u, l)
        out[key] = out.get(key, mpf(0)) + c
    for comp, c, g in p:
        c = mpf(c)*a[0]**g[0]*a[1]**g[1]*a[2]**g[2]/a[comp]
        for i in range(g[0]//2+1):
            for j in range(g[1]//2+1):
                for k in range(g[2]//2+1):
                    m = i+j+k
                    w = c/(mpf(4)**m*factorial(m+1)*factorial(i)*factorial(j)*factorial(k))
                    w *= falling(g[0], 2*i)*falling(g[1], 2*j)*falling(g[2], 2*k)
                    n = [g[0]-2*i, g[1]-2*j, g[2]-2*k]
                    up = list(n); up[comp] += 1
                    put(2*(m+1)*w, (i, j, k), tuple(up), m, -1)
                    if n[comp]:
                        dn = list(n); dn[comp] -= 1
                        put(-n[comp]*w, (i, j, k), tuple(dn), m+1, comp)
    return out

def root(a2, x):
    f = lambda l: sum(x[i]**2/(a2[i]+l) for i in range(3))
    if f(mpf(0)) <= 1: return mpf(0)
    lam = max([mpf(0)]+[x[i]**2-a2[i] for i in range(3)])
    for _ in range(500):
        g = f(lam); g2 = sum(x[i]**2/(a2[i]+lam)**2 for i in range(3))
        st = g*(g-1)/g2
        lam += st
        if abs(st) < mpf(10)**-46*(lam+min(a2)): break
    return lam

def potential(a, T, x, top):
    a2 = [v*v for v in a]
    lam = root(a2, x)
    A0 = [v+lam for v in a2]
    lo, hi = log(min(A0))-75, log(max(A0))+55
    e, ratio = exp(lo), exp(STEP)
    total = mpf(0)
    for _ in range(int((hi-lo)/STEP)):
        A = [v+e for v in A0]; s = lam+e
        al = [a2[i]/A[i] for i in range(3)]
        U = 1-sum(x[i]**2/A[i] for i in range(3))
        def powers(v):
            r = [mpf(1)]
            for _ in range(top): r.append(r[-1]*v)
            return r
        E = [powers(al[i]*x[i]/a[i]) for i in range(3)]; B = [powers(s/A[i]) for i in range(3)]; P = powers(U)
        f = mpf(0)
        for (q, n, u, l), c in T.items():
            t = c*B[0][q[0]]*B[1][q[1]]*B[2][q[2]]*E[0][n[0]]*E[1][n[1]]*E[2][n[2]]*P[u]
            f += t if l < 0 else t*al[l]
        total += f*e/sqrt(A[0]*A[1]*A[2])
        e *= ratio
    return total*STEP*a[0]*a[1]*a[2]/4

def field(a, T, x, top, small):
    h = small*mpf(10)**-13
    c = lambda i, s: potential(a, T, [x[k]+(s*h if k == i else 0) for k in range(3)], top)
    return [-(8*(c(i, 1)-c(i, -1))-(c(i, 2)-c(i, -2)))/(12*h) for i in range(3)]

def brute(a, p, x, n=120):
    a, x = np.array(a, float), np.array(x, float)
    t, w = np.polynomial.legendre.leggauss(n)
    az = (np.arange(2*n)+0.5)*np.pi/n
    s = np.sqrt(1-t*t)
    om = np.stack([np.outer(s, np.cos(az)), np.outer(s, np.sin(az)), np.outer(t, np.ones(2*n))])
    W = np.outer(w, np.full(2*n, np.pi/n))
    def at(r):
        v = [np.zeros(r[0].shape) for _ in range(3)]
        for comp, c, g in p: v[comp] = v[comp]+c*r[0]**g[0]*r[1]**g[1]*r[2]**g[2]
        return v
    total = 0.0
    rt, rw = np.polynomial.legendre.leggauss(24 if sum((x/a)**2) < 1 else n)
    if sum((x/a)**2) < 1:
        A = sum((om[i]/a[i])**2 for i in range(3)); B = sum(om[i]*x[i]/a[i]**2 for i in range(3)); C = sum((x/a)**2)-1
        R = (-B+np.sqrt(B*B-A*C))/A
        for y, q in zip(rt, rw):
            r = R*(1+y)/2
            v = at([x[i]+r*om[i] for i in range(3)])
            total -= np.sum(W*R/2*q*sum(v[i]*om[i] for i in range(3)))
    else:
        for y, q in zip(rt, rw):
            m = (1+y)/2
            r = [a[i]*m*om[i] for i in range(3)]
            v = at(r); d = [r[i]-x[i] for i in range(3)]
            D = sum(z*z for z in d)**1.5
            total -= np.sum(W*q/2*m*m*a[0]*a[1]*a[2]*sum(v[i]*d[i] for i in range(3))/D)
    return total/(4*np.pi)

if __name__ == '__main__':
    random.seed(7)
    cubic = [(0, 0.5, (2, 1, 0)), (0, -0.25, (0, 0, 3)), (1, 1.0, (1, 1, 1)), (2, 0.75, (0, 2, 1)), (2, -1.0, (0, 0, 0)), (1, 0.5, (0, 0, 2))]
    axial = [(2, 1.0, (0, 0, 8))]
    high = [(0, 1.0, (4, 0, 2)), (1, -0.5, (1, 3, 3)), (2, 0.75, (2, 2, 8)), (2, 0.25, (0, 12, 0)), (0, 0.125, (1, 0, 0))]
    bodies = [('triaxial cubic', [1.0, 0.75, 0.5], cubic, True), ('sphere high', [1.0, 1.0, 1.0], high, True),
        ('oblate high', [1.0, 1.0, 0.5], high, True), ('prolate axial', [0.5, 0.5, 1.0], axial, True),
        ('flat cubic', [1.0, 0.75, 0.01], cubic, False), ('needle axial', [0.01, 0.0125, 1.0], axial, False), ('blade high', [1.0, 0.125, 0.015625], high, False)]
    cases = []
    for name, a, p, check in bodies:
        am = [mpf(v) for v in a]
        top = 2+max(sum(g) for _, _, g in p)
        T = terms(p, am)
        pts = []
        for h in ([-0.9, -0.3, 1.0, 6.0] if check else [-0.5, 0.25])+[-1e-9, 1e-5, 100.0]:
            d = [random.gauss(0, 1) for _ in range(3)]
            n = math.sqrt(sum(v*v for v in d)); s = [a[i]*d[i]/n for i in range(3)]
            pts.append([(1+h)*v for v in s] if h <= 1e-4 else [v+h*max(a)*d[i]/n for i, v in enumerate(s)])
        case = {'ID': name, 'Axes': a, 'P': p, 'Points': pts, 'Phi': [], 'G': [], 'Checked': []}
        for k, x in enumerate(pts):
            xm = [mpf(v) for v in x]
            phi = potential(am, T, xm, top)
            ok = check and k < 4
            if ok:
                b = brute(a, p, x)
                print(name, x, nstr(phi, 16), b, flush=True)
                assert abs(b-phi) < 1e-11*max(abs(phi), mpf(10)**-3), (name, x)
            case['Phi'].append(nstr(phi, 25)); case['Checked'].append(ok)
            case['G'].append([nstr(v, 25) for v in field(am, T, xm, top, min(am))])
        cases.append(case)
    json.dump(cases, open(sys.argv[1], 'w'), indent=1)
