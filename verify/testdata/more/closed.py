"""Random triples of the families with closed forms: bodies, points with weight on hard places, values and gradients.

The bodies have numbers of six digits, four times in five, to keep the files small; the points have all digits. Every value
is computed twice, by the closed forms of gen.py with 110 digits and by the quadratures of edges.py and sweep.py, and stored
where both agree to 20 digits (points and dipoles: one formula; COSTLY families: every second body). The gradient of g is differenced in the closed forms with a
step of 1e-42 sizes; its symmetry and trace are checked to 20 digits.
"""
import json
import math
import random
import time

from num import *
import cases
import edges
import gen
import sampler
import values
from cases2 import Points
from gen import M, add, cross, dot, fr, mul, sub, vec

PER_BODY = 3
COSTLY = {"prism": 2, "tube": 2, "annulus": 4, "polyhedron": 4}  # of so many bodies the first gets gradients, the second and fourth both formulations


# ---------------------------------------------------------------- numbers
def short(r, v):
    """A float64, of six decimal digits four times in five."""
    if isinstance(v, (list, tuple)):
        return [short(r, t) for t in v]
    return float(v) if r.random() < 0.2 else float("%.6g" % v)


def place(r, size):
    """Pose and centre of a body."""
    z, x = sampler.pose_of(r)
    return {"centre": short(r, sampler.centre_of(r, size)), "axis": short(r, z), "ref": short(r, x)}


def direction_of(r, axis):
    """Along the axis, across it, oblique."""
    k = r.random()
    if k < 0.3:
        return [r.uniform(0.2, 2) * t for t in axis]
    v = [r.gauss(0, 1) for _ in range(3)]
    return v if k > 0.6 else [float(t) for t in cross(axis, v)]


def uniform(r, axis):
    return {"kind": "uniform", "p": short(r, direction_of(r, axis))}


def affine(r, centre, a):
    G = short(r, [[t / a for t in row] for row in sampler.matrix(r)])
    q = [r.gauss(0, 1) for _ in range(3)]
    return {"kind": "affine", "p0": short(r, [q[i] - sum(G[i][j] * centre[j] for j in range(3)) for i in range(3)]), "G": G}


def either(r, axis, centre, a):
    return uniform(r, axis) if r.random() < 0.6 else affine(r, centre, a)


def aspects(r, a):
    ax = [a] + [a * (10 ** r.uniform(-3, 0) if r.random() < 0.3 else r.uniform(0.3, 1)) for _ in range(2)]
    r.shuffle(ax)
    return ax


# ---------------------------------------------------------------- flat bodies
def star(r, n):
    """A simple polygon of n vertices round the origin, counter-clockwise."""
    while True:
        angles = sorted(r.uniform(0, 2 * math.pi) for _ in range(n))
        gaps = [(q - p) % (2 * math.pi) for p, q in zip(angles, angles[1:] + angles[:1])]
        if min(gaps) > 0.15 and max(gaps) < 2.9:
            return [(k * math.cos(t), k * math.sin(t)) for t in angles for k in (r.uniform(0.4, 1),)]


def base_of(r, a):
    k = r.random()
    b = [cases.LBASE, cases.UBASE, cases.STAR][r.randrange(3)] if k < 0.3 else star(r, r.randrange(3, 8))
    thin = 10 ** r.uniform(-3, -1) if r.random() < 0.2 else 1
    return [(a * x, a * y * thin) for x, y in b]


def make_box(r):
    a = sampler.length(r)
    b = {"type": "box", "half_lengths_e1_e2_e3": short(r, aspects(r, a)), **place(r, 2 * a)}
    return b, either(r, b["axis"], b["centre"], a)


def make_prism(r):
    a = sampler.length(r)
    base = short(r, base_of(r, a))
    H = a * (r.uniform(0.3, 3) if r.random() < 0.65 else 10 ** r.uniform(-3, 1.5))
    reach = max(abs(x) for v in base for x in v)
    slopes = [[0.0, 0.0], [0.0, 0.0]]
    if r.random() < 0.7:
        slopes = [[r.uniform(-0.22, 0.22) * H / reach for _ in range(2)] for _ in range(2)]
    b = {"type": "prism", "base": base[::r.choice((1, -1))], "height": short(r, H), "bottom_slope": short(r, slopes[0]), "top_slope": short(r, slopes[1]),
         **place(r, 2 * max(a, H))}
    return b, either(r, b["axis"], b["centre"], max(a, H))


