"""Bodies and points of the hard reference cases: nasty shapes and nasty places, all numbers float64, reproducible (seeded)."""
import math
import random
from fractions import Fraction as Fr

from mpmath import mp, mpf

import gen
from gen import M, add, cross, dot, fr, mul, sub, vec

U4 = 2.0 ** -51                                     # 4u: closer to a sheet than this (times |x| + size) the side is moot
NEAR = (1e-3, 1e-6, 1e-9, 1e-12)
FRAME = ("e3 = axis/|axis|; e1 = component of ref perpendicular to e3, normalised; e2 = e3 x e1; "
         "local (x,y,z) = (r-centre).(e1,e2,e3)")
NOTE = ("All dimensions, vertices, axes, polarizations and points are float64 values, written as shortest round-trip decimals; phi and g "
        "were evaluated with mpmath at exactly those float64 values. axis/ref need not be unit vectors: normalise them exactly. phi and g in natural units.")
REGION = ("inside/outside the body; on-sheet: on the charged sheet itself, phi is continuous there and g is the mean of the two sides")
MEANING = {"uniform": "p(r) = p, constant, GLOBAL components",
           "affine": "p(r) = p0 + G r, r = absolute global position, (G r)_i = sum_j G[i][j] r_j",
           "sheet_linear": "surface charge density sigma(r) = a + b.r, r = absolute global position",
           "axial_z": "p = c z e3, z = local axial coordinate (from centre)"}
METHOD = {"flat": "closed form: polygon faces with linear density (edge logs and solid angles), volume charge through faces",
          "round": "closed form: complete elliptic integrals, Carlson R_F, R_D, R_J",
          "axial_z": "Carlson R_F, R_D, R_J; potential of the charged wall by graded Gauss-Legendre in the azimuth",
          "ball": "closed form: dipole formula", "ellipsoid": "closed form: Carlson R_D, largest root of the confocal cubic by Newton"}
CHECK = ("80 and 130 digits of working precision agree to >= 27 digits in phi and in each component of g; sample of points by direct quadrature of the "
         "dipole density or sheet (80-bit floats), by differentiated phi, and (round bodies) by azimuthal quadrature near the rims")

ALIGNED = ((0.0, 0.0, 1.0), (1.0, 0.0, 0.0))
RATIONAL = ((1.0, 2.0, 2.0), (2.0, 1.0, -2.0))      # norms 3, 3
SEVENTHS = ((6.0, 2.0, 3.0), (2.0, 3.0, -6.0))      # norms 7, 7
GENERIC = ((0.37, -0.82, 0.51), (0.9, 0.13, -0.4))
GENERIC2 = ((-1.3, 0.29, 0.77), (0.21, 0.5, 1.9))
TILT = ((1e-3, 0.0, 1.0), (1.0, 0.0, 0.0))
TILT2 = ((6e-4, -8e-4, 1.0), (0.3, 1.0, 0.2))
HERE = (0.0, 0.0, 0.0)


def away(size):
    """The translation (100, -37.3, 0.123) in sizes."""
    return tuple(float(t * size) for t in (100.0, -37.3, 0.123))


def body(kind, dims, pose, centre):
    return {"type": kind, **dims, "centre": list(centre), "axis": list(pose[0]), "ref": list(pose[1]), "frame": FRAME}


def pol(kind, **values):
    return {"kind": kind, **values, "meaning": MEANING[kind]}


class Points:
    """Collects distinct points with tags; the tag of a near point ends with the side on which the rounded point lies."""

    def __init__(self, case, seed, centre, size):
        self.case, self.rnd, self.c, self.size = case, random.Random(seed), vec(centre), size
        self.points, self.tags = [], []

    def direction(self):
        while True:
            v = [self.rnd.gauss(0, 1) for _ in range(3)]
            n = math.sqrt(dot(v, v))
            if n > 0.1:
                return [mpf(t) / mpf(n) for t in v]

    def put(self, x, tag, keep=None):
        p = [float(t) + 0.0 for t in x]
        if p in self.points or (keep and not keep(fr(p))):
            return
        if tag.startswith("near-"):
            region = gen.natural(self.case["body"], self.case["polarization"], fr(p))[2]
            tag += {"inside": "-in", "outside": "-out", "on-sheet": "-on-sheet"}[region]
        self.points.append(p)
        self.tags.append(tag)

    def afar(self):
        """Middle distances and far points, generic directions."""
        for k in (1.2, 1.5, 2.0, 3.1, 4.7, 8.0, 13.0, 21.0, 30.0):
            self.put(add(self.c, mul(mpf(k) * self.size, self.direction())), "outside-%g" % k)
        for k in (1e2, 1e3, 1e4, 1e5, 1e6):
            self.put(add(self.c, mul(mpf(k) * self.size, self.direction())), "far-1e+%02d" % round(math.log10(k)))


