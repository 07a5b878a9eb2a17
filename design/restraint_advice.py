"""What the engineer should know of soft knee braces and of a bottom chord that little holds sideways."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from spanwright.design.certificate import NextLighter
from spanwright.design.result import Design
from spanwright.design.sizing import Choice
from spanwright.truss.runs import Run
from spanwright.truss.tolerances import TOLERANCES


def soft_braces(found: Design) -> Iterator[str]:
    """Yield one sentence on all counted knee braces that rise far, with the stiffness that must be shown.

    What they have: practice notes 2.3, derived there from beam stiffness.
    """
    needed = {force.part: force.stiffness for force in found.restraint_forces}
    soft = [
        f"{brace.at} (rises {brace.rise / 1000:.2f} m, {needed[brace.name]:.0f} N/mm)"
        for brace in found.setting.restraint.braces
        if brace.counted and brace.rise > TOLERANCES.long_knee
    ]
    if soft:
        yield (
            f"Knee braces that rise more than {TOLERANCES.long_knee / 1000:g} m are soft: show for each that brace and "
            f"purlin together have the stiffness 2 beta Cu/Lb of cl. {found.setting.standard.restraint_clause}: "
            f"{', '.join(soft)}. The purlin gives 4EI/L (bent in single curvature) to 12EI/L (double), over the square "
            "of the rise; the brace in series lessens it."
        )


def long_bottom_chords(found: Design) -> Iterator[str]:
    """Yield a sentence for each bottom chord group sized by a run out of plane that no brace or tie bounds."""
    for choice, lighter in zip(found.choices, found.next_lighter, strict=True):
        run = _deciding_run(found, choice, lighter)
        if choice.group.role == "bottom chord" and run is not None and not _braced(run):
            start, end = (_joint_at(found, along) for along in (run.from_along, run.to_along))
            yield (
                f"{choice.group.name}: held sideways only at {start} and {end} over {run.length / 1000:.3f} m; knee "
                "braces or ties would make it lighter"
            )


def _deciding_run(found: Design, choice: Choice, lighter: NextLighter) -> Run | None:
    """Return the longest run of the bar that decides out of plane, in the choice or in the next lighter one."""
    if choice.passes and choice.index == 0:
        return None
    for decides in (found.governing_of(choice), lighter.fails):
        if decides is not None and "out of plane" in decides.check:
            bar = found.setting.truss.bar(decides.bar)
            runs = [run for run in found.setting.lengths.runs if bar in run.bars]
            return max(runs, key=lambda run: run.length)
    return None


def _braced(run: Run) -> bool:
    return any(part in words for words in run.between for part in ("knee brace", "tie at"))


def _joint_at(found: Design, along: float) -> str:
    chord = found.setting.truss.bottom
    return found.setting.truss.joint_names[chord.joints[int(np.argmin(np.abs(chord.along - along)))]]
