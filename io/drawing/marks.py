"""Marks and section names along the members, joint names and the numbers of purlin lines, so that none overlap."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import product

import numpy as np

from spanwright.design.cutting import Cut, cuts
from spanwright.design.lying import edges
from spanwright.design.result import Design
from spanwright.io.drawing.holding import PURLIN, Signs
from spanwright.io.drawing.lettering import TEXT, cut_to, width_of
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.places import Occupied, along_member, near_point, with_leader
from spanwright.io.drawing.standards import JOINTS, MARKS, PURLINS, Layer
from spanwright.io.pictures.boxes import box, boxes_along
from spanwright.truss.arrays import FloatArray

BALLOON = 2.3
"""mm on paper: radius of the circle round the number of a purlin line."""
CLEAR = 0.5
"""mm on paper left free on all sides of a text."""
OFF = 0.9
"""mm on paper between a member's edge and the text beside it."""
BEYOND_SIGNS = 8.4
"""mm on paper from a chord to texts beyond its purlins and joint names."""
LEADERS = tuple(np.arange(6.0, 54.0, 3.0))
"""mm on paper: lengths of leaders, tried in this order."""
WIDEST_MARK = 60.0
"""mm on paper: a longer mark is cut short."""
LED_TO = (0.5, 0.42, 0.58, 0.34, 0.66)
"""Places along a member that its leader may point to, as shares of its length."""
ABOVE = (90.0, 60.0, 120.0, 40.0, 140.0, 0.0, 180.0)
BELOW = (270.0, 300.0, 240.0, 320.0, 220.0, 0.0, 180.0)
BESIDE = (180.0, 0.0, 135.0, 45.0, 225.0, 315.0, 90.0, 270.0)
"""Directions in which the name of a joint of the top chord, of the bottom chord, or of neither or both is tried."""


@dataclass(frozen=True, eq=False)
class Label:
    """One text on the elevation.

    middle : (2,) model mm. angle : degrees. leader : (2, 2), text first, or None. ringed : has it a circle round it?
    bar : the first bar of the member that it marks, "" where it marks none.
    """

    text: str
    middle: FloatArray
    angle: float
    layer: Layer
    leader: FloatArray | None = None
    ringed: bool = False
    bar: str = ""

    def box(self, scale: float) -> FloatArray:
        """Return the (6,) box of its letters, model mm."""
        return box(self.middle, np.radians(self.angle), width_of(self.text) * scale, TEXT * scale)


def labels(design: Design, found: Signs, dimensions: FloatArray) -> tuple[Label, ...]:
    """Return every text of an elevation at the scale of its signs, clear of the (n, 6) boxes of its dimensions."""
    scale = found.scale
    occupied = Occupied(np.vstack([_steel(design), found.brace_boxes]), found.boxes, dimensions)
    placed = [*_purlin_numbers(design, found, occupied), *_joint_names(design, scale, occupied)]
    left = []
    for cut in sorted(cuts(design.setting, design.choices), key=lambda cut: cut.axis):
        along = _along(design, cut, scale, occupied)
        placed += along
        left += [] if along else [cut]
    for cut in left:
        placed += _with_leader(design, cut, scale, occupied)
    return tuple(placed)


def _steel(design: Design) -> FloatArray:
    """Return the boxes of the steel and of the setting-out lines between."""
    truss = design.setting.truss
    found = [boxes_along(truss.xy[truss.ends], 1.0)]
    for cut in cuts(design.setting, design.choices):
        lower, upper = edges(cut.choice.section, cut.choice.group.role)
        across = np.array([-cut.direction[1], cut.direction[0]])
        line = np.array([cut.start, cut.finish]) + (lower + upper) / 2.0 * across
        found.append(boxes_along(line[None], upper - lower))
    return np.vstack(found)


def _size(text: str, scale: float) -> tuple[float, float]:
    return (width_of(text) + 2.0 * CLEAR) * scale, (TEXT + 2.0 * CLEAR) * scale


def mark_of(design: Design, cut: Cut) -> str:
    """Return the marks of the pieces that lie side by side in a run: "2 x P1-BC1", "P1-TC1L + P1-TC1R"."""
    first = design.setting.truss.bar_names[cut.bars[0]]
    marks = [
        piece.mark for piece in design.pieces if first in piece.bars and piece.section in cut.choice.section.piece_names
    ]
    same = cut.choice.section.pieces > len(marks)
    return cut_to(f"{cut.choice.section.pieces} x {marks[0]}" if same else " + ".join(marks), WIDEST_MARK)


def section_of(cut: Cut) -> str:
    """Return the section in short: "2L 65x50x5"; which way round it stands is in the cross-sections."""
    return cut.choice.name.split(",")[0]


