#!/usr/bin/env python3
"""Reference values of free currents: a, b and the gradient of b of loops and wires, natural units.

Textbook formulas in 150 digits (complete elliptic integrals; Biot and Savart for a straight piece with the angles of its ends),
the gradient by central differences at 150 digits, all at exactly the float64 numbers that are listed; b of every point is held
against the curl of a by differences, a and b of the points marked "quad" against quadrature of the defining integral. Usage:
gen.py > reference.json
"""
import json
import random
from mpmath import mp, mpf, ellipk, ellipe, sqrt, log, pi, quad, cos, sin, nstr

mp.dps = 150
H = mpf(10) ** -25


def cross(a, b):
    return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]]


def dot(a, b):
    return sum(x * y for x, y in zip(a, b))


def loop_a(radius, x):
    rho = sqrt(x[0] ** 2 + x[1] ** 2)
    if rho == 0:
        return [mpf(0)] * 3
    q = (radius + rho) ** 2 + x[2] ** 2
    m = 4 * radius * rho / q
    a = sqrt(radius / rho) * ((2 - m) * ellipk(m) - 2 * ellipe(m)) / sqrt(m) / (2 * pi)
    return [-a * x[1] / rho, a * x[0] / rho, mpf(0)]


def loop_b(radius, x):
    rho, z = sqrt(x[0] ** 2 + x[1] ** 2), x[2]
    q, d = (radius + rho) ** 2 + z ** 2, (radius - rho) ** 2 + z ** 2
    if rho == 0:
        return [mpf(0), mpf(0), radius ** 2 / (2 * sqrt(radius ** 2 + z ** 2) ** 3)]
    m = 4 * radius * rho / q
    k, e = ellipk(m), ellipe(m)
    bz = (k + (radius ** 2 - rho ** 2 - z ** 2) / d * e) / (2 * pi * sqrt(q))
    br = z / rho * (-k + (radius ** 2 + rho ** 2 + z ** 2) / d * e) / (2 * pi * sqrt(q))
    return [br * x[0] / rho, br * x[1] / rho, bz]


def pieces(points, closed):
    n = len(points)
    return [(points[i], points[(i + 1) % n]) for i in range(n if closed else n - 1)]


def wire_a(points, closed, x):
    s = [mpf(0)] * 3
    for p, q in pieces(points, closed):
        t = [b - a for a, b in zip(p, q)]
        l = sqrt(dot(t, t))
        e = [c / l for c in t]
        s1, s2 = dot(e, [a - b for a, b in zip(p, x)]), dot(e, [a - b for a, b in zip(q, x)])
        r1, r2 = sqrt(sum((a - b) ** 2 for a, b in zip(p, x))), sqrt(sum((a - b) ** 2 for a, b in zip(q, x)))
        v = log((r1 + r2 + l) / (r1 + r2 - l)) / (4 * pi)
        s = [a + v * b for a, b in zip(s, e)]
    return s


def wire_b(points, closed, x):
    s = [mpf(0)] * 3
    for p, q in pieces(points, closed):
        t = [b - a for a, b in zip(p, q)]
        l = sqrt(dot(t, t))
        e = [c / l for c in t]
        w = [b - a for a, b in zip(p, x)]
        u = [a - dot(w, e) * b for a, b in zip(w, e)]
        s1, s2 = -dot(w, e), l - dot(w, e)
        p2 = dot(u, u)
        if p2 == 0:
            continue
        f = (s2 / sqrt(p2 + s2 ** 2) - s1 / sqrt(p2 + s1 ** 2)) / p2 / (4 * pi)
        s = [a + f * b for a, b in zip(s, cross(e, u))]
    return s


def gradient(b, x):
    size = sqrt(dot(x, x)) + 1
    h = H * size
    g = []
    for j in range(3):
        up, down = list(x), list(x)
        up[j] += h
        down[j] -= h
        g.append([(p - q) / (2 * h) for p, q in zip(b(up), b(down))])
    s = lambda i, j: (g[i][j] + g[j][i]) / 2
    return [s(0, 0), s(1, 1), s(2, 2), s(0, 1), s(0, 2), s(1, 2)]


def curl(a, x, h):
    g = []
    for j in range(3):
        up, down = list(x), list(x)
        up[j] += h
        down[j] -= h
        g.append([(p - q) / (2 * h) for p, q in zip(a(up), a(down))])
    return [g[1][2] - g[2][1], g[2][0] - g[0][2], g[0][1] - g[1][0]]


def values(a, b, x):
    va, vb = a(x), b(x)
    c = curl(a, x, H)
    norm = sqrt(dot(vb, vb))
    assert sqrt(sum((p - q) ** 2 for p, q in zip(c, vb))) < 1e-22 * norm + mpf(10) ** -40, (x, c, vb)
    text = lambda v: [nstr(c, 25) if abs(c) > 1e-45 else "0" for c in v]
    return {"x": [float(c) for c in x], "a": text(va), "b": text(vb), "grad": text(gradient(b, x))}


