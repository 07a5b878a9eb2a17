"""Pressure coefficients: tables, lines of one sign, interpolation, walls and the inside."""

from __future__ import annotations

import math

import numpy as np
import pytest

from spanwright.loads.coefficients import (
    dominance,
    internal_without_dominant_face,
    is_flat,
    roof_coefficients,
    wall_coefficients,
)
from spanwright.truss.errors import InputError

LARGE = 50e6


def test_rows_are_returned_as_printed() -> None:
    """EN 1991-1-4 Table 7.4a at 30 degrees, from memory."""
    lines = roof_coefficients("duopitch 0", ("F", "G", "H"), 30.0, LARGE)
    assert lines["suction"].tolist() == [-0.5, -0.5, -0.2]
    assert lines["pressure"].tolist() == [0.7, 0.7, 0.4]


def test_lines_run_straight_between_values_of_one_sign() -> None:
    """At 12 degrees, worked by hand in our rule sheet of SANS 10160-3, section 3.9."""
    upwind = roof_coefficients("duopitch 0", ("F", "G", "H"), 12.0, LARGE)
    assert upwind["suction"] == pytest.approx([-1.14, -0.92, -0.39])
    assert upwind["pressure"] == pytest.approx([0.14, 0.14, 0.14])
    downwind = roof_coefficients("duopitch 0", ("I", "J"), 12.0, LARGE)
    assert downwind["suction"] == pytest.approx([-0.46, -0.88])
    assert downwind["pressure"] == pytest.approx([0.0, 0.06])


@pytest.mark.parametrize("pitch", [5.0, 8.0, 14.9, 15.0])
def test_zone_I_takes_nothing_on_the_pressure_line_between_5_and_15_degrees(pitch: float) -> None:
    """Project rule: the single -0.6 at 5 degrees is suction."""
    assert roof_coefficients("duopitch 0", ("I",), pitch, LARGE).get("pressure", np.zeros(1)) == pytest.approx([0.0])


def test_a_line_that_a_slope_does_not_have_is_absent() -> None:
    assert set(roof_coefficients("duopitch 0", ("F", "G", "H"), 65.0, LARGE)) == {"pressure"}
    assert set(roof_coefficients("duopitch 0", ("I", "J"), 65.0, LARGE)) == {"suction"}
    assert set(roof_coefficients("duopitch 0", ("F", "G", "H"), -20.0, LARGE)) == {"suction"}
    assert set(roof_coefficients("duopitch 90", ("F", "G", "H", "I"), 20.0, LARGE)) == {"suction"}


def test_flat_roofs_keep_their_suction_beside_either_value_of_zone_I() -> None:
    """EN 1991-1-4 Table 7.2, sharp eaves, from memory."""
    lines = roof_coefficients("flat", ("F", "G", "H", "I"), 2.0, LARGE)
    assert lines["suction"].tolist() == [-1.8, -1.2, -0.7, -0.2]
    assert lines["pressure"].tolist() == [-1.8, -1.2, -0.7, 0.2]


@pytest.mark.parametrize(("area", "expected"), [(0.5e6, -2.0), (1e6, -2.0), (math.sqrt(10) * 1e6, -1.45), (10e6, -0.9)])
def test_small_areas_tend_to_the_local_coefficient(area: float, expected: float) -> None:
    """EN 1991-1-4 cl. 7.2.1: cpe = cpe,1 - (cpe,1 - cpe,10) log A; F at 15 degrees has -2.0 and -0.9, from memory."""
    assert roof_coefficients("duopitch 0", ("F",), 15.0, area)["suction"] == pytest.approx([expected])


@pytest.mark.parametrize(("table", "pitch"), [("duopitch 0", 76.0), ("duopitch 0", -46.0), ("monopitch 0", -10.0)])
def test_a_pitch_outside_the_table_is_refused(table: str, pitch: float) -> None:
    with pytest.raises(InputError, match="outside") as caught:
        roof_coefficients(table, ("F",), pitch, LARGE)  # type: ignore[arg-type]  # a word of RoofTable
    assert caught.value.key == "truss.pitch"


def test_below_5_degrees_a_roof_is_flat() -> None:
    assert is_flat(4.9)
    assert is_flat(-4.9)
    assert not is_flat(math.degrees(math.radians(5.0)))
    assert not is_flat(-5.0)


def test_walls_by_height_over_depth() -> None:
    """EN 1991-1-4 Table 7.1, from memory: D +0.7 at h/d of 0.25 and less, +0.8 from 1 on."""
    assert wall_coefficients(0.1) == {"A": -1.2, "B": -0.8, "C": -0.5, "D": 0.7, "E": -0.3}
    assert wall_coefficients(0.625)["D"] == pytest.approx(0.75)
    assert wall_coefficients(3.0)["E"] == pytest.approx(-0.6)


@pytest.mark.parametrize(
    ("mu", "ratio", "expected"),
    [
        (0.2, 0.25, 0.35),
        (0.33, 0.1, 0.35),
        (0.95, 0.2, -0.3),
        (1.0, 1.0, -0.5),
        (0.64, 1.0, -0.075),  # half-way from 0.33 to 0.95
        (1.0, 0.625, -0.4),  # half-way between the curves
    ],
)
def test_inside_by_the_share_of_openings_under_suction(mu: float, ratio: float, expected: float) -> None:
    """EN 1991-1-4 Figure 7.13, from memory."""
    assert internal_without_dominant_face(mu, ratio) == pytest.approx(expected)


@pytest.mark.parametrize(
    ("area", "others", "expected"),
    [(20.0, 10.0, 0.75), (25.0, 10.0, 0.825), (30.0, 10.0, 0.9), (1.0, 0.0, 0.9), (19.9, 10.0, 0.0), (0.0, 0.0, 0.0)],
)
def test_dominant_faces(area: float, others: float, expected: float) -> None:
    """EN 1991-1-4 cl. 7.2.9 (5): 0.75 at twice the other openings, 0.90 at three times, from memory."""
    assert dominance(area, others) == pytest.approx(expected)
