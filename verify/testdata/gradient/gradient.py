#!/usr/bin/env python3
"""Gradients of g at points of the reference cases, by differences of the multiprecision field.

gradient.py make [OUT.json] [SEED]   choose points of all cases of dev, hard and more, add those of triples.json, and write their gradients
                                      (what the file has is kept)
gradient.py verify IN.json [COUNT SEED]   recompute the file, or COUNT points of it, with another step and more digits

Method. g is evaluated by ../hard and ../more with 80 digits at the float64 point moved by +-h along each axis, h = 2^-80 of the
size: the rule leaves (h/d)^2, d the distance from the nearest edge, below 1e-22 for d > 1e-13 sizes. Nothing is assumed of the
result; it is accepted if

    asymmetry and trace - rho   are below 1e-17 of the gradient's norm (rho = -div p, from differences of p),
    twice the step              gives the same to 1e-17,
    -(second difference) of phi along a random direction gives the same component to 1e-15

and else tried again with 130 and 220 digits. The norm is never taken below 1e-6 of p_max/size times (size/R)^4. Points and dipoles:
exact derivatives in multiprecision, held against the same differences.
"""
import gzip
import json
import math
import os
import random
import sys
import time
from functools import lru_cache

HERE = os.path.dirname(os.path.abspath(__file__))
sys.path[:0] = [os.path.join(HERE, "../more"), os.path.join(HERE, "../hard")]
import gen2  # noqa: F401  (completes gen.VALUE)
import check2
import gen
import sampler
from gen import add, dot, fr, mul, sub, vec
from num import Fr, mp, mpf

FILES = ("dev.json", "hard.json", "more.json")
ORDER = ((0, 0), (1, 1), (2, 2), (0, 1), (0, 2), (1, 2))    # xx yy zz xy xz yz


def data(name):
    path = os.path.join(HERE, "..", name)
    with gzip.open(path + ".gz") if name.startswith("triples/") else open(path) as f:
        return json.load(f)


def size(case):
    b = case["body"]
    if "vertices" in b:
        v = b["vertices"]
        return max(math.dist(p, q) for p in v for q in v)
    return check2.case_size(case)


def largest(case):
    """Largest |p| (sheets: |sigma|) over points of the surface, as a scale."""
    b, p = case["body"], case["polarization"]
    with mp.workdps(40):
        if p["kind"] == "sheet_linear":
            spots = [vec(v) for v in b.get("vertices", [b.get("centre")])]
            value = lambda x: abs(mpf(p["a"]) + dot(vec(p["b"]), x))
        else:
            r = random.Random(case["id"])
            spots = [vec(v) for v in b["vertices"]] if "vertices" in b else [check2.surface_point(case, r)[0] for _ in range(40)]
            value = lambda x: mp.sqrt(dot(*2 * [check2.p_at(b, p, x)]))
        return float(max(value(x) for x in spots))


def slopes(case, x, h):
    """Matrix d g_i / d x_j at the exact point x, and the region of the point."""
    field = lambda y: gen.natural(case["body"], case["polarization"], y)
    cols, regions = [], set()
    for j in range(3):
        a, b = (field([t + s * h * (k == j) for k, t in enumerate(x)]) for s in (1, -1))
        cols.append([(p - q) / gen.M(2 * h) for p, q in zip(a[1], b[1])])
        regions |= {a[2], b[2]}
    if len(regions) != 1 or "on-sheet" in regions:
        raise ValueError("the step crosses a face")
    return [[cols[j][i] for j in range(3)] for i in range(3)], regions.pop()


def frobenius(m):
    return mp.sqrt(sum(t * t for row in m for t in row))


def charge(case, x):
    """rho = -div p at x, by differences of p."""
    e, xm = mpf(10) ** -25, vec(x)
    move = lambda j, s: check2.p_at(case["body"], case["polarization"], [t + s * e * (k == j) for k, t in enumerate(xm)])
    return -sum((move(j, 1)[j] - move(j, -1)[j]) / (2 * e) for j in range(3))


def bend(case, x, h, d):
    """-(second difference of phi) along the exact direction d."""
    phi = lambda s: gen.natural(case["body"], case["polarization"], [t + s * h * u for t, u in zip(x, d)])[0]
    return -(phi(1) - 2 * phi(0) + phi(-1)) / gen.M(h * h)


