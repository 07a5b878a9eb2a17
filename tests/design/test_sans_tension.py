"""Tension by SANS 10162-1 cl. 12.3 and 13.2 for the stated ends."""

from __future__ import annotations

import numpy as np
import pytest
from members import check_named, member_demand, named, sections

from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.sans.tension import WeldedAngle
from spanwright.design.standard import Ends

KN = 1e3


def net(name: str, ends: Ends, family: str = "L") -> float:
    """Resistance of the net section, N."""
    checks = SANS_10162_1.checks(named(family, name), member_demand([[50 * KN]], ends=ends))  # type: ignore[arg-type]  # a family
    return float(check_named(checks, "tension, net section").resistance[0, 0])


def test_gross_section() -> None:
    angle = named("L", "L 80x80x8")
    check = check_named(SANS_10162_1.checks(angle, member_demand([[50 * KN]])), "tension, gross section")
    assert check.resistance[0, 0] == pytest.approx(0.9 * angle.area[0] * 355)
    assert check.ratio[0, 0] == pytest.approx(50 * KN / check.resistance[0, 0])


@pytest.mark.parametrize(
    ("bolts", "diameter", "punched", "hole", "lag"),
    [
        (2, 20, True, 24, 0.6),
        (3, 20, True, 24, 0.6),
        (4, 20, True, 24, 0.8),
        (4, 20, False, 22, 0.8),
        (2, 24, True, 28, 0.6),
        (2, 27, False, 30, 0.6),
    ],
)
def test_bolted_by_one_leg(bolts: int, diameter: float, punched: bool, hole: float, lag: float) -> None:
    """Cl. 12.3.2, 12.3.3.2: holes d + 2 (above 24 mm d + 3, from memory), punched + 2; 0.60, from 4 lines 0.80."""
    angle = named("L", "L 80x80x8")
    expected = 0.85 * 0.9 * lag * (angle.area[0] - hole * 8) * 450
    assert net("L 80x80x8", Ends("bolted", bolts=bolts, bolt_diameter=diameter, punched=punched)) == pytest.approx(
        expected
    )


@pytest.mark.parametrize(
    ("legs", "expected"),
    [
        (2.0, 72 * 8 + (1 - 80 / (2 * 160)) * 80 * 8),  # L >= 2 w: the connected leg whole (from memory)
        (1.5, 0.5 * 72 * 8 + 0.25 * 120 * 8 + (1 - 80 / 240) * 80 * 8),
        (0.8, 0.75 * 64 * 8 + 0.5 * 64 * 8),  # short welds (from memory)
    ],
)
def test_welded_by_one_leg(legs: float, expected: float) -> None:
    """Cl. 12.3.3.3 for an 80x80x8 angle with welds of so many legs along both edges."""
    assert net("L 80x80x8", Ends(weld_length=legs)) == pytest.approx(0.85 * 0.9 * expected * 450)


def test_pairs_carry_twice_a_single_angle() -> None:
    for ends in (Ends(), Ends("bolted", bolts=3)):
        for pair in ("2L", "2L star"):
            assert net(f"{pair.split()[0]} 80x80x8", ends, pair) == pytest.approx(2 * net("L 80x80x8", ends))


def test_tubes_count_as_welded_all_round() -> None:
    tube = named("SHS", "SHS 80x80x4")
    for ends in (Ends(), Ends("bolted", bolts=2)):
        assert net("SHS 80x80x4", ends, "SHS") == pytest.approx(0.85 * 0.9 * tube.area[0] * 450)


def test_longer_welds_never_weaken() -> None:
    lengths = np.linspace(20.0, 400.0, 200)[:, None]
    legs_and_thickness = np.array([[90.0]]), np.array([[75.0]]), np.array([[8.0]])
    angle = WeldedAngle(1, *legs_and_thickness, lengths, lengths)
    assert np.all(np.diff(angle.net_area[:, 0]) >= -1e-9)


@pytest.mark.parametrize("kind", ["welded", "bolted"])
def test_the_net_section_is_never_more_than_the_gross_one(kind: str) -> None:
    for family in ("L", "2L"):
        every = sections(family)
        rules = check_named(
            SANS_10162_1.checks(every, member_demand([[KN]], ends=Ends(kind, weld_length=5.0))),  # type: ignore[arg-type]  # both are kinds
            "tension, net section",
        ).rules
        assert np.all(rules[0].net_area[:, 0] < every.area)  # type: ignore[attr-defined]  # the net section comes first


def test_the_combination_with_the_greatest_tension_governs() -> None:
    check = check_named(
        SANS_10162_1.checks(named("L", "L 60x60x6"), member_demand([[KN, 9 * KN, -30 * KN], [-1, -2, -3]])),
        "tension, net section",
    )
    assert check.combination.tolist() == [[1, -1]]
    assert check.demand.tolist() == [[9 * KN, 0.0]]
