"""Where the truss stands on the sheet, and at which scale."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.style import DENOMINATORS
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.restraint import Restraint


@dataclass(frozen=True, eq=False)
class Zone:
    """A part of the sheet, mm: from left to right, from bottom to top."""

    left: float
    bottom: float
    right: float
    top: float


@dataclass(frozen=True, eq=False)
class View:
    """A truss drawn 1:`denominator`: `origin` is where its x = y = 0 lies on the sheet, mm."""

    origin: FloatArray
    denominator: int

    def onto(self, points: FloatArray) -> FloatArray:
        """Return points of the truss, (..., 2) mm, on the sheet, mm."""
        placed: FloatArray = self.origin + points / self.denominator
        return placed


def overhang_tips(truss: Truss) -> list[tuple[int, FloatArray]]:
    """Return for each overhang the end joint of the top chord and the tip (2,), mm."""
    joints, bars = truss.top.joints, truss.top.bars
    tips = []
    for joint, bar, length in zip((joints[0], joints[-1]), (bars[0], bars[-1]), truss.top.overhang, strict=True):
        if length > 0.0:
            inward = truss.directions[bar] if truss.ends[bar, 0] == joint else -truss.directions[bar]
            tips.append((joint, truss.xy[joint] - length * inward))
    return tips


def view_of(truss: Truss, restraint: Restraint, zone: Zone) -> View:
    """Return the truss in the middle of a zone, at the largest usual scale at which it fits."""
    lines = [[line.x, line.y] for line in restraint.lines]
    points = np.array([*truss.xy, *(tip for _, tip in overhang_tips(truss)), *lines])
    low, high = points.min(axis=0), points.max(axis=0)
    room = np.array([zone.right - zone.left, zone.top - zone.bottom])
    least = float(((high - low) / room).max())
    denominator = next((step for step in DENOMINATORS if step >= least), int(np.ceil(least)))
    middle = np.array([zone.left + zone.right, zone.bottom + zone.top]) / 2.0
    return View(middle - (low + high) / 2.0 / denominator, denominator)
