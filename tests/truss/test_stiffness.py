"""The stiffness solution on trusses small enough to know the answer."""

from __future__ import annotations

import numpy as np
import pytest
import sympy as sp
from bare import bare_truss, by_pairs, parallel_chords

from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError
from spanwright.truss.model import Support, Truss
from spanwright.truss.stiffness import reaction_sums, solve

EA = 4.2e8


def stiff(truss: Truss) -> FloatArray:
    return np.full(len(truss.bar_names), EA)


def at_joint(truss: Truss, joint: str, x: float, y: float) -> FloatArray:
    values = np.zeros((len(truss.joint_names), 2, 1))
    values[truss.joint(joint), :, 0] = x, y
    return values


def gable() -> Truss:
    joints = {"A": (0, 0), "B": (4, 0), "C": (8, 0), "D": (12, 0), "E": (4, 3), "F": (8, 3)}
    bars = by_pairs("A-B B-C C-D A-E E-F F-D B-E C-F E-C")
    return bare_truss({name: (1000 * x, 1000 * y) for name, (x, y) in joints.items()}, bars, {"A": "xy", "D": "y"})


def test_bar_forces_match_exact_joint_equilibrium() -> None:
    # second opinion: joint equilibrium in rational numbers and surds by sympy
    truss = gable()
    loads = np.zeros((6, 2, 2))
    loads[:, :, 0] = [[0, -700], [300, -1200], [0, 0], [0, -50], [400, 0], [-90, -2500]]
    loads[truss.joint("F"), 0, 1] = 1000.0
    unknown = sp.symbols(f"n0:{len(truss.bar_names)}")
    supports = sp.symbols("ax ay dy")
    reactions = {"A": supports[:2], "D": (0, supports[2])}
    xy = [[sp.Integer(round(part)) for part in point] for point in truss.xy.tolist()]
    solution = solve(truss, stiff(truss), loads)
    for case in range(2):
        equations = []
        for joint, name in enumerate(truss.joint_names):
            for axis in range(2):
                total = sp.Integer(round(loads[joint, axis, case])) + reactions.get(name, (0, 0))[axis]
                for force, (start, end) in zip(unknown, truss.ends.tolist(), strict=True):
                    length = sp.sqrt(sum((xy[end][part] - xy[start][part]) ** 2 for part in range(2)))
                    pull = force * (xy[end][axis] - xy[start][axis]) / length
                    total += pull if joint == start else -pull if joint == end else 0
                equations.append(total)
        (exact,) = sp.linsolve(equations, *unknown, *supports)
        bars = len(unknown)
        assert solution.forces[:, case] == pytest.approx([float(value) for value in exact[:bars]], rel=1e-11, abs=1e-8)
        found = [*solution.reactions[truss.joint("A"), :, case], solution.reactions[truss.joint("D"), 1, case]]
        assert found == pytest.approx([float(value) for value in exact[bars:]], rel=1e-11, abs=1e-8)


def test_one_bar_stretches_by_hookes_law() -> None:
    truss = bare_truss({"A": (0, 0), "B": (2500, 0)}, by_pairs("A-B"), {"A": "xy", "B": "y"})
    solution = solve(truss, np.array([EA]), at_joint(truss, "B", 42e3, 0.0))
    assert solution.forces[0, 0] == pytest.approx(42e3)
    assert solution.displacements[1, 0, 0] == pytest.approx(42e3 * 2500 / EA)
    assert solution.reactions[0, 0, 0] == pytest.approx(-42e3)


def test_a_load_on_a_support_goes_straight_into_it() -> None:
    truss = gable()
    solution = solve(truss, stiff(truss), at_joint(truss, "A", 300.0, -500.0))
    assert solution.forces == pytest.approx(np.zeros((9, 1)))
    assert solution.reactions[truss.joint("A"), :, 0] == pytest.approx([-300.0, 500.0])


