"""Every printed line of every rule, in every family, agrees with the numbers that decided."""

from __future__ import annotations

import numpy as np
import pytest
from formulas import assert_formulas_hold
from members import member_demand, sections

from spanwright.design.candidates import FAMILIES, Family
from spanwright.design.sans.member import SANS_10162_1, Sans10162
from spanwright.design.standard import Check, Demand, Ends, Packs
from spanwright.design.steps import explain

BENDS: tuple[Family, ...] = ("2L", "CHS", "SHS", "RHS")


def some_demand(*, bent: bool, bolted: bool = False) -> Demand:
    """Six members and five combinations: struts, ties, reversal, a first web, one that bends sideways with another."""
    draw = np.random.default_rng(7)
    axial = draw.normal(0.0, 60e3, (6, 5))
    axial[4] = np.abs(axial[4])
    axial[5] = 0.0
    lengths = np.array([900.0, 1500.0, 2400.0, 3000.0, 2000.0, 1200.0])
    sideways = np.maximum(-axial, 0.0)
    sideways[1] *= 1.3
    first = np.zeros(axial.shape, dtype=np.bool_)
    first[2, 1] = first[2, 3] = True
    moments = np.abs(draw.normal(0.0, 5e5, (2, 6, 5))) if bent else np.zeros((2, 6, 5))
    ends = draw.normal(0.0, 3e5, (6, 2, 5)) if bent else np.zeros((6, 2, 5))
    return member_demand(
        axial,
        lengths,
        out_of_plane=lengths * 1.6,
        torsional=lengths * 1.6,
        minor=lengths * 1.6,
        sideways=sideways,
        first_web=first,
        sag=moments[0],
        hog=moments[1],
        end_moments=ends,
        point_loads=np.array([0, 1, 2, 0, 0, 1]) if bent else np.zeros(6, dtype=np.intp),
        one_leg=np.array([True, True, True, False, True, True]),
        ends=Ends("bolted", bolts=4) if bolted else Ends(),
        packs=Packs(2, 0.65 if bolted else 1.0),
        heel_up=np.array([True, False, True, False, True, False]),
    )


def assert_printed(checks: tuple[Check, ...], shape: tuple[int, int]) -> int:
    places = [(section, bar) for section in range(0, shape[0], max(1, shape[0] // 6)) for bar in range(shape[1])]
    lines = 0
    for check in checks:
        assert check.ratio.shape == check.combination.shape == check.demand.shape == check.resistance.shape == shape
        assert np.all(np.isfinite(check.ratio)), check.name
        lines += sum(assert_formulas_hold(rule, place) for rule in check.rules for place in places)
    return lines


@pytest.mark.parametrize("bolted", [False, True])
@pytest.mark.parametrize("family", FAMILIES)
def test_every_printed_formula_gives_its_printed_value(family: Family, bolted: bool) -> None:
    options = sections(family)
    demand = some_demand(bent=family in BENDS, bolted=bolted)
    assert assert_printed(SANS_10162_1.checks(options, demand), (len(options), 6)) > 1000


def test_hot_formed_tubes_print_too() -> None:
    options = sections("SHS", hot=True)
    checks = Sans10162(hot_formed_tubes=True).checks(options, some_demand(bent=True))
    assert assert_printed(checks, (len(options), 6)) > 1000
    printed = {line.symbol: line.value for rule in checks[2].rules for line in explain(rule, (0, 0))}
    assert printed["n"] == 2.24


@pytest.mark.parametrize("family", FAMILIES)
def test_the_last_printed_line_is_the_ratio_that_decided(family: Family) -> None:
    options = sections(family)
    checks = SANS_10162_1.checks(options, some_demand(bent=family in BENDS))
    seen = 0
    for check in checks:
        np.testing.assert_allclose(check.ratio, check.demand / check.resistance, rtol=1e-12)
        for place in zip(*np.nonzero(check.ratio), strict=True):
            if seen % 97 == 0 and check.kind == "strength":
                assert explain(check.rules[-1], place)[-1].value == pytest.approx(check.ratio[place], rel=1e-12)
            seen += 1
    assert seen > 100


@pytest.mark.parametrize("family", FAMILIES)
def test_names_of_checks_are_unique(family: Family) -> None:
    names = [check.name for check in SANS_10162_1.checks(sections(family), some_demand(bent=family in BENDS))]
    assert len(set(names)) == len(names)