# ---------------------------------------------------------------- bodies with flat faces
def box_faces(b):
    f = gen.Frame(b)
    h = vec(fr(b["half_lengths_e1_e2_e3"]))
    faces = []
    for i in range(3):
        for s in (1, -1):
            loop = []
            for u, w in ((1, 1), (-1, 1), (-1, -1), (1, -1))[::s]:
                v = [None] * 3
                v[i], v[(i + 1) % 3], v[(i + 2) % 3] = s * h[i], u * h[(i + 1) % 3], w * h[(i + 2) % 3]
                loop.append(add(vec(f.c), f.turn(v)))
            faces.append(loop)
    return faces


def flat_points(case, seed):
    """Points round a box, polyhedron or polygon."""
    b = case["body"]
    sheet = b["type"] == "polygon"
    if b["type"] == "box":
        faces = box_faces(b)
    elif sheet:
        faces = [[vec(fr(v)) for v in b["vertices"]]]
    else:
        faces = [[vec(fr(b["vertices"][i])) for i in f] for f in b["faces"]]
    vs = [v for f in faces for v in f]
    lo, hi = ([op(v[i] for v in vs) for i in range(3)] for op in (min, max))
    centre = [(p + q) / 2 for p, q in zip(lo, hi)]
    size = float(max(mp.sqrt(dot(sub(v, w), sub(v, w))) for f in faces for v in f for w in f)) if b["type"] != "box" \
        else 2 * max(b["half_lengths_e1_e2_e3"])
    P = Points(case, seed, centre, size)
    case["size"] = size
    rnd = P.rnd
    zero = [mpf(0)] * 3

    def clear(x):
        """No point so near to a face, yet not on it, that its side is a matter of rounding."""
        for f in faces:
            _, _, h, W, _, _ = gen.polygon(f, vec(x), mpf(1), zero)
            if W > 3 and 1e-40 < abs(h) < U4 * (mp.sqrt(dot(vec(x), vec(x))) + size):
                return False
        return True

    def normal(f):
        n = zero
        for k in range(1, len(f) - 1):
            n = add(n, cross(sub(f[k], f[0]), sub(f[k + 1], f[0])))
        return mul(1 / mp.sqrt(dot(n, n)), n)

    def spot(f):
        """A point in the face, of dyadic weights."""
        while True:
            k = rnd.randrange(len(f))
            a, c = rnd.randrange(1, 16), rnd.randrange(1, 16)
            if a + c >= 28:
                continue
            v = [(a * f[k - 1][i] + c * f[(k + 1) % len(f)][i] + (32 - a - c) * f[k][i]) / 32 for i in range(3)]
            if gen.polygon(f, add(v, mul(mpf(10) ** -30, normal(f))), mpf(1), zero)[3] > 6:
                return v

    def put(x, tag):
        P.put(x, tag, clear)
    inside = 0
    while inside < 5 and not sheet:
        f, g = rnd.choice(faces), rnd.choice(faces)
        t = mpf(rnd.random())
        x = [float(t * p + (1 - t) * q) for p, q in zip(spot(f), spot(g))]
        if f is not g and gen.natural(b, case["polarization"], fr(x))[2] == "inside":
            put(x, "interior")
            inside += 1
    for f in [rnd.choice(faces) for _ in range(3)]:
        put(spot(f), "on-face")
    P.afar()
    for j, d in enumerate(NEAR):
        for side in (1, -1):
            f = rnd.choice(faces)
            put(add(spot(f), mul(side * mpf(d) * size, normal(f))), "near-face-%.0e" % d)
        for th in ((0, 45, 135, 225, 290), (90, 20, 160, 250, 330), (0, 110, 170, 215, 340), (90, 60, 150, 240, 300))[j]:
            f = rnd.choice(faces)
            k, t = rnd.randrange(len(f)), mpf(rnd.uniform(0.05, 0.95))
            l = sub(f[(k + 1) % len(f)], f[k])
            n = normal(f)
            m = mul(1 / mp.sqrt(dot(l, l)), cross(l, n))
            c, s = {0: (1, 0), 90: (0, 1)}.get(th, (mp.cos(mp.pi * th / 180), mp.sin(mp.pi * th / 180)))
            put(add(add(f[k], mul(t, l)), mul(mpf(d) * size, add(mul(c, m), mul(s, n)))), "near-edge-%.0e-%ddeg" % (d, th))
        for way in ("any", "line", "plane", "body"):
            f = rnd.choice(faces)
            k = rnd.randrange(len(f))
            e = sub(f[k], f[k - 1])
            e = mul(1 / mp.sqrt(dot(e, e)), e)
            v = {"any": P.direction(), "line": e, "body": sub(centre, f[k])}.get(way)
            if way == "plane":
                v = add(e, mul(mpf(rnd.uniform(0.2, 2)), cross(e, normal(f))))
            if sheet and way == "body":
                v = add(v, mul(mp.sqrt(dot(v, v)) / 2, normal(f)))
            put(add(f[k], mul(mpf(d) * size / mp.sqrt(dot(v, v)), v)), "near-corner-%.0e-%s" % (d, way))
    for s in (1e-2, 0.25, 1.75, 6.0, 500.0):
        f = rnd.choice(faces)
        k = rnd.randrange(len(f))
        put(add(f[k], mul(-mpf(s), sub(f[(k + 1) % len(f)], f[k]))), "edge-line-extension" + ("-far" if s > 100 else ""))
    for s in (0.8, 1.3, 4.0, 25.0, 3e3):
        f = rnd.choice(faces)
        n, v = normal(f), P.direction()
        v = sub(v, mul(dot(v, n), n))
        mid = mul(mpf(1) / len(f), [sum(q[i] for q in f) for i in range(3)])
        put(add(mid, mul(mpf(s) * size / mp.sqrt(dot(v, v)), v)), "face-plane-outside")
    return P


