"""Restraint: what holds the chords sideways, the path of its forces, and what this roof cannot lose."""

from __future__ import annotations

import networkx as nx

from spanwright.design.result import Design
from spanwright.io.calculation.blocks import Column, Mark, Paragraph, Section, Sketch, Stroke, Table
from spanwright.io.calculation.figures import NONE, kilo
from spanwright.io.calculation.geometry import framed, strokes
from spanwright.io.text import rounded_up
from spanwright.truss.restraint import ANCHOR, Restraint

SIGNS = {
    "counted": "Filled square: purlin line that counts",
    "open": "Open square: purlin line or bottom tie that does not count",
    "brace": "Open circle: foot of a knee brace, where it holds the bottom chord",
    "brace line": "Dashed: knee brace up to its purlin line",
    "loose line": "Dotted: knee brace that does not count",
    "tie": "Diamond: bottom tie",
    "bearing": "Bar: bearing held sideways",
}
"""Signs of the drawing and what they mean."""


def restraint(design: Design) -> Section:
    """Return the restraint drawing, the purlin lines, the forces with their paths, and what cannot be lost."""
    given = design.setting.project.restraint
    standard = design.setting.standard
    total = Paragraph(
        f"Each point restraint must resist {standard.restraint_share:g} of the greatest compression in the chord "
        f"beside it, to either side (cl. {standard.restraint_clause}). Summed over the lines, braces and ties of all "
        f"{design.setting.project.quantity} trusses, {kilo(design.anchor_force)} kN reach the anchor "
        f"({given.anchored_by}) in {design.anchor_combination}; bearings have ties of their own. This is the plain "
        f"sum, the safe reading. Where parallel trusses may share less, by the same clause (from memory): "
        f"{kilo(design.anchor_force_relieved)} kN."
    )
    return Section(
        "Restraint",
        (_drawing(design), _lines(design), total, _forces(design), _missing(design)),
    )


def _drawing(design: Design) -> Sketch:
    setting = design.setting
    truss = setting.truss
    forces = {force.part: force.force for force in design.restraint_forces}

    def label(part: str) -> str:
        return kilo(forces[part]) if part in forces else ""

    marks = [
        Mark(
            "counted" if line.name in setting.restraint.counted else "open",
            line.x / 1e3,
            line.y / 1e3,
            label(line.name),
        )
        for line in setting.restraint.lines
    ]
    braces = []
    for brace in setting.restraint.braces:
        line = setting.restraint.line(brace.line)
        x, y = (float(value) / 1e3 for value in truss.xy[brace.joint])
        braces.append(Stroke("brace" if brace.counted else "loose", (x, y), (line.x / 1e3, line.y / 1e3)))
        marks.append(Mark("brace", x, y, label(brace.name)))
    for tie in setting.restraint.ties:
        x, y = (float(value) / 1e3 for value in truss.xy[tie.joint])
        marks.append(Mark("tie" if tie.counted else "open", x, y, label(tie.name)))
    for bearing in setting.restraint.bearings:
        x, y = (float(value) / 1e3 for value in truss.xy[bearing.joint])
        marks.append(Mark("bearing", x, y, label(bearing.name)))
    caption = _caption({mark.shape for mark in marks} | {f"{brace.style} line" for brace in braces})
    return framed(truss, (*strokes(truss, named=False), *braces), tuple(marks), (), (), caption)


def _caption(shown: set[str]) -> str:
    """Return what the drawing shows, with the signs that stand in it."""
    signs = ". ".join(words for sign, words in SIGNS.items() if sign in shown)
    return (
        f"What holds the chords sideways, with the force in kN that each must resist. {signs}. The forces run along "
        "purlins and ties, out of the paper, to the anchor."
    )


def _lines(design: Design) -> Table:
    setting = design.setting
    names = setting.truss.joint_names
    rows = tuple(
        (
            str(line.number),
            kilo(line.x, 3),
            kilo(line.along, 3),
            names[line.joint] if line.joint is not None else "between joints",
            "yes" if line.name in setting.restraint.counted else "no",
        )
        for line in setting.restraint.lines
    )
    columns = (
        Column("line"),
        Column("x", "m"),
        Column("along chord", "m"),
        Column("stands at", align="left"),
        Column("counts", align="left"),
    )
    return Table(columns, rows, title="Purlin lines", dense=True, side_by_side=2)


def _forces(design: Design) -> Table:
    anchored_by = design.setting.project.restraint.anchored_by
    rows = tuple(
        (
            force.part,
            force.at,
            kilo(force.force, 2),
            f"{force.stiffness:.0f}",
            path(design.setting.restraint, force.part, anchored_by),
        )
        for force in design.restraint_forces
    )
    columns = (
        Column("part", align="left"),
        Column("holds the chord at", align="left"),
        Column("force", "kN"),
        Column("stiffness required", "N/mm"),
        Column("path of the force", align="left", share=1.0),
    )
    return Table(columns, rows, title="Restraint forces and their path", dense=True)


def path(held: Restraint, part: str, anchored_by: str) -> str:
    """Return the parts that a restraint force passes on its way to the anchor, in words."""
    nodes = [node for node in held.graph if isinstance(node, str)]
    passed = nx.shortest_path(held.graph.subgraph(nodes), part, ANCHOR)
    end = "its own tie or strut" if part.startswith("bearing") else anchored_by
    return " to ".join([*(str(node) for node in passed if node != ANCHOR), end])


def _missing(design: Design) -> Table:
    rows = []
    for row in design.missing:
        if row.unheld:
            rows.append((row.part, f"nothing holds {', '.join(row.unheld)}", NONE, NONE))
        else:
            rows.append((row.part, row.bar, kilo(row.out_of_plane, 3), rounded_up(row.utilisation)))
    columns = (
        Column("without", align="left", share=1.0),
        Column("worst member", align="left", share=0.7),
        Column("out of plane", "m"),
        Column("greatest ratio"),
    )
    failing = tuple(at for at, row in enumerate(design.missing) if row.unheld or row.utilisation > 1.0)
    note = (
        "The sections are checked again with the lengths that remain; forces do not change. Bold: the roof fails "
        "without it."
    )
    return Table(columns, tuple(rows), title="What this roof cannot lose", note=note, bold=failing, dense=True)
