"""Lettering: fonts, the width and height of words on paper, and words cut to the room there is."""

from __future__ import annotations

from functools import lru_cache
from typing import Literal

from matplotlib.font_manager import FontProperties
from matplotlib.textpath import text_to_path

Weight = Literal["normal", "bold"]

MM_PER_INCH = 25.4
POINTS_PER_MM = 72.0 / MM_PER_INCH

_MEASURED = 100.0  # points: size at which letters are measured

CAPITAL = 0.73
"""Height of a capital letter or a figure over the size of the font (DejaVu Sans)."""


def plain(words: str) -> str:
    """Return text on one line, without the control characters that no font draws and no XML file may hold."""
    return "".join(letter for letter in " ".join(words.split()) if letter.isprintable())


@lru_cache(maxsize=64)
def font_of(size: float, weight: Weight) -> FontProperties:
    """Return the font that all text is written in, of a size in points."""
    return FontProperties(family="sans-serif", size=size, weight=weight)


def width_of(words: str, size: float, weight: Weight = "normal") -> float:
    """Return the width of one line of text, mm: the sum of its letters' advances (measuring it whole takes longer)."""
    return size / POINTS_PER_MM * sum(_advance(letter, weight) for letter in plain(words))


@lru_cache(maxsize=1024)
def _advance(letter: str, weight: Weight) -> float:
    """Return the advance of a letter over the size of the font."""
    points, _, _ = text_to_path.get_text_width_height_descent(letter, font_of(_MEASURED, weight), ismath=False)
    return float(points) / _MEASURED


def height_of(size: float) -> float:
    """Return the height of a capital letter or a figure, mm."""
    return CAPITAL * size / POINTS_PER_MM


def cut_to(words: str, width: float, size: float, weight: Weight = "normal") -> str:
    """Return text that is no wider than `width` mm, with an ellipsis where its end had to go."""
    words = plain(words)
    if width_of(words, size, weight) <= width:
        return words
    kept = len(words)
    while kept and width_of(words[:kept].rstrip() + "\u2026", size, weight) > width:
        kept -= 1
    return words[:kept].rstrip() + "\u2026"
