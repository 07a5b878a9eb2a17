"""The top chord between its joints, against beams solved by hand."""

import math

import numpy as np
import pytest

from spanwright.loads.bending import ChordBeams, chord_beams
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput
from spanwright.truss.model import Truss
from spanwright.truss.stiffness import solve

# 3-4-5 slopes of 5 m, two rafter panels of 2.5 m on each
FOUR_PANELS = FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4)
DOWN = np.array([[0.0, -1000.0]])


def beams_with(truss: Truss, *purlins_at: float, man: bool = False) -> ChordBeams:
    return chord_beams(truss, np.array(purlins_at), man=man)


def at(beams: ChordBeams, bar: str, mm: float) -> int:
    here = (beams.stations.bar == beams.truss.bar(bar)) & np.isclose(beams.stations.at, mm)
    (found,) = np.flatnonzero(here)
    return int(found)


def test_load_at_the_middle_of_one_of_two_panels() -> None:
    """13/32, 22/32, -3/32 of P; -3/32 P L over the joint, 13/64 P L under the load, P being 0.8 of the weight."""
    truss = build_form(FOUR_PANELS)
    beams = beams_with(truss, 1250.0)
    part = beams.influence(np.array([1250.0])).part(DOWN, ())
    across = 1000.0 * 0.8
    along = {"T1": 1000.0 * 0.6}  # down the slope, whole to the upper joint of the bar
    thirtyseconds = {"B0": 13.0, "T1": 22.0, "T2": -3.0}
    for name in truss.joint_names:
        pressing, down = thirtyseconds.get(name, 0.0) / 32 * across, along.get(name, 0.0)
        expected = [0.6 * pressing - 0.8 * down, -0.8 * pressing - 0.6 * down]
        assert part.joint_loads[truss.joint(name)] == pytest.approx(expected, abs=1e-9)
    assert part.moments[at(beams, "TC1", 1250.0)] == pytest.approx(13 / 64 * across * 2500.0)
    assert part.moments[at(beams, "TC1", 2500.0)] == pytest.approx(-3 / 32 * across * 2500.0)
    assert part.moments[at(beams, "TC2", 0.0)] == pytest.approx(-3 / 32 * across * 2500.0)
    assert part.moments[at(beams, "TC2", 2500.0)] == pytest.approx(0.0, abs=1e-6)


def test_the_ridge_is_a_hinge() -> None:
    truss = build_form(FOUR_PANELS)
    beams = beams_with(truss, 4800.0, 5200.0)
    pair = beams.influence(np.array([4800.0, 5200.0])).part(np.repeat(DOWN, 2, axis=0), ())
    assert pair.moments[[at(beams, "TC2", 2500.0), at(beams, "TC3", 0.0)]] == pytest.approx([0.0, 0.0], abs=1e-6)
    alone = beams.influence(np.array([4800.0])).part(DOWN, ())
    right = np.isin(beams.stations.bar, [truss.bar("TC3"), truss.bar("TC4")])
    assert alone.moments[right] == pytest.approx(np.zeros(right.sum()))


def test_one_bar_between_hinges_is_a_simple_beam() -> None:
    truss = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=2))
    beams = beams_with(truss, 2500.0)
    part = beams.influence(np.array([2500.0])).part(DOWN, ())
    assert part.moments[at(beams, "TC1", 2500.0)] == pytest.approx(800.0 * 5000.0 / 4)
    across = np.array([0.6, -0.8]) * 800.0
    assert part.joint_loads[truss.joint("B0")] == pytest.approx(across / 2)
    assert part.joint_loads[truss.joint("T1")] == pytest.approx(DOWN[0] - across / 2)


def test_a_push_along_the_chord_does_not_bend_it() -> None:
    beams = beams_with(build_form(FOUR_PANELS), 1250.0)
    along = np.array([[800.0, 600.0]])
    part = beams.influence(np.array([1250.0])).part(along, ())
    assert part.moments == pytest.approx(np.zeros(len(part.moments)), abs=1e-6)
    assert part.joint_loads.sum(axis=0) == pytest.approx([800.0, 600.0])


