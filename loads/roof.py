"""Loads on the roof: pressures carried by the purlin lines to the truss, and a man walking on it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from spanwright.loads import derivation as say
from spanwright.loads.bending import ChordBeams, Influence, Part, chord_beams
from spanwright.loads.strips import SIDES, Strips, strips
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import SlopeSide
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine


@dataclass(frozen=True, eq=False)
class Roof:
    """The roof over one truss.

    numbers : (l,) of the purlin lines. strips : what each carries. beams : the top chord under them.
    tributary : mm of roof along the ridge that the truss carries.
    """

    truss: Truss
    numbers: tuple[int, ...]
    strips: Strips
    beams: ChordBeams
    tributary: float

    def permanent(self, pressure: float) -> Part:
        """Return the part of a permanent pressure on the slope, MPa."""
        forces = self.strips.on_slope(pressure * self.tributary)
        carried = [f"{say.metres(length)} of slope" for length in self.strips.lengths.sum(axis=1)]
        return self._part(f"roof: {self._per_metre(pressure)} of slope", forces, carried)

    def imposed(self, pressure: float, half: SlopeSide | None = None) -> Part:
        """Return the part of an imposed pressure on plan, MPa, on the whole roof or on one half alone."""
        forces = self.strips.on_plan(pressure * self.tributary, half)
        carried = [f"{say.metres(length)} on plan" for length in self.strips.plan(half)]
        where = f" on the {half} half" if half else ""
        return self._part(f"roof, imposed{where}: {self._per_metre(pressure)} on plan", forces, carried)

    def wind(self, left: float, right: float) -> Part:
        """Return the part of pressures normal to the slopes, MPa, + presses in."""
        forces = self.strips.across(left * self.tributary, right * self.tributary)
        slope = np.array(self.strips.slope)
        carried = [
            " and ".join(
                f"{say.metres(float(row[slope == side].sum()))} of the {side} slope"
                for side in SIDES
                if row[slope == side].any()
            )
            for row in self.strips.lengths
        ]
        head = f"wind across the slopes, + presses in: left {self._per_metre(left)}, right {self._per_metre(right)}"
        return self._part(head, forces, carried)

    def men(self, load: float) -> Iterator[tuple[str, Part]]:
        """Yield the name of each place where a man (N) is met, and what he does there.

        He stands on every top joint that is no bearing (there no bar feels him), midway on every bar that carries a
        purlin between its joints, and at the outermost purlin of an overhang.
        """
        chord, names = self.truss.top, self.truss.joint_names
        for joint in chord.joints:
            if joint not in self.truss.bearing_joints:
                forces = np.zeros((len(names), 2))
                forces[joint, 1] = -load
                text = f"man: {say.force(0.0, -load)} at {names[joint]}"
                yield f"at {names[joint]}", self.beams.at_joints(forces, (text,))
        for bar, left, right in zip(chord.bars, chord.along[:-1], chord.along[1:], strict=True):
            if self.beams.stations.loads_between[bar]:
                name = self.truss.bar_names[bar]
                yield f"in {name}", self._man(load, (left + right) / 2, f"midway in {name}")
        first, last = self.strips.places[[0, -1]]
        for side, outermost, overhangs in (("left", first, first < 0.0), ("right", last, last > chord.length)):
            if overhangs:
                where = f"on {side} overhang"
                yield where, self._man(load, outermost, f"{where}, at its outermost purlin")

    @cached_property
    def _carried(self) -> Influence:
        return self.beams.influence(self.strips.places)

    def _man(self, load: float, place: float, where: str) -> Part:
        influence = self.beams.influence(np.array([place]))
        text = f"man: {say.force(0.0, -load)} {where}, {say.shares(self.truss, influence.shares[:, 0])}"
        return self._with_bending(influence.part(np.array([[0.0, -load]]), (text,)))

    def _part(self, head: str, forces: FloatArray, carried: list[str]) -> Part:
        lines = [
            f"purlin {number} at x {say.metres(x)}, {carries}: {say.force(*force)}, {say.shares(self.truss, column)}"
            for number, x, carries, force, column in zip(
                self.numbers, self.strips.x.tolist(), carried, forces.tolist(), self._carried.shares.T, strict=True
            )
        ]
        return self._with_bending(self._carried.part(forces, (head, *lines, say.total(forces))))

    def _with_bending(self, part: Part) -> Part:
        return replace(part, derivation=(*part.derivation, *say.bending(self.beams, part.moments)))

    def _per_metre(self, pressure: float) -> str:
        line_load = pressure * self.tributary
        return f"{say.kilopascals(pressure)} x {say.metres(self.tributary)} = {line_load:.3f} kN/m"


def roof_over(truss: Truss, lines: tuple[PurlinLine, ...], tributary: float, *, man: bool) -> Roof:
    """Return the roof over a truss. man : whether a man's load is to be met."""
    carried = strips(truss, lines)
    beams = chord_beams(truss, carried.places, man=man)
    return Roof(truss, tuple(line.number for line in lines), carried, beams, tributary)
