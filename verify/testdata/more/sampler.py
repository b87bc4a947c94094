"""Random (body, polarization, point) triples with weight on hard places, values of >= 20 digits; closed forms: closed.py."""
import gzip
import json
import math
import os
import random
import time

from num import *
import cases
import cases2
from cases2 import Points, affine_about, pol, u, sector, cone, torus, cyl, tube
from cases3 import disc, annulus
import values
from gen import add, mul, fr


def pose_of(r):
    k = r.random()
    if k < 0.2:
        return cases.ALIGNED
    if k < 0.35:
        return r.choice((cases.RATIONAL, cases.SEVENTHS))
    if k < 0.45:
        return r.choice((cases.TILT, cases.TILT2))
    return tuple(tuple(r.gauss(0, 1) for _ in range(3)) for _ in range(2))


def centre_of(r, size):
    if r.random() < 0.15:
        return tuple(t * size * r.uniform(0.5, 1) for t in (100.0, -37.3, 0.123))
    return tuple(r.uniform(-1, 1) * size for _ in range(3))


def vector(r, pose):
    if r.random() < 0.2:                             # along the axis, as near as float64 allows
        k = r.uniform(0.2, 2)
        return [k * t for t in pose[0]]
    return [r.gauss(0, 1) for _ in range(3)]


def matrix(r):
    return [[r.uniform(-2, 2) for _ in range(3)] for _ in range(3)]


def length(r):
    """Overall scale: mostly of order one."""
    return 10 ** (r.uniform(-0.3, 0.3) if r.random() < 0.8 else r.uniform(-3, 3))


def thin(r):
    """A ratio, small one time in three."""
    return 10 ** r.uniform(-3, -1) if r.random() < 0.33 else r.uniform(0.1, 0.95)


def round_body(r):
    a = length(r)
    aspect = r.uniform(0.2, 2.5) if r.random() < 0.7 else 10 ** r.uniform(-3, 1.5)
    return a, a * aspect, pose_of(r)


def make_arc(r, kind):
    a, h, pose = round_body(r)
    r1 = a * (1 - thin(r))
    k = r.random()
    p1 = r.uniform(-3.1, 3.1)
    w = r.uniform(0.2, 6.0) if k < 0.7 else 10 ** r.uniform(-2, -0.7) if k < 0.85 else 2 * math.pi - 10 ** r.uniform(-2, -0.7)
    c = centre_of(r, 2 * max(a, h))
    p = u(*vector(r, pose)) if kind == "arc" else pol("radial_unit", c=r.choice((1, -1)) * r.uniform(0.3, 2)) if kind == "arc-radial" \
        else affine_about(c, [[t / a for t in row] for row in matrix(r)], vector(r, pose))
    return sector("x", r1, a, p1, p1 + w, h, pose, c, p)


def make_cone(r, kind):
    a, h, pose = round_body(r)
    k = r.random()
    b = 0.0 if k < 0.25 else a * (1 - 10 ** r.uniform(-9, -2)) if k < 0.4 else a * 10 ** r.uniform(-4, -1) if k < 0.5 else a * r.uniform(0.1, 0.9)
    rb, rt = (a, b) if r.random() < 0.5 else (b, a)
    return cone("x", rb, rt, h, pose, centre_of(r, 2 * max(a, h)), u(*vector(r, pose)))


def make_torus(r, kind):
    R = length(r)
    k = r.random()
    m = R * (r.uniform(0.1, 0.8) if k < 0.55 else 10 ** r.uniform(-3, -1) if k < 0.8 else r.uniform(0.8, 0.96))
    pose = pose_of(r)
    return torus("x", R, m, pose, centre_of(r, 2 * (R + m)), u(*vector(r, pose)))


def make_cyl(r, kind):
    a, h, pose = round_body(r)
    c = centre_of(r, 2 * max(a, h))
    k = r.choice((1, -1)) * r.uniform(0.3, 2)
    if kind == "cylinder-affine":
        p = affine_about(c, [[t / a for t in row] for row in matrix(r)], vector(r, pose))
    elif kind == "cylinder-axial":
        p = pol("axial_z2", c=k / h ** 2) if r.random() < 0.5 else pol("axial_power", c=k / h ** 3, n=3)
    else:
        n = r.choice((0, 0.5, 1, 2, 3, 0.5, 0))
        p = pol("radial_s2", c=k / a ** 2) if n == 2 else pol("radial_power", c=k / a ** n, n=n)
    if r.random() < 0.5:
        return cyl("x", a, h, pose, c, p)
    return tube("x", a * (1 - thin(r)), a, h, pose, c, p)