def prism(name, base, z0, z1, matrix=((1, 0, 0), (0, 1, 0), (0, 0, 1)), shift=(0, 0, 0)):
    """Polyhedron over a plane polygon (counter-clockwise), then r -> matrix r + shift; checked to be exact in float64."""
    n, vs = len(base), []
    for z in (z0, z1):
        for x, y in base:
            v = [sum(Fr(matrix[i][j]) * Fr((x, y, z)[j]) for j in range(3)) + Fr(shift[i]) for i in range(3)]
            assert all(Fr(float(t)) == t for t in v), "vertex not a float64"
            vs.append([float(t) for t in v])
    faces = [list(range(n))[::-1], list(range(n, 2 * n))] + [[k, (k + 1) % n, (k + 1) % n + n, k + n] for k in range(n)]
    return solid(name, vs, faces)


def solid(name, vertices, faces):
    """Polyhedron; planarity, and outward orientation of the closed surface, are checked exactly."""
    vs = [fr([float(t) for t in v]) for v in vertices]
    volume = sum(dot(vs[f[0]], cross(vs[f[k]], vs[f[k + 1]])) for f in faces for k in range(1, len(f) - 1))
    flat = all(dot(cross(sub(vs[f[1]], vs[f[0]]), sub(vs[f[2]], vs[f[0]])), sub(vs[i], vs[f[0]])) == 0 for f in faces for i in f)
    edges = sorted((f[k - 1], f[k]) for f in faces for k in range(len(f)))
    assert volume > 0 and flat and edges == sorted((q, p) for p, q in edges), "not a closed outward polyhedron: " + name
    return {"type": "polyhedron", "name": name, "vertices": [list(map(float, v)) for v in vertices], "faces": faces,
            "orientation": "each face lists vertex indices (from 0) counter-clockwise seen from outside, so the right-hand normal points out of the body"}


def sheet(name, vertices):
    vs = [fr([float(t) for t in v]) for v in vertices]
    n = cross(sub(vs[1], vs[0]), sub(vs[2], vs[0]))
    assert all(dot(n, sub(v, vs[0])) == 0 for v in vs), "not planar"
    return {"type": "polygon", "name": name, "vertices": [[float(t) for t in v] for v in vertices],
            "orientation": "planar, vertices in order; normal by the right-hand rule (the field does not depend on it)"}


