"""Checks of members with bending in the plane: each sense against each axial force, by 13.8 and 13.9."""

from __future__ import annotations

import numpy as np

from spanwright.design.sans.bending import (
    EquivalentMoment,
    LateralMoment,
    MomentRule,
    PairLateral,
    PairMoment,
    RectangularMoment,
    RoundMoment,
    TubeLateral,
)
from spanwright.design.sans.case import Case
from spanwright.design.sans.checking import sum_check
from spanwright.design.sans.combinations import Kept, Loads, Maker, Resistances, governing_of, kept_of, undominated
from spanwright.design.sans.compression import MODULUS, PHI, SHEAR_MODULUS, Flexural, SinglySymmetric
from spanwright.design.sans.effects import column
from spanwright.design.sans.interaction import (
    CrossSection,
    MemberInteraction,
    SecondOrder,
    StretchedFibre,
    TensionInteraction,
    TensionRelief,
)
from spanwright.design.sans.struts import Route, in_plane, pair_sideways, tube_sideways
from spanwright.design.standard import Check
from spanwright.design.steps import Rule
from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.errors import InputError


def bending_checks(case: Case, tension_resistance: FloatArray) -> tuple[Check, ...]:
    """Return the checks of axial force with bending, none where no member has a moment.

    tension_resistance : (s, b) or narrower, N.
    Raises InputError for single and starred angles with a moment: their bending is about inclined axes.
    """
    if not case.effects.bent:
        return ()
    _refuse_inclined(case)
    d = case.demand
    heel_up = np.ones(1, dtype=np.bool_) if d.heel_up is None else d.heel_up
    plane = in_plane(case)
    across = pair_sideways(case) if case.candidates.family == "2L" else tube_sideways(case)
    return (
        *_sense_checks(case, "sagging", d.sag, heel_up, plane, across, tension_resistance),
        *_sense_checks(case, "hogging", d.hog, ~heel_up, plane, across, tension_resistance),
    )


def _sense_checks(
    case: Case,
    sense: str,
    moment: FloatArray,
    heel_compressed: BoolArray,
    plane: Route[Flexural],
    across: Route[Flexural] | Route[SinglySymmetric],
    tension_resistance: FloatArray,
) -> tuple[Check, ...]:
    strength = _strength(case, heel_compressed)
    lateral = _lateral(case, heel_compressed)
    reduced = LateralMoment(lateral.critical, strength.capacity, PHI)
    loads = _loads(case, moment)
    resistances = Resistances(
        effective_area=case.section_class.effective_area,
        gross_area=column(case.candidates.area),
        fy=case.fy,
        tension=tension_resistance,
        in_plane=plane.curve.resistance,
        sideways=across.curve.resistance,
        compressed=strength.resistance_compressed,
        stretched=strength.resistance_stretched,
        lateral=reduced.resistance,
        section_modulus=strength.modulus,
        length=case.demand.in_plane,
        inertia=column(case.candidates.inertia_in),
    )
    own, twist = (case.section_class, strength), (lateral, reduced)
    pressed = kept_of(_with_compression(case, loads), loads, resistances)
    pulled = kept_of(_with_tension(case, loads), loads, resistances)
    in_plane_rules, sideways_rules = (plane.stress, plane.curve), (across.stress, across.curve)

    def check(name: str, clause: str, kept: Kept, make: Maker, *before: Rule) -> Check:
        ratio, governing = governing_of(make, kept, case.shape)
        last = make(loads.at(np.arange(case.shape[1]), np.maximum(governing, 0)), resistances)
        return sum_check(name, clause, ratio, governing, (*before, *last), case.shape)

    compression = f"compression and {sense}"
    return (
        check(f"{compression}, cross-section", "13.8.3", pressed, _cross_section, *own),
        check(f"{compression}, in plane", "13.8.3", pressed, _in_plane, *own, *in_plane_rules),
        check(f"{compression}, out of plane", "13.8.3", pressed, _out_of_plane, *own, *sideways_rules, *twist),
        check(f"{compression}, stretched fibre", "13.8.3", pressed, _stretched, *own),
        check(f"tension and {sense}, stretched fibre", "13.9", pulled, _pulled, *own),
        check(f"tension and {sense}, compressed fibre", "13.9", pulled, _relieved, *own, *twist),
    )


def _with_compression(case: Case, loads: Loads) -> BoolArray:
    """Return (b, c) the combinations to evaluate with compression; every rule there grows with each measure."""
    valid = (loads.moment > 0.0) & ((loads.tension == 0.0) | (loads.sideways > 0.0))
    measures = (loads.compression, loads.sideways, loads.moment, _diagram(loads).factor)
    reduced = (-loads.share,) if np.any(loads.share < 1.0) else ()
    return _worth_evaluating(case, valid, (*measures, *reduced))


def _with_tension(case: Case, loads: Loads) -> BoolArray:
    """Return (b, c) the combinations to evaluate with tension: one rule grows with the force, one falls with it."""
    valid = (loads.moment > 0.0) & (loads.tension > 0.0)
    most = _worth_evaluating(case, valid, (loads.tension, loads.moment))
    return most | _worth_evaluating(case, valid, (-loads.tension, loads.moment))


