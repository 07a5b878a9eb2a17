"""Load cases: each a name, a kind, forces on joints, moments in the top chord, and how they came about."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from typing import Literal

import numpy as np

from spanwright.loads.bending import Part, Stations
from spanwright.loads.inputs import JointLoad, LoadsInput, WindInput
from spanwright.loads.joint_loads import at_eaves, at_joint, ceiling, ceiling_warnings, own_mass_loads
from spanwright.loads.mirror import SUFFIX, is_symmetric, mirrored, mirrored_load
from spanwright.loads.roof import Roof, roof_over
from spanwright.loads.site import SiteActions, actions_from_site
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.site_parts import snow_parts, wind_parts
from spanwright.loads.strips import SIDES
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine

__all__ = ["PERMANENT", "Case", "CaseKind", "LoadSet", "Stations", "load_cases", "loads_on", "own_mass_loads"]

CaseKind = Literal["permanent", "imposed", "man", "snow", "exceptional snow", "wind"]
PERMANENT = ("most", "least")
"""The two sets of permanent loads: the greatest and the least credible."""


@dataclass(frozen=True, eq=False)
class Case:
    """One load case, unfactored.

    name : unique ("most", "least", "imposed left", "man at T3", "man in TC4", "across ridge, suction mirrored").
    kind : "permanent", "imposed", "man" (takes the place of imposed in a combination), "snow", "exceptional snow" or
        "wind".
    joint_loads : (j, 2) N, x to the right, y up.
    moments : (m,) N mm in the top chord at the stations, sagging (tension at the lower fibre) +.
    derivation : lines for the checker: what, value, unit, how.
    """

    name: str
    kind: CaseKind
    joint_loads: FloatArray
    moments: FloatArray
    derivation: tuple[str, ...] = ()

    def joined_by(self, part: Part) -> Case:
        """Return the case with a part added."""
        return replace(
            self,
            joint_loads=self.joint_loads + part.joint_loads,
            moments=self.moments + part.moments,
            derivation=self.derivation + part.derivation,
        )


@dataclass(frozen=True, eq=False)
class LoadSet:
    """All load cases of a truss, the stations of their moments, and what a user should know, in sentences.

    cautions : what a printed copy of the loading standard must confirm. site : where loads were found from the site.
    """

    cases: tuple[Case, ...]
    stations: Stations
    warnings: tuple[str, ...] = ()
    cautions: tuple[str, ...] = ()
    site: SiteActions | None = None


def loads_on(
    truss: Truss,
    lines: tuple[PurlinLine, ...],
    loads: LoadsInput,
    site: SiteInput | None,
    actions: str,
    *,
    spacing: float,
    tributary: float,
) -> LoadSet:
    """Return every load case of a truss, with what the user left to the site, if there is one, found from it.

    See `load_cases` and `site.actions_from_site`.
    """
    if site is None:
        return load_cases(truss, lines, loads, tributary)
    found = actions_from_site(truss, site, actions, loads, spacing=spacing, tributary=tributary)
    return load_cases(truss, lines, found.loads, found.tributary, found)


def load_cases(
    truss: Truss, lines: tuple[PurlinLine, ...], loads: LoadsInput, tributary: float, site: SiteActions | None = None
) -> LoadSet:
    """Return every load case; "most" and "least" come without the own mass (see `joint_loads.own_mass_loads`).

    tributary : mm of roof along the ridge that the truss carries. site : adds its wind and snow.

    A load at a joint joins the case it names; a permanent one with a name of its own joins both sets, any other makes a
    case of that name. What joins a wind case joins its mirrored twin at the mirror image of the joint.

    Raises InputError for wind on a slope that does not exist, for a name given twice and for a kind that contradicts
    the named case's; UnknownNameError for a load at an unknown joint.
    """
    if not lines:
        raise InputError(
            "no purlin line carries the roof to the truss", "state where purlins stand", "restraint.purlins"
        )
    cuts = None if site is None or site.wind is None else site.wind.cuts
    roof = roof_over(truss, lines, tributary, man=loads.man_load > 0.0, cuts=cuts)
    cases: dict[str, Case] = {}
    stated = (*_permanent(roof, loads), *_imposed(roof, loads), *_men(roof, loads), *_wind(roof, loads))
    derived = () if site is None else (*_snow(roof, site), *_wind_from(roof, site))
    for case in (*stated, *derived):
        if case.name in cases:
            raise InputError(f'two cases are called "{case.name}"', "give every case a name of its own", "loads.wind")
        cases[case.name] = case
    warnings = [*ceiling_warnings(truss, loads.ceiling_permanent), *_wind_warnings(roof, loads)]
    for load in loads.at_joint:
        warnings += _join(roof, cases, load)
    known = _without_needless_twins(cases)
    if site is None:
        return LoadSet(known, roof.beams.stations, tuple(warnings))
    return LoadSet(known, roof.beams.stations, (*site.warnings, *warnings), site.cautions, site)


def _permanent(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    for key, given in (("roof_permanent", loads.roof_permanent), ("ceiling_permanent", loads.ceiling_permanent)):
        if given.least > given.most:
            raise InputError(
                f"the least value, {given.least * 1e3:g} kPa, is more than the most, {given.most * 1e3:g} kPa",
                "state most and least the other way round",
                f"loads.{key}",
            )
    for name in PERMANENT:
        pressure = getattr(loads.roof_permanent, name)
        case = _case(name, "permanent", roof.permanent(pressure, pulled=name == "least"))
        below = getattr(loads.ceiling_permanent, name)
        if below:
            case = case.joined_by(roof.beams.at_joints(*ceiling(roof.truss, below, roof.tributary)))
        yield case


def _imposed(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    if loads.roof_imposed:
        yield _case("imposed", "imposed", roof.imposed(loads.roof_imposed))
        for half in SIDES:
            yield _case(f"imposed {half}", "imposed", roof.imposed(loads.roof_imposed, half))


def _men(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    if loads.man_load:
        for where, part in roof.men(loads.man_load):
            yield _case(f"man {where}", "man", part)


def _wind(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    """Yield every wind case, each followed by its mirrored twin; on a roof of one slope there are no twins."""
    for wind in loads.wind:
        _refuse_missing_slope(roof, wind)
        yield _wind_case(roof, wind)
        if wind.mirrored and _has_both_slopes(roof):
            twin = _wind_case(roof, mirrored(wind))
            yield replace(twin, derivation=(f"mirror image of {wind.name}", *twin.derivation))


def _wind_case(roof: Roof, wind: WindInput) -> Case:
    case = _case(wind.name, "wind", roof.wind(wind.left, wind.right))
    return case.joined_by(roof.beams.at_joints(*at_eaves(roof.truss, wind.eaves_left, wind.eaves_right)))


def _snow(roof: Roof, site: SiteActions) -> Iterator[Case]:
    for name, kind, part in snow_parts(roof, site.snow):
        yield _case(name, kind, part)


def _wind_from(roof: Roof, site: SiteActions) -> Iterator[Case]:
    if site.wind is not None:
        for name, part, on_walls in wind_parts(roof, site.wind):
            yield _case(name, "wind", part).joined_by(on_walls)


def _case(name: str, kind: CaseKind, part: Part) -> Case:
    return Case(name, kind, part.joint_loads, part.moments, part.derivation)


def _has_both_slopes(roof: Roof) -> bool:
    return len(set(roof.strips.slope)) == 2


def _refuse_missing_slope(roof: Roof, wind: WindInput) -> None:
    for side, pressure in (("left", wind.left), ("right", wind.right)):
        if pressure and side not in roof.strips.slope:
            raise InputError(
                f'wind case "{wind.name}" presses on the {side} slope, but the roof has no {side} slope',
                f'leave "{side}" out, or state it as 0; give the pressure of the one slope there is',
                "loads.wind",
            )


def _wind_warnings(roof: Roof, loads: LoadsInput) -> Iterator[str]:
    twins = [wind for wind in loads.wind if wind.mirrored]
    lopsided = [wind for wind in twins if wind.left != wind.right]
    if twins and not _has_both_slopes(roof):
        yield (
            "the roof has one slope, so no wind case is mirrored: state wind from the other side as a case of its own, "
            "with the pressures for that side"
        )
    elif lopsided and not is_symmetric(roof.truss):
        yield (
            "the truss is not symmetric, yet mirrored wind cases swap the pressures of its slopes: state wind from the "
            "other side as a case of its own, with the pressures for that side, where the slopes differ"
        )
    if loads.wind and any(roof.truss.top.overhang):
        yield (
            "wind on the overhangs is the net pressure of their slope: pressure on their undersides is not added; "
            "allow for it in the stated pressures"
        )


def _join(roof: Roof, cases: dict[str, Case], load: JointLoad) -> tuple[str, ...]:
    """Add a joint's load to the case it names, or to both permanent sets, or as a new case; return warnings."""
    part = roof.beams.at_joints(*at_joint(roof.truss, load))
    names = PERMANENT if load.kind == "permanent" and load.case not in cases else (load.case,)
    has_twin = load.kind == "wind" and (load.case not in cases or load.case + SUFFIX in cases)
    for name in names:
        _join_one(roof, cases, name, load.kind, part)
    if not (has_twin and _has_both_slopes(roof)):
        return ()
    twin = mirrored_load(roof.truss, load)
    if twin is None:
        _join_one(roof, cases, load.case + SUFFIX, "wind", roof.beams.at_joints(np.zeros_like(part.joint_loads), ()))
        return (f'the load at {load.joint} in wind case "{load.case}" has no mirror image: it acts in that case only',)
    _join_one(roof, cases, twin.case, "wind", roof.beams.at_joints(*at_joint(roof.truss, twin)))
    return ()


def _without_needless_twins(cases: dict[str, Case]) -> tuple[Case, ...]:
    """Return the cases without the mirrored ones that equal their original or hold nothing."""
    kept = []
    for name, case in cases.items():
        original = cases.get(name.removesuffix(SUFFIX)) if name.endswith(SUFFIX) else None
        if original is None or (np.any(case.joint_loads) and not _alike(case, original)):
            kept.append(case)
    return tuple(kept)


def _alike(case: Case, other: Case) -> bool:
    return np.array_equal(case.joint_loads, other.joint_loads) and np.array_equal(case.moments, other.moments)


def _join_one(roof: Roof, cases: dict[str, Case], name: str, kind: CaseKind, part: Part) -> None:
    known = cases.get(name)
    if known is None:
        nothing = roof.beams.at_joints(np.zeros_like(part.joint_loads), ())
        known = _case(name, kind, nothing)
    elif known.kind != kind:
        raise InputError(
            f'a load at a joint is stated as {kind} but joins case "{name}", which is {known.kind}',
            f'state kind = "{known.kind}", or give the load a case name of its own',
            "loads.at_joint",
        )
    cases[name] = known.joined_by(part)
