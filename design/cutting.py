"""What is cut from one length of steel: runs of bars that are one piece, their cut lengths and end preparations."""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.truss.model import Chord, Truss
from spanwright.truss.tolerances import TOLERANCES

TUBES = ("CHS", "SHS", "RHS")


@dataclass(frozen=True, eq=False)
class Cut:
    """One run of bars as the saw sees it.

    bars : indices, in order. choice : what it is made of. length : mm, tip to tip.
    mitres : degrees from square at its two ends, 0 = square. profiled : ends cut to the face of a tube.
    """

    bars: tuple[int, ...]
    choice: Choice
    length: float
    mitres: tuple[float, float]
    profiled: bool


def cuts(setting: Setting, choices: tuple[Choice, ...]) -> tuple[Cut, ...]:
    """Return every run of the truss, chords first: straight chord bars of one group are one piece, and so are webs
    that pass straight through a joint on no chord.
    """
    truss = setting.truss
    owner = {int(bar): choice for choice in choices for bar in choice.group.bars}
    sections = {id(choice): choice.section for choice in choices}
    section_of = {bar: sections[id(choice)] for bar, choice in owner.items()}
    chord_cuts = [
        _chord_cut(truss, chord, run, owner[run[0]])
        for chord in (truss.top, truss.bottom)
        for run in _straight(truss, chord.bars, owner)
    ]
    webs = [bar for bar in range(len(truss.bar_names)) if "chord" not in truss.roles[bar]]
    web_runs = _web_runs(truss, webs, owner)
    gap = setting.project.members.setback
    return (*chord_cuts, *(_web_cut(truss, run, owner[run[0]], section_of, gap) for run in web_runs))


def _straight(truss: Truss, bars: Iterable[int], owner: dict[int, Choice]) -> list[tuple[int, ...]]:
    """Split a chain of bars where it kinks or its group changes."""
    runs: list[list[int]] = []
    for bar in bars:
        if runs and owner[runs[-1][-1]] is owner[bar] and _kink(truss, runs[-1][-1], bar) <= TOLERANCES.straight:
            runs[-1].append(bar)
        else:
            runs.append([bar])
    return [tuple(run) for run in runs]


def _kink(truss: Truss, first: int, second: int) -> float:
    """Return the angle in rad by which two bars that meet are out of line."""
    a, b = truss.directions[first], truss.directions[second]
    return abs(math.atan2(float(a[0] * b[1] - a[1] * b[0]), abs(float(a @ b))))


def _web_runs(truss: Truss, webs: list[int], owner: dict[int, Choice]) -> list[tuple[int, ...]]:
    on_chord = {*truss.top.joints, *truss.bottom.joints}
    runs: list[tuple[int, ...]] = []
    used: set[int] = set()
    for start in webs:
        if start in used:
            continue
        run = [start]
        for end in (1, 0):
            bar, joint = start, int(truss.ends[start, end])
            while joint not in on_chord:
                ahead = [
                    other
                    for other in webs
                    if other not in run
                    and owner[other] is owner[bar]
                    and joint in truss.ends[other]
                    and _kink(truss, bar, other) <= TOLERANCES.straight
                ]
                if not ahead:
                    break
                bar = ahead[0]
                run = [*run, bar] if end else [bar, *run]
                joint = int(truss.ends[bar].sum()) - joint
        used.update(run)
        runs.append(tuple(run))
    return runs


def _chord_cut(truss: Truss, chord: Chord, run: tuple[int, ...], choice: Choice) -> Cut:
    first, last = chord.bars.index(run[0]), chord.bars.index(run[-1])
    length = float(truss.lengths[list(run)].sum())
    mitres = [0.0, 0.0]
    if first == 0:
        length += chord.overhang[0]
    else:
        mitres[0] = _mitre(truss, chord.bars[first - 1], run[0])
    if last == len(chord.bars) - 1:
        length += chord.overhang[1]
    else:
        mitres[1] = _mitre(truss, run[-1], chord.bars[last + 1])
    return Cut(run, choice, length, (mitres[0], mitres[1]), profiled=False)


def _mitre(truss: Truss, first: int, second: int) -> float:
    return round(math.degrees(_kink(truss, first, second) / 2.0), 1)


def _web_cut(truss: Truss, run: tuple[int, ...], choice: Choice, section_of: dict[int, Candidates], gap: float) -> Cut:
    ends = _end_joints(truss, run)
    length = float(truss.lengths[list(run)].sum())
    profiled = True
    for joint, bar in zip(ends, (run[0], run[-1]), strict=True):
        through = _through(truss, joint, run)
        tubes = choice.candidates.family in TUBES and all(section_of[other].family in TUBES for other in through)
        profiled &= tubes
        length -= max((_to_edge(truss, bar, other, section_of[other]) for other in through), default=0.0)
        length -= 0.0 if tubes else gap
    return Cut(run, choice, length, (0.0, 0.0), profiled)


def _end_joints(truss: Truss, run: tuple[int, ...]) -> tuple[int, int]:
    if len(run) == 1:
        return int(truss.ends[run[0], 0]), int(truss.ends[run[0], 1])
    first = next(int(joint) for joint in truss.ends[run[0]] if joint not in truss.ends[run[1]])
    last = next(int(joint) for joint in truss.ends[run[-1]] if joint not in truss.ends[run[-2]])
    return first, last


def _through(truss: Truss, joint: int, run: tuple[int, ...]) -> list[int]:
    """Return the bars that run on past the end of a web at a joint: the chord's, or else the other webs there."""
    meeting = [int(bar) for bar in np.flatnonzero((truss.ends == joint).any(axis=1)) if bar not in run]
    chord = [bar for bar in meeting if "chord" in truss.roles[bar]]
    return chord or [
        bar
        for bar in meeting
        if any(_kink(truss, bar, other) <= TOLERANCES.straight for other in meeting if other != bar)
    ]


def _to_edge(truss: Truss, bar: int, through: int, section: Candidates) -> float:
    """Return mm along a web from the joint to the edge of the member that runs past it."""
    sine = math.sin(_kink(truss, bar, through))
    if section.family in TUBES:
        edge = float(section.depth[0]) / 2.0
    else:
        edge = float(section.leg_connected[0] - section.piece_centroid_outstanding[0])
    return edge / sine if sine > TOLERANCES.straight else 0.0