ICOSA = [(0, 1, 2), (0, 2, 3), (0, 3, 4), (0, 4, 5), (0, 5, 1), (1, 6, 2), (2, 7, 3), (3, 8, 4), (4, 9, 5), (5, 10, 1),
         (2, 6, 7), (3, 7, 8), (4, 8, 9), (5, 9, 10), (1, 10, 6), (6, 11, 7), (7, 11, 8), (8, 11, 9), (9, 11, 10), (10, 11, 6)]
OCTA = [(0, 1, 4), (1, 2, 4), (2, 3, 4), (3, 0, 4), (1, 0, 5), (2, 1, 5), (3, 2, 5), (0, 3, 5)]


def dyadic(r, bits=6):
    return [[r.randrange(-2 ** bits, 2 ** bits + 1) / 2 ** bits for _ in range(3)] for _ in range(3)]


def det(m):
    return dot(m[0], cross(m[1], m[2]))


def make_polyhedron(r):
    a = sampler.length(r)
    c = sampler.centre_of(r, 2 * a)
    k = r.random()
    while True:
        try:
            if k < 0.3:
                t = [1, 1, 10 ** r.uniform(-2.5, 0)]
                vs = [[c[i] + a * t[i] * r.uniform(-1, 1) for i in range(3)] for _ in range(4)]
                q = cases.solid("", short(r, vs), cases.TET)
            elif k < 0.6:
                faces = OCTA if r.random() < 0.6 else ICOSA
                dirs = [(1, 0, 0), (0, 1, 0), (-1, 0, 0), (0, -1, 0), (0, 0, 1), (0, 0, -1)]
                if faces is ICOSA:
                    g = math.atan(0.5)
                    ring = lambda lat, off: [(math.cos(lat) * math.cos(off + 2 * math.pi * i / 5), math.cos(lat) * math.sin(off + 2 * math.pi * i / 5), math.sin(lat)) for i in range(5)]
                    dirs = [(0, 0, 1)] + ring(g, 0) + ring(-g, math.pi / 5) + [(0, 0, -1)]
                m = sampler.matrix(r)
                if abs(det(m)) < 1:
                    continue
                if det(m) < 0:
                    m[0] = [-t for t in m[0]]
                rad = [a * r.uniform(0.5, 1) for _ in dirs]
                vs = short(r, [[c[i] + s * sum(m[i][j] * d[j] for j in range(3)) for i in range(3)] for d, s in zip(dirs, rad)])
                q = cases.solid("", vs, [list(f) for f in faces])
            else:
                m = dyadic(r)
                if not 0.2 < det(m):
                    continue
                unit = 2.0 ** round(math.log2(a))
                m = [[unit * t for t in row] for row in m]
                base = [cases.LBASE, cases.UBASE, cases.STAR][r.randrange(3)]
                at = [math.floor(t / unit * 64) / 64 * unit for t in c]
                q = cases.prism("", base, 0, 2.0 ** r.choice((-9, -3, -2, -1, 0, 2)), m, at)
                a = unit
            break
        except AssertionError:
            continue
    b = {"type": "polyhedron", "vertices": q["vertices"], "faces": q["faces"]}
    return b, either(r, [r.gauss(0, 1) for _ in range(3)], c, a)


