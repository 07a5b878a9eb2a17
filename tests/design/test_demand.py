"""What members must resist: first compression webs, sideways runs, chord moments per bar."""

from __future__ import annotations

import math

import numpy as np
from roofs import raised, restraint, triangular

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


def test_every_pressed_web_at_a_raised_bearing_is_first() -> None:
    truss = raised()
    assert webs_marked(truss, {"P0": -8e3, "D1": 5e3, "P1": -4e3, "P8": -8e3, "P7": -4e3}) == {"P0", "P8"}


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
