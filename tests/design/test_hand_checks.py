"""Hand checks: they agree with every sound design, and each fails when what it checks is falsified."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Literal

import numpy as np
import pytest
from calculated import FAMILIES, designed
from demos import DEMOS, demo

from spanwright.design.comparison import Comparison, compared
from spanwright.design.envelope import envelope
from spanwright.design.hand_checks import hand_checks
from spanwright.design.hand_cuts import chosen_cuts, crossing
from spanwright.design.hand_loads import plan_by_slope
from spanwright.design.hand_statics import mirror
from spanwright.design.result import Design
from spanwright.design.rules_of_thumb import rule
from spanwright.design.run import design
from spanwright.truss.inputs import FormInput, GivenInput
from spanwright.truss.model import Role

SupportWords = Literal["left pinned, right sliding", "both pinned", "as given"]
FIXED: dict[Role, str] = {
    "top chord": "2L 80x80x8",
    "bottom chord": "2L 80x80x8",
    "post": "L 70x70x7",
    "diagonal": "L 70x70x7",
}


def roof(
    base: str,
    form: FormInput | GivenInput,
    supports: SupportWords = "left pinned, right sliding",
    sections: dict[Role, str] = FIXED,
) -> Design:
    """Return a demo's loads on another truss, with sections given so that no search takes time."""
    project = demo(base)
    wind = tuple(replace(case, right=0.0) for case in project.loads.wind) if form is MONO_PITCH else project.loads.wind
    return design(
        replace(
            project,
            truss=form,
            supports=supports,
            loads=replace(project.loads, wind=wind, at_joint=()),
            members=replace(project.members, by_role=sections, by_group={}),
            groups={},
            restraint=replace(project.restraint, ridge_pair=None, knee_braces="none", bottom_ties="none"),
        )
    )


MONO_PITCH = GivenInput(
    joints=(
        ("A", 0.0, 0.0),
        ("T1", 2000.0, 500.0),
        ("T2", 4000.0, 1000.0),
        ("T3", 6000.0, 1500.0),
        ("B1", 2000.0, 0.0),
        ("B2", 4000.0, 0.0),
        ("B3", 6000.0, 0.0),
    ),
    bars=(
        ("A", "T1", "top chord"),
        ("T1", "T2", "top chord"),
        ("T2", "T3", "top chord"),
        ("A", "B1", "bottom chord"),
        ("B1", "B2", "bottom chord"),
        ("B2", "B3", "bottom chord"),
        ("B1", "T1", "post"),
        ("B2", "T2", "post"),
        ("B3", "T3", "post"),
        ("T1", "B2", "diagonal"),
        ("T2", "B3", "diagonal"),
    ),
    supports=(("A", "pinned"), ("B3", "sliding")),
)
SLOPE = math.radians(15.0)
VARIANTS: dict[str, tuple[str, FormInput, SupportWords]] = {
    "triangular Pratt": ("howe_workshop", FormInput("Pratt", 16000.0, SLOPE, 0.0, 8), "left pinned, right sliding"),
    "overhang": ("howe_workshop", FormInput("Howe", 12000.0, SLOPE, 0.0, 8, 600.0), "left pinned, right sliding"),
    "heel and overhang": (
        "howe_workshop",
        FormInput("Pratt", 12000.0, SLOPE, 700.0, 8, 900.0),
        "left pinned, right sliding",
    ),
    "both pinned": ("howe_workshop", FormInput("Howe", 15000.0, SLOPE, 0.0, 10), "both pinned"),
    "Fink of 4": ("fink_barn", FormInput("Fink", 9000.0, 2 * SLOPE, panels=4), "left pinned, right sliding"),
    "Fink of 6": ("fink_barn", FormInput("Fink", 9000.0, 2 * SLOPE, panels=6), "left pinned, right sliding"),
}


@pytest.fixture(scope="module")
def store() -> Design:
    return designed("pratt_store")


