"""The member schedule: one row a bar, for the engineer; the same figures as results.json."""

from __future__ import annotations

from typing import Any

from spanwright.design.packs import packs_by_bar
from spanwright.design.result import Design
from spanwright.io.results.members import members
from spanwright.io.schedule.table import Cell, Column, Table, table
from spanwright.io.text import rounded_up

COLUMNS = (
    Column("Member", 8),
    Column("Group", 12),
    Column("Joints", 9),
    Column("Section", 19),
    Column("Grade", 9),
    Column("Length c/c, mm", 8, 0),
    Column("Buckling length in plane, mm", 9, 0),
    Column("Buckling length out of plane, mm", 9, 0),
    Column("Buckling length minor axis, mm", 9, 0),
    Column("Greatest tension (+), kN", 9, 1),
    Column("in combination", 20),
    Column("Greatest compression (-), kN", 12, 1),
    Column("in combination", 20),
    Column("Greatest moment (sagging +), kNm", 9, 2),
    Column("Packs between joints", 8, 0),
    Column("Utilisation", 11, 2),
    Column("Governing check", 18),
    Column("Clause", 9),
)


def members_table(design: Design) -> Table:
    """Return the member schedule in the order of the truss's bars."""
    grades = {bar: piece.grade for piece in design.pieces for bar in piece.bars if piece.description != "packing plate"}
    packs = packs_by_bar(design.setting, design.demand, design.choices)
    rows = [
        _row(design, bar, member, grades[member["bar"]], int(packs[bar])) for bar, member in enumerate(members(design))
    ]
    return table("Members", "Member schedule", COLUMNS, rows)


def _row(design: Design, bar: int, member: dict[str, Any], grade: str, packs: int) -> tuple[Cell, ...]:
    buckling = member["buckling"]
    return (
        member["bar"],
        member["group"],
        " - ".join(member["joints"]),
        member["section"],
        grade,
        member["length_mm"],
        buckling["in_plane_mm"],
        buckling["out_of_plane_mm"],
        buckling["minor_axis_mm"],
        *_force(member["tension"]),
        *_force(member["compression"]),
        _moment(design, bar),
        packs or None,
        float(rounded_up(float(design.utilisation[bar]))),
        member["governing"]["check"],
        member["governing"]["clause"],
    )


def _force(extreme: dict[str, Any]) -> tuple[float | None, str]:
    """Return kN and the combination, both empty where the force prints as nothing."""
    force = round(extreme["max_N"] / 1e3, 1)
    return (force, extreme["combination"]) if force else (None, "")


def _moment(design: Design, bar: int) -> float | None:
    """Return the greater of sagging (+) and hogging (-) moment in kNm, or None where it prints as nothing."""
    sag, hog = float(design.demand.sag[bar].max()), float(design.demand.hog[bar].max())
    return round((sag if sag >= hog else -hog) / 1e6, 2) or None
