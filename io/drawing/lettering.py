"""Lettering: the text that a drawing may carry, its heights on paper, and how wide it is.

Widths are those of the DejaVu Sans that comes with matplotlib, in which the PDF is set; the Arial that CAD systems take
is narrower, so what fits here fits there.
"""

from __future__ import annotations

import unicodedata
from collections.abc import Sequence
from functools import cache
from importlib.resources import files

from ezdxf.fonts import fonts

TEXT, LARGE, TITLE = 2.5, 3.5, 5.0
"""Heights of lettering on paper, mm (ISO 3098); nothing is lettered smaller."""

WIDTH_FACTOR = 0.85
"""Share of the font's own width: with it figures are as wide as ISO 3098 type B has them."""

STEP = 1.6
"""Distance from line to line, in heights of the lettering (ISO 3098: at least 1.4)."""

ELLIPSIS = "\u2026"
LONGEST = 2000
"""Characters of a text that are looked at: a DXF line of text holds about that many."""

_LOOKALIKES = {"^": "\u02c6"}
"""What stands for a character that begins a code wherever it is: a circumflex accent for a caret."""
_SPLIT = ("%%", "\\U+", "\\u+", "\\M+", "\\m+")


@cache
def sheet_font() -> fonts.AbstractFont:
    """Return the font that widths are taken from, capitals 1 mm high."""
    path = files("matplotlib").joinpath("mpl-data", "fonts", "ttf", "DejaVuSans.ttf")
    return fonts.sideload_ttf(str(path), 1.0)


def width_of(text: str, height: float = TEXT) -> float:
    """Return the width of a text on paper, mm."""
    return float(sheet_font().text_width_ex(printable(text), height, WIDTH_FACTOR))


def printable(text: str) -> str:
    """Return a text that shows as it is written: no control characters, and nothing a CAD system takes for a code.

    Control characters become a blank, marks of writing direction go, a caret becomes an accent, and a blank parts the
    pairs that begin a code.
    """
    shown = "".join(_shown(char) for char in text[:LONGEST])
    for code in _SPLIT:
        while code in shown:
            shown = shown.replace(code, f"{code[0]} {code[1:]}")
    return shown


def _shown(char: str) -> str:
    kind = unicodedata.category(char)
    if kind in ("Cc", "Zl", "Zp"):
        return " "
    if kind in ("Cf", "Cs", "Co", "Cn"):
        return ""
    return _LOOKALIKES.get(char, char)


def cut_to(text: str, room: float, height: float = TEXT) -> str:
    """Return a text that is at most `room` mm wide, an ellipsis where its end is cut off."""
    text = printable(text)
    if width_of(text, height) <= room:
        return text
    low, high = 0, len(text)
    while low < high:
        middle = (low + high + 1) // 2
        if width_of(text[:middle].rstrip() + ELLIPSIS, height) <= room:
            low = middle
        else:
            high = middle - 1
    return text[:low].rstrip() + ELLIPSIS


def wrapped(text: str, room: float, height: float = TEXT, *, most: int | None = None) -> list[str]:
    """Return a text in lines at most `room` mm wide; of more than `most` lines the last is cut off."""
    lines: list[str] = []
    for word in printable(text).split():
        longer = f"{lines[-1]} {word}" if lines else word
        if lines and width_of(longer, height) <= room:
            lines[-1] = longer
        else:
            lines.append(word)
    if most is not None and len(lines) > most:
        lines = [*lines[: most - 1], " ".join(lines[most - 1 :])]
    return [cut_to(line, room, height) for line in lines]


def widest(texts: Sequence[str], height: float = TEXT) -> float:
    """Return the width of the widest of some texts, mm; 0 of none."""
    return max((width_of(text, height) for text in texts), default=0.0)
