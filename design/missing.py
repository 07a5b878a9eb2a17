"""What this roof cannot lose: the greatest utilisation if any one restraint, line or the whole anchor is missing."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from spanwright.design.demand import of_bars, side_by_side, sideways_compression
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice, utilisation_or_failure
from spanwright.design.standard import Demand
from spanwright.truss.arrays import FloatArray
from spanwright.truss.lengths import BucklingLengths, lengths_without


@dataclass(frozen=True)
class Missing:
    """The truss without one part of what holds it.

    part : in words. unheld : names of chord ends that nothing holds any more (then there is no utilisation).
    utilisation : greatest over all members, or the ratio of a limit that fails (slenderness).
    bar : the member, with its out-of-plane length in mm.
    """

    part: str
    unheld: tuple[str, ...]
    utilisation: float
    bar: str
    out_of_plane: float


def if_missing(setting: Setting, wanted: Demand, choices: tuple[Choice, ...]) -> tuple[Missing, ...]:
    """Return one row a part that can go missing, worst first; an end that nothing holds any more ranks first.

    The chosen sections are checked again with the lengths that remain; forces do not change.
    """
    lengths = lengths_without(setting.truss, setting.restraint, setting.project.restraint)
    standing = {part: left for part, left in lengths.items() if not left.unheld}
    rows = [Missing(part, left.unheld, np.inf, "", np.inf) for part, left in lengths.items() if left.unheld]
    rows += _checked_again(setting, wanted, choices, standing)
    return tuple(sorted(rows, key=lambda row: -row.utilisation))


def _checked_again(
    setting: Setting, wanted: Demand, choices: tuple[Choice, ...], standing: dict[str, BucklingLengths]
) -> list[Missing]:
    if not standing:
        return []
    variants = [_with_lengths(wanted, left) for left in standing.values()]
    ratios = np.array([_ratios(setting, wanted, choice, variants) for choice in choices]).max(axis=0)
    rows = []
    for (part, left), row in zip(standing.items(), ratios, strict=True):
        bar = int(np.argmax(row))
        rows.append(Missing(part, (), float(row[bar]), wanted.bars[bar], float(left.out_of_plane[bar])))
    return rows


def _ratios(setting: Setting, wanted: Demand, choice: Choice, variants: list[Demand]) -> FloatArray:
    """Return (parts, b) the greatest ratio of a group's bars without each part, 0 for other bars."""
    bars = choice.group.bars
    ratios = np.zeros((len(variants), len(wanted.bars)))
    ratios[:, bars] = utilisation_or_failure(choice.checks)[0]
    changed = [at for at, left in enumerate(variants) if (left.out_of_plane != wanted.out_of_plane)[bars].any()]
    if changed:
        together = side_by_side([of_bars(variants[at], bars) for at in changed])
        found = utilisation_or_failure(setting.standard.checks(choice.section, together))[0]
        ratios[np.array(changed)[:, None], bars] = found.reshape(len(changed), len(bars))
    return ratios


def _with_lengths(wanted: Demand, left: BucklingLengths) -> Demand:
    return replace(
        wanted,
        out_of_plane=left.out_of_plane,
        torsional=left.torsional,
        minor=left.minor,
        sideways=sideways_compression(wanted.axial, left),
    )
