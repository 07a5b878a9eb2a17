"""The picture `utilisation`: the truss to scale, each member coloured by how far it is used, with its value."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from spanwright.design.result import Design
from spanwright.design.sizing import Governing
from spanwright.io.pictures.boxes import box, boxes_along
from spanwright.io.pictures.joints import draw_joint_names, draw_joints
from spanwright.io.pictures.labels import Occupied
from spanwright.io.pictures.legend import band_signs, draw_legend, holding_signs, in_lines, member_signs
from spanwright.io.pictures.lettering import width_of
from spanwright.io.pictures.members import Member, draw_members
from spanwright.io.pictures.page import FOOT_TOP, HEADING_BOTTOM, LEFT, RIGHT, draw_foot, draw_heading, draw_scale
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.state import GroupState, group_states, member_states
from spanwright.io.pictures.style import SMALL, Pen, pen_for
from spanwright.io.pictures.symbols import draw_holding, draw_overhangs, taken_by_signs
from spanwright.io.pictures.tables import Table, draw_table, height_of_table
from spanwright.io.pictures.values import Value, draw_balloon, draw_values, place_values
from spanwright.io.pictures.view import View, Zone, overhang_tips, view_of
from spanwright.io.text import rounded_up
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.restraint import Restraint

BALLOON_COLUMN = 5.0
"""mm to the left of the table, for the letters of the groups."""

GROUPS_SHOWN = 12
"""Rows of groups that the sheet has room for; all are in results.json."""

AROUND = 11.0
"""mm kept free above and below the truss, for labels, purlins and bearings."""

STRIP = 9.0
"""Height of the strip between truss and legend that holds the scale and the key of values without room, mm."""

KEY_LEFT = LEFT + 92.0
KEY_STEP = 2.8
KEY_LINES = 3
"""Where the lines of the key begin, their distance, mm, and how many there is room for."""


def utilisation_sheet(design: Design) -> Sheet:
    """Return the sheet of the picture `utilisation`."""
    sheet = Sheet()
    truss, restraint = design.setting.truss, design.setting.restraint
    groups = group_states(design)
    draw_heading(sheet, design, "Utilisation")
    draw_foot(sheet, design)
    bottom = _draw_beneath(sheet, groups, restraint) + 2.5
    zone = Zone(LEFT + 6.0, bottom + STRIP + AROUND, RIGHT - 6.0, HEADING_BOTTOM - AROUND)
    view = view_of(truss, restraint, zone)
    draw_scale(sheet, view, LEFT + 1.0, bottom)
    segments = view.onto(truss.xy[truss.ends])
    states = member_states(design, groups)
    members = [Member(*found) for found in zip(segments, truss.roles, states, strict=True)]
    _draw_key(sheet, _draw_truss(sheet, truss, restraint, view, members), bottom)
    return sheet


def _draw_truss(
    sheet: Sheet, truss: Truss, restraint: Restraint, view: View, members: Sequence[Member]
) -> tuple[Value, ...]:
    pen = pen_for(truss.lengths / view.denominator)
    joints = view.onto(truss.xy)
    draw_overhangs(sheet, truss, view, pen)
    draw_members(sheet, members, pen)
    draw_joints(sheet, joints, pen.joint)
    draw_holding(sheet, truss, restraint, view, pen)
    for member in members:
        if member.state.letter:
            draw_balloon(sheet, member.segment.mean(axis=0), member.state.letter, pen)
    occupied = Occupied(np.vstack([_taken(truss, view, members, pen), taken_by_signs(truss, restraint, view, pen)]))
    values = place_values(members, occupied, pen)
    draw_values(sheet, values)
    draw_joint_names(sheet, truss, joints, pen.joint, occupied)
    return values


def _taken(truss: Truss, view: View, members: Sequence[Member], pen: Pen) -> FloatArray:
    """Return the boxes of members, joints, discs and overhangs, which labels must keep clear of."""
    segments = np.array([member.segment for member in members])
    widths = np.array([member.width(pen) + 2.0 * pen.casing for member in members])
    boxes = [box(joint, 0.0, 2.0 * pen.joint, 2.0 * pen.joint) for joint in view.onto(truss.xy)]
    for member in (member for member in members if member.state.letter):
        angle = float(np.arctan2(member.span[1], member.span[0]))
        boxes.append(box(member.segment.mean(axis=0), angle, 2.0 * pen.balloon, 2.0 * pen.balloon))
    tips = [view.onto(np.array([[truss.xy[joint], tip]])) for joint, tip in overhang_tips(truss)]
    return np.vstack([boxes_along(segments, widths), *boxes, *(boxes_along(tip, pen.strut) for tip in tips)])


def _draw_beneath(sheet: Sheet, groups: tuple[GroupState, ...], restraint: Restraint) -> float:
    """Draw table and legend up from the foot, and return the height at which they end."""
    table = _table(groups[:GROUPS_SHOWN])
    top = FOOT_TOP + 3.0 + height_of_table(table)
    rows = draw_table(sheet, table, LEFT + BALLOON_COLUMN, top, RIGHT - LEFT - BALLOON_COLUMN)
    for group, middle in zip(groups, rows, strict=False):
        draw_balloon(sheet, np.array([LEFT + 1.8, middle]), group.letter, Pen(1.0))
    width = RIGHT - LEFT
    lines = [*in_lines(band_signs(), width), *in_lines((*member_signs(), *holding_signs(restraint)), width)]
    return draw_legend(sheet, lines, LEFT, top + 1.5)


def _table(groups: tuple[GroupState, ...]) -> Table:
    return Table(
        headings=("group", "section", "member", "utilisation", "governing check", "combination"),
        rows=[
            (
                group.choice.group.name,
                group.choice.name,
                group.governing.bar,
                rounded_up(group.governing.ratio),
                _check(group.governing),
                group.governing.combination or "any",
            )
            for group in groups
        ],
        right=frozenset({3}),
    )


def _check(found: Governing) -> str:
    return f"{'limit: ' if found.kind == 'limit' else ''}{found.check} ({found.clause})"


def _draw_key(sheet: Sheet, values: tuple[Value, ...], bottom: float) -> None:
    """Write the values that found no room on their members, in lines beside the scale."""
    keyed = [value for value in values if value.key]
    x, line = KEY_LEFT, 0
    for number, value in enumerate(keyed):
        words = f"{value.key} = {value.state.name} {value.state.words}"
        if x + width_of(words, SMALL) > RIGHT:
            x, line = KEY_LEFT, line + 1
        y = bottom + (KEY_LINES - 1 - line) * KEY_STEP
        if line == KEY_LINES:
            sheet.text(x, y, f"\u2026 and {len(keyed) - number} more, in results.json", SMALL)
            break
        sheet.text(x, y, words, SMALL, mark=f"key-{value.state.name}")
        x += width_of(words, SMALL) + 4.0
