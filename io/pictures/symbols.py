"""The signs for what holds the truss: bearings, purlins, knee braces, ties. Filled counts, open does not."""

from __future__ import annotations

import numpy as np

from spanwright.io.pictures.boxes import box, boxes_along
from spanwright.io.pictures.sheet import Sheet, disc, rectangle
from spanwright.io.pictures.style import FAINT, HAIR, INK, PAPER, SOFT, THICK, THIN, Pen
from spanwright.io.pictures.view import View, overhang_tips
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.restraint import Restraint

TIE_WIDTH, TIE_HEIGHT = 1.3, 4.6
"""Sides of the upright oblong of a bottom tie, mm."""

BESIDE = 0.5
"""mm between a post and a knee brace, which is drawn beside the line from its joint to its purlin."""

BEARING = 4.0
"""Height of a bearing's triangle, mm."""

BELOW_JOINT = 0.9
"""mm from a bearing's joint to the point of its triangle."""

GROUND = 3.4
"""Half the length of the ground under a bearing, mm."""

ROLLER = 0.6
"""Radius of a roller, mm."""

DASHES = (1.3, 0.8)
_ORDER = 4.0


def fill(counted: bool) -> str:
    """Return the fill of a sign: dark where what it stands for counts, else none."""
    return INK if counted else PAPER


def stroke(counted: bool) -> str:
    """Return the colour of a line that stands for what counts, or does not."""
    return INK if counted else FAINT


def purlin_square(foot: FloatArray, upward: FloatArray, side: float) -> FloatArray:
    """Return the outline of a purlin's square that stands on a chord at `foot` (2,), mm."""
    along = np.array([upward[1], -upward[0]]) * side / 2.0
    return np.array([foot - along, foot + along, foot + along + side * upward, foot - along + side * upward])


def tie_oblong(middle: FloatArray, factor: float) -> FloatArray:
    """Return the outline of a bottom tie's oblong about a point (2,), mm."""
    width, height = factor * TIE_WIDTH, factor * TIE_HEIGHT
    return rectangle(middle[0] - width / 2.0, middle[1] - height / 2.0, width, height)


def bearing_outline(top: FloatArray, high: float = BEARING) -> FloatArray:
    """Return the triangle of a bearing whose point is at `top` (2,), mm."""
    outline: FloatArray = top + high * np.array([[0.0, 0.0], [-0.6, -1.0], [0.6, -1.0]])
    return outline


def purlin_outlines(truss: Truss, restraint: Restraint, view: View, pen: Pen) -> list[FloatArray]:
    """Return each purlin line's square, standing on the top chord."""
    outlines = []
    for line in restraint.lines:
        upward = _upward(truss, line.along)
        foot = view.onto(np.array([line.x, line.y])) + pen.lift * upward
        outlines.append(purlin_square(foot, upward, pen.square))
    return outlines


def _upward(truss: Truss, along: float) -> FloatArray:
    """Return the unit vector away from the truss, normal to the top chord; at a kink, between both normals."""
    chord = truss.top
    before, after = (
        int(np.clip(np.searchsorted(chord.along, along, side=side) - 1, 0, len(chord.bars) - 1))
        for side in ("left", "right")
    )
    normals = []
    for place in (before, after):
        span = truss.xy[chord.joints[place + 1]] - truss.xy[chord.joints[place]]
        normals.append(np.array([-span[1], span[0]]) / np.hypot(*span))
    middle: FloatArray = normals[0] + normals[1]
    return middle / float(np.hypot(*middle))


def brace_lines(truss: Truss, restraint: Restraint, view: View, pen: Pen) -> list[FloatArray]:
    """Return for each knee brace the (2, 2) line beside the way from its joint to its purlin, mm."""
    lines = []
    for brace in restraint.braces:
        purlin = restraint.line(brace.line)
        ends = view.onto(np.array([truss.xy[brace.joint], [purlin.x, purlin.y]]))
        span = ends[1] - ends[0]
        length = float(np.hypot(*span))
        direction = span / length
        aside = (pen.lift + BESIDE) * np.array([direction[1], -direction[0]])
        short = min(0.2 * length, 2.5) * direction
        lines.append(np.array([ends[0] + aside + 0.4 * short, ends[1] + aside - short]))
    return lines