def gradient(case, x, floor, step=Fr(1, 2 ** 80), digits=(80, 130, 220)):
    """Gradient, region and least number of agreeing digits at the float64 point x."""
    x, h = fr(x), Fr(size(case)) * step
    d = [Fr(3, 7), Fr(-6, 7), Fr(2, 7)]
    for dps in digits:
        with mp.workdps(dps):
            m, region = slopes(case, x, h)
            n = max(frobenius(m), mpf(floor))
            rho = charge(case, x) if region == "inside" else mpf(0)
            misses = [abs(m[i][j] - m[j][i]) / n for i in range(3) for j in range(i)]
            misses.append(abs(m[0][0] + m[1][1] + m[2][2] - rho) / n)
            twice, _ = slopes(case, x, 2 * h)
            misses.append(frobenius([[p - q for p, q in zip(a, b)] for a, b in zip(m, twice)]) / n)
            second = abs(bend(case, x, h, d) - dot(d, [dot(row, d) for row in m])) / n
            if max(misses) < mpf(10) ** -17 and second < mpf(10) ** -15:
                return m, region, float(-mp.log10(max(misses + [mpf(10) ** -99])))
    raise ArithmeticError("misses %s, by phi %s" % (mp.nstr(max(misses), 3), mp.nstr(second, 3)))


def texts(m, n):
    with mp.workdps(40):
        return ["0" if abs(m[i][j]) < mpf(10) ** -28 * n else mp.nstr(m[i][j], 20, min_fixed=-3, max_fixed=20) for i, j in ORDER]


def weight(tag):
    """Hard places come more often."""
    for start, w in (("near-edge", 8), ("near-corner", 8), ("near-tip", 6), ("near", 5), ("axis", 3), ("wall-ext", 3), ("edge-line", 3),
                     ("hole", 3), ("on-", 0)):
        if tag.startswith(start):
            return w
    return 1


def chosen(case, r, count):
    """Indices of count points of a case."""
    keep = {}
    for i, t in enumerate(case["tags"]):
        w = weight(t) if case["region"][i] != "on-sheet" else 0
        if w:
            keep[i] = r.random() ** (1 / w)          # weighted sampling without replacement (Efraimidis, Spirakis 2006)
    return sorted(sorted(keep, key=keep.get)[-count:])


def rows(seed):
    """(file, case, indices): four points of every case, and all of triples.json, random bodies and points of ../more/sampler.py."""
    r = random.Random(seed)
    for name in FILES:
        for case in data(name):
            if case["polarization"]["kind"] != "flux_tube":
                yield name, case, chosen(case, r, 4)
    for case in data("gradient/triples.json"):
        yield "gradient/triples.json", case, [0]


def singles(seed):
    """Points and dipoles: g = q d/(4 pi r^3), (3 (m.d) d/r^5 - m/r^3)/(4 pi), and their exact derivatives."""
    r = random.Random(seed)
    for k in range(24):
        at = [r.uniform(-1, 1) * (100 if k % 3 == 0 else 1) for _ in range(3)]
        dist = 10 ** r.uniform(-9, 6)
        v = [r.gauss(0, 1) for _ in range(3)]
        x = [a + dist * t / math.hypot(*v) for a, t in zip(at, v)]
        moment = [r.uniform(-2, 2) for _ in range(3)]
        out = {"kind": "dipole" if k % 2 else "point", "at": at, "q": r.uniform(-2, 2), "m": moment, "point": x}
        with mp.workdps(80):
            q, mm = mpf(out["q"]), vec(moment)

            def g(y):
                d = vec(sub(y, fr(at)))
                s = mp.sqrt(dot(d, d))
                if out["kind"] == "point":
                    return mul(q / (4 * mp.pi * s ** 3), d)
                return mul(1 / (4 * mp.pi), sub(mul(3 * dot(mm, d) / s ** 5, d), mul(1 / s ** 3, mm)))
            d = vec(sub(fr(x), fr(at)))
            s, md = mp.sqrt(dot(d, d)), dot(mm, d)
            e = lambda i, j: int(i == j)
            if out["kind"] == "point":
                m = [[q / (4 * mp.pi) * (e(i, j) / s ** 3 - 3 * d[i] * d[j] / s ** 5) for j in range(3)] for i in range(3)]
            else:
                m = [[(3 * (mm[j] * d[i] + mm[i] * d[j] + md * e(i, j)) / s ** 5 - 15 * md * d[i] * d[j] / s ** 7) / (4 * mp.pi)
                      for j in range(3)] for i in range(3)]
            h = Fr(dist) / 2 ** 60
            up = [[(p - q) / gen.M(2 * h) for p, q in zip(g([t + h * (k == j) for k, t in enumerate(fr(x))]),
                                                           g([t - h * (k == j) for k, t in enumerate(fr(x))]))] for j in range(3)]
            miss = frobenius([[m[i][j] - up[j][i] for j in range(3)] for i in range(3)]) / frobenius(m)
            assert miss < mpf(10) ** -30, miss
            out["gradient"] = texts(m, frobenius(m))
        yield out


