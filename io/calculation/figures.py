"""Numbers in tables: fixed decimals, a true minus sign, no negative zero."""

from __future__ import annotations

import math
import re

from spanwright.io.calculation.mathematics import grouped

NONE = "\u2013"
"""Stands where there is no value."""


def fixed(value: float, decimals: int) -> str:
    """Return a number with these decimals; a dash where it is not finite."""
    if not math.isfinite(value):
        return NONE
    text = f"{abs(value):.{decimals}f}"
    sign = "\u2212" if value < 0 and float(text) != 0.0 else ""
    return sign + grouped(text)


def kilo(value: float, decimals: int = 1) -> str:
    """Return N as kN, mm as m, N/m as kN/m."""
    return fixed(value / 1e3, decimals)


def mega(value: float, decimals: int = 3) -> str:
    """Return N mm as kN m."""
    return fixed(value / 1e6, decimals)


_NUMBER = re.compile(r"[\u2212\u2009\d]*\d(\.\d+)?")
_FIGURE_SPACE, _POINT_SPACE = "\u2007", "\u2008"


def points_aligned(cells: tuple[str, ...]) -> tuple[str, ...]:
    """Return the cells of a column that stands on the right with their points aligned: missing decimals are spaces."""
    decimals = [len(match[1] or "") if (match := _NUMBER.fullmatch(cell)) else None for cell in cells]
    most = max((count for count in decimals if count is not None), default=0)
    return tuple(
        cell
        if count is None or count == most
        else cell + ("" if count else _POINT_SPACE) + _FIGURE_SPACE * (most - max(count, 1))
        for cell, count in zip(cells, decimals, strict=True)
    )
