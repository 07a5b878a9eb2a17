"""Checks in compression by family: which ways of buckling a section has, and with which length and force."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Generic, TypeVar

import numpy as np

from spanwright.design.sans.built_up import pair_between_packs
from spanwright.design.sans.case import GENERAL, Case
from spanwright.design.sans.checking import strength_check, sum_check
from spanwright.design.sans.classes import AngleClass
from spanwright.design.sans.compression import (
    MODULUS,
    PHI,
    SHEAR_MODULUS,
    ColumnCurve,
    CompressionRatio,
    DoublySymmetric,
    Flexural,
    SinglySymmetric,
    Unsymmetric,
)
from spanwright.design.sans.effects import Worst, column
from spanwright.design.sans.one_leg import CLAUSE, LEAST_BOLTS, LEG_RATIO, EccentricAngle, OneLeg
from spanwright.design.standard import Check
from spanwright.truss.arrays import BoolArray, FloatArray

Stress = TypeVar("Stress", Flexural, DoublySymmetric, SinglySymmetric, Unsymmetric, OneLeg)


@dataclass(frozen=True, eq=False)
class Route(Generic[Stress]):
    """One way of buckling: its elastic stress and the resistance that follows, (s, b)."""

    stress: Stress
    curve: ColumnCurve


def in_plane(case: Case) -> Route[Flexural]:
    """Flexure in the plane of the truss: pairs back to back and tubes."""
    return _route(case, Flexural(case.demand.in_plane, column(case.candidates.radius_in), MODULUS), case.exponent)


def tube_sideways(case: Case) -> Route[Flexural]:
    """Flexure of a tube out of the plane."""
    stress = Flexural(case.demand.out_of_plane, column(case.candidates.radius_out), MODULUS)
    return _route(case, stress, case.exponent)


def pair_sideways(case: Case) -> Route[SinglySymmetric]:
    """Flexure with torsion of a pair back to back, out of the plane."""
    c, d = case.candidates, case.demand
    stress = SinglySymmetric(
        length=d.out_of_plane,
        length_torsion=d.torsional,
        radius_out=column(c.radius_out),
        radius_in=column(c.radius_in),
        shear_centre=column(c.shear_sym),
        area=column(c.area),
        torsion=column(c.torsion),
        warping=column(c.warping),
        spacing=d.panel / (case.packs + 1),
        piece_radius=column(c.piece_radius_minor),
        factor=d.packs.factor,
        modulus=MODULUS,
        shear_modulus=SHEAR_MODULUS,
    )
    return _route(case, stress)


def compression_checks(case: Case) -> tuple[Check, ...]:
    """Return the checks in compression of the case's family."""
    if case.candidates.family == "L":
        return _single_angle_checks(case)
    if case.candidates.family == "2L star":
        checks = (_buckling("buckling, minor axis or torsion", "13.3.2", case, _star(case), case.effects.sideways),)
        return (*checks, _piece_check(case))
    plane = _buckling("buckling in plane", "13.3.1", case, in_plane(case), case.effects.own)
    if case.candidates.family == "2L":
        torsion = "buckling out of plane, flexure and torsion"
        across = _buckling(torsion, "13.3.2", case, pair_sideways(case), case.effects.sideways)
        return plane, across, _piece_check(case)
    return plane, _buckling("buckling out of plane", "13.3.1", case, tube_sideways(case), case.effects.sideways)


def one_leg_applies(case: Case) -> BoolArray:
    """Return (s, b) True where all conditions of the one-leg rule hold; its slenderness limit is checked apart."""
    c, d = case.candidates, case.demand
    longer, shorter = np.maximum(c.leg_connected, c.leg_outstanding), np.minimum(c.leg_connected, c.leg_outstanding)
    ends = d.ends.kind == "welded" or d.ends.bolts >= LEAST_BOLTS
    applies: BoolArray = column(longer / shorter < LEG_RATIO) & (d.one_leg & (d.point_loads == 0) & ends)
    return applies


def one_leg(case: Case) -> Route[OneLeg]:
    """The one-leg rule; its length is the greater of joint-to-joint and effective length."""
    c, d = case.candidates, case.demand
    stress = OneLeg(
        length=np.maximum(d.panel, d.minor),
        radius_parallel=column(c.piece_radius_parallel),
        radius_minor=column(c.radius_minor),
        connected=column(c.leg_connected),
        outstanding=column(c.leg_outstanding),
        modulus=MODULUS,
    )
    return _route(case, stress)


