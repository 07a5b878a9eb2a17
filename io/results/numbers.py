"""Rounding at the edge, so that the same truss gives the same text however it was described."""

from __future__ import annotations

import math

from spanwright.truss.arrays import FloatArray


def millimetres(value: float) -> float | None:
    """Return mm to 0.001, or None where there is no length."""
    return _rounded(value, 3)


def newtons(value: float) -> float | None:
    """Return N to 0.1 (or N mm), or None where there is no force."""
    return _rounded(value, 1)


def ratio(value: float) -> float | None:
    """Return a ratio to 0.0001, or None where there is none (infinite)."""
    return _rounded(value, 4)


def in_unit(value: float, unit: str) -> float | None:
    """Return a check's demand or resistance: forces and moments to 0.1, anything else to 0.0001."""
    return newtons(value) if unit.startswith("N") else ratio(value)


def kilograms(value: float) -> float | None:
    """Return kg to 0.01."""
    return _rounded(value, 2)


def pairs(vectors: FloatArray, names: tuple[str, ...]) -> dict[str, list[float | None]]:
    """Return {name: [x, y]} in N for a (j, 2) array, joints without a force left out."""
    listed = {name: [newtons(float(x)), newtons(float(y))] for name, (x, y) in zip(names, vectors, strict=True)}
    return {name: vector for name, vector in listed.items() if any(vector)}


def _rounded(value: float, digits: int) -> float | None:
    if not math.isfinite(value):
        return None
    return round(value, digits) + 0.0  # + 0.0 turns -0.0 into 0.0
