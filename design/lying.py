"""How the rolled pieces of a member lie in the plane of the truss: their edges, and which way each is turned."""

from __future__ import annotations

from dataclasses import dataclass

from spanwright.design.candidates import Candidates
from spanwright.truss.model import Role

TUBES = ("CHS", "SHS", "RHS")


@dataclass(frozen=True)
class Lying:
    """One rolled piece beside the member's setting-out line, which is the centroid line of the whole member.

    lower, upper : mm, its edges in the plane; + is to the left of the member's direction, upward in a chord.
    heel_up : whether its outstanding leg is at the upper edge; None for a tube, which has no heel.
    far : whether it stands behind the gusset.
    """

    lower: float
    upper: float
    heel_up: bool | None
    far: bool = False


def lying(section: Candidates, role: Role) -> tuple[Lying, ...]:
    """Return how each piece of a chosen section (candidates of length 1) lies.

    Outstanding legs are at the outer edge of a chord: on top in a top chord, below in a bottom chord. The near angle of
    a starred pair is the upper one. Which way a web's angle is turned is settled with its gussets; here it is heel up.
    """
    if section.family in TUBES:
        half = float(section.depth[0]) / 2.0
        return (Lying(-half, half, heel_up=None),)
    leg, near_gap = float(section.leg_connected[0]), section.gap / 2.0
    if section.family == "2L star":
        upper = Lying(near_gap, near_gap + leg, heel_up=False)
        return upper, Lying(-near_gap - leg, -near_gap, heel_up=True, far=True)
    heel = float(section.piece_centroid_outstanding[0])
    heel_up = role != "bottom chord"
    edges = (heel - leg, heel) if heel_up else (-heel, leg - heel)
    return tuple(Lying(*edges, heel_up=heel_up, far=far) for far in (False, True)[: section.pieces])


def edges(section: Candidates, role: Role) -> tuple[float, float]:
    """Return the outermost edges of a member in mm from its setting-out line, (lower <= 0, upper >= 0).

    A web may be turned either way, so both its edges are the farther one.
    """
    lies = lying(section, role)
    lower, upper = min(lie.lower for lie in lies), max(lie.upper for lie in lies)
    if "chord" in role:
        return lower, upper
    farther = max(-lower, upper)
    return -farther, farther


def way_round(section: Candidates) -> str:
    """Say which way round a chosen section stands, as the workshop says it; "" where there is one way only."""
    in_plane, across = float(section.leg_connected[0]), float(section.leg_outstanding[0])
    if in_plane == across:
        return ""
    if section.family in TUBES:
        return f"{'upright' if in_plane > across else 'flat'}: its side of {in_plane:g} mm in the plane of the truss"
    leg = "long" if in_plane > across else "short"
    return f"{leg} leg to the gusset" if section.pieces == 1 else f"{leg} legs together"
