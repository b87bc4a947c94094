"""Surfaces swept by straight segments of the meridian plane about the axis: potential and field of polynomial surface charge,
and of the volume charge that goes with it, by quadrature in the azimuth of closed-form inner integrals.

Target (s, 0, z); D the azimuth from it; basis (e_s(D), e_phi(D), e_z). On a segment with unit tangent t and outward normal n,
r = foot + l t, R^2 = l^2 + p^2. A_k = int l^k/R dl, B_k = int l^k/R^3 dl.
Quadrature: sin(D/2) = d sinh u, panels of length <= 2 in u, d the smallest of the distances (in this variable) of the singular
points, all of which lie at Im u = pi/2.
"""
from num import *


class Segment:
    """From A to B in the meridian plane, (ns, nz) the outward normal; tag: what its density is."""

    def __init__(self, sA, zA, sB, zB, out, tag):
        self.sA, self.zA, self.sB, self.zB, self.tag = sA, zA, sB, zB, tag
        self.len = hypot(sB - sA, zB - zA)
        self.ts, self.tz = (sB - sA) / self.len, (zB - zA) / self.len
        # the normal is the tangent turned by -90 degrees (s right, z up) times out
        self.ns, self.nz = out * self.tz, -out * self.ts
        self.flat = self.tz == 0

    def at(self, s, z, memo):
        self.s, self.z = s, z
        self.D0 = self.ns * (s - self.sA) + self.nz * (z - self.zA)
        if self.flat:
            self.D0 = self.nz * memo
        self.LA = self.ts * (self.sA - s) + self.tz * (self.zA - z)
        self.LB = self.ts * (self.sB - s) + self.tz * (self.zB - z)


def line_log(lA, lB, RA, RB, p2):
    if lA >= 0:
        return log((RB + lB) / (RA + lA))
    if lB <= 0:
        return log((RA - lA) / (RB - lB))
    return log((RB + lB) * (RA - lA) / p2)


def moments(lA, lB, p2, n):
    """A_0..A_n and B_0..B_(n+1)."""
    RA, RB = sqrt(lA * lA + p2), sqrt(lB * lB + p2)
    A = [line_log(lA, lB, RA, RB, p2), RB - RA]
    if lA * lB > 0:
        B0 = (lB * lB - lA * lA) / (RA * RB * (lB * RA + lA * RB))
    else:
        B0 = (lB / RB - lA / RA) / p2
    B = [B0, 1 / RA - 1 / RB]
    pA, pB = lA, lB
    for k in range(2, n + 1):
        A.append((pB * RB - pA * RA - (k - 1) * p2 * A[k - 2]) / k)
        pA, pB = pA * lA, pB * lB
    for k in range(2, n + 2):
        B.append(A[k - 2] - p2 * B[k - 2])
    return A, B


def pmul(a, b):
    out = [mpfr(0)] * (len(a) + len(b) - 1)
    for i, x in enumerate(a):
        for j, y in enumerate(b):
            out[i + j] += x * y
    return out


def scales(segs, s, z):
    """Distances of the singular points in sin(D/2) (they lie on the imaginary axis)."""
    out = []
    if s == 0:
        return out
    for g in segs:
        for sk, zk in ((g.sA, g.zA), (g.sB, g.zB)):
            if sk > 0:
                dz = g.D0 if g.flat else z - zk
                out.append(hypot(s - sk, dz) / (2 * sqrt(s * sk)))
        if g.flat:
            q = abs(g.D0) / s
            foot = s * sqrt(1 + q * q)
            if min(g.sA, g.sB) < foot < max(g.sA, g.sB):
                out.append(q / sqrt(2 * (1 + sqrt(1 + q * q))))
        elif g.ts == 0:
            if min(g.zA, g.zB) < z < max(g.zA, g.zB):
                out.append(abs(s - g.sA) / (2 * sqrt(s * g.sA)))
        else:                                       # cone: tip at tau = 0, generator at s = tau |ts|
            zt = g.zA - g.sA * g.tz / g.ts
            up = 1 if g.ts > 0 else -1
            bs, bz = g.ts * up, g.tz * up           # unit vector from the tip along the generator
            r = hypot(s, z - zt)
            if min(g.sA, g.sB) < r * bs < max(g.sA, g.sB):
                cross = abs(s * bz - (z - zt) * bs) / r          # sin of the angle between
                dotp = (s * bs + (z - zt) * bz) / r
                if dotp > -0.5:
                    out.append(cross / sqrt(2 * (1 + dotp)) / sqrt(s / r * bs))
    return out


