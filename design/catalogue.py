"""The catalogue: the sizes of sections that ship with the program.

Only dimensions and stock marks are stored (`design/data/*.csv`, each with its sources); every property is computed
from them, see `spanwright.design.families`.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from typing import Literal

import numpy as np

from spanwright.design.tables import read_table
from spanwright.truss.arrays import BoolArray, FloatArray

Process = Literal["cold", "hot"]

DENSITY = 7850.0
"""kg/m3, of structural steel (SANS 10162-1:2011 and EN 1991-1-1 alike, from memory)."""

COMMERCIAL = "commercial quality"
"""The stock mark of sizes that are sold without a certificate only; also the name of the steel they are."""

TO_ORDER = "to order"
"""How the stock mark of a size ends that is listed subject to availability."""

STOCKS = ("South Africa", "any")
"""Markets whose stock marks can filter; "any" filters nothing."""


@dataclass(frozen=True, eq=False)
class Angles:
    """Sizes of angles (s) in mm, longer leg first, and the stock mark of each ("" = none known).

    market : where the marks come from, "" if the whole table has none.
    """

    long: FloatArray
    short: FloatArray
    thickness: FloatArray
    root: FloatArray
    toe: FloatArray
    stock: tuple[str, ...]
    market: str = ""


@dataclass(frozen=True, eq=False)
class Tubes:
    """Sizes of hollow sections (s) in mm, greater side first; `hot` is True for hot-finished ones.

    outer, inner : corner radii; zero for round tubes, whose `depth` and `width` are the diameter.
    """

    depth: FloatArray
    width: FloatArray
    thickness: FloatArray
    outer: FloatArray
    inner: FloatArray
    hot: BoolArray


@dataclass(frozen=True, eq=False)
class Catalogue:
    """All sizes to choose from, by table: the `shipped` one, or one of the user's own."""

    equal_angles: Angles
    unequal_angles: Angles
    chs: Tubes
    shs: Tubes
    rhs: Tubes


@cache
def shipped() -> Catalogue:
    """Return the catalogue that ships with the program, read once."""
    equal = read_table("equal_angles.csv")
    leg, thickness, root, toe = _columns(equal, "leg_mm", "t_mm", "r1_mm", "r2_mm")
    unequal = read_table("unequal_angles.csv")
    long, short, wall, fillet, tip = _columns(unequal, "h_mm", "b_mm", "t_mm", "r1_mm", "r2_mm")
    return Catalogue(
        equal_angles=Angles(leg, leg, thickness, root, toe, tuple(row["south_africa"] for row in equal), STOCKS[0]),
        unequal_angles=Angles(long, short, wall, fillet, tip, ("",) * len(unequal)),
        chs=_tubes("chs.csv", "d_mm", "d_mm", rounded=False),
        shs=_tubes("shs.csv", "b_mm", "b_mm"),
        rhs=_tubes("rhs.csv", "h_mm", "b_mm"),
    )


def _columns(table: list[dict[str, str]], *names: str) -> list[FloatArray]:
    return [np.array([float(row[name]) for row in table]) for name in names]


def _tubes(file: str, depth: str, width: str, *, rounded: bool = True) -> Tubes:
    table = read_table(file)
    h, b, t = _columns(table, depth, width, "t_mm")
    hot = np.array([row["process"] == "hot" for row in table])
    outer, inner = _corner_radii(t, hot) if rounded else (np.zeros_like(t), np.zeros_like(t))
    return Tubes(h, b, t, outer, inner, hot)


def _corner_radii(thickness: FloatArray, hot: BoolArray) -> tuple[FloatArray, FloatArray]:
    outer, inner = np.zeros_like(thickness), np.zeros_like(thickness)
    for rule in reversed(read_table("corner_radii.csv")):
        here = (hot == (rule["process"] == "hot")) & (thickness <= float(rule["t_up_to_mm"]))
        outer[here] = float(rule["outer"]) * thickness[here]
        inner[here] = float(rule["inner"]) * thickness[here]
    return outer, inner
