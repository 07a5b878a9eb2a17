"""The signs for what stands under and beside the truss: bearings, purlins, knee braces, bottom ties. Model mm."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.lying import edges
from spanwright.design.result import Design
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import BRACES, PURLINS, SUPPORTS, TIES, Layer
from spanwright.io.pictures.boxes import box, boxes_along
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import slopes
from spanwright.truss.model import Truss

PURLIN = 2.4
"""Side of a purlin's square, mm on paper; the purlins themselves are not designed here."""
BEARING, GROUND, ROLLER = 4.0, 3.2, 0.6
"""Height of a bearing's triangle, half the length of the ground under it, radius of a roller, mm on paper."""
TIE = (1.6, 4.4)
"""Width and height of a tie's oblong, mm on paper."""
BRACE_ASIDE = 1.2
"""mm on paper between the line from a brace's joint to its purlin and the brace, which is drawn beside it."""
SPREAD = 1.0
"""mm: to either side of a point of the chord, so that at a kink the sign stands up between both slopes."""


@dataclass(frozen=True, eq=False)
class Signs:
    """The signs of one truss at one scale, each with whether what it stands for counts.

    purlins : outlines (4, 2) and the upward direction of each (2,). braces : lines (2, 2). ties : outlines (4, 2).
    bearings : (point of the triangle, does it slide).
    """

    purlins: tuple[tuple[FloatArray, FloatArray, bool], ...]
    braces: tuple[tuple[FloatArray, bool], ...]
    ties: tuple[tuple[FloatArray, bool], ...]
    bearings: tuple[tuple[FloatArray, bool], ...]
    scale: float

    @property
    def brace_boxes(self) -> FloatArray:
        """(n, 6) boxes that the knee braces take."""
        found = [boxes_along(line[None], 0.6 * self.scale) for line, _ in self.braces]
        return np.vstack([np.zeros((0, 6)), *found])

    @property
    def boxes(self) -> FloatArray:
        """(n, 6) boxes that the other signs take."""
        unit = self.scale
        found = [np.zeros((0, 6))]
        found += [box(ring.mean(axis=0), 0.0, 3.0 * unit, 3.0 * unit)[None] for ring, _, _ in self.purlins]
        found += [box(ring.mean(axis=0), 0.0, TIE[0] * unit, TIE[1] * unit)[None] for ring, _ in self.ties]
        high = BEARING + 2.0 * ROLLER + 1.2
        found += [
            box(top - np.array([0.0, high / 2.0 * unit]), 0.0, 2.4 * GROUND * unit, high * unit)[None]
            for top, _ in self.bearings
        ]
        return np.vstack(found)


def signs(design: Design, scale: float) -> Signs:
    """Return the signs of a design in an elevation 1:scale."""
    truss, restraint = design.setting.truss, design.setting.restraint
    counted = restraint.counted
    return Signs(
        purlins=tuple(
            (*_purlin(design, line.along, np.array([line.x, line.y]), scale), line.anchored) for line in restraint.lines
        ),
        braces=tuple(
            (
                _brace(truss.xy[brace.joint], np.array([line.x, line.y]), scale),
                brace.name in counted,
            )
            for brace in restraint.braces
            for line in (restraint.line(brace.line),)
        ),
        ties=tuple(
            (oblong(truss.xy[tie.joint], (TIE[0] * scale, TIE[1] * scale)), tie.counted) for tie in restraint.ties
        ),
        bearings=tuple((_bearing(design, support.joint), not support.x) for support in truss.supports if support.y),
        scale=scale,
    )


def _purlin(design: Design, along: float, at: FloatArray, scale: float) -> tuple[FloatArray, FloatArray]:
    """Return the square of a purlin that stands on the upper edge of the chord, and its upward direction."""
    truss = design.setting.truss
    upward = upward_at(truss, along)
    bar = truss.top.bars[min(int(np.searchsorted(truss.top.along[1:-1], along)), len(truss.top.bars) - 1)]
    choice, _ = design.choice_for(bar)
    foot = at + edges(choice.section, choice.group.role)[1] * upward
    side = PURLIN * scale
    half = np.array([upward[1], -upward[0]]) * side / 2.0
    return np.array([foot - half, foot + half, foot + half + side * upward, foot - half + side * upward]), upward


