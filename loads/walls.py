"""Wind on the walls below a truss and on the faces of its raised heels, as forces at its joints."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.loads import derivation as say
from spanwright.loads.joint_loads import Derived
from spanwright.loads.roof_shape import RoofShape
from spanwright.truss.errors import InputError
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True)
class WallSide:
    """One wall: the bearing joint at its head, the top joint above it (or None), the height of the face between the two
    and of the wall below, mm, and the direction that presses in, + to the right.
    """

    name: str
    bearing: int
    top: int | None
    face: float
    below: float
    inward: float


def wall_sides(truss: Truss, shape: RoofShape) -> tuple[WallSide, WallSide]:
    """Return the left and the right wall; InputError (key "site.eaves_height") where the heel alone is higher."""
    x, y = truss.xy[list(truss.top.joints)].T
    found = []
    for name, place, eaves, inward in (("left", 0, shape.eaves[0], 1.0), ("right", -1, shape.eaves[1], -1.0)):
        bearing, end = truss.bearing_joints[place], truss.top.joints[place]
        at_wall = float(truss.xy[bearing, 0])
        face = float(np.interp(at_wall, x, y)) - float(truss.xy[bearing, 1])
        above = abs(float(truss.xy[end, 0]) - at_wall) <= TOLERANCES.same_point and end != bearing
        if eaves < face:
            raise InputError(
                f"the {name} wall is {say.metres(eaves)} high to the roof, and the truss {say.metres(face)} deep there",
                "state the height from the ground to the roof's surface above the lower wall",
                "site.eaves_height",
            )
        found.append(WallSide(name, bearing, end if above else None, max(face, 0.0), eaves - max(face, 0.0), inward))
    return found[0], found[1]


def wall_forces(
    truss: Truss, walls: tuple[WallSide, WallSide], pressures: tuple[float, float], width: float, head_share: float
) -> Derived:
    """Return the forces on joints (j, 2) N from wind on both walls, and how they came about.

    pressures : MPa on the left and the right wall, + presses in. width : mm of wall along the ridge that goes to the
    truss. head_share : share of the wind on the wall below the bearing that its columns pass to their heads.

    Of the wind on the face of a raised heel half goes to the joint above and half to the bearing.
    """
    forces = np.zeros((len(truss.joint_names), 2))
    lines = []
    for side, pressure in zip(walls, pressures, strict=True):
        per_height = side.inward * pressure * width
        at_head = per_height * side.below * head_share
        on_face = per_height * side.face
        forces[side.bearing, 0] += at_head
        lines.append(
            f"{side.name} wall below the bearing: {say.kilopascals(pressure)} x {say.metres(width)} x "
            f"{say.metres(side.below)} x {head_share:g} at the column head: {say.force(at_head, 0.0)} at "
            f"{truss.joint_names[side.bearing]}"
        )
        if side.face > 0.0:
            joints = [side.bearing, side.bearing if side.top is None else side.top]
            for joint in joints:
                forces[joint, 0] += on_face / 2
            lines.append(
                f"{side.name} face of the heel, {say.metres(side.face)} high: {say.force(on_face, 0.0)}, half to "
                f"{' and half to '.join(truss.joint_names[joint] for joint in joints)}"
            )
    return forces, tuple(lines)
