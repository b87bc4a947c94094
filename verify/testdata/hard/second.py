"""Second, independent methods for the values written by gen.py; prints the digits of agreement of every case.

direct    3-D quadrature of the dipole density p.(x-r)/|x-r|^3 (bodies) or 2-D of the charged sheet, Gauss-Legendre, 80-bit floats;
          no equivalent charges, no closed form; points outside at 1.5 to 30 sizes, 18-19 digits at best
slope     g against central differences of phi (step 1e-30 of the size, 130 digits), points of all classes
azimuth   disc and wall integrals of discs, cylinders, tubes by one-dimensional quadrature round the rim, at points of all classes
confocal  ellipsoids: phi against tanh-sinh quadrature of the confocal integral
"""
import json
import random
from fractions import Fraction as Fr

import numpy as np
from mpmath import mp, mpf

import gen
from gen import M, dot, fr, mul, sub

LD = np.longdouble


def digits(a, b):
    """Digits to which the vectors (or numbers) a and b agree, relative to the length of b."""
    a, b = (t if isinstance(t, list) else [t] for t in (a, b))
    e, n = mp.sqrt(sum((p - q) ** 2 for p, q in zip(a, b))), mp.sqrt(sum(q * q for q in b))
    return 99.0 if e == 0 else -99.0 if n == 0 else float(-mp.log10(e / n))


def ld(x):
    """mpf to an 80-bit float."""
    hi = float(x)
    return LD(hi) + LD(float(x - hi))


def rule(n):
    with mp.workdps(40):
        r = gen.legendre(n, 40)
        return np.array([ld((1 + t) / 2) for t, _ in r]), np.array([ld(w / 2) for _, w in r])


def cube(n):
    t, w = rule(n)
    u = np.stack(np.meshgrid(t, t, t, indexing="ij"), -1).reshape(-1, 3)
    return u, (w[:, None, None] * w[None, :, None] * w[None, None, :]).reshape(-1)


def square(n):
    t, w = rule(n)
    return np.stack(np.meshgrid(t, t, indexing="ij"), -1).reshape(-1, 2), (w[:, None] * w[None, :]).reshape(-1)


def nodes(b):
    """Nodes (relative to an origin) and weights over the volume, or over the sheet; the origin, mpf."""
    kind = b["type"]
    pi = ld(mp.pi)
    if kind in ("polygon", "polyhedron"):
        vs = [gen.vec(fr(v)) for v in b["vertices"]]
        o = vs[0]
        v = [np.array([ld(t) for t in sub(w, o)]) for w in vs]
        if kind == "polygon":
            u, w = square(40)
            n = sum(np.cross(v[k], v[k + 1]) for k in range(1, len(v) - 1))
            n = n / np.sqrt(n @ n)
            parts = [(u[:, :1] * (v[k] + u[:, 1:] * (v[k + 1] - v[k])), w * u[:, 0] * (np.cross(v[k], v[k + 1]) @ n)) for k in range(1, len(v) - 1)]
        else:
            u, w = cube(22)
            parts = []
            for f in b["faces"]:
                for k in range(1, len(f) - 1):
                    p, q, r = v[f[0]], v[f[k]], v[f[k + 1]]
                    x = u[:, :1] * (p + u[:, 1:2] * (q - p + u[:, 2:] * (r - q)))
                    parts.append((x, w * u[:, 0] ** 2 * u[:, 1] * (np.cross(p, q) @ r)))
        return np.concatenate([p for p, _ in parts]), np.concatenate([q for _, q in parts]), o
    f = gen.Frame(b)
    e = np.array([[ld(t) for t in f.e(i)] for i in range(3)])
    if kind == "box":
        u, w = cube(36)
        h = np.array([LD(t) for t in b["half_lengths_e1_e2_e3"]])
        return ((2 * u - 1) * h) @ e, w * 8 * h[0] * h[1] * h[2], gen.vec(f.c)
    r1, r2 = LD(b.get("r1", 0.0)), LD(b.get("radius", b.get("r2", 1.0)))
    t, w = rule(36)
    m = 72                                          # periodic rule in the azimuth
    phi = (np.arange(m).astype(LD) + LD(0.5)) * 2 * pi / m
    r, wr = r1 + (r2 - r1) * t, w * (r2 - r1)
    if kind in ("disc", "annulus"):
        R, P = np.meshgrid(r, phi, indexing="ij")
        W = np.meshgrid(wr * r, np.full(m, 2 * pi / m, LD), indexing="ij")
        x = np.stack([R * np.cos(P), R * np.sin(P), 0 * R], -1).reshape(-1, 3)
        return x @ e, (W[0] * W[1]).reshape(-1), gen.vec(f.c)
    R, Z, P = np.meshgrid(r, 2 * t - 1, phi, indexing="ij")
    if kind in ("cylinder", "tube"):
        L = LD(b["half_length"])
        x = np.stack([R * np.cos(P), R * np.sin(P), L * Z], -1)
        W = (wr * r)[:, None, None] * (w * 2 * L)[None, :, None] * np.full(m, 2 * pi / m, LD)[None, None, :]
    else:                                           # balls: Z is the cosine of the polar angle
        S = np.sqrt(1 - Z * Z)
        x = np.stack([R * S * np.cos(P), R * S * np.sin(P), R * Z], -1)
        W = (wr * r * r)[:, None, None] * (w * 2)[None, :, None] * np.full(m, 2 * pi / m, LD)[None, None, :]
        if kind == "ellipsoid":
            a = np.array([LD(t) for t in b["semi_axes_e1_e2_e3"]])
            x, W = x * a, W * a[0] * a[1] * a[2]
    return x.reshape(-1, 3) @ e, W.reshape(-1), gen.vec(f.c)


