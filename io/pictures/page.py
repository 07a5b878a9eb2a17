"""What frames both pictures: the heading above, the scale, and the conventions and cautions below."""

from __future__ import annotations

import numpy as np

from spanwright import __version__
from spanwright.design.cautions import SHORT_CAUTION
from spanwright.design.result import Design
from spanwright.io.files import input_hash
from spanwright.io.pictures.lettering import cut_to, height_of, width_of
from spanwright.io.pictures.sheet import Sheet, rectangle
from spanwright.io.pictures.style import BODY, BOLD, HEADING, INK, MARGIN, PAGE, PAPER, SMALL, SOFT, THIN, TITLE
from spanwright.io.pictures.view import View
from spanwright.io.text import metres, rounded_up

LEFT, RIGHT = MARGIN, PAGE[0] - MARGIN
HEADING_BOTTOM = PAGE[1] - MARGIN - 14.0
"""Below this the heading ends, mm."""

FOOT_TOP = MARGIN + 10.0
"""Above this the foot ends, mm."""

LEAST_CELL = 9.0
"""Least length of one of the three cells of the scale bar, mm."""

SIGNS = "Tension +, compression \u2212. Lengths in m."
PRESSURE_SIGNS = "Pressures: + presses on the surface, \u2212 sucks. Lengths in m."


def draw_heading(sheet: Sheet, design: Design, subject: str) -> None:
    """Write title and mark, form and standard, the subject of the picture and the verdict."""
    setting = design.setting
    project, truss = setting.project, setting.truss
    first, second = PAGE[1] - MARGIN - 5.0, PAGE[1] - MARGIN - 10.5
    verdict = _verdict(design)
    room = RIGHT - LEFT - max(width_of(verdict, HEADING, "bold"), width_of(subject, TITLE)) - 10.0
    mark = cut_to(project.mark, room / 3.0, TITLE, "bold")
    sheet.text(LEFT, first, mark, TITLE, weight="bold")
    after = width_of(mark, TITLE, "bold") + 4.0
    sheet.text(LEFT + after, first, cut_to(project.title, room - after, TITLE), TITLE)
    lean = f", diagonals {truss.lean}" if truss.lean else ""
    about = (
        f"{truss.form}{lean}, span {metres(truss.span)}, {len(truss.bar_names)} members; {project.quantity} off, "
        f"{metres(project.spacing)} apart; {setting.standard.name}, {project.actions}"
    )
    sheet.text(LEFT, second, cut_to(about, room, 8.0), 8.0, colour=SOFT)
    sheet.text(RIGHT, first, subject, TITLE, across="right")
    width, high = width_of(verdict, HEADING, "bold"), height_of(HEADING)
    if not design.passes:
        sheet.areas([rectangle(RIGHT - width - 3.0, second - 1.2, width + 3.0, high + 2.4)], INK)
    sheet.text(
        RIGHT - (0.0 if design.passes else 1.5),
        second,
        verdict,
        HEADING,
        across="right",
        weight="bold",
        colour=INK if design.passes else PAPER,
    )
    sheet.lines([np.array([[LEFT, HEADING_BOTTOM], [RIGHT, HEADING_BOTTOM]])], BOLD)


def _verdict(design: Design) -> str:
    greatest = float(design.utilisation.max())
    used = f"greatest utilisation {rounded_up(greatest)}" if np.isfinite(greatest) else "a member without resistance"
    if design.passes:
        return f"every member passes, {used}"
    bent = "" if design.serviceability.passes else ", deflection exceeded"
    return f"NOT PASSING: {used}{bent}"


def draw_foot(sheet: Sheet, design: Design, signs: str = SIGNS) -> None:
    """Write the conventions of sign, what anchors the restraint, the caution, and the mark of the input."""
    project = design.setting.project
    sheet.lines([np.array([[LEFT, FOOT_TOP], [RIGHT, FOOT_TOP]])], THIN)
    step = 3.3
    origin = f"input {input_hash(project.source)}"
    name = f"{project.source_name}, " if project.source_name else ""
    right = cut_to(f"{name}{origin}", 110.0, SMALL)
    sheet.text(RIGHT, FOOT_TOP - step, right, SMALL, across="right", colour=SOFT)
    sheet.text(RIGHT, FOOT_TOP - 2 * step, f"Spanwright {__version__}", SMALL, across="right", colour=SOFT)
    sheet.text(LEFT, FOOT_TOP - step, f"{signs} {anchor_words(design)}", SMALL)
    sheet.text(LEFT, FOOT_TOP - 2 * step, SHORT_CAUTION, SMALL)


def anchor_words(design: Design) -> str:
    """Return the statement of what anchors the restraint, and how much of it counts."""
    restraint, by = design.setting.restraint, design.setting.project.restraint.anchored_by
    counted = sum(line.anchored for line in restraint.lines)
    return f"Restraint anchored by {by}: {counted} of {len(restraint.lines)} purlin lines counted."


def draw_scale(sheet: Sheet, view: View, left: float, bottom: float) -> None:
    """Draw a scale bar in metres, and state the scale, which holds on A4."""
    metre = 1000.0 / view.denominator
    unit = next(step for step in (0.1, 0.2, 0.5, 1.0, 2.0, 5.0, 10.0, 20.0, 50.0, 100.0) if step * metre >= LEAST_CELL)
    cell, high = unit * metre, 1.3
    for number, fill in enumerate((INK, PAPER, INK)):
        sheet.areas([rectangle(left + number * cell, bottom, cell, high)], fill, edge=INK, width=THIN)
    for number in range(4):
        words = f"{number * unit:g}" + (" m" if number == 3 else "")
        sheet.text(left + number * cell, bottom + high + 0.9, words, SMALL, across="center")
    sheet.text(left + 3 * cell + 5.0, bottom, f"1:{view.denominator} on A4", BODY)
