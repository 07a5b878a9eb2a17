"""Which lengths the elevation is dimensioned with, and where their dimension lines lie. Model mm."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.io.drawing.lettering import TEXT, width_of
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import DIMENSION_GAP, DIMENSIONS, EXTENSION_LENGTH, TICK
from spanwright.io.pictures.boxes import box, boxes_along
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import slopes
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

FIRST, BESIDE, APART = 19.0, 11.0, 8.0
"""mm on paper from the steel to the first dimension line above and below, and beside it; and from line to line."""


@dataclass(frozen=True, eq=False)
class Dimension:
    """One dimension: what it measures, from point to point (2,) in a direction, degrees, on a line through `line`.

    off : to which side its text may stand off where it is short, +1 or -1 in that direction; 0: it stays.
    sign : stands before the length, such as that of a diameter.
    """

    what: str
    start: FloatArray
    end: FloatArray
    line: FloatArray
    angle: float
    off: float = 0.0
    sign: str = ""

    @property
    def length(self) -> float:
        """Length measured, mm."""
        turn = np.radians(self.angle)
        return abs(float((self.end - self.start) @ np.array([np.cos(turn), np.sin(turn)])))

    def boxes(self, scale: float) -> FloatArray:
        """Return the (3, 6) boxes that its line with the text, and its two extension lines take."""
        turn = np.radians(self.angle)
        along, across = np.array([np.cos(turn), np.sin(turn)]), np.array([-np.sin(turn), np.cos(turn)])
        feet = [self.line + along * ((point - self.line) @ along) for point in (self.start, self.end)]
        over = (TEXT + 2.0 * DIMENSION_GAP) * scale
        below = TICK / 2.0 * scale
        shown = self.length + TICK * scale
        middle = (feet[0] + feet[1]) / 2.0 + (over - below) / 2.0 * across
        inward = np.sign((self.start - feet[0]) @ across) * EXTENSION_LENGTH * scale * across
        return np.vstack(
            [
                box(middle, turn, max(shown, width_of(f"{self.length:.0f}") * scale), over + below),
                boxes_along(np.array([[foot, foot + inward] for foot in feet]), 0.5 * scale),
            ]
        )


def dimensions(truss: Truss, outer: FloatArray, scale: float) -> tuple[Dimension, ...]:
    """Return the dimensions of an elevation.

    outer : (n, 2) mm, corners of all steel. Rafter panels are measured along the slope; panels, span and overall length
    below the truss; heights at its sides.
    """
    first, apart = FIRST * scale, APART * scale
    low, high = outer.min(axis=0), outer.max(axis=0)
    below = float(min(low[1], truss.xy[:, 1].min()))
    levels = (below - first, below - first - apart, below - first - 2.0 * apart)
    return (
        *_rafter_panels(truss, first),
        *_bottom_panels(truss, levels[0]),
        *_span(truss, levels[1]),
        *_overall_length(truss, low, high, levels),
        *_heights(truss, low, high, BESIDE * scale, apart),
    )


def _rafter_panels(truss: Truss, first: float) -> Iterator[Dimension]:
    for bar, along in zip(truss.top.bars, slopes(truss).directions, strict=True):
        start, end = sorted(truss.xy[truss.ends[bar]], key=lambda point: float(point @ along))
        upward = np.array([-along[1], along[0]])
        angle = float(np.degrees(np.arctan2(along[1], along[0])))
        yield Dimension(truss.bar_names[bar], start, end, start + first * upward, angle)


def _bottom_panels(truss: Truss, level: float) -> Iterator[Dimension]:
    joints = sorted(truss.bottom.joints, key=lambda joint: float(truss.xy[joint, 0]))
    for left, right in pairwise(joints):
        yield _level("bottom panel", truss.xy[left], truss.xy[right], level)


def _span(truss: Truss, level: float) -> Iterator[Dimension]:
    for left, right in pairwise(truss.bearing_joints):
        yield _level("span", truss.xy[left], truss.xy[right], level)


def _overall_length(truss: Truss, low: FloatArray, high: FloatArray, levels: tuple[float, ...]) -> Iterator[Dimension]:
    """Dimension overhangs beside the span, and below it the length over all steel."""
    ends = (truss.top.joints[0], truss.top.joints[-1])
    directions = slopes(truss).directions
    for joint, overhang, outward in zip(ends, truss.top.overhang, (-directions[0], directions[-1]), strict=True):
        if overhang > 0.0:
            tip = truss.xy[joint] + overhang * outward
            start, end = sorted((tip, truss.xy[joint]), key=lambda point: float(point[0]))
            yield _level("overhang", start, end, levels[1])
    yield _level("overall length", low, np.array([high[0], low[1]]), levels[2])


def _heights(truss: Truss, low: FloatArray, high: FloatArray, first: float, apart: float) -> Iterator[Dimension]:
    """Dimension heel, rise and both together at the right, the height over all steel at the left, with its heel if it
    is another.
    """
    apex = truss.xy[slopes(truss).apex_joint]
    eaves = min((truss.xy[joint] for joint in (truss.top.joints[0], truss.top.joints[-1])), key=lambda point: point[1])
    heels = [_heel(truss, joint) for joint in (truss.bearing_joints[0], truss.bearing_joints[-1])]
    near, far = float(high[0]) + first, float(high[0]) + first + apart
    if heels[1] and heels[1][1][1] < apex[1]:
        yield _upright("heel", *heels[1], near)
    if heels[0] and (not heels[1] or abs(_height(heels[0]) - _height(heels[1])) > TOLERANCES.same_length):
        yield _upright("heel", *heels[0], float(low[0]) - first)
    if apex[1] - eaves[1] > TOLERANCES.same_length:
        beside = not heels[1] or abs(heels[1][1][1] - eaves[1]) < TOLERANCES.same_length
        yield _upright("rise", eaves, apex, near if beside else far)
        if heels[1] and beside and heels[1][0][1] < eaves[1]:
            yield _upright("heel and rise", heels[1][0], apex, far)
    yield _upright("overall height", low, np.array([low[0], high[1]]), float(low[0]) - first - apart)


def _height(heel: tuple[FloatArray, FloatArray]) -> float:
    return float(heel[1][1] - heel[0][1])


def _heel(truss: Truss, joint: int) -> tuple[FloatArray, FloatArray] | None:
    """Return the points of both chords in the line of a bearing, lower first, or None where the chords meet."""
    x, y = truss.xy[joint]
    for other in (*truss.top.joints, *truss.bottom.joints):
        if abs(truss.xy[other, 0] - x) <= TOLERANCES.on_joint and abs(truss.xy[other, 1] - y) > TOLERANCES.on_joint:
            low, high = sorted((truss.xy[joint], truss.xy[other]), key=lambda point: float(point[1]))
            return low, high
    return None


def _level(what: str, start: FloatArray, end: FloatArray, level: float) -> Dimension:
    return Dimension(what, start, end, np.array([start[0], level]), 0.0)


def _upright(what: str, start: FloatArray, end: FloatArray, at: float) -> Dimension:
    return Dimension(what, start, end, np.array([at, start[1]]), 90.0)


def draw_dimensions(pen: Pen, found: tuple[Dimension, ...]) -> None:
    """Draw the dimensions."""
    for one in found:
        pen.dimension(DIMENSIONS, one.start, one.end, one.line, one.angle)
