"""Bodies and points of the second-stage reference cases (see cases.py); all numbers float64, reproducible (seeded)."""
import math
import random
from fractions import Fraction as Fr

from num import *
import cases
import values
from cases import (ALIGNED, GENERIC, GENERIC2, HERE, NEAR, OBLIQUE, RATIONAL, REGION, SEVENTHS, TILT, TILT2, U4, away, G1, NOTE)
from gen import M, add, dot, mul, sub, vec, fr

ANGLE = "radians about e3, from e1 towards e2; the body is r1<s<r2, phi1<phi<phi2, |z|<half_length"
MEANING = dict(cases.MEANING)
MEANING.update({
    "radial_unit": "p = c s_hat (unit radial vector from the axis times c)",
    "axial_z2": "p = c z^2 e3, z = local axial coordinate (from centre)",
    "axial_power": "p = c z^n e3, z = local axial coordinate (from centre), n an integer >= 0",
    "radial_s": "p = c s s_hat, s = distance from the axis",
    "radial_s2": "p = c s^2 s_hat",
    "radial_power": "p = c s^n s_hat, s = distance from the axis, real n >= 0; rho = -c (n+1) s^(n-1)",
    "ball_r": "p = c (r - centre)",
    "ball_r2": "p = c |r-centre| (r - centre)",
    "central_power": "p = c d^n d_hat, d = r - centre, real n >= 0; rho = -c (n+2) |d|^(n-1)",
    "polynomial": "p_component(r) = sum over terms [component, coefficient, [i, j, k]] of coefficient x^i y^j z^k, GLOBAL components, absolute global position",
})
pol = lambda kind, **v: {"kind": kind, **v, "meaning": MEANING[kind]}
u = lambda *p: pol("uniform", p=list(map(float, p)))
aff = lambda p0, G: pol("affine", p0=list(map(float, p0)), G=[list(map(float, r)) for r in G])
body = cases.body
G2 = [[-0.7, 0.4, 1.1], [0.55, 1.3, -0.85], [0.2, 0.95, 0.6]]


def affine_about(centre, G, q):
    """Affine kind whose value at the centre is near q."""
    p0 = [float(q[i]) - sum(G[i][j] * centre[j] for j in range(3)) for i in range(3)]
    return aff(p0, G)


def sector(n, r1, r2, p1, p2, h, pose, c, p):
    return n, body("tube_sector", {"r1": r1, "r2": r2, "phi1": p1, "phi2": p2, "half_length": h, "angle": ANGLE}, pose, c), p


def cone(n, rb, rt, h, pose, c, p):
    return n, body("truncated_cone", {"radius_bottom_at_z=-half_length": rb, "radius_top_at_z=+half_length": rt, "half_length": h}, pose, c), p


def torus(n, R, r, pose, c, p):
    return n, body("torus", {"major_radius": R, "minor_radius": r}, pose, c), p


def cyl(n, r, h, pose, c, p):
    return n, body("cylinder", {"radius": r, "half_length": h}, pose, c), p


def tube(n, r1, r2, h, pose, c, p):
    return n, body("tube", {"r1": r1, "r2": r2, "half_length": h}, pose, c), p


class Points:
    """Distinct float64 points with tags; the tag of a near point ends with the side on which the rounded point lies."""

    def __init__(self, case, seed):
        self.case, self.b = case, case["body"]
        self.rnd = random.Random(seed)
        self.f = gen.Frame(self.b)
        self.c = vec(self.f.c)
        self.points, self.tags = [], []

    direction = cases.Points.direction

    def mix(self, lo, hi):
        return self.rnd.uniform(lo, hi)

    def local(self, v):
        return add(self.c, self.f.turn([mpf(t) for t in v]))

    def polar(self, s, phi, z):
        s = mpf(s)
        return self.local([s * mp.cos(phi), s * mp.sin(phi), mpf(z)])

    def put(self, x, tag):
        p = [float(t) + 0.0 for t in x]
        if p in self.points:
            return False
        dist, exact, region = self.near(fr(p))
        tol = U4 * (math.sqrt(sum(t * t for t in p)) + self.case["size"])
        if dist < tol and not exact:
            return False
        if tag.startswith("near-"):
            tag += {"inside": "-in", "outside": "-out", "on-sheet": "-on-sheet"}[region]
        self.points.append(p)
        self.tags.append(tag)
        return True

    def near(self, x):
        """Distance from the nearest charged surface, whether the point is exactly on a flat one (or its plane), region."""
        L = values.Local(self.b, x)
        return nearest(self.b, L)

    def afar(self, ks=(0.8, 1.3, 2.2, 3.7, 8.0, 30.0)):
        for k in ks:
            self.put(add(self.c, mul(mpf(k) * self.case["size"], self.direction())), "outside-%g" % k)
        for k in (1e2, 1e3, 1e4, 1e5, 1e6):
            self.put(add(self.c, mul(mpf(k) * self.case["size"], self.direction())), "far-1e+%02d" % round(math.log10(k)))


