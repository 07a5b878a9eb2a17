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

    names : (l,) of the purlin lines. on_joint : (l,) whether each stands on a joint.
    strips : what each carries. beams : the top chord under them.
    tributary : mm of roof along the ridge that the truss carries.
    """

    truss: Truss
    names: tuple[str, ...]
    on_joint: tuple[bool, ...]
    strips: Strips
    beams: ChordBeams
    tributary: float

    @property
    def has_both_slopes(self) -> bool:
        """Whether the roof has a left and a right slope."""
        return set(self.strips.slope) == set(SIDES)

    def permanent(self, pressure: float, *, pulled: bool = False) -> Part:
        """Return the part of a permanent pressure on the slope, MPa; pulled : see `bending.Influence.part`."""
        forces = self.strips.on_slope(pressure * self.tributary)
        carried = [f"{say.metres(length)} of slope" for length in self.strips.lengths.sum(axis=1)]
        head, goes = (
            f"roof: {self._per_metre(pressure)} of slope",
            self._shares_down if pulled else self._shares(forces),
        )
        return self._part(head, forces, carried, goes, pulled=pulled)

    def imposed(self, pressure: float, half: SlopeSide | None = None) -> Part:
        """Return the part of an imposed pressure on plan, MPa, on the whole roof or on one half alone."""
        forces = self.strips.on_plan(pressure * self.tributary, half)
        carried = [f"{say.metres(length)} on plan" if length else "" for length in self.strips.plan(half)]
        where = f" on the {half} half" if half else ""
        head = f"roof, imposed{where}: {self._per_metre(pressure)} on plan"
        return self._part(head, forces, carried, self._shares_again)

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
        return self._part(head, forces, carried, self._shares_again)

    def surface(self, cuts: FloatArray, net: FloatArray, head: tuple[str, ...]) -> Part:
        """Return the part of pressures normal to the roof that change along it, MPa, + presses in.

        cuts : (q + 1,) x between which the pressures net (q,) hold, mm. head : how they came about.
        """
        at = np.clip(np.searchsorted(cuts, self.strips.middles) - 1, 0, len(net) - 1)
        forces = self.strips.across_pieces(net[at] * self.tributary)
        carried = [f"{say.metres(length)} of slope" for length in self.strips.lengths.sum(axis=1)]
        part = self._part(
            f"on {say.metres(self.tributary)} of roof along the ridge", forces, carried, self._shares_again
        )
        return replace(part, derivation=(*head, *part.derivation))

    def snow(self, left: float, right: float, edges: tuple[float, float], head: tuple[str, ...]) -> Part:
        """Return the part of snow, MPa on plan of each slope, and of what hangs over the eaves, N/mm along them."""
        forces = self.strips.on_plan_pieces(self.strips.by_slope(left, right) * self.tributary)
        forces[[0, -1], 1] -= np.array(edges) * self.tributary
        carried = [f"{say.metres(length)} on plan" for length in self.strips.plan()]
        line = f"snow: left {self._per_metre(left)}, right {self._per_metre(right)}, on plan"
        part = self._part(line, forces, carried, self._shares_again)
        return replace(part, derivation=(*head, *part.derivation))

    def men(self, load: float) -> Iterator[tuple[str, Part]]:
        """Yield the name of each place where a man (N) is met, and what he does there.

        He stands on every top joint that is no bearing (there no bar feels him), midway on every bar that carries a
        purlin between its joints, and at the outermost purlin of an overhang.
        """
        names = self.truss.joint_names
        for joint in self.truss.top.joints:
            if joint not in self.truss.bearing_joints:
                forces = np.zeros((len(names), 2))
                forces[joint, 1] = -load
                text = f"man: {say.force(0.0, -load)} at {names[joint]}"
                yield f"at {names[joint]}", self.beams.at_joints(forces, (text,))
        standing = self._standing_between_joints()
        influence = self.beams.influence(np.array([place for _, place in standing]))
        for number, (where, _) in enumerate(standing):
            forces = np.zeros((len(standing), 2))
            forces[number, 1] = -load
            text = f"man: {say.force(0.0, -load)} {where}, {self._goes(influence, number, forces[number])}"
            yield where, self._with_bending(influence.part(forces, (text,)))

    def _standing_between_joints(self) -> list[tuple[str, float]]:
        """Return where a man is met between the joints of the top chord: in words, and the place along it, mm."""
        chord, loads_between = self.truss.top, self.beams.stations.loads_between
        middles = (chord.along[:-1] + chord.along[1:]) / 2
        bars = zip(chord.bars, middles.tolist(), strict=True)
        standing = [(f"in {self.truss.bar_names[bar]}", middle) for bar, middle in bars if loads_between[bar]]
        first, last = self.strips.places[[0, -1]].tolist()
        if first < 0.0:
            standing.append(("on left overhang", first))
        if last > chord.length:
            standing.append(("on right overhang", last))
        return standing

    @cached_property
    def _carried(self) -> Influence:
        return self.beams.influence(self.strips.places)

    def _shares(self, forces: FloatArray) -> list[str]:
        return [self._goes(self._carried, number, force) for number, force in enumerate(forces)]

    @cached_property
    def _shares_down(self) -> list[str]:
        """Where each line's force goes in a case that counts where the chord is pulled."""
        lower = [self.truss.joint_names[joint] for joint in self._carried.ends[:, 0]]
        again = zip(self._shares_again, self.on_joint, lower, strict=True)
        return [text if on_joint else f"{text}, but along the chord to {name}" for text, on_joint, name in again]

    @cached_property
    def _shares_again(self) -> list[str]:
        """Where each line's force goes, for cases after the permanent ones, which list the shares."""
        shares = zip(self._shares(np.zeros((len(self.names), 2))), self.on_joint, strict=True)
        return [text if on_joint else "shared as under most" for text, on_joint in shares]

    def _goes(self, influence: Influence, number: int, force: FloatArray) -> str:
        across = influence.across[number]
        along = float(np.hypot(*(force - (force @ across) * across)))
        return say.shares(self.truss, influence.shares[:, number], int(influence.ends[number, 1]), along)

    def _part(
        self, head: str, forces: FloatArray, carried: list[str], goes: list[str], *, pulled: bool = False
    ) -> Part:
        """Return the part of forces (l, 2); `carried` says what each line carries ("" = nothing), `goes` where to."""
        lines = [
            f"{name} at x {say.metres(x)}, {carries}: {say.force(*force)}, {where}"
            for name, x, carries, force, where in zip(
                self.names, self.strips.x.tolist(), carried, forces.tolist(), goes, strict=True
            )
            if carries
        ]
        return self._with_bending(self._carried.part(forces, (head, *lines, say.total(forces)), pulled=pulled))

    def _with_bending(self, part: Part) -> Part:
        return replace(part, derivation=(*part.derivation, *say.bending(self.beams, part.moments)))

    def _per_metre(self, pressure: float) -> str:
        line_load = pressure * self.tributary
        return f"{say.kilopascals(pressure)} x {say.metres(self.tributary)} = {line_load:.3f} kN/m"


def roof_over(
    truss: Truss, lines: tuple[PurlinLine, ...], tributary: float, *, man: bool, cuts: FloatArray | None = None
) -> Roof:
    """Return the roof over a truss. man : whether a man's load is to be met. cuts : x where pressures change, mm."""
    carried = strips(truss, lines, cuts)
    beams = chord_beams(truss, carried.places, man=man)
    on_joint = tuple(line.joint is not None for line in lines)
    return Roof(truss, tuple(line.name for line in lines), on_joint, carried, beams, tributary)
