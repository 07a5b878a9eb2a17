"""Combinations, and what reaches the bearings."""

from __future__ import annotations

from spanwright.design.result import Design
from spanwright.io.calculation.blocks import Block, Column, Paragraph, Section, Table
from spanwright.io.calculation.figures import NONE, kilo
from spanwright.io.calculation.loads import steps_of
from spanwright.io.calculation.naming import case_labels, labels
from spanwright.loads.combinations import combination_factors
from spanwright.truss.stiffness import reaction_sums

LONGEST_NAME = 60
"""Signs of a combination's name that fit into the table; with longer ones it takes the numbers of the cases."""

STATES = {
    "STR": "strength of members",
    "STR-P": "strength, permanent load leading",
    "EQU": "holding down, reactions only",
    "SLS": "total deflection",
    "SLS variable": "deflection of the variable actions alone",
    "SLS quasi-permanent": "what lasts",
}


def combinations(design: Design) -> Section:
    """Return the combinations with their numbers, by which every other table names them."""
    first = len(design.analysis.combinations) // len(design.analysis.arrangements)
    listed = list(zip(design.analysis.combinations, labels(design).values(), strict=True))
    brief = max(len(combination.name) for combination, _ in listed[:first]) > LONGEST_NAME
    cases = case_labels(design)
    rows = tuple(
        (
            label,
            combination.limit_state,
            " + ".join(f"{factor:g} {cases[name]}" for name, factor in combination.factors)
            if brief
            else combination.name,
        )
        for combination, label in listed[:first]
    )
    columns = (
        Column("no.", align="left"),
        Column("state", align="left"),
        Column("combination", align="left", share=1.0),
    )
    states = {combination.limit_state for combination in design.analysis.combinations}
    note = " ".join(f"{state}: {meaning}." for state, meaning in STATES.items() if state in states)
    later = [
        Paragraph(f"C{at * first + 1} to C{(at + 1) * first} are the same in this order{reading.suffix}.")
        for at, reading in enumerate(design.analysis.arrangements)
        if at
    ]
    if brief:
        note += " L1 and so on: the load cases by their numbers under Loads; elsewhere a combination has their names."
    blocks: list[Block] = [Table(columns, rows, note=note, dense=True, side_by_side=3 if brief else 2), *later]
    project = design.setting.project
    factors = combination_factors(project.actions, project.site)
    if factors:
        blocks += [Paragraph("Factors that the site or the nation sets:"), steps_of(factors)]
    return Section("Combinations", tuple(blocks))


def reactions(design: Design) -> Section:
    """Return the reactions of each case against its load, and the greatest forces on the bearings."""
    return Section("Reactions", (_by_case(design), *_greatest(design)))


def _by_case(design: Design) -> Table:
    truss, solution = design.setting.truss, design.analysis.solutions[0]
    sums = reaction_sums(solution, design.analysis.loads)
    bearings, numbered = truss.bearing_joints, case_labels(design)
    columns = [Column("case", align="left", share=1.0), Column("load right", "kN"), Column("load up", "kN")]
    for joint in bearings:
        columns += [Column(f"{truss.joint_names[joint]} right", "kN"), Column(f"{truss.joint_names[joint]} up", "kN")]
    columns += [Column("sum right", "kN"), Column("sum up", "kN")]
    rows = []
    for at, case in enumerate(design.analysis.cases):
        shares = [kilo(float(solution.reactions[joint, axis, at]), 2) for joint in bearings for axis in (0, 1)]
        load = sums.loads[:, at]
        left = load + sums.reactions[:, at]
        rows.append(
            (
                f"{numbered[case.name]} {case.name}",
                *(kilo(float(v), 2) for v in load),
                *shares,
                *(kilo(float(v), 2) for v in left),
            )
        )
    stated = "" if len(design.analysis.arrangements) == 1 else ", with the supports as stated"
    note = f"Unfactored{stated}. A sum is load and reactions together, and must be zero."
    return Table(tuple(columns), tuple(rows), title="By load case", note=note, dense=True)


def _greatest(design: Design) -> tuple[Table, ...]:
    numbered = labels(design)
    tables = []
    for factored, title in ((True, "Greatest, factored"), (False, "Greatest, characteristic (every factor 1.0)")):
        rows = [
            (
                force.joint,
                force.direction,
                kilo(force.value, 2),
                kilo(force.right, 2) if force.value else NONE,
                kilo(force.down, 2) if force.value else NONE,
                f"{numbered[force.combination]}: {force.combination}"
                if factored and force.value
                else force.combination or NONE,
            )
            for force in design.bearing_forces
            if force.factored == factored
        ]
        columns = (
            Column("bearing", align="left"),
            Column("direction", align="left"),
            Column("greatest", "kN"),
            Column("right", "kN"),
            Column("down", "kN"),
            Column("combination" if factored else "cases", align="left", share=1.0),
        )
        note = (
            "" if factored else "Right and down: both components of the force of the truss on the bearing at that time."
        )
        tables.append(Table(columns, tuple(rows), title=f"{title}: the truss on its bearings", note=note))
    return tuple(tables)
