"""4 pi (phi, g) and region of the second-stage families: VALUE[type](body, polarization, x), for gen.natural."""
from num import *
from sweep import FULL, Segment, integrate, rectangle, spans_of
from gen import fr, dot, sub, add

TINY = 1e-42


class Local:
    """Target and polarization in the frame of the body turned so that the target has azimuth 0."""

    def __init__(self, body, x):
        tune()
        self.f = f = gen.Frame(body)
        xl = f.local(x)
        self.xl = [N(t) for t in xl]
        s2 = xl[0] ** 2 + xl[1] ** 2
        r = gen.root(s2) if isinstance(s2, Fr) else mp.sqrt(s2)
        self.s, self.z, self.zq = N(r), N(xl[2]), xl[2]
        if self.s < TINY:
            self.s, self.phi0, self.c0, self.s0 = mpfr(0), mpfr(0), mpfr(1), mpfr(0)
        else:
            self.phi0 = atan2(self.xl[1], self.xl[0])
            self.c0, self.s0 = self.xl[0] / self.s, self.xl[1] / self.s

    def turned(self, v):
        """Turned components of a global exact vector."""
        a, b, c = [N(t) for t in self.f.along(v)]
        return [a * self.c0 + b * self.s0, b * self.c0 - a * self.s0, c]

    def global_(self, g):
        """Global mpf components of a vector in turned components."""
        a, b, c = g
        return self.f.turn([back(a * self.c0 - b * self.s0), back(a * self.s0 + b * self.c0), back(c)])

    def affine(self, pol):
        """q, G turned, of p = q + G (r - centre)."""
        p0, G = polarization_affine(pol, self.f)
        return frame_affine(p0, G, self.f, self.turned)


def frame_affine(p0, G, f, turn):
    q = turn(add(p0, [dot(row, f.c) for row in G]))
    if not any(any(r) for r in G):
        return q, None
    cols = [turn([G[i][j] for i in range(3)]) for j in range(3)]           # turned first index
    rows = [turn([Fr(0) + (1 if k == j else 0) for k in range(3)]) for j in range(3)]  # e_j turned
    out = [[sum(cols[k][i] * rows[k][j] for k in range(3)) for j in range(3)] for i in range(3)]
    return q, out


def polarization_affine(pol, f):
    """(p0, G) exact global, for the kinds that are affine in global coordinates by given numbers."""
    if pol["kind"] in ("uniform", "affine"):
        return gen.affine(pol)
    raise KeyError(pol["kind"])


def local_affine(pol, L):
    """q, G (or None) turned, of every affine kind."""
    k = pol["kind"]
    if k in ("uniform", "affine"):
        return L.affine(pol)
    c, o = N(Fr(pol["c"])), mpfr(0)
    if k == "axial_z" or (k == "axial_power" and pol["n"] == 1):
        return [o, o, o], [[o, o, o], [o, o, o], [o, o, c]]
    if k == "radial_s" or (k == "radial_power" and pol["n"] == 1):
        return [o, o, o], [[c, o, o], [o, c, o], [o, o, o]]
    if k in ("ball_r",) or (k == "central_power" and pol["n"] == 1):
        return [o, o, o], [[c, o, o], [o, c, o], [o, o, c]]
    return None


def walls(body):
    """Meridian segments of a body of revolution or sector, and the exact axial offsets of the flat ones."""
    t = body["type"]
    h = Fr(body.get("half_length", 0.0))
    if t == "truncated_cone":
        rb, rt = Fr(body["radius_bottom_at_z=-half_length"]), Fr(body["radius_top_at_z=+half_length"])
        out = [((rb, -h), (rt, h), 1, "wall")]
        if rt:
            out.append(((Fr(0), h), (rt, h), -1, "cap"))
        if rb:
            out.append(((Fr(0), -h), (rb, -h), 1, "cap"))
        return out
    r2 = Fr(body.get("radius", body.get("r2", 0.0)))
    r1 = Fr(body.get("r1", 0.0))
    if t in ("disc", "annulus"):
        return [((r1, Fr(0)), (r2, Fr(0)), -1, "cap")]
    out = [((r2, -h), (r2, h), 1, "wall"), ((r1, h), (r2, h), -1, "cap"), ((r1, -h), (r2, -h), 1, "cap")]
    if r1:
        out.append(((r1, -h), (r1, h), -1, "wall"))
    return out