def seg_dist(s, z, g):
    l = (s - g.sA) * g.ts + (z - g.zA) * g.tz
    l = min(max(l, mpfr(0)), g.len)
    return float(hypot(s - g.sA - l * g.ts, z - g.zA - l * g.tz))


def nearest(b, L):
    if b["type"] == "torus":
        de = hypot(L.s - N(Fr(b["major_radius"])), L.z) - N(Fr(b["minor_radius"]))
        return abs(float(de)), False, "inside" if de < 0 else "outside"
    segs, gaps = values.make(b, L)
    phis = (N(Fr(b["phi1"])), N(Fr(b["phi2"]))) if b["type"] == "tube_sector" else None
    region = values.region_of(b, L, segs, gaps, phis)
    exact, dist = False, 1e300
    arc = True
    if phis:
        d = L.phi0 - phis[0]
        d -= 2 * pi() * gmpy2.floor(d / (2 * pi()))
        w = phis[1] - phis[0]
        arc = d < w
        r1, r2, h = float(b["r1"]), float(b["r2"]), float(b["half_length"])
        for e in (d, d - w, d - 2 * pi()):
            c = float(cos(e))
            if c > 0:
                s, hh, z = float(L.s) * c, abs(float(L.s * sin(e))), float(L.z)
                ds, dz = max(r1 - s, s - r2, 0.0), max(abs(z) - h, 0.0)
                q = math.sqrt(ds * ds + dz * dz + hh * hh)
                if q < 1e-40 or (hh < 1e-40):
                    exact = True
                else:
                    dist = min(dist, q)
        if min(abs(float(d)), abs(float(d - w)), abs(float(d - 2 * pi()))) < 1e-9:
            arc = True
    if arc:
        for i, g in enumerate(segs):
            if g.flat and abs(gaps[i]) < values.TINY:
                exact = True
                if g.sA < L.s < g.sB:
                    continue
            dist = min(dist, seg_dist(L.s, L.z, g))
    if dist == 0.0:
        exact = False
    return dist, exact, region


