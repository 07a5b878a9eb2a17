"""Where the purlin lines stand on the top chord.

Positions are measured along the developed top chord. The two slopes run from the roof's edges (overhang included) up to
the apex; where the apex is an end of the chord (mono-pitch) there is one slope, from the low to the high edge.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal, get_args

import numpy as np

from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import Slopes, slopes
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import AnchoredBy, RestraintInput
from spanwright.truss.model import Chord, Truss
from spanwright.truss.ranges import refuse_outside
from spanwright.truss.tolerances import TOLERANCES

_PURLINS = "restraint.purlins"
_RIDGE = "restraint.ridge_purlins"
_ANCHORED = "restraint.anchored_purlins"


@dataclass(frozen=True)
class PurlinLine:
    """A line of purlins where it crosses the truss.

    number : from 1 at the left eaves over the ridge to the right; a ridge pair is two.
    x, y : mm.
    along : mm, developed length along the top chord from its first joint; negative on a left overhang, beyond the
        chord's length on a right one.
    joint : index of the joint it stands on (then `along` is exactly the joint's), or None.
    bar : index of the top-chord bar it stands on; at a joint the bar that begins there (at the last joint the one that
        ends there); None on an overhang.
    anchored : does the line end at a node of a braced bay or diaphragm?
    side : "ridge" on the apex joint, else the slope it stands on; the lines of a ridge pair are "left" and "right".
    """

    number: int
    x: float
    y: float
    along: float
    joint: int | None
    bar: int | None
    anchored: bool
    side: Literal["left", "right", "ridge"]

    @property
    def name(self) -> str:
        """The line's name in print."""
        return f"purlin line {self.number}"


def lay_purlins(truss: Truss, restraint: RestraintInput) -> tuple[PurlinLine, ...]:
    """Return the purlin lines from the left eaves over the ridge to the right.

    - "at joints": one at every joint of the top chord, the end joints included, and one at the roof's edge where an
      overhang is longer along the slope than sheeting cantilevers (`TOLERANCES.sheeting_cantilever`): it bends the
      overhang, and is numbered like the others. A shorter overhang is carried by the line at the end joint.
    - a greatest spacing: on each slope the fewest equal spacings that do not exceed it, from the roof's edge to the
      ridge line or to the pair's lower line.
    - distances: up the slope from the roof's edge, on both slopes; of two unequal slopes the shorter one leaves out
      those beyond its top. The ridge line or pair stands where `ridge_pair` says, listed or not. On a mono-pitch
      they run from the low to the high edge, and a line stands at the high end joint, listed or not.

    A ridge pair replaces the line at the apex. A line within `TOLERANCES.on_joint` of a joint stands on it. A
    line is anchored if its number is stated so and something anchors it: with "nothing", none is.

    Raises InputError for positions off the slope, on each other or absurd, a ridge pair without a ridge, and
    anchored numbers that do not exist.
    """
    slope = slopes(truss)
    if restraint.ridge_pair is not None:
        _refuse_pair(truss, slope, restraint.ridge_pair)
    if restraint.purlins == "at joints":
        alongs = _at_joints(truss.top, slope.apex_along, restraint.ridge_pair)
    elif isinstance(restraint.purlins, tuple):
        alongs = _listed(truss, slope.apex_along, restraint.purlins, restraint.ridge_pair or 0.0)
    elif isinstance(restraint.purlins, str):
        raise InputError(f'"{restraint.purlins}" is not known', 'state "at joints", a spacing or a list', _PURLINS)
    else:
        alongs = _spaced(truss.top, slope.apex_along, restraint.purlins, restraint.ridge_pair or 0.0)
    anchored = _anchored(restraint, len(alongs))
    return tuple(_line(truss, slope, k, along, k in anchored) for k, along in enumerate(sorted(alongs), 1))


def _refuse_pair(truss: Truss, slope: Slopes, distance: float) -> None:
    at = truss.top.joints.index(slope.apex_joint)
    inside = 0 < at < len(truss.top.bars)
    if (
        not inside
        or slope.directions[at - 1, 1] <= TOLERANCES.straight
        or slope.directions[at, 1] >= -TOLERANCES.straight
    ):
        raise InputError(
            "a pair of ridge purlins is stated, but the top chord has no ridge: it does not fall away on both sides "
            f"of {truss.joint_names[slope.apex_joint]}",
            'state ridge_purlins = "one"',
            _RIDGE,
        )
    room = min(slope.apex_along - truss.top.along[at - 1], truss.top.along[at + 1] - slope.apex_along)
    if not TOLERANCES.on_joint < distance < room - TOLERANCES.on_joint:
        raise InputError(
            f"the ridge pair stands {_m(distance)} from the apex",
            f"state more than {_m(TOLERANCES.on_joint)} and less than the panel beside the ridge, {_m(room)} "
            '(usual: 0.15 m to 0.3 m), or ridge_purlins = "one"',
            _RIDGE,
        )


def _ridge(apex: float, pair: float | None) -> list[float]:
    return [apex - pair, apex + pair] if pair else [apex]


def _at_joints(chord: Chord, apex: float, pair: float | None) -> list[float]:
    others = [float(along) for along in chord.along if along != apex]
    ends = zip((0.0, chord.length), (-1.0, 1.0), chord.overhang, strict=True)
    edges = [end + out * reach for end, out, reach in ends if reach > TOLERANCES.sheeting_cantilever]
    return [*others, *edges, *_ridge(apex, pair)]


def _spaced(chord: Chord, apex: float, spacing: float, pair: float) -> list[float]:
    refuse_outside(spacing, "purlin spacing", key=_PURLINS, what="the greatest purlin spacing")
    alongs = _ridge(apex, pair)
    for edge, top in ((-chord.overhang[0], apex - pair), (chord.length + chord.overhang[1], apex + pair)):
        length = abs(top - edge)
        if length > TOLERANCES.on_joint:
            count = max(1, math.ceil(length / (spacing + TOLERANCES.same_length)))
            alongs += [edge + (top - edge) * k / count for k in range(count)]
    return alongs


def _listed(truss: Truss, apex: float, distances: tuple[float, ...], pair: float) -> list[float]:
    chord = truss.top
    left, right = -chord.overhang[0], chord.length + chord.overhang[1]
    if apex <= TOLERANCES.same_point:
        tops = {right: left}
    elif apex >= chord.length - TOLERANCES.same_point:
        tops = {left: right}
    else:
        tops = {left: apex - pair, right: apex + pair}
    _refuse_list(distances, max(abs(top - edge) for edge, top in tops.items()), pair)
    alongs = _ridge(apex, pair)
    for edge, top in tops.items():
        up = 1.0 if top > edge else -1.0
        for distance in sorted(distances):
            along = edge + up * distance
            within = distance <= abs(top - edge) + TOLERANCES.same_point
            if within and min(abs(along - ridge) for ridge in _ridge(apex, pair)) > 2 * TOLERANCES.on_joint:
                alongs.append(along)
    return alongs


def _refuse_list(distances: tuple[float, ...], top: float, pair: float) -> None:
    if not distances:
        raise InputError("the list of purlins is empty", "list distances up the slope from the roof's edge", _PURLINS)
    for distance in distances:
        if not 0.0 <= distance <= top + TOLERANCES.same_point:
            where = "the lower line of the ridge pair" if pair else "its top"
            raise InputError(
                f"a purlin {_m(distance)} up the slope stands off it: {_m(top)} from the roof's edge to {where}",
                f"list distances from 0 m to {_m(top)}",
                _PURLINS,
            )
    ordered = sorted(distances)
    for lower, upper in pairwise(ordered):
        if upper - lower <= 2 * TOLERANCES.on_joint:
            found = f"the purlins {_m(lower)} and {_m(upper)} up the slope stand on each other"
            raise InputError(found, "list each line once", _PURLINS)


def _anchored(restraint: RestraintInput, count: int) -> frozenset[int]:
    if restraint.anchored_by not in get_args(AnchoredBy):
        known = ", ".join(f'"{way}"' for way in get_args(AnchoredBy))
        raise InputError(f'"{restraint.anchored_by}" is not known', f"state one of {known}", "restraint.anchored_by")
    numbers = frozenset(range(1, count + 1))
    if isinstance(restraint.anchored, tuple):
        for number in restraint.anchored:
            if number not in numbers:
                raise InputError(
                    f"there is no purlin line {number}",
                    f"lines are numbered from 1 at the left eaves to {count} at the right",
                    _ANCHORED,
                )
        numbers = frozenset(restraint.anchored)
    elif restraint.anchored == "none":
        numbers = frozenset()
    elif restraint.anchored != "all":
        raise InputError(f'anchored = "{restraint.anchored}" is not known', 'state "all", "none" or numbers', _ANCHORED)
    return frozenset() if restraint.anchored_by == "nothing" else numbers


def _line(truss: Truss, slope: Slopes, number: int, along: float, anchored: bool) -> PurlinLine:
    chord = truss.top
    nearest = int(np.argmin(np.abs(chord.along - along)))
    joint = None
    if abs(chord.along[nearest] - along) <= TOLERANCES.on_joint:
        joint, along = chord.joints[nearest], float(chord.along[nearest])
    at = _bar_at(chord.along, along)
    x, y = truss.xy[chord.joints[at]] + slope.directions[at] * (along - chord.along[at])
    side = "ridge" if joint == slope.apex_joint else slope.side[at]
    bar = chord.bars[at] if 0.0 <= along <= chord.length else None
    return PurlinLine(number, float(x), float(y), along, joint, bar, anchored, side)


def _bar_at(joints_along: FloatArray, along: float) -> int:
    last = len(joints_along) - 2
    return min(max(int(np.searchsorted(joints_along, along, side="right")) - 1, 0), last)


def _m(length: float) -> str:
    return f"{length / 1000:.6g} m"
