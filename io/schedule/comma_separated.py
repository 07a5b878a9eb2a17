"""The parts list as CSV for machines: names of columns in line 1, then one line a mark and nothing else.

Every line says that it is an estimate, with the caution and the hash of the input, so that lines stay marked when
lists are filtered or merged. UTF-8 without a byte-order mark, commas, full stops, CRLF (RFC 4180).
"""

from __future__ import annotations

import csv
import io

from spanwright.io.files import safe_cell
from spanwright.io.schedule.table import Cell, Column, Table

STATUS = "ESTIMATE"


def comma_separated(table: Table, note: str, input_sha256: str) -> str:
    """Return a table as CSV, its columns by key, without sums.

    note : what every line says of itself. input_sha256 : mark of the input.
    """
    buffer = io.StringIO()
    writer = csv.writer(buffer, lineterminator="\r\n")
    writer.writerow(("status", *(column.key for column in table.columns), "note", "input_sha256"))
    for row in table.rows:
        cells = [_text(cell, column) for cell, column in zip(row, table.columns, strict=True)]
        writer.writerow((STATUS, *cells, note, input_sha256))
    return buffer.getvalue()


def _text(cell: Cell, column: Column) -> str:
    if cell is None:
        return ""
    return safe_cell(cell) if isinstance(cell, str) else f"{cell:.{column.decimals}f}"
