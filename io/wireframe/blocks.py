"""Inserts of blocks: where their parts come to stand, and which are refused."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from ezdxf.entities.insert import Insert
from ezdxf.math import Vec3

from spanwright.io.wireframe.content import Content
from spanwright.io.wireframe.options import Limits
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import DrawingError

ContentOf = Callable[[str], Content]


def insert_matrices(insert: Insert) -> FloatArray:
    """Return the matrices (k, 4, 4), for row vectors, that place a block's parts; k copies where it is an array."""
    offsets = _offsets(insert)
    matrices = np.tile(np.array(list(insert.matrix44())).reshape(4, 4), (len(offsets), 1, 1))
    matrices[:, 3, :3] += offsets
    return matrices


def insert_points(insert: Insert) -> FloatArray:
    """Return the insertion points (k, 3) of a block and its copies, in the axes of the space it is inserted in."""
    point = np.array(insert.ocs().to_wcs(Vec3(insert.dxf.insert)).xyz)
    return point + _offsets(insert)


def why_not_apart(insert: Insert) -> str:
    """Return why a block cannot be taken apart, or ""."""
    block = insert.block()
    if block is None:
        return f'block "{insert.dxf.get("name", "")}" is not in the drawing'
    if block.block_record.is_xref:
        return f'block "{insert.dxf.name}" is another drawing (external reference); bind it first'
    return ""


def refuse_hostile_blocks(content_of: ContentOf, limits: Limits) -> None:
    """Raise DrawingError for blocks that contain themselves, stand too deep in each other, or make too many entities.

    content_of : name of a block to its content; "" is model space. Nothing is taken apart for this.
    """
    _Census(content_of, limits).count("", ())


class _Census:
    """Counts entities as if all blocks were taken apart, each block once."""

    def __init__(self, content_of: ContentOf, limits: Limits) -> None:
        self._content_of = content_of
        self._limits = limits
        self._known: dict[str, tuple[int, int]] = {}

    def count(self, block: str, around: tuple[str, ...]) -> tuple[int, int]:
        """Return how many entities a block makes, and how many levels of blocks are in it."""
        if block in self._known:
            return self._known[block]
        entities, levels = 0, 0
        content = self._content_of(block)
        for position, insert in content.inserts:
            if why_not_apart(insert):
                continue
            inner = str(insert.dxf.name).casefold()
            handle = content.entities[position].handle
            self._refuse_circle(inner, (*around, block), handle)
            if len(around) >= self._limits.depth:
                raise self._too_deep(handle)
            parts, below = self.count(inner, (*around, block))
            entities += _copies(insert) * (parts + 1)
            levels = max(levels, below + 1)
        entities += max(len(content.entities), len(content.lines))
        if len(around) + levels > self._limits.depth:
            raise self._too_deep(content.inserts[0][1].dxf.handle)
        if entities > self._limits.entities:
            what = f'block "{block}"' if block else "the drawing"
            raise DrawingError(
                f"{what} holds {entities} entities with those in blocks; at most {self._limits.entities} are read",
                "save the truss alone in a drawing of its own",
            )
        self._known[block] = entities, levels
        return entities, levels

    def _refuse_circle(self, inner: str, path: tuple[str, ...], handle: str) -> None:
        if inner in path:
            circle = " in ".join(f'"{name}"' for name in (inner, *reversed(path[path.index(inner) :])))
            raise DrawingError(f"a block contains itself: {circle}", "take the insert out", entity=handle)

    def _too_deep(self, handle: str) -> DrawingError:
        found = f"blocks stand more than {self._limits.depth} deep in each other"
        return DrawingError(found, "explode the outer blocks", entity=handle)


def _copies(insert: Insert) -> int:
    rows, columns = _grid(insert)
    return rows * columns


def _grid(insert: Insert) -> tuple[int, int]:
    """Return how many rows and columns stand apart; copies with no spacing lie on each other and count once."""
    dxf = insert.dxf
    rows = max(1, dxf.row_count) if dxf.row_spacing else 1
    columns = max(1, dxf.column_count) if dxf.column_spacing else 1
    return rows, columns


def _offsets(insert: Insert) -> FloatArray:
    """Return the shifts (k, 3) of the copies: spacings are not scaled, but turn with the block."""
    rows, columns = _grid(insert)
    dxf, ocs = insert.dxf, insert.ocs()
    along = Vec3(dxf.column_spacing, 0).rotate_deg(dxf.rotation)
    across = Vec3(0, dxf.row_spacing).rotate_deg(dxf.rotation)
    steps = np.array([ocs.to_wcs(along).xyz, ocs.to_wcs(across).xyz])
    column, row = np.meshgrid(np.arange(columns), np.arange(rows))
    counts = np.column_stack([column.ravel(), row.ravel()]).astype(float)
    shifts: FloatArray = counts @ steps
    return shifts
