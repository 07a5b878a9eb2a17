"""Pairs of angles joined by packs (cl. 19): number of packs, their spacing, one angle between them."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.sans.classes import AngleClass
from spanwright.design.sans.compression import MODULUS, PHI, ColumnCurve, Flexural
from spanwright.design.sans.constants import number
from spanwright.design.sans.effects import Effects, column
from spanwright.design.standard import Demand
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.errors import InputError

TIE_SPACING = number("built_up", "tie_spacing")
STAR_PACKS, TIE_PACKS = number("built_up", "star_packs"), number("built_up", "tie_packs")
MOST_PACKS = number("built_up", "most_packs")
END_BOLTS = number("built_up", "end_bolts")
EXPONENT = number("column", "n")


@dataclass(frozen=True, eq=False)
class StrutPacks(Rule):
    """Spacing of packs in a pair that sees compression (19.1)."""

    panel: FloatArray = given("L_p", "mm", "panel, joint to joint")
    packs: IntArray = given("n_p", "-", "packs between the joints")
    piece_radius: FloatArray = given("r_1", "mm", "least radius of gyration of one angle")
    slenderness_first: FloatArray = given("lam_1", "-", "slenderness of the pair, in plane (star: minor axis)")
    slenderness_second: FloatArray = given("rho_0", "-", "slenderness of the pair acting as one, sideways")

    @step("a", "mm", "19.1", "L_p/(n_p + 1)", "distance between packs")
    def spacing(self) -> FloatArray:
        return self.panel / (self.packs + 1)

    @step("a_r", "-", "19.1", "a/r_1", "slenderness of one angle between packs")
    def slenderness(self) -> FloatArray:
        return self.spacing / self.piece_radius

    @step("limit", "-", "19.1", "max(lam_1, rho_0)", "greatest slenderness of the pair")
    def limit(self) -> FloatArray:
        return np.maximum(self.slenderness_first, self.slenderness_second)

    @step("ratio", "-", "19.1", "a_r/limit", "spacing over its limit")
    def ratio(self) -> FloatArray:
        return self.slenderness / self.limit


@dataclass(frozen=True, eq=False)
class TiePacks(Rule):
    """Spacing of packs in a pair that sees tension only (19.2)."""

    panel: FloatArray = given("L_p", "mm", "panel, joint to joint")
    packs: IntArray = given("n_p", "-", "packs between the joints")
    piece_radius: FloatArray = given("r_1", "mm", "least radius of gyration of one angle")

    @step("a", "mm", "19.2", "L_p/(n_p + 1)", "distance between packs")
    def spacing(self) -> FloatArray:
        return self.panel / (self.packs + 1)

    @step("a_r", "-", "19.2", "a/r_1", "slenderness of one angle between packs")
    def slenderness(self) -> FloatArray:
        return self.spacing / self.piece_radius

    @step("ratio", "-", "19.2", f"a_r/{TIE_SPACING:g}", "spacing over its limit")
    def ratio(self) -> FloatArray:
        return self.slenderness / TIE_SPACING


@dataclass(frozen=True, eq=False)
class Share(Rule):
    """One angle of a pair carries half of it."""

    pair_force: FloatArray = given("C_p", "N", "factored compression in the pair")
    pair_area: FloatArray = given("A_ep", "mm2", "effective area of the pair")

    @step("C_u", "N", "19.1", "C_p/2", "factored compression in one angle")
    def force(self) -> FloatArray:
        return self.pair_force / 2.0

    @step("A_e", "mm2", "19.1", "A_ep/2", "effective area of one angle")
    def area(self) -> FloatArray:
        return self.pair_area / 2.0


@dataclass(frozen=True, eq=False)
class Pair:
    """The rules of one angle between packs, at the number of packs that was found: arrays (s, b)."""

    packs: IntArray
    spacing: FloatArray
    share: Share
    buckling: Flexural
    resistance: ColumnCurve


def pair_slenderness(candidates: Candidates, demand: Demand) -> tuple[FloatArray, FloatArray]:
    """Return (s, b) the plain slenderness in plane and sideways; of a starred pair about its minor axis, twice."""
    if candidates.family == "2L star":
        minor = demand.minor / column(candidates.radius_minor)
        return minor, minor
    return demand.in_plane / column(candidates.radius_in), demand.out_of_plane / column(candidates.radius_out)


def pair_packs(candidates: Candidates, demand: Demand, effects: Effects, section_class: AngleClass) -> IntArray:
    """Return (s, b) packs between the joints.

    Where the member sees compression: the stated number, raised until the spacing keeps within the slenderness of the
    pair and one angle between packs carries its half; raised no further than the standard object's greatest number,
    nor where more packs cannot help. In ties at least one, and within the spacing limit of ties.
    """
    radius = column(candidates.piece_radius_minor)
    in_plane, sideways = pair_slenderness(candidates, demand)
    by_rule = radius * np.maximum(in_plane, sideways)
    by_strength = _longest_piece(candidates, effects, section_class, radius)
    least = max(demand.packs.per_panel, int(STAR_PACKS) if candidates.family == "2L star" else 0)
    struts = np.maximum(_packs_within(demand.panel, np.minimum(by_rule, by_strength)), least)
    ties = np.maximum(_packs_within(demand.panel, TIE_SPACING * radius), int(TIE_PACKS))
    return np.where(effects.compressed, struts, ties)


def _longest_piece(
    candidates: Candidates, effects: Effects, section_class: AngleClass, radius: FloatArray
) -> FloatArray:
    """Return (s, b) mm, the longest angle that carries half of the compression; infinite where no spacing does."""
    stub = PHI * section_class.effective_area * column(candidates.steel_fy)
    share = effects.own.force / (effects.own.share * stub)
    helps = (share > 0.0) & (share < 1.0)
    share = np.where(helps, share, 1.0)
    # the column curve of 13.3.1 solved for its slenderness
    slenderness = (1.0 - share**EXPONENT) ** (0.5 / EXPONENT) / np.sqrt(share)
    length = slenderness * radius * np.pi * np.sqrt(MODULUS / column(candidates.steel_fy))
    return np.where(helps, length, np.inf)


def _packs_within(panel: FloatArray, longest: FloatArray) -> IntArray:
    """Return how many packs keep every part of the panel within the longest, but not more than the greatest number."""
    packs = np.clip(np.ceil(panel / longest) - 1.0, 0.0, MOST_PACKS)
    # a quotient rounded down leaves a part too long by its last digit
    packs += (panel / (packs + 1.0) > longest) & (packs < MOST_PACKS)
    return packs.astype(np.intp)


def pair_between_packs(
    candidates: Candidates, demand: Demand, effects: Effects, section_class: AngleClass, packs: IntArray
) -> Pair:
    """Return the rules of one angle between packs; flexure about its minor axis over the spacing.

    Torsion of one angle needs no check of its own: the pair has the lower torsional stress.
    """
    spacing = demand.panel / (packs + 1)
    share = Share(effects.own.force, section_class.effective_area)
    buckling = Flexural(spacing, column(candidates.piece_radius_minor), MODULUS)
    resistance = ColumnCurve(share.area, column(candidates.steel_fy), buckling.elastic_stress, EXPONENT, PHI)
    return Pair(packs, spacing, share, buckling, resistance)


def refuse_loose_ends(demand: Demand, effects: Effects) -> None:
    """Raise InputError where the angles of a compressed pair do not act together at their ends."""
    if demand.ends.kind == "bolted" and demand.ends.bolts < END_BOLTS and effects.compressed.any():
        bar = demand.bars[int(np.argmax(effects.compressed))]
        raise InputError(
            f"{demand.ends.bolts} bolt at the ends of {bar}, a pair of angles in compression",
            f"a pair acts as one only if its ends are welded or have at least {END_BOLTS:g} bolts (cl. 19.1)",
            "connections.bolts",
        )
