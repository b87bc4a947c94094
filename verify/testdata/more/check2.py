"""Second formulations for the cases of gen2.py: check2.py OUT.json [PREFIX...]; digits of agreement of every case, kept in checks.json.

direct  3-D quadrature of the dipole density p.(x-r)/R^3 (sheets: of the charge), 80-bit floats; no equivalent charges, no closed form
panels  the same integrals with other panels (scale of the sinh map times 0.37)
slope   g against central differences of phi
gauss   div g against -div p (differences of g and of p)
jump    across the surface at random places, 1e-25 sizes on either side: g jumps by (p.n) n, phi does not
        (slope, gauss, jump and the decay of direct fix the field uniquely)
closure sectors: sector + rest = full tube, by complete elliptic integrals
rings   cones: rings (cel) integrated along the generator plus elliptic discs
"""
import json
import os
import random
import sys

import numpy as np

from num import *
import gen2
import cases2
import sweep
import values
import values2
from gen import add, mul, sub, dot, fr, vec
import second
from second import ld, rule as ldrule

LD = np.longdouble


def p_at(body, pol, r):
    """p at the global point r (mpf), global components."""
    k = pol["kind"]
    if k in ("uniform", "affine"):
        p0, G = gen.affine(pol)
        return [gen.M(p0[i]) + sum(gen.M(G[i][j]) * r[j] for j in range(3)) for i in range(3)]
    if k == "polynomial":
        out = [mpf(0)] * 3
        for c, co, (i, j, l) in pol["terms"]:
            out[c] += mpf(co) * r[0] ** i * r[1] ** j * r[2] ** l
        return out
    f = gen.Frame(body)
    d = sub(r, vec(f.c))
    e = [f.e(i) for i in range(3)]
    X = [dot(d, t) for t in e]
    c = mpf(pol["c"])
    n = pol.get("n", {"axial_z": 1, "axial_z2": 2, "radial_s": 1, "radial_s2": 2, "radial_unit": 0, "ball_r": 1, "ball_r2": 2}.get(k))
    if k.startswith("axial"):
        return mul(c * X[2] ** int(n), e[2])
    if k.startswith("radial"):
        X[2] = mpf(0)
    q = mp.sqrt(dot(X, X))
    return f.turn(mul(c * q ** (mpf(n) - 1), X))


def exact(v):
    return [Fr(int(t._mpf_[1]) * (-1) ** t._mpf_[0]) * (Fr(2) ** t._mpf_[2]) for t in v]


def digits(a, b, floor=mpf(0)):
    e = mp.sqrt(sum((p - q) ** 2 for p, q in zip(a, b)))
    n = max(mp.sqrt(sum(q * q for q in b)), floor)
    return 99.0 if not e else float(-mp.log10(e / n)) if n else -99.0


def laws(case, x, h):
    """Digits of slope and of Gauss's law at the exact point x with the step h."""
    b, p = case["body"], case["polarization"]
    h = Fr(h)
    phi, g, region = gen.natural(b, p, x)
    lap, sl = mpf(0), []
    for i in range(3):
        u, v = (gen.natural(b, p, [t + s * h * (j == i) for j, t in enumerate(x)]) for s in (1, -1))
        sl.append(-(u[0] - v[0]) / gen.M(2 * h))
        lap += (u[1][i] - v[1][i]) / gen.M(2 * h)
    grad = max(abs(u[1][i] - v[1][i]) / gen.M(2 * h) for i in range(3))
    rho = mpf(0)
    if region == "inside":
        e = mpf(10) ** -35
        xm = vec(x)
        for i in range(3):
            rho -= (p_at(b, p, [t + e * (j == i) for j, t in enumerate(xm)])[i] - p_at(b, p, [t - e * (j == i) for j, t in enumerate(xm)])[i]) / (2 * e)
    size = mpf(case_size(case))
    scale = max(abs(rho), mp.sqrt(dot(g, g)) / size, grad)
    err = abs(lap - rho)
    return digits(sl, g), 99.0 if not err else float(-mp.log10(err / scale)) if scale else -99


def case_size(case):
    b = case["body"]
    d = [b.get(k, 0.0) for k in ("radius", "r2", "half_length", "radius_bottom_at_z=-half_length", "radius_top_at_z=+half_length")]
    if "major_radius" in b:
        d.append(b["major_radius"] + b["minor_radius"])
    d += b.get("semi_axes_e1_e2_e3", []) + b.get("half_lengths_e1_e2_e3", [])
    return 2 * max(d)


