"""What is drawn more than once becomes one bar, and pieces in one line become one bar again."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from spanwright.io.wireframe.network import Network, Remark
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray


def merge_repeated(network: Network, rank: IntArray) -> tuple[Network, IntArray, tuple[Remark, ...]]:
    """Keep one of the bars between the same two joints.

    rank : (lines,) the bar whose line ranks lowest is kept, then the one drawn first.

    Returns the network, pairs (k, 2) of lines (dropped, kept), and remarks.
    """
    low, high = network.ends.min(axis=1), network.ends.max(axis=1)
    order = np.lexsort((network.sources, rank[network.sources], high, low))
    same = np.zeros(len(order), dtype=bool)
    same[1:] = (low[order][1:] == low[order][:-1]) & (high[order][1:] == high[order][:-1])
    heads = np.maximum.accumulate(np.where(same, 0, np.arange(len(order))))
    dropped, kept = order[same], order[heads[same]]
    lines = np.column_stack([network.sources[dropped], network.sources[kept]])
    keep = np.ones(len(order), dtype=bool)
    keep[dropped] = False
    merged = Network(network.xy, network.ends[keep], network.sources[keep])
    return merged, lines, tuple(_repeats(network, dropped, lines))


def _repeats(network: Network, dropped: IntArray, lines: IntArray) -> Iterator[Remark]:
    """Say of each line that gave bars away whether it was drawn twice or overlaps another."""
    pieces = np.bincount(network.sources)
    given: dict[int, list[int]] = {}
    for position, source in enumerate(lines[:, 0].tolist()):
        given.setdefault(source, []).append(position)
    for source, positions in sorted(given.items()):
        at = tuple(network.xy[network.ends[dropped[positions[0]]]].mean(axis=0).tolist())
        others = {int(lines[position, 1]) for position in positions}
        if len(positions) == pieces[source] and len(others) == 1 and pieces[others.pop()] == pieces[source]:
            yield Remark("W-306", "a line lies on another from end to end", "one of them was kept", source, at)
        else:
            text = f"{len(positions)} of the {pieces[source]} bars along a line lie on other lines"
            yield Remark("W-307", text, "merged", source, at)


def join_straight(network: Network, tolerance: float, kept: BoolArray) -> tuple[Network, tuple[Remark, ...]]:
    """Join bars that meet, two and no more, within the tolerance (mm) of one straight line.

    kept : (j,) joints that stay whatever meets there.
    """
    gone = np.zeros(len(network.ends), dtype=bool)
    joined: list[tuple[int, int, int]] = []
    remarks: list[Remark] = []
    for chain, bars in _chains(network, _passed(network, tolerance) & ~kept):
        for first, last in _straight_parts(network.xy[chain], tolerance):
            part = bars[first:last]
            gone[part] = True
            joined.append((chain[first], chain[last], int(network.sources[min(part)])))
            text = f"{len(part)} pieces in one line, and nothing else meets between them"
            at = network.place(chain[first + 1])
            remarks.append(Remark("W-308", text, "joined into one bar", joined[-1][2], at))
    added = np.array(joined, dtype=np.intp).reshape(-1, 3)
    ends = np.concatenate([network.ends[~gone], added[:, :2]])
    sources = np.concatenate([network.sources[~gone], added[:, 2]])
    return Network(network.xy, ends, sources).used(), tuple(remarks)


def _passed(network: Network, tolerance: float) -> BoolArray:
    """Return which joints (j,) have two bars and lie within the tolerance of the line between their neighbours."""
    passed: BoolArray = network.degrees() == 2
    from_joint = np.concatenate([network.ends, network.ends[:, ::-1]])
    from_joint = from_joint[np.argsort(from_joint[:, 0], kind="stable")]
    from_joint = from_joint[passed[from_joint[:, 0]]]
    joints, one, other = from_joint[::2, 0], from_joint[::2, 1], from_joint[1::2, 1]
    step = network.xy[other] - network.xy[one]
    away = network.xy[joints] - network.xy[one]
    aside = np.abs(away[:, 0] * step[:, 1] - away[:, 1] * step[:, 0])
    passed[joints] = aside <= tolerance * np.hypot(step[:, 0], step[:, 1])
    return passed


def _chains(network: Network, passing: BoolArray) -> Iterator[tuple[list[int], list[int]]]:
    """Yield every chain of bars through joints that are merely passed: its joints, and the bars between them."""
    beside: list[list[int]] = [[] for _ in network.xy]
    for bar, (start, end) in enumerate(network.ends.tolist()):
        beside[start].append(bar)
        beside[end].append(bar)
    done: set[int] = set()
    for joint in np.flatnonzero(passing).tolist():
        if joint not in done:
            chain, bars = _half_chain(network, beside, passing, joint, beside[joint][0])
            if chain[-1] == joint:
                chain, bars = _from_corner(network, chain, bars)
            else:
                more, further = _half_chain(network, beside, passing, joint, beside[joint][1])
                chain, bars = chain[:0:-1] + more, bars[::-1] + further
            done.update(chain)
            yield chain, bars


def _half_chain(
    network: Network, beside: list[list[int]], passing: BoolArray, joint: int, bar: int
) -> tuple[list[int], list[int]]:
    """Follow bars from a joint to the next joint that is not merely passed, or round to itself."""
    chain, bars = [joint], [bar]
    while True:
        start, end = network.ends[bar].tolist()
        chain.append(end if start == chain[-1] else start)
        if not passing[chain[-1]] or chain[-1] == joint:
            return chain, bars
        one, other = beside[chain[-1]]
        bar = other if one == bar else one
        bars.append(bar)


def _from_corner(network: Network, chain: list[int], bars: list[int]) -> tuple[list[int], list[int]]:
    """Turn a closed chain so that it begins and ends at a corner: the joint furthest from its middle."""
    points = network.xy[chain[:-1]]
    corner = int(np.argmax(np.hypot(*(points - points.mean(axis=0)).T)))
    return chain[corner:-1] + chain[: corner + 1], bars[corner:] + bars[:corner]


def _straight_parts(points: FloatArray, tolerance: float) -> Iterator[tuple[int, int]]:
    """Yield (first, last) of the parts of a polyline (n, 2) that are straight and have joints between."""
    parts = [(0, len(points) - 1)]
    while parts:
        first, last = parts.pop()
        if last - first < 2:
            continue
        away = points[first : last + 1] - points[first]
        length = float(np.hypot(*away[-1]))
        if length <= tolerance:
            aside = np.hypot(away[:, 0], away[:, 1])
        else:
            aside = np.abs(away[:, 0] * away[-1, 1] - away[:, 1] * away[-1, 0]) / length
        furthest = int(np.argmax(aside[1:-1])) + 1
        if aside[furthest] > tolerance:
            parts += [(first, first + furthest), (first + furthest, last)]
        elif (np.diff(away @ away[-1]) > 0).all():
            yield first, last
