"""What holds for the analysis of every truss, whatever its form, loads and sections."""

from __future__ import annotations

from dataclasses import dataclass, replace
from random import Random

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from strategies import trusses

from spanwright.truss.arrays import FloatArray
from spanwright.truss.elongation import held_directions
from spanwright.truss.equilibrium import difference, second_solution
from spanwright.truss.errors import MechanismError
from spanwright.truss.holding import what_would_hold
from spanwright.truss.mechanism import free_motions, refuse_mechanism
from spanwright.truss.model import Support, Truss
from spanwright.truss.stiffness import Solution, reaction_sums, solve
from spanwright.truss.tolerances import TOLERANCES

CASES = 3


@dataclass(frozen=True)
class Loaded:
    """A truss with sections from slim ties to stout chords, and random loads on every joint."""

    truss: Truss
    axial_stiffness: FloatArray
    loads: FloatArray
    strains: FloatArray

    def solve(self) -> Solution:
        return solve(self.truss, self.axial_stiffness, self.loads)

    @property
    def determinate(self) -> bool:
        held = held_directions(self.truss)
        return len(self.truss.bar_names) + int(held.sum()) == held.size


@st.composite
def loaded_trusses(draw: st.DrawFn) -> Loaded:
    truss = draw(trusses())
    random = np.random.default_rng(draw(st.integers(0, 10_000)))
    bars, joints = len(truss.bar_names), len(truss.joint_names)
    axial_stiffness = np.exp(random.uniform(np.log(6e7), np.log(2e9), bars))
    loads = random.normal(size=(joints, 2, CASES)) * 1e4
    return Loaded(truss, axial_stiffness, loads, random.normal(size=(bars, CASES)) * 1e-4)


def determinate_trusses() -> st.SearchStrategy[Loaded]:
    return loaded_trusses().filter(lambda loaded: loaded.determinate)


def close(found: FloatArray, expected: FloatArray) -> bool:
    """Whether two arrays agree to TOLERANCES.residual of the largest value."""
    largest = max(float(np.abs(expected).max()), float(np.abs(found).max()))
    return bool(np.abs(found - expected).max() <= TOLERANCES.residual * largest)


@given(loaded_trusses())
def test_every_joint_is_in_equilibrium(loaded: Loaded) -> None:
    solution = loaded.solve()
    pull = solution.forces[:, None, :] * loaded.truss.directions[:, :, None]
    total = loaded.loads + solution.reactions
    np.add.at(total, loaded.truss.ends[:, 0], pull)
    np.add.at(total, loaded.truss.ends[:, 1], -pull)
    largest = np.abs(loaded.loads).max()
    assert np.abs(total).max() < TOLERANCES.residual * largest
    assert solution.residuals == pytest.approx(total, abs=1e-9 * largest)
    assert solution.largest_residual < TOLERANCES.residual * largest
    assert not solution.reactions[~held_directions(loaded.truss)].any()


@given(loaded_trusses())
def test_reactions_balance_the_loads_in_force_and_moment(loaded: Loaded) -> None:
    solution = loaded.solve()
    assert reaction_sums(solution, loaded.loads).largest_imbalance < TOLERANCES.residual * np.abs(loaded.loads).max()
    x, y = loaded.truss.xy.T
    external = loaded.loads + solution.reactions
    moments = x @ external[:, 1] - y @ external[:, 0]
    assert np.abs(moments).max() < TOLERANCES.residual * np.abs(loaded.loads).max() * loaded.truss.span


@given(loaded_trusses())
def test_both_ways_give_the_same_bar_forces(loaded: Loaded) -> None:
    first = solve(loaded.truss, loaded.axial_stiffness, loaded.loads, strains=loaded.strains).forces
    second = second_solution(loaded.truss, loaded.axial_stiffness, loaded.loads, strains=loaded.strains)
    assert difference(first, second) < TOLERANCES.second_solution


@given(loaded_trusses(), st.floats(-3, 3))
def test_cases_add_up(loaded: Loaded, factor: float) -> None:
    parts = loaded.solve()
    combined = factor * loaded.loads[:, :, [0]] + loaded.loads[:, :, [1]]
    whole = solve(loaded.truss, loaded.axial_stiffness, combined)
    for name in ("forces", "displacements", "reactions"):
        part, together = getattr(parts, name), getattr(whole, name)
        assert close(together, factor * part[..., [0]] + part[..., [1]])


