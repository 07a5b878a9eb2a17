"""Wind from the other side: the mirror image of a wind case and of the joints it acts on."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from spanwright.loads.inputs import JointLoad, WindInput
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

SUFFIX = " mirrored"
"""Added to the name of a wind case for its mirror image."""


def mirrored(wind: WindInput) -> WindInput:
    """Return the same wind from the other side: the slopes swap, sideways forces swap and turn round."""
    return replace(
        wind,
        name=wind.name + SUFFIX,
        left=wind.right,
        right=wind.left,
        eaves_left=0.0 - wind.eaves_right,
        eaves_right=0.0 - wind.eaves_left,
    )


def mirrored_load(truss: Truss, load: JointLoad) -> JointLoad | None:
    """Return a joint's wind load from the other side, at the mirror image of its joint; None where there is none."""
    partner = _partner(truss, truss.joint(load.joint, key="loads.at_joint"))
    if partner is None:
        return None
    return replace(load, case=load.case + SUFFIX, joint=truss.joint_names[partner], right=0.0 - load.right)


def is_symmetric(truss: Truss) -> bool:
    """Return whether every joint has a mirror image about mid-span, and the overhangs are equal."""
    left, right = truss.top.overhang
    alike = abs(left - right) <= TOLERANCES.same_point
    return alike and all(_partner(truss, joint) is not None for joint in range(len(truss.joint_names)))


def _partner(truss: Truss, joint: int) -> int | None:
    bearings = truss.xy[[truss.bearing_joints[0], truss.bearing_joints[-1]], 0]
    x, y = truss.xy[joint]
    away = np.hypot(truss.xy[:, 0] - (bearings.sum() - x), truss.xy[:, 1] - y)
    nearest = int(np.argmin(away))
    return nearest if away[nearest] <= TOLERANCES.same_point else None
