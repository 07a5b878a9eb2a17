"""Axial force with bending by SANS 10162-1 cl. 13.8 and 13.9."""

from __future__ import annotations

from dataclasses import fields, replace
from typing import Any

import numpy as np
import pytest
from members import check_named, member_demand, named, sections

from spanwright.design.candidates import Family
from spanwright.design.sans.bending import EquivalentMoment, LateralMoment, PairLateral, PairMoment, RectangularMoment
from spanwright.design.sans.combinations import undominated
from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.standard import Check, Demand
from spanwright.design.steps import explain
from spanwright.truss.errors import InputError

KN, KNM = 1e3, 1e6
PAIR = "2L 80x80x8"


def one(value: float) -> Any:
    return np.array([[value]])


def chord(axial: float, sag: float = 0.0, hog: float = 0.0, **changes: Any) -> Demand:
    """One chord member of 1500 mm in plane and 3000 mm out of plane, loads between its joints."""
    values: dict[str, Any] = {
        "in_plane": 1500,
        "out_of_plane": 3000,
        "torsional": 3000,
        "panel": 1500,
        "minor": 3000,
        "sag": [[sag]],
        "hog": [[hog]],
        "point_loads": [2],
    }
    return member_demand([[axial]], **{**values, **changes})


def ratio(checks: tuple[Check, ...], name: str) -> float:
    return float(check_named(checks, name).ratio[0, 0])


def value(check: Check, symbol: str) -> float:
    """Return the last printed value with this symbol."""
    return [line.value for rule in check.rules for line in explain(rule, (0, 0)) if line.symbol == symbol][-1]


def test_no_moment_no_checks() -> None:
    checks = SANS_10162_1.checks(named("2L", PAIR), chord(-100 * KN))
    assert not [check.name for check in checks if "ging" in check.name]


def test_sagging_compresses_the_heel_of_a_top_chord() -> None:
    """Cl. 13.8.3 (a) by hand: 80x80x8 (class 3) in S355: C/(phi A fy) + M/(phi Ze fy), Ze at the heel when sagging."""
    pair = named("2L", PAIR)
    sagging = SANS_10162_1.checks(pair, chord(-100 * KN, sag=2 * KNM))
    hogging = SANS_10162_1.checks(pair, chord(-100 * KN, hog=2 * KNM))
    axial = 100 * KN / (0.9 * pair.area[0] * 355)
    at_heel = axial + 2 * KNM / (0.9 * pair.modulus_heel[0] * 355)
    at_toe = axial + 2 * KNM / (0.9 * pair.modulus_toe[0] * 355)
    assert at_toe > at_heel
    assert ratio(sagging, "compression and sagging, cross-section") == pytest.approx(at_heel)
    assert ratio(hogging, "compression and hogging, cross-section") == pytest.approx(at_toe)
    assert ratio(sagging, "compression and hogging, cross-section") == 0


def test_a_bottom_chord_is_the_other_way_up() -> None:
    pair = named("2L", PAIR)
    up = SANS_10162_1.checks(pair, chord(-100 * KN, sag=2 * KNM))
    down = SANS_10162_1.checks(pair, chord(-100 * KN, hog=2 * KNM, heel_up=np.array([False])))
    for check in up:
        if "sagging" in check.name:
            other = ratio(down, check.name.replace("sagging", "hogging"))
            assert check.ratio[0, 0] == pytest.approx(other), check.name


def test_in_plane_by_hand() -> None:
    """Cl. 13.8.3 (b), 13.8.4: U1 = 1/(1 - Cu/Ce), w1 = 1.0 for several loads."""
    pair = named("2L", PAIR)
    checks = SANS_10162_1.checks(pair, chord(-150 * KN, sag=2 * KNM))
    euler = np.pi**2 * 200e3 * pair.inertia_in[0] / 1500**2
    buckling = check_named(checks, "buckling in plane").resistance[0, 0]
    expected = 150 * KN / buckling + 2 * KNM / (1 - 150 * KN / euler) / (0.9 * pair.modulus_heel[0] * 355)
    assert ratio(checks, "compression and sagging, in plane") == pytest.approx(expected)


