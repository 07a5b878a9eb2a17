"""Where a few slender webs size a whole group: what a group of their own would save."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from spanwright.design.demand import of_bars
from spanwright.design.name_ranges import in_ranges
from spanwright.design.result import Design
from spanwright.design.sizing import Choice, worst_ratio
from spanwright.truss.arrays import BoolArray
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True)
class Split:
    """A group in two: `apart` (n,) True for the bars that keep the section; the candidate that does for the others; the
    mass saved, kg.
    """

    apart: BoolArray
    index: int
    saved: float


def worth_a_group(found: Design) -> Iterator[str]:
    """Yield a sentence for each group of webs that the slenderness of some sizes and that is worth dividing.

    Chords are left out: another section needs a splice.
    """
    for choice in found.choices:
        if "chord" in choice.group.role or not _idle(choice):
            continue
        split = _best_split(found, choice)
        if split is None or split.saved < TOLERANCES.worth_a_group * found.mass:
            continue
        names = np.array(found.setting.truss.bar_names)[choice.group.bars]
        yield (
            f"{choice.group.name}: the slenderness of {in_ranges(names[split.apart].tolist())} sizes them all, used at "
            f"most {_strength_use(choice):.2f} for strength; a group for these would save about {split.saved:.0f} kg a "
            f"truss, with {choice.candidates.names[split.index]} for the others"
        )


def _idle(choice: Choice) -> bool:
    return choice.group.sized and choice.passes and _strength_use(choice) < TOLERANCES.idle_group


def _strength_use(choice: Choice) -> float:
    return max(float(check.ratio.max()) for check in choice.checks if check.kind == "strength")


def _best_split(found: Design, choice: Choice) -> Split | None:
    """Return the split that saves most, or None where the lightest section for all was not what was chosen."""
    setting, bars = found.setting, choice.group.bars
    worst = worst_ratio(setting.standard.checks(choice.candidates, of_bars(found.demand, bars)))
    passes = (worst <= 1.0) & choice.joinable[:, None]
    if int(passes.all(axis=1).argmax()) != choice.index:
        return None
    lightest = passes.argmax(axis=0)
    lengths, mass = setting.truss.lengths[bars] / 1e3, choice.candidates.mass
    splits = []
    for least in np.unique(lightest)[1:]:
        apart = lightest >= least
        index = int(passes[:, ~apart].all(axis=1).argmax())
        saved = float((mass[choice.index] - mass[index]) * lengths[~apart].sum())
        splits.append(Split(apart, index, saved))
    return max(splits, key=lambda split: split.saved, default=None)
