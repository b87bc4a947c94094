"""Second formulation of the closed-form families, by one-dimensional quadrature, against which every stored triple is held.

polygon    the integrals of a face by quadrature along its edges in polar form (no logarithm of a face, no solid angle formula):
           int dA/R = sum d int dl/(R + |h|),  |Omega| = sum d int dl/(R (R + |h|)),  l = p sinh u, p the distance from the edge line
ellipsoid  the confocal integrals by Gauss panels in log; the confocal coordinate by bisection
Cylinders, tubes, discs and annuli: values.value_swept (quadrature in the azimuth).
"""
from num import *
import gen
from gen import M, add, cross, dot, fr, mul, sub, vec


def along(u1, u2, q):
    """int du/(cosh u + q) over [u1, u2], 0 <= q <= 1, by Gauss panels of length 2 at most."""
    m = int((u2 - u1) / 2) + 1
    total = mpfr(0)
    for k in range(m):
        for u, w in on(u1 + (u2 - u1) * k / m, u1 + (u2 - u1) * (k + 1) / m):
            e = gmpy2.exp(u)
            total += w / ((e + 1 / e) / 2 + q)
    return total


def polygon(vs, x, s0, b):
    """As gen.polygon, by quadrature."""
    tune()
    n_vec = [0, 0, 0]
    for k in range(1, len(vs) - 1):
        n_vec = add(n_vec, cross(sub(vs[k], vs[0]), sub(vs[k + 1], vs[0])))
    rn = mp.sqrt(M(dot(n_vec, n_vec)))
    n = mul(1 / rn, vec(n_vec))
    h = M(dot(n_vec, sub(x, vs[0]))) / rn
    ah = abs(h)
    I0, W, lin = mpf(0), mpf(0), mpf(0)
    gI0, glin = [mpf(0)] * 3, [mpf(0)] * 3
    for k in range(len(vs)):
        va, vb = vs[k], vs[(k + 1) % len(vs)]
        l = sub(vb, va)
        rl = mp.sqrt(M(dot(l, l)))
        mv = cross(l, n_vec)
        m, t = mul(1 / (rl * rn), vec(mv)), mul(1 / rl, vec(l))
        d = M(dot(mv, sub(va, x))) / (rl * rn)
        l1, l2 = M(dot(l, sub(va, x))) / rl, M(dot(l, sub(vb, x))) / rl
        p = mp.sqrt(d * d + h * h)
        if p:
            u1, u2 = asinh(N(l1 / p)), asinh(N(l2 / p))
            L = back(u2 - u1)
            w = back(along(u1, u2, N(ah / p)))      # int dl/(R + |h|) = u2 - u1 - (|h|/p) w
            W += d / p * w
            I0 += d * (L - ah / p * w)
        else:
            L = abs(mp.log(l2 / l1))
        gI0 = sub(gI0, mul(L, m))
        bm = dot(b, m)
        if bm:
            R1, R2 = mp.sqrt(l1 * l1 + p * p), mp.sqrt(l2 * l2 + p * p)
            lin += bm * (l2 * R2 - l1 * R1 + p * p * L) / 2
            glin = add(glin, mul(bm, sub(mul(L, sub(mul(h, n), mul(d, m))), mul(R2 - R1, t))))
    gI0 = sub(gI0, mul(mp.sign(h) * W, n))
    s = s0 + dot(b, vec(x)) - h * dot(b, n)
    bt = sub(b, mul(dot(b, n), n))
    return s * I0 + lin, mul(-1, add(add(mul(I0, bt), mul(s, gI0)), glin)), h, W, I0, n


def ellipsoid(body, pol, x):
    """4 pi (phi, g) of a uniformly polarized ellipsoid, sphere or hollow sphere as a difference of two spheres."""
    tune()
    if "semi_axes_e1_e2_e3" not in body:
        phi, g = mpf(0), [mpf(0)] * 3
        for a, sign in gen.radii(body):
            q = {"centre": body["centre"], "axis": [0.0, 0.0, 1.0], "ref": [1.0, 0.0, 0.0], "semi_axes_e1_e2_e3": [a] * 3}
            v = ellipsoid(q, pol, x)
            phi, g = phi + sign * v[0], add(g, mul(sign, v[1]))
        return phi, g, ""
    f = gen.Frame(body)
    a2 = [N(Fr(t)) ** 2 for t in body["semi_axes_e1_e2_e3"]]
    xl, p = [N(t) for t in vec(f.local(x))], [N(t) for t in vec(f.along(fr(pol["p"])))]
    x2 = [t * t for t in xl]
    level = lambda s: sum(t / (a + s) for t, a in zip(x2, a2)) - 1
    lo = mpfr(0)
    if level(lo) > 0:
        hi = sum(x2)
        step = hi
        while step > hi * mpfr(10) ** (5 - mp.dps) * mpfr("1e-26"):
            step = step / 2
            if level(lo + step) > 0:
                lo += step
    b = [a + lo for a in a2]
    least = min(b)
    acc = [mpfr(0)] * 3
    end = float(log(max(b) / least)) + 2 * 2.302585 * mp.dps / 3 + 8
    m = int(end / 2) + 1
    for k in range(m):
        for v, w in on(mpfr(end) * k / m, mpfr(end) * (k + 1) / m):
            e = gmpy2.exp(v)
            q = [c + least * (e - 1) for c in b]
            w *= least * e / sqrt(q[0] * q[1] * q[2])
            for i in range(3):
                acc[i] += w / q[i]
    vol = sqrt(a2[0] * a2[1] * a2[2])
    phi = vol / 2 * sum(p[i] * xl[i] * acc[i] for i in range(3))
    g = [-vol / 2 * p[i] * acc[i] for i in range(3)]
    if lo > 0:
        k = vol / sqrt(b[0] * b[1] * b[2]) / sum(s / q ** 2 for s, q in zip(x2, b)) * sum(p[i] * xl[i] / b[i] for i in range(3))
        g = [g[i] + k * xl[i] / b[i] for i in range(3)]
    return 4 * mp.pi * back(phi), mul(4 * mp.pi, f.turn([back(t) for t in g])), ""
