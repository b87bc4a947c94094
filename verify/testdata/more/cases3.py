"""The other second-stage bodies: cylinders and tubes with affine and power laws, linear discs, balls, ellipsoids, boxes with polynomials."""
from cases2 import *
import cases
import cases2

OTHER = [[0.4, -1.2, 0.3], [0.7, -0.6, 1.5], [-0.8, 0.25, 1.1]]


def disc(n, r, pose, c, a, b):
    return n, {**body("disc", {"radius": r}, pose, c), "note": "flat sheet in the local plane z=0"}, pol("sheet_linear", a=float(a), b=list(map(float, b)))


def annulus(n, r1, r2, pose, c, a, b):
    return n, {**body("annulus", {"r1": r1, "r2": r2}, pose, c), "note": "flat sheet in the local plane z=0"}, \
        pol("sheet_linear", a=float(a), b=list(map(float, b)))


def affine_round():
    c = (0.3, -0.4, 0.2)
    yield cyl("cyl-affine-aligned", 65 / 64, 0.7, ALIGNED, (0.25, 0.5, -0.125), aff((0.5, -0.25, 1.0), G1))
    yield cyl("cyl-affine-generic", 0.47, 0.61, GENERIC, c, affine_about(c, G2, OBLIQUE))
    yield tube("tube-affine-generic", 0.33, 0.71, 0.52, GENERIC2, c, affine_about(c, G1, OBLIQUE))
    m = away(1.5)
    yield tube("tube-affine-moved", 0.4, 0.75, 0.6, GENERIC, m, affine_about(m, OTHER, (0.2, 0.6, -0.3)))
    yield cyl("cyl-affine-plate-1e-3", 1.0, 1e-3, TILT, c, affine_about(c, G1, (0.3, 0.1, 1.0)))
    yield tube("tube-affine-wall-1e-3", 0.999, 1.0, 0.6, GENERIC2, c, affine_about(c, G2, OBLIQUE))
    yield cyl("cyl-affine-rod", 0.02, 4.0, SEVENTHS, (0.5, 0.25, 0.75), affine_about((0.5, 0.25, 0.75), G1, (0.1, 0.2, 0.3)))


def powers_round():
    k = lambda kind, c, n=None: pol(kind, c=float(c), **({"n": n} if n is not None else {}))
    yield cyl("cyl-radial_power-0.5", 0.8, 0.6, GENERIC, (0.3, 0.2, -0.1), k("radial_power", 1.2, 0.5))
    yield cyl("cyl-axial_z2-generic", 0.7, 0.9, GENERIC, (0.2, -0.4, 0.6), k("axial_z2", 1.3))
    yield tube("tube-radial_s2-moved", 0.35, 0.9, 0.5, GENERIC2, away(1.8), k("radial_s2", -0.8))
    yield cyl("cyl-radial_power-0", 0.75, 0.5, ALIGNED, (0.25, -0.5, 0.125), k("radial_power", 1.0, 0))
    yield tube("tube-radial_power-0", 0.4, 0.9, 0.7, TILT, (0.1, 0.3, 0.2), k("radial_power", -1.1, 0))
    yield tube("tube-axial_power-5", 0.5, 0.8, 0.95, GENERIC, (0.1, 0.2, 0.3), k("axial_power", 1.1, 5))
    yield cyl("cyl-axial_power-3-moved", 0.6, 0.8, GENERIC2, away(1.6), k("axial_power", -1.4, 3))
    yield cyl("cyl-radial_s-generic", 0.9, 0.35, GENERIC2, (0.5, 0.1, 0.1), k("radial_s", 0.9))
    yield cyl("cyl-radial_s2-plate-1e-3", 1.0, 1e-3, RATIONAL, (0.5, 0.25, -1.0), k("radial_s2", 1.5))
    yield cyl("cyl-radial_power-1.7", 0.65, 0.8, SEVENTHS, (0.5, 0.25, 0.75), k("radial_power", 0.7, 1.7))
    yield tube("tube-radial_power-0.5-hole-1e-3", 1e-3, 1.0, 0.5, GENERIC, (0.0, 0.1, 0.4), k("radial_power", 1.0, 0.5))
    yield tube("tube-radial_power-3-wall-1e-3", 0.999, 1.0, 0.7, TILT2, HERE, k("radial_power", 1.3, 3))
    yield tube("tube-axial_z2-wall-1e-3", 0.999, 1.0, 0.7, ALIGNED, HERE, k("axial_z2", 1.0))
    yield cyl("cyl-axial_z2-rod", 0.02, 4.0, GENERIC, (0.3, 0.1, 0.2), k("axial_z2", 0.3))
    yield cyl("cyl-axial_z2-plate", 1.1, 1.1e-3, TILT, (0.1, 0.3, 0.2), k("axial_z2", 1000.0))


