"""The tables of the sheet: parts, members, restraint, bearings. Every figure is the one of the other outputs."""

from __future__ import annotations

from typing import Any

from spanwright.design.name_ranges import in_ranges
from spanwright.design.result import Design
from spanwright.io.drawing.tables import Table
from spanwright.io.results.members import members
from spanwright.io.schedule.parts import parts_table
from spanwright.io.text import kilonewtons
from spanwright.truss.purlins import PurlinLine

NONE = "-"

PARTS = (
    ("mark", "Mark"),
    ("per_truss", "Per truss"),
    ("quantity", "Total"),
    ("section", "Section"),
    ("grade", "Grade"),
    ("cut_length_mm", "Cut length, mm"),
    ("mass_each_kg", "Mass each, kg"),
    ("mass_total_kg", "Mass total, kg"),
    ("end_1", "End 1"),
    ("end_2", "End 2"),
    ("bars", "Members"),
)
"""Columns of the parts list that the drawing shows: key in the schedule, heading."""


def parts(design: Design) -> Table:
    """Return the parts list, remarks as numbered sentences below it."""
    listed = parts_table(design)
    at = {column.key: place for place, column in enumerate(listed.columns)}
    numbers: dict[str, int] = {}
    rows = []
    for row, piece in zip(listed.rows, design.pieces, strict=True):
        cells = [_cell(row[at[key]], listed.columns[at[key]].decimals) for key, _ in PARTS]
        notes = [str(numbers.setdefault(remark, len(numbers) + 1)) for remark in piece.remarks]
        rows.append((*cells, ", ".join(notes)))
    right = frozenset(place for place, (key, _) in enumerate(PARTS) if listed.columns[at[key]].decimals is not None)
    sentences = tuple(f"{number})  {text}" for text, number in numbers.items())
    return Table("PARTS LIST", (*(head for _, head in PARTS), "Notes"), tuple(rows), right, sentences)


def _cell(value: str | float | None, decimals: int | None) -> str:
    if value is None:
        return ""
    return value if isinstance(value, str) else f"{value:.{decimals or 0}f}"


def member_schedule(design: Design) -> Table:
    """Return the members, those alike in one row: mark, section, length joint to joint, greatest forces."""
    marks = {
        bar: piece.mark
        for piece in reversed(design.pieces)
        for bar in piece.bars
        if piece.description != "packing plate"
    }
    alike: dict[tuple[str, ...], list[str]] = {}
    for member in members(design):
        key = (
            marks[member["bar"]].rstrip("LR"),
            member["section"].split(",")[0],
            f"{member['length_mm']:.0f}",
            _force(member["tension"]),
            _force(member["compression"]),
        )
        alike.setdefault(key, []).append(member["bar"])
    rows = tuple((in_ranges(bars), *key) for key, bars in alike.items())
    heads = ("Members", "Mark", "Section", "Length c/c, mm", "Greatest tension, kN", "Greatest compression, kN")
    return Table("MEMBER SCHEDULE", heads, rows, frozenset({3, 4, 5}), ("Factored forces, tension +, compression -.",))


def _force(extreme: dict[str, Any]) -> str:
    force = round(extreme["max_N"] / 1e3, 1)
    return f"{force:+.1f}" if force else NONE


def restraint_table(design: Design) -> Table:
    """Return everything that holds the chords sideways, where, and the force it must resist; and what holds nothing."""
    setting = design.setting
    restraint = setting.restraint
    forces = {force.part: force for force in design.restraint_forces}
    chords: dict[str, list[str]] = {}
    for name, points in design.held.items():
        for held in points:
            chords.setdefault(held.part, []).append(name)
    why = {brace.name: brace.why_not for brace in restraint.braces}
    why |= {tie.name: tie.why_not for tie in restraint.ties}
    xy = setting.truss.xy
    places = [(line.name, _at(design, line), line.x) for line in restraint.lines]
    places += [(f"{brace.name}", brace.at, float(xy[brace.joint, 0])) for brace in restraint.braces]
    places += [(tie.name, tie.at, float(xy[tie.joint, 0])) for tie in restraint.ties]
    places += [(bearing.name, bearing.at, float(xy[bearing.joint, 0])) for bearing in restraint.bearings]
    to_line = {brace.name: f" to line {brace.line}" for brace in restraint.braces}
    start = float(xy[setting.truss.bearing_joints[0], 0])
    rows = tuple(
        (
            f"{name}{to_line.get(name, '')}",
            at,
            f"{x - start:.0f}",
            _chords(chords.get(name, [])),
            f"{forces[name].force / 1e3:.1f}" if name in forces else NONE,
        )
        for name, at, x in places
    )
    standard, project = setting.standard, setting.project
    remarks: tuple[str, ...] = (
        f"Lines are anchored by {project.restraint.anchored_by}. Forces act to either side: "
        f"{standard.restraint_share:.1%} of the greatest compression beside them ({standard.restraint_clause}). The "
        f"anchor takes {kilonewtons(design.anchor_force)} from {project.quantity} trusses together.",
    )
    loose = "; ".join(f"{name}: {reason}" for name, reason in why.items() if reason)
    if loose:
        remarks = (*remarks, f"What holds nothing: {loose}.")
    heads = ("Restraint", "At", "x from left bearing, mm", "Holds", "Force, kN")
    return Table("RESTRAINT", heads, rows, frozenset({2, 4}), remarks)


def _chords(names: list[str]) -> str:
    return "both chords" if len(names) > 1 else f"{names[0]} chord" if names else "nothing"


def _at(design: Design, line: PurlinLine) -> str:
    names = design.setting.truss.joint_names
    if line.joint is not None:
        return names[line.joint]
    if line.bar is not None:
        return design.setting.truss.bar_names[line.bar]
    return "overhang"


def bearing_table(design: Design) -> Table:
    """Return the greatest forces on the bearings."""
    found: dict[tuple[str, str], dict[bool, str]] = {}
    for force in design.bearing_forces:
        value = f"{force.value / 1e3:.1f}" if round(force.value / 1e3, 1) else NONE
        found.setdefault((force.joint, force.direction), {})[force.factored] = value
    rows = tuple((joint, direction, both[True], both[False]) for (joint, direction), both in found.items())
    heads = ("Bearing", "Direction", "Factored, kN", "Characteristic, kN")
    return Table("FORCES ON BEARINGS", heads, rows, frozenset({2, 3}))
