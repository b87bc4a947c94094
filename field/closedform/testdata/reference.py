"""Writes reference.json: python3 reference.py > reference.json

For every function of the package: arguments, exact in binary, and the value in
25 digits, worked out by mpmath in 40 digits from a defining integral, a derivative, a
limit or another formulation than the one coded; "how" names it. Arguments are flat
lists in the order of the Go signature, vectors as three numbers.
"""
import json
import random
from mpmath import mp, mpf, quad, diff, sqrt, log, exp, sin, cos, atan, pi, inf, fsum, elliprd, matrix, lu_solve, asinh, cosh

mp.dps = 40
random.seed(20)
CASES = []


def flat(v):
    return [w for x in v for w in flat(x)] if isinstance(v, (list, tuple)) else [v]


def add(f, args, value, how):
    y = [mp.nstr(mpf(w), 25, strip_zeros=True) for w in flat(value)]
    x = ["inf" if a == inf else float(a) for a in flat(args)]
    CASES.append({"f": f, "x": x, "y": y, "how": how})


def many(f, rows, fn, how):
    for row in rows:
        a = [mpf(float(t)) if not isinstance(t, int) else t for t in flat(row)]
        add(f, a, fn(*a), how)


def norm(v):
    return sqrt(fsum(t * t for t in v))


def dot(a, b):
    return fsum(s * t for s, t in zip(a, b))


def cross(a, b):
    return [a[1]*b[2]-a[2]*b[1], a[2]*b[0]-a[0]*b[2], a[0]*b[1]-a[1]*b[0]]


def grad(f, x):
    return [diff(lambda *t: f(list(t)), tuple(x), tuple(1 if i == j else 0 for j in range(3))) for i in range(3)]


def rnd(n, scale=2.0):
    return [round(random.uniform(-scale, scale), 3) for _ in range(n)]


def pts(n, scale=2.0):
    return [rnd(3, scale) for _ in range(n)]


Q = 1 / (4 * pi)

# ---- point.go, dipole.go: derivatives of q/(4 pi r)
X = pts(12) + [[1e-9, 2e-9, -3e-9], [1e6, -2e6, 5e5], [0, 0, 2], [3, 0, 0]]
many("PointPotential", [[1.5] + x for x in X], lambda q, *x: q * Q / norm(x), "Coulomb's law")
many("PointField", [[1.5] + x for x in X[:12] + X[14:]], lambda q, *x: [-t for t in grad(lambda r: q * Q / norm(r), x)], "derivative of the potential")


def hess(f, x):
    e = lambda i, j: tuple((1 if k == i else 0) + (1 if k == j else 0) for k in range(3))
    return [[diff(lambda *t: f(list(t)), tuple(x), e(i, j)) for j in range(3)] for i in range(3)]


many("PointGradient", [[1.5] + x for x in X[:8]], lambda q, *x: [[-t for t in r] for r in hess(lambda r: q * Q / norm(r), x)], "second derivatives of the potential")


def two(q, L, x):
    return q * Q * (1 / norm([x[0], x[1], x[2] - L / 2]) - 1 / norm([x[0], x[1], x[2] + L / 2]))


PP = [[2.0, 1.5] + x for x in X[:8]] + [[2.0, 1.5, 0, 0, 1e4], [2.0, 1.5, 3e5, 1e5, 2e5], [1.0, 1e-3, 0.25, 0.5, -1]]
many("TwoPolePotential", PP, lambda q, L, *x: two(q, L, x), "two charges, 40 digits")
many("TwoPoleField", PP, lambda q, L, *x: [q * Q * ((x[i] - (L/2 if i == 2 else 0)) / norm([x[0], x[1], x[2]-L/2])**3 -
     (x[i] + (L/2 if i == 2 else 0)) / norm([x[0], x[1], x[2]+L/2])**3) for i in range(3)], "two charges, 40 digits")


def dip(m, x):
    return -dot(m, grad(lambda r: Q / norm(r), x))


D = [rnd(3) + rnd(3) for _ in range(12)] + [[1, 2, 3, 0, 0, 2], [1, 0, 0, 0, 0, 2]]
many("DipolePotential", D, lambda *a: dip(a[:3], a[3:]), "minus m.grad of 1/(4 pi r)")
many("DipoleField", D, lambda *a: [-t for t in grad(lambda r: Q * dot(a[:3], r) / norm(r)**3, a[3:])], "derivative of the potential")
many("DipoleGradient", D, lambda *a: [[-t for t in r] for r in hess(lambda r: Q * dot(a[:3], r) / norm(r)**3, a[3:])], "second derivatives of the potential")
D2 = [rnd(3) + rnd(3) + rnd(3) for _ in range(10)] + [[0, 0, 1, 0, 0, 1, 0, 0, 1]]


def g1(m, x):
    r = norm(x)
    return [Q * (3 * dot(m, x) * x[i] / r**5 - m[i] / r**3) for i in range(3)]


many("DipoleEnergy", D2, lambda *a: -dot(a[3:6], g1(a[:3], a[6:])), "minus m2.g, 40 digits")
many("DipoleForce", D2, lambda *a: grad(lambda x: dot(a[3:6], g1(a[:3], x)), a[6:]), "derivative of m2.g")
many("DipoleTorque", D2[:10], lambda *a: cross(a[3:6], g1(a[:3], a[6:])), "cross product, 40 digits")
many("FieldTorque", [rnd(6) for _ in range(8)] + [[1, 2, 3, 0.1, -0.2, 0.3]], lambda *a: cross(a[:3], a[3:]), "cross product, 40 digits")
many("DipoleAxialDistance", [[129.3, 400], [3.25, 0.5], [1e-6, 30], [2, 1e-9]],
     lambda m, g: exp(log(2*Q*m/g)/3), "axial field solved by logarithms")


# ---- spheres: Poisson's theorem, phi = -p.grad of the potential of unit charge
def ball(a, x):
    r = norm(x)
    return (3*a*a - r*r) / 6 if r < a else a**3 / 3 / r


