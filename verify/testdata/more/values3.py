"""Boxes with p = c s^n s_hat, n an integer >= 0 (s from the box's e3 axis): half-plane rectangles of volume charge and vertical
lines of the side faces in closed form, one quadrature along each side face."""
from num import *
from gen import fr, mul
from values import TINY, refine
from values2 import Face, local_polynomial  # noqa: F401
import values2
from sweep import moments


def value_box_radial(body, pol, x):
    tune()
    f = gen.Frame(body)
    n = int({"radial_unit": 0, "radial_s": 1, "radial_s2": 2}.get(pol["kind"], pol.get("n")))
    c = N(Fr(pol["c"]))
    xl = [N(t) for t in f.local(x)]
    half = [N(t) for t in fr(body["half_lengths_e1_e2_e3"])]
    h, Z = half[2], xl[2]
    z1, z2 = -h - Z, h - Z
    rho2 = xl[0] ** 2 + xl[1] ** 2
    if rho2 < mpfr("1e-80"):
        raise ValueError("target on the axis")
    phi, g = mpfr(0), [mpfr(0)] * 3
    coef = [gmpy2.bincoef(n, k) for k in range(n + 1)]
    for m, D, wy in (((1, 0), half[0], half[1]), ((0, 1), half[1], half[0]), ((-1, 0), half[0], half[1]), ((0, -1), half[1], half[0])):
        t = (-m[1], m[0])
        xt, yt = m[0] * xl[0] + m[1] * xl[1], t[0] * xl[0] + t[1] * xl[1]
        breaks = [-wy, wy]
        if abs(yt) < wy:
            breaks.append(yt)
        if xt > 0 and abs(yt * D / xt) < wy:
            breaks.append(yt * D / xt)
        breaks.sort()
        sings = singular(xt, yt, D, (z1, z2))
        acc = [mpfr(0)] * 4

        def eat(y, w):
            S = sqrt(D * D + y * y)
            co, si = D / S, y / S
            along, perp = xt * co + yt * si, yt * co - xt * si
            face = Face(-perp, [-along, S - along], [z1, z2], n + 2)
            F = {(k, 0): coef[k] * along ** (n - k) for k in range(n + 1)}
            k0 = -c * (n + 1) * w * D / (S * S)
            kn, ku, kw = face.K(F)
            acc[0] += k0 * face.J(F)
            acc[1] += k0 * (ku * co - kn * si)
            acc[2] += k0 * (ku * si + kn * co)
            acc[3] += k0 * kw
            dx, dy = D - xt, y - yt
            A, B = moments(z1, z2, dx * dx + dy * dy, 1)
            k1 = c * S ** (n - 1) * D * w
            acc[0] += k1 * A[0]
            acc[1] -= k1 * dx * B[0]
            acc[2] -= k1 * dy * B[0]
            acc[3] -= k1 * B[1]
        for a, b in zip(breaks, breaks[1:]):
            L = (b - a) / 2
            if not L:
                continue
            for base, sign in ((a, 1), (b, -1)):
                rel = [complex((q[0] - base) * sign, q[1]) for q in sings]
                fl = float(L)
                for p, q in refine([(0.0, fl)], [complex(float(r.real), float(r.imag)) for r in rel]):
                    for v, w in on(mpfr(p), L if q == fl else mpfr(q)):
                        eat(base + sign * v, w)
        phi += acc[0]
        g[0] += acc[1] * m[0] + acc[2] * t[0]
        g[1] += acc[1] * m[1] + acc[2] * t[1]
        g[2] += acc[3]
    gaps = [half[i] - abs(xl[i]) for i in range(3)]
    region = "inside" if all(q > TINY for q in gaps) else "on-sheet" if all(q > -TINY for q in gaps) else "outside"
    return back(phi), f.turn([back(q) for q in g]), region


def singular(xt, yt, D, zs):
    """Complex y at which the target meets a corner or an edge of the rectangle: (re, im) mpfr pairs."""
    o = mpfr(0)
    out = [(o, D), (yt, D - xt)] + [(yt, sqrt((D - xt) ** 2 + z * z)) for z in zs]
    for z in zs:
        q = z * z
        # y = D (xt yt +- i |z| sqrt(xt^2+yt^2+z^2))/(xt^2+z^2)
        k = xt * xt + q
        if k:
            out.append((D * xt * yt / k, D * abs(z) * sqrt(k + yt * yt) / k))
    return out + [(a, -b) for a, b in out]


def value_box(body, pol, x):
    k = pol["kind"]
    if k in ("uniform", "affine"):
        return values2.BOX(body, pol, x)
    if k in ("radial_unit", "radial_s2") or (k == "radial_power" and pol["n"] % 2 == 0):
        return value_box_radial(body, pol, x)
    return values2.value_box(body, pol, x)


VALUE = {"box": value_box}
