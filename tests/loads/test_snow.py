"""Snow by EN 1991-1-3: shape coefficients, arrangements, guards, overhangs, and what is refused."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest
from formulas import FUNCTIONS
from hypothesis import given
from hypothesis import strategies as st
from roofs import mono_pitch
from strategies import trusses

from spanwright.loads.cases import Case, loads_on
from spanwright.loads.eurocode import Eurocode
from spanwright.loads.inputs import JointLoad, LoadsInput, MostLeast
from spanwright.loads.roof_shape import RoofShape, ShapeKind, roof_shape
from spanwright.loads.site_inputs import SiteInput, SnowInput
from spanwright.loads.site_standard import SnowArrangement
from spanwright.loads.snow import snow_arrangements
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import lay_purlins

GROUND = 2e-3
UK = "United Kingdom"


def roof(left: float, right: float | None = None, kind: ShapeKind = "duopitch", overhang: float = 0.0) -> RoofShape:
    """Return a roof 20 m wide by the pitch of its slopes, degrees."""
    pitches = math.radians(left), math.radians(left if right is None else right)
    edges = (-overhang, 20e3 + overhang)
    return RoofShape(kind, *pitches, edges, (0.0, 20e3), 10e3, (0.0, 40e3), 40e3, 20e3, 8e3, (6e3, 6e3))


def fallen(
    shape: RoofShape,
    snow: SnowInput = SnowInput(GROUND),  # noqa: B008  # frozen
    altitude: float = 0.0,
    national: str = "",
) -> dict[str, SnowArrangement]:
    site = SiteInput(40e3, 6e3, altitude=altitude, snow=snow, national=national)
    return {one.name: one for one in snow_arrangements(snow, site, shape)}


def shares(arrangement: SnowArrangement) -> tuple[float, float]:
    """Return the load of each slope over the load on the ground."""
    return arrangement.left / GROUND, arrangement.right / GROUND


def cases_on(truss: Truss, snow: SnowInput, altitude: float = 0.0, *at_joint: JointLoad) -> dict[str, Case]:
    site = SiteInput(40e3, 6e3, altitude=altitude, snow=snow, derive=frozenset({"snow"}))
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    loads = LoadsInput(MostLeast(0.0, 0.0), 0.0, (), at_joint=at_joint)
    found = loads_on(truss, lines, loads, site, Eurocode("6.10").name, spacing=5e3, tributary=5e3)
    return {case.name: case for case in found.cases if "snow" in case.kind}


@pytest.mark.parametrize(
    ("pitch", "mu"), [(0.0, 0.8), (15.0, 0.8), (30.0, 0.8), (45.0, 0.4), (57.0, 0.08), (60.0, 0.0)]
)
def test_shape_coefficient(pitch: float, mu: float) -> None:
    """EN 1991-1-3 Table 5.2, from memory: 0.8 to 30 degrees, 0.8(60 - pitch)/30 to 60."""
    assert shares(fallen(roof(pitch))["snow balanced"]) == pytest.approx((mu, mu))


def test_each_slope_has_its_own_coefficient() -> None:
    """EN 1991-1-3 Figure 5.3, seen: mu1(a1) | mu1(a2); 0.5 mu1(a1) | mu1(a2); mu1(a1) | 0.5 mu1(a2)."""
    found = fallen(roof(20.0, 45.0))
    assert shares(found["snow balanced"]) == pytest.approx((0.8, 0.4))
    assert shares(found["snow drifted to the right"]) == pytest.approx((0.4, 0.4))
    assert shares(found["snow drifted to the left"]) == pytest.approx((0.8, 0.2))


def test_exposure_and_warmth_are_factors() -> None:
    found = fallen(roof(10.0), SnowInput(GROUND, exposure=1.2, thermal=0.9))
    assert shares(found["snow balanced"]) == pytest.approx((0.8 * 1.2 * 0.9,) * 2)


@pytest.mark.parametrize("pitch", [20.0, 45.0, 65.0])
def test_guards_keep_the_snow_on_the_roof(pitch: float) -> None:
    """EN 1991-1-3 cl. 5.3, from memory: mu1 not below 0.8."""
    found = fallen(roof(pitch), SnowInput(GROUND, guards=True))
    assert shares(found["snow balanced"]) == pytest.approx((0.8, 0.8))
    assert shares(found["snow drifted to the left"]) == pytest.approx((0.8, 0.4))


@pytest.mark.parametrize(("pitch", "mu"), [(10.0, 0.8), (20.0, 0.8 + 0.4 * 5 / 15), (30.0, 1.2), (45.0, 0.6)])
def test_drifts_in_the_united_kingdom(pitch: float, mu: float) -> None:
    """UK annex to EN 1991-1-3, from memory: 0.8 + 0.4(pitch - 15)/15 on one slope, nothing on the other."""
    found = fallen(roof(pitch), national=UK)
    assert shares(found["snow drifted to the left"]) == pytest.approx((mu, 0.0))
    assert shares(found["snow drifted to the right"]) == pytest.approx((0.0, mu))


@pytest.mark.parametrize("kind", ["rises to the right", "rises to the left", "level"])
def test_one_slope_has_one_arrangement(kind: ShapeKind) -> None:
    """EN 1991-1-3 cl. 5.3.2, from memory."""
    (only,) = fallen(roof(0.0 if kind == "level" else 15.0, kind=kind)).values()
    assert shares(only) == pytest.approx((0.8, 0.8))
    assert [step.symbol for step in only.steps] == ["sk", "Ce", "Ct", "a", "mu", "s"]


def test_a_roof_too_steep_for_snow_has_no_drifts() -> None:
    (only,) = fallen(roof(62.0)).values()
    assert shares(only) == (0.0, 0.0)


def test_exceptional_falls_are_cases_of_their_own() -> None:
    found = fallen(roof(12.0), SnowInput(GROUND, exceptional=2.0))
    assert [one.kind for one in found.values()] == ["snow"] * 3 + ["exceptional snow"] * 3
    assert shares(found["exceptional snow drifted to the left"]) == pytest.approx((1.6, 0.8))


@pytest.mark.parametrize(
    ("ground", "expected"),
    [
        (2.0, 1.6**3 / 3),  # s = 1.6, d = 0.533 m: k = 3/d is capped by 3d = s
        (5.0, 9 / 4 * 4**2 / 3),  # s = 4, d = 1.333 m: k = 3/d = 2.25
    ],
)
def test_snow_over_the_eaves(ground: float, expected: float) -> None:
    """EN 1991-1-3 cl. 6.3, from memory: se = k s2/3, k = 3/d not above 3d; by hand, with d = s/3."""
    found = fallen(roof(20.0, overhang=600.0), SnowInput(ground * 1e-3), altitude=900e3)
    for arrangement in found.values():
        assert (arrangement.edge_left, arrangement.edge_right) == pytest.approx((expected, expected))


def test_snow_hangs_over_eaves_alone_and_above_800_m() -> None:
    """EN 1991-1-3 cl. 6.3, recommended, from memory."""
    snow = SnowInput(GROUND)

    def edges(shape: RoofShape, altitude: float = 900e3) -> list[bool]:
        one = fallen(shape, snow, altitude)["snow balanced"]
        return [one.edge_left > 0.0, one.edge_right > 0.0]

    assert edges(roof(20.0)) == [False, False]
    assert edges(roof(20.0, overhang=600.0)) == [True, True]
    assert edges(roof(20.0, overhang=600.0), 800e3) == [False, False]
    assert edges(roof(20.0, overhang=600.0, kind="rises to the right")) == [True, False]
    assert edges(roof(20.0, overhang=600.0, kind="rises to the left")) == [False, True]
    assert edges(roof(62.0, overhang=600.0)) == [False, False]


@pytest.mark.parametrize("national", ["", UK])
def test_printed_formulas_give_their_values(national: str) -> None:
    snow = SnowInput(GROUND, exposure=1.2, exceptional=1.8)
    for arrangement in fallen(roof(20.0, 40.0, overhang=500.0), snow, 900e3, national).values():
        value: dict[str, float] = {}
        for step in arrangement.steps:
            if step.formula:
                found = eval(step.formula, {"__builtins__": {}}, {**FUNCTIONS, **value})
                assert found == pytest.approx(step.value, rel=1e-9), str(step)
            value[step.symbol] = step.value
        assert (value["s_left"], value["s_right"]) == pytest.approx((arrangement.left * 1e3, arrangement.right * 1e3))


@pytest.mark.parametrize(
    ("shape", "altitude", "key", "message"),
    [
        (roof(12.0), 1500.1e3, "site.altitude", "1500 m"),
        (roof(-12.0, kind="trough"), 0.0, "site.snow", "trough"),
    ],
)
def test_what_is_refused(shape: RoofShape, altitude: float, key: str, message: str) -> None:
    """EN 1991-1-3 cl. 1.1, seen: to 1500 m."""
    with pytest.raises(InputError) as caught:
        fallen(shape, altitude=altitude)
    assert caught.value.key == key
    assert message in str(caught.value)
    assert 'kind = "snow"' in caught.value.remedy
    assert fallen(roof(12.0), altitude=1500e3)


@given(truss=trusses(), altitude=st.sampled_from([0.0, 900e3]), guards=st.booleans())
def test_the_joints_carry_pressure_times_area_and_the_eaves(truss: Truss, altitude: float, guards: bool) -> None:
    snow = SnowInput(GROUND, guards=guards, exceptional=1.5)
    shape = roof_shape(truss, SiteInput(40e3, 6e3))
    cases = cases_on(truss, snow, altitude)
    for name, arrangement in fallen(shape, snow, altitude).items():
        (low, high), middle = shape.edges, shape.middle
        on_plan = arrangement.left * (middle - low) + arrangement.right * (high - middle)
        total = (on_plan + arrangement.edge_left + arrangement.edge_right) * 5e3
        assert cases[name].joint_loads.sum(axis=0) == pytest.approx([0.0, -total], rel=1e-9, abs=1e-6)
        balanced = cases["snow balanced" if arrangement.kind == "snow" else "exceptional snow balanced"]
        assert -cases[name].joint_loads[:, 1].sum() <= -balanced.joint_loads[:, 1].sum() + 1e-6


@given(truss=trusses())
def test_snow_drifted_the_other_way_is_the_mirror_image(truss: Truss) -> None:
    cases = cases_on(truss, SnowInput(GROUND))
    if "snow drifted to the left" not in cases:
        return
    left, right = (cases[f"snow drifted to the {side}"].joint_loads[:, 1] for side in ("left", "right"))
    middle = truss.xy[list(truss.bearing_joints), 0].sum() / 2
    turned = np.column_stack([2 * middle - truss.xy[:, 0], truss.xy[:, 1]])
    partner = np.array([int(np.argmin(np.hypot(*(truss.xy - place).T))) for place in turned])
    assert left == pytest.approx(right[partner], rel=1e-9, abs=1e-6)


def test_snow_on_a_mono_pitch_truss() -> None:
    """By hand: rises 3 in 4 (36.87 degrees) over 12 m, mu1 = 0.8 x 23.13/30."""
    (case,) = cases_on(mono_pitch(), SnowInput(GROUND)).values()
    mu = 0.8 * (60.0 - math.degrees(math.atan(0.75))) / 30.0
    assert -case.joint_loads[:, 1].sum() == pytest.approx(mu * GROUND * 12e3 * 5e3)


def test_a_load_at_a_joint_may_be_snow_and_join_a_case_of_the_site() -> None:
    truss = mono_pitch()
    alone = cases_on(truss, SnowInput(GROUND))["snow balanced"]
    drift = JointLoad("snow balanced", "snow", "T3", down=5000.0)
    joined = cases_on(truss, SnowInput(GROUND), 0.0, drift, replace(drift, case="slide"))
    assert set(joined) == {"snow balanced", "slide"}
    assert (joined["snow balanced"].joint_loads - alone.joint_loads).sum(axis=0) == pytest.approx([0.0, -5000.0])


def test_without_snow_there_is_none() -> None:
    assert Eurocode("6.10").snow(SiteInput(40e3, 6e3), roof(12.0)) == ()
