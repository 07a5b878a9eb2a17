"""The certificate of a choice: the next lighter candidate and the check it fails, judged with its own mass."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.demand import of_bars
from spanwright.design.serviceability import serviceability
from spanwright.design.setting import Setting, demand_of
from spanwright.design.sizing import Choice, Governing, governing


@dataclass(frozen=True)
class NextLighter:
    """What the next lighter candidate of a group fails, or why there is none.

    section : its name, or "". fails : the check that fails, or None. reason : words where there is no such section.
    """

    section: str
    fails: Governing | None
    reason: str = ""


def next_lighter(setting: Setting, choices: tuple[Choice, ...]) -> tuple[NextLighter, ...]:
    """Return one certificate a group; each candidate is analysed with its own mass and stiffness in place."""
    return tuple(_one(setting, choices, at) for at in range(len(choices)))


def _one(setting: Setting, choices: tuple[Choice, ...], at: int) -> NextLighter:
    choice = choices[at]
    if not choice.group.sized:
        return NextLighter("", None, "the section was given")
    lighter = np.flatnonzero(choice.joinable[: choice.index])
    if lighter.size == 0:
        return NextLighter("", None, "it is the lightest that the stated least sizes and stock allow")
    index = int(lighter[-1])
    chosen = [index if which == at else other.index for which, other in enumerate(choices)]
    analysis, wanted = demand_of(setting, chosen)
    section = choice.candidates.take([index])
    checks = setting.standard.checks(section, of_bars(wanted, choice.group.bars))
    names = tuple(c.name for c, counts in zip(analysis.combinations, analysis.strength, strict=True) if counts)
    bars = tuple(setting.truss.bar_names[bar] for bar in choice.group.bars)
    worst = governing(checks, bars, names)
    if worst.ratio <= 1.0:
        worst = _deflection(setting, analysis) or worst
    if worst.ratio <= 1.0:
        return NextLighter(section.names[0], None, "it passes with its own mass, but did not beside the first choices")
    return NextLighter(section.names[0], worst)


def _deflection(setting: Setting, analysis: Analysis) -> Governing | None:
    """Return the deflection that exceeds its limit most, as what governs, or None."""
    rows = serviceability(setting.truss, setting.project.deflection, analysis).deflections
    worst = max(rows, key=lambda row: row.ratio, default=None)
    if worst is None or worst.ratio <= 1.0:
        return None
    return Governing(f"deflection, {worst.name}", "Annex D", "limit", worst.joint, worst.combination, worst.ratio)
