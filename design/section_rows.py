"""Every section of a family, each way round, with its shape computed once.

Ways round: of a pair with unequal legs either the long or the short legs stand together against the gusset, in the
plane of the truss; of a single unequal angle either leg is connected; a rectangular tube stands upright or flat.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from itertools import compress

import numpy as np

from spanwright.design.candidates import Family
from spanwright.design.catalogue import Catalogue, Tubes
from spanwright.design.shapes import AngleShape, angle_shape
from spanwright.design.tubes import TubeShape, rectangular_tube, round_tube
from spanwright.truss.arrays import BoolArray, FloatArray


@dataclass(frozen=True, eq=False)
class AngleRows:
    """Single angles (s), the leg that is to lie in the plane of the truss upright.

    sizes, ways : "100x75x8" and "long" or "short" for the upright leg ("" for equal legs).
    stock : stock mark. market : where the marks of its table come from ("" = that table has none).
    """

    shape: AngleShape
    sizes: tuple[str, ...]
    ways: tuple[str, ...]
    stock: tuple[str, ...]
    market: tuple[str, ...]

    def take(self, keep: BoolArray) -> AngleRows:
        """Return the rows where `keep` is True."""
        shape = AngleShape(**{name: values[keep] for name, values in vars(self.shape).items()})
        texts = (tuple(compress(texts, keep)) for texts in (self.sizes, self.ways, self.stock, self.market))
        return AngleRows(shape, *texts)


@dataclass(frozen=True, eq=False)
class TubeRows:
    """Hollow sections (s). ways : "upright", "flat" or "" where both are the same. hot : hot finished."""

    shape: TubeShape
    sizes: tuple[str, ...]
    ways: tuple[str, ...]
    hot: BoolArray

    def take(self, keep: BoolArray) -> TubeRows:
        """Return the rows where `keep` is True."""
        shape = TubeShape(**{name: values[keep] for name, values in vars(self.shape).items()})
        return TubeRows(shape, tuple(compress(self.sizes, keep)), tuple(compress(self.ways, keep)), self.hot[keep])


@lru_cache(maxsize=8)
def angle_rows(catalogue: Catalogue, *, equal_only: bool) -> AngleRows:
    """Return the angles of a catalogue; unequal ones follow, each with its long and then its short leg upright."""
    equal, unequal = catalogue.equal_angles, catalogue.unequal_angles
    tables = [equal] if equal_only else [equal, unequal, unequal]
    counts = [len(table.stock) for table in tables]
    long, short = _joined([t.long for t in tables]), _joined([t.short for t in tables])
    thickness = _joined([t.thickness for t in tables])
    turned = np.arange(sum(counts)) >= sum(counts[:2])
    return AngleRows(
        shape=angle_shape(
            np.where(turned, short, long),
            np.where(turned, long, short),
            thickness,
            _joined([t.root for t in tables]),
            _joined([t.toe for t in tables]),
        ),
        sizes=tuple(map(size_text, long, short, thickness)),
        ways=tuple(way for way, count in zip(("", "long", "short"), counts, strict=False) for _ in range(count)),
        stock=tuple(mark for table in tables for mark in table.stock),
        market=tuple(table.market for table in tables for _ in table.stock),
    )


@lru_cache(maxsize=8)
def tube_rows(catalogue: Catalogue, family: Family) -> TubeRows:
    """Return the hollow sections of a family; rectangular ones twice, all upright and then all flat."""
    if family == "CHS":
        round_ = catalogue.chs
        sizes = tuple(map(size_text, round_.depth, round_.thickness))
        return TubeRows(round_tube(round_.depth, round_.thickness), sizes, ("",) * len(sizes), round_.hot)
    if family == "SHS":
        return _rectangular(catalogue.shs, ("",))
    return _rectangular(catalogue.rhs, ("upright", "flat"))


def _rectangular(table: Tubes, ways: tuple[str, ...]) -> TubeRows:
    sizes = tuple(map(size_text, table.depth, table.width, table.thickness))
    count = len(ways)
    shape = rectangular_tube(
        _joined([table.depth, table.width][:count]),
        _joined([table.width, table.depth][:count]),
        np.tile(table.thickness, count),
        np.tile(table.outer, count),
        np.tile(table.inner, count),
    )
    return TubeRows(shape, sizes * count, tuple(w for w in ways for _ in sizes), np.tile(table.hot, count))


def size_text(*lengths: float) -> str:
    """Return lengths in mm as ISO 5261 writes them in a section name: "76.1x3.6"."""
    return "x".join(f"{length:g}" for length in lengths)


def _joined(columns: list[FloatArray]) -> FloatArray:
    return np.concatenate(columns)