def test_out_of_plane_takes_the_force_of_the_run() -> None:
    pair = named("2L", PAIR)
    checks = SANS_10162_1.checks(pair, chord(-100 * KN, hog=1 * KNM, sideways=[[140 * KN]]))
    buckling = check_named(checks, "buckling out of plane, flexure and torsion").resistance[0, 0]
    bent = check_named(checks, "compression and hogging, out of plane")
    moment = value(bent, "U_1") * 1 * KNM / value(bent, "M_r")
    assert bent.ratio[0, 0] == pytest.approx(140 * KN / buckling + moment)
    assert value(bent, "U_1") == value(check_named(checks, "compression and hogging, in plane"), "U_1")


def test_stretched_fibre_is_checked_without_relief() -> None:
    pair = named("2L", PAIR)
    checks = SANS_10162_1.checks(pair, chord(-1 * KN, sag=10 * KNM))
    toe = 10 * KNM / (0.9 * pair.modulus_toe[0] * 355)
    assert toe > 1
    assert ratio(checks, "compression and sagging, stretched fibre") == pytest.approx(toe, rel=1e-2)
    assert ratio(checks, "compression and sagging, stretched fibre") >= toe


def test_tension_with_bending() -> None:
    """Cl. 13.9: Tu/Tr + Mu/Mr at the stretched fibre; Mu/Mr - Tu Z/(Mr A) at the compressed one."""
    pair = named("2L", PAIR)
    checks = SANS_10162_1.checks(pair, chord(200 * KN, sag=9 * KNM))
    tension = max(check_named(checks, f"tension, {part} section").ratio[0, 0] for part in ("net", "gross"))
    stretched = tension + 9 * KNM / (0.9 * pair.modulus_toe[0] * 355)
    assert ratio(checks, "tension and sagging, stretched fibre") == pytest.approx(stretched)
    resistance = 0.9 * pair.modulus_heel[0] * 355
    relieved = 9 * KNM / resistance - 200 * KN * pair.modulus_heel[0] / (resistance * pair.area[0])
    compressed = check_named(checks, "tension and sagging, compressed fibre")
    assert value(compressed, "M_rl") == pytest.approx(resistance)  # no lateral buckling with toes stretched at 3 m
    assert compressed.ratio[0, 0] == pytest.approx(relieved)
    assert ratio(checks, "compression and sagging, cross-section") == 0


def test_pure_bending_is_checked_too() -> None:
    checks = SANS_10162_1.checks(named("2L", PAIR), chord(0.0, sag=2 * KNM))
    assert ratio(checks, "compression and sagging, cross-section") > 0


@pytest.mark.parametrize(
    ("ends", "loads", "expected"),
    [
        ((10.0, 10.0), 0, 1.0),  # single curvature
        ((10.0, -10.0), 0, 0.4),  # double curvature: 0.6 - 0.4 = 0.2, not below 0.4
        ((10.0, 0.0), 0, 0.6),
        ((0.0, -8.0), 0, 0.6),
        ((5.0, -10.0), 0, 0.4),
        ((-5.0, -10.0), 0, 0.8),
        ((10.0, -10.0), 1, 0.85),  # from memory
        ((10.0, -10.0), 2, 1.0),  # from memory
    ],
)
def test_factor_of_the_moment_diagram(ends: tuple[float, float], loads: int, expected: float) -> None:
    """Cl. 13.8.5: 0.6 - 0.4 kappa >= 0.4 without load between; kappa + in double curvature."""
    smaller, larger = sorted((moment * KNM for moment in ends), key=abs)
    rule = EquivalentMoment(np.array(smaller), np.array(larger), np.array(loads))
    assert rule.factor == pytest.approx(expected)


def test_a_span_moment_above_the_end_moments_shows_a_load() -> None:
    """Whatever the stated number of loads: w1 = 1, not that of the end moments."""
    pair = named("2L", PAIR)
    demand = chord(-100 * KN, sag=2 * KNM, point_loads=[0], end_moments=np.array([[[0.5 * KNM], [-0.5 * KNM]]]))
    check = check_named(SANS_10162_1.checks(pair, demand), "compression and sagging, in plane")
    assert value(check, "w_1") == 1.0
    linear = replace(demand, sag=np.array([[0.5 * KNM]]))
    check = check_named(SANS_10162_1.checks(pair, linear), "compression and sagging, in plane")
    assert value(check, "w_1") == 0.4


