"""Limits: slenderness (cl. 10.4.2), spacing of packs (cl. 19), bolts that fit. Pass or fail, no utilisation."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.back_marks import CLAUSE as BACK_MARKS
from spanwright.design.back_marks import bolt_fit
from spanwright.design.sans.built_up import TIE_SPACING, StrutPacks, TiePacks, pair_slenderness
from spanwright.design.sans.case import Case
from spanwright.design.sans.checking import limit_check
from spanwright.design.sans.constants import number
from spanwright.design.sans.effects import column
from spanwright.design.sans.one_leg import CLAUSE
from spanwright.design.sans.struts import one_leg, one_leg_applies, pair_sideways
from spanwright.design.sans.ties import TUBES
from spanwright.design.standard import Check
from spanwright.design.steps import Rule, given, step
from spanwright.truss.arrays import FloatArray

COMPRESSION = number("slenderness", "compression")
TENSION = number("slenderness", "tension")


@dataclass(frozen=True, eq=False)
class Slenderness(Rule):
    """Slenderness about one axis against its limit: 200 for every member that sees compression, else 300."""

    length: FloatArray = given("KL", "mm", "effective length")
    radius: FloatArray = given("r", "mm", "radius of gyration for this way of buckling")
    limit: FloatArray = given("limit", "-", "greatest slenderness", "10.4.2")

    @step("KL_r", "-", "10.4.2", "KL/r", "slenderness")
    def slenderness(self) -> FloatArray:
        return self.length / self.radius

    @step("ratio", "-", "10.4.2", "KL_r/limit", "slenderness over its limit")
    def ratio(self) -> FloatArray:
        return self.slenderness / self.limit


def limit_checks(case: Case) -> tuple[Check, ...]:
    """Return the slenderness limits of the family, for pairs the spacing of packs, and whether bolts fit the leg."""
    return (*_slender(case), *_bolts(case))


def _slender(case: Case) -> tuple[Check, ...]:
    if case.candidates.family == "L":
        return _minor_axis(case), _one_leg(case)
    if case.candidates.family == "2L star":
        return _minor_axis(case), *_spacing(case)
    checks = (
        _slenderness("slenderness in plane", case, case.demand.in_plane, case.candidates.radius_in),
        _slenderness("slenderness out of plane", case, case.demand.out_of_plane, case.candidates.radius_out),
    )
    return (*checks, _equivalent(case), *_spacing(case)) if case.candidates.family == "2L" else checks


def _limit(case: Case) -> FloatArray:
    return np.where(case.effects.compressed, COMPRESSION, TENSION)


def _slenderness(name: str, case: Case, length: FloatArray, radius: FloatArray) -> Check:
    rule = Slenderness(length, column(radius), _limit(case))
    return limit_check(name, "10.4.2", rule.slenderness, rule.limit, (rule,), case.shape)


def _minor_axis(case: Case) -> Check:
    return _slenderness("slenderness, minor axis", case, case.demand.minor, case.candidates.radius_minor)


def _one_leg(case: Case) -> Check:
    stress = one_leg(case).stress
    name = "slenderness, connected by one leg"
    applies = one_leg_applies(case) & case.effects.compressed
    return limit_check(name, CLAUSE, stress.slenderness, COMPRESSION, (stress,), case.shape, applies)


def _equivalent(case: Case) -> Check:
    """The equivalent slenderness of a pair counts towards the limit too (the safe reading)."""
    stress = pair_sideways(case).stress
    name = "slenderness out of plane, equivalent"
    compressed = case.effects.compressed
    return limit_check(name, "19.1.4", stress.slenderness, COMPRESSION, (stress,), case.shape, compressed)


def _spacing(case: Case) -> tuple[Check, Check]:
    radius = column(case.candidates.piece_radius_minor)
    first, second = pair_slenderness(case.candidates, case.demand)
    strut = StrutPacks(case.demand.panel, case.packs, radius, first, second)
    tie = TiePacks(case.demand.panel, case.packs, radius)
    compressed, shape = case.effects.compressed, case.shape
    name = "spacing of packs"
    return (
        limit_check(name, "19.1", strut.slenderness, strut.limit, (strut,), shape, compressed),
        limit_check(f"{name}, tie", "19.2", tie.slenderness, TIE_SPACING, (tie,), shape, ~compressed),
    )


def _bolts(case: Case) -> tuple[Check, ...]:
    """Return the check of angles with bolted ends; bolts of tubes stand in plates, which belong to the joint."""
    ends = case.demand.ends
    if ends.kind != "bolted" or case.candidates.family in TUBES:
        return ()
    rule = bolt_fit(column(case.candidates.leg_connected), ends.bolt_diameter)
    diameter = np.asarray(rule.diameter)
    name = "bolt fits the connected leg"
    return (limit_check(name, BACK_MARKS, diameter, rule.greatest, (rule,), case.shape, unit="mm"),)
