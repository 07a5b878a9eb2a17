"""The legend: what colours, widths and signs of a picture mean, in lines that flow from left to right."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass
from functools import partial

import numpy as np

from spanwright.io.pictures.lettering import height_of, width_of
from spanwright.io.pictures.members import BARS, hatching
from spanwright.io.pictures.sheet import Sheet, rectangle
from spanwright.io.pictures.style import BANDS, BODY, INK, PAPER, SOFT, THICK, THIN, Pen
from spanwright.io.pictures.symbols import DASHES, TIE_WIDTH, bearing_outline, fill, purlin_square, stroke, tie_oblong
from spanwright.io.pictures.values import draw_balloon
from spanwright.truss.restraint import Restraint

LINE = 5.2
"""Height of a line of the legend, mm."""

GAP = 5.0
"""mm between entries."""

_PEN = Pen(1.0)
_SAMPLE = 8.0
_APART = 1.3
_GREY = "#c8c8c8"


@dataclass(frozen=True)
class Sign:
    """One entry: `draw(sheet, left, middle)` draws a sample of this `width`, mm, before the words."""

    width: float
    draw: Callable[[Sheet, float, float], None]
    words: str

    @property
    def length(self) -> float:
        """The length of sample and words, mm."""
        return self.width + _APART + width_of(self.words, BODY)


def in_lines(signs: Iterable[Sign], width: float) -> list[list[Sign]]:
    """Set signs into lines that are no longer than `width` mm."""
    lines: list[list[Sign]] = [[]]
    used = 0.0
    for sign in signs:
        if lines[-1] and used + sign.length > width:
            lines.append([])
            used = 0.0
        lines[-1].append(sign)
        used += sign.length + GAP
    return lines


def draw_legend(sheet: Sheet, lines: list[list[Sign]], left: float, bottom: float) -> float:
    """Draw lines of signs that end at `bottom`, and return the height at which they begin, mm."""
    top = bottom + LINE * len(lines)
    for number, signs in enumerate(lines):
        x, middle = left, top - (number + 0.5) * LINE
        for sign in signs:
            sign.draw(sheet, x, middle)
            sheet.text(x + sign.width + _APART, middle - height_of(BODY) / 2.0, sign.words, BODY)
            x += sign.length + GAP
    return top


def band_signs() -> tuple[Sign, ...]:
    """Return the signs of the bands of utilisation, of members over 1.00 and of hatched ones."""
    first, *others = BANDS
    return (
        Sign(_SAMPLE, partial(_swatch, colour=first.colour), f"utilisation, strength: {first.words}"),
        *(Sign(_SAMPLE, partial(_swatch, colour=band.colour), band.words) for band in others),
        Sign(_SAMPLE, _over, "over 1.00"),
        Sign(_SAMPLE, _hatched, "fails a limit (slenderness, packs)"),
    )


def member_signs() -> tuple[Sign, ...]:
    """Return the signs of compression, of tension and of the member that governs its group."""
    return (
        Sign(_SAMPLE, partial(_bar, width=_PEN.strut), "C: compression governs"),
        Sign(_SAMPLE, partial(_bar, width=_PEN.tie), "T: tension governs"),
        Sign(2.0 * _PEN.balloon, _balloon, "governs its group"),
    )


def holding_signs(restraint: Restraint) -> tuple[Sign, ...]:
    """Return the signs of what holds the truss, as far as there is any; filled counts, open does not."""
    signs = []
    for counts, purlin, other in ((True, "counted", ""), (False, "loose", ", no hold")):
        if any(line.anchored == counts for line in restraint.lines):
            signs.append(Sign(_PEN.square, partial(_square, counts=counts), f"purlin, {purlin}"))
        if any(brace.counted == counts for brace in restraint.braces):
            signs.append(Sign(_SAMPLE, partial(_brace, counts=counts), f"knee brace{other}"))
        if any(tie.counted == counts for tie in restraint.ties):
            signs.append(Sign(TIE_WIDTH, partial(_tie, counts=counts), f"bottom tie{other}"))
    held = bool(restraint.bearings)
    words = "bearing, held sideways" if held else "bearing, not held sideways"
    return (*signs, Sign(3.0, partial(_bearing, held=held), words))


def _swatch(sheet: Sheet, x: float, y: float, colour: str) -> None:
    sheet.areas([rectangle(x, y - 1.3, _SAMPLE, 2.6)], colour, edge=INK, width=_PEN.casing)


def _over(sheet: Sheet, x: float, y: float) -> None:
    _swatch(sheet, x, y, INK)
    sheet.lines([np.array([[x, y], [x + _SAMPLE, y]])], 2.2, PAPER, dashes=BARS, order=1.2)


def _hatched(sheet: Sheet, x: float, y: float) -> None:
    sheet.areas([rectangle(x, y - 0.8, _SAMPLE, 1.6)], PAPER, edge=INK, width=_PEN.casing)
    sheet.lines(hatching(np.array([[x - 1.0, y], [x + _SAMPLE + 1.0, y]])), THICK, order=1.2)


def _bar(sheet: Sheet, x: float, y: float, width: float) -> None:
    line = [np.array([[x, y], [x + _SAMPLE, y]])]
    sheet.lines(line, width + 2.0 * _PEN.casing, INK)
    sheet.lines(line, width, _GREY, order=1.1)


def _balloon(sheet: Sheet, x: float, y: float) -> None:
    draw_balloon(sheet, np.array([x + _PEN.balloon, y]), "A", _PEN)


def _square(sheet: Sheet, x: float, y: float, counts: bool) -> None:
    foot = np.array([x + _PEN.square / 2.0, y - _PEN.square / 2.0])
    outline = purlin_square(foot, np.array([0.0, 1.0]), _PEN.square)
    sheet.areas([outline], fill(counts), edge=INK, width=THIN)


def _brace(sheet: Sheet, x: float, y: float, counts: bool) -> None:
    sheet.lines([np.array([[x, y], [x + _SAMPLE, y]])], THICK, stroke(counts), dashes=DASHES)


def _tie(sheet: Sheet, x: float, y: float, counts: bool) -> None:
    sheet.areas([tie_oblong(np.array([x + TIE_WIDTH / 2.0, y]), 0.8)], fill(counts), edge=INK, width=THIN)


def _bearing(sheet: Sheet, x: float, y: float, held: bool) -> None:
    outline = bearing_outline(np.array([x + 1.5, y + 1.2]), 2.5)
    sheet.areas([outline], SOFT if held else PAPER, edge=INK, width=THIN)