def discs():
    yield disc("disc-linear-aligned", 65 / 64, ALIGNED, (0.5, -0.25, 0.125), 0.4, (1.1, -0.7, 0.3))
    yield disc("disc-linear-moved", 0.83, GENERIC, away(1.66), 2.0, (0.6, 1.9, -1.3))
    yield annulus("annulus-linear-generic", 0.42, 0.97, GENERIC2, (0.3, 0.1, -0.7), 0.0, (1.0, 0.5, -2.0))
    yield annulus("annulus-linear-narrow-1e-3", 0.999, 1.0, TILT, HERE, 0.3, (1.4, 0.2, 0.5))
    yield annulus("annulus-linear-hole-1e-3", 1e-3, 1.0, RATIONAL, (0.5, 0.25, -1.0), -0.2, (0.8, -1.6, 0.4))


def balls():
    ball = lambda n, r, pose, c, p: (n, body("sphere", {"radius": r}, pose, c), p)
    shell = lambda n, r1, r2, c, p: (n, body("spherical_shell", {"r1": r1, "r2": r2}, ALIGNED, c), p)
    k = lambda kind, c, n=None: pol(kind, c=float(c), **({"n": n} if n is not None else {}))
    yield ball("ball-r-moved", 0.77, GENERIC, away(1.54), k("ball_r", 1.3))
    yield ball("ball-r2", 0.6, GENERIC2, (0.1, 0.2, 0.3), k("ball_r2", -0.9))
    yield shell("shell-r", 0.5, 1.0, (0.3, -0.1, 0.2), k("ball_r", 1.0))
    yield shell("shell-r2-wall-1e-3", 0.999, 1.0, HERE, k("ball_r2", 1.4))
    yield ball("ball-central-0", 0.9, ALIGNED, (0.2, 0.4, 0.1), k("central_power", 0.8, 0))
    yield ball("ball-central-0.5", 1.1, ALIGNED, HERE, k("central_power", -1.2, 0.5))
    yield shell("shell-central-3", 0.3, 0.8, (0.5, -0.2, 0.4), k("central_power", 2.0, 3))
    yield shell("shell-central-0", 0.4, 0.9, (0.1, -0.2, 0.4), k("central_power", 1.1, 0))
    m = away(1.8)
    yield ball("ball-affine-moved", 0.9, GENERIC, m, affine_about(m, G1, OBLIQUE))
    c = (0.3, -0.4, 0.2)
    yield ball("ball-affine", 0.8, ALIGNED, c, affine_about(c, G2, (0.3, 0.1, -0.5)))
    yield shell("shell-affine", 0.45, 0.95, c, affine_about(c, G1, OBLIQUE))
    yield shell("shell-affine-wall-1e-3", 0.999, 1.0, c, affine_about(c, G2, OBLIQUE))


def ellipsoids():
    def ell(n, a, pose, c, G, q):
        return n, body("ellipsoid", {"semi_axes_e1_e2_e3": a}, pose, c), affine_about(c, G, q)
    yield ell("ellipsoid-affine-moved", [0.7, 1.3, 0.45], GENERIC, away(2.6), G1, OBLIQUE)
    yield ell("ellipsoid-affine", [1.0, 1.5, 2.0], GENERIC2, (0.3, 0.1, -0.2), G2, (0.3, -0.5, 0.4))
    yield ell("ellipsoid-affine-oblate", [1.1, 1.1, 0.3], TILT, (0.1, 0.3, 0.2), G1, OBLIQUE)
    yield ell("ellipsoid-affine-prolate", [0.4, 0.9, 0.4], RATIONAL, (0.5, 0.25, -1.0), G2, OBLIQUE)
    yield ell("ellipsoid-affine-plate-1e-3", [1.0, 0.8, 1e-3], TILT2, (0.2, 0.1, 0.3), G1, (0.5, 0.2, 1.0))
    yield ell("ellipsoid-affine-needle", [0.011, 0.013, 5.0], GENERIC, (0.3, 0.7, 0.1), G2, OBLIQUE)
    yield ell("ellipsoid-affine-near-sphere", [0.9, 0.9 * (1 + 1e-6), 0.9 * (1 - 3e-9)], TILT2, (0.1, 0.1, 0.2), G1, OBLIQUE)


