"""The way back down: under uplift a lighter truss is pressed harder, so sizing from below can end too heavy.

The first round analyses the lightest truss, whose bottom chord and webs see the most uplift, and what it chooses for
them may be heavier than the heavier truss of the last round needs.
"""

from __future__ import annotations

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.demand import of_bars
from spanwright.design.serviceability import serviceability
from spanwright.design.setting import Setting, demand_of
from spanwright.design.sizing import Choice, fitting, settle, worst_ratio
from spanwright.design.standard import Demand

Sized = tuple[Analysis, Demand, tuple[Choice, ...]]
"""A truss with its sections: analysis, demand and choices that belong together."""


def lightened(setting: Setting, sized: Sized) -> Sized:
    """Return the truss with every group as light as the others allow; as it is where a group fails.

    A group is made lighter only if the whole truss, analysed with its new mass, passes every check and its deflection
    limits; each step lowers one group and raises none, so it ends.
    """
    if not all(choice.passes for choice in sized[2]):
        return sized
    found: Sized | None = sized
    while found is not None:
        sized = found
        found = _one_step(setting, sized)
    return sized


def _one_step(setting: Setting, sized: Sized) -> Sized | None:
    _, wanted, choices = sized
    for at, choice in enumerate(choices):
        for index in _lighter(setting, wanted, choice):
            chosen = [index if which == at else other.index for which, other in enumerate(choices)]
            tried = _analysed(setting, chosen, choices)
            if _stands(setting, tried):
                return tried
    return None


def _lighter(setting: Setting, wanted: Demand, choice: Choice) -> list[int]:
    """Return the candidates lighter than the choice that pass with the forces as they are, lightest first."""
    if not choice.group.sized or choice.index == 0:
        return []
    lower = choice.candidates.take(np.arange(choice.index))
    worst = worst_ratio(setting.standard.checks(lower, of_bars(wanted, choice.group.bars))).max(axis=1)
    passing = np.flatnonzero((worst <= 1.0) & choice.joinable[: choice.index])
    return [int(index) for index in passing]


def _analysed(setting: Setting, chosen: list[int], choices: tuple[Choice, ...]) -> Sized:
    analysis, wanted = demand_of(setting, chosen)
    chords = [
        choice.candidates.take([index])
        for choice, index in zip(choices, chosen, strict=True)
        if "chord" in choice.group.role
    ]
    settled = []
    for choice, index in zip(choices, chosen, strict=True):
        group, candidates = choice.group, choice.candidates
        fits = choice.joinable if "chord" in group.role else fitting(candidates, chords)
        settled.append(settle(group, candidates, index, setting.standard, of_bars(wanted, group.bars), fits))
    return analysis, wanted, tuple(settled)


def _stands(setting: Setting, sized: Sized) -> bool:
    analysis, _, choices = sized
    members = all(choice.passes for choice in choices)
    return members and serviceability(setting.truss, setting.project.deflection, analysis).passes
