"""The one-screen summary of a design."""

from __future__ import annotations

from pathlib import Path

from rich.console import Console
from rich.markup import escape
from rich.table import Table

from spanwright.design.cautions import SHORT_CAUTION
from spanwright.design.certificate import NextLighter
from spanwright.design.hand_checks import mass_per_area
from spanwright.design.reactions import greatest_factored
from spanwright.design.result import Design
from spanwright.design.serviceability import Serviceability
from spanwright.io.text import kilograms, kilonewtons, metres, rounded_up
from spanwright.truss.errors import OutputError

MISSING_SHOWN = 3
"""Rows of what the roof cannot lose that fit on the screen; the rest is in the files."""


def print_summary(
    design: Design,
    console: Console | None = None,
    *,
    written_to: Path | None = None,
    failures: tuple[OutputError, ...] = (),
) -> None:
    """Print mass, deflection, each group's section with what governs it, what the roof cannot lose, and warnings.

    written_to : the folder that holds the files of this design, if any were written.
    failures : outputs that could not be written.
    """
    out = console or Console(highlight=False, emoji=False)
    setting = design.setting
    project, truss = setting.project, setting.truss
    out.print(f"[bold]{escape(project.mark)}  {escape(project.title)}[/bold]   {project.quantity} off")
    lean = f", diagonals {truss.lean}" if truss.lean else ""
    out.print(
        f"{truss.form}{lean}, span {metres(truss.span)}, {len(truss.bar_names)} members, "
        f"{metres(project.spacing)} apart; {setting.standard.name}, {escape(project.actions)}"
    )
    out.print(_groups(design))
    overhang = " and over the overhang" if any(truss.top.overhang) else ""
    out.print(
        f"mass {kilograms(design.mass)} a truss, {mass_per_area(design):.1f} kg/m2 of plan, "
        f"members joint to joint{overhang}, without gussets and fixings"
    )
    _print_movements(out, design.serviceability)
    out.print(_reactions(design))
    _print_missing(out, design)
    for warning in design.warnings:
        out.print(f"warning: {escape(warning)}")
    verdict = "every member passes" if design.passes else "NOT PASSING"
    out.print(f"[bold]{verdict}[/bold]   greatest utilisation {rounded_up(float(design.utilisation.max()))}")
    if written_to is not None:
        out.print(f"written to {escape(str(written_to))}" + ("" if design.pieces else "; no schedule and no drawing"))
    for failure in failures:
        out.print(f"[bold]not written[/bold]: {escape(str(failure))}")
    out.print(f"[dim]{SHORT_CAUTION}[/dim]")


def _groups(design: Design) -> Table:
    table = Table(box=None, pad_edge=False, header_style="bold")
    for heading in ("group", "section", "use", "governed by", "member", "combination", "next lighter"):
        table.add_column(heading, justify="right" if heading == "use" else "left")
    for choice, lighter in zip(design.choices, design.next_lighter, strict=True):
        found = design.governing_of(choice)
        table.add_row(
            escape(choice.group.name),
            escape(choice.name),
            rounded_up(found.ratio),
            escape(found.check),
            found.bar,
            escape(found.combination),
            escape(_certificate(lighter)),
        )
    return table


def _print_movements(out: Console, found: Serviceability) -> None:
    for row in found.deflections:
        verdict = "" if row.ratio <= 1.0 else "  [bold]EXCEEDED[/bold]"
        way = "up" if row.value < 0.0 else "down"
        out.print(
            f"deflection, {row.name}: {abs(row.value):.1f} mm {way} at {row.joint} of {row.limit:.1f} mm allowed "
            f"(span/{row.span_over:g}), {escape(row.combination)}{verdict}"
        )
    slides = f"sliding end moves {found.sliding:.1f} mm, {found.sliding_combination}; " if found.sliding else ""
    out.print(escape(f"{slides}{f'camber {found.camber:.0f} mm' if found.camber else 'no camber'}"))


def _certificate(lighter: NextLighter) -> str:
    if lighter.fails is None:
        return lighter.section or lighter.reason
    return f"{lighter.section}: {rounded_up(lighter.fails.ratio)}"


def _reactions(design: Design) -> str:
    found = greatest_factored(design.bearing_forces)
    listed = ", ".join(
        f"{direction} {kilonewtons(force.value)}" + (f" at {force.joint}" if force.value else "")
        for direction, force in found.items()
    )
    return f"on the bearings, factored: {listed}"


def _print_missing(out: Console, design: Design) -> None:
    worst, more = design.missing[:MISSING_SHOWN], design.missing[MISSING_SHOWN:]
    if not worst:
        return
    out.print("what this roof cannot lose (greatest utilisation without it):")
    for row in worst:
        effect = (
            f"nothing holds {', '.join(row.unheld)}"
            if row.unheld
            else f"{rounded_up(row.utilisation)} in {row.bar}, {metres(row.out_of_plane)} out of plane"
        )
        out.print(f"  without {escape(row.part)}: {effect}")
    beyond = sum(row.utilisation > 1.0 for row in more)
    if beyond:
        out.print(f"  and {beyond} more parts without which something fails: see calculation.pdf or results.json")
