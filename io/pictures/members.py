"""Members as drawn: coloured by band, stout in compression, slender in tension, barred over 1, hatched on a limit."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.state import MemberState
from spanwright.io.pictures.style import BANDS, INK, PAPER, THICK, Pen
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Role

BARS = (1.1, 1.1)
"""White bars across a black member that is used over 1.00: on, off, mm."""

HATCH_STEP = 1.9
HATCH_REACH = 1.9
"""Strokes across a member that fails a pass-or-fail row: their spacing, and how far they reach to either side, mm."""

HATCH_LEAN = np.deg2rad(60.0)
"""rad: angle of the strokes to the member."""


@dataclass(frozen=True, eq=False)
class Member:
    """One member on the sheet: its (2, 2) segment, mm, its role and its state."""

    segment: FloatArray
    role: Role
    state: MemberState

    @property
    def span(self) -> FloatArray:
        """(2,) mm from its first end to its second."""
        span: FloatArray = self.segment[1] - self.segment[0]
        return span

    @property
    def length(self) -> float:
        """Its length on the sheet, mm."""
        return float(np.hypot(*self.span))

    @property
    def chord(self) -> bool:
        """Whether it belongs to a chord."""
        return "chord" in self.role

    @property
    def sides(self) -> tuple[float, ...]:
        """Sides on which its label may stand, the best first: +1 above (of a post: left), -1 below."""
        if self.chord:
            return (-1.0,) if self.role == "bottom chord" else (1.0,)
        return (1.0, -1.0)

    def width(self, pen: Pen) -> float:
        """Return the width it is drawn with, casing left out, mm: over 1.00 wider than any other."""
        return (pen.strut if self.state.sign == "C" else pen.tie) + (0.8 * pen.factor if self.state.over else 0.0)


def draw_members(sheet: Sheet, members: Sequence[Member], pen: Pen) -> None:
    """Draw every member, chords over webs: a dark casing, the band's colour on it, white bars where it is over 1.00."""
    for member in members:
        order = 2.5 if member.chord else 2.0
        width, state = member.width(pen), member.state
        sheet.lines([member.segment], width + 2.0 * pen.casing, INK, order=order)
        if state.over:
            sheet.lines([member.segment], width, PAPER, dashes=BARS, order=order + 0.1)
        else:
            sheet.lines([member.segment], width, BANDS[state.band].colour, order=order + 0.1)
        if state.hatched:
            sheet.lines(hatching(member.segment), THICK, order=2.9)


def hatching(segment: FloatArray) -> list[FloatArray]:
    """Return the strokes across one member, (2, 2) mm each."""
    span = segment[1] - segment[0]
    length = float(np.hypot(*span))
    along = span / length
    across = np.array([-along[1], along[0]])
    stroke = HATCH_REACH * (np.cos(HATCH_LEAN) * along + np.sin(HATCH_LEAN) * across)
    count = max(int((length - 4.0) / HATCH_STEP), 1)
    places = (np.arange(count) - (count - 1) / 2.0) * HATCH_STEP + length / 2.0
    return [np.array([segment[0] + at * along - stroke, segment[0] + at * along + stroke]) for at in places]
