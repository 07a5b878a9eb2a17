"""The top chord as continuous beams: what a load between joints gives to the joints, and how it bends the chord.

Each straight run of the chord is a beam over its joints, hinged to the next run at a kink (heel, ridge, any other
change of slope); an overhang continues the end run as a cantilever. Only the component of a load across the chord
bends it and is shared among its joints. The component along the chord goes to one joint whole: between the joints the
bar's axial force steps by it, so one end of the bar carries more than the other, and the end that carries more is the
one to check.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise

import numpy as np

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.beam import Beam
from spanwright.truss.chords import slopes
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True, eq=False)
class Stations:
    """Sections of the top chord at which its moment is known; between them it runs straight.

    Sorted by the chord's bars from left to right, within a bar from its left joint to its right one: the first and
    the last station of a bar are its joints, those between are the places of loads.

    bar : (m,) bar indices. at : (m,) mm from the bar's left joint.
    loads_between : (b,) over all bars of the truss: places strictly between the joints of each bar where a purlin
        stands or a man may.
    """

    bar: IntArray
    at: FloatArray
    loads_between: IntArray


@dataclass(frozen=True, eq=False)
class Part:
    """A part of a load case: forces on joints (j, 2) N, moments at the stations (m,) N mm, and how they came about."""

    joint_loads: FloatArray
    moments: FloatArray
    derivation: tuple[str, ...]


@dataclass(frozen=True, eq=False)
class Influence:
    """What unit forces at places (p,) of the top chord do.

    shares : (j, p) the share of each force across the chord that goes to each joint of the truss.
    moments : (m, p) mm, the moment at each station, sagging +, for a unit force across the chord, pressing in.
    across : (p, 2) unit vectors across the chord at each place, pressing in.
    ends : (p, 2) the lower and the upper joint of the bar at each place; for a place on a joint that joint twice, on an
        overhang the chord's end joint twice.
    """

    shares: FloatArray
    moments: FloatArray
    across: FloatArray
    ends: IntArray

    def part(self, forces: FloatArray, derivation: tuple[str, ...], *, pulled: bool = False) -> Part:
        """Return what forces (p, 2) N at the places do.

        Across the chord they go to the joints as the reactions of its beams. Along it they go to the upper joint of
        their bar: the whole bar then carries the compression of its lowest part, which is the greatest in it (seen by a
        cut just above the lower joint). pulled : to the lower joint, for loads that count where the chord is pulled:
        the whole bar then carries the tension of its uppermost part. No other bar of a determinate truss feels the
        difference, and a force moved along its own line keeps sum and moment.
        """
        pressing = (forces * self.across).sum(axis=1)
        across = pressing[:, None] * self.across
        joint_loads = self.shares @ across
        np.add.at(joint_loads, self.ends[:, 0 if pulled else 1], forces - across)
        return Part(joint_loads, self.moments @ pressing, derivation)


@dataclass(frozen=True, eq=False)
class ChordBeams:
    """The top chord of a truss as beams, with the stations at which moments are wanted.

    Places are mm along the chord from its first joint, negative or beyond its length on an overhang.
    """

    truss: Truss
    stations: Stations

    @cached_property
    def runs(self) -> tuple[tuple[int, int], ...]:
        """Straight runs of the chord: (first, last) positions of their joints in the chord."""
        directions = slopes(self.truss).directions
        turns = np.arccos(np.clip((directions[:-1] * directions[1:]).sum(axis=1), -1.0, 1.0))
        kinks = np.flatnonzero(turns > TOLERANCES.straight) + 1
        return tuple(pairwise((0, *kinks.tolist(), len(directions))))

    @cached_property
    def beams(self) -> tuple[Beam, ...]:
        """A beam for each run."""
        return tuple(Beam(self.truss.top.along[first : last + 1]) for first, last in self.runs)

    @cached_property
    def across(self) -> FloatArray:
        """(chord bars, 2) unit vectors across each bar of the chord, pressing in from above."""
        directions = slopes(self.truss).directions
        return np.column_stack([directions[:, 1], -directions[:, 0]])

    def influence(self, places: FloatArray) -> Influence:
        """Return what unit forces at places (p,) of the chord do."""
        chord = self.truss.top
        position = np.array([chord.bars.index(bar) for bar in self.stations.bar])
        sections = chord.along[position] + self.stations.at
        shares = np.zeros((len(self.truss.joint_names), len(places)))
        moments = np.zeros((len(sections), len(places)))
        run_of_place = self._run_of(places)
        for number, ((first, last), beam) in enumerate(zip(self.runs, self.beams, strict=True)):
            here = np.flatnonzero(run_of_place == number)
            inside = np.flatnonzero((position >= first) & (position < last))
            joints = np.array(chord.joints[first : last + 1])
            shares[np.ix_(joints, here)] = beam.reactions(places[here])
            moments[np.ix_(inside, here)] = beam.moments(sections[inside], places[here])
        bar = np.searchsorted(chord.along[1:-1], places)
        return Influence(shares, moments, self.across[bar], self._ends_at(places, bar))

    def at_joints(self, forces: FloatArray, derivation: tuple[str, ...]) -> Part:
        """Return what forces (j, 2) N straight on the joints do: no bending."""
        return Part(forces, np.zeros(len(self.stations.at)), derivation)

    def _ends_at(self, places: FloatArray, bar: IntArray) -> IntArray:
        """Return (p, 2) the joints that a force along the chord may go to, the lower and the upper; see `Influence`.

        bar : (p,) position in the chord of the bar at each place.
        """
        chord = self.truss.top
        position = np.column_stack([bar, bar + 1])
        on_left, on_right = places <= chord.along[bar], places >= chord.along[bar + 1]
        position[on_left, 1] = bar[on_left]
        position[on_right, 0] = bar[on_right] + 1
        ends = np.array(chord.joints)[position]
        by_height = np.argsort(self.truss.xy[ends, 1], axis=1, kind="stable")
        return np.take_along_axis(ends, by_height, axis=1)

    def _run_of(self, places: FloatArray) -> IntArray:
        """Return (p,) the number of the run each place stands on; a place on a kink stands on the left one."""
        kinks = self.truss.top.along[[first for first, _ in self.runs[1:]]]
        return np.searchsorted(kinks, places)


def chord_beams(truss: Truss, purlins_at: FloatArray, *, man: bool) -> ChordBeams:
    """Return the top chord's beams with stations at its joints and at every load between them.

    purlins_at : (l,) places of the purlin lines; those that stand on a joint have exactly its place.
    man : whether a man's load is to be met: he stands at joints, and midway on bars that carry purlins between joints.
    """
    chord = truss.top
    bars: list[int] = []
    at: list[float] = []
    loads_between = np.zeros(len(truss.bar_names), dtype=np.intp)
    for bar, left, right in zip(chord.bars, chord.along[:-1], chord.along[1:], strict=True):
        between = purlins_at[(purlins_at > left) & (purlins_at < right)] - left
        middle = (right - left) / 2
        if man and between.size and np.abs(between - middle).min() > TOLERANCES.same_point:
            between = np.sort(np.append(between, middle))
        loads_between[bar] = between.size
        bars += [bar] * (between.size + 2)
        at += [0.0, *between.tolist(), right - left]
    return ChordBeams(truss, Stations(np.array(bars, dtype=np.intp), np.array(at, dtype=np.float64), loads_between))
