"""One member worked in full on the screen: every intermediate value of every check, from the arrays that decided."""

from __future__ import annotations

from rich.console import Console
from rich.table import Table
from rich.text import Text

from spanwright.design.standard import Check
from spanwright.design.steps import Line, explain
from spanwright.io.text import figures, rounded_up

_FIRST = (0, 0)


def print_worked(console: Console, checks: tuple[Check, ...]) -> None:
    """Print the checks of one section for one member: each rule once, with its inputs and steps, and each result.

    Checks that do not arise (ratio 0) are named in one line.
    """
    printed: dict[tuple[Line, ...], str] = {}
    for check in checks:
        if check.ratio[_FIRST] == 0:
            continue
        console.print(Text(f"\n{check.name}, {check.clause}", style="bold"))
        table = _table()
        for rule in check.rules:
            lines = explain(rule, _FIRST)
            if printed.setdefault(lines, check.name) != check.name:
                console.print(Text(f"{lines[-1].symbol} = {figures(lines[-1].value)}: see {printed[lines]}"))
                continue
            if table.row_count:
                table.add_row()
            for line in lines:
                table.add_row(*(Text(cell) for cell in _cells(line)))
        if table.row_count:
            console.print(table)
        console.print(Text(result(check)))
    idle = [check.name for check in checks if check.ratio[_FIRST] == 0]
    if idle:
        console.print(Text(f"\nDoes not arise here: {'; '.join(idle)}."))


def result(check: Check) -> str:
    """Return effect, resistance, utilisation and verdict of the check of one section for one member."""
    effect, resistance, ratio = (float(part[_FIRST]) for part in (check.demand, check.resistance, check.ratio))
    unit = "" if check.unit == "-" else f" {check.unit}"
    verdict = "passes" if ratio <= 1 else "FAILS"
    return f"{figures(effect)}{unit} of {figures(resistance)}{unit}: {rounded_up(ratio)}, {verdict}"


def _table() -> Table:
    table = Table(box=None, pad_edge=False, show_header=False)
    for justify in ("left", "right", "left", "left", "left"):
        table.add_column(justify=justify)
    return table


def _cells(line: Line) -> tuple[str, str, str, str, str]:
    meaning = f"{line.meaning}\n  = {line.formula}" if line.formula else line.meaning
    unit = "" if line.unit == "-" else line.unit
    return line.symbol, figures(line.value), unit, line.clause, meaning
