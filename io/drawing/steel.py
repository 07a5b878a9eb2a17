"""The steel in elevation: each rolled piece as the eye sees it from the front, true to size, mm."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.cut_ends import End
from spanwright.design.cutting import Cut, cuts
from spanwright.design.lying import TUBES, Lying, lying
from spanwright.design.result import Design
from spanwright.truss.arrays import FloatArray

CURVE = 17
"""Points that draw one profiled end of a round tube."""


@dataclass(frozen=True, eq=False)
class Outline:
    """One piece in elevation.

    bars : names of the bars it makes up. ring : (n, 2) mm, its closed outline. edge : (2, 2) mm, the edge of its
    outstanding leg, or None of a tube. behind : whether it stands behind the gusset, so that its edge is hidden.
    along : (2,) unit vector from its start to its finish.
    """

    bars: tuple[str, ...]
    ring: FloatArray
    edge: FloatArray | None
    behind: bool
    along: FloatArray

    @property
    def length(self) -> float:
        """Length tip to tip along the piece, mm."""
        return float(np.ptp(self.ring @ self.along))


def outlines(design: Design) -> tuple[Outline, ...]:
    """Return what is seen of every piece; of a pair back to back the angle in front hides the one behind."""
    radii = {
        name: float(choice.section.depth[0]) / 2.0
        for choice in design.choices
        for name in choice.section.piece_names
        if choice.section.family == "CHS"
    }
    found = []
    for cut in cuts(design.setting, design.choices):
        seen = lying(cut.choice.section, cut.choice.group.role)
        if cut.choice.section.family == "2L":
            seen = tuple(lies for lies in seen if not lies.far)
        names = tuple(design.setting.truss.bar_names[bar] for bar in cut.bars)
        found += [Outline(names, _ring(cut, lies, radii), _edge(cut, lies), lies.far, cut.direction) for lies in seen]
    return tuple(found)


def _ring(cut: Cut, lies: Lying, radii: dict[str, float]) -> FloatArray:
    across = np.array([-cut.direction[1], cut.direction[0]])
    rows = []
    for point, end, outward in ((cut.start, cut.ends[0], -1.0), (cut.finish, cut.ends[1], 1.0)):
        heights = _heights(end, lies, cut)
        beyond = end.slant * heights + outward * _bulge(end, heights, cut, radii)
        rows.append(point + heights[:, None] * across + beyond[:, None] * cut.direction)
    ring: FloatArray = np.vstack([rows[0][::-1], rows[1]])
    return ring


def _heights(end: End, lies: Lying, cut: Cut) -> FloatArray:
    """Return places across the piece, lower edge first, between which its end is drawn straight."""
    if end.kind == "profile" and cut.choice.section.family == "CHS":
        turn = np.linspace(-np.pi / 2.0, np.pi / 2.0, CURVE)
        return np.asarray(lies.upper * np.sin(turn))
    return np.array([lies.lower, lies.upper])


def _bulge(end: End, heights: FloatArray, cut: Cut, radii: dict[str, float]) -> FloatArray:
    """Return mm by which a profiled end reaches beyond the flat face at each height (geometry of two cylinders)."""
    if end.kind != "profile":
        return np.zeros(len(heights))
    section, radius = cut.choice.section, radii[end.tube]
    half = float(section.width[0]) / 2.0
    aside = np.sqrt(np.maximum(half**2 - heights**2, 0.0)) if section.family == "CHS" else np.full(len(heights), half)
    bulge: FloatArray = (radius - np.sqrt(np.maximum(radius**2 - aside**2, 0.0))) * np.hypot(1.0, end.slant)
    return bulge


def _edge(cut: Cut, lies: Lying) -> FloatArray | None:
    """Return the inner edge of the outstanding leg, between the two ends."""
    section = cut.choice.section
    if section.family in TUBES:
        return None
    thickness = float(section.thickness[0])
    height = lies.upper - thickness if lies.heel_up else lies.lower + thickness
    across = np.array([-cut.direction[1], cut.direction[0]])
    return np.array(
        [
            point + height * (across + end.slant * cut.direction)
            for point, end in ((cut.start, cut.ends[0]), (cut.finish, cut.ends[1]))
        ]
    )
