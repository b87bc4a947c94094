#!/usr/bin/env python3
"""Recomputes a seeded sample of the stored references of every file and compares to 15 digits or more: recheck.py [SEED [SHARE]].

fields      phi and g of bodies and sheets by hard/gen.py and more/gen2.py with other digits and nodes than those that made them
slopes      gradients by gradient/gradient.py with another step and more digits
closed      values of the textbook forms by the same fields (those of bodies at a point)
elliptic    Carlson's, complete and circle integrals by the trapezoidal rule on their defining integrals, in ln t

SHARE scales the number of values. Needs mpmath, is faster with gmpy2; gradients are left out without numpy, with a word. Exit status
1 if a value differs.
"""
import glob
import gzip
import json
import os
import random
import sys
import time

from mpmath import mp, mpf

HERE = os.path.dirname(os.path.abspath(__file__))
ROOT = os.path.join(HERE, "..", "..")
sys.path[:0] = [os.path.join(HERE, t) for t in ("gradient", "more", "hard")]
import gen2  # noqa: F401  (completes gen.VALUE)
import gen
from gen import dot, fr
try:
    import gradient
except ImportError:                                  # numpy
    gradient = None

GOOD = 15.0                                          # digits that have to agree
AXES = {"centre": [0.0] * 3, "axis": [0.0, 0.0, 1.0], "ref": [1.0, 0.0, 0.0]}


def digits(got, want, floor=0):
    """Digits to which two vectors agree, relative to the length of want or to floor."""
    e = mp.sqrt(sum((p - q) ** 2 for p, q in zip(got, want)))
    n = max(mp.sqrt(sum(q * q for q in want)), mpf(floor))
    return 99.0 if not e else float(-mp.log10(e / n)) if n else -99.0


def load(path):
    with (gzip.open if path.endswith(".gz") else open)(os.path.join(ROOT, path), "rt") as f:
        return json.load(f)


# ---------------------------------------------------------------- fields
def at_point(case, i):
    """Digits of phi and g at point i; phi on the scale of |g| times the distance of the sample's farthest coordinate."""
    want = [mpf(t) for t in case["g"][i]]
    with mp.workdps(110):
        phi, g, _ = gen.natural(case["body"], case["polarization"], fr(case["points"][i]))
    n = mp.sqrt(dot(want, want))
    return min(digits(g, want, mpf(10) ** -30), digits([phi], [mpf(case["phi"][i])], n * max(map(abs, case["points"][i]))))


def fields(path, count, r):
    cases = [c for c in load(path) if c.get("polarization", {}).get("kind") != "flux_tube"]
    for c in cases:
        c.setdefault("polarization", {"kind": "uniform", "p": c.get("p")})
    cases = [c for c in cases if c["body"]["type"] in gen.VALUE]
    for _ in range(count if cases else 0):
        c = r.choice(cases)
        i = r.randrange(len(c["points"]))
        if c.get("region", ["outside"] * (i + 1))[i] != "on-sheet":
            yield "%s point %d" % (c["id"], i), at_point(c, i)


def slopes(path, count, r):
    rows = [(c, k) for c in load(path)["cases"] for k in range(len(c["index"]))]
    for c, k in r.sample(rows, count) if gradient else ():
        yield "%s point %d" % (c["id"], c["index"][k]), gradient.again(c, k)


# ---------------------------------------------------------------- textbook forms
def axial(body, pol, part):
    def value(dims, strength, z):
        phi, g, _ = gen.natural({**AXES, **body(*dims)}, pol(strength), fr([0.0, 0.0, z]))
        return [phi] if part == "phi" else [g[2]]
    return value


def sheet(s):
    return {"kind": "sheet_linear", "a": s, "b": [0.0] * 3}


def along(p):
    return {"kind": "uniform", "p": [0.0, 0.0, p]}


SHAPES = {"Disc": (lambda a: {"type": "disc", "radius": a}, sheet), "Annulus": (lambda i, o: {"type": "annulus", "r1": i, "r2": o}, sheet),
          "Cylinder": (lambda a, L: {"type": "cylinder", "radius": a, "half_length": L / 2}, along),
          "Tube": (lambda i, o, L: {"type": "tube", "r1": i, "r2": o, "half_length": L / 2}, along)}
BALLS = {"Sphere": (1, lambda a: {"type": "sphere", "radius": a}), "HollowSphere": (2, lambda i, o: {"type": "spherical_shell", "r1": i, "r2": o})}


def closed_form(f, x):
    """Value of a function of field/closedform at the arguments x, None if it is not known here."""
    for name, (body, pol) in SHAPES.items():
        for part, end in (("phi", "AxisPotential"), ("g", "AxisField")):
            if f == name + end and all(isinstance(t, float) for t in x):
                return axial(body, pol, part)(x[1:-1], x[0], x[-1])
    for name, (n, body) in BALLS.items():
        if f in (name + "Field", name + "Potential"):
            phi, g, _ = gen.natural({**AXES, **body(*x[3:3 + n])}, {"kind": "uniform", "p": x[:3]}, fr(x[3 + n:]))
            return [phi] if f.endswith("Potential") else g
    if f == "EllipsoidInnerField":
        return gen.natural({**AXES, "type": "ellipsoid", "semi_axes_e1_e2_e3": x[3:]}, {"kind": "uniform", "p": x[:3]}, fr([0.0] * 3))[1]
    return None


def closed(path, count, r):
    names = [n + e for n in SHAPES for e in ("AxisPotential", "AxisField")] + [n + e for n in BALLS for e in ("Field", "Potential")]
    names.append("EllipsoidInnerField")
    rows = [c for c in load(path)["cases"] if c["f"] in names]
    for c in r.sample(rows, count):
        with mp.workdps(60):
            got = closed_form(c["f"], c["x"])
            if got is not None:
                yield "%s%s" % (c["f"], c["x"]), digits(got, [mpf(t) for t in c["y"]])


