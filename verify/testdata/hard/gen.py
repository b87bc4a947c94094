#!/usr/bin/env python3
"""Multiprecision reference values of the field of bound charge.

Natural units: phi(x) = (1/4pi) [ int sigma/|x-r| dA + int rho/|x-r| dV ], g = -grad phi, sigma = p.n, rho = -div p.

Usage
    gen.py verify REF.json     recompute the cases of REF.json that this program knows, and compare all digits
    gen.py make OUT.json       write the cases of cases.py (bodies and points) with their values
    gen.py check OUT.json [ID...]   compare OUT.json with independent methods (see second.py)

Method. All inputs are float64, taken as exact rationals (fractions.Fraction). Local coordinates are a rational over the root
of a rational, so "on the plane", "on the axis", "on the wall" are decided exactly. Every value is computed twice, with 80 and
with 130 digits (and finer quadrature where there is one), and accepted when phi and each component of g agree to 27 digits;
otherwise the digits are raised.

    polygons, boxes, polyhedra   edge logarithms and solid angles, linear density (Wilton et al. 1984)
    discs, cylinders, tubes      complete elliptic integrals in Carlson's form, R_F, R_D, R_J (DLMF 19)
    cylinder with p = c z e3     the same; the potential of the uniformly charged wall by graded Gauss-Legendre in the azimuth
    spheres, shells              dipole formula
    ellipsoids                   R_D at the confocal coordinate (largest root, monotone Newton)
"""
import json
import os
import sys
from fractions import Fraction as Fr
from functools import lru_cache
from math import isqrt

from mpmath import mp, mpf

DIGITS = (80, 130, 220)
NODES = {80: 44, 130: 60, 220: 100}


# ---------------------------------------------------------------- exact numbers and vectors
def M(q):
    """mpf of a Fraction, int or mpf, at the present precision."""
    return mpf(q.numerator) / q.denominator if isinstance(q, Fr) else mpf(q)


def fr(v):
    """Fractions of a float or of a list of floats (exact)."""
    return [fr(t) for t in v] if isinstance(v, (list, tuple)) else Fr(v)


def dot(a, b):
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]


def cross(a, b):
    return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]


def sub(a, b):
    return [a[0] - b[0], a[1] - b[1], a[2] - b[2]]


def add(a, b):
    return [a[0] + b[0], a[1] + b[1], a[2] + b[2]]


def mul(s, a):
    return [s * a[0], s * a[1], s * a[2]]


def vec(a):
    return [M(t) for t in a]


def root(q):
    """Square root of a Fraction: a Fraction if it is rational, else an mpf."""
    n, d = isqrt(q.numerator), isqrt(q.denominator)
    return Fr(n, d) if n * n == q.numerator and d * d == q.denominator else mp.sqrt(M(q))


class Frame:
    """The pose: e3 = axis/|axis|, e1 = part of ref perpendicular to e3 (normalised), e2 = e3 x e1; directions kept unnormalised."""

    def __init__(self, body):
        self.c = fr(body["centre"])
        a, r = fr(body["axis"]), fr(body["ref"])
        b = sub(r, mul(dot(r, a) / dot(a, a), a))
        self.dirs = [b, cross(a, b), a]
        self.n2 = [dot(d, d) for d in self.dirs]
        self.norm = [root(q) for q in self.n2]
        self.rational = all(isinstance(q, Fr) for q in self.norm)

    def along(self, v):
        """Components of the exact vector v along e1, e2, e3: all Fractions in a rational pose, else all mpf."""
        if self.rational:
            return [dot(v, d) / q for d, q in zip(self.dirs, self.norm)]
        return [M(dot(v, d)) / M(q) for d, q in zip(self.dirs, self.norm)]

    def local(self, x):
        return self.along(sub(x, self.c))

    def e(self, i):
        """Unit vector e_i, mpf."""
        return [M(t) / M(self.norm[i]) for t in self.dirs[i]]

    def turn(self, v):
        """Global components (mpf) of the local vector v."""
        out = [mpf(0)] * 3
        for i in range(3):
            out = add(out, mul(M(v[i]), self.e(i)))
        return out

    def cylindrical(self, x):
        """rho^2 (exact), z (exact if e3 is rational), radial unit vector (None on the axis), e3."""
        d = sub(x, self.c)
        da = dot(d, self.dirs[2])
        n = self.norm[2]
        z = da / n if isinstance(n, Fr) else M(da) / n
        radial = sub(d, mul(da / self.n2[2], self.dirs[2]))
        rho2 = dot(radial, radial)
        s = mul(1 / mp.sqrt(M(rho2)), vec(radial)) if rho2 else None
        return rho2, z, s, self.e(2)


