"""Load cases: each a name, a kind, forces on joints, moments in the top chord, and how they came about."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from spanwright.loads.bending import Stations
from spanwright.loads.case import PERMANENT, Case, CaseKind, case_of
from spanwright.loads.inputs import LoadsInput, WindInput
from spanwright.loads.joining import join
from spanwright.loads.joint_loads import at_eaves, ceiling, ceiling_warnings, own_mass_loads, own_mass_warnings
from spanwright.loads.mirror import SUFFIX, is_symmetric, mirrored
from spanwright.loads.plausible import unusual_loads
from spanwright.loads.roof import Roof, roof_over
from spanwright.loads.site import SiteActions, actions_from_site
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.site_parts import snow_parts, wind_parts
from spanwright.loads.strips import SIDES
from spanwright.truss.errors import InputError
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine

__all__ = ["PERMANENT", "Case", "CaseKind", "LoadSet", "Stations", "load_cases", "loads_on", "own_mass_loads"]

BENDING_LEFT_OUT = "bending by own mass between joints is left out"
"""Said of "most": the bars' own mass goes to the joints."""


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

    A load at a joint joins the case it names; a permanent one with a name of its own joins "most", and "least" with its
    stated least value; any other makes a case of that name, which accompanies other variable loads where it is imposed.
    What joins a wind case joins its mirrored twin at the mirror image of the joint; what joins "imposed" joins also its
    half on which the joint lies.

    Raises InputError for wind on a slope that does not exist, for a wind pressure left out on one that does, for a name
    given twice, and as `joining.join`.
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
    warnings = [
        *ceiling_warnings(truss, loads.ceiling_permanent),
        *own_mass_warnings(truss),
        *_wind_warnings(roof, loads),
    ]
    for load in loads.at_joint:
        warnings += join(roof, cases, load)
    known = _without_needless_twins(cases)
    from_site: frozenset[str] = frozenset() if site is None else site.site.derive
    warnings += unusual_loads(loads, from_site, wind_acts=any(case.kind == "wind" for case in known))
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
        case = case_of(name, "permanent", roof.permanent(pressure, pulled=name == "least"))
        below = getattr(loads.ceiling_permanent, name)
        if below:
            case = case.joined_by(roof.beams.at_joints(*ceiling(roof.truss, below, roof.tributary)))
        yield replace(case, derivation=(*case.derivation, BENDING_LEFT_OUT)) if name == "most" else case


def _imposed(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    if loads.roof_imposed:
        yield case_of("imposed", "imposed", roof.imposed(loads.roof_imposed))
        for half in SIDES:
            yield case_of(f"imposed {half}", "imposed", roof.imposed(loads.roof_imposed, half))


def _men(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    if loads.man_load:
        for where, part in roof.men(loads.man_load):
            yield case_of(f"man {where}", "man", part)


def _wind(roof: Roof, loads: LoadsInput) -> Iterator[Case]:
    """Yield every wind case, each followed by its mirrored twin; on a roof of one slope there are no twins."""
    for wind in loads.wind:
        _refuse_slopes(roof, wind)
        yield _wind_case(roof, wind)
        if wind.mirrored and roof.has_both_slopes:
            twin = _wind_case(roof, mirrored(wind))
            yield replace(twin, derivation=(f"mirror image of {wind.name}", *twin.derivation))


def _wind_case(roof: Roof, wind: WindInput) -> Case:
    case = case_of(wind.name, "wind", roof.wind(wind.left, wind.right))
    return case.joined_by(roof.beams.at_joints(*at_eaves(roof.truss, wind.eaves_left, wind.eaves_right)))


def _snow(roof: Roof, site: SiteActions) -> Iterator[Case]:
    for name, kind, part in snow_parts(roof, site.snow):
        yield case_of(name, kind, part)


def _wind_from(roof: Roof, site: SiteActions) -> Iterator[Case]:
    if site.wind is not None:
        for name, part, on_walls in wind_parts(roof, site.wind):
            yield case_of(name, "wind", part).joined_by(on_walls)


def _refuse_slopes(roof: Roof, wind: WindInput) -> None:
    """Refuse a pressure on a slope that does not exist, and none on one that does."""
    for side, other, pressure in (("left", "right", wind.left), ("right", "left", wind.right)):
        exists = side in roof.strips.slope
        if exists and side in wind.unstated:
            raise InputError(
                f'wind case "{wind.name}" states no pressure on the {side} slope',
                f'state {side} = "-0.75 kPa", or whatever the wind does there; "0 kPa" is an answer',
                "loads.wind",
            )
        if pressure and not exists:
            raise InputError(
                f'wind case "{wind.name}" presses on the {side} slope, but the roof has no {side} slope',
                f'leave {side} out, or state it as "0 kPa"; the one slope there is has its pressure under {other}',
                "loads.wind",
            )


def _wind_warnings(roof: Roof, loads: LoadsInput) -> Iterator[str]:
    twins = [wind for wind in loads.wind if wind.mirrored]
    lopsided = [wind for wind in twins if wind.left != wind.right]
    if twins and not roof.has_both_slopes:
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