def test_factor_on_the_moment_is_never_less_than_one() -> None:
    pair = named("2L", PAIR)
    ends = np.array([[[1 * KNM], [-1 * KNM]]])
    demand = chord(-10 * KN, sag=1 * KNM, hog=1 * KNM, point_loads=[0], end_moments=ends)
    for check in SANS_10162_1.checks(pair, demand):
        if check.name.startswith("compression and") and "cross-section" not in check.name:
            assert value(check, "U_1") == 1.0


def test_beyond_the_euler_load_the_sum_stays_finite_and_fails() -> None:
    pair = named("2L", "2L 50x50x5")
    checks = SANS_10162_1.checks(pair, chord(-900 * KN, sag=1 * KNM))
    assert 1 < ratio(checks, "compression and sagging, in plane") < np.inf


def test_tubes_are_plastic_in_class_2_and_elastic_beyond() -> None:
    """Flat width over wall against 525/sqrt(355) = 27.9 (from memory): 80x80x4 is 16, 100x100x3 is 29.3."""
    thick, thin = named("SHS", "SHS 80x80x4"), named("SHS", "SHS 100x100x3")
    for tube, modulus in ((thick, thick.modulus_plastic), (thin, thin.modulus_heel)):
        checks = SANS_10162_1.checks(tube, chord(0.0, sag=1 * KNM))
        expected = 1 * KNM / (0.9 * modulus[0] * 355)
        assert ratio(checks, "compression and sagging, cross-section") == pytest.approx(expected)


def test_wide_walls_and_legs_bend_with_a_reduced_yield_stress() -> None:
    leg = PairMoment(one(1e4), one(1e4), one(100), one(80), one(6), one(355), 0.9)
    assert leg.bending_yield == pytest.approx((200 * 6 / 100) ** 2)
    wall = RectangularMoment(one(1), one(1), one(100), one(200), one(4), one(355), 0.9)
    assert wall.bending_yield == pytest.approx((670 / 46) ** 2)


class TestLateralTorsional:
    def test_compressed_toes_are_the_weak_side(self) -> None:
        """AISC 360 F9: B changes its sign; the two critical moments multiply to that without B, squared."""
        toes_stretched, toes_compressed = (
            PairLateral(one(3000), one(90e4), one(9.6e3), one(60), one(sign), 200e3).critical.item() for sign in (1, -1)
        )
        assert toes_stretched > toes_compressed
        plain = 1.95 * 200e3 / 3000 * np.sqrt(90e4 * 9.6e3)
        assert toes_stretched * toes_compressed == pytest.approx(plain**2)

    def test_branches_of_the_resistance_meet(self) -> None:
        """Cl. 13.6 (from memory): at Mcr = 0.67 My the branches differ by 0.1 %; far above it is phi My."""
        at = np.array([0.669999, 0.670001, 100.0]) * KNM
        resistance = LateralMoment(at, np.array(1.0 * KNM), 0.9).resistance
        assert resistance[0] == pytest.approx(resistance[1], rel=2e-3)
        assert resistance[2] == pytest.approx(0.9 * KNM)

    def test_closed_sections_of_a_roof_do_not_buckle_laterally(self) -> None:
        """Square and round tubes keep their full moment at 6 m; only the closed-section formula was used."""
        for family in ("SHS", "CHS"):
            tubes = sections(family).take(list(range(0, 90, 9)))
            demand = chord(0.0, sag=KNM, out_of_plane=6000, torsional=6000)
            checks = SANS_10162_1.checks(tubes, demand)
            section = check_named(checks, "compression and sagging, cross-section").ratio
            lateral = check_named(checks, "compression and sagging, out of plane").ratio
            np.testing.assert_allclose(lateral, section, rtol=0.02)


@pytest.mark.parametrize("family", ["L", "2L star"])
def test_inclined_axes_are_refused_with_the_member_and_a_remedy(family: Family) -> None:
    with pytest.raises(InputError, match="M0 bends between its joints") as refused:
        SANS_10162_1.checks(sections(family).take([0]), chord(-10 * KN, sag=KNM))
    assert refused.value.key == "members"
    assert "2L" in refused.value.remedy