def _route(case: Case, stress: Stress, exponent: FloatArray | float = GENERAL) -> Route[Stress]:
    return Route(stress, ColumnCurve(case.section_class.effective_area, case.fy, stress.elastic_stress, exponent, PHI))


def _star(case: Case) -> Route[DoublySymmetric]:
    c, d = case.candidates, case.demand
    stress = DoublySymmetric(
        length=d.minor,
        length_torsion=d.torsional,
        radius_minor=column(c.radius_minor),
        radius_major=column(c.radius_major),
        area=column(c.area),
        torsion=column(c.torsion),
        warping=column(c.warping),
        modulus=MODULUS,
        shear_modulus=SHEAR_MODULUS,
    )
    return _route(case, stress)


def _concentric(case: Case) -> Route[Unsymmetric]:
    c, d = case.candidates, case.demand
    stress = Unsymmetric(
        length=d.minor,
        length_torsion=d.torsional,
        radius_minor=column(c.radius_minor),
        radius_major=column(c.radius_major),
        shear_major=column(c.shear_major),
        shear_minor=column(c.shear_minor),
        area=column(c.area),
        torsion=column(c.torsion),
        warping=column(c.warping),
        modulus=MODULUS,
        shear_modulus=SHEAR_MODULUS,
    )
    return _route(case, stress)


def _single_angle_checks(case: Case) -> tuple[Check, ...]:
    force = case.effects.sideways
    concentric, by_leg = _concentric(case), one_leg(case)
    applies = one_leg_applies(case)
    checks = [
        _buckling("buckling as a concentric strut", "13.3.2", case, concentric, force),
        _buckling("buckling, connected by one leg", CLAUSE, case, by_leg, force, applies),
    ]
    if (~applies & case.effects.compressed).any():
        eccentric = _eccentric(case, concentric.curve.resistance)
        rules = (case.section_class, concentric.stress, concentric.curve, eccentric)
        ratio = np.where(applies, 0.0, eccentric.ratio)
        combination = np.where(applies, -1, force.combination)
        checks.append(sum_check("buckling with eccentric ends", "13.8.3", ratio, combination, rules, case.shape))
    return tuple(checks)


def _eccentric(case: Case, resistance: FloatArray) -> EccentricAngle:
    c, d = case.candidates, case.demand
    return EccentricAngle(
        force=case.effects.sideways.force,
        share=case.effects.sideways.share,
        resistance=resistance,
        gusset=d.gusset,
        length=d.minor,
        area=column(c.area),
        inertia_in=column(c.inertia_in),
        inertia_out=column(c.inertia_out),
        inertia_major=column(c.inertia_major),
        inertia_minor=column(c.inertia_minor),
        connected=column(c.leg_connected),
        outstanding=column(c.leg_outstanding),
        thickness=column(c.thickness),
        centroid_p=column(c.piece_centroid_outstanding),
        centroid_q=column(c.piece_centroid_connected),
        fy=case.fy,
        modulus=MODULUS,
        phi=PHI,
    )


def _piece_check(case: Case) -> Check:
    if not isinstance(case.section_class, AngleClass):
        raise TypeError("only pairs of angles have packs")
    pair = pair_between_packs(case.candidates, case.demand, case.effects, case.section_class, case.packs)
    own = case.effects.own
    half = Worst(pair.share.force, own.combination, own.share)
    ratio = CompressionRatio(half.force, half.share, pair.resistance.resistance)
    rules = (case.section_class, pair.share, pair.buckling, pair.resistance, ratio)
    return strength_check("one angle between packs", "19.1", half, pair.resistance.resistance, rules, case.shape)


def _buckling(
    name: str, clause: str, case: Case, route: Route[Stress], worst: Worst, applies: BoolArray | None = None
) -> Check:
    ratio = CompressionRatio(worst.force, worst.share, route.curve.resistance)
    rules = (case.section_class, route.stress, route.curve, ratio)
    return strength_check(name, clause, worst, route.curve.resistance, rules, case.shape, applies)