S = [rnd(3) + [1.25] + x for x in pts(10) + [[0.1, 0.2, 0.3], [0, 0, 1.5], [1.2, 0, 0]]]
many("SpherePotential", S, lambda *a: -dot(a[:3], grad(lambda x: ball(a[3], x), a[4:])), "Poisson's theorem")


def poisson_field(u, p, x):
    h = hess(u, x)
    return [dot(p, h[i]) for i in range(3)]


many("SphereField", S, lambda *a: poisson_field(lambda x: ball(a[3], x), a[:3], a[4:]), "Poisson's theorem")


def shell(a, b, x):
    return ball(b, x) - ball(a, x)


H = [rnd(3) + [0.75, 1.5] + x for x in [[1, 0.3, -0.2], [0.5, 0.5, 0.5], [0.2, 0.1, 0.7501], [1, 1, 1], [0, 2, 0], [-3, 1, 0.5], [0, 0, 1.4999]]]
H += [rnd(3) + [1.0, 1.0 + 2.0**-20] + x for x in [[2, 1, 0], [0.5, -1, 1]]]
many("HollowSpherePotential", H, lambda *a: -dot(a[:3], grad(lambda x: shell(a[3], a[4], x), a[5:])), "Poisson's theorem")
many("HollowSphereField", H, lambda *a: poisson_field(lambda x: shell(a[3], a[4], x), a[:3], a[5:]), "Poisson's theorem")


# ---- chargedsphere.go: integrals over shells
def shellphi(s, a, r):
    return s * a * a / 2 * quad(lambda t: 1 / sqrt(a*a + r*r - 2*a*r*t), [-1, 1])


R = [0.25, 0.5, 0.875, 1.75, 3, 40]
many("ChargedShellPotential", [[1.5, 1.25, r] for r in R], shellphi, "integral over the polar angle")
many("ChargedShellField", [[1.5, 1.25, r] for r in R[3:]], lambda s, a, r: quad(lambda t: s*a*a/2*(r - a*t) / sqrt(a*a + r*r - 2*a*r*t)**3, [-1, 1]), "integral over the polar angle")
many("ChargedSpherePotential", [[1.5, 1.25, r] for r in R], lambda rho, a, r: quad(lambda s: rho * s * s / max(s, r), [0, min(r, a), a]), "integral over shells")
many("ChargedSphereField", [[1.5, 1.25, r] for r in R], lambda rho, a, r: quad(lambda s: rho * s * s, [0, min(r, a)]) / r**2, "enclosed charge")

# ---- power.go, axialpower.go
CP = [[c, n, 1.25, r] for c, n in [(2.0, 1.0), (-1.5, 0.0), (1.0, 2.0), (0.5, -0.5), (0.7, 3.5)] for r in [0.125, 0.75, 1.2421875, 1.25 - 2.0**-30]]
CE = CP + [[1.5, -1.0, 1.25, 0.5], [1.5, -1.5, 1.25, 0.25], [1.0, -0.9990234375, 1.25, 0.5]]
pot = lambda c, n, a, r: -quad(lambda t: c * t**n, [r, a])
fld = lambda w: (lambda c, n, a, r: (quad(lambda t: -c * (n + w - 1) * t**(n + w - 2), [0, r]) if n > 2 - w else -c * r**(n + w - 1)) / r**(w - 1))
many("CentralPowerPotential", CE, pot, "integral of c t^n")
many("RadialPowerPotential", CP, pot, "integral of c t^n")
many("CentralPowerField", CE, lambda c, n, a, r: fld(mpf(3))(c, n, a, r), "enclosed charge")
many("RadialPowerField", CP, lambda c, n, a, r: fld(mpf(2))(c, n, a, r), "enclosed charge")
many("CentralPowerCharge", [[2.0, 1.0, 1.25], [-1.5, 0.5, 2.0], [1.0, -1.5, 0.5], [1.0, 3.0, 1e-3]], lambda c, n, a: [4*pi*a*a*c*a**n, -4*pi*a*a*c*a**n], "area times density")
many("CentralPowerDensity", [[2.0, 1.0, 0.5], [1.5, -1.0, 2.0], [1.0, 2.5, 0.75]], lambda c, n, r: -diff(lambda t: t*t*c*t**n, r) / r**2, "divergence by differentiation")
many("RadialPowerCharge", [[2.0, 1.0, 0.5, 1.25, 3.0], [1.5, -1.0, 0.5, 1.0, 2.0], [1.0, 2.5, 0.0, 0.75, 1.0], [1.0, -2.0, 0.5, 0.5 + 2.0**-20, 1.0], [1.0, 0.0, 0.5, 1.0, 1.0]],
     lambda c, n, i, o, h: [2*pi*h*o*c*o**n, -2*pi*h*i*c*i**n if i else 0, 0 if n == -1 else quad(lambda s: -c*(n+1)*s**(n-1)*2*pi*s*h, [i, o])], "integral of the density")
many("RadialPowerDensity", [[2.0, 1.0, 0.5], [1.5, -2.0, 2.0], [1.0, 2.5, 0.75]], lambda c, n, r: -diff(lambda t: t*c*t**n, r) / r, "divergence by differentiation")
AP = [[2.0, 1, 0.0, 0.75, 3.0], [1.0, 0, -1.0, 2.0, 1.5], [1.0, 2, -1.0, 0.5, 1.0], [0.5, 3, 1.0, 1.0 + 2.0**-20, 2.0], [0.5, 5, -0.75, 1.25, 2.0], [1.0, 4, 2.0, 3.0, 1.0]]
many("AxialPowerCharge", AP, lambda c, n, a, b, A: [-A*c*a**n, A*c*b**n, -A*quad(lambda z: c*n*z**(n-1) if n else mpf(0), [a, b])], "integral of the density")
many("AxialPowerDensity", [[2.0, 0, 0.5], [1.5, 1, -2.0], [1.0, 3, -0.75], [1.0, 4, 1.5]], lambda c, n, z: -diff(lambda t: c*t**n, z), "divergence by differentiation")
many("AxialPowerSlabField", [r[:4] + [z] for r in AP[:3] for z in (0.25, 0.4375)], lambda c, n, a, b, z: -c*z**n, "g = -p")
many("AxialPowerSlabVoltage", [r[:4] for r in AP], lambda c, n, a, b: quad(lambda z: c*z**n, [a, b]), "integral of p")

