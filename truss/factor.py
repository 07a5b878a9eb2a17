"""The stiffness matrix in band storage, its Cholesky factor, and whether it holds the truss.

All 2 j degrees of freedom (2 * joint + axis) keep their place: a held one has a diagonal and nothing beside it, so it
stays zero. Joints are eliminated along the longer side of the truss, which keeps the band as narrow as its depth.

Two judgements find a mechanism, because rounding hides it from a plain factorisation, which "solves" most of them:
a pivot is next to nothing beside the stiffness of its joint; or arbitrary forces move joints and hardly strain a bar.
The first is sharp where a few bars nearly meet in a line. The second is needed where much of the truss turns about
a joint eliminated late: rounding in that pivot grows with the third power of the number of panels that turn.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from scipy.linalg.lapack import dpbtrf, dpbtrs

from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.elongation import Elongation
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True, eq=False)
class Factor:
    """A factorised stiffness matrix.

    freedoms : (2 j,) degrees of freedom in the order of elimination.
    held : (2 j,) whether each of them, in that order, is held.
    band : (width + 1, 2 j) the lower Cholesky factor in band storage.
    loose : a degree of freedom that takes part in a mechanism, or None where the truss stands. Where there is one,
        the factor must not be used.
    """

    freedoms: IntArray
    held: BoolArray
    band: FloatArray
    loose: int | None = None

    def displacements(self, forces: FloatArray) -> FloatArray:
        """Return (2 j, c) mm for forces (2 j, c) N; what acts where the truss is held goes into the supports."""
        ordered = np.take(forces.T, self.freedoms, axis=1)
        ordered[:, self.held] = 0.0
        solved, _ = dpbtrs(self.band, ordered.T, lower=1, overwrite_b=1)
        displacements = np.empty_like(forces)
        displacements[self.freedoms] = solved
        return displacements


def factorise(truss: Truss, elongation: Elongation, stiffness: FloatArray, held: BoolArray) -> Factor:
    """Assemble and factorise the stiffness matrix of a truss.

    elongation : of the same truss. stiffness : (b,) N/mm of each bar, EA / length. held : (j, 2).
    """
    order = _along_longer_side(truss.xy)
    freedoms = (2 * order[:, None] + np.arange(2)).ravel()
    band = _assembled(truss, stiffness, order)
    stiffest = np.repeat(band[0].reshape(-1, 2).max(axis=1), 2)  # of the two directions at each joint
    stiffest[stiffest == 0.0] = 1.0  # a joint without bars
    fixed = held[order].ravel()
    _hold(band, fixed, stiffest)
    band, stopped = dpbtrf(band, lower=1, overwrite_ab=1)  # stopped: number of the first pivot not above zero, or 0
    sound = stopped - 1 if stopped else len(stiffest)
    weak = np.flatnonzero(band[0, :sound] ** 2 < TOLERANCES.pivot * stiffest[:sound])
    if weak.size or stopped:
        return Factor(freedoms, fixed, band, int(freedoms[weak[0] if weak.size else sound]))
    factor = Factor(freedoms, fixed, band)
    return replace(factor, loose=_moves_without_strain(factor, elongation))


def _along_longer_side(xy: FloatArray) -> IntArray:
    longer = int(np.argmax(np.ptp(xy, axis=0)))
    return np.lexsort((xy[:, 1 - longer], xy[:, longer]))


def _assembled(truss: Truss, stiffness: FloatArray, order: IntArray) -> FloatArray:
    """Return (width + 1, 2 j) the stiffness of the unsupported truss: element (row, column) at [row - column, column].

    Stored by columns, element (row, column) is number `row + width * column`.
    """
    place = np.empty_like(order)
    place[order] = np.arange(len(order))
    ends = 2 * place[truss.ends]
    near, far = np.minimum(ends[:, 0], ends[:, 1]), np.maximum(ends[:, 0], ends[:, 1])
    width = int((far - near).max(initial=0)) + 1

    # the ten elements on and below the diagonal of a bar's 4 x 4 matrix: three of each end, four between the ends
    x, y = truss.directions.T
    along = stiffness * np.array([x * x, x * y, y * y])
    first = np.array([near * (1 + width), far * (1 + width), far + near * width])
    down, right = 1, width  # from an element to the next row and to the next column
    steps = np.array([0, down, down + right, 0, down, down + right, 0, down, right, down + right])
    where = first[[0, 0, 0, 1, 1, 1, 2, 2, 2, 2]] + steps[:, None]
    what = along[[0, 1, 2, 0, 1, 2, 0, 1, 1, 2]]
    np.negative(what[6:], out=what[6:])
    size = 2 * len(order) * (width + 1)
    flat = np.bincount(where.ravel(), what.ravel(), minlength=size).astype(np.float64, copy=False)
    return flat.reshape(-1, width + 1).T


def _hold(band: FloatArray, held: BoolArray, diagonal: FloatArray) -> None:
    """Clear the rows and columns of held degrees of freedom in place, but for their diagonal."""
    columns = np.flatnonzero(held)
    below = np.arange(len(band))[:, None]
    band[:, columns] = 0.0
    band[below, columns - below] = 0.0  # a column before the first wraps to the last ones' unused places
    band[0, columns] = diagonal[columns]


def _moves_without_strain(factor: Factor, elongation: Elongation) -> int | None:
    """Return the degree of freedom that moves most if arbitrary forces hardly strain a bar, else None."""
    motion = factor.displacements(np.cos(np.arange(len(factor.freedoms)))[:, None])
    size = np.abs(motion)
    strained = np.abs(elongation.of_bars(motion)).max(initial=0.0)
    return int(size.argmax()) if strained < TOLERANCES.strainless * size.max(initial=0.0) else None