def make_disc(r, kind):
    a, pose = length(r), pose_of(r)
    c = centre_of(r, 2 * a)
    b = [t / a for t in vector(r, pose)]
    s0 = r.uniform(-1, 1) - sum(p * q for p, q in zip(b, c))
    return disc("x", a, pose, c, s0, b) if r.random() < 0.4 else annulus("x", a * (1 - thin(r)), a, pose, c, s0, b)


def make_ellipsoid(r, kind):
    a = length(r)
    ax = [a] + [a * (10 ** r.uniform(-3, 0) if r.random() < 0.3 else r.uniform(0.3, 1)) for _ in range(2)]
    k = r.random()
    if k < 0.2:
        ax[1] = ax[0]
    elif k < 0.3:
        ax[1] = ax[0] * (1 - 10 ** r.uniform(-9, -3))
    r.shuffle(ax)
    pose, c = pose_of(r), centre_of(r, 2 * a)
    return "x", cases.body("ellipsoid", {"semi_axes_e1_e2_e3": ax}, pose, c), affine_about(c, [[t / a for t in row] for row in matrix(r)], vector(r, pose))


def make_box(r, kind):
    a = length(r)
    ax = [a] + [a * (10 ** r.uniform(-3, 0) if r.random() < 0.3 else r.uniform(0.3, 1)) for _ in range(2)]
    r.shuffle(ax)
    pose = pose_of(r)
    c = tuple(r.uniform(-1, 1) * a for _ in range(3))
    d = r.choice((2, 3))
    terms = []
    for comp in range(3):
        for _ in range(4):
            i = r.randrange(d + 1)
            j = r.randrange(d + 1 - i)
            l = r.randrange(d + 1 - i - j)
            terms.append([comp, r.uniform(-1, 1) / a ** (i + j + l), [i, j, l]])
    return "x", cases.body("box", {"half_lengths_e1_e2_e3": ax}, pose, c), pol("polynomial", terms=terms)


FAMILIES = {"arc": make_arc, "arc-radial": make_arc, "arc-affine": make_arc, "cone": make_cone, "torus": make_torus,
            "cylinder-affine": make_cyl, "cylinder-axial": make_cyl, "cylinder-radial": make_cyl, "disc-linear": make_disc,
            "ellipsoid-affine": make_ellipsoid, "box-polynomial": make_box}
CLASSES = (("interior", 8), ("outside", 14), ("far", 10), ("near-face", 24), ("near-edge", 22), ("near-corner", 8), ("axis", 6), ("plane", 8))


def small(r):
    return 10 ** r.uniform(-12.3, -1)


