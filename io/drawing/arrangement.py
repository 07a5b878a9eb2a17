"""Which sheet, which scales, and where everything lies on it. Sizes in mm on paper, from the lower left corner."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cached_property
from typing import Protocol

import numpy as np

from spanwright.design.cutting import cuts
from spanwright.design.lying import edges
from spanwright.design.result import Design
from spanwright.io.drawing.cross_sections import CrossSections, cross_sections
from spanwright.io.drawing.elevation import Elevation, lay_out
from spanwright.io.drawing.lettering import LARGE, TEXT
from spanwright.io.drawing.notes import caution, general_notes, legend
from spanwright.io.drawing.packing import Block, Spot, pack
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.schedules import bearing_table, member_schedule, parts, restraint_table
from spanwright.io.drawing.tables import DrawnTable
from spanwright.io.drawing.title_block import FILING, HEIGHT, MARGIN, REVISIONS_HEIGHT, WIDTH
from spanwright.truss.errors import OutputError

PAPERS = (("A3", 420.0, 297.0), ("A2", 594.0, 420.0), ("A1", 841.0, 594.0))
"""Sizes by ISO 216, lying."""
SCALES = (10, 20, 50, 100, 200, 500, 1000, 2000)
"""Elevations 1:n by ISO 5455."""
SCALES_TRIED = 2
"""Of the scales at which a truss fits a sheet's width, only so many of the largest are tried."""
SECTION_SCALES = (1, 2, 5, 10)
"""Cross-sections 1:n by ISO 5455."""
SMALLEST, LARGEST = 14.0, 150.0
"""mm on paper: no cross-section is drawn smaller, for its dimensions' sake, nor larger."""
ROWS_AT_MOST = (None, 100, 50, 25)
"""Rows of a table, tried in this order."""
INSIDE = 6.0
"""mm on paper left free inside the frame."""
LEAST_GAP = 0.7
"""mm on paper: parallel lines, such as the edges of a member, are at least this far apart (ISO 128-2)."""
VIEW_TITLE = LARGE + TEXT + 5.0
"""Height of the title under a view."""
STRIPS = (1, 2, 3)
"""Tables may be drawn in so many strips; a short one in up to two."""
NOTE_WIDTHS = (WIDTH, 130.0, 240.0)
"""mm, of notes; best as wide as the title block."""
LEGEND_COLUMNS = (2, 3, 1)
"""Columns that the legend may have."""
SHORT = 5
"""Rows of the shortest strip worth drawing."""


class Drawn(Protocol):
    """What draws itself down from its upper left corner."""

    def draw(self, pen: Pen, left: float, top: float) -> None:
        """Draw it."""


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
    """Return the smallest sheet with everything on it, of that the largest scales, so that all marks stand along their
    members; where no sheet has room for all of them, that with the fewest on leaders.

    Scales at which the edges of a member run together, and tables without all their rows, are the last resort.
    Raises OutputError where even so no sheet is large enough.
    """
    for most in ROWS_AT_MOST:
        possible = _Possible(design, most)
        for scales in (possible.clear_scales, SCALES):
            if best := _best(possible.sheets(scales)):
                return best
    raise OutputError(
        "no sheet is large enough for the drawing", "design it in parts, or shorten the texts of the project"
    )


def _best(sheets: Iterator[Arrangement]) -> Arrangement | None:
    best: Arrangement | None = None
    for found in sheets:
        if best is None or found.elevation.wanting < best.elevation.wanting:
            best = found
        if best.elevation.wanting == (0, 0):
            break
    return best


