"""Members: the groups, one of each worked in full, and every check of all the others."""

from __future__ import annotations

from collections.abc import Iterator

from spanwright.design.connectors import connectors
from spanwright.design.result import Design
from spanwright.design.sizing import Choice
from spanwright.io.calculation.blocks import Column, MemberWork, Paragraph, Section, Table
from spanwright.io.calculation.figures import NONE, fixed, kilo
from spanwright.io.calculation.naming import labels
from spanwright.io.calculation.working import work
from spanwright.io.text import metres, rounded_up

FIRST_CHECK = 3
"""Columns before the checks in the table of all members."""


def worked_members(design: Design, *, every: bool) -> Iterator[Section]:
    """Yield a section a group: the member that governs it worked in full, or with `every` all of them."""
    for choice in design.choices:
        places = range(len(choice.group.bars)) if every else [_governing_place(design, choice)]
        works = tuple(worked(design, choice, place) for place in places)
        yield Section(f"Member checks: {choice.group.name}", works, level=2)


def _governing_place(design: Design, choice: Choice) -> int:
    found = design.governing_of(choice)
    return [design.setting.truss.bar_names[bar] for bar in choice.group.bars].index(found.bar)


def worked(design: Design, choice: Choice, place: int) -> MemberWork:
    """Return one member of a group worked in full."""
    truss, lengths = design.setting.truss, design.setting.lengths
    bar = int(choice.group.bars[place])
    numbered = labels(design)
    found = design.governing_of(choice, place)
    start, end = (truss.joint_names[joint] for joint in truss.ends[bar])
    sideways = " – ".join(lengths.out_of_plane_between[bar])
    about = (
        ("Section", choice.name),
        ("From, to", f"{start}, {end}; {metres(float(truss.lengths[bar]))} joint to joint"),
        ("In plane", f"{metres(float(lengths.in_plane[bar]))}, {' – '.join(lengths.in_plane_between[bar])}"),
        ("Out of plane", f"{metres(float(lengths.out_of_plane[bar]))}, {sideways}"),
    )

    def combination(at: int) -> str:
        name = design.strength_names[at]
        return f"{numbered[name]}: {name}"

    return work(f"{truss.bar_names[bar]}, {truss.roles[bar]}", about, choice.checks, place, combination, found.check)


def all_members(design: Design) -> Section:
    """Return for each group a table of every check of every member."""
    about = Paragraph(
        "Every check of every member, rounded up; checks are numbered below each table. Bold: the check that governs a "
        "member. Utilisation is the greatest of the strength checks; limits (slenderness, spacing of packs) pass or "
        "fail."
    )
    return Section("All members", (about, *(_matrix(design, choice) for choice in design.choices)), level=2)


def _matrix(design: Design, choice: Choice) -> Table:
    truss = design.setting.truss
    arising = [check for check in choice.checks if check.ratio.max() > 0.0]
    columns = (
        Column("bar", align="left"),
        Column("length", "m"),
        Column("use"),
        *(Column(str(number)) for number in range(1, len(arising) + 1)),
    )
    rows, strong = [], []
    for place, bar in enumerate(choice.group.bars):
        found = design.governing_of(choice, place).check
        strong += [(place, at) for at, check in enumerate(arising, FIRST_CHECK) if check.name == found]
        ratios = (float(check.ratio[0, place]) for check in arising)
        rows.append(
            (
                truss.bar_names[bar],
                kilo(float(truss.lengths[bar]), 3),
                rounded_up(float(design.utilisation[bar])),
                *(rounded_up(ratio) if ratio > 0.0 else NONE for ratio in ratios),
            )
        )
    named = "; ".join(
        f"{number} {check.name} ({check.clause})" + (", limit" if check.kind == "limit" else "")
        for number, check in enumerate(arising, 1)
    )
    return Table(
        columns,
        tuple(rows),
        title=f"{choice.group.name}: {choice.name}",
        note=f"{named}.",
        strong=tuple(strong),
        dense=True,
    )


def packs(design: Design) -> Section:
    """Return connectors and packing plates of the pairs."""
    rows = [
        (row.bar, kilo(row.panel, 3), str(row.count), fixed(row.spacing, 0))
        for choice in design.choices
        for row in connectors(design.setting.standard, design.demand, choice)
    ]
    if not rows:
        return Section("Connectors and packing plates", (Paragraph("No member is a pair of angles."),))
    stated = design.setting.project.members.packs
    fixing = "welded" if stated.factor < 1.0 else "bolted snug"
    about = Paragraph(
        f"At least {stated.per_panel} packs in each panel that sees compression, more where the rules ask; {fixing}, "
        f"which counts {stated.factor:g} times the slenderness of one angle between them. Their spacing is checked "
        "with each member."
    )
    columns = (Column("bar", align="left"), Column("panel", "m"), Column("packs"), Column("apart", "mm"))
    blocks: list[Paragraph | Table] = [about, Table(columns, tuple(rows), dense=True, side_by_side=3)]
    plates = [piece for piece in design.pieces if piece.description == "packing plate"]
    if plates:
        head = (
            Column("mark", align="left"),
            Column("plate", align="left"),
            Column("length", "mm"),
            Column("a truss"),
            Column("in all"),
            Column("mass each", "kg"),
            Column("remarks", align="left", share=1.0),
        )
        rows_of_plates = tuple(
            (
                piece.mark,
                piece.section,
                fixed(piece.cut_length, 0),
                str(piece.per_truss),
                str(piece.quantity),
                fixed(piece.mass, 2),
                "; ".join(piece.remarks),
            )
            for piece in plates
        )
        blocks.append(Table(head, rows_of_plates, title="Packing plates"))
    return Section("Connectors and packing plates", tuple(blocks))
