"""Tables as they are drawn: lines and lettering, columns as wide as their text. Sizes in mm on paper."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cached_property

from spanwright.io.drawing.lettering import LARGE, STEP, TEXT, cut_to, widest, width_of, wrapped
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import TABLE_FRAMES, TABLES

ROW = 4.3
"""Height of a row."""
PAD = 1.2
"""Left free at either side of a cell's text."""
TITLE_ROOM = LARGE + 2.5
"""Height of the title above a table."""
WIDEST_CELL = 100.0
"""A longer text is cut short."""
BETWEEN = 4.0
"""Between the strips of a table that is drawn in several."""


@dataclass(frozen=True)
class Table:
    """A table; `right` : columns whose cells stand to the right. remarks : sentences below it."""

    title: str
    heads: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    right: frozenset[int] = frozenset()
    remarks: tuple[str, ...] = ()

    def limited(self, most: int | None) -> Table:
        """Return the table with so many rows, and the number of those left out as a remark."""
        if most is None or len(self.rows) <= most:
            return self
        left_out = f"{len(self.rows) - most} more rows: see schedule.xlsx and results.json."
        return replace(self, rows=self.rows[:most], remarks=(*self.remarks, left_out))

    @cached_property
    def cells(self) -> tuple[tuple[str, ...], ...]:
        """The rows as they are lettered."""
        return tuple(tuple(cut_to(cell, WIDEST_CELL) for cell in row) for row in self.rows)

    @cached_property
    def widths(self) -> tuple[float, ...]:
        """Width of each column."""
        found = []
        for at, head in enumerate(self.heads):
            cells = widest([row[at] for row in self.cells])
            head_room = max(widest(head.split()), 0.6 * width_of(head))
            found.append(max(cells, head_room) + 2.0 * PAD)
        return tuple(found)

    @cached_property
    def head_lines(self) -> tuple[list[str], ...]:
        """The headings, broken into lines."""
        return tuple(
            wrapped(head, width - 2.0 * PAD + 0.01) for head, width in zip(self.heads, self.widths, strict=True)
        )

    @property
    def head_height(self) -> float:
        """Height of the row of headings."""
        return max(len(lines) for lines in self.head_lines) * TEXT * STEP + 1.5


@dataclass(frozen=True)
class DrawnTable:
    """A table drawn in `strips` strips side by side, each with its headings."""

    table: Table
    strips: int = 1

    @property
    def _per_strip(self) -> int:
        return -(-len(self.table.rows) // self.strips)

    @cached_property
    def _remark_lines(self) -> list[str]:
        return [line for remark in self.table.remarks for line in wrapped(remark, self.size[0])]

    @cached_property
    def size(self) -> tuple[float, float]:
        """Width, and height without remarks; see `height`."""
        one = sum(self.table.widths)
        width = max(self.strips * one + (self.strips - 1) * BETWEEN, width_of(self.table.title, LARGE))
        return width, TITLE_ROOM + self.table.head_height + ROW * self._per_strip

    @property
    def height(self) -> float:
        """Height with remarks."""
        return self.size[1] + (len(self._remark_lines) * TEXT * STEP + 1.0 if self._remark_lines else 0.0)

    def draw(self, pen: Pen, left: float, top: float) -> None:
        """Draw the table down from its upper left corner."""
        pen.text(TABLES, (left, top - LARGE), self.table.title, LARGE)
        under = top - TITLE_ROOM
        for strip in range(self.strips):
            rows = self.table.cells[strip * self._per_strip : (strip + 1) * self._per_strip]
            x = left + strip * (sum(self.table.widths) + BETWEEN)
            if rows:
                self._draw_strip(pen, x, under, rows)
        y = top - self.size[1] - 1.0
        for line in self._remark_lines:
            y -= TEXT * STEP
            pen.text(TABLES, (left, y + 0.6), line)

    def _draw_strip(self, pen: Pen, left: float, top: float, rows: tuple[tuple[str, ...], ...]) -> None:
        table = self.table
        head = table.head_height
        bottom = top - head - ROW * len(rows)
        right = left + sum(table.widths)
        x = left
        for at, width in enumerate(table.widths):
            for number, line in enumerate(table.head_lines[at]):
                y = top - (number + 1) * TEXT * STEP + 0.6
                pen.text(TABLES, (x + width / 2.0, y), line, across="centre")
            for number, row in enumerate(rows):
                y = top - head - (number + 0.5) * ROW
                if at in table.right:
                    pen.text(TABLES, (x + width - PAD, y), row[at], across="right", up="middle")
                else:
                    pen.text(TABLES, (x + PAD, y), row[at], up="middle")
            if at:
                pen.line(TABLES, (x, top), (x, bottom))
            x += width
        for number in range(1, len(rows)):
            y = top - head - number * ROW
            pen.line(TABLES, (left, y), (right, y))
        pen.line(TABLE_FRAMES, (left, top - head), (right, top - head))
        frame = [(left, bottom), (right, bottom), (right, top), (left, top)]
        for start, end in zip(frame, [*frame[1:], frame[0]], strict=True):
            pen.line(TABLE_FRAMES, start, end)
