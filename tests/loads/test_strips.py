"""Tributary lengths on roofs small enough to divide by hand."""

import math

import numpy as np
import pytest

from spanwright.loads.strips import Strips, strips
from spanwright.truss.forms import build_form
from spanwright.truss.given import build_given
from spanwright.truss.inputs import FormInput, GivenInput, RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine, lay_purlins

# 3-4-5 slopes: 8 m span, 3 m rise, 5 m of slope on each side, panels of 1.25 m on the slope
ROOF = FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=8)


def restraint(purlins: float | tuple[float, ...], ridge_pair: float | None = None) -> RestraintInput:
    return RestraintInput(purlins, "all", "roof bracing", True, ridge_pair=ridge_pair)


def divided(truss: Truss, purlins: tuple[float, ...], ridge_pair: float | None = None) -> Strips:
    return strips(truss, lay_purlins(truss, restraint(purlins, ridge_pair)))


def test_a_single_ridge_line_takes_both_halves() -> None:
    roof = divided(build_form(ROOF), (0.0, 2000.0, 4000.0))
    assert roof.lengths.sum(axis=1) == pytest.approx([1000, 2000, 1500, 1000, 1500, 2000, 1000])
    assert roof.plan() == pytest.approx([800, 1600, 1200, 800, 1200, 1600, 800])
    assert roof.plan("left") == pytest.approx([800, 1600, 1200, 400, 0, 0, 0])
    assert roof.plan("right") == pytest.approx([0, 0, 0, 400, 1200, 1600, 800])


def test_each_line_of_a_ridge_pair_carries_to_the_apex() -> None:
    roof = divided(build_form(ROOF), (0.0, 2000.0), ridge_pair=200.0)
    # the upper lines stand 4.8 m up a slope of 5 m: (4.8 - 2.0) / 2 below, 0.2 m above
    assert roof.lengths.sum(axis=1) == pytest.approx([1000, 2400, 1600, 1600, 2400, 1000])
    assert roof.plan("left") == pytest.approx([800, 1920, 1280, 0, 0, 0])


def test_the_eaves_line_carries_from_the_edge_of_an_overhang() -> None:
    overhanging = FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=8, overhang=800.0)  # 1 m of slope
    roof = divided(build_form(overhanging), (200.0, 3000.0))  # from the edge: 200 mm on the overhang, 2 m up the slope
    assert roof.places == pytest.approx([-800.0, 2000.0, 5000.0, 8000.0, 10800.0])
    assert roof.lengths.sum(axis=1) == pytest.approx([1600, 2900, 3000, 2900, 1600])


def test_without_a_ridge_line_the_slopes_part_at_the_apex() -> None:
    def line(number: int, along: float) -> PurlinLine:
        return PurlinLine(number, 0.0, 0.0, along, None, None, True, "left")

    roof = strips(build_form(ROOF), (line(1, 1000.0), line(2, 4600.0), line(3, 7000.0)))
    assert roof.lengths.sum(axis=1) == pytest.approx([2800, 2200, 5000])
    assert roof.plan("right") == pytest.approx([0, 0, 4000])


def test_wind_presses_across_each_slope() -> None:
    roof = divided(build_form(ROOF), (0.0, 2500.0))
    forces = roof.across(1.0, -2.0)
    # w s dz sideways, -w s dx upward for every piece of slope; dx = 0.8 l, dz = 0.6 l on the left, -0.6 l on the right
    left, right = np.array([0.6, -0.8]), np.array([-0.6, -0.8])
    expected = [1250 * left, 2500 * left, 1250 * left - 2.0 * 1250 * right, -2.0 * 2500 * right, -2.0 * 1250 * right]
    assert forces == pytest.approx(np.array(expected))


def mono_pitch() -> Truss:
    return build_given(
        GivenInput(
            joints=(
                ("A", 0.0, 0.0),
                ("B", 4000.0, 0.0),
                ("C", 8000.0, 0.0),
                ("D", 4000.0, 1500.0),
                ("E", 8000.0, 3000.0),
            ),
            bars=(
                ("A", "D", "top chord"),
                ("D", "E", "top chord"),
                ("A", "B", "bottom chord"),
                ("B", "C", "bottom chord"),
                ("B", "D", "post"),
                ("C", "E", "post"),
                ("B", "E", "diagonal"),
            ),
            supports=(("A", "pinned"), ("C", "sliding")),
        )
    )


def test_a_roof_of_one_slope_has_its_halves_about_mid_span() -> None:
    roof = divided(mono_pitch(), (0.0, 4000.0))
    length = math.hypot(8000.0, 3000.0)
    assert set(roof.slope) == {"left"}
    assert roof.lengths.sum() == pytest.approx(length)
    assert roof.plan("left").sum() == pytest.approx(4000.0)
    assert roof.plan("right").sum() == pytest.approx(4000.0)
    cosine = 8000.0 / length
    assert roof.plan("left") == pytest.approx([2000.0 * cosine, 4000.0 - 2000.0 * cosine, 0.0])
