"""Deflection, the sliding end and camber."""

from __future__ import annotations

from spanwright.design.result import Design
from spanwright.design.serviceability import CAMBER_LEAST, CAMBER_STEP
from spanwright.io.calculation.blocks import Column, Fields, Section, Table
from spanwright.io.calculation.figures import fixed
from spanwright.io.calculation.naming import labels
from spanwright.io.text import rounded_up


def deflection(design: Design) -> Section:
    """Return deflections against their limits, the movement of the sliding end, and camber."""
    found = design.serviceability
    numbered = labels(design)
    rows = tuple(
        (
            row.name,
            fixed(row.value, 1),
            fixed(row.limit, 1),
            f"span/{row.span_over:g}",
            rounded_up(row.ratio),
            row.joint,
            f"{numbered[row.combination]}: {row.combination}",
        )
        for row in found.deflections
    )
    columns = (
        Column("deflection", align="left"),
        Column("down", "mm"),
        Column("limit", "mm"),
        Column("which is", align="left"),
        Column("ratio"),
        Column("joint", align="left"),
        Column("combination", align="left", share=1.0),
    )
    sliding = f"{fixed(found.sliding, 1)} mm"
    if found.sliding_combination:
        sliding += f", in {numbered[found.sliding_combination]}: {found.sliding_combination}"
    camber = (
        f"{fixed(found.camber, 0)} mm at mid-span, for the permanent load, to the nearest {CAMBER_STEP:g} mm; state it "
        "on the drawing as no-load, lying flat. Lengths in this document are those of the loaded geometry."
        if found.camber
        else f"none: the permanent load deflects the truss by less than {CAMBER_LEAST:g} mm"
    )
    note = "Any joint against the line between the bearings, down +. Pin joints and no slip: bolt holes add to it."
    return Section(
        "Deflection, sliding end and camber",
        (
            Table(columns, rows, note=note),
            Fields((("Sliding end moves", sliding), ("Camber", camber))),
        ),
    )
