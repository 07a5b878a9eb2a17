"""Every finding of the wireframe import: its stable code, how much it weighs, and what it means.

W-1xx reading the file, W-2xx units and plane, W-3xx lines becoming bars and joints, W-4xx recognising the truss.
A code is never given another meaning; one that falls away is not used again.
"""

from __future__ import annotations

from typing import Literal, NamedTuple

Severity = Literal["note", "warning"]


class Code(NamedTuple):
    """How much a finding weighs ("warning": look at it before you build; "note": what was done) and what it means."""

    severity: Severity
    meaning: str


CODES: dict[str, Code] = {
    "W-101": Code("warning", "the file is damaged; the recovering reader was used"),
    "W-102": Code("note", "a layer was left out by rule"),
    "W-103": Code("warning", "an entity that is no straight line was not read"),
    "W-104": Code("warning", "an arc within a polyline was not read"),
    "W-105": Code("note", "a closed polyline repeats its first point"),
    "W-106": Code("warning", "the ends of an open polyline nearly meet"),
    "W-107": Code("warning", "a block cannot be taken apart"),
    "W-108": Code("warning", "a pattern matches no layer that holds anything"),
    "W-109": Code("note", "a layer seems to hold marks, and no option names it"),
    "W-201": Code("note", "the unit of the drawing"),
    "W-202": Code("warning", "the user's unit differs from the drawing's own statement"),
    "W-203": Code("note", "the plane of drawing and the vertical axis"),
    "W-204": Code("note", "line ends off the plane were moved onto it"),
    "W-205": Code("warning", "the span is unusual"),
    "W-301": Code("note", "line ends were moved to meet in a joint"),
    "W-302": Code("warning", "the line ends of one joint are further apart than the tolerance"),
    "W-303": Code("note", "a line of no length was dropped"),
    "W-304": Code("note", "a line was split where joints lie on it"),
    "W-305": Code("note", "a joint was moved onto the line it lies on"),
    "W-306": Code("note", "a line drawn twice was dropped"),
    "W-307": Code("note", "overlapping lines were merged"),
    "W-308": Code("note", "pieces in one line were joined into one bar"),
    "W-309": Code("warning", "two bars cross without a joint"),
    "W-310": Code("note", "a joint was made where two bars cross"),
    "W-311": Code("warning", "two joints nearly meet"),
    "W-312": Code("warning", "a joint nearly lies on a bar"),
    "W-313": Code("warning", "a loose piece was left out"),
    "W-314": Code("warning", "a bar that ends in the air was left out"),
    "W-401": Code("warning", "too few bars: the joints can move without straining a bar"),
    "W-402": Code("note", "more bars than a truss needs: forces depend on stiffness"),
    "W-403": Code("warning", "end bars of an outline were taken for diagonals"),
    "W-404": Code("note", "overhang of the top chord"),
    "W-405": Code("warning", "the overhangs differ; the longer one was taken on both sides"),
    "W-406": Code("warning", "a mark stands too far away to belong to anything"),
    "W-407": Code("note", "the bearings"),
    "W-408": Code("warning", "no rule of a project file says where the marked purlins stand"),
    "W-409": Code("warning", "one bar was drawn on layers of different roles"),
    "W-410": Code("warning", "the user's overhang differs from the one drawn"),
}