def surface_point(case, r):
    """A point on the surface and the outward normal, global mpf."""
    b = case["body"]
    f = gen.Frame(b)
    c = vec(f.c)
    t = b["type"]
    rnd = lambda lo, hi: mpf(r.uniform(lo, hi))
    if t in ("sphere", "spherical_shell", "ellipsoid"):
        v = cases2.Points.direction(type("D", (), {"rnd": r})())
        v = mul(1 / mp.sqrt(dot(v, v)), v)
        ax = b.get("semi_axes_e1_e2_e3") or [b.get("radius") or r.choice((b["r1"], b["r2"]))] * 3
        x = [mpf(a) * q for a, q in zip(ax, v)]
        n = [q / mpf(a) for a, q in zip(ax, v)]
        n = mul(1 / mp.sqrt(dot(n, n)), n)
        if b.get("r1") == ax[0]:
            n = mul(-1, n)
        return add(c, f.turn(x)), f.turn(n)
    if t == "box":
        h = b["half_lengths_e1_e2_e3"]
        i, s = r.randrange(3), r.choice((1, -1))
        x = [mpf(q) * rnd(-0.9, 0.9) for q in h]
        x[i] = mpf(s * h[i])
        return add(c, f.turn(x)), mul(s, f.e(i))
    az = rnd(0, 6.28)
    if t == "torus":
        th = rnd(0, 6.28)
        R, m = mpf(b["major_radius"]), mpf(b["minor_radius"])
        s, z, ns, nz = R + m * mp.cos(th), m * mp.sin(th), mp.cos(th), mp.sin(th)
    else:
        if t == "tube_sector":
            az = mpf(b["phi1"]) + (mpf(b["phi2"]) - mpf(b["phi1"])) * rnd(0.05, 0.95)
            if r.random() < 0.4:
                s, z, k = b["r1"] + (b["r2"] - b["r1"]) * rnd(0.05, 0.95), b["half_length"] * rnd(-0.9, 0.9), r.choice((1, -1))
                az = mpf(b["phi2"] if k > 0 else b["phi1"])
                return add(c, f.turn([s * mp.cos(az), s * mp.sin(az), z])), mul(k, f.turn([-mp.sin(az), mp.cos(az), mpf(0)]))
        L = values.Local(b, add(f.c, [Fr(1), Fr(0), Fr(0)]))
        segs, _ = values.make(b, L)
        g = r.choice(segs)
        q = rnd(0.05, 0.95)
        A, B = [back(g.sA), back(g.zA)], [back(g.sB), back(g.zB)]
        s, z = A[0] + (B[0] - A[0]) * q, A[1] + (B[1] - A[1]) * q
        ns, nz = back(g.ns), back(g.nz)
    return add(c, f.turn([s * mp.cos(az), s * mp.sin(az), z])), f.turn([ns * mp.cos(az), ns * mp.sin(az), nz])


def jump(case, r):
    b, p = case["body"], case["polarization"]
    x, n = surface_point(case, r)
    e = mpf(case_size(case)) * mpf(10) ** -25
    po, go, _ = gen.natural(b, p, exact(add(x, mul(e, n))))
    pi_, gi, _ = gen.natural(b, p, exact(sub(x, mul(e, n))))
    if p["kind"] == "sheet_linear":
        sigma = mpf(p["a"]) + dot(vec(p["b"]), x)
    else:
        sigma = dot(p_at(b, p, x), n)
    want = mul(sigma, n)
    big = max(abs(sigma), mp.sqrt(dot(go, go)))
    d = digits(sub(go, gi), want, big)
    dp = abs(po - pi_) / (abs(po) + big * mpf(case_size(case)))
    return min(d, float(-mp.log10(dp)) if dp else 99)


