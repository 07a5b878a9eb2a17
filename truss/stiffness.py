"""Bar forces, displacements and reactions by direct stiffness: pin joints, small displacements, linear elastic bars."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from spanwright.truss.arrays import FloatArray
from spanwright.truss.equilibrium import elongation_matrix, held_directions
from spanwright.truss.errors import MechanismError
from spanwright.truss.factor import factorise
from spanwright.truss.model import Support, Truss


@dataclass(frozen=True, eq=False, repr=False)
class Solution:
    """What a truss does under c load cases.

    forces : (b, c) N, tension positive. displacements : (j, 2, c) mm. reactions : (j, 2, c) N on the truss, zero where
    nothing is held. residuals : (j, 2, c) N, what joint equilibrium of loads, reactions and bar forces leaves.
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
        tension, compression = self.forces.max(initial=0.0), self.forces.min(initial=0.0)
        moved = np.hypot(self.displacements[:, 0], self.displacements[:, 1]).max(initial=0.0)
        return (
            f"Solution({bars} bars, {cases} cases: bar forces {compression / 1e3:.4g} to {tension / 1e3:+.4g} kN, "
            f"tension +; largest displacement {moved:.4g} mm; largest residual {self.largest_residual:.1e} N)"
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

    axial_stiffness : (b,) N, EA of each bar.
    loads : (j, 2, c) N on the joints, x to the right and y up.
    strains : (b, c), stress-free strain of each bar: alpha times temperature rise, or lack of fit over length
        (positive: too long).
    settlements : (j, 2, c) mm, prescribed displacement of held joints.
    supports : instead of the truss's own.

    Raises MechanismError if joints can move without straining a bar.
    """
    joints, _, cases = loads.shape
    held = held_directions(truss, supports)
    stiffness = axial_stiffness / truss.lengths
    factor = factorise(truss, stiffness, held)
    if factor.loose is not None:
        raise MechanismError("the truss is a mechanism")

    elongation = elongation_matrix(truss)
    fixed = held.ravel()
    applied = loads.reshape(2 * joints, cases)
    prescribed = np.zeros_like(applied)
    stress_free = np.zeros((len(truss.bar_names), cases))
    if settlements is not None:
        prescribed = np.where(fixed[:, None], settlements.reshape(2 * joints, cases), 0.0)
    if strains is not None:
        stress_free = truss.lengths[:, None] * strains

    driving = applied + elongation.T @ (stiffness[:, None] * (stress_free - elongation @ prescribed))
    driving[fixed] = 0.0
    displacements = factor.displacements(driving) + prescribed
    forces = stiffness[:, None] * (elongation @ displacements - stress_free)

    unbalanced = applied - elongation.T @ forces
    reactions = np.where(fixed[:, None], -unbalanced, 0.0)
    shape = (joints, 2, cases)
    return Solution(
        forces,
        displacements.reshape(shape),
        reactions.reshape(shape),
        (unbalanced + reactions).reshape(shape),
    )
