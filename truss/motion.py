"""A mechanism's motion in words: pieces of the truss that turn or slide as one, joints that move by themselves."""

from __future__ import annotations

import numpy as np
from scipy.sparse import coo_array
from scipy.sparse.csgraph import connected_components

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

NAMES_TOLD = 8
"""Joints of a piece, and pieces and joints of a motion, that are named, so that the message stays readable."""

LEAST_PIECE = 3
"""Joints from which a part that moves as one is called a piece: below, a bar turns."""

DIRECTIONS = (
    "to the right",
    "up and to the right",
    "up",
    "up and to the left",
    "to the left",
    "down and to the left",
    "down",
    "down and to the right",
)
"""From the x axis counter-clockwise, one for each eighth of a turn."""


def motion_in_words(truss: Truss, motion: FloatArray) -> str:
    """Return what moves which way, e.g. "T1 moves down" or "the whole truss turns about B0".

    motion : (j, 2), exactly zero where a joint stays, largest displacement 1. The opposite motion is as free.
    """
    alone = np.abs(motion).max(axis=1) > 0.0
    pieces = []
    for joints in _rigid_pieces(truss, motion):
        moving = joints[alone[joints]]
        if len(moving):
            pieces.append((joints, moving))
            alone[moving] = False
    single = np.flatnonzero(alone)
    most_first = single[np.argsort(-np.hypot(motion[single, 0], motion[single, 1]), kind="stable")]
    told = [
        f"{_piece(truss, joints, moving)} {_rigid_motion(truss, motion, joints)}"
        for joints, moving in pieces[:NAMES_TOLD]
    ]
    told += [f"{truss.joint_names[joint]} moves {_direction(motion[joint])}" for joint in most_first[:NAMES_TOLD]]
    return _listed(told[:NAMES_TOLD], len(pieces) + len(single))


def _rigid_pieces(truss: Truss, motion: FloatArray) -> list[IntArray]:
    """Return the joints of each part that moves as one, the largest first: bars that meet and turn alike."""
    across = truss.directions[:, ::-1] * (-1.0, 1.0)
    relative = motion[truss.ends[:, 1]] - motion[truss.ends[:, 0]]
    turns = np.sum(relative * across, axis=1) / truss.lengths * np.ptp(truss.xy, axis=0).max()
    order = np.argsort(turns)
    alike = np.empty_like(order)
    alike[order] = np.concatenate([[0], np.cumsum(np.diff(turns[order]) > TOLERANCES.motionless)])
    # a node for each joint and each way of turning that its bars have; bars link nodes
    nodes, ends = np.unique(alike[:, None] * len(truss.xy) + truss.ends, return_inverse=True)
    links = coo_array((np.ones(len(ends)), ends.reshape(-1, 2).T), shape=(len(nodes), len(nodes)))
    count, part = connected_components(links, directed=False)
    sorted_nodes = np.argsort(part, kind="stable")
    pieces = np.split(nodes[sorted_nodes] % len(truss.xy), np.cumsum(np.bincount(part, minlength=count))[:-1])
    return sorted((piece for piece in pieces if len(piece) >= LEAST_PIECE), key=len, reverse=True)


def _piece(truss: Truss, joints: IntArray, moving: IntArray) -> str:
    if len(joints) == len(truss.joint_names):
        return "the whole truss"
    return f"the piece with {_listed([truss.joint_names[joint] for joint in moving[:NAMES_TOLD]], len(moving))}"


def _direction(vector: FloatArray) -> str:
    eighth = round(float(np.arctan2(vector[1], vector[0])) / (np.pi / 4))
    return DIRECTIONS[eighth % len(DIRECTIONS)]


def _listed(items: list[str], count: int) -> str:
    """Return "a, b and c", or "a, b and 7 more" where the items are the first of more."""
    if count > len(items):
        return ", ".join(items) + f" and {count - len(items)} more"
    return ", ".join(items[:-1]) + " and " + items[-1] if count > 1 else items[0]


def _rigid_motion(truss: Truss, motion: FloatArray, joints: IntArray) -> str:
    """Return how a piece moves: "slides ..." or "turns about ...", by least squares about its middle."""
    middle = truss.xy[joints].mean(axis=0)
    arms = truss.xy[joints] - middle
    across = arms[:, ::-1] * (-1.0, 1.0)
    shift = motion[joints].mean(axis=0)
    turn = float(np.sum(across * motion[joints]) / np.sum(arms**2))
    if abs(turn) * np.ptp(truss.xy, axis=0).max() < TOLERANCES.motionless:
        return f"slides {_direction(shift)}"
    centre = middle + np.array([-shift[1], shift[0]]) / turn
    off = np.hypot(*(truss.xy - centre).T)
    if off.min() < TOLERANCES.same_point:
        return f"turns about {truss.joint_names[int(off.argmin())]}"
    x, y = centre / 1000.0
    return f"turns about the point x = {x:.3g} m, y = {y:.3g} m"
