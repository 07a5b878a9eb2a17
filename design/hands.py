"""What the ends of a piece are called, and which of two opposite hands it is.

Opposite hands mirror each other. A piece that is its own mirror image about mid-length has none; neither has a tube,
whose section is symmetrical about the plane of the truss.
"""

from __future__ import annotations

import math

from spanwright.design.cut_ends import End
from spanwright.design.cutting import Cut
from spanwright.design.lying import Lying

SQUARE_WORDS = "square"

Ends = tuple[str, str]


def ends_and_hand(cut: Cut, lies: Lying) -> tuple[Ends, str]:
    """Return how the two ends of a piece are made, the squarer first, and its hand: "", "L" or "R".

    Hand: seen from the inside of the angle with its outstanding leg on top, the first end is at the left or right.
    """
    first, last = cut.ends
    # degrees by which the upper edge is the longer one; + 0.0 turns -0.0 into 0.0
    angles = [round(math.degrees(math.atan(slant)), 1) + 0.0 for slant in (-first.slant, last.slant)]
    if lies.heel_up is None:
        return _of_tube(cut.ends, angles), ""
    at_heel = [angle if lies.heel_up else -angle for angle in angles]
    order = sorted((0, 1), key=lambda at: (abs(at_heel[at]), at_heel[at]))
    ends = _in_words(cut.ends, at_heel, order, ("heel", "toe"))
    if at_heel[0] == at_heel[1]:
        return ends, ""
    # to see the inside with the outstanding leg on top one goes behind the truss, or turns the piece upside down
    swapped = lies.far == lies.heel_up
    start_is_left = not swapped
    first_is_start = order[0] == 0
    return ends, "L" if first_is_start == start_is_left else "R"


def _of_tube(ends: tuple[End, End], angles: list[float]) -> Ends:
    """Name the ends of a tube, which may be turned over: the steeper end is long at side A."""
    order = sorted((0, 1), key=lambda at: (abs(angles[at]), ends[at].kind, ends[at].tube))
    turn = -1.0 if angles[order[1]] < 0.0 else 1.0
    sides = ("side A", "side B") if all(angles) else ("", "")
    return _in_words(ends, [turn * angle for angle in angles], order, sides)


def _in_words(ends: tuple[End, End], angles: list[float], order: list[int], sides: tuple[str, str]) -> Ends:
    first, last = (_end_in_words(ends[at], angles[at], sides[0] if angles[at] > 0.0 else sides[1]) for at in order)
    return first, last


def _end_in_words(end: End, angle: float, side: str) -> str:
    long_side = f", long at {side}" if side else ""
    if end.kind == "profile":
        return f"profile to {end.tube} at {90.0 - abs(angle):.1f} deg{long_side if angle else ''}"
    return f"mitre {abs(angle):.1f} deg{long_side}" if angle else SQUARE_WORDS
