"""The role of every bar: by the layers that the user named, else by geometry."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

import networkx as nx
import numpy as np

from spanwright.io.wireframe.envelope import Path, chords_of, straight_through, upright
from spanwright.io.wireframe.network import Network, Remark
from spanwright.io.wireframe.outline import outline_of
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import DrawingError
from spanwright.truss.model import ROLES, Role
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True, eq=False)
class Recognised:
    """A network with its chords (joints left to right) and the role of every bar."""

    network: Network
    top: Path
    bottom: Path
    roles: tuple[Role, ...]


def recognise(
    network: Network, by_layer: Sequence[Role | None], tolerance: float
) -> tuple[Recognised, tuple[Remark, ...]]:
    """Give every bar its role.

    by_layer : for each bar the role of its layer, or None. tolerance : mm.

    Raises DrawingError where a chord is no single line from left to right.
    """
    top, bottom = (_by_layer(network, by_layer, role) for role in ROLES[:2])
    remarks: tuple[Remark, ...] = ()
    if not (top and bottom):
        upper, lower, remarks = chords_of(network, outline_of(network, tolerance), tolerance)
        top, bottom = top or upper, bottom or lower
    rows = {frozenset(ends): row for row, ends in enumerate(network.ends.tolist())}
    top_bars = [rows[frozenset(pair)] for pair in pairwise(top)]
    bottom_bars = [rows[frozenset(pair)] for pair in pairwise(bottom)]
    shared = set(top_bars) & set(bottom_bars)
    if shared:
        x, y = network.xy[network.ends[shared.pop()]].mean(axis=0)
        raise DrawingError(
            f"the top and the bottom chord run along the same bar, at x = {x:.0f}, y = {y:.0f} mm",
            "name the layers of both chords, or join what stands on either side of that bar by a second one",
        )
    roles: list[Role] = [role or "diagonal" for role in by_layer]
    for bar in _posts(network, top, {*top_bars, *bottom_bars}, tolerance):
        roles[bar] = by_layer[bar] or "post"
    for bar in top_bars:
        roles[bar] = "top chord"
    for bar in bottom_bars:
        roles[bar] = "bottom chord"
    return Recognised(network, top, bottom, tuple(roles)), remarks


def _by_layer(network: Network, by_layer: Sequence[Role | None], role: Role) -> Path:
    """Return the joints of a chord along the bars that a layer gave its role, or () where there are none."""
    graph: nx.Graph[int] = nx.Graph()
    graph.add_edges_from(
        (start, end) for (start, end), given in zip(network.ends.tolist(), by_layer, strict=True) if given == role
    )
    if not graph:
        return ()
    odd = [joint for joint, degree in graph.degree if degree > 2]
    ends = sorted((joint for joint, degree in graph.degree if degree == 1), key=lambda joint: network.place(joint))
    if odd or len(ends) != 2 or not nx.is_connected(graph):
        x, y = network.place((odd or ends or list(graph))[0])
        what = "branches" if odd else "is broken or closed: it does not run in one line from left to right"
        raise DrawingError(
            f"the {role}, as its layers give it, {what}, at x = {x:.0f}, y = {y:.0f} mm",
            "mend the layers of those bars, or leave the chord to be found by geometry",
            f"roles.{role}",
        )
    return tuple(nx.shortest_path(graph, ends[0], ends[1]))


def _posts(network: Network, top: Path, chord_bars: set[int], tolerance: float) -> list[int]:
    """Return the webs that are posts: upright ones; and struts below a chord that runs straight on.

    Where such a joint of the top chord has no upright web, its strut is its only web, or the only one square to
    the chord.
    """
    webs_at: dict[int, list[int]] = {joint: [] for joint in top}
    posts = []
    for bar, (start, end) in enumerate(network.ends.tolist()):
        if bar not in chord_bars:
            if upright(network.xy[end] - network.xy[start], tolerance):
                posts.append(bar)
            for joint in (start, end):
                if joint in webs_at:
                    webs_at[joint].append(bar)
    found = set(posts)
    for before, at, after in zip(top, top[1:], top[2:], strict=False):
        webs = webs_at[at]
        if found.isdisjoint(webs) and straight_through(
            network.xy[before], network.xy[at], network.xy[after], tolerance
        ):
            along = network.xy[after] - network.xy[before]
            square = webs if len(webs) == 1 else [bar for bar in webs if _square(network, bar, along, tolerance)]
            posts += square if len(square) == 1 else []
    return posts


def _square(network: Network, bar: int, along: FloatArray, tolerance: float) -> bool:
    step = network.xy[network.ends[bar, 1]] - network.xy[network.ends[bar, 0]]
    length = float(np.hypot(*step))
    cosine = abs(step @ along) / (length * float(np.hypot(*along)))
    return bool(cosine <= TOLERANCES.off_upright + 2 * tolerance / length)
