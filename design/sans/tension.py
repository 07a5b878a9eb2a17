"""Tension (cl. 12.3, 13.2): yield of the gross section, fracture of the net section with shear lag.

Block shear belongs to the joint. Tubes are taken as welded, whatever the stated ends: to tubes all round, to a gusset
along slots. A bolted end plate or cleat has its own net section, which belongs to the joint too.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.sans.constants import number
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray

FRACTURE = number("tension", "fracture")
LINES = number("tension", "lines")
LAG_MANY, LAG_FEW = number("tension", "lag_many"), number("tension", "lag_few")
CLEARANCE, CLEARANCE_LARGE = number("tension", "clearance"), number("tension", "clearance_large")
LARGE_BOLT, PUNCHED = number("tension", "large_bolt"), number("tension", "punched")
WELD_LONG, WELD_SHORT = number("tension", "weld_long"), number("tension", "weld_short")
MID_WIDTH, MID_LENGTH = number("tension", "weld_mid_width"), number("tension", "weld_mid_length")
OUTSTAND_SHORT = number("tension", "outstand_short")


@dataclass(frozen=True, eq=False)
class GrossYield(Rule):
    """Yield of the gross section (13.2 a i)."""

    force: FloatArray = given("T_u", "N", "factored tension")
    area: FloatArray = given("A", "mm2", "gross area")
    fy: FloatArray = given("fy", "MPa", "yield stress")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("T_ry", "N", "13.2", "phi*A*fy", "factored resistance, yield of the gross section")
    def resistance(self) -> FloatArray:
        return self.phi * self.area * self.fy

    @step("ratio", "-", "13.2", "T_u/T_ry", "utilisation")
    def ratio(self) -> FloatArray:
        return self.force / self.resistance


@dataclass(frozen=True, eq=False)
class NetFracture(Rule):
    """Fracture of the net section (13.2 a iii)."""

    force: FloatArray = given("T_u", "N", "factored tension")
    net_area: FloatArray = given("A_ne", "mm2", "effective net area")
    fu: FloatArray = given("fu", "MPa", "tensile strength")
    phi: float = given("phi", "-", "resistance factor", "13.1")

    @step("T_ru", "N", "13.2", f"{FRACTURE:g}*phi*A_ne*fu", "factored resistance, fracture of the net section")
    def resistance(self) -> FloatArray:
        return FRACTURE * self.phi * self.net_area * self.fu

    @step("ratio", "-", "13.2", "T_u/T_ru", "utilisation")
    def ratio(self) -> FloatArray:
        return self.force / self.resistance


@dataclass(frozen=True, eq=False)
class WeldedAngle(Rule):
    """Effective net area of angles welded along both edges of one leg (12.3.3.3)."""

    pieces: float = given("n_L", "-", "angles in the member")
    connected: FloatArray = given("b_c", "mm", "connected leg")
    outstanding: FloatArray = given("b_o", "mm", "outstanding leg")
    thickness: FloatArray = given("t", "mm", "thickness")
    weld: FloatArray = given("L", "mm", "mean length of the two welds")
    heel_weld: FloatArray = given("L_h", "mm", "length of the weld along the heel")

    @step("w", "mm", "12.3.3.3", "b_c - t", "width of the connected leg between its welds")
    def width(self) -> FloatArray:
        return self.connected - self.thickness

    @step(
        "A_n2",
        "mm2",
        "12.3.3.3",
        f"where(L >= 2*w, {WELD_LONG:g}*w*t, where(L >= w, {MID_WIDTH:g}*w*t + {MID_LENGTH:g}*L*t, "
        f"{WELD_SHORT:g}*L*t))",
        "effective area of the connected leg of one angle",
    )
    def connected_area(self) -> FloatArray:
        w, t, L = self.width, self.thickness, self.weld
        middle = MID_WIDTH * w * t + MID_LENGTH * L * t
        return np.where(2 * w <= L, WELD_LONG * w * t, np.where(w <= L, middle, WELD_SHORT * L * t))

    @step(
        "A_n3",
        "mm2",
        "12.3.3.3",
        f"where(L_h >= b_o, (1 - b_o/(2*L_h))*b_o*t, {OUTSTAND_SHORT:g}*L_h*t)",
        "effective area of the outstanding leg of one angle, held along the heel",
    )
    def outstanding_area(self) -> FloatArray:
        w, t, L = self.outstanding, self.thickness, self.heel_weld
        return np.where(w <= L, (1.0 - w / (2.0 * L)) * w * t, OUTSTAND_SHORT * L * t)

    @step("A_ne", "mm2", "12.3.3.3", "n_L*(A_n2 + A_n3)", "effective net area of the member")
    def net_area(self) -> FloatArray:
        return self.pieces * (self.connected_area + self.outstanding_area)


@dataclass(frozen=True, eq=False)
class BoltedAngle(Rule):
    """Effective net area of angles bolted through one leg (12.3.2, 12.3.3.2)."""

    pieces: float = given("n_L", "-", "angles in the member")
    area: FloatArray = given("A", "mm2", "gross area of the member")
    thickness: FloatArray = given("t", "mm", "thickness")
    diameter: float = given("d", "mm", "bolt diameter")
    lines: float = given("n_t", "-", "transverse lines of bolts, one behind the other along the member")
    across: float = given("n_w", "-", "holes in one cross-section of an angle")
    punched: float = given("p", "-", "1 for punched holes, 0 for drilled")

    @step(
        "d_h",
        "mm",
        "22.3.5",
        f"d + where(d <= {LARGE_BOLT:g}, {CLEARANCE:g}, {CLEARANCE_LARGE:g})",
        "hole diameter",
    )
    def hole(self) -> FloatArray:
        return np.asarray(self.diameter + np.where(self.diameter <= LARGE_BOLT, CLEARANCE, CLEARANCE_LARGE))

    @step("A_n", "mm2", "12.3.2", f"A - n_L*n_w*(d_h + {PUNCHED:g}*p)*t", "net area of the member")
    def plain_net_area(self) -> FloatArray:
        return self.area - self.pieces * self.across * (self.hole + PUNCHED * self.punched) * self.thickness

    @step("U", "-", "12.3.3.2", f"where(n_t >= {LINES:g}, {LAG_MANY:g}, {LAG_FEW:g})", "shear lag, one leg connected")
    def lag(self) -> FloatArray:
        return np.where(np.asarray(self.lines) >= LINES, LAG_MANY, LAG_FEW)

    @step("A_ne", "mm2", "12.3.3.2", "U*A_n", "effective net area of the member")
    def net_area(self) -> FloatArray:
        return self.lag * self.plain_net_area


@dataclass(frozen=True, eq=False)
class WeldedTube(Rule):
    """Effective net area of a tube welded all round (12.3.3.1): every wall is connected."""

    area: FloatArray = given("A", "mm2", "gross area")

    @step("A_ne", "mm2", "12.3.3.1", "A", "effective net area; the end is taken as welded all round")
    def net_area(self) -> FloatArray:
        return self.area


@dataclass(frozen=True, eq=False)
class SlottedTube(Rule):
    """Effective net area of a tube slotted over a gusset and welded along it (12.3.2, 12.3.3.3).

    Each half of the wall is an element connected along two parallel edges. Later editions of S16 allow more.
    """

    area: FloatArray = given("A", "mm2", "gross area")
    thickness: FloatArray = given("t", "mm", "wall")
    slot: FloatArray = given("b_s", "mm", "width of the slots, 0 where both ends are welded all round")
    weld: FloatArray = given("L", "mm", "length of each of the four welds")

    @step("A_n", "mm2", "12.3.2", "A - 2*b_s*t", "net area, both slots taken off")
    def plain_net_area(self) -> FloatArray:
        return self.area - 2.0 * self.slot * self.thickness

    @step("w", "mm", "12.3.3.3", "A_n/(2*t)", "half of the wall, from weld to weld")
    def width(self) -> FloatArray:
        return self.plain_net_area / (2.0 * self.thickness)

    @step(
        "U",
        "-",
        "12.3.3.3",
        f"where(b_s <= 0, 1, where(L >= 2*w, {WELD_LONG:g}, where(L >= w, {MID_WIDTH:g} + {MID_LENGTH:g}*L/w, "
        f"{WELD_SHORT:g}*L/w)))",
        "shear lag",
    )
    def lag(self) -> FloatArray:
        w, L = self.width, self.weld
        along = np.where(2 * w <= L, WELD_LONG, np.where(w <= L, MID_WIDTH + MID_LENGTH * L / w, WELD_SHORT * L / w))
        return np.where(self.slot <= 0.0, 1.0, along)

    @step("A_ne", "mm2", "12.3.3.3", "U*A_n", "effective net area of the member")
    def net_area(self) -> FloatArray:
        return self.lag * self.plain_net_area
