"""Combinations of load cases by a loading standard, enumerated from its table and never chosen by a resultant."""

from __future__ import annotations

import csv
from dataclasses import dataclass
from importlib.resources import files
from itertools import product
from typing import Literal, cast

import numpy as np

from spanwright.loads.cases import Case
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import UnknownNameError

LimitState = Literal["STR", "STR-P", "EQU", "SLS", "SLS variable"]

ACTIONS: dict[str, tuple[str, str]] = {
    "SANS 10160:2011": ("combinations_sans_10160.csv", "2011"),
    "SANS 10160:2019": ("combinations_sans_10160.csv", "2019"),
}
"""Loading standards by name: the file of their combinations in loads/data, and the edition within it."""

COLUMNS = ("most", "least", "imposed", "man", "snow", "wind")
"""Columns of such a file that may hold factors: the two permanent sets, then the kinds of variable cases."""


@dataclass(frozen=True)
class Combination:
    """One combination.

    name : unique, as printed ("1.2 most + 1.6 imposed"); where two limit states hold the same sum, the later one in
        the standard's file is printed with its limit state ("EQU: 0.9 least + 1.3 west gale").
    limit_state : "STR" and "STR-P" are for members, "EQU" for reactions only, "SLS" for total deflection,
        "SLS variable" for the deflection of one variable action alone.
    factors : (case name, factor) each.
    """

    name: str
    limit_state: LimitState
    factors: tuple[tuple[str, float], ...]


def combine(cases: tuple[Case, ...], actions: str) -> tuple[Combination, ...]:
    """Return every combination of a loading standard; UnknownNameError (key "actions") where nobody knows it."""
    if actions not in ACTIONS:
        raise UnknownNameError.among(actions, list(ACTIONS), what="loading standard", key="actions")
    combinations: dict[str, Combination] = {}
    for row in _rows(*ACTIONS[actions]):
        for combination in _expand(row, cases):
            if combination.name in combinations:
                combination = _told_apart(combination)
            combinations[combination.name] = combination
    return tuple(combinations.values())


def factor_matrix(combinations: tuple[Combination, ...], cases: tuple[Case, ...]) -> FloatArray:
    """Return (cases, combinations): the factor of each case in each combination, 0 where it is absent."""
    place = {case.name: row for row, case in enumerate(cases)}
    matrix = np.zeros((len(cases), len(combinations)))
    for column, combination in enumerate(combinations):
        for name, factor in combination.factors:
            matrix[place[name], column] = factor
    return matrix


def _rows(file: str, edition: str) -> list[dict[str, str]]:
    text = files("spanwright.loads.data").joinpath(file).read_text(encoding="utf-8")
    table = csv.DictReader(line for line in text.splitlines() if not line.startswith("#"))
    return [row for row in table if row["edition"] in (edition, "all")]


def _expand(row: dict[str, str], cases: tuple[Case, ...]) -> list[Combination]:
    """Return one combination for every way to take one case of each kind that the row gives a factor."""
    factors = [(column, row[column]) for column in COLUMNS if row.get(column)]
    choices = [[(case.name, text) for case in cases if _column(case) == column] for column, text in factors]
    state = cast(LimitState, row["limit_state"])
    return [
        Combination(
            " + ".join(f"{text} {name}" for name, text in terms),
            state,
            tuple((name, float(text)) for name, text in terms),
        )
        for terms in product(*choices)
    ]


def _column(case: Case) -> str:
    return case.name if case.kind == "permanent" else case.kind


def _told_apart(combination: Combination) -> Combination:
    return Combination(f"{combination.limit_state}: {combination.name}", combination.limit_state, combination.factors)
