"""The envelope of bar forces and chord moments: the greatest of each, with the combination that gives it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.standard import Demand
from spanwright.truss.arrays import FloatArray
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True)
class Extreme:
    """The greatest value of an effect, N or N mm, >= 0, and the index of its strength combination; -1 where it is 0."""

    value: float
    combination: int


@dataclass(frozen=True)
class BarEnvelope:
    """The extremes of one bar over the strength combinations.

    tension, compression : sizes, N. sag, hog : moments that stretch the lower and the upper fibre, N mm.
    """

    bar: int
    tension: Extreme
    compression: Extreme
    sag: Extreme
    hog: Extreme


def envelope(wanted: Demand) -> tuple[BarEnvelope, ...]:
    """Return the envelope of every bar, in the truss's order; effects that are zero but for rounding count as none."""
    force, moment = (
        TOLERANCES.tiny_force * float(np.abs(effects).max(initial=0.0))
        for effects in (wanted.axial, wanted.end_moments)
    )
    effects = ((wanted.axial, force), (-wanted.axial, force), (wanted.sag, moment), (wanted.hog, moment))
    return tuple(
        BarEnvelope(bar, *(_extreme(effect[bar], least) for effect, least in effects))
        for bar in range(len(wanted.bars))
    )


def _extreme(values: FloatArray, least: float) -> Extreme:
    at = int(np.argmax(values))
    return Extreme(float(values[at]), at) if values[at] > least else Extreme(0.0, -1)