@pytest.mark.parametrize(("pulled", "expected"), [(False, -1025.0), (True, -425.0)])
def test_the_whole_bar_is_checked_with_the_force_of_its_end_that_carries_most(pulled: bool, expected: float) -> None:
    """Reviewed: the lower part of a rafter bar with a purlin in it carried up to 10 % more than its checked force.

    1 kN midway in TC1, 1 m from B0 on plan: B0 bears 7/8 kN. Cut TC1 just above B0, where it carries the thrust N and
    the shear V = 13/32 of 0.8 kN, and the tie, which is level: N 0.6 + 7/8 - V 0.8 = 0, so N = -1.025 kN. Just below
    T1, past the load, 0.6 kN along the slope is gone: -0.425 kN.
    """
    truss = build_form(FOUR_PANELS)
    influence = beams_with(truss, 1250.0).influence(np.array([1250.0]))
    both = [influence.part(DOWN, (), pulled=way).joint_loads for way in (pulled, not pulled)]
    solution = solve(truss, np.full(len(truss.bar_names), 1e8), np.stack(both, axis=-1))
    rafter = truss.bar("TC1")
    assert solution.forces[rafter, 0] == pytest.approx(expected)
    others = np.delete(solution.forces, rafter, axis=0)
    assert others[:, 0] == pytest.approx(others[:, 1])  # no other bar feels to which end it went


@pytest.mark.parametrize(
    ("place", "joints"), [(-1000.0, "B0 B0"), (0.0, "B0 B0"), (1000.0, "B0 T1"), (2500.0, "T1 T1")]
)
def test_where_a_force_along_the_chord_goes(place: float, joints: str) -> None:
    overhanging = FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=800.0)
    truss = build_form(overhanging)
    for at, lower_first in ((place, True), (truss.top.length - place, False)):
        (ends,) = beams_with(truss).influence(np.array([at])).ends
        names = " ".join(truss.joint_names[joint] for joint in ends)
        assert names == (joints if lower_first else joints.replace("B0", "B4").replace("T1", "T3"))


def test_suction_between_joints_hogs() -> None:
    beams = beams_with(build_form(FOUR_PANELS), 1250.0)
    suction = np.array([[-600.0, 800.0]])
    part = beams.influence(np.array([1250.0])).part(suction, ())
    assert part.moments[at(beams, "TC1", 1250.0)] == pytest.approx(-13 / 64 * 1000.0 * 2500.0)


def test_overhang_is_a_cantilever_of_the_end_panel() -> None:
    overhanging = FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=800.0)
    beams = beams_with(build_form(overhanging), -1000.0)
    part = beams.influence(np.array([-1000.0])).part(DOWN, ())
    assert part.moments[at(beams, "TC1", 0.0)] == pytest.approx(-800.0 * 1000.0)  # across the chord, 1 m of slope
    assert part.moments[at(beams, "TC1", 2500.0)] == pytest.approx(800.0 * 1000.0 / 4)


def test_stations_are_joints_and_loads_between_them() -> None:
    truss = build_form(FOUR_PANELS)
    stations = beams_with(truss, 0.0, 1000.0, 2500.0, 5000.0, 7500.0, 10000.0, man=True).stations
    first = stations.bar == truss.bar("TC1")
    assert stations.at[first] == pytest.approx([0.0, 1000.0, 1250.0, 2500.0])
    assert stations.loads_between[truss.bar("TC1")] == 2  # the purlin and the man
    others = [truss.bar(name) for name in ("TC2", "TC3", "TC4")]
    assert stations.loads_between[others].tolist() == [0, 0, 0]
    assert stations.bar.tolist() == sorted(stations.bar.tolist(), key=truss.top.bars.index)
    for bar in others:
        assert stations.at[stations.bar == bar] == pytest.approx([0.0, 2500.0])


def test_a_man_at_a_purlin_is_one_place() -> None:
    truss = build_form(FOUR_PANELS)
    stations = beams_with(truss, 1250.1, man=True).stations
    assert stations.at[stations.bar == truss.bar("TC1")] == pytest.approx([0.0, 1250.1, 2500.0])
    assert stations.loads_between[truss.bar("TC1")] == 1


def test_no_man_no_station_for_him() -> None:
    truss = build_form(FOUR_PANELS)
    stations = beams_with(truss, 1000.0).stations
    assert stations.at[stations.bar == truss.bar("TC1")] == pytest.approx([0.0, 1000.0, 2500.0])
    assert stations.loads_between[truss.bar("TC1")] == 1
