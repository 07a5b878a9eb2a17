"""Single angles connected by one leg.

Where its conditions hold, the rule of S16-09 13.3.3 (numerically AISC 360 E5) turns the eccentricity into a longer
slenderness; the concentric strut of 13.3.2 is checked beside it, so the smaller resistance governs (project
decision: SANS 10162-1:2011 has no rule of its own). Where a condition fails, the angle is a strut with the moment of
its eccentric ends about both principal axes (13.8.3).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.sans.classes import LEG
from spanwright.design.sans.constants import number
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray

FEW = number("one_leg", "few")
FEW_BASE, FEW_FACTOR = number("one_leg", "few_base"), number("one_leg", "few_factor")
MANY_BASE, MANY_FACTOR = number("one_leg", "many_base"), number("one_leg", "many_factor")
SHORT_LEG, SHORT_FLOOR = number("one_leg", "short_leg"), number("one_leg", "short_floor")
LEG_RATIO = number("one_leg", "leg_ratio")
LEAST_BOLTS = number("one_leg", "bolts")

CLAUSE = "13.3.3 (S16-09)"


@dataclass(frozen=True, eq=False)
class OneLeg(Rule):
    """Equivalent slenderness of a web of a plane truss, all webs on one side of gusset or chord."""

    length: FloatArray = given("L", "mm", "length between work points, not less than the effective length")
    radius_parallel: FloatArray = given("r_a", "mm", "radius of gyration about the axis parallel to the connected leg")
    radius_minor: FloatArray = given("r_v", "mm", "least radius of gyration")
    connected: FloatArray = given("b_c", "mm", "connected leg")
    outstanding: FloatArray = given("b_o", "mm", "outstanding leg")
    modulus: float = given("E", "MPa", "modulus of elasticity")

    @step("L_ra", "-", CLAUSE, "L/r_a", "plain slenderness about the axis parallel to the connected leg")
    def plain_slenderness(self) -> FloatArray:
        return self.length / self.radius_parallel

    @step(
        "base",
        "-",
        CLAUSE,
        f"where(L_ra <= {FEW:g}, {FEW_BASE:g} + {FEW_FACTOR:g}*L_ra, {MANY_BASE:g} + {MANY_FACTOR:g}*L_ra)",
        "equivalent slenderness, equal leg or long leg connected",
    )
    def base(self) -> FloatArray:
        plain = self.plain_slenderness
        return np.where(plain <= FEW, FEW_BASE + FEW_FACTOR * plain, MANY_BASE + MANY_FACTOR * plain)

    @step("extra", "-", CLAUSE, f"{SHORT_LEG:g}*(max(b_o/b_c, 1)**2 - 1)", "added where the short leg is connected")
    def extra(self) -> FloatArray:
        return SHORT_LEG * (np.maximum(self.outstanding / self.connected, 1.0) ** 2 - 1.0)

    @step(
        "least",
        "-",
        CLAUSE,
        f"where(b_o > b_c, {SHORT_FLOOR:g}*L/r_v, 0)",
        "least slenderness where the short leg is connected",
    )
    def least(self) -> FloatArray:
        return np.where(self.outstanding > self.connected, SHORT_FLOOR * self.length / self.radius_minor, 0.0)

    @step("KL_r", "-", CLAUSE, "max(base + extra, least)", "equivalent slenderness")
    def slenderness(self) -> FloatArray:
        return np.maximum(self.base + self.extra, self.least)

    @step("f_e", "MPa", "13.3.1", "pi**2*E/KL_r**2", "elastic buckling stress")
    def elastic_stress(self) -> FloatArray:
        return np.pi**2 * self.modulus / self.slenderness**2


@dataclass(frozen=True, eq=False)
class EccentricAngle(Rule):
    """Strut whose load enters at mid-gusset, in single curvature about both principal axes (13.8.3).

    Stresses are added with their signs at the same corner: the heel, the toe of the connected leg, the toe of the
    outstanding one. p runs along the connected leg and q along the outstanding one, from the centroid.
    """

    force: FloatArray = given("C_u", "N", "factored compression")
    share: FloatArray = given("k_w", "-", "0.85 for the first compression web from a bearing, else 1", "15")
    resistance: FloatArray = given("C_r", "N", "factored resistance of the concentric strut")
    gusset: float = given("t_g", "mm", "thickness of the gusset")
    length: FloatArray = given("KL", "mm", "effective length about both principal axes")
    area: FloatArray = given("A", "mm2", "gross area")
    inertia_in: FloatArray = given("I_p", "mm4", "second moment for bending along the connected leg")
    inertia_out: FloatArray = given("I_q", "mm4", "second moment for bending along the outstanding leg")
    inertia_major: FloatArray = given("I_u", "mm4", "greatest second moment")
    inertia_minor: FloatArray = given("I_v", "mm4", "least second moment")
    connected: FloatArray = given("b_c", "mm", "connected leg")
    outstanding: FloatArray = given("b_o", "mm", "outstanding leg")
    thickness: FloatArray = given("t", "mm", "thickness")
    centroid_p: FloatArray = given("c_p", "mm", "centroid from the back of the outstanding leg")
    centroid_q: FloatArray = given("c_q", "mm", "centroid from the back of the connected leg")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    modulus: float = given("E", "MPa", "modulus of elasticity")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("e", "mm", "13.8.3", "c_q + t_g/2", "eccentricity: from the middle of the gusset to the centroid")
    def eccentricity(self) -> FloatArray:
        return self.centroid_q + self.gusset / 2.0

    @step("cos2", "-", "mechanics", "(I_p - I_q)/(I_u - I_v)", "cosine of twice the angle of the axis of I_u")
    def cosine_double(self) -> FloatArray:
        return (self.inertia_in - self.inertia_out) / (self.inertia_major - self.inertia_minor)

    @step("c", "-", "mechanics", "sqrt(max(1 + cos2, 0)/2)", "cosine of the angle from p to the spread I_u")
    def cosine(self) -> FloatArray:
        return np.sqrt(np.maximum(1.0 + self.cosine_double, 0.0) / 2.0)

    @step(
        "s",
        "-",
        "mechanics",
        "-sqrt(max(1 - cos2, 0)/2)",
        "its sine, negative: the heel lies at negative p and q",
    )
    def sine(self) -> FloatArray:
        return -np.sqrt(np.maximum(1.0 - self.cosine_double, 0.0) / 2.0)

    @step(
        "U_u", "-", "13.8.4", "1/max(1 - C_u*KL**2/(pi**2*E*I_u), 1 - phi)", "second-order factor, bowing against I_u"
    )
    def factor_major(self) -> FloatArray:
        return 1.0 / np.maximum(1.0 - self.force / self._euler(self.inertia_major), 1.0 - self.phi)

    @step(
        "U_v", "-", "13.8.4", "1/max(1 - C_u*KL**2/(pi**2*E*I_v), 1 - phi)", "second-order factor, bowing against I_v"
    )
    def factor_minor(self) -> FloatArray:
        return 1.0 / np.maximum(1.0 - self.force / self._euler(self.inertia_minor), 1.0 - self.phi)

    @step("g_u", "1/mm3", "mechanics", "-U_u*e*s/I_u", "bending stress per force and distance in the spread of I_u")
    def gradient_major(self) -> FloatArray:
        return -self.factor_major * self.eccentricity * self.sine / self.inertia_major

    @step("g_v", "1/mm3", "mechanics", "-U_v*e*c/I_v", "the same across it")
    def gradient_minor(self) -> FloatArray:
        return -self.factor_minor * self.eccentricity * self.cosine / self.inertia_minor

    @step("s_h", "MPa", "mechanics", "C_u*(g_u*(-c_p*c - c_q*s) + g_v*(c_p*s - c_q*c))", "bending stress at the heel")
    def stress_heel(self) -> FloatArray:
        return self._stress(-self.centroid_p, -self.centroid_q)

    @step(
        "s_c",
        "MPa",
        "mechanics",
        "C_u*(g_u*((b_c - c_p)*c - c_q*s) + g_v*(-(b_c - c_p)*s - c_q*c))",
        "bending stress at the toe of the connected leg, compression +",
    )
    def stress_connected(self) -> FloatArray:
        return self._stress(self.connected - self.centroid_p, -self.centroid_q)

    @step(
        "s_o",
        "MPa",
        "mechanics",
        "C_u*(g_u*(-c_p*c + (b_o - c_q)*s) + g_v*(c_p*s + (b_o - c_q)*c))",
        "bending stress at the toe of the outstanding leg, compression +",
    )
    def stress_outstanding(self) -> FloatArray:
        return self._stress(-self.centroid_p, self.outstanding - self.centroid_q)

    @step("f_b", "MPa", "13.5", f"min(fy, ({LEG:g}*t/max(b_c, b_o))**2)", "yield stress, reduced for class 4 legs")
    def bending_yield(self) -> FloatArray:
        return np.minimum(self.fy, (LEG * self.thickness / np.maximum(self.connected, self.outstanding)) ** 2)

    @step(
        "compressed",
        "-",
        "13.8.3",
        "C_u/(k_w*C_r) + max(s_h, s_c, s_o)/(phi*f_b)",
        "axial force and bending at the corner most compressed",
    )
    def compressed(self) -> FloatArray:
        most = np.maximum(np.maximum(self.stress_heel, self.stress_connected), self.stress_outstanding)
        return self.force / (self.share * self.resistance) + most / (self.phi * self.bending_yield)

    @step(
        "stretched",
        "-",
        "13.8.3",
        "(-min(s_h, s_c, s_o) - C_u/A)/(phi*f_b)",
        "bending less axial force at the corner most stretched",
    )
    def stretched(self) -> FloatArray:
        least = np.minimum(np.minimum(self.stress_heel, self.stress_connected), self.stress_outstanding)
        return (-least - self.force / self.area) / (self.phi * self.bending_yield)

    @step("ratio", "-", "13.8.3", "max(compressed, stretched)", "utilisation")
    def ratio(self) -> FloatArray:
        return np.maximum(self.compressed, self.stretched)

    def _euler(self, inertia: FloatArray) -> FloatArray:
        return np.pi**2 * self.modulus * inertia / self.length**2

    def _stress(self, p: FloatArray, q: FloatArray) -> FloatArray:
        across = -p * self.sine + q * self.cosine
        along = p * self.cosine + q * self.sine
        return self.force * (self.gradient_major * along + self.gradient_minor * across)
