"""What the picture `restraint` shows of a chord: its lengths in and out of plane, and what stands along it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import groupby

import numpy as np

from spanwright.design.result import Design
from spanwright.io.text import kilonewtons
from spanwright.truss.arrays import FloatArray
from spanwright.truss.braces import BottomTie, KneeBrace
from spanwright.truss.model import Chord, Truss


@dataclass(frozen=True, eq=False)
class Stretch:
    """One length of a chord.

    ends : (2, 2) points of the truss, mm, left and right. length : developed, mm. compression : N, >= 0, the greatest
    in its bars over the strength combinations.
    """

    ends: FloatArray
    length: float
    compression: float


@dataclass(frozen=True, eq=False)
class Holder:
    """What stands at a point (2,) of a chord, mm: its lines in words, and whether it counts."""

    point: FloatArray
    lines: tuple[str, ...]
    counted: bool


@dataclass(frozen=True)
class ChordHolding:
    """A chord ("top" or "bottom") with its lengths between what holds it, and what does or does not hold it."""

    name: str
    in_plane: tuple[Stretch, ...]
    out_of_plane: tuple[Stretch, ...]
    holders: tuple[Holder, ...]


def chord_holding(design: Design, chord: Chord) -> ChordHolding:
    """Gather what the picture shows of a chord, left to right."""
    return ChordHolding(chord.name, _in_plane(design, chord), _out_of_plane(design, chord), _holders(design, chord))


def point_at(truss: Truss, chord: Chord, along: float) -> FloatArray:
    """Return the point (2,) of a chord, mm; beyond its ends, on the line of its end bar."""
    place = int(np.clip(np.searchsorted(chord.along, along) - 1, 0, len(chord.bars) - 1))
    start, end = truss.xy[chord.joints[place]], truss.xy[chord.joints[place + 1]]
    share = (along - chord.along[place]) / (chord.along[place + 1] - chord.along[place])
    point: FloatArray = start + share * (end - start)
    return point


def _in_plane(design: Design, chord: Chord) -> tuple[Stretch, ...]:
    """Return the lengths between the joints that hold the chord in its plane."""
    between = design.setting.lengths.in_plane_between
    stretches = []
    for _, group in groupby(range(len(chord.bars)), key=lambda place: between[chord.bars[place]]):
        places = list(group)
        start, end = float(chord.along[places[0]]), float(chord.along[places[-1] + 1])
        stretches.append(_stretch(design, chord, start, end, end - start, [chord.bars[place] for place in places]))
    return tuple(stretches)


def _out_of_plane(design: Design, chord: Chord) -> tuple[Stretch, ...]:
    """Return the lengths between the points that hold the chord sideways."""
    runs = [run for run in design.setting.lengths.runs if run.chord == chord.name]
    return tuple(_stretch(design, chord, run.from_along, run.to_along, run.length, run.bars) for run in runs)


def _stretch(design: Design, chord: Chord, start: float, end: float, length: float, bars: Sequence[int]) -> Stretch:
    ends = np.array([point_at(design.setting.truss, chord, along) for along in (start, end)])
    return Stretch(ends, length, max(0.0, -float(design.demand.axial[list(bars)].min())))


def _holders(design: Design, chord: Chord) -> tuple[Holder, ...]:
    """Return what holds the chord, with the force it must resist, and what stands there but does not."""
    forces = {force.part: f": {kilonewtons(force.force)}" for force in design.restraint_forces}
    holding: dict[float, list[str]] = {}
    for held in design.held[chord.name]:
        holding.setdefault(held.along, []).extend(_lines(f"{held.by}{forces.get(held.part, '')}"))
    found = [(along, tuple(lines), True) for along, lines in holding.items()]
    found += [(along, (words,), False) for along, words in _loose(design, chord)]
    found.sort(key=lambda holder: (holder[0], not holder[2]))
    truss = design.setting.truss
    return tuple(Holder(point_at(truss, chord, along), lines, counted) for along, lines, counted in found)


def _lines(words: str) -> list[str]:
    """Set "knee brace B4 to line 5: 2.2 kN" into two lines, which take less height."""
    brace, to, line = words.partition(" to ")
    return [brace, f"to {line}"] if to else [words]


def _loose(design: Design, chord: Chord) -> list[tuple[float, str]]:
    restraint = design.setting.restraint
    along = dict(zip(chord.joints, chord.along.tolist(), strict=True))
    parts: list[KneeBrace | BottomTie] = [*restraint.braces, *restraint.ties]
    parts = [part for part in parts if not part.counted and part.joint in along]
    loose = [(along[part.joint], f"{part.name}: no hold") for part in parts]
    if chord.name == "top":
        loose += [(line.along, f"{line.name}: loose") for line in restraint.lines if not line.anchored]
    return loose