# ---------------------------------------------------------------- planar polygons
def polygon(vs, x, s0, b):
    """4 pi (phi, g) of a planar polygon with density s0 + b.r, and how x lies to it.

    vs, x: all Fractions or all mpf. Returns I, g, h, W, I0, n: h the signed distance from the plane, W = |solid angle|
    continued to h = 0 (2 pi inside the polygon), I0 the integral of 1/R. In the plane g is the mean of both sides.
    """
    n_vec = [0, 0, 0]
    for k in range(1, len(vs) - 1):
        n_vec = add(n_vec, cross(sub(vs[k], vs[0]), sub(vs[k + 1], vs[0])))
    nn = dot(n_vec, n_vec)
    rn = mp.sqrt(M(nn))
    n = mul(1 / rn, vec(n_vec))
    h = M(dot(n_vec, sub(x, vs[0]))) / rn
    I0, W, lin = mpf(0), mpf(0), mpf(0)
    gI0, glin = [mpf(0)] * 3, [mpf(0)] * 3
    for k in range(len(vs)):
        va, vb = vs[k], vs[(k + 1) % len(vs)]
        p, q, l = sub(va, x), sub(vb, x), sub(vb, va)
        ll = dot(l, l)
        rl = mp.sqrt(M(ll))
        mv = cross(l, n_vec)
        m, t = mul(1 / (rl * rn), vec(mv)), mul(1 / rl, vec(l))
        d = M(dot(mv, p)) / (rl * rn)
        s1, s2 = M(dot(l, p)) / rl, M(dot(l, q)) / rl
        w = cross(p, l)
        p2 = M(dot(w, w)) / M(ll)
        R1, R2 = mp.sqrt(M(dot(p, p))), mp.sqrt(M(dot(q, q)))
        if s1 >= 0:
            L = mp.log((R2 + s2) / (R1 + s1))
        elif s2 <= 0:
            L = mp.log((R1 - s1) / (R2 - s2))
        else:
            L = mp.log((R2 + s2) * (R1 - s1) / p2)
        if p2:
            W += mp.atan(d * s2 / (p2 + abs(h) * R2)) - mp.atan(d * s1 / (p2 + abs(h) * R1))
        I0 += d * L
        gI0 = sub(gI0, mul(L, m))
        bm = dot(b, m)
        if bm:
            lin += bm * (s2 * R2 - s1 * R1 + p2 * L) / 2
            glin = add(glin, mul(bm, sub(mul(L, sub(mul(h, n), mul(d, m))), mul(R2 - R1, t))))
    I0 -= abs(h) * W
    gI0 = sub(gI0, mul(mp.sign(h) * W, n))
    s = s0 + dot(b, vec(x)) - h * dot(b, n)
    bt = sub(b, mul(dot(b, n), n))
    grad = add(add(mul(I0, bt), mul(s, gI0)), glin)
    return s * I0 + lin, mul(-1, grad), h, W, I0, n


