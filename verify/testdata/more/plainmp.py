"""What num.py uses of gmpy2, on mpmath alone: the same digits, some times slower."""
from math import comb

from mpmath import mp, mpf
from mpmath import asinh, atan, atan2, cos, cosh, exp, floor, hypot, log, log1p, sin, sinh, sqrt  # noqa: F401


mpfr = mpf


def mpq(n, d):
    return mpf(n) / d


def mul_2exp(v, n):
    return mp.ldexp(v, n)


def div_2exp(v, n):
    return mp.ldexp(v, -n)


def exp2(n):
    return mpf(2) ** n


def const_pi():
    return +mp.pi


def bincoef(n, k):
    return comb(n, k)


class Context:
    """The precision is that of mpmath, whatever is set."""

    @property
    def precision(self):
        return mp.prec

    @precision.setter
    def precision(self, bits):
        pass


def get_context():
    return Context()
