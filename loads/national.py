"""Values that the Eurocodes leave to each nation: the recommended ones, and what a nation puts in their place.

They lie in loads/data/national_values.csv, each with its clause and mark.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cache

import numpy as np

from spanwright.loads.intermediate import Intermediate
from spanwright.loads.tables import read_table
from spanwright.truss.errors import InputError, UnknownNameError

RECOMMENDED = "recommended"
_KEY = "site.national_values"


@dataclass(frozen=True)
class _Value:
    """One row of the table; `at` is where a value that runs over something holds."""

    at: float
    value: Intermediate


def nations() -> tuple[str, ...]:
    """Return the nations of whom at least one value is known, as the project file spells them."""
    rows = (*read_table("national_values.csv"), *read_table("national_not_covered.csv"))
    return tuple(sorted({row["nation"] for row in rows} - {RECOMMENDED}))


def national_value(nation: str, symbol: str, at: float = 0.0) -> Intermediate:
    """Return a value as a nation has it, or the recommended one where nothing is known of the nation's own.

    nation : "" or "recommended" stands for the recommended values. at : for a value that runs over something, such as
    the pitch in degrees.

    Raises UnknownNameError (key "site.national_values") for a nation nobody knows.
    """
    recommended = _values(RECOMMENDED)[symbol]
    own = _own(nation).get(symbol)
    if own is None:
        return _on_curve(recommended, at)
    found, model = _on_curve(own, at), recommended[0].value
    return replace(
        found,
        meaning=f"{model.meaning}, {nation}",
        unit=model.unit,
        clause=found.clause or f"annex to {model.clause}",
    )


def national_basis(nation: str) -> tuple[Intermediate, ...]:
    """Return, as an assumption to verify, how many values of a nation's own are known; nothing for recommended values.

    Raises UnknownNameError as `national_value`.
    """
    own = _own(nation)
    if nation in ("", RECOMMENDED):
        return ()
    meaning = f"values of {nation} known here: {', '.join(own)}; the recommended ones stand for all others"
    return (Intermediate("known", meaning, len(own), "-", mark="assumed"),)


def refuse_not_covered(nation: str, part: str, remedy: str, key: str) -> None:
    """Raise InputError (the key given) where a nation replaces a part of a Eurocode by rules that are not covered."""
    for row in read_table("national_not_covered.csv"):
        if (row["nation"], row["part"]) == (nation, part):
            raise InputError(f"{part} in the {nation} is not covered: {row['reason']}", remedy, key)


def _own(nation: str) -> dict[str, tuple[_Value, ...]]:
    if nation in ("", RECOMMENDED):
        return {}
    if nation not in nations():
        raise UnknownNameError.among(nation, [RECOMMENDED, *nations()], what="set of national values", key=_KEY)
    return _values(nation)


def _on_curve(rows: tuple[_Value, ...], at: float) -> Intermediate:
    """Return the value at a place: straight between rows, constant beyond; from memory where any row is."""
    found = float(np.interp(at, [row.at for row in rows], [row.value.value for row in rows]))
    first = rows[0].value
    remembered = next((row.value.mark for row in rows if row.value.mark == "from memory"), first.mark)
    return replace(first, value=found, mark=remembered)


@cache
def _values(nation: str) -> dict[str, tuple[_Value, ...]]:
    found: dict[str, tuple[_Value, ...]] = {}
    for row in read_table("national_values.csv"):
        if row["nation"] == nation:
            value = Intermediate(
                row["symbol"],
                row["meaning"],
                float(row["value"]),
                row["unit"],
                row["clause"],
                mark=row["mark"],  # type: ignore[arg-type]  # a word of Mark
            )
            found[value.symbol] = (*found.get(value.symbol, ()), _Value(float(row["at"] or 0.0), value))
    return found
