"""Bars are split where a joint lies on them, and where they cross if that is asked for."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from spanwright.io.wireframe.cluster import gather
from spanwright.io.wireframe.near import OnBars, bars_near_bars, joints_beside_bars
from spanwright.io.wireframe.network import Network, Remark
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.tolerances import TOLERANCES

_DIGITS = round(-np.log10(TOLERANCES.drawing_noise))


def split_at_joints(network: Network, tolerance: float, limit: int) -> tuple[Network, tuple[Remark, ...]]:
    """Split every bar at the joints within the tolerance (mm) of its axis, and move those joints onto the axis.

    A joint on several bars goes onto the longest.
    """
    on_bars = joints_beside_bars(network, tolerance, limit)
    inside = _well_inside(on_bars.along, network.lengths()[on_bars.bars], tolerance)
    on_bars = OnBars(*(getattr(on_bars, name)[inside] for name in ("bars", "joints", "along", "aside")))
    moved, remarks = _onto_axes(network, on_bars)
    return _cut(moved, on_bars), (*_cut_remarks(network, on_bars), *remarks)


def find_crossings(network: Network, tolerance: float, limit: int) -> tuple[IntArray, FloatArray]:
    """Return the pairs of bars (k, 2) that cross further than the tolerance (mm) from their ends, and where (k, 2)."""
    pairs = bars_near_bars(network, limit)
    one, other = network.ends[pairs[:, 0]], network.ends[pairs[:, 1]]
    meet = (one[:, :, None] == other[:, None, :]).any(axis=(1, 2))
    pairs = pairs[~meet]
    start, step = network.xy[network.ends[:, 0]], network.vectors()
    first, second = pairs.T
    between = start[second] - start[first]
    turn = _cross(step[first], step[second])
    lengths = network.lengths()
    # bars that turn less than this from each other are parallel for a drawing
    parallel = np.abs(turn) <= TOLERANCES.straight * lengths[first] * lengths[second]
    safe = np.where(parallel, 1.0, turn)
    along_first = np.where(parallel, -1.0, _cross(between, step[second]) / safe)
    along_second = np.where(parallel, -1.0, _cross(between, step[first]) / safe)
    inside = _well_inside(along_first, lengths[first], tolerance) & _well_inside(
        along_second, lengths[second], tolerance
    )
    points: FloatArray = start[first] + along_first[:, None] * step[first]
    return pairs[inside], points[inside]


def split_at_crossings(
    network: Network, pairs: IntArray, points: FloatArray, tolerance: float, limit: int
) -> tuple[Network, tuple[Remark, ...]]:
    """Make joints where pairs of bars (k, 2) cross, at points (k, 2), and split the bars there.

    Crossings within the tolerance (mm) of each other are one joint.
    """
    if not len(points):
        return network, ()
    places, labels = gather(points, tolerance, limit)
    grown = replace(network, xy=np.concatenate([network.xy, places]))
    rows = np.unique(np.column_stack([pairs.T.ravel(), np.tile(labels + len(network.xy), 2)]), axis=0)
    bars, joints = rows[:, 0], rows[:, 1]
    along = np.hypot(*(grown.xy[joints] - grown.xy[grown.ends[bars, 0]]).T)
    cut = _cut(grown, OnBars(bars, joints, along, np.zeros(len(bars))))
    done = "a joint was made, as asked"
    remarks = (
        Remark("W-310", "two bars cross", done, int(network.sources[first]), tuple(point.tolist()))
        for first, point in zip(pairs[:, 0], points, strict=True)
    )
    return cut, tuple(remarks)


def _cut(network: Network, on_bars: OnBars) -> Network:
    """Replace every bar by its pieces between the joints on it."""
    count = len(network.ends)
    bars = np.concatenate([np.arange(count), on_bars.bars, np.arange(count)])
    joints = np.concatenate([network.ends[:, 0], on_bars.joints, network.ends[:, 1]])
    along = np.concatenate([np.full(count, -np.inf), on_bars.along, np.full(count, np.inf)])
    order = np.lexsort((along, bars))
    bars, joints = bars[order], joints[order]
    piece = bars[1:] == bars[:-1]
    ends = np.column_stack([joints[:-1], joints[1:]])[piece]
    sources = network.sources[bars[:-1][piece]]
    real = ends[:, 0] != ends[:, 1]
    return Network(network.xy, ends[real], sources[real])


def _onto_axes(network: Network, on_bars: OnBars) -> tuple[Network, list[Remark]]:
    off = np.flatnonzero(on_bars.aside > TOLERANCES.drawing_noise)
    xy = network.xy.copy()
    starts, steps = network.xy[network.ends[on_bars.bars, 0]], network.vectors()[on_bars.bars]
    lengths = network.lengths()[on_bars.bars]
    remarks = []
    # shorter bars first, so that the longest has the last word
    for row in off[np.argsort(lengths[off], kind="stable")]:
        bar, joint = on_bars.bars[row], on_bars.joints[row]
        xy[joint] = np.round(starts[row] + steps[row] * (on_bars.along[row] / lengths[row]), _DIGITS)
        text = f"a joint lies {on_bars.aside[row]:.3g} mm off the line that it belongs to"
        at = tuple(network.xy[joint].tolist())
        remarks.append(Remark("W-305", text, "moved onto the line", int(network.sources[bar]), at))
    return replace(network, xy=xy), remarks


def _cut_remarks(network: Network, on_bars: OnBars) -> Iterator[Remark]:
    bars, first, counts = np.unique(on_bars.bars, return_index=True, return_counts=True)
    for bar, row, count in zip(bars, first, counts, strict=True):
        at = network.place(int(on_bars.joints[row]))
        text = f"{count} joint{'s lie' if count > 1 else ' lies'} on a line"
        yield Remark("W-304", text, f"split into {count + 1} bars", int(network.sources[bar]), at)


def _cross(first: FloatArray, second: FloatArray) -> FloatArray:
    product: FloatArray = first[:, 0] * second[:, 1] - first[:, 1] * second[:, 0]
    return product


def _well_inside(along: FloatArray, lengths: FloatArray, tolerance: float) -> BoolArray:
    return (along > tolerance) & (along < lengths - tolerance)
