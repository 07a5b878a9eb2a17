"""Zones of roof and walls for each wind direction, as rectangles in plan, and their share of a truss's strip of roof.

x from left to right along the truss, z along the ridge from the near gable's wall, all mm. Zones of the roof begin at
its edges, overhang included; the building's sides b and d are taken from wall to wall.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Literal

import numpy as np

from spanwright.loads.coefficients import RoofTable, is_flat
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import Face
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError

WindFrom = Literal["left", "right", "near gable", "far gable"]
DIRECTIONS: tuple[WindFrom, ...] = ("left", "right", "near gable", "far gable")
Part = Literal["upwind", "downwind", "left", "right", "whole"]
"""The part of the roof whose zones share a signed line: a slope named by the wind or by its side, or the whole roof."""


@dataclass(frozen=True)
class Zone:
    """A rectangle of roof between x0 and x1 and between z0 and z1, in the table's words; pitch in rad."""

    name: str
    part: Part
    table: RoofTable
    pitch: float
    x0: float
    x1: float
    z0: float
    z1: float


@dataclass(frozen=True)
class WallZone:
    """A stretch of a face between two distances along it: from the left wall on a gable, else from the near gable."""

    face: Face
    name: str
    start: float
    end: float


def across(wind: WindFrom) -> bool:
    """Return whether the wind blows across the ridge."""
    return wind in ("left", "right")


def sides(shape: RoofShape, wind: WindFrom) -> tuple[float, float]:
    """Return the building's side across the wind, b, and along it, d, mm."""
    return (shape.length, shape.width) if across(wind) else (shape.width, shape.length)


def zone_measure(shape: RoofShape, wind: WindFrom) -> float:
    """Return e, the lesser of b and twice the height, mm."""
    return min(sides(shape, wind)[0], 2 * shape.height)


def roof_zones(shape: RoofShape, wind: WindFrom) -> tuple[Zone, ...]:
    """Return the zones of the roof, which cover it without gap or overlap.

    Raises InputError (key "truss.pitch") where one slope counts as flat and the other does not.
    """
    if wind == "right":
        return tuple(_turned_across(shape, zone) for zone in roof_zones(_mirror_image(shape), "left"))
    if wind == "far gable":
        return tuple(_turned_along(shape, zone) for zone in roof_zones(shape, "near gable"))
    e = zone_measure(shape, wind)
    flat = [is_flat(float(np.degrees(pitch))) for pitch in (shape.left, shape.right)]
    if flat[0] != flat[1]:
        raise InputError(
            "one slope is flatter than 5 deg and the other is not: no table covers such a roof",
            "state wind pressures in [loads]",
            "truss.pitch",
        )
    if wind == "left":
        found = _flat_across(shape, e) if flat[0] else _pitched_across(shape, e)
    else:
        found = _along(shape, e, flat=flat[0])
    return tuple(zone for zone in found if zone.x1 > zone.x0 and zone.z1 > zone.z0)


def wall_zones(shape: RoofShape, wind: WindFrom) -> tuple[WallZone, ...]:
    """Return the zones of all four faces: D faces the wind, E lies in its lee, A, B and C follow along it."""
    e = zone_measure(shape, wind)
    facing: dict[WindFrom, tuple[Face, Face]] = {
        "left": ("left wall", "right wall"),
        "right": ("right wall", "left wall"),
        "near gable": ("near gable", "far gable"),
        "far gable": ("far gable", "near gable"),
    }
    b, d = sides(shape, wind)
    upwind, lee = facing[wind]
    along: tuple[Face, Face] = ("near gable", "far gable") if across(wind) else ("left wall", "right wall")
    zones = [WallZone(upwind, "D", 0.0, b), WallZone(lee, "E", 0.0, b)]
    cuts = [0.0, min(e / 5, d), min(e, d), d]
    for face in along:
        for name, start, end in zip("ABC", cuts[:-1], cuts[1:], strict=True):
            if wind in ("right", "far gable"):
                start, end = d - end, d - start
            if end > start:
                zones.append(WallZone(face, name, start, end))
    return tuple(zones)


def shares(zones: tuple[Zone, ...], cuts: FloatArray, strip: tuple[float, float]) -> FloatArray:
    """Return (q, n): the share of each zone in the area of each stretch of the strip between two cuts in x (q + 1,).

    strip : z from and to, mm. Every row sums to 1 where the zones cover the strip.
    """
    x = np.array([[zone.x0, zone.x1] for zone in zones])
    z = np.array([[zone.z0, zone.z1] for zone in zones])
    low, high = np.maximum.outer(cuts[:-1], x[:, 0]), np.minimum.outer(cuts[1:], x[:, 1])
    in_x = np.maximum(high - low, 0.0) / np.diff(cuts)[:, None]
    found: FloatArray = in_x * overlaps(z, strip) / (strip[1] - strip[0])
    return found


