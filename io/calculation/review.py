"""For the checker: hand checks with pass or fail, and a page to redo three members with a pocket calculator."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from spanwright.design.hand_checks import Comparison, hand_checks
from spanwright.design.result import Design
from spanwright.design.sizing import Choice
from spanwright.design.standard import Check
from spanwright.io.calculation.blocks import Column, Paragraph, Section, Table, Task, Tasks
from spanwright.io.calculation.figures import fixed, kilo, mega
from spanwright.io.calculation.working import measured, values_given
from spanwright.io.text import metres, rounded_up
from spanwright.truss.tolerances import TOLERANCES

TASKS = 3
WORTH = 0.5
"""A check is taken in place of one that another task has, if its ratio is at least this share of the greatest."""


def checks_by_hand(design: Design) -> Section:
    """Return the hand checks with pass or fail."""
    found = hand_checks(design)
    rows = tuple((row.name, row.where, row.working, *_values(row), _verdict(row)) for row in found)
    columns = (
        Column("check", align="left", share=1.0),
        Column("of what, under what", align="left", share=1.0),
        Column("how the hand does it", align="left", share=1.6),
        Column("by hand"),
        Column("found"),
        Column("unit", align="left"),
        Column("verdict", align="left"),
    )
    failing = sum(row.exact and not row.passes for row in found)
    outside = sum(not row.exact and not row.passes for row in found)
    about = Paragraph(
        "Each value by hand is found without the analysis: by equilibrium of a part, closed forms, virtual work, "
        f"areas. {len(found)} checks, {failing} failing, {outside} outside a rule of thumb. Pass: both values are the "
        f"same but for rounding, to {TOLERANCES.by_hand:g} of the greater. A rule of thumb gives no exact value: its "
        "row shows under by hand what the rule says; within: the design keeps to it; OUTSIDE asks for a second look."
    )
    bold = tuple(at for at, row in enumerate(found) if not row.passes)
    return Section("Hand checks", (about, Table(columns, rows, dense=True, bold=bold)))


def _verdict(row: Comparison) -> str:
    if row.exact:
        return "pass" if row.passes else "FAIL"
    return "within" if row.passes else "OUTSIDE"


def _values(row: Comparison) -> tuple[str, str, str]:
    if row.unit == "N":
        return kilo(row.by_hand, 3), kilo(row.found, 3), "kN"
    if row.unit == "N mm":
        return mega(row.by_hand), mega(row.found), "kN m"
    decimals = 2 if row.unit == "mm" else 1
    return fixed(row.by_hand, decimals), fixed(row.found, decimals), {"kg/m2": "kg/m²", "-": ""}.get(row.unit, row.unit)


def for_the_hand(design: Design) -> Section:
    """Return a page with the inputs and results of three members, and room to work them."""
    about = Paragraph(
        "To redo with a pocket calculator and the printed standard. The working stands under Member checks, or is that "
        "of the clause named."
    )
    return Section("For the hand", (about, Tasks(tuple(_tasks(design)))), apart=True)


def _tasks(design: Design) -> Iterator[Task]:
    used: set[str] = set()
    ranked = sorted(design.choices, key=lambda choice: -float(design.utilisation[choice.group.bars].max()))
    for choice in ranked[:TASKS]:
        picked = _pick(choice, used)
        if picked is not None:
            check, place = picked
            used.add(check.name)
            yield _task(design, choice, check, place)


def _pick(choice: Choice, used: set[str]) -> tuple[Check, int] | None:
    """Return the check of a force against a resistance that is used most, preferring one that no other task has."""
    forces = [
        check for check in choice.checks if check.kind == "strength" and check.unit == "N" and check.ratio.max() > 0
    ]
    ranked = sorted(forces, key=lambda check: -float(check.ratio.max()))
    if not ranked:
        return None
    worth = WORTH * float(ranked[0].ratio.max())
    fresh = [check for check in ranked if check.name not in used and check.ratio.max() >= worth]
    check = (fresh or ranked)[0]
    return check, int(np.argmax(check.ratio[0]))


def _task(design: Design, choice: Choice, check: Check, place: int) -> Task:
    truss = design.setting.truss
    bar = int(choice.group.bars[place])
    length = metres(float(truss.lengths[bar]))
    member = f"{truss.bar_names[bar]}, {truss.roles[bar]}, {choice.name}, {length} joint to joint"
    return Task(
        f"{member}: {check.name} ({check.clause})",
        values_given(check, place),
        (
            ("factored effect", measured(float(check.demand[0, place]), check.unit)),
            ("factored resistance", measured(float(check.resistance[0, place]), check.unit)),
            ("utilisation", rounded_up(float(check.ratio[0, place]))),
        ),
    )
