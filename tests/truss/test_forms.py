"""Topology, names, panels and warnings of the parametric forms."""

import math
from dataclasses import replace

import pytest

from spanwright.truss.errors import InputError
from spanwright.truss.forms import build_form, check_panels, panels_for, settle_panels
from spanwright.truss.inputs import FormInput, Lean
from spanwright.truss.model import Truss

HOWE = FormInput("Howe", 24000.0, math.atan(0.5), panels=8)
RAISED = FormInput("Pratt", 18000.0, math.radians(5), 900.0, 12)
FINK = FormInput("Fink", 24000.0, math.atan(0.5), panels=8)


def bars_of(truss: Truss) -> dict[str, tuple[str, str]]:
    named = zip(truss.bar_names, truss.ends, strict=True)
    return {name: (truss.joint_names[a], truss.joint_names[b]) for name, (a, b) in named}


def names(truss: Truss, joints: tuple[int, ...]) -> list[str]:
    return [truss.joint_names[joint] for joint in joints]


def test_a_triangular_heel_is_one_joint_and_the_ridge_is_in_the_middle() -> None:
    truss = build_form(HOWE)
    assert names(truss, truss.top.joints) == ["B0", "T1", "T2", "T3", "T4", "T5", "T6", "T7", "B8"]
    assert names(truss, truss.bottom.joints) == [f"B{i}" for i in range(9)]
    assert tuple(truss.xy[truss.joint("T4")]) == pytest.approx((12000.0, 6000.0))
    assert tuple(truss.xy[truss.joint("B0")]) == (0.0, 0.0)


def test_a_triangular_howe_has_the_classical_webs() -> None:
    # practice notes 1.3: vertical Bi-Ti, diagonal Ti to B(i+1) down to mid-span, none in the heel panel
    bars = bars_of(build_form(HOWE))
    assert {bar: ends for bar, ends in bars.items() if bar[0] in "PD"} == {
        **{f"P{i}": (f"B{i}", f"T{i}") for i in range(1, 8)},
        "D2": ("T1", "B2"),
        "D3": ("T2", "B3"),
        "D4": ("T3", "B4"),
        "D5": ("B4", "T5"),
        "D6": ("B5", "T6"),
        "D7": ("B6", "T7"),
    }


def test_a_triangular_pratt_leans_the_other_way() -> None:
    truss = build_form(replace(HOWE, form="Pratt"))
    bars = bars_of(truss)
    assert (bars["D2"], bars["D4"], bars["D5"]) == (("B1", "T2"), ("B3", "T4"), ("T4", "B5"))
    assert (truss.form, truss.lean) == ("Pratt", "up to centre")


def test_a_raised_pratt_leans_down_and_has_posts_and_diagonals_everywhere() -> None:
    truss = build_form(RAISED)
    bars = bars_of(truss)
    assert (bars["D1"], bars["D6"], bars["D7"], bars["D12"]) == (
        ("T0", "B1"),
        ("T5", "B6"),
        ("B6", "T7"),
        ("B11", "T12"),
    )
    assert [bar for bar in bars if bar.startswith("P")] == [f"P{i}" for i in range(13)]
    assert truss.lean == "down to centre"
    assert truss.xy[truss.joint("T0"), 1] == 900.0
    assert names(truss, truss.bearing_joints) == ["B0", "B12"]


@pytest.mark.parametrize("panels", [2, 4, 8, 16])
@pytest.mark.parametrize("lean", ["up to centre", "down to centre"])
def test_counts_of_pratt_and_howe(panels: int, lean: Lean) -> None:
    # practice notes 1.3: triangular 4n - 3 bars and 2n joints, raised heel 4n + 1 bars and 2n + 2 joints
    form = replace(HOWE, panels=panels, lean=lean)
    triangular, raised = build_form(form), build_form(replace(form, heel_depth=1000.0))
    assert (len(triangular.bar_names), len(triangular.joint_names)) == (4 * panels - 3, 2 * panels)
    assert (len(raised.bar_names), len(raised.joint_names)) == (4 * panels + 1, 2 * panels + 2)


@pytest.mark.parametrize(("panels", "joints", "bars"), [(4, 7, 11), (6, 9, 15), (8, 15, 27)])
def test_counts_of_finks(panels: int, joints: int, bars: int) -> None:
    # practice notes 1.3
    truss = build_form(replace(FINK, panels=panels))
    assert (len(truss.joint_names), len(truss.bar_names)) == (joints, bars)


