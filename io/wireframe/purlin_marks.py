"""Purlins that a drawing marks: where they stand on the top chord, and the rule that a project file would give."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np

from spanwright.io.wireframe.marks import FlatMark, stray
from spanwright.io.wireframe.network import Remark
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import slopes
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import lay_purlins
from spanwright.truss.tolerances import TOLERANCES

_WIDEST_PAIR = 1000.0  # mm from the apex: two ridge purlins further apart are no pair (practice: 150 to 300 mm)

PurlinRule = Literal["at joints"] | tuple[float, ...]


@dataclass(frozen=True)
class PurlinMark:
    """A purlin: mm along the developed top chord from its first joint, its place, the joint it stands on or ""."""

    along: float
    x: float
    y: float
    joint: str


@dataclass(frozen=True)
class MarkedPurlins:
    """The purlins, left to right, and what a project file would say of them.

    rule : as `RestraintInput.purlins`; None where there are none or no rule says it. ridge_pair : as there.
    """

    purlins: tuple[PurlinMark, ...] = ()
    rule: PurlinRule | None = None
    ridge_pair: float | None = None


def place_purlins(truss: Truss, marks: Sequence[FlatMark]) -> tuple[MarkedPurlins, tuple[Remark, ...]]:
    """Set the marks of purlins, drawn on the top chord or within a purlin's depth of it, onto the chord."""
    directions = slopes(truss).directions
    alongs: list[float] = []
    remarks: list[Remark] = []
    for mark in (mark for mark in marks if mark.kind == "purlins"):
        along, distance = _nearest(truss, directions, mark.at)
        if distance > TOLERANCES.mark_reach:
            remarks.append(stray(mark, distance, "the top chord"))
        elif all(abs(along - other) > 2 * TOLERANCES.on_joint for other in alongs):
            alongs.append(along)
    purlins = tuple(_purlin(truss, directions, along) for along in sorted(alongs))
    if not purlins:
        return MarkedPurlins(), tuple(remarks)
    placed, doubts = _with_rule(truss, purlins)
    return placed, (*remarks, *doubts)


def _nearest(truss: Truss, directions: FloatArray, point: FloatArray) -> tuple[float, float]:
    """Return how far along the top chord, overhangs included, a point is, and how far from it; mm."""
    chord = truss.top
    starts = truss.xy[list(chord.joints[:-1])]
    lower, upper = np.zeros(len(starts)), np.diff(chord.along)
    lower[0] -= chord.overhang[0]
    upper[-1] += chord.overhang[1]
    forward = np.clip(((point - starts) * directions).sum(axis=1), lower, upper)
    distances = np.hypot(*(starts + forward[:, None] * directions - point).T)
    bar = int(np.argmin(distances))
    return float(chord.along[bar] + forward[bar]), float(distances[bar])


def _purlin(truss: Truss, directions: FloatArray, along: float) -> PurlinMark:
    chord = truss.top
    nearest = int(np.argmin(np.abs(chord.along - along)))
    if abs(chord.along[nearest] - along) <= TOLERANCES.on_joint:
        x, y = truss.xy[chord.joints[nearest]].tolist()
        return PurlinMark(float(chord.along[nearest]), x, y, truss.joint_names[chord.joints[nearest]])
    bar = int(np.clip(np.searchsorted(chord.along, along) - 1, 0, len(chord.bars) - 1))
    x, y = (truss.xy[chord.joints[bar]] + directions[bar] * (along - chord.along[bar])).tolist()
    return PurlinMark(along, x, y, "")


def _with_rule(truss: Truss, purlins: tuple[PurlinMark, ...]) -> tuple[MarkedPurlins, list[Remark]]:
    apex = slopes(truss).apex_along
    alongs = np.array([purlin.along for purlin in purlins])
    at_ridge = bool(np.abs(alongs - apex).min() <= TOLERANCES.on_joint)
    pair = None if at_ridge else _pair(alongs - apex)
    if not at_ridge and pair is None:
        return MarkedPurlins(purlins), [_no_rule("none is marked at the ridge, where a project file has one or a pair")]
    if _tells(truss, "at joints", pair, alongs):
        return MarkedPurlins(purlins, "at joints", pair), []
    sides = _sides(truss, alongs, apex, pair or 0.0)
    first, *others = sides
    alike = all(len(side) == len(first) and np.allclose(side, first, atol=TOLERANCES.on_joint) for side in others)
    if not alike or not first:
        listed = " and at ".join(", ".join(f"{distance:.0f} mm" for distance in side) or "none" for side in sides)
        return MarkedPurlins(purlins, None, pair), [
            _no_rule(f"up the slopes from the roof's edge they stand at {listed}")
        ]
    rule = tuple(round(distance, 1) for distance in first)
    if not _tells(truss, rule, pair, alongs):
        return MarkedPurlins(purlins, None, pair), [_no_rule("a list of these distances would give other lines")]
    return MarkedPurlins(purlins, rule, pair), []


def _tells(truss: Truss, rule: PurlinRule, pair: float | None, alongs: FloatArray) -> bool:
    """Return whether a rule gives the lines that are marked, `alongs` (p,) mm, and no other."""
    try:
        lines = lay_purlins(truss, RestraintInput(rule, "none", "nothing", True, pair))
    except InputError:
        return False
    return len(lines) == len(alongs) and np.allclose([line.along for line in lines], alongs, atol=TOLERANCES.on_joint)


def _pair(from_apex: FloatArray) -> float | None:
    """Return the distance of a ridge pair from the apex, mm, or None; from_apex : (p,) mm, + to the right."""
    left, right = -from_apex[from_apex < 0], from_apex[from_apex > 0]
    if not (left.size and right.size):
        return None
    nearest = float(left.min()), float(right.min())
    alike = abs(nearest[0] - nearest[1]) <= TOLERANCES.on_joint
    return round(sum(nearest) / 2, 1) if alike and max(nearest) <= _WIDEST_PAIR else None


def _sides(truss: Truss, alongs: FloatArray, apex: float, pair: float) -> list[list[float]]:
    """Return for each slope the distances up from the roof's edge, without the ridge line or pair."""
    chord = truss.top
    left, right = -chord.overhang[0], float(chord.length + chord.overhang[1])
    others = alongs[np.abs(np.abs(alongs - apex) - pair) > TOLERANCES.on_joint]
    if apex <= TOLERANCES.same_point:
        return [sorted((right - others).tolist())]
    if apex >= chord.length - TOLERANCES.same_point:
        return [sorted((others - left).tolist())]
    return [sorted((others[others < apex] - left).tolist()), sorted((right - others[others > apex]).tolist())]


def _no_rule(text: str) -> Remark:
    return Remark("W-408", f"purlins are marked, but {text}", "no rule was written; write the purlins by hand")