def charged_faces(faces, x, density, rho):
    """4 pi (phi, g) and region of a closed body: faces (outward), density(n) -> (s0, b), uniform volume charge rho."""
    phi, g, on, total = mpf(0), [mpf(0)] * 3, False, mpf(0)
    for vs in faces:
        n_vec = [0, 0, 0]
        for k in range(1, len(vs) - 1):
            n_vec = add(n_vec, cross(sub(vs[k], vs[0]), sub(vs[k + 1], vs[0])))
        s0, b = density(mul(1 / mp.sqrt(M(dot(n_vec, n_vec))), vec(n_vec)))
        I, gi, h, W, I0, n = polygon(vs, x, s0, b)
        phi, g = phi + I - rho * h * I0 / 2, add(add(g, gi), mul(rho * I0, n))
        on = on or (h == 0 and W > 3)
        total -= mp.sign(h) * W
    return phi, g, "on-sheet" if on else "inside" if total > 6 else "outside"


def affine(pol):
    """p0 and G (exact) of a uniform or affine polarization p = p0 + G r."""
    if pol["kind"] == "uniform":
        return fr(pol["p"]), [[Fr(0)] * 3] * 3
    return fr(pol["p0"]), fr(pol["G"])


def value_box(body, pol, x):
    f = Frame(body)
    xl, half = f.local(x), fr(body["half_lengths_e1_e2_e3"])
    if not f.rational:
        half = vec(half)
    p0, G = affine(pol)
    p0c = add(p0, [dot(row, f.c) for row in G])
    pl = vec(f.along(p0c))
    e = [f.e(i) for i in range(3)]
    Gl = [[dot(e[i], [dot(vec(row), e[j]) for row in G]) for j in range(3)] for i in range(3)]
    faces = []
    for i in range(3):
        j, k = (i + 1) % 3, (i + 2) % 3
        for s in (1, -1):
            vs = []
            for u, w in ((1, 1), (-1, 1), (-1, -1), (1, -1)):
                v = [None] * 3
                v[i], v[j], v[k] = s * half[i], u * half[j], w * half[k]
                vs.append(v)
            faces.append(vs if s > 0 else vs[::-1])

    def density(n):
        return dot(pl, n), [sum(Gl[i][j] * n[i] for i in range(3)) for j in range(3)]
    phi, g, region = charged_faces(faces, xl, density, -M(G[0][0] + G[1][1] + G[2][2]))
    return phi, f.turn(g), region


def value_polyhedron(body, pol, x):
    vs = fr(body["vertices"])
    p0, G = affine(pol)
    p0m, Gm = vec(p0), [vec(r) for r in G]

    def density(n):
        return dot(p0m, n), [sum(Gm[i][j] * n[i] for i in range(3)) for j in range(3)]
    return charged_faces([[vs[i] for i in f] for f in body["faces"]], x, density, -M(G[0][0] + G[1][1] + G[2][2]))


def value_polygon(body, pol, x):
    I, g, h, W, _, _ = polygon(fr(body["vertices"]), x, M(Fr(pol["a"])), vec(fr(pol["b"])))
    return I, g, "on-sheet" if h == 0 and W > 3 else "outside"