def _worth_evaluating(case: Case, valid: BoolArray, measures: tuple[FloatArray, ...]) -> BoolArray:
    """Drop the combinations that others reach in every measure; with few sections that costs more than it saves."""
    sections, combinations = case.shape[0], valid.shape[1]
    return undominated(valid, measures) if sections > combinations else valid


def _loads(case: Case, moment: FloatArray) -> Loads:
    """Gather the effects. A span moment above both end moments shows a load between, whatever is stated."""
    d = case.demand
    left, right = d.end_moments[:, 0], d.end_moments[:, 1]
    left_larger = np.abs(left) >= np.abs(right)
    larger, smaller = np.where(left_larger, left, right), np.where(left_larger, right, left)
    in_span = np.maximum(d.sag, d.hog) > np.abs(larger)
    stated = np.broadcast_to(d.point_loads[:, None], larger.shape)
    return Loads(
        compression=np.maximum(-d.axial, 0.0),
        sideways=np.maximum(d.sideways, -d.axial),
        tension=np.maximum(d.axial, 0.0),
        share=case.effects.shares,
        moment=moment,
        smaller=smaller,
        larger=larger,
        between=np.where(in_span & (stated == 0), 2, stated),
    )


def _diagram(loads: Loads) -> EquivalentMoment:
    return EquivalentMoment(loads.smaller, loads.larger, loads.between)


def _second_order(loads: Loads, r: Resistances) -> tuple[EquivalentMoment, SecondOrder]:
    diagram = _diagram(loads)
    return diagram, SecondOrder(loads.compression, diagram.factor, r.length, r.inertia, MODULUS, PHI)


def _cross_section(loads: Loads, r: Resistances) -> tuple[Rule, ...]:
    return (CrossSection(loads.compression, loads.share, r.effective_area, r.fy, loads.moment, r.compressed, PHI),)


def _in_plane(loads: Loads, r: Resistances) -> tuple[Rule, ...]:
    diagram, second = _second_order(loads, r)
    force = loads.compression
    return (
        diagram,
        second,
        MemberInteraction(force, loads.share, r.in_plane, loads.moment, second.factor, r.compressed),
    )


def _out_of_plane(loads: Loads, r: Resistances) -> tuple[Rule, ...]:
    diagram, second = _second_order(loads, r)
    force = loads.sideways
    return diagram, second, MemberInteraction(force, loads.share, r.sideways, loads.moment, second.factor, r.lateral)


def _stretched(loads: Loads, r: Resistances) -> tuple[Rule, ...]:
    diagram, second = _second_order(loads, r)
    return diagram, second, StretchedFibre(loads.moment, second.factor, r.stretched)


def _pulled(loads: Loads, r: Resistances) -> tuple[Rule, ...]:
    return (TensionInteraction(loads.tension, r.tension, loads.moment, r.stretched),)


def _relieved(loads: Loads, r: Resistances) -> tuple[Rule, ...]:
    return (TensionRelief(loads.tension, loads.moment, r.lateral, r.section_modulus, r.gross_area),)


def _strength(case: Case, heel_compressed: BoolArray) -> MomentRule:
    c = case.candidates
    heel, toe = column(c.modulus_heel), column(c.modulus_toe)
    depth, width, thickness = column(c.leg_connected), column(c.leg_outstanding), column(c.thickness)
    if c.family == "2L":
        compressed, stretched = np.where(heel_compressed, heel, toe), np.where(heel_compressed, toe, heel)
        return PairMoment(compressed, stretched, depth, width, thickness, case.fy, PHI)
    elastic, plastic = np.minimum(heel, toe), column(c.modulus_plastic)
    if c.family == "CHS":
        return RoundMoment(plastic, elastic, depth, thickness, case.fy, PHI)
    return RectangularMoment(plastic, elastic, depth, width, thickness, case.fy, PHI)


def _lateral(case: Case, heel_compressed: BoolArray) -> PairLateral | TubeLateral:
    c, d = case.candidates, case.demand
    length = np.maximum(d.out_of_plane, d.torsional)
    inertia, torsion = column(c.inertia_out), column(c.torsion)
    if c.family == "2L":
        toes_stretched = np.where(heel_compressed, 1.0, -1.0)
        return PairLateral(length, inertia, torsion, column(c.depth), toes_stretched, MODULUS)
    return TubeLateral(length, inertia, torsion, MODULUS, SHEAR_MODULUS)


def _refuse_inclined(case: Case) -> None:
    if case.candidates.family not in ("L", "2L star"):
        return
    largest = np.maximum(case.demand.sag, case.demand.hog).max(axis=1)
    bar = case.demand.bars[int(np.argmax(largest))]
    raise InputError(
        f"{bar} bends between its joints, and {case.candidates.family} is not designed for bending",
        "choose 2L or a tube for it, or let loads come in at the joints only",
        "members",
    )
