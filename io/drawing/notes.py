"""General notes, the caution, and what the signs mean. Sizes in mm on paper."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from spanwright.design.cautions import CAUTIONS
from spanwright.design.dispatch import assembly
from spanwright.design.result import Design
from spanwright.io.drawing.holding import BEARING, PURLIN, TIE, draw_bearing
from spanwright.io.drawing.lettering import LARGE, STEP, TEXT, wrapped
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import BRACES, NOTES, PURLINS, SETTING_OUT, TIES
from spanwright.io.schedule.notes import ESTIMATE
from spanwright.io.text import kilograms
from spanwright.truss.arrays import FloatArray

INDENT = 7.0
HEAD = LARGE + 3.0
SIGN_ROW = 7.0


@dataclass(frozen=True)
class Notes:
    """Numbered paragraphs under a heading, set to a width."""

    title: str
    paragraphs: tuple[str, ...]
    width: float

    @cached_property
    def _lines(self) -> list[tuple[str, str]]:
        found = []
        for number, paragraph in enumerate(self.paragraphs, 1):
            for place, line in enumerate(wrapped(paragraph, self.width - INDENT)):
                found.append(("" if place else f"{number}.", line))
        return found

    @property
    def height(self) -> float:
        """Height of all of it."""
        return HEAD + len(self._lines) * TEXT * STEP

    def draw(self, pen: Pen, left: float, top: float) -> None:
        """Draw down from the upper left corner."""
        pen.text(NOTES, (left, top - LARGE), self.title, LARGE)
        y = top - HEAD
        for number, line in self._lines:
            y -= TEXT * STEP
            pen.text(NOTES, (left, y + 1.0), number)
            pen.text(NOTES, (left + INDENT, y + 1.0), line)


def general_notes(design: Design, width: float) -> Notes:
    """Return the general notes of a passing design."""
    setting = design.setting
    project, standard = setting.project, setting.standard
    whole = assembly(setting, design.choices, design.pieces)
    camber = design.serviceability.camber
    lean = f", diagonals {setting.truss.lean}" if setting.truss.lean else ""
    paragraphs = [
        "All dimensions in mm. Do not scale. Setting-out lines are the centroid lines of the members; rafter panels are "
        "measured along the slope.",
        f"{setting.truss.form} truss{lean}; {project.quantity} off, {project.spacing:.0f} apart. Members to "
        f"{standard.name}, actions to {project.actions}.",
        f"{ESTIMATE[0]}{ESTIMATE[1:].lower()}.",
        "Gussets and connections are not shown; they are not designed yet. Which way round the angles of webs are turned "
        "is settled with them.",
        f"Webs are cut square {project.members.setback:.0f} along the web clear of the chords' edges, tubes to their face.",
        _ends(design),
        f"Gap between the angles of pairs {project.members.gap:.0f}, filled by packing plates as listed.",
        f"Camber {camber:.0f} at mid-span." if camber else "No camber.",
        "Purlins, knee braces, ties and bearings are shown as signs, not to scale. The chords are held sideways only "
        "where the restraint table says so: it is part of the design.",
        f"Mass of one truss {kilograms(whole.mass)}, to lift {kilograms(whole.lift_mass)} with the allowance for gussets "
        "and fixings.",
        *whole.remarks,
        *design.warnings,
    ]
    return Notes("GENERAL NOTES", tuple(paragraphs), width)


def caution(design: Design, width: float) -> Notes:
    """Return the caution, with what the standard leaves to verify."""
    return Notes("CAUTION", (*CAUTIONS, *design.setting.standard.verify_notes()), width)


def _ends(design: Design) -> str:
    ends = design.setting.project.ends
    if ends.kind == "welded":
        return f"End welds required: at least {ends.weld_length:g} times the connected leg along each edge of it."
    holes = "punched" if ends.punched else "drilled"
    return f"End bolts required: {ends.bolts} M{ends.bolt_diameter:g} {ends.bolt_grade} in one line, holes {holes}."


@dataclass(frozen=True)
class Legend:
    """What the signs mean, in two columns."""

    width: float
    height: float = HEAD + 4 * SIGN_ROW + 2.0

    def draw(self, pen: Pen, left: float, top: float) -> None:
        """Draw down from the upper left corner."""
        pen.text(NOTES, (left, top - LARGE), "SIGNS", LARGE)
        column = self.width / 2.0
        for place, words in enumerate(_WORDS):
            row, side = place % 4, place // 4
            x, y = left + side * column, top - HEAD - (row + 0.5) * SIGN_ROW
            _sign(pen, place, np.array([x + 6.0, y]))
            pen.text(NOTES, (x + 14.0, y), words, up="middle")


_WORDS = (
    "purlin line, counted as restraint",
    "purlin line, not counted",
    "knee brace (crossed out: not counted)",
    "bottom tie, counted (open: not)",
    "bearing, pinned",
    "bearing, sliding along the span",
    "setting-out line",
)


def _sign(pen: Pen, place: int, at: FloatArray) -> None:
    square = at + PURLIN / 2.0 * np.array([[-1.0, -1.0], [1.0, -1.0], [1.0, 1.0], [-1.0, 1.0]])
    if place < 2:
        pen.path(PURLINS, square, closed=True)
        if place == 0:
            pen.area(PURLINS, square)
    elif place == 2:
        pen.line(BRACES, at - [5.0, 0.0], at + [5.0, 0.0])
    elif place == 3:
        oblong = at + np.array(TIE) / 2.0 * np.array([[-1.0, -1.0], [1.0, -1.0], [1.0, 1.0], [-1.0, 1.0]])
        pen.path(TIES, oblong, closed=True)
        pen.area(TIES, oblong)
    elif place < 6:
        draw_bearing(pen, at + [0.0, BEARING / 2.0 + 0.8], slides=place == 5)
    else:
        pen.line(SETTING_OUT, at - [5.5, 0.0], at + [5.5, 0.0])
