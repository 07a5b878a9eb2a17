"""What the members must resist, reduced over the combinations before any section is looked at.

Resistances in pure tension and compression do not depend on the combination, except that the first compression web
has a reduced one; so the greatest force over its share of resistance decides for every section alike.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from spanwright.design.sans.constants import number
from spanwright.design.standard import Demand
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.tolerances import TOLERANCES

FIRST_WEB = number("column", "first_web")


Entry = TypeVar("Entry", bound=np.generic)


def column(values: NDArray[Entry]) -> NDArray[Entry]:
    """Return (s, 1) from (s,), so that sections broadcast against bars."""
    return values[:, None]


@dataclass(frozen=True, eq=False)
class Worst:
    """(b,) the greatest effect, >= 0, its combination (-1 where there is none) and the share of resistance there."""

    force: FloatArray
    combination: IntArray
    share: FloatArray


@dataclass(frozen=True, eq=False)
class Effects:
    """Effects on members (b).

    tension, own, sideways : greatest tension; greatest compression in the bar itself; greatest compression of the
        bars that buckle sideways together with it.
    compressed : (b,) True where the bar, or one that buckles together with it, sees compression.
    shares : (b, c) share of the resistance in compression: 0.85 for the first compression web, else 1.
    bent : whether any member has a moment.
    """

    tension: Worst
    own: Worst
    sideways: Worst
    compressed: BoolArray
    shares: FloatArray
    bent: bool


def effects_of(demand: Demand) -> Effects:
    """Reduce a demand over its combinations; forces below the tolerance for zero count as none."""
    threshold = TOLERANCES.tiny_force * float(np.abs(demand.axial).max(initial=0.0))
    compression = np.where(demand.axial < -threshold, -demand.axial, 0.0)
    sideways = np.where(demand.sideways > threshold, demand.sideways, 0.0)
    shares = np.where(demand.first_web, FIRST_WEB, 1.0)
    return Effects(
        tension=_worst(np.where(demand.axial > threshold, demand.axial, 0.0), np.ones_like(shares)),
        own=_worst(compression, shares),
        sideways=_worst(np.maximum(sideways, compression), shares),
        compressed=np.any((compression > 0.0) | (sideways > 0.0), axis=1),
        shares=shares,
        bent=bool(np.any(np.maximum(demand.sag, demand.hog) > threshold * demand.panel[:, None])),
    )


def _worst(forces: FloatArray, shares: FloatArray) -> Worst:
    """Return the combination with the greatest force over its share of resistance."""
    bars = np.arange(forces.shape[0])
    at = np.argmax(forces / shares, axis=1)
    force = forces[bars, at]
    return Worst(force, np.where(force > 0.0, at, -1), shares[bars, at])
