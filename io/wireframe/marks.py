"""Marks: points, circles and blocks on layers that the user named, set against the joints that they stand at."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from spanwright.io.wireframe.network import Remark
from spanwright.io.wireframe.options import MarkKind
from spanwright.truss.arrays import FloatArray
from spanwright.truss.tolerances import TOLERANCES


class FlatMark(NamedTuple):
    """A mark in the plane: its kind, its place (2,) in mm, and the index of its origin."""

    kind: MarkKind
    at: FloatArray
    source: int


@dataclass(frozen=True, eq=False)
class JointMarks:
    """Joints that marks of one kind stand at, from the left, and a remark for each mark that stands at none."""

    joints: tuple[int, ...]
    remarks: tuple[Remark, ...]


def joints_marked(marks: Sequence[FlatMark], kind: MarkKind, xy: FloatArray, among: Sequence[int]) -> JointMarks:
    """Return the joints nearest to the marks of one kind.

    xy : (j, 2) mm. among : the joints that can be meant.
    """
    found: set[int] = set()
    remarks = []
    for mark in marks:
        if mark.kind == kind:
            distances = np.hypot(*(xy[list(among)] - mark.at).T)
            nearest = int(np.argmin(distances))
            if distances[nearest] <= TOLERANCES.mark_reach:
                found.add(among[nearest])
            else:
                remarks.append(stray(mark, float(distances[nearest]), "the nearest joint that can be meant"))
    return JointMarks(tuple(sorted(found, key=lambda joint: float(xy[joint, 0]))), tuple(remarks))


def stray(mark: FlatMark, distance: float, what: str) -> Remark:
    """Return the remark on a mark that is too far (mm) from what it could belong to."""
    x, y = mark.at.tolist()
    return Remark("W-406", f"a mark of {mark.kind} is {distance:.0f} mm from {what}", "left out", mark.source, (x, y))