def test_a_compound_fink_has_the_classical_webs() -> None:
    # practice notes 1.3: BF, CG, DH are struts, FC, CH, GH, HE ties; F is B1, G is B2, H is M1, B, C, D, E are T1 to T4
    truss = build_form(FINK)
    bars = bars_of(truss)
    assert (bars["P1"], bars["P2"], bars["P3"]) == (("T1", "B1"), ("T2", "B2"), ("T3", "M1"))
    assert (bars["D1"], bars["D2"], bars["D3"], bars["D4"]) == (("B1", "T2"), ("T2", "M1"), ("B2", "M1"), ("M1", "T4"))
    assert (bars["D5"], bars["D8"]) == (("T4", "M2"), ("T6", "B4"))
    assert tuple(truss.xy[truss.joint("B2")]) == pytest.approx((7500.0, 0.0))
    assert tuple(truss.xy[truss.joint("M1")]) == pytest.approx((9750.0, 3000.0))


@pytest.mark.parametrize("panels", [4, 8])
def test_struts_of_a_fink_stand_square_to_the_rafter(panels: int) -> None:
    truss = build_form(replace(FINK, pitch=math.radians(23), panels=panels))
    for post in truss.bars_with_role("post"):
        left = truss.xy[truss.ends[post]].mean(axis=0)[0] < truss.span / 2
        rafter = truss.directions[truss.top.bars[0 if left else -1]]
        assert truss.directions[post] @ rafter == pytest.approx(0.0, abs=1e-12)


def test_finks_are_told_apart_by_name() -> None:
    assert [build_form(replace(FINK, panels=panels)).form for panels in (4, 6, 8)] == [
        "Fink",
        "Fink fan",
        "compound Fink",
    ]
    assert build_form(FINK).lean == ""


def test_two_panels_make_a_king_post_without_a_lean() -> None:
    truss = build_form(replace(HOWE, span=6000.0, panels=2))
    assert (truss.form, truss.lean) == ("king post", "")
    assert bars_of(truss)["P1"] == ("B1", "T1")


def test_a_stated_lean_overrides_the_name_and_is_warned_about() -> None:
    truss = build_form(replace(HOWE, lean="up to centre"))
    assert (truss.form, truss.lean) == ("Howe", "up to centre")
    assert bars_of(truss)["D2"] == ("B1", "T2")
    assert "usually called Pratt" in truss.warnings[0]
    assert not any("lean" in warning for warning in build_form(replace(HOWE, lean="down to centre")).warnings)


def test_the_overhang_in_plan_becomes_a_length_along_the_slope() -> None:
    truss = build_form(replace(HOWE, overhang=600.0))
    assert truss.top.overhang == pytest.approx((600.0 * math.sqrt(1.25), 600.0 * math.sqrt(1.25)))
    assert len(truss.joint_names) == 16


def test_supports_of_either_kind() -> None:
    sliding, pinned = build_form(HOWE), build_form(HOWE, "both pinned")
    assert [(support.x, support.y) for support in sliding.supports] == [(True, True), (False, True)]
    assert [(support.x, support.y) for support in pinned.supports] == [(True, True), (True, True)]


# Panels from the purlin spacing


def test_panels_left_out_are_the_fewest_even_number_within_the_spacing() -> None:
    # 18 m at 12 deg: one slope is 9.2013 m, so panels of 1.5335 m need 12 and anything below needs 14
    form = replace(RAISED, pitch=math.radians(12), panels=None)
    assert panels_for(form, 1800.0) == 12
    assert panels_for(form, 1534.0) == 12
    assert panels_for(form, 1530.0) == 14
    assert len(build_form(form).top.bars) == 12


def test_a_fink_takes_the_smallest_of_its_three_sizes() -> None:
    # one slope of 24 m at 1:2 is 13.416 m
    form = replace(FINK, panels=None)
    assert [panels_for(form, spacing) for spacing in (7000.0, 4500.0, 3400.0)] == [4, 6, 8]
    with pytest.raises(InputError, match="choose a Pratt or Howe"):
        panels_for(form, 1800.0)


def test_settling_fills_in_what_is_left_out() -> None:
    form = replace(RAISED, pitch=math.radians(12), panels=None)
    assert settle_panels(form, "at joints").panels == 12
    assert settle_panels(form, 1500.0).panels == 14
    assert settle_panels(form, (100.0, 1400.0, 2700.0)).panels == 16
    assert settle_panels(replace(form, panels=10), (100.0, 1400.0)).panels == 10
    assert settle_panels(replace(form, panels=10), "at joints").panels == 10


def test_panels_and_spacing_that_contradict_are_both_named() -> None:
    form = replace(RAISED, pitch=math.radians(12))
    with pytest.raises(InputError) as refused:
        settle_panels(form, 1500.0)
    assert refused.value.key == "truss.panels"
    for part in ("12 panels", "1.534 m", "1.5 m", "14 panels"):
        assert part in str(refused.value)


@pytest.mark.parametrize("spacing", [1534.0, 1800.0, 3200.0, 767.0])
def test_purlins_wider_than_panels_or_in_whole_parts_of_them_do_not_contradict(spacing: float) -> None:
    check_panels(replace(RAISED, pitch=math.radians(12)), spacing)
