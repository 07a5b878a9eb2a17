"""Numbers as people read them: units beside them, utilisation rounded up."""

from __future__ import annotations

import math

FIGURES = 5
"""Significant figures of a worked value."""


def rounded_up(ratio: float) -> str:
    """Return a ratio rounded up to 0.01, so that what is printed never flatters; "-" where there is none.

    A ratio that passes (at most 1) never prints above 1.00.
    """
    if not math.isfinite(ratio):
        return "-"
    hundredths = math.ceil(ratio * 100.0 - 1e-9)  # 1e-9: the dust of 100 times a binary fraction
    return f"{hundredths / 100.0:.2f}"


def kilonewtons(force: float) -> str:
    """Return N as kN to 0.1."""
    return f"{force / 1e3 + 0.0:.1f} kN"


def metres(length: float) -> str:
    """Return mm as m to 0.001; "not held" where it is infinite."""
    return f"{length / 1e3:.3f} m" if math.isfinite(length) else "not held"


def kilograms(mass: float) -> str:
    """Return kg to 1."""
    return f"{mass:.0f} kg"


def figures(value: float) -> str:
    """Write a number with five significant figures; powers of ten only where it is very large or small."""
    if value == 0 or not math.isfinite(value):
        return f"{value:g}"
    size = math.floor(math.log10(abs(value)))
    if not -4 <= size < 10:
        return f"{value:.{FIGURES - 1}e}"
    text = f"{value:.{max(0, FIGURES - 1 - size)}f}"
    return text.rstrip("0").rstrip(".") if "." in text else text
