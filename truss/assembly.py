"""From named joints and bars to the arrays of a truss."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import NamedTuple

import numpy as np

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.chords import trace_chords
from spanwright.truss.model import Role, Support, Truss
from spanwright.truss.tolerances import TOLERANCES

Joints = Mapping[str, tuple[float, float]]


class NamedBar(NamedTuple):
    """A bar by the names of its end joints."""

    name: str
    start: str
    end: str
    role: Role


def assemble(
    joints: Joints,
    bars: Sequence[NamedBar],
    supports: Mapping[str, bool],
    *,
    overhang: float = 0.0,
    form: str = "as given",
    lean: str = "",
) -> Truss:
    """Make the truss.

    joints : name to (x, y) in mm; the names that bars and supports use must be among them.
    supports : joint name to whether the bearing also holds sideways; every one holds upward and downward.
    overhang : mm in plan, of the top chord beyond each end.

    Raises GeometryError where a chord is missing, broken, branches or closes on itself.
    """
    names = tuple(joints)
    index = {name: position for position, name in enumerate(names)}
    xy = np.array([joints[name] for name in names], dtype=float)
    ends = left_end_first(xy, np.array([(index[bar.start], index[bar.end]) for bar in bars], dtype=np.intp))
    roles = tuple(bar.role for bar in bars)
    top, bottom = trace_chords(names, xy, ends, roles, overhang)
    bearings = tuple(Support(index[joint], sideways, True) for joint, sideways in supports.items())
    return Truss(names, xy, tuple(bar.name for bar in bars), ends, roles, bearings, top, bottom, form=form, lean=lean)


def left_end_first(xy: FloatArray, ends: IntArray) -> IntArray:
    """Return the ends (b, 2) turned so that the left joint comes first, of an upright bar the lower one."""
    steps = xy[ends[:, 1]] - xy[ends[:, 0]]
    upright = np.abs(steps[:, 0]) <= TOLERANCES.same_point
    turned = np.where(upright, steps[:, 1] < 0, steps[:, 0] < 0)
    return np.where(turned[:, None], ends[:, ::-1], ends)