LBASE = [(0, 0), (2, 0), (2, 0.375), (0.625, 0.375), (0.625, 1.75), (0, 1.75)]
UBASE = [(0, 0), (1.5, 0), (1.5, 1), (1.25, 1), (1.25, 0.125), (0.5, 0.25), (0.25, 1.125), (0, 1)]
STAR = [(1, 0), (0.25, 0.25), (0, 1.25), (-0.25, 0.25), (-1, 0.125), (-0.25, -0.375), (0.125, -1.5), (0.25, -0.25)]
SHEAR = ((0.75, -0.3125, 0.21875), (0.40625, 0.8125, -0.15625), (-0.109375, 0.28125, 0.90625))
FAR_EXACT = (200, -74.625, 0.25)                    # dyadic, so that moved quadrilaterals stay planar
G1 = [[0.31, 1.7, -0.45], [-0.9, 0.83, 0.27], [1.2, -0.66, -1.9]]
OBLIQUE = [0.47, -0.81, 1.13]
TET = [[0, 2, 1], [0, 1, 3], [1, 2, 3], [2, 0, 3]]


def flat_cases():
    def box(name, half, pose, centre, p):
        return name, body("box", {"half_lengths_e1_e2_e3": half}, pose, centre), p
    u = lambda *p: pol("uniform", p=list(map(float, p)))
    lin = lambda a, *b: pol("sheet_linear", a=float(a), b=list(map(float, b)) or [0.0, 0.0, 0.0])
    yield box("box-plate-1e-3", [0.8, 0.55, 8e-4], ALIGNED, HERE, u(0, 0, 1))
    yield box("box-plate-1e-5-generic-moved", [1.1, 0.9, 1.1e-5], GENERIC, away(2.2), u(*OBLIQUE))
    yield box("box-plate-1e-3-transverse", [0.75, 1.0, 1e-3], RATIONAL, HERE, u(1, -0.5, 0.75))
    yield box("box-rod-1e3-generic", [0.013, 0.017, 13.0], GENERIC2, (0.4, 1.7, -2.2), u(*OBLIQUE))
    yield box("box-rod-1e3-axial", [15.0, 0.015, 0.015], ALIGNED, HERE, u(1, 0, 0))
    yield box("box-generic-moved", [0.35, 0.6, 0.47], GENERIC, away(1.2), u(*OBLIQUE))
    yield box("box-tilt", [0.6, 0.35, 0.85], TILT, (0.1, 0.2, -0.3), u(0, 0, 1))
    yield box("box-sevenths", [0.875, 1.75, 0.4375], SEVENTHS, (0.25, 1.5, -0.75), u(-0.5, 1.25, 0.375))
    yield box("box-affine-generic-moved", [0.7, 0.45, 0.3], GENERIC2, away(1.4), pol("affine", p0=[0.7, -20.0, 11.0], G=G1))
    yield box("box-affine-plate", [0.9, 0.7, 9e-4], TILT2, (0.3, -0.1, 0.2), pol("affine", p0=[0.1, 0.6, -0.4], G=G1))
    yield "poly-needle", solid("needle 30:1", [(0, 0, 0), (3.1, 0.04, 0.13), (3.0, 0.11, -0.02), (2.7, 0.07, 0.2)], TET), u(*OBLIQUE)
    yield "poly-wedge", solid("sliver tetrahedron, dihedral 1e-3", [(0.1, 0.2, 0.3), (0.3, 1.37, 0.52), (1.4, -0.2, 0.41), (0.79, 0.61, 0.46059)], TET), u(-0.3, 0.5, 0.9)
    yield "poly-Lprism-sheared", prism("L prism, sheared", LBASE, -0.25, 0.5, SHEAR), u(*OBLIQUE)
    yield "poly-Uprism-moved", prism("U prism, sheared, moved", UBASE, 0, 0.625, SHEAR, FAR_EXACT), u(0.2, 1.0, -0.6)
    yield "poly-starprism", prism("star prism", STAR, -0.125, 0.25), u(*OBLIQUE)
    yield "poly-foil", prism("non-convex foil 1e-3", LBASE, 0, 2.0 ** -10, SHEAR), u(0.1, 0.3, 1.0)
    yield "poly-octahedron", solid("octahedron, irregular", [(0.91, 0.03, -0.1), (-0.07, 1.13, 0.05), (-0.83, 0.01, 0.12), (0.02, -0.97, 0.2), (0.11, -0.06, 1.21), (-0.05, 0.08, -1.07)],
                                   [[0, 1, 4], [1, 2, 4], [2, 3, 4], [3, 0, 4], [1, 0, 5], [2, 1, 5], [3, 2, 5], [0, 3, 5]]), u(*OBLIQUE)
    yield "poly-Uprism-affine", prism("U prism, sheared", UBASE, 0, 0.625, SHEAR), pol("affine", p0=[0.2, -0.1, 0.4], G=G1)
    yield "poly-tet-affine-moved", solid("tetrahedron, moved", [(130.0, -48.5, 0.16), (131.3, -48.61, 0.3), (130.4, -47.4, 0.05), (130.5, -48.1, 1.4)], TET), \
        pol("affine", p0=[-40.0, 150.0, -160.0], G=G1)
    needle = sheet("needle triangle 30:1", [(0.1, 0.2, 0.3), (3.2, 0.27, 0.51), (1.7, 0.33, 0.45)])
    yield "sheet-needle", needle, lin(1.3)
    yield "sheet-needle-linear", needle, lin(-0.4, 1.1, 0.7, -0.2)
    yield "sheet-triangle-generic-moved", sheet("triangle", [(110.0, -41.03, 0.14), (111.07, -40.7, 0.31), (110.2, -40.1, -0.37)]), lin(0.8)
    yield "sheet-triangle-linear-moved", sheet("triangle", [(110.0, -41.03, 0.14), (111.07, -40.7, 0.31), (110.2, -40.1, -0.37)]), lin(3.0, 0.9, 2.0, -1.5)
    yield "sheet-star", sheet("star", [(x, y, 0.5) for x, y in STAR]), lin(-1.1)
    shear = lambda x, y: [float(sum(Fr(SHEAR[i][j]) * Fr(t) for j, t in ((0, x), (1, y)))) for i in range(3)]
    yield "sheet-star-sheared-linear", sheet("star, sheared", [shear(x, y) for x, y in STAR]), lin(0.25, 1.0, -2.0, 0.5)
    yield "sheet-strip-linear", sheet("strip 1:1024", [(0, 0, 0), (2, 0, 1), (2, 2.0 ** -9, 1), (0, 2.0 ** -9, 0)]), lin(0.5, 0.3, 4.0, 0.1)
    yield "sheet-U", sheet("U", [shear(x, y) for x, y in UBASE]), lin(1.7)