# ---- disc.go
Z = [0.0625, -0.25, 0.5, 1.0, -3.0, 10.0, 1e3, 1e6, 1e-6]
disc = lambda s, a, z: quad(lambda r: s / 2 * r / sqrt(r*r + z*z), [0, a])


def discg(s, a, z):
    return quad(lambda t: s * a * a * z * t / 2 / sqrt(a*a*t*t + z*z)**3, sorted({mpf(0), min(abs(z) / a, mpf(1)), min(8 * abs(z) / a, mpf(1)), min(64 * abs(z) / a, mpf(1)), mpf(1)}))


many("RingAxisPotential", [[1.5, 1.25, z] for z in Z + [0.0]], lambda l, a, z: quad(lambda t: l*a*Q / sqrt(a*a*cos(t)**2 + a*a*sin(t)**2 + z*z), [0, 2*pi]), "integral along the ring")
many("RingAxisField", [[1.5, 1.25, z] for z in Z], lambda l, a, z: -diff(lambda t: l*a/2/sqrt(a*a + t*t), z), "derivative of the potential")
many("DiscAxisPotential", [[1.5, 1.25, z] for z in Z], disc, "integral over rings")
many("DiscAxisField", [[1.5, 1.25, z] for z in Z[:7]], discg, "integral over rings")
AZ = [[1.5, i, o, z] for i, o in [(0.5, 1.25), (1.0, 1.0 + 2.0**-20)] for z in Z]
many("AnnulusAxisPotential", AZ, lambda s, i, o, z: quad(lambda r: s/2*r/sqrt(r*r + z*z), [i, o]), "integral over rings")
many("AnnulusAxisField", AZ, lambda s, i, o, z: quad(lambda r: s/2*r*z/sqrt(r*r + z*z)**3, [i, o]), "integral over rings")


def j1sq(h, n):
    """int J1^2 exp(-hx) x^-n by the product formula J1(x)^2 = (2/pi) int_0^(pi/2) J2(2x cos t) dt:
    Laplace transform of J2(bx) x^-n in closed form, then one angle."""
    def lt(b):
        r = sqrt(h*h + b*b)
        u = b / (r + h)
        if n == 1:
            return u**2 / 2
        return b * (u + u**3 / 3) / 4
    return 2 / pi * quad(lambda t: lt(2 * cos(t)), [0, pi/8, pi/4, 3*pi/8, 7*pi/16, 31*pi/64, 127*pi/256, 511*pi/1024, 4095*pi/8192, pi/2])


many("DiscRimPotential", [[1.5, 1.25], [1.0, 1.0], [-2.0, 1e-3]], lambda s, a: s*Q*quad(lambda t: 2*a*cos(t), [-pi/2, pi/2]), "polar integral about the rim point")
many("DiscSelfEnergy", [[1.5, 1.25], [1.0, 1.0], [-2.0, 1e-3]], lambda s, a: s*s*pi*a**3/2*j1sq(mpf(0), 2), "Lipschitz-Hankel integral over one angle")
HD = [1e-6, 0.0625, 0.5, 1.0, 2.0, 3.0, 3.25, 3.5, 3.75, 5.0, 20.0, 1e3, 1e-30] + [round(10**random.uniform(-2, 2), 6) for _ in range(30)]
many("DiscPairForce", [[1.5, -2.0, 1.0, h] for h in HD], lambda s, t, a, d: s*t*pi*a*a*j1sq(d/a, 1), "Lipschitz-Hankel integral over one angle")
many("DiscPairEnergy", [[1.5, -2.0, 1.0, h] for h in HD], lambda s, t, a, d: s*t*pi*a**3*j1sq(d/a, 2), "Lipschitz-Hankel integral over one angle")
CC = [[1, 1, 1, 2, 2, 0.5], [1, 1, 1, 1, 1, 0.01], [1, 1, 1, 1, 1, 2], [0.7, -1.1, 5.0, 5.0, 8.0, 1.0], [1, 1, 1, 0.5, 3, 8]] + [[1.0, 1.0] + [round(10**random.uniform(-1, 1), 6) for _ in range(4)] for _ in range(20)]
many("CoaxialCylinderForce", [[float(t) for t in r] for r in CC], lambda p, q, a, k, l, g: -p*q*pi*a*a*(j1sq(g/a, 1) - j1sq((g+k)/a, 1) - j1sq((g+l)/a, 1) + j1sq((g+k+l)/a, 1)), "Lipschitz-Hankel integral over one angle")

