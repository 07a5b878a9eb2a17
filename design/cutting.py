"""What is cut from one length of steel: runs of bars that are one piece, where they end and how the ends are made."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.cut_ends import SQUARE, End, Passing, mitre, passing, web_end
from spanwright.design.lying import Lying, edges
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError
from spanwright.truss.model import Chord, Truss
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True, eq=False)
class Cut:
    """One run of bars as the saw sees it; the member may be two pieces that lie side by side.

    bars : indices, in order. choice : what it is made of.
    start, finish : (2,) mm, where the setting-out line begins and ends; a chord runs from left to right.
    ends : how the start and the finish are made.
    """

    bars: tuple[int, ...]
    choice: Choice
    start: FloatArray
    finish: FloatArray
    ends: tuple[End, End]

    @property
    def axis(self) -> float:
        """Length along the setting-out line, mm."""
        return float(np.hypot(*(self.finish - self.start)))

    @cached_property
    def direction(self) -> FloatArray:
        """(2,) unit vector from start to finish."""
        direction: FloatArray = (self.finish - self.start) / self.axis
        return direction

    def length(self, lies: Lying) -> float:
        """Return the length, tip to tip along the axis, mm, of the piece that lies so."""
        first, last = self.ends
        starts = [first.slant * edge for edge in (lies.lower, lies.upper)] if first.kind == "mitre" else [0.0]
        finishes = [last.slant * edge for edge in (lies.lower, lies.upper)] if last.kind == "mitre" else [0.0]
        return self.axis + first.beyond + last.beyond + max(finishes) - min(starts)

    @cached_property
    def outline(self) -> FloatArray:
        """(4, 2) mm: the corners of the whole member, lower start, lower finish, upper finish, upper start."""
        lower, upper = edges(self.choice.section, self.choice.group.role)
        along, across = self.direction, np.array([-self.direction[1], self.direction[0]])
        first, last = self.ends
        corners: FloatArray = np.array(
            [
                self.start + lower * (across + first.slant * along),
                self.finish + lower * (across + last.slant * along),
                self.finish + upper * (across + last.slant * along),
                self.start + upper * (across + first.slant * along),
            ]
        )
        return corners


def cuts(setting: Setting, choices: tuple[Choice, ...]) -> tuple[Cut, ...]:
    """Return every run of the truss, chords first: straight chord bars of one group are one piece, and so are webs
    of one group that pass straight through a joint on no chord.

    Raises InputError (key "members.setback") for a web for which the members at its ends leave no room.
    """
    truss = setting.truss
    owner = {int(bar): choice for choice in choices for bar in choice.group.bars}
    chord_cuts = [
        _chord_cut(truss, chord, run, owner[run[0]])
        for chord in (truss.top, truss.bottom)
        for run in _straight(truss, chord.bars, owner)
    ]
    sections = {bar: choice.section for bar, choice in owner.items()}
    gap = setting.project.members.setback
    web_cuts = [_web_cut(truss, run, owner[run[0]], sections, gap) for run in _web_runs(truss, owner)]
    return (*chord_cuts, *web_cuts)


def _straight(truss: Truss, bars: Iterable[int], owner: dict[int, Choice]) -> list[tuple[int, ...]]:
    """Split a chain of bars where it kinks or its group changes."""
    runs: list[list[int]] = []
    for bar in bars:
        if runs and owner[runs[-1][-1]] is owner[bar] and _in_line(truss, runs[-1][-1], bar):
            runs[-1].append(bar)
        else:
            runs.append([bar])
    return [tuple(run) for run in runs]


def _in_line(truss: Truss, first: int, second: int) -> bool:
    a, b = truss.directions[first], truss.directions[second]
    return abs(float(a[0] * b[1] - a[1] * b[0])) <= TOLERANCES.straight


def _chord_cut(truss: Truss, chord: Chord, run: tuple[int, ...], choice: Choice) -> Cut:
    first, last = chord.bars.index(run[0]), chord.bars.index(run[-1])
    steps = np.diff(truss.xy[list(chord.joints)], axis=0)
    directions = steps / np.hypot(steps[:, 0], steps[:, 1])[:, None]
    start, finish = truss.xy[chord.joints[first]], truss.xy[chord.joints[last + 1]]
    along = (finish - start) / np.hypot(*(finish - start))
    ends = [SQUARE, SQUARE]
    if first == 0:
        start = start - chord.overhang[0] * along
    else:
        ends[0] = mitre(directions[first - 1], directions[first], along)
    if last == len(chord.bars) - 1:
        finish = finish + chord.overhang[1] * along
    else:
        ends[1] = mitre(directions[last], directions[last + 1], along)
    return Cut(run, choice, start, finish, (ends[0], ends[1]))


def _web_runs(truss: Truss, owner: dict[int, Choice]) -> list[tuple[int, ...]]:
    """Return the webs by run: on through a joint on no chord, with the web of the same group straight ahead."""
    on_chord = {*truss.top.joints, *truss.bottom.joints}
    webs = [bar for bar in range(len(truss.bar_names)) if "chord" not in truss.roles[bar]]
    runs: list[tuple[int, ...]] = []
    used: set[int] = set()
    for start in webs:
        if start in used:
            continue
        run = [start]
        for end in (1, 0):
            bar, joint = start, int(truss.ends[start, end])
            while joint not in on_chord:
                ahead = [other for other in _meeting(truss, joint, run) if _goes_on(truss, owner, bar, other)]
                if not ahead:
                    break
                bar = ahead[0]
                run = [*run, bar] if end else [bar, *run]
                joint = int(truss.ends[bar].sum()) - joint
        used.update(run)
        runs.append(tuple(run))
    return runs


def _goes_on(truss: Truss, owner: dict[int, Choice], bar: int, other: int) -> bool:
    return "chord" not in truss.roles[other] and owner[other] is owner[bar] and _in_line(truss, bar, other)


def _meeting(truss: Truss, joint: int, run: Sequence[int]) -> list[int]:
    """Return the bars that meet at a joint, but for those of the run."""
    return [bar for bar in map(int, np.flatnonzero((truss.ends == joint).any(axis=1))) if bar not in run]


def _web_cut(truss: Truss, run: tuple[int, ...], choice: Choice, sections: dict[int, Candidates], gap: float) -> Cut:
    joints = _end_joints(truss, run)
    start, finish = truss.xy[joints[0]], truss.xy[joints[1]]
    length = float(np.hypot(*(finish - start)))
    along: FloatArray = (finish - start) / length
    first, last = (
        web_end(choice.section, choice.group.role, along, _past(truss, sections, joint, run, inward), gap)
        for joint, inward in zip(joints, (along, -along), strict=True)
    )
    if first.length + last.length >= length:
        name = truss.bar_names[run[0]]
        raise InputError(
            f"no room for {name} ({choice.name}): it is {length:.0f} mm long between joints, of which the members at "
            f"its ends and the gaps take {first.length + last.length:.0f} mm",
            "take fewer panels, a steeper pitch or a raised heel; or shallower sections, or a smaller setback",
            "members.setback",
        )
    ends = (first.end, last.end)
    return Cut(run, choice, start + first.length * along, finish - last.length * along, ends)


def _end_joints(truss: Truss, run: tuple[int, ...]) -> tuple[int, int]:
    if len(run) == 1:
        return int(truss.ends[run[0], 0]), int(truss.ends[run[0], 1])
    first = next(int(joint) for joint in truss.ends[run[0]] if joint not in truss.ends[run[1]])
    last = next(int(joint) for joint in truss.ends[run[-1]] if joint not in truss.ends[run[-2]])
    return first, last


def _past(
    truss: Truss, sections: dict[int, Candidates], joint: int, run: tuple[int, ...], inward: FloatArray
) -> list[Passing]:
    """Return what runs on past the end of a web at a joint: the chords there, or else the webs that pass through.

    inward : (2,) unit direction of the web, away from the joint.
    """
    meeting = _meeting(truss, joint, run)
    chord = [bar for bar in meeting if "chord" in truss.roles[bar]]
    through = chord or [
        bar for bar in meeting if any(other != bar and _in_line(truss, bar, other) for other in meeting)
    ]
    return [passing(sections[bar], truss.roles[bar], truss.directions[bar], inward) for bar in through]