def failing(found: Design) -> set[str]:
    return {row.name for row in hand_checks(found) if row.exact and not row.passes}


def named(found: Design, name: str) -> list[Comparison]:
    rows = [row for row in hand_checks(found) if row.name.startswith(name)]
    assert rows, name
    return rows


@pytest.mark.parametrize("name", [*FAMILIES, "coast_shed"])
def test_the_hand_agrees_with_every_design(name: str) -> None:
    assert not failing(designed(name))


@pytest.mark.parametrize("name", VARIANTS)
def test_the_hand_agrees_with_other_trusses(name: str) -> None:
    found = roof(*VARIANTS[name])
    assert not failing(found)
    assert named(found, "sum of upright reactions") and named(found, "deflection, total")


def test_the_hand_agrees_with_a_mono_pitch() -> None:
    found = roof("howe_workshop", MONO_PITCH, "as given")
    assert not failing(found)
    assert not [row for row in hand_checks(found) if row.name == "symmetry"]


@pytest.mark.parametrize("name", DEMOS)
def test_the_same_value_is_found_by_both_ways_to_rounding(name: str) -> None:
    """Mechanics leaves no difference: what is allowed for the hand's rounding is not used."""
    for row in hand_checks(designed(name)):
        if row.exact and row.unit in ("N", "N mm", "mm") and row.by_hand != 0.0:
            assert row.found == pytest.approx(row.by_hand, rel=1e-6, abs=1e-3), row


def test_a_closed_form_is_that_of_the_books() -> None:
    """Triangular truss, n equal panels: end tie (n - 1) P/(2 tan), rafter minus that over the cosine (textbook)."""
    found = designed("howe_workshop")
    project = found.setting.project
    panel_load = project.loads.roof_imposed * project.tributary * 15000.0 / 10.0
    tie, rafter = (named(found, name)[0] for name in ("BC1, tie", "TC1, rafter"))
    assert tie.by_hand == pytest.approx(9.0 * panel_load / (2.0 * math.tan(math.radians(18.0))))
    assert rafter.by_hand == pytest.approx(-9.0 * panel_load / (2.0 * math.sin(math.radians(18.0))))


def test_a_chord_force_by_hand() -> None:
    """Method of sections: the tie beside mid-span has its moments taken about the joint where rafter and web meet."""
    truss = designed("pratt_store").setting.truss
    cut = chosen_cuts(truss)[-1]
    centre = crossing(truss, cut.top, cut.web)
    assert truss.bar_names[cut.bottom] == "BC6" and centre is not None
    assert np.allclose(centre, truss.xy[truss.joint_names.index("T5")], atol=1e-6)


@pytest.mark.parametrize(
    ("field", "caught"),
    [
        ("forces", {"TC1, force N = M/h", "deflection, total"}),
        ("reactions", {"TC1, force N = M/h", "uplift held by the bearings"}),
        ("loads", {"sum of upright reactions", "reaction at B12 by moments"}),
    ],
)
def test_falsified_arrays_are_caught(store: Design, field: str, caught: set[str]) -> None:
    wrong = getattr(store.analysis, field) * 1.01
    assert caught <= failing(replace(store, analysis=replace(store.analysis, **{field: wrong})))


def test_a_falsified_deflection_is_caught(store: Design) -> None:
    rows = tuple(replace(row, value=row.value * 1.005) for row in store.serviceability.deflections)
    wrong = replace(store, serviceability=replace(store.serviceability, deflections=rows))
    assert failing(wrong) == {"deflection, variable", "deflection, total"}


def test_a_falsified_case_is_caught(store: Design) -> None:
    """Loads that do not come from pressure and area, and a moment that statics does not allow."""
    cases = tuple(
        replace(case, joint_loads=case.joint_loads * 1.02, moments=case.moments * 1.02) for case in store.analysis.cases
    )
    caught = failing(replace(store, analysis=replace(store.analysis, cases=cases)))
    assert {"load against area", "moment between joints"} <= caught


