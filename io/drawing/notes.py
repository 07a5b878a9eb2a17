"""General notes, the caution, and what the signs mean. Sizes in mm on paper."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property, partial

import numpy as np

from spanwright.design.cautions import CAUTIONS
from spanwright.design.dispatch import assembly
from spanwright.design.result import Design
from spanwright.io.drawing.holding import BEARING, PURLIN, TIE, draw_bearing, draw_brace, draw_sign, oblong
from spanwright.io.drawing.lettering import LARGE, STEP, TEXT, wrapped
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import NOTES, PURLINS, SETTING_OUT, TIES
from spanwright.io.schedule.notes import ESTIMATE
from spanwright.io.text import kilograms
from spanwright.truss.arrays import FloatArray

WARNINGS = 6
"""Warnings that a sheet has room for."""
INDENT = 7.0
HEAD = LARGE + 3.0
SIGN_ROW, SIGN_COLUMN = 7.5, 62.0


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
    families = {choice.section.family for choice in design.choices}
    paragraphs = [
        "All dimensions in mm. Do not scale. Setting-out lines are the centroid lines of the members; rafter panels "
        "are measured along the slope.",
        f"Form of the truss: {setting.truss.form}{lean}; {project.quantity} off, {project.spacing:.0f} apart. Members "
        f"to {standard.name}, actions to {project.actions}.",
        f"{ESTIMATE[0]}{ESTIMATE[1:].lower()}.",
        "Gussets and connections are not shown; they are not designed yet.",
        *(_ANGLES if "L" in families else ()),
        f"Webs are cut square, {project.members.setback:.0f} along the web clear of the chords' edges; tubes that meet "
        "tubes to their face.",
        _ends(design),
        *(_PAIRS if families & {"2L", "2L star"} else ()),
        f"Camber {camber:.0f} at mid-span." if camber else "No camber.",
        "Purlins, knee braces, ties and bearings are shown as signs, not to scale. The chords are held sideways only "
        "where the restraint table says so: it is part of the design.",
        f"Mass of one truss {kilograms(whole.mass)}, to lift {kilograms(whole.lift_mass)} with the allowance for "
        "gussets and fixings.",
        *whole.remarks,
        *(f"{warning[:1].upper()}{warning[1:]}" for warning in design.warnings[:WARNINGS]),
    ]
    if len(design.warnings) > WARNINGS:
        paragraphs.append(f"{len(design.warnings) - WARNINGS} more warnings are in results.json.")
    return Notes("GENERAL NOTES", tuple(paragraphs), width)


_ANGLES = ("Which way round the single angles of webs are turned is settled with their gussets.",)
_PAIRS = ("Between the angles of pairs stand packing plates as listed, as thick as the gap.",)


def caution(design: Design, width: float) -> Notes:
    """Return the caution."""
    verify = f"What a licensed copy of {design.setting.standard.name} must confirm is listed in the calculation."
    return Notes("CAUTION", (*CAUTIONS, verify), width)


def _ends(design: Design) -> str:
    ends = design.setting.project.ends
    if ends.kind == "welded":
        return f"End welds required: at least {ends.weld_length:g} times the connected leg along each edge of it."
    holes = "punched" if ends.punched else "drilled"
    return f"End bolts required: {ends.bolts} M{ends.bolt_diameter:g} {ends.bolt_grade} in one line, holes {holes}."


@dataclass(frozen=True)
class Legend:
    """What the signs on the elevation mean."""

    signs: tuple[str, ...]
    columns: int

    @property
    def width(self) -> float:
        """Width of all columns."""
        return self.columns * SIGN_COLUMN

    @property
    def _rows(self) -> int:
        return -(-len(self.signs) // self.columns)

    @property
    def height(self) -> float:
        """Height of all of it."""
        return HEAD + self._rows * SIGN_ROW

    def draw(self, pen: Pen, left: float, top: float) -> None:
        """Draw down from the upper left corner."""
        pen.text(NOTES, (left, top - LARGE), "SIGNS", LARGE)
        for place, words in enumerate(self.signs):
            side, row = divmod(place, self._rows)
            x, y = left + side * SIGN_COLUMN, top - HEAD - (row + 0.5) * SIGN_ROW
            _SIGNS[words](pen, np.array([x + 6.0, y]))
            pen.text(NOTES, (x + 13.5, y), words, up="middle")


def legend(design: Design, columns: int) -> Legend:
    """Return the legend of the signs that stand on the elevation of a design."""
    setting = design.setting
    restraint, bearings = setting.restraint, [support for support in setting.truss.supports if support.y]
    shown = {
        _COUNTED: any(line.anchored for line in restraint.lines),
        _LOOSE: not all(line.anchored for line in restraint.lines),
        _BRACE: bool(restraint.braces),
        _NO_BRACE: any(brace.name not in restraint.counted for brace in restraint.braces),
        _TIE: any(tie.counted for tie in restraint.ties),
        _NO_TIE: not all(tie.counted for tie in restraint.ties),
        _PINNED: any(support.x for support in bearings),
        _SLIDING: not all(support.x for support in bearings),
        _SETTING_OUT: True,
    }
    return Legend(tuple(words for words, there in shown.items() if there), columns)


_COUNTED, _LOOSE = "purlin line, by number", "purlin line, does not count"
_BRACE, _NO_BRACE = "knee brace", "knee brace, does not count"
_TIE, _NO_TIE = "bottom tie", "bottom tie, does not count"
_PINNED, _SLIDING, _SETTING_OUT = "bearing, pinned", "bearing, sliding", "setting-out line"


def _purlin(pen: Pen, at: FloatArray, *, counted: bool) -> None:
    draw_sign(pen, PURLINS, oblong(at, (PURLIN, PURLIN)), counted=counted)


def _tie(pen: Pen, at: FloatArray, *, counted: bool) -> None:
    draw_sign(pen, TIES, oblong(at, TIE), counted=counted)


def _brace(pen: Pen, at: FloatArray, *, counted: bool) -> None:
    draw_brace(pen, at + np.array([[-5.5, 0.0], [5.5, 0.0]]), counted=counted)


def _bearing(pen: Pen, at: FloatArray, *, slides: bool) -> None:
    draw_bearing(pen, at + np.array([0.0, BEARING / 2.0 + 0.8]), slides=slides)


def _line(pen: Pen, at: FloatArray) -> None:
    pen.line(SETTING_OUT, (at[0] - 5.5, at[1]), (at[0] + 6.5, at[1]))


_SIGNS: dict[str, Callable[[Pen, FloatArray], None]] = {
    _COUNTED: partial(_purlin, counted=True),
    _LOOSE: partial(_purlin, counted=False),
    _BRACE: partial(_brace, counted=True),
    _NO_BRACE: partial(_brace, counted=False),
    _TIE: partial(_tie, counted=True),
    _NO_TIE: partial(_tie, counted=False),
    _PINNED: partial(_bearing, slides=False),
    _SLIDING: partial(_bearing, slides=True),
    _SETTING_OUT: _line,
}