def make_polygon(r):
    a = sampler.length(r)
    c = sampler.centre_of(r, 2 * a)
    if r.random() < 0.4:
        t = 10 ** r.uniform(-2.5, 0)
        e, f = [[r.gauss(0, 1) for _ in range(3)] for _ in range(2)]
        vs = [[c[i] + a * (p * e[i] + q * f[i]) for i in range(3)] for p, q in ((0, 0), (1, t * 0.1), (r.uniform(-0.2, 1.1), t))]
        b = short(r, vs)
    else:
        unit = 2.0 ** round(math.log2(a))
        base = base_of(r, 1.0)
        base = [[math.floor(t * 2 ** 20) / 2 ** 20 for t in v] for v in base]
        at = [math.floor(t / unit * 64) / 64 * unit for t in c]
        while True:
            m = dyadic(r)
            n = cross([t[0] for t in m], [t[1] for t in m])
            if dot(n, n) > 0.1:
                break
        b = [[float(Fr(at[i]) + Fr(unit) * sum(Fr(m[i][j]) * Fr(v[j]) for j in range(2))) for i in range(3)] for v in base]
        assert all(Fr(w[i]) == Fr(at[i]) + Fr(unit) * sum(Fr(m[i][j]) * Fr(v[j]) for j in range(2)) for v, w in zip(base, b) for i in range(3))
    g = short(r, [r.gauss(0, 1) / a for _ in range(3)]) if r.random() < 0.6 else [0.0] * 3
    p = {"kind": "sheet_linear", "a": short(r, r.uniform(-1, 1) - dot(g, c)), "b": g}
    if not any(g):
        p["a"] = short(r, r.choice((1, -1)) * r.uniform(0.3, 2))
    return {"type": "polygon", "vertices": b}, p


def prism_loops(b):
    """Exact local faces of a prism, counter-clockwise seen from outside."""
    base, H = [fr(list(v)) for v in b["base"]], Fr(b["height"])
    if sum(p[0] * q[1] - p[1] * q[0] for p, q in zip(base, base[1:] + base[:1])) < 0:
        base = base[::-1]
    lo, up = ([[x, y, s * H / 2 + Fr(t[0]) * x + Fr(t[1]) * y] for x, y in base] for s, t in ((-1, b["bottom_slope"]), (1, b["top_slope"])))
    n = len(base)
    return [lo[::-1], up] + [[lo[k], lo[(k + 1) % n], up[(k + 1) % n], up[k]] for k in range(n)]


def value_prism(body, pol, x):
    """4 pi (phi, g) and region of a prism with uniform or affine p, in its own frame."""
    f = gen.Frame(body)
    xl, loops = f.local(x), prism_loops(body)
    if not f.rational:
        loops = [[vec(v) for v in q] for q in loops]
    p0, G = gen.affine(pol)
    pl = vec(f.along(add(p0, [dot(row, f.c) for row in G])))
    e = [f.e(i) for i in range(3)]
    Gl = [[dot(e[i], [dot(vec(row), e[j]) for row in G]) for j in range(3)] for i in range(3)]
    density = lambda n: (dot(pl, n), [sum(Gl[i][j] * n[i] for i in range(3)) for j in range(3)])
    phi, g, region = gen.charged_faces(loops, xl, density, -M(G[0][0] + G[1][1] + G[2][2]))
    return phi, f.turn(g), region


def value_polyhedron(body, pol, x):
    """As that of gen.py, in numbers of so many digits (60 and more) that sums and products of float64 are exact, which is quicker."""
    vs, p0, G = [vec(fr(v)) for v in body["vertices"]], *gen.affine(pol)
    p0, G = vec(p0), [vec(row) for row in G]
    density = lambda n: (dot(p0, n), [sum(G[i][j] * n[i] for i in range(3)) for j in range(3)])
    return gen.charged_faces([[vs[i] for i in f] for f in body["faces"]], vec(x), density, -(G[0][0] + G[1][1] + G[2][2]))


def loops_of(b):
    """Faces in global coordinates, mpf."""
    if b["type"] == "box":
        return cases.box_faces(b)
    if b["type"] == "polygon":
        return [[vec(fr(v)) for v in b["vertices"]]]
    if b["type"] == "polyhedron":
        return [[vec(fr(b["vertices"][i])) for i in f] for f in b["faces"]]
    f = gen.Frame(b)
    return [[add(vec(f.c), f.turn(vec(v))) for v in q] for q in prism_loops(b)]


