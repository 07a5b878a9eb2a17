"""Where lettering goes in the elevation so that no two texts, and no text and steel, lie on each other. Model mm.

Boxes are rows (6,), as in `spanwright.io.pictures.boxes`.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.boxes import box, boxes_along, overlaps
from spanwright.truss.arrays import BoolArray, FloatArray

SHARES = np.array([0.5, 0.46, 0.54, 0.42, 0.58, 0.38, 0.62, 0.34, 0.66, 0.3, 0.7, 0.25, 0.75, 0.2, 0.8])
"""Places along a member that a label tries, in this order, as shares of its length."""

TURNS = np.radians(np.arange(0.0, 360.0, 15.0))
"""Directions in which a label with a leader is tried."""

Size = tuple[float, float]
"""Length and height of a text with the room around it."""


@dataclass(frozen=True, eq=False)
class Place:
    """Where one text goes: the middle of its letters (2,), and its angle in degrees."""

    middle: FloatArray
    angle: float


class Occupied:
    """What stands on the drawing already: steel, signs, and texts with the dimensions."""

    def __init__(self, steel: FloatArray, signs: FloatArray, dimensions: FloatArray) -> None:
        self.steel = steel
        self.signs = signs
        self.texts = dimensions

    def free(self, middles: FloatArray, angle: float, size: Size) -> BoolArray:
        """Return (n,) True for boxes of one size and angle about (n, 2) middles that nothing overlaps."""
        taken = np.vstack([self.steel, self.signs, self.texts])
        along, upward = np.array([np.cos(angle), np.sin(angle)]), np.array([-np.sin(angle), np.cos(angle)])
        half = np.array(size) / 2.0
        apart = taken[None, :, :2] - middles[:, None]
        cos, sin = np.abs(taken[:, 2:4] @ along), np.abs(taken[:, 2:4] @ upward)
        own, across = taken[:, 2:4], np.column_stack([-taken[:, 3], taken[:, 2]])
        overlap = np.ones(apart.shape[:2], dtype=bool)
        for distance, reach in (
            (apart @ along, half[0] + taken[:, 4] * cos + taken[:, 5] * sin),
            (apart @ upward, half[1] + taken[:, 4] * sin + taken[:, 5] * cos),
            ((apart * own).sum(axis=2), taken[:, 4] + half[0] * cos + half[1] * sin),
            ((apart * across).sum(axis=2), taken[:, 5] + half[0] * sin + half[1] * cos),
        ):
            overlap &= np.abs(distance) < reach
        return np.asarray(~overlap.any(axis=1))

    def first_free(self, middles: FloatArray, angle: float, size: Size) -> FloatArray | None:
        """Return the first of (n, 2) middles about which a text finds room, and let it be taken; else None."""
        free = self.free(middles, angle, size) if len(middles) else np.zeros(0, dtype=bool)
        if not free.any():
            return None
        middle: FloatArray = middles[int(np.argmax(free))]
        self.add(middle, angle, size)
        return middle

    def crosses(self, start: FloatArray, end: FloatArray, *, signs: bool) -> bool:
        """Whether a line runs through a text or a dimension, or with `signs` through a sign."""
        line = boxes_along(np.array([[start, end]]), 0.0)[0]
        return bool(overlaps(line, self.texts).any() or (signs and overlaps(line, self.signs).any()))

    def add(self, middle: FloatArray, angle: float, size: Size) -> None:
        """Let a box be taken by a text."""
        self.texts = np.vstack([self.texts, box(middle, angle, *size)])


def readable(direction: FloatArray) -> float:
    """Return the angle of text along a direction, rad, so that it reads from below or from the right (ISO 129-1)."""
    angle = float(np.arctan2(direction[1], direction[0]))
    half = np.pi / 2.0
    if angle > half + 1e-9:
        return angle - np.pi
    return angle + np.pi if angle <= -half + 1e-9 else angle


def along_member(
    ends: FloatArray, size: Size, aways: Sequence[float], sides: Sequence[float], occupied: Occupied
) -> Place | None:
    """Return the first free place for a text beside a member and along it, or None; the place is then taken.

    ends : (2, 2). aways : distances of the text's near edge from the member's line; sides : +1 the upper (of a post the
    left) side, -1 the other; both in the order to be tried.
    """
    span = ends[1] - ends[0]
    total = float(np.hypot(*span))
    angle = readable(span)
    upward = np.array([-np.sin(angle), np.cos(angle)])
    shares = SHARES[np.minimum(SHARES, 1.0 - SHARES) * total >= size[0] / 2.0]
    for away in aways:
        for side in sides:
            middles = ends[0] + shares[:, None] * span + side * (away + size[1] / 2.0) * upward
            middle = occupied.first_free(middles, angle, size)
            if middle is not None:
                return Place(middle, float(np.degrees(angle)))
    return None


def near_point(
    point: FloatArray, size: Size, reaches: Iterable[float], bearings: Sequence[float], occupied: Occupied
) -> Place | None:
    """Return the first free place for level text near a point, in one of these directions (degrees), or None."""
    turns = np.radians(bearings)
    towards = np.column_stack([np.cos(turns), np.sin(turns)])
    extents = np.abs(towards) @ np.array(size) / 2.0
    for reach in reaches:
        middle = occupied.first_free(point + towards * (reach + extents)[:, None], 0.0, size)
        if middle is not None:
            return Place(middle, 0.0)
    return None


def with_leader(
    point: FloatArray, size: Size, reaches: Iterable[float], occupied: Occupied, *, over_signs: bool
) -> tuple[Place, FloatArray] | None:
    """Return the nearest free place for level text about a point and its leader (2, 2), text first, or None.

    over_signs : whether the leader may cross signs.
    """
    towards = np.column_stack([np.cos(TURNS), np.sin(TURNS)])
    half = np.array(size) / 2.0
    for reach in reaches:
        middles = point + reach * towards
        for middle in middles[occupied.free(middles, 0.0, size)]:
            feet = middle + half * np.array([[-1.0, 0.0], [1.0, 0.0], [0.0, -1.0], [0.0, 1.0]])
            start = feet[np.hypot(*(feet - point).T).argmin()]
            if not occupied.crosses(start, point, signs=not over_signs):
                occupied.add(middle, 0.0, size)
                return Place(middle, 0.0), np.array([start, point])
    return None
