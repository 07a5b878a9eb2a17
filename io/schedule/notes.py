"""What stands on every schedule, and the sheet of notes behind them."""

from __future__ import annotations

from spanwright import __version__
from spanwright.design.nesting import END_TRIM, KERF
from spanwright.design.result import Design
from spanwright.io.files import input_hash
from spanwright.io.schedule.table import Column, Table, table
from spanwright.io.text import kilograms, metres

ESTIMATE = "ESTIMATE: no gussets, cleats, bearings, splices, bolts or welds; lengths nominal until joints are designed"

COLUMNS = (Column("Note", 22), Column("Text", 125))

READING = (
    ("Marks", "One mark is one shape; the number is that of the first bar it makes up. L and R are opposite hands."),
    (
        "Hands",
        "Look at the inside of the angle, its outstanding leg on top: End 1 of an L is at the left, of an R at the "
        "right. A mark without a letter has no hand.",
    ),
    (
        "Cut lengths",
        "Tip to tip along the piece. Chords run to the joint, with the overhang, mitred where the chord kinks. Webs "
        "end square, their nearest corner one setback clear of the edge of the chord whichever way the angle is "
        "turned; they are rounded down to 1 mm. Tubes that meet tubes are cut to their face. Whether webs "
        "of one joint clear each other is settled with its gusset.",
    ),
    (
        "Way round",
        "The remarks of every angle with unequal legs say which leg goes to the gusset, of pairs which legs are "
        "together. Turned the other way the member may fail.",
    ),
    ("Ends", "Degrees of a mitre are from square; of a profile, between the two axes."),
    ("Mass", "Mass per metre times cut length, nothing taken off for mitres and holes."),
    (
        "Paint area",
        "Whole outline of each piece times its cut length, contact faces of pairs included; faces and edges of plates.",
    ),
    ("Forces", "Tension +, compression -; the greatest over the strength combinations. Utilisation is rounded up."),
)


def notes_table(design: Design) -> Table:
    """Return everything that belongs to the lists in words, one row a note."""
    rows = [
        *_truss(design),
        *READING,
        ("Cutting", _cutting(design)),
        ("Ends required", _ends(design)),
    ]
    rows += [("Warning", warning) for warning in design.warnings]
    rows += [("Caution", caution) for caution in design.cautions]
    rows += [("Default used", f"{key} = {value}") for key, value in design.setting.project.defaults_used]
    return table("Notes", "Notes", COLUMNS, rows)


def _truss(design: Design) -> list[tuple[str, str]]:
    setting = design.setting
    project, truss = setting.project, setting.truss
    whole = design.assembly
    form = f"{truss.form}, diagonals {truss.lean}" if truss.lean else truss.form
    return [
        ("Truss", f"{project.title}; mark {project.mark}, {project.quantity} off; {form}, span {metres(truss.span)}"),
        ("Standards", f"{setting.standard.name}; actions {project.actions}"),
        ("Overall size", f"{metres(whole.length)} long, {metres(whole.height)} high, {whole.width:.0f} mm wide"),
        (
            "Mass of one truss",
            f"{kilograms(whole.mass)} of pieces; to lift, with {100.0 * project.members.fixings:g} % for gussets "
            f"and fixings: {kilograms(whole.lift_mass)}",
        ),
        *(("Transport", remark) for remark in whole.remarks),
        ("Status", ESTIMATE),
        ("Made from", f"{project.source_name}, input {input_hash(project.source)}, by Spanwright {__version__}"),
    ]


def _cutting(design: Design) -> str:
    stock = design.setting.project.members.stock_length
    return (
        f"Stock bars of {metres(stock)}, {KERF:g} mm lost at each cut, {END_TRIM:g} mm trimmed off each bar (from "
        "memory); longest piece first, then the longest that fits. Pieces longer than a bar are not counted: splice "
        "them first."
    )


def _ends(design: Design) -> str:
    ends, slots = design.setting.project.ends, design.demand.slots
    slotted = ""
    if slots is not None and slots.any():
        slotted = f" Tubes slotted over gussets: four welds a slotted end, {ends.weld_length:g} times the depth long."
    begin = "The checks of tension assume, and so require: "
    if ends.kind == "welded":
        welds = f"end welds at least {ends.weld_length:g} times the connected leg long, along each edge of it."
        return f"{begin}{welds}{slotted}"
    bolts = f"{ends.bolts} bolts M{ends.bolt_diameter:g} {ends.bolt_grade} in one line at each end"
    return f"{begin}{bolts}, holes {'punched' if ends.punched else 'drilled'}.{slotted}"
