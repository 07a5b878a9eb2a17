"""The chords: followed from bar to bar through every kink, and the slopes of the top one."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

import networkx as nx
import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.errors import GeometryError
from spanwright.truss.model import Chord, ChordName, Role, Truss
from spanwright.truss.tolerances import TOLERANCES

SlopeSide = Literal["left", "right"]


@dataclass(frozen=True, eq=False)
class Slopes:
    """The top chord (m joints, m - 1 bars) by slope.

    side : for each top-chord bar "left" where the chord rises to the right, "right" where it falls; a level bar
        belongs to the side of mid-span its centre lies on (at mid-span itself: left).
    directions : (m - 1, 2) unit vectors along the chord, left to right.
    apex_joint : index of the joint at the apex; of a level run at the top the joint nearest mid-span.
    apex_along : mm, developed length of the apex from the first joint of the chord.
    """

    side: tuple[SlopeSide, ...]
    directions: FloatArray
    apex_joint: int
    apex_along: float


def trace_chords(
    joint_names: Sequence[str], xy: FloatArray, ends: IntArray, roles: Sequence[Role], overhang: float = 0.0
) -> tuple[Chord, Chord]:
    """Follow the top and the bottom chord from left to right, by continuity.

    joint_names : (j,). xy : (j, 2) mm. ends : (b, 2) joint indices. roles : (b,).
    overhang : mm in plan, of the top chord beyond each of its ends.

    Raises GeometryError (key "truss.bars") where a chord is missing, broken, branches or closes on itself, and
    (key "truss.overhang") where an end with an overhang is vertical.
    """
    top = _trace("top", joint_names, xy, ends, roles)
    bottom = _trace("bottom", joint_names, xy, ends, roles)
    along_slope = (
        _overhang_along(top, 0, xy, joint_names, overhang),
        _overhang_along(top, -1, xy, joint_names, overhang),
    )
    return Chord("top", top.joints, top.bars, top.along, along_slope), bottom


def slopes(truss: Truss) -> Slopes:
    """Return the side of each top-chord bar, its direction, and where the apex is."""
    joints = list(truss.top.joints)
    xy = truss.xy[joints]
    steps = np.diff(xy, axis=0)
    directions: FloatArray = steps / np.hypot(steps[:, 0], steps[:, 1])[:, None]
    level = np.abs(directions[:, 1]) <= TOLERANCES.straight
    mid_span = float(np.mean([truss.xy[truss.bearing_joints[0], 0], truss.xy[truss.bearing_joints[-1], 0]]))
    centres = (xy[:-1, 0] + xy[1:, 0]) / 2
    on_left = np.where(level, centres <= mid_span + TOLERANCES.same_point, directions[:, 1] > 0)
    apex = _apex(xy, level, mid_span)
    sides: tuple[SlopeSide, ...] = tuple("left" if left else "right" for left in on_left)
    return Slopes(sides, directions, joints[apex], float(truss.top.along[apex]))


def _apex(xy: FloatArray, level: BoolArray, mid_span: float) -> int:
    """Return the chord position of the highest joint, or within a level run there of the one nearest mid-span."""
    highest = int(np.flatnonzero(xy[:, 1] >= xy[:, 1].max() - TOLERANCES.same_point)[0])
    first = last = highest
    while first > 0 and level[first - 1]:
        first -= 1
    while last < len(level) and level[last]:
        last += 1
    away = np.abs(xy[first : last + 1, 0] - mid_span)
    return first + int(np.flatnonzero(away <= away.min() + TOLERANCES.same_point)[0])


def _trace(name: ChordName, joint_names: Sequence[str], xy: FloatArray, ends: IntArray, roles: Sequence[Role]) -> Chord:
    role = f"{name} chord"
    graph: nx.Graph[int] = nx.Graph()
    for bar in range(len(roles)):
        if roles[bar] == role:
            graph.add_edge(int(ends[bar, 0]), int(ends[bar, 1]), bar=bar)
    _refuse_unless_path(graph, role, joint_names)
    loose = [joint for joint, degree in graph.degree if degree == 1]
    start, end = sorted(loose, key=lambda joint: (xy[joint, 0], xy[joint, 1]))
    joints = tuple(nx.shortest_path(graph, start, end))
    bars = tuple(graph.edges[pair]["bar"] for pair in pairwise(joints))
    steps = np.diff(xy[list(joints)], axis=0)
    along: FloatArray = np.concatenate([[0.0], np.cumsum(np.hypot(steps[:, 0], steps[:, 1]))])
    return Chord(name, joints, bars, along)


def _refuse_unless_path(graph: nx.Graph[int], role: str, joint_names: Sequence[str]) -> None:
    def named(joints: Sequence[int]) -> str:
        return ", ".join(joint_names[joint] for joint in sorted(joints))

    if not graph:
        raise GeometryError(f"no bar is a {role}", f'give every bar of the {role} the role "{role}"', "truss.bars")
    branching = [joint for joint, degree in graph.degree if degree > 2]
    if branching:
        raise GeometryError(
            f"the {role} branches at {named(branching)}: more than two of its bars meet there",
            "a chord is one line of bars; give the others the role of a post or a diagonal",
            "truss.bars",
        )
    parts = sorted(nx.connected_components(graph), key=min)
    if len(parts) > 1:
        listed = " / ".join(named(list(part)) for part in parts)
        raise GeometryError(
            f"the {role} is broken: its bars do not meet between {listed}",
            f"close the gap with a bar of the {role}, or give the loose bars another role",
            "truss.bars",
        )
    if graph.number_of_edges() == graph.number_of_nodes():
        raise GeometryError(
            f"the {role} closes on itself through {named(list(graph))}",
            "a chord has a left and a right end; check the roles",
            "truss.bars",
        )


def _overhang_along(chord: Chord, end: Literal[0, -1], xy: FloatArray, names: Sequence[str], overhang: float) -> float:
    """Return the overhang along the slope of the chord's end bar, mm."""
    if overhang == 0.0:
        return 0.0
    joint, inner = chord.joints[end], chord.joints[1 if end == 0 else -2]
    step = xy[joint] - xy[inner]
    cosine = abs(float(step[0])) / float(np.hypot(step[0], step[1]))
    if cosine <= TOLERANCES.straight:
        raise GeometryError(
            f"the top chord ends vertically at {names[joint]}, so an overhang of {overhang:g} mm in plan has no slope",
            'state overhang = "0 m", or end the top chord with a sloping bar',
            "truss.overhang",
        )
    return overhang / cosine
