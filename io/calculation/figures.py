"""Numbers in tables: fixed decimals, a true minus sign, no negative zero."""

from __future__ import annotations

import math

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
