"""The value on each member: beside it where there is room, else a small letter there and the value in a key."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.boxes import corners
from spanwright.io.pictures.labels import Occupied, Words, place_along, readable_angle
from spanwright.io.pictures.lettering import Weight, height_of, width_of
from spanwright.io.pictures.members import Member
from spanwright.io.pictures.sheet import Sheet, disc
from spanwright.io.pictures.state import MemberState, letters_from
from spanwright.io.pictures.style import BODY, INK, LEAST, PAPER, SMALL, THIN, Pen
from spanwright.truss.arrays import FloatArray

APART = 0.55
"""mm between a member's edge and its label."""

FEW = 0.125
"""Share of the labels that may be smaller than the others; beyond it smaller letters are taken for all."""

LETTER = 3.9
"""Size in points of the letter in a disc, over the disc's radius in mm."""

_ORDER = 6.0


@dataclass(frozen=True, eq=False)
class Value:
    """A member's label: its (6,) box on the sheet and the size of its letters.

    key : the letter that stands for it in the key where the value itself finds no room, else "". Where that is the
    letter of the group it governs, the disc on the member shows it, and there is no `box`.
    """

    state: MemberState
    box: FloatArray | None
    size: float
    key: str = ""

    @property
    def words(self) -> str:
        """What is written on the member."""
        return self.key or self.state.words


def place_values(members: Sequence[Member], occupied: Occupied, pen: Pen) -> tuple[Value, ...]:
    """Take a place for every member's label, in the larger letters if most find room in them, and return the labels.

    Labels of the bottom chord lie below it, all others above (of posts: to the left), of webs below at need.
    """
    larger = Occupied(occupied.boxes)
    values = _placed(members, larger, pen, (BODY, SMALL))
    if sum(value.size < BODY for value in values) > len(values) * FEW:
        return _placed(members, occupied, pen, (SMALL, LEAST))
    occupied.boxes = larger.boxes
    return values


def _placed(members: Sequence[Member], occupied: Occupied, pen: Pen, sizes: tuple[float, ...]) -> tuple[Value, ...]:
    """Place governing and short members first; who finds no room tries smaller letters, then the letter of a key."""
    first = sorted(
        range(len(members)), key=lambda bar: (not members[bar].state.letter, round(members[bar].length, 1), bar)
    )
    values: dict[int, Value] = {}
    for size in sizes:
        for bar in (bar for bar in first if bar not in values):
            place = _beside(members[bar], members[bar].state.words, size, occupied, pen)
            if place is not None:
                values[bar] = Value(members[bar].state, place, size)
    keys = letters_from("a")
    for bar in (bar for bar in range(len(members)) if bar not in values):
        state = members[bar].state
        values[bar] = Value(state, None, SMALL, state.letter)
        if not state.letter:
            key = next(keys)
            place = _beside(members[bar], key, SMALL, occupied, pen)
            values[bar] = Value(state, _upon(members[bar], key) if place is None else place, SMALL, key)
    return tuple(values[bar] for bar in range(len(members)))


def _beside(member: Member, words: str, size: float, occupied: Occupied, pen: Pen) -> FloatArray | None:
    edge = member.width(pen) / 2.0 + pen.casing
    away = max(edge, pen.balloon if member.state.letter else 0.0) + APART
    room = Words(width_of(words, size, _weight(member.state)), height_of(size))
    return place_along(member.segment, room, away, member.sides, occupied)


def _upon(member: Member, words: str) -> FloatArray:
    """Return the box on the member itself, half-way."""
    middle = member.segment.mean(axis=0)
    return Words(width_of(words, SMALL), height_of(SMALL)).at(middle, readable_angle(member.span))


def _weight(state: MemberState) -> Weight:
    return "bold" if state.over or state.letter else "normal"


def draw_values(sheet: Sheet, values: tuple[Value, ...]) -> None:
    """Draw the labels on plates of paper, black ones where a member is used over 1.00."""
    for value in values:
        if value.box is None:
            continue
        sheet.areas([corners(value.box)], INK if value.state.over else PAPER, order=_ORDER)
        upward = np.array([-value.box[3], value.box[2]])
        x, y = value.box[:2] - height_of(value.size) / 2.0 * upward
        sheet.text(
            x,
            y,
            value.words,
            value.size,
            across="center",
            angle=float(np.degrees(np.arctan2(value.box[3], value.box[2]))),
            weight=_weight(value.state),
            colour=PAPER if value.state.over else INK,
            order=_ORDER + 0.2,
            mark=f"value-{value.state.name}",
        )


def draw_balloon(sheet: Sheet, middle: FloatArray, letter: str, pen: Pen) -> None:
    """Draw the letter of a group in a black disc."""
    sheet.areas([disc(middle, pen.balloon)], INK, edge=PAPER, width=THIN, order=_ORDER + 0.1)
    size = LETTER * pen.balloon
    base = middle[1] - height_of(size) / 2.0
    sheet.text(middle[0], base, letter, size, across="center", weight="bold", colour=PAPER, order=_ORDER + 0.2)
