"""Packing plates between the two angles of a pair: how many, how far apart, how large."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from spanwright.design.catalogue import DENSITY
from spanwright.design.demand import of_bars
from spanwright.design.name_ranges import in_ranges
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.design.standard import Demand
from spanwright.truss.arrays import IntArray
from spanwright.truss.tolerances import TOLERANCES

PACK_WIDTH = 60.0
"""mm along the member (common practice: 50 to 75)."""
PACK_PROJECTION = 25.0
"""mm by which a pack is longer than the member is deep, for the welds on both edges (common practice: 20 to 30)."""


@dataclass(frozen=True)
class Pack:
    """The packs of one size in one truss.

    thickness, length : mm; the length lies across the member. count : in one truss. bars : indices, in order.
    remarks : where they sit and how they are fixed, sentences.
    """

    thickness: float
    length: float
    count: int
    bars: tuple[int, ...]
    remarks: tuple[str, ...]

    @property
    def mass(self) -> float:
        """Mass of one, kg."""
        return PACK_WIDTH * self.thickness * self.length * DENSITY * 1e-9

    @property
    def surface(self) -> float:
        """Surface of one, m2: both faces and the edges."""
        faces, edges = PACK_WIDTH * self.length, (PACK_WIDTH + self.length) * self.thickness
        return 2.0 * (faces + edges) * 1e-6


def packs_by_bar(setting: Setting, wanted: Demand, choices: tuple[Choice, ...]) -> IntArray:
    """Return (b,) the number of packs between the joints of each bar, 0 where the member is one piece."""
    counts = np.zeros(len(setting.truss.bar_names), dtype=np.intp)
    for choice in choices:
        demand = of_bars(wanted, choice.group.bars)
        counts[choice.group.bars] = setting.standard.packs_per_panel(choice.section, demand)[0]
    return counts


def packs(setting: Setting, wanted: Demand, choices: tuple[Choice, ...]) -> tuple[Pack, ...]:
    """Return the packs, one entry a size; as thick as the gap, as long as the member is deep and some more.

    Pairs in contact (no gap) have none.
    """
    counts = packs_by_bar(setting, wanted, choices)
    bars_of: dict[tuple[float, float], list[int]] = {}
    starred: set[tuple[float, float]] = set()
    for choice in choices:
        section = choice.section
        length = math.ceil((float(section.depth[0]) + PACK_PROJECTION) / TOLERANCES.same_length)
        size = (section.gap, TOLERANCES.same_length * length)
        if section.gap > 0.0:
            bars_of.setdefault(size, []).extend(int(bar) for bar in choice.group.bars if counts[bar] > 0)
            starred |= {size} if section.family == "2L star" else set()
    return tuple(
        Pack(
            *size,
            int(counts[bars].sum()),
            tuple(bars),
            (*_places(setting, wanted, counts, bars), _fixing(setting, starred=size in starred)),
        )
        for size, bars in bars_of.items()
        if bars
    )


def _places(setting: Setting, wanted: Demand, counts: IntArray, bars: list[int]) -> list[str]:
    """Say for each number of packs in which bars it is, and at what distance."""
    sentences = []
    for count in sorted({int(counts[bar]) for bar in bars}, reverse=True):
        here = [bar for bar in bars if counts[bar] == count]
        spacings = [float(wanted.panel[bar]) / (count + 1) for bar in here]
        apart = f"{min(spacings):.0f}"
        if round(max(spacings)) > round(min(spacings)):
            apart = f"{min(spacings):.0f} to {max(spacings):.0f}"
        names = in_ranges([setting.truss.bar_names[bar] for bar in here])
        sentences.append(f"{count} in each of {names}, {apart} mm apart")
    return sentences


def _fixing(setting: Setting, *, starred: bool) -> str:
    fixed = "welded" if setting.project.members.packs.factor < 1.0 else "welded, or bolted snug-tight"
    turned = ", in starred pairs in turn in one gap and the other" if starred else ""
    return f"between the angles, equally spaced between joints{turned}, {fixed}; flush where a purlin sits"
