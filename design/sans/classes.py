"""Section classes (cl. 11) and the effective area of class 4 sections in compression (cl. 13.3).

A section whose walls keep within the limit has its whole area effective. Otherwise each wall too wide is cut to its
limit width; buckling stresses stay those of the gross section (project decision, the safe one of the two routes).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.sans.constants import number
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray

LEG = number("classes", "leg")
WALL = number("classes", "wall")
CORNERS = number("classes", "corners")
ROUND = number("classes", "round")


@dataclass(frozen=True, eq=False)
class AngleClass(Rule):
    """Effective area of angles, single or in pairs with or without separators; widths are whole legs."""

    area: FloatArray = given("A", "mm2", "gross area of the member")
    pieces: float = given("n_L", "-", "angles in the member")
    connected: FloatArray = given("b_c", "mm", "connected leg")
    outstanding: FloatArray = given("b_o", "mm", "outstanding leg")
    thickness: FloatArray = given("t", "mm", "thickness")
    fy: FloatArray = given("fy", "MPa", "yield stress")

    @step("W_lim", "-", "11.2", f"{LEG:g}/sqrt(fy)", "greatest width-to-thickness ratio of a leg that is not class 4")
    def limit(self) -> FloatArray:
        return LEG / np.sqrt(self.fy)

    @step("W_c", "-", "11.3", "b_c/t", "width-to-thickness ratio of the connected leg")
    def ratio_connected(self) -> FloatArray:
        return self.connected / self.thickness

    @step("W_o", "-", "11.3", "b_o/t", "width-to-thickness ratio of the outstanding leg")
    def ratio_outstanding(self) -> FloatArray:
        return self.outstanding / self.thickness

    @step(
        "A_e",
        "mm2",
        "13.3.3",
        "A - n_L*t**2*(max(W_c - W_lim, 0) + max(W_o - W_lim, 0))",
        "area effective in compression: legs cut to the limit width",
    )
    def effective_area(self) -> FloatArray:
        connected: FloatArray = np.maximum(self.ratio_connected - self.limit, 0.0)
        outstanding: FloatArray = np.maximum(self.ratio_outstanding - self.limit, 0.0)
        return self.area - self.pieces * self.thickness**2 * (connected + outstanding)


@dataclass(frozen=True, eq=False)
class RectangularClass(Rule):
    """Effective area of square and rectangular tubes; flat width = outside less four wall thicknesses (11.3.2)."""

    area: FloatArray = given("A", "mm2", "gross area")
    depth: FloatArray = given("h", "mm", "outside depth in the plane")
    width: FloatArray = given("b", "mm", "outside width")
    thickness: FloatArray = given("t", "mm", "wall")
    fy: FloatArray = given("fy", "MPa", "yield stress")

    @step("W_lim", "-", "11.2", f"{WALL:g}/sqrt(fy)", "greatest width-to-thickness ratio of a wall that is not class 4")
    def limit(self) -> FloatArray:
        return WALL / np.sqrt(self.fy)

    @step("W_h", "-", "11.3.2", f"h/t - {CORNERS:g}", "width-to-thickness ratio of the flat depth")
    def ratio_depth(self) -> FloatArray:
        return self.depth / self.thickness - CORNERS

    @step("W_b", "-", "11.3.2", f"b/t - {CORNERS:g}", "width-to-thickness ratio of the flat width")
    def ratio_width(self) -> FloatArray:
        return self.width / self.thickness - CORNERS

    @step(
        "A_e",
        "mm2",
        "13.3.3",
        "A - 2*t**2*(max(W_h - W_lim, 0) + max(W_b - W_lim, 0))",
        "area effective in compression: walls cut to the limit width",
    )
    def effective_area(self) -> FloatArray:
        depth: FloatArray = np.maximum(self.ratio_depth - self.limit, 0.0)
        width: FloatArray = np.maximum(self.ratio_width - self.limit, 0.0)
        return self.area - 2 * self.thickness**2 * (depth + width)


@dataclass(frozen=True, eq=False)
class RoundClass(Rule):
    """Effective area of round tubes: beyond the limit the area is scaled by it (project decision)."""

    area: FloatArray = given("A", "mm2", "gross area")
    diameter: FloatArray = given("D", "mm", "outside diameter")
    thickness: FloatArray = given("t", "mm", "wall")
    fy: FloatArray = given("fy", "MPa", "yield stress")

    @step("W_lim", "-", "11.2", f"{ROUND:g}/fy", "greatest diameter-to-wall ratio that is not class 4")
    def limit(self) -> FloatArray:
        return ROUND / self.fy

    @step("A_e", "mm2", "13.3.3", "A*min(1, W_lim*t/D)", "area effective in compression")
    def effective_area(self) -> FloatArray:
        return self.area * np.minimum(1.0, self.limit * self.thickness / self.diameter)


CompressionClass = AngleClass | RectangularClass | RoundClass
