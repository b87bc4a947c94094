"""Multiprecision numbers of the integrators: gmpy2.mpfr (or mpf where gmpy2 is missing) at the precision of mpmath (mp.dps);
conversions both ways."""
import os
import sys
from fractions import Fraction as Fr

sys.path[:0] = [os.path.dirname(os.path.abspath(__file__)), "../hard"]
try:
    import gmpy2
except ImportError:                                  # mpmath alone will do
    import plainmp as gmpy2
    sys.modules["gmpy2"] = gmpy2
from gmpy2 import atan, atan2, cos, log, log1p, mpfr, sin, sinh, cosh, asinh, sqrt, hypot  # noqa: F401
from mpmath import mp, mpf

import gen

NODES = {46: 22, 70: 30, 80: 40, 100: 40, 130: 52, 220: 74}
gen.DIGITS = (70, 100, 220)
SCALE = [1]                                         # factor on the scale of the sinh maps (other panels, for checks)
_rules = {}


def N(q):
    """mpfr of an int, float, Fraction, mpf or mpfr."""
    if isinstance(q, Fr):
        return mpfr(gmpy2.mpq(q.numerator, q.denominator))
    if isinstance(q, mpf):
        sign, man, exp, _ = q._mpf_
        v = mpfr(man)
        v = gmpy2.mul_2exp(v, exp) if exp >= 0 else gmpy2.div_2exp(v, -exp)
        return -v if sign else v
    return mpfr(q)


def back(v):
    """mpf of an mpfr."""
    if isinstance(v, mpf) or not isinstance(v, type(mpfr(0))):
        return mpf(v)
    if v == 0:
        return mpf(0)
    m, e = v.as_mantissa_exp()
    return mp.ldexp(mpf(int(m)), int(e))


def tune():
    """Set the precision of gmpy2 to that of mpmath."""
    gmpy2.get_context().precision = int(mp.dps * 3.3220) + 12


def pi():
    return gmpy2.const_pi()


def rule(n=None):
    n = n or NODES.get(mp.dps, 40)
    key = n, mp.dps
    if key not in _rules:
        _rules[key] = [(N(t), N(w)) for t, w in gen.legendre(n, mp.dps)]
    return _rules[key]


def on(lo, hi, n=None):
    """Nodes and weights of Gauss-Legendre on [lo, hi]."""
    h, m = (hi - lo) / 2, (hi + lo) / 2
    return [(m + h * t, w * h) for t, w in rule(n)]


def cel(kc, p, a, b):
    """Bulirsch's complete elliptic integral int_0^(pi/2) (a cos^2 + b sin^2)/((cos^2 + p sin^2) sqrt(cos^2 + kc^2 sin^2)), p > 0."""
    tol = gmpy2.exp2(-(gmpy2.get_context().precision // 2) - 2)
    e, m = kc, mpfr(1)
    p = sqrt(p)
    b = b / p
    f, g = a, e / p
    a = a + b / p
    b = 2 * (b + f * g)
    p = p + g
    g = m
    m = m + kc
    while abs(g - kc) > g * tol:
        kc = 2 * sqrt(e)
        e = kc * m
        f, g = a, e / p
        a = a + b / p
        b = 2 * (b + f * g)
        p = p + g
        g = m
        m = m + kc
    return pi() / 2 * (b + a * m) / (m * (m + p))


class Ring:
    """Integrals round a circle of radius a for a target at distance s from the axis and height z above it."""

    def __init__(self, a, s, z, ds=None):
        self.a, self.s, self.z = a, s, z
        ds = a - s if ds is None else ds
        self.ds = ds
        self.Q = (a + s) ** 2 + z * z
        self.sq = sqrt(self.Q)
        self.kc = sqrt((ds * ds + z * z) / self.Q)

    def charge(self):
        """oint 1/R, oint cos/R."""
        k = 4 / self.sq
        return k * cel(self.kc, mpfr(1), mpfr(1), mpfr(1)), k * cel(self.kc, mpfr(1), mpfr(-1), mpfr(1))

    def force(self):
        """oint 1/R^3, oint cos/R^3."""
        k = 4 / (self.Q * self.sq)
        p = self.kc * self.kc
        return k * cel(self.kc, p, mpfr(1), mpfr(1)), k * cel(self.kc, p, mpfr(-1), mpfr(1))

    def third(self):
        """oint 1/(q^2 R), q the distance in the plane of the circle."""
        t = self.a + self.s
        g = self.ds / t
        return 4 / (t * t * self.sq) * cel(self.kc, g * g, mpfr(1), mpfr(1))
