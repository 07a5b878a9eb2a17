"""Scope and basis: what was decided, by which standards and assumptions, and what is not covered."""

from __future__ import annotations

from math import degrees

from spanwright.design.cautions import CAUTIONS
from spanwright.design.families import TUBES
from spanwright.design.hand_checks import mass_per_area
from spanwright.design.reactions import greatest_factored
from spanwright.design.result import Design
from spanwright.design.steels import steel
from spanwright.io.calculation.blocks import Column, Fields, Paragraph, Points, Section, Table
from spanwright.io.calculation.figures import fixed
from spanwright.io.files import input_hash
from spanwright.io.text import kilograms, kilonewtons, metres, rounded_up
from spanwright.truss.inputs import FormInput

IN_WORKING = "Worked values are in N, mm and MPa; utilisation is rounded up."

CONVENTIONS = (
    "x to the right along the span, y up. Tension +, compression −. Sagging moments, which stretch the lower fibre, +. "
    "Reactions act on the truss: + to the right and + up. In plane and out of plane name the direction in which a "
    "member bows. Tables are in kN and m where their heads say so. " + IN_WORKING
)


def summary(design: Design) -> Section:
    """Return the result in short."""
    greatest = float(design.utilisation.max())
    verdict = "Every member passes." if design.passes else "NOT PASSING: see the groups and the warnings."
    return Section(
        "Result",
        (
            Paragraph(
                f"{verdict} Greatest utilisation {rounded_up(greatest)}. Mass {fixed(mass_per_area(design), 1)} kg/m² "
                "of plan, members joint to joint."
            ),
            Paragraph(_masses(design)),
            groups(design),
            *_deflection_lines(design),
            *_warned(design),
        ),
    )


def _masses(design: Design) -> str:
    """Return the masses of one truss, and why they differ."""
    overhang = " and over the overhang" if any(design.setting.truss.top.overhang) else ""
    text = f"Mass of one truss: members joint to joint{overhang} {kilograms(design.mass)}, as the loads have it"
    if not design.pieces:
        return f"{text}, without gussets and fixings."
    whole, fixings = design.assembly, design.setting.project.members.fixings
    return (
        f"{text}; pieces as cut, with packs and with ends clear of the joints, {kilograms(whole.mass)}; to lift, with "
        f"{fixings:.0%} more for gussets and fixings, {kilograms(whole.lift_mass)}."
    )


def groups(design: Design) -> Table:
    """Return the groups with their sections, what governs them, and what the next lighter section fails."""
    rows = []
    for choice, lighter in zip(design.choices, design.next_lighter, strict=True):
        found = design.governing_of(choice)
        next_one = lighter.section or lighter.reason
        if lighter.fails is not None:
            next_one = f"{lighter.section}: {lighter.fails.check}, {rounded_up(lighter.fails.ratio)}"
        elif lighter.section:
            next_one = f"{lighter.section}: {lighter.reason}"
        rows.append(
            (
                choice.group.name,
                choice.name,
                rounded_up(found.ratio),
                found.bar,
                f"{found.check} ({found.clause})",
                next_one,
            )
        )
    columns = (
        Column("group", align="left"),
        Column("section", align="left", share=1.3),
        Column("use"),
        Column("member", align="left"),
        Column("governed by (clause)", align="left", share=1.0),
        Column("next lighter section and what it fails", align="left", share=1.4),
    )
    return Table(columns, tuple(rows))


def _deflection_lines(design: Design) -> tuple[Paragraph, ...]:
    words = [
        f"{row.name} {fixed(abs(row.value), 1)} mm {'up' if row.value < 0.0 else 'down'} of {fixed(row.limit, 1)} mm "
        f"allowed (span/{row.span_over:g})" + ("" if row.ratio <= 1.0 else ", EXCEEDED")
        for row in design.serviceability.deflections
    ]
    greatest = greatest_factored(design.bearing_forces)
    bearing = ", ".join(
        f"{direction} {kilonewtons(force.value)}" + (f" at {force.joint}" if force.value else "")
        for direction, force in greatest.items()
    )
    return (
        Paragraph(f"Deflection: {'; '.join(words) or 'no serviceability combination'}."),
        Paragraph(f"Greatest factored force on a bearing: {bearing}."),
    )