def boxes():
    def box(n, half, pose, c, p):
        return n, body("box", {"half_lengths_e1_e2_e3": half}, pose, c), p
    k = lambda kind, c, n=None: pol(kind, c=float(c), **({"n": n} if n is not None else {}))
    T2 = [[0, 0.7, [0, 0, 0]], [0, 1.2, [2, 0, 0]], [0, -0.8, [0, 1, 1]], [1, 0.5, [1, 1, 0]], [1, -1.1, [0, 0, 2]], [2, 0.9, [0, 2, 0]], [2, -0.6, [1, 0, 1]], [2, 1.3, [0, 0, 1]]]
    T3 = [[0, 0.4, [3, 0, 0]], [0, -0.9, [1, 1, 1]], [0, 0.3, [0, 1, 0]], [1, 1.0, [0, 2, 1]], [1, 0.6, [1, 0, 0]], [2, -1.2, [0, 0, 3]], [2, 0.8, [2, 1, 0]], [2, 0.2, [0, 0, 0]]]
    yield box("box-polynomial-2", [0.5, 0.75, 1.25], ALIGNED, HERE, pol("polynomial", terms=T2))
    yield box("box-polynomial-2-generic", [0.35, 0.6, 0.47], GENERIC, (0.3, -0.4, 0.5), pol("polynomial", terms=T2))
    yield box("box-polynomial-3", [0.6, 0.4, 0.8], RATIONAL, (0.25, 0.5, -0.125), pol("polynomial", terms=T3))
    yield box("box-polynomial-3-plate-1e-3", [0.8, 0.55, 8e-4], TILT, (0.1, 0.2, 0.3), pol("polynomial", terms=T3))
    yield box("box-radial_s", [0.6, 0.35, 0.85], GENERIC2, (0.1, 0.2, -0.3), k("radial_s", 1.3))
    yield box("box-radial_power-3", [0.5, 0.5, 0.4], GENERIC, (0.4, 0.1, -0.2), k("radial_power", -1.1, 3))
    yield box("box-ball_r", [0.45, 0.7, 0.3], SEVENTHS, (0.5, 0.25, 0.75), k("ball_r", 0.9))
    yield box("box-central_power-3", [0.5, 0.6, 0.7], GENERIC2, (0.2, -0.3, 0.1), k("central_power", 1.2, 3))
    yield box("box-axial_z2-moved", [0.5, 0.3, 0.6], GENERIC, away(1.2), k("axial_z2", 1.5))


def boxes_even():
    def box(n, half, pose, c, p):
        return n, body("box", {"half_lengths_e1_e2_e3": half}, pose, c), p
    yield box("box-radial_s2", [0.5, 0.7, 0.4], GENERIC, (0.2, 0.1, -0.3), pol("radial_s2", c=1.2))
    yield box("box-radial_unit", [0.6, 0.45, 0.5], GENERIC2, (0.1, -0.2, 0.3), pol("radial_unit", c=-0.9))


def some_flat_points(case, seed):
    """About 45 of the points of cases.flat_points (their tags by way of a uniform p)."""
    q = {"id": "x", "body": case["body"], "polarization": u(0, 0, 1)}
    P = cases.flat_points(q, seed)
    case["size"] = q["size"]
    keep = sorted(random.Random(seed).sample(range(len(P.points)), 45))
    P.points, P.tags = [P.points[i] for i in keep], [P.tags[i] for i in keep]
    return P


METHOD.update({
    "radial": "phi = int p.grad(1/R) over circles, g from wall and volume charge, both by cylindrical shells (complete elliptic integrals of three kinds, Bulirsch's cel) integrated over the radius, sinh map",
    "axial": "azimuthal Gauss-Legendre quadrature (sinh map about the nearest azimuth) of closed-form straight segments; volume charge turned into surface integrals by homogeneity about the target",
    "ball": "closed form: spherical harmonics of degree 0, 1, 2, or radial symmetry",
    "ellipsoid": "closed form: Ferrers potentials of the densities 1 and r_j, Carlson R_D, largest root of the confocal cubic by Newton",
    "box2": "quadrature along the side faces (by azimuth) of closed-form half-plane rectangles of volume charge and vertical lines of surface charge",
    "box": "closed form: face integrals of polynomials over R and R^3 by recursion; volume charge turned into face integrals by homogeneity about the target",
})
GROUPS3 = [(affine_round, revolved_points, "swept"), (discs, revolved_points, "swept"), (balls, cases.ball_points, "ball"),
           (ellipsoids, cases.ball_points, "ellipsoid"), (boxes, cases.flat_points, "box"), (boxes_even, some_flat_points, "box2"), (powers_round, revolved_points, "radial")]
cases2.GROUPS += GROUPS3
