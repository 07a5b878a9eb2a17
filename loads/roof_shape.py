"""The roof over a truss as the loading standards see it: duopitch, monopitch, trough or flat, with its measures."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Literal

import numpy as np

from spanwright.loads.site_inputs import SiteInput
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import slopes
from spanwright.truss.errors import InputError
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

ShapeKind = Literal["duopitch", "trough", "rises to the right", "rises to the left", "level"]


@dataclass(frozen=True)
class RoofShape:
    """The roof, with x from left to right along the truss and z along the ridge from the near gable's wall, all mm.

    kind : "duopitch" and "trough" have two slopes, the others one.
    left, right : rad, pitch of the slopes, positive where they rise towards the middle (negative in a trough); on a
        roof of one slope both are its pitch, never negative.
    edges : x of the roof's edges. walls : x of the walls. middle : x of the ridge or trough; of one slope its middle.
    ends : z of the roof's edges beyond the gables. length : of the building. width : wall to wall.
    height : of the highest point of the roof above ground. eaves : of the roof's surface above each wall, above ground.
    """

    kind: ShapeKind
    left: float
    right: float
    edges: tuple[float, float]
    walls: tuple[float, float]
    middle: float
    ends: tuple[float, float]
    length: float
    width: float
    height: float
    eaves: tuple[float, float]

    @property
    def two_slopes(self) -> bool:
        """Whether the roof has a ridge or a trough."""
        return self.kind in ("duopitch", "trough")


def roof_shape(truss: Truss, site: SiteInput) -> RoofShape:
    """Return the roof over a truss; InputError where the standards' tables do not know its shape."""
    chord = truss.top
    xy = truss.xy[list(chord.joints)]
    pitches = np.arctan2(*slopes(truss).directions.T[::-1])
    kind, turn = _kind(pitches)
    left, right = float(pitches[0]), float(pitches[-1])
    edges = (
        float(xy[0, 0] - chord.overhang[0] * math.cos(left)),
        float(xy[-1, 0] + chord.overhang[1] * math.cos(right)),
    )
    bearings = truss.xy[[truss.bearing_joints[0], truss.bearing_joints[-1]], 0]
    walls = (float(bearings[0]), float(bearings[1]))
    span = walls[1] - walls[0]
    if site.width is not None and site.width < span - TOLERANCES.same_point:
        raise InputError(
            f"the building is {site.width / 1e3:g} m wide, less than the truss spans, {span / 1e3:g} m",
            "state its width from wall to wall, or leave the key out",
            "site.width",
        )
    at_walls = np.interp(walls, xy[:, 0], xy[:, 1])
    lower = float(at_walls.min())
    two = kind in ("duopitch", "trough")
    return RoofShape(
        kind=kind,
        left=left if two else abs(left),
        right=-right if two else abs(left),
        edges=edges,
        walls=walls,
        middle=float(xy[turn, 0]) if two else (edges[0] + edges[1]) / 2,
        ends=(0.0 - site.gable_overhang, site.length + site.gable_overhang),
        length=site.length,
        width=site.width or span,
        height=site.eaves_height + float(xy[:, 1].max()) - lower,
        eaves=(site.eaves_height + float(at_walls[0]) - lower, site.eaves_height + float(at_walls[1]) - lower),
    )


def _kind(pitches: FloatArray) -> tuple[ShapeKind, int]:
    """Return the kind of a roof from the slope (m,) of its chord's bars, rad, and the joint at which it turns."""
    turns = np.flatnonzero(np.abs(np.diff(pitches)) > TOLERANCES.straight) + 1
    if len(turns) == 0:
        if abs(pitches[0]) <= TOLERANCES.straight:
            return "level", 0
        return ("rises to the right" if pitches[0] > 0 else "rises to the left"), 0
    first, last = pitches[0], pitches[-1]
    if len(turns) == 1 and first > 0 > last:
        return "duopitch", int(turns[0])
    if len(turns) == 1 and first < 0 < last:
        return "trough", int(turns[0])
    raise InputError(
        "the top chord has neither one straight slope nor two that meet at a ridge or trough, and the tables of wind "
        "and snow know no other roof",
        "state wind and imposed loads in [loads]",
        "site",
    )
