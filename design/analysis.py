"""Bar forces, reactions and chord moments of all cases and combinations, for one choice of sections."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from spanwright.loads.cases import Case, LoadSet, own_mass_loads
from spanwright.loads.combinations import Combination, factor_matrix
from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.equilibrium import second_solution
from spanwright.truss.model import Support, Truss
from spanwright.truss.stiffness import Solution, solve

STRENGTH = ("STR", "STR-P")
"""Limit states in which members are checked; EQU is for reactions, the SLS ones for deflection."""


@dataclass(frozen=True)
class Arrangement:
    """One reading of the supports; `suffix` is added to the names of its combinations ("" for the first)."""

    suffix: str
    supports: tuple[Support, ...]


@dataclass(frozen=True, eq=False)
class Analysis:
    """Forces for one choice of sections. N, mm, N mm; tension +, sagging +. k cases, c combinations.

    cases : with own mass in the permanent ones.
    combinations : one after the other for each arrangement of the supports; the suffix tells.
    solutions : one an arrangement, over the cases.
    case_forces : (b, k) of the first arrangement.
    forces : (b, c). moments : (m, c) at the stations of the top chord.
    reactions : (j, 2, c). displacements : (j, 2, c).
    strength : (c,) True where members are checked.
    axial_stiffness : (b,) EA, N.
    """

    cases: tuple[Case, ...]
    combinations: tuple[Combination, ...]
    arrangements: tuple[Arrangement, ...]
    solutions: tuple[Solution, ...]
    case_forces: FloatArray
    forces: FloatArray
    moments: FloatArray
    reactions: FloatArray
    displacements: FloatArray
    strength: BoolArray
    axial_stiffness: FloatArray
    loads: FloatArray

    def columns(self, *limit_states: str) -> list[int]:
        """Return the indices of the combinations of these limit states."""
        return [at for at, combination in enumerate(self.combinations) if combination.limit_state in limit_states]


def arrangements(truss: Truss) -> tuple[Arrangement, ...]:
    """Return the readings of the supports that members must stand: as stated, and, where more than one bearing is
    held sideways, with only the first held, since a building rarely resists the thrust that the model then finds.
    """
    as_stated = Arrangement("", truss.supports)
    held = [support for support in truss.supports if support.x]
    if len(held) < 2:
        return (as_stated,)
    sliding = tuple(replace(support, x=support.x and support == held[0]) for support in truss.supports)
    return (as_stated, Arrangement(", one end sliding", sliding))


def analyse(
    truss: Truss,
    load_set: LoadSet,
    combinations: tuple[Combination, ...],
    mass: FloatArray,
    axial_stiffness: FloatArray,
    fixings: float,
) -> Analysis:
    """Solve every case for every arrangement of the supports and add up the combinations.

    mass : (b,) kg/m. axial_stiffness : (b,) EA in N. fixings : share of the own mass added in the case "most" only.
    Raises MechanismError.
    """
    own = own_mass_loads(truss, mass)
    cases = tuple(_with_own_mass(case, own, fixings) for case in load_set.cases)
    loads = np.stack([case.joint_loads for case in cases], axis=-1)
    readings = arrangements(truss)
    solutions = tuple(solve(truss, axial_stiffness, loads, supports=reading.supports) for reading in readings)
    factors = factor_matrix(combinations, cases)
    moments = np.stack([case.moments for case in cases], axis=-1) @ factors
    return Analysis(
        cases=cases,
        combinations=tuple(
            replace(combination, name=combination.name + reading.suffix)
            for reading in readings
            for combination in combinations
        ),
        arrangements=readings,
        solutions=solutions,
        case_forces=solutions[0].forces,
        forces=np.concatenate([solution.forces @ factors for solution in solutions], axis=-1),
        moments=np.concatenate([moments] * len(readings), axis=-1),
        reactions=np.concatenate([solution.reactions @ factors for solution in solutions], axis=-1),
        displacements=np.concatenate([solution.displacements @ factors for solution in solutions], axis=-1),
        strength=np.array([combination.limit_state in STRENGTH for combination in combinations] * len(readings)),
        axial_stiffness=axial_stiffness,
        loads=loads,
    )


def _with_own_mass(case: Case, own: FloatArray, fixings: float) -> Case:
    if case.name not in ("most", "least"):
        return case
    share = 1.0 + fixings if case.name == "most" else 1.0
    total = -float(own[:, 1].sum()) * share
    extra = f", fixings {fixings:.0%} included" if case.name == "most" and fixings else ""
    line = (
        f"own mass of the chosen sections: {total / 1e3:.3f} kN in all, half of each bar to each of its joints{extra}"
    )
    return replace(case, joint_loads=case.joint_loads + share * own, derivation=(*case.derivation, line))


def largest_difference(truss: Truss, analysis: Analysis) -> float:
    """Return the largest difference, N, of the bar forces found a second way, without stiffness."""
    worst = 0.0
    for reading, solution in zip(analysis.arrangements, analysis.solutions, strict=True):
        second = second_solution(truss, analysis.axial_stiffness, analysis.loads, supports=reading.supports)
        worst = max(worst, float(np.abs(second - solution.forces).max()))
    return worst
