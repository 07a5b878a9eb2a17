"""From pressures on the roof to forces at the purlin lines: who carries what."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import Slopes, SlopeSide, slopes
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine

SIDES: tuple[SlopeSide, ...] = ("left", "right")


@dataclass(frozen=True, eq=False)
class Strips:
    """What each purlin line (l) carries of each straight piece (q) of the roof, both from left to right.

    places : (l,) mm along the top chord from its first joint.
    x : (l,) mm.
    lengths : (l, q) mm of slope.
    middles : (q,) x of the middle of each piece, mm.
    directions : (q, 2) unit vectors, left to right.
    slope : (q,) the slope each piece lies on. half : (q,) the half of the roof it lies on.
    halves_meet : x where the halves meet, mm: the apex, on a roof of one slope mid-span.
    """

    places: FloatArray
    x: FloatArray
    lengths: FloatArray
    middles: FloatArray
    directions: FloatArray
    slope: tuple[SlopeSide, ...]
    half: tuple[SlopeSide, ...]
    halves_meet: float

    def on_slope(self, load: float) -> FloatArray:
        """Return (l, 2) N for a load down, N per mm of slope."""
        return _down(load * self.lengths.sum(axis=1))

    def on_plan(self, load: float, half: SlopeSide | None = None) -> FloatArray:
        """Return (l, 2) N for a load down, N per mm of plan, on the whole roof or on one half alone."""
        return _down(load * self.plan(half))

    def on_plan_pieces(self, load: FloatArray) -> FloatArray:
        """Return (l, 2) N for a load (q,) down on each piece, N per mm of plan."""
        return _down(self.lengths @ (np.abs(self.directions[:, 0]) * load))

    def plan(self, half: SlopeSide | None = None) -> FloatArray:
        """Return (l,) mm on plan that each line carries, of the whole roof or of one half."""
        loaded = np.array([half in (None, lies) for lies in self.half])
        plan: FloatArray = self.lengths @ (np.abs(self.directions[:, 0]) * loaded)
        return plan

    def across(self, left: float, right: float) -> FloatArray:
        """Return (l, 2) N for loads normal to the slopes, N per mm of slope, + presses in."""
        return self.across_pieces(self.by_slope(left, right))

    def across_pieces(self, load: FloatArray) -> FloatArray:
        """Return (l, 2) N for a load (q,) normal to each piece, N per mm of slope, + presses in."""
        normals = np.column_stack([self.directions[:, 1], -self.directions[:, 0]])
        forces: FloatArray = self.lengths @ (load[:, None] * normals)
        return forces

    def by_slope(self, left: float, right: float) -> FloatArray:
        """Return (q,) the value of the slope that each piece lies on."""
        return np.array([left if lies == "left" else right for lies in self.slope])


def strips(truss: Truss, lines: tuple[PurlinLine, ...], cuts: FloatArray | None = None) -> Strips:
    """Divide the roof among the purlin lines.

    cuts : x at which pieces are divided further, mm, such as the edges of wind zones.

    A line carries half-way to each of its neighbours along the slope, the outermost ones to the roof's edge; where no
    line stands on the apex, those nearest to it carry to the apex.
    """
    roof = slopes(truss)
    places = np.array([line.along for line in lines])
    half = _halves_meet(truss, roof)
    x_of, along_of = _plan(truss, roof)
    further = np.empty(0) if cuts is None else np.interp(cuts, x_of, along_of)
    ends = _piece_cuts(truss, half, further)
    middles = (ends[:-1] + ends[1:]) / 2
    bar = np.searchsorted(truss.top.along[1:-1], middles)
    bounds = _boundaries(truss, roof, places)
    low = np.maximum.outer(bounds[:-1], ends[:-1])
    high = np.minimum.outer(bounds[1:], ends[1:])
    return Strips(
        places,
        np.array([line.x for line in lines]),
        np.maximum(high - low, 0.0),
        np.interp(middles, along_of, x_of),
        roof.directions[bar],
        tuple(roof.side[at] for at in bar),
        tuple("left" if middle < half else "right" for middle in middles),
        float(np.interp(half, along_of, x_of)),
    )


def _down(loads: FloatArray) -> FloatArray:
    return np.column_stack([np.zeros_like(loads), -loads])


def _edges(truss: Truss) -> tuple[float, float]:
    left, right = truss.top.overhang
    return -left, truss.top.length + right


def _has_inner_apex(truss: Truss, roof: Slopes) -> bool:
    return 0.0 < roof.apex_along < truss.top.length


def _halves_meet(truss: Truss, roof: Slopes) -> float:
    """Return the place where the halves of the roof meet: the apex; on a roof of one slope, above mid-span."""
    if _has_inner_apex(truss, roof):
        return roof.apex_along
    x = truss.xy[list(truss.top.joints), 0]
    middle = truss.xy[list(truss.bearing_joints), 0].mean()
    return float(np.interp(middle, x, truss.top.along))


def _plan(truss: Truss, roof: Slopes) -> tuple[FloatArray, FloatArray]:
    """Return x of the roof's edges and of the joints between them, and their places along the chord."""
    (left, right), along = truss.top.overhang, truss.top.along
    x = truss.xy[list(truss.top.joints), 0]
    first, last = x[0] - left * roof.directions[0, 0], x[-1] + right * roof.directions[-1, 0]
    return np.array([first, *x, last]), np.array([-left, *along, truss.top.length + right])


def _piece_cuts(truss: Truss, half: float, further: FloatArray) -> FloatArray:
    """Return the places, ascending, between which the roof is straight, lies on one half and is not cut further."""
    return np.unique(np.array([*_edges(truss), *truss.top.along, half, *further]))


def _boundaries(truss: Truss, roof: Slopes, places: FloatArray) -> FloatArray:
    """Return (l + 1,) the places where one line's share ends and the next one's begins."""
    between = (places[:-1] + places[1:]) / 2
    if _has_inner_apex(truss, roof):
        astride = (places[:-1] < roof.apex_along) & (places[1:] > roof.apex_along)
        between[astride] = roof.apex_along
    start, end = _edges(truss)
    return np.concatenate([[start], between, [end]])
