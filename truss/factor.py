"""The stiffness matrix in band storage and its Cholesky factor.

All 2 j degrees of freedom are kept: a held one has a unit diagonal and nothing beside it, so it stays zero and costs
nothing. Joints are numbered along the longer side of the truss, which keeps the band as narrow as its depth.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from scipy.linalg.lapack import dpbtrf, dpbtrs

from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True, eq=False)
class Factor:
    """A factorised stiffness matrix.

    freedoms : (2 j,) degrees of freedom (2 * joint + axis) in the order of elimination.
    band : (width + 1, 2 j) the lower Cholesky factor in band storage.
    loose : the first degree of freedom without stiffness of its own once all before it are eliminated, or None;
        where there is one the truss is a mechanism and the factor must not be used.
    """

    freedoms: IntArray
    band: FloatArray
    loose: int | None

    def displacements(self, forces: FloatArray) -> FloatArray:
        """Return (2 j, c) mm for (2 j, c) N; held degrees of freedom must carry no force."""
        ordered = np.asfortranarray(forces[self.freedoms])
        solved, _ = dpbtrs(self.band, ordered, lower=1, overwrite_b=1)
        displacements = np.zeros_like(forces)
        displacements[self.freedoms] = solved
        return displacements


def factorise(truss: Truss, stiffness: FloatArray, held: BoolArray) -> Factor:
    """Assemble and factorise the stiffness matrix.

    stiffness : (b,) N/mm of each bar, EA / length. held : (j, 2).
    A pivot is judged against its diagonal (`TOLERANCES.pivot`): a plain factorisation "solves" most mechanisms.
    """
    order = _along_longer_side(truss.xy)
    freedoms = (2 * order[:, None] + np.arange(2)).ravel()
    band = _assemble(truss, stiffness, held, order)
    diagonal = band[0].copy()
    band, stopped = dpbtrf(band, lower=1, overwrite_ab=1)
    if stopped > 0:
        diagonal = diagonal[: stopped - 1]
    weak = np.flatnonzero(band[0, : len(diagonal)] ** 2 < TOLERANCES.pivot * diagonal)
    first = weak[0] if weak.size else stopped - 1
    return Factor(freedoms, band, int(freedoms[first]) if first >= 0 else None)


def _along_longer_side(xy: FloatArray) -> IntArray:
    longer = int(np.argmax(np.ptp(xy, axis=0)))
    return np.lexsort((xy[:, 1 - longer], xy[:, longer]))


def _assemble(truss: Truss, stiffness: FloatArray, held: BoolArray, order: IntArray) -> FloatArray:
    """Return the lower band: element (row, column) stands at [row - column, column]."""
    joints = len(order)
    place = np.empty(joints, dtype=np.intp)
    place[order] = np.arange(joints)
    near, far = 2 * np.sort(place[truss.ends], axis=1).T
    swapped = place[truss.ends[:, 0]] > place[truss.ends[:, 1]]
    width = int((far - near).max(initial=0)) + 1

    free = ~held[truss.ends] * truss.directions[:, None, :]  # (b, end, axis), nothing where held
    a = np.where(swapped[:, None], free[:, 1], free[:, 0])
    b = np.where(swapped[:, None], free[:, 0], free[:, 1])
    ka, kb = stiffness[:, None] * a, stiffness[:, None] * b

    # (row, column, value) of the ten elements of a bar's 4 x 4 matrix on and below the diagonal
    elements = [
        (near, near, ka[:, 0] * a[:, 0]),
        (near + 1, near, ka[:, 0] * a[:, 1]),
        (near + 1, near + 1, ka[:, 1] * a[:, 1]),
        (far, near, -ka[:, 0] * b[:, 0]),
        (far + 1, near, -ka[:, 0] * b[:, 1]),
        (far, near + 1, -ka[:, 1] * b[:, 0]),
        (far + 1, near + 1, -ka[:, 1] * b[:, 1]),
        (far, far, kb[:, 0] * b[:, 0]),
        (far + 1, far, kb[:, 0] * b[:, 1]),
        (far + 1, far + 1, kb[:, 1] * b[:, 1]),
    ]
    # column-wise storage of width + 1 numbers a column: [row - column, column] is number row + column * width
    where = np.concatenate([row + column * width for row, column, _ in elements])
    values = np.concatenate([value for *_, value in elements])
    flat = np.bincount(where, values, minlength=2 * joints * (width + 1)).astype(np.float64, copy=False)
    band = flat.reshape(2 * joints, width + 1)
    band[:, 0] += held[order].ravel()
    return band.T
