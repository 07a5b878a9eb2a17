"""From lines in a plane to the network of joints and bars that is the truss, and everything there is to say of it."""

from __future__ import annotations

from collections.abc import Callable, Sequence

import numpy as np

from spanwright.io.wireframe.cluster import cluster_ends
from spanwright.io.wireframe.marks import FlatMark, joints_marked
from spanwright.io.wireframe.merge import join_straight, merge_repeated
from spanwright.io.wireframe.near import refuse_crowd
from spanwright.io.wireframe.network import Network, Remark
from spanwright.io.wireframe.options import Options
from spanwright.io.wireframe.pieces import Trunk, main_piece, near_misses, trunk_of
from spanwright.io.wireframe.split import find_crossings, split_at_crossings, split_at_joints
from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.model import Role

Say = Callable[[Sequence[Remark]], None]


def clean(
    lines: FloatArray,
    roles: Sequence[Role | None],
    marks: Sequence[FlatMark],
    options: Options,
    tolerance: float,
    say: Say,
) -> Trunk:
    """Make the truss of drawn lines.

    lines : (n, 2, 2) mm. roles : for each line that of its layer, or None. tolerance : mm. say : takes the remarks.

    Raises DrawingError where nothing, or more than one thing, could be the truss; what was said before stays said.
    """
    limit = options.limits.pairs
    network, remarks = cluster_ends(lines, tolerance, limit)
    say(remarks)
    network, remarks = split_at_joints(network, tolerance, limit)
    say(remarks)
    network, remarks = _merged(network, roles)
    say(remarks)
    marked = joints_marked(marks, "supports", network.xy, range(len(network.xy))).joints
    kept = np.isin(np.arange(len(network.xy)), marked)
    network, remarks = join_straight(network, tolerance, kept)
    say(remarks)
    pairs, points = find_crossings(network, tolerance, limit)
    refuse_crowd(len(pairs), options.limits.findings)
    if options.split_crossings:
        network, remarks = split_at_crossings(network, pairs, points, tolerance, limit)
    else:
        remarks = _crossings(network, pairs, points)
    say(remarks)
    say(near_misses(network, tolerance, options.limits))
    network, remarks = main_piece(network)
    say(remarks)
    return trunk_of(network)


def _merged(network: Network, roles: Sequence[Role | None]) -> tuple[Network, tuple[Remark, ...]]:
    """Merge bars drawn more than once, keeping those with a role; say where their roles differ."""
    rank = np.array([role is None for role in roles], dtype=np.intp)
    merged, lines, remarks = merge_repeated(network, rank)
    doubts = [
        Remark("W-409", f"a bar is drawn as {roles[dropped]} and as {roles[kept]}", f"taken as {roles[kept]}", dropped)
        for dropped, kept in np.unique(lines, axis=0).tolist()
        if roles[dropped] is not None and roles[dropped] != roles[kept]
    ]
    return merged, (*remarks, *doubts)


def _crossings(network: Network, pairs: IntArray, points: FloatArray) -> tuple[Remark, ...]:
    done = "left without a joint; split_crossings makes one"
    return tuple(
        Remark("W-309", "two bars cross without a joint", done, int(network.sources[first]), tuple(point))
        for (first, _), point in zip(pairs.tolist(), points.tolist(), strict=True)
    )
