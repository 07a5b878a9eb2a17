"""From the site to the loads of one truss: what the user left to the site is found by the loading standard.

    actions_from_site(truss, site, "SANS 10160:2019", loads, spacing=5000.0, tributary=5000.0)

returns a SiteActions: the loads, complete; the strip of roof that the truss carries; the wind cases on it; snow; and
what a printed copy of the standard must confirm. `loads.cases.load_cases` turns them into load cases.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import cached_property

from spanwright.loads import derivation as say
from spanwright.loads.coefficients import CLAUSES
from spanwright.loads.eurocode import Eurocode
from spanwright.loads.inputs import LoadsInput, MostLeast
from spanwright.loads.intermediate import Intermediate, to_verify
from spanwright.loads.place import truss_position, truss_strip
from spanwright.loads.pressures import WindField
from spanwright.loads.roof_shape import RoofShape, roof_shape
from spanwright.loads.sans_10160 import Sans10160
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.site_standard import Imposed, SiteStandard, SnowArrangement
from spanwright.loads.tables import read_table
from spanwright.loads.walls import wall_sides
from spanwright.truss.errors import UnknownNameError
from spanwright.truss.model import Truss

STANDARDS: dict[str, SiteStandard] = {
    standard.name: standard
    for standard in (Sans10160("2011"), Sans10160("2019"), Eurocode("6.10"), Eurocode("6.10a and 6.10b"))
}
"""Loading standards by the name that the key `actions` gives; the same names as in `combinations.ACTIONS`."""


@dataclass(frozen=True, eq=False)
class SiteActions:
    """What acts on one truss, by its place in the building.

    standard : name with edition. position : mm from the near gable. strip : of roof it carries, z from and to, mm.
    loads : the loads of the project, with what was left to the site filled in. imposed : None where stated.
    wind : None where stated. snow : arrangements; empty where none or stated.
    permanent : what the assumed permanent load is made of; empty where stated.
    warnings, cautions : sentences; cautions name what a printed copy of the standard must confirm.
    """

    standard: str
    site: SiteInput
    shape: RoofShape
    position: float
    strip: tuple[float, float]
    loads: LoadsInput
    imposed: Imposed | None
    wind: WindField | None
    snow: tuple[SnowArrangement, ...]
    permanent: tuple[Intermediate, ...]
    warnings: tuple[str, ...]

    @property
    def tributary(self) -> float:
        """Roof along the ridge that the truss carries, mm."""
        return self.strip[1] - self.strip[0]

    @cached_property
    def steps(self) -> tuple[Intermediate, ...]:
        """Every value on the way, in the order of calculation."""
        return tuple(self._steps())

    @property
    def cautions(self) -> tuple[str, ...]:
        """What a printed copy of the standard must confirm."""
        return to_verify(self.standard, (*self.steps[len(self.permanent) :], *self._tables()))

    def _tables(self) -> Iterator[Intermediate]:
        if self.wind is not None:
            used = dict.fromkeys(zone.table for zones in self.wind.zones.values() for zone in zones)
            for table in (*(CLAUSES[table] for table in used), "cpe table of walls"):
                yield Intermediate("cpe", table, math.nan, "-", mark="from memory")

    def _steps(self) -> Iterator[Intermediate]:
        yield from self.permanent
        if self.imposed is not None:
            yield from self.imposed.steps
        if self.wind is not None:
            yield from self.wind.peak.steps
            yield from self.wind.internal
        for arrangement in self.snow:
            yield from arrangement.steps


def actions_from_site(
    truss: Truss, site: SiteInput, actions: str, loads: LoadsInput, *, spacing: float, tributary: float
) -> SiteActions:
    """Find what the user left to the site.

    actions : loading standard with edition. loads : as stated; the keys in `site.derive` are replaced.
    spacing : mm from truss to truss. tributary : mm of roof carried where it is stated, else equal to the spacing, and
    the truss's strip follows from its neighbours and the gables.

    Raises InputError where the standard has no answer: see its methods, `roof_shape`, `truss_position`, `truss_strip`.
    """
    if actions not in STANDARDS:
        raise UnknownNameError.among(actions, list(STANDARDS), what="loading standard", key="actions")
    standard = STANDARDS[actions]
    shape = roof_shape(truss, site)
    wall_sides(truss, shape)
    position = truss_position(site, spacing)
    strip = truss_strip(shape, position, spacing, tributary)
    area = (strip[1] - strip[0]) * (shape.edges[1] - shape.edges[0])
    imposed = standard.imposed(site, shape, area)
    permanent = _permanent(shape)
    wind = None
    if "wind" in site.derive:
        peak = standard.peak_pressure(site, shape.height)
        wind = WindField(shape, site, peak, standard.internal_pair, strip)
    settled = _settled(site, loads, imposed, permanent)
    return SiteActions(
        standard=actions,
        site=site,
        shape=shape,
        position=position,
        strip=strip,
        loads=settled,
        imposed=imposed if {"roof_imposed", "man_load"} & site.derive else None,
        wind=wind,
        snow=standard.snow(site, shape) if "snow" in site.derive else (),
        permanent=permanent if "roof_permanent" in site.derive else (),
        warnings=tuple(_warnings(site, loads, settled, imposed, wind)),
    )


def _settled(site: SiteInput, loads: LoadsInput, imposed: Imposed, permanent: tuple[Intermediate, ...]) -> LoadsInput:
    """Return the loads with what was left to the site filled in."""
    return replace(
        loads,
        roof_permanent=_total(permanent) if "roof_permanent" in site.derive else loads.roof_permanent,
        roof_imposed=imposed.pressure if "roof_imposed" in site.derive else loads.roof_imposed,
        man_load=imposed.man if "man_load" in site.derive else loads.man_load,
    )


def _permanent(shape: RoofShape) -> tuple[Intermediate, ...]:
    """Return the greatest and the least of a usual sheeted roof, item by item, kPa on the slope."""
    steps = []
    for which, symbol in (("most", "g,most"), ("least", "g,least")):
        for row in read_table("roof_permanent.csv"):
            on_slope = 1.0 if row["basis"] == "slope" else math.cos(shape.left)
            value = float(row[which]) * on_slope
            if value:
                meaning = f"{row['item']}, {which}, on the slope, not stated"
                steps.append(Intermediate(symbol, meaning, value, "kPa", mark="assumed"))
    return tuple(steps)


def _total(permanent: tuple[Intermediate, ...]) -> MostLeast:
    def total(symbol: str) -> float:
        return sum(step.value for step in permanent if step.symbol == symbol) / 1e3

    return MostLeast(total("g,most"), total("g,least"))


def _warnings(
    site: SiteInput, loads: LoadsInput, settled: LoadsInput, imposed: Imposed, wind: WindField | None
) -> Iterator[str]:
    if "roof_permanent" in site.derive:
        found = settled.roof_permanent
        yield (
            f"roof_permanent is not stated: a usual sheeted roof is assumed, {say.kilopascals(found.most)} at most and "
            f"{say.kilopascals(found.least)} at least; state yours"
        )
    if "roof_imposed" not in site.derive and abs(loads.roof_imposed - imposed.pressure) > 0.0:
        yield (
            f"roof_imposed as stated, {say.kilopascals(loads.roof_imposed)}, is used; the site would give "
            f"{say.kilopascals(imposed.pressure)}"
        )
    if "wind" not in site.derive:
        yield "wind as stated in [loads] is used; none is found from the site"
    if wind is not None:
        yield from wind.peak.warnings
        shut = [f"{one.area / 1e6:g} m2 in the {one.face}" for one in site.openings if one.shut_in_storms]
        if shut:
            yield (
                f"openings taken as shut in storms: {', '.join(shut)}; standing open in a storm is an accidental case, "
                "which is not covered"
            )
