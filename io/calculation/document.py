"""calculation.pdf, put together from its parts."""

from __future__ import annotations

from dataclasses import asdict
from pathlib import Path
from typing import Any

from spanwright import __version__
from spanwright.design.cautions import SHORT_CAUTION
from spanwright.design.result import Design
from spanwright.io.calculation.actions import combinations, loads, reactions
from spanwright.io.calculation.basis import assumptions, basis, summary
from spanwright.io.calculation.behaviour import deflection
from spanwright.io.calculation.blocks import Paragraph, Points, Section
from spanwright.io.calculation.forces import bar_forces, chord_bending, lengths
from spanwright.io.calculation.geometry import geometry
from spanwright.io.calculation.holding import restraint
from spanwright.io.calculation.members import all_members, packs, worked_members
from spanwright.io.calculation.titles import title_block
from spanwright.io.calculation.typesetting import typeset
from spanwright.io.files import input_hash, make_folder, write_atomically

NAME = "calculation.pdf"


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


def document(design: Design, folder: Path | None = None, *, every_member: bool = False, date: str = "") -> dict[str, Any]:
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
        Section("Members", (Paragraph("For each group the member that governs is worked in full; a table of all follows."),)),
        *worked_members(design, every=every_member),
        all_members(design),
        packs(design),
        chord_bending(design),
        deflection(design),
        Section("Warnings", (Points(design.warnings),) if design.warnings else (Paragraph("None."),)),
    )
    return {
        "title": project.title,
        "mark": project.mark,
        "passes": design.passes,
        "foot": f"Spanwright {__version__}, input {input_hash(project.source)}",
        "caution": SHORT_CAUTION,
        "block": title_block(project, date),
        "sections": [asdict(section) for section in sections],
    }
