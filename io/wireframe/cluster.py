"""Line ends become joints: ends within the tolerance of each other are one, by distance and never by rounding."""

from __future__ import annotations

import numpy as np
from scipy.sparse import coo_array
from scipy.sparse.csgraph import connected_components
from scipy.spatial.distance import pdist

from spanwright.io.wireframe.near import points_within
from spanwright.io.wireframe.network import Network, Remark
from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.decimals import decimal
from spanwright.truss.tolerances import TOLERANCES

_DIGITS = round(-np.log10(TOLERANCES.drawing_noise))
_MEASURED = 500  # ends: of larger clusters the box is measured, not every pair


def default_tolerance(lines: FloatArray) -> float:
    """Return the lesser of 5 mm and 0.1 % of the width of lines (n, 2, 2) in mm."""
    width = float(np.ptp(lines[:, :, 0]))
    return min(TOLERANCES.ends_meet, TOLERANCES.ends_meet_share * width)


def cluster_ends(lines: FloatArray, tolerance: float, limit: int) -> tuple[Network, tuple[Remark, ...]]:
    """Make joints of the ends of lines (n, 2, 2) in mm; lines of no length are dropped.

    limit : most pairs of near ends that are looked at.
    """
    points = lines.reshape(-1, 2)
    xy, labels = gather(points, tolerance, limit)
    ends = labels.reshape(-1, 2)
    sources = np.arange(len(lines))
    no_length = ends[:, 0] == ends[:, 1]
    dropped = [
        Remark("W-303", f"a line of {decimal(_length(line), 3)} mm", "dropped", int(source), tuple(line[0].tolist()))
        for source, line in zip(sources[no_length], lines[no_length], strict=True)
    ]
    network = Network(xy, ends[~no_length], sources[~no_length])
    return network.used(), (*_moves(points, labels, xy, tolerance), *dropped)


def gather(points: FloatArray, tolerance: float, limit: int) -> tuple[FloatArray, IntArray]:
    """Make one of all points (n, 2) that chains of steps within the tolerance join.

    Returns the places (j, 2) and the place of each point (n,). Where points agree, noise apart, their place is the
    first of them to the last digit, else it is their mean.
    """
    distinct, inverse = np.unique(points, axis=0, return_inverse=True)
    pairs = points_within(distinct, tolerance, limit)
    near = coo_array((np.ones(len(pairs)), (pairs[:, 0], pairs[:, 1])), shape=(len(distinct), len(distinct)))
    count, of_distinct = connected_components(near, directed=False)
    labels: IntArray = of_distinct[inverse.ravel()].astype(np.intp)
    return _means(points, labels, int(count)), labels


def _means(points: FloatArray, labels: IntArray, count: int) -> FloatArray:
    ends = np.bincount(labels, minlength=count)[:, None]
    sums = np.column_stack([np.bincount(labels, weights=points[:, axis], minlength=count) for axis in (0, 1)])
    means = np.round(sums / ends, _DIGITS)
    first = np.empty(count, dtype=np.intp)
    first[labels[::-1]] = np.arange(len(points))[::-1]
    agree = np.ones(count, dtype=bool)
    apart = np.abs(points - points[first[labels]]).max(axis=1) > TOLERANCES.drawing_noise
    agree[labels[apart]] = False
    return np.where(agree[:, None], points[first], means)


def _moves(points: FloatArray, labels: IntArray, xy: FloatArray, tolerance: float) -> list[Remark]:
    """Say of each joint how far its ends were moved, and warn of those wider than the tolerance."""
    moved = np.hypot(*(points - xy[labels]).T)
    furthest = np.zeros(len(xy))
    np.maximum.at(furthest, labels, moved)
    remarks = []
    order = np.argsort(labels, kind="stable")
    starts = np.searchsorted(labels[order], np.arange(len(xy) + 1))
    for joint in np.flatnonzero(furthest > TOLERANCES.drawing_noise):
        ends = order[starts[joint] : starts[joint + 1]]
        text = f"{len(ends)} line ends lie up to {decimal(furthest[joint], 3)} mm from their mean"
        source, at = int(ends[0]) // 2, tuple(xy[joint].tolist())
        remarks.append(Remark("W-301", text, "moved to meet there", source, at))
        width = _width(points[ends]) if furthest[joint] > tolerance / 2 else 0.0
        if width > tolerance:
            text = (
                f"the {len(ends)} ends spread over {decimal(width, 3)} mm, the tolerance is {decimal(tolerance, 3)} mm"
            )
            remarks.append(Remark("W-302", text, "made one joint, because each has a neighbour within it", source, at))
    return remarks


def _width(ends: FloatArray) -> float:
    if len(ends) > _MEASURED:
        return float(np.hypot(*np.ptp(ends, axis=0)))
    return float(pdist(ends).max())


def _length(line: FloatArray) -> float:
    return float(np.hypot(*(line[1] - line[0])))
