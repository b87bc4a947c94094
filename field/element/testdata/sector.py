"""Writes sector.json: potential and field of arcs with affine polarization, p = p0 + G r, in natural units.

Every face is integrated by Gauss-Legendre products in 80-bit floats (numpy.longdouble), 20 points a panel, panels graded
by thirds towards the foot of the point and, in the azimuth, towards its images a turn away. The volume charge goes over
the faces by the divergence theorem. Points lie 1e-4 or more from the faces, where 17 digits are left.
"""
import json
import math
import random

import numpy as np
from mpmath import cos, legendre, mp, mpf, nstr, pi

mp.dps = 30
L = np.longdouble
PI = np.arctan2(L(0), L(-1))


def legendre_rule(n):
    xs, ws = [], []
    for k in range(1, n + 1):
        x = cos(pi * (k - mpf(1) / 4) / (n + mpf(1) / 2))
        for _ in range(8):
            p = legendre(n, x)
            d = n * (x * p - legendre(n - 1, x)) / (x * x - 1)
            x -= p / d
        xs.append(L(nstr(x, 25)))
        ws.append(L(nstr(2 / ((1 - x * x) * d * d), 25)))
    return np.array(xs, L), np.array(ws, L)


GX, GW = legendre_rule(20)


def breaks(a, b, x0, eps):
    c = min(max(x0, a), b)
    out = {a, b, c} | {a + (b - a) * L(k) / 4 for k in (1, 2, 3)}
    for s in (1, -1):
        h = max(L(eps), abs(x0 - c))
        while a < c + s * h < b:
            out.add(c + s * h)
            h *= 3
    return out


def rule(points):
    points = sorted(points)
    x, w = [], []
    for lo, hi in zip(points[:-1], points[1:]):
        x.append((lo + hi) / 2 + (hi - lo) / 2 * GX)
        w.append((hi - lo) / 2 * GW)
    return np.concatenate(x), np.concatenate(w)


def solve(body, p0, G, x, eps):
    r1, r2, f1, f2, h = (L(body[k]) for k in ("r1", "r2", "phi1", "phi2", "half_length"))
    if body["full"]:
        f1, f2 = -PI, PI
    x = np.array([L(v) for v in x])
    p0 = np.array([L(v) for v in p0])
    G = np.array([[L(v) for v in row] for row in G])
    rho, f = np.hypot(x[0], x[1]), np.arctan2(x[1], x[0])
    div = -(G[0, 0] + G[1, 1] + G[2, 2])
    phi, g = L(0), np.zeros(3, L)

    def face(at, n, w):
        nonlocal phi
        d = [x[i] - at[i] for i in range(3)]
        r2 = d[0] * d[0] + d[1] * d[1] + d[2] * d[2]
        r = np.sqrt(r2)
        sigma = sum(n[i] * (p0[i] + sum(G[i, j] * at[j] for j in range(3))) for i in range(3))
        away = -sum(n[i] * d[i] for i in range(3))
        phi += np.sum(w * (sigma + div * away / 2) / r)
        for i in range(3):
            g[i] += np.sum(w * (sigma * d[i] / (r2 * r) + div * n[i] / r))

    s, ws = rule(breaks(r1, r2, rho, eps))
    a, wa = rule(set().union(*(breaks(f1, f2, f + 2 * PI * k, eps) for k in (-1, 0, 1))))
    z, wz = rule(breaks(-h, h, x[2], eps))
    for n in (-1, 1):
        u, v = np.meshgrid(s, a, indexing="ij")
        face((u * np.cos(v), u * np.sin(v), n * h + 0 * u), (0 * u, 0 * u, n + 0 * u), np.outer(ws, wa) * u)
    for radius, n in ((r1, -1), (r2, 1)):
        if radius > 0:
            u, v = np.meshgrid(z, a, indexing="ij")
            c, sn = np.cos(v), np.sin(v)
            face((radius * c, radius * sn, u), (n * c, n * sn, 0 * u), np.outer(wz, wa) * radius)
    for end, n in ((f1, -1), (f2, 1)):
        if not body["full"]:
            c, sn = np.cos(end), np.sin(end)
            t, wt = rule(breaks(r1, r2, x[0] * c + x[1] * sn, eps))
            u, v = np.meshgrid(t, z, indexing="ij")
            face((u * c, u * sn, v), (-n * sn + 0 * u, n * c + 0 * u, 0 * u), np.outer(wt, wz))
    return phi / (4 * PI), g / (4 * PI)


