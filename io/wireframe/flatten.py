"""Blocks taken apart: every line and mark in world coordinates, on the layer it is seen on.

A block's content is read once and placed by one matrix for each insert, so a mirrored, turned or unequally scaled
block gives the points that are seen. A part on layer 0 takes the layer of the nearest insert on a named layer.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple

import numpy as np
from ezdxf.document import Drawing
from ezdxf.entities.insert import Insert

from spanwright.io.wireframe.blocks import insert_matrices, insert_points, refuse_hostile_blocks, why_not_apart
from spanwright.io.wireframe.content import RULE_OF_KIND, Content, Entity, read_content, record
from spanwright.io.wireframe.counting import Counting
from spanwright.io.wireframe.layers import LayerRules
from spanwright.io.wireframe.options import MarkKind, Options
from spanwright.io.wireframe.read import READER_TROUBLE
from spanwright.io.wireframe.report import Finding, Origin, TallyRow
from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.decimals import decimal
from spanwright.truss.errors import DrawingError
from spanwright.truss.tolerances import TOLERANCES

_RULES = frozenset({*RULE_OF_KIND.values(), "invisible"})


class DrawnMark(NamedTuple):
    """A mark: its kind, where it came from, and its place (3,) in drawing units."""

    kind: MarkKind
    origin: Origin
    at: FloatArray


@dataclass(frozen=True, eq=False)
class Drawn:
    """What was drawn, in drawing units and world axes.

    lines : (n, 2, 3). sources : (n,) indices into `origins`, never falling. marks : on the layers that the user named.
    open_ends : (index into `origins`, first point (3,), last point (3,)) of open polylines.
    layers : every layer that holds anything, as seen.
    """

    lines: FloatArray
    sources: IntArray
    origins: tuple[Origin, ...]
    marks: tuple[DrawnMark, ...]
    open_ends: tuple[tuple[int, FloatArray, FloatArray], ...]
    layers: frozenset[str]
    findings: tuple[Finding, ...]
    tally: tuple[TallyRow, ...]


class _Place(NamedTuple):
    """Where a content stands: (4, 4) matrix for row vectors, layer that layer 0 takes, names of the blocks around."""

    matrix: FloatArray
    layer: str
    blocks: tuple[str, ...]


def flatten(document: Drawing, options: Options) -> Drawn:
    """Take the drawing apart.

    Raises DrawingError for blocks that contain themselves, blocks too deep, more entities than the limit, and
    coordinates that are no finite numbers or absurdly large.
    """
    work = _Flattening(document, options)
    refuse_hostile_blocks(work.content, options.limits)
    work.place(work.content(""), _Place(np.eye(4), "0", ()))
    work.note_paper_space()
    return work.result()


class _Flattening:
    """The state of one flattening."""

    def __init__(self, document: Drawing, options: Options) -> None:
        self._document = document
        self._rules = LayerRules(document, options)
        self._contents: dict[str, Content] = {}
        self._lines: list[FloatArray] = []
        self._sources: list[IntArray] = []
        self._origins: list[Origin] = []
        self._marks: list[DrawnMark] = []
        self._open_ends: list[tuple[int, FloatArray, FloatArray]] = []
        self._counting = Counting()

    def content(self, block: str) -> Content:
        """Return the content of a block, or of model space for ""; each is read once."""
        key = block.casefold()
        if key not in self._contents:
            space = self._document.blocks.get(block) if block else self._document.modelspace()
            self._contents[key] = read_content(space or ())
        return self._contents[key]

    def place(self, content: Content, place: _Place) -> None:
        """Place a content and, through its inserts, all that is in it."""
        first = len(self._origins)
        shown = np.zeros(len(content.entities), dtype=bool)
        for position, entity in enumerate(content.entities):
            layer = place.layer if entity.layer == "0" else entity.layer
            origin = Origin(entity.handle, entity.kind, layer, place.blocks)
            self._origins.append(origin)
            shown[position] = self._take(entity, origin, place)
        keep = shown[content.owners]
        if keep.any():
            self._lines.append(_moved(content.lines[keep], place.matrix))
            self._sources.append(content.owners[keep] + first)
        self._place_details(content, place, first, shown)
        for position, insert in content.inserts:
            self._place_insert(insert, self._origins[first + position], place)

    def _place_details(self, content: Content, place: _Place, first: int, shown: np.ndarray) -> None:
        for position, start, end in content.open_ends:
            if shown[position]:
                ends = _moved(np.array([start, end]), place.matrix)
                self._open_ends.append((first + position, ends[0], ends[1]))
        for aside in content.asides:
            if shown[aside.entity]:
                at = _moved(np.array(aside.at), place.matrix)
                self._counting.say(self._origins[first + aside.entity], aside.code, aside.text, aside.done, at)

    def _take(self, entity: Entity, origin: Origin, place: _Place) -> bool:
        """Count an entity the way it goes, and take it if it is a mark; return whether its lines are bars."""
        if entity.use == "block":
            return False
        why_not = entity.use if entity.use in _RULES else self._rules.why_not(origin.layer)
        if why_not:
            self._counting.count(origin, "ignored by rule", why_not)
            return False
        mark = self._rules.mark(origin.layer)
        if entity.use == "bars" and not mark:
            self._counting.count(origin, "converted", "bars")
            return True
        at = _moved(np.array(entity.at), place.matrix) if entity.at else None
        if entity.use == "mark" and mark and at is not None:
            self._counting.count(origin, "converted", mark)
            self._marks.append(DrawnMark(mark, origin, at))
        else:
            about = f"marks of {mark} are points, circles or blocks" if mark else "it is no straight line"
            self._counting.not_understood(origin, "W-103", entity.about or about, at)
        return False

    def _place_insert(self, insert: Insert, origin: Origin, place: _Place) -> None:
        mark = self._rules.mark(origin.layer)
        why_not = self._rules.why_not(origin.layer) if mark else self._rules.hides_insert(origin.layer)
        if why_not:
            self._counting.count(origin, "ignored by rule", why_not)
            return
        try:
            trouble = "" if mark else why_not_apart(insert)
            points, matrices = insert_points(insert), insert_matrices(insert)
        except READER_TROUBLE as error:
            trouble = f"the insert is damaged ({type(error).__name__})"
        if trouble:
            self._counting.not_understood(origin, "W-107", trouble, None)
        elif mark:
            self._counting.count(origin, "converted", mark)
            self._marks += [DrawnMark(mark, origin, point) for point in _moved(points, place.matrix)]
        else:
            name = str(insert.dxf.name)
            self._counting.count(origin, "converted", "taken apart")
            for matrix in matrices:
                inner = _Place(_combined(matrix, place.matrix), origin.layer, (*place.blocks, name))
                self.place(self.content(name), inner)

    def note_paper_space(self) -> None:
        """Count what stands in paper space, which is never read."""
        for layout in self._document.layouts:
            if not layout.is_modelspace:
                for entity in layout:
                    if entity.dxftype() != "VIEWPORT":
                        found = record(entity, "paper space")
                        origin = Origin(found.handle, found.kind, found.layer)
                        self._counting.count(origin, "ignored by rule", found.use)

    def result(self) -> Drawn:
        """Return what was drawn, after a look at its coordinates."""
        lines = np.concatenate(self._lines) if self._lines else np.empty((0, 2, 3))
        sources = np.concatenate(self._sources) if self._sources else np.empty(0, dtype=np.intp)
        marks = np.array([mark.at for mark in self._marks]).reshape(-1, 3)
        _refuse_absurd(lines.reshape(-1, 6), [self._origins[source] for source in sources])
        _refuse_absurd(marks, [mark.origin for mark in self._marks])
        return Drawn(
            lines,
            sources,
            tuple(self._origins),
            tuple(self._marks),
            tuple(self._open_ends),
            frozenset(origin.layer for origin in self._origins),
            self._counting.findings,
            self._counting.tally,
        )


def _moved(points: FloatArray, matrix: FloatArray) -> FloatArray:
    """Return points (..., 3) moved by a matrix (4, 4) for row vectors; absurd numbers are refused later."""
    with np.errstate(invalid="ignore", over="ignore"):
        moved: FloatArray = points @ matrix[:3, :3] + matrix[3, :3]
    return moved


def _combined(inner: FloatArray, outer: FloatArray) -> FloatArray:
    with np.errstate(invalid="ignore", over="ignore"):
        combined: FloatArray = inner @ outer
    return combined


def _refuse_absurd(coordinates: FloatArray, origins: list[Origin]) -> None:
    """Raise DrawingError for the first row (n, 3 or 6) with a coordinate that is not finite or too large."""
    with np.errstate(invalid="ignore"):
        absurd = np.flatnonzero(~(np.abs(coordinates) <= TOLERANCES.farthest).all(axis=1))
    if absurd.size:
        row, origin = coordinates[absurd[0]], origins[absurd[0]]
        values = ", ".join(map(decimal, row.tolist()))
        raise DrawingError(
            f'{origin.kind} {origin.handle} on layer "{origin.layer}" has the coordinates {values}',
            "mend or delete it; coordinates must be finite and within 1e12 drawing units of the origin",
            entity=origin.handle,
            at=tuple(row.tolist()),
        )
