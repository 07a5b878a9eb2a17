"""Runs: the lengths of chord or web that buckle in one piece."""

from __future__ import annotations

import math
from bisect import bisect_left, bisect_right
from collections import defaultdict
from collections.abc import Collection, Iterable
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

from spanwright.truss.model import Chord, ChordName, Truss
from spanwright.truss.restraint import Held
from spanwright.truss.tolerances import TOLERANCES

NOTHING = "nothing"

Meeting = dict[int, dict[int, tuple[float, float]]]
"""By joint, then by bar that meets there: the bar's unit vector away from the joint."""

Straight = tuple[tuple[int, ...], tuple[int, int]]
"""Bars that run straight on into each other, in order, and the joints at both ends."""


@dataclass(frozen=True)
class Run:
    """Bars that buckle sideways in one piece.

    chord : "top", "bottom" or "web". bars : indices, in order along it.
    from_along, to_along : mm along the chord from its first joint (web: from the run's own first end); where an end is
        not held, the chord's end.
    length : mm between the two, infinite where an end is not held; without effective length factor.
    between : what holds its two ends, in words; "nothing" where nothing does.
    """

    chord: ChordName | Literal["web"]
    bars: tuple[int, ...]
    from_along: float
    to_along: float
    length: float
    between: tuple[str, str]


def chord_runs(chord: Chord, points: tuple[Held, ...]) -> tuple[Run, ...]:
    """Return the runs of a chord between the points where it is held, left to right, through every kink.

    A point on an overhang bounds the run of the bars beside it; a run that lies on an overhang has no bars and is left
    out.
    """
    words: dict[float, list[str]] = defaultdict(list)
    for held in points:
        words[held.along].append(held.by)
    bounds = {along: " and ".join(by) for along, by in sorted(words.items())}
    if not bounds or min(bounds) > 0.0:
        bounds = {0.0: NOTHING} | bounds
    if max(bounds) < chord.length:
        bounds |= {chord.length: NOTHING}
    joints = chord.along.tolist()
    runs = []
    for (start, left), (end, right) in pairwise(bounds.items()):
        first, last = bisect_right(joints, start) - 1, bisect_left(joints, end)
        bars = chord.bars[max(first, 0) : last]
        if bars:
            length = math.inf if NOTHING in (left, right) else end - start
            runs.append(Run(chord.name, bars, start, end, length, (left, right)))
    return tuple(runs)


def web_runs(truss: Truss, meeting: Meeting, held: Iterable[int]) -> tuple[tuple[Run, ...], tuple[int, ...]]:
    """Return the runs of the webs, and the joints at their ends that nothing holds.

    held : joints that bear and are held; those on a chord count as held besides. At a joint that is neither, bars that
    are collinear go on; a run that passes it, held at both its own ends, holds the other bars that end there.
    """
    words = dict.fromkeys(held, "bearing")
    words |= {joint: f"{chord.name} chord at" for chord in (truss.top, truss.bottom) for joint in chord.joints}
    lengths, names = truss.lengths.tolist(), truss.joint_names
    found = _straight_webs(truss, meeting, words)
    passed = _held_by_passing(truss, found, set(words))

    def holding(joint: int) -> str:
        if joint in words:
            return f"{words[joint]} {names[joint]}"
        return f"webs that pass {names[joint]}" if joint in passed else NOTHING

    runs = []
    for bars, (first, last) in found:
        between = (holding(first), holding(last))
        length = sum(lengths[bar] for bar in bars)
        runs.append(Run("web", bars, 0.0, length, math.inf if NOTHING in between else length, between))
    loose = {joint for _, ends in found for joint in ends} - passed
    return tuple(runs), tuple(sorted(loose))


def _straight_webs(truss: Truss, meeting: Meeting, held: Collection[int]) -> list[Straight]:
    through = meeting.keys() - held
    done = {*truss.top.bars, *truss.bottom.bars}
    found = []
    for bar in range(len(truss.bar_names)):
        if bar not in done:
            found.append(straight_run(truss, meeting, bar, through))
            done.update(found[-1][0])
    return found


def _held_by_passing(truss: Truss, runs: list[Straight], held: set[int]) -> set[int]:
    """Return the joints that are held: those given, and again and again those inside a run held at both its ends."""
    long = [(set(truss.ends[list(bars)].ravel().tolist()), ends) for bars, ends in runs if len(bars) > 1]
    while True:
        more = {joint for joints, ends in long if held.issuperset(ends) for joint in joints} - held
        if not more:
            return held
        held = held | more


def straight_run(truss: Truss, meeting: Meeting, bar: int, through: Collection[int]) -> Straight:
    """Follow a bar both ways, straight on through the joints of `through`, until no bar goes straight on."""
    sides = []
    for joint in truss.ends[bar].tolist():
        bars: list[int] = []
        last = bar
        while joint in through and (following := _straight_on(meeting[joint], last)) is not None:
            last = following
            bars.append(last)
            start, end = truss.ends[last].tolist()
            joint = end if start == joint else start
        sides.append((bars, joint))
    (before, first), (after, last) = sides
    return (*reversed(before), bar, *after), (first, last)


def _straight_on(here: dict[int, tuple[float, float]], bar: int) -> int | None:
    return next((other for other in here if other != bar and opposite(here[bar], here[other])), None)


def meeting_bars(truss: Truss) -> Meeting:
    """Return the bars that meet at each joint, with their directions away from it."""
    meeting: Meeting = defaultdict(dict)
    for bar, ((start, end), (x, y)) in enumerate(zip(truss.ends.tolist(), truss.directions.tolist(), strict=True)):
        meeting[start][bar] = (x, y)
        meeting[end][bar] = (-x, -y)
    return meeting


def opposite(one: tuple[float, float], other: tuple[float, float]) -> bool:
    """Whether two unit vectors away from a joint make one straight line (within `TOLERANCES.straight`)."""
    cross = one[0] * other[1] - one[1] * other[0]
    return abs(cross) <= TOLERANCES.straight and one[0] * other[0] + one[1] * other[1] < 0.0
