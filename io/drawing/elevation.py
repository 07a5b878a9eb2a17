"""The elevation of a truss: setting-out lines, steel true to size, signs, marks and dimensions, in model mm."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.cutting import cuts
from spanwright.design.result import Design
from spanwright.io.drawing.dimensions import Dimension, dimensions, draw_dimensions
from spanwright.io.drawing.holding import Signs, draw_signs, signs
from spanwright.io.drawing.marks import Label, draw_labels, labels
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.standards import HIDDEN_LEGS, LEGS, MEMBERS, SETTING_OUT
from spanwright.io.drawing.steel import Outline, outlines
from spanwright.io.pictures.boxes import corners
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import slopes
from spanwright.truss.model import Truss

MARGIN = 2.0
"""mm on paper left free around the elevation in its viewport."""


@dataclass(frozen=True, eq=False)
class Elevation:
    """An elevation laid out at 1:scale; low, high : (2,) model mm, the corners of all that belongs to it."""

    scale: int
    steel: tuple[Outline, ...]
    signs: Signs
    labels: tuple[Label, ...]
    dimensions: tuple[Dimension, ...]
    low: FloatArray
    high: FloatArray

    @property
    def size(self) -> FloatArray:
        """(2,) width and height on paper, mm."""
        size: FloatArray = (self.high - self.low) / self.scale
        return size

    @property
    def wanting(self) -> tuple[int, int]:
        """Number of members without a label, and of labels that stand off their member, with a leader."""
        marked = {label.bar for label in self.labels}
        bare = sum(marked.isdisjoint(outline.bars) for outline in self.steel)
        return bare, sum(label.leader is not None for label in self.labels)


def lay_out(design: Design, scale: int) -> Elevation:
    """Lay out the elevation of a passing design at 1:scale."""
    steel = outlines(design)
    outer = np.vstack([cut.outline for cut in cuts(design.setting, design.choices)])
    found = signs(design, scale)
    measured = dimensions(design.setting.truss, outer, scale)
    lines = np.vstack([one.boxes(scale) for one in measured])
    texts = labels(design, found, lines)
    around = [corners(one) for one in (*lines, *found.boxes, *(label.box(scale) for label in texts))]
    points = np.vstack([outer, *around])
    margin = MARGIN * scale
    low, high = points.min(axis=0) - margin, points.max(axis=0) + margin
    return Elevation(scale, steel, found, texts, measured, low, high)


def draw_elevation(pen: Pen, design: Design, elevation: Elevation) -> None:
    """Draw an elevation in model space."""
    for line in setting_out(design.setting.truss):
        pen.line(SETTING_OUT, *line)
    for outline in elevation.steel:
        pen.path(MEMBERS, outline.ring, closed=True)
        if outline.edge is not None:
            pen.line(HIDDEN_LEGS if outline.behind else LEGS, *outline.edge)
    draw_signs(pen, elevation.signs)
    draw_labels(pen, elevation.labels)
    draw_dimensions(pen, elevation.dimensions)


def setting_out(truss: Truss) -> list[FloatArray]:
    """Return the setting-out line (2, 2) of every bar in order, and of every overhang."""
    lines = [np.array(truss.xy[list(ends)]) for ends in truss.ends]
    directions = slopes(truss).directions
    joints = (truss.top.joints[0], truss.top.joints[-1])
    for joint, overhang, outward in zip(joints, truss.top.overhang, (-directions[0], directions[-1]), strict=True):
        if overhang > 0.0:
            lines.append(np.array([truss.xy[joint], truss.xy[joint] + overhang * outward]))
    return lines