def make(body, L):
    segs, gaps = [], {}
    for (a, b, c, d) in [(p[0], q[0], o, (p, q, t)) for p, q, o, t in walls(body)]:
        (p, q, t) = d
        g = Segment(N(p[0]), N(p[1]), N(q[0]), N(q[1]), c, t)
        if g.flat:
            gaps[len(segs)] = N(L.zq - p[1]) if isinstance(L.zq, Fr) else L.z - N(p[1])
        segs.append(g)
    return segs, gaps


def region_of(body, L, segs, gaps, phis=None):
    """Region by the meridian polygon (and the azimuth)."""
    s, z = L.s, L.z
    t = body["type"]
    inside_phi, on_phi = True, False
    if phis:
        lo, hi = phis
        P2 = 2 * pi()
        d = L.phi0 - lo
        d -= P2 * gmpy2.floor(d / P2)
        w = hi - lo
        near = min(abs(d), abs(d - w), abs(d - P2)) * s
        inside_phi = d < w
        on_phi = near < TINY
    if t in ("disc", "annulus"):
        g = segs[0]
        return "on-sheet" if abs(gaps[0]) < TINY and g.sA <= s <= g.sB else "outside"
    inn = 0
    closed = 0
    for i, g in enumerate(segs):
        if g.flat:
            D = g.nz * gaps[i]
        else:
            D = g.ns * (s - g.sA) + g.nz * (z - g.zA)
        inn += D < -TINY
        closed += D <= TINY
    if t in ("tube", "tube_sector") or True:
        n = len(segs)
        if inn == n and inside_phi and not on_phi:
            return "inside"
        if closed == n and (inside_phi or on_phi):
            return "on-sheet"
        return "outside"


