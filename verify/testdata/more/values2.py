"""More of values.py: radial powers in cylinders and tubes, balls, ellipsoids with affine p, boxes with polynomial p."""
from num import *
from gen import fr, dot, sub, add, step, radii
from sweep import moments
from values import Local, TINY, casinh, refine, region_of, make, value_swept, local_affine


# ---------------------------------------------------------------- p = c s^n s_hat in cylinders and tubes
def shell_slopes(a, s, z1, z2, z1z=False, z2z=False):
    """dV/da, dV/ds, dV/dz of V = oint dphi int dz'/R over the circle of radius a; z1, z2 = z above the lower and upper rim."""
    Fa = Fs = C = mpfr(0)
    P4 = 2 * pi()
    t, ds = a + s, a - s
    g = ds / t
    g2 = g * g
    one = mpfr(1)
    for zeta, sg in ((z1, 1), (z2, -1)):
        Q = t * t + zeta * zeta
        sq = sqrt(Q)
        kc = sqrt((ds * ds + zeta * zeta) / Q)
        c0 = 4 / sq * cel(kc, one, one, one)
        C += sg * c0
        if zeta:
            w = ds * t * 4 / (t * t * sq) * cel(kc, g2, one, one) if ds else mpfr(0)          # (a^2-s^2) oint 1/(q^2 R)
            Fa -= sg * zeta / (2 * a) * (c0 + w)
            if s:
                Fs -= sg * zeta / (2 * s) * (c0 - w)
    return Fa, Fs, C


def value_radial_power(body, pol, x):
    """phi = c int a^(n+1) dV/da da (dipoles); g from the charges of the walls and the volume, both shells (cel) integrated over the radius."""
    L = Local(body, x)
    segs, gaps = make(body, L)
    region = region_of(body, L, segs, gaps)
    n = Fr({"radial_s2": 2.0, "radial_s": 1.0, "radial_unit": 0.0}.get(pol["kind"], pol.get("n")))
    c = N(Fr(pol["c"]))
    s, h = L.s, Fr(body["half_length"])
    z1, z2 = [N(L.zq + k * h) if isinstance(L.zq, Fr) else L.z + k * N(h) for k in (1, -1)]
    r1, r2 = N(Fr(body.get("r1", 0.0))), N(Fr(body.get("r2", body.get("radius"))))
    nn = N(n)
    power = lambda a, e: a ** int(e) if e == int(e) else sqrt(a ** int(2 * e)) if 2 * e == int(2 * e) else gmpy2.exp(N(e) * log(a))
    phi = gs = gz = mpfr(0)
    for a, sg in ((r2, 1), (r1, -1)):
        if a:
            _, vs, vz = shell_slopes(a, s, z1, z2)
            k = -sg * c * power(a, n + 1)
            gs, gz = gs + k * vs, gz + k * vz
    acc = [phi, gs, gz]

    def eat(a, w):
        va, vs, vz = shell_slopes(a, s, z1, z2)
        k = w * c * power(a, n)
        acc[0] += k * a * va
        acc[1] += k * (nn + 1) * vs
        acc[2] += k * (nn + 1) * vz
    zs = [max(abs(float(t)), 1e-45) for t in (z1, z2)]
    fs = float(s)
    sings = [complex(e * fs, k * t) for e in (1, -1) for k in (1, -1) for t in zs]
    lo = r1
    if n != int(n) or n == 0:
        sings.append(0j)
        if not r1:
            e = min([r2] + [mpfr(abs(t)) / 2 for t in sings[:-1]])
            if s and s < 2 * e:
                e = s / 2
            lo = e
            if 2 * n == int(2 * n):
                for t, w in on(mpfr(0), mpfr(1)):
                    eat(e * t * t, 2 * e * t * w)
            else:
                V = mpfr(2.35 * mp.dps / float(n + 1))
                m = int(V / 2) + 1
                for k in range(m):
                    for v, w in on(V * k / m, V * (k + 1) / m):
                        a = e * gmpy2.exp(-v)
                        eat(a, w * a)
    if n == 0:
        sings.pop()
    inside = lo < s < r2
    for a, b in ([(lo, s), (s, r2)] if inside else [(lo, r2)]):
        if a == b:
            continue
        d = mpfr(min(zs))
        ctr = s
        if not inside and s >= r2:
            d = max(d, (s - r2))
        elif not inside:
            d = max(d, (lo - s))
        d *= SCALE[0]
        if d > b - a:
            for p, q in refine([(float(a), float(b))], sings):
                pa = a if p == float(a) else mpfr(p)
                pb = b if q == float(b) else mpfr(q)
                for t, w in on(pa, pb):
                    eat(t, w)
            continue
        ua, ub = asinh((a - ctr) / d), asinh((b - ctr) / d)
        fd, us = float(d), []
        for t in sings:
            v = (t - fs) / fd
            us.append(casinh(v))
        us += [t.conjugate() for t in us]
        m = int((ub - ua) / 2) + 1
        fa, fb = float(ua), float(ub)
        cuts = [fa + (fb - fa) * k / m for k in range(m)] + [fb]
        for p, q in refine(list(zip(cuts, cuts[1:])), us, 3.0):
            pa = ua if p == fa else mpfr(p)
            pb = ub if q == fb else mpfr(q)
            for u, w in on(pa, pb):
                e = gmpy2.exp(u)
                eat(ctr + d * (e - 1 / e) / 2, w * d * (e + 1 / e) / 2)
    return back(acc[0]), L.global_([acc[1], mpfr(0), acc[2]]), region


