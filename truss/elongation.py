"""What joint displacements do to bars, and what bar forces do to joints: one matrix read both ways."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from scipy.sparse import csr_array

from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.model import Support, Truss


def held_directions(truss: Truss, supports: tuple[Support, ...] | None = None) -> BoolArray:
    """Return (j, 2) whether each joint is held in x and in y, by `supports` or else by the truss's own."""
    held = np.zeros((len(truss.joint_names), 2), dtype=bool)
    for support in truss.supports if supports is None else supports:
        held[support.joint] |= (support.x, support.y)
    return held


MOST_DENSE = 100
"""Bars up to which a full matrix is quicker to make and to use than a sparse one (tests/benchmarks/solver.py)."""


@dataclass(frozen=True, eq=False)
class Elongation:
    """How bars and joints act on each other.

    matrix : (b, 2 j), sparse for many bars; its columns stand for x0, y0, x1, y1, ... of the joints. Times
    displacements it gives elongations; its transpose times bar forces gives the joint loads that these forces carry.
    """

    matrix: FloatArray | csr_array[np.float64]

    def of_bars(self, displacements: FloatArray) -> FloatArray:
        """Return (b, c) mm that bars grow longer by joint displacements (2 j, c) mm."""
        return np.asarray(self.matrix @ displacements)

    def carried(self, forces: FloatArray) -> FloatArray:
        """Return (2 j, c) N, the joint loads that bar forces (b, c) N, tension positive, are in equilibrium with."""
        return np.asarray(self.matrix.T @ forces)


def elongation_of(truss: Truss) -> Elongation:
    """Return how the bars and joints of a truss act on each other."""
    cosines: FloatArray = np.hstack([-truss.directions, truss.directions])
    freedoms = 2 * truss.ends[:, [0, 0, 1, 1]] + np.array([0, 1, 0, 1])
    bars, joints = len(truss.ends), len(truss.xy)
    if bars <= MOST_DENSE:
        dense = np.zeros((bars, 2 * joints))
        dense[np.arange(bars)[:, None], freedoms] = cosines
        return Elongation(dense)
    starts = np.arange(0, cosines.size + 1, 4)
    return Elongation(csr_array((cosines.ravel(), freedoms.ravel(), starts), shape=(bars, 2 * joints)))
