"""Numbers as a message prints them: without an exponent."""

from __future__ import annotations

import math

_MOST = 9  # decimals: what is smaller prints as 0
_LARGEST = 1e15  # a slip or a damaged file: beyond it the digits say nothing, and the exponent does


def decimal(value: float, figures: int = 6) -> str:
    """Return a number with at least so many significant figures, all of its whole part, and no closing zeros."""
    if value == 0 or not abs(value) < _LARGEST:
        return f"{value + 0.0:g}"
    return fixed(value, min(max(figures - 1 - math.floor(math.log10(abs(value))), 0), _MOST))


def fixed(value: float, decimals: int) -> str:
    """Return a number rounded to so many decimals, without closing zeros."""
    text = f"{value:.{decimals}f}"
    text = text.rstrip("0").rstrip(".") if "." in text else text
    return "0" if text == "-0" else text
