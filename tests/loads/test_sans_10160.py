"""SANS 10160: imposed load, peak pressure by edition, and what is refused."""

from __future__ import annotations

from dataclasses import replace
from typing import Literal

import pytest

from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.sans_10160 import Sans10160, air_density, return_period_factor, roughness_factor
from spanwright.loads.site_inputs import SiteInput, SnowInput
from spanwright.truss.errors import InputError, UnknownNameError

SITE = SiteInput(40e3, 6e3, "B", 36.0, altitude=1500e3)
SHAPE = RoofShape("duopitch", 0.2, 0.2, (0.0, 20e3), (0.0, 20e3), 10e3, (0.0, 40e3), 40e3, 20e3, 8e3, (6e3, 6e3))


@pytest.mark.parametrize(
    ("area", "expected"), [(1.0, 0.50), (3.0, 0.50), (9.0, 0.40), (12.0, 0.35), (15.0, 0.30), (100.0, 0.30)]
)
def test_imposed_load_by_tributary_area(area: float, expected: float) -> None:
    """SABS 0160:1989, inaccessible roofs: 0.3 + (15 - A)/60 between 3 and 15 m2, from memory."""
    found = Sans10160("2019").imposed(SITE, SHAPE, area * 1e6)
    assert found.pressure == pytest.approx(expected * 1e-3)
    assert found.man == 900.0
    assert [step.symbol for step in found.steps] == ["A", "q", "Q"]


def test_air_is_thinner_higher_up() -> None:
    """SANS 10160-3:2019 Table 4, values from memory: linear between, constant beyond."""
    assert [air_density(metres * 1e3) for metres in (-100, 0, 250, 1500, 2600)] == pytest.approx(
        [1.2, 1.2, 1.16, 1.0, 0.94]
    )


def test_below_its_least_height_a_terrain_gives_no_less() -> None:
    """Project assumption where the standard's rule is not known: C counts from 5 m, D from 10 m."""
    assert roughness_factor("C", 2e3) == roughness_factor("C", 5e3) == pytest.approx(0.733, abs=5e-4)
    assert roughness_factor("D", 1e3) == roughness_factor("D", 10e3) == pytest.approx(0.706, abs=5e-4)


def test_the_steps_lead_to_the_pressure() -> None:
    found = Sans10160("2011").peak_pressure(replace(SITE, wind_speed=28.0, topography=1.1, return_period=100.0), 8e3)
    value = {step.symbol: step.value for step in found.steps}
    assert value["cprob"] == pytest.approx(return_period_factor(100.0))
    assert value["vb"] == pytest.approx(28.0 * value["cprob"])
    assert value["vp"] == pytest.approx(value["cr"] * 1.1 * 1.4 * value["vb"])
    assert value["qp"] == pytest.approx(value["rho"] * value["vp"] ** 2 / 2000)
    assert found.pressure == value["qp"] / 1e3
    assert all(step.meaning and step.unit for step in found.steps)
    assert {step.symbol for step in found.steps if step.mark == "from memory"} >= {"cg", "cr", "rho", "alpha", "zg"}


@pytest.mark.parametrize(
    ("edition", "speed", "hint"),
    [
        ("2019", 28.0, "SANS 10160:2011"),
        ("2011", 40.0, "SANS 10160:2019"),
        ("2011", 20.0, "28 to 36"),
        ("2019", 60.0, "32 to 44"),
        ("2019", None, "32 to 44"),
    ],
)
def test_a_speed_of_the_other_map_is_refused(edition: Literal["2011", "2019"], speed: float | None, hint: str) -> None:
    with pytest.raises(InputError) as caught:
        Sans10160(edition).peak_pressure(replace(SITE, wind_speed=speed), 8e3)
    assert caught.value.key == "site.basic_wind_speed"
    assert hint in caught.value.remedy


def test_terrains_have_names() -> None:
    with pytest.raises(UnknownNameError, match="terrain category"):
        Sans10160("2019").peak_pressure(replace(SITE, terrain="II"), 8e3)
    with pytest.raises(InputError, match="missing") as caught:
        Sans10160("2019").peak_pressure(replace(SITE, terrain=None), 8e3)
    assert caught.value.key == "site.terrain"


def test_there_is_no_snow_in_sans_10160() -> None:
    """The series has no snow part: contents page of SANS 10160-1:2010, seen."""
    assert Sans10160("2019").snow(SITE, SHAPE) == ()
    with pytest.raises(InputError, match="no part on snow"):
        Sans10160("2019").snow(replace(SITE, snow=SnowInput(0.5e-3)), SHAPE)


def test_national_values_are_refused_where_the_standard_leaves_none_open() -> None:
    with pytest.raises(InputError, match="national values of Norway") as caught:
        Sans10160("2011").imposed(replace(SITE, national="Norway"), SHAPE, 75e6)
    assert caught.value.key == "site.national_values"
