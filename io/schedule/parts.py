"""The parts list: one row a mark."""

from __future__ import annotations

from spanwright.design.name_ranges import in_ranges
from spanwright.design.result import Design
from spanwright.io.schedule.table import Column, Table, table

COLUMNS = (
    Column("Truss", 8, key="truss"),
    Column("Mark", 11, key="mark"),
    Column("Hand", 6, key="hand"),
    Column("Per truss", 6, 0, key="per_truss"),
    Column("Trusses", 8, 0, key="trusses"),
    Column("Total", 7, 0, summed=True, key="quantity"),
    Column("Description", 14, key="description"),
    Column("Section", 16, key="section"),
    Column("Grade", 9, key="grade"),
    Column("Cut length, mm", 8, 0, key="cut_length_mm"),
    Column("Mass each, kg", 8, 2, key="mass_each_kg"),
    Column("Mass total, kg", 9, 1, summed=True, key="mass_total_kg"),
    Column("Paint area total, m2", 9, 2, summed=True, key="paint_area_total_m2"),
    Column("End 1", 13, key="end_1"),
    Column("End 2", 19, key="end_2"),
    Column("Bars", 16, key="bars"),
    Column("Remarks", 38, key="remarks"),
)


def parts_table(design: Design) -> Table:
    """Return the parts list of all trusses of a passing design, chords, posts, diagonals, packs."""
    rows = [
        (
            design.setting.project.mark,
            piece.mark,
            piece.hand,
            piece.per_truss,
            design.setting.project.quantity,
            piece.quantity,
            piece.description,
            piece.section,
            piece.grade,
            piece.cut_length,
            piece.mass,
            piece.total_mass,
            piece.total_paint_area,
            piece.ends[0],
            piece.ends[1],
            in_ranges(piece.bars),
            "; ".join(piece.remarks),
        )
        for piece in design.pieces
    ]
    return table("Parts", "Parts list", COLUMNS, rows)