# ---------------------------------------------------------------- bodies of revolution
def round_points(case, seed):
    """Points round a disc, annulus, cylinder or tube."""
    b = case["body"]
    f = gen.Frame(b)
    L = b.get("half_length", 0.0)
    flat, aligned = L == 0.0, tuple(b["axis"]) == (0.0, 0.0, 1.0)
    out, inn = b.get("radius", b.get("r2")), b.get("r1", 0.0)
    size = 2 * max(out, L)
    case["size"] = size
    P = Points(case, seed, f.c, size)
    rnd = P.rnd
    rims = [(mpf(a), s * mpf(L), o) for a, o in ((out, 1), (inn, -1)) if a for s in ((1, -1) if L else (1,))]
    thin = [t for t in (out - inn, 2 * L) if t and t < 0.01 * size] + ([inn] if 0 < inn < 0.01 * size else [])

    def put(rho, z, tag, phi=None):
        phi = mpf(rnd.uniform(0, 2 * math.pi)) if phi is None else phi
        x = add(vec(f.c), f.turn([rho * mp.cos(phi), rho * mp.sin(phi), z]))
        P.put(x, tag, clear)

    def clear(x):
        rho2, z, _, _ = f.cylindrical(x)
        rho, z, tol = mp.sqrt(M(rho2)), M(z), U4 * (mp.sqrt(dot(vec(x), vec(x))) + size)
        ends = any(0 < abs(z - s * M(Fr(L))) < tol for s in (1, -1)) and inn - tol < rho < out + tol
        walls = L and any(abs(rho - M(Fr(a))) < tol for a in (out, inn) if a) and abs(z) < M(Fr(L)) + tol
        return not (ends or walls)

    def mix(lo, hi):
        return mpf(rnd.uniform(lo, hi))
    for _ in range(0 if flat else 5):
        put(inn + (out - inn) * mp.sqrt(mix(0.02, 0.98)), L * mix(-0.98, 0.98), "interior")
    for _ in range(3 if aligned else 0):
        put(inn + (out - inn) * mix(0.05, 0.95), mpf(L), "on-face")
    P.afar()
    dirs = ((0, 45, 135, 225, 290), (90, 20, 160, 250, 330), (0, 90, 110, 200, 315), (0, 90, 60, 150, 240))
    for j, d in enumerate(NEAR):
        for th in dirs[j] + ((180,) if flat and aligned else ()):
            a, z0, o = rnd.choice(rims)
            c, s = {0: (1, 0), 90: (0, 1), 180: (-1, 0)}.get(th, (mp.cos(mp.pi * th / 180), mp.sin(mp.pi * th / 180)))
            up = 1 if z0 >= 0 else -1
            if a + o * c * d * size > 0:
                put(a + o * c * mpf(d) * size, z0 + up * s * mpf(d) * size, "near-edge-%.0e-%ddeg" % (d, th))
        for side in (1, -1):
            a, z0, o = rnd.choice(rims)
            put(inn + (out - inn) * mix(0.05, 0.95), z0 + side * mpf(d) * size, "near-face-%.0e" % d)
            if L and a + side * d * size > 0:
                put(a + side * mpf(d) * size, L * mix(-0.9, 0.9), "near-face-%.0e" % d)
        put(mpf(d) * size, mpf(rnd.choice((0.31 * L, -1.4 * L - 0.3 * size, L + 0.02 * size))), "axis-off-%.0e" % d)
    for t in thin:                                  # the scale of the wall, the plate or the hole
        for k in (3.0, 0.3, 1e-3):
            for th in (0, 70, 90, 140, 235):
                a, z0, o = rnd.choice(rims)
                c, s = {0: (1, 0), 90: (0, 1)}.get(th, (mp.cos(mp.pi * th / 180), mp.sin(mp.pi * th / 180)))
                if k * t > 1e-12 * size and a + o * c * k * t > 0 and rnd.random() < 0.6:
                    put(a + o * c * mpf(k) * t, z0 + (1 if z0 >= 0 else -1) * s * mpf(k) * t, "near-edge-%gthin-%ddeg" % (k, th))
    for z in (0.37 * L, L + 1e-6 * size, -L - 0.01 * size, 1.5 * L + 0.1 * size, -5.3 * size, 700.0 * size):
        put(mpf(0), mpf(z), "axis")
    for k in (1.05, 2.3, 17.0, 4e3):
        put(mpf(out) * k, rnd.choice(rims)[1], "end-plane-outside")
    if inn:
        put(mpf(inn) * mix(0.1, 0.9), rnd.choice(rims)[1], "hole-end-plane")
        put(mpf(inn) * mix(0.1, 0.95), mpf(L) * mix(-0.8, 0.8) if L else mpf(0.01) * inn, "hole")
    for k in (1e-2, 0.4, 6.0, 900.0):
        a, z0, _ = rnd.choice(rims)
        put(a, (z0 + mpf(k) * size) * rnd.choice((1, -1)) if z0 >= 0 else z0 - mpf(k) * size, "wall-extension")
    if aligned and out == 65 / 64:                  # exactly on the cylinder through the rim, at azimuths of Pythagorean triples
        c = b["centre"]
        for (p, q), k in (((33, 56), 1e-9), ((16, -63), 1e-3), ((-39, 52), 0.5), ((60, 25), 3.0)):
            P.put([mpf(c[0]) + mpf(p) / 64, mpf(c[1]) + mpf(q) / 64, mpf(c[2]) + L + mpf(k) * size], "wall-extension-exact", clear)
    put(mpf(out) * mix(1.1, 1.6), mpf(0) if L else mpf(0.3) * out, "midplane-outside" if L else "outside")
    return P


