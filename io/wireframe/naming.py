"""Names and order of joints and bars, by the project's convention, so that one of its own forms gets its own names.

Joints of the bottom chord are `B0..` from the left, those of the top chord `T0..`, where a heel that belongs to both
is a `B` and counts in both; all others are `M1..` from the left. Chord bars are `TC1..` and `BC1..`. A post has the
number of its top joint, a diagonal that of its panel, where that names every one of them apart; else they are
numbered from the left.
"""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.io.wireframe.envelope import Path, upright
from spanwright.io.wireframe.roles import Recognised
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Role
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True)
class Named:
    """A truss with names.

    joints : (index, name) in their order. bars : (name, joint name, joint name, role) in their order.
    """

    joints: tuple[tuple[int, str], ...]
    bars: tuple[tuple[str, str, str, Role], ...]


def name_all(truss: Recognised, tolerance: float) -> Named:
    """Name the joints and the bars of a recognised truss; tolerance in mm."""
    names = {joint: f"T{k}" for k, joint in enumerate(truss.top)}
    names |= {joint: f"B{k}" for k, joint in enumerate(truss.bottom)}
    xy = truss.network.xy
    others = sorted(set(range(len(xy))) - set(names), key=lambda joint: _from_left(xy[joint]))
    names |= {joint: f"M{k}" for k, joint in enumerate(others, start=1)}
    ordered = sorted(names.items(), key=lambda entry: (entry[1][0], int(entry[1][1:])))
    bars = [
        *_chord(truss.top, "TC", "top chord"),
        *_chord(truss.bottom, "BC", "bottom chord"),
        *_webs(truss, tolerance),
    ]
    return Named(
        tuple(ordered),
        tuple(
            (name, *_left_first(names[start], names[end], xy[[start, end]]), role) for name, start, end, role in bars
        ),
    )


_Bar = tuple[str, int, int, Role]


def _chord(path: Path, prefix: str, role: Role) -> list[_Bar]:
    return [(f"{prefix}{k}", start, end, role) for k, (start, end) in enumerate(pairwise(path), start=1)]


def _webs(truss: Recognised, tolerance: float) -> list[_Bar]:
    """Return posts, then diagonals, from the left; where posts lean both kinds together from the left."""
    xy, ends = truss.network.xy, truss.network.ends
    centres = xy[ends].mean(axis=1)
    rows = [row for row, role in enumerate(truss.roles) if role in ("post", "diagonal")]
    rows.sort(key=lambda row: (_from_left(centres[row]), _from_left(xy[ends[row]].min(axis=0))))
    posts = [row for row in rows if truss.roles[row] == "post"]
    diagonals = [row for row in rows if truss.roles[row] == "diagonal"]
    top, bottom = ({joint: k for k, joint in enumerate(path)} for path in (truss.top, truss.bottom))
    numbers = _numbers([top.get(_upper_joint(truss, row)) for row in posts])
    names = {row: f"P{number}" for row, number in zip(posts, numbers, strict=True)}
    numbers = _numbers([_panel(ends[row].tolist(), top, bottom) for row in diagonals])
    names |= {row: f"D{number}" for row, number in zip(diagonals, numbers, strict=True)}
    all_upright = all(upright(xy[ends[row, 1]] - xy[ends[row, 0]], tolerance) for row in posts)
    ordered = [*posts, *diagonals] if all_upright else rows
    return [(names[row], int(ends[row, 0]), int(ends[row, 1]), truss.roles[row]) for row in ordered]


def _numbers(wanted: list[int | None]) -> list[int]:
    """Return the wanted numbers if they tell all apart, else 1, 2, 3..."""
    known = [number for number in wanted if number is not None]
    if len(known) == len(wanted) == len(set(known)):
        return known
    return list(range(1, len(wanted) + 1))


def _upper_joint(truss: Recognised, row: int) -> int:
    ends = truss.network.ends[row]
    return int(ends[np.argmax(truss.network.xy[ends, 1])])


def _panel(ends: list[int], top: dict[int, int], bottom: dict[int, int]) -> int | None:
    """Return the number of the panel that a diagonal crosses, where both chords have the same panels.

    top, bottom : joint to its number along the chord.
    """
    if len(top) != len(bottom):
        return None
    for upper, lower in (ends, ends[::-1]):
        if upper in top and lower in bottom and abs(top[upper] - bottom[lower]) == 1:
            return max(top[upper], bottom[lower])
    return None


def _from_left(point: FloatArray) -> tuple[int, int]:
    """Return a sort key from the left, then from below, that noise does not disturb."""
    x, y = np.round(point / TOLERANCES.same_point).astype(int).tolist()
    return x, y


def _left_first(start: str, end: str, points: FloatArray) -> tuple[str, str]:
    return (end, start) if _from_left(points[1]) < _from_left(points[0]) else (start, end)
