"""Where knee braces and bottom ties hold the bottom chord.

A knee brace runs from a joint of the bottom chord up to a purlin; a bottom tie is a line of members at the bottom chord
from truss to truss that ends at a braced bay.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

import numpy as np

from spanwright.truss.chords import slopes
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine
from spanwright.truss.tolerances import TOLERANCES

BRACES_KEY = "restraint.knee_braces"
TIES_KEY = "restraint.bottom_ties"

_EVERY = re.compile(r"every (?:(\d+)(?:st|nd|rd|th) )?(purlin|joint)")


@dataclass(frozen=True)
class KneeBrace:
    """A knee brace.

    joint : index of its joint of the bottom chord; `at` is that joint's name.
    line : number of the purlin line it runs to.
    rise : mm, height of that line above the joint.
    counted : does it hold the joint? `why_not` says why it does not.
    """

    joint: int
    at: str
    line: int
    rise: float
    why_not: str = ""

    @property
    def counted(self) -> bool:
        """Whether the brace holds its joint."""
        return not self.why_not

    @property
    def name(self) -> str:
        """The brace's name in print."""
        return f"knee brace {self.at}"


@dataclass(frozen=True)
class BottomTie:
    """A bottom tie at a joint of the bottom chord (index; `at` is its name); `why_not` as for a knee brace."""

    joint: int
    at: str
    why_not: str = ""

    @property
    def counted(self) -> bool:
        """Whether the tie holds its joint."""
        return not self.why_not

    @property
    def name(self) -> str:
        """The tie's name in print."""
        return f"tie at {self.at}"


def place_knee_braces(truss: Truss, restraint: RestraintInput, lines: tuple[PurlinLine, ...]) -> tuple[KneeBrace, ...]:
    """Return the knee braces, left to right.

    One to a line that is not anchored, or that rises more than `TOLERANCES.longest_knee`, is there but does not count.

    Listed joints: each takes the nearest anchored line within `TOLERANCES.knee_reach` in plan, else the nearest loose
    one. "every nth purlin": the ridge line or pair is number 0 and braced, then the nth, 2nth... on each side, down to
    the nearest joint of the bottom chord within that reach; bearings, joints of the top chord and lines with no joint
    below are left out.

    Raises InputError for a joint that is not on the bottom chord or has no purlin line within reach, for words that
    are not known, and for anything but a list where the form is a Fink.
    """
    if restraint.knee_braces == "none":
        return ()
    if isinstance(restraint.knee_braces, tuple):
        joints = _listed(truss, restraint.knee_braces, BRACES_KEY)
        found = [_brace(truss, joint, lines) for joint in joints]
    else:
        step = _step(truss, restraint.knee_braces, "purlin", BRACES_KEY)
        braced = _every(truss, restraint, lines, step)
        below = {joint for line in braced if (joint := _joint_below(truss, line)) is not None}
        found = [_brace(truss, joint, braced) for joint in below]
    return tuple(sorted(found, key=lambda brace: truss.bottom.joints.index(brace.joint)))


def place_bottom_ties(truss: Truss, restraint: RestraintInput) -> tuple[BottomTie, ...]:
    """Return the bottom ties, left to right; where nothing anchors the lines there is no braced bay, and none counts.

    "every nth joint": from the joint at mid-span, which is tied, to both ends; bearings are left out.

    Raises InputError as `place_knee_braces` does, and where no joint of the bottom chord stands at mid-span.
    """
    if restraint.bottom_ties == "none":
        return ()
    if isinstance(restraint.bottom_ties, tuple):
        joints = _listed(truss, restraint.bottom_ties, TIES_KEY)
    else:
        step = _step(truss, restraint.bottom_ties, "joint", TIES_KEY)
        middle = _middle(truss)
        counted = [joint for k, joint in enumerate(truss.bottom.joints) if (k - middle) % step == 0]
        joints = tuple(joint for joint in counted if joint not in truss.bearing_joints)
    why_not = "nothing anchors the lines" if restraint.anchored_by == "nothing" else ""
    ordered = sorted(joints, key=truss.bottom.joints.index)
    return tuple(BottomTie(joint, truss.joint_names[joint], why_not) for joint in ordered)