@given(loaded_trusses(), st.floats(0, 2 * np.pi))
def test_a_truss_turned_with_its_loads_has_the_same_bar_forces(loaded: Loaded, turn: float) -> None:
    truss = loaded.truss
    pinned = tuple(Support(support.joint, True, True) for support in truss.supports)
    turning = np.array([[np.cos(turn), -np.sin(turn)], [np.sin(turn), np.cos(turn)]])
    turned = replace(truss, xy=truss.xy @ turning.T)
    loads = np.einsum("ab,jbc->jac", turning, loaded.loads)
    here = solve(truss, loaded.axial_stiffness, loaded.loads, supports=pinned)
    there = solve(turned, loaded.axial_stiffness, loads, supports=pinned)
    assert close(there.forces, here.forces)
    assert close(there.displacements, np.einsum("ab,jbc->jac", turning, here.displacements))
    assert close(there.reactions, np.einsum("ab,jbc->jac", turning, here.reactions))


@given(loaded_trusses())
def test_a_truss_on_end_has_the_same_bar_forces(loaded: Loaded) -> None:
    # x and y change places, so the other direction is the longer one and sliding supports slide upward
    truss = loaded.truss
    upright = replace(
        truss,
        xy=truss.xy[:, ::-1],
        supports=tuple(Support(support.joint, support.y, support.x) for support in truss.supports),
    )
    standing = solve(upright, loaded.axial_stiffness, loaded.loads[:, ::-1])
    assert close(standing.forces, loaded.solve().forces)
    assert close(standing.displacements, loaded.solve().displacements[:, ::-1])


@given(loaded_trusses())
def test_the_mirrored_truss_has_the_same_bar_forces(loaded: Loaded) -> None:
    mirror = np.array([-1.0, 1.0])
    mirrored = replace(loaded.truss, xy=loaded.truss.xy * mirror)
    there = solve(mirrored, loaded.axial_stiffness, loaded.loads * mirror[:, None])
    here = loaded.solve()
    assert close(there.forces, here.forces)
    assert close(there.displacements, here.displacements * mirror[:, None])
    assert close(there.reactions, here.reactions * mirror[:, None])


@given(loaded_trusses(), st.randoms(use_true_random=False))
def test_numbering_changes_nothing(loaded: Loaded, shuffler: Random) -> None:
    truss = loaded.truss
    joints, bars = list(range(len(truss.joint_names))), list(range(len(truss.bar_names)))
    shuffler.shuffle(joints)
    shuffler.shuffle(bars)
    new_number = np.argsort(joints)
    shuffled = replace(
        truss,
        joint_names=tuple(truss.joint_names[joint] for joint in joints),
        xy=truss.xy[joints],
        bar_names=tuple(truss.bar_names[bar] for bar in bars),
        ends=new_number[truss.ends[bars]][:, ::-1],
        supports=tuple(replace(support, joint=int(new_number[support.joint])) for support in truss.supports),
    )
    there = solve(shuffled, loaded.axial_stiffness[bars], loaded.loads[joints])
    here = loaded.solve()
    assert close(there.forces, here.forces[bars])
    assert close(there.displacements, here.displacements[joints])


@given(loaded_trusses())
def test_displacements_are_reciprocal(loaded: Loaded) -> None:
    # E. Betti 1872: the work of one set of loads on the displacements of another is the same the other way round
    work = np.einsum("jab,jac->bc", loaded.loads, loaded.solve().displacements)
    assert close(work, work.T)


@given(loaded_trusses())
def test_external_work_is_strain_energy(loaded: Loaded) -> None:
    # B. P. E. Clapeyron 1833
    solution = loaded.solve()
    external = np.sum(loaded.loads * solution.displacements, axis=(0, 1))
    flexibility = loaded.truss.lengths / loaded.axial_stiffness
    assert close(external, flexibility @ solution.forces**2)


