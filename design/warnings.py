"""Everything a user should know beside the results, gathered in one list."""

from __future__ import annotations

from spanwright.design.section_warnings import section_warnings
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice, governing

ANGLES = ("L", "2L", "2L star")


def warnings_of(setting: Setting, choices: tuple[Choice, ...]) -> tuple[str, ...]:
    """Return the warnings of the input, geometry, restraint and loads, then those of the chosen sections."""
    return (
        *setting.project.warnings,
        *setting.truss.warnings,
        *setting.restraint.warnings,
        *setting.load_set.warnings,
        *section_warnings(setting, choices),
        *_legs_above_the_chords(choices),
        *_not_passing(setting, choices),
    )


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
        sentences.append(
            f"{begin}: {worst.check} (cl. {worst.clause}) of {worst.bar} is {worst.ratio:.2f} times its limit; "
            f"{_what_would_help(worst.check, choice)}"
        )
    return sentences


def _what_would_help(check: str, choice: Choice) -> str:
    if "out of plane" in check or "slenderness" in check:
        held = "more counted purlins, knee braces or ties" if "chord" in choice.group.role else "shorter webs"
        return f"{held}, or another family"
    if "tension" in check:
        return "a longer weld or more bolts, a higher grade, or another family"
    return "closer trusses, a greater depth, shorter panels, or another family"
