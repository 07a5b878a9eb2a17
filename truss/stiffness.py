"""Bar forces, displacements and reactions by direct stiffness: pin joints, small displacements, linear elastic bars."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.elongation import Elongation, elongation_of, held_directions
from spanwright.truss.errors import InputError
from spanwright.truss.factor import factorise
from spanwright.truss.mechanism import refuse_mechanism
from spanwright.truss.model import Support, Truss


@dataclass(frozen=True, eq=False, repr=False)
class Solution:
    """What a truss does under c load cases.

    forces : (b, c) N, tension positive.
    displacements : (j, 2, c) mm, x to the right and y up.
    reactions : (j, 2, c) N, what the supports do to the truss; zero where nothing is held.
    residuals : (j, 2, c) N, what is left of loads, reactions and bar forces at each joint. At a held joint the reaction
        is found from the same sum, so compare `reaction_sums` too.
    """

    forces: FloatArray
    displacements: FloatArray
    reactions: FloatArray
    residuals: FloatArray

    @cached_property
    def largest_residual(self) -> float:
        """Largest unbalanced force at a joint, N."""
        return float(np.abs(self.residuals).max(initial=0.0))

    def __repr__(self) -> str:
        bars, cases = self.forces.shape
        least, most = self.forces.min(initial=0.0) / 1000.0, self.forces.max(initial=0.0) / 1000.0
        moved = np.hypot(self.displacements[:, 0], self.displacements[:, 1]).max(initial=0.0)
        return (
            f"Solution({bars} bars, {cases} {'case' if cases == 1 else 'cases'}: "
            f"bar forces {least:.4g} to {most:+.4g} kN (tension +), largest displacement {moved:.4g} mm, "
            f"largest residual {self.largest_residual:.1e} N)"
        )


def solve(
    truss: Truss,
    axial_stiffness: FloatArray,
    loads: FloatArray,
    *,
    strains: FloatArray | None = None,
    settlements: FloatArray | None = None,
    supports: tuple[Support, ...] | None = None,
) -> Solution:
    """Solve all load cases with one factorisation.

    axial_stiffness : (b,) N, EA of each bar, above zero.
    loads : (j, 2, c) N on the joints, x to the right and y up.
    strains : (b, c), stress-free strain of each bar, positive longer: coefficient of expansion times rise of
        temperature, or lack of fit over length.
    settlements : (j, 2, c) mm, prescribed displacements of held directions, zero elsewhere.
    supports : instead of the truss's own.

    Raises MechanismError if joints can move without straining a bar; InputError if an array has the wrong shape or
    holds something that is no finite number.
    """
    bars, joints = len(truss.ends), len(truss.xy)
    shape = joints, 2, loads.shape[-1]
    _check(loads, shape, "loads")
    _check(axial_stiffness, (bars,), "axial_stiffness")
    if axial_stiffness.min(initial=np.inf) <= 0.0:
        raise InputError("an axial stiffness is not above zero", "state EA of each bar in N", "axial_stiffness")
    held = held_directions(truss, supports)
    elongation = elongation_of(truss)
    stiffness = axial_stiffness / truss.lengths
    factor = factorise(truss, elongation, stiffness, held)
    if factor.loose is not None:
        refuse_mechanism(truss, supports)
        raise InputError("the bars' axial stiffnesses differ too much to solve", "state EA in N", "axial_stiffness")

    applied = loads.reshape(2 * joints, -1)
    unforced = _unforced_elongation(truss, elongation, held, shape, strains, settlements)
    driving = applied if unforced is None else applied + elongation.carried(stiffness[:, None] * unforced)
    displacements = factor.displacements(driving)
    forces = elongation.of_bars(displacements)
    if unforced is not None:
        forces -= unforced
    forces *= stiffness[:, None]

    residuals = elongation.carried(forces)
    np.subtract(applied, residuals, out=residuals)
    fixed = np.flatnonzero(held)
    reactions = np.zeros_like(residuals)
    reactions[fixed] = -residuals[fixed]
    residuals[fixed] = 0.0
    if settlements is not None:
        displacements[fixed] = settlements.reshape(2 * joints, -1)[fixed]
    return Solution(forces, displacements.reshape(shape), reactions.reshape(shape), residuals.reshape(shape))


@dataclass(frozen=True, eq=False)
class ForceSums:
    """Sums over all joints for each case, (2, c) N in x and y, which must cancel."""

    loads: FloatArray
    reactions: FloatArray

    @property
    def largest_imbalance(self) -> float:
        """Largest sum of loads and reactions together, N."""
        return float(np.abs(self.loads + self.reactions).max(initial=0.0))


def reaction_sums(solution: Solution, loads: FloatArray) -> ForceSums:
    """Return the sums of the loads (j, 2, c) N and of the reactions to them."""
    return ForceSums(loads.sum(axis=0), solution.reactions.sum(axis=0))


def _unforced_elongation(
    truss: Truss,
    elongation: Elongation,
    held: BoolArray,
    shape: tuple[int, int, int],
    strains: FloatArray | None,
    settlements: FloatArray | None,
) -> FloatArray | None:
    """Return (b, c) mm that each bar would be too long by if all free joints stayed in place, or None for nothing."""
    if strains is None and settlements is None:
        return None
    unforced = np.zeros((len(truss.ends), shape[2]))
    if strains is not None:
        _check(strains, unforced.shape, "strains")
        unforced += truss.lengths[:, None] * strains
    if settlements is not None:
        _check(settlements, shape, "settlements")
        if settlements[~held].any():
            raise InputError(
                "a settlement is given where no support holds the joint in that direction",
                "give settlements of held directions only, zero elsewhere",
                "settlements",
            )
        unforced -= elongation.of_bars(settlements.reshape(held.size, -1))
    return unforced


def _check(values: FloatArray, shape: tuple[int, ...], name: str) -> None:
    if values.shape != shape:
        raise InputError(f"the array has shape {values.shape}", f"its shape must be {shape}", name)
    if not np.isfinite(values).all():
        raise InputError("the array holds something that is no finite number", "state finite numbers", name)
