"""The pictures `wind_pressures`: the truss under every wind case, its net pressures normal to the roof and to scale."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.design.result import Design
from spanwright.io.pictures.lettering import cut_to, height_of
from spanwright.io.pictures.page import FOOT_TOP, HEADING_BOTTOM, LEFT, RIGHT, draw_foot, draw_heading
from spanwright.io.pictures.sheet import Across, Sheet, rectangle
from spanwright.io.pictures.style import FAINT, HAIR, INK, PALE, SMALL, SOFT, THICK, THIN
from spanwright.io.pictures.view import View, Zone, overhang_tips, view_of
from spanwright.io.pictures.wind_zones import signed
from spanwright.loads.cases import Case
from spanwright.loads.pressures import SurfaceCase, WindField
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss

COLUMNS, ROWS = 4, 5
TITLE_HEIGHT, TOTAL_HEIGHT = 4.2, 3.6
TINY = 5.2
"""Size of the letters of pressures, points."""

LONGEST = 5.0
"""mm: how far the greatest pressure of all cases stands off the roof."""

WALL = 5.0
"""mm of wall drawn below each bearing; walls are not to scale."""

ARROW_STEP = 4.5
"""mm between arrows along the roof."""

LEAST_ARROW = 0.4
"""mm: a shorter arrow would be a blot."""


@dataclass(frozen=True, eq=False)
class _Board:
    """What all cells share: the truss, the outline of its roof (n, 2) mm, and mm on paper for a MPa."""

    truss: Truss
    roof: FloatArray
    field: WindField
    scale: float


def wind_case_sheets(design: Design, field: WindField) -> list[Sheet]:
    """Return the sheets of the pictures `wind_pressures`, twenty cases each."""
    truss = design.setting.truss
    greatest = max(float(np.abs(case.net).max()) for case in field.cases)
    board = _Board(truss, _roof(truss), field, LONGEST / greatest)
    known = {case.name: case for case in design.setting.load_set.cases}
    cases = [(surface, known[surface.name]) for surface in field.cases]
    count = COLUMNS * ROWS
    return [_sheet(design, board, cases[at : at + count]) for at in range(0, len(cases), count)]


def _sheet(design: Design, board: _Board, cases: list[tuple[SurfaceCase, Case]]) -> Sheet:
    sheet = Sheet()
    draw_heading(sheet, design, "Wind pressures")
    draw_foot(sheet, design)
    top, bottom = HEADING_BOTTOM - 1.0, FOOT_TOP + 5.0
    width, height = (RIGHT - LEFT) / COLUMNS, (top - bottom) / ROWS
    for number, (surface, case) in enumerate(cases):
        left, upper = LEFT + number % COLUMNS * width, top - number // COLUMNS * height
        _draw_case(
            sheet, design, board, surface, case, Zone(left + 1.5, upper - height + 1.0, left + width - 1.5, upper)
        )
    unit = 0.5e-3 * board.scale
    sheet.areas([rectangle(LEFT, FOOT_TOP + 2.0, unit, 1.2)], INK)
    sheet.text(
        LEFT + unit + 2.0,
        FOOT_TOP + 2.0,
        "0.50 kPa, net of inside and outside; arrows show which way the wind presses; walls are not to scale.",
        SMALL,
    )
    return sheet


def _draw_case(sheet: Sheet, design: Design, board: _Board, surface: SurfaceCase, case: Case, cell: Zone) -> None:
    wide = cell.right - cell.left
    sheet.text(cell.left, cell.top - 3.2, cut_to(surface.name, wide, SMALL, "bold"), SMALL, weight="bold")
    total = next(line for line in case.derivation if line.startswith("in all"))
    sheet.text(cell.left, cell.bottom + 0.4, cut_to(f"roof {total}", wide, SMALL), SMALL, colour=SOFT)
    room = Zone(
        cell.left + 9.0,
        cell.bottom + TOTAL_HEIGHT + WALL,
        cell.right - 9.0,
        cell.top - TITLE_HEIGHT - LONGEST - 2.5,
    )
    view = view_of(board.truss, design.setting.restraint, room)
    sheet.lines(list(view.onto(board.truss.xy[board.truss.ends])), HAIR, FAINT)
    sheet.lines([view.onto(board.roof)], THICK, order=3.0)
    for first, last in _alike(board, surface.net):
        x = board.field.cuts[[first, last]]
        _draw_block(sheet, view.onto(_on_roof(board, x)), float(surface.net[first]) * board.scale, surface.net[first])
    for bearing, pressure, outward in zip(
        (board.truss.bearing_joints[0], board.truss.bearing_joints[-1]), surface.walls, (-1.0, 1.0), strict=True
    ):
        _draw_wall(sheet, view, board.truss.xy[bearing], pressure, pressure * board.scale, outward)


def _roof(truss: Truss) -> FloatArray:
    """Return the outline of the roof from edge to edge, (n, 2) mm."""
    points = [truss.xy[joint] for joint in truss.top.joints]
    for joint, tip in overhang_tips(truss):
        points.insert(0 if joint == truss.top.joints[0] else len(points), tip)
    return np.array(points)


def _on_roof(board: _Board, x: FloatArray) -> FloatArray:
    return np.column_stack([x, np.interp(x, board.roof[:, 0], board.roof[:, 1])])


def _alike(board: _Board, net: FloatArray) -> list[tuple[int, int]]:
    """Return the stretches between cuts that carry one pressure on one slope, as pairs of cuts."""
    at_ridge = np.isclose(board.field.cuts[1:-1], board.field.shape.middle)
    breaks = np.flatnonzero(~np.isclose(net[1:], net[:-1], atol=0.0) | at_ridge) + 1
    return list(pairwise([0, *breaks.tolist(), len(net)]))


def _draw_block(sheet: Sheet, ends: FloatArray, height: float, pressure: float) -> None:
    """Draw a pressure on a stretch of roof between two points, mm: a block outside it, and arrows that show its way."""
    along = ends[1] - ends[0]
    length = float(np.hypot(*along))
    outward = np.array([-along[1], along[0]]) / length
    off = abs(height) * outward
    sheet.areas([np.array([ends[0], ends[1], ends[1] + off, ends[0] + off])], PALE, edge=SOFT, width=HAIR, order=2.0)
    count = max(1, round(length / ARROW_STEP))
    feet = [ends[0] + along * (number + 0.5) / count for number in range(count)]
    if abs(height) > LEAST_ARROW:
        arrows = [_arrow(foot, foot + off) if height < 0.0 else _arrow(foot + off, foot) for foot in feet]
        sheet.lines(arrows, HAIR, order=2.5)
    middle = (ends[0] + ends[1]) / 2.0 + off + 0.6 * outward
    if length > 3.0:
        sheet.text(middle[0], middle[1], signed(pressure * 1e3), TINY, across="center")


def _draw_wall(sheet: Sheet, view: View, bearing: FloatArray, pressure: float, height: float, outward: float) -> None:
    """Draw the pressure on the wall below a bearing; `outward` is -1 on the left and +1 on the right."""
    head = view.onto(bearing)
    foot = head - np.array([0.0, WALL])
    off = np.array([outward * abs(height), 0.0])
    sheet.areas([np.array([head, foot, foot + off, head + off])], PALE, edge=SOFT, width=HAIR, order=2.0)
    sheet.lines([np.array([head, foot])], THIN, order=3.0)
    middle = (head + foot) / 2.0
    if abs(height) > LEAST_ARROW:
        sheet.lines([_arrow(middle + off, middle) if height > 0.0 else _arrow(middle, middle + off)], HAIR, order=2.5)
    place = middle + off + np.array([0.6 * outward, -height_of(TINY) / 2.0])
    side: Across = "left" if outward > 0 else "right"
    sheet.text(place[0], place[1], signed(pressure * 1e3), TINY, across=side)


def _arrow(tail: FloatArray, tip: FloatArray) -> FloatArray:
    """Return an arrow as one line: the shaft, then the head's two barbs."""
    shaft = tip - tail
    size = min(1.0, 0.5 * float(np.hypot(*shaft)))
    back = size * shaft / np.hypot(*shaft)
    aside = 0.4 * np.array([-back[1], back[0]])
    return np.array([tail, tip, tip - back + aside, tip, tip - back - aside])