def revolved_points(case, seed, few=False):
    """Points round a cone, cylinder, tube, disc, annulus or sector."""
    b = case["body"]
    P = Points(case, seed)
    tune()
    zero = gen.fr([0.0, 0.0, 0.0])
    L = values.Local(b, add(P.f.c, [Fr(1), Fr(0), Fr(0)]))
    segs, _ = values.make(b, L)
    sheet = b["type"] in ("disc", "annulus")
    out = max(float(max(g.sA, g.sB)) for g in segs)
    h = b.get("half_length", 0.0)
    size = case["size"] = 2 * max(out, h)
    arc = b["type"] == "tube_sector"
    p1, p2 = (b["phi1"], b["phi2"]) if arc else (0.0, 2 * math.pi)
    rnd, mix = P.rnd, P.mix
    rims = sorted({(float(s), float(z)) for g in segs for s, z in ((g.sA, g.zA), (g.sB, g.zB)) if s > 0})
    tips = [(float(s), float(z)) for g in segs if not g.flat for s, z in ((g.sA, g.zA), (g.sB, g.zB)) if s == 0]
    az = lambda: mpf(p1 + (p2 - p1) * mix(0.07, 0.93)) if arc else mpf(mix(0, 2 * math.pi))
    lo = min(float(min(g.sA, g.sB)) for g in segs if not g.flat) if not sheet else float(segs[0].sA)
    r1 = b.get("r1", 0.0)
    n = 0
    for _ in range(0 if sheet else 400):
        s, z = r1 + (out - r1) * math.sqrt(mix(0, 1)), h * mix(-1, 1)
        if all(float(g.ns) * (s - float(g.sA)) + float(g.nz) * (z - float(g.zA)) < 0 for g in segs):
            P.put(P.polar(s, az(), z), "interior")
            n += 1
            if n == 4:
                break

    def spot(g, a=0.06, c=0.94):
        t = mix(a, c)
        return g.sA + (g.sB - g.sA) * mpfr(t), g.zA + (g.zB - g.zA) * mpfr(t)
    mm = lambda v: back(v)
    if tuple(b["axis"]) == (0.0, 0.0, 1.0):
        for g in [g for g in segs if g.flat][:1]:
            s, z = spot(g)
            P.put(P.polar(mm(s), az(), mm(z)), "on-face")
    for k in (0.1, 0.3):
        g = rnd.choice(segs)
        s, z = spot(g)
        P.put(P.polar(mm(s + k * size * g.ns), az(), mm(z + k * size * g.nz)), "outside-%g" % k)
    P.afar()
    angles = (17, 73, 128, 201, 265, 319, 352, 48)
    for j, d in enumerate(NEAR):
        for sd in (1, -1):
            g = rnd.choice(segs)
            s, z = spot(g)
            e = sd * d * size
            P.put(P.polar(mm(s + e * g.ns), az(), mm(z + e * g.nz)), "near-face-%.0e" % d)
        for k in range(2):
            s, z = rnd.choice(rims)
            th = angles[(2 * j + k * 3) % 8] + mix(-9, 9)
            P.put(P.polar(s + mpf(d) * size * mp.cos(th * mp.pi / 180), az(), z + mpf(d) * size * mp.sin(th * mp.pi / 180)), "near-edge-%.0e" % d)
        if tips:
            s, z = rnd.choice(tips)
            th = mix(0, 2 * math.pi)
            P.put(P.polar(abs(mpf(d) * size * mp.cos(th)), az(), z + mpf(d) * size * mp.sin(th)), "near-tip-%.0e" % d)
            P.put(P.polar(0, 0, z + rnd.choice((1, -1)) * mpf(d) * size), "near-tip-%.0e-axis" % d)
        if arc:
            pe = mpf(rnd.choice((p1, p2)))
            s, z = b["r1"] + (b["r2"] - b["r1"]) * mix(0.05, 0.95), h * mix(-0.95, 0.95)
            x0 = [s * mp.cos(pe), s * mp.sin(pe), mpf(z)]
            en = [-mp.sin(pe), mp.cos(pe), mpf(0)]
            P.put(P.local(add(x0, mul(mpf(d) * size * rnd.choice((1, -1)), en))), "near-face-%.0e-end" % d)
            for way in range(2):                    # edge of an end
                pe = mpf(rnd.choice((p1, p2)))
                en = [-mp.sin(pe), mp.cos(pe), mpf(0)]
                es = [mp.cos(pe), mp.sin(pe), mpf(0)]
                th = mpf(mix(0, 2 * math.pi))
                if way == 0:
                    s, z = rnd.choice((b["r1"], b["r2"])), h * mix(-0.95, 0.95)
                    o = add(mul(mp.cos(th), es), mul(mp.sin(th), en))
                else:
                    s, z = b["r1"] + (b["r2"] - b["r1"]) * mix(0.05, 0.95), rnd.choice((h, -h))
                    o = add(mul(mp.cos(th), [mpf(0), mpf(0), mpf(1)]), mul(mp.sin(th), en))
                P.put(P.local(add(add(mul(mpf(s), es), [mpf(0), mpf(0), mpf(z)]), mul(mpf(d) * size, o))), "near-edge-%.0e-end" % d)
            pe = mpf(rnd.choice((p1, p2)))
            s, z = rnd.choice((b["r1"], b["r2"])), rnd.choice((h, -h))
            P.put(P.local(add([s * mp.cos(pe), s * mp.sin(pe), mpf(z)], mul(mpf(d) * size, P.direction()))), "near-corner-%.0e" % d)
    # the scale of thin walls, plates, holes, arcs
    thin = [t for t in {out - r1 if r1 else 0.0, 2 * h, r1, (p2 - p1) * out if arc else 0.0, (2 * math.pi - p2 + p1) * out if arc else 0.0} if 0 < t < 0.03 * size]
    for t in thin:
        for k in (3.0, 0.3, 0.02):
            s, z = rnd.choice(rims)
            th = mix(0, 2 * math.pi)
            P.put(P.polar(abs(s + k * t * mp.cos(th)), az(), z + k * t * mp.sin(th)), "near-edge-%gthin" % k)
            g = rnd.choice(segs)
            s, z = spot(g)
            P.put(P.polar(abs(mm(s + k * t * g.ns)), az(), mm(z + k * t * g.nz)), "near-face-%gthin" % k)
        if arc and min(p2 - p1, 2 * math.pi - p2 + p1) < 0.1:
            P.put(P.polar(b["r1"] + (b["r2"] - b["r1"]) * mix(0.1, 0.9), mpf(p1 - 0.4 * t / out), h * mix(-0.8, 0.8)), "near-end-0.4thin")
    # axis, planes, extensions
    for z in (0.37 * h + 0.01 * size * (h == 0), h + 0.013 * size, -5.3 * size):
        P.put(P.polar(0, 0, z), "axis")
    P.put(P.polar(mpf(10) ** -rnd.randrange(7, 13) * size, az(), (h + 0.02 * size) * rnd.choice((1, -1))), "axis-off")
    P.put(P.polar(mpf(10) ** -rnd.randrange(3, 13) * size, az(), h * mix(-0.8, 0.8) + 0.03 * size * (h == 0)), "axis-off")
    s, z = rnd.choice(rims)
    P.put(P.polar(s * mix(1.2, 3), az() if rnd.random() < 0.5 else mpf(mix(0, 6)), z), "end-plane-outside")
    if r1:
        P.put(P.polar(r1 * mix(0.1, 0.9), az(), rnd.choice((h, -h, 0.3 * h))), "hole")
    if arc:
        P.put(P.polar(b["r1"] + (b["r2"] - b["r1"]) * mix(0.1, 0.9), mpf((p1 + p2) / 2 + math.pi), h * mix(-0.8, 0.8)), "opposite-side")
        P.put(P.polar(out * mix(1.3, 2.5), mpf(p1), h * mix(-0.8, 0.8)), "radial-face-plane")
        P.put(P.polar(out * mix(0.3, 1.5), mpf(p2 + math.pi), h * mix(-0.8, 0.8)), "radial-face-plane-other-side")
        P.put(P.polar(b["r2"], mpf(p2 + min(0.3, (2 * math.pi - p2 + p1) / 2)), h * mix(-0.8, 0.8)), "wall-extension-phi")
    g = rnd.choice([g for g in segs if not g.flat] or segs)
    t = 1.0 + mix(0.1, 0.8)
    P.put(P.polar(abs(mm(g.sA + (g.sB - g.sA) * mpfr(t))), az(), mm(g.zA + (g.zB - g.zA) * mpfr(t))), "generator-extension")
    if not sheet:
        s, z = rnd.choice(rims)
        P.put(P.polar(s, az(), z + (1 if z > 0 else -1) * mix(0.2, 2) * size), "wall-extension")
    return P


