"""Pairs of angles by SANS 10162-1 cl. 19: packs, their spacing, one angle between them."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from members import check_named, member_demand, named, sections

from spanwright.design.candidates import Family
from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.standard import Ends, Packs
from spanwright.truss.errors import InputError

KN = 1e3
PAIRS: tuple[Family, ...] = ("2L", "2L star")


def test_struts_start_at_the_stated_number_and_ties_at_one() -> None:
    demand = member_demand([[-20 * KN], [20 * KN]], 1200.0, packs=Packs(2))
    assert SANS_10162_1.packs_per_panel(named("2L", "2L 80x80x8"), demand).tolist() == [[2, 1]]


def test_ties_are_tightened_to_300_radii() -> None:
    pair = named("2L", "2L 50x50x5")
    radius = pair.piece_radius_minor[0]
    demand = member_demand([[20 * KN]], 3 * 300 * radius)
    assert SANS_10162_1.packs_per_panel(pair, demand).tolist() == [[2]]
    spacing = check_named(SANS_10162_1.checks(pair, demand), "spacing of packs, tie")
    assert spacing.ratio[0, 0] == pytest.approx(1.0)
    assert spacing.ratio[0, 0] <= 1.0


@pytest.mark.parametrize("family", PAIRS)
def test_spacing_keeps_within_the_slenderness_of_the_pair(family: Family) -> None:
    """Cl. 19.1: a/r of one angle against max(KxLx/rx, rho_0); the fewest packs above the stated number that do."""
    pairs = sections(family)
    lengths = np.array([1500.0, 2500.0, 4000.0])
    demand = member_demand([[-1.0]] * 3, lengths, in_plane=lengths / 2, out_of_plane=lengths, packs=Packs(0))
    packs = SANS_10162_1.packs_per_panel(pairs, demand)
    spacing = check_named(SANS_10162_1.checks(pairs, demand), "spacing of packs")
    assert np.all(spacing.ratio <= 1.0)
    least = 2 if family == "2L star" else 0
    fewer = spacing.demand * (packs + 1) / np.maximum(packs, 1)
    assert np.all((packs == least) | (fewer > spacing.resistance))
    if family == "2L":
        assert len(np.unique(packs)) > 1


def test_packs_are_added_until_one_angle_carries_its_half() -> None:
    """A slender angle between few packs fails under a force that the pair bears; more packs are found."""
    pair = named("2L", "2L 60x60x6")
    stub = 0.9 * pair.area[0] * 355
    packs = []
    for share in (0.3, 0.6, 0.8, 0.9):
        demand = member_demand([[-share * stub]], 1500.0)
        packs.append(int(SANS_10162_1.packs_per_panel(pair, demand)[0, 0]))
        assert check_named(SANS_10162_1.checks(pair, demand), "one angle between packs").ratio[0, 0] <= 1.0
    assert packs[0] == 2
    assert packs == sorted(packs)
    assert packs[-1] > 2


def test_where_more_packs_cannot_help_none_are_added() -> None:
    """A force beyond the stub's resistance fails however close the packs stand."""
    pair = named("2L", "2L 60x60x6")
    demand = member_demand([[-1.2 * pair.area[0] * 355]], 1500.0)
    assert SANS_10162_1.packs_per_panel(pair, demand)[0, 0] == 2
    assert check_named(SANS_10162_1.checks(pair, demand), "one angle between packs").ratio[0, 0] > 1.0


def test_packs_stop_at_twelve() -> None:
    pair = named("2L", "2L 60x60x6")
    demand = member_demand([[-0.999 * 0.9 * pair.area[0] * 355]], 6000.0)
    assert SANS_10162_1.packs_per_panel(pair, demand)[0, 0] == 12


def test_closer_packs_stiffen_the_pair_sideways() -> None:
    """Cl. 19.1.4: rho_e falls as packs are added and as they are welded."""
    pair = named("2L", "2L 80x80x8")
    resistances = []
    for packs in (Packs(2, 1.0), Packs(4, 1.0), Packs(4, 0.65)):
        checks = SANS_10162_1.checks(pair, member_demand([[-100 * KN]], 2000.0, packs=packs))
        resistances.append(check_named(checks, "buckling out of plane, flexure and torsion").resistance[0, 0])
    assert resistances == sorted(resistances)
    assert resistances[0] < resistances[1] < resistances[2]


def test_the_stated_number_is_kept_where_it_is_more() -> None:
    demand = member_demand([[-10 * KN]], 1000.0, packs=Packs(5))
    assert SANS_10162_1.packs_per_panel(named("2L", "2L 80x80x8"), demand)[0, 0] == 5


@pytest.mark.parametrize("family", PAIRS)
def test_a_single_bolt_is_refused_in_compression_only(family: Family) -> None:
    one_bolt = Ends("bolted", bolts=1)
    strut, tie = member_demand([[-10 * KN]], ends=one_bolt), member_demand([[10 * KN]], ends=one_bolt)
    pair = sections(family).take([5])
    assert SANS_10162_1.checks(pair, tie)
    for ask in (SANS_10162_1.checks, SANS_10162_1.packs_per_panel):
        with pytest.raises(InputError, match="1 bolt at the ends of M0") as refused:
            ask(pair, strut)
        assert refused.value.key == "connections.bolts"
    assert SANS_10162_1.checks(pair, replace(strut, ends=Ends("bolted", bolts=2)))


@pytest.mark.parametrize("family", ["L", "CHS", "SHS", "RHS"])
def test_single_sections_have_no_packs(family: Family) -> None:
    some = sections(family).take([0, 1])
    assert SANS_10162_1.packs_per_panel(some, member_demand([[-KN]] * 3)).tolist() == [[0, 0, 0]] * 2


def test_torsion_of_one_angle_is_covered_by_the_pair() -> None:
    """The claim that lets one angle be checked for flexure alone: the pair's torsional stress is the lower one."""
    angles, pairs = sections("L"), sections("2L")
    assert angles.piece_names == pairs.piece_names
    polar = angles.shear_major**2 + angles.shear_minor**2 + angles.radius_major**2 + angles.radius_minor**2
    pair_polar = pairs.shear_sym**2 + pairs.radius_in**2 + pairs.radius_out**2
    assert np.all(pairs.torsion / (pairs.area * pair_polar) <= angles.torsion / (angles.area * polar))
