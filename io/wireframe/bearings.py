"""Where the truss bears, how wide and deep it is, and what its top chord has beyond the bearings."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from spanwright.io.wireframe.envelope import Path, straight_through
from spanwright.io.wireframe.network import Remark
from spanwright.io.wireframe.options import BearingChord
from spanwright.io.wireframe.outline import outermost
from spanwright.io.wireframe.pieces import Trunk
from spanwright.io.wireframe.roles import Recognised
from spanwright.truss.errors import DrawingError
from spanwright.truss.tolerances import TOLERANCES


def find_bearings(
    truss: Recognised, marked: Sequence[int], asked: BearingChord, tolerance: float
) -> tuple[tuple[int, ...], tuple[Remark, ...]]:
    """Return the bearing joints, left to right.

    marked : joints that the drawing marks. asked : the chord whose ends bear, or "". tolerance : mm.

    Raises DrawingError where the marks are too few, where the lowest of the outermost joints are not the ends of the
    bottom chord and nothing says which bear, and where the truss stands on end.
    """
    network = truss.network
    if marked:
        bearings, how = sorted(set(marked), key=lambda joint: float(network.xy[joint, 0])), "as marked"
        if len(bearings) < 2:
            raise DrawingError("supports are marked at one joint only", "mark both bearings", "marks.supports")
    elif asked:
        path = truss.top if asked == "top chord" else truss.bottom
        bearings, how = [path[0], path[-1]], f"at the ends of the {asked}, as asked"
    else:
        bearings, how = _outermost(truss, tolerance), "at the lowest of the outermost joints"
    width, height = np.ptp(network.xy, axis=0)
    if height > width:
        raise DrawingError(
            f"the truss is {height:.0f} mm high and only {width:.0f} mm wide",
            'say which axis of the drawing is up, such as up = "x"',
            "up",
        )
    at = network.xy[bearings[0]]
    return tuple(bearings), (Remark("W-407", f"the truss bears {how}", "", -1, tuple(at.tolist())),)


def _outermost(truss: Recognised, tolerance: float) -> list[int]:
    outer = list(outermost(truss.network, tolerance))
    ends = [truss.bottom[0], truss.bottom[-1]]
    if outer != ends:
        listed = [f"({x:.0f}, {y:.0f})" for x, y in truss.network.xy[[*outer, *ends]].tolist()]
        raise DrawingError(
            "the bearings can be read in two ways: at the outermost joints "
            f"{listed[0]} and {listed[1]} mm, or at the ends of the bottom chord {listed[2]} and {listed[3]} mm",
            "mark the bearings by points on a layer of their own, or name the chord that bears",
            "bearings",
        )
    return outer


def find_overhang(
    trunk: Trunk, truss: Recognised, stated: float | None, tolerance: float
) -> tuple[float, tuple[Remark, ...]]:
    """Return the overhang of the top chord, mm in plan, and what to say of every bar that ends in the air.

    stated : the user's overhang, which goes before what is drawn; None: as drawn. tolerance : mm.
    """
    left = right = 0.0
    remarks: list[Remark] = []
    for (inner, tip), source in zip(trunk.hanging.tolist(), trunk.sources.tolist(), strict=True):
        at = trunk.whole.place(tip)
        plan = abs(at[0] - float(trunk.whole.xy[inner, 0]))
        on_left, on_right = (_runs_on(trunk, truss.top[::turn], inner, tip, tolerance) for turn in (1, -1))
        if on_left or on_right:
            left, right = (plan, right) if on_left else (left, plan)
            text = f"the top chord runs on for {plan:.0f} mm in plan beyond its end joint"
            done = "taken as overhang" if stated is None else "the user states the overhang"
            remarks.append(Remark("W-404", text, f"{done}; its tip is no joint", source, at))
        else:
            remarks.append(Remark("W-314", "a bar ends in the air", "left out", source, at))
    if stated is not None:
        if left + right and max(abs(left - stated), abs(right - stated)) > TOLERANCES.on_joint:
            text = f"the drawn overhangs are {left:.0f} and {right:.0f} mm, the user's is {stated:.0f} mm"
            remarks.append(Remark("W-410", text, "the user's was taken"))
        return stated, tuple(remarks)
    if abs(left - right) > TOLERANCES.on_joint:
        text = f"the top chord overhangs by {left:.0f} mm on the left and {right:.0f} mm on the right"
        remarks.append(Remark("W-405", text, f"{max(left, right):.0f} mm was taken on both sides"))
    return max(left, right), tuple(remarks)


def _runs_on(trunk: Trunk, chord: Path, inner: int, tip: int, tolerance: float) -> bool:
    """Return whether a hanging bar runs straight on beyond the first joint of a chord."""
    if trunk.joints[chord[0]] != inner:
        return False
    xy = trunk.network.xy
    return straight_through(xy[chord[1]], xy[chord[0]], trunk.whole.xy[tip], tolerance)


def judge_stiffness(joints: int, bars: int) -> tuple[Remark, ...]:
    """Return a remark where the number of bars is not the one that makes a plane truss just stiff, b = 2 j - 3."""
    enough = 2 * joints - 3
    text = f"{bars} bars for {joints} joints; a truss on two bearings is just stiff with {enough}"
    if bars < enough:
        return (Remark("W-401", text, "taken as drawn; add the missing bars, or joints that were missed"),)
    if bars > enough:
        return (Remark("W-402", text, "taken as drawn"),)
    return ()