def value_swept(body, pol, x):
    """Sector, cone, cylinder, tube with affine p, axial_zn, radial_unit (sector); disc and annulus with linear charge."""
    L = Local(body, x)
    segs, gaps = make(body, L)
    sector = body["type"] == "tube_sector"
    phis = (N(Fr(body["phi1"])), N(Fr(body["phi2"]))) if sector else None
    spans = spans_of(phis[0], phis[1], L.phi0) if sector else FULL
    region = region_of(body, L, segs, gaps, phis)
    kind, o = pol["kind"], mpfr(0)
    s, z = L.s, L.z
    volume = rect = None
    if kind == "sheet_linear":
        b = fr(pol["b"])
        a, bt = N(Fr(pol["a"]) + dot(b, L.f.c)), L.turned(b)
        surface = lambda g, c, sn: (a, bt[0] * c + bt[1] * sn, o)
        phi, gr = integrate(segs, s, z, spans, surface, None, None, None, gaps)
        return back(phi), L.global_(gr), region
    qG = local_affine(pol, L)
    if qG:
        q, G = qG

        def surface(g, c, sn):
            n = (g.ns * c, g.ns * sn, g.nz)
            al = n[0] * q[0] + n[1] * q[1] + n[2] * q[2]
            if G is None:
                return al, o, o
            nG = [n[0] * G[0][j] + n[1] * G[1][j] + n[2] * G[2][j] for j in range(3)]
            return al, nG[0] * c + nG[1] * sn, nG[2]
        if G:
            rho = -(G[0][0] + G[1][1] + G[2][2])
            if rho:
                volume = lambda g, D, sp, zp, c, sn: ([-D * rho / 2], [[rho * g.ns] if g.ns else None, None, [rho * g.nz] if g.nz else None])
    elif kind == "radial_unit" or (kind == "radial_power" and pol["n"] == 0):
        c0 = N(Fr(pol["c"]))
        surface = lambda g, c, sn: (c0 * g.ns, o, o)
        r1, h = N(Fr(body.get("r1", 0.0))), N(Fr(body["half_length"]))
        rect = (-c0, (r1, N(Fr(body.get("r2", body.get("radius")))), -h, h))
    elif kind in ("axial_z2", "axial_power"):
        c0, n = N(Fr(pol["c"])), int(pol.get("n", 2))
        surface = lambda g, c, sn: (c0 * g.zA ** n * g.nz if g.flat else o, o, o)
        # rho = -c n z'^(n-1); with z' = z + u: rho~ = -c n sum binom z^(n-1-k) u^k/(k+2)
        def tilde(k, m):
            return [k * gmpy2.bincoef(m, j) * z ** (m - j) / (j + 2) for j in range(m + 1)]

        def compose(co, up):
            out, pw = [mpfr(0)], [mpfr(1)]
            for a in co:
                out = [(out[i] if i < len(out) else 0) + (a * pw[i] if i < len(pw) else 0) for i in range(max(len(out), len(pw)))]
                pw = [(pw[i] * up[0] if i < len(pw) else 0) + (pw[i - 1] * up[1] if i and len(up) > 1 else 0) for i in range(len(pw) + (len(up) > 1))]
            return out
        t0 = tilde(-c0 * n, n - 1)
        t1 = tilde(-c0 * n * (n - 1), n - 2) if n > 1 else [o]
        whole = [-c0 * n * gmpy2.bincoef(n - 1, j) * z ** (n - 1 - j) for j in range(n)]

        def volume(g, D, sp, zp, c, sn):
            up = [zp[0] - z] + zp[1:]
            r = compose(whole, up)
            vz = [-D * -t for t in compose(t1, up)]             # - V[grad rho], u.n = -D
            if g.nz:
                vz = [(vz[i] if i < len(vz) else 0) + (g.nz * r[i] if i < len(r) else 0) for i in range(max(len(vz), len(r)))]
            return [-D * t for t in compose(t0, up)], [[g.ns * t for t in r] if g.ns else None, None, vz]
    else:
        raise KeyError(kind)
    phi, gr = integrate(segs, s, z, spans, surface, volume, rect, None, gaps)
    if sector and qG:                                # the plane ends
        rho = -(G[0][0] + G[1][1] + G[2][2]) if G else None
        r1, r2, h = N(Fr(body["r1"])), N(Fr(body["r2"])), N(Fr(body["half_length"]))
        for ph, sg in ((phis[0], -1), (phis[1], 1)):
            Dl = ph - L.phi0
            half = sin(Dl / 2)
            v, sn = 2 * half * half, sin(Dl)
            if abs(sn) < TINY:
                sn = mpfr(0)
            c = 1 - v
            n = (-sn * sg, c * sg, o)
            al = n[0] * q[0] + n[1] * q[1]
            be = ga = o
            if G:
                nG = [n[0] * G[0][j] + n[1] * G[1][j] for j in range(3)]
                be, ga = nG[0] * c + nG[1] * sn, nG[2]
                al = al + be * s * c + ga * z
            P, g = rectangle(s, z, v, sn, r1, r2, -h, h, al, be, ga)
            if rho:
                I0, _ = rectangle(s, z, v, sn, r1, r2, -h, h, mpfr(1), o, o)
                P += rho / 2 * sg * s * sn * I0
                g[1] += rho * sg * I0
            phi += P
            gr = [gr[0] + g[0] * c - g[1] * sn, gr[1] + g[0] * sn + g[1] * c, gr[2] + g[2]]
    return back(phi), L.global_(gr), region


