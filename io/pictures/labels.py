"""Where labels go: along their members, half-way, on a fixed side; further along or across where that is taken."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.boxes import box, overlaps
from spanwright.truss.arrays import FloatArray

SHARES = (0.5, 0.45, 0.55, 0.4, 0.6, 0.35, 0.65, 0.3, 0.7)
"""Places along a member that a label tries, in this order, as shares of its length."""

CLEAR = 0.35
"""mm left free on all sides of a label."""

_LEVEL = 1e-9  # rad: rounding of an upright member's direction


class Occupied:
    """What stands on the sheet already, as (n, 6) boxes, mm."""

    def __init__(self, boxes: FloatArray) -> None:
        self.boxes = boxes

    def take(self, one: FloatArray) -> bool:
        """Let a box be taken if nothing overlaps it, and return whether it was."""
        free = not overlaps(one, self.boxes).any()
        if free:
            self.boxes = np.vstack([self.boxes, one])
        return free


@dataclass(frozen=True, eq=False)
class Words:
    """The room that a line of text takes: its length and height, mm."""

    length: float
    height: float

    def at(self, centre: FloatArray, angle: float = 0.0) -> FloatArray:
        """Return its (6,) box about a point, turned by `angle` in rad, with what must stay clear around it."""
        return box(centre, angle, self.length + 2.0 * CLEAR, self.height + 2.0 * CLEAR)


def readable_angle(direction: FloatArray) -> float:
    """Return the angle of text along a direction, rad, in (-90, 90] degrees: read from below or from the right."""
    angle = float(np.arctan2(direction[1], direction[0]))
    half = np.pi / 2.0
    if angle > half + _LEVEL:
        return angle - np.pi
    return angle + np.pi if angle <= -half + _LEVEL else angle


def place_along(
    segment: FloatArray, words: Words, away: float, sides: Sequence[float], occupied: Occupied
) -> FloatArray | None:
    """Take the first free place for words beside a member, and return its box; None if there is none.

    segment : (2, 2) mm. away : distance of the words' near edge from the member's centre line, mm. sides : +1 the upper
    (of a post the left) side, -1 the other, in the order to be tried.
    """
    span = segment[1] - segment[0]
    total = float(np.hypot(*span))
    angle = readable_angle(span)
    upward = np.array([-np.sin(angle), np.cos(angle)])
    for side in sides:
        for share in SHARES:
            fits = min(share, 1.0 - share) * total >= words.length / 2.0
            one = words.at(segment[0] + share * span + side * (away + words.height / 2.0) * upward, angle)
            if fits and occupied.take(one):
                return one
    return None


def place_near(
    points: FloatArray, own: int, words: Words, reach: float, bearings: Iterable[float], occupied: Occupied
) -> FloatArray | None:
    """Take the first free place for level words near one of (p, 2) points and nearer to it than to any other.

    reach : distance of the words' near edge from the point, mm. bearings : directions to be tried, degrees. Returns the
    box, None if there is none.
    """
    for bearing in np.radians(list(bearings)):
        towards = np.array([np.cos(bearing), np.sin(bearing)])
        out = reach + abs(towards[0]) * words.length / 2.0 + abs(towards[1]) * words.height / 2.0
        centre = points[own] + towards * out
        nearest = int(np.argmin(np.hypot(*(points - centre).T)))
        one = words.at(centre)
        if nearest == own and occupied.take(one):
            return one
    return None
