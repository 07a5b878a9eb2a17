"""Tables on the sheet: columns as wide as their words, letters smaller and words cut short only where they must be."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.lettering import POINTS_PER_MM, cut_to, height_of, width_of
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import BODY, HAIR, INK, SMALL, SOFT, THICK

GAP = 4.0
"""mm between columns."""

ROW = 1.75
"""Height of a row over the size of its letters."""


@dataclass(frozen=True)
class Table:
    """Headings and rows of words; the columns named in `right` are set to the right."""

    headings: tuple[str, ...]
    rows: Sequence[tuple[str, ...]]
    right: frozenset[int] = frozenset()


def row_height(size: float = BODY) -> float:
    """Return the height of a row, mm."""
    return ROW * size / POINTS_PER_MM


def height_of_table(table: Table) -> float:
    """Return the height of a table with its heading, mm."""
    return row_height() * (len(table.rows) + 1)


def draw_table(sheet: Sheet, table: Table, left: float, top: float, width: float) -> list[float]:
    """Draw a table down from `top` and return the height of the middle of each row, mm.

    Letters shrink to `SMALL` where columns are too wide; then the widest column is cut short.
    """
    size, widths = _fitted(table, width)
    edges = left + np.concatenate([[0.0], np.cumsum(np.array(widths) + GAP)])
    step = row_height()
    places = []
    for number, row in enumerate((table.headings, *table.rows)):
        middle = top - (number + 0.5) * step
        places.append(middle)
        base = middle - height_of(size) / 2.0
        for column, words in enumerate(row):
            at_right = column in table.right
            x = float(edges[column]) + (widths[column] if at_right else 0.0)
            sheet.text(
                x,
                base,
                cut_to(words, widths[column] + 0.01, size),
                size,
                across="right" if at_right else "left",
                colour=SOFT if number == 0 else INK,
            )
    ends = np.array([left, left + width])
    levels = [(top - step, THICK), *((top - (number + 2) * step, HAIR) for number in range(len(table.rows)))]
    for weight in (THICK, HAIR):
        rules = [np.column_stack([ends, [level, level]]) for level, own in levels if own == weight]
        sheet.lines(rules, weight, INK if weight == THICK else "#c8c8c8")
    return places[1:]


def _fitted(table: Table, width: float) -> tuple[float, list[float]]:
    """Return the size of the letters and the widths of the columns."""
    room = width - GAP * (len(table.headings) - 1)
    for size in (BODY, 0.5 * (BODY + SMALL), SMALL):
        columns = list(zip(table.headings, *table.rows, strict=True))
        widths = [max(width_of(words, size) for words in column) for column in columns]
        if sum(widths) <= room:
            break
    while sum(widths) > room + 0.01:
        ordered = sorted(widths)
        widest = widths.index(ordered[-1])
        step = max(ordered[-1] - ordered[-2], 1.0) if len(ordered) > 1 else ordered[-1]
        widths[widest] -= min(step, sum(widths) - room)
    return size, widths
