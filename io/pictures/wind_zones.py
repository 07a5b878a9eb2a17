"""The picture `wind_zones`: the roof in plan for each wind direction, its zones, and the strip of the truss."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.design.result import Design
from spanwright.io.pictures.labels import CLEAR
from spanwright.io.pictures.lettering import cut_to, height_of, width_of
from spanwright.io.pictures.page import FOOT_TOP, HEADING_BOTTOM, LEFT, PRESSURE_SIGNS, RIGHT, draw_foot, draw_heading
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import (
    BOLD,
    HAIR,
    INK,
    SMALL,
    SOFT,
    THICK,
    THIN,
)
from spanwright.io.pictures.view import View
from spanwright.io.pictures.wind_steps import draw_steps
from spanwright.io.text import metres
from spanwright.loads.coefficients import Sign
from spanwright.loads.pressures import WindField
from spanwright.loads.site import SiteActions
from spanwright.loads.zones import DIRECTIONS, WindFrom, Zone, zone_measure
from spanwright.truss.arrays import FloatArray

TABLE_WIDTH = 92.0
PLAN_DENOMINATORS = (50, 100, 150, 200, 250, 300, 400, 500, 600, 750, 1000, 1250, 1500, 2000, 2500, 3000, 4000, 5000)
"""Scales 1:n of plans: those of ISO 5455 and the steps between that are usual on plans of buildings."""

AROUND = 9.0
"""mm left free about each plan, for the wind's arrow and the letters of narrow zones."""

BEFORE = 3.6
"""mm between the wind's arrow and the roof: room for the letter of a narrow zone."""

CAPTION_LINES = 5
LINE = 3.1
"""Height of a line of the captions, mm."""

_FILLS = {"F": "#c4c4c4", "G": "#d8d8d8", "H": "#ebebeb", "I": "#f8f8f8", "J": "#d8d8d8"}
_AIM: dict[WindFrom, tuple[float, float]] = {
    "left": (1.0, 0.0),
    "right": (-1.0, 0.0),
    "near gable": (0.0, 1.0),
    "far gable": (0.0, -1.0),
}


@dataclass(frozen=True)
class _Cell:
    """A part of the sheet for one plan, mm."""

    left: float
    bottom: float
    width: float
    height: float


def wind_zones_sheet(design: Design, site: SiteActions, field: WindField) -> Sheet:
    """Return the sheet of the picture `wind_zones`."""
    sheet = Sheet()
    draw_heading(sheet, design, "Wind zones")
    draw_foot(sheet, design, PRESSURE_SIGNS)
    cells, denominator = _cells(field)
    for wind, cell in zip(DIRECTIONS, cells, strict=True):
        _draw_plan(sheet, site, field, wind, cell, denominator)
    _draw_values(sheet, site, field, denominator)
    return sheet


