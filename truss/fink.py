"""Fink trusses: struts square to the rafter on a bottom chord with an open middle panel.

Topology: practice notes, simple Fink (4 rafter panels), fan (6) and compound Fink (8). The first inner bottom joint
from mid-span lies at span / (4 cos^2 pitch), where the strut from the middle of the rafter meets the bottom chord.
"""

from __future__ import annotations

import math

from spanwright.truss.assembly import NamedBar
from spanwright.truss.model import Role

FINK_NAMES = {4: "Fink", 6: "Fink fan", 8: "compound Fink"}
"""Number of rafter panels, both slopes together, to the form's name."""

_LAST_BOTTOM = {4: 3, 6: 3, 8: 5}

_LEFT_WEBS: dict[int, tuple[tuple[str, str, Role], ...]] = {
    4: (("B1", "T1", "post"), ("B1", "T2", "diagonal")),
    6: (("B1", "T1", "post"), ("B1", "T2", "post"), ("B1", "T3", "diagonal")),
    8: (
        ("B1", "T1", "post"),
        ("B1", "T2", "diagonal"),
        ("B2", "T2", "post"),
        ("M1", "T2", "diagonal"),
        ("B2", "M1", "diagonal"),
        ("M1", "T3", "post"),
        ("M1", "T4", "diagonal"),
    ),
}
"""Webs of the left half, from left to right."""


def fink(span: float, pitch: float, panels: int) -> tuple[dict[str, tuple[float, float]], list[NamedBar]]:
    """Return joints (mm, left bearing at the origin) and bars of a Fink truss.

    span : mm. pitch : rad, below 45 degrees. panels : 4, 6 or 8 rafter panels, both slopes together.
    Struts are posts with the number of their top joint; the other webs are diagonals, numbered left to right.
    """
    joints = _joints(span, pitch, panels)
    last = _LAST_BOTTOM[panels]
    rafter = ["B0", *(f"T{i}" for i in range(1, panels)), f"B{last}"]
    bars = [NamedBar(f"TC{k}", rafter[k - 1], rafter[k], "top chord") for k in range(1, panels + 1)]
    bars += [NamedBar(f"BC{k}", f"B{k - 1}", f"B{k}", "bottom chord") for k in range(1, last + 1)]
    left = _LEFT_WEBS[panels]
    right = tuple((_mirror(a, panels), _mirror(b, panels), role) for a, b, role in reversed(left))
    diagonals = 0
    for lower, upper, role in left + right:
        diagonals += role == "diagonal"
        name = f"P{upper[1:]}" if role == "post" else f"D{diagonals}"
        bars.append(NamedBar(name, lower, upper, role))
    return joints, bars


def _joints(span: float, pitch: float, panels: int) -> dict[str, tuple[float, float]]:
    half, slope = panels // 2, math.tan(pitch)
    inner = span / (4 * math.cos(pitch) ** 2)
    ridge = (span / 2, span / 2 * slope)
    left = {"B0": (0.0, 0.0)}
    if panels == 8:
        left |= {"B1": (inner / 2, 0.0), "B2": (inner, 0.0), "M1": ((inner + ridge[0]) / 2, ridge[1] / 2)}
    else:
        left["B1"] = (inner, 0.0)
    for i in range(1, half):
        left[f"T{i}"] = (ridge[0] * i / half, ridge[1] * i / half)
    right = {_mirror(name, panels): (span - x, y) for name, (x, y) in reversed(left.items())}
    found = left | {f"T{half}": ridge} | right
    return {name: found[name] for name in sorted(found, key=lambda name: (name[0], int(name[1:])))}


def _mirror(joint: str, panels: int) -> str:
    """Return the name of the joint that mirrors this one about mid-span."""
    total = {"T": panels, "B": _LAST_BOTTOM[panels], "M": 3}[joint[0]]
    return f"{joint[0]}{total - int(joint[1:])}"