def draw_revolved(P, segs, tag, r):
    b = P.b
    size = P.case["size"]
    arc = b["type"] == "tube_sector"
    p1, p2 = (b["phi1"], b["phi2"]) if arc else (0.0, 2 * math.pi)
    az = lambda: mpf(p1 + (p2 - p1) * r.uniform(0.03, 0.97)) if arc else mpf(r.uniform(0, 2 * math.pi))
    h, r1 = b.get("half_length", 0.0), b.get("r1", 0.0)
    out = max(float(max(g.sA, g.sB)) for g in segs)
    rims = sorted({(float(s), float(z)) for g in segs for s, z in ((g.sA, g.zA), (g.sB, g.zB)) if s > 0})
    tips = [(float(s), float(z)) for g in segs if not g.flat for s, z in ((g.sA, g.zA), (g.sB, g.zB)) if s == 0]
    t = r.uniform(0.02, 0.98)
    g = r.choice(segs)
    s, z = g.sA + (g.sB - g.sA) * mpfr(t), g.zA + (g.zB - g.zA) * mpfr(t)
    e = r.choice((1, -1)) * small(r) * (size if r.random() < 0.7 else max(out - r1, 1e-3 * size))
    th, th2 = r.uniform(0, 2 * math.pi), mpf(r.uniform(0, 2 * math.pi))
    pe = mpf(r.choice((p1, p2)))
    en, es, ez = [-mp.sin(pe), mp.cos(pe), mpf(0)], [mp.cos(pe), mp.sin(pe), mpf(0)], [mpf(0), mpf(0), mpf(1)]
    if tag == "interior":
        for _ in range(200):
            s, z = r1 + (out - r1) * math.sqrt(r.random()), h * r.uniform(-1, 1)
            if all(float(q.ns) * (s - float(q.sA)) + float(q.nz) * (z - float(q.zA)) < 0 for q in segs):
                return P.put(P.polar(s, az(), z), tag)
        return False
    if tag == "outside":
        k = 10 ** r.uniform(-1, 1.5)
        if k < 1:
            return P.put(P.polar(abs(back(s + k * size * g.ns)), az(), back(z + k * size * g.nz)), tag)
        return P.put(add(P.c, mul(mpf(k * size), P.direction())), tag)
    if tag == "far":
        return P.put(add(P.c, mul(mpf(10 ** r.uniform(1.5, 6) * size), P.direction())), tag)
    if tag == "near-face":
        if arc and r.random() < 0.35:
            s, z = r1 + (out - r1) * r.uniform(0.03, 0.97), h * r.uniform(-0.97, 0.97)
            return P.put(P.local(add([s * es[0], s * es[1], mpf(z)], mul(mpf(e), en))), tag + "-end")
        return P.put(P.polar(abs(back(s + e * g.ns)), az(), back(z + e * g.nz)), tag)
    if tag == "near-edge":
        if arc and r.random() < 0.5:
            if r.random() < 0.5:
                s, z = r.choice((b["r1"], b["r2"])), h * r.uniform(-0.97, 0.97)
                o = add(mul(mp.cos(th2), es), mul(mp.sin(th2), en))
            else:
                s, z = r1 + (out - r1) * r.uniform(0.03, 0.97), r.choice((h, -h))
                o = add(mul(mp.cos(th2), ez), mul(mp.sin(th2), en))
            return P.put(P.local(add(add(mul(mpf(s), es), mul(mpf(z), ez)), mul(mpf(e), o))), tag + "-end")
        s, z = r.choice(rims)
        return P.put(P.polar(abs(s + mpf(e) * mp.cos(th)), az(), z + mpf(e) * mp.sin(th)), tag)
    if tag == "near-corner":
        if arc:
            s, z = r.choice((b["r1"], b["r2"])), r.choice((h, -h))
            return P.put(P.local(add([s * es[0], s * es[1], mpf(z)], mul(mpf(e), P.direction()))), tag)
        if not tips:
            return False
        s, z = r.choice(tips)
        return P.put(P.polar(abs(mpf(e) * mp.cos(th)), az(), z + mpf(e) * mp.sin(th)), "near-tip")
    if tag == "axis":
        s = 0 if r.random() < 0.4 else small(r) * size
        return P.put(P.polar(s, az(), r.uniform(-1.5, 1.5) * max(h, 0.1 * size)), tag)
    k = r.randrange(4 if arc else 2)
    s, z = r.choice(rims)
    if k == 0:
        return P.put(P.polar(s * r.uniform(1.05, 3), az(), z), "end-plane")
    if k == 1:
        return P.put(P.polar(s, az(), z + (1 if z > 0 else -1) * r.uniform(0.05, 2) * size), "wall-extension")
    if k == 2:
        return P.put(P.polar(out * r.uniform(1.05, 3), pe, h * r.uniform(-0.9, 0.9)), "radial-face-plane")
    return P.put(P.polar(r.choice((b["r1"], b["r2"])), mpf(p2 + (2 * math.pi - p2 + p1) * r.uniform(0.02, 0.9)), h * r.uniform(-0.9, 0.9)), "wall-extension-phi")


def draw_torus(P, tag, r):
    b, size = P.b, P.case["size"]
    R, m = b["major_radius"], b["minor_radius"]
    az, th = mpf(r.uniform(0, 2 * math.pi)), r.uniform(0, 2 * math.pi)
    if r.random() < 0.25:
        th = math.pi + r.uniform(-0.2, 0.2)
    at = lambda d: P.polar(abs(R + mpf(d) * mp.cos(th)), az, mpf(d) * mp.sin(th))
    if tag == "interior":
        return P.put(at(m * math.sqrt(r.random())), tag)
    if tag == "outside":
        k = 10 ** r.uniform(-1, 1.5)
        return P.put(at(m + k * size) if k < 1 else add(P.c, mul(mpf(k * size), P.direction())), tag)
    if tag == "far":
        return P.put(add(P.c, mul(mpf(10 ** r.uniform(1.5, 6) * size), P.direction())), tag)
    if tag == "near-face":
        return P.put(at(m + r.choice((1, -1)) * mpf(small(r)) * (size if r.random() < 0.6 else m)), tag)
    if tag == "near-edge":                           # the scale of the tube
        return P.put(at(m * (1 + 10 ** r.uniform(-2, 1))), "near-face-tube")
    if tag == "near-corner":
        return P.put(P.polar(abs(R + r.choice((1, -1)) * (m + r.choice((1, -1)) * mpf(small(r)) * size)), az, 0), "near-face-equator")
    if tag == "axis":
        return P.put(P.polar(0 if r.random() < 0.4 else small(r) * size, az, r.uniform(-1, 1) * size), tag)
    return P.put(P.polar(R * r.uniform(0, 2.5), az, r.choice((0, m, -m))), "plane")