def torus_points(case, seed):
    b = case["body"]
    P = Points(case, seed)
    tune()
    R, r = b["major_radius"], b["minor_radius"]
    size = case["size"] = 2 * (R + r)
    rnd, mix = P.rnd, P.mix
    az = lambda: mpf(mix(0, 2 * math.pi))

    def at(d, th):
        return P.polar(abs(R + mpf(d) * mp.cos(th)), az(), mpf(d) * mp.sin(th))
    P.put(P.polar(R, az(), 0), "interior")
    for k in (0.03, 0.4, 0.7, 0.9):
        P.put(at(k * r, mix(0, 6.28)), "interior")
    for k in (0.1, 0.3):
        P.put(at(r + k * size, mix(-1.5, 1.5)), "outside-%g" % k)
    P.afar()
    for d in NEAR:
        for sd in (1, -1):
            for th in (mix(0, 6.28), mix(2.6, 3.6)):
                P.put(at(r + mpf(sd) * mpf(d) * size, th), "near-face-%.0e" % d)
            if r < 0.02 * size and d * r > 2e-13 * size:
                P.put(at(r * (1 + sd * mpf(d)), mix(0, 6.28)), "near-face-%.0ethin" % d)
        P.put(P.polar(R - r + rnd.choice((1, -1)) * mpf(d) * size, az(), 0), "near-face-%.0e-equator" % d)
    for k in (1.5, 3.0, 10.0):
        if k * r < 0.5 * R:
            P.put(at(k * r, mix(0, 6.28)), "near-face-%gtube" % k)
    for z in (0.0, 0.3 * r, -1.01 * r, 0.7 * size, -6.1 * size):
        P.put(P.polar(0, 0, z), "axis")
    for k in (2, 3):
        P.put(P.polar(mpf(10) ** -rnd.randrange(3, 13) * size, az(), mix(-1, 1) * r), "axis-off")
    P.put(P.polar((R - r) * mix(0.2, 0.9), az(), 0), "hole")
    P.put(P.polar((R - r) * mix(0.2, 0.9), az(), mix(-1, 1) * r), "hole")
    P.put(P.polar(R * mix(0.8, 1.2), az(), r), "tangent-plane") if r < 0.9 * R else None
    P.put(P.polar(R * mix(1.5, 2.5), az(), r), "tangent-plane")
    P.put(P.polar((R + r) * mix(1.1, 2), az(), 0), "equator-outside")
    return P


