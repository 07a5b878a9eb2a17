"""Back-marks: where bolts stand in the leg of an angle, and the greatest bolt that it takes (common practice)."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np

from spanwright.design.steps import Rule, given, step
from spanwright.design.tables import read_table
from spanwright.truss.arrays import FloatArray

CLAUSE = "back-marks, common practice (from memory)"


@dataclass(frozen=True, eq=False)
class BackMarks:
    """Rows of the table that hold for legs, each in the shape of the legs, mm.

    leg : of the row. gauge : from the heel to the line of bolts (the first of two). greatest_bolt : diameter.
    """

    leg: FloatArray
    gauge: FloatArray
    greatest_bolt: FloatArray


@dataclass(frozen=True, eq=False)
class BoltFit(Rule):
    """Whether one line of bolts fits the connected leg."""

    connected: FloatArray = given("b_c", "mm", "connected leg")
    diameter: float = given("d", "mm", "bolt diameter")
    row: FloatArray = given("b_r", "mm", "greatest leg of the back-mark table within the connected leg, or its least")
    gauge: FloatArray = given("g", "mm", "usual gauge of that leg, heel to the line of bolts")
    listed: FloatArray = given("d_r", "mm", "greatest bolt of that leg")

    @step(
        "d_max",
        "mm",
        CLAUSE,
        "where(b_c >= b_r, d_r, min(d, d_r)*b_c/b_r)",
        "greatest bolt of the connected leg; below the table less than any bolt, as such a leg takes none",
    )
    def greatest(self) -> FloatArray:
        below = np.minimum(self.diameter, self.listed) * self.connected / self.row
        return np.where(self.connected >= self.row, self.listed, below)

    @step("ratio", "-", CLAUSE, "d/d_max", "bolt diameter over the greatest that fits")
    def ratio(self) -> FloatArray:
        return self.diameter / self.greatest


def back_marks(legs: FloatArray) -> BackMarks:
    """Return the rows for legs in mm: the greatest listed leg that is not longer, or the least one."""
    leg, gauge, bolt = _table()
    at = np.maximum(np.searchsorted(leg, legs, side="right") - 1, 0)
    return BackMarks(leg[at], gauge[at], bolt[at])


def bolt_fit(connected: FloatArray, diameter: float) -> BoltFit:
    """Return the rule for connected legs and a bolt diameter, both in mm."""
    row = back_marks(connected)
    return BoltFit(connected, diameter, row.leg, row.gauge, row.greatest_bolt)


@cache
def _table() -> tuple[FloatArray, FloatArray, FloatArray]:
    rows = read_table("back_marks.csv")
    leg, gauge, bolt = (
        np.array([float(row[name]) for row in rows]) for name in ("leg_mm", "gauge_1_mm", "greatest_bolt_mm")
    )
    return leg, gauge, bolt