def azimuths(spans, d, n=None):
    """(sin(D/2), cos(D/2), weight) over the spans [(lo, hi)], -pi <= lo < hi <= pi, none containing 0 inside."""
    third = pi() / 3
    half = mpfr(1) / 2
    for lo, hi in spans:
        sign = 1 if lo >= 0 else -1
        a, b = (lo, hi) if sign > 0 else (-hi, -lo)
        plain = []
        if d is not None and d < half and a < third:
            e = min(b, third)
            ua, ub = asinh(sin(a / 2) / d), asinh(sin(e / 2) / d)
            m = int((ub - ua) / 2) + 1
            for k in range(m):
                for u, w in on(ua + (ub - ua) * k / m, ua + (ub - ua) * (k + 1) / m, n):
                    x = gmpy2.exp(u)
                    q = d * (x - 1 / x) / 2
                    c = sqrt(1 - q * q)
                    yield sign * q, c, w * d * (x + 1 / x) / c
            if b > e:
                plain.append((e, b, third))
        else:
            plain.append((a, b, pi() / 4))
        for x, y, step in plain:
            m = int((y - x) / step + mpfr("0.999"))or 1
            for k in range(m):
                for D, w in on(x + (y - x) * k / m, x + (y - x) * (k + 1) / m, n):
                    yield sign * sin(D / 2), cos(D / 2), w


def spans_of(phi1, phi2, phi0):
    """The span of azimuths phi1..phi2 about phi0, cut at 0 and at +-pi."""
    P = pi()
    lo, hi = phi1 - phi0, phi2 - phi0
    k = gmpy2.floor((lo + P) / (2 * P))
    lo, hi = lo - 2 * P * k, hi - 2 * P * k        # lo in [-pi, pi)
    cuts = [lo] + [c for c in (mpfr(0), P, 2 * P, 3 * P) if lo < c < hi] + [hi]
    out = []
    for a, b in zip(cuts, cuts[1:]):
        if (a + b) / 2 > P:
            a, b = a - 2 * P, b - 2 * P
        out.append((a, b))
    return out


FULL = "full"


