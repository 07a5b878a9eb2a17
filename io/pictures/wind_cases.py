"""The pictures `wind_pressures`: the truss under every wind case, its net pressures normal to the roof and to scale."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.design.result import Design
from spanwright.io.pictures.boxes import boxes_along
from spanwright.io.pictures.lettering import cut_to, width_of
from spanwright.io.pictures.page import FOOT_TOP, HEADING_BOTTOM, LEFT, PRESSURE_SIGNS, RIGHT, draw_foot, draw_heading
from spanwright.io.pictures.pressure_blocks import Block, draw_block, draw_numbers
from spanwright.io.pictures.sheet import Sheet, rectangle
from spanwright.io.pictures.style import FAINT, HAIR, INK, SMALL, SOFT, THICK, THIN
from spanwright.io.pictures.view import View, Zone, overhang_tips, view_of
from spanwright.io.pictures.wind_zones import signed
from spanwright.loads.cases import Case
from spanwright.loads.pressures import SurfaceCase, WindField
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

COLUMNS, ROWS = 4, 5
TITLE_HEIGHT, TOTAL_HEIGHT = 4.2, 3.6
BETWEEN = 1.5
"""mm on either side of a case's words, into which only the numbers at walls may reach."""

LONGEST = 5.0
"""mm: how far the greatest pressure of all cases stands off the roof."""

WALL = 5.0
"""mm of wall drawn below each bearing; walls are not to scale."""


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
    draw_foot(sheet, design, PRESSURE_SIGNS)
    top, bottom = HEADING_BOTTOM - 1.0, FOOT_TOP + 5.0
    width, height = (RIGHT - LEFT) / COLUMNS, (top - bottom) / ROWS
    for number, (surface, case) in enumerate(cases):
        left, upper = LEFT + number % COLUMNS * width, top - number // COLUMNS * height
        _draw_case(
            sheet,
            design,
            board,
            surface,
            case,
            Zone(left + BETWEEN, upper - height + 1.0, left + width - BETWEEN, upper),
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
    unit = "net, kPa"
    room = wide - width_of(unit, SMALL) - 2.0
    sheet.text(cell.left, cell.bottom + 0.4, cut_to(f"roof {total}", room, SMALL), SMALL, colour=SOFT)
    sheet.text(cell.right, cell.bottom + 0.4, unit, SMALL, across="right", colour=SOFT)
    zone = Zone(
        cell.left + 9.0,
        cell.bottom + TOTAL_HEIGHT + WALL,
        cell.right - 9.0,
        cell.top - TITLE_HEIGHT - LONGEST - 2.5,
    )
    view = view_of(board.truss, design.setting.restraint, zone)
    sheet.lines(list(view.onto(board.truss.xy[board.truss.ends])), HAIR, FAINT)
    sheet.lines([view.onto(board.roof)], THICK, order=3.0)
    walls = _walls(board, view, surface)
    sheet.lines([wall.feet for wall in walls], THIN, order=3.0)
    blocks = [*walls, *_on_stretches(board, view, surface)]
    for block in blocks:
        draw_block(sheet, block)
    roof = view.onto(board.roof)
    bars = np.concatenate([view.onto(board.truss.xy[board.truss.ends]), np.stack([roof[:-1], roof[1:]], axis=1)])
    free = Zone(cell.left - BETWEEN, cell.bottom + TOTAL_HEIGHT, cell.right + BETWEEN, cell.top - TITLE_HEIGHT)
    draw_numbers(sheet, blocks, free, boxes_along(bars, THICK))


def _on_stretches(board: _Board, view: View, surface: SurfaceCase) -> list[Block]:
    """Return the blocks on the roof, from left to right."""
    blocks = []
    for first, last in _alike(board, surface.net):
        feet = view.onto(_on_roof(board, board.field.cuts[[first, last]]))
        along = feet[1] - feet[0]
        blocks.append(_block(board, feet, np.array([-along[1], along[0]]) / np.hypot(*along), surface.net[first]))
    return blocks


def _walls(board: _Board, view: View, surface: SurfaceCase) -> list[Block]:
    """Return the blocks on the walls below the outer bearings."""
    bearings = board.truss.bearing_joints[0], board.truss.bearing_joints[-1]
    blocks = []
    for bearing, pressure, outward in zip(bearings, surface.walls, (-1.0, 1.0), strict=True):
        head = view.onto(board.truss.xy[bearing])
        feet = np.array([head, head - np.array([0.0, WALL])])
        blocks.append(_block(board, feet, np.array([outward, 0.0]), pressure))
    return blocks


def _block(board: _Board, feet: FloatArray, outward: FloatArray, pressure: float) -> Block:
    return Block(feet, outward, abs(pressure) * board.scale, pressure > 0.0, signed(pressure * 1e3))


def _roof(truss: Truss) -> FloatArray:
    """Return the outline of the roof from edge to edge, (n, 2) mm."""
    points = [truss.xy[joint] for joint in truss.top.joints]
    for joint, tip in overhang_tips(truss):
        points.insert(0 if joint == truss.top.joints[0] else len(points), tip)
    return np.array(points)


def _on_roof(board: _Board, x: FloatArray) -> FloatArray:
    return np.column_stack([x, np.interp(x, board.roof[:, 0], board.roof[:, 1])])


def _alike(board: _Board, net: FloatArray) -> list[tuple[int, int]]:
    """Return the stretches between cuts that carry one pressure on one slope, as pairs of cuts.

    Cuts that are one but for rounding, such as a zone's end and the ridge, bound no stretch.
    """
    at_ridge = np.isclose(board.field.cuts[1:-1], board.field.shape.middle)
    breaks = np.flatnonzero(~np.isclose(net[1:], net[:-1], atol=0.0) | at_ridge) + 1
    cuts = board.field.cuts
    stretches = pairwise([0, *breaks.tolist(), len(net)])
    return [(first, last) for first, last in stretches if cuts[last] - cuts[first] > TOLERANCES.same_point]
