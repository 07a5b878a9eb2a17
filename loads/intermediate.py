"""A value on the way from the site to a load, with all that a checking engineer asks of it."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Literal

Mark = Literal["stated", "computed", "seen", "from memory", "assumed"]
"""Where a value comes from: the user, arithmetic, a source that was read, a standard recalled without its print at hand
(to be verified), or the project's own rule where the standard is silent or unknown."""


@dataclass(frozen=True)
class Intermediate:
    """One value.

    symbol, unit : as printed; unit "-" where there is none. value : in `unit`. meaning : in words.
    clause : of the standard, with its part; "" where the user stated the value. formula : "" where it is looked up.
    mark : where the value, or the rule that gave it, comes from.
    """

    symbol: str
    meaning: str
    value: float
    unit: str
    clause: str = ""
    formula: str = ""
    mark: Mark = "computed"

    def __str__(self) -> str:
        formula = f" = {self.formula}" if self.formula else ""
        unit = "" if self.unit == "-" else f" {self.unit}"
        source = ", ".join(part for part in (self.clause, self.mark) if part)
        return f"{self.meaning}: {self.symbol}{formula} = {self.value:.4g}{unit} ({source})"


def to_verify(standard: str, values: Iterable[Intermediate]) -> tuple[str, ...]:
    """Return at most two sentences that name what a printed copy of the standard must confirm: each value once."""
    listed = list(values)
    sentences = []
    for mark, what in (
        ("from memory", "taken from memory, verify against the printed standard before use"),
        ("assumed", "this project's assumption where the standard was not at hand, verify"),
    ):
        names = dict.fromkeys(
            f"{value.meaning} ({value.clause})" if value.clause else value.meaning
            for value in listed
            if value.mark == mark
        )
        if names:
            sentences.append(f"{standard}: {what}: {'; '.join(names)}")
    return tuple(sentences)
