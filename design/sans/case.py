"""What all checks of one call share: candidates, demand, its reduced effects, section class and packs."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.sans.built_up import pair_packs, refuse_loose_ends
from spanwright.design.sans.classes import AngleClass, CompressionClass, RectangularClass, RoundClass
from spanwright.design.sans.constants import number
from spanwright.design.sans.effects import Effects, column, effects_of
from spanwright.design.standard import Demand
from spanwright.truss.arrays import FloatArray, IntArray

GENERAL = number("column", "n")
HOT_FORMED = number("column", "n_hot_formed")


@dataclass(frozen=True, eq=False)
class Case:
    """Candidates (s) for members (b).

    exponent : (s, 1) n of the column curve for flexural buckling. packs : (s, b), 0 for single sections.
    """

    candidates: Candidates
    demand: Demand
    effects: Effects
    section_class: CompressionClass
    exponent: FloatArray
    packs: IntArray

    @property
    def shape(self) -> tuple[int, int]:
        """(sections, bars)."""
        return len(self.candidates), len(self.demand.bars)

    @property
    def fy(self) -> FloatArray:
        """(s, 1) yield stress, MPa."""
        return column(self.candidates.steel_fy)


def case_of(candidates: Candidates, demand: Demand, *, hot_formed_tubes: bool) -> Case:
    """Gather what all checks share; `hot_formed_tubes` lets hot-finished tubes use their better column curve.

    Raises InputError for a compressed pair whose ends do not act together.
    """
    effects = effects_of(demand)
    section_class = compression_class(candidates)
    packs = np.zeros((len(candidates), len(demand.bars)), dtype=np.intp)
    if isinstance(section_class, AngleClass) and candidates.pieces > 1:
        refuse_loose_ends(demand, effects)
        packs = pair_packs(candidates, demand, effects, section_class)
    better = column(candidates.hot) & hot_formed_tubes
    return Case(candidates, demand, effects, section_class, np.where(better, HOT_FORMED, GENERAL), packs)


def compression_class(candidates: Candidates) -> CompressionClass:
    """Return the class rule of a family, arrays (s, 1)."""
    area, fy = column(candidates.area), column(candidates.steel_fy)
    depth, width = column(candidates.leg_connected), column(candidates.leg_outstanding)
    thickness = column(candidates.thickness)
    if candidates.family == "CHS":
        return RoundClass(area, depth, thickness, fy)
    if candidates.family in ("SHS", "RHS"):
        return RectangularClass(area, depth, width, thickness, fy)
    return AngleClass(area, candidates.pieces, depth, width, thickness, fy)
