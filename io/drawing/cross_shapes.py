"""The shapes of cross-sections, mm: x across the truss, y in its plane and upward, the origin at the centroid."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.lying import TUBES
from spanwright.design.sizing import Choice
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Role

ARC = 9
"""Points that draw a quarter circle."""
TOE_SHARE = 0.5
"""Radius at the toes over the root radius (EN 10056-1, from memory); it changes no dimension."""


@dataclass(frozen=True, eq=False)
class Shape:
    """One rolled piece in cross-section: its outer ring (n, 2), and of a tube its inner ring."""

    rings: tuple[FloatArray, ...]


@dataclass(frozen=True, eq=False)
class Cell:
    """One cross-section: what it goes through, its pieces, its packing plate (4, 2) or None, gusset, title, caption.

    width : mm on paper.
    """

    choice: Choice
    pieces: tuple[Shape, ...]
    pack: FloatArray | None
    gusset: float
    title: str
    caption: tuple[str, ...]
    width: float

    @property
    def steel(self) -> FloatArray:
        """(n, 2) mm, all points of steel, packing plate included."""
        rings = [ring for piece in self.pieces for ring in piece.rings]
        return np.vstack([*rings, *([] if self.pack is None else [self.pack])])


def shapes(section: Candidates, role: Role, gusset: float) -> tuple[Shape, ...]:
    """Return the pieces of a chosen section (candidates of length 1).

    gusset : mm; a single angle stands in front of a gusset of this thickness in the plane of the truss (x = 0 is the
    middle of the gusset); other sections are centred on the plane.
    """
    if section.family in TUBES:
        return (_tube(section),)
    angle = _angle(section)
    leg_back = float(section.piece_centroid_outstanding[0])
    if section.family == "2L star":
        off = section.gap / 2.0
        return Shape((angle + off,)), Shape((-(angle + off)[::-1],))
    if role != "bottom chord":
        angle = angle * np.array([1.0, -1.0]) + np.array([0.0, leg_back])
    else:
        angle = angle - np.array([0.0, leg_back])
    if section.family == "L":
        return (Shape((angle + np.array([gusset / 2.0, 0.0]),)),)
    right = angle + np.array([section.gap / 2.0, 0.0])
    return Shape((right,)), Shape((right * np.array([-1.0, 1.0]),))


def _angle(section: Candidates) -> FloatArray:
    """Return an angle with its heel at the origin: connected leg along +y, outstanding leg along +x."""
    leg, out = float(section.leg_connected[0]), float(section.leg_outstanding[0])
    t, root = float(section.thickness[0]), float(section.root_radius[0])
    toe = min(TOE_SHARE * root, t)
    turn = np.linspace(0.0, np.pi / 2.0, ARC)
    quarter = np.column_stack([np.cos(turn), np.sin(turn)])
    return np.vstack(
        [
            [(0.0, 0.0), (out, 0.0)],
            np.array([out - toe, t - toe]) + toe * quarter,
            np.array([t + root, t + root]) - root * quarter[:, ::-1],
            np.array([t - toe, leg - toe]) + toe * quarter,
            [(0.0, leg)],
        ]
    )


def _tube(section: Candidates) -> Shape:
    half_depth, half_width = float(section.depth[0]) / 2.0, float(section.width[0]) / 2.0
    t = float(section.thickness[0])
    if section.family == "CHS":
        return Shape((_rounded(half_depth, half_depth, half_depth), _rounded(*3 * (half_depth - t,))))
    corner = float(section.root_radius[0])
    inner = max(corner - t, 0.0)
    return Shape((_rounded(half_width, half_depth, corner), _rounded(half_width - t, half_depth - t, inner)))


def _rounded(half_width: float, half_depth: float, radius: float) -> FloatArray:
    """Return a rectangle with rounded corners about the origin."""
    turn = np.linspace(0.0, np.pi / 2.0, 3 * ARC)
    corner = np.array([half_width - radius, half_depth - radius]) + radius * np.column_stack(
        [np.cos(turn), np.sin(turn)]
    )
    mirrored = [corner, corner[::-1] * [-1.0, 1.0], corner * [-1.0, -1.0], corner[::-1] * [1.0, -1.0]]
    return np.vstack(mirrored)