def points(b):
    r1, r2, f1, f2, h = (b[k] for k in ("r1", "r2", "phi1", "phi2", "half_length"))
    mid, sm, dr, df = (f1 + f2) / 2, (r1 + r2) / 2, r2 - r1, f2 - f1

    def at(s, f, z):
        return [s * math.cos(f), s * math.sin(f), z]

    return [
        ("interior", at(sm, mid + 0.1 * df, 0.1 * h)), ("interior", at(r1 + 0.2 * dr, mid - 0.3 * df, -0.7 * h)),
        ("out-top", at(sm, mid, h + 0.3)), ("out-side", at(r2 + 0.2, mid + 0.2 * df, 0.2 * h)),
        ("opposite", at(sm, mid + math.pi, 0.3 * h)), ("end-out", at(sm + 0.1 * dr, f2 + 0.1, 0.1 * h)),
        ("axis", [0.0, 0.0, h + 0.25]), ("axis-in", [0.015625, 0.0078125, 0.25 * h]),
        ("near-wall", at(r2 + 1e-4, mid + 0.2 * df, 0.2 * h)), ("near-wall", at(r2 - 1e-4, mid + 0.2 * df, -0.3 * h)),
        ("near-inner", at(r1 + 1e-4 if r1 else 1e-3, mid - 0.2 * df, 0.2 * h)),
        ("near-top", at(sm, mid + 0.1 * df, h - 1e-4)), ("near-end", at(sm, f1 + 1e-4, 0.3 * h)),
        ("near-edge", at(r2 + 1e-4, mid, h + 2e-4)), ("near-radial-edge", at(sm, f2 + 1e-4, h - 2e-4)),
        ("near-vertical-edge", at(r2 - 1e-4, f2 - 1e-4, 0.4 * h)), ("near-corner", at(r2 + 1e-4, f1 - 2e-4, h + 1e-4)),
        ("plane", at(r2 + 0.4, mid, h)), ("far-2", [1.5, 0.5, 1.0]), ("far-3", [2.0, -1.5, 2.0]), ("far-10", [5.0, 8.0, -4.0]),
    ] + [("random", [round(random.uniform(-m, m), 4) for m in (1.5, 1.5, 1)]) for _ in range(6)]


def main():
    random.seed(5)
    G = [[0.25, 0.5, -0.375], [-0.125, 0.75, 0.3125], [0.625, -0.5, -0.25]]
    out = []
    for name, r1, r2, f1, f2, h, p0 in (
        ("sector-affine", 0.5, 1.0, 0.0, 1.0, 0.375, [0.3, -0.7, 1.1]),
        ("sector-affine-wide", 0.25, 1.0, -2.5, 3.0, 0.75, [0.5, 0.25, -1]),
        ("sector-affine-wedge", 0.0, 1.0, -0.5, 2.0, 0.5, [0.5, 0.25, -1]),
        ("sector-narrow", 0.5, 1.0, 0.5, 0.51, 0.375, [0.3, -0.7, 1.1]),
        ("sector-thin", 0.995, 1.0, 0.5, 2.0, 0.375, [0.3, -0.7, 1.1]),
        ("sector-flat", 0.5, 1.0, 0.5, 2.0, 0.001, [0.3, -0.7, 1.1]),
        ("sector-nearly-full", 0.5, 1.0, -3.125, 3.125, 0.375, [0.3, -0.7, 1.1]),
        ("tube-affine", 0.5, 1.0, -math.pi, math.pi, 0.375, [0.3, -0.7, 1.1]),
        ("cylinder-affine", 0.0, 1.0, -math.pi, math.pi, 0.75, [0.3, -0.7, 1.1]),
    ):
        body = {"r1": r1, "r2": r2, "phi1": f1, "phi2": f2, "half_length": h, "full": f1 == -math.pi}
        shape = {"type": "tube_sector", "r1": r1, "r2": r2, "phi1": f1, "phi2": f2, "half_length": h}
        if name == "tube-affine":
            shape = {"type": "tube", "r1": r1, "r2": r2, "half_length": h}
        if name == "cylinder-affine":
            shape = {"type": "cylinder", "radius": r2, "half_length": h}
        shape |= {"centre": [0.0] * 3, "axis": [0.0, 0.0, 1.0], "ref": [1.0, 0.0, 0.0]}
        case = {"id": name, "body": shape, "polarization": {"kind": "affine", "p0": p0, "G": G}, "points": [], "phi": [], "g": [],
                "tags": [], "method": "see sector.py; 17 digits"}
        thin = min(r2 - r1, f2 - f1, h) < 0.2
        for tag, x in points(body):
            phi, g = solve(body, p0, G, x, 3e-5 if tag.startswith("near") else 2e-4 if thin else 0.02)
            case["points"].append(x)
            case["phi"].append(np.format_float_scientific(phi, precision=18, unique=False))
            case["g"].append([np.format_float_scientific(v, precision=18, unique=False) for v in g])
            case["tags"].append(tag)
        out.append(case)
    with open("sector.json", "w") as f:
        f.write("[\n" + ",\n".join(json.dumps(c) for c in out) + "\n]\n")


main()
