"""Writes circle.json, complete.json, carlson.json and cel.json.

Method: Carlson's symmetric integrals of mpmath with 90 digits, where the
cancellation of the classical forms does no harm; the circle integrals are
first held against direct quadrature over the angle. Inputs are float64 in
hexadecimal and exact; values have 25 digits. Near the rim rho is the float64
next to a - gap, and the values belong to a - gap exactly.
Run: python3 reference.py (mpmath 1.3)
"""
import json, random
import mpmath as mp

mp.mp.dps = 90
rf, rd, rj, rc = mp.elliprf, mp.elliprd, mp.elliprj, mp.elliprc


def hx(x): return float(x).hex()
def s25(x): return mp.nstr(x, 25) if x != 0 else "0"
def rpart(x): return mp.re(x)


def circle(a, rho, z):
    """U, T1, S3, C3, Omega, S, E of a circle (radius a) at (rho, z); mpf."""
    s, z = mp.sign(z), abs(z)
    Q, q1 = (a + rho) ** 2 + z * z, (a - rho) ** 2 + z * z
    k2, sQ, m = q1 / Q, mp.sqrt(Q), 4 * a * rho / Q
    K, D, B = rf(0, k2, 1), rd(0, k2, 1) / 3, k2 * rd(0, 1, k2) / 3
    E = B + k2 * D
    U, T1 = 4 * a / sQ * K, 4 * a / sQ * (D - B)
    S3, C3 = 4 * E / (sQ * q1), 4 / (Q * sQ * k2) * (B - k2 * D)
    if rho == 0:
        return U, mp.mpf(0), S3, mp.mpf(0), s * 2 * mp.pi * (1 - z / sQ), s * mp.pi * z / sQ, mp.mpf(0)
    n, g = 4 * a * rho / (a + rho) ** 2, (a - rho) / (a + rho)
    if g == 0:
        Om, G, e = (mp.pi - 2 * z / sQ * K if z != 0 else 0), D, 2 * z / sQ * K
    else:
        P = rj(0, k2, 1, g * g) / 3  # (Pi - K)/n
        C, Cm = K + g * (1 - g) * P, K - g * (1 + g) * P
        G = (D - g * g * P) / n
        Om = (2 * mp.pi if rho < a else 0) - 4 * a / (a + rho) * z / sQ * C
        e = 4 * a * z / ((a + rho) * sQ) * Cm
    if z == 0:
        Om = mp.mpf(0)
    return U, T1, S3, C3, s * Om, s * 16 * a * a * z / ((a + rho) ** 2 * sQ) * G, s * e


def quadrature(a, rho, z):
    def integral(f):
        return 2 * mp.quad(f, [0, mp.mpf(1) / 50, mp.mpf(1) / 5, 1, 2, mp.pi])
    q2 = lambda f: a * a + rho * rho - 2 * a * rho * mp.cos(f)
    R = lambda f: mp.sqrt(q2(f) + z * z)
    return (integral(lambda f: a / R(f)), integral(lambda f: a * mp.cos(f) / R(f)),
            integral(lambda f: R(f) ** -3), integral(lambda f: mp.cos(f) * R(f) ** -3),
            mp.sign(z) * integral(lambda f: a * (a - rho * mp.cos(f)) / (R(f) * (R(f) + abs(z)))),
            integral(lambda f: a * a * z * mp.sin(f) ** 2 / (q2(f) * R(f))),
            integral(lambda f: a * z * (rho - a * mp.cos(f)) / (q2(f) * R(f))))


def verify():
    mp.mp.dps = 30
    for a, rho, z in ((1, .5, .3), (1, 1.4, -.6), (1, .9, .2), (1, .01, 2.5), (1, 3, 7), (2, 1.9, -.05)):
        a, rho, z = mp.mpf(a), mp.mpf(rho), mp.mpf(z)
        for x, y in zip(circle(a, rho, z), quadrature(a, rho, z)):
            assert abs(x / y - 1) < mp.mpf(10) ** -20, (a, rho, z, x, y)
    mp.mp.dps = 90