def draw_holding(sheet: Sheet, truss: Truss, restraint: Restraint, view: View, pen: Pen) -> None:
    """Draw bearings, purlins, knee braces and ties."""
    held = {bearing.joint for bearing in restraint.bearings}
    for support in truss.supports:
        top = view.onto(truss.xy[support.joint]) - np.array([0.0, BELOW_JOINT])
        _draw_bearing(sheet, top, pinned=support.x and support.y, held=support.joint in held)
    for line, outline in zip(restraint.lines, purlin_outlines(truss, restraint, view, pen), strict=True):
        sheet.areas([outline], fill(line.anchored), edge=INK, width=THIN, order=_ORDER)
    for brace, path in zip(restraint.braces, brace_lines(truss, restraint, view, pen), strict=True):
        sheet.lines([path], THICK, stroke(brace.counted), dashes=DASHES, order=_ORDER)
    for tie in restraint.ties:
        outline = tie_oblong(view.onto(truss.xy[tie.joint]), pen.factor)
        sheet.areas([outline], fill(tie.counted), edge=INK, width=THIN, order=_ORDER + 0.5)


def _draw_bearing(sheet: Sheet, top: FloatArray, *, pinned: bool, held: bool) -> None:
    """Draw a bearing: pinned on hatched ground, sliding on rollers; filled where it is held sideways."""
    sheet.areas([bearing_outline(top)], SOFT if held else PAPER, edge=INK, width=THICK, order=_ORDER)
    ground = top - np.array([0.0, BEARING])
    if pinned:
        stroke_ends = np.array([[0.0, 0.0], [-0.9, -1.1]])
        strokes = [ground + stroke_ends + np.array([at, 0.0]) for at in np.linspace(0.6 - GROUND, GROUND, 8)]
        sheet.lines(strokes, HAIR, order=_ORDER)
    else:
        rollers = [disc(ground + np.array([shift, -ROLLER - 0.1]), ROLLER) for shift in (-1.5, 0.0, 1.5)]
        sheet.areas(rollers, PAPER, edge=INK, width=THIN, order=_ORDER)
        ground = ground - np.array([0.0, 2.0 * ROLLER + 0.2])
    sheet.lines([ground + np.array([[-GROUND, 0.0], [GROUND, 0.0]])], THICK, order=_ORDER)


def taken_by_signs(truss: Truss, restraint: Restraint, view: View, pen: Pen) -> FloatArray:
    """Return the (n, 6) boxes that bearings, purlins, knee braces and ties take on the sheet."""
    under = np.array([0.0, BELOW_JOINT + BEARING / 2.0 + ROLLER])
    bearings = [view.onto(truss.xy[support.joint]) - under for support in truss.supports]
    ties = [view.onto(truss.xy[tie.joint]) for tie in restraint.ties]
    boxes = [box(middle, 0.0, 2.0 * GROUND + 0.6, BEARING + 3.0 * ROLLER) for middle in bearings]
    boxes += [box(middle, 0.0, pen.factor * TIE_WIDTH, pen.factor * TIE_HEIGHT) for middle in ties]
    for outline in purlin_outlines(truss, restraint, view, pen):
        along = outline[1] - outline[0]
        boxes.append(box(outline.mean(axis=0), float(np.arctan2(along[1], along[0])), pen.square, pen.square))
    braces = [boxes_along(line[None], THICK) for line in brace_lines(truss, restraint, view, pen)]
    return np.vstack([*boxes, *braces])


def draw_overhangs(sheet: Sheet, truss: Truss, view: View, pen: Pen) -> None:
    """Draw the top chord's overhangs, which carry no axial force, as an empty casing."""
    for joint, tip in overhang_tips(truss):
        segment = view.onto(np.array([truss.xy[joint], tip]))
        sheet.lines([segment], pen.strut, INK, order=2.0)
        sheet.lines([segment], pen.strut - 2.0 * pen.casing, PAPER, order=2.1)
