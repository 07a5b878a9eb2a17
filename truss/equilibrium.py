"""Bar forces a second, independent way: from the equilibrium of joints, without a stiffness matrix."""

from __future__ import annotations

import numpy as np
from scipy.sparse import block_array, csc_array, diags_array, eye_array, hstack
from scipy.sparse.linalg import splu

from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.elongation import elongation_of, held_directions
from spanwright.truss.mechanism import refuse_mechanism
from spanwright.truss.model import Support, Truss


def second_solution(
    truss: Truss,
    axial_stiffness: FloatArray,
    loads: FloatArray,
    *,
    strains: FloatArray | None = None,
    settlements: FloatArray | None = None,
    supports: tuple[Support, ...] | None = None,
) -> FloatArray:
    """Return bar forces (b, c) N, tension positive, with bar forces and reactions as the unknowns.

    The arguments are those of `spanwright.truss.stiffness.solve`. A determinate truss needs joint equilibrium only:
    neither axial stiffness nor strains nor settlements change its bar forces, and they are not used. In a redundant one
    the bars' elongations must also fit together, so the force method's two sets of equations are solved at once:
    equilibrium, which leaves a particular solution and the states of self-stress open, and compatibility, which picks
    among them. Joint displacements come out beside the forces and are dropped.

    Raises MechanismError if joints can move without straining a bar.
    """
    refuse_mechanism(truss, supports)
    held = held_directions(truss, supports)
    equilibrium = _equilibrium(truss, held)
    bars, (equations, unknowns) = len(truss.ends), equilibrium.shape
    cases = loads.shape[2]
    applied = loads.reshape(equations, cases)
    if unknowns == equations:
        return splu(equilibrium).solve(applied)[:bars]

    misfit = np.zeros((unknowns, cases))  # of bars: stress-free elongation; of reactions: minus the settlement
    if strains is not None:
        misfit[:bars] = truss.lengths[:, None] * strains
    if settlements is not None:
        misfit[bars:] = -settlements.reshape(equations, cases)[held.ravel()]
    flexibility = truss.lengths / axial_stiffness
    unit = flexibility.max()  # brings the two sets of equations to one size
    flexibilities = np.append(flexibility / unit, np.zeros(unknowns - bars))
    both = block_array([[diags_array(flexibilities), equilibrium.T], [equilibrium, None]], format="csc")
    return splu(both).solve(np.vstack([-misfit / unit, applied]))[:bars]


def _equilibrium(truss: Truss, held: BoolArray) -> csc_array[np.float64]:
    """Return (2 j, b + r): times bar forces and reactions it gives the joint loads that they carry."""
    reactions = eye_array(held.size, format="csc")[:, held.ravel()]
    return csc_array(hstack([csc_array(elongation_of(truss).matrix.T), -reactions]))


def difference(forces: FloatArray, second: FloatArray) -> float:
    """Return the largest difference of two solutions (b, c) over the largest force of the first; 0 if all are zero."""
    largest = float(np.abs(forces).max(initial=0.0))
    apart = float(np.abs(forces - second).max(initial=0.0))
    return apart / largest if largest else apart
