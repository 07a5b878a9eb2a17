"""Evaluates the printed formulas of a rule against its printed values."""

from __future__ import annotations

import math
from collections.abc import Callable

from spanwright.design.steps import Line, Rule, explain

RELATIVE = 1e-9
"""Printed values come from the same doubles; a formula may only differ by its order of operations."""


def _where(condition: bool, yes: float, no: float) -> float:
    return yes if condition else no


FUNCTIONS: dict[str, Callable[..., float] | float] = {
    "sqrt": math.sqrt,
    "pi": math.pi,
    "min": min,
    "max": max,
    "abs": abs,
    "where": _where,
    "sin": math.sin,
    "cos": math.cos,
    "tan": math.tan,
    "log": math.log,
    "atan": math.atan,
    "floor": math.floor,
    "ceil": math.ceil,
}


def assert_formulas_hold(rule: Rule, index: tuple[int, ...]) -> int:
    """Assert that each printed formula of one element gives its printed value; return how many there were.

    Symbols must be unique in a rule, and a formula may use only symbols printed in it. A value that is zero but for
    rounding is compared on the scale of 1.
    """
    lines = explain(rule, index)
    symbols = {line.symbol: line.value for line in lines}
    assert len(symbols) == len(lines), f"{type(rule).__name__} prints a symbol twice"
    return sum(_holds(rule, line, symbols) for line in lines if line.formula)


def _holds(rule: Rule, line: Line, symbols: dict[str, float]) -> bool:
    value = eval(line.formula, {"__builtins__": {}}, {**FUNCTIONS, **symbols})
    told = f"{type(rule).__name__}: {line.symbol} = {line.formula} gives {value}, printed {line.value}"
    assert math.isclose(value, line.value, rel_tol=RELATIVE, abs_tol=RELATIVE if abs(line.value) < RELATIVE else 0), (
        told
    )
    return True