# ---------------------------------------------------------------- balls
def frame_local(body, pol):
    """q, G (mpf) in the unturned frame of the body."""
    f = gen.Frame(body)
    p0, G = gen.affine(pol)
    q = gen.vec(f.along(add(p0, [dot(row, f.c) for row in G])))
    e = [f.e(i) for i in range(3)]
    Gm = [gen.vec(r) for r in G]
    Gl = [[dot(e[i], [dot(r, e[j]) for r in Gm]) for j in range(3)] for i in range(3)]
    return f, q, Gl


def value_ball(body, pol, x):
    d = sub(x, fr(body["centre"]))
    d2 = dot(d, d)
    r = gen.root(d2)
    rm, dm = gen.M(r), gen.vec(d)
    kind = pol["kind"]
    rr = radii(body)
    part = sum(sg * step(d2, a * a) for a, sg in rr)
    region = {Fr(0): "outside", Fr(1): "inside"}.get(part, "on-sheet")
    if kind in ("ball_r", "ball_r2", "central_power"):
        n = Fr({"ball_r": 1.0, "ball_r2": 2.0}.get(kind, pol.get("n")))
        c, e = mpf(1) * gen.M(Fr(pol["c"])), gen.M(n) + 1
        R = gen.M(rr[0][0])
        r1 = gen.M(rr[1][0]) if len(rr) > 1 else mpf(0)
        at = min(max(rm, r1), R)
        phi = c * (at ** e - R ** e) / e
        k = -gen.M(part) * c * (rm ** (gen.M(n) - 1) if rm else 0)
        return 4 * mp.pi * phi, [4 * mp.pi * k * t for t in dm], region
    p0, G = gen.affine(pol)
    q = gen.vec(add(p0, [dot(row, fr(body["centre"])) for row in G]))
    T = gen.M(G[0][0] + G[1][1] + G[2][2]) / 3
    S = [[gen.M(G[i][j] + G[j][i]) / 2 - (T if i == j else 0) for j in range(3)] for i in range(3)]
    qd = dot(q, dm)
    Sd = [dot(S[i], dm) for i in range(3)]
    dSd = dot(dm, Sd)
    phi, g = mpf(0), [mpf(0)] * 3
    for a, sg in rr:
        w = step(d2, a * a)
        A = gen.M(a)
        if w > 0:
            phi += sg * (qd / 3 + T * (rm * rm - A * A) / 2 + dSd / 5)
            k = gen.M(w) * sg
            g = [g[i] - k * (q[i] / 3 + T * dm[i] + 2 * Sd[i] / 5) for i in range(3)]
        else:
            phi += sg * (qd * A ** 3 / (3 * rm ** 3) + A ** 5 / rm ** 5 * dSd / 5)
        if w < 1:
            k = gen.M(1 - w) * sg
            g = [g[i] + k * (A ** 3 / 3 * (3 * qd * dm[i] / rm ** 5 - q[i] / rm ** 3)
                             + A ** 5 / 5 * (5 * dSd * dm[i] / rm ** 7 - 2 * Sd[i] / rm ** 5)) for i in range(3)]
    return 4 * mp.pi * phi, [4 * mp.pi * t for t in g], region


