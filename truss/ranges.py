"""Possible and usual ranges of a truss's measures: outside the first it is refused, outside the second warned about."""

from __future__ import annotations

import csv
import math
from dataclasses import dataclass
from functools import cache
from importlib.resources import files

from spanwright.truss.decimals import decimal
from spanwright.truss.errors import InputError

_UNITS = {"m": 1000.0, "deg": math.pi / 180, "-": 1.0}


@dataclass(frozen=True)
class Range:
    """Limits of one quantity, in mm, rad or as a ratio; infinite where there is none. `unit` is for printing."""

    unit: str
    possible_least: float
    usual_least: float
    usual_most: float
    possible_most: float

    def show(self, value: float) -> str:
        """Return the value with its printing unit ("1.53 m", "18.4 deg", "8.2")."""
        number = value / _UNITS[self.unit]
        return decimal(number, 3) if self.unit == "-" else f"{decimal(number, 4)} {self.unit}"


@cache
def ranges() -> dict[str, Range]:
    """Return the ranges by quantity, as read from ranges.csv."""
    text = files("spanwright.truss").joinpath("ranges.csv").read_text(encoding="utf-8")
    rows = csv.DictReader(line for line in text.splitlines() if not line.startswith("#"))
    return {row["quantity"]: _range(row) for row in rows}


def _range(row: dict[str, str]) -> Range:
    factor = _UNITS[row["unit"]]

    def limit(column: str, none: float) -> float:
        return float(row[column]) * factor if row[column] else none

    return Range(
        row["unit"],
        limit("possible_least", -math.inf),
        limit("usual_least", -math.inf),
        limit("usual_most", math.inf),
        limit("possible_most", math.inf),
    )


def refuse_outside(value: float, quantity: str, *, key: str, what: str, otherwise: str = "") -> None:
    """Raise InputError (with `key`) unless the value, in mm or rad, lies strictly between the possible limits.

    what : the quantity in words. otherwise : added to the remedy.
    """
    limits = ranges()[quantity]
    if limits.possible_least < value < limits.possible_most:
        return
    bounds = f"more than {limits.show(limits.possible_least)}"
    if math.isfinite(limits.possible_most):
        bounds += f" and less than {limits.show(limits.possible_most)}"
    raise InputError(f"{what} is {limits.show(value)}", f"it must be {bounds}{otherwise}", key)
