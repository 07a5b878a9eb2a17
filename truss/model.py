"""The truss as arrays over joints (j) and bars (b): what stands there, frozen.

x runs to the right along the span, y up; mm. Roles and names are the trade's.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cached_property
from typing import Literal

import numpy as np

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.errors import UnknownNameError

Role = Literal["top chord", "bottom chord", "post", "diagonal"]
ROLES: tuple[Role, ...] = ("top chord", "bottom chord", "post", "diagonal")
ChordName = Literal["top", "bottom"]


@dataclass(frozen=True)
class Support:
    """What a bearing holds: `joint` (index), sideways in the plane (`x`) and upward (`y`)."""

    joint: int
    x: bool
    y: bool


@dataclass(frozen=True)
class Chord:
    """A chord followed from left to right through every kink.

    joints : (m,) joint indices, left to right; for a top chord that springs from the heels both ends are bearings.
    bars : (m - 1,) bar indices between them.
    along : (m,) mm, developed length from the first joint.
    overhang : (left, right) mm along the slope beyond the end joints; the tip is no joint.
    """

    name: ChordName
    joints: tuple[int, ...]
    bars: tuple[int, ...]
    along: FloatArray
    overhang: tuple[float, float] = (0.0, 0.0)

    @property
    def length(self) -> float:
        """Developed length between the end joints, mm."""
        return float(self.along[-1])


@dataclass(frozen=True)
class Truss:
    """A plane truss.

    joint_names : (j,) unique names.
    xy : (j, 2) mm.
    bar_names : (b,) unique names.
    ends : (b, 2) joint indices, the left (then the lower) end first.
    roles : (b,) roles.
    supports : the bearings.
    top, bottom : the chords, left to right.
    form : name of the form, or "as given".
    lean : lean of the diagonals in words ("down to centre"), or "".
    warnings : what is outside the usual ranges, in sentences.
    """

    joint_names: tuple[str, ...]
    xy: FloatArray
    bar_names: tuple[str, ...]
    ends: IntArray
    roles: tuple[Role, ...]
    supports: tuple[Support, ...]
    top: Chord
    bottom: Chord
    form: str = "as given"
    lean: str = ""
    warnings: tuple[str, ...] = field(default=())

    @cached_property
    def vectors(self) -> FloatArray:
        """(b, 2) mm, from the first end to the second."""
        spans: FloatArray = self.xy[self.ends[:, 1]] - self.xy[self.ends[:, 0]]
        return spans

    @cached_property
    def lengths(self) -> FloatArray:
        """(b,) mm, joint to joint."""
        lengths: FloatArray = np.hypot(self.vectors[:, 0], self.vectors[:, 1])
        return lengths

    @cached_property
    def directions(self) -> FloatArray:
        """(b, 2) unit vectors from the first end to the second."""
        return self.vectors / self.lengths[:, None]

    @cached_property
    def bearing_joints(self) -> tuple[int, ...]:
        """Joint indices of the bearings, left to right."""
        held = {support.joint for support in self.supports if support.y}
        return tuple(sorted(held, key=lambda joint: float(self.xy[joint, 0])))

    @cached_property
    def span(self) -> float:
        """Distance between the outermost bearings in x, mm."""
        x = self.xy[list(self.bearing_joints), 0]
        return float(x.max() - x.min())

    def joint(self, name: str, *, key: str = "") -> int:
        """Return the index of a joint by name; UnknownNameError (with `key`) if there is none."""
        if name not in self.joint_names:
            raise UnknownNameError.among(name, list(self.joint_names), what="joint", key=key)
        return self.joint_names.index(name)

    def bar(self, name: str, *, key: str = "") -> int:
        """Return the index of a bar by name; UnknownNameError (with `key`) if there is none."""
        if name not in self.bar_names:
            raise UnknownNameError.among(name, list(self.bar_names), what="bar", key=key)
        return self.bar_names.index(name)

    def bars_with_role(self, role: Role) -> IntArray:
        """Return the indices of the bars that have this role."""
        return np.flatnonzero([given == role for given in self.roles])

    def chord(self, name: ChordName) -> Chord:
        """Return the top or the bottom chord."""
        return self.top if name == "top" else self.bottom
