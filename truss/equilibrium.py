"""Joint equilibrium of a pin-jointed truss."""

from __future__ import annotations

import numpy as np
from scipy.sparse import csr_array

from spanwright.truss.arrays import BoolArray, IntArray
from spanwright.truss.model import Support, Truss


def held_directions(truss: Truss, supports: tuple[Support, ...] | None = None) -> BoolArray:
    """Return (j, 2) whether each joint is held in x and in y, by `supports` or else by the truss's own."""
    held = np.zeros((len(truss.joint_names), 2), dtype=bool)
    for support in truss.supports if supports is None else supports:
        held[support.joint] |= (support.x, support.y)
    return held


def bar_freedoms(truss: Truss) -> IntArray:
    """Return (b, 4) the degrees of freedom of each bar: x and y of its first end, then of its second."""
    freedoms: IntArray = 2 * truss.ends[:, [0, 0, 1, 1]] + np.array([0, 1, 0, 1])
    return freedoms


def elongation_matrix(truss: Truss) -> csr_array[np.float64]:
    """Return (b, 2 j) sparse: times joint displacements (x0, y0, x1, y1, ...) it gives the bars' elongations.

    Its transpose times bar forces gives the joint loads that these forces carry: joint equilibrium.
    """
    cosines = np.hstack([-truss.directions, truss.directions])
    starts = np.arange(0, cosines.size + 1, 4)
    shape = (len(truss.bar_names), 2 * len(truss.joint_names))
    return csr_array((cosines.ravel(), bar_freedoms(truss).ravel(), starts), shape=shape)
