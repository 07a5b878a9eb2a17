"""What in a restraint should make its engineer look twice."""

from __future__ import annotations

from collections.abc import Iterator

from spanwright.truss.braces import BottomTie, KneeBrace
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine
from spanwright.truss.tolerances import TOLERANCES


def restraint_warnings(
    truss: Truss,
    restraint: RestraintInput,
    lines: tuple[PurlinLine, ...],
    braces: tuple[KneeBrace, ...],
    ties: tuple[BottomTie, ...],
) -> tuple[str, ...]:
    """Return the warnings, as sentences: what does not count, and top chord ends held only beyond."""
    return (
        *_about_lines(restraint, lines),
        *_about_braces(restraint, lines, braces),
        *_about_ties(ties),
        *_about_ends(truss, restraint, lines),
    )


def _about_lines(restraint: RestraintInput, lines: tuple[PurlinLine, ...]) -> Iterator[str]:
    loose = [str(line.number) for line in lines if not line.anchored]
    if restraint.anchored_by == "nothing" and restraint.anchored != "none":
        yield "Purlin lines are stated as anchored, but nothing anchors them: none of them counts."
    elif len(loose) == len(lines):
        yield "No purlin line is anchored: no purlin and no knee brace holds a chord sideways."
    elif len(loose) == 1:
        yield f"Purlin line {loose[0]} is not anchored and holds nothing sideways."
    elif loose:
        yield f"Purlin lines {', '.join(loose)} are not anchored and hold nothing sideways."


def _about_braces(
    restraint: RestraintInput, lines: tuple[PurlinLine, ...], braces: tuple[KneeBrace, ...]
) -> Iterator[str]:
    if restraint.knee_braces != "none" and not braces:
        yield (
            f'No knee brace stands: "{restraint.knee_braces}" is stated, but no joint of the bottom chord is within '
            f"{TOLERANCES.knee_reach / 1000:g} m in plan of these purlins."
        )
    loose = [brace for brace in braces if not brace.counted]
    too_long = [brace for brace in loose if lines[brace.line - 1].anchored]
    for brace in loose:
        if brace not in too_long:
            yield f"The {brace.name} holds nothing: {brace.why_not}."
    if too_long:
        listed = ", ".join(f"{brace.at} ({brace.rise / 1000:.2f} m)" for brace in too_long)
        yield (
            f"Knee braces that rise more than {TOLERANCES.longest_knee / 1000:g} m are too soft and hold nothing: "
            f"{listed}; tie these joints of the bottom chord to a braced bay instead (project rule)."
        )


def _about_ties(ties: tuple[BottomTie, ...]) -> Iterator[str]:
    for tie in ties:
        if not tie.counted:
            yield f"The {tie.name} holds nothing: {tie.why_not}."


def _about_ends(truss: Truss, restraint: RestraintInput, lines: tuple[PurlinLine, ...]) -> Iterator[str]:
    held = {line.joint for line in lines if line.anchored}
    if restraint.bearings_held:
        held |= set(truss.bearing_joints)
    for joint, along, outward in ((truss.top.joints[0], 0.0, -1.0), (truss.top.joints[-1], truss.top.length, 1.0)):
        beyond = [line for line in lines if line.anchored and outward * (line.along - along) > 0.0]
        if beyond and joint not in held:
            nearest = min(beyond, key=lambda line: abs(line.along - along))
            yield (
                f"Nothing holds {truss.joint_names[joint]} itself sideways: the top chord is held beyond it, on the "
                f"overhang, by {nearest.name}."
            )