# ---- cylinder.go, tube.go
ring_phi = lambda a, u: a / 2 / sqrt(a*a + u*u)
CZ = [[1.5, a, L, z] for a, L in [(1.25, 2.0), (4.0, 0.5), (0.25, 10.0)] for z in [0.125, -0.5, 3.0, -8.0, 100.0, 1e4, L/2 + 2.0**-20]]
CZ += [[1.5, 1.25, 2.0, 1 - 2.0**-20]]
big = CZ
dg = lambda a, u: (1 if u > 0 else -1) * 1 / mpf(2) - u / 2 / sqrt(u*u + a*a)
cyl_phi = lambda p, a, L, z: p/2*(sqrt((z-L/2)**2 + a*a) - abs(z-L/2) - sqrt((z+L/2)**2 + a*a) + abs(z+L/2))
bsol = lambda p, a, L, z: quad(lambda t: p*a*a/2/sqrt(a*a + (z-t)**2)**3, sorted({-L/2, L/2} | {t for t in (z, z - a, z + a) if -L/2 < t < L/2}))
many("CylinderAxisPotential", big, cyl_phi, "two discs, 40 digits")
many("CylinderAxisInduction", big, bsol, "integral over current loops")
many("CylinderAxisField", big, lambda p, a, L, z: bsol(p, a, L, z) - (p if abs(z) < L/2 else 0), "integral over current loops")
many("TwoDiscAxisField", [r for r in big if abs(r[3]) < 50], lambda p, a, L, z: bsol(p, a, L, z) - (p if abs(z) < L/2 else 0), "integral over current loops")
many("ChargedCylinderAxisField", big, lambda p, a, L, z: quad(lambda t: p*dg(a, z-t), sorted({-L/2, L/2} | ({z} if abs(z) < L/2 else set()))), "integral over discs")
many("LinearCylinderAxisField", [r for r in big if abs(r[3]) < 10], lambda c, a, L, z: quad(lambda t: c*t*a*a/2/sqrt(a*a + (z-t)**2)**3, sorted({-L/2, L/2} | {t for t in (z, z - a, z + a) if -L/2 < t < L/2})) - (c*z if abs(z) < L/2 else 0), "integral over current loops of c t, less p")
many("FaceCentreInduction", [[1.3, 4.0, 3.0], [1.0, 1.0, 100.0], [1.0, 1.0, 1e-3]], lambda p, a, L: bsol(p, a, L, L/2), "integral over current loops")
TZ = [[1.5, i, o, L, z] for i, o, L in [(0.5, 1.25, 2.0), (1.0, 1.0625, 4.0)] for z in [0.0, 0.125, -0.25, 1.0, 3.0, -8.0]]
ann = lambda i, o, u: quad(lambda r: r/2/sqrt(r*r + u*u), [i, o])
many("TubeAxisPotential", [t for t in TZ if t[4]], lambda p, i, o, L, z: p*(ann(i, o, z-L/2) - ann(i, o, z+L/2)), "integral over rings")
many("TubeAxisField", TZ, lambda p, i, o, L, z: quad(lambda r: p*r/2*((z-L/2)/sqrt(r*r + (z-L/2)**2)**3 - (z+L/2)/sqrt(r*r + (z+L/2)**2)**3), [i, o]), "integral over rings")
RZ = [[1.5, i, o, L, z] for i, o, L in [(10.0, 20.0, 8.0), (1.0, 1.0625, 4.0), (0.03125, 4.0, 1.0)] for z in [0.125, -0.25, 3.0, 4.0, 14.0, -20.0, 60.0]]
def radial(p, i, o, L, z):
    # dipole volume integral: p s-directed ring of dipoles, g_z = (3/4pi) (p.u) u_z / r^3
    def inner(s):
        f = lambda t: -p * 3 * s * s * (z - t) / 2 / sqrt(s*s + (z-t)**2)**5
        return quad(f, sorted({-L/2, L/2} | {t for t in (z - s, z, z + s) if -L/2 < t < L/2}))
    brk = [i * 2**k for k in range(12) if i * 2**k < o] + [o]
    return quad(inner, brk)
mp.dps = 28
many("RadialTubeAxisField", RZ, radial, "volume integral over dipoles, 2-D, 28 digits")
mp.dps = 40

# ---- cylinderfactor.go
CF = [[0.5, 2.0**k] for k in range(-8, 9)] + [[1.0, 2*0.99], [1.0, 2*1.01], [1.0, 3.125], [1.0, 3.25], [1.0, 1e4], [1.0, 6.9], [1.0, 7.1], [1.0, 0.9], [1.0, 1e-6]] + [[1.0, round(10**random.uniform(-2, 2), 6)] for _ in range(40)]
many("CylinderCentreFactor", CF, lambda a, L: quad(lambda r: r*(L/2)/sqrt(r*r + L*L/4)**3, sorted({mpf(0), min(L, a), min(8*L, a), min(64*L, a), a})), "integral over the rings of both ends")
mag = lambda a, L: 2*(j1sq(mpf(0), 2) - j1sq(L/a, 2)) / (L/a)
many("CylinderMagnetometricFactor", CF, mag, "Lipschitz-Hankel integral over one angle")
many("CylinderTransverseFactor", CF, lambda a, L: (1 - mag(a, L))/2, "trace, Lipschitz-Hankel integral over one angle")
many("CylinderFluxmetricFactor", CF, lambda a, L: 2*j1sq(L/2/a, 1), "Lipschitz-Hankel integral over one angle")

# ---- slab.go, rod.go
many("PlaneField", [[1.5, 2.0], [1.5, -0.1]], lambda s, z: s/2*mp.sign(z), "Gauss's law")
many("PlanePotential", [[1.5, 2.0], [1.5, -0.1]], lambda s, z: -quad(lambda t: s/2, [0, abs(z)]), "integral of the field")
many("SlabField", [[1, 2, 3, 0.5, 0.2], [1, 2, 3, 0.5, -0.1]], lambda a, b, c, t, z: [0, 0, -c], "Gauss's law")
many("SlabPotential", [[1.0, 2.0, 3.0, 0.5, 0.2], [1.0, 2.0, 3.0, 0.5, -0.7]], lambda a, b, c, t, z: quad(lambda u: c, [0, max(-t/2, min(t/2, z))]), "integral of the field")
many("ChargedSlabField", [[1.5, 0.5, 0.2], [1.5, 0.5, -0.7]], lambda r, t, z: quad(lambda u: r*mp.sign(z-u)/2, [-t/2, max(-t/2, min(t/2, z)), t/2]), "integral over planes")
disc2 = lambda a, x: (a*a - x[0]**2 - x[1]**2)/4 if x[0]**2 + x[1]**2 < a*a else -a*a/2*log(sqrt(x[0]**2 + x[1]**2)/a)
many("EndlessCylinderPotential", S, lambda *a: -dot(a[:3], grad(lambda x: disc2(a[3], x), a[4:])), "Poisson's theorem in the plane")
many("EndlessCylinderField", S, lambda *a: poisson_field(lambda x: disc2(a[3], x), a[:3], a[4:]), "Poisson's theorem in the plane")
many("LinePotential", [[1.5, 0.5, 2.0], [1.5, 3.0, 2.0], [1.0, 2.0 - 2.0**-30, 2.0], [1.0, 1e-9, 1.0]], lambda l, s, t: quad(lambda u: l*2*Q*exp(u)/exp(u), [log(s), log(t)]), "integral of the field")
many("LineField", [[1.5, 0.5], [1.5, 3.0], [1.0, 1e-9]], lambda l, s: quad(lambda t: l*Q*s/sqrt(s*s + t*t)**3, [-inf, -s, 0, s, inf]), "integral along the line")
SG = [[1.5, 2.0, s, z] for s in [0.5, 1.0, 1e-6, 30.0] for z in [0.0, 0.5, -1.5, 1.0, 4.0, 100.0]] + [[1.5, 2.0, 0.0, z] for z in [1.5, -3.0, 1 + 2.0**-20, 1e4]]
def seg(l, L, s, z):
    lo, hi = z - L/2, z + L/2
    if s == 0:
        return l*Q*abs(quad(lambda v: mpf(1), [log(abs(lo)), log(abs(hi))]))
    return l*Q*quad(lambda v: mpf(1), [asinh(lo/s), asinh(hi/s)])
