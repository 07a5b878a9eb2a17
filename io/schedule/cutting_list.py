"""The cutting list and the stock it takes."""

from __future__ import annotations

from spanwright.design.nesting import Nest, Pattern, nest
from spanwright.design.result import Design
from spanwright.io.schedule.table import Cell, Column, Table, table

CUTTING_COLUMNS = (
    Column("Section", 18),
    Column("Grade", 10),
    Column("Bars cut alike", 9, 0, summed=True),
    Column("From each bar, longest first: number x mark (cut length, mm)", 90),
    Column("Left of each, mm", 10, 0),
)

STOCK_COLUMNS = (
    Column("Section", 18),
    Column("Grade", 10),
    Column("Stock length, mm", 10, 0),
    Column("Bars", 8, 0, summed=True),
    Column("Used, %", 8, 0),
    Column("Too long for a bar: not counted, to be spliced first", 80),
)


def cutting_table(design: Design) -> Table:
    """Return how the stock bars are cut, one row a pattern."""
    rows = [
        (kind.section, kind.grade, pattern.bars, _parts(pattern), pattern.left)
        for kind in _nests(design)
        for pattern in kind.patterns
    ]
    return table("Cutting", "Cutting list", CUTTING_COLUMNS, rows)


def stock_table(design: Design) -> Table:
    """Return the stock bars needed, one row a section and grade."""
    rows: list[tuple[Cell, ...]] = [
        (kind.section, kind.grade, kind.stock_length, kind.bars, 100.0 * kind.used, _too_long(kind))
        for kind in _nests(design)
    ]
    return table("Stock", "Stock bars needed", STOCK_COLUMNS, rows)


def _nests(design: Design) -> tuple[Nest, ...]:
    return nest(design.pieces, design.setting.project.members.stock_length)


def _parts(pattern: Pattern) -> str:
    return ", ".join(f"{number} x {piece.mark} ({piece.cut_length:.0f})" for piece, number in pattern.parts)


def _too_long(kind: Nest) -> str:
    return ", ".join(f"{piece.quantity} x {piece.mark} ({piece.cut_length:.0f})" for piece in kind.too_long)