class Flat:
    """Points round plane faces."""

    def __init__(self, b, p, r):
        self.b, self.p, self.r, self.faces = b, p, r, loops_of(b)
        vs = [v for f in self.faces for v in f]
        lo, hi = ([op(v[i] for v in vs) for i in range(3)] for op in (min, max))
        self.c = [(s + t) / 2 for s, t in zip(lo, hi)]
        self.size = float(max(t - s for s, t in zip(lo, hi)))

    def unit(self, v):
        return mul(1 / mp.sqrt(dot(v, v)), v)

    def normal(self, f):
        n = [mpf(0)] * 3
        for k in range(1, len(f) - 1):
            n = add(n, cross(sub(f[k], f[0]), sub(f[k + 1], f[0])))
        return self.unit(n)

    def direction(self):
        return self.unit([mpf(self.r.gauss(0, 1)) for _ in range(3)])

    def spot(self, f):
        """A point in the face."""
        while True:
            k, (a, c) = self.r.randrange(len(f)), sorted((self.r.random(), self.r.random()))
            v = add(f[k], add(mul(mpf(a), sub(f[k - 1], f[k])), mul(mpf(1 - c), sub(f[(k + 1) % len(f)], f[k]))))
            if gen.polygon(f, add(v, mul(mpf(10) ** -30, self.normal(f))), mpf(1), [mpf(0)] * 3)[3] > 6:
                return v

    def clear(self, x):
        """No face so near that the side is a matter of rounding."""
        tol = 16 * 2.0 ** -53 * float(sum(abs(t) for t in x) + sum(abs(t) for t in self.c) + 2 * self.size)
        x = vec(x)
        for f in self.faces:
            _, _, h, W, _, _ = gen.polygon(f, x, mpf(1), [mpf(0)] * 3)
            if W > 3 and abs(h) < tol:
                return False
            for p, q in zip(f, f[1:] + f[:1]):
                l, d = sub(q, p), sub(x, p)
                t = min(max(dot(l, d) / dot(l, l), mpf(0)), mpf(1))
                d = sub(d, mul(t, l))
                if dot(d, d) < tol * tol:
                    return False
        return True

    def draw(self, tag):
        r, f = self.r, self.r.choice(self.faces)
        n, k = self.normal(f), self.r.randrange(len(f))
        e = mpf(sampler.small(r) * self.size)
        l = sub(f[(k + 1) % len(f)], f[k])
        th = mpf(r.uniform(0, 2 * math.pi))
        out = add(mul(mp.cos(th), self.unit(cross(l, n))), mul(mp.sin(th), n))
        if tag == "interior":
            for _ in range(40):
                t = mpf(r.random())
                x = add(mul(t, self.spot(f)), mul(1 - t, self.spot(r.choice(self.faces))))
                if self.b["type"] != "polygon" and gen.natural(self.b, self.p, fr([float(t) for t in x]))[2] == "inside":
                    return x
            return None
        if tag == "outside":
            q = 10 ** r.uniform(-1, 1.5)
            return add(self.spot(f), mul(mpf(q * self.size), n)) if q < 1 else add(self.c, mul(mpf(q * self.size), self.direction()))
        if tag == "far":
            return add(self.c, mul(mpf(10 ** r.uniform(1.5, 6) * self.size), self.direction()))
        if tag == "near-face":
            return add(self.spot(f), mul(r.choice((1, -1)) * e, n))
        if tag == "near-edge":
            return add(add(f[k], mul(mpf(r.uniform(0.01, 0.99)), l)), mul(e, out))
        if tag == "near-corner":
            v = self.direction() if r.random() < 0.6 else add(self.unit(l), mul(mpf(r.uniform(-1, 1)), cross(self.unit(l), n)))
            return add(f[k], mul(e, self.unit(v)))
        if tag == "axis":                            # the line of an edge, on it or near it
            x = add(f[k], mul(-mpf(10 ** r.uniform(-3, 2)), l))
            return x if r.random() < 0.5 else add(x, mul(e, out))
        return add(self.spot(f), mul(mpf(10 ** r.uniform(-1, 2) * self.size), self.unit(cross(n, self.direction()))))


# ---------------------------------------------------------------- round bodies
def make_sheet(kind):
    def make(r):
        a = sampler.length(r)
        size = {"radius": short(r, a)} if kind == "disc" else dict(zip(("r1", "r2"), short(r, [a * (1 - sampler.thin(r) if r.random() < 0.8 else 10 ** r.uniform(-3, -1)), a])))
        return {"type": kind, **size, **place(r, 2 * a)}, {"kind": "sheet_linear", "a": short(r, r.choice((1, -1)) * r.uniform(0.3, 2)), "b": [0.0, 0.0, 0.0]}
    return make


