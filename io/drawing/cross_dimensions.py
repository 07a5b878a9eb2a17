"""Which sizes a cross-section is dimensioned with, from its own origin, mm."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from spanwright.io.drawing.cross_shapes import Cell
from spanwright.io.drawing.dimensions import Dimension
from spanwright.io.drawing.lettering import width_of
from spanwright.io.drawing.standards import TICK
from spanwright.truss.arrays import FloatArray

LINE = 8.0
"""mm on paper from the steel to its dimensions, and from line to line."""
NARROW = 3.0
"""mm on paper: a narrower gap is dimensioned on a line of its own."""
DIAMETER = "\u00d8"


def sizes(cell: Cell, unit: float) -> Iterator[Dimension]:
    """Return what a cross-section is dimensioned with, from its own origin."""
    section = cell.choice.section
    low, high = cell.steel.min(axis=0), cell.steel.max(axis=0)
    rings = np.vstack([ring for piece in cell.pieces for ring in piece.rings])
    if section.family in ("L", "2L", "2L star"):
        yield from _of_angles(cell, rings, low, high, unit)
    else:
        depth, width, wall = (float(value[0]) for value in (section.depth, section.width, section.thickness))
        across = _upright("depth", 0.0, -depth / 2.0, depth / 2.0, float(low[0]) - LINE * unit)
        yield replace(across, sign=DIAMETER) if section.family == "CHS" else across
        if section.family != "CHS":
            yield _level("width", 0.0, -width / 2.0, width / 2.0, float(high[1]) + LINE * unit)
        yield _level("wall", 0.0, width / 2.0 - wall, width / 2.0, float(low[1]) - LINE * unit, off=1.0)
    if cell.pack is not None:
        x, (bottom, top) = float(cell.pack[1, 0]), cell.pack[[1, 2], 1]
        yield _upright("pack length", x, float(bottom), float(top), float(high[0]) + 2.0 * LINE * unit)


def _of_angles(cell: Cell, rings: FloatArray, low: FloatArray, high: FloatArray, unit: float) -> Iterator[Dimension]:
    section = cell.choice.section
    leg, out, t = (float(value[0]) for value in (section.leg_connected, section.leg_outstanding, section.thickness))
    back = section.gap / 2.0 if section.pieces == 2 else cell.gusset / 2.0
    upper, lower = float(rings[:, 1].max()), float(rings[:, 1].min())
    heel_up = cell.choice.group.role != "bottom chord"
    star = section.family == "2L star"
    heel = section.gap / 2.0 if star else upper if heel_up else lower
    inward = 1.0 if star or not heel_up else -1.0
    left, right = float(min(low[0], -back)) - LINE * unit, float(high[0]) + LINE * unit
    outward = LINE * unit if heel_up or star else -LINE * unit
    level = float(high[1] if outward > 0.0 else low[1]) + outward
    legs_low, legs_high = sorted((heel, heel + inward * leg))
    yield _upright("connected leg", back, legs_low, legs_high, left)
    if not star:
        yield _upright("setting-out line", back, min(heel, 0.0), max(heel, 0.0), left - LINE * unit, off=-inward)
    face = heel + inward * t
    yield _upright("thickness", back + out, min(heel, face), max(heel, face), right, off=-inward)
    yield _level("outstanding leg", heel, back, back + out, level)
    if section.gap > 0.0:
        yield _gap("gap", heel, back, level, outward, unit)
        if not star:
            yield _level("outstanding leg", heel, -back - out, -back, level)
        else:
            yield _upright("gap", back, -back, back, left - LINE * unit, off=1.0)
    elif cell.gusset:
        yield _gap("gusset", heel, back, level, outward, unit)


def _gap(what: str, y: float, half: float, level: float, outward: float, unit: float) -> Dimension:
    """Dimension a gap in the line of the outstanding legs; where it is too narrow for that, on a line of its own."""
    if 2.0 * half / unit < NARROW:
        return _level(what, y, -half, half, level + outward, off=1.0)
    return _level(what, y, -half, half, level)


def _level(what: str, y: float, left: float, right: float, at: float, off: float = 0.0) -> Dimension:
    return Dimension(what, np.array([left, y]), np.array([right, y]), np.array([left, at]), 0.0, off)


def _upright(what: str, x: float, bottom: float, top: float, at: float, off: float = 0.0) -> Dimension:
    return Dimension(what, np.array([x, bottom]), np.array([x, top]), np.array([at, bottom]), 90.0, off)


def off_by(one: Dimension, unit: float) -> float:
    """Return mm on paper by which the text of a short dimension stands off."""
    room, text = one.length / unit, width_of(f"{one.length:.1f}".removesuffix(".0"))
    return one.off * (room + text) / 2.0 + one.off * TICK if room < text + TICK else 0.0
