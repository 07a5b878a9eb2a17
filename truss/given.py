"""A truss given joint by joint: any plane truss with a top chord, a bottom chord and bearings."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterable
from dataclasses import replace
from itertools import count

import numpy as np

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.assembly import NamedBar, assemble
from spanwright.truss.chords import trace_chords
from spanwright.truss.errors import GeometryError, InputError, UnknownNameError
from spanwright.truss.inputs import GivenInput
from spanwright.truss.model import ROLES, Role, Truss
from spanwright.truss.possible import refuse_overhang
from spanwright.truss.ranges import refuse_outside
from spanwright.truss.tolerances import TOLERANCES
from spanwright.truss.unusual import unusual

_JOINTS, _BARS, _SUPPORTS = "truss.joints", "truss.bars", "truss.joint_supports"
_PREFIX: dict[Role, str] = {"top chord": "TC", "bottom chord": "BC", "post": "P", "diagonal": "D"}


def build_given(given: GivenInput) -> Truss:
    """Build the truss from its joints and bars; joints keep their names and coordinates.

    Bars that have names keep them and their order. Without, they are named by role and numbered from left to right,
    chord bars along the chord: `TC1..`, `BC1..`, `P1..`, `D1..`.

    Raises InputError (UnknownNameError for a name) and GeometryError with the names of joints and bars, key
    "truss.joints", "truss.bars" or "truss.joint_supports", for what cannot be a truss on two bearings or more. What
    is unusual is in the truss's warnings. Whether joints can move is found by the solution.
    """
    names = [name for name, _, _ in given.joints]
    xy = np.array([(x, y) for _, x, y in given.joints], dtype=float).reshape(-1, 2)
    _refuse_joints(names, xy)
    ends = _ends(given, names)
    _refuse_bars(given, names, xy, ends)
    _refuse_supports(given, names)
    joints = {name: (x, y) for name, x, y in given.joints}
    bearings = {joint: kind == "pinned" for joint, kind in given.supports}
    truss = assemble(joints, _named_bars(given, names, xy, ends), bearings, overhang=given.overhang)
    _refuse_bearings(truss)
    refuse_overhang(given.overhang, truss.span)
    _refuse_swapped_chords(truss)
    return replace(truss, warnings=unusual(truss))


def _refuse_joints(names: list[str], xy: FloatArray) -> None:
    if not names:
        raise InputError("no joint is given", 'state each joint as A = ["0 m", "0 m"]', _JOINTS)
    repeated = _repeated(names)
    if repeated:
        raise InputError(f"joint {_quoted(repeated)} is given more than once", "give every joint its own name", _JOINTS)
    for name, point in zip(names, xy, strict=True):
        if not np.isfinite(point).all():
            raise InputError(f'joint "{name}" is at x = {point[0]:g}, y = {point[1]:g}', "state two lengths", _JOINTS)
    order = np.argsort(xy[:, 0], kind="stable")
    for position, joint in enumerate(order):
        for other in order[position + 1 :]:
            if xy[other, 0] - xy[joint, 0] >= TOLERANCES.same_point:
                break
            distance = math.dist(xy[joint], xy[other])
            if distance < TOLERANCES.same_point:
                pair = _quoted(sorted((names[joint], names[other])))
                raise GeometryError(f"joints {pair} are {distance:.3g} mm apart", "make them one joint", _JOINTS)


def _ends(given: GivenInput, names: list[str]) -> IntArray:
    if not given.bars:
        raise InputError("no bar is given", 'state each bar as ["A", "B", "top chord"]', _BARS)
    index = {name: position for position, name in enumerate(names)}
    for start, end, role in given.bars:
        for joint in (start, end):
            if joint not in index:
                raise UnknownNameError.among(joint, names, what="joint", key=_BARS)
        if role not in ROLES:
            raise UnknownNameError.among(role, list(ROLES), what="role", key=_BARS)
    return np.array([(index[start], index[end]) for start, end, _ in given.bars], dtype=np.intp)


def _refuse_bars(given: GivenInput, names: list[str], xy: FloatArray, ends: IntArray) -> None:
    loops = [start for start, end, _ in given.bars if start == end]
    if loops:
        raise GeometryError(f"a bar runs from joint {_quoted(loops[:1])} to itself", "a bar joins two joints", _BARS)
    repeated = _repeated(" to ".join(sorted((start, end))) for start, end, _ in given.bars)
    if repeated:
        raise GeometryError(f"bar {_quoted(repeated)} is given more than once", "give every bar once", _BARS)
    unused = [name for joint, name in enumerate(names) if joint not in ends]
    if unused:
        raise GeometryError(f"no bar reaches joint {_quoted(unused)}", "join it to the truss or take it out", _JOINTS)
    for first, last in ends:
        passed = _passed(xy, first, last)
        if passed.size:
            bar, joint = f'"{names[first]} to {names[last]}"', names[passed[0]]
            raise GeometryError(
                f'bar {bar} passes through joint "{joint}" without ending there',
                f'give two bars, "{names[first]} to {joint}" and "{joint} to {names[last]}"',
                _BARS,
            )


def _refuse_bar_names(given: GivenInput) -> None:
    if len(given.bar_names) != len(given.bars):
        found = f"there are {len(given.bars)} bars and {len(given.bar_names)} names for them"
        raise InputError(found, "name every bar, or none", _BARS)
    repeated = _repeated(given.bar_names)
    if repeated:
        raise InputError(f"the bar name {_quoted(repeated)} is given more than once", "name every bar apart", _BARS)


def _passed(xy: FloatArray, first: int, last: int) -> IntArray:
    """Return the joints that lie on the bar between its ends."""
    step = xy[last] - xy[first]
    length = float(np.hypot(*step))
    away = xy - xy[first]
    along = away @ step / length
    aside = np.abs(away[:, 0] * step[1] - away[:, 1] * step[0]) / length
    near = TOLERANCES.same_point
    return np.flatnonzero((aside < near) & (along > near) & (along < length - near))


def _refuse_supports(given: GivenInput, names: list[str]) -> None:
    for joint, kind in given.supports:
        if joint not in names:
            raise UnknownNameError.among(joint, names, what="joint", key=_SUPPORTS)
        if kind not in ("pinned", "sliding"):
            raise InputError(f'joint "{joint}" is supported "{kind}"', 'state "pinned" or "sliding"', _SUPPORTS)
    repeated = _repeated(joint for joint, _ in given.supports)
    if repeated:
        raise InputError(f"joint {_quoted(repeated)} is supported more than once", "state one support", _SUPPORTS)
    if given.supports and not any(kind == "pinned" for _, kind in given.supports):
        listed = _quoted([joint for joint, _ in given.supports])
        raise GeometryError(f"every support ({listed}) slides, so the truss can too", "make one pinned", _SUPPORTS)


def _refuse_bearings(truss: Truss) -> None:
    """Refuse a truss that does not stand on at least two bearings apart in plan."""
    bearings = [truss.joint_names[joint] for joint in truss.bearing_joints]
    if len(bearings) < 2:
        chord_ends = {chord.joints[end] for chord in (truss.top, truss.bottom) for end in (0, -1)}
        candidates = _quoted([truss.joint_names[joint] for joint in sorted(chord_ends)])
        raise GeometryError(
            f"the only support is at {_quoted(bearings)}" if bearings else "no support is given",
            f"state at least two joints, one pinned; the chords end at {candidates}",
            _SUPPORTS,
        )
    if truss.span < TOLERANCES.same_point:
        raise GeometryError(
            f"the supports {_quoted(bearings)} stand one above the other, so there is no span",
            "a truss stands on bearings apart in plan; a cantilever from a wall is not covered",
            _SUPPORTS,
        )
    refuse_outside(truss.span, "span", key=_JOINTS, what="the distance between the outermost supports")


def _refuse_swapped_chords(truss: Truss) -> None:
    """Refuse chords of which the top one lies below, judged in the middle of the run they share."""
    top, bottom = (truss.xy[list(chord.joints)] for chord in (truss.top, truss.bottom))
    middle = (max(top[0, 0], bottom[0, 0]) + min(top[-1, 0], bottom[-1, 0])) / 2
    depth = np.interp(middle, top[:, 0], top[:, 1]) - np.interp(middle, bottom[:, 0], bottom[:, 1])
    if depth < TOLERANCES.same_point:
        raise GeometryError(
            f"the top chord lies {-depth:.0f} mm below the bottom chord at x = {middle:.0f} mm",
            "swap their roles, and check that y is up",
            _BARS,
        )


def _named_bars(given: GivenInput, names: list[str], xy: FloatArray, ends: IntArray) -> list[NamedBar]:
    """Return the bars with their names, or numbered: the chords along themselves, webs by their centres."""
    if given.bar_names:
        _refuse_bar_names(given)
        return [NamedBar(name, *bar) for name, bar in zip(given.bar_names, given.bars, strict=True)]
    roles = [role for _, _, role in given.bars]
    top, bottom = trace_chords(names, xy, ends, roles)
    centres = xy[ends].mean(axis=1)

    def from_left(bar: int) -> tuple[int, float]:
        return round(centres[bar, 0] / TOLERANCES.same_point), float(centres[bar, 1])

    webs = sorted((bar for bar, role in enumerate(roles) if role in ("post", "diagonal")), key=from_left)
    numbers = {role: count(1) for role in ROLES}
    named = []
    for bar in (*top.bars, *bottom.bars, *sorted(webs, key=lambda bar: ROLES.index(roles[bar]))):
        start, end, role = given.bars[bar]
        named.append(NamedBar(f"{_PREFIX[role]}{next(numbers[role])}", start, end, role))
    return named


def _repeated(names: Iterable[str]) -> list[str]:
    return [name for name, times in Counter(names).items() if times > 1]


def _quoted(names: list[str]) -> str:
    return ", ".join(f'"{name}"' for name in names)
