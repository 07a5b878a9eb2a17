"""Zones of roof and walls in plan, checked by hand figures and by shapely."""

from __future__ import annotations

import math
from itertools import pairwise
from typing import get_args

import numpy as np
import pytest
import shapely

from spanwright.loads.roof_shape import RoofShape, ShapeKind
from spanwright.loads.zones import (
    DIRECTIONS,
    WindFrom,
    Zone,
    roof_zones,
    shares,
    sides,
    wall_zones,
    zone_measure,
)
from spanwright.truss.errors import InputError


def roof(
    kind: ShapeKind = "duopitch", degrees: float = 12.0, overhang: float = 0.0, height: float = 8000.0
) -> RoofShape:
    """Return a roof 20 m wide and 40 m long."""
    pitch = math.radians(degrees)
    return RoofShape(
        kind=kind,
        left=pitch,
        right=pitch,
        edges=(-overhang, 20e3 + overhang),
        walls=(0.0, 20e3),
        middle=10e3,
        ends=(-overhang, 40e3 + overhang),
        length=40e3,
        width=20e3,
        height=height,
        eaves=(6000.0, 6000.0),
    )


def box(zone: Zone) -> shapely.Polygon:
    return shapely.box(zone.x0, zone.z0, zone.x1, zone.z1)


def named(zones: tuple[Zone, ...], name: str) -> list[tuple[float, float, float, float]]:
    return [(zone.x0, zone.x1, zone.z0, zone.z1) for zone in zones if zone.name == name]


def test_measures() -> None:
    """e is the lesser of the side across the wind and twice the height (EN 1991-1-4 Figure 7.8, from memory)."""
    assert sides(roof(), "left") == (40e3, 20e3)
    assert sides(roof(), "far gable") == (20e3, 40e3)
    assert zone_measure(roof(), "left") == 16e3
    assert zone_measure(roof(height=11e3), "near gable") == 20e3
    assert zone_measure(roof(height=11e3), "right") == 22e3


def test_wind_across_the_ridge() -> None:
    zones = roof_zones(roof(), "left")  # e = 16 m
    assert named(zones, "F") == [(0.0, 1600.0, 0.0, 4000.0), (0.0, 1600.0, 36e3, 40e3)]
    assert named(zones, "G") == [(0.0, 1600.0, 4000.0, 36e3)]
    assert named(zones, "H") == [(1600.0, 10e3, 0.0, 40e3)]
    assert named(zones, "J") == [(10e3, 11600.0, 0.0, 40e3)]
    assert named(zones, "I") == [(11600.0, 20e3, 0.0, 40e3)]
    assert {zone.name: zone.part for zone in zones} == {
        "F": "upwind",
        "G": "upwind",
        "H": "upwind",
        "J": "downwind",
        "I": "downwind",
    }


def test_wind_along_the_ridge() -> None:
    zones = roof_zones(roof(), "near gable")
    assert named(zones, "F") == [(0.0, 4000.0, 0.0, 1600.0), (16e3, 20e3, 0.0, 1600.0)]
    assert named(zones, "G") == [(4000.0, 10e3, 0.0, 1600.0), (10e3, 16e3, 0.0, 1600.0)]
    assert named(zones, "H") == [(0.0, 10e3, 1600.0, 8000.0), (10e3, 20e3, 1600.0, 8000.0)]
    assert named(zones, "I") == [(0.0, 10e3, 8000.0, 40e3), (10e3, 20e3, 8000.0, 40e3)]


def test_zones_begin_at_the_roof_edge() -> None:
    zones = roof_zones(roof(overhang=500.0), "left")
    assert named(zones, "G") == [(-500.0, 1100.0, 3500.0, 36.5e3)]


def test_monopitch_low_and_high_eaves() -> None:
    assert {zone.table for zone in roof_zones(roof("rises to the right"), "left")} == {"monopitch 0"}
    assert {zone.table for zone in roof_zones(roof("rises to the right"), "right")} == {"monopitch 180"}
    assert {zone.table for zone in roof_zones(roof("rises to the left"), "left")} == {"monopitch 180"}
    along = roof_zones(roof("rises to the right"), "near gable")
    assert named(along, "Flow") == [(0.0, 4000.0, 0.0, 1600.0)]
    assert named(along, "Fup") == [(16e3, 20e3, 0.0, 1600.0)]
    along = roof_zones(roof("rises to the left"), "far gable")
    assert named(along, "Fup") == [(0.0, 4000.0, 38.4e3, 40e3)]


