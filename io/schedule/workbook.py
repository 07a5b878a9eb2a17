"""Tables as an XLSX workbook: one sheet each, headed, frozen, set up for A4 landscape; same tables, same bytes."""

from __future__ import annotations

import io
from dataclasses import dataclass
from datetime import datetime

import xlsxwriter
from xlsxwriter.format import Format
from xlsxwriter.worksheet import Worksheet

from spanwright.io.files import safe_cell
from spanwright.io.schedule.table import Cell, Column, Table

A4 = 9
LONGEST_CELL = 2000
"""Characters: longer text is cut, far below what a spreadsheet refuses (32 767)."""
LONGEST_HEADING = 110
LONGEST_PAGE_HEADER = 80
"""Characters of user text in a page header, whose whole may have 255."""
UNDATED = datetime(2000, 1, 1)
"""Written as the date of creation, so that the same input gives the same bytes."""


@dataclass(frozen=True)
class Headings:
    """What stands on every sheet and page: name of the truss, status, caution, and where it came from."""

    truss: str
    status: str
    caution: str
    origin: str


@dataclass(frozen=True)
class _Styles:
    title: Format
    status: Format
    small: Format
    head: Format
    text: Format
    numbers: dict[int, Format]
    total: Format
    totals: dict[int, Format]


def workbook(tables: tuple[Table, ...], headings: Headings) -> bytes:
    """Return the workbook's bytes; all text is text, never a formula or a link."""
    buffer = io.BytesIO()
    book = xlsxwriter.Workbook(buffer, {"in_memory": True})
    book.set_properties(
        {"title": _shortened(headings.truss, LONGEST_HEADING), "comments": headings.status, "created": UNDATED}
    )
    styles = _styles(book)
    for table in tables:
        _sheet(book.add_worksheet(table.name), table, headings, styles)
    book.close()
    return buffer.getvalue()


def _styles(book: xlsxwriter.Workbook) -> _Styles:
    cell = {"font_size": 9, "valign": "top", "border": 1, "border_color": "#BFBFBF"}
    total = cell | {"bold": True, "top": 2}
    decimals = {0: "0", 1: "0.0", 2: "0.00"}
    return _Styles(
        title=book.add_format({"bold": True, "font_size": 14}),
        status=book.add_format({"bold": True, "font_size": 11}),
        small=book.add_format({"italic": True, "font_size": 9}),
        head=book.add_format(cell | {"bold": True, "text_wrap": True, "bg_color": "#E6E6E6"}),
        text=book.add_format(cell | {"text_wrap": True}),
        numbers={places: book.add_format(cell | {"num_format": form}) for places, form in decimals.items()},
        total=book.add_format(total),
        totals={places: book.add_format(total | {"num_format": form}) for places, form in decimals.items()},
    )


def _sheet(sheet: Worksheet, table: Table, headings: Headings, styles: _Styles) -> None:
    lines = (
        (f"{table.title}: {headings.truss}", styles.title),
        (headings.status, styles.status),
        (headings.caution, styles.small),
        (headings.origin, styles.small),
    )
    for row, (line, style) in enumerate(lines):
        sheet.write_string(row, 0, safe_cell(_shortened(line, 2 * LONGEST_HEADING)), style)
    head = len(lines)
    for at, column in enumerate(table.columns):
        sheet.set_column(at, at, column.width)
        sheet.write_string(head, at, column.head, styles.head)
    for row, cells in enumerate(table.rows, head + 1):
        for at, (cell, column) in enumerate(zip(cells, table.columns, strict=True)):
            _write(sheet, (row, at), cell, _style(column, styles.text, styles.numbers))
    last = head + len(table.rows)
    if table.totals is not None:
        for at, (cell, column) in enumerate(zip(table.totals, table.columns, strict=True)):
            _write(sheet, (last + 1, at), cell, _style(column, styles.total, styles.totals))
    sheet.freeze_panes(head + 1, 0)
    if any(column.decimals is not None for column in table.columns):
        sheet.autofilter(head, 0, last, len(table.columns) - 1)
    _page(sheet, head, headings)


def _page(sheet: Worksheet, head: int, headings: Headings) -> None:
    sheet.set_landscape()
    sheet.set_paper(A4)
    sheet.set_margins(left=0.4, right=0.4, top=0.7, bottom=0.7)
    sheet.fit_to_pages(1, 0)
    sheet.repeat_rows(head)
    # "&" begins a command in a page header
    truss = _shortened(headings.truss.replace("&", "and"), LONGEST_PAGE_HEADER)
    sheet.set_header(f"&L{truss}&R{headings.status.split(':')[0]}")
    sheet.set_footer(f"&L{headings.origin.replace('&', 'and')[:LONGEST_PAGE_HEADER]}&C&A&RPage &P of &N")


def _style(column: Column, text: Format, numbers: dict[int, Format]) -> Format:
    return text if column.decimals is None else numbers[column.decimals]


def _write(sheet: Worksheet, place: tuple[int, int], cell: Cell, style: Format) -> None:
    if cell is None or cell == "":
        sheet.write_blank(*place, None, style)
    elif isinstance(cell, str):
        sheet.write_string(*place, safe_cell(_shortened(cell, LONGEST_CELL)), style)
    else:
        sheet.write_number(*place, cell, style)


def _shortened(text: str, longest: int) -> str:
    return text if len(text) <= longest else f"{text[: longest - 3]}..."