def test_a_supported_joint_without_bars_takes_its_own_load() -> None:
    truss = bare_truss({"A": (0, 0), "B": (2500, 0), "C": (9000, 0)}, by_pairs("A-B"), {"A": "xy", "B": "y", "C": "xy"})
    solution = solve(truss, np.array([EA]), at_joint(truss, "C", 30.0, -20.0))
    assert solution.reactions[2, :, 0] == pytest.approx([-30.0, 20.0])
    assert not solution.displacements.any()


def test_cases_are_solved_side_by_side() -> None:
    truss = gable()
    loads = np.random.default_rng(3).normal(size=(6, 2, 5)) * 1e4
    together = solve(truss, stiff(truss), loads)
    for case in range(5):
        alone = solve(truss, stiff(truss), loads[:, :, [case]])
        assert together.forces[:, [case]] == pytest.approx(alone.forces, rel=1e-12)
        assert together.displacements[:, :, [case]] == pytest.approx(alone.displacements, rel=1e-12)


def test_inputs_are_left_as_they_were() -> None:
    truss = gable()
    arrays = [stiff(truss), np.ones((6, 2, 1)), np.full((9, 1), 1e-4), at_joint(truss, "A", 0.0, -3.0)]
    before = [array.copy() for array in arrays]
    solve(truss, arrays[0], arrays[1], strains=arrays[2], settlements=arrays[3])
    for array, copy in zip(arrays, before, strict=True):
        assert np.array_equal(array, copy)


def test_other_supports_replace_the_trusss_own() -> None:
    # by symmetry of supports: pinned at both ends, a sideways load at one bearing meets half of it there
    truss = bare_truss(
        {"A": (0, 0), "B": (3000, 0), "C": (6000, 0)}, by_pairs("A-B B-C"), {"A": "xy", "B": "y", "C": "y"}
    )
    pinned = tuple(Support(joint, joint != 1, True) for joint in range(3))
    loads = at_joint(truss, "B", 1000.0, 0.0)
    assert solve(truss, stiff(truss), loads).forces[:, 0] == pytest.approx([1000.0, 0.0])
    assert solve(truss, stiff(truss), loads, supports=pinned).forces[:, 0] == pytest.approx([500.0, -500.0])


def test_reactions_balance_loads() -> None:
    truss = gable()
    loads = np.random.default_rng(5).normal(size=(6, 2, 4)) * 1e4
    solution = solve(truss, stiff(truss), loads)
    sums = reaction_sums(solution, loads)
    assert sums.reactions == pytest.approx(-sums.loads, rel=1e-12, abs=1e-9)
    assert sums.largest_imbalance < 1e-9
    assert solution.largest_residual < 1e-9
    moved = reaction_sums(solution, loads + 1.0)  # six joints
    assert moved.largest_imbalance == pytest.approx(6.0)


def test_a_settlement_tilts_a_determinate_truss_without_force() -> None:
    truss = gable()
    solution = solve(truss, stiff(truss), np.zeros((6, 2, 1)), settlements=at_joint(truss, "D", 0.0, -12.0))
    assert solution.forces == pytest.approx(np.zeros((9, 1)), abs=1e-6)
    turn = 12.0 / 12000.0  # rad, clockwise
    rigid = np.column_stack([truss.xy[:, 1], -truss.xy[:, 0]]) * turn
    assert solution.displacements[:, :, 0] == pytest.approx(rigid, abs=1e-9)


def test_warmed_bar_between_rigid_supports() -> None:
    # common practice: N = -EA alpha dT
    truss = bare_truss({"A": (0, 0), "B": (2500, 0)}, by_pairs("A-B"), {"A": "xy", "B": "xy"})
    solution = solve(truss, np.array([EA]), np.zeros((2, 2, 1)), strains=np.array([[12e-6 * 30]]))
    assert solution.forces[0, 0] == pytest.approx(-EA * 12e-6 * 30)
    assert solution.reactions[:, 0, 0] == pytest.approx([EA * 12e-6 * 30, -EA * 12e-6 * 30])


