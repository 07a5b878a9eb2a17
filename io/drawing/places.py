"""Where lettering goes in the elevation so that no two texts, and no text and steel, lie on each other. Model mm."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.boxes import box, boxes_along, overlaps
from spanwright.truss.arrays import FloatArray

SHARES = (0.5, 0.46, 0.54, 0.42, 0.58, 0.38, 0.62, 0.34, 0.66, 0.3, 0.7, 0.25, 0.75, 0.2, 0.8)
"""Places along a member that a label tries, in this order, as shares of its length."""

TURNS = np.radians(np.arange(0.0, 360.0, 15.0))
"""Directions in which a label with a leader is tried."""


@dataclass(frozen=True, eq=False)
class Place:
    """Where one text goes: the middle of its letters (2,), and its angle in degrees."""

    middle: FloatArray
    angle: float


class Occupied:
    """What stands on the drawing already, as boxes: steel and signs, and texts."""

    def __init__(self, steel: FloatArray) -> None:
        self.steel = steel
        self.texts = np.zeros((0, 6))

    def is_free(self, one: FloatArray) -> bool:
        """Whether nothing overlaps a box."""
        return not (overlaps(one, self.steel).any() or overlaps(one, self.texts).any())

    def crosses_text(self, start: FloatArray, end: FloatArray) -> bool:
        """Whether a line runs through a text."""
        return bool(overlaps(boxes_along(np.array([[start, end]]), 0.0)[0], self.texts).any())

    def add(self, one: FloatArray) -> None:
        """Let a box be taken by a text."""
        self.texts = np.vstack([self.texts, one])


def readable(direction: FloatArray) -> float:
    """Return the angle of text along a direction, rad, so that it reads from below or from the right (ISO 129-1)."""
    angle = float(np.arctan2(direction[1], direction[0]))
    half = np.pi / 2.0
    if angle > half + 1e-9:
        return angle - np.pi
    return angle + np.pi if angle <= -half + 1e-9 else angle


def along_member(
    ends: FloatArray, size: tuple[float, float], aways: Sequence[float], sides: Sequence[float], occupied: Occupied
) -> Place | None:
    """Return the first free place for a text beside a member and along it, or None; the place is then taken.

    ends : (2, 2). size : length and height of the text with its clearance. aways : distances of its near edge from the
    member's line; sides : +1 the upper (of a post the left) side, -1 the other; both in the order to be tried.
    """
    span = ends[1] - ends[0]
    total = float(np.hypot(*span))
    angle = readable(span)
    upward = np.array([-np.sin(angle), np.cos(angle)])
    for away in aways:
        for side in sides:
            for share in SHARES:
                if min(share, 1.0 - share) * total < size[0] / 2.0:
                    continue
                middle = ends[0] + share * span + side * (away + size[1] / 2.0) * upward
                one = box(middle, angle, *size)
                if occupied.is_free(one):
                    occupied.add(one)
                    return Place(middle, float(np.degrees(angle)))
    return None


def near_point(
    point: FloatArray,
    size: tuple[float, float],
    reaches: Iterable[float],
    bearings: Sequence[float],
    occupied: Occupied,
) -> Place | None:
    """Return the first free place for level text near a point, in one of these directions (degrees), or None."""
    for reach in reaches:
        for bearing in np.radians(bearings):
            towards = np.array([np.cos(bearing), np.sin(bearing)])
            middle = point + towards * (reach + abs(towards) @ np.array(size) / 2.0)
            one = box(middle, 0.0, *size)
            if occupied.is_free(one):
                occupied.add(one)
                return Place(middle, 0.0)
    return None


def with_leader(
    point: FloatArray, size: tuple[float, float], reaches: Iterable[float], occupied: Occupied
) -> tuple[Place, FloatArray] | None:
    """Return the nearest free place for level text about a point and its leader (2, 2), text first, or None."""
    for reach in reaches:
        for turn in TURNS:
            middle = point + reach * np.array([np.cos(turn), np.sin(turn)])
            if not occupied.is_free(box(middle, 0.0, *size)):
                continue
            half = np.array(size) / 2.0
            feet = middle + half * np.array([[-1.0, 0.0], [1.0, 0.0], [0.0, -1.0], [0.0, 1.0]])
            start = feet[np.hypot(*(feet - point).T).argmin()]
            if not occupied.crosses_text(start, point):
                occupied.add(box(middle, 0.0, *size))
                return Place(middle, 0.0), np.array([start, point])
    return None