def test_lost_symmetry_and_residuals_are_caught(store: Design) -> None:
    forces = store.analysis.case_forces.copy()
    forces[0] += 500.0
    wrong = replace(store.analysis, case_forces=forces)
    assert failing(replace(store, analysis=wrong)) == {"symmetry"}
    assert failing(replace(store, second_difference=5.0)) == {"bar forces found a second way"}


def test_a_bar_across_a_straight_line_is_caught() -> None:
    found = designed("howe_workshop")
    forces = found.analysis.case_forces.copy()
    forces[list(found.setting.truss.bar_names).index("P1")] += 500.0
    assert "bars that meet a straight line alone" in failing(
        replace(found, analysis=replace(found.analysis, case_forces=forces))
    )


def test_thrust_is_caught(store: Design) -> None:
    solution = store.analysis.solutions[0]
    reactions = solution.reactions.copy()
    reactions[0, 0] += 500.0
    reactions[12, 0] -= 500.0
    wrong = replace(store.analysis, solutions=(replace(solution, reactions=reactions),))
    assert failing(replace(store, analysis=wrong)) == {"no thrust under loads straight down"}


def test_pinned_at_both_ends_thrust_is_expected_and_the_sliding_reading_has_none() -> None:
    found = roof(*VARIANTS["both pinned"])
    names = [row.name for row in named(found, "no thrust")]
    assert names == ["no thrust under loads straight down, one end sliding"]


def test_rules_of_thumb_are_those_of_the_source() -> None:
    """Thayer's formula and L/3 + 5 as tabulated in the trade notes for 24 m: 12.9 and 13.0 kg/m2 (q = 90, s = 6)."""
    thayer, other = rule("mass_thayer"), rule("mass_span")
    assert math.sqrt(90.0 / 6.0) * (24.0 / thayer["divisor"] + thayer["constant"]) == pytest.approx(12.9, abs=0.05)
    assert 24.0 / other["divisor"] + other["constant"] == pytest.approx(13.0)


def test_a_heavy_truss_and_a_stocky_web_are_outside_their_rules(store: Design) -> None:
    thick: dict[Role, str] = FIXED | {"top chord": "2L 100x100x12", "bottom chord": "2L 100x100x12"}
    heavy = roof("pratt_store", FormInput("Pratt", 18000.0, math.radians(5.0), 900.0, 12), sections=thick)
    outside = {row.name for row in hand_checks(heavy) if not row.exact and not row.passes}
    assert "mass of the truss" in outside
    assert "length over depth, posts" in {
        row.name for row in hand_checks(designed("howe_workshop")) if not row.exact and not row.passes
    }
    assert not [row for row in hand_checks(store) if not row.exact and not row.passes]


def test_comparisons_allow_a_pocket_calculator_three_figures() -> None:
    assert compared("", "", "", 1000.0, 1000.9, "N").passes
    assert not compared("", "", "", 1000.0, 1001.1, "N").passes
    assert compared("", "", "", 0.0, 0.9, "N", scale=1000.0).passes


def test_plan_of_the_slopes_reaches_to_the_edges() -> None:
    truss = roof(*VARIANTS["heel and overhang"]).setting.truss
    assert plan_by_slope(truss) == pytest.approx((6900.0, 6900.0))


def test_the_mirror_image_of_a_mirror_image_is_the_joint_itself(store: Design) -> None:
    twin = mirror(store.setting.truss)
    assert twin is not None
    assert [twin[joint] for joint in twin] == list(range(len(twin)))


def test_the_envelope_holds_the_greatest_of_every_combination(store: Design) -> None:
    for row in envelope(store.demand):
        axial = store.demand.axial[row.bar]
        assert row.tension.value == pytest.approx(max(axial.max(), 0.0), abs=1.0)
        assert row.compression.value == pytest.approx(max(-axial.min(), 0.0), abs=1.0)
        if row.compression.combination >= 0:
            assert axial[row.compression.combination] == -row.compression.value
