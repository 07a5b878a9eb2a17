"""The second way to bar forces agrees with the first, and is really another way."""

from __future__ import annotations

import numpy as np
import pytest
from bare import bare_truss, by_pairs, parallel_chords
from scipy.linalg import null_space

from spanwright.truss.arrays import FloatArray
from spanwright.truss.equilibrium import difference, second_solution
from spanwright.truss.errors import MechanismError
from spanwright.truss.model import Truss
from spanwright.truss.stiffness import solve


def loads_on(truss: Truss, cases: int = 3) -> FloatArray:
    return np.random.default_rng(2).normal(size=(len(truss.joint_names), 2, cases)) * 1e4


def stiffnesses(truss: Truss) -> FloatArray:
    return np.random.default_rng(7).uniform(1e8, 9e8, len(truss.bar_names))


def crossed() -> Truss:
    """Two panels with crossed diagonals on three bearings, one pinned and two sliding: three times redundant."""
    joints = {"A": (0, 0), "B": (3000, 0), "C": (7000, 0), "D": (0, 2500), "E": (3000, 2800), "F": (7000, 2000)}
    bars = by_pairs("A-B B-C D-E E-F A-D B-E C-F A-E D-B B-F E-C")
    return bare_truss(joints, bars, {"A": "xy", "B": "y", "C": "y"})


def test_a_determinate_truss_needs_joint_equilibrium_only() -> None:
    truss = parallel_chords(12)
    loads = loads_on(truss)
    unknown = np.full(len(truss.bar_names), np.nan)
    second = second_solution(truss, unknown, loads)
    assert second == pytest.approx(solve(truss, stiffnesses(truss), loads).forces, rel=1e-9, abs=1e-6)


def test_a_redundant_truss_is_solved_by_particular_solution_and_compatibility() -> None:
    # third opinion: the force method in the open, with dense least squares and null space
    truss = crossed()
    loads = loads_on(truss)
    axial_stiffness = stiffnesses(truss)
    strains = np.random.default_rng(4).normal(size=(11, 3)) * 1e-4
    settlements = np.zeros_like(loads)
    settlements[truss.joint("B"), 1] = [-8.0, 0.0, 5.0]

    bars, freedoms = len(truss.bar_names), 2 * len(truss.joint_names)
    equilibrium = np.zeros((freedoms, bars + 4))
    for bar, (start, end) in enumerate(truss.ends):
        equilibrium[[2 * start, 2 * start + 1], bar] = -truss.directions[bar]
        equilibrium[[2 * end, 2 * end + 1], bar] = truss.directions[bar]
    for column, freedom in enumerate([0, 1, 3, 5]):  # A in x and y, B and C in y
        equilibrium[freedom, bars + column] = -1.0
    particular = np.linalg.lstsq(equilibrium, loads.reshape(freedoms, 3))[0]
    self_stress = null_space(equilibrium)
    assert self_stress.shape[1] == 3
    flexibility = np.append(truss.lengths / axial_stiffness, np.zeros(4))
    misfit = np.vstack([truss.lengths[:, None] * strains, np.zeros((2, 3)), -settlements[1, 1:], np.zeros((1, 3))])
    gaps = self_stress.T @ (flexibility[:, None] * particular + misfit)
    redundants = np.linalg.solve(self_stress.T @ (flexibility[:, None] * self_stress), -gaps)
    expected = (particular + self_stress @ redundants)[:bars]

    second = second_solution(truss, axial_stiffness, loads, strains=strains, settlements=settlements)
    first = solve(truss, axial_stiffness, loads, strains=strains, settlements=settlements).forces
    assert second == pytest.approx(expected, rel=1e-8, abs=1e-5)
    assert first == pytest.approx(expected, rel=1e-8, abs=1e-5)


def test_both_ways_agree_on_a_long_truss_on_many_supports() -> None:
    truss = parallel_chords(1000, supports={"B0": "xy"} | {f"B{i}": "y" for i in range(20, 1001, 20)})
    loads = loads_on(truss)
    first = solve(truss, stiffnesses(truss), loads).forces
    assert difference(first, second_solution(truss, stiffnesses(truss), loads)) < 1e-9


def test_the_second_way_shows_what_rounding_did_to_the_first() -> None:
    # one span of 5000 panels: displacements of kilometres leave two or three figures of the bar forces
    truss = parallel_chords(5000)
    loads = np.zeros((len(truss.joint_names), 2, 1))
    loads[truss.joint("T2500"), 1, 0] = -1000.0
    second = second_solution(truss, np.full(len(truss.bar_names), 4e8), loads)
    assert second[truss.bar("TC2500"), 0] == pytest.approx(-1000.0 * 5000 * 3000.0 / 4 / 2000.0, rel=1e-9)
    assert difference(solve(truss, np.full(len(truss.bar_names), 4e8), loads).forces, second) > 1e-6


def test_the_second_way_refuses_a_mechanism_too() -> None:
    truss = parallel_chords(4, without=["D2"])
    with pytest.raises(MechanismError):
        second_solution(truss, stiffnesses(truss), loads_on(truss))


def test_difference_is_relative_to_the_largest_force() -> None:
    forces = np.array([[200.0, -400.0], [0.0, 100.0]])
    assert difference(forces, forces + np.array([[0.0, 0.0], [2.0, 0.0]])) == pytest.approx(2.0 / 400.0)
    assert difference(forces, forces) == 0.0
    assert difference(np.zeros((2, 0)), np.zeros((2, 0))) == 0.0
    assert difference(np.zeros((1, 1)), np.ones((1, 1))) == 1.0