# ---------------------------------------------------------------- elliptic integrals
def half_line(f, h=mpf(1) / 8):
    """int_0^inf f(t) dt by the trapezoidal rule in ln t: the rule leaves exp(-pi^2/h) where f is analytic off the imaginary axis."""
    total, eps = f(mpf(1)), mpf(10) ** -28
    for sign in (1, -1):
        k, small = 1, 0
        while small < 40:
            t = mp.exp(sign * k * h)
            v = t * f(t)
            total += v
            small = small + 1 if abs(v) < eps * abs(total) else 0
            k += 1
    return h * total


def carlson(x, y, z, p):
    s = lambda t: 1 / mp.sqrt((t + x) * (t + y) * (t + z))
    return [half_line(s) / 2, half_line(lambda t: 1 / (mp.sqrt(t + x) * (t + p))) / 2, half_line(lambda t: s(t) / (t + z)) * 3 / 2,
            half_line(lambda t: s(t) / (t + p)) * 3 / 2]


def cel(kc, p, a, b):
    return half_line(lambda t: (a + b * t * t) / ((1 + p * t * t) * mp.sqrt((1 + t * t) * (1 + kc * kc * t * t))))


def complete(kc2):
    kc = mp.sqrt(kc2)
    k, b = cel(kc, mpf(1), mpf(1), mpf(1)), cel(kc, mpf(1), mpf(1), mpf(0))
    return [k, cel(kc, mpf(1), mpf(1), kc2), b, cel(kc, mpf(1), mpf(0), mpf(1))]


def circle(a, rho, gap, z):
    """U, T1, S3, C3, Omega, S, E round a circle, with t = tan((pi - azimuth)/2)."""
    big = a + rho

    def parts(t):
        w = 1 + t * t
        q2 = (big ** 2 + gap ** 2 * t * t) / w
        return q2, mp.sqrt(q2 + z * z), 1 - 2 / w, gap + rho * 2 / w, 4 / w

    def integral(f):
        return half_line(lambda t: (lambda q2, R, c, arm, w: w * f(q2, R, c, arm))(*parts(t)))
    out = [integral(f) for f in (lambda q2, R, c, arm: a / R, lambda q2, R, c, arm: a * c / R, lambda q2, R, c, arm: R ** -3,
                                 lambda q2, R, c, arm: c * R ** -3)]
    if not z:
        return out + [mpf(0)] * 3
    return out + [mp.sign(z) * integral(lambda q2, R, c, arm: a * arm / (R * (R + abs(z)))),
                  integral(lambda q2, R, c, arm: a * a * z * (1 - c * c) / (q2 * R)),
                  integral(lambda q2, R, c, arm: a * z * (rho - a * c) / (q2 * R))]


def elliptic(path, count, r):
    name = os.path.basename(path)[:-5]
    hexa = lambda v: mpf(float.fromhex(v))
    for row in r.sample(load(path), count):
        with mp.workdps(60 if name == "circle" else 40):
            if name == "circle":
                a, rho, gap = (hexa(row[t]) for t in ("a", "rho", "gap"))
                if row["group"] == "rim":            # there the gap is the exact one
                    rho = a - gap
                got = circle(a, rho, a - rho, hexa(row["z"]))
            elif name == "complete":
                got = complete(hexa(row["kc2"]))
            else:
                got = (carlson if name == "carlson" else cel)(*map(hexa, row["arg"]))
            want = row["value"] if isinstance(row["value"], list) else [row["value"]]
            got = got if isinstance(got, (list, tuple)) else [got]
            yield "%s %s" % (name, row), min(digits([p], [mpf(q)], mpf(10) ** -25) for p, q in zip(got, want))


# ---------------------------------------------------------------- all files
def files():
    """(how, path, count) of every file of references."""
    for name, n in (("dev", 25), ("hard", 25), ("more", 10)):
        yield fields, "verify/testdata/%s.json" % name, n
    for path in sorted(glob.glob(os.path.join(HERE, "triples", "*.json.gz"))):
        yield fields, os.path.relpath(path, ROOT), 2
    for name, n in (("round", 6), ("simple", 25), ("sector", 3)):
        yield fields, "field/element/testdata/%s.json" % name, n
    yield slopes, "verify/testdata/gradient/gradient.json", 4
    yield closed, "field/closedform/testdata/reference.json", 30
    for name, n in (("carlson", 5), ("complete", 8), ("cel", 8), ("circle", 5)):
        yield elliptic, "field/internal/elliptic/testdata/%s.json" % name, n


def main(seed=1, share=1.0):
    mp.dps = 40                                      # of comparisons
    bad, total = 0, 0
    for how, path, count in files():
        r, t0, worst, n = random.Random("%s %s" % (seed, path)), time.time(), 99.0, 0
        for name, d in how(path, max(1, round(count * share)), r):
            n, worst = n + 1, min(worst, d)
            if d < GOOD:
                bad += 1
                print("differs: %s: %.1f digits" % (name, d))
        total += n
        if n:
            print("%-52s %3d values, least digits %5.1f, %.1f s" % (path, n, min(worst, 30), time.time() - t0), flush=True)
        else:
            print("%-52s left out: %s" % (path, "needs numpy" if how is slopes else "other kinds"))
    print("%d values recomputed, %d differ" % (total, bad))
    return bad > 0


if __name__ == "__main__":
    sys.exit(main(*(f(t) for f, t in zip((int, float), sys.argv[1:]))))
