"""Closed formulas of sections against polygons of their outlines, integrated independently."""

from __future__ import annotations

import numpy as np
import pytest
import shapely
from outlines import Angle, Tube, angle_outline, moments, tube_outline

from spanwright.design.shapes import AngleShape, angle_shape
from spanwright.design.tubes import TubeShape, rectangular_tube, round_tube
from spanwright.design.turning import Turned, back_to_back, single_angle, starred, tube

ANGLES: list[Angle] = [
    (80, 80, 8, 10, 5),
    (50, 50, 5, 7, 3.5),
    (100, 50, 8, 8, 4),  # plastic axis in the upright leg
    (50, 100, 8, 8, 4),
    (100, 75, 10, 10, 5),  # plastic axis in the root
    (200, 100, 15, 15, 7.5),
    (60, 60, 10, 8, 0),
    (90, 75, 8, 0, 0),
]
TUBES: list[Tube] = [(120, 60, 5, 10, 5), (60, 120, 5, 10, 5), (80, 80, 4, 8, 4), (200, 100, 12.5, 37.5, 25)]
GAP = 10.0
POLYGON = 2e-5  # what chords in place of arcs cost


def shape_of(size: Angle) -> AngleShape:
    return angle_shape(*(np.array([float(length)]) for length in size))


def tube_of(size: Tube) -> TubeShape:
    return rectangular_tube(*(np.array([float(length)]) for length in size))


def plastic_modulus(outline: shapely.Geometry) -> float:
    """First moments of both halves about the level that halves the area, which bisection finds."""
    left, below, right, above = outline.bounds
    low, high = below, above
    for _ in range(60):
        level = (low + high) / 2
        lower = outline.intersection(shapely.box(left, below, right, level))
        low, high = (level, high) if lower.area < outline.area / 2 else (low, level)
    upper = outline.intersection(shapely.box(left, level, right, above))
    return float(upper.area * (upper.centroid.y - level) + lower.area * (level - lower.centroid.y))


@pytest.mark.parametrize("size", ANGLES)
def test_angle_agrees_with_its_polygon(size: Angle) -> None:
    shape, outline = shape_of(size), angle_outline(size)
    found = moments(outline)
    assert shape.area == pytest.approx(found["area"], rel=POLYGON)
    assert shape.perimeter == pytest.approx(outline.length, rel=POLYGON)
    assert shape.centroid_x == pytest.approx(found["x"], rel=POLYGON)
    assert shape.centroid_y == pytest.approx(found["y"], rel=POLYGON)
    assert shape.inertia_x == pytest.approx(found["Ix"], rel=POLYGON)
    assert shape.inertia_y == pytest.approx(found["Iy"], rel=POLYGON)
    assert shape.product == pytest.approx(found["Ixy"], rel=POLYGON)
    assert shape.plastic_x == pytest.approx(plastic_modulus(outline), rel=5 * POLYGON)


@pytest.mark.parametrize("size", ANGLES)
def test_principal_axes_of_an_angle_are_those_of_its_polygon_turned(size: Angle) -> None:
    shape = shape_of(size)
    turned = moments(shapely.affinity.rotate(angle_outline(size), -float(shape.angle[0]), use_radians=True))
    assert shape.inertia_u == pytest.approx(turned["Ix"], rel=POLYGON)
    assert shape.inertia_v == pytest.approx(turned["Iy"], rel=POLYGON)
    assert abs(turned["Ixy"]) < POLYGON * turned["Ix"]


@pytest.mark.parametrize("size", ANGLES)
def test_shear_centre_of_an_angle_is_where_the_middle_lines_of_its_legs_meet(size: Angle) -> None:
    shape, found = shape_of(size), moments(angle_outline(size))
    crossing = shapely.Point(size[2] / 2, size[2] / 2)
    turned = shapely.affinity.rotate(
        crossing, -float(shape.angle[0]), origin=(found["x"], found["y"]), use_radians=True
    )
    assert shape.shear_u == pytest.approx(abs(turned.x - found["x"]), abs=1e-2)
    assert shape.shear_v == pytest.approx(abs(turned.y - found["y"]), abs=1e-2)


def test_a_toe_radius_beyond_the_thickness_is_cut_down_to_it() -> None:
    assert shape_of((45, 45, 3, 7, 3.5)).area == shape_of((45, 45, 3, 7, 3)).area


def test_many_sizes_at_once_give_what_each_gives_alone() -> None:
    together = angle_shape(*np.array(ANGLES, dtype=np.float64).T)
    for i, size in enumerate(ANGLES):
        alone = shape_of(size)
        for name, values in vars(together).items():
            assert values[i] == pytest.approx(getattr(alone, name)[0], rel=1e-14), name


@pytest.mark.parametrize("size", TUBES)
def test_rectangular_tube_agrees_with_its_polygon(size: Tube) -> None:
    shape, outline = tube_of(size), tube_outline(size)
    found = moments(outline)
    assert shape.area == pytest.approx(found["area"], rel=POLYGON)
    assert shape.perimeter == pytest.approx(outline.exterior.length, rel=POLYGON)
    assert shape.inertia_x == pytest.approx(found["Ix"], rel=POLYGON)
    assert shape.inertia_y == pytest.approx(found["Iy"], rel=POLYGON)
    assert shape.elastic_x == pytest.approx(found["Ix"] / (size[0] / 2), rel=POLYGON)
    assert shape.plastic_x == pytest.approx(plastic_modulus(outline), rel=5 * POLYGON)