def write(path, out):
    with open(path + ".part", "w") as f:
        f.write('{"cases": [\n' + ",\n".join(json.dumps(c) for c in out["cases"]) + '\n],\n"singles": [\n'
                + ",\n".join(json.dumps(c) for c in out["singles"]) + "\n]}\n")
    os.replace(path + ".part", path)


def floor_at(case, p, x):
    c = case["body"].get("centre") or case["body"]["vertices"][0]
    s = size(case)
    return 1e-6 * p / s * min(1.0, s / max(math.dist(x, c), 1e-300)) ** 4


def make(path, seed):
    old = {}
    if os.path.exists(path):
        with open(path) as f:
            old = {(c["file"], c["id"]): c for c in json.load(f)["cases"]}
    out, left, t0 = {"cases": [], "singles": list(singles(seed))}, 0, time.time()
    for name, case, indices in rows(seed):
        kept = old.get((name, case["id"]))
        if kept and set(kept["index"]) <= set(indices):
            out["cases"].append(kept)
            continue
        p = largest(case)
        row = {"file": name, "id": case["id"], "size": size(case), "scale": p, "index": [], "gradient": [], "digits": []}
        for i in indices:
            try:
                m, _, d = gradient(case, case["points"][i], floor_at(case, p, case["points"][i]))
            except (ValueError, ArithmeticError, ZeroDivisionError) as e:
                left += 1
                print("   left out:", case["id"], case["tags"][i], case["points"][i], repr(e)[:100], flush=True)
                continue
            row["index"].append(i)
            row["gradient"].append(texts(m, frobenius(m)))
            row["digits"].append(round(min(d, 30)))
        if row["index"]:
            out["cases"].append(row)
        print(case["id"], len(row["index"]), row["digits"], flush=True)
        if time.time() - t0 > 60:
            write(path, out)
            t0 = time.time()
    write(path, out)
    print("%d points, %d left out" % (sum(len(c["index"]) for c in out["cases"]) + len(out["singles"]), left))


@lru_cache(None)
def named(name):
    return {c["id"]: c for c in data(name)}


def again(row, k):
    """Digits to which gradient k of a row of the file agrees with one by another step and more digits."""
    case = named(row["file"])[row["id"]]
    x = case["points"][row["index"][k]]
    floor = floor_at(case, row["scale"], x)
    m, _, _ = gradient(case, x, floor, Fr(1, 3 * 2 ** 82), (100, 150, 220))
    with mp.workdps(40):
        e = mp.sqrt(sum((m[i][j] - mpf(t)) ** 2 * (1 if i == j else 2) for (i, j), t in zip(ORDER, row["gradient"][k])))
        return float(-mp.log10(e / max(frobenius(m), mpf(floor)) + mpf(10) ** -99))


def verify(path, count=None, seed=1):
    with open(path) as f:
        rows = [(c, k) for c in json.load(f)["cases"] for k in range(len(c["index"]))]
    worst = 99.0
    for c, k in random.Random(seed).sample(rows, count) if count else rows:
        d = again(c, k)
        if d < 17:
            print("  differs", c["id"], c["index"][k], "digits %.1f" % d)
        worst = min(worst, d)
    print("%d gradients, least digits %.1f" % (count or len(rows), worst))
    return worst


if __name__ == "__main__":
    if sys.argv[1] == "make":
        make(sys.argv[2] if len(sys.argv) > 2 else os.path.join(HERE, "gradient.json"), int(sys.argv[3]) if len(sys.argv) > 3 else 1)
    else:
        sys.exit(verify(sys.argv[2], *map(int, sys.argv[3:])) < 17)