def test_no_load_case_at_all() -> None:
    truss = gable()
    solution = solve(truss, stiff(truss), np.zeros((6, 2, 0)))
    assert solution.forces.shape == (9, 0)
    assert solution.largest_residual == 0.0


def test_a_solution_shows_what_matters() -> None:
    truss = gable()
    text = repr(solve(truss, stiff(truss), at_joint(truss, "C", 0.0, -1200.0)))
    assert text.startswith("Solution(9 bars, 1 case: bar forces -1.333 to +1.067 kN (tension +), largest displacement")


@pytest.mark.parametrize(("panels", "accuracy"), [(100, 1e-8), (1000, 1e-4), (5000, 1e-2)])
def test_long_slender_trusses_are_not_taken_for_mechanisms(panels: int, accuracy: float) -> None:
    # one span of up to 20 000 bars: rounding of displacements grows with the fourth power of the number of panels
    truss = parallel_chords(panels)
    loads = np.zeros((len(truss.joint_names), 2, 1))
    loads[truss.joint(f"T{panels // 2}"), 1, 0] = -1000.0
    solution = solve(truss, stiff(truss), loads)
    chord = solution.forces[truss.bar(f"TC{panels // 2}"), 0]
    assert chord == pytest.approx(-1000.0 * panels * 3000.0 / 4 / 2000.0, rel=accuracy)  # M / h


def test_a_long_truss_on_many_supports() -> None:
    supports = {"B0": "xy"} | {f"B{i}": "y" for i in range(20, 5001, 20)}
    truss = parallel_chords(5000, supports=supports)
    loads = np.zeros((len(truss.joint_names), 2, 1))
    loads[1::2, 1] = -1000.0
    solution = solve(truss, stiff(truss), loads)
    assert len(truss.bar_names) == 20001
    assert solution.largest_residual < 1e-6 * 1000.0
    assert reaction_sums(solution, loads).largest_imbalance < 1e-9 * 5e6


def test_a_cantilever_of_many_panels_stands() -> None:
    truss = parallel_chords(1000, supports={"B0": "xy", "T0": "xy"})
    loads = np.zeros((len(truss.joint_names), 2, 1))
    loads[truss.joint("B1000"), 1, 0] = -1.0
    assert solve(truss, stiff(truss), loads).forces[truss.bar("BC1"), 0] == pytest.approx(-1.0 * 3e6 / 2000.0, rel=1e-2)


@pytest.mark.parametrize(
    ("change", "key", "found"),
    [
        ({"loads": np.zeros((6, 2))}, "loads", r"shape \(6, 2\)"),
        ({"loads": np.full((6, 2, 1), np.nan)}, "loads", "finite"),
        ({"axial_stiffness": np.ones(8)}, "axial_stiffness", r"shape \(8,\)"),
        ({"axial_stiffness": np.array([0.0] * 9)}, "axial_stiffness", "above zero"),
        ({"strains": np.zeros((9, 3))}, "strains", "shape"),
        ({"settlements": np.ones((6, 2, 1))}, "settlements", "no support"),
    ],
)
def test_unfit_arrays_are_refused(change: dict[str, FloatArray], key: str, found: str) -> None:
    truss = gable()
    given = {"axial_stiffness": stiff(truss), "loads": np.zeros((6, 2, 1))} | change
    with pytest.raises(InputError, match=found) as refused:
        solve(truss, **given)  # type: ignore[arg-type]  # keywords from a table of arrays
    assert refused.value.key == key
    assert refused.value.remedy


def test_stiffnesses_of_no_real_bars_are_refused_and_not_called_a_mechanism() -> None:
    truss = gable()
    wild = stiff(truss)
    wild[truss.bar("B-C")] = 1e-9
    with pytest.raises(InputError, match="differ too much"):
        solve(truss, wild, np.zeros((6, 2, 1)))
