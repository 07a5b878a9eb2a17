"""Which sheet, which scales, and where everything lies on the sheet. Sizes in mm on paper, from the lower left corner."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import cache
from itertools import product
from typing import Protocol

from spanwright.design.result import Design
from spanwright.io.drawing.cross_sections import CrossSections, cross_sections
from spanwright.io.drawing.elevation import Elevation, lay_out
from spanwright.io.drawing.lettering import LARGE, TEXT
from spanwright.io.drawing.notes import Legend, caution, general_notes
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.schedules import bearing_table, member_schedule, parts, restraint_table
from spanwright.io.drawing.tables import DrawnTable
from spanwright.io.drawing.title_block import FILING, HEIGHT, MARGIN, REVISIONS_HEIGHT, WIDTH

PAPERS = (("A3", 420.0, 297.0), ("A2", 594.0, 420.0), ("A1", 841.0, 594.0))
"""Sizes by ISO 216, lying."""
SCALES = (10, 20, 50, 100, 200, 500)
"""Elevations 1:n by ISO 5455."""
SECTION_SCALES = (1, 2, 5, 10)
"""Cross-sections 1:n by ISO 5455."""
FREE = 6.0
"""Left free between blocks."""
VIEW_TITLE = LARGE + TEXT + 5.0
"""Height of the title under a view."""


class Drawn(Protocol):
    """A block that draws itself down from its upper left corner."""

    def draw(self, pen: Pen, left: float, top: float) -> None:
        """Draw it."""


@dataclass(frozen=True)
class Spot:
    """A rectangle on the sheet: left, top, width, height."""

    left: float
    top: float
    width: float
    height: float

    def clear_of(self, other: Spot) -> bool:
        """Whether two spots have `FREE` between them."""
        return (
            self.left >= other.left + other.width + FREE
            or other.left >= self.left + self.width + FREE
            or self.top <= other.top - other.height - FREE
            or other.top <= self.top - self.height - FREE
        )


@dataclass(frozen=True, eq=False)
class Arrangement:
    """A sheet with everything on it: paper name and size, both views with their spots, and the other blocks."""

    paper: str
    width: float
    height: float
    elevation: Elevation
    elevation_spot: Spot
    sections: CrossSections
    sections_spot: Spot
    blocks: tuple[tuple[Drawn, Spot], ...]


def arrange(design: Design) -> Arrangement:
    """Return the smallest sheet and the largest scales at which all fits and every mark stands along its member.

    Where no sheet has room for all marks, that with the fewest on leaders.
    """
    best: Arrangement | None = None
    for found in _possible(design):
        if found.elevation.led == 0:
            return found
        if best is None or found.elevation.led < best.elevation.led:
            best = found
    if best is None:
        raise NotImplementedError
    return best


def _possible(design: Design) -> Iterator[Arrangement]:
    """Give sheets that hold everything, small ones first, of each the one with the largest scales."""
    elevation_at = cache(lambda scale: lay_out(design, scale))
    for (paper, width, height), scale in product(PAPERS, SCALES):
        elevation = elevation_at(scale)
        if elevation.size[0] > width - FILING - MARGIN - 2.0:
            continue
        found = _packed(design, paper, width, height, elevation)
        if found:
            yield found


def _packed(design: Design, paper: str, width: float, height: float, elevation: Elevation) -> Arrangement | None:
    texts: list[DrawnTable | Legend | object]
    column = WIDTH
    blocks: list[Drawn] = [
        general_notes(design, column),
        caution(design, column),
        DrawnTable(parts(design)),
        DrawnTable(member_schedule(design)),
        DrawnTable(restraint_table(design)),
        DrawnTable(bearing_table(design)),
        Legend(column),
    ]
    for scale, columns in product(SECTION_SCALES, range(len(design.choices), 0, -1)):
        sections = cross_sections(design, scale, columns)
        sizes = [
            (float(elevation.size[0]), float(elevation.size[1]) + VIEW_TITLE),
            *(_size(block) for block in blocks),
            (float(sections.size[0]), float(sections.size[1]) + VIEW_TITLE),
        ]
        spots = pack(sizes, width, height)
        if spots:
            return Arrangement(
                paper,
                width,
                height,
                elevation,
                spots[0],
                sections,
                spots[-1],
                tuple(zip(blocks, spots[1:-1], strict=True)),
            )
    return None


def _size(block: object) -> tuple[float, float]:
    if isinstance(block, DrawnTable):
        return block.size[0], block.height
    return block.width, block.height  # type: ignore[attr-defined]


def pack(sizes: Sequence[tuple[float, float]], width: float, height: float) -> list[Spot] | None:
    """Return a spot for each size on a sheet, clear of each other and of the title block, or None.

    The first stands at the top in the middle; each other as high as can be, then as far to the left.
    """
    left, right, bottom, top = FILING + FREE, width - MARGIN - FREE, MARGIN + FREE, height - MARGIN - FREE
    block = Spot(width - MARGIN - WIDTH, MARGIN + HEIGHT + REVISIONS_HEIGHT, WIDTH, HEIGHT + REVISIONS_HEIGHT)
    first = sizes[0]
    if first[0] > right - left or first[1] > top - bottom:
        return None
    taken = [block, Spot((left + right - first[0]) / 2.0, top, *first)]
    if not taken[1].clear_of(block):
        taken[1] = Spot(left, top, *first)
        if not taken[1].clear_of(block):
            return None
    order = sorted(range(1, len(sizes)), key=lambda at: -sizes[at][0] * sizes[at][1])
    spots: dict[int, Spot] = {0: taken[1]}
    for at in order:
        spot = _free_spot(sizes[at], taken, left, right, bottom, top)
        if spot is None:
            return None
        spots[at] = spot
        taken.append(spot)
    return [spots[at] for at in range(len(sizes))]


def _free_spot(
    size: tuple[float, float], taken: list[Spot], left: float, right: float, bottom: float, top: float
) -> Spot | None:
    tops = sorted({top, *(spot.top - spot.height - FREE for spot in taken)}, reverse=True)
    lefts = sorted({left, *(spot.left + spot.width + FREE for spot in taken)})
    for y, x in product(tops, lefts):
        spot = Spot(x, y, *size)
        if x + size[0] <= right + FREE and y - size[1] >= bottom and all(spot.clear_of(other) for other in taken):
            return spot
    return None
