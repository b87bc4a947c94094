"""Writes forces.json: python3 forces.py > forces.json

Force, torque about the centre of the part and energy between two rigid parts in natural units, worked out by mpmath in 40 digits
from integrals other than those of the package; inputs are exact in binary, outputs have 25 digits.

boxes: both polarized along z. The integral over two parallel rectangles becomes one over the difference of the places with
trapezoids as weights; one direction is closed (asinh), the other numeric.
coaxial: both polarized along the axis. One angle, from the product J1(as) J1(bs) by Neumann's addition theorem:
F = a b int -log(z + r) cos t dt, W = a b int (z log(z + r) - r) cos t dt, r^2 = a^2 + b^2 - 2ab cos t + z^2.
"""
import json
from mpmath import mp, mpf, quad, sqrt, log, cos, pi, asinh, fsum

mp.dps = 40


def weight(a, b, c):
    """Knots and values of the trapezoid of overlaps at the difference u for half lengths a, b and offset c."""
    m = 2*min(a, b)
    return [(c - a - b, 0), (c - abs(a - b), m), (c + abs(a - b), m), (c + a + b, 0)]


def moment(a, b, c):
    """Piecewise polynomials (lo, hi, c0, c1) of the overlap."""
    k = weight(a, b, c)
    out = []
    for (p, y), (q, z) in zip(k, k[1:]):
        if q > p:
            s = (z - y)/(q - p)
            out.append((p, q, y - s*p, s))
    return out


def arm(a, b, c):
    """Integral over the overlap of the place x2 (from the middle of the interval of half length b) at difference u: quadratic pieces
    (lo, hi, c0, c1, c2). x2 = u - c + x1 with |x1| <= a, |x2| <= b."""
    out = []
    for p, q, _, _ in moment(a, b, c):
        mid = (p + q)/2
        f = lambda u: (min(b, u - c + a)**2 - max(-b, u - c - a)**2)/2
        y0, y1, y2 = f(p), f(mid), f(q)
        h = q - p
        d1, d2 = (y1 - y0)/(h/2), (y2 - 2*y1 + y0)/(h/2)**2
        # Newton form y0 + d1 (u-p) + d2/2 (u-p)(u-mid)
        c2 = d2/2
        c1 = d1 - c2*(p + mid)
        c0 = y0 - d1*p + c2*p*mid
        out.append((p, q, c0, c1, c2))
    return out


def inner(pieces, rho2, kind):
    """Integral over v of the pieces times 1/r (kind 0) or 1/r^3 (kind 1)."""
    s = mpf(0)
    for pc in pieces:
        lo, hi, c = pc[0], pc[1], list(pc[2:]) + [0]*(5 - len(pc))
        for v, sg in ((hi, 1), (lo, -1)):
            r = sqrt(v*v + rho2)
            L = asinh(v/sqrt(rho2))
            if kind == 0:
                f = c[0]*L + c[1]*r + c[2]*(v*r - rho2*L)/2
            else:
                f = c[0]*v/(rho2*r) - c[1]/r + c[2]*(L - v/r)
            s += sg*f
    return s


def outer(pieces, f):
    knots = sorted({p[0] for p in pieces} | {p[1] for p in pieces} | ({mpf(0)} if pieces[0][0] < 0 < pieces[-1][1] else set()))
    s = mpf(0)
    for lo, hi in zip(knots, knots[1:]):
        p = next(p for p in pieces if p[0] <= (lo + hi)/2 <= p[1])
        c = list(p[2:]) + [0]*(5 - len(p))
        s += quad(lambda u: (c[0] + c[1]*u + c[2]*u*u)*f(u), [lo, lo + (hi - lo)/64, lo + (hi - lo)/8, (lo + hi)/2, hi - (hi - lo)/8, hi - (hi - lo)/64, hi])
    return s


def boxes(s1, s2, d):
    """The part (s2 at d) above the source s1, p = 1 along z both."""
    s1, s2, d = [[mpf(t) for t in v] for v in (s1, s2, d)]
    tx, ty = moment(s1[0]/2, s2[0]/2, d[0]), moment(s1[1]/2, s2[1]/2, d[1])
    ax, ay = arm(s1[0]/2, s2[0]/2, d[0]), arm(s1[1]/2, s2[1]/2, d[1])
    # derivative of a weight: u times 1/r^3 integrated by parts
    slope = lambda t: [(p[0], p[1], p[3], mpf(0)) for p in t]
    F, T, W = [mpf(0)]*3, [mpf(0)]*3, mpf(0)
    for e1 in (-1, 1):
        for e2 in (-1, 1):
            z2 = e2*s2[2]/2
            w = d[2] + z2 - e1*s1[2]/2
            q = e1*e2/(4*pi)
            one = lambda u: inner(ty, u*u + w*w, 0)
            cube = lambda u: inner(ty, u*u + w*w, 1)
            fx = outer(slope(tx), one)
            fy = outer(tx, lambda u: inner(slope(ty), u*u + w*w, 0))
            fz = w*outer(tx, cube)
            W += q*outer(tx, one)
            F = [F[0] + q*fx, F[1] + q*fy, F[2] + q*fz]
            # torque x cross f about the centre of the part: x from the arm weights
            xfz, yfz = w*outer(ax, cube), w*outer(tx, lambda u: inner(ay, u*u + w*w, 1))
            dy = [(p[0], p[1], p[3], 2*p[4]) for p in ay]
            dx = [(p[0], p[1], p[3], 2*p[4]) for p in ax]
            xfy = outer(ax, lambda u: inner(slope(ty), u*u + w*w, 0))
            yfx = outer(slope(tx), lambda u: inner(ay, u*u + w*w, 0))
            T = [T[0] + q*(yfz - z2*fy), T[1] + q*(z2*fx - xfz), T[2] + q*(xfy - yfx)]
    return F, T, W


def coaxial(a1, l1, a2, l2, gap):
    a, b, l1, l2, gap = [mpf(t) for t in (a1, a2, l1, l2, gap)]
    knots = [mpf(0)] + [pi*mpf(2)**-k for k in range(12, -1, -1)]
    F = W = mpf(0)
    for s, z in ((-1, gap), (1, gap + l1), (1, gap + l2), (-1, gap + l1 + l2)):
        r = lambda t: sqrt((a - b)**2 + 4*a*b*mp.sin(t/2)**2 + z*z)
        F += s*a*b*quad(lambda t: -log(z + r(t))*cos(t), knots)
        W += s*a*b*quad(lambda t: (z*log(z + r(t)) - r(t))*cos(t), knots)
    return F, W


def text(v):
    return [mp.nstr(t, 25, strip_zeros=True) for t in v]


cases = []
S1, S2 = [1.0, 1.25, 0.75], [1.5, 0.5, 1.0]
for gap in (0.01, 1.0, 10.0, 100.0):
    d = [0.25, 0.375, gap + 0.875]
    F, T, W = boxes(S1, S2, d)
    cases.append({"kind": "boxes", "gap": gap, "source": S1, "part": S2, "at": d, "force": text(F), "torque": text(T), "energy": text([W])[0]})
for gap in (0.01, 1.0, 10.0, 100.0):
    F, W = coaxial(1.0, 1.0, 0.75, 1.5, gap)
    cases.append({"kind": "coaxial", "gap": gap, "source": [1.0, 1.0], "part": [0.75, 1.5], "force": text([0, 0, F]), "torque": text([0, 0, 0]), "energy": text([W])[0]})
print("[\n" + ",\n".join(json.dumps(c) for c in cases) + "\n]")
