"""Axial force with bending in the plane (cl. 13.8.3, 13.9), for pairs back to back and tubes.

Each sense of bending is checked on its own, with the elastic modulus at the fibre that it compresses and at the one
that it stretches. Where compression relieves a stretched fibre, the relief is left out.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray


@dataclass(frozen=True, eq=False)
class SecondOrder(Rule):
    """Factor on the moment for the deflection between the ends (13.8.4).

    The denominator is floored at 1 - phi: no member that passes in compression comes nearer to its Euler load.
    """

    force: FloatArray = given("C_u", "N", "factored compression")
    moment_factor: FloatArray = given("w_1", "-", "factor of the moment diagram", "13.8.5")
    length: FloatArray = given("KL", "mm", "effective length in plane")
    inertia: FloatArray = given("I_in", "mm4", "second moment in plane")
    modulus: float = given("E", "MPa", "modulus of elasticity")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("C_e", "N", "13.8.4", "pi**2*E*I_in/KL**2", "Euler load in plane")
    def euler(self) -> FloatArray:
        return np.pi**2 * self.modulus * self.inertia / self.length**2

    @step("U_1", "-", "13.8.4", "max(1, w_1/max(1 - C_u/C_e, 1 - phi))", "factor on the moment, not less than 1")
    def factor(self) -> FloatArray:
        return np.maximum(1.0, self.moment_factor / np.maximum(1.0 - self.force / self.euler, 1.0 - self.phi))


@dataclass(frozen=True, eq=False)
class CrossSection(Rule):
    """Strength of the cross-section (13.8.3 a): no slenderness."""

    force: FloatArray = given("C_u", "N", "factored compression")
    share: FloatArray = given("k_w", "-", "0.85 for the first compression web from a bearing, else 1", "15")
    area: FloatArray = given("A_e", "mm2", "effective area")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    moment: FloatArray = given("M_u", "N mm", "factored moment")
    moment_resistance: FloatArray = given("M_rc", "N mm", "factored moment resistance at the compressed fibre")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("C_r0", "N", "13.8.3", "phi*A_e*fy", "factored resistance in compression, no slenderness")
    def resistance(self) -> FloatArray:
        return self.phi * self.area * self.fy

    @step("ratio", "-", "13.8.3", "C_u/(k_w*C_r0) + M_u/M_rc", "interaction sum")
    def ratio(self) -> FloatArray:
        return self.force / (self.share * self.resistance) + self.moment / self.moment_resistance


@dataclass(frozen=True, eq=False)
class MemberInteraction(Rule):
    """Strength of the member: in plane (13.8.3 b), or sideways with lateral-torsional buckling (13.8.3 c)."""

    force: FloatArray = given("C_u", "N", "factored compression that goes with this way of buckling")
    share: FloatArray = given("k_w", "-", "0.85 for the first compression web from a bearing, else 1", "15")
    resistance: FloatArray = given("C_r", "N", "factored resistance in compression, this way of buckling")
    moment: FloatArray = given("M_u", "N mm", "factored moment")
    factor: FloatArray = given("U_1", "-", "second-order factor", "13.8.4")
    moment_resistance: FloatArray = given("M_r", "N mm", "factored moment resistance: 13.5 in plane, 13.6 sideways")

    @step("ratio", "-", "13.8.3", "C_u/(k_w*C_r) + U_1*M_u/M_r", "interaction sum")
    def ratio(self) -> FloatArray:
        return self.force / (self.share * self.resistance) + self.factor * self.moment / self.moment_resistance


@dataclass(frozen=True, eq=False)
class StretchedFibre(Rule):
    """Bending alone at the stretched fibre, second order included, relief by the compression left out (13.8.3)."""

    moment: FloatArray = given("M_u", "N mm", "factored moment")
    factor: FloatArray = given("U_1", "-", "second-order factor", "13.8.4")
    moment_resistance: FloatArray = given("M_rt", "N mm", "factored moment resistance at the stretched fibre")

    @step("ratio", "-", "13.8.3", "U_1*M_u/M_rt", "utilisation")
    def ratio(self) -> FloatArray:
        return self.factor * self.moment / self.moment_resistance


@dataclass(frozen=True, eq=False)
class TensionInteraction(Rule):
    """Tension and bending at the stretched fibre (13.9 a)."""

    force: FloatArray = given("T_u", "N", "factored tension")
    resistance: FloatArray = given("T_r", "N", "factored resistance in tension, the lesser of yield and fracture")
    moment: FloatArray = given("M_u", "N mm", "factored moment")
    moment_resistance: FloatArray = given("M_rt", "N mm", "factored moment resistance at the stretched fibre")

    @step("ratio", "-", "13.9", "T_u/T_r + M_u/M_rt", "interaction sum")
    def ratio(self) -> FloatArray:
        return self.force / self.resistance + self.moment / self.moment_resistance


@dataclass(frozen=True, eq=False)
class TensionRelief(Rule):
    """Bending less tension at the compressed fibre (13.9 b)."""

    force: FloatArray = given("T_u", "N", "factored tension")
    moment: FloatArray = given("M_u", "N mm", "factored moment")
    moment_resistance: FloatArray = given("M_rl", "N mm", "factored moment resistance, lateral-torsional buckling")
    section_modulus: FloatArray = given("Z", "mm3", "modulus that goes with it")
    area: FloatArray = given("A", "mm2", "gross area")

    @step("ratio", "-", "13.9", "max(M_u/M_rl - T_u*Z/(M_rl*A), 0)", "interaction difference")
    def ratio(self) -> FloatArray:
        relieved = self.moment - self.force * self.section_modulus / self.area
        return np.maximum(relieved / self.moment_resistance, 0.0)


InteractionRule = CrossSection | MemberInteraction | StretchedFibre | TensionInteraction | TensionRelief
