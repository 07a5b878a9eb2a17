"""Pratt and Howe trusses: a post at every joint, one diagonal a panel, triangular or with a raised heel.

Topology: practice notes, triangular after the classical tables (4n - 3 bars, 2n joints), raised heel 4n + 1 bars,
2n + 2 joints; both are statically determinate.
"""

from __future__ import annotations

import math

from spanwright.truss.assembly import NamedBar
from spanwright.truss.inputs import Lean


def triangulated(
    span: float, pitch: float, heel_depth: float, panels: int, lean: Lean
) -> tuple[dict[str, tuple[float, float]], list[NamedBar]]:
    """Return joints (mm, left bearing at the origin) and bars of a Pratt or Howe truss.

    span, heel_depth : mm; a heel depth of 0 makes one joint of each heel, `B0` and `Bn`. pitch : rad.
    panels : even number n. lean : "down to centre" (diagonals fall towards mid-span) or "up to centre".
    """
    raised = heel_depth > 0
    first = 0 if raised else 1
    posts = range(first, panels - first + 1)
    joints = {f"B{i}": (span * i / panels, 0.0) for i in range(panels + 1)}
    for i in posts:
        rise = min(i, panels - i) * span / panels * math.tan(pitch)
        joints[f"T{i}"] = (span * i / panels, heel_depth + rise)

    def top(i: int) -> str:
        return f"T{i}" if i in posts else f"B{i}"

    bars = [NamedBar(f"TC{k}", top(k - 1), top(k), "top chord") for k in range(1, panels + 1)]
    bars += [NamedBar(f"BC{k}", f"B{k - 1}", f"B{k}", "bottom chord") for k in range(1, panels + 1)]
    bars += [NamedBar(f"P{i}", f"B{i}", f"T{i}", "post") for i in posts]
    for k in range(first + 1, panels - first + 1):
        outer, inner = (k - 1, k) if k <= panels // 2 else (k, k - 1)
        upper, lower = (outer, inner) if lean == "down to centre" else (inner, outer)
        bars.append(NamedBar(f"D{k}", f"T{upper}", f"B{lower}", "diagonal"))
    return joints, bars
