"""Pressure inside a building from its openings (SANS 10160-3 cl. 8.3, EN 1991-1-4 cl. 7.2.9; from memory)."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from spanwright.loads.coefficients import dominance, internal_without_dominant_face
from spanwright.loads.intermediate import Intermediate
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import Face, Opening, SiteInput
from spanwright.loads.zones import WallZone, WindFrom, overlaps, sides
from spanwright.truss.errors import InputError
from spanwright.truss.tolerances import TOLERANCES

OPEN_SHARE = 0.3
"""Of a face's area: two faces open by more than this make a canopy, not a building (SCI AD 554 for EN 1991-1-4)."""
FACES: tuple[Face, ...] = ("left wall", "right wall", "near gable", "far gable")
_CLAUSE = "cpi by openings"

Walls = tuple[tuple[WallZone, float], ...]
"""The zones of the faces, each with its external coefficient."""


@dataclass(frozen=True)
class Internal:
    """One internal pressure coefficient to design for, + presses outward on the skin, and where it comes from."""

    cpi: float
    source: Intermediate

    @property
    def name(self) -> str:
        """As case names print it: "inside +0.2"."""
        return f"inside {self.cpi:+.3g}"


def internal_coefficients(
    site: SiteInput, shape: RoofShape, wind: WindFrom, walls: Walls, pair: tuple[Intermediate, ...]
) -> tuple[Internal, ...]:
    """Return the internal coefficients for one wind direction.

    pair : the standard's coefficients, where nothing is known of the openings.

    Stated coefficients win. Of openings that may lie anywhere on a dominant face both the least and the greatest cpe of
    its zones are taken.

    Raises InputError (key "site.openings") for a building so open that it is a canopy, and for openings off their face.
    """
    if site.internal:
        return _different(Intermediate("cpi", "inside", value, "-", mark="stated") for value in site.internal)
    refuse_openings(site, shape)
    areas = {face: sum(one.area for one in _on(site, face)) for face in FACES}
    if not any(areas.values()):
        return _different(pair)
    for face, area in areas.items():
        share = dominance(area, sum(areas.values()) - area)
        if share:
            return _different(_dominant(_on(site, face), share, walls))
    return _different([_not_dominant(shape, wind, areas, walls)])


def refuse_openings(site: SiteInput, shape: RoofShape) -> None:
    """Raise InputError for openings that lie off their face or are larger than it, and for a building that is a canopy.

    Openings that are shut in storms count here too: they may stand open on any other day.
    """
    gaping = []
    for face in FACES:
        openings = [one for one in site.openings if one.face == face]
        length, area = face_size(shape, face)
        for one in openings:
            start, end = _extent(one, length)
            if not -TOLERANCES.same_point <= start < end <= length + TOLERANCES.same_point:
                place = f"an opening from {start / 1e3:g} m to {end / 1e3:g} m"
                raise InputError(
                    f"{place} lies off the {face}, {length / 1e3:g} m long",
                    "measure along the face: on a gable from the left wall, on a wall from the near gable",
                    "site.openings",
                )
        total = sum(one.area for one in openings)
        if total > area:
            raise InputError(
                f"openings of {total / 1e6:g} m2 are more than the {face} has, {area / 1e6:.4g} m2",
                "check the areas",
                "site.openings",
            )
        if total > OPEN_SHARE * area:
            gaping.append(face)
    if len(gaping) > 1:
        raise InputError(
            f"{' and '.join(gaping)} are each open by more than {OPEN_SHARE:.0%}: such a building is a canopy, whose "
            "coefficients are not covered",
            "state wind pressures in [loads]",
            "site.openings",
        )


def face_size(shape: RoofShape, face: Face) -> tuple[float, float]:
    """Return the length of a face, mm, and its area, mm2, up to the roof."""
    if face == "left wall":
        return shape.length, shape.length * shape.eaves[0]
    if face == "right wall":
        return shape.length, shape.length * shape.eaves[1]
    if not shape.two_slopes:
        return shape.width, shape.width * sum(shape.eaves) / 2
    middle = shape.height if shape.kind == "duopitch" else min(shape.eaves)
    left, right = (abs(wall - shape.middle) for wall in shape.walls)
    return shape.width, left * (shape.eaves[0] + middle) / 2 + right * (shape.eaves[1] + middle) / 2


def _different(values: Iterable[Intermediate]) -> tuple[Internal, ...]:
    found: dict[str, Internal] = {}
    for value in values:
        internal = Internal(value.value, value)
        found.setdefault(internal.name, internal)
    return tuple(found.values())


def _on(site: SiteInput, face: Face) -> list[Opening]:
    """Return the openings of a face that may stand open in a storm."""
    return [one for one in site.openings if one.face == face and not one.shut_in_storms]


def _extent(opening: Opening, length: float) -> tuple[float, float]:
    return (
        0.0 if opening.start is None else opening.start,
        length if opening.end is None else opening.end,
    )


def _dominant(openings: list[Opening], share: float, walls: Walls) -> list[Intermediate]:
    """Return the coefficients behind a dominant face: one where all places are known, else the two extremes."""
    zones = [(zone, cpe) for zone, cpe in walls if zone.face == openings[0].face]
    stretches = np.array([[zone.start, zone.end] for zone, _ in zones])
    cpe = np.array([value for _, value in zones])
    least, greatest, total = 0.0, 0.0, sum(one.area for one in openings)
    for one in openings:
        low, high = float(cpe.min()), float(cpe.max())
        if one.start is not None or one.end is not None:
            lengths = overlaps(stretches, _extent(one, float(stretches.max())))
            low = high = float(lengths @ cpe / lengths.sum())
        least += low * one.area / total
        greatest += high * one.area / total
    return [
        Intermediate(
            "cpi",
            f"inside, {openings[0].face} dominates, cpe {value:.3g} at its openings",
            share * value,
            "-",
            _CLAUSE,
            f"{share:.3g}*{value:.4g}",
            "from memory",
        )
        for value in (least, greatest)
    ]


def _not_dominant(shape: RoofShape, wind: WindFrom, areas: dict[Face, float], walls: Walls) -> Intermediate:
    sucked = {zone.face for zone, cpe in walls if cpe <= 0.0}
    mu = sum(area for face, area in areas.items() if face in sucked) / sum(areas.values())
    ratio = shape.height / sides(shape, wind)[1]
    cpi = internal_without_dominant_face(mu, ratio)
    meaning = f"inside, no face dominates, openings where cpe is not positive mu = {mu:.3g}, h/d = {ratio:.3g}"
    return Intermediate("cpi", meaning, cpi, "-", _CLAUSE, mark="from memory")
