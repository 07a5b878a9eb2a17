"""How the ends of a piece are made: square, mitred at a kink or onto a flat face, or profiled to a round tube."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Literal

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.lying import TUBES, edges
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Role
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True)
class End:
    """One end of a piece.

    kind : "square", "mitre" (one flat cut) or "profile" (to the round face of a tube).
    slant : by how many mm the cut moves along the piece's direction for each mm across it, to its left; 0 = square.
    beyond : mm by which the tips of a profile stand beyond the point where the axis meets the tube's face.
    tube : the section profiled to, or "".
    """

    kind: Literal["square", "mitre", "profile"] = "square"
    slant: float = 0.0
    beyond: float = 0.0
    tube: str = ""


SQUARE = End()


@dataclass(frozen=True)
class Passing:
    """A member that runs past the end of a web.

    direction : (2,) along its setting-out line. edge : mm from that line to its edge on the web's side.
    """

    direction: FloatArray
    edge: float
    section: Candidates


@dataclass(frozen=True)
class TakeOff:
    """What a web loses at an end: mm along it from the joint to where its axis ends, and how the end is made."""

    length: float
    end: End


def passing(section: Candidates, role: Role, direction: FloatArray, towards: FloatArray) -> Passing:
    """Return a member (direction from left to right) as a web sees it that leaves the joint in direction `towards`."""
    lower, upper = edges(section, role)
    on_left = float(direction[0] * towards[1] - direction[1] * towards[0]) > 0.0
    return Passing(direction, upper if on_left else -lower, section)


def mitre(before: FloatArray, after: FloatArray, along: FloatArray) -> End:
    """Return the end of a chord piece at a kink: cut in the plane that halves the angle.

    before, after : (2,) unit directions of the chord on either side, left to right. along : the piece's own.
    Square where the chord runs straight on.
    """
    turn = float(before[0] * after[1] - before[1] * after[0])
    return _mitre(after - before, along) if abs(turn) > TOLERANCES.straight else SQUARE


def web_end(web: Candidates, role: Role, along: FloatArray, past: list[Passing], gap: float) -> TakeOff:
    """Return what a web loses at a joint.

    along : (2,) unit direction of the piece. past : members that run past the end. gap : mm.
    A tube that meets only tubes is cut to their face. Any other web is cut square, its nearest corner `gap` clear of
    the edge. Where several members pass, the one that takes most decides; where none does, the gap is to the joint.
    """
    if past and web.family in TUBES and all(other.section.family in TUBES for other in past):
        return max((_to_face(web, along, other) for other in past), key=lambda found: found.length)
    half = edges(web, role)[1]
    return TakeOff(max((_to_corner(half, along, other, gap) for other in past), default=gap), SQUARE)


def _to_corner(half: float, along: FloatArray, other: Passing, gap: float) -> float:
    cosine, sine = _between(along, other.direction)
    return (other.edge + gap + half * cosine) / sine if sine > TOLERANCES.straight else gap


def _to_face(web: Candidates, along: FloatArray, other: Passing) -> TakeOff:
    cosine, sine = _between(along, other.direction)
    if sine <= TOLERANCES.straight:
        return TakeOff(0.0, SQUARE)
    axis = other.edge / sine
    flat = _mitre(other.direction, along)
    if other.section.family != "CHS":
        return TakeOff(axis, flat)
    tips = _nearest_on_round(other.edge, web, cosine, sine)
    return TakeOff(axis, End("profile", flat.slant, axis - tips, other.section.piece_names[0]))


def _nearest_on_round(radius: float, web: Candidates, cosine: float, sine: float) -> float:
    """Return mm along a web's axis from the joint to the deepest point of its profile on a round tube.

    The wall of a round web that stands off by z sideways meets the tube where it is sqrt(R2 - z2) deep. The deepest
    point is at the acute corner, or farther round where the web leans little (geometry of two cylinders).
    """
    half_depth, half_width = float(web.depth[0]) / 2.0, float(web.width[0]) / 2.0
    beside = math.sqrt(max(radius**2 - half_width**2, 0.0))
    if web.family != "CHS":
        return (beside - half_depth * cosine) / sine
    if beside * cosine <= half_depth * sine:
        return beside
    return (radius - half_depth * cosine) / sine


def _between(first: FloatArray, second: FloatArray) -> tuple[float, float]:
    """Return cosine and sine of the acute angle between two lines."""
    return abs(float(first @ second)), abs(float(first[0] * second[1] - first[1] * second[0]))


def _mitre(cut: FloatArray, along: FloatArray) -> End:
    """Return the end of a piece cut along the line `cut`, which crosses it; square where it does so squarely."""
    across = np.array([-along[1], along[0]])
    slant = float(cut @ along) / float(cut @ across)
    return End("mitre", slant) if abs(slant) > TOLERANCES.straight else SQUARE
