"""Tubes welded straight to tubes: what is not checked, and where joints leave the range of the usual rules."""

from __future__ import annotations

import math
from collections.abc import Iterator
from functools import cache

import numpy as np

from spanwright.design.lying import TUBES
from spanwright.design.name_ranges import in_ranges
from spanwright.design.sizing import Choice
from spanwright.design.tables import read_table
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

RANGE = "the range of EN 1993-1-8 7.1.2 and 7.8 (from memory)"


def joint_warnings(truss: Truss, choices: tuple[Choice, ...]) -> tuple[str, ...]:
    """Return the warnings of joints where a tube web is welded to a tube chord; none where there is no such joint."""
    owner = {int(bar): choice for choice in choices for bar in choice.group.bars}
    pairs = list(_joints(truss, owner))
    if not pairs:
        return ()
    outside = (
        *_thin_chords([owner[chord] for _, chord in pairs]),
        *_narrow_webs([(owner[web], owner[chord]) for web, chord in pairs]),
        *_flat_webs(truss, pairs, owner),
    )
    begin = "joints of tubes are not checked: where a chord's face is too weak for its webs, sizes must grow"
    return (begin, f"outside {RANGE}, so chord faces need a close look: {'; '.join(outside)}") if outside else (begin,)


def _joints(truss: Truss, owner: dict[int, Choice]) -> Iterator[tuple[int, int]]:
    """Yield (web, chord bar) for every chord bar that a tube web is welded to."""
    for web, role in enumerate(truss.roles):
        if "chord" in role or owner[web].section.family not in TUBES:
            continue
        for chord in np.flatnonzero(np.isin(truss.ends, truss.ends[web]).any(axis=1)):
            if "chord" in truss.roles[chord] and owner[int(chord)].section.family in TUBES:
                yield web, int(chord)


def _thin_chords(chords: list[Choice]) -> Iterator[str]:
    for chord in dict.fromkeys(chords):
        section, most = chord.section, _limits()[chord.section.family]["wall_ratio"]
        ratio = float(max(section.depth[0], section.width[0]) / section.thickness[0])
        if ratio > most:
            yield f"{chord.group.name} {chord.name} is {ratio:.1f} walls wide, more than {most:g}"


def _narrow_webs(pairs: list[tuple[Choice, Choice]]) -> Iterator[str]:
    for web, chord in dict.fromkeys(pairs):
        least = _limits()[chord.section.family]["width_ratio"]
        ratio = float(web.section.width[0] / chord.section.width[0])
        if ratio < least:
            begin = f"{web.group.name} {web.name} is {ratio:.2f} of the width"
            yield f"{begin} of the {chord.group.name}, less than {least:g}"


def _flat_webs(truss: Truss, pairs: list[tuple[int, int]], owner: dict[int, Choice]) -> Iterator[str]:
    """Name the webs that lie flatter on a chord than the rules reach, by least angle."""
    flat: dict[float, list[str]] = {}
    for web, chord in pairs:
        least = _limits()[owner[chord].section.family]["angle_deg"]
        if _angle(truss, web, chord) < math.radians(least) - TOLERANCES.straight:
            flat.setdefault(least, []).append(truss.bar_names[web])
    for least, webs in flat.items():
        yield f"{in_ranges(list(dict.fromkeys(webs)))}: less than {least:g} deg to the chord"


def _angle(truss: Truss, web: int, chord: int) -> float:
    """Return the acute angle between two bars, rad."""
    return math.acos(min(1.0, abs(float(truss.directions[web] @ truss.directions[chord]))))


@cache
def _limits() -> dict[str, dict[str, float]]:
    rows = read_table("tube_joints.csv")
    return {row["chord"]: {name: float(value) for name, value in row.items() if name != "chord"} for row in rows}