def by_quadrature(curve, breaks, x):
    """a and b by the defining integrals; curve(t) gives the point and the derivative."""
    def part(i, what):
        def f(t):
            r, dr = curve(t)
            d = [p - q for p, q in zip(x, r)]
            n = sqrt(dot(d, d))
            return (dr[i] / n if what == "a" else cross(dr, d)[i] / n ** 3) / (4 * pi)
        return quad(f, breaks)
    return [part(i, "a") for i in range(3)], [part(i, "b") for i in range(3)]


random.seed(8)
coarse = lambda v: round(v * 1024) / 1024
cases = []

points = [(0, 0, 0.5), (0, 0, 0), (0, 0, -8), (1e-9, 0, 0.25), (0.375, -0.5, 0.125), (0.25, 0.5, 0), (1.5, 0.75, 0), (-2, 1, 3),
          (0.75, 0, 1e-3), (0.75, 0, 1e-6), (0.75, 0, -1e-9), (0.75, 0, 1e-12), (0.75 + 2.0 ** -20, 0, 0), (0.75 - 2.0 ** -30, 0, 2.0 ** -33),
          (0.45, 0.6, 2.0 ** -40), (100, 30, -20), (1e4, -2e4, 5e3), (7.5e5, 0, 1), (0, 3e5, 4e5), (1e9, 2e9, -1e9), (0.0009765625, 0, 50)]
points += [tuple(coarse(random.uniform(-2, 2)) for _ in range(3)) for _ in range(20)]
radius = mpf(0.75)
loop = {"kind": "loop", "radius": 0.75, "values": []}
for x in points:
    x = [mpf(c) for c in x]
    loop["values"].append(values(lambda y: loop_a(radius, y), lambda y: loop_b(radius, y), x))
for x in points[4:8]:
    x = [mpf(c) for c in x]
    qa, qb = by_quadrature(lambda t: ([radius * cos(t), radius * sin(t), mpf(0)], [-radius * sin(t), radius * cos(t), mpf(0)]),
                           [k * pi / 8 for k in range(17)], x)
    for got, want in zip(qa + qb, loop_a(radius, x) + loop_b(radius, x)):
        assert abs(got - want) < 1e-25
cases.append(loop)

shapes = [("segment", [(0.5, -0.25, 1), (-1, 0.75, 2)], False),
          ("square", [(1, 1, 0), (-1, 1, 0), (-1, -1, 0), (1, -1, 0)], True),
          ("skew", [(1, 0, 0), (0.25, 1, 0.5), (-1, 0.25, -0.375), (-0.5, -1, 0.25), (0.5, -0.5, 1)], True)]
for name, corners, closed in shapes:
    c = [[mpf(v) for v in p] for p in corners]
    near = []
    for k, (p, q) in enumerate(pieces(corners, closed)):
        m = [(a + b) / 2 for a, b in zip(p, q)]
        for d in (1e-3, 1e-7, 1e-12):
            near.append((m[0] + d, m[1], m[2] - d))
        beyond = [b + (b - a) for a, b in zip(p, q)]
        near.append(tuple(beyond))
        near.append((beyond[0], beyond[1], beyond[2] + 1e-6))
        near.append((q[0] + 1e-9, q[1] - 1e-9, q[2] + 2e-9))
    far = [(20, 15, -5), (3, -4, 6), (100, -30, 60), (1e4, 2e4, 1e4), (5e5, -8e5, 1e5)]
    rand = [tuple(coarse(random.uniform(-2, 2)) for _ in range(3)) for _ in range(12)]
    w = {"kind": "wire", "name": name, "points": corners, "closed": closed, "values": []}
    for x in near + far + rand:
        x = [mpf(v) for v in x]
        w["values"].append(values(lambda y: wire_a(c, closed, y), lambda y: wire_b(c, closed, y), x))
    for x in rand[:2]:
        x = [mpf(v) for v in x]
        total = [mpf(0)] * 6
        for p, q in pieces(c, closed):
            t = [b - a for a, b in zip(p, q)]
            qa, qb = by_quadrature(lambda s: ([a + s * b for a, b in zip(p, t)], t), [mpf(k) / 8 for k in range(9)], x)
            total = [a + b for a, b in zip(total, qa + qb)]
        for got, want in zip(total, wire_a(c, closed, x) + wire_b(c, closed, x)):
            assert abs(got - want) < 1e-25
    cases.append(w)

print(json.dumps({"generator": "gen.py", "method": "textbook forms in 150 digits, held against quadrature of Biot and Savart",
                  "digits": 25, "cases": cases}, indent=0))