def overlaps(stretches: FloatArray, strip: tuple[float, float]) -> FloatArray:
    """Return (n,) mm: how much of each stretch (n, 2) lies within a strip."""
    inside: FloatArray = np.minimum(stretches[:, 1], strip[1]) - np.maximum(stretches[:, 0], strip[0])
    return np.maximum(inside, 0.0)


def _pitched_across(shape: RoofShape, e: float) -> list[Zone]:
    """Return the zones for wind from the left on slopes of 5 degrees and more."""
    x1 = shape.edges[1]
    if not shape.two_slopes:
        table: RoofTable = "monopitch 0" if shape.kind == "rises to the right" else "monopitch 180"
        return _upwind(shape, e, x1, table, shape.left, "whole")
    middle = shape.middle
    behind = min(middle + e / 10, x1)
    z0, z1 = shape.ends
    return [
        *_upwind(shape, e, middle, "duopitch 0", shape.left, "upwind"),
        Zone("J", "downwind", "duopitch 0", shape.right, middle, behind, z0, z1),
        Zone("I", "downwind", "duopitch 0", shape.right, behind, x1, z0, z1),
    ]


def _upwind(shape: RoofShape, e: float, end: float, table: RoofTable, pitch: float, part: Part) -> list[Zone]:
    """Return F, G and H from the left edge to `end`."""
    x0, (z0, z1) = shape.edges[0], shape.ends
    front = min(x0 + e / 10, end)
    corner = min(e / 4, (z1 - z0) / 2)
    return [
        Zone("F", part, table, pitch, x0, front, z0, z0 + corner),
        Zone("F", part, table, pitch, x0, front, z1 - corner, z1),
        Zone("G", part, table, pitch, x0, front, z0 + corner, z1 - corner),
        Zone("H", part, table, pitch, front, end, z0, z1),
    ]


def _flat_across(shape: RoofShape, e: float) -> list[Zone]:
    (x0, x1), (z0, z1) = shape.edges, shape.ends
    middle = min(x0 + e / 2, x1)
    return [
        *_upwind(shape, e, middle, "flat", 0.0, "whole"),
        Zone("I", "whole", "flat", 0.0, middle, x1, z0, z1),
    ]


def _along(shape: RoofShape, e: float, *, flat: bool) -> list[Zone]:
    """Return the zones for wind from the near gable."""
    (x0, x1), (z0, z1) = shape.edges, shape.ends
    front, middle = min(z0 + e / 10, z1), min(z0 + e / 2, z1)
    corner = min(e / 4, (x1 - x0) / 2)
    table: RoofTable = "flat" if flat else "duopitch 90" if shape.two_slopes else "monopitch 90"
    at_left, at_right = "F", "F"
    if table == "monopitch 90":
        at_left, at_right = ("Flow", "Fup") if shape.kind == "rises to the right" else ("Fup", "Flow")
    zones = []
    for part, pitch, start, end in _parts(shape, flat=flat):
        first, last = min(max(x0 + corner, start), end), max(min(x1 - corner, end), start)
        zones += [
            Zone(at_left, part, table, pitch, start, first, z0, front),
            Zone("G", part, table, pitch, first, last, z0, front),
            Zone(at_right, part, table, pitch, last, end, z0, front),
            Zone("H", part, table, pitch, start, end, front, middle),
            Zone("I", part, table, pitch, start, end, middle, z1),
        ]
    return zones


def _parts(shape: RoofShape, *, flat: bool) -> list[tuple[Part, float, float, float]]:
    x0, x1 = shape.edges
    if flat or not shape.two_slopes:
        return [("whole", 0.0 if flat else shape.left, x0, x1)]
    return [("left", shape.left, x0, shape.middle), ("right", shape.right, shape.middle, x1)]


def _mirror_image(shape: RoofShape) -> RoofShape:
    """Return the roof seen from behind: left and right change places, the outline in plan turns about its middle."""
    turned = {"rises to the right": "rises to the left", "rises to the left": "rises to the right"}
    total = sum(shape.edges)
    return replace(
        shape,
        kind=turned.get(shape.kind, shape.kind),  # type: ignore[arg-type]  # a word of ShapeKind
        left=shape.right,
        right=shape.left,
        walls=(total - shape.walls[1], total - shape.walls[0]),
        middle=total - shape.middle,
        eaves=(shape.eaves[1], shape.eaves[0]),
    )


def _turned_across(shape: RoofShape, zone: Zone) -> Zone:
    total = sum(shape.edges)
    return replace(zone, x0=total - zone.x1, x1=total - zone.x0)


def _turned_along(shape: RoofShape, zone: Zone) -> Zone:
    total = sum(shape.ends)
    return replace(zone, z0=total - zone.z1, z1=total - zone.z0)
