"""Combinations of load cases by a loading standard."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from spanwright.loads.cases import Case
from spanwright.truss.arrays import FloatArray

LimitState = Literal["STR", "STR-P", "EQU", "SLS", "SLS variable"]


@dataclass(frozen=True)
class Combination:
    """One combination.

    name : unique, as printed ("1.2 most + 1.6 imposed").
    limit_state : "STR" and "STR-P" are for members, "EQU" for reactions only, "SLS" for total deflection,
        "SLS variable" for the deflection of one variable action alone.
    factors : (case name, factor) each.
    """

    name: str
    limit_state: LimitState
    factors: tuple[tuple[str, float], ...]


def combine(cases: tuple[Case, ...], actions: str) -> tuple[Combination, ...]:
    """Return every combination of a loading standard; UnknownNameError (key "actions") where nobody knows it."""
    raise NotImplementedError


def factor_matrix(combinations: tuple[Combination, ...], cases: tuple[Case, ...]) -> FloatArray:
    """Return (cases, combinations): the factor of each case in each combination, 0 where it is absent."""
    raise NotImplementedError
