"""What each point restraint must resist, in force and in stiffness, and what reaches the anchor."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from itertools import pairwise

import numpy as np

from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Chord, Truss
from spanwright.truss.restraint import Held, Restraint, held_points


@dataclass(frozen=True)
class RestraintForce:
    """The force, N, that a part must resist sideways, to either side, where it holds a chord.

    part : its name. kind : "purlin line", "knee brace", "bottom tie" or "bearing". at : where, in words.
    combination : index of the one that gives the force. stiffness : N/mm, the least that the part must have there.
    """

    part: str
    kind: str
    at: str
    force: float
    combination: int
    stiffness: float


@dataclass(frozen=True)
class AnchorForce:
    """The sum of restraint forces, N, that reaches the anchor, and the index of the combination that gives it."""

    force: float
    combination: int


@dataclass(frozen=True, eq=False)
class _Point:
    """A point where a part holds a chord.

    compression : (c,) N, greatest in the two runs that meet there. per_length : (c,) N/mm, greatest of each run's own
    compression over its length.
    """

    part: str
    at: str
    compression: FloatArray
    per_length: FloatArray


def restraint_forces(
    truss: Truss, restraint: Restraint, compression: FloatArray, share: float, beta: float
) -> tuple[RestraintForce, ...]:
    """Return the force that each counted part must resist where it holds a chord, and the stiffness it must have.

    compression : (b, c) N, >= 0, of each bar in each combination. share, beta : of the member standard (SANS 10162-1
    cl. 9.2, from memory): a point restraint resists `share` of the compression Cu beside it (0.02), and is as stiff as
    k = 2 beta Cu / Lb (beta = 4, for four and more points), Lb the distance to the next held point.

    The compression is the greatest in the two runs that meet at the point: at least that of the two adjacent bars, and
    more where the chord is pressed harder further on. For the stiffness the run with the greater Cu / Lb counts. A
    part that holds both chords at a shared joint takes the greater. A purlin line must carry its own force and those of
    the braces that run to it.
    """
    greatest: dict[str, RestraintForce] = {}
    for point in _points(truss, restraint, compression):
        kind = restraint.graph.nodes[point.part]["kind"]
        at = int(np.argmax(point.compression))
        stiffness = 2.0 * beta * float(point.per_length.max())
        found = RestraintForce(point.part, kind, point.at, share * float(point.compression[at]), at, stiffness)
        known = greatest.get(point.part, found)
        governs = found if found.force > known.force else known
        greatest[point.part] = replace(governs, stiffness=max(found.stiffness, known.stiffness))
    return tuple(greatest.values())


def anchor_force(
    truss: Truss, restraint: Restraint, compression: FloatArray, share: float, quantity: int
) -> AnchorForce:
    """Return the greatest sum of restraint forces that reaches the anchor from `quantity` trusses.

    The forces of one combination are summed over lines, braces and ties (bearings have ties of their own), all in one
    direction, and the worst combination is taken. compression, share : as for `restraint_forces`.
    """
    beside: dict[str, FloatArray] = {}
    for point in _points(truss, restraint, compression):
        if restraint.graph.nodes[point.part]["kind"] != "bearing":
            beside[point.part] = np.maximum(beside.get(point.part, 0.0), point.compression)
    if not beside:
        return AnchorForce(0.0, -1)
    sums = quantity * share * np.sum(list(beside.values()), axis=0)
    at = int(np.argmax(sums))
    return AnchorForce(float(sums[at]), at)


def _points(truss: Truss, restraint: Restraint, compression: FloatArray) -> Iterator[_Point]:
    points = held_points(truss, restraint)
    for chord in (truss.top, truss.bottom):
        bounds = [-np.inf, *sorted({held.along for held in points[chord.name]}), np.inf]
        runs = list(pairwise(bounds))
        pressed = [_compression_between(chord, start, end, compression) for start, end in runs]
        slopes = [force / (end - start) for force, (start, end) in zip(pressed, runs, strict=True)]
        for held in points[chord.name]:
            after = bounds.index(held.along)
            yield _Point(
                held.part,
                _where(truss, chord, held),
                np.maximum(pressed[after - 1], pressed[after]),
                np.maximum(slopes[after - 1], slopes[after]),
            )


def _compression_between(chord: Chord, start: float, end: float, compression: FloatArray) -> FloatArray:
    """Return (c,) the greatest compression of the chord's bars that lie wholly or partly between two places."""
    between = (chord.along[:-1] < end) & (chord.along[1:] > start)
    greatest: FloatArray = compression[list(chord.bars)][between].max(axis=0, initial=0.0)
    return greatest


def _where(truss: Truss, chord: Chord, held: Held) -> str:
    if held.joint is not None:
        return truss.joint_names[held.joint]
    after = int(np.searchsorted(chord.along, held.along))
    if after == 0:
        return f"left of {truss.joint_names[chord.joints[0]]}"
    if after == len(chord.joints):
        return f"right of {truss.joint_names[chord.joints[-1]]}"
    return f"{truss.joint_names[chord.joints[after - 1]]} to {truss.joint_names[chord.joints[after]]}"
