"""Which points and bars lie near each other, in nearly linear time: samples along bars, looked up in k-d trees.

The samples are as far apart as the bars' total length allows, so that there are never many more of them than bars;
whatever the drawing, the pairs are counted before they are listed, and too many are refused.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from scipy.spatial import cKDTree

from spanwright.io.wireframe.network import Network
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.errors import DrawingError

_SAMPLES_A_BAR = 3  # on average; more samples are smaller circles but a larger tree


@dataclass(frozen=True, eq=False)
class OnBars:
    """Joints beside bars, one row each.

    bars, joints : (k,) indices. along : (k,) mm from the bar's first end. aside : (k,) mm off its axis.
    """

    bars: IntArray
    joints: IntArray
    along: FloatArray
    aside: FloatArray

    def rows(self, keep: BoolArray) -> OnBars:
        """Return the rows to keep (k,)."""
        return OnBars(self.bars[keep], self.joints[keep], self.along[keep], self.aside[keep])


def points_within(points: FloatArray, reach: float, limit: int) -> IntArray:
    """Return the pairs (k, 2) of points (n, 2) that are no further apart than `reach`."""
    tree = cKDTree(points)
    # every pair is counted twice, and every point once with itself
    refuse_crowd((int(tree.count_neighbors(tree, reach)) - len(points)) // 2, limit)
    pairs: IntArray = tree.query_pairs(reach, output_type="ndarray").astype(np.intp)
    return pairs


def joints_beside_bars(network: Network, reach: float, limit: int) -> OnBars:
    """Return the joints that lie within `reach` (mm) of a bar's axis, between its ends and none of them."""
    samples, owners, spacing = _samples(network)
    pairs = _across(samples, network.xy, np.hypot(spacing / 2, reach), limit)
    bars, joints = _distinct(owners[pairs[:, 0]], pairs[:, 1], len(network.xy))
    own = (network.ends[bars] == joints[:, None]).any(axis=1)
    bars, joints = bars[~own], joints[~own]
    start = network.xy[network.ends[bars, 0]]
    lengths = network.lengths()[bars]
    directions = network.vectors()[bars] / lengths[:, None]
    away = network.xy[joints] - start
    along = (away * directions).sum(axis=1)
    aside = np.abs(away[:, 0] * directions[:, 1] - away[:, 1] * directions[:, 0])
    near = (aside <= reach) & (along > 0) & (along < lengths)
    return OnBars(bars[near], joints[near], along[near], aside[near])


def bars_near_bars(network: Network, limit: int) -> IntArray:
    """Return pairs (k, 2) of bars, the lower index first, among which are all that cross each other."""
    samples, owners, spacing = _samples(network)
    # a crossing is at most half a spacing from a sample of either bar
    pairs = owners[points_within(samples, spacing, limit)]
    first, second = _distinct(pairs.min(axis=1), pairs.max(axis=1), len(network.ends))
    apart = first != second
    return np.column_stack([first[apart], second[apart]])


def _samples(network: Network) -> tuple[FloatArray, IntArray, float]:
    """Return points along the bars (s, 2), the bar of each (s,), and their greatest spacing in mm."""
    lengths = network.lengths()
    spacing = float(lengths.sum()) / (_SAMPLES_A_BAR * max(1, len(lengths)))
    counts = np.maximum(1, np.ceil(lengths / spacing)).astype(np.intp)
    owners = np.repeat(np.arange(len(lengths)), counts)
    position = np.arange(len(owners)) - np.repeat(np.cumsum(counts) - counts, counts)
    share = (position + 0.5) / counts[owners]
    samples: FloatArray = network.xy[network.ends[owners, 0]] + share[:, None] * network.vectors()[owners]
    return samples, owners, spacing


def _across(first: FloatArray, second: FloatArray, reach: float, limit: int) -> IntArray:
    one, other = cKDTree(first), cKDTree(second)
    refuse_crowd(int(one.count_neighbors(other, reach)), limit)
    found = one.sparse_distance_matrix(other, reach, output_type="ndarray")
    return np.column_stack([found["i"], found["j"]]).astype(np.intp)


def _distinct(first: IntArray, second: IntArray, width: int) -> tuple[IntArray, IntArray]:
    """Return the distinct pairs, sorted; `width` is more than any number in `second`."""
    keys = np.unique(first * width + second)
    return keys // width, keys % width


def refuse_crowd(pairs: int, limit: int) -> None:
    """Raise DrawingError where more pairs of lines or line ends are near each other than are looked at."""
    if pairs > limit:
        raise DrawingError(
            f"the lines are too crowded: {pairs} pairs are near each other, at most {limit} are looked at",
            "read only the layers of one truss, and check the unit and the tolerance",
        )