def _listed(truss: Truss, names: tuple[str, ...], key: str) -> tuple[int, ...]:
    joints = tuple(dict.fromkeys(truss.joint(name, key=key) for name in names))
    for joint in joints:
        if joint not in truss.bottom.joints:
            name, known = truss.joint_names[joint], ", ".join(truss.joint_names[k] for k in truss.bottom.joints)
            raise InputError(f"{name} is not on the bottom chord", f"list joints of the bottom chord: {known}", key)
    return joints


def _step(truss: Truss, words: str, unit: str, key: str) -> int:
    match = _EVERY.fullmatch(words)
    step = int(match[1] or 1) if match and match[2] == unit else 0
    if step == 0:
        raise InputError(f'"{words}" is not known', f'state "none", "every 2nd {unit}" or a list of bottom joints', key)
    if "Fink" in truss.form:
        bottom = ", ".join(truss.joint_names[joint] for joint in truss.bottom.joints)
        raise InputError(
            f'"{words}" is stated, but the bottom joints of a Fink do not stand below its purlins in order',
            f"list the bottom joints, of {bottom}",
            key,
        )
    return step


def _every(truss: Truss, restraint: RestraintInput, lines: tuple[PurlinLine, ...], step: int) -> tuple[PurlinLine, ...]:
    apex = slopes(truss).apex_along
    left = [line for line in reversed(lines) if line.along < apex]
    right = [line for line in lines if line.along > apex]
    at_apex = [line for line in lines if line.along == apex]
    first = 0 if restraint.ridge_pair else step - 1
    return (*left[first::step], *at_apex, *right[first::step])


def _joint_below(truss: Truss, line: PurlinLine) -> int | None:
    left_out = {*truss.bearing_joints, *truss.top.joints}
    within = [joint for joint in truss.bottom.joints if joint not in left_out and _reaches(truss, joint, line)]
    return min(within, key=lambda joint: abs(truss.xy[joint, 0] - line.x), default=None)


def _reaches(truss: Truss, joint: int, line: PurlinLine) -> bool:
    return bool(abs(truss.xy[joint, 0] - line.x) <= TOLERANCES.knee_reach + TOLERANCES.same_point)


def _brace(truss: Truss, joint: int, lines: tuple[PurlinLine, ...]) -> KneeBrace:
    x, y = truss.xy[joint]
    name = truss.joint_names[joint]
    if joint in truss.top.joints:
        raise InputError(f"{name} is on the top chord too", "a purlin there holds it: leave the brace out", BRACES_KEY)
    nearest = min(lines, key=lambda line: abs(line.x - x))
    within = [line for line in lines if _reaches(truss, joint, line)]
    if not within:
        raise InputError(
            f"no purlin stands within {TOLERANCES.knee_reach / 1000:g} m in plan of {name}: "
            f"the nearest, {nearest.name}, is {abs(nearest.x - x) / 1000:.3f} m away",
            "brace a joint that has a purlin above it, or let a purlin stand there",
            BRACES_KEY,
        )
    line = min(within, key=lambda line: (not line.anchored, abs(line.x - x)))
    return KneeBrace(joint, name, line.number, float(line.y - y), _why_not(line, float(line.y - y)))


def _why_not(line: PurlinLine, rise: float) -> str:
    if not line.anchored:
        return f"{line.name} is not anchored"
    if rise > TOLERANCES.longest_knee + TOLERANCES.same_point:
        return f"{line.name} is {rise / 1000:.2f} m above it, more than {TOLERANCES.longest_knee / 1000:g} m"
    return ""


def _middle(truss: Truss) -> int:
    x = truss.xy[list(truss.bottom.joints), 0]
    mid_span = float(np.mean(truss.xy[[truss.bearing_joints[0], truss.bearing_joints[-1]], 0]))
    nearest = int(np.argmin(np.abs(x - mid_span)))
    if abs(x[nearest] - mid_span) > TOLERANCES.on_joint:
        raise InputError(
            "no joint of the bottom chord stands at mid-span, where the counting of ties begins",
            f"list the joints to tie, of {', '.join(truss.joint_names[joint] for joint in truss.bottom.joints)}",
            TIES_KEY,
        )
    return nearest