def direct(case, x, cache={}):
    """phi and g by direct quadrature."""
    if case["id"] not in cache:
        cache.clear()
        cache[case["id"]] = nodes(case["body"])
    r, w, o = cache[case["id"]]
    pol = case["polarization"]
    d = np.array([ld(t) for t in sub(gen.vec(x), o)]) - r
    R = np.sqrt((d * d).sum(1))
    c = 1 / (4 * ld(mp.pi))
    om = np.array([ld(t) for t in o])
    if pol["kind"] == "sheet_linear":
        b = gen.vec(fr(pol["b"]))
        s = ld(M(Fr(pol["a"])) + dot(b, o)) + r @ np.array([ld(t) for t in b])
        return c * (w * s / R).sum(), c * ((w * s / R ** 3)[:, None] * d).sum(0)
    if pol["kind"] == "axial_z":
        e3 = np.array([ld(t) for t in gen.Frame(case["body"]).e(2)])
        p = LD(pol["c"]) * (r @ e3)[:, None] * e3
    else:
        p0, G = gen.affine(pol)
        at = gen.vec(gen.add(p0, [sum(M(row[j]) * o[j] for j in range(3)) for row in G]))
        p = np.array([ld(t) for t in at]) + r @ np.array([[ld(M(t)) for t in row] for row in G]).T
    pd = (p * d).sum(1)
    return c * (w * pd / R ** 3).sum(), c * (w[:, None] * (3 * pd[:, None] * d / R[:, None] ** 5 - p / R[:, None] ** 3)).sum(0)


def slope(case, x, size):
    """-grad phi by central differences."""
    h = Fr(size) / 10 ** 30
    g = []
    for i in range(3):
        a, b = ([t + s * h * (j == i) for j, t in enumerate(x)] for s in (1, -1))
        g.append(-(gen.natural(case["body"], case["polarization"], a)[0] - gen.natural(case["body"], case["polarization"], b)[0]) / M(2 * h))
    return g


def azimuth(case, x):
    """Digits of the disc and wall integrals against quadrature round the rim: the worst of I, T1, Omega, T/rho."""
    b = case["body"]
    rho2, z, _, _ = gen.Frame(b).cylindrical(x)
    worst = 99.0
    for a, _ in gen.radii(b):
        for h in ((Fr(0),) if "half_length" not in b else (Fr(b["half_length"]), -Fr(b["half_length"]))):
            c, zz = gen.Circle(a, rho2), M(z) - M(h)
            if not zz or not c.dr:
                continue
            r2 = lambda q2: mp.sqrt(q2 + zz * zz)
            arm = lambda co: c.a * (c.dr + c.rho * (1 - co)) if c.rho else c.a ** 2
            I = c.azimuth(lambda q2, co: arm(co) / (r2(q2) + abs(zz)))
            T1 = c.azimuth(lambda q2, co: c.a * co / r2(q2))
            om = c.azimuth(lambda q2, co: arm(co) / (r2(q2) + abs(zz)) / r2(q2)) * mp.sign(zz)
            T = c.azimuth(lambda q2, co: c.a ** 2 * zz * (1 - co * co) / (q2 * r2(q2)))
            got = c.disc(zz)
            worst = min(worst, digits(got[0], I), digits(got[2], om), digits(c.cosine(zz), T),
                        float(-mp.log10(abs(got[1] - T1) / (abs(got[2]) + abs(T1)) + mpf(10) ** -99)))
    return worst