@given(loaded_trusses(), st.data())
def test_virtual_work_gives_the_solved_deflection(loaded: Loaded, data: st.DataObject) -> None:
    # unit-load method, with bar forces from joint equilibrium only: sum of n (N L / EA + strain L) = deflection
    truss = loaded.truss
    free = np.argwhere(~held_directions(truss))
    joint, axis = free[data.draw(st.integers(0, len(free) - 1))]
    unit = np.zeros((len(truss.joint_names), 2, 1))
    unit[joint, axis] = 1.0
    virtual = second_solution(truss, loaded.axial_stiffness, unit)
    solution = solve(truss, loaded.axial_stiffness, loaded.loads, strains=loaded.strains)
    longer = truss.lengths[:, None] * (solution.forces / loaded.axial_stiffness[:, None] + loaded.strains)
    largest = np.abs(solution.displacements).max()
    expected = (virtual.T @ longer)[0]
    assert solution.displacements[joint, axis] == pytest.approx(expected, abs=TOLERANCES.residual * largest)


@given(determinate_trusses())
def test_no_strain_forces_a_bar_of_a_determinate_truss(loaded: Loaded) -> None:
    solution = solve(loaded.truss, loaded.axial_stiffness, np.zeros_like(loaded.loads), strains=loaded.strains)
    locked = np.abs(loaded.axial_stiffness[:, None] * loaded.strains).max()
    assert np.abs(solution.forces).max() < TOLERANCES.tiny_force * locked
    assert np.abs(solution.displacements).max() > 0.0


@given(determinate_trusses())
def test_a_determinate_truss_that_warms_evenly_grows_in_shape(loaded: Loaded) -> None:
    truss, strain = loaded.truss, 12e-6 * 40
    warm = np.full((len(truss.bar_names), 1), strain)
    moved = solve(truss, loaded.axial_stiffness, np.zeros((len(truss.joint_names), 2, 1)), strains=warm).displacements
    pin = truss.xy[next(support.joint for support in truss.supports if support.x)]
    assert close(moved[:, :, 0], strain * (truss.xy - pin))


@given(loaded_trusses(), st.floats(-30, 30), st.floats(-30, 30), st.floats(-1e-3, 1e-3))
def test_supports_that_move_as_one_body_force_no_bar(loaded: Loaded, right: float, up: float, turn: float) -> None:
    truss = loaded.truss
    rigid = np.column_stack([right - turn * truss.xy[:, 1], up + turn * truss.xy[:, 0]])[:, :, None]
    pinned = tuple(Support(support.joint, True, True) for support in truss.supports)
    settlements = np.where(held_directions(truss, pinned)[:, :, None], rigid, 0.0)
    no_loads = np.zeros_like(rigid)
    solution = solve(truss, loaded.axial_stiffness, no_loads, settlements=settlements, supports=pinned)
    strained = loaded.axial_stiffness / truss.lengths * max(float(np.abs(settlements).max()), 1e-3)
    assert np.abs(solution.forces[:, 0]).max() < TOLERANCES.tiny_force * strained.max()
    assert solution.displacements == pytest.approx(rigid, abs=1e-6)


@given(loaded_trusses(), st.floats(0.1, 10))
def test_stiffer_bars_by_one_factor_move_less_by_it(loaded: Loaded, factor: float) -> None:
    stiffer = solve(loaded.truss, factor * loaded.axial_stiffness, loaded.loads)
    assert close(stiffer.forces, loaded.solve().forces)
    assert close(stiffer.displacements * factor, loaded.solve().displacements)


@given(determinate_trusses(), st.data())
def test_a_determinate_truss_cannot_lose_a_bar_and_is_told_what_would_hold_it(
    loaded: Loaded, data: st.DataObject
) -> None:
    truss = loaded.truss
    lost = data.draw(st.integers(0, len(truss.bar_names) - 1))
    lacking = replace(
        truss,
        bar_names=truss.bar_names[:lost] + truss.bar_names[lost + 1 :],
        ends=np.delete(truss.ends, lost, axis=0),
        roles=truss.roles[:lost] + truss.roles[lost + 1 :],
    )
    with pytest.raises(MechanismError, match="would hold it") as refused:
        solve(lacking, np.delete(loaded.axial_stiffness, lost), loaded.loads)
    assert refused.value.motions

    motions, independent = free_motions(lacking, held_directions(lacking))
    (hold,) = what_would_hold(lacking, held_directions(lacking), motions)
    assert independent == 1
    assert isinstance(hold, tuple)
    mended = replace(
        lacking,
        bar_names=(*lacking.bar_names, "new"),
        ends=np.vstack([lacking.ends, hold]),
        roles=(*lacking.roles, "diagonal"),
    )
    refuse_mechanism(mended)