@dataclass(frozen=True, eq=False)
class _Possible:
    """The sheets that a design can be drawn on, with at most so many rows in a table."""

    design: Design
    most: int | None

    @cached_property
    def clear_scales(self) -> tuple[int, ...]:
        """Scales at which the two edges of every member are seen apart."""
        widths = []
        for choice in self.design.choices:
            lower, upper = edges(choice.section, choice.group.role)
            widths.append(upper - lower)
        return tuple(scale for scale in SCALES if min(widths) / scale >= LEAST_GAP)

    @cached_property
    def _steel(self) -> float:
        corners = np.vstack([cut.outline for cut in cuts(self.design.setting, self.design.choices)])
        return float(np.ptp(corners[:, 0]))

    @cached_property
    def _texts(self) -> tuple[tuple[tuple[Drawn, ...], Block], ...]:
        """The blocks beside the views, each with what it may look like."""
        found: list[tuple[tuple[Drawn, ...], Block]] = []
        for table in (parts, member_schedule, restraint_table, bearing_table):
            made = table(self.design).limited(self.most)
            strips = STRIPS if len(made.rows) > 2 * SHORT else STRIPS[:2]
            drawn = tuple(DrawnTable(made, number) for number in strips)
            found.append((drawn, Block(tuple((one.size[0], one.height) for one in drawn))))
        for notes in (general_notes, caution):
            widths = tuple(notes(self.design, width) for width in NOTE_WIDTHS)
            found.append((widths, Block(tuple((one.width, one.height) for one in widths), at_right=True)))
        signs = tuple(legend(self.design, columns) for columns in LEGEND_COLUMNS)
        found.append((signs, Block(tuple((one.width, one.height) for one in signs))))
        return tuple(found)

    @cached_property
    def _sections(self) -> list[tuple[CrossSections, ...]]:
        """Cross-sections at each scale that suits, the largest first, in every number of columns."""
        sizes = [float(max(choice.section.depth[0], choice.section.width[0])) for choice in self.design.choices]
        scales = [n for n in SECTION_SCALES if min(sizes) / n >= SMALLEST and max(sizes) / n <= LARGEST]
        if not scales:
            scales = [next(n for n in SECTION_SCALES if max(sizes) / n <= LARGEST)]
        columns = range(len(self.design.choices), 0, -1)
        return [tuple(cross_sections(self.design, scale, number) for number in columns) for scale in scales]

    def sheets(self, scales: tuple[int, ...]) -> Iterator[Arrangement]:
        """Give sheets that hold everything, small ones first, each with the largest scale of elevation it holds."""
        laid: dict[int, Elevation] = {}
        for paper, width, height in PAPERS:
            inside = Spot(
                FILING + INSIDE,
                height - MARGIN - INSIDE,
                width - FILING - MARGIN - 2.0 * INSIDE,
                height - 2.0 * (MARGIN + INSIDE),
            )
            fitting = [scale for scale in scales if self._steel / scale <= inside.width]
            for scale in fitting[:SCALES_TRIED]:
                if scale not in laid:
                    laid[scale] = lay_out(self.design, scale)
                found = self._on(paper, width, height, inside, laid[scale])
                if found:
                    yield found
                    break

    def _on(self, paper: str, width: float, height: float, inside: Spot, elevation: Elevation) -> Arrangement | None:
        corner = Spot(width - MARGIN - WIDTH, MARGIN + HEIGHT + REVISIONS_HEIGHT, WIDTH, HEIGHT + REVISIONS_HEIGHT)
        across, up = (float(size) for size in elevation.size)
        for left in (inside.left + (inside.width - across) / 2.0, inside.left):
            view = Spot(left, inside.top, across, up + VIEW_TITLE)
            if not view.within(inside) or not view.clear_of(corner, 0.0):
                continue
            for sections in self._sections:
                sizes = tuple((float(one.size[0]), float(one.size[1]) + VIEW_TITLE) for one in sections)
                packed = pack(inside, (corner, view), (Block(sizes), *(block for _, block in self._texts)))
                if packed:
                    (at, spot), *others = packed
                    blocks = tuple(
                        (drawn[k], place) for (drawn, _), (k, place) in zip(self._texts, others, strict=True)
                    )
                    return Arrangement(paper, width, height, elevation, view, sections[at], spot, blocks)
        return None
