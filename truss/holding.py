"""What would hold a mechanism: bars between joints near each other, or support in a direction."""

from __future__ import annotations

import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.model import Support, Truss
from spanwright.truss.tolerances import TOLERANCES

NEIGHBOURS = 12
"""Joints around a moving one that a new bar may go to: those of its own and the next panels."""

PAIRS_TRIED = 50
"""Possible new bars looked at, most strained first, for one that crosses no other."""

Hold = tuple[int, int] | Support
"""A bar between two joints, or a support in one direction."""


def what_would_hold(truss: Truss, held: BoolArray, motions: FloatArray) -> tuple[Hold, ...]:
    """Return one hold for each motion, which together stop them all.

    held : (j, 2). motions : (m, j, 2), independent, largest displacement 1. For each motion in turn: the bar between
    neighbours that it would strain most, preferably one that crosses no other; where it strains none, a support. What
    this leaves free of the other motions goes on to the next.
    """
    left = motions.copy()
    holds: list[Hold] = []
    for row in range(len(left)):
        bar = _new_bar(truss, left[row])
        hold: Hold = bar if bar is not None else _new_support(truss, held, left[row])
        resisted = _resisted(truss, hold, left)
        left[row + 1 :] -= (resisted[row + 1 :] / resisted[row])[:, None, None] * left[row]
        holds.append(hold)
    return tuple(holds)


def hold_in_words(truss: Truss, hold: Hold) -> str:
    """Return e.g. "a bar from T1 to B2" or "a support that holds B0 sideways"."""
    if isinstance(hold, Support):
        return f"a support that holds {truss.joint_names[hold.joint]} {'sideways' if hold.x else 'vertically'}"
    return f"a bar from {truss.joint_names[hold[0]]} to {truss.joint_names[hold[1]]}"


def _resisted(truss: Truss, hold: Hold, motions: FloatArray) -> FloatArray:
    """Return (m,) how far each motion moves what the hold keeps still."""
    if isinstance(hold, Support):
        return motions[:, hold.joint, 0 if hold.x else 1]
    first, second = hold
    along = truss.xy[second] - truss.xy[first]
    elongations: FloatArray = (motions[:, second] - motions[:, first]) @ along / np.hypot(*along)
    return elongations


def _new_bar(truss: Truss, motion: FloatArray) -> tuple[int, int] | None:
    small = TOLERANCES.motionless * np.abs(motion).max()
    pairs = _open_pairs(truss, np.flatnonzero(np.abs(motion).max(axis=1) > small))
    along = truss.xy[pairs[:, 1]] - truss.xy[pairs[:, 0]]
    lengths = np.hypot(along[:, 0], along[:, 1])
    elongations = np.abs(np.sum((motion[pairs[:, 1]] - motion[pairs[:, 0]]) * along, axis=1)) / lengths
    strains = elongations / lengths
    straining = np.flatnonzero(elongations > small)
    # equal strains, but for rounding, rank by length to the mm and then by joint number
    steps = np.rint(strains[straining] / (TOLERANCES.motionless * strains.max(initial=0.0)))
    ranked = straining[np.lexsort((np.rint(lengths[straining]), -steps))][:PAIRS_TRIED]
    possible = [(int(first), int(second)) for first, second in pairs[ranked]]
    clear = (pair for pair in possible if not _crosses_bar(truss, *pair))
    return next(clear, possible[0] if possible else None)


def _open_pairs(truss: Truss, moving: IntArray) -> IntArray:
    """Return (p, 2) pairs of a moving joint and one near it that no bar connects, each once."""
    from scipy.spatial import KDTree  # heavy, and needed for mechanisms only

    joints = len(truss.xy)
    reach = min(NEIGHBOURS + 1, joints)  # the joint itself is its own nearest
    near = KDTree(truss.xy).query(truss.xy[moving], reach)[1].reshape(len(moving), reach)
    pairs = np.sort(np.column_stack([np.repeat(moving, reach), near.ravel()]), axis=1)
    numbers = np.unique(pairs[pairs[:, 0] < pairs[:, 1]] @ [joints, 1])
    taken = np.sort(truss.ends, axis=1) @ [joints, 1]
    return np.column_stack(np.divmod(np.setdiff1d(numbers, taken), joints))


def _crosses_bar(truss: Truss, first: int, second: int) -> bool:
    """Whether the line between two joints crosses a bar that ends at neither."""
    apart = ~np.isin(truss.ends, (first, second)).any(axis=1)
    start, end = truss.xy[truss.ends[apart, 0]], truss.xy[truss.ends[apart, 1]]
    a, b = truss.xy[first], truss.xy[second]
    splits_bar = _side(a, b, start) * _side(a, b, end) < 0.0
    split_by_bar = _side(start, end, a) * _side(start, end, b) < 0.0
    return bool(np.any(splits_bar & split_by_bar))


def _side(start: FloatArray, end: FloatArray, point: FloatArray) -> FloatArray:
    """Return twice the area of the triangles start, end, point: positive to the left of the line."""
    along, to = end - start, point - start
    area: FloatArray = along[..., 0] * to[..., 1] - along[..., 1] * to[..., 0]
    return area


def _new_support(truss: Truss, held: BoolArray, motion: FloatArray) -> Support:
    """Return a support in the direction and at the joint that move most: of equals bearings first, then the lowest."""
    pushed = np.abs(motion)
    joints, axes = np.nonzero(pushed > (1.0 - TOLERANCES.motionless) * pushed.max())
    bearing = held[joints].any(axis=1)
    best = np.lexsort((truss.xy[joints, 0], truss.xy[joints, 1], ~bearing))[0]
    return Support(int(joints[best]), bool(axes[best] == 0), bool(axes[best] == 1))