def _cells(field: WindField) -> tuple[list[_Cell], int]:
    """Return the four cells, in one row or in two, whichever lets the plans be larger, and the scale."""
    shape = field.shape
    size = np.array([shape.edges[1] - shape.edges[0], shape.ends[1] - shape.ends[0]])
    width, height = RIGHT - LEFT - TABLE_WIDTH - 6.0, HEADING_BOTTOM - FOOT_TOP - 4.0
    found: list[tuple[float, list[_Cell]]] = []
    for columns in (4, 2):
        rows = len(DIRECTIONS) // columns
        cell = np.array([width / columns, height / rows])
        room = cell - np.array([2 * AROUND, 2 * AROUND + CAPTION_LINES * LINE])
        cells = [
            _Cell(LEFT + at % columns * cell[0], FOOT_TOP + 2.0 + (rows - 1 - at // columns) * cell[1], *cell)
            for at in range(len(DIRECTIONS))
        ]
        found.append((float((size / room).max()), cells))
    least, cells = min(found, key=lambda one: one[0])
    return cells, next((step for step in PLAN_DENOMINATORS if step >= least), int(np.ceil(least)))


def _draw_plan(
    sheet: Sheet, site: SiteActions, field: WindField, wind: WindFrom, cell: _Cell, denominator: int
) -> None:
    shape = field.shape
    top_middle = np.array([sum(shape.edges) / 2.0, shape.ends[1]])
    place = np.array([cell.left + cell.width / 2.0, cell.bottom + cell.height - AROUND])
    view = View(place - top_middle / denominator, denominator)
    for zone in field.zones[wind]:
        outline = _box(view, zone.x0, zone.z0, zone.x1, zone.z1)
        sheet.areas([outline], _FILLS[zone.name[0]], edge=INK, width=HAIR)
        _draw_letter(sheet, view, field, zone)
    walls = _box(view, shape.walls[0], 0.0, shape.walls[1], shape.length)
    sheet.lines([np.vstack([walls, walls[:1]])], THIN, SOFT, dashes=(1.2, 0.8), order=2.0)
    if shape.two_slopes:
        ridge = view.onto(np.array([[shape.middle, shape.ends[0]], [shape.middle, shape.ends[1]]]))
        sheet.lines([ridge], THIN, dashes=(4.0, 1.0), order=2.0)
    strip = _box(view, shape.edges[0], field.strip[0], shape.edges[1], field.strip[1])
    sheet.lines([np.vstack([strip, strip[:1]])], THICK, order=3.0)
    sheet.lines(
        [view.onto(np.array([[shape.walls[0], site.position], [shape.walls[1], site.position]]))], BOLD, order=3.0
    )
    _draw_arrow(sheet, view, field, wind)
    _draw_caption(sheet, field, wind, cell, float(view.onto(np.array([0.0, shape.ends[0]]))[1]))


def _box(view: View, x0: float, z0: float, x1: float, z1: float) -> FloatArray:
    return view.onto(np.array([[x0, z0], [x1, z0], [x1, z1], [x0, z1]]))


def _draw_letter(sheet: Sheet, view: View, field: WindField, zone: Zone) -> None:
    """Write a zone's letter in it, or beside the roof where it is too narrow; skip it where it is inside and narrow."""
    low, _, high, _ = _box(view, zone.x0, zone.z0, zone.x1, zone.z1)
    tall = high[1] - low[1]
    y = (low[1] + high[1]) / 2.0 - height_of(SMALL) / 2.0
    start, end = _widest(zone, field)
    x, wide = float(view.onto(np.array([(start + end) / 2.0, 0.0]))[0]), (end - start) / view.denominator
    if width_of(zone.name, SMALL) + 2 * CLEAR <= wide and height_of(SMALL) + CLEAR <= tall:
        sheet.text(x, y, zone.name, SMALL, across="center")
    elif zone.x0 == field.shape.edges[0]:
        sheet.text(low[0] - 0.8, y, zone.name, SMALL, across="right")
    elif zone.x1 == field.shape.edges[1]:
        sheet.text(high[0] + 0.8, y, zone.name, SMALL)
    elif zone.z0 == field.shape.ends[0]:
        sheet.text(x, low[1] - 0.8 - height_of(SMALL), zone.name, SMALL, across="center")
    elif zone.z1 == field.shape.ends[1]:
        sheet.text(x, high[1] + 0.8, zone.name, SMALL, across="center")


def _widest(zone: Zone, field: WindField) -> tuple[float, float]:
    """Return the widest part of a zone that no wall and no ridge runs through, as x from and to, mm."""
    lines = [*field.shape.walls, *([field.shape.middle] if field.shape.two_slopes else [])]
    bounds = sorted({zone.x0, zone.x1, *(x for x in lines if zone.x0 < x < zone.x1)})
    return max(pairwise(bounds), key=lambda part: round(part[1] - part[0]))


def _draw_arrow(sheet: Sheet, view: View, field: WindField, wind: WindFrom) -> None:
    """Draw an arrow that blows onto the middle of the upwind edge."""
    aim = np.array(_AIM[wind])
    aside = np.array([-aim[1], aim[0]])
    low, _, high, _ = _box(view, field.shape.edges[0], field.shape.ends[0], field.shape.edges[1], field.shape.ends[1])
    tip = (low + high) / 2.0 - aim * ((high - low) / 2.0 + BEFORE)
    outline = [tip, *(tip - back * aim + out * aside for back, out in _ARROW)]
    sheet.areas([np.array(outline)], INK, order=3.0)


_ARROW = ((2.2, 1.3), (2.2, 0.45), (5.2, 0.45), (5.2, -0.45), (2.2, -0.45), (2.2, -1.3))
"""mm behind an arrow's tip and aside of it, around."""


def _draw_caption(sheet: Sheet, field: WindField, wind: WindFrom, cell: _Cell, below: float) -> None:
    """Write below a plan the direction, e, and every zone's coefficients, suction and pressure."""
    zones = dict.fromkeys(
        (zone.name, _coefficients(values))
        for zone, values in zip(field.zones[wind], field.coefficients[wind], strict=True)
    )
    e = zone_measure(field.shape, wind)
    lines = [f"from the {wind}, e = {metres(e)}", *_wrapped([f"{name} {cpe}" for name, cpe in zones], cell.width - 3.0)]
    top = below - AROUND
    for number, words in enumerate(lines[:CAPTION_LINES]):
        y = top - (number + 1) * LINE
        sheet.text(
            cell.left + cell.width / 2.0, y, words, SMALL, across="center", weight="normal" if number else "bold"
        )


def _coefficients(values: dict[Sign, float]) -> str:
    return " / ".join(dict.fromkeys(signed(value) for value in values.values()))


def signed(value: float) -> str:
    """Write a coefficient or a pressure with its sign."""
    return f"{round(value, 2) + 0.0:+.2f}".replace("-", "\u2212")


def _wrapped(entries: list[str], width: float) -> list[str]:
    """Set entries on as few lines as they fill."""
    lines = [""]
    for entry in entries:
        longer = f"{lines[-1]},  {entry}" if lines[-1] else entry
        if width_of(longer, SMALL) <= width or not lines[-1]:
            lines[-1] = longer
        else:
            lines.append(entry)
    return lines


def _draw_values(sheet: Sheet, site: SiteActions, field: WindField, denominator: int) -> None:
    """Write the way to the peak pressure, what stands inside, and where the truss stands."""
    left = RIGHT - TABLE_WIDTH
    notes = (
        "Below the plans outside coefficients cpe of the zones, suction / pressure.",
        "e is the lesser of the building\u2019s breadth across the wind and twice its height.",
        f"Dashed are walls and ridge. Plans 1:{denominator} on A4.",
        "The heavy line is the truss in its strip of roof; the near gable is at the foot.",
        f"The truss stands {metres(site.position)} from the near gable and carries {metres(field.strip[0])} to "
        f"{metres(field.strip[1])}.",
        "What is marked \u201cfrom memory\u201d must be verified against the printed standard.",
    )
    top = HEADING_BOTTOM - 2.0
    height = top - FOOT_TOP - 6.0 - len(notes) * LINE
    below = draw_steps(sheet, field, left, top, (TABLE_WIDTH, height)) - 4.0
    for number, words in enumerate(notes):
        sheet.text(left, below - number * LINE, cut_to(words, TABLE_WIDTH, SMALL), SMALL)