def nodes(b):
    t = b["type"]
    if t == "tube_sector":
        u, w = ldrule(26)
        v, wv = ldrule(40)
        r = LD(b["r1"]) + (LD(b["r2"]) - LD(b["r1"])) * u
        z = LD(b["half_length"]) * (2 * u - 1)
        m = max(1, int((b["phi2"] - b["phi1"]) / 2) + 1)
        wid = (LD(b["phi2"]) - LD(b["phi1"])) / m
        phi = np.concatenate([LD(b["phi1"]) + wid * (k + v) for k in range(m)])
        wp = np.concatenate([wv * wid] * m)
        R, Z, P = np.meshgrid(r, z, phi, indexing="ij")
        W = (w * (LD(b["r2"]) - LD(b["r1"])) * r)[:, None, None] * (w * 2 * LD(b["half_length"]))[None, :, None] * wp[None, None, :]
        x = np.stack([R * np.cos(P), R * np.sin(P), Z], -1)
    elif t in ("truncated_cone", "torus"):
        u, w = ldrule(30)
        m = 80
        pi_ = ld(mp.pi)
        phi = (np.arange(m).astype(LD) + LD(0.5)) * 2 * pi_ / m
        if t == "torus":
            th = (np.arange(m).astype(LD) + LD(0.5)) * 2 * pi_ / m
            q, T, P = np.meshgrid(LD(b["minor_radius"]) * u, th, phi, indexing="ij")
            S, Z = LD(b["major_radius"]) + q * np.cos(T), q * np.sin(T)
            W = (w * LD(b["minor_radius"]))[:, None, None] * q * (2 * pi_ / m) ** 2 * S
        else:
            h, rb, rt = LD(b["half_length"]), LD(b["radius_bottom_at_z=-half_length"]), LD(b["radius_top_at_z=+half_length"])
            q, Z, P = np.meshgrid(u, h * (2 * u - 1), phi, indexing="ij")
            rad = rb + (rt - rb) * (Z + h) / (2 * h)
            S = q * rad
            W = w[:, None, None] * (w * 2 * h)[None, :, None] * rad * S * (2 * pi_ / m)
        x = np.stack([S * np.cos(P), S * np.sin(P), Z], -1)
    else:
        r, w, o = second.nodes(b)
        f = gen.Frame(b)
        e = np.array([[ld(q) for q in f.e(i)] for i in range(3)])
        return r @ e.T, w, o, e
    f = gen.Frame(b)
    e = np.array([[ld(q) for q in f.e(i)] for i in range(3)])
    return x.reshape(-1, 3), W.reshape(-1), vec(f.c), e


def density(case, X, o, e):
    """p at the local positions X, local components, 80-bit."""
    b, pol = case["body"], case["polarization"]
    k = pol["kind"]
    if k in ("uniform", "affine"):
        p0, G = gen.affine(pol)
        q = [gen.M(p0[i]) + sum(gen.M(G[i][j]) * o[j] for j in range(3)) for i in range(3)]
        q = e @ np.array([ld(t) for t in q])
        return q + X @ (e @ np.array([[ld(gen.M(t)) for t in r] for r in G]) @ e.T).T
    if k == "polynomial":
        r = np.array([ld(t) for t in o]) + X @ e
        out = np.zeros_like(r)
        for c, co, (i, j, l) in pol["terms"]:
            out[:, c] += LD(co) * r[:, 0] ** i * r[:, 1] ** j * r[:, 2] ** l
        return out @ e.T
    c = LD(pol["c"])
    n = pol.get("n", {"axial_z": 1, "axial_z2": 2, "radial_s": 1, "radial_s2": 2, "radial_unit": 0, "ball_r": 1, "ball_r2": 2}.get(k))
    Y = X.copy()
    if k.startswith("axial"):
        Y[:, :2] = 0
        Y[:, 2] = c * X[:, 2] ** int(n)
        return Y
    if k.startswith("radial"):
        Y[:, 2] = 0
    q = np.sqrt((Y * Y).sum(1))
    return Y * (c * q ** (LD(n) - 1))[:, None]


def direct(case, pts):
    X, w, o, e = nodes(case["body"])
    c4 = 1 / (4 * ld(mp.pi))
    pol = case["polarization"]
    sheet = pol["kind"] == "sheet_linear"
    if sheet:
        bb = vec(fr(pol["b"]))
        s = ld(gen.M(Fr(pol["a"])) + dot(bb, o)) + X @ (e @ np.array([ld(t) for t in bb]))
    else:
        p = density(case, X, o, e)
    out = []
    f = gen.Frame(case["body"])
    for x in pts:
        d = np.array([ld(gen.M(t)) for t in f.local(fr(x))]) - X
        R = np.sqrt((d * d).sum(1))
        if sheet:
            phi, g = (w * s / R).sum(), ((w * s / R ** 3)[:, None] * d).sum(0)
        else:
            pd = (p * d).sum(1)
            phi, g = (w * pd / R ** 3).sum(), (w[:, None] * (3 * pd[:, None] * d / R[:, None] ** 5 - p / R[:, None] ** 3)).sum(0)
        tomp = lambda v: mpf(float(v)) + mpf(float(v - LD(float(v))))
        out.append((tomp(c4 * phi), f.turn([tomp(t) for t in c4 * g])))
    return out


