"""What hangs together: near misses, the piece that is the truss, and the bars that end in the air."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np
from scipy.sparse import coo_array
from scipy.sparse.csgraph import connected_components

from spanwright.io.wireframe.near import joints_beside_bars, points_within, refuse_crowd
from spanwright.io.wireframe.network import Network, Remark
from spanwright.io.wireframe.options import Limits
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.decimals import decimal
from spanwright.truss.errors import DrawingError
from spanwright.truss.tolerances import TOLERANCES

_RIVAL = 0.5  # a second piece with at least this share of the bars of the first could be the truss as well


@dataclass(frozen=True, eq=False)
class Trunk:
    """The truss without the bars that end in the air, and those bars.

    network : its joints are those of the truss. hanging : (h, 2) joints of `whole`; the first is nearer the trunk.
    sources : (h,) the lines of the hanging bars. whole : the network with them. joints : (j,) trunk joints in `whole`.
    """

    network: Network
    whole: Network
    joints: IntArray
    hanging: IntArray
    sources: IntArray


def near_misses(network: Network, tolerance: float, limits: Limits) -> tuple[Remark, ...]:
    """Report joints up to 5 tolerances (mm) from another joint, or from a bar that they are not joined to."""
    reach = TOLERANCES.near_miss * tolerance
    pairs = points_within(network.xy, reach, limits.findings)
    joined = set(map(tuple, np.sort(network.ends, axis=1).tolist()))
    done = "not made one; draw them together, or give a greater tolerance"
    source_at = _source_at(network)
    remarks = []
    for first, second in sorted(map(tuple, np.sort(pairs, axis=1).tolist())):
        gap = float(np.hypot(*(network.xy[first] - network.xy[second])))
        between = ", with a bar between them" if (first, second) in joined else ""
        text = f"two joints are {decimal(gap, 3)} mm apart{between}, the tolerance is {decimal(tolerance, 3)} mm"
        remarks.append(Remark("W-311", text, done, int(source_at[first]), network.place(first)))
    beside = joints_beside_bars(network, reach, limits.pairs)
    refuse_crowd(len(beside.bars), limits.findings)
    lengths = network.lengths()[beside.bars]
    for bar, joint, along, aside, length in zip(
        beside.bars.tolist(), beside.joints.tolist(), beside.along, beside.aside, lengths, strict=True
    ):
        ends = network.ends[bar].tolist()
        if min(along, length - along) > reach and not any((min(joint, e), max(joint, e)) in joined for e in ends):
            text = f"a joint is {decimal(aside, 3)} mm from a bar, the tolerance is {decimal(tolerance, 3)} mm"
            remarks.append(Remark("W-312", text, done, int(source_at[joint]), network.place(joint)))
    return tuple(remarks)


def nearly_closed(open_ends: Iterable[tuple[int, FloatArray]], tolerance: float) -> tuple[Remark, ...]:
    """Report polylines that are open though their ends nearly meet.

    open_ends : for each open polyline a line of it, and its first and last point (2, 2) in mm.
    """
    remarks = []
    for source, (start, end) in open_ends:
        gap = float(np.hypot(*(end - start)))
        if 0 < gap <= TOLERANCES.near_miss * tolerance:
            text = f"the ends of an open polyline are {decimal(gap, 3)} mm apart"
            done = "joined, being within the tolerance" if gap <= tolerance else "left open"
            remarks.append(Remark("W-106", text, done, source, tuple(start.tolist())))
    return tuple(remarks)


def main_piece(network: Network) -> tuple[Network, tuple[Remark, ...]]:
    """Return the piece with the most bars; the others are loose and left out.

    Raises DrawingError where a second piece could be the truss as well.
    """
    labels = _pieces(network)
    bars = np.bincount(labels[network.ends[:, 0]], minlength=int(labels.max()) + 1)
    order = np.argsort(-bars, kind="stable")
    order = order[bars[order] > 0]
    if len(order) > 1 and bars[order[1]] >= _RIVAL * bars[order[0]]:
        listed = "; ".join(_extent(network, labels == piece, int(bars[piece])) for piece in order[:2])
        raise DrawingError(
            f"the lines fall into {len(order)} pieces, and more than one could be the truss: {listed}",
            "read only the layers of one truss; if they are one, mend the gaps that are reported as near misses",
        )
    remarks = []
    for piece in order[1:]:
        rows = np.flatnonzero(labels[network.ends[:, 0]] == piece)
        text = f"a piece of {len(rows)} bar{'s' if len(rows) > 1 else ''} does not hang together with the truss"
        at = network.place(int(network.ends[rows[0], 0]))
        remarks.append(Remark("W-313", text, "left out", int(network.sources[rows].min()), at))
    keep = labels[network.ends[:, 0]] == order[0]
    return Network(network.xy, network.ends[keep], network.sources[keep]).used(), tuple(remarks)


def trunk_of(network: Network) -> Trunk:
    """Take off the bars that end in the air, and those that end in the air without them, and so on.

    Raises DrawingError where nothing is left.
    """
    alive = np.ones(len(network.ends), dtype=bool)
    degrees = network.degrees()
    beside: list[list[int]] = [[] for _ in network.xy]
    for bar, (start, end) in enumerate(network.ends.tolist()):
        beside[start].append(bar)
        beside[end].append(bar)
    hanging: list[tuple[int, int, int]] = []
    tips = np.flatnonzero(degrees == 1).tolist()
    while tips:
        tip = tips.pop()
        for bar in beside[tip]:
            if alive[bar]:
                alive[bar] = False
                start, end = network.ends[bar].tolist()
                inner = end if start == tip else start
                hanging.append((inner, tip, int(network.sources[bar])))
                degrees[inner] -= 1
                if degrees[inner] == 1:
                    tips.append(inner)
    if not alive.any():
        raise DrawingError(
            "no line closes a triangle with others",
            "a truss is triangles; if it is drawn as one, mend the gaps that are reported as near misses",
        )
    rows = np.array(hanging, dtype=np.intp).reshape(-1, 3)
    joints, compact = np.unique(network.ends[alive], return_inverse=True)
    trunk = Network(network.xy[joints], compact.reshape(-1, 2).astype(np.intp), network.sources[alive])
    return Trunk(trunk, network, joints, rows[:, :2], rows[:, 2])


def _pieces(network: Network) -> IntArray:
    count = len(network.xy)
    shape = (count, count)
    graph = coo_array((np.ones(len(network.ends)), (network.ends[:, 0], network.ends[:, 1])), shape=shape)
    labels: IntArray = connected_components(graph, directed=False)[1].astype(np.intp)
    return labels


def _extent(network: Network, joints: BoolArray, bars: int) -> str:
    low, high = network.xy[joints].min(axis=0), network.xy[joints].max(axis=0)
    return f"{bars} bars from ({low[0]:.0f}, {low[1]:.0f}) to ({high[0]:.0f}, {high[1]:.0f}) mm"


def _source_at(network: Network) -> IntArray:
    """Return for each joint one line that ends there."""
    sources = np.full(len(network.xy), -1, dtype=np.intp)
    sources[network.ends.ravel()] = np.repeat(network.sources, 2)
    return sources
