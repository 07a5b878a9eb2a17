"""The title block with the data fields of ISO 7200, the revisions above it, and the frame of the sheet (ISO 5457)."""

from __future__ import annotations

from spanwright import __version__
from spanwright.design.result import Design
from spanwright.io.drawing.lettering import LARGE, TEXT, TITLE, cut_to, wrapped
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import FRAME, NOTES, TITLE_BLOCK, TRIM
from spanwright.io.files import input_hash

WIDTH = 180.0
"""mm, of the title block (ISO 7200)."""
ROW = 9.2
TITLE_ROW = 19.0
FILING, MARGIN = 20.0, 10.0
"""mm from the edge of the sheet to its frame: at the left, where it is filed, and at the other sides (ISO 5457)."""
REVISION_ROWS = 3
REVISION_ROW = 5.0
REVISIONS_HEIGHT = REVISION_ROW * (REVISION_ROWS + 1)
HEIGHT = 7 * ROW + TITLE_ROW
DOCUMENT = "Arrangement drawing"

Field = tuple[float, str, str]
"""Width, caption, value."""


def draw_frame(pen: Pen, width: float, height: float) -> None:
    """Draw the frame of a sheet, and its centring marks."""
    _box(pen, TRIM.name, 0.0, 0.0, width, height)
    left, right, bottom, top = FILING, width - MARGIN, MARGIN, height - MARGIN
    _box(pen, FRAME.name, left, bottom, right - left, top - bottom)
    middle = ((left + right) / 2.0, (bottom + top) / 2.0)
    for start, end in (
        ((middle[0], top - 5.0), (middle[0], height - MARGIN / 2.0)),
        ((middle[0], bottom + 5.0), (middle[0], MARGIN / 2.0)),
        ((left + 5.0, middle[1]), (left - MARGIN / 2.0, middle[1])),
        ((right - 5.0, middle[1]), (width - MARGIN / 2.0, middle[1])),
    ):
        pen.line(FRAME, start, end)


def draw_title_block(pen: Pen, design: Design, right: float, bottom: float, scales: str, paper: str) -> None:
    """Draw title block and revisions into the lower right corner of the frame."""
    left = right - WIDTH
    y = bottom + HEIGHT
    for fields, high in _rows(design, scales, paper):
        y -= high
        x = left
        for width, caption, value in fields:
            _field(pen, x, y, width, high, caption, value)
            x += width
    _box(pen, FRAME.name, left, bottom, WIDTH, HEIGHT)
    _draw_revisions(pen, design, left, bottom + HEIGHT)


def _rows(design: Design, scales: str, paper: str) -> list[tuple[tuple[Field, ...], float]]:
    project = design.setting.project
    given = project.title_block

    def field(width: float, caption: str, key: str) -> Field:
        return width, caption, given.get(key, "")

    origin = f"{project.source_name or 'project'}, input {input_hash(project.source)}, Spanwright {__version__}"
    mark = (45.0, "Mark, number off", f"{project.mark}, {project.quantity} off")
    return [
        (
            (
                field(45.0, "Responsible dept", "department"),
                field(45.0, "Technical reference", "reference"),
                field(45.0, "Created by", "creator"),
                field(45.0, "Checked by", "checker"),
            ),
            ROW,
        ),
        (
            (
                field(45.0, "Approved by", "approver"),
                (45.0, "Document type", DOCUMENT),
                field(45.0, "Document status", "status"),
                mark,
            ),
            ROW,
        ),
        ((field(90.0, "Legal owner", "owner"), field(90.0, "Client", "client")), ROW),
        ((field(180.0, "Project", "project"),), ROW),
        (((180.0, "Title", project.title),), TITLE_ROW),
        ((field(180.0, "Supplementary title", "supplementary_title"),), ROW),
        (
            (
                field(62.0, "Identification number", "number"),
                field(16.0, "Rev.", "revision"),
                field(30.0, "Date of issue", "date"),
                (18.0, "Sheet", "1/1"),
                field(16.0, "Lang.", "language"),
                (38.0, "Scale", scales),
            ),
            ROW,
        ),
        (((38.0, "Units", "mm"), (24.0, "Paper", paper), (118.0, "Made from", origin)), ROW),
    ]


def _field(pen: Pen, left: float, bottom: float, width: float, high: float, caption: str, value: str) -> None:
    _box(pen, TITLE_BLOCK.name, left, bottom, width, high)
    pen.text(NOTES, (left + 1.0, bottom + high - 1.0 - TEXT), cut_to(caption, width - 2.0))
    if high == TITLE_ROW:
        for number, line in enumerate(wrapped(value, width - 4.0, TITLE, most=2)):
            pen.text(TITLE_BLOCK, (left + 2.0, bottom + high - 10.4 - 7.0 * number), line, TITLE)
        return
    height = LARGE if cut_to(value, width - 2.0, LARGE) == value else TEXT
    pen.text(TITLE_BLOCK, (left + 1.0, bottom + 1.2), cut_to(value, width - 2.0, height), height)


def _draw_revisions(pen: Pen, design: Design, left: float, bottom: float) -> None:
    given = design.setting.project.title_block
    columns = ((14.0, "Rev."), (92.0, "Revision"), (30.0, "Date"), (22.0, "Made"), (22.0, "Checked"))
    first = (given.get("revision", ""), given.get("status", ""), given.get("date", ""), given.get("creator", ""),
             given.get("checker", ""))  # fmt: skip
    top = bottom + REVISIONS_HEIGHT
    x = left
    for (width, head), value in zip(columns, first, strict=True):
        pen.text(NOTES, (x + 1.0, bottom + 1.2), head)
        pen.text(TITLE_BLOCK, (x + 1.0, bottom + REVISION_ROW + 1.2), cut_to(value, width - 2.0))
        pen.line(TITLE_BLOCK, (x, bottom), (x, top))
        x += width
    for row in range(REVISION_ROWS + 2):
        y = bottom + row * REVISION_ROW
        pen.line(TITLE_BLOCK, (left, y), (left + WIDTH, y))
    pen.line(TITLE_BLOCK, (left + WIDTH, bottom), (left + WIDTH, top))


def _box(pen: Pen, layer: str, left: float, bottom: float, width: float, height: float) -> None:
    points = [(left, bottom), (left + width, bottom), (left + width, bottom + height), (left, bottom + height)]
    pen.layout.add_lwpolyline(points, close=True, dxfattribs={"layer": layer})