def confocal(case, x):
    """phi of an ellipsoid: (abc/2) int_lambda^inf sum p_i x_i/(a_i^2+s) ds/Delta(s), by quadrature; lambda by bisection."""
    b = case["body"]
    f = gen.Frame(b)
    a2 = [M(Fr(t)) ** 2 for t in b["semi_axes_e1_e2_e3"]]
    xl, p = gen.vec(f.local(x)), gen.vec(f.along(fr(case["polarization"]["p"])))
    level = lambda s: sum(t * t / (a + s) for t, a in zip(xl, a2)) - 1
    lo, hi = mpf(0), dot(xl, xl)
    if level(lo) > 0:
        for _ in range(400):
            mid = (lo + hi) / 2
            lo, hi = (mid, hi) if level(mid) > 0 else (lo, mid)
    k = mp.sqrt(a2[0] * a2[1] * a2[2]) / 2

    def f1(t):                                      # s = lo + t
        q = [a + lo + t for a in a2]
        return k * sum(p[i] * xl[i] / q[i] for i in range(3)) / mp.sqrt(q[0] * q[1] * q[2])
    cuts = [-60 + 5 * i for i in range(25)]
    scale = max(a2)
    return mp.quad(lambda v: f1(scale * mp.exp(v)) * scale * mp.exp(v), [-mp.inf] + cuts + [mp.inf])


def check(path, only=()):
    """Print the digits of agreement of every case, or of the cases named."""
    rnd = random.Random(1)
    for case in json.load(open(path)):
        if only and case["id"] not in only:
            continue
        b, n = case["body"], len(case["points"])
        with mp.workdps(130):
            d = {"direct": [99.0, 0], "slope": [99.0, 0], "azimuth": [99.0, 0], "confocal": [99.0, 0]}

            def note(kind, v):
                d[kind] = [min(d[kind][0], v), d[kind][1] + 1]
            near = [i for i in range(n) if case["tags"][i].startswith("near")]
            rest = [i for i in range(n) if i not in near]
            for i in rnd.sample(near, 8) + rnd.sample(rest, 8):
                x = fr(case["points"][i])
                if case["region"][i] == "on-sheet":
                    continue
                g = [mpf(t) for t in case["g"][i]]
                far = max(1.0, max(abs(t) for t in case["points"][i]) / 1e3)
                if any(g) and not ("wall-extension" in case["tags"][i] and case["polarization"]["kind"] == "axial_z"):
                    note("slope", digits(slope(case, x, far), g))
            for i in range(n):
                t = case["tags"][i]
                if t.startswith("outside-") and float(t[8:]) >= (3 if b["type"] == "polyhedron" else 1.5):
                    phi, g = direct(case, fr(case["points"][i]))
                    back = lambda v: mpf(float(v)) + mpf(float(v - LD(float(v))))
                    note("direct", digits([back(t) for t in g], [mpf(t) for t in case["g"][i]]))
                    if case["phi"][i] != "0":
                        note("direct", min(99, digits(back(phi), mpf(case["phi"][i]))))
        with mp.workdps(80):
            if b["type"] in ("disc", "annulus", "cylinder", "tube"):
                for i in rnd.sample(near, 4) + rnd.sample(rest, 2):
                    if "wall-ext" not in case["tags"][i]:
                        note("azimuth", azimuth(case, fr(case["points"][i])))
        with mp.workdps(40):
            if b["type"] == "ellipsoid":
                for i in rnd.sample(near, 3) + rnd.sample(rest, 3):
                    if case["phi"][i] != "0":
                        note("confocal", digits(confocal(case, fr(case["points"][i])) , mpf(case["phi"][i])))
        print("%-40s %s" % (case["id"], "  ".join("%s %.1f (%d)" % (k, v, m) for k, (v, m) in d.items() if m)), flush=True)
