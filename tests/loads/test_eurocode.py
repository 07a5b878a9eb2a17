"""EN 1991: peak pressure and imposed load, national values, and what is refused."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest
from formulas import FUNCTIONS
from hypothesis import given
from hypothesis import strategies as st

from spanwright.loads.cases import loads_on
from spanwright.loads.combinations import ACTIONS
from spanwright.loads.eurocode import Eurocode
from spanwright.loads.inputs import LoadsInput, MostLeast
from spanwright.loads.intermediate import Intermediate
from spanwright.loads.national import national_basis, national_value, nations
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site import STANDARDS
from spanwright.loads.site_inputs import Derivable, SiteInput, SnowInput
from spanwright.truss.errors import InputError, UnknownNameError
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.purlins import lay_purlins

EN = Eurocode("6.10")
SITE = SiteInput(40e3, 6e3, "II", 26.0)
TERRAINS = ["0", "I", "II", "III", "IV"]


def roof(degrees: float) -> RoofShape:
    pitch = math.radians(degrees)
    return RoofShape("duopitch", pitch, pitch, (0.0, 20e3), (0.0, 20e3), 10e3, (0.0, 40e3), 40e3, 20e3, 8e3, (6e3, 6e3))


def pressure(site: SiteInput, height: float) -> float:
    return EN.peak_pressure(site, height).pressure


def assert_formulas_give_their_values(steps: tuple[Intermediate, ...]) -> None:
    value: dict[str, float] = {}
    for step in steps:
        if step.formula:
            found = eval(step.formula, {"__builtins__": {}}, {**FUNCTIONS, **value})
            assert found == pytest.approx(step.value, rel=1e-9), str(step)
        value[step.symbol] = step.value


@pytest.mark.parametrize("height", [1e3, 8e3, 60e3])
def test_printed_formulas_give_their_values(height: float) -> None:
    site = replace(SITE, topography=1.15, return_period=100.0, national="Germany")
    found = EN.peak_pressure(site, height)
    assert_formulas_give_their_values(found.steps)
    assert found.steps[-1].value == found.pressure * 1e3
    assert sum(bool(step.formula) for step in found.steps) == 7
    assert all(step.meaning and step.unit for step in found.steps)


@given(height=st.floats(100.0, 200e3), other=st.floats(100.0, 200e3), terrain=st.sampled_from(TERRAINS))
def test_more_exposed_or_higher_never_lowers_a_pressure(height: float, other: float, terrain: str) -> None:
    here = pressure(replace(SITE, terrain=terrain), height)
    for rougher in TERRAINS[TERRAINS.index(terrain) :]:
        assert pressure(replace(SITE, terrain=rougher), height) <= here
    low, high = sorted((height, other))
    assert pressure(replace(SITE, terrain=terrain), low) <= pressure(replace(SITE, terrain=terrain), high)


def test_below_its_least_height_a_terrain_gives_no_less() -> None:
    """EN 1991-1-4 Table 4.1: z_min 5 m (seen in the worked example of terrain III)."""
    site = replace(SITE, terrain="III")
    assert pressure(site, 2e3) == pressure(site, 5e3) < pressure(site, 5.1e3)


def test_orography_raises_the_mean_speed_and_leaves_the_gusts() -> None:
    """EN 1991-1-4 cl. 4.3 to 4.5, from memory: the pressure is rho vb2 cr2 (co2 + 7 co/ln(z/z0))/2."""
    log = math.log(10.0 / 0.05)
    for factor in (1.0, 1.2, 1.6):
        expected = 0.5 * 1.25 * 26.0**2 * (0.19 * log) ** 2 * (factor**2 + 7 * factor / log)
        assert pressure(replace(SITE, topography=factor), 10e3) * 1e6 == pytest.approx(expected)


def test_a_longer_return_period_means_faster_wind() -> None:
    """c_prob is 1.038 for 100 years (our rule sheet, computed); the pressure goes with its square."""
    once = pressure(SITE, 8e3)
    assert pressure(replace(SITE, return_period=100.0), 8e3) / once == pytest.approx(1.038**2, abs=1.1e-3)
    assert pressure(replace(SITE, return_period=50.0), 8e3) == once


def test_imposed_load_of_category_H() -> None:
    """EN 1991-1-1 Table 6.10, recommended, from memory; the same for every area."""
    for area in (5e6, 500e6):
        found = EN.imposed(SITE, roof(12.0), area)
        assert (found.pressure, found.man) == pytest.approx((0.4e-3, 1000.0))
    assert [step.mark for step in found.steps if step.symbol in ("qk", "Qk")] == ["from memory"] * 2


@pytest.mark.parametrize(("pitch", "expected"), [(0.0, 0.6), (29.0, 0.6), (45.0, 0.3), (60.0, 0.0), (70.0, 0.0)])
def test_imposed_load_in_the_united_kingdom(pitch: float, expected: float) -> None:
    """UK annex to EN 1991-1-1, from memory: 0.6 below 30 degrees, 0.6(60 - pitch)/30 to 60, then nothing; 0.9 kN."""
    found = EN.imposed(replace(SITE, national="United Kingdom"), roof(pitch), 100e6)
    assert found.pressure == pytest.approx(expected * 1e-3)
    assert found.man == pytest.approx(900.0)


def test_of_unequal_slopes_the_flatter_decides_the_imposed_load() -> None:
    unequal = replace(roof(45.0), right=math.radians(20.0))
    assert EN.imposed(replace(SITE, national="United Kingdom"), unequal, 1e8).pressure == pytest.approx(0.6e-3)


def test_germany_knows_the_concentrated_load_alone() -> None:
    """German annex to EN 1991-1-1, from memory."""
    found = EN.imposed(replace(SITE, national="Germany"), roof(12.0), 100e6)
    assert (found.pressure, found.man) == (0.0, 1000.0)


def test_a_nations_own_values_are_named_and_the_rest_is_an_assumption() -> None:
    own, other = national_value("United Kingdom", "xi"), national_value("United Kingdom", "rho")
    assert (own.value, own.clause) == (0.925, "annex to EN 1990 Table A1.2(B)")
    assert "United Kingdom" in own.meaning
    assert other == national_value("", "rho") == national_value("recommended", "rho")
    (basis,) = national_basis("United Kingdom")
    assert basis.mark == "assumed"
    assert "xi" in basis.meaning
    assert national_basis("") == national_basis("recommended") == ()


def test_every_nations_values_stand_in_for_recommended_ones() -> None:
    for nation in nations():
        assert national_basis(nation)
        for symbol in ("gG_sup", "xi", "psi0_snow", "psi0_wind", "qk", "mu1", "relief", "rho"):
            found = national_value(nation, symbol, 20.0)
            assert (found.unit, found.mark in ("seen", "from memory")) == (national_value("", symbol).unit, True)


@pytest.mark.parametrize(
    ("changes", "key", "message"),
    [
        ({"wind_speed": None}, "site.basic_wind_speed", "missing"),
        ({"wind_speed": 48.0}, "site.basic_wind_speed", "gust"),
        ({"wind_speed": 12.0}, "site.basic_wind_speed", "not plausible"),
        ({"terrain": None}, "site.terrain", "low vegetation"),
        ({"terrain": "B"}, "site.terrain", "EN 1991-1-4"),
        ({"national": "United Kingdom"}, "site.national_values", "charts"),
        ({"national": "Untied Kingdom"}, "site.national_values", 'did you mean "United Kingdom"'),
    ],
)
def test_what_is_refused(changes: dict[str, object], key: str, message: str) -> None:
    with pytest.raises(InputError) as caught:
        pressure(replace(SITE, **changes), 8e3)  # type: ignore[arg-type]  # keywords, some wrong on purpose
    assert caught.value.key == key
    assert message in str(caught.value)


def test_the_profile_ends_at_200_m() -> None:
    assert pressure(SITE, 200e3)
    with pytest.raises(InputError, match="200 m"):
        pressure(SITE, 200.1e3)


def test_high_roofs_are_told_of_the_structural_factor() -> None:
    """EN 1991-1-4 cl. 6.2, seen in Steel Buildings in Europe: c_s c_d = 1 below 15 m."""
    assert EN.peak_pressure(SITE, 14.9e3).warnings == ()
    (told,) = EN.peak_pressure(SITE, 15e3).warnings
    assert "cscd" in told


def test_every_standard_has_actions_and_combinations() -> None:
    assert set(STANDARDS) == set(ACTIONS)


ALL: frozenset[Derivable] = frozenset({"roof_permanent", "roof_imposed", "man_load", "wind", "snow"})


@pytest.mark.parametrize("actions", [name for name in STANDARDS if name.startswith("EN")])
def test_a_site_alone_gives_every_kind_of_case(actions: str) -> None:
    site = replace(SITE, snow=SnowInput(0.65e-3, exceptional=2.0), derive=ALL)
    truss = build_form(FormInput("Pratt", 20e3, math.radians(12.0), 600.0, 8, 600.0))
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    found = loads_on(truss, lines, LoadsInput(MostLeast(0.0, 0.0), 0.0, ()), site, actions, spacing=5e3, tributary=5e3)
    assert {case.kind for case in found.cases} == {"permanent", "imposed", "man", "snow", "exceptional snow", "wind"}
    assert all(case.derivation for case in found.cases)
    (memory,) = found.cautions
    assert "EN 1991-1-4 Table 4.1" in memory
    assert "EN 1991-1-3 Table 5.2" in memory


def test_an_unknown_terrain_lists_the_known_ones() -> None:
    with pytest.raises(UnknownNameError, match="known: 0, I, II, III, IV"):
        pressure(replace(SITE, terrain="countryside"), 8e3)
