"""Small hand-made trusses for the tests of restraint, and the restraint that most of them start from."""

import math
from itertools import pairwise

from spanwright.truss.assembly import NamedBar, assemble
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.model import Role, Truss


def restraint(**changes: object) -> RestraintInput:
    """Return purlins at joints, all anchored by roof bracing, bearings held; `changes` to that."""
    usual: dict[str, object] = {
        "purlins": "at joints",
        "anchored": "all",
        "anchored_by": "roof bracing",
        "bearings_held": True,
    }
    return RestraintInput(**(usual | changes))  # type: ignore[arg-type]  # keywords, some wrong on purpose


def triangular() -> Truss:
    """Return a Howe of 16 m in 8 panels of 2 m, pitch 3 in 4: rafter panels of 2.5 m, 10 m a slope."""
    return build_form(FormInput("Howe", 16000.0, math.atan(0.75), 0.0, 8))


def raised(overhang: float = 0.0) -> Truss:
    """Return a Pratt of 16 m in 8 panels of 2 m on a heel of 1 m, pitch 3 in 4: 2.5 m rafter panels, 10 m a slope."""
    return build_form(FormInput("Pratt", 16000.0, math.atan(0.75), 1000.0, 8, overhang))


def shallow() -> Truss:
    """Return a Pratt of 16 m in 8 panels of 2 m on a heel of 1 m, pitch 1 in 8: 1.25 m deep at B1, 2 m at B4."""
    return build_form(FormInput("Pratt", 16000.0, math.atan(0.125), 1000.0, 8))


def fink() -> Truss:
    """Return a compound Fink of 12 m at 30 degrees: inner bottom joints at 2, 4, 8 and 10 m, inner joints M1 and M2."""
    return build_form(FormInput("Fink", 12000.0, math.pi / 6, 0.0, 8))


def hand_made(joints: str, bars: str, supports: str, overhang: float = 0.0) -> Truss:
    """Return a truss.

    joints : "A 0 0, B 3 4" in m. bars : "top A B C, bottom A C, web B D", each a run of bars from joint to joint.
    supports : "A C", the first pinned.
    """
    points = {}
    for text in joints.split(","):
        name, x, y = text.split()
        points[name] = (1000.0 * float(x), 1000.0 * float(y))
    roles: dict[str, Role] = {"top": "top chord", "bottom": "bottom chord", "web": "diagonal"}
    named = []
    for text in bars.split(","):
        role, *along = text.split()
        named += [NamedBar(f"{a}-{b}", a, b, roles[role]) for a, b in pairwise(along)]
    pinned, *sliding = supports.split()
    return assemble(points, named, {pinned: True} | dict.fromkeys(sliding, False), overhang=overhang)


def scissor() -> Truss:
    """Return a scissor truss: both chords spring from the heels A and E and kink at mid-span, T2 and B2."""
    return hand_made(
        "A 0 0, T1 4 3, T2 8 6, T3 12 3, E 16 0, B1 4 1, B2 8 2, B3 12 1",
        "top A T1 T2 T3 E, bottom A B1 B2 B3 E, web B1 T1, web B2 T2, web B3 T3, web B2 T1, web B2 T3",
        "A E",
    )


def mono_pitch(overhang: float = 0.0) -> Truss:
    """Return a mono-pitch truss that rises 3 in 4 from the heel A to T3, 12 m away: 5 m rafter panels."""
    return hand_made(
        "A 0 0, T1 4 3, T2 8 6, T3 12 9, B1 4 0, B2 8 0, B3 12 0",
        "top A T1 T2 T3, bottom A B1 B2 B3, web B1 T1, web B2 T2, web B3 T3, web B2 T1, web B3 T2",
        "A B3",
        overhang,
    )


def parallel() -> Truss:
    """Return a flat truss that bears on its top chord, T0 to T4; the bottom chord ends at B1 and B3, in the air."""
    return hand_made(
        "T0 0 2, T1 3 2, T2 6 2, T3 9 2, T4 12 2, B1 3 0, B2 6 0, B3 9 0",
        "top T0 T1 T2 T3 T4, bottom B1 B2 B3, web B1 T1, web B2 T2, web B3 T3, web T0 B1 T2 B3 T4",
        "T0 T4",
    )