many("SegmentPotential", SG, seg, "integral along the segment, sinh substitution")

# ---- bar.go, loadline.go
many("SlantedEnd", [[1.5, 2.0, 0.0], [1.5, 2.0, 0.5], [-1.0, 0.25, -1.25]], lambda p, A, t: [p*cos(t), A/cos(t), p*cos(t)*(A/cos(t))], "density times area")
many("ContactPull", [[1.5, 2.0], [-3.0, 0.1]], lambda p, A: p*(p/2)*A, "charge p A in the field p/2 of the other face")
many("PermeanceCoefficient", [[0.25], [0.5434], [0.001], [1.0], [0.999755859375]], lambda n: 1/n - 1, "1/N - 1")
def op(p, n, mur):
    pc = (1 - n) / n
    return [p*pc/(pc + mur), -p/(pc + mur)]
many("OperatingPoint", [[1.3, 0.5434, 1.05], [1.0, 1e-3, 1.1], [1.0, 0.75, 2.0], [1.0, 0.999755859375, 1.05]], op, "permeance coefficient")

# ---- ellipsoid.go, spheroid.go: quadrature of the defining integral
def dep(a, b, c):
    """a b c/2 int ds/((a^2+s) sqrt(...)) with s = a^2 (1/t^2 - 1)"""
    return b*c/(a*a)*quad(lambda t: t*t/sqrt((1 + ((b/a)**2 - 1)*t*t)*(1 + ((c/a)**2 - 1)*t*t)), brk(a, b, c))
def brk(a, b, c):
    # break points near the complex singularities of long ratios
    ts = {mpf(0), mpf(1)}
    for r in (b/a, c/a):
        if r > 2:
            ts |= {min(mpf(1), k/r) for k in (1, 4, 16, 64, 256, 1024)}
        if r < 0.5:
            ts |= {max(mpf(0), 1 - k*r*r) for k in (1, 4, 16, 64, 256, 1024, 4096)}
    return sorted(ts)
EL = [[1.0, 1.5, 2.0], [5.0, 1.0, 0.2], [1.0, 1.0, 1.0], [1.0, 1.0, 1.0009765625], [3.0, 2.0, 0.01], [100.0, 1.0, 2.0], [0.5, 0.5, 4.0], [1e-3, 2e-3, 1.5e-3], [1.0, 50.0, 50.0]] + [[round(10**random.uniform(-1, 1), 6) for _ in range(3)] for _ in range(20)]
ef = lambda a, b, c: [dep(a, b, c), dep(b, c, a), dep(c, a, b)]
many("EllipsoidFactors", EL, ef, "quadrature of the defining integral")
many("EllipsoidInnerField", [rnd(3) + e for e in EL], lambda *a: [-p*n for p, n in zip(a[:3], ef(*a[3:]))], "quadrature of the defining integral")
many("EllipsoidSelfEnergy", [rnd(3) + e for e in EL] + [[0.3, -0.7, 1.1, 1, 1.5, 2]], lambda *a: 4*pi/3*a[3]*a[4]*a[5]/2*dot([p*p for p in a[:3]], ef(*map(mpf, a[3:]))), "quadrature of the defining integral")
def eaxis(p, a, b, c, x):
    # Poisson: potential of unit charge on the axis, U = (abc/4) int_lam^inf (1 - x^2/(a^2+s)) ds/D; g_x = p U''
    n = lambda y: quad(lambda t: a*b*c*t*t/sqrt((y*y + (b*b - a*a)*t*t)*(y*y + (c*c - a*a)*t*t)), [0, 0.5, 1])
    # n(y) = y N(lambda(y)); phi = p n(y)
    return -p*diff(n, abs(x))
EA = [[1.5, 1.0, 1.5, 2.0, 1.0625], [1.5, 1.0, 1.5, 2.0, -4.0], [1.0, 2.0, 1.0, 0.5, 3.0], [1.0, 1.0, 1.0, 1.0, 2.0], [1.0, 2.0, 1.0, 0.5, 50.0], [1.0, 1.0, 3.0, 3.0, 1.5], [1.0, 1.0, 3.0, 3.0, 1000.0], [1.0, 4.0, 1.0, 1.0, 4.5]]
many("EllipsoidAxisField", EA, eaxis, "derivative of the quadrature of the potential")
add("SphereFactors", [], [mpf(1)/3]*3, "symmetry")
add("EndlessCylinderFactors", [], [mpf(1)/2, mpf(1)/2, 0], "symmetry")
add("PlateFactors", [], [0, 0, 1], "Gauss's law")
many("EllipticCylinderFactors", [[1.0, 2.0], [3.0, 0.1], [1e-3, 1e-3]], lambda a, b: [quad(lambda t: a*b/2/(a*a + t)**1.5/(b*b + t)**0.5, [0, a*b, inf]), quad(lambda t: a*b/2/(b*b + t)**1.5/(a*a + t)**0.5, [0, a*b, inf]), 0], "quadrature of the defining integral")
MM = [1.0, 1.0 + 2.0**-40, 1.0009765625, 1.03125, 1.04, 1.0498046875, 1.05078125, 1.1, 1.25, 2.0, 5.0, 10.0, 100.0, 1000.0, 1e6, 1e9, 1e100] + [round(1 + 10**random.uniform(-6, 3), 9) for _ in range(40)]
def prolate(m):
    n = elliprd(1, 1, m*m)*m/3
    return [n, elliprd(1, m*m, 1)*m/3]
