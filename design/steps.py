"""Rules that explain themselves.

A rule is a frozen dataclass whose inputs are declared with `given` and whose intermediates are declared with
`step`; both state symbol, unit, clause and (for steps) the formula, right above the one line that computes it.
Values are arrays that broadcast against each other, usually (sections, bars); a step is computed at its first use.

    @dataclass(frozen=True, eq=False)
    class Euler(Rule):
        slenderness: FloatArray = given("KLr", "-", "slenderness ratio")
        modulus: float = given("E", "MPa", "modulus of elasticity")

        @step("fe", "MPa", "13.3.1", "pi**2*E/KLr**2", "elastic buckling stress")
        def elastic_stress(self) -> FloatArray:
            return np.pi**2 * self.modulus / self.slenderness**2

`explain(rule, index)` gives the printed lines for one element, from the very arrays that decided.

Formulas are Python expressions over the symbols of the same rule, with `sqrt`, `pi`, `min`, `max`, `abs`, `where`
(`where(condition, a, b)`), `sin`, `cos`, `tan`, `log`, `atan` and `floor`/`ceil`; so a test can evaluate each one
against its printed value, and a writer can typeset it.
A formula of "" is text only: the note says where the value comes from.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, field, fields
from functools import cached_property
from typing import Any, cast

import numpy as np

from spanwright.truss.arrays import FloatArray


@dataclass(frozen=True)
class Line:
    """One printed line of a calculation.

    symbol, unit, clause, formula : as declared; formula is "" for an input.
    meaning : what the value is, in words.
    value : the number, in `unit`.
    """

    symbol: str
    unit: str
    clause: str
    formula: str
    meaning: str
    value: float


@dataclass(frozen=True)
class _Note:
    symbol: str
    unit: str
    clause: str
    formula: str
    meaning: str


def given(symbol: str, unit: str, meaning: str, clause: str = "") -> Any:
    """Declare an input of a rule: its symbol, unit, meaning and, where it has one, clause."""
    return field(metadata={"note": _Note(symbol, unit, clause, "", meaning)})


class _Step(cached_property[FloatArray]):
    """A lazily computed step that carries its note."""

    note: _Note


def step(
    symbol: str, unit: str, clause: str, formula: str, meaning: str
) -> Callable[[Callable[[Any], FloatArray]], cached_property[FloatArray]]:
    """Declare a step of a rule: symbol, unit, clause, formula over the rule's symbols, meaning."""

    def wrap(function: Callable[[Any], FloatArray]) -> cached_property[FloatArray]:
        wrapped = _Step(function)
        wrapped.note = _Note(symbol, unit, clause, formula, meaning)
        return wrapped

    return wrap


@dataclass(frozen=True, eq=False)
class Rule:
    """Base of all rules: inputs by `given`, intermediates by `step`, in the order they are printed."""

    def notes(self) -> Iterator[tuple[str, _Note]]:
        """Yield (attribute, note) of every input, then of every step, in declaration order."""
        for entry in fields(self):
            if "note" in entry.metadata:
                yield entry.name, cast(_Note, entry.metadata["note"])
        for base in reversed(type(self).__mro__):
            for name, member in vars(base).items():
                if isinstance(member, _Step):
                    yield name, member.note


def explain(rule: Rule, index: tuple[int, ...]) -> tuple[Line, ...]:
    """Return the printed lines of a rule for one element.

    index : indices into the broadcast shape of the rule's arrays, e.g. (section, bar); an array with fewer
    dimensions or with length 1 in one of them is taken as constant there (NumPy broadcasting).
    """
    return tuple(
        Line(note.symbol, note.unit, note.clause, note.formula, note.meaning, _pick(getattr(rule, name), index))
        for name, note in rule.notes()
    )


def _pick(values: Any, index: tuple[int, ...]) -> float:
    array = np.asarray(values)
    trailing = index[len(index) - array.ndim :] if array.ndim else ()
    return float(array[tuple(0 if size == 1 else at for size, at in zip(array.shape, trailing, strict=True))])
