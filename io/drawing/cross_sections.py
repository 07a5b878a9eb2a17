"""Cross-sections through each kind of member, with which way round it stands, gap and packing plates, dimensioned."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from spanwright.design.name_ranges import in_ranges
from spanwright.design.pieces import Piece
from spanwright.design.result import Design
from spanwright.design.sizing import Choice
from spanwright.io.drawing.cross_shapes import Shape, shapes
from spanwright.io.drawing.dimensions import Dimension
from spanwright.io.drawing.lettering import LARGE, STEP, TEXT, width_of, wrapped
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import (
    DIMENSIONS,
    GUSSETS,
    NOTES,
    PACKS,
    SECTION_HATCH,
    SECTIONS,
    SETTING_OUT,
    TICK,
)
from spanwright.truss.arrays import FloatArray

LINE = 8.0
"""mm on paper from the steel to its dimensions, and from line to line."""
TEXT_ROOM = 3.6
"""mm on paper kept beyond the last dimension line for its text."""
OVER = 12.0
"""mm on paper kept for dimensions above and below the steel."""
BEYOND = 5.0
"""mm on paper by which centre lines and gussets pass the steel."""
NARROWEST = 62.0
"""mm on paper: least width of one cross-section, for its caption."""
NARROW = 3.0
"""mm on paper: a narrower gap is dimensioned on a line of its own."""
DIAMETER = "\u00d8"
HATCH = 1.4
"""mm on paper between hatching lines (ISO 128-3: at least 0.7)."""


@dataclass(frozen=True, eq=False)
class Cell:
    """One cross-section: what it goes through, its pieces, its packing plate (4, 2) or None, gusset, title, caption.

    width : mm on paper.
    """

    choice: Choice
    pieces: tuple[Shape, ...]
    pack: FloatArray | None
    gusset: float
    title: str
    caption: tuple[str, ...]
    width: float

    @property
    def steel(self) -> FloatArray:
        """(n, 2) mm, all points of steel, packing plate included."""
        rings = [ring for piece in self.pieces for ring in piece.rings]
        return np.vstack([*rings, *([] if self.pack is None else [self.pack])])


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
    for one in _dimensions(cell, unit):
        shift = _shift(one, unit)
        pen.dimension(
            DIMENSIONS, one.start + origin, one.end + origin, one.line + origin, one.angle, shift=shift, sign=one.sign
        )


def _shift(one: Dimension, unit: float) -> float:
    """Return mm on paper by which the text of a short dimension stands off."""
    room, text = one.length / unit, width_of(f"{one.length:.1f}".removesuffix(".0"))
    return one.off * (room + text) / 2.0 + one.off * TICK if room < text + TICK else 0.0


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


def _dimensions(cell: Cell, unit: float) -> Iterator[Dimension]:
    """Return what a cross-section is dimensioned with, from its own origin."""
    section = cell.choice.section
    low, high = cell.steel.min(axis=0), cell.steel.max(axis=0)
    rings = np.vstack([ring for piece in cell.pieces for ring in piece.rings])
    if section.family in ("L", "2L", "2L star"):
        yield from _of_angles(cell, rings, low, high, unit)
    else:
        depth, width, wall = (float(value[0]) for value in (section.depth, section.width, section.thickness))
        across = _upright("depth", 0.0, -depth / 2.0, depth / 2.0, float(low[0]) - LINE * unit)
        yield replace(across, sign=DIAMETER) if section.family == "CHS" else across
        if section.family != "CHS":
            yield _level("width", 0.0, -width / 2.0, width / 2.0, float(high[1]) + LINE * unit)
        yield _level("wall", 0.0, width / 2.0 - wall, width / 2.0, float(low[1]) - LINE * unit, off=1.0)
    if cell.pack is not None:
        x, (bottom, top) = float(cell.pack[1, 0]), cell.pack[[1, 2], 1]
        yield _upright("pack length", x, float(bottom), float(top), float(high[0]) + 2.0 * LINE * unit)


def _of_angles(cell: Cell, rings: FloatArray, low: FloatArray, high: FloatArray, unit: float) -> Iterator[Dimension]:
    section = cell.choice.section
    leg, out, t = (float(value[0]) for value in (section.leg_connected, section.leg_outstanding, section.thickness))
    back = section.gap / 2.0 if section.pieces == 2 else cell.gusset / 2.0
    upper, lower = float(rings[:, 1].max()), float(rings[:, 1].min())
    heel_up = cell.choice.group.role != "bottom chord"
    star = section.family == "2L star"
    heel = section.gap / 2.0 if star else upper if heel_up else lower
    inward = 1.0 if star or not heel_up else -1.0
    left, right = float(min(low[0], -back)) - LINE * unit, float(high[0]) + LINE * unit
    outward = LINE * unit if heel_up or star else -LINE * unit
    level = float(high[1] if outward > 0.0 else low[1]) + outward
    legs_low, legs_high = sorted((heel, heel + inward * leg))
    yield _upright("connected leg", back, legs_low, legs_high, left)
    if not star:
        yield _upright("setting-out line", back, min(heel, 0.0), max(heel, 0.0), left - LINE * unit, off=-inward)
    face = heel + inward * t
    yield _upright("thickness", back + out, min(heel, face), max(heel, face), right, off=-inward)
    yield _level("outstanding leg", heel, back, back + out, level)
    if section.pieces == 2:
        yield _gap("gap", heel, back, level, outward, unit)
        if not star:
            yield _level("outstanding leg", heel, -back - out, -back, level)
        else:
            yield _upright("gap", back, -back, back, left - LINE * unit)
    elif cell.gusset:
        yield _gap("gusset", heel, back, level, outward, unit)


def _gap(what: str, y: float, half: float, level: float, outward: float, unit: float) -> Dimension:
    """Dimension a gap in the line of the outstanding legs; where it is too narrow for that, on a line of its own."""
    if 2.0 * half / unit < NARROW:
        return _level(what, y, -half, half, level + outward, off=1.0)
    return _level(what, y, -half, half, level)


def _level(what: str, y: float, left: float, right: float, at: float, off: float = 0.0) -> Dimension:
    return Dimension(what, np.array([left, y]), np.array([right, y]), np.array([left, at]), 0.0, off)


def _upright(what: str, x: float, bottom: float, top: float, at: float, off: float = 0.0) -> Dimension:
    return Dimension(what, np.array([x, bottom]), np.array([x, top]), np.array([at, bottom]), 90.0, off)
