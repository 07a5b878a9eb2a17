"""A table as every writer of schedules takes it: columns that know their unit, width and decimals, and rows."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

Cell = str | float | None


@dataclass(frozen=True)
class Column:
    """One column.

    head : with the unit. width : characters. decimals : of a number; None where the cells are text.
    summed : whether the last row adds it up. key : its name in CSV, with the unit; "" where there is no CSV.
    """

    head: str
    width: float
    decimals: int | None = None
    summed: bool = False
    key: str = ""


@dataclass(frozen=True)
class Table:
    """A sheet's table; None leaves a cell empty.

    rows : as long as the columns; numbers already rounded to their decimals, so that what is printed adds up.
    """

    name: str
    title: str
    columns: tuple[Column, ...]
    rows: tuple[tuple[Cell, ...], ...]

    @property
    def totals(self) -> tuple[Cell, ...] | None:
        """The row of sums, or None where no column is added up."""
        if not any(column.summed for column in self.columns):
            return None
        sums: list[Cell] = [
            _sum(column, at, self.rows) if column.summed else None for at, column in enumerate(self.columns)
        ]
        return ("Total", *sums[1:])


def table(name: str, title: str, columns: Sequence[Column], rows: Sequence[Sequence[Cell]]) -> Table:
    """Return a table with its numbers rounded to the decimals of their columns."""
    rounded = tuple(tuple(_rounded(cell, column) for cell, column in zip(row, columns, strict=True)) for row in rows)
    return Table(name, title, tuple(columns), rounded)


def _rounded(cell: Cell, column: Column) -> Cell:
    if isinstance(cell, str) or cell is None or column.decimals is None:
        return cell
    return round(float(cell), column.decimals) + 0.0  # + 0.0 turns -0.0 into 0.0


def _sum(column: Column, at: int, rows: tuple[tuple[Cell, ...], ...]) -> float:
    cells = [row[at] for row in rows]
    return round(sum(cell for cell in cells if isinstance(cell, float)), column.decimals or 0)