def integrate(segs, s, z, spans, surface, volume=None, rect=None, n=None, gaps=None):
    """4 pi (phi, g) in the basis (e_s, e_t, e_z) at the target.

    surface(seg, c, sn) -> (alpha, beta, gamma): sigma = alpha + beta s' + gamma z' on the segment
    volume(seg, D, sp, zp, c, sn) -> (T, V): scalar poly T in l (density of 1/R), vector polys V = [Vs, Vphi, Vz] in the turning basis
        with the field int V/R dA (outward normal part included)
    rect = (c0, (s1, s2, z1, z2)): volume charge c0/s over the rectangle
    gaps: for flat segments, z - zA (exact)
    """
    gaps = gaps or {}
    skip = set()
    for i, g in enumerate(segs):
        gap = gaps.get(i, z - g.zA)
        if g.flat and abs(gap) < mpfr("1e-42"):
            gap = mpfr("1e-44")
            skip.add(i)
        g.at(s, z, gap)
    ds = scales(segs, s, z)
    d = min(ds) * SCALE[0] if ds else None
    phi, gs, gt, gz = mpfr(0), mpfr(0), mpfr(0), mpfr(0)
    signs = (1,)
    if spans == FULL:
        spans, signs = [(mpfr(0), pi())], (1, -1)
    for q, cq, wt in azimuths(spans, d, n):
        v = 2 * q * q
        sn0, c = 2 * q * cq, 1 - v
        geo = []
        h2 = (s * sn0) ** 2
        for i, g in enumerate(segs):
            D = g.D0 - g.ns * s * v
            p2 = D * D + h2
            sp = [s * c - D * g.ns, g.ts] if g.ts else [g.sA]
            zp = [z - D * g.nz, g.tz] if g.tz else [g.zA]
            geo.append([D, sp, zp, g.LA + g.ts * s * v, g.LB + g.ts * s * v, p2, None])
        for sgn in signs:
            sn = sn0 * sgn
            h = s * sn
            I = Fs = Fp = Fz = mpfr(0)
            for i, g in enumerate(segs):
                al, be, ga = surface(g, c, sn)
                if not (al or be or ga) and volume is None:
                    continue
                D, sp, zp, lA, lB, p2, AB = geo[i]
                f = [al + be * sp[0] + ga * zp[0]]
                if (be and g.ts) or (ga and g.tz):
                    f.append((be * g.ts if g.ts else 0) + (ga * g.tz if g.tz else 0))
                f = pmul(f, sp)
                T, V = volume(g, D, sp, zp, c, sn) if volume else (None, None)
                deg = len(f)
                if T is not None:
                    deg = max([deg, len(T) + 1] + [len(t) + 1 for t in V if t])
                if AB is None or len(AB[0]) < deg + 1:
                    AB = geo[i][6] = moments(lA, lB, p2, deg)
                A, B = AB
                I += sum(x * y for x, y in zip(f, A))
                b0 = sum(x * y for x, y in zip(f, B))
                b1 = sum(x * y for x, y in zip(f, B[1:]))
                Fs -= b1 * g.ts - D * g.ns * b0
                Fp -= h * b0
                if i not in skip:
                    Fz -= b1 * g.tz - D * g.nz * b0
                if T is not None:
                    I += sum(x * y for x, y in zip(pmul(T, sp), A))
                    if V[0]:
                        Fs += sum(x * y for x, y in zip(pmul(V[0], sp), A))
                    if V[1]:
                        Fp += sum(x * y for x, y in zip(pmul(V[1], sp), A))
                    if V[2]:
                        Fz += sum(x * y for x, y in zip(pmul(V[2], sp), A))
            if rect:
                k, (s1, s2, z1, z2) = rect
                P, G = rectangle(s, z, v, sn, s1, s2, z1, z2, mpfr(1), mpfr(0), mpfr(0))
                I += k * P
                Fs, Fp, Fz = Fs + k * G[0], Fp + k * G[1], Fz + k * G[2]
            phi += wt * I
            gs += wt * (Fs * c - Fp * sn)
            gt += wt * (Fs * sn + Fp * c)
            gz += wt * Fz
    return phi, [gs, gt, gz]


def rectangle(s, z, v, sn, s1, s2, z1, z2, a, bs, bz):
    """Potential and field (turning basis) of the plane rectangle at the azimuth with 1 - cos = v, sin = sn, charge a + bs (s'-s cos) + bz (z'-z)."""
    x1, x2 = (s1 - s) + s * v, (s2 - s) + s * v
    y1, y2 = z1 - z, z2 - z
    h = s * sn                                      # the foot lies at +h e_phi from the target
    ah, h2 = abs(h), h * h
    I0 = W = Js = Jz = gs = gz = ms = mz = mpfr(0)
    for lA, lB, d, m_s, m_z in ((x1, x2, -y1, 0, -1), (x1, x2, y2, 0, 1), (y1, y2, -x1, -1, 0), (y1, y2, x2, 1, 0)):
        p2 = d * d + h2
        RA, RB = sqrt(lA * lA + p2), sqrt(lB * lB + p2)
        L = line_log(lA, lB, RA, RB, p2) if p2 or lA * lB > 0 else mpfr(0)
        I0 += d * L
        if d:
            W += atan(d * lB / (p2 + ah * RB)) - atan(d * lA / (p2 + ah * RA))
        # in-plane gradient: -oint sigma m/R
        sig0 = a + (bz * d * m_z if m_z else bs * d * m_s)
        slope = bs if m_z else bz
        e = sig0 * L + slope * (RB - RA)
        gs -= m_s * e
        gz -= m_z * e
        ms += m_s * L
        mz += m_z * L
        if bs or bz:
            A2 = (lB * RB - lA * RA - p2 * L) / 2
            JR = A2 + p2 * L                        # int R dl
            Js += m_s * JR
            Jz += m_z * JR
    I0 -= ah * W
    pot = a * I0 + bs * Js + bz * Jz
    gs += bs * I0
    gz += bz * I0
    # d/dh with x_phi = -h: grad_phi = -x_phi int sigma/R^3 = h (a J3 + b.int u/R^3)
    sg = 1 if h > 0 else -1 if h < 0 else 0
    gp = sg * W * a - h * (bs * ms + bz * mz)
    return pot, [-gs, -gp, -gz]