def _warned(design: Design) -> tuple[Paragraph, ...]:
    count = len(design.warnings)
    if not count:
        return ()
    return (Paragraph(f"{count} {'warning' if count == 1 else 'warnings'}: see the section Warnings."),)


def basis(design: Design) -> Section:
    """Return scope, standards, materials and conventions."""
    setting = design.setting
    project, truss = setting.project, setting.truss
    lean = f", diagonals {truss.lean}" if truss.lean else ""
    carried = "" if project.tributary == project.spacing else f"; each carries {metres(project.tributary)} of roof"
    ends = project.ends
    joined = (
        f"welded, each weld along the connected leg at least {ends.weld_length:g} times that leg"
        if ends.kind == "welded"
        else f"bolted, {ends.bolts} bolts of {ends.bolt_diameter:g} mm, grade {ends.bolt_grade}, in one line; holes "
        + ("punched" if ends.punched else "drilled")
    )
    rows = (
        (
            "Structure",
            f"{truss.form}{lean}, span {metres(truss.span)}{_pitch(design)}, {len(truss.bar_names)} members, "
            f"{project.quantity} off, {metres(project.spacing)} apart{carried}",
        ),
        ("Input", f"{project.source_name or 'no file'}, mark {input_hash(project.source)}"),
        ("Member standard", setting.standard.name),
        ("Loading standard", f"{project.actions}; load factors in the table of combinations"),
        ("Modulus of elasticity", f"{fixed(setting.standard.modulus, 0)} MPa"),
        ("End connections assumed", f"{joined}. They become requirements on the joints."),
        ("Restraint anchored by", project.restraint.anchored_by),
        (
            "Model",
            "plane truss, pin joints, small displacements, linear elastic, loads at joints; the top chord besides "
            "as a continuous beam over its joints where purlins stand between them",
        ),
    )
    return Section(
        "Scope and basis",
        (Fields(rows), _steels(design), Paragraph(CONVENTIONS, small=True)),
    )


def _pitch(design: Design) -> str:
    given = design.setting.project.truss
    return f", pitch {fixed(degrees(given.pitch), 1)}°" if isinstance(given, FormInput) else ""


def _steels(design: Design) -> Table:
    rows: dict[tuple[str, ...], None] = {}
    for choice in design.choices:
        section = choice.section
        grade = steel(design.setting.project.members.steel, hollow=section.family in TUBES)
        rows[
            (
                choice.name,
                grade.name,
                fixed(float(section.steel_fy[0]), 0),
                fixed(float(section.steel_fu[0]), 0),
                fixed(float(section.area[0]), 0),
                fixed(float(section.mass[0]), 2),
                fixed(float(section.radius_in[0]), 1),
                fixed(float(section.radius_out[0]), 1),
                fixed(float(section.radius_minor[0]), 1),
            )
        ] = None
    columns = (
        Column("section", align="left", share=1.0),
        Column("steel", align="left"),
        Column("yield", "MPa"),
        Column("tensile", "MPa"),
        Column("area", "mm²"),
        Column("mass", "kg/m"),
        Column("i in plane", "mm"),
        Column("i out of plane", "mm"),
        Column("i least", "mm"),
    )
    return Table(
        columns, tuple(rows), title="Sections and steel", note="i is the radius of gyration of the whole member."
    )


def assumptions(design: Design) -> Section:
    """Return what is assumed by default, what is to be verified, and what is not covered."""
    defaults = tuple(design.setting.project.defaults_used)
    blocks: list[Table | Paragraph | Points] = []
    if defaults:
        columns = (Column("key of the project file", align="left", share=1.0), Column("taken", align="left", share=1.0))
        blocks.append(
            Table(
                columns,
                defaults,
                title="Assumed by default, since the project file does not say",
                dense=True,
                side_by_side=2,
            )
        )
    reason = design.setting.project.restraint.reason
    if reason:
        blocks.append(Paragraph(f"Effective length factors differ from 1. Reason stated: {reason}"))
    blocks += [
        Paragraph(f"To verify against a licensed copy, first of {design.setting.standard.name}:"),
        Points(design.cautions[len(CAUTIONS) :]),
        Paragraph("Not covered, and cautions:"),
        Points(CAUTIONS),
    ]
    return Section("Assumptions, and what is not covered", tuple(blocks))
