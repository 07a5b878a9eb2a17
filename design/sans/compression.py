"""Elastic buckling stresses (cl. 13.3.1, 13.3.2), the column curve (13.3.1) and the utilisation in compression.

One class a route: flexural; doubly symmetric (starred pairs); singly symmetric (pairs back to back); unsymmetric
(single angles). All arrays broadcast to (sections, bars).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.sans.constants import number
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray

MODULUS = number("steel", "modulus")
SHEAR_MODULUS = number("steel", "shear_modulus")
PHI = number("steel", "phi")


@dataclass(frozen=True, eq=False)
class Flexural(Rule):
    """Flexural buckling about one axis (13.3.1)."""

    length: FloatArray = given("KL", "mm", "effective length")
    radius: FloatArray = given("r", "mm", "radius of gyration for this way of buckling")
    modulus: float = given("E", "MPa", "modulus of elasticity")

    @step("KL_r", "-", "10.4.2", "KL/r", "slenderness")
    def slenderness(self) -> FloatArray:
        return self.length / self.radius

    @step("f_e", "MPa", "13.3.1", "pi**2*E/KL_r**2", "elastic flexural buckling stress")
    def elastic_stress(self) -> FloatArray:
        return np.pi**2 * self.modulus / self.slenderness**2


@dataclass(frozen=True, eq=False)
class DoublySymmetric(Rule):
    """Flexure about both principal axes and torsion, uncoupled: starred pairs (13.3.2 a)."""

    length: FloatArray = given("KL", "mm", "effective length about both principal axes")
    length_torsion: FloatArray = given("L_z", "mm", "length for torsion")
    radius_minor: FloatArray = given("r_v", "mm", "least radius of gyration")
    radius_major: FloatArray = given("r_u", "mm", "greatest radius of gyration")
    area: FloatArray = given("A", "mm2", "gross area")
    torsion: FloatArray = given("J", "mm4", "St Venant torsion constant")
    warping: FloatArray = given("C_w", "mm6", "warping constant")
    modulus: float = given("E", "MPa", "modulus of elasticity")
    shear_modulus: float = given("G", "MPa", "shear modulus")

    @step("f_ev", "MPa", "13.3.1", "pi**2*E/(KL/r_v)**2", "elastic stress, flexure about the minor axis")
    def stress_minor(self) -> FloatArray:
        return np.pi**2 * self.modulus / (self.length / self.radius_minor) ** 2

    @step("f_eu", "MPa", "13.3.1", "pi**2*E/(KL/r_u)**2", "elastic stress, flexure about the major axis")
    def stress_major(self) -> FloatArray:
        return np.pi**2 * self.modulus / (self.length / self.radius_major) ** 2

    @step("r_02", "mm2", "13.3.2", "r_u**2 + r_v**2", "square of the polar radius about the shear centre")
    def polar_squared(self) -> FloatArray:
        return self.radius_major**2 + self.radius_minor**2

    @step("f_ez", "MPa", "13.3.2", "(pi**2*E*C_w/L_z**2 + G*J)/(A*r_02)", "elastic stress, torsion")
    def stress_torsion(self) -> FloatArray:
        warping = np.pi**2 * self.modulus * self.warping / self.length_torsion**2
        return (warping + self.shear_modulus * self.torsion) / (self.area * self.polar_squared)

    @step("f_e", "MPa", "13.3.2", "min(f_ev, f_eu, f_ez)", "elastic buckling stress")
    def elastic_stress(self) -> FloatArray:
        return np.minimum(np.minimum(self.stress_minor, self.stress_major), self.stress_torsion)


@dataclass(frozen=True, eq=False)
class SinglySymmetric(Rule):
    """Sideways flexure with torsion of a pair back to back (13.3.2 b), with its equivalent slenderness (19.1.4).

    The axis of symmetry lies in the plane of the truss, so sideways buckling bends the pair about it and twists it.
    """

    length: FloatArray = given("KL_out", "mm", "effective length sideways")
    length_torsion: FloatArray = given("L_z", "mm", "length for torsion")
    radius_out: FloatArray = given("r_out", "mm", "radius of gyration of the pair, sideways")
    radius_in: FloatArray = given("r_in", "mm", "radius of gyration of the pair, in plane")
    shear_centre: FloatArray = given("y_0", "mm", "from centroid to shear centre")
    area: FloatArray = given("A", "mm2", "gross area of the pair")
    torsion: FloatArray = given("J", "mm4", "St Venant torsion constant of the pair")
    warping: FloatArray = given("C_w", "mm6", "warping constant of the pair")
    spacing: FloatArray = given("a", "mm", "distance between packs")
    piece_radius: FloatArray = given("r_1", "mm", "least radius of gyration of one angle")
    factor: float = given("K_i", "-", "1.0 for packs bolted snug, 0.65 welded", "19.1.4")
    modulus: float = given("E", "MPa", "modulus of elasticity")
    shear_modulus: float = given("G", "MPa", "shear modulus")

    @step("rho_0", "-", "19.1.4", "KL_out/r_out", "slenderness sideways of the pair acting as one")
    def plain_slenderness(self) -> FloatArray:
        return self.length / self.radius_out

    @step("rho_i", "-", "19.1.4", "K_i*a/r_1", "slenderness of one angle between packs")
    def piece_slenderness(self) -> FloatArray:
        return self.factor * self.spacing / self.piece_radius

    @step("rho_e", "-", "19.1.4", "sqrt(rho_0**2 + rho_i**2)", "equivalent slenderness sideways")
    def slenderness(self) -> FloatArray:
        return np.hypot(self.plain_slenderness, self.piece_slenderness)

    @step("f_ey", "MPa", "13.3.1", "pi**2*E/rho_e**2", "elastic stress, sideways flexure")
    def stress_out(self) -> FloatArray:
        return np.pi**2 * self.modulus / self.slenderness**2

    @step("r_02", "mm2", "13.3.2", "y_0**2 + r_in**2 + r_out**2", "square of the polar radius about the shear centre")
    def polar_squared(self) -> FloatArray:
        return self.shear_centre**2 + self.radius_in**2 + self.radius_out**2

    @step("Omega", "-", "13.3.2", "1 - y_0**2/r_02", "coupling of flexure and torsion")
    def coupling(self) -> FloatArray:
        return 1.0 - self.shear_centre**2 / self.polar_squared

    @step("f_ez", "MPa", "13.3.2", "(pi**2*E*C_w/L_z**2 + G*J)/(A*r_02)", "elastic stress, torsion")
    def stress_torsion(self) -> FloatArray:
        warping = np.pi**2 * self.modulus * self.warping / self.length_torsion**2
        return (warping + self.shear_modulus * self.torsion) / (self.area * self.polar_squared)

    @step(
        "f_e",
        "MPa",
        "13.3.2",
        "(f_ey + f_ez)/(2*Omega)*(1 - sqrt(1 - 4*f_ey*f_ez*Omega/(f_ey + f_ez)**2))",
        "elastic flexural-torsional buckling stress",
    )
    def elastic_stress(self) -> FloatArray:
        both = self.stress_out + self.stress_torsion
        root = np.sqrt(1.0 - 4.0 * self.stress_out * self.stress_torsion * self.coupling / both**2)
        return both / (2.0 * self.coupling) * (1.0 - root)


@dataclass(frozen=True, eq=False)
class Unsymmetric(Rule):
    """Flexure about both principal axes coupled with torsion: single angles (13.3.2 c).

    With equal legs v_0 = 0, and the least root is the lesser of flexure about v and of the singly symmetric formula
    about u, the axis of symmetry.
    """

    length: FloatArray = given("KL", "mm", "effective length about both principal axes")
    length_torsion: FloatArray = given("L_z", "mm", "length for torsion")
    radius_minor: FloatArray = given("r_v", "mm", "least radius of gyration")
    radius_major: FloatArray = given("r_u", "mm", "greatest radius of gyration")
    shear_major: FloatArray = given("u_0", "mm", "from centroid to shear centre along the major axis")
    shear_minor: FloatArray = given("v_0", "mm", "from centroid to shear centre along the minor axis")
    area: FloatArray = given("A", "mm2", "gross area")
    torsion: FloatArray = given("J", "mm4", "St Venant torsion constant")
    warping: FloatArray = given("C_w", "mm6", "warping constant")
    modulus: float = given("E", "MPa", "modulus of elasticity")
    shear_modulus: float = given("G", "MPa", "shear modulus")

    @step("f_eu", "MPa", "13.3.1", "pi**2*E/(KL/r_u)**2", "elastic stress, flexure about the major axis")
    def stress_major(self) -> FloatArray:
        return np.pi**2 * self.modulus / (self.length / self.radius_major) ** 2

    @step("f_ev", "MPa", "13.3.1", "pi**2*E/(KL/r_v)**2", "elastic stress, flexure about the minor axis")
    def stress_minor(self) -> FloatArray:
        return np.pi**2 * self.modulus / (self.length / self.radius_minor) ** 2

    @step("r_02", "mm2", "13.3.2", "u_0**2 + v_0**2 + r_u**2 + r_v**2", "square of the polar radius")
    def polar_squared(self) -> FloatArray:
        return self.shear_major**2 + self.shear_minor**2 + self.radius_major**2 + self.radius_minor**2

    @step("f_ez", "MPa", "13.3.2", "(pi**2*E*C_w/L_z**2 + G*J)/(A*r_02)", "elastic stress, torsion")
    def stress_torsion(self) -> FloatArray:
        warping = np.pi**2 * self.modulus * self.warping / self.length_torsion**2
        return (warping + self.shear_modulus * self.torsion) / (self.area * self.polar_squared)

    @step("f_e", "MPa", "13.3.2", "", "least root of the cubic below, so that its left side is zero")
    def elastic_stress(self) -> FloatArray:
        u, v, z = self.stress_major, self.stress_minor, self.stress_torsion
        U, V = self.shear_major**2 / self.polar_squared, self.shear_minor**2 / self.polar_squared
        return least_root(1.0 - U - V, v * U + u * V - u - v - z, u * v + u * z + v * z, -u * v * z)

    @step(
        "cubic",
        "-",
        "13.3.2",
        "((f_e - f_eu)*(f_e - f_ev)*(f_e - f_ez) - f_e**2*(f_e - f_ev)*u_0**2/r_02"
        " - f_e**2*(f_e - f_eu)*v_0**2/r_02)/(f_eu*f_ev*f_ez)",
        "left side of the cubic at f_e; zero but for rounding",
    )
    def residual(self) -> FloatArray:
        f, u, v, z = self.elastic_stress, self.stress_major, self.stress_minor, self.stress_torsion
        U, V = self.shear_major**2 / self.polar_squared, self.shear_minor**2 / self.polar_squared
        return ((f - u) * (f - v) * (f - z) - f**2 * (f - v) * U - f**2 * (f - u) * V) / (u * v * z)


def least_root(c3: FloatArray, c2: FloatArray, c1: FloatArray, c0: FloatArray) -> FloatArray:
    """Return the least root of c3 x^3 + c2 x^2 + c1 x + c0, whose three roots are real and positive.

    Its reciprocal is the greatest root of the reversed cubic, which the trigonometric solution gives as a sum of
    two positive terms, so that no digits are lost.
    """
    a, b, c = c1 / c0, c2 / c0, c3 / c0
    q = np.maximum(a**2 - 3.0 * b, 0.0) / 9.0
    r = (2.0 * a**3 - 9.0 * a * b + 27.0 * c) / 54.0
    # three equal roots make q and r zero
    cosine = np.divide(-r, q**1.5, out=np.zeros_like(r), where=q > 0.0)
    greatest = 2.0 * np.sqrt(q) * np.cos(np.arccos(np.clip(cosine, -1.0, 1.0)) / 3.0) - a / 3.0
    root: FloatArray = 1.0 / greatest
    return root


@dataclass(frozen=True, eq=False)
class ColumnCurve(Rule):
    """Factored resistance in compression (13.3.1) from the elastic buckling stress."""

    area: FloatArray = given("A_e", "mm2", "effective area")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    elastic_stress: FloatArray = given("f_e", "MPa", "elastic buckling stress")
    exponent: FloatArray | float = given("n", "-", "of the column curve: 1.34, or 2.24 for hot-formed tubes", "13.3.1")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("lam", "-", "13.3.1", "sqrt(fy/f_e)", "non-dimensional slenderness")
    def slenderness(self) -> FloatArray:
        return np.sqrt(self.fy / self.elastic_stress)

    @step("C_r", "N", "13.3.1", "phi*A_e*fy*(1 + lam**(2*n))**(-1/n)", "factored resistance in compression")
    def resistance(self) -> FloatArray:
        reduction = (1.0 + self.slenderness ** (2.0 * self.exponent)) ** (-1.0 / self.exponent)
        return self.phi * self.area * self.fy * reduction


@dataclass(frozen=True, eq=False)
class CompressionRatio(Rule):
    """Factored compression over factored resistance; the first compression web has a reduced one (cl. 15)."""

    force: FloatArray = given("C_u", "N", "factored compression")
    share: FloatArray = given("k_w", "-", "0.85 for the first compression web from a bearing, else 1", "15")
    resistance: FloatArray = given("C_r", "N", "factored resistance in compression")

    @step("ratio", "-", "13.3.1", "C_u/(k_w*C_r)", "utilisation")
    def ratio(self) -> FloatArray:
        return self.force / (self.share * self.resistance)