def round_cases():
    u = lambda *p: pol("uniform", p=list(map(float, p)))
    q = lambda a: pol("sheet_linear", a=float(a), b=[0.0, 0.0, 0.0])
    R = 65 / 64
    disc = lambda n, r, pose, c, s: (n, {**body("disc", {"radius": r}, pose, c), "note": "flat sheet in the local plane z=0"}, q(s))
    ann = lambda n, r1, r2, pose, c, s: (n, {**body("annulus", {"r1": r1, "r2": r2}, pose, c), "note": "flat sheet in the local plane z=0"}, q(s))
    cyl = lambda n, r, L, pose, c, p: (n, body("cylinder", {"radius": r, "half_length": L}, pose, c), p)
    tube = lambda n, r1, r2, L, pose, c, p: (n, body("tube", {"r1": r1, "r2": r2, "half_length": L}, pose, c), p)
    az = lambda c: pol("axial_z", c=float(c))
    along = lambda pose, k: u(*(k * t for t in pose[0]))
    yield disc("disc-aligned", R, ALIGNED, (0.5, -0.25, 0.125), 1.2)
    yield disc("disc-generic-moved", 0.83, GENERIC, away(1.66), -0.7)
    yield disc("disc-tilt", 1.3, TILT, HERE, 1.0)
    yield ann("annulus-narrow-1e-3", R * (1 - 2.0 ** -10), R, ALIGNED, HERE, 1.0)
    yield ann("annulus-narrow-1e-6-generic", 0.9 * (1 - 1e-6), 0.9, GENERIC2, (0.3, 0.1, -0.7), 2.0)
    yield ann("annulus-hole-1e-4", 1.1e-4, 1.1, RATIONAL, (0.5, 0.25, -1.0), -1.5)
    yield ann("annulus-generic-moved", 0.42, 0.97, GENERIC, away(1.94), 0.6)
    yield cyl("cyl-axial-aligned", R, 0.7, ALIGNED, HERE, u(0, 0, 1))
    yield cyl("cyl-transverse-aligned", R, 0.7, ALIGNED, (0.25, 0.5, -0.125), u(0.6, -0.9, 0))
    yield cyl("cyl-oblique-generic-moved", 0.47, 0.61, GENERIC, away(1.22), u(*OBLIQUE))
    yield cyl("cyl-plate-1e-3-axial", 1.0, 1e-3, ALIGNED, HERE, u(0, 0, 1))
    yield cyl("cyl-plate-1e-3-transverse", 0.9, 9e-4, GENERIC2, (1.0, 2.0, 3.0), u(0.29, 1.3, 0.0))
    yield cyl("cyl-plate-1e-5-oblique", 1.2, 1.2e-5, TILT, (0.1, 0.3, 0.2), u(*OBLIQUE))
    yield cyl("cyl-rod-1e3-axial", 0.012, 12.0, RATIONAL, HERE, along(RATIONAL, 0.5))
    yield cyl("cyl-rod-1e3-oblique-moved", 0.011, 11.0, GENERIC, away(22.0), u(*OBLIQUE))
    yield cyl("cyl-oblique-tilt", 0.55, 0.95, TILT2, HERE, u(0.001, 0.3, 1.2))
    yield cyl("cyl-transverse-sevenths", 0.875, 1.75, SEVENTHS, (0.5, 0.25, 0.75), u(2, 3, -6))
    yield tube("tube-wall-1e-3-axial", 0.999, 1.0, 0.6, ALIGNED, HERE, u(0, 0, 1))
    yield tube("tube-wall-1e-3-transverse", R * (1 - 2.0 ** -10), R, 0.8, ALIGNED, HERE, u(1, 0.3, 0))
    yield tube("tube-wall-1e-6-oblique-generic", 0.7 * (1 - 1e-6), 0.7, 0.9, GENERIC, (0.2, -0.4, 0.6), u(*OBLIQUE))
    yield tube("tube-hole-1e-4-oblique", 0.9e-4, 0.9, 0.5, GENERIC2, (-0.3, 0.8, 0.1), u(*OBLIQUE))
    yield tube("tube-oblique-generic-moved", 0.33, 0.71, 0.52, GENERIC, away(1.42), u(-0.4, 0.9, 0.7))
    yield tube("tube-washer-1e-3", 0.4, 1.0, 5e-4, TILT, (0.7, 0.1, 0.2), u(0.3, -0.2, 1.0))
    yield tube("tube-long-thin-wall", 0.0199, 0.02, 8.0, RATIONAL, (1.0, 0.5, -0.25), u(0.6, 0.2, 0.9))
    yield cyl("cyl-axial_z-aligned", R, 0.8, ALIGNED, HERE, az(1.3))
    yield cyl("cyl-axial_z-generic-moved", 0.58, 0.44, GENERIC, away(1.16), az(-2.1))
    yield cyl("cyl-axial_z-plate-1e-3", 0.9, 9e-4, GENERIC2, (0.2, 0.3, 0.4), az(0.9))
    yield cyl("cyl-axial_z-rod-1e3", 0.013, 13.0, RATIONAL, (0.0, 1.0, 0.5), az(1.7))


