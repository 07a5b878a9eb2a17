"""Reads printed tables and says how far a computed value is from a printed one, beyond its rounding."""

from __future__ import annotations

import csv
from pathlib import Path

DATA = Path(__file__).parent / "published" / "data"


def read_printed(name: str) -> list[dict[str, str]]:
    """Return the rows of a table in tests/published/data, by column name."""
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def half_unit(text: str) -> float:
    """Return half a unit in the last printed place; of trailing zeros of a whole number only three figures count."""
    mantissa, _, exponent = text.casefold().lstrip("-").partition("e")
    whole, _, decimals = mantissa.partition(".")
    if decimals or exponent:
        place = int(exponent or 0) - len(decimals)
    else:
        place = len(whole) - max(min(3, len(whole)), len(whole.rstrip("0")))
    return 0.5 * 10.0**place


def beyond_rounding(text: str, computed: float) -> float:
    """Return the relative difference of a computed from a printed value that its rounding does not explain."""
    printed = float(text)
    return max(0.0, abs(computed - printed) - half_unit(text)) / abs(printed)