def closure(case, x):
    """Sector + rest against the full tube: by elliptic integrals (uniform, radial_unit), by value_swept (affine)."""
    b, p = case["body"], case["polarization"]
    k = p["kind"]
    va = values.value_swept(b, p, x)
    with_tau = rest_of(b, p, x)
    tube = {"type": "tube", "r1": b["r1"], "r2": b["r2"], "half_length": b["half_length"], "centre": b["centre"], "axis": b["axis"], "ref": b["ref"]}
    if k == "uniform":
        t = gen.value_cylinder(tube, p, x)
    elif k == "radial_unit":
        t = values2.value_radial_power(tube, p, x)
    else:
        t = values.value_swept(tube, p, x)
    s = [va[0] + with_tau[0]] + add(va[1], with_tau[1])
    big = [mp.sqrt(va[0] ** 2 + dot(va[1], va[1])), mpf(0), mpf(0), mpf(0)]
    return digits(s, [t[0]] + t[1], big[0])


def rest_of(b, p, x):
    """The sector from phi2 to phi1 + 2 pi; the upper azimuth is handed on as a marked rational."""
    real, mark = values.N, Fr(10) ** 40
    values.N = lambda v: real(v - mark) + 2 * pi() if isinstance(v, Fr) and v > mark / 10 else real(v)
    try:
        return values.value_swept({**b, "phi1": b["phi2"], "phi2": Fr(b["phi1"]) + mark}, p, x)
    finally:
        values.N = real


def rings(case, x):
    """Cone with uniform p: rings along the generator (sinh map about the foot), discs by gen.Circle."""
    b = case["body"]
    L = values.Local(b, x)
    (ps, pt, pz), _ = L.affine(case["polarization"])
    s, z = L.s, L.z
    segs, gaps = values.make(b, L)
    tot = [mpfr(0)] * 4
    one, P = mpfr(1), pi()
    for i, g in enumerate(segs):
        if g.flat:
            a = back(g.sB)
            C = gen.Circle(Fr(b["radius_top_at_z=+half_length"] if g.nz > 0 else b["radius_bottom_at_z=-half_length"]), exact([back(s)])[0] ** 2 if s else Fr(0))
            I, gr, gz = C.disc(back(gaps[i]))
            k = N(gen.M(1)) * pz * g.nz
            tot = [tot[0] + k * N(I), tot[1] + k * N(gr), tot[2], tot[3] + k * N(gz)]
            continue
        D0 = g.ns * (s - g.sA) + g.nz * (z - g.zA)
        l0 = g.ts * (s - g.sA) + g.tz * (z - g.zA)
        d = max(abs(D0), mpfr("1e-60"))
        cuts = [mpfr(0), l0, g.len] if 0 < l0 < g.len else [mpfr(0), g.len]
        for lo, hi in zip(cuts, cuts[1:]):
            ua, ub = asinh((lo - l0) / d), asinh((hi - l0) / d)
            m = int(ub - ua) + 1
            # the axis s = 0 and its mirror: panels short enough in l as well
            for k in range(m):
                sub_ = [(ua + (ub - ua) * k / m, ua + (ub - ua) * (k + 1) / m)]
                for a_, b_ in sub_:
                    parts = 4
                    for j in range(parts):
                        for u, w in on(a_ + (b_ - a_) * j / parts, a_ + (b_ - a_) * (j + 1) / parts):
                            l = l0 + d * gmpy2.sinh(u)
                            w = w * d * gmpy2.cosh(u)
                            a, zr = g.sA + l * g.ts, g.zA + l * g.tz
                            near2 = D0 * D0 + (l - l0) ** 2
                            Q = (a + s) ** 2 + (z - zr) ** 2
                            sQ = sqrt(Q)
                            p = near2 / Q
                            kc = sqrt(p)
                            C0, C1 = cel(kc, one, one, one) * 4 / sQ, cel(kc, one, -one, one) * 4 / sQ
                            k3 = 4 / (Q * sQ)
                            E0, E1 = cel(kc, p, one, one) * k3, cel(kc, p, -one, one) * k3
                            E = C1 / (a * s) if s else P / (Q * sQ)
                            A0, A1 = pz * g.nz * a * w, ps * g.ns * a * w
                            tot[0] += A0 * C0 + A1 * C1
                            tot[1] += A0 * (s * E0 - a * E1) + A1 * (s * E1 - a * (E0 - E))
                            tot[2] -= pt * g.ns * a * w * a * E
                            tot[3] += (z - zr) * (A0 * E0 + A1 * E1)
    v = [back(tot[0])] + L.global_(tot[1:])
    return mul4(1 / (4 * mp.pi), v)


