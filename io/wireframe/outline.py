"""The outline of a truss: the two ways round it from the left end to the right, over the top and along the bottom."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from spanwright.io.wireframe.network import Network
from spanwright.truss.arrays import BoolArray
from spanwright.truss.errors import DrawingError

_FULL = 2 * math.pi


@dataclass(frozen=True)
class Outline:
    """Joints along the upper and the lower side, left to right; both begin at the lowest of the leftmost joints."""

    upper: tuple[int, ...]
    lower: tuple[int, ...]


def outline_of(network: Network, tolerance: float) -> Outline:
    """Walk round the outer face of the network, keeping to the right; joints within the tolerance (mm) share an x.

    Raises DrawingError where bars that cross without a joint cut the right end off.
    """
    left, right = outermost(network, tolerance)
    walk = _walk(network, left)
    if right not in walk:
        x, y = network.place(right)
        raise DrawingError(
            f"the outline cannot be followed from the left end to the right, at x = {x:.0f}, y = {y:.0f} mm",
            "name the layers of the chords, or draw joints where outer bars cross",
        )
    turn = walk.index(right)
    return Outline(tuple(reversed(walk[turn:])), tuple(walk[: turn + 1]))


def outermost(network: Network, tolerance: float) -> tuple[int, int]:
    """Return the lowest of the leftmost and of the rightmost joints; joints within the tolerance (mm) share an x."""
    left = _lowest(network, network.xy[:, 0] <= network.xy[:, 0].min() + 2 * tolerance)
    right = _lowest(network, network.xy[:, 0] >= network.xy[:, 0].max() - 2 * tolerance)
    return left, right


def _lowest(network: Network, among: BoolArray) -> int:
    rows = np.flatnonzero(among)
    return int(rows[np.argmin(network.xy[rows, 1])])


def _walk(network: Network, start: int) -> list[int]:
    """Return the joints round the outer face from `start` back to it, the face on the right hand."""
    beside = _neighbours(network)
    # at the start the outer face lies to the left of the truss, so the walk begins as if it came from there
    walk, back, previous = [start], math.pi, -1
    while len(walk) <= 2 * len(network.ends) + 1:
        at = walk[-1]
        turns = [(_FULL if other == previous else (angle - back) % _FULL, other, angle) for other, angle in beside[at]]
        _, following, angle = min(turns)
        if at == start and len(walk) > 1 and following == walk[1]:
            break
        walk.append(following)
        back, previous = math.remainder(angle + math.pi, _FULL), at
    return walk


def _neighbours(network: Network) -> list[list[tuple[int, float]]]:
    """Return for each joint the joints it is joined to, and the direction to each in rad."""
    beside: list[list[tuple[int, float]]] = [[] for _ in network.xy]
    steps = network.vectors()
    angles = np.arctan2(steps[:, 1], steps[:, 0]).tolist()
    for (start, end), angle in zip(network.ends.tolist(), angles, strict=True):
        beside[start].append((end, angle))
        beside[end].append((start, math.remainder(angle + math.pi, _FULL)))
    return beside