# ---------------------------------------------------------------- spheres, shells, ellipsoids
def ball_points(case, seed):
    b = case["body"]
    f = gen.Frame(b)
    axes = b.get("semi_axes_e1_e2_e3") or [b.get("radius", b.get("r2"))] * 3
    inn = b.get("r1", 0.0)
    size = 2 * max(axes)
    case["size"] = size
    P = Points(case, seed, f.c, size)
    rnd, ax = P.rnd, vec(axes)

    def put(v, tag):
        P.put(add(vec(f.c), f.turn(v)), tag)

    def surface(scale=1):
        v = P.direction()
        v = [scale * a * t for a, t in zip(ax, v)]
        n = [t / (a * a) for a, t in zip(ax, v)]
        return v, mul(1 / mp.sqrt(dot(n, n)), n)
    put([mpf(0)] * 3, "centre")
    for _ in range(5):
        k = mpf(inn) / ax[0] + (1 - mpf(inn) / ax[0]) * mpf(rnd.uniform(0.05, 0.98))
        put(mul(k, surface()[0]), "interior")
    for k in ((0.2, 0.7, 0.999) if inn else ()):
        put(mul(mpf(k), surface(mpf(inn) / ax[0])[0]), "hole")
    P.afar()
    thin = ax[0] - mpf(inn) if inn else min(ax)
    for d in NEAR:
        for side in (1, -1, 1):
            v, n = surface()
            put(add(v, mul(side * mpf(d) * size, n)), "near-face-%.0e" % d)
        for side in (1, -1):
            v, n = surface(mpf(inn) / ax[0]) if inn else surface()
            dd = mpf(d) * min(thin, mpf(inn) if inn else thin)
            if dd > 2e-13 * size:
                put(add(v, mul(side * dd, n)), "near-face-%.0ethin" % d)
        for i in range(3):                          # tips
            v = [mpf(0)] * 3
            v[i] = rnd.choice((1, -1)) * (ax[i] + mpf(d) * size)
            put(v, "near-face-%.0e-tip" % d)
    for i in range(3):
        for k in (1.5, 60.0):
            v = [mpf(0)] * 3
            v[i] = k * ax[i]
            put(v, "axis")
        v = [mpf(rnd.uniform(0.6, 1.4)) * size for _ in range(3)]
        v[i] = mpf(0)
        put(v, "symmetry-plane-outside")
        v[i] = mpf(10) ** rnd.randrange(-12, -2) * size
        put(v, "near-plane")
    return P


