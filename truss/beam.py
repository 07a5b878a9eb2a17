"""A continuous beam of constant stiffness over rigid supports, its ends free to overhang: influence of point loads.

Reactions by Betti's law (H. Müller-Breslau, 1886): the influence line of a support's reaction is the shape the
beam takes when that support alone moves by 1. Between supports that shape is a natural cubic spline; beyond the
end supports the beam carries nothing and stays straight. Moments then follow from the reactions by statics.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from scipy.interpolate import CubicSpline

from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import GeometryError


@dataclass(frozen=True, eq=False)
class Beam:
    """A beam over two or more supports.

    supports : (s,) mm, places of the supports, ascending. GeometryError if fewer than two or not ascending.
    Places of loads and sections are on the same axis and may lie beyond the end supports.
    """

    supports: FloatArray

    def __post_init__(self) -> None:
        if len(self.supports) < 2 or not np.all(np.diff(self.supports) > 0.0):
            raise GeometryError(f"a beam cannot stand on supports at {np.asarray(self.supports).tolist()} mm")

    @cached_property
    def _shapes(self) -> CubicSpline:
        return CubicSpline(self.supports, np.eye(len(self.supports)), bc_type="natural")

    def reactions(self, loads_at: FloatArray) -> FloatArray:
        """Return (s, p): upward reaction of each support for a unit load downward at each of the places (p,), mm."""
        held = np.clip(loads_at, self.supports[0], self.supports[-1])
        beyond = np.asarray(loads_at) - held
        influence: FloatArray = self._shapes(held) + beyond[:, None] * self._shapes(held, 1)
        return influence.T

    def moments(self, sections_at: FloatArray, loads_at: FloatArray) -> FloatArray:
        """Return (m, p), mm: bending moment at each section (m,) for a unit load downward at each place (p,).

        Sagging (tension at the lower fibre) is positive.
        """
        from_supports = np.maximum(np.subtract.outer(sections_at, self.supports), 0.0)
        from_loads = np.maximum(np.subtract.outer(sections_at, loads_at), 0.0)
        moments: FloatArray = from_supports @ self.reactions(loads_at) - from_loads
        return moments