def mul4(k, v):
    return [k * t for t in v]


def main(path, prefixes):
    out = os.path.join(os.path.dirname(os.path.abspath(path)), "checks.json")
    done = json.load(open(out)) if os.path.exists(out) else {}
    for case in json.load(open(path)):
        name = case["id"]
        if prefixes and not name.startswith(tuple("more-" + p for p in prefixes)) or name in done and not prefixes:
            continue
        r = random.Random(name)
        n = len(case["points"])
        if not n:
            continue
        t, b, k = case["tags"], case["body"], case["polarization"]["kind"]
        res = {}

        def note(key, v):
            res[key] = [min(res[key][0], v), res[key][1] + 1] if key in res else [v, 1]
        value = lambda i: [mpf(case["phi"][i])] + [mpf(q) for q in case["g"][i]]
        off = [i for i in range(n) if case["region"][i] != "on-sheet"]
        size = case_size(case)
        with mp.workdps(70):
            tune()
            pts = [i for i in off if t[i].startswith("outside-") and float(t[i][8:]) >= 1.3][:4]
            if pts:
                try:
                    for i, (phi, g) in zip(pts, direct(case, [case["points"][i] for i in pts])):
                        v = value(i)
                        if any(v[1:]):
                            note("direct", digits([phi / size] + g, [v[0] / size] + v[1:]))
                except Exception as e:
                    print("   direct:", name, repr(e)[:200])
            near = [i for i in off if t[i].startswith("near")]
            inn = [i for i in off if t[i] == "interior"]
            for group, m in ((near, 1), (inn, 1)):
                for i in r.sample(group, min(m, len(group))):
                    q = [q for q in t[i].split("-") if q.endswith(("03", "06", "09", "12")) and len(q) == 2]
                    d = 10.0 ** -int(q[0]) * size if q else 1e-3 * size
                    x = fr(case["points"][i])
                    if not any(value(i)[1:]):
                        continue
                    s_, g_ = laws(case, x, d * 1e-11)
                    note("slope", s_)
                    if k != "sheet_linear":
                        note("gauss", g_)
            for _ in range(2):
                note("jump", jump(case, r))
            if b["type"] in ("tube_sector", "truncated_cone", "torus", "cylinder", "tube", "disc", "annulus"):
                for i in r.sample(near, 6) + r.sample([i for i in off if i not in near], 4):
                    SCALE[0] = mpfr("0.37")
                    phi, g, _ = gen.natural(b, case["polarization"], fr(case["points"][i]))
                    SCALE[0] = 1
                    v = value(i)
                    big = mp.sqrt(dot(v[1:], v[1:]))
                    note("panels", min(digits(g, v[1:]), digits([phi], v[:1], big * size * mpf(10) ** -3)))
            if b["type"] == "tube_sector":
                for i in r.sample(near, 2) + r.sample(inn, 1):
                    note("closure", closure(case, fr(case["points"][i])))
            if b["type"] == "truncated_cone":
                for i in r.sample(near, 2) + r.sample(off, 1):
                    v = value(i)
                    note("rings", digits(rings(case, fr(case["points"][i])), v))
        done[name] = res
        with open(out + ".part", "w") as f:
            json.dump(done, f, indent=1)
        os.replace(out + ".part", out)
        print("%-42s %s" % (name, "  ".join("%s %.1f (%d)" % (q, v, m) for q, (v, m) in res.items())), flush=True)


if __name__ == "__main__":
    main(sys.argv[1], sys.argv[2:])