# ---------------------------------------------------------------- ellipsoids with affine p
def value_ellipsoid(body, pol, x):
    """Derivatives of the potentials of the densities 1 and r_j (Ferrers): int U ds/((a^2+s)..Delta), U = 1 - sum x^2/(a^2+s)."""
    f, q, G = frame_local(body, pol)
    ax = fr(body["semi_axes_e1_e2_e3"])
    d = sub(x, f.c)
    sq = [dot(d, t) ** 2 / n2 for t, n2 in zip(f.dirs, f.n2)]
    level = sum(s / (a * a) for s, a in zip(sq, ax))
    xl = gen.vec(f.along(d))
    a2, s2 = [gen.M(a * a) for a in ax], gen.vec(sq)
    region = "inside" if level < 1 else "outside" if level > 1 else "on-sheet"
    lam = mpf(0)
    if level > 1:
        lam = max(mpf(0), max(s - a for s, a in zip(s2, a2)))
        for _ in range(200):
            t = sum(s / (a + lam) for s, a in zip(s2, a2))
            move = t * (t - 1) / sum(s / (a + lam) ** 2 for s, a in zip(s2, a2))
            lam += move
            if abs(move) < lam * mpf(10) ** (5 - mp.dps):
                break
    b = [a + lam for a in a2]
    De = mp.sqrt(b[0] * b[1] * b[2])
    I = [mpf(2) / 3 * mp.elliprd(b[(i + 1) % 3], b[(i + 2) % 3], b[i]) for i in range(3)]
    J = [[None] * 3 for _ in range(3)]
    for i in range(3):
        for j in range(3):
            if ax[i] != ax[j]:
                J[i][j] = (I[j] - I[i]) / (a2[i] - a2[j])
    for i in range(3):                               # 3/2 J_ii + 1/2 sum_(j != i) J_ij = 1/(b_i Delta); equal axes: J_ij = J_ii
        same = [j for j in range(3) if j != i and ax[j] == ax[i]]
        rest = sum(J[i][j] for j in range(3) if j != i and j not in same)
        v = (1 / (b[i] * De) - rest / 2) / (mpf(3) / 2 + mpf(len(same)) / 2)
        J[i][i] = v
        for j in same:
            J[i][j] = v
    vol = mp.sqrt(a2[0] * a2[1] * a2[2])
    lm = [mpf(0)] * 3
    if level > 1:
        t = sum(s / c ** 2 for s, c in zip(s2, b))
        lm = [2 * xl[m] / b[m] / t for m in range(3)]
    U = [I[j] - sum(s2[k] * J[j][k] for k in range(3)) for j in range(3)]
    delta = lambda i, j: 1 if i == j else 0
    phi, g = mpf(0), [mpf(0)] * 3
    for i in range(3):
        phi += q[i] * 2 * xl[i] * I[i]
        for j in range(3):
            phi -= G[i][j] * a2[j] * (delta(i, j) * U[j] - 2 * xl[i] * xl[j] * J[i][j])
        for m in range(3):
            g[m] -= 2 * q[i] * (delta(i, m) * I[i] - xl[i] * lm[m] / (b[i] * De))
            for j in range(3):
                v = -2 * delta(i, j) * xl[m] * J[j][m] - 2 * (delta(i, m) * xl[j] + delta(j, m) * xl[i]) * J[i][j] \
                    + 2 * xl[i] * xl[j] * lm[m] / (b[i] * b[j] * De)
                g[m] += G[i][j] * a2[j] * v
    k = mp.pi * vol
    return k * phi, gen.mul(k, f.turn(g)), region


# ---------------------------------------------------------------- boxes with polynomial p
def padd(a, b, k=1):
    out = dict(a)
    for m, v in b.items():
        out[m] = out.get(m, 0) + k * v
    return out


def pmul3(a, b):
    out = {}
    for m, v in a.items():
        for n, w in b.items():
            t = (m[0] + n[0], m[1] + n[1], m[2] + n[2])
            out[t] = out.get(t, 0) + v * w
    return out


