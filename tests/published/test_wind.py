"""Wind from the site against printed figures and against vectors of our rule sheets."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Literal

import numpy as np
import pytest
from printed import beyond_rounding, read_printed

from spanwright.loads.cases import LoadSet, loads_on
from spanwright.loads.coefficients import roof_coefficients
from spanwright.loads.inputs import LoadsInput, MostLeast
from spanwright.loads.internal import internal_coefficients
from spanwright.loads.pressures import WindField
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.sans_10160 import Sans10160, return_period_factor, roughness_factor
from spanwright.loads.site_inputs import Opening, SiteInput
from spanwright.loads.zones import wall_zones, zone_measure
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.purlins import lay_purlins

SITE = SiteInput(40e3, 6e3, "B", 36.0, altitude=1500e3, derive=frozenset({"wind"}))
PITCH = math.radians(12.0)
HEIGHT = 6e3 + 10e3 * math.tan(PITCH)


def duopitch(site: SiteInput = SITE, actions: str = "SANS 10160:2019") -> LoadSet:
    """The roof of section 7 of our rule sheet of SANS 10160: span 20, length 40, eaves 6, pitch 12 degrees, s = 5."""
    truss = build_form(FormInput("Pratt", 20e3, PITCH, 0.0, 12))
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    loads = LoadsInput(MostLeast(0.0, 0.0), 0.0, ())
    return loads_on(truss, lines, loads, site, actions, spacing=5e3, tributary=5e3)


def field_of(found: LoadSet) -> WindField:
    assert found.site is not None
    assert found.site.wind is not None
    return found.site.wind


@pytest.mark.parametrize("row", read_printed("sans_roughness.csv"), ids=lambda row: row["z_m"])
def test_roughness(row: dict[str, str]) -> None:
    """Our rule sheet of SANS 10160-3, table of section 3.2."""
    height = float(row["z_m"])
    for category, least in (("A", 1.0), ("B", 2.0), ("C", 5.0), ("D", 10.0)):
        if height >= least:
            assert beyond_rounding(row[category], roughness_factor(category, height * 1e3)) == pytest.approx(0.0)


@pytest.mark.parametrize(("years", "expected"), [(25, "0.960"), (50, "1.000"), (100, "1.038")])
def test_return_period(years: float, expected: str) -> None:
    """Values of our rule sheet, section 3.1; formula and constants seen in Moroathsehla, "Wind load pressures"."""
    assert beyond_rounding(expected, return_period_factor(years)) == 0.0


@pytest.mark.parametrize(
    ("edition", "speed", "vp", "qp"), [("2019", 36.0, 34.75, 0.6038), ("2011", 28.0, 37.84, 0.7159)]
)
def test_peak_pressure_of_both_editions(edition: Literal["2011", "2019"], speed: float, vp: float, qp: float) -> None:
    """Our rule sheet, section 7: cr 0.9653, rho 1.00."""
    found = Sans10160(edition).peak_pressure(replace(SITE, wind_speed=speed), HEIGHT)
    value = {step.symbol: step.value for step in found.steps}
    assert value["cr"] == pytest.approx(0.9653, abs=5e-5)
    assert value["rho"] == pytest.approx(1.0)
    assert value["vp"] == pytest.approx(vp, abs=5e-3)
    assert found.pressure * 1e3 == pytest.approx(qp, abs=5e-5)


def test_measures_of_the_zones() -> None:
    """Our rule sheet, section 7: h 8.126, e 16.25 for either direction."""
    shape = field_of(duopitch()).shape
    assert shape.height / 1e3 == pytest.approx(8.126, abs=5e-4)
    assert zone_measure(shape, "left") / 1e3 == pytest.approx(16.25, abs=5e-3)
    assert zone_measure(shape, "near gable") / 1e3 == pytest.approx(16.25, abs=5e-3)


@pytest.mark.parametrize("row", read_printed("sans_duopitch_12deg.csv"), ids=lambda row: row["zone"])
def test_pressures_by_zone(row: dict[str, str]) -> None:
    """Our rule sheet, section 7."""
    qp = Sans10160("2019").peak_pressure(SITE, HEIGHT).pressure * 1e3
    zones = ("I", "J") if row["zone"] in "IJ" else ("F", "G", "H")
    lines = roof_coefficients("duopitch 0", zones, 12.0, 100e6)
    for sign, short in (("suction", "neg"), ("pressure", "pos")):
        cpe = float(lines[sign][zones.index(row["zone"])])  # type: ignore[index]  # a word of Sign
        assert cpe == pytest.approx(float(row[f"cpe_{short}"]), abs=5e-4)
        for cpi in ("+0.2", "-0.3"):
            assert qp * (cpe - float(cpi)) == pytest.approx(float(row[f"w_{short}_cpi{cpi}"]), abs=5.1e-4)


SUMS = {  # cpi +0.2: down and downwind, cpi -0.3: down and downwind, kN
    ("suction", "suction"): ((-42.40, 0.33), (-12.21, 0.33)),
    ("suction", "pressure"): ((-26.15, -3.12), (4.03, -3.12)),
    ("pressure", "suction"): ((-23.80, 4.29), (6.39, 4.29)),
    ("pressure", "pressure"): ((-7.55, 0.84), (22.63, 0.84)),
}


@pytest.mark.parametrize("signs", SUMS, ids=" and ".join)
@pytest.mark.parametrize(("wind", "downwind"), [("left", 1.0), ("right", -1.0)])
def test_sums_over_the_roof_of_an_interior_truss(signs: tuple[str, str], wind: str, downwind: float) -> None:
    """Our rule sheet, section 7: table of sums for wind across the ridge; roof alone, column heads take nothing."""
    cases = {case.name: case for case in duopitch(replace(SITE, column_head_share=0.0)).cases}
    for cpi, (down, along) in zip(("+0.2", "-0.3"), SUMS[signs], strict=True):
        case = cases[f"wind from {wind}, {signs[0]} and {signs[1]}, inside {cpi}"]
        x, y = case.joint_loads.sum(axis=0) / 1e3
        assert -y == pytest.approx(down, abs=0.0051)
        assert x * downwind == pytest.approx(along, abs=0.0051)


def test_wind_along_the_ridge() -> None:
    """Our rule sheet, section 7: cpe F -1.39, G -1.30, H -0.63, I -0.53; w with cpi +0.2."""
    lines = roof_coefficients("duopitch 90", ("F", "G", "H", "I"), 12.0, 100e6)
    assert set(lines) == {"suction"}
    assert lines["suction"] == pytest.approx([-1.39, -1.30, -0.63, -0.53])
    qp = Sans10160("2019").peak_pressure(SITE, HEIGHT).pressure * 1e3
    assert qp * (lines["suction"] - 0.2) == pytest.approx([-0.960, -0.906, -0.501, -0.441], abs=5e-4)


def test_an_interior_truss_in_the_lee_of_the_gable_zones() -> None:
    """By hand: far from the upwind gable every stretch lies in I, so the sum is -0.441 kPa on 20 m x 5 m."""
    found = duopitch(replace(SITE, column_head_share=0.0))
    (case,) = [case for case in found.cases if case.name == "wind from far gable, suction, inside +0.2"]
    assert case.joint_loads.sum(axis=0) / 1e3 == pytest.approx([0.0, 0.6038 * 0.73 * 100.0], rel=5e-4, abs=1e-9)


def test_a_door_that_dominates() -> None:
    """Steel Buildings in Europe, Single-Storey, Part 3, Appendix B p. 53 (seen): gable wind on b 32, d 60, h 8; a door
    wholly in zone B, where cpe is -0.8, gives cpi = 0.90 x (-0.8) = -0.72. e = 16, e/5 = 3.2, 4e/5 = 12.8 (pp. 47, 48).
    """
    half = math.atan2(2.0, 16.0)
    shape = RoofShape("duopitch", half, half, (0.0, 32e3), (0.0, 32e3), 16e3, (0.0, 60e3), 60e3, 32e3, 8e3, (6e3, 6e3))
    zones = wall_zones(shape, "near gable")
    along = {zone.name: zone.end - zone.start for zone in zones if zone.face == "left wall"}
    assert along == {"A": 3200.0, "B": 12800.0, "C": 44e3}
    values = {"A": -1.2, "B": -0.8, "C": -0.5, "D": 0.7, "E": -0.3}
    site = SiteInput(60e3, 6e3, openings=(Opening("left wall", 20e6, 8e3, 12e3),))
    (found,) = internal_coefficients(site, shape, "near gable", tuple((zone, values[zone.name]) for zone in zones), ())
    assert found.cpi == pytest.approx(-0.72)


def test_every_wind_case_of_the_truss_has_its_place() -> None:
    """Our rule sheet, section 3.9: four sign cases by two internal pressures from a side; two from a gable."""
    winds = [case for case in duopitch().cases if case.kind == "wind"]
    assert len(winds) == 2 * 4 * 2 + 2 * 2
    assert np.isfinite([case.joint_loads for case in winds]).all()