def random_demand(bars: int, combinations: int, seed: int) -> Demand:
    """Correlated and uncorrelated forces, both senses, reversal, zero moments, first webs."""
    draw = np.random.default_rng(seed)
    axial = draw.normal(-40e3, 60e3, (bars, combinations))
    sag = np.where(draw.random(axial.shape) < 0.3, 0.0, np.abs(draw.normal(0, 8e5, axial.shape)))
    hog = np.where(draw.random(axial.shape) < 0.3, 0.0, np.abs(draw.normal(0, 8e5, axial.shape)))
    sag[1] = hog[1] = 0.0
    return member_demand(
        axial,
        draw.uniform(800, 6000, bars),
        sideways=np.maximum(-axial, 0.0) + np.where(draw.random(axial.shape) < 0.3, 20e3, 0.0),
        sag=sag,
        hog=hog,
        end_moments=draw.normal(0, 5e5, (bars, 2, combinations)),
        point_loads=np.arange(bars) % 3,
        first_web=draw.random(axial.shape) < 0.1,
        heel_up=draw.random(bars) < 0.5,
    )


def one_combination(demand: Demand, at: int) -> Demand:
    """Return the demand of one combination alone."""
    shape = demand.axial.shape
    changes: dict[str, Any] = {}
    for entry in fields(demand):
        array = getattr(demand, entry.name)
        if isinstance(array, np.ndarray) and array.shape[-1] == shape[1] and array.ndim > 1:
            changes[entry.name] = array[..., at : at + 1]
    return replace(demand, **changes)


@pytest.mark.parametrize("family", ["2L", "RHS"])
def test_only_combinations_that_cannot_govern_are_left_out(family: Family) -> None:
    """More sections than combinations drop dominated ones; the result is the greatest over single combinations."""
    demand = random_demand(5, 12, seed=3)
    some = sections(family).take(list(range(0, 80, 5)))
    assert len(some) > 12
    checks = SANS_10162_1.checks(some, demand)
    packs = SANS_10162_1.packs_per_panel(some, demand)
    alone = [SANS_10162_1.checks(some, one_combination(demand, at)) for at in range(12)]
    compared = 0
    for check in checks:
        if check.kind == "limit" or "between packs" in check.name:
            continue
        single = np.array([check_named(each, check.name).ratio for each in alone if check.name in names(each)])
        if family == "2L" and "out of plane" in check.name:
            continue  # packs, and so rho_e, follow from all combinations together
        np.testing.assert_allclose(check.ratio, single.max(axis=0), rtol=1e-12, err_msg=check.name)
        compared += 1
    assert compared >= 12
    assert packs.shape == (len(some), 5)


def names(checks: tuple[Check, ...]) -> set[str]:
    return {check.name for check in checks}


@pytest.mark.parametrize("seed", range(4))
def test_few_and_many_sections_agree(seed: int) -> None:
    """The short cut for many sections and the plain evaluation for few give the same."""
    demand = random_demand(4, 30, seed)
    some = sections("2L").take(list(range(0, 120, 3)))
    together = SANS_10162_1.checks(some, demand)
    for s in (0, 11, 39):
        for check, single in zip(together, SANS_10162_1.checks(some.take([s]), demand), strict=True):
            np.testing.assert_allclose(check.ratio[s], single.ratio[0], rtol=1e-12, err_msg=check.name)
            np.testing.assert_array_equal(check.combination[s], single.combination[0], err_msg=check.name)


def test_undominated_keeps_the_first_of_equals_and_every_trade_off() -> None:
    valid = np.array([[True, True, True, True, False, True]])
    force = np.array([[5.0, 5.0, 1.0, 3.0, 9.0, 2.0]])
    moment = np.array([[1.0, 1.0, 4.0, 3.0, 9.0, 2.0]])
    assert undominated(valid, (force, moment)).tolist() == [[True, False, True, True, False, False]]


def test_a_rounder_diagram_can_govern_over_a_greater_moment() -> None:
    """Single curvature with a little less force and moment beats double curvature: w1 counts in what is left out."""
    ends = np.array([[[1.0, 0.999], [-1.0, 0.999]]]) * KNM
    demand = member_demand([[-60 * KN, -59.9 * KN]], 2500.0, sag=np.array([[1.0, 0.999]]) * KNM, end_moments=ends)
    checks = SANS_10162_1.checks(sections("SHS").take(list(range(20, 60))), demand)
    assert np.all(check_named(checks, "compression and sagging, in plane").combination == 1)
    assert np.all(check_named(checks, "compression and sagging, cross-section").combination == 0)