def draw_other(P, case, tag, r):
    """Ellipsoids and boxes: by the point makers of cases.py, one point of many."""
    maker = cases.ball_points if case["body"]["type"] == "ellipsoid" else cases.flat_points
    q = maker({"id": "x", "body": case["body"], "polarization": case["polarization"]}, r.random())
    near = [i for i, t in enumerate(q.tags) if t.startswith("near")]
    rest = [i for i, t in enumerate(q.tags) if not t.startswith("near")]
    return [(q.points[i], q.tags[i]) for i in r.sample(near, min(6, len(near))) + r.sample(rest, min(4, len(rest)))]


def pack(path, cases):
    """Write cases, a line each, as gzipped JSON without time stamp; words that only explain are left out."""
    lean = lambda d: {k: v for k, v in d.items() if k not in ("frame", "angle", "note", "meaning")}
    lines = [json.dumps({k: lean(v) if isinstance(v, dict) else v for k, v in c.items() if k != "size"}, separators=(",", ":")) for c in cases]
    with open(path + ".part", "wb") as raw, gzip.GzipFile("", "wb", 9, raw, 0) as f:
        f.write(("[\n" + ",\n".join(lines) + "\n]\n").encode())
    os.replace(path + ".part", path)


def triples(seed, count, family, path, digits=46, every=10):
    r = random.Random("%s-%s" % (seed, family))
    make = FAMILIES[family]
    names, weights = [c[0] for c in CLASSES], [c[1] for c in CLASSES]
    out, t0, worst, k = [], time.time(), 99.0, 0
    if family in ("ellipsoid-affine", "box-polynomial", "cylinder-radial", "cylinder-axial"):
        digits = 70
    while len(out) < count:
        k += 1
        mp.dps = 60
        tune()
        _, b, p = make(r, family)
        case = {"id": "", "body": b, "polarization": p}
        P = Points(case, r.random())
        found = []
        if b["type"] in ("ellipsoid", "box"):
            case["size"] = 2 * max(b.get("semi_axes_e1_e2_e3") or b["half_lengths_e1_e2_e3"])
            found = draw_other(P, case, None, r)
        else:
            L = values.Local(b, add(P.f.c, [Fr(1), Fr(0), Fr(0)]))
            if b["type"] == "torus":
                segs, case["size"] = None, 2 * (b["major_radius"] + b["minor_radius"])
            else:
                segs, _ = values.make(b, L)
                case["size"] = 2 * max(max(float(max(g.sA, g.sB)) for g in segs), b.get("half_length", 0.0))
            for _ in range(2):                       # two points a body
                tag = r.choices(names, weights)[0]
                try:
                    draw_torus(P, tag, r) if segs is None else draw_revolved(P, segs, tag, r)
                except ZeroDivisionError:
                    continue
            found = list(zip(P.points, P.tags))
        for x, tag in found:
            try:
                with mp.workdps(digits):
                    v = gen.natural(b, p, fr(x))
                if v[2] == "on-sheet":
                    continue
                if len(out) % every == 0:
                    with mp.workdps(100 if digits < 100 else 130):
                        w = gen.natural(b, p, fr(x))
                        n = mp.sqrt(gen.dot(w[1], w[1]))
                        e = mp.sqrt(sum((i - j) ** 2 for i, j in zip(v[1], w[1]))) / n if n else mpf(0)
                        e = max(e, abs(v[0] - w[0]) / (abs(w[0]) + n * mpf(case["size"])) if n else mpf(0))
                        d = float(-mp.log10(e)) if e else 99.0
                        if d < 21:
                            print("   digits %.1f" % d, family, tag, x, json.dumps({q: t for q, t in b.items() if q not in ("frame", "angle")}), flush=True)
                        worst = min(worst, d)
                        v = w
            except Exception as e:
                print("   no value:", family, tag, x, repr(e)[:100], flush=True)
                continue
            with mp.workdps(60):
                t = lambda q: "0" if abs(q) <= mpf(10) ** -60 else mp.nstr(q, 22, strip_zeros=False, min_fixed=-3, max_fixed=22)
                out.append({"id": "triple-%s-%s-%d" % (family, seed, len(out)), "body": b, "polarization": p, "size": case["size"],
                            "points": [x], "phi": [t(v[0])], "g": [[t(q) for q in v[1]]], "region": [v[2]], "tags": [tag]})
            if len(out) % 50 == 0:
                pack(path, out)
            if len(out) >= count:
                break
    pack(path, out)
    print("%s seed %s: %d triples, %.1fs, least digits on a sample (every %dth, against more digits and nodes) %.1f"
          % (family, seed, len(out), time.time() - t0, every, worst), flush=True)
