"""The dimension bands of a chord drawn above or below the truss, with names of what holds it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.io.pictures.lettering import cut_to, height_of, width_of
from spanwright.io.pictures.runs import ChordHolding, Holder, Stretch
from spanwright.io.pictures.sheet import Across, Sheet, rectangle
from spanwright.io.pictures.style import BODY, FAINT, HAIR, INK, LEAST, PAPER, SMALL, SOFT, THICK, THIN
from spanwright.io.pictures.view import View
from spanwright.io.text import kilonewtons, metres
from spanwright.truss.arrays import FloatArray

BAND, TALL_BAND = 4.6, 7.4
"""Heights of the band of lengths in plane and of that out of plane, which takes a second line, mm."""

LINE = 2.9
"""mm between lines of upright text."""

ELBOW = 3.2
"""mm over which a leader slants from its point to its text."""

NAMES = BAND + TALL_BAND + ELBOW + 0.7
"""mm outward at which the names of what holds begin."""

LONGEST = 32.0
"""mm: a longer name is cut short."""

_TINTS = ("#cfe3f1", "#eaf3f9")
"""Two tints by turns, so that neighbouring lengths are told apart."""


@dataclass(frozen=True)
class Side:
    """Where the bands of a chord lie: from `edge` mm outward, `up` (+1) above the truss or (-1) below it."""

    edge: float
    up: float

    def at(self, out: float) -> float:
        """Return the height on the sheet `out` mm outward."""
        return self.edge + self.up * out


def draw_bands(sheet: Sheet, chord: ChordHolding, view: View, side: Side) -> None:
    """Draw the lengths in plane next to the truss, then those out of plane, then the names of what holds."""
    for stretch in chord.in_plane:
        _draw_length(sheet, view.onto(stretch.ends), side.at(BAND / 2.0), BAND, PAPER, [(_m(stretch), BODY)])
    for number, stretch in enumerate(chord.out_of_plane):
        lines = [(_m(stretch), BODY), (_compression(stretch), SMALL)]
        middle = side.at(BAND + TALL_BAND / 2.0)
        _draw_length(sheet, view.onto(stretch.ends), middle, TALL_BAND, _TINTS[number % 2], lines)
    ends = [end for stretch in chord.in_plane for end in stretch.ends]
    points = view.onto(np.array([*ends, *(holder.point for holder in chord.holders)]))
    leaders = [np.array([[x, y + side.up * 1.2], [x, side.edge]]) for x, y in np.unique(points, axis=0)]
    sheet.lines(leaders, HAIR, FAINT, order=0.5)
    left = min(float(points[:, 0].min()), _draw_holders(sheet, chord.holders, view, side)) - 2.0
    for out, words in (
        (BAND / 2.0, "in plane"),
        (BAND + TALL_BAND / 2.0, "out of plane"),
        (NAMES + 3.0 + LINE / 2.0 * side.up, f"{chord.name} chord,"),
        (NAMES + 3.0 - LINE / 2.0 * side.up, "held by"),
    ):
        sheet.text(left, side.at(out) - height_of(SMALL) / 2.0, words, SMALL, across="right", colour=SOFT)


def _m(stretch: Stretch) -> str:
    return metres(stretch.length).removesuffix(" m")


def _compression(stretch: Stretch) -> str:
    return f"C {kilonewtons(stretch.compression)}" if stretch.compression > 0.0 else "no C"


def _draw_length(
    sheet: Sheet,
    ends: FloatArray,
    middle: float,
    high: float,
    tint: str,
    words: list[tuple[str, float]],
) -> None:
    """Draw one length as a box with its words under each other; in a narrow box the first stands upright."""
    left, right = float(ends[0, 0]), float(ends[1, 0])
    sheet.areas([rectangle(left, middle - high / 2.0, right - left, high)], tint, edge=INK, width=THIN, order=2.0)
    centre, room = (left + right) / 2.0, right - left - 0.8
    sizes = [next((size for size in (most, SMALL, LEAST) if width_of(text, size) < room), 0.0) for text, most in words]
    fitting = [(text, size) for (text, _), size in zip(words, sizes, strict=True) if size]
    if not fitting and width_of(words[0][0], SMALL) < high - 0.4 and room > height_of(SMALL):
        sheet.text(centre + height_of(SMALL) / 2.0, middle, words[0][0], SMALL, across="center", angle=90.0)
    step = high / (len(fitting) + 0.2)
    for number, (text, size) in enumerate(fitting):
        y = middle + ((len(fitting) - 1) / 2.0 - number) * step - height_of(size) / 2.0
        sheet.text(centre, y, text, size, across="center", colour=INK if number == 0 else SOFT)


def _draw_holders(sheet: Sheet, holders: tuple[Holder, ...], view: View, side: Side) -> float:
    """Write upright what holds, spread where the points are close, with a leader to each; return the left end, mm."""
    places = [float(view.onto(holder.point)[0]) for holder in holders]
    widths = [len(holder.lines) * LINE for holder in holders]
    found = spread(places, [(before + own) / 2.0 for before, own in pairwise(widths)])
    start = side.at(BAND + TALL_BAND)
    for holder, place, x in zip(holders, places, found, strict=True):
        path = np.array([[place, start], [place, start + side.up * 0.8], [x, start + side.up * ELBOW]])
        style = (THICK, INK, None) if holder.counted else (HAIR, SOFT, (0.8, 0.6))
        sheet.lines([path], style[0], style[1], dashes=style[2])
        for number, words in enumerate(holder.lines):
            shift = (number - (len(holder.lines) - 1) / 2.0) * LINE + height_of(SMALL) / 2.0
            across: Across = "left" if side.up > 0.0 else "right"
            shown = cut_to(words, LONGEST, SMALL)
            sheet.text(x + shift, side.at(NAMES), shown, SMALL, across=across, angle=90.0, colour=style[1])
    return min((x - width / 2.0 for x, width in zip(found, widths, strict=True)), default=np.inf)


def spread(places: Sequence[float], gaps: Sequence[float]) -> list[float]:
    """Return places as near as can be to those given, in order, each at least its gap from the one before it.

    gaps : one fewer than places. Neighbours that come too near each other form a block, which is centred on the places
    it stands for.
    """
    shifts = np.concatenate([[0.0], np.cumsum(gaps)])[: len(places)]
    blocks: list[list[float]] = []
    for place, shift in zip(places, shifts, strict=True):
        block = [place - float(shift)]
        while blocks and np.mean(blocks[-1]) > np.mean(block):
            block = blocks.pop() + block
        blocks.append(block)
    levels = [float(np.mean(block)) for block in blocks for _ in block]
    return [level + float(shift) for level, shift in zip(levels, shifts, strict=True)]


def height_of_bands(chord: ChordHolding) -> float:
    """Return the height that the bands and names of a chord take, mm."""
    names = [width_of(words, SMALL) for holder in chord.holders for words in holder.lines]
    return NAMES + min(max(names, default=0.0), LONGEST)