def arcs():
    q = lambda c: pol("radial_unit", c=float(c))
    tau = 2 * math.pi
    yield sector("arc-generic-moved", 0.41, 0.93, 0.3, 1.7, 0.37, GENERIC, away(1.86), u(*OBLIQUE))
    yield sector("arc-radial-generic-moved", 0.41, 0.93, -0.8, 0.9, 0.37, GENERIC2, away(1.86), q(1.3))
    yield sector("arc-narrow-0.01", 0.55, 1.0, 0.4, 0.41, 0.3, GENERIC, (0.2, -0.3, 0.5), u(*OBLIQUE))
    yield sector("arc-narrow-0.01-radial", 0.55, 1.0, 0.4, 0.41, 0.3, GENERIC2, (0.2, -0.3, 0.5), q(-0.9))
    yield sector("arc-nearly-full", 0.5, 0.9, -3.1, -3.1 + tau - 0.01, 0.45, TILT, (0.3, 0.1, -0.2), u(*OBLIQUE))
    yield sector("arc-nearly-full-radial", 0.5, 0.9, 0.2, 0.2 + tau - 0.01, 0.45, GENERIC, HERE, q(1.0))
    yield sector("arc-wall-1e-3", 0.999, 1.0, 0.5, 2.0, 0.6, ALIGNED, HERE, u(*OBLIQUE))
    yield sector("arc-wall-1e-3-radial", 0.999, 1.0, 0.5, 2.0, 0.6, RATIONAL, (0.5, 0.25, -1.0), q(1.2))
    yield sector("arc-plate-1e-3", 0.4, 1.1, -1.0, 1.3, 1.1e-3, TILT2, (0.1, 0.2, 0.3), u(0.4, -0.3, 1.0))
    yield sector("arc-plate-1e-3-radial", 0.4, 1.1, 2.0, 4.3, 1.1e-3, ALIGNED, (0.25, 0.5, -0.125), q(-1.0))
    yield sector("arc-reflex", 0.3, 0.8, 1.1, 5.2, 0.5, SEVENTHS, (0.5, 0.25, 0.75), u(2, 3, -6))
    yield sector("arc-long", 0.05, 0.09, -0.6, 0.7, 4.0, GENERIC2, (1.0, 0.5, -0.25), u(*OBLIQUE))
    yield sector("arc-hole-1e-3-radial", 1e-3, 1.0, 0.1, 1.4, 0.5, GENERIC, (-0.3, 0.2, 0.1), q(0.8))
    c = (0.3, -0.4, 0.2)
    yield sector("arc-affine", 0.45, 0.95, 0.25, 2.1, 0.4, GENERIC, c, affine_about(c, G1, OBLIQUE))
    yield sector("arc-affine-aligned", 0.5, 1.0, 0.0, 1.0, 0.375, ALIGNED, HERE, aff((0.2, -0.1, 0.4), G2))
    c = away(1.8)
    yield sector("arc-affine-moved", 0.35, 0.9, 2.5, 3.6, 0.3, GENERIC2, c, affine_about(c, G2, (0.3, 0.2, -0.4)))
    c = (0.1, 0.6, -0.2)
    yield sector("arc-affine-wall-1e-3", 0.999, 1.0, -0.4, 1.6, 0.5, TILT, c, affine_about(c, G1, OBLIQUE))
    yield sector("arc-affine-narrow", 0.5, 1.2, 1.0, 1.01, 0.4, GENERIC, c, affine_about(c, G2, OBLIQUE))
    yield sector("arc-affine-nearly-full", 0.5, 1.2, 1.0, 1.0 + tau - 0.01, 0.4, GENERIC2, c, affine_about(c, G1, (0.1, 0.2, 0.3)))


