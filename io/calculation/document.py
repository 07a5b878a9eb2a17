"""calculation.pdf, put together from its parts."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import asdict, replace
from pathlib import Path
from typing import Any

from spanwright import __version__
from spanwright.design.cautions import SHORT_CAUTION
from spanwright.design.result import Design
from spanwright.io.calculation.actions import combinations, reactions
from spanwright.io.calculation.basis import IN_WORKING, assumptions, basis, summary
from spanwright.io.calculation.behaviour import deflection
from spanwright.io.calculation.blocks import MemberWork, Paragraph, Points, Section, Table
from spanwright.io.calculation.figures import points_aligned
from spanwright.io.calculation.forces import bar_forces, chord_bending, lengths
from spanwright.io.calculation.geometry import geometry
from spanwright.io.calculation.holding import restraint
from spanwright.io.calculation.loads import loads
from spanwright.io.calculation.members import all_members, packs, worked_members
from spanwright.io.calculation.pictures import pictures
from spanwright.io.calculation.review import checks_by_hand, for_the_hand
from spanwright.io.calculation.titles import plain_block, title_block
from spanwright.io.calculation.typesetting import typeset
from spanwright.io.files import input_hash, make_folder, write_atomically

NAME = "calculation.pdf"
COMPRESSION_ONLY = (
    "In plane and out of plane name the direction in which the member bows. One factored compression, no moment."
)


def write_calculation(design: Design, folder: Path, *, every_member: bool = False, date: str = "") -> Path:
    """Write calculation.pdf into a folder and return its path; OutputError where that cannot be done.

    every_member : work all members in full, not only the one that governs each group.
    date : of the document, where the project file states none; "" leaves it for signature.

    Pictures that the same input left in the folder are embedded. The same design and date give the same bytes.
    """
    make_folder(folder)
    path = folder / NAME
    write_atomically(path, typeset(document(design, folder, every_member=every_member, date=date)))
    return path


def document(
    design: Design, folder: Path | None = None, *, every_member: bool = False, date: str = ""
) -> dict[str, Any]:
    """Return the data of the whole document, as the template takes it."""
    project = design.setting.project
    sections = (
        summary(design),
        basis(design),
        assumptions(design),
        geometry(design),
        restraint(design),
        loads(design),
        combinations(design),
        reactions(design),
        bar_forces(design),
        lengths(design),
        Section(
            "Members", (Paragraph("For each group the member that governs is worked in full; a table of all follows."),)
        ),
        *worked_members(design, every=every_member),
        all_members(design),
        packs(design),
        chord_bending(design),
        deflection(design),
        checks_by_hand(design),
        Section("Warnings", (Points(design.warnings),) if design.warnings else (Paragraph("None."),)),
        for_the_hand(design),
        *pictures(design, folder),
    )
    return _page_data(
        sections,
        title_block(project, date),
        passes=design.passes,
        foot=f"Spanwright {__version__}, input {input_hash(project.source)}",
        contents=True,
    )


def write_worked_member(path: Path, title: str, member: MemberWork) -> Path:
    """Write one member worked in full as a PDF and return its path; OutputError where that cannot be done."""
    sections = (Section("Member check", (member, Paragraph(f"{COMPRESSION_ONLY} {IN_WORKING}", small=True))),)
    passes = all(check.passes for check in member.checks)
    data = _page_data(sections, plain_block(title), passes=passes, foot=f"Spanwright {__version__}", contents=False)
    make_folder(path.parent)
    write_atomically(path, typeset(data))
    return path


def _page_data(
    sections: Iterable[Section], block: dict[str, Any], *, passes: bool, foot: str, contents: bool
) -> dict[str, Any]:
    return {
        "block": block,
        "passes": passes,
        "foot": foot,
        "caution": SHORT_CAUTION,
        "contents": contents,
        "sections": [asdict(_aligned(section)) for section in sections],
    }


def _aligned(section: Section) -> Section:
    """Return a section whose tables have their numbers aligned on the decimal point."""
    return replace(
        section, blocks=tuple(_points_aligned(block) if isinstance(block, Table) else block for block in section.blocks)
    )


def _points_aligned(table: Table) -> Table:
    columns = list(zip(*table.rows, strict=True))
    ready = [
        points_aligned(cells) if column.align == "right" else cells
        for column, cells in zip(table.columns, columns, strict=False)
    ]
    return replace(table, rows=tuple(zip(*ready, strict=True)))