def test_round_tube_agrees_with_its_polygon() -> None:
    shape = round_tube(np.array([76.1]), np.array([3.6]))
    outline = shapely.Point(0, 0).buffer(38.05, quad_segs=400).difference(shapely.Point(0, 0).buffer(34.45, 400))
    found = moments(outline)
    assert shape.area == pytest.approx(found["area"], rel=POLYGON)
    assert shape.inertia_x == pytest.approx(found["Ix"], rel=POLYGON)
    assert shape.torsion == pytest.approx(found["Ix"] + found["Iy"], rel=POLYGON)
    assert shape.plastic_x == pytest.approx(plastic_modulus(outline), rel=5 * POLYGON)


def pair_outline(size: Angle) -> shapely.Geometry:
    right = shapely.affinity.translate(angle_outline(size), GAP / 2)
    return right.union(shapely.affinity.scale(right, -1, 1, origin=(0, 0)))


def star_outline(size: Angle) -> shapely.Geometry:
    right = shapely.affinity.translate(angle_outline(size), GAP / 2, GAP / 2)
    return right.union(shapely.affinity.scale(right, -1, -1, origin=(0, 0)))


def check_whole(turned: Turned, outline: shapely.Geometry) -> None:
    """The plane of the truss is the vertical one: y runs in it, x across it."""
    found = moments(outline)
    mean, half = (found["Ix"] + found["Iy"]) / 2, np.hypot((found["Ix"] - found["Iy"]) / 2, found["Ixy"])
    left, below, right, above = outline.bounds
    assert turned.area == pytest.approx(found["area"], rel=POLYGON)
    assert turned.inertia_in == pytest.approx(found["Ix"], rel=POLYGON)
    assert turned.inertia_out == pytest.approx(found["Iy"], rel=POLYGON)
    assert turned.inertia_major == pytest.approx(mean + half, rel=POLYGON)
    assert turned.inertia_minor == pytest.approx(mean - half, rel=POLYGON)
    assert turned.modulus_plastic == pytest.approx(plastic_modulus(outline), rel=5 * POLYGON)
    assert turned.depth == pytest.approx(above - below)
    assert turned.width == pytest.approx(right - left)


@pytest.mark.parametrize("size", ANGLES)
def test_single_angle_turned_into_the_truss(size: Angle) -> None:
    check_whole(single_angle(shape_of(size)), angle_outline(size))


@pytest.mark.parametrize("size", ANGLES)
def test_pair_back_to_back_turned_into_the_truss(size: Angle) -> None:
    turned, outline = back_to_back(shape_of(size), GAP), pair_outline(size)
    check_whole(turned, outline)
    found = moments(outline)
    assert turned.modulus_heel == pytest.approx(found["Ix"] / found["y"], rel=POLYGON)
    assert turned.modulus_toe == pytest.approx(found["Ix"] / (size[0] - found["y"]), rel=POLYGON)
    assert turned.shear_sym == pytest.approx(found["y"] - size[2] / 2, rel=POLYGON)
    along_symmetry = turned.shear_major if found["Iy"] > found["Ix"] else turned.shear_minor
    assert along_symmetry == turned.shear_sym
    assert turned.shear_major + turned.shear_minor == turned.shear_sym


@pytest.mark.parametrize("size", [size for size in ANGLES if size[0] == size[1]])
def test_starred_pair_turned_into_the_truss(size: Angle) -> None:
    turned, outline = starred(shape_of(size), GAP), star_outline(size)
    check_whole(turned, outline)
    assert turned.modulus_heel == turned.modulus_toe
    assert turned.shear_major == turned.shear_minor == turned.shear_sym == 0


@pytest.mark.parametrize("size", TUBES)
def test_tube_turned_into_the_truss(size: Tube) -> None:
    check_whole(tube(tube_of(size)), tube_outline(size))


def greatest_stress(outline: shapely.Polygon, *, below: float, above: float) -> float:
    """For a unit moment about x, free sideways, over the vertices between two levels (unsymmetric bending)."""
    found = moments(outline)
    x, y = np.vstack([np.array(part.exterior.coords) for part in shapely.get_parts(outline)]).T
    here = (y >= below) & (y <= above)
    stress = np.linalg.solve(
        np.array([[found["Ix"], found["Ixy"]], [found["Ixy"], found["Iy"]]]), np.array([1.0, 0.0])
    ) @ np.array([y - found["y"], x - found["x"]])
    return float(np.max(np.abs(stress[here])))


@pytest.mark.parametrize("size", ANGLES)
def test_moduli_of_a_single_angle_count_its_skew_bending(size: Angle) -> None:
    turned, outline = single_angle(shape_of(size)), angle_outline(size)
    toe = greatest_stress(outline, below=size[0] - size[4], above=size[0])
    heel = greatest_stress(outline, below=0, above=size[2])
    assert turned.modulus_toe[0] * toe == pytest.approx(1, rel=POLYGON)
    assert turned.modulus_heel[0] * heel == pytest.approx(1, rel=POLYGON)


@pytest.mark.parametrize("size", [size for size in ANGLES if size[0] == size[1]])
def test_moduli_of_a_starred_pair_count_its_skew_bending(size: Angle) -> None:
    outline = star_outline(size)
    worst = greatest_stress(outline, below=-1e3, above=1e3)
    assert starred(shape_of(size), GAP).modulus_toe[0] * worst == pytest.approx(1, rel=POLYGON)


def test_free_bending_costs_a_thin_equal_angle_a_fifth() -> None:
    """ANSI/AISC 360 F10: 0.80 of the geometric modulus for an equal angle without lateral restraint, from memory."""
    shape = shape_of((80, 80, 0.1, 0, 0))
    geometric = shape.inertia_x / (shape.upright - shape.centroid_y)
    assert single_angle(shape).modulus_toe / geometric == pytest.approx(0.80, abs=0.001)