def circles():
    rnd, out = random.Random(7), []

    def put(group, a, rho, z, gap=None):
        a, rho, z = float(a), float(rho), float(z)
        true = mp.mpf(rho) if gap is None else mp.mpf(a) - mp.mpf(gap)
        gap = mp.mpf(a) - true
        q1 = gap ** 2 + mp.mpf(z) ** 2
        v = circle(mp.mpf(a), true, mp.mpf(z))
        out.append(dict(group=group, a=hx(a), rho=hx(float(true)), z=hx(z), gap=hx(gap), q1=hx(q1),
                        value=[s25(x) for x in v]))

    def sphere(r):
        t = rnd.random() * mp.pi
        return r * mp.sin(t), r * mp.cos(t)
    for k in range(0, 25):  # distance 1e-12 .. 1 from the rim
        d = mp.mpf(10) ** (mp.mpf(-k) / 2)
        for j in range(8):
            t = 2 * mp.pi * (j + rnd.random() * (k % 2)) / 8
            dz = float(d * mp.sin(t)) if k % 2 or j % 4 else 0.0
            put("rim", 1 + (j % 3) * .37, 0, dz, float(d * mp.cos(t) * mp.mpf("0.999")))
        put("rim", 1.5, 0, float(d), 0.0)
        put("rim", 1.5, 0, float(d), float(d * d))
        put("rim", 1.5, 0, float(d * d), float(-d))
    for k in range(0, 25):  # distance 1e-12 .. 1 from the axis
        d = mp.mpf(10) ** (mp.mpf(-k) / 2)
        for z in (1e-9, .3, -1.1, 2.7, 40., 3e5):
            put("axis", .8, d * (.5 + rnd.random() / 2) * mp.mpf(".8"), z * (1 + rnd.random() / 9))
    for z in (1e-9, .3, -1.1, 2.7, 40., 3e5):
        put("axis", .8, 0, z)
    for k in range(1, 13):  # distance 3 .. 1e6
        for r in (mp.mpf(10) ** (mp.mpf(k) / 2), mp.mpf(10) ** (mp.mpf(k) / 2) * 2):
            for j in range(4):
                put("far", 1.2, *sphere(r))
            put("far", 1.2, r, 1e-9 * r)
            put("far", 1.2, r * mp.mpf("1e-3"), r)
            put("far", 1.2, 1.3, r)
            put("far", 1.2, 1.1, r)
    for k in range(0, 13):  # distance 1e-12 .. 1 from the plane
        d = mp.mpf(10) ** -k * mp.mpf(".7")
        for rho in (.1, .6, .97, 1.02, 1.5, 6.):
            put("plane", 1, rho * (1 + rnd.random() / 100), d)
    for j in range(240):
        put("middle", 1, 3 * rnd.random(), 4 * rnd.random() - 2)
    for j in range(60):  # about the change of formula at |z| = max(a, rho)
        rho = 3 * rnd.random()
        put("switch", 1, rho, max(1, rho) * (1 + (rnd.random() - .5) / 100))
    return out


def complete():
    rnd, out = random.Random(8), []
    for x in [10 ** (-k / 2 + rnd.random() / 2) for k in range(0, 90)] + [1 - 10.0 ** -k for k in range(1, 16)] + [1.0] + [10 ** (k / 2 + rnd.random() / 2) for k in range(12)]:
        y = mp.mpf(x)
        D, B = rd(0, y, 1) / 3, y * rd(0, 1, y) / 3
        out.append(dict(kc2=hx(x), value=[s25(v) for v in (D + B, B + y * D, B, D)]))
    return out


def carlson():
    rnd, out = random.Random(9), []
    for i in range(300):
        v = [float(10 ** rnd.uniform(-8, 4)) for _ in range(4)]
        if i % 3 == 0:
            v = [0.0, 10 ** rnd.uniform(-12, 0), 1.0, 10 ** rnd.uniform(-14, 2)]
        if i % 7 == 0:
            v[3] = v[2] * (1 + (rnd.random() - .5) * 10 ** rnd.uniform(-15, 0))
        x, y, z, p = map(mp.mpf, v)
        out.append(dict(arg=[hx(t) for t in v], value=[s25(rpart(t)) for t in (rf(x, y, z), rc(x, p), rd(x, y, z), rj(x, y, z, p))]))
    return out


def cel():
    rnd, out = random.Random(10), []
    for i in range(150):
        kc, p, a, b = 10 ** rnd.uniform(-8, .5), 10 ** rnd.uniform(-10, 4), rnd.random(), rnd.random()
        k2, P = mp.mpf(kc) ** 2, mp.mpf(p)
        out.append(dict(arg=[hx(t) for t in (kc, p, a, b)], value=s25(a * rf(0, k2, 1) + (mp.mpf(b) - P * mp.mpf(a)) / 3 * rj(0, k2, 1, P))))
    return out


if __name__ == "__main__":
    verify()
    for name, f in (("circle", circles), ("complete", complete), ("carlson", carlson), ("cel", cel)):
        with open(name + ".json", "w") as w:
            w.write("[\n" + ",\n".join(json.dumps(r) for r in f()) + "\n]\n")