def oblate(m):
    n = elliprd(1, m*m, m*m)*m*m/3
    return [n, elliprd(m*m, m*m, 1)*m*m/3]
many("ProlateFactors", [[m] for m in MM], prolate, "Carlson R_D, 40 digits")
many("OblateFactors", [[m] for m in MM], lambda m: oblate(m), "Carlson R_D, 40 digits")

# ---- box.go, rectangle.go
def pairs(a, b, L):
    """int int dA dA'/R of two parallel a x b rectangles L apart; x in closed form, y numeric."""
    def inner(y):
        h = sqrt(y*y + L*L)
        return (b - y)*2*(a*asinh(a/h) - (sqrt(a*a + h*h) - h))*2 if h else 0
    bp = sorted({mpf(0), b} | {min(b, s*k) for s in (L, a) for k in (1, 3, 9, 27, 81, 243, 729, 2187, 1e4, 1e5)})
    return quad(inner, bp)
def boxn(a, b, c):
    if c < 1e-9:
        raise ValueError
    return Q*2*(pairs(a, b, mpf(0)) - pairs(a, b, c))/(a*b*c)
BX = [[1, 1, 1], [1, 1, 2], [1, 1, 10], [1, 1, 0.1], [1, 1, 0.01], [1, 2, 3], [0.5, 0.35, 0.8], [20, 10, 5], [10, 5, 20], [5, 20, 10], [1, 1, 100], [1, 1, 1e4], [0.01, 1, 1], [1e-3, 1, 2], [100, 1, 1], [0.01, 10, 3], [1, 1, 1e-6], [1e-6, 1, 1], [1, 1e-6, 1]] + [[round(10**random.uniform(-2, 2), 6) for _ in range(3)] for _ in range(20)]
many("BoxMagnetometricFactor", [[float(t) for t in r] for r in BX], boxn, "energy of the two charged faces")
def boxc(a, b, c):
    return 4*quad(lambda y: 2*Q*c/2*(a/2)/((y*y + c*c/4)*sqrt(a*a/4 + y*y + c*c/4)), sorted({mpf(0), min(c, b/2), min(8*c, b/2), min(64*c, b/2), b/2}))
many("BoxCentreFactor", [[float(t) for t in r] for r in BX], boxc, "flux density of the two charged faces")
def rectg(s, a, b, z):
    u = abs(z)
    return mp.sign(z)*s*Q*4*quad(lambda y: u*(a/2)/((y*y + u*u)*sqrt(a*a/4 + y*y + u*u)), sorted({mpf(0), min(u, b/2), min(8*u, b/2), min(64*u, b/2), b/2}))
def rectphi(s, a, b, z):
    h = lambda y: sqrt(y*y + z*z)
    return s*Q*4*quad(lambda y: asinh(a/2/h(y)), sorted({mpf(0), min(abs(z), b/2), min(8*abs(z), b/2), min(64*abs(z), b/2), b/2}))
RC = [[1.5, 2.0, 0.75, z] for z in [0.0625, -0.5, 1.0, 8.0, 1e3]] + [[1.0, 0.1, 5.0, 0.25]]
many("RectangleAxisField", RC, rectg, "integral over strips")
many("RectangleAxisPotential", RC + [[1.5, 2.0, 0.75, 0.0], [1.0, 1.0, 1.0, 0.0]], rectphi, "integral over strips")
many("BoxAxisInduction", [[1.3, 50.0, 50.0, 50.0, 95.0], [1.0, 20.0, 10.0, 5.0, 3.0], [1.0, 1.0, 1.0, 2.0, 0.125], [1.0, 20.0, 10.0, 5.0, 100.0]], lambda p, a, b, L, z: rectg(p, a, b, z) - rectg(p, a, b, z + L), "integral over strips")
many("RectangleSelfEnergy", [[1.5, 2.0, 0.75], [1.0, 1.0, 1.0], [1.0, 1e-3, 1.0], [1.0, 5.0, 0.01]], lambda s, a, b: s*s*Q/2*pairs(a, b, mpf(0)), "integral over pairs of strips")
many("SquareCentrePotential", [[1.5, 2.0], [1.0, 1.0]], lambda s, a: rectphi(s, a, a, mpf(0)), "integral over strips")
def boxphi(r, a, b, c):
    # one octant of the box, int dz closed: asinh; then 2-D
    f = lambda x, y: asinh(c/2/sqrt(x*x + y*y))
    def polar(A, B):
        return quad(lambda t: quad(lambda s: s*asinh(c/2/s), [0, A/cos(t)]), [0, atan(B/A)])
    return r*Q*8*(polar(a/2, b/2) + polar(b/2, a/2))
mp.dps = 28
many("BoxCentrePotential", [[1.5, 1.0, 2.0, 0.5], [1.0, 1.0, 1.0, 1.0]], boxphi, "polar integral over one octant, 28 digits")
many("CubeCentrePotential", [[1.5, 2.0], [1.0, 1.0]], lambda r, a: boxphi(r, a, a, a), "polar integral over one octant, 28 digits")
many("CubeCornerPotential", [[1.5, 2.0], [1.0, 1.0]], lambda r, a: boxphi(r, 2*a, 2*a, 2*a)/8, "polar integral over one octant, 28 digits")
mp.dps = 40

# ---- image.go
many("ImageFactor", [[0.0], [1.0], [2.0], [80.0], [1.0009765625], [1e12]], lambda e: 1 - 2/(e + 1), "1 - 2/(eps+1)")
add("ImageFactor", [inf], 1, "limit")
many("ImageTransmission", [[0.0], [2.0], [80.0]], lambda e: 2/(e + 1), "continuity of phi: 1 - k = q'' share")
many("ImageChargeForce", [[1.5, 1.0, 0.5], [2.0, -0.5, 3.0]], lambda q, k, d: q*(-k*q)*Q/(2*d)**2, "pair force at 2d")
def imgE(m, k, d, t):
    v = [m*sin(t), mpf(0), m*cos(t)]
    w = [-k*v[0], mpf(0), k*v[2]]
    return -dot(v, g1(w, [mpf(0), mpf(0), 2*d]))/2
