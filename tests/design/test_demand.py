"""What members must resist: first compression webs, sideways runs, chord moments per bar."""

from __future__ import annotations

import math

import numpy as np
from roofs import hand_made, raised, restraint, triangular

from spanwright.design.demand import first_compression_webs, sideways_compression
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput
from spanwright.truss.lengths import buckling_lengths
from spanwright.truss.model import Truss
from spanwright.truss.restraint import restrain


def webs_marked(truss: Truss, forces: dict[str, float]) -> set[str]:
    axial = np.zeros((len(truss.bar_names), 1))
    for bar, force in forces.items():
        axial[truss.bar(bar)] = force
    marked = first_compression_webs(truss, axial)[:, 0]
    return {truss.bar_names[bar] for bar in np.flatnonzero(marked)}


def test_no_web_meets_a_triangular_heel_so_the_nearest_pressed_one_is_first() -> None:
    """Howe: the first post pulls, the first diagonal presses (practice: "Howe, pitched", gravity signs)."""
    truss = triangular()
    assert webs_marked(truss, {"P1": 1e3, "D2": -5e3, "D3": -9e3, "D7": -5e3, "D6": -9e3}) == {"D2", "D7"}


def test_at_a_raised_heel_the_end_post_does_not_stand_for_the_web_behind_it() -> None:
    """The post over the bearing carries the eaves; the first web of the panels is reduced beside it."""
    truss = raised()
    under_gravity = {"P0": -8e3, "D1": 5e3, "P1": -4e3, "D2": 4e3, "P2": -3e3, "P8": -8e3, "P7": -4e3}
    assert webs_marked(truss, under_gravity) == {"P0", "P1", "P7", "P8"}
    under_uplift = {"P0": 8e3, "D1": -5e3, "P1": 4e3, "D2": -4e3, "P8": 8e3, "D8": -5e3, "D7": -4e3}
    assert webs_marked(truss, under_uplift) == {"D1", "D8"}


def test_an_almost_idle_web_does_not_shield_the_first_one_that_is_pressed() -> None:
    """P1 carries 1 % of the greatest web compression, P7 just over the 5 % from which a web counts (project rule)."""
    truss = triangular()
    forces = {"P1": -90.0, "D2": -5e3, "D3": -9e3, "P7": -460.0, "D7": -5e3, "D6": -9e3}
    assert webs_marked(truss, forces) == {"P1", "D2", "P7"}


def test_an_idle_end_post_does_not_shield_either() -> None:
    assert {"P0", "P1"} <= webs_marked(raised(), {"P0": -10.0, "D1": 5e3, "P1": -4e3})


def test_idle_is_judged_in_each_combination_by_itself() -> None:
    truss = triangular()
    axial = np.zeros((len(truss.bar_names), 2))
    axial[[truss.bar("P1"), truss.bar("P7")]] = -90.0
    axial[[truss.bar("D2"), truss.bar("D7")]] = [-5e3, -100.0]
    marked = first_compression_webs(truss, axial)
    assert marked[truss.bar("P1")].all()
    assert marked[truss.bar("D2")].tolist() == [True, False]


def test_a_bearing_between_the_ends_has_a_first_web_on_each_side() -> None:
    """B-T1 is 2 m to the left of C, D-T3 is 4 m to its right and not the nearest to E."""
    truss = hand_made(
        "A 0 0, B 3 0, C 5 0, D 9 0, E 12 0, T0 0 2, T1 3 2, T2 5 2, T3 9 2, T4 12 2",
        "top T0 T1 T2 T3 T4, bottom A B C D E, web A T0, web B T1, web C T2, web D T3, web E T4, "
        "web T0 B, web T1 C, web C T3, web D T4",
        "A C E",
    )
    pressed = {"C-T2": -9e3, "B-T1": -4e3, "D-T3": -3e3, "D-T4": -5e3}
    assert webs_marked(truss, pressed) == set(pressed)
    assert webs_marked(truss, {"C-T3": -9e3, "T0-B": -4e3}) == {"C-T3", "T0-B"}


def test_with_every_web_pulled_there_is_no_first_compression_web() -> None:
    assert webs_marked(raised(), {"P0": 8e3, "D1": 5e3}) == set()


def test_a_post_over_the_bearing_does_not_hide_a_pressed_diagonal_there() -> None:
    """Up-to-centre lean: post and diagonal both meet the bearing; both count, the safe reading."""
    truss = build_form(FormInput("Howe", 16000.0, math.atan(0.75), 1000.0, 8))
    assert {"P0", "D1"} <= webs_marked(truss, {"P0": -1e3, "D1": -9e3})


def test_bars_of_one_sideways_run_take_the_greatest_compression_in_it() -> None:
    truss = triangular()
    given = restraint(bottom_ties=("B4",))
    lengths = buckling_lengths(truss, restrain(truss, given), given)
    axial = np.zeros((len(truss.bar_names), 2))
    axial[truss.bar("BC2")] = [-7e3, 3e3]
    axial[truss.bar("BC7")] = [-2e3, -1e3]
    together = sideways_compression(axial, lengths)
    assert [together[truss.bar(bar), 0] for bar in ("BC1", "BC2", "BC3", "BC4")] == [7e3] * 4
    assert [together[truss.bar(bar), 0] for bar in ("BC5", "BC8")] == [2e3] * 2
    assert together[truss.bar("BC1"), 1] == 0.0
