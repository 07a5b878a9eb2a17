"""The picture `restraint`: both chords with their buckling lengths in and out of plane, and what bounds them."""

from __future__ import annotations

import numpy as np

from spanwright.design.missing import Missing
from spanwright.design.result import Design
from spanwright.io.pictures.bands import Side, draw_bands, height_of_bands
from spanwright.io.pictures.boxes import boxes_along
from spanwright.io.pictures.joints import draw_joint_names, draw_joints
from spanwright.io.pictures.labels import Occupied
from spanwright.io.pictures.legend import draw_legend, holding_signs, in_lines
from spanwright.io.pictures.notes import draw_notes
from spanwright.io.pictures.page import FOOT_TOP, HEADING_BOTTOM, LEFT, RIGHT, draw_foot, draw_heading, draw_scale
from spanwright.io.pictures.runs import chord_holding
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import BODY, BOLD, HAIR, INK, PAGE, SOFT, THIN, Pen
from spanwright.io.pictures.symbols import draw_holding, taken_by_signs
from spanwright.io.pictures.tables import Table, draw_table, height_of_table
from spanwright.io.pictures.view import View, Zone, overhang_tips, view_of
from spanwright.io.text import metres, rounded_up
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.restraint import Restraint

ROWS_SHOWN = 6
"""Rows of what the roof cannot lose that the sheet has room for; all are in calculation.pdf and results.json."""

MORE = 3.6
"""Height of the line under the rows that says how many are not shown, mm."""

CAPTIONS = 17.0
"""mm kept free at the left of the bands for their captions."""

NOTES = 104.0
"""Width of the notes, mm."""

LEAST_NOTES = 28.0
"""Height kept for the notes and the scale under them, mm."""

ABOVE, BELOW = 7.0, 8.5
"""mm between the truss and the bands of its top and its bottom chord: room for purlins, and for bearings."""

PEN = Pen(0.67)
"""Signs are drawn smaller than where members have their width."""


def restraint_sheet(design: Design) -> Sheet:
    """Return the sheet of the picture `restraint`."""
    sheet = Sheet()
    truss, restraint = design.setting.truss, design.setting.restraint
    draw_heading(sheet, design, "Restraint")
    draw_foot(sheet, design)
    bottom = _draw_beneath(sheet, design)
    chords = (chord_holding(design, truss.top), chord_holding(design, truss.bottom))
    above, below = (height_of_bands(chord) + 2.0 for chord in chords)
    zone = Zone(LEFT + CAPTIONS, bottom + below + BELOW, RIGHT - 2.0, HEADING_BOTTOM - above - ABOVE)
    view = view_of(truss, restraint, zone)
    draw_scale(sheet, view, RIGHT - NOTES, FOOT_TOP + 2.5)
    low, high = _band_edges(truss, view)
    _draw_truss(sheet, truss, restraint, view)
    for chord, side in zip(chords, (Side(high, 1.0), Side(low, -1.0)), strict=True):
        draw_bands(sheet, chord, view, side)
    return sheet


def _band_edges(truss: Truss, view: View) -> tuple[float, float]:
    """Return the heights on the sheet at which the bands of the bottom and of the top chord begin."""
    heights = view.onto(truss.xy)[:, 1]
    return float(heights.min()) - BELOW, float(heights.max()) + ABOVE


def _draw_truss(sheet: Sheet, truss: Truss, restraint: Restraint, view: View) -> None:
    """Draw the truss in thin lines, with all that holds it."""
    segments, joints = view.onto(truss.xy[truss.ends]), view.onto(truss.xy)
    for segment, role in zip(segments, truss.roles, strict=True):
        style = (BOLD, INK, 2.1) if "chord" in role else (HAIR, SOFT, 2.0)
        sheet.lines([segment], style[0], style[1], order=style[2])
    for joint, tip in overhang_tips(truss):
        sheet.lines([view.onto(np.array([truss.xy[joint], tip]))], THIN, INK, order=2.0)
    draw_joints(sheet, joints, PEN.joint)
    draw_holding(sheet, truss, restraint, view, PEN)
    draw_joint_names(sheet, truss, joints, PEN.joint, Occupied(_taken(truss, restraint, view)))


def _taken(truss: Truss, restraint: Restraint, view: View) -> FloatArray:
    """Return the boxes of all that joints' names must keep clear of: bars, leaders, bands and signs."""
    joints = view.onto(truss.xy)
    low, high = _band_edges(truss, view)
    leaders = [[joints[joint], [joints[joint, 0], high]] for joint in truss.top.joints]
    leaders += [[joints[joint], [joints[joint, 0], low]] for joint in truss.bottom.joints]
    bands = [[[0.0, level], [PAGE[0], level]] for level in (low, high)]
    lines = np.concatenate([view.onto(truss.xy[truss.ends]), np.array(leaders), np.array(bands)])
    return np.vstack([boxes_along(lines, BOLD), taken_by_signs(truss, restraint, view, PEN)])


def _draw_beneath(sheet: Sheet, design: Design) -> float:
    """Draw table, notes and legend up from the foot, and return the height at which they end."""
    table = Table(
        headings=("What this roof cannot lose: without", "utilisation", "member", "out of plane"),
        rows=[_missing_row(row) for row in design.missing[:ROWS_SHOWN]],
        right=frozenset({1, 3}),
    )
    more = _more(design)
    tall = height_of_table(table) + (MORE if more else 0.0)
    top = FOOT_TOP + 2.0 + max(tall, LEAST_NOTES)
    draw_table(sheet, table, LEFT, top, RIGHT - LEFT - NOTES - 8.0)
    sheet.text(LEFT, top - tall + 0.5, more, BODY)
    draw_notes(sheet, design, RIGHT - NOTES, top, NOTES)
    return draw_legend(sheet, in_lines(holding_signs(design.setting.restraint), RIGHT - LEFT), LEFT, top + 1.0)


def _more(design: Design) -> str:
    """Return how many rows are not shown, and how many of them do not stand; "" where all are shown."""
    rest = design.missing[ROWS_SHOWN:]
    if not rest:
        return ""
    fallen = sum(bool(row.unheld) or row.utilisation > 1.0 for row in rest)
    return f"and {len(rest)} more, {fallen} of them above 1.00 or unheld: see calculation.pdf"


def _missing_row(row: Missing) -> tuple[str, ...]:
    if row.unheld:
        return (row.part, "\u2013", f"nothing holds {', '.join(row.unheld)}", "")
    return (row.part, rounded_up(row.utilisation), row.bar, metres(row.out_of_plane))