ID = [[1.5, 1.0, 0.5, t] for t in (0.0, 0.75, 1.5)] + [[1.0, -1.0, 2.0, 0.25], [1.0, 0.6, 1.0, 3.0]]
many("ImageDipoleEnergy", ID, imgE, "half of the pair energy with the image dipole")
many("ImageDipoleForce", ID, lambda m, k, d, t: -diff(lambda y: imgE(m, k, y, t), d), "derivative of the energy")

# ---- dielectric.go, shield.go: boundary conditions as a linear system
def layers(eps, rad, dim):
    """field ratio in the core and A r + B r^(1-dim) coefficient outside, unit applied field, phi = -(A r + B r^(1-dim)) cos"""
    n = len(rad)
    size = 2*n
    M, y = matrix(size, size), matrix(size, 1)
    # unknowns: A0, (A_i, B_i) for shells 1..n-1, B_n; outer A = 1
    col = lambda i, k: (0 if i == 0 else 2*i - 1 + k)
    row = 0
    for j, r in enumerate(rad):
        for deriv in (0, 1):
            for i, sgn in ((j, 1), (j + 1, -1)):
                e = eps[i] if deriv else mpf(1)
                a = e*(1 if deriv else r)
                b = e*((1 - dim)*r**(-dim) if deriv else r**(1 - dim))
                if i == n:
                    y[row] -= sgn*a
                    M[row, col(i, 0)] += sgn*b
                else:
                    M[row, col(i, 0)] += sgn*a
                    if i > 0:
                        M[row, col(i, 1)] += sgn*b
            row += 1
    s = lu_solve(M, y)
    return s[0], s[size - 1]
one = mpf(1)
EP = [[0.5], [2.0], [4.0], [10.0], [80.0], [1.0009765625], [1e9]]
# outside phi = -(r + B/r^2) cos: moment over 4 pi = -B (sign of the applied field), over the volume 3
sph = lambda e: layers([e, one], [one], 3)
many("SphereInnerRatio", EP, lambda e: sph(e)[0], "boundary conditions, linear system")
many("SpherePolarizability", EP, lambda e: -3*sph(e)[1], "boundary conditions, linear system")
add("SphereInnerRatio", [inf], 0, "limit")
add("SpherePolarizability", [inf], 3, "limit")
add("SpherePolarizability", [0], mpf(-3)/2, "limit")
many("EllipsoidPolarizability", [[0.25, 2.0], [0.1, 1e6], [0.5434, 0.5], [1.0, 4.0], [0.0, 3.0]], lambda n, e: mp.findroot(lambda p: p - (e - 1)*(1 - n*p), (e - 1)/(1 + n*e)), "root of p = chi (E0 - N p)")
add("EllipsoidPolarizability", [0.25, inf], 4, "limit")
CS = [[10.0, 2.0, 0.5, 1.0], [1.0, 5.0, 0.8, 1.0], [1.0, 1000.0, 0.75, 1.0], [0.5, 0.25, 0.25, 2.0], [3.0, 3.0, 0.5, 1.0]]
many("CoatedSpherePolarizability", CS, lambda c, s, a, b: -3*layers([c, s, one], [a, b], 3)[1]/b**3, "boundary conditions, linear system")
many("CoatedSphereCoreRatio", CS, lambda c, s, a, b: layers([c, s, one], [a, b], 3)[0], "boundary conditions, linear system")
SH = [[20000.0, 50.0, 51.0], [2.0, 1.0, 3.0], [1e6, 1.0, 1.0 + 2.0**-20], [0.5, 1.0, 1.5], [1.0009765625, 1.0, 2.0]]
many("SphericalShieldRatio", SH, lambda m, a, b: layers([one, m, one], [a, b], 3)[0], "boundary conditions, linear system")
many("SphericalShieldMoment", SH, lambda m, a, b: -3*layers([one, m, one], [a, b], 3)[1]/b**3, "boundary conditions, linear system")
many("CylindricalShieldRatio", SH, lambda m, a, b: layers([one, m, one], [a, b], 2)[0], "boundary conditions, linear system")

# ---- halbach.go, electret.go
many("HalbachField", [[1.3, 20.0, 45.0], [1.0, 1.0, 1.0 + 2.0**-20]], lambda p, i, o: quad(lambda s: p/s, [i, o]), "volume integral over line dipoles")
many("HalbachCentreField", [[1.3, 20.0, 45.0, 120.0], [1.0, 1.0, 2.0, 0.25], [1.0, 1.0, 2.0, 1e3], [1.0, 1.0, 1.0625, 1.0]], lambda p, i, o, L: quad(lambda s: 2*p*3/mpf(4)*quad(lambda v: cosh(v)**-4/s, [0, asinh(L/2/s)]), [i, o]), "volume integral over dipoles")
many("HalbachSegmentFactor", [[8], [12], [16], [3], [100000]], lambda n: quad(lambda t: n/(2*pi)*cos(t), [-pi/n, pi/n]) if n < 1000 else sin(2*pi/n)/(2*pi/n), "mean of the direction over a sector")
for c in CASES:
    if c["f"] == "HalbachSegmentFactor":  # the field turns by twice the half angle
        n = int(c["x"][0])
        c["y"] = [mp.nstr(quad(lambda t: n*cos(2*t)/(2*pi), [-pi/n, pi/n]), 25)]
