"""Combinations of load cases by a loading standard, enumerated from its table and never chosen by a resultant.

Imposed loads at joints that are cases of their own, such as a hoist, lead in rows of their own. Where another action
leads, each accompanies it with its psi, or stays away: every subset of them stands, for a hoist that helps one member
presses another.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from itertools import combinations, product
from typing import Literal, cast

import numpy as np

from spanwright.loads.case import Case
from spanwright.loads.intermediate import Intermediate, Mark, to_verify
from spanwright.loads.national import national_basis
from spanwright.loads.partial_factors import en_1990_factors
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.tables import read_table
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError, UnknownNameError

LimitState = Literal["STR", "STR-P", "EQU", "SLS", "SLS variable", "SLS quasi-permanent"]
Factors = dict[str, Intermediate]


@dataclass(frozen=True)
class Actions:
    """A loading standard as its combinations know it.

    file : of its combinations, in loads/data. column : the file's column that tells editions or expressions apart;
    takes : which of them hold, beside those marked "all".
    factors : finds the values that the file names instead of numbers.
    """

    file: str
    column: str
    takes: tuple[str, ...]
    factors: Callable[[SiteInput | None], Factors] = lambda _: {}

    def rows(self) -> list[dict[str, str]]:
        """Return the rows that hold."""
        return [row for row in read_table(self.file) if row[self.column] in (*self.takes, "all")]


_SANS = "combinations_sans_10160.csv"
_EN = "combinations_en_1990.csv"
ACTIONS: dict[str, Actions] = {
    "SANS 10160:2011": Actions(_SANS, "edition", ("2011",)),
    "SANS 10160:2019": Actions(_SANS, "edition", ("2019",)),
    "EN 1990:2002, 6.10": Actions(_EN, "expression", ("6.10",), en_1990_factors),
    "EN 1990:2002, 6.10a and 6.10b": Actions(_EN, "expression", ("6.10a", "6.10b"), en_1990_factors),
}
"""Loading standards by name."""

COLUMNS = ("most", "least", "imposed", "man", "snow", "exceptional snow", "wind", "at joint")
"""Columns of such a file that may hold factors: the two permanent sets, then the kinds of variable cases; "at joint" is
for imposed loads at joints that are cases of their own.

A factor is a number or a product ("gQ*psi0_wind") of numbers and of values that the standard leaves to the site.
"""
BESIDE = "beside"
"""The column with the factor, before their own psi, of loads at joints that accompany what a row holds."""
MOST_BESIDE = 4
"""So many loads at joints may accompany others, in 16 ways; more would bury every other combination."""

Terms = tuple[tuple[str, float], ...]


@dataclass(frozen=True)
class Combination:
    """One combination.

    name : unique, as printed ("1.2 most + 1.6 imposed + 0.48 hoist"); where two limit states hold the same sum, the
        later one in the standard's file is printed with its limit state ("EQU: 0.9 least + 1.3 west gale").
    limit_state : "STR" and "STR-P" are for members, "EQU" for reactions only, "SLS" for total deflection,
        "SLS variable" for the deflection of the variable actions alone, "SLS quasi-permanent" for what lasts.
    factors : (case name, factor) each.
    """

    name: str
    limit_state: LimitState
    factors: Terms


def combine(cases: tuple[Case, ...], actions: str, site: SiteInput | None = None) -> tuple[Combination, ...]:
    """Return every combination of a loading standard.

    site : its altitude and nation set the factors that the standard leaves to them; None: the recommended values, for a
    site not above 1000 m.

    Raises UnknownNameError (key "actions") for a standard nobody knows; InputError (key "actions") for a case of a kind
    that the standard does not combine, as it would act nowhere, and (key "loads.at_joint") where more than
    `MOST_BESIDE` loads at joints accompany others.
    """
    standard = _standard(actions)
    rows, values = standard.rows(), standard.factors(site)
    _refuse_lost(cases, rows, actions)
    _refuse_many_beside(cases)
    found: dict[str, Combination] = {}
    sums: set[tuple[LimitState, frozenset[tuple[str, float]]]] = set()
    for row in rows:
        for combination in _expand(row, cases, values):
            same = combination.limit_state, frozenset(combination.factors)
            if same in sums:  # two loads at joints with a psi of 1 each: either may lead
                continue
            sums.add(same)
            if combination.name in found:
                combination = _told_apart(combination)
            found[combination.name] = combination
    return tuple(found.values())


def combination_factors(actions: str, site: SiteInput | None = None) -> tuple[Intermediate, ...]:
    """Return the values that a standard's combinations take from the site; UnknownNameError as `combine`."""
    return tuple(_standard(actions).factors(site).values())


