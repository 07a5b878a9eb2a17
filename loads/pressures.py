"""From the zones of a roof to the pressures on one truss: by area over its own strip of roof, for every wind case.

Friction along the roof is left out: it goes to the bracing, not to the trusses.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import cached_property
from itertools import product

import numpy as np

from spanwright.loads import wind_derivation as told
from spanwright.loads.coefficients import Sign, roof_coefficients, wall_coefficients
from spanwright.loads.intermediate import Intermediate
from spanwright.loads.internal import Walls, internal_coefficients
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import Face, SiteInput
from spanwright.loads.site_standard import PeakPressure
from spanwright.loads.zones import (
    DIRECTIONS,
    Part,
    WindFrom,
    Zone,
    across,
    overlaps,
    roof_zones,
    shares,
    sides,
    wall_zones,
)
from spanwright.truss.arrays import FloatArray


@dataclass(frozen=True, eq=False)
class SurfaceCase:
    """One wind case: net pressures on the truss's strip, + towards the surface.

    wind : where it blows from. signs : (part of the roof, signed line of its table) each.
    external : (q,) mean external coefficient on each stretch of roof. under : (q,) mean coefficient below it: inside
    the building, or on the wall or gable below an overhang. net : (q,) MPa, + presses the roof in.
    cpi : internal coefficient. walls : net pressure on the left and the right wall, MPa, + presses in.
    derivation : lines for the checker.
    """

    name: str
    wind: WindFrom
    signs: tuple[tuple[Part, Sign], ...]
    external: FloatArray
    under: FloatArray
    net: FloatArray
    cpi: float
    walls: tuple[float, float]
    derivation: tuple[str, ...]


@dataclass(frozen=True, eq=False)
class WindField:
    """Wind on one truss's strip of roof and walls.

    strip : z from and to, mm. cuts : (q + 1,) x at which pressures change, mm.
    """

    shape: RoofShape
    site: SiteInput
    peak: PeakPressure
    pair: tuple[Intermediate, ...]
    strip: tuple[float, float]

    @cached_property
    def zones(self) -> dict[WindFrom, tuple[Zone, ...]]:
        """The zones of the roof for each direction."""
        return {wind: roof_zones(self.shape, wind) for wind in DIRECTIONS}

    @cached_property
    def cuts(self) -> FloatArray:
        """(q + 1,) x at which a zone, a wall or a slope begins or ends, mm."""
        edges = {x for zones in self.zones.values() for zone in zones for x in (zone.x0, zone.x1)}
        return np.unique(np.array([*edges, *self.shape.walls, self.shape.middle]))

    @cached_property
    def area(self) -> float:
        """Area of roof on plan that the truss carries, mm2."""
        return (self.strip[1] - self.strip[0]) * (self.shape.edges[1] - self.shape.edges[0])

    @cached_property
    def coefficients(self) -> dict[WindFrom, tuple[dict[Sign, float], ...]]:
        """External coefficients of each zone, on the signed lines that its part of the roof has."""
        return {wind: tuple(self._of_zones(zones)) for wind, zones in self.zones.items()}

    @cached_property
    def cases(self) -> tuple[SurfaceCase, ...]:
        """Every wind case: each direction, signed line of each slope and internal pressure, those that differ."""
        kept: list[SurfaceCase] = []
        for case in (case for wind in DIRECTIONS for case in self._cases(wind)):
            twin = next((at for at, other in enumerate(kept) if _alike(case, other)), None)
            if twin is None:
                kept.append(case)
            else:
                same = kept[twin]
                kept[twin] = replace(same, derivation=(*same.derivation, f"the same as: {case.name}"))
        return tuple(kept)

    @cached_property
    def internal(self) -> tuple[Intermediate, ...]:
        """Where the internal coefficients of all directions come from."""
        found = [
            internal.source
            for wind in DIRECTIONS
            for internal in internal_coefficients(self.site, self.shape, wind, self.walls(wind), self.pair)
        ]
        return tuple(dict.fromkeys(found))

    @property
    def wall_width(self) -> float:
        """Wall along the ridge that goes to the truss, mm."""
        return min(self.strip[1], self.shape.length) - max(self.strip[0], 0.0)

    def walls(self, wind: WindFrom) -> Walls:
        """Return the zones of the faces with their external coefficients."""
        values = wall_coefficients(self.shape.height / sides(self.shape, wind)[1])
        return tuple((zone, values[zone.name]) for zone in wall_zones(self.shape, wind))

    def on_wall(self, walls: Walls, face: Face, stretch: tuple[float, float]) -> float:
        """Return the mean external coefficient of a face between two distances along it."""
        zones = [(zone, cpe) for zone, cpe in walls if zone.face == face]
        ends = np.array([[zone.start, zone.end] for zone, _ in zones])
        first, last = float(ends.min()), float(ends.max())
        ends[ends == first], ends[ends == last] = -np.inf, np.inf  # beyond its ends a face is as at them
        lengths = overlaps(ends, stretch)
        return float(lengths @ np.array([cpe for _, cpe in zones]) / lengths.sum())

    def _cases(self, wind: WindFrom) -> list[SurfaceCase]:
        zones, walls = self.zones[wind], self.walls(wind)
        by_zone = shares(zones, self.cuts, self.strip)
        inside, below = self._under(walls)
        within = (max(self.strip[0], 0.0), min(self.strip[1], self.shape.length))
        on_walls = [self.on_wall(walls, face, within) for face in ("left wall", "right wall")]
        head = told.zones(self.shape, wind, zones[0].table, self.strip)
        cases = []
        for signs, cpe in self._lines(wind):
            external: FloatArray = by_zone @ cpe
            for internal in internal_coefficients(self.site, self.shape, wind, walls, self.pair):
                under = below + inside * internal.cpi
                net = self.peak.pressure * (external - under)
                pressed = [self.peak.pressure * (on_wall - internal.cpi) for on_wall in on_walls]
                cases.append(
                    SurfaceCase(
                        name=f"{_name(wind, signs)}, {internal.name}",
                        wind=wind,
                        signs=signs,
                        external=external,
                        under=under,
                        net=net,
                        cpi=internal.cpi,
                        walls=(pressed[0], pressed[1]),
                        derivation=(
                            *head,
                            str(internal.source),
                            *told.stretches(zones, self.cuts, by_zone, external, under, net),
                            *told.walls(on_walls, internal.name, pressed),
                        ),
                    )
                )
        return cases

    def _of_zones(self, zones: tuple[Zone, ...]) -> Iterator[dict[Sign, float]]:
        for zone in zones:
            names = tuple(other.name for other in zones if other.part == zone.part)
            lines = roof_coefficients(zone.table, names, float(np.degrees(zone.pitch)), self.area)
            yield {sign: float(values[names.index(zone.name)]) for sign, values in lines.items()}

    def _lines(self, wind: WindFrom) -> list[tuple[tuple[tuple[Part, Sign], ...], FloatArray]]:
        """Return every way to take one signed line for each part of the roof: the signs, and cpe (n,) of the zones."""
        zones, values = self.zones[wind], self.coefficients[wind]
        parts = {zone.part: value.keys() for zone, value in zip(zones, values, strict=True)}
        found = []
        for signs in product(*parts.values()):
            taken = dict(zip(parts, signs, strict=True))
            cpe = [value[taken[zone.part]] for zone, value in zip(zones, values, strict=True)]
            found.append((tuple(taken.items()), np.array(cpe)))
        return found

    def _under(self, walls: Walls) -> tuple[FloatArray, FloatArray]:
        """Return (q,) the share of each stretch that lies above the inside, and (q,) the coefficient below the rest.

        Below an overhang stands the pressure of the wall or gable that the wind finds there.
        """
        (wall_left, wall_right), length, (start, end) = self.shape.walls, self.shape.length, self.strip
        width = end - start
        inside = np.full(len(self.cuts) - 1, (min(end, length) - max(start, 0.0)) / width)
        below = np.zeros(len(inside))
        for at, (x0, x1) in enumerate(zip(self.cuts[:-1], self.cuts[1:], strict=True)):
            face: Face = "left wall" if x1 <= wall_left else "right wall"
            if x1 <= wall_left or x0 >= wall_right:
                inside[at], below[at] = 0.0, self.on_wall(walls, face, self.strip)
                continue
            stretch = (float(x0 - wall_left), float(x1 - wall_left))
            if start < 0.0:
                below[at] += -start / width * self.on_wall(walls, "near gable", stretch)
            if end > length:
                below[at] += (end - length) / width * self.on_wall(walls, "far gable", stretch)
        return inside, below


def _name(wind: WindFrom, signs: tuple[tuple[Part, Sign], ...]) -> str:
    words = [sign for _, sign in signs]
    if not across(wind) or len(words) == 1:
        words = words[:1]
    return f"wind from {wind}, {' and '.join(words)}"


def _alike(case: SurfaceCase, other: SurfaceCase) -> bool:
    return np.allclose(case.net, other.net, rtol=1e-9, atol=0.0) and np.allclose(case.walls, other.walls, rtol=1e-9)