def make_round(kind):
    def make(r):
        a = sampler.length(r)
        h = a * (r.uniform(0.2, 2.5) if r.random() < 0.65 else 10 ** r.uniform(-3, 3))
        size = {"radius": short(r, a)} if kind == "cylinder" else dict(zip(("r1", "r2"), short(r, [a * (1 - sampler.thin(r) if r.random() < 0.8 else 10 ** r.uniform(-3, -1)), a])))
        b = {"type": kind, **size, "half_length": short(r, h), **place(r, 2 * max(a, h))}
        if r.random() < 0.1:
            return b, {"kind": "axial_z", "c": short(r, r.choice((1, -1)) * r.uniform(0.3, 2) / h)}
        return b, uniform(r, b["axis"])
    return make


class Round:
    """Points round bodies of revolution, by sampler.draw_revolved."""

    def __init__(self, b, p, r):
        self.r, self.b = r, b
        L = values.Local(b, add(gen.Frame(b).c, [Fr(1), Fr(0), Fr(0)]))
        self.segs, _ = values.make(b, L)
        self.size = 2 * max(max(float(max(g.sA, g.sB)) for g in self.segs), b.get("half_length", 0.0))

    def draw(self, tag):
        P = Points({"body": self.b, "polarization": None, "size": self.size}, self.r.random())
        try:
            sampler.draw_revolved(P, self.segs, tag, self.r)
        except ZeroDivisionError:
            return None
        return P.points[-1] if P.points else None

    def clear(self, x):
        return True


# ---------------------------------------------------------------- balls, points
def make_sphere(r):
    a = sampler.length(r)
    b = {"type": "sphere", "radius": short(r, a), **place(r, 2 * a)}
    return b, uniform(r, b["axis"])


def make_shell(r):
    a = sampler.length(r)
    b = {"type": "spherical_shell", "r1": short(r, a * (1 - sampler.thin(r) if r.random() < 0.7 else 10 ** r.uniform(-3, -1))), "r2": short(r, a), **place(r, 2 * a)}
    return b, uniform(r, b["axis"])


def make_ellipsoid(r):
    a = sampler.length(r)
    ax = aspects(r, a)
    k = r.random()
    if k < 0.2:
        ax[1] = ax[0]
    elif k < 0.35:
        ax = [a, a * (1 - 10 ** r.uniform(-9, -1)), a * (1 - 10 ** r.uniform(-9, -1))]
    b = {"type": "ellipsoid", "semi_axes_e1_e2_e3": [float(t) for t in ax] if k < 0.35 else short(r, ax), **place(r, 2 * a)}
    return b, uniform(r, b["axis"])


