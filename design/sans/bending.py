"""Moment resistances (cl. 13.5, 13.6) and the factor of the moment diagram (13.8.5). Bending in the plane only."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.sans.classes import CORNERS, LEG, WALL
from spanwright.design.sans.constants import number
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray, IntArray

WALL_CLASS_2 = number("classes", "wall_class_2")
ROUND_CLASS_2, ROUND_CLASS_3 = number("classes", "round_class_2"), number("classes", "round_class_3")
ELASTIC_SHARE = number("bending", "elastic_share")
INELASTIC, INELASTIC_DROP = number("bending", "inelastic"), number("bending", "inelastic_drop")
PAIR_MOMENT, PAIR_DEPTH = number("bending", "pair_moment"), number("bending", "pair_depth")
BASE, FACTOR, LEAST = (
    number("bending", "no_load_base"),
    number("bending", "no_load_factor"),
    number("bending", "no_load_least"),
)
ONE_LOAD, MORE_LOADS = number("bending", "one_load"), number("bending", "more_loads")


@dataclass(frozen=True, eq=False)
class PairMoment(Rule):
    """Elastic moment of a pair of angles, class 3, at the fibre compressed and at the fibre stretched."""

    modulus_compressed: FloatArray = given("Z_c", "mm3", "elastic modulus at the fibre that the moment compresses")
    modulus_stretched: FloatArray = given("Z_t", "mm3", "elastic modulus at the fibre that the moment stretches")
    connected: FloatArray = given("b_c", "mm", "connected leg")
    outstanding: FloatArray = given("b_o", "mm", "outstanding leg")
    thickness: FloatArray = given("t", "mm", "thickness")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("f_b", "MPa", "13.5", f"min(fy, ({LEG:g}*t/max(b_c, b_o))**2)", "yield stress, reduced for class 4 legs")
    def bending_yield(self) -> FloatArray:
        return np.minimum(self.fy, (LEG * self.thickness / np.maximum(self.connected, self.outstanding)) ** 2)

    @step("M_y", "N mm", "13.5", "Z_c*f_b", "moment at yield of the compressed fibre")
    def capacity(self) -> FloatArray:
        return self.modulus_compressed * self.bending_yield

    @step("M_rc", "N mm", "13.5", "phi*M_y", "factored moment resistance at the compressed fibre")
    def resistance_compressed(self) -> FloatArray:
        return self.phi * self.capacity

    @step("M_rt", "N mm", "13.5", "phi*Z_t*f_b", "factored moment resistance at the stretched fibre")
    def resistance_stretched(self) -> FloatArray:
        return self.phi * self.modulus_stretched * self.bending_yield

    @property
    def modulus(self) -> FloatArray:
        """The modulus that goes with `capacity`."""
        return self.modulus_compressed


@dataclass(frozen=True, eq=False)
class RectangularMoment(Rule):
    """Moment of a rectangular tube: plastic in class 1 and 2, else elastic.

    Every wall is classed as if it were compressed throughout, which is never less severe than the rule for webs.
    """

    modulus_plastic: FloatArray = given("Z_pl", "mm3", "plastic modulus")
    modulus_elastic: FloatArray = given("Z_e", "mm3", "elastic modulus")
    depth: FloatArray = given("h", "mm", "outside depth in the plane")
    width: FloatArray = given("b", "mm", "outside width")
    thickness: FloatArray = given("t", "mm", "wall")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("W", "-", "11.3.2", f"max(h, b)/t - {CORNERS:g}", "greatest width-to-thickness ratio of a wall")
    def ratio(self) -> FloatArray:
        return np.maximum(self.depth, self.width) / self.thickness - CORNERS

    @step("Z", "mm3", "11.2", f"where(W <= {WALL_CLASS_2:g}/sqrt(fy), Z_pl, Z_e)", "plastic in class 1 and 2")
    def modulus(self) -> FloatArray:
        return np.where(self.ratio <= WALL_CLASS_2 / np.sqrt(self.fy), self.modulus_plastic, self.modulus_elastic)

    @step("f_b", "MPa", "13.5", f"min(fy, ({WALL:g}/W)**2)", "yield stress, reduced for class 4 walls")
    def bending_yield(self) -> FloatArray:
        return np.minimum(self.fy, (WALL / self.ratio) ** 2)

    @step("M_y", "N mm", "13.5", "Z*f_b", "moment at yield, or plastic moment")
    def capacity(self) -> FloatArray:
        return self.modulus * self.bending_yield

    @step("M_rc", "N mm", "13.5", "phi*M_y", "factored moment resistance")
    def resistance_compressed(self) -> FloatArray:
        return self.phi * self.capacity

    @property
    def resistance_stretched(self) -> FloatArray:
        """The same at both fibres."""
        return self.resistance_compressed


@dataclass(frozen=True, eq=False)
class RoundMoment(Rule):
    """Moment of a round tube: plastic in class 1 and 2, else elastic."""

    modulus_plastic: FloatArray = given("Z_pl", "mm3", "plastic modulus")
    modulus_elastic: FloatArray = given("Z_e", "mm3", "elastic modulus")
    diameter: FloatArray = given("D", "mm", "outside diameter")
    thickness: FloatArray = given("t", "mm", "wall")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("Z", "mm3", "11.2", f"where(D/t <= {ROUND_CLASS_2:g}/fy, Z_pl, Z_e)", "plastic in class 1 and 2")
    def modulus(self) -> FloatArray:
        plastic = self.diameter / self.thickness <= ROUND_CLASS_2 / self.fy
        return np.where(plastic, self.modulus_plastic, self.modulus_elastic)

    @step("f_b", "MPa", "13.5", f"min(fy, {ROUND_CLASS_3:g}*t/D)", "yield stress, reduced for class 4")
    def bending_yield(self) -> FloatArray:
        return np.minimum(self.fy, ROUND_CLASS_3 * self.thickness / self.diameter)

    @step("M_y", "N mm", "13.5", "Z*f_b", "moment at yield, or plastic moment")
    def capacity(self) -> FloatArray:
        return self.modulus * self.bending_yield

    @step("M_rc", "N mm", "13.5", "phi*M_y", "factored moment resistance")
    def resistance_compressed(self) -> FloatArray:
        return self.phi * self.capacity

    @property
    def resistance_stretched(self) -> FloatArray:
        """The same at both fibres."""
        return self.resistance_compressed


MomentRule = PairMoment | RectangularMoment | RoundMoment


@dataclass(frozen=True, eq=False)
class PairLateral(Rule):
    """Elastic critical moment of a pair (AISC 360 F9), uniform moment over the length between lateral restraints."""

    length: FloatArray = given("L_b", "mm", "length between lateral restraints, not less than the torsional length")
    inertia_out: FloatArray = given("I_out", "mm4", "second moment sideways")
    torsion: FloatArray = given("J", "mm4", "St Venant torsion constant")
    depth: FloatArray = given("d", "mm", "depth of the connected legs")
    sense: FloatArray = given("k_B", "-", "1 where the moment stretches the toes, -1 where it compresses them")
    modulus: float = given("E", "MPa", "modulus of elasticity")

    @step("B", "-", "AISC F9", f"k_B*{PAIR_DEPTH:g}*d/L_b*sqrt(I_out/J)", "effect of the depth below the flange")
    def asymmetry(self) -> FloatArray:
        return self.sense * PAIR_DEPTH * self.depth / self.length * np.sqrt(self.inertia_out / self.torsion)

    @step(
        "M_cr",
        "N mm",
        "AISC F9",
        f"{PAIR_MOMENT:g}*E/L_b*sqrt(I_out*J)*(B + sqrt(1 + B**2))",
        "elastic critical moment, lateral-torsional buckling",
    )
    def critical(self) -> FloatArray:
        stiffness = PAIR_MOMENT * self.modulus / self.length * np.sqrt(self.inertia_out * self.torsion)
        return stiffness * (self.asymmetry + np.hypot(1.0, self.asymmetry))


@dataclass(frozen=True, eq=False)
class TubeLateral(Rule):
    """Elastic critical moment of a closed section (13.6), uniform moment, warping left out."""

    length: FloatArray = given("L_b", "mm", "length between lateral restraints, not less than the torsional length")
    inertia_out: FloatArray = given("I_out", "mm4", "second moment sideways")
    torsion: FloatArray = given("J", "mm4", "St Venant torsion constant")
    modulus: float = given("E", "MPa", "modulus of elasticity")
    shear_modulus: float = given("G", "MPa", "shear modulus")

    @step("M_cr", "N mm", "13.6", "pi/L_b*sqrt(E*I_out*G*J)", "elastic critical moment, lateral-torsional buckling")
    def critical(self) -> FloatArray:
        stiffness = self.modulus * self.inertia_out * self.shear_modulus * self.torsion
        return np.pi / self.length * np.sqrt(stiffness)


@dataclass(frozen=True, eq=False)
class LateralMoment(Rule):
    """Factored moment resistance with lateral-torsional buckling (13.6)."""

    critical: FloatArray = given("M_cr", "N mm", "elastic critical moment")
    capacity: FloatArray = given("M_y", "N mm", "moment at yield, or plastic moment")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step(
        "M_rl",
        "N mm",
        "13.6",
        f"where(M_cr > {ELASTIC_SHARE:g}*M_y, "
        f"min({INELASTIC:g}*phi*M_y*(1 - {INELASTIC_DROP:g}*M_y/M_cr), phi*M_y), phi*M_cr)",
        "factored moment resistance, lateral-torsional buckling",
    )
    def resistance(self) -> FloatArray:
        My, Mcr = self.capacity, self.critical
        inelastic = INELASTIC * self.phi * My * (1.0 - INELASTIC_DROP * My / Mcr)
        return np.where(Mcr > ELASTIC_SHARE * My, np.minimum(inelastic, self.phi * My), self.phi * Mcr)


@dataclass(frozen=True, eq=False)
class EquivalentMoment(Rule):
    """Factor of the moment diagram for second-order effects (13.8.5)."""

    smaller: FloatArray = given("M_1", "N mm", "end moment of smaller size, sagging +")
    larger: FloatArray = given("M_2", "N mm", "end moment of larger size, sagging +")
    loads: IntArray = given("n_P", "-", "loads between the ends; 2 where the span moment exceeds both end moments")

    @step("kappa", "-", "13.8.5", "-M_1*M_2/max(M_2**2, 1)", "ratio of end moments, + in double curvature")
    def ratio(self) -> FloatArray:
        return -self.smaller * self.larger / np.maximum(self.larger**2, 1.0)

    @step(
        "w_1",
        "-",
        "13.8.5",
        f"where(n_P > 1, {MORE_LOADS:g}, where(n_P > 0, {ONE_LOAD:g}, max({BASE:g} - {FACTOR:g}*kappa, {LEAST:g})))",
        "factor of the moment diagram",
    )
    def factor(self) -> FloatArray:
        unloaded = np.maximum(BASE - FACTOR * self.ratio, LEAST)
        return np.where(self.loads > 1, MORE_LOADS, np.where(self.loads > 0, ONE_LOAD, unloaded))