def combination_cautions(cases: tuple[Case, ...], actions: str, site: SiteInput | None = None) -> tuple[str, ...]:
    """Return what a printed copy of the standard must confirm of the combinations that these cases make.

    Raises UnknownNameError as `combine`.
    """
    standard = _standard(actions)
    values = standard.factors(site)
    used = [row for row in standard.rows() if _expand(row, cases, values)]
    named = {part for row in used for column in (*COLUMNS, BESIDE) for part in row.get(column, "").split("*")}
    tables = (
        Intermediate("", f"combinations for {row['limit_state']}", math.nan, "-", mark=cast(Mark, row["mark"]))
        for row in used
    )
    nation = national_basis("" if site is None else site.national) if values else ()
    return to_verify(actions, (*nation, *(value for name, value in values.items() if name in named), *tables))


def factor_matrix(combinations: tuple[Combination, ...], cases: tuple[Case, ...]) -> FloatArray:
    """Return (cases, combinations): the factor of each case in each combination, 0 where it is absent."""
    place = {case.name: row for row, case in enumerate(cases)}
    matrix = np.zeros((len(cases), len(combinations)))
    for column, combination in enumerate(combinations):
        for name, factor in combination.factors:
            matrix[place[name], column] = factor
    return matrix


def _standard(actions: str) -> Actions:
    if actions not in ACTIONS:
        raise UnknownNameError.among(actions, list(ACTIONS), what="loading standard", key="actions")
    return ACTIONS[actions]


def _refuse_lost(cases: tuple[Case, ...], rows: list[dict[str, str]], actions: str) -> None:
    for case in cases:
        if not any(row.get(_column(case)) for row in rows):
            raise InputError(
                f'{actions} has no combination with {case.kind}, of which "{case.name}" is a case',
                "choose a loading standard that has, or leave the case out",
                "actions",
            )


def _refuse_many_beside(cases: tuple[Case, ...]) -> None:
    names = [case.name for case in cases if case.psi]
    if len(names) > MOST_BESIDE:
        raise InputError(
            f"{len(names)} imposed loads at joints accompany others: {', '.join(names)}",
            f"at most {MOST_BESIDE} may: give one case name to those that act together, and psi = 0 to those that act "
            "alone, such as the places of one hoist",
            "loads.at_joint",
        )


def _expand(row: dict[str, str], cases: tuple[Case, ...], values: Factors) -> list[Combination]:
    """Return one combination for every way to take one case of each kind that the row gives a factor, and any of the
    loads at joints beside them.

    None where a factor is 0: the standard's file has a row without that action.
    """
    factors = {column: _factor(row[column], values) for column in COLUMNS if row.get(column)}
    if not all(factors.values()):
        return []
    choices = [[(case.name, factor) for case in cases if _column(case) == column] for column, factor in factors.items()]
    state = cast(LimitState, row["limit_state"])
    beside = _factor(row[BESIDE], values) if row.get(BESIDE) else 0.0
    return [
        Combination(" + ".join(f"{factor} {name}" for name, factor in terms), state, terms)
        for leading in product(*choices)
        for terms in _accompanied(leading, cases, beside)
    ]


def _accompanied(leading: Terms, cases: tuple[Case, ...], beside: float) -> Iterator[Terms]:
    """Yield the terms of a combination without and with each subset of the loads at joints that may accompany them."""
    there = {name for name, _ in leading}
    able = [(case.name, round(beside * case.psi, 6)) for case in cases if case.psi and case.name not in there]
    for count in range(len(able) + 1 if beside else 1):
        for some in combinations(able, count):
            yield (*leading, *some)


def _factor(text: str, values: Factors) -> float:
    """Return a factor, rounded to what is printed."""
    parts = text.split("*")
    return round(math.prod(values[part].value if part in values else float(part) for part in parts), 6)


def _column(case: Case) -> str:
    if case.kind == "permanent":
        return case.name
    return case.kind if case.psi is None else "at joint"


def _told_apart(combination: Combination) -> Combination:
    return Combination(f"{combination.limit_state}: {combination.name}", combination.limit_state, combination.factors)
