"""Everything a user should know beside the results, gathered in one list."""

from __future__ import annotations

import math

from spanwright.design.regrouping import worth_a_group
from spanwright.design.restraint_advice import long_bottom_chords, soft_braces
from spanwright.design.result import Design
from spanwright.design.section_warnings import section_warnings
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice, governing

ANGLES = ("L", "2L", "2L star")


def warnings_of(found: Design) -> tuple[str, ...]:
    """Return the warnings of the input, geometry, restraint and loads, then those of bearings and chosen sections."""
    setting, choices = found.setting, found.choices
    return (
        *setting.project.warnings,
        *setting.truss.warnings,
        *setting.restraint.warnings,
        *soft_braces(found),
        *setting.load_set.warnings,
        *_thrust(found),
        *_settlement(setting),
        *section_warnings(setting, choices),
        *_legs_above_the_chords(choices),
        *_between_joints(setting),
        *_two_systems(setting),
        *_one_off(setting),
        *_not_passing(setting, choices),
        *long_bottom_chords(found),
        *worth_a_group(found),
    )


def _thrust(found: Design) -> list[str]:
    """Where more than one bearing is held along the span, the truss pushes both: what stands below must resist it."""
    pushed = [
        f"{force.value / 1e3:.1f} kN at {force.joint} ({force.combination})"
        for force in found.bearing_forces
        if force.factored and force.direction == "along the span" and force.value > 0.0
    ]
    if len(found.analysis.arrangements) == 1 or not pushed:
        return []
    return [
        "more than one bearing is held along the span, so the truss thrusts: the columns must resist, factored, "
        f"{' and '.join(pushed)}; every member also stands with one end sliding"
    ]


def _between_joints(setting: Setting) -> list[str]:
    """A greatest spacing seldom lands on joints: where it does not, the chord bends, which may not be meant."""
    lines = setting.restraint.lines
    between = [line for line in lines if line.joint is None and line.bar is not None]
    if not between or not isinstance(setting.project.restraint.purlins, float):
        return []
    return [
        f"{len(between)} of {len(lines)} purlin lines stand between joints and bend the top chord; "
        'purlins "at joints", or distances listed joint by joint, spare it that'
    ]


def _two_systems(setting: Setting) -> list[str]:
    """Load and resistance factors are calibrated together (SANS 10160 with SANS 10162, EN 1990 with EN 1993)."""
    if setting.standard.name.startswith("SANS") == setting.project.actions.startswith("SANS"):
        return []
    return [
        f"load factors of {setting.project.actions} stand beside resistances of {setting.standard.name}: "
        "the two were not calibrated together"
    ]


def _one_off(setting: Setting) -> list[str]:
    """A building with a site has more trusses than the one that is assumed where no quantity is stated."""
    project = setting.project
    if project.site is None or project.quantity > 1:
        return []
    length, spacing = project.site.length / 1e3, project.spacing / 1e3
    return [
        f"quantity is 1, but a building {length:g} m long has {round(length / spacing) + 1} trusses {spacing:g} m "
        "apart: lists and the force at the anchor are those of one"
    ]


def _settlement(setting: Setting) -> list[str]:
    names = [setting.truss.joint_names[joint] for joint in setting.truss.bearing_joints]
    if len(names) <= 2:
        return []
    return [
        f"the truss bears at {', '.join(names)}: that {', '.join(names[1:-1])} settles against the ends is not "
        "considered, and the bar forces depend on it"
    ]


def _legs_above_the_chords(choices: tuple[Choice, ...]) -> list[str]:
    """A web leg wider than the chord's is awkward to weld at the gusset (common practice)."""
    chords = [choice.section for choice in choices if "chord" in choice.group.role]
    legs = [float(section.leg_connected[0]) for section in chords if section.family in ANGLES]
    if not legs:
        return []
    return [
        f"{choice.group.name}: the leg of {choice.name} is wider than the smallest chord leg, {min(legs):.0f} mm"
        for choice in choices
        if "chord" not in choice.group.role
        and choice.candidates.family in ANGLES
        and float(choice.section.leg_connected[0]) > min(legs)
    ]


def _not_passing(setting: Setting, choices: tuple[Choice, ...]) -> list[str]:
    sentences = []
    for choice in choices:
        if choice.passes:
            continue
        bars = tuple(setting.truss.bar_names[bar] for bar in choice.group.bars)
        worst = governing(choice.checks, bars, None)
        begin = f"no candidate passes for the {choice.group.name}" if choice.group.sized else f"{choice.name} fails"
        source = f"cl. {worst.clause}" if worst.clause[0].isdigit() else worst.clause
        sentences.append(
            f"{begin}: {worst.check} ({source}) of {worst.bar} is {math.ceil(worst.ratio * 100) / 100:.2f} times "
            f"its limit; {_what_would_help(worst.check, choice)}"
        )
    return sentences


def _what_would_help(check: str, choice: Choice) -> str:
    if "out of plane" in check or "slenderness" in check:
        held = "more counted purlins, knee braces or ties" if "chord" in choice.group.role else "shorter webs"
        return f"{held}, or another family"
    if "bolt" in check:
        return "smaller bolts, welded ends, or longer legs"
    if "tension" in check:
        return "a longer weld or more bolts, a higher grade, or another family"
    return "closer trusses, a greater depth, shorter panels, or another family"
