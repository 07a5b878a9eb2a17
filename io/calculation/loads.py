"""Loads: how the site became pressures, how each case came about, and what every purlin line brings in each case.

What the lines of a derivation say of purlin lines goes into tables, a column a case; the first case keeps its lines,
which show what each purlin line carries and to which joints it goes.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterable, Iterator

from spanwright.design.result import Design
from spanwright.io.calculation.blocks import (
    Column,
    Derivation,
    Derivations,
    Paragraph,
    Row,
    Section,
    Step,
    Steps,
    Table,
    Value,
)
from spanwright.io.calculation.figures import NONE, fixed
from spanwright.io.calculation.mathematics import evaluate, number, reasons, symbols_in, with_numbers, with_symbols
from spanwright.io.calculation.naming import case_labels
from spanwright.io.calculation.symbols import symbol, unit
from spanwright.io.text import figures
from spanwright.loads.cases import Case
from spanwright.loads.intermediate import Intermediate

_PURLIN = re.compile(r"purlin line (\d+) at x .+?: (.+? kN.*?), (?:to |shared )")
_PART = re.compile(r"([\d.]+) kN (up|down|to the left|to the right)")
_SIGNS = {"up": (1, 1.0), "down": (1, -1.0), "to the right": (0, 1.0), "to the left": (0, -1.0)}

CASES_ACROSS = 6
"""Cases side by side in a table of purlin loads."""

ALWAYS_TOLD = ("in all", "top chord")
"""How lines begin that every case repeats: its sum, and how it bends the chord."""

Push = tuple[float, float]
"""kN to the right and up."""


def loads(design: Design) -> Section:
    """Return the steps from the site, every load case with its derivation, and the purlin loads by case."""
    cases, numbered = design.analysis.cases, case_labels(design)
    pushes = {case.name: _pushes(case) for case in cases}
    shown = {str(value) for value in _site(design)}
    first: dict[str, str] = {}
    entries = []
    for at, case in enumerate(cases):
        tabled = at > 0 and bool(pushes[case.name])
        lines = [line for line in case.derivation if line not in shown and not (tabled and _PURLIN.match(line))]
        label = numbered[case.name]
        entries.append(Derivation(f"{label} {case.name}", case.kind, tuple(_told_once(lines, label, first))))
    about = Paragraph(
        'Unfactored. "most" and "least" are the greatest and the least credible permanent load; a man takes the place '
        "of the imposed load. Each purlin line carries half-way to its neighbours, the outer ones from the roof's "
        f"edge; {numbered[cases[0].name]} lists what that is and to which joints it goes, the tables below the loads "
        "of every other case."
    )
    columns = [(numbered[case.name], pushes[case.name]) for case in cases[1:] if pushes[case.name]]
    return Section("Loads", (*_from_site(design), about, Derivations(tuple(entries)), *_tables(columns)))


def _told_once(lines: list[str], label: str, first: dict[str, str]) -> Iterator[str]:
    """Yield the lines of a case, those that an earlier case has as one that names them and it; `first` grows."""
    repeated: dict[str, list[str]] = {}
    for line in lines:
        if line in first and not line.startswith(ALWAYS_TOLD):
            repeated.setdefault(first[line], []).append(line.split(":")[0])
        else:
            yield line
    for earlier, heads in repeated.items():
        yield f"as under {earlier}: {'; '.join(heads)}"
    first |= {line: label for line in lines if line not in first}


def steps_of(values: Iterable[Intermediate]) -> Steps:
    """Return values on the way as steps: their formulas with numbers put in, where they are formulas."""
    known: dict[str, float] = {}
    steps = []
    for value in values:
        steps.append(_step(value, known))
        known[value.symbol] = value.value
    return Steps(tuple(steps))


def _site(design: Design) -> tuple[Intermediate, ...]:
    site = design.setting.load_set.site
    return site.steps if site is not None else ()


def _from_site(design: Design) -> tuple[Paragraph | Steps, ...]:
    site = design.setting.load_set.site
    if site is None or not site.steps:
        return ()
    left, right = (fixed(edge / 1e3, 3) for edge in site.strip)
    about = Paragraph(
        f"From the site, by {site.standard}. The truss stands {fixed(site.position / 1e3, 3)} m from the near gable "
        f"and carries the strip of roof from {left} m to {right} m. Beside each clause stands where the value comes "
        "from."
    )
    return about, steps_of(site.steps)


def _step(step: Intermediate, known: dict[str, float]) -> Step:
    source = ", ".join(part for part in (step.clause, step.mark) if part)
    words = step.meaning
    formula = numbers = ""
    why: tuple[str, ...] = ()
    if _is_formula(step.formula, known):
        formula, numbers = with_symbols(step.formula), with_numbers(step.formula, known)
        why = reasons(step.formula, known)
    elif step.formula:
        words = f"{words}: {step.formula}"
    value = Value(
        step.symbol, figures(step.value), symbol(step.symbol), number(step.value), unit(step.unit), words, source
    )
    return Step(value, step.formula if formula else "", formula, "" if numbers == value.shown else numbers, reasons=why)


def _is_formula(text: str, known: dict[str, float]) -> bool:
    """Return whether a text is a formula over values that are known; some are rules in words."""
    try:
        names = symbols_in(text)
        return bool(text) and set(names) <= known.keys() and math.isfinite(evaluate(text, known))
    except (SyntaxError, TypeError, NameError):
        return False


def _pushes(case: Case) -> dict[int, Push]:
    """Return what each purlin line, by its number, brings to the truss in a case: kN to the right and up."""
    found: dict[int, Push] = {}
    for line in case.derivation:
        match = _PURLIN.match(line)
        if match is None:
            continue
        push = [0.0, 0.0]
        for size, direction in _PART.findall(match[2]):
            axis, sign = _SIGNS[direction]
            push[axis] += sign * float(size)
        found[int(match[1])] = (push[0], push[1])
    return found


def _tables(cases: list[tuple[str, dict[int, Push]]]) -> Iterator[Table]:
    """Yield tables of purlin loads, a few cases each; a case without sideways loads has one column."""
    for start in range(0, len(cases), CASES_ACROSS):
        some = cases[start : start + CASES_ACROSS]
        lines = sorted({number for _, pushes in some for number in pushes})
        columns = [Column("line")]
        for label, pushes in some:
            columns.append(Column(f"{label} up", "kN"))
            if _pushes_sideways(pushes):
                columns.append(Column(f"{label} right", "kN"))
        rows = tuple(_row(number, some) for number in lines)
        yield Table(tuple(columns), rows, title="Loads of the purlin lines" if start == 0 else "", dense=True)


def _pushes_sideways(pushes: dict[int, Push]) -> bool:
    return any(right for right, _ in pushes.values())


def _row(line: int, cases: list[tuple[str, dict[int, Push]]]) -> Row:
    cells = [str(line)]
    for _, pushes in cases:
        right, up = pushes.get(line, (math.nan, math.nan))
        cells.append(fixed(up, 3) if line in pushes else NONE)
        if _pushes_sideways(pushes):
            cells.append(fixed(right, 3) if line in pushes else NONE)
    return tuple(cells)