# ---------------------------------------------------------------- discs, cylinders, tubes
class Circle:
    """Integrals over the circle, the disc and the wall of radius a, for a target at distance rho from the axis."""

    def __init__(self, a, rho2):
        self.a, self.rho, self.side = M(a), mp.sqrt(M(rho2)), (a * a > rho2) - (a * a < rho2)
        self.dr = M(a * a - rho2) / (self.a + self.rho)
        self.memo = {}

    def carlson(self, z):
        """sqrt(Q), k'^2, R_F, R_D/3, R_J(..., g^2) of the rim at the axial distance z."""
        if z not in self.memo:
            Q = (self.a + self.rho) ** 2 + z * z
            kc = (self.dr ** 2 + z * z) / Q
            g = self.dr / (self.a + self.rho)
            rj = mp.elliprj(0, kc, 1, g * g) if g and z else None
            self.memo[z] = mp.sqrt(Q), kc, mp.elliprf(0, kc, 1), mp.elliprd(0, kc, 1) / 3, g, rj
        return self.memo[z]

    def disc(self, z):
        """I = int dA/R, -dI/drho and -dI/dz of the unit disc at height z above it (z = 0: the mean of both sides)."""
        a, rho = self.a, self.rho
        sq, kc, rf, rd, g, rj = self.carlson(z)
        U = 4 * a * rf / sq
        T1 = 4 * a * (2 * rd - rf) / sq
        if not z:
            om = mpf(0)
        elif self.side == 0:
            om = mp.sign(z) * (mp.pi - 2 * abs(z) * rf / sq)
        else:
            c = rf + g * (1 - g) / 3 * rj
            om = mp.sign(z) * (2 * mp.pi * (self.side > 0) - 4 * a / (a + rho) * abs(z) / sq * c)
        return a * U - rho * T1 - z * om, T1, om

    def cosine(self, z):
        """T/rho, T = int_0^z dz' a oint cos(phi)/R dphi = a^2 rho z oint sin^2(phi)/(q^2 R) dphi."""
        a, rho = self.a, self.rho
        if not z:
            return mpf(0)
        if not rho:
            return mp.pi * z / mp.sqrt(a * a + z * z)
        sq, kc, rf, rd, g, rj = self.carlson(z)
        bracket = rd - (g * g * rj / 3 if g else 0)
        return 4 * a * z / (rho * sq) * bracket

    def shell(self, z1, z2, within):
        """W/rho, dW/drho, dW/dz of the wall -z2.. with density cos(phi); z1, z2 = z above the lower and the upper rim.

        within: 1 inside the cylinder, 1/2 on an end, 0 outside.
        """
        w = self.cosine(z1) - self.cosine(z2)
        t1, t2 = self.disc(z1), self.disc(z2)
        return w, -w - t1[2] + t2[2] + 4 * mp.pi * within, t1[1] - t2[1]

    def azimuth(self, f):
        """oint f(q^2, cos phi) dphi, q the distance from (rho, phi=0) to (a, phi): Gauss-Legendre in u, sin(phi/2) = d sinh u."""
        a, rho = self.a, self.rho
        d = abs(self.dr) / (2 * mp.sqrt(a * rho)) if rho else mp.inf

        def at(phi):
            s = mp.sin(phi / 2)
            return f(self.dr ** 2 + 4 * a * rho * s * s, 1 - 2 * s * s)
        if d > 1:
            return 2 * gauss(at, [mp.pi * k / 4 for k in range(5)])
        if d == 0:
            return 2 * mp.quad(at, [0, mp.pi / 2, mp.pi])

        def at_u(u):
            s = d * mp.sinh(u)
            return f(self.dr ** 2 + 4 * a * rho * s * s, 1 - 2 * s * s) * 2 * d * mp.cosh(u) / mp.sqrt(1 - s * s)
        u0 = mp.asinh(mpf(1) / 2 / d)
        n = int(mp.ceil(u0))
        return 2 * (gauss(at_u, [u0 * k / n for k in range(n + 1)]) + gauss(at, [mp.pi * k / 3 for k in (1, 2, 3)]))


