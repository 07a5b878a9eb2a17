"""Bar forces and buckling lengths."""

from __future__ import annotations

from spanwright.design.envelope import Extreme, envelope
from spanwright.design.result import Design
from spanwright.io.calculation.blocks import Column, Paragraph, Section, Table
from spanwright.io.calculation.figures import NONE, kilo, mega
from spanwright.io.calculation.naming import strength_labels


def bar_forces(design: Design) -> Section:
    """Return the envelope of bar forces with the combination that gives each."""
    names = strength_labels(design)
    truss = design.setting.truss
    rows = tuple(
        (
            truss.bar_names[row.bar],
            truss.roles[row.bar],
            *_cells(row.tension, names, +1.0),
            *_cells(row.compression, names, -1.0),
        )
        for row in envelope(design.demand)
    )
    columns = (
        Column("bar", align="left"),
        Column("role", align="left"),
        Column("tension", "kN"),
        Column("in", align="left"),
        Column("compression", "kN"),
        Column("in", align="left"),
    )
    about = Paragraph("Greatest factored tension and compression over all strength combinations, by number.")
    return Section("Bar forces", (about, Table(columns, rows, dense=True, side_by_side=2)))


def _cells(extreme: Extreme, names: tuple[str, ...], sign: float) -> tuple[str, str]:
    if extreme.combination < 0:
        return NONE, ""
    return kilo(sign * extreme.value), names[extreme.combination]


def chord_bending(design: Design) -> Section:
    """Return the greatest factored moments in the top chord, where anything bends it."""
    names = strength_labels(design)
    truss = design.setting.truss
    rows = tuple(
        (truss.bar_names[row.bar], *_moment(row.sag, names), *_moment(row.hog, names))
        for row in envelope(design.demand)
        if row.sag.value or row.hog.value
    )
    if not rows:
        return Section("Chord bending", (Paragraph("Every load comes in at a joint: no chord bends between joints."),))
    columns = (
        Column("bar", align="left"),
        Column("sagging", "kN m"),
        Column("in", align="left"),
        Column("hogging", "kN m"),
        Column("in", align="left"),
    )
    about = Paragraph(
        "Purlins or a man between joints bend the top chord, a continuous beam over its joints, hinged at heel and "
        "ridge. Greatest factored moments; their checks stand with the members."
    )
    return Section("Chord bending", (about, Table(columns, rows, dense=True, side_by_side=2)))


def _moment(extreme: Extreme, names: tuple[str, ...]) -> tuple[str, str]:
    return (NONE, "") if extreme.combination < 0 else (mega(extreme.value), names[extreme.combination])


def lengths(design: Design) -> Section:
    """Return the buckling lengths about both axes with what bounds them."""
    found, truss = design.setting.lengths, design.setting.truss
    rows = tuple(
        (
            name,
            kilo(float(truss.lengths[bar]), 3),
            kilo(float(found.in_plane[bar]), 3),
            " – ".join(found.in_plane_between[bar]),
            kilo(float(found.out_of_plane[bar]), 3),
            " – ".join(found.out_of_plane_between[bar]),
            kilo(float(found.torsional[bar]), 3),
        )
        for bar, name in enumerate(truss.bar_names)
    )
    columns = (
        Column("bar", align="left"),
        Column("joint to joint", "m"),
        Column("in plane", "m"),
        Column("between", align="left"),
        Column("out of plane", "m"),
        Column("between", align="left", share=1.0),
        Column("twist", "m"),
    )
    given = design.setting.project.restraint
    about = Paragraph(
        f"Effective length factors: {given.factor_in:g} in plane, {given.factor_out:g} out of plane, included. In "
        "plane a length ends at joints with bars that are not collinear; out of plane a chord is followed through "
        "every kink to points that are held. About the minor axis of an angle the greater of both goes."
    )
    return Section("Buckling lengths", (about, Table(columns, rows, dense=True)))