many("HalbachQuadrupoleGradient", [[1.18, 10.0, 30.0], [1.0, 1.0, 1.0 + 2.0**-20]], lambda p, i, o: quad(lambda s: 2*p/s**2, [i, o]), "volume integral over line dipoles")
many("HalbachArrayField", [[1.3, 40.0, 10.0, 0.0], [1.3, 40.0, 10.0, 5.0], [1.0, 1.0, 1e-6, 0.5]], lambda p, l, t, z: quad(lambda u: p*2*pi/l*exp(-2*pi/l*(z + u)), [0, t]), "integral over thin layers")
many("ElectretPotential", [[0.3e-3, 12.5e-6, 2.1], [1.0, 2.0, 3.0]], lambda s, d, e: quad(lambda z: s/e, [0, d]), "integral of the field in the film")
def gap(s, d, e, g):
    # E_film eps - jump: e Ef + ... : Ef d + Eg g = 0 around the short, Eg - e Ef = s
    return lu_solve(matrix([[d, g], [-e, 1]]), matrix([0, s]))[1]
many("ElectretGapField", [[0.3e-3, 12.5e-6, 2.1, 20e-6], [1.0, 2.0, 3.0, 0.5]], gap, "Gauss's law and zero voltage, linear system")

# ---- currents.go
many("LoopAxisField", [[2.0, 1.5, 0.0], [-3.0, 1.0, 0.5], [1.0, 2.0, -8.0], [1.0, 1.0, 1e6], [1.0, 1e6, 0.25]], lambda c, a, z: quad(lambda t: c*a*a/(4*pi)/(a*a + z*z)**(mpf(3)/2), [0, 2*pi]), "Biot and Savart round the loop")
many("SegmentField", [[2.0, 1.5, 0.5], [-3.0, 1.0, 8.0], [1.0, 1e6, 0.25], [1.0, 0.125, 1e4]], lambda c, L, s: quad(lambda t: 2*c*s/(4*pi)/(s*s + t*t)**(mpf(3)/2), [0] + [L/2*mpf(4)**-k for k in range(14, -1, -1)]), "Biot and Savart along the segment")
many("CoaxialLoopInductance", [[1.0, 1.0, 1.0], [1.0, 0.5, 0.0], [2.0, 3.0, 0.25], [1.0, 1.0, 0.0009765625], [1.0, 0.25, 50.0], [0.001, 1.0, 0.0], [1.0, 2.0, 1e5]], lambda a, b, d: quad(lambda t: a*b*cos(t)/sqrt(a*a + b*b - 2*a*b*cos(t) + d*d), [0] + [pi*mpf(2)**-k for k in range(16, -1, -1)]), "Neumann's integral")
# ---- pairforce.go: one angle as in force/testdata/forces.py; rectangles by the difference of places, one direction closed
def coaxialpair(p, q, a, k, b, l, g):
    knots = [mpf(0)] + [pi*mpf(2)**-i for i in range(12, -1, -1)]
    r = lambda t, z: sqrt((a - b)**2 + 4*a*b*sin(t/2)**2 + z*z)
    one = lambda z: a*b*quad(lambda t: -log(z + r(t, z))*cos(t), knots)
    return p*q*(-one(g) + one(g + k) + one(g + l) - one(g + k + l))
many("CoaxialPairForce", [[1.0, 1.0, 1.0, 1.0, 0.5, 1.0, 0.25], [1.0, 1.0, 1.0, 1.0, 0.75, 1.5, 0.01], [0.7, -1.1, 5.0, 5.0, 3.0, 8.0, 1.0],
     [1.0, 2.0, 0.5, 0.25, 1.5, 3.0, 0.125], [1.0, 1.0, 1.0, 1.0, 0.75, 1.5, 1.0], [1.0, 1.0, 2.0, 0.5, 1.0, 0.5, 2.0]], coaxialpair, "one angle, from a product of Bessel functions")
def overlap(a, b, c):
    m = 2*min(a, b)
    k = [(c - a - b, mpf(0)), (c - abs(a - b), m), (c + abs(a - b), m), (c + a + b, mpf(0))]
    return [(x, y, v - (w - v)/(y - x)*x, (w - v)/(y - x)) for (x, v), (y, w) in zip(k, k[1:]) if y > x]
def across(t, r2, cube):
    s = mpf(0)
    for lo, hi, c, e in t:
        for v, g in ((hi, 1), (lo, -1)):
            r, L = sqrt(v*v + r2), asinh(v/sqrt(r2))
            s += g*(c*v/(r2*r) - e/r if cube else c*L + e*r)
    return s
def along(t, f):
    s = mpf(0)
    for lo, hi, c, e in t:
        knots = sorted({lo, hi, (lo + hi)/2, lo + (hi - lo)/16, hi - (hi - lo)/16} | ({mpf(0)} if lo < 0 < hi else set()))
        s += quad(lambda u: (c + e*u)*f(u), knots)
    return s
def cuboids(p, q, *v):
    a, b, d = v[0:3], v[3:6], v[6:9]
    x, y = overlap(a[0]/2, b[0]/2, d[0]), overlap(a[1]/2, b[1]/2, d[1])
    slope = lambda t: [(lo, hi, e, mpf(0)) for lo, hi, _, e in t]
    F = [mpf(0)]*3
    for i in (-1, 1):
        for j in (-1, 1):
            w = d[2] + j*b[2]/2 - i*a[2]/2
            k = i*j*p*q*Q
            F[0] += k*along(slope(x), lambda u: across(y, u*u + w*w, False))
            F[1] += k*along(x, lambda u: across(slope(y), u*u + w*w, False))
            F[2] += k*w*along(x, lambda u: across(y, u*u + w*w, True))
    return F
many("CuboidForce", [[1.0, 1.0, 20.0, 12.0, 6.0, 12.0, 20.0, 6.0, -4.0, -4.0, 8.0], [1.0, 1.0, 20.0, 12.0, 6.0, 12.0, 20.0, 6.0, 6.0, -4.0, 8.0],
     [1.0, -2.0, 1.0, 1.25, 0.75, 1.5, 0.5, 1.0, 0.25, 0.375, 0.890625], [1.0, 1.0, 1.0, 1.25, 0.75, 1.5, 0.5, 1.0, 0.25, 0.375, 1.875]], cuboids, "two rectangles by the difference of places")

head = {"source": "reference.py, mpmath, 40 digits (28 where said), 25 printed", "cases": None}
print('{\n"source": %s,\n"cases": [' % json.dumps(head["source"]))
print(",\n".join(json.dumps(c) for c in CASES))
print("]\n}")
