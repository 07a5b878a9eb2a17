"""Connectors of pairs: how many packs stand in each panel, and how far apart."""

from __future__ import annotations

from dataclasses import dataclass

from spanwright.design.demand import of_bars
from spanwright.design.sizing import Choice
from spanwright.design.standard import Demand, Standard


@dataclass(frozen=True)
class Connectors:
    """The packs of one bar. panel, spacing : mm. count : between the joints."""

    bar: str
    panel: float
    count: int
    spacing: float


def connectors(standard: Standard, wanted: Demand, choice: Choice) -> tuple[Connectors, ...]:
    """Return the packs of a group's bars, equally spaced in each panel; none where the section is no pair."""
    if choice.section.pieces < 2:
        return ()
    group = of_bars(wanted, choice.group.bars)
    counts = standard.packs_per_panel(choice.section, group)[0]
    return tuple(
        Connectors(bar, float(panel), int(count), float(panel) / (int(count) + 1))
        for bar, panel, count in zip(group.bars, group.panel, counts, strict=True)
    )
