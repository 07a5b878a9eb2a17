"""Bars are split where a joint lies on them, and where they cross if that is asked for."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from spanwright.io.wireframe.cluster import gather
from spanwright.io.wireframe.near import OnBars, bars_near_bars, joints_beside_bars
from spanwright.io.wireframe.network import Network, Remark
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.decimals import decimal
from spanwright.truss.tolerances import TOLERANCES

_DIGITS = round(-np.log10(TOLERANCES.drawing_noise))


def split_at_joints(network: Network, tolerance: float, limit: int) -> tuple[Network, tuple[Remark, ...]]:
    """Split every bar at the joints within the tolerance (mm) of its axis, and move those joints onto the axis.

    A joint on several bars goes onto the longest.
    """
    beside = joints_beside_bars(network, tolerance, limit)
    on_bars = beside.rows(_well_inside(beside.along, network.lengths()[beside.bars], tolerance))
    on_bars = on_bars.rows(_not_linked(network, on_bars, tolerance))
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
    inside = _well_inside(along_first * lengths[first], lengths[first], tolerance)
    inside &= _well_inside(along_second * lengths[second], lengths[second], tolerance)
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


def _not_linked(network: Network, on_bars: OnBars, tolerance: float) -> BoolArray:
    """Return which joints on bars (k,) are to split them: all but those that are linked to its end by another bar.

    Near a bar's end a joint of another bar from that end is within the tolerance (mm) of both, though it belongs to
    one. The pairs most in line are taken first, and each links its joint to the end.
    """
    lengths = network.lengths()[on_bars.bars]
    second = on_bars.along > lengths / 2
    from_end = np.where(second, lengths - on_bars.along, on_bars.along)
    off_line = on_bars.aside / from_end
    accepted: BoolArray = (from_end > tolerance / TOLERANCES.spread) | (off_line <= TOLERANCES.straight)
    doubtful = np.flatnonzero(~accepted)
    if doubtful.size:
        clear = _cut(network, on_bars.rows(accepted))
        linked = set(map(tuple, np.sort(clear.ends, axis=1).tolist()))
        for row in doubtful[np.argsort(off_line[doubtful], kind="stable")].tolist():
            end = int(network.ends[on_bars.bars[row], int(second[row])])
            joint = int(on_bars.joints[row])
            pair = min(joint, end), max(joint, end)
            accepted[row] = pair not in linked or off_line[row] <= TOLERANCES.spread
            linked.add(pair)
    return accepted


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
        text = f"a joint lies {decimal(on_bars.aside[row], 3)} mm off the line that it belongs to"
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