def pdiff(a, i):
    out = {}
    for m, v in a.items():
        if m[i]:
            t = list(m)
            t[i] -= 1
            out[tuple(t)] = out.get(tuple(t), 0) + v * m[i]
    return out


def tilde(a):
    return {m: v / (sum(m) + 2) for m, v in a.items()}


def local_polynomial(pol, f, x):
    """p as three polynomials (local components) of u = r - x in local components."""
    e = [[N(t) for t in f.e(i)] for i in range(3)]
    unit = [(1, 0, 0), (0, 1, 0), (0, 0, 1)]
    one = mpfr(1)
    k = pol["kind"]
    if k in ("polynomial", "affine", "uniform"):
        R = [{(0, 0, 0): N(x[i]), **{unit[j]: e[j][i] for j in range(3)}} for i in range(3)]
        p = [{}, {}, {}]
        if k == "polynomial":
            for comp, co, (i, j, l) in pol["terms"]:
                t = {(0, 0, 0): N(Fr(co))}
                for base, pw in zip(R, (i, j, l)):
                    for _ in range(pw):
                        t = pmul3(t, base)
                p[comp] = padd(p[comp], t)
        else:
            p0, G = gen.affine(pol)
            for i in range(3):
                p[i] = {(0, 0, 0): N(p0[i])}
                for j in range(3):
                    p[i] = padd(p[i], R[j], N(G[i][j]))
        out = []
        for a in range(3):
            t = {}
            for i in range(3):
                t = padd(t, p[i], e[a][i])
            out.append(t)
        return out
    xl = [N(t) for t in f.local(x)]
    r = [{(0, 0, 0): xl[i], unit[i]: one} for i in range(3)]
    c = N(Fr(pol["c"]))
    n = {"radial_s": 1, "ball_r": 1, "axial_z": 1, "axial_z2": 2}.get(k, pol.get("n"))
    n = int(n)

    def times(base, m):
        out = {(0, 0, 0): one}
        for _ in range(m):
            out = pmul3(out, base)
        return out
    if k.startswith("axial"):
        return [{}, {}, padd({}, times(r[2], n), c)]
    radial = k.startswith("radial")
    assert n % 2 == 1
    q = {}
    for i in range(2 if radial else 3):
        q = padd(q, pmul3(r[i], r[i]))
    fac = padd({}, times(q, (n - 1) // 2), c)
    return [pmul3(fac, r[i]) for i in range(2 if radial else 3)] + ([{}] if radial else [])


def value_box(body, pol, x):
    tune()
    f = gen.Frame(body)
    xl, half = f.local(x), fr(body["half_lengths_e1_e2_e3"])
    p = local_polynomial(pol, f, x)
    rho = {}
    for i in range(3):
        rho = padd(rho, pdiff(p[i], i), -1)
    rt = tilde(rho)
    grt = [tilde(pdiff(rho, m)) for m in range(3)]
    deg = max([sum(m) for q in p for m in q] + [0])
    gap = lambda i, s: N(s * half[i] - xl[i]) if isinstance(xl[i], Fr) else s * N(half[i]) - N(xl[i])
    ends = [[gap(i, -1), gap(i, 1)] for i in range(3)]
    for i in range(3):
        for t in range(2):
            if abs(ends[i][t]) < TINY:
                ends[i][t] = mpfr(0)
    phi, g = mpfr(0), [mpfr(0)] * 3
    for i in range(3):
        j, k = (i + 1) % 3, (i + 2) % 3
        for t, sg in ((0, -1), (1, 1)):
            D = ends[i][t]
            face = Face(D, ends[j], ends[k], deg + 2)

            def flat(poly):
                out = {}
                for m, v in poly.items():
                    key = (m[j], m[k])
                    out[key] = out.get(key, 0) + v * D ** m[i]
                return out
            sig = {m: sg * v for m, v in flat(p[i]).items()}
            un = sg * D
            phi += face.J(sig) + un * face.J(flat(rt))
            kn, kj, kk = face.K(sig)
            g[i] += kn + sg * face.J(flat(rho))
            g[j] += kj
            g[k] += kk
            for m in range(3):
                g[m] -= un * face.J(flat(grt[m]))
    level = [(e[0] < 0 < e[1], e[0] <= 0 <= e[1]) for e in ends]
    region = "inside" if all(a for a, _ in level) else "on-sheet" if all(b for _, b in level) else "outside"
    return back(phi), f.turn([back(t) for t in g]), region


class Face:
    """int u^a w^b/R and /R^3 over the rectangle [u1,u2] x [w1,w2] at the height D above the target's foot."""

    def __init__(self, D, us, ws, deg):
        self.D, self.h2 = D, D * D
        self.memo1, self.memo3 = {}, {}
        self.edges = []                              # (axis along, fixed value, outward sign, moments)
        W = mpfr(0)
        for along, (a, b), fixed in ((0, us, ws), (1, ws, us)):
            for v, sg in ((fixed[0], -1), (fixed[1], 1)):
                p2 = v * v + self.h2
                A, _ = moments(a, b, p2, deg)
                self.edges.append((along, v, sg, A))
                d = sg * v
                if d:
                    RA, RB = sqrt(a * a + p2), sqrt(b * b + p2)
                    W += atan(d * b / (p2 + abs(D) * RB)) - atan(d * a / (p2 + abs(D) * RA))
        self.W = W

    def contour(self, axis, m):
        """oint m_axis u^m0 w^m1/R dl."""
        out = mpfr(0)
        for along, v, sg, A in self.edges:
            if along != axis:
                out += sg * v ** m[1 - along] * A[m[along]]
        return out

    def j1(self, m):
        if m not in self.memo1:
            k = m[0] + m[1]
            c = self.contour(0, (m[0] + 1, m[1])) + self.contour(1, (m[0], m[1] + 1))
            self.memo1[m] = (c - self.h2j3(m)) / (k + 1)
        return self.memo1[m]

    def h2j3(self, m):
        if m == (0, 0):
            return abs(self.D) * self.W
        return self.h2 * self.j3(m)

    def j3(self, m):
        """int u^m0 w^m1/R^3, not both zero."""
        if m not in self.memo3:
            a = 0 if m[0] else 1
            G = (m[0] - 1, m[1]) if a == 0 else (m[0], m[1] - 1)
            v = -self.contour(a, G)
            if G[a]:
                v += G[a] * self.j1((G[0] - 1, G[1]) if a == 0 else (G[0], G[1] - 1))
            self.memo3[m] = v
        return self.memo3[m]

    def J(self, F):
        return sum((v * self.j1(m) for m, v in F.items() if v), mpfr(0))

    def K(self, F):
        """int F (x-r)/R^3: along the normal axis, u, w."""
        kn = ku = kw = mpfr(0)
        sgn = 1 if self.D > 0 else -1 if self.D < 0 else 0
        for m, v in F.items():
            if not v:
                continue
            kn -= v * (sgn * self.W if m == (0, 0) else self.D * self.j3(m))
            for a in (0, 1):
                t = self.contour(a, m)
                if m[a]:
                    t -= m[a] * self.j1((m[0] - 1, m[1]) if a == 0 else (m[0], m[1] - 1))
                if a == 0:
                    ku += v * t
                else:
                    kw += v * t
        return kn, ku, kw


# ---------------------------------------------------------------- by type and kind
def value_cylinder(body, pol, x):
    k = pol["kind"]
    if k in ("uniform", "axial_z"):
        return gen.value_cylinder(body, pol, x)
    if k in ("radial_s2", "radial_power", "radial_unit") and pol.get("n") != 1:
        return value_radial_power(body, pol, x)
    return value_swept(body, pol, x)


def value_disc(body, pol, x):
    return value_swept(body, pol, x) if any(pol["b"]) else gen.value_disc(body, pol, x)


def value_sphere(body, pol, x):
    return gen.value_sphere(body, pol, x) if pol["kind"] == "uniform" else value_ball(body, pol, x)


def ellipsoid(body, pol, x):
    return ELL(body, pol, x) if pol["kind"] == "uniform" else value_ellipsoid(body, pol, x)


def box(body, pol, x):
    return BOX(body, pol, x) if pol["kind"] in ("uniform", "affine") else value_box(body, pol, x)


ELL, BOX = gen.value_ellipsoid, gen.value_box
VALUE = {"cylinder": value_cylinder, "tube": value_cylinder, "disc": value_disc, "annulus": value_disc, "sphere": value_sphere,
         "spherical_shell": value_sphere, "ellipsoid": ellipsoid, "box": box}
