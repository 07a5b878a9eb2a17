"""One truss as it leaves the workshop: overall size, mass on the hook, and the roads it is too large for."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np

from spanwright.design.cutting import cuts
from spanwright.design.pieces import Piece
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.design.tables import read_table


@dataclass(frozen=True)
class Assembly:
    """One truss, put together.

    length, height, width : mm, overall, with section depths and overhangs; without gussets and cleats.
    mass : kg, of its pieces. lift_mass : kg, with the stated allowance for gussets and fixings.
    quantity : number of trusses. remarks : sentences.
    """

    length: float
    height: float
    width: float
    mass: float
    lift_mass: float
    quantity: int
    remarks: tuple[str, ...]


@dataclass(frozen=True)
class RoadLimit:
    """The greatest load that usually travels without a permit: length, and height standing or lying, mm."""

    name: str
    length: float
    height: float
    confidence: str


def assembly(setting: Setting, choices: tuple[Choice, ...], pieces: tuple[Piece, ...]) -> Assembly:
    """Return overall size and mass of one truss from the outlines of its members and its pieces."""
    corners = np.concatenate([cut.outline for cut in cuts(setting, choices)])
    length, height = (float(size) for size in np.ptp(corners, axis=0))
    mass = sum(piece.mass * piece.per_truss for piece in pieces)
    return Assembly(
        length=length,
        height=height,
        width=max(float(choice.section.width[0]) for choice in choices),
        mass=mass,
        lift_mass=mass * (1.0 + setting.project.members.fixings),
        quantity=setting.project.quantity,
        remarks=_too_large_for(length, height),
    )


@cache
def road_limits() -> tuple[RoadLimit, ...]:
    """Return the usual limits of transport, in the order of the table."""
    return tuple(
        RoadLimit(
            row["name"],
            float(row["length_mm"]),
            max(float(row["width_mm"]), float(row["height_mm"] or 0.0)),
            row["confidence"],
        )
        for row in read_table("transport.csv")
    )


def _too_large_for(length: float, height: float) -> tuple[str, ...]:
    """Name the usual limits that a truss in one piece exceeds."""
    exceeded = [
        f"{limit.name} ({limit.length / 1e3:.2f} m x {limit.height / 1e3:.2f} m, {limit.confidence})"
        for limit in road_limits()
        if length > limit.length or height > limit.height
    ]
    if not exceeded:
        return ()
    return (
        f"in one piece, {length / 1e3:.2f} m x {height / 1e3:.2f} m, it is larger than what usually travels without a "
        f"permit: {'; '.join(exceeded)}. Plan site splices, or ask the haulier; the roads to the site govern.",
    )