class Ball:
    """Points round spheres and ellipsoids."""

    def __init__(self, b, p, r):
        self.b, self.r, self.f = b, r, gen.Frame(b)
        self.ax = b.get("semi_axes_e1_e2_e3") or [b.get("radius", b.get("r2"))] * 3
        self.inner = b.get("r1", 0.0) / self.ax[0]
        self.size = 2 * max(self.ax)

    def skin(self, scale, d, at=None):
        """A point d off the surface scaled."""
        v = at or [self.r.gauss(0, 1) for _ in range(3)]
        n = mp.sqrt(sum(mpf(t) ** 2 for t in v))
        v = [mpf(scale) * mpf(a) * t / n for a, t in zip(self.ax, v)]
        n = [t / mpf(a) ** 2 for t, a in zip(v, self.ax)]
        return add(v, mul(d / mp.sqrt(dot(n, n)), n))

    def draw(self, tag):
        r = self.r
        e = mpf(r.choice((1, -1)) * sampler.small(r) * (self.size if r.random() < 0.6 else min(self.ax)))
        scale = self.inner if self.inner and r.random() < 0.5 else 1
        if tag == "interior":
            k = self.inner * r.random() if self.inner and r.random() < 0.4 else self.inner + (1 - self.inner) * r.random()
            v = self.skin(max(k, 1e-6), mpf(0))
        elif tag in ("outside", "far"):
            k = 10 ** (r.uniform(-2, 1.5) if tag == "outside" else r.uniform(1.5, 6))
            v = self.skin(1, mpf(k * self.size))
        elif tag == "near-face":
            v = self.skin(scale, e)
        elif tag == "near-edge":                     # the scale of the wall or of the smallest axis
            v = self.skin(scale, mpf(r.choice((1, -1)) * 10 ** r.uniform(-3, 1) * (min(self.ax) if not self.inner else self.ax[0] * min(self.inner, 1 - self.inner))))
        elif tag == "near-corner":                   # tips
            at = [0.0] * 3
            at[r.randrange(3)] = r.choice((1.0, -1.0))
            if r.random() < 0.5:
                at = [t + sampler.small(r) for t in at]
            v = self.skin(scale, e, at)
        elif tag == "axis":
            v = [mpf(sampler.small(r) * self.size) if r.random() < 0.7 else mpf(0) for _ in range(3)]
            v[r.randrange(3)] = mpf(r.uniform(-2, 2) * self.size)
        else:
            v = [mpf(r.uniform(-1.5, 1.5) * self.size) for _ in range(3)]
            v[r.randrange(3)] = mpf(sampler.small(r) * self.size) if r.random() < 0.7 else mpf(0)
        return add(vec(self.f.c), self.f.turn(v))

    def clear(self, x):
        tol = mpf(16 * 2.0 ** -53) * (sum(abs(t) for t in x) + 2 * self.size + sum(abs(t) for t in self.f.c))
        xl = vec(self.f.local(fr(x)))
        for k in (1, self.inner) if self.inner else (1,):
            n = [t / (mpf(k) * mpf(a)) ** 2 for t, a in zip(xl, self.ax)]
            if abs(dot(n, xl) - 1) < 2 * tol * mp.sqrt(dot(n, n)):
                return False
        return True


def make_point(r):
    return {"type": "point", "centre": short(r, [r.uniform(-3, 3) for _ in range(3)])}, {"kind": "charge", "c": short(r, r.choice((1, -1)) * 10 ** r.uniform(-3, 3))}


def make_dipole(r):
    return {"type": "dipole", "centre": short(r, [r.uniform(-3, 3) for _ in range(3)])}, {"kind": "moment", "p": short(r, [10 ** r.uniform(-2, 0) * r.choice((1, -1)) for _ in range(3)])}


class Lone:
    """Points round a point or dipole, at any distance; for dipoles also near the axis and the plane across."""

    def __init__(self, b, p, r):
        self.r, self.c, self.size = r, vec(fr(b["centre"])), 1.0
        self.m = vec(fr(p.get("p", [0.0, 0.0, 1.0])))

    def draw(self, tag):
        r = self.r
        v, m = [mpf(r.gauss(0, 1)) for _ in range(3)], mul(1 / mp.sqrt(dot(self.m, self.m)), self.m)
        if tag in ("axis", "plane", "near-corner"):
            along, across = mul(dot(v, m), m), sub(v, mul(dot(v, m), m))
            e = mpf(sampler.small(r))
            v = add(along, mul(e, across)) if tag == "axis" else add(across, mul(e, along))
        return add(self.c, mul(mpf(10 ** r.uniform(-12, 6)) / mp.sqrt(dot(v, v)), v))

    def clear(self, x):
        return True


def value_point(body, pol, x):
    d = vec(sub(x, fr(body["centre"])))
    R, q = mp.sqrt(dot(d, d)), M(Fr(pol["c"]))
    return q / R, mul(q / R ** 3, d), "outside"


def value_dipole(body, pol, x):
    d, m = vec(sub(x, fr(body["centre"]))), vec(fr(pol["p"]))
    R, md = mp.sqrt(dot(d, d)), dot(vec(fr(pol["p"])), d)
    return md / R ** 3, sub(mul(3 * md / R ** 5, d), mul(1 / R ** 3, m)), "outside"


# ---------------------------------------------------------------- families
def by_edges(value):
    def second(b, p, x):
        keep, gen.polygon = gen.polygon, edges.polygon
        try:
            return value(b, p, x)
        finally:
            gen.polygon = keep
    return second