def test_flat_roofs_pay_no_heed_to_the_ridge() -> None:
    zones = roof_zones(roof(degrees=3.0), "right")
    assert {zone.table for zone in zones} == {"flat"}
    assert named(zones, "H") == [(12e3, 18.4e3, 0.0, 40e3)]
    assert named(zones, "I") == [(0.0, 12e3, 0.0, 40e3)]


def test_a_strip_deeper_than_the_slope_fills_it() -> None:
    zones = roof_zones(roof(height=60e3), "left")  # e = 40 m: e/10 = 4 m; e/4 = 10 m
    assert named(zones, "F")[0] == (0.0, 4000.0, 0.0, 10e3)
    steep = RoofShape(
        "duopitch", 0.5, 0.5, (0.0, 6e3), (0.0, 6e3), 3e3, (0.0, 90e3), 90e3, 6e3, 45e3, (40e3, 40e3)
    )  # e = 90 m, e/10 = 9 m on slopes of 3 m
    assert {zone.name for zone in roof_zones(steep, "left")} == {"F", "G", "J"}


@pytest.mark.parametrize("wind", DIRECTIONS)
@pytest.mark.parametrize("kind", get_args(ShapeKind))
@pytest.mark.parametrize(("degrees", "overhang", "height"), [(12.0, 0.0, 8e3), (3.0, 900.0, 4e3), (35.0, 400.0, 90e3)])
def test_zones_cover_the_roof_once(
    wind: WindFrom, kind: ShapeKind, degrees: float, overhang: float, height: float
) -> None:
    """Second opinion by shapely: the union is the roof, and the areas add up to it, so nothing overlaps."""
    shape = roof(kind, degrees if kind != "trough" else -degrees, overhang, height)
    boxes = [box(zone) for zone in roof_zones(shape, wind)]
    whole = shapely.box(shape.edges[0], shape.ends[0], shape.edges[1], shape.ends[1])
    assert shapely.union_all(boxes).equals(whole)
    assert sum(part.area for part in boxes) == pytest.approx(whole.area, rel=1e-12)


@pytest.mark.parametrize("wind", DIRECTIONS)
def test_shares_of_a_strip_are_areas(wind: WindFrom) -> None:
    """Second opinion by shapely: area of each zone within each stretch of the strip."""
    shape = roof(overhang=600.0)
    zones = roof_zones(shape, wind)
    cuts, strip = np.array([-600.0, 0.0, 700.0, 5e3, 9.9e3, 20.6e3]), (-600.0, 6.1e3)
    found = shares(zones, cuts, strip)
    assert found.sum(axis=1) == pytest.approx(np.ones(5))
    for row, (x0, x1) in enumerate(pairwise(cuts)):
        stretch = shapely.box(x0, strip[0], x1, strip[1])
        expected = [stretch.intersection(box(zone)).area / stretch.area for zone in zones]
        assert found[row] == pytest.approx(expected)


def test_walls() -> None:
    """EN 1991-1-4 Figure 7.5: A for e/5, B to e, C beyond; e/5 and 4e/5 seen in Steel Buildings in Europe, Part 3."""
    zones = {(zone.face, zone.name): (zone.start, zone.end) for zone in wall_zones(roof(), "near gable")}
    assert zones == {
        ("near gable", "D"): (0.0, 20e3),
        ("far gable", "E"): (0.0, 20e3),
        ("left wall", "A"): (0.0, 3200.0),
        ("left wall", "B"): (3200.0, 16e3),
        ("left wall", "C"): (16e3, 40e3),
        ("right wall", "A"): (0.0, 3200.0),
        ("right wall", "B"): (3200.0, 16e3),
        ("right wall", "C"): (16e3, 40e3),
    }
    zones = {(zone.face, zone.name): (zone.start, zone.end) for zone in wall_zones(roof(), "right")}
    assert zones["near gable", "A"] == (16.8e3, 20e3)
    assert zones["near gable", "B"] == (4e3, 16.8e3)
    assert zones["right wall", "D"] == (0.0, 40e3)
    assert zones["left wall", "E"] == (0.0, 40e3)
    assert ("near gable", "C") in zones
    assert {zone.name for zone in wall_zones(roof(height=11e3), "left")} == {"A", "B", "D", "E"}  # e > d


def test_slopes_on_either_side_of_5_degrees_are_refused() -> None:
    shape = RoofShape("duopitch", 0.05, 0.2, (0.0, 20e3), (0.0, 20e3), 10e3, (0.0, 40e3), 40e3, 20e3, 8e3, (6e3, 6e3))
    with pytest.raises(InputError, match="flatter than 5 deg"):
        roof_zones(shape, "left")