def _in_one(design: Design, cut: Cut) -> str:
    return f"{mark_of(design, cut)}  {section_of(cut)}"


def _along(design: Design, cut: Cut, scale: float, occupied: Occupied) -> list[Label]:
    """Place mark and section along a member: in one line, else one on either side, else nothing."""
    mark, section = mark_of(design, cut), section_of(cut)
    together = _beside(design, _in_one(design, cut), cut, scale, occupied)
    if together:
        return [together]
    before = occupied.texts
    apart = [_beside(design, text, cut, scale, occupied) for text in (mark, section)]
    if all(apart):
        return [label for label in apart if label]
    occupied.texts = before
    return []


def _beside(design: Design, text: str, cut: Cut, scale: float, occupied: Occupied) -> Label | None:
    lower, upper = edges(cut.choice.section, cut.choice.group.role)
    away = max(upper, -lower) + (OFF - CLEAR) * scale
    role = cut.choice.group.role
    aways = (away, away + BEYOND_SIGNS * scale) if "chord" in role else (away,)
    sides = (-1.0, 1.0) if role == "bottom chord" else (1.0, -1.0)
    place = along_member(_joint_to_joint(design, cut), _size(text, scale), aways, sides, occupied)
    if place is None:
        return None
    return Label(text, place.middle, place.angle, MARKS, bar=design.setting.truss.bar_names[cut.bars[0]])


def _joint_to_joint(design: Design, cut: Cut) -> FloatArray:
    """Return the ends (2, 2) of a run: its joints, of a chord with an overhang its tip."""
    joints = design.setting.truss.xy[design.setting.truss.ends[list(cut.bars)].ravel()]
    points = np.vstack([joints, cut.start, cut.finish])
    along = (points - cut.start) @ cut.direction
    return np.array([points[along.argmin()], points[along.argmax()]])


def _with_leader(design: Design, cut: Cut, scale: float, occupied: Occupied) -> Iterator[Label]:
    """Set mark and section off a member that is too short for them, with a leader; at worst the mark alone at it."""
    text = _in_one(design, cut)
    reaches = [reach * scale for reach in LEADERS]
    for over_signs, share in product((False, True), LED_TO):
        at = cut.start + share * (cut.finish - cut.start)
        found = with_leader(at, _size(text, scale), reaches, occupied, over_signs=over_signs)
        if found:
            break
    if found:
        bar = design.setting.truss.bar_names[cut.bars[0]]
        yield Label(text, found[0].middle, 0.0, MARKS, found[1], bar=bar)
    elif alone := _beside(design, mark_of(design, cut), cut, scale, occupied):
        yield alone


def _purlin_numbers(design: Design, found: Signs, occupied: Occupied) -> Iterator[Label]:
    for line, (ring, upward, _) in zip(design.setting.restraint.lines, found.purlins, strict=True):
        text, scale = str(line.number), found.scale
        bearing = float(np.degrees(np.arctan2(upward[1], upward[0])))
        place = near_point(
            ring.mean(axis=0),
            (2.0 * BALLOON * scale, 2.0 * BALLOON * scale),
            ((PURLIN / 2.0 + 0.3) * scale, (PURLIN / 2.0 + 3.0) * scale),
            (bearing, bearing + 40.0, bearing - 40.0),
            occupied,
        )
        if place:
            yield Label(text, place.middle, 0.0, PURLINS, ringed=True)


def _joint_names(design: Design, scale: float, occupied: Occupied) -> Iterator[Label]:
    truss = design.setting.truss
    top, bottom = set(truss.top.joints), set(truss.bottom.joints)
    reaches = [reach * scale for reach in (1.5, 3.0, 4.5, 6.5, 9.0)]
    for joint, name in enumerate(truss.joint_names):
        in_one = (joint in top) != (joint in bottom)
        bearings: Sequence[float] = BESIDE if not in_one else ABOVE if joint in top else BELOW
        place = near_point(truss.xy[joint], _size(name, scale), reaches, bearings, occupied)
        if place:
            yield Label(name, place.middle, 0.0, JOINTS)


def draw_labels(pen: Pen, found: Sequence[Label]) -> None:
    """Letter the texts and draw their leaders, which end on the member with a dot."""
    for label in found:
        pen.text(label.layer, label.middle, label.text, across="centre", up="middle", angle=label.angle)
        if label.ringed:
            pen.circle(label.layer, label.middle, BALLOON * pen.scale)
        if label.leader is not None:
            pen.line(MARKS, *label.leader)
            pen.area(MARKS, label.leader[1] + 0.45 * pen.scale * _disc())


def _disc() -> FloatArray:
    turn = np.linspace(0.0, 2.0 * np.pi, 13)[:-1]
    return np.column_stack([np.cos(turn), np.sin(turn)])