# family: body, places, closed form, second formulation (None: the formula is one line)
FAMILIES = {
    "box": (make_box, Flat, gen.value_box, by_edges(gen.value_box)),
    "prism": (make_prism, Flat, value_prism, by_edges(value_prism)),
    "polyhedron": (make_polyhedron, Flat, value_polyhedron, by_edges(gen.value_polyhedron)),
    "polygon": (make_polygon, Flat, gen.value_polygon, by_edges(gen.value_polygon)),
    "disc": (make_sheet("disc"), Round, gen.value_disc, values.value_swept),
    "annulus": (make_sheet("annulus"), Round, gen.value_disc, values.value_swept),
    "cylinder": (make_round("cylinder"), Round, gen.value_cylinder, values.value_swept),
    "tube": (make_round("tube"), Round, gen.value_cylinder, values.value_swept),
    "sphere": (make_sphere, Ball, gen.value_sphere, edges.ellipsoid),
    "hollow-sphere": (make_shell, Ball, gen.value_sphere, edges.ellipsoid),
    "ellipsoid": (make_ellipsoid, Ball, gen.value_ellipsoid, edges.ellipsoid),
    "point": (make_point, Lone, value_point, None),
    "dipole": (make_dipole, Lone, value_dipole, None),
}


def digits(v, w, size):
    """Digits to which two values (phi, g) agree; phi on the scale of |phi| + 1e-4 size |g|."""
    n = mp.sqrt(dot(w[1], w[1]))
    e = [sub(v[1], w[1]), n] if n else [[mpf(0)], mpf(1)]
    e = max(mp.sqrt(sum(t * t for t in e[0])) / e[1], abs(v[0] - w[0]) / (abs(w[0]) + mpf(1e-4 * size) * n) if n or w[0] else mpf(0))
    return float(-mp.log10(e)) if e else 99.0


def slopes(value, b, p, x, size, g):
    """xx, yy, zz, xy, xz, yz of grad g, by differences in three directions; None if symmetry or trace fail at 20 digits."""
    h = Fr(size) / 10 ** 42
    m = []
    for j in range(3):
        w = value(b, p, [t + h * (i == j) for i, t in enumerate(x)])[1]
        m.append([(s - t) / M(h) for s, t in zip(w, g[1])])
    rho = mpf(0)
    if p["kind"] == "affine" and g[2] == "inside":
        rho = -4 * mp.pi * M(sum(fr(p["G"])[i][i] for i in range(3)))
    n = mp.sqrt(sum(t * t for row in m for t in row))
    off = max(abs(m[0][1] - m[1][0]), abs(m[0][2] - m[2][0]), abs(m[1][2] - m[2][1]), abs(m[0][0] + m[1][1] + m[2][2] - rho))
    if off > n * mpf(10) ** -20 and off > mpf(10) ** -24 * abs(rho):
        # uniform fields (inside balls): the gradient is zero but for the difference
        if n > mpf(10) ** -30 * mp.sqrt(dot(g[1], g[1])) / mpf(size):
            return None
    return [m[0][0], m[1][1], m[2][2], m[0][1], m[0][2], m[1][2]]


def text(v, floor):
    return "0" if abs(v) <= floor else mp.nstr(v, 21, min_fixed=-1, max_fixed=1)