def cones():
    al = lambda pose, k: u(*(k * t for t in pose[0]))
    yield cone("cone-transverse", 0.75, 0.5, 0.625, ALIGNED, (0.25, -0.5, 0.125), u(0.6, -0.9, 0))
    yield cone("cone-oblique-generic-moved", 0.9, 0.35, 0.6, GENERIC, away(1.8), u(*OBLIQUE))
    yield cone("cone-tip-axial", 0.8, 0.0, 0.7, ALIGNED, HERE, u(0, 0, 1.2))
    yield cone("cone-tip-oblique", 0.7, 0.0, 0.9, GENERIC2, (0.3, 0.1, -0.7), u(*OBLIQUE))
    yield cone("cone-tip-below-transverse", 0.0, 0.95, 0.55, RATIONAL, (0.5, 0.25, -1.0), u(2, 1, -2))
    yield cone("cone-near-cylinder-1e-4", 0.8, 0.8 * (1 - 1e-4), 0.7, GENERIC, (0.4, 0.2, 0.1), u(*OBLIQUE))
    yield cone("cone-near-cylinder-1e-9", 0.6 * (1 - 1e-9), 0.6, 0.8, TILT, HERE, u(*OBLIQUE))
    yield cone("cone-flat-1e-3", 1.0, 0.2, 1e-3, GENERIC2, (0.1, 0.3, 0.2), u(*OBLIQUE))
    yield cone("cone-flat-tip-1e-3", 1.0, 0.0, 1e-3, ALIGNED, HERE, u(0.3, -0.2, 1.0))
    yield cone("cone-needle", 0.012, 0.0, 6.0, GENERIC, (0.7, 0.1, 0.2), u(*OBLIQUE))
    yield cone("cone-long", 0.01, 0.02, 8.0, SEVENTHS, (0.5, 0.25, 0.75), al(SEVENTHS, 0.25))
    yield cone("cone-small-top", 0.9, 1e-4, 0.8, TILT2, (0.2, 0.2, -0.4), u(*OBLIQUE))


def tori():
    yield torus("torus-axial-aligned", 0.9, 0.3, ALIGNED, (0.25, -0.5, 0.125), u(0, 0, 1))
    yield torus("torus-transverse", 1.0, 0.4, RATIONAL, HERE, u(2, 1, -2))
    yield torus("torus-oblique-generic-moved", 0.8, 0.25, GENERIC, away(2.1), u(*OBLIQUE))
    yield torus("torus-thin-1e-3-axial", 1.0, 1e-3, ALIGNED, HERE, u(0, 0, 1.3))
    yield torus("torus-thin-1e-3-oblique", 1.1, 1.1e-3, GENERIC2, (0.3, 0.1, -0.2), u(*OBLIQUE))
    yield torus("torus-fat-0.95-axial", 1.0, 0.95, TILT, HERE, u(*TILT[0]))
    yield torus("torus-fat-0.95-oblique", 0.7, 0.7 * 0.95, GENERIC, (0.5, -0.2, 0.3), u(*OBLIQUE))
    yield torus("torus-oblique-tilt", 1.2, 0.6, TILT2, (0.1, 0.0, 0.4), u(*OBLIQUE))


METHOD = {
    "swept": "azimuthal Gauss-Legendre quadrature (sinh map about the nearest azimuth) of closed-form straight segments of the meridian; plane ends of sectors and half-plane rectangles of volume charge in closed form",
    "torus": "rings (complete elliptic integrals, Bulirsch's cel) integrated over the meridian circle, sinh map about the nearest point",
}
CHECK = "70 and 100 digits of working precision with 30 and 40 nodes a panel agree to >= 27 digits in phi and in each component of g"
GROUPS = [(arcs, revolved_points, "swept"), (cones, revolved_points, "swept"), (tori, torus_points, "torus")]


def words(method):
    return {"region_meaning": REGION, "method": METHOD[method], "check": CHECK, "source": "derived here", "note": NOTE}


def all_cases(want=None):
    with mp.workdps(60):
        for maker, points, method in GROUPS:
            for name, b, p in maker():
                if want and not want(name):
                    continue
                mp.dps = 60
                tune()
                case = {"id": "more-" + name, "body": b, "polarization": p}
                P = points(case, name)
                case.update(points=P.points, tags=P.tags, words=words(method))
                yield case
