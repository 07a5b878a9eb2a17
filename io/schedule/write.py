"""Writes schedule.csv and schedule.xlsx."""

from __future__ import annotations

from pathlib import Path

from spanwright.design.cautions import SHORT_CAUTION
from spanwright.design.result import Design
from spanwright.io.files import input_hash, write_atomically
from spanwright.io.schedule.comma_separated import comma_separated
from spanwright.io.schedule.cutting_list import cutting_table, stock_table
from spanwright.io.schedule.members import members_table
from spanwright.io.schedule.notes import ESTIMATE, notes_table
from spanwright.io.schedule.parts import parts_table
from spanwright.io.schedule.workbook import Headings, workbook


def write_schedules(design: Design, folder: Path) -> None:
    """Write the schedules of a passing design into a folder that exists; OutputError where that cannot be done."""
    project = design.setting.project
    mark_of_input = input_hash(project.source)
    parts = parts_table(design)
    others = (cutting_table(design), stock_table(design), members_table(design), notes_table(design))
    headings = Headings(
        truss=f"{project.mark}, {project.quantity} off, {project.title}",
        status=ESTIMATE,
        caution=SHORT_CAUTION,
        origin=f"From {project.source_name}, input {mark_of_input}",
    )
    text = comma_separated(parts, f"{ESTIMATE}. {SHORT_CAUTION}", mark_of_input)
    write_atomically(folder / "schedule.csv", text.encode())
    write_atomically(folder / "schedule.xlsx", workbook((parts, *others), headings))