def triples(seed, count, family, path):
    """Write count triples, three points a body, as gzipped JSON."""
    r = random.Random("%s-%s" % (seed, family))
    make, places, value, second = FAMILIES[family]
    gen.VALUE["prism"] = value_prism
    names, weights = [c[0] for c in sampler.CLASSES], [c[1] for c in sampler.CLASSES]
    out, total, worst, dropped, t0 = [], 0, 99.0, 0, time.time()
    while total < count:
        mp.dps = 60
        tune()
        b, p = make(r)
        keep = gen.VALUE.get(b["type"])
        gen.VALUE[b["type"]] = value
        P = places(b, p, r)
        case = {"id": "", "body": b, "polarization": p, "points": [], "phi": [], "g": [], "grad": [], "region": [], "tags": []}
        for _ in range(4 * PER_BODY):
            if len(case["points"]) == min(PER_BODY, count - total):
                break
            tag = r.choices(names, weights)[0]
            x = P.draw(tag)
            if x is None:
                continue
            x = [float(t) + 0.0 for t in x]
            mp.dps = 60
            tune()
            if x in case["points"] or not P.clear(x):
                continue
            turn = len(out) % COSTLY[family] if family in COSTLY else None
            exact = p["kind"] != "axial_z" and not turn            # axial_z has a quadrature in the closed form
            mp.dps = 110 if exact else 80
            v = value(b, p, fr(x))
            if v[2] == "on-sheet":
                continue
            grad = slopes(value, b, p, fr(x), P.size, v) if exact else None
            if second and (turn is None or turn % 2):
                mp.dps = 46
                tune()
                d = digits(second(b, p, fr(x)), v, P.size)
                if d < 20:
                    mp.dps = 100
                    tune()
                    d = digits(second(b, p, fr(x)), v, P.size)
                worst = min(worst, d)
            else:
                d = 99
            if d < 20 or exact and grad is None:
                dropped += 1
                print("   dropped: %.1f digits, gradient %s, %s %s %s" % (d, grad is not None, tag, x, json.dumps([b, p])), flush=True)
                continue
            mp.dps = 60
            k = 1 / (4 * mp.pi)
            n = mp.sqrt(dot(v[1], v[1]))
            case["points"].append(x)
            case["phi"].append(text(k * v[0], k * n * mpf(10) ** -28 * P.size))
            case["g"].append([text(k * t, k * n * mpf(10) ** -28) for t in v[1]])
            if grad:
                m = mp.sqrt(sum(t * t for t in grad))
                case["grad"].append([text(k * t, k * max(m * mpf(10) ** -24, n * mpf(10) ** -30 / P.size)) for t in grad])
            case["region"].append(v[2])
            case["tags"].append(tag)
        if keep:
            gen.VALUE[b["type"]] = keep
        if not case["points"]:
            continue
        if not case["grad"]:
            del case["grad"]
        case["id"] = "%s-%d" % (family, len(out))
        out.append(case)
        total += len(case["points"])
        if len(out) % 100 == 0:
            print("%s: %d triples, %.0f s" % (family, total, time.time() - t0), flush=True)
    sampler.pack(path, out)
    print("%s seed %s: %d triples, %d dropped, %.1fs; the two formulations agree to %.1f digits at least"
          % (family, seed, total, dropped, time.time() - t0, worst), flush=True)


def brute(family, count=6):
    """Print the digits to which values agree with Gauss quadrature of the dipole density (or sheet) in three (two) dimensions, 80-bit floats."""
    import second
    r = random.Random("brute-" + family)
    make, places, value, _ = FAMILIES[family]
    worst = 99.0
    while count:
        mp.dps = 60
        b, p = make(r)
        if b["type"] == "prism":
            b.update(centre=[0.0] * 3, axis=[0.0, 0.0, 1.0], ref=[1.0, 0.0, 0.0])
            if p["kind"] != "uniform":
                continue
        P = places(b, p, r)
        x = fr([float(t) for t in P.draw("far")])
        c = vec(fr(b["centre"])) if "centre" in b else P.c
        d = sub(vec(x), c)
        x = fr([float(t) for t in add(c, mul(mpf(r.uniform(2.5, 4) * P.size) / mp.sqrt(dot(d, d)), d))])
        q = b
        if b["type"] == "prism":
            loops = prism_loops(b)
            vs = [v for f in loops[:2] for v in f]
            q = {"type": "polyhedron", "vertices": vs, "faces": [[vs.index(v) for v in f] for f in loops]}
        got = second.direct({"id": "%s %d" % (family, count), "body": q, "polarization": p}, x)
        want = [mpf(1) / (4 * mp.pi) * t for t in [value(b, p, x)[0]] + value(b, p, x)[1]]
        got = [mpf(float(t)) + mpf(float(t - type(t)(float(t)))) for t in [got[0]] + list(got[1])]
        e = mp.sqrt(sum((s - t) ** 2 for s, t in zip(got[1:], want[1:])) / sum(t * t for t in want[1:]))
        worst = min(worst, float(-mp.log10(e + mpf(10) ** -40)))
        count -= 1
    print("%s: g by quadrature agrees to %.1f digits at least" % (family, worst), flush=True)