@lru_cache(None)
def legendre(n, dps):
    """Nodes and weights of the n-point Gauss-Legendre rule on [-1, 1]."""
    rule = []
    for i in range(n):
        t = mp.cos(mp.pi * (i + mpf(3) / 4) / (n + mpf(1) / 2))
        for _ in range(12):
            p0, p1 = mpf(1), t
            for k in range(2, n + 1):
                p0, p1 = p1, ((2 * k - 1) * t * p1 - (k - 1) * p0) / k
            dp = n * (t * p1 - p0) / (t * t - 1)
            step = p1 / dp
            t -= step
            if abs(step) < mpf(10) ** (-mp.dps * 6 // 10):
                break
        rule.append((t, 2 / ((1 - t * t) * dp * dp)))
    return rule


def gauss(f, cuts):
    total = mpf(0)
    for lo, hi in zip(cuts, cuts[1:]):
        for t, w in legendre(NODES.get(mp.dps, 44), mp.dps):
            total += w * (hi - lo) / 2 * f((lo + hi) / 2 + t * (hi - lo) / 2)
    return total


def radii(body):
    """[(radius, sign)]: the solid is the sum of sign times solids of that radius."""
    if "radius" in body:
        return [(Fr(body["radius"]), 1)]
    return [(Fr(body["r2"]), 1), (Fr(body["r1"]), -1)]


def step(lo, hi):
    """1, 1/2, 0 for hi above, equal to, below lo."""
    return Fr((hi > lo) + (hi >= lo), 2)


def value_disc(body, pol, x):
    """Disc or annulus with constant density."""
    rho2, z, s, e3 = Frame(body).cylindrical(x)
    sigma, phi, g, on = M(Fr(pol["a"])), mpf(0), [mpf(0)] * 3, 0
    for a, sign in radii(body):
        I, gr, gz = Circle(a, rho2).disc(M(z))
        phi += sign * I
        g = add(g, add(mul(sign * gr, s or [0, 0, 0]), mul(sign * gz, e3)))
        on += sign * step(rho2, a * a)
    return sigma * phi, mul(sigma, g), "on-sheet" if z == 0 and on else "outside"


def value_cylinder(body, pol, x):
    """Cylinder or tube, uniform p or p = c z e3."""
    f = Frame(body)
    rho2, z, s, e3 = f.cylindrical(x)
    h = Fr(body["half_length"])
    exact = isinstance(z, Fr)
    z1, z2 = (z + h, z - h) if exact else (z + M(h), z - M(h))
    span = step(0, z1) * step(z2, 0)
    z1, z2, z = M(z1), M(z2), M(z)
    s0 = s or [mpf(0)] * 3
    phi, g, part = mpf(0), [mpf(0)] * 3, Fr(0)
    for a, sign in radii(body):
        c = Circle(a, rho2)
        within = span * step(rho2, a * a)
        part += sign * within
        top, bot = c.disc(z2), c.disc(z1)
        w, wr, wz = c.shell(z1, z2, M(within))
        if pol["kind"] == "axial_z":
            k, L, rho = M(Fr(pol["c"])), M(h), c.rho
            wall = c.a * c.azimuth(lambda q2, _: mp.asinh(z1 / mp.sqrt(q2)) - mp.asinh(z2 / mp.sqrt(q2)))
            vol = (-z2 * top[0] + z1 * bot[0] + c.a * wall - rho * rho * w) / 2
            phi += sign * k * (L * (top[0] + bot[0]) - vol)
            gr = L * (top[1] + bot[1]) - w * rho
            gz = L * (top[2] + bot[2]) - (top[0] - bot[0])
            g = add(g, mul(sign * k, add(mul(gr, s0), mul(gz, e3))))
            continue
        p = fr(pol["p"])
        pa = dot(p, f.dirs[2])
        pz = M(pa) / M(f.norm[2])
        pt = vec(sub(p, mul(pa / f.n2[2], f.dirs[2])))
        if pz:
            phi += sign * pz * (top[0] - bot[0])
            g = add(g, mul(sign * pz, add(mul(top[1] - bot[1], s0), mul(top[2] - bot[2], e3))))
        if any(pt):
            if s is None:
                g = sub(g, mul(sign * w, pt))
                continue
            ps = dot(pt, s)
            phi += sign * w * c.rho * ps
            g = sub(g, mul(sign, add(add(mul(wr * ps, s), mul(w, sub(pt, mul(ps, s)))), mul(wz * ps, e3))))
    return phi, g, {Fr(0): "outside", Fr(1): "inside"}.get(part, "on-sheet")


# ---------------------------------------------------------------- spheres and ellipsoids
def value_sphere(body, pol, x):
    """Ball or shell with uniform p."""
    d, p = sub(x, fr(body["centre"])), fr(pol["p"])
    r2, pd = dot(d, d), M(dot(p, d))
    phi, g, part = mpf(0), [mpf(0)] * 3, Fr(0)
    for a, sign in radii(body):
        within = step(r2, a * a)
        part += sign * within
        r = mp.sqrt(M(r2))
        if within > 0:
            phi += sign * pd / 3
            g = sub(g, mul(M(sign * within) / 3, vec(p)))
        else:
            phi += sign * pd * M(a ** 3) / (3 * r ** 3)
        if within < 1:
            k = sign * M(1 - within) * M(a ** 3) / 3
            g = add(g, mul(k, sub(mul(3 * pd / r ** 5, vec(d)), mul(1 / r ** 3, vec(p)))))
    return 4 * mp.pi * phi, mul(4 * mp.pi, g), {Fr(0): "outside", Fr(1): "inside"}.get(part, "on-sheet")


def value_ellipsoid(body, pol, x):
    f = Frame(body)
    ax = fr(body["semi_axes_e1_e2_e3"])
    d = sub(x, f.c)
    sq = [dot(d, u) ** 2 / n2 for u, n2 in zip(f.dirs, f.n2)]          # squares of the local coordinates, exact
    level = sum(s / (a * a) for s, a in zip(sq, ax))
    xl, p = vec(f.along(d)), vec(f.along(fr(pol["p"])))
    a2, s2 = [M(a * a) for a in ax], vec(sq)
    lam = mpf(0)
    if level > 1:
        lam = max(mpf(0), max(s - a for s, a in zip(s2, a2)))
        for _ in range(200):
            t = sum(s / (a + lam) for s, a in zip(s2, a2))
            move = t * (t - 1) / sum(s / (a + lam) ** 2 for s, a in zip(s2, a2))
            lam += move
            if abs(move) < lam * mpf(10) ** (5 - mp.dps):
                break
    b = [a + lam for a in a2]
    vol = mp.sqrt(a2[0] * a2[1] * a2[2])
    N = [vol / 3 * mp.elliprd(b[(i + 1) % 3], b[(i + 2) % 3], b[i]) for i in range(3)]
    phi = sum(p[i] * xl[i] * N[i] for i in range(3))
    g = [-p[i] * N[i] for i in range(3)]
    if level > 1:
        k = vol / mp.sqrt(b[0] * b[1] * b[2]) / sum(s / q ** 2 for s, q in zip(s2, b)) * sum(p[i] * xl[i] / b[i] for i in range(3))
        g = [g[i] + k * xl[i] / b[i] for i in range(3)]
    region = "inside" if level < 1 else "outside" if level > 1 else "on-sheet"
    return 4 * mp.pi * phi, mul(4 * mp.pi, f.turn(g)), region


VALUE = {"box": value_box, "polyhedron": value_polyhedron, "polygon": value_polygon, "disc": value_disc, "annulus": value_disc,
         "cylinder": value_cylinder, "tube": value_cylinder, "sphere": value_sphere, "spherical_shell": value_sphere,
         "ellipsoid": value_ellipsoid}
KINDS = {"uniform", "affine", "sheet_linear", "axial_z"}


# ---------------------------------------------------------------- values with guaranteed digits
def natural(body, pol, x):
    """phi, g, region at the exact point x, at the present precision."""
    phi, g, region = VALUE[body["type"]](body, pol, x)
    return phi / (4 * mp.pi), mul(1 / (4 * mp.pi), g), region


def certain(body, pol, x):
    """phi, g, region, agreeing at two precisions to 27 digits (zeros: below 1e-28 of |g|)."""
    old = None
    for dps in DIGITS:
        with mp.workdps(dps):
            new = natural(body, pol, x)
            if old and new[2] == old[2] and alike(old, new):
                return new
            old = new
    raise ArithmeticError("no agreement of digits for %s at %s" % (body, [float(t) for t in x]))


def alike(a, b):
    size = mp.sqrt(dot(b[1], b[1]))
    pairs = [(a[0], b[0])] + list(zip(a[1], b[1]))
    return all(abs(p - q) <= mpf(10) ** -27 * abs(q) or max(abs(p), abs(q)) < mpf(10) ** -32 * size or abs(q) < mpf(10) ** -50
               for p, q in pairs)


def text(v, floor):
    """25 significant digits, "0" below the floor."""
    if abs(v) < max(floor, mpf(10) ** -45):
        return "0"
    return mp.nstr(v, 25, strip_zeros=False, min_fixed=-3, max_fixed=25)


def texts(value, size):
    phi, g, region = value
    with mp.workdps(60):
        floor = mpf(10) ** -28 * mp.sqrt(dot(g, g))
        return text(phi, floor * size), [text(t, floor) for t in g], region


def known(case):
    kind, shape = case["polarization"]["kind"], case["body"]["type"]
    return shape in VALUE and kind in KINDS and (shape != "sphere" or kind == "uniform")


def verify(path):
    """Recompute a file: print, for each case, the values whose 25 digits differ."""
    for case in json.load(open(path)):
        if not known(case):
            continue
        worst, bad = 99.0, 0
        for i, pt in enumerate(case["points"]):
            v = certain(case["body"], case["polarization"], fr(pt))
            phi, g, region = texts(v, 1)
            same = phi == case["phi"][i] and g == case["g"][i] and region == case["region"][i]
            if not same:
                bad += 1
                with mp.workdps(60):
                    r = [mpf(t) for t in case["g"][i]]
                    e = mp.sqrt(dot(sub(v[1], r), sub(v[1], r))) / (mp.sqrt(dot(r, r)) or 1)
                    worst = min(worst, float(-mp.log10(e)) if e else 99)
                print("  differs", case["id"], case["tags"][i], pt, region, case["region"][i], phi, case["phi"][i], g, case["g"][i])
        print("%-34s %3d points, %d differ%s" % (case["id"], len(case["points"]), bad, "" if not bad else ", digits %.1f" % worst), flush=True)


def make(path):
    """Write the hard cases, one body after the other; the file is whole at any time. Values of unchanged cases are kept."""
    import cases
    done, old = [], {}
    if os.path.exists(path):
        old = {c["id"]: c for c in json.load(open(path))}
    for case in cases.cases():
        out = {k: case[k] for k in ("id", "body", "polarization", "points")}
        if case["id"] in old and all(json.dumps(out[k]) == json.dumps(old[case["id"]][k]) for k in out):
            done.append({**old[case["id"]], "tags": case["tags"], **case["words"]})
            continue
        vals = [texts(certain(case["body"], case["polarization"], fr(p)), case["size"]) for p in case["points"]]
        out["phi"], out["g"], out["region"] = ([v[k] for v in vals] for k in range(3))
        out["tags"] = case["tags"]
        out.update(case["words"])
        done.append(out)
        write(path, done)
        print(out["id"], len(vals), flush=True)
    write(path, done)


def write(path, done):
    rows = []
    for c in done:
        parts = []
        for k, v in c.items():
            if k in ("points", "g"):
                parts.append('  "%s": [\n   %s]' % (k, ",\n   ".join(json.dumps(t) for t in v)))
            else:
                parts.append('  "%s": %s' % (k, json.dumps(v)))
        rows.append(" {\n" + ",\n".join(parts) + "\n }")
    with open(path + ".part", "w") as f:
        f.write("[\n" + ",\n".join(rows) + "\n]\n")
    os.replace(path + ".part", path)


if __name__ == "__main__":
    if sys.argv[1] == "verify":
        verify(sys.argv[2])
    elif sys.argv[1] == "make":
        make(sys.argv[2])
    else:
        import second
        second.check(sys.argv[2], sys.argv[3:])