# ---------------------------------------------------------------- torus
def value_torus(body, pol, x):
    """Uniform p: rings (cel) integrated over the meridian circle, sin((theta-theta0)/2) = d sinh u."""
    L = Local(body, x)
    R, r = N(Fr(body["major_radius"])), N(Fr(body["minor_radius"]))
    q, _ = L.affine(pol)
    s, z = L.s, L.z
    de = hypot(s - R, z)
    region = "inside" if de < r - TINY else "outside" if de > r + TINY else "on-sheet"
    P = pi()
    th0 = atan2(z, s - R) if de else mpfr(0)
    c0, s0 = ((s - R) / de, z / de) if de else (mpfr(1), mpfr(0))
    d = abs(r - de) / (2 * sqrt(r * de)) * SCALE[0] if de else None
    ps, pt, pz = q
    tot = [mpfr(0)] * 4
    sings = []
    dm = hypot(s + R, z)                             # mirror image, and the axis for s = 0
    thm = atan2(z, -s - R) - th0
    be = abs(log(r / dm))
    for k in (-2, -1, 0, 1, 2):
        sings += [complex(float(thm + 2 * P * k), float(be)), complex(float(thm + 2 * P * k), -float(be))]

    def eat(sq, cq, w):
        """theta - theta0 = 2 asin(sq)."""
        v, sn = 2 * sq * sq, 2 * sq * cq
        cd = 1 - v
        ct, st = c0 * cd - s0 * sn, s0 * cd + c0 * sn
        a, zr = R + r * ct, r * st
        # distance^2 in the meridian plane, free of cancellation
        near2 = (r - de) ** 2 + 4 * r * de * sq * sq
        Q = (a + s) ** 2 + (z - zr) ** 2
        sQ = sqrt(Q)
        p = near2 / Q
        kc = sqrt(p)
        one = mpfr(1)
        C0, C1 = cel(kc, one, one, one) * 4 / sQ, cel(kc, one, -one, one) * 4 / sQ
        k3 = 4 / (Q * sQ)
        D0, D1 = cel(kc, p, one, one) * k3, cel(kc, p, -one, one) * k3
        E = C1 / (a * s) if s else P / (Q * sQ)
        D2 = D0 - E
        w = w * a * r
        # a - s = (R - s) + r ct ; (s - a) expressed as it stands: guard digits cover it
        tot[0] += w * (pz * st * C0 + ps * ct * C1)
        tot[1] += w * (pz * st * (s * D0 - a * D1) + ps * ct * (s * D1 - a * D2))
        tot[2] -= w * pt * ct * a * E
        tot[3] += w * (z - zr) * (pz * st * D0 + ps * ct * D1)

    import cmath
    third = P / 3
    for sign in (1, -1):
        if d is not None and d < mpfr(1) / 2:
            u0 = asinh(mpfr(1) / 2 / d)
            fd = float(d)
            us = []
            for t in sings:
                v = cmath.sin(t / 2) / fd * sign
                us.append(casinh(v))
            m = int(u0 / 2) + 1
            cuts = [float(u0) * k / m for k in range(m)] + [float(u0)]
            for a, b in refine(list(zip(cuts, cuts[1:])), us):
                ua, ub = mpfr(a), u0 if b == float(u0) else mpfr(b)
                for u, w in on(ua, ub):
                    e = gmpy2.exp(u)
                    sq = d * (e - 1 / e) / 2
                    cq = sqrt(1 - sq * sq)
                    eat(sign * sq, cq, w * d * (e + 1 / e) / cq)
            rest = [(1 / 3, 2 / 3), (2 / 3, 1)]
        else:
            rest = [(k / 4, (k + 1) / 4) for k in range(4)]
        ss = sings + ([complex(0, 2 * float(asinh(d / SCALE[0])))] if d is not None else [])
        rest = [(a * float(P), b * float(P)) for a, b in rest]
        for a, b in refine(rest, [t * sign if t.real else t for t in ss]):
            fa = third if abs(a - float(third)) < 1e-12 else P if a > 3.14159265358 else mpfr(a)
            fb = P if abs(b - float(P)) < 1e-12 else mpfr(b)
            for D, w in on(fa, fb):
                eat(sign * sin(D / 2), cos(D / 2), w)
    return back(tot[0]), L.global_(tot[1:]), region


def casinh(v):
    """Complex asinh in float64, accurate near 0 and at infinity."""
    import cmath
    if abs(v) < 1e-4:
        return v - v ** 3 / 6
    r = cmath.sqrt(v * v + 1)
    return cmath.log(v + r) if abs(v + r) >= 1 else -cmath.log(r - v)


def refine(panels, sings, rho=3.3):
    """Bisect until every complex singular point lies outside the Bernstein ellipse rho of its panel."""
    import cmath
    out, todo = [], list(panels)
    while todo:
        a, b = todo.pop()
        m, h = (a + b) / 2, (b - a) / 2
        ok = True
        for t in sings:
            if abs(t - m) > 4 * h:
                continue
            y = (t - m) / h
            w = cmath.sqrt(y - 1) * cmath.sqrt(y + 1)
            if max(abs(y + w), abs(y - w)) < rho:
                ok = False
                break
        if ok or h < 1e-14 * abs(m) + 1e-60:
            out.append((a, b))
        else:
            todo += [(a, m), (m, b)]
    return sorted(out)


VALUE = {"tube_sector": value_swept, "truncated_cone": value_swept, "torus": value_torus}
