"""Cross-sections through each kind of member, with which way round it stands, gap and packing plates, dimensioned."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from spanwright.design.name_ranges import in_ranges
from spanwright.design.pieces import Piece
from spanwright.design.result import Design
from spanwright.design.sizing import Choice
from spanwright.io.drawing.cross_dimensions import LINE, NARROW, off_by, sizes
from spanwright.io.drawing.cross_shapes import Cell, shapes
from spanwright.io.drawing.lettering import LARGE, STEP, TEXT, wrapped
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import (
    DIMENSIONS,
    GUSSETS,
    NOTES,
    PACKS,
    SECTION_HATCH,
    SECTIONS,
    SETTING_OUT,
)
from spanwright.truss.arrays import FloatArray

TEXT_ROOM = 3.6
"""mm on paper kept beyond the last dimension line for its text."""
OVER = 12.0
"""mm on paper kept for dimensions above and below the steel."""
BEYOND = 5.0
"""mm on paper by which centre lines and gussets pass the steel."""
NARROWEST = 62.0
"""mm on paper: least width of one cross-section, for its caption."""
HATCH = 1.4
"""mm on paper between hatching lines (ISO 128-3: at least 0.7)."""


@dataclass(frozen=True, eq=False)
class CrossSections:
    """Cross-sections 1:scale in rows; high : height of a row on paper, mm."""

    scale: int
    rows: tuple[tuple[Cell, ...], ...]
    high: float

    @property
    def size(self) -> FloatArray:
        """(2,) width and height on paper, mm."""
        return np.array([max(sum(cell.width for cell in row) for row in self.rows), self.high * len(self.rows)])


def cross_sections(design: Design, scale: int, columns: int) -> CrossSections:
    """Return the cross-sections of a passing design, one for each group of members, so many side by side."""
    cells = [_cell(design, choice, scale) for choice in design.choices]
    steel = max(float(np.ptp(cell.steel[:, 1])) for cell in cells) / scale
    lines = max(len(cell.caption) for cell in cells)
    gap = design.setting.project.members.gap / scale
    over = OVER if gap >= NARROW else OVER + LINE
    rows = tuple(tuple(cells[at : at + columns]) for at in range(0, len(cells), columns))
    return CrossSections(scale, rows, steel + 2.0 * over + LARGE * STEP + lines * TEXT * STEP + 4.0)


def _cell(design: Design, choice: Choice, scale: int) -> Cell:
    gap = design.setting.project.members.gap
    truss, section = design.setting.truss, choice.section
    names = [truss.bar_names[bar] for bar in choice.group.bars]
    packs = [piece for piece in design.pieces if piece.description == "packing plate" and set(piece.bars) & set(names)]
    texts = [choice.name, in_ranges(names)]
    texts += ["in front of the gusset"] if section.family == "L" else []
    texts += [f"packs {piece.mark}: {piece.section} - {piece.cut_length:.0f}" for piece in packs]
    gusset = gap if section.family == "L" else 0.0
    cell = Cell(
        choice,
        shapes(section, choice.group.role, gap),
        _pack(choice, packs[0]) if packs else None,
        gusset,
        choice.group.name.upper(),
        (),
        0.0,
    )
    lines = 4 if packs else 3
    width = max(NARROWEST, (float(np.ptp(cell.steel[:, 0])) + gusset) / scale + lines * LINE + 2.0 * TEXT_ROOM)
    caption = tuple(line for text in texts for line in wrapped(text, width - 4.0, most=2))
    return replace(cell, caption=caption, width=width)


def _pack(choice: Choice, piece: Piece) -> FloatArray:
    """Return the packing plate between the legs of a pair, its middle half-way down the connected legs."""
    rings = [ring for shape in shapes(choice.section, choice.group.role, 0.0) for ring in shape.rings]
    y = np.vstack(rings)[:, 1]
    middle, half = (float(y.min()) + float(y.max())) / 2.0, piece.cut_length / 2.0
    across = choice.section.gap / 2.0
    return np.array(
        [[-across, middle - half], [across, middle - half], [across, middle + half], [-across, middle + half]]
    )


def draw_cross_sections(pen: Pen, found: CrossSections, corner: FloatArray) -> None:
    """Draw cross-sections in model space, the upper left corner of all at `corner` (2,), mm."""
    across = float(found.size[0])
    for number, row in enumerate(found.rows):
        apart = (across - sum(cell.width for cell in row)) / len(row)
        left = apart / 2.0
        for cell in row:
            at = corner + found.scale * np.array([left, -number * found.high])
            _draw_cell(pen, cell, at, np.array([cell.width, found.high]))
            left += cell.width + apart


def _draw_cell(pen: Pen, cell: Cell, corner: FloatArray, size: FloatArray) -> None:
    unit = pen.scale
    x = corner[0] + size[0] / 2.0 * unit
    y = corner[1] - (LARGE + 1.0) * unit
    pen.text(NOTES, (x, y), cell.title, LARGE, across="centre")
    for line in cell.caption:
        y -= TEXT * STEP * unit
        pen.text(NOTES, (x, y), line, across="centre")
    steel = cell.steel
    low, high = steel.min(axis=0), steel.max(axis=0)
    aside = (1.0 if cell.pack is None else 2.0) - 2.0
    middle = np.array([x - aside * LINE / 2.0 * unit, (y - 2.0 * unit + corner[1] - size[1] * unit) / 2.0])
    origin = middle - np.array([(low[0] + high[0]) / 2.0, (low[1] + high[1]) / 2.0])
    for piece in cell.pieces:
        rings = [ring + origin for ring in piece.rings]
        for ring in rings:
            pen.path(SECTIONS, ring, closed=True)
        pen.hatching(SECTION_HATCH, rings, HATCH)
    if cell.pack is not None:
        pen.path(PACKS, cell.pack + origin, closed=True)
    _draw_axes(pen, cell, origin, low, high)
    for one in sizes(cell, unit):
        shift = off_by(one, unit)
        pen.dimension(
            DIMENSIONS, one.start + origin, one.end + origin, one.line + origin, one.angle, shift=shift, sign=one.sign
        )


def _draw_axes(pen: Pen, cell: Cell, origin: FloatArray, low: FloatArray, high: FloatArray) -> None:
    """Draw the plane of the truss, the setting-out line's level, and the faces of the gusset of a single angle."""
    beyond = BEYOND * pen.scale
    x, y = origin
    left, right = min(float(low[0]), -cell.gusset / 2.0) - beyond / 2.0, float(high[0]) + beyond / 2.0
    bottom, top = float(low[1]) - beyond, float(high[1]) + beyond
    pen.line(SETTING_OUT, (x, y + bottom), (x, y + top))
    pen.line(SETTING_OUT, (x + left, y), (x + right, y))
    if cell.gusset:
        for at in (x - cell.gusset / 2.0, x + cell.gusset / 2.0):
            pen.line(GUSSETS, (at, y + bottom), (at, y + top))
