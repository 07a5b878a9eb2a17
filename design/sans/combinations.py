"""Effects and resistances for members with bending, evaluated only at the combinations that can govern.

Resistances do not depend on the combination. So a rule is evaluated only at the combinations that no other of the
same bar reaches in every effect, and then once more, for printing, at the one that governs.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, fields

import numpy as np

from spanwright.design.sans.interaction import InteractionRule
from spanwright.design.steps import Rule
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray


@dataclass(frozen=True, eq=False)
class Loads:
    """Effects by member and combination (b, c), or picked from these; forces >= 0, end moments sagging +."""

    compression: FloatArray
    sideways: FloatArray
    tension: FloatArray
    share: FloatArray
    moment: FloatArray
    smaller: FloatArray
    larger: FloatArray
    between: IntArray

    def at(self, bars: IntArray, combinations: IntArray) -> Loads:
        """Return the effects of these bars in these combinations; the two broadcast."""
        return Loads(*(getattr(self, entry.name)[bars, combinations] for entry in fields(self)))


@dataclass(frozen=True, eq=False)
class Resistances:
    """What members resist, and the properties that interaction needs; each (s, b), (s, 1) or (b,)."""

    effective_area: FloatArray
    gross_area: FloatArray
    fy: FloatArray
    tension: FloatArray
    in_plane: FloatArray
    sideways: FloatArray
    compressed: FloatArray
    stretched: FloatArray
    lateral: FloatArray
    section_modulus: FloatArray
    length: FloatArray
    inertia: FloatArray

    def of(self, bars: IntArray, count: int) -> Resistances:
        """Return those of these bars, of `count` in all; what is the same for all bars stays narrow."""
        values = (getattr(self, entry.name) for entry in fields(self))
        return Resistances(*(value[..., bars] if value.shape[-1] == count else value for value in values))


@dataclass(frozen=True, eq=False)
class Kept:
    """The combinations worth evaluating, flat and sorted by bar, with effects and resistances picked for them."""

    bars: IntArray
    combinations: IntArray
    loads: Loads
    resistances: Resistances


Maker = Callable[[Loads, Resistances], tuple[Rule, ...]]


def undominated(valid: BoolArray, measures: tuple[FloatArray, ...]) -> BoolArray:
    """Return (b, c) the combinations that no other of the same bar reaches or exceeds in every measure (b, c).

    A ratio that grows with every measure is greatest at one of them, whatever the section. Of equal ones the first
    is kept.
    """
    keep = np.zeros_like(valid)
    bars = np.flatnonzero(valid.any(axis=1))
    some = valid[bars]
    reaches = np.broadcast_to(some[:, :, None], (*some.shape, some.shape[1])).copy()  # (b, other, this)
    for measure in measures:
        values = measure[bars]
        reaches &= values[:, :, None] >= values[:, None, :]
    later = np.tri(some.shape[1], k=-1, dtype=np.bool_)  # other after this
    beaten = reaches & ~(reaches.transpose(0, 2, 1) & later)
    np.einsum("bcc->bc", beaten)[:] = False
    keep[bars] = some & ~beaten.any(axis=1)
    return keep


def kept_of(keep: BoolArray, loads: Loads, resistances: Resistances) -> Kept:
    """Pick effects and resistances for the combinations (b, c) worth evaluating."""
    bars, combinations = np.nonzero(keep)
    return Kept(bars, combinations, loads.at(bars, combinations), resistances.of(bars, keep.shape[0]))


def governing_of(make: Maker, kept: Kept, shape: tuple[int, int]) -> tuple[FloatArray, IntArray]:
    """Return (s, b) the greatest ratio over the kept combinations and the one that governs; 0 and -1 where none is."""
    ratio, governing = np.zeros(shape), np.full(shape, -1)
    if kept.bars.size == 0:
        return ratio, governing
    values = _ratio(make(kept.loads, kept.resistances))
    bars, starts, counts = np.unique(kept.bars, return_index=True, return_counts=True)
    ratio[:, bars] = np.maximum.reduceat(values, starts, axis=1)
    greatest = values == np.repeat(ratio[:, bars], counts, axis=1)
    first = np.minimum.reduceat(np.where(greatest, np.arange(kept.bars.size), kept.bars.size), starts, axis=1)
    governing[:, bars] = kept.combinations[first]
    return ratio, np.where(ratio > 0.0, governing, -1)


def _ratio(rules: tuple[Rule, ...]) -> FloatArray:
    last = rules[-1]
    if not isinstance(last, InteractionRule):
        raise TypeError(f"{type(last).__name__} has no ratio")
    return last.ratio