def ball_cases():
    u = lambda *p: pol("uniform", p=list(map(float, p)))
    ball = lambda n, r, pose, c, p: (n, body("sphere", {"radius": r}, pose, c), p)
    shell = lambda n, r1, r2, c, p: (n, body("spherical_shell", {"r1": r1, "r2": r2}, ALIGNED, c), p)
    ell = lambda n, a, pose, c, p: (n, body("ellipsoid", {"semi_axes_e1_e2_e3": a}, pose, c), p)
    yield ball("sphere-generic-moved", 0.77, GENERIC, away(1.54), u(*OBLIQUE))
    yield ball("sphere-small", 3.1e-3, ALIGNED, (0.1, 0.2, 0.3), u(0.4, 1.0, -0.2))
    yield shell("shell-wall-1e-3", 0.999, 1.0, HERE, u(*OBLIQUE))
    yield shell("shell-wall-1e-6-moved", 0.8 * (1 - 1e-6), 0.8, away(1.6), u(*OBLIQUE))
    yield shell("shell-hole-1e-4", 1.2e-4, 1.2, (0.4, -0.3, 0.2), u(*OBLIQUE))
    yield ell("ellipsoid-generic-moved", [0.7, 1.3, 0.45], GENERIC, away(2.6), u(*OBLIQUE))
    yield ell("ellipsoid-plate-1e-3", [1.0, 0.8, 1e-3], TILT, HERE, u(0.5, 0.2, 1.0))
    yield ell("ellipsoid-plate-1e-5", [1.1, 1.1, 1.1e-5], RATIONAL, (0.5, 0.0, 0.25), u(*OBLIQUE))
    yield ell("ellipsoid-needle-1e3", [0.011, 0.013, 11.0], GENERIC2, (0.3, 0.7, 0.1), u(*OBLIQUE))
    yield ell("ellipsoid-near-sphere", [0.9, 0.9 * (1 + 1e-6), 0.9 * (1 - 3e-9)], TILT2, (0.1, 0.1, 0.2), u(*OBLIQUE))
    yield ell("ellipsoid-prolate-rod", [0.02, 0.02, 2.0], SEVENTHS, HERE, u(0.3, 1.0, 0.4))


def cases():
    """All cases with points, tags and words; phi, g and region are still to be computed."""
    with mp.workdps(60):
        for maker, points in ((flat_cases, flat_points), (round_cases, round_points), (ball_cases, ball_points)):
            for name, b, p in maker():
                case = {"id": "hard-" + name, "body": b, "polarization": p}
                P = points(case, name)
                case.update(points=P.points, tags=P.tags)
                kind = "axial_z" if p["kind"] == "axial_z" else {"flat_cases": "flat", "round_cases": "round"}.get(maker.__name__) or \
                    ("ellipsoid" if b["type"] == "ellipsoid" else "ball")
                case["words"] = {"region_meaning": REGION, "method": METHOD[kind], "check": CHECK, "source": "derived here", "note": NOTE}
                yield case
