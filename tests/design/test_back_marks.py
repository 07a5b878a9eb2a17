"""Back-marks: the greatest bolt of a leg (common practice, from memory), as a limit that sizing keeps."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from demos import demo
from formulas import assert_formulas_hold
from members import check_named, member_demand, named, sections

from spanwright.design.back_marks import back_marks, bolt_fit
from spanwright.design.candidates import Family
from spanwright.design.run import design
from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.standard import Check, Ends

NAME = "bolt fits the connected leg"


def fit(family: Family, name: str, bolt: float) -> Check:
    demand = member_demand([[10e3]], ends=Ends("bolted", bolts=2, bolt_diameter=bolt))
    return check_named(SANS_10162_1.checks(named(family, name), demand), NAME)


@pytest.mark.parametrize(
    ("leg", "gauge", "bolt"),
    [
        (50, 28, 12),
        (60, 35, 16),
        (65, 35, 20),
        (70, 40, 20),
        (75, 45, 20),
        (80, 45, 20),
        (90, 50, 24),
        (100, 55, 24),
        (120, 45, 24),
        (125, 45, 24),
        (150, 55, 24),
        (55, 28, 12),  # between two rows: the lower one
        (63, 35, 16),
        (89.9, 45, 20),
        (110, 55, 24),
    ],
)
def test_rows_of_the_table(leg: float, gauge: float, bolt: float) -> None:
    """Gauge and greatest bolt by leg: British and South African back-mark table, from memory."""
    row = back_marks(np.array([float(leg)]))
    assert (row.gauge[0], row.greatest_bolt[0]) == (gauge, bolt)


@pytest.mark.parametrize(
    ("family", "section", "bolt", "ratio"),
    [
        ("L", "L 50x50x5", 20, 20 / 12),
        ("L", "L 50x50x5", 12, 1.0),
        ("2L", "2L 65x65x8", 20, 1.0),
        ("2L", "2L 60x60x6", 20, 1.25),
        ("L", "L 65x50x5, long leg connected", 20, 1.0),
        ("L", "L 65x50x5, short leg connected", 20, 20 / 12),
        ("2L star", "2L 90x90x8", 24, 1.0),
        ("2L", "2L 100x100x10", 27, 27 / 24),
    ],
)
def test_bolts_that_do_not_fit_the_leg_do_not_pass_silently(
    family: Family, section: str, bolt: float, ratio: float
) -> None:
    """An M20 in a 50 mm leg has no room for its washer and edge (common practice)."""
    check = fit(family, section, bolt)
    assert check.ratio[0, 0] == pytest.approx(ratio)
    assert (check.kind, check.unit) == ("limit", "mm")
    assert "common practice (from memory)" in check.clause


@pytest.mark.parametrize("leg", [20.0, 30.0, 45.0, 49.9])
@pytest.mark.parametrize("bolt", [8.0, 10.0, 12.0, 20.0, 30.0])
def test_legs_below_the_table_take_no_bolt(leg: float, bolt: float) -> None:
    assert bolt_fit(np.array([leg]), bolt).ratio[0] > 1.0


def test_longer_legs_never_take_a_smaller_bolt() -> None:
    legs = np.linspace(20.0, 300.0, 561)
    for bolt in (12.0, 20.0, 30.0):
        assert np.all(np.diff(bolt_fit(legs, bolt).ratio) <= 1e-12)


def test_printed_formulas_of_the_fit_give_their_values() -> None:
    legs = np.array([[30.0], [49.0], [50.0], [64.0], [100.0], [250.0]])
    for bolt in (10.0, 12.0, 20.0, 30.0):
        assert sum(assert_formulas_hold(bolt_fit(legs, bolt), (row, 0)) for row in range(len(legs))) == 12


@pytest.mark.parametrize("ends", [Ends(), Ends("bolted")])
def test_only_bolted_angles_are_asked(ends: Ends) -> None:
    families: tuple[Family, ...] = ("L", "2L", "2L star", "CHS", "SHS", "RHS")
    for family in families:
        names = [check.name for check in SANS_10162_1.checks(sections(family), member_demand([[1e3]], ends=ends))]
        assert (NAME in names) == (ends.kind == "bolted" and family in ("L", "2L", "2L star"))


def test_sizing_avoids_legs_that_cannot_take_the_bolt() -> None:
    project = demo("coast_shed")
    welded = design(project)
    assert any(float(choice.section.leg_connected[0]) < 65.0 for choice in welded.choices)
    bolted = design(replace(project, ends=Ends("bolted", bolts=2, bolt_diameter=20.0)))
    assert bolted.passes
    assert all(float(choice.section.leg_connected[0]) >= 65.0 for choice in bolted.choices)


def test_a_given_section_whose_leg_is_too_small_for_the_bolt_fails_and_says_what_helps() -> None:
    project = demo("coast_shed")
    members = replace(project.members, by_role={**project.members.by_role, "post": "L 50x50x5"})
    found = design(replace(project, members=members, ends=Ends("bolted", bolts=2, bolt_diameter=20.0)))
    assert not found.passes
    (told,) = (text for text in found.warnings if text.startswith("L 50x50x5 fails"))
    assert "bolt fits the connected leg (back-marks, common practice (from memory)) of P1 is 1.67 times" in told
    assert told.endswith("smaller bolts, welded ends, or longer legs")