def upward_at(truss: Truss, along: float) -> FloatArray:
    """Return the unit vector (2,) away from the truss, square to the top chord; at a kink between both slopes'."""
    directions = slopes(truss).directions
    inner = truss.top.along[1:-1]
    first, last = (int(np.searchsorted(inner, at)) for at in (along - SPREAD, along + SPREAD))
    middle = directions[first] + directions[last]
    upward: FloatArray = np.array([-middle[1], middle[0]]) / np.hypot(*middle)
    return upward


def _brace(joint: FloatArray, purlin: FloatArray, scale: float) -> FloatArray:
    span = purlin - joint
    along = span / np.hypot(*span)
    aside = BRACE_ASIDE * scale * np.array([along[1], -along[0]])
    return np.array([joint + aside + 0.04 * span, purlin + aside - 0.04 * span])


def _bearing(design: Design, joint: int) -> FloatArray:
    """Return the point under a joint at which its bearing begins: the lowest edge of the chords that meet there."""
    truss = design.setting.truss
    low = 0.0
    for bar in np.flatnonzero((truss.ends == joint).any(axis=1)):
        choice, _ = design.choice_for(int(bar))
        if "chord" in choice.group.role:
            low = min(low, edges(choice.section, choice.group.role)[0] / max(abs(truss.directions[bar, 0]), 0.5))
    point: FloatArray = truss.xy[joint] + np.array([0.0, low])
    return point


def oblong(middle: FloatArray, sides: tuple[float, float]) -> FloatArray:
    """Return the outline (4, 2) of an upright oblong about a point."""
    outline: FloatArray = middle + np.array(sides) / 2.0 * np.array(
        [[-1.0, -1.0], [1.0, -1.0], [1.0, 1.0], [-1.0, 1.0]]
    )
    return outline


def draw_signs(pen: Pen, found: Signs) -> None:
    """Draw the signs of an elevation."""
    for ring, _, counted in found.purlins:
        draw_sign(pen, PURLINS, ring, counted=counted)
    for line, counted in found.braces:
        draw_brace(pen, line, counted=counted)
    for ring, counted in found.ties:
        draw_sign(pen, TIES, ring, counted=counted)
    for top, slides in found.bearings:
        draw_bearing(pen, top, slides=slides)


def draw_sign(pen: Pen, layer: Layer, ring: FloatArray, *, counted: bool) -> None:
    """Draw an outline, filled where what it stands for counts."""
    pen.path(layer, ring, closed=True)
    if counted:
        pen.area(layer, ring)


def draw_brace(pen: Pen, line: FloatArray, *, counted: bool) -> None:
    """Draw a knee brace along a line (2, 2), crossed out where it does not count."""
    pen.line(BRACES, *line)
    if not counted:
        arm, middle = 1.2 * pen.scale, line.mean(axis=0)
        for turn in (1.0, -1.0):
            pen.line(PURLINS, middle - arm * np.array([1.0, turn]), middle + arm * np.array([1.0, turn]))


def draw_bearing(pen: Pen, top: FloatArray, *, slides: bool) -> None:
    """Draw a bearing under a point: pinned on hatched ground, sliding on rollers."""
    unit = pen.scale
    triangle = top + BEARING * unit * np.array([[0.0, 0.0], [-0.6, -1.0], [0.6, -1.0]])
    pen.path(SUPPORTS, triangle, closed=True)
    ground = top - np.array([0.0, BEARING * unit])
    if slides:
        for shift in (-1.5, 0.0, 1.5):
            pen.circle(SUPPORTS, ground + unit * np.array([shift, -ROLLER]), ROLLER * unit)
        ground = ground - np.array([0.0, 2.0 * ROLLER * unit])
    pen.line(SUPPORTS, ground - np.array([GROUND * unit, 0.0]), ground + np.array([GROUND * unit, 0.0]))
    for shift in np.arange(-GROUND + 0.9, GROUND + 0.1, 1.0):
        start = ground + np.array([shift * unit, 0.0])
        pen.line(SUPPORTS, start, start - unit * np.array([0.9, 1.0]))
