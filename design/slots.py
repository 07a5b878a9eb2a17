"""Tubes that cannot be welded to what they meet all round, and so are slotted over a gusset."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.groups import Group
from spanwright.design.lying import TUBES
from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.model import Truss

SLOT_CLEARANCE = 3.0
"""mm by which a slot is wider than its gusset (common practice)."""


def slotted_ends(truss: Truss, groups: Sequence[Group], options: Sequence[Candidates]) -> BoolArray:
    """Return (b, 2) True for the ends of tube webs that meet angles: a chord there, or where no chord is, any bar."""
    angles = np.zeros(len(truss.bar_names), dtype=np.bool_)
    for group, candidates in zip(groups, options, strict=True):
        angles[group.bars] = candidates.family not in TUBES
    slotted = np.zeros(truss.ends.shape, dtype=np.bool_)
    chord = np.array(["chord" in role for role in truss.roles])
    if not angles.any() or angles[~chord].all():
        return slotted
    for bar in np.flatnonzero(~chord & ~angles):
        for end, joint in enumerate(truss.ends[bar]):
            here = (truss.ends == joint).any(axis=1)
            past = here & chord if (here & chord).any() else here
            slotted[bar, end] = angles[past].any()
    return slotted


def slot_widths(truss: Truss, groups: Sequence[Group], options: Sequence[Candidates], gusset: float) -> FloatArray:
    """Return (b,) mm, the width of each bar's slots over gussets of that thickness, 0 where it has none."""
    slotted = slotted_ends(truss, groups, options).any(axis=1)
    return np.where(slotted, gusset + SLOT_CLEARANCE, 0.0)
