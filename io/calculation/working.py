"""A member worked in full: each rule's values, formulas and results, from the very arrays that decided.

A value that means the same in every check is printed once, above them; a rule that two checks share is worked once.
Within a check, a value printed already is not printed again.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Callable
from dataclasses import dataclass, fields

from spanwright.design.standard import Check
from spanwright.design.steps import Line, Rule, explain
from spanwright.io.calculation.blocks import CheckWork, MemberWork, RuleWork, Step, Taken, Value
from spanwright.io.calculation.mathematics import number, reasons, signs, symbols_in, with_numbers, with_symbols
from spanwright.io.calculation.symbols import symbol, unit
from spanwright.io.text import figures, rounded_up

WIDEST = 100
"""Signs of a formula with its numbers that fit into one line of the column."""


@dataclass(frozen=True)
class _Explained:
    """A rule's printed lines for one member: what is given, and the steps."""

    given: tuple[Line, ...]
    steps: tuple[Line, ...]


def work(
    title: str,
    about: tuple[tuple[str, str], ...],
    checks: tuple[Check, ...],
    place: int,
    combination: Callable[[int], str],
    governs: str,
) -> MemberWork:
    """Work the checks of one section for its member number `place`.

    combination : the printed name of a combination by its index. governs : name of the check that governs.
    """
    explained = [[_explained(rule, place) for rule in check.rules] for check in checks]
    arising = [at for at, check in enumerate(checks) if check.ratio[0, place] > 0.0]
    common = _common([rule for at in arising for rule in explained[at]])
    printed: dict[_Explained, str] = {}
    works = []
    for at in arising:
        works.append(_check(checks[at], place, explained[at], common, printed, combination, governs))
    return MemberWork(
        title,
        about,
        tuple(_value(line) for line in common.values()),
        tuple(works),
        tuple(check.name for at, check in enumerate(checks) if at not in arising),
    )


def outcome(check: Check, place: int) -> str:
    """Return effect, resistance and utilisation of a check of one section for one member, in words."""
    effect, resistance, ratio = (float(part[0, place]) for part in (check.demand, check.resistance, check.ratio))
    verdict = "passes" if ratio <= 1.0 else "FAILS"
    return f"{measured(effect, check.unit)} of {measured(resistance, check.unit)}: {rounded_up(ratio)}, {verdict}"


def values_given(check: Check, place: int) -> tuple[Value, ...]:
    """Return what a check of one section takes for its member number `place`, each value once."""
    rules = [_explained(rule, place) for rule in check.rules]
    made = {line.symbol for rule in rules for line in rule.steps}
    given = {line.symbol: line for rule in rules for line in rule.given if line.symbol not in made}
    return tuple(_value(line) for line in given.values())


def measured(value: float, of: str) -> str:
    """Return a value with its unit: forces in kN and moments in kN m, anything else as it is."""
    if of == "N":
        return f"{figures(value / 1e3)} kN"
    if of == "N mm":
        return f"{figures(value / 1e6)} kN m"
    return f"{figures(value)} {unit(of)}".rstrip()


def _explained(rule: Rule, place: int) -> _Explained:
    lines = explain(rule, (0, place))
    count = sum("note" in entry.metadata for entry in fields(rule))
    return _Explained(lines[:count], lines[count:])


def _common(rules: list[_Explained]) -> dict[str, Line]:
    """Return by symbol the given values that are the same in every rule and that no step makes."""
    found: dict[str, list[Line]] = defaultdict(list)
    for rule in rules:
        for line in rule.given:
            found[line.symbol].append(line)
    made = {line.symbol for rule in rules for line in rule.steps}
    return {
        name: lines[0]
        for name, lines in found.items()
        if name not in made and all((line.value, line.unit) == (lines[0].value, lines[0].unit) for line in lines)
    }


def _check(
    check: Check,
    place: int,
    rules: list[_Explained],
    common: dict[str, Line],
    printed: dict[_Explained, str],
    combination: Callable[[int], str],
    governs: str,
) -> CheckWork:
    known = {name: line.value for name, line in common.items()}
    demand = float(check.demand[0, place])
    seen = [rule for rule in rules if printed.setdefault(rule, check.name) != check.name]
    needed = {name for rule in rules if rule not in seen for name in _used(rule)}
    results = [(_decisive(rule, demand), printed[rule]) for rule in seen]
    taken = [(line, under) for line, under in results if line.symbol in needed or line.value == demand]
    known |= {line.symbol: line.value for line, _ in taken}
    works = [_rule(rule, known) for rule in rules if rule not in seen]
    at = int(check.combination[0, place])
    return CheckWork(
        check.name,
        check.clause,
        combination(at) if at >= 0 else "",
        tuple(Taken(_value(line), under) for line, under in taken),
        tuple(works),
        outcome(check, place),
        bool(check.ratio[0, place] <= 1.0),
        check.name == governs,
    )


def _used(rule: _Explained) -> set[str]:
    """Return the symbols that a rule's formulas use."""
    return {name for line in rule.steps if line.formula for name in symbols_in(line.formula)}


def _decisive(rule: _Explained, demand: float) -> Line:
    """Return the line of a rule that is a check's demand, or else its result."""
    return next((line for line in reversed(rule.steps) if line.value == demand), rule.steps[-1])


def _rule(rule: _Explained, known: dict[str, float]) -> RuleWork:
    """Work one rule; `known`, the values printed in this check so far, grows by its own."""
    needed = _used(rule)
    fresh = tuple(line for line in rule.given if line.symbol in needed and known.get(line.symbol) != line.value)
    known |= {line.symbol: line.value for line in fresh}
    steps = []
    for line in rule.steps:
        steps.append(_step(line, known))
        known[line.symbol] = line.value
    return RuleWork(tuple(_value(line) for line in fresh), tuple(steps))


def _value(line: Line) -> Value:
    return Value(
        line.symbol,
        figures(line.value),
        symbol(line.symbol),
        number(line.value),
        unit(line.unit),
        line.meaning,
        line.clause,
    )


def _step(line: Line, known: dict[str, float]) -> Step:
    value = _value(line)
    if not line.formula:
        return Step(value)
    formula, numbers = with_symbols(line.formula), with_numbers(line.formula, known)
    wide = signs(numbers) > WIDEST
    if wide:
        numbers = with_numbers(line.formula, known, flat=True)
    return Step(
        value,
        line.formula,
        "" if _on_one_line(formula) == value.symbol else formula,
        "" if numbers == value.shown else numbers,
        wide,
        reasons(line.formula, known),
    )


def _on_one_line(formula: str) -> str:
    """Return a plain quotient as it stands in a symbol such as KL/r, which is its own formula."""
    return formula.replace("frac(", "(").replace(", ", " slash ")
