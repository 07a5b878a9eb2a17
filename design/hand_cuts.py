"""Hand checks by cutting the truss: chord forces by moments about the opposite joint, the web by the shear.

A cut between two neighbouring places of joints that meets one bar of each chord and one web leaves three unknowns,
which the equilibrium of the part to its left gives one by one.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.comparison import Comparison, compared
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

CUTS = 3
"""Cuts made: near the bearing, half-way, and at mid-span."""


@dataclass(frozen=True, eq=False)
class Cut:
    """A vertical cut at x (mm) through one bar of the top chord, one of the bottom chord and one web (indices)."""

    x: float
    top: int
    bottom: int
    web: int


def cuts(truss: Truss, analysis: Analysis) -> Iterator[Comparison]:
    """Yield the checks at cuts of the left half, in the strength combinations that press each chord most.

    The top chord's combination at every chosen cut, the bottom chord's at the one nearest mid-span.
    """
    chosen = chosen_cuts(truss)
    strength = np.flatnonzero(analysis.strength)
    for chord, here in ((truss.top, chosen), (truss.bottom, chosen[-1:])):
        forces = analysis.forces[np.array(chord.bars)][:, strength]
        if forces.min() < 0.0:
            _, column = np.unravel_index(int(np.argmin(forces)), forces.shape)
            for cut in here:
                yield from at_cut(truss, analysis, cut, int(strength[column]))


def chosen_cuts(truss: Truss) -> list[Cut]:
    """Return up to `CUTS` cuts of the left half that meet just three bars: the first, the middle and the last."""
    middle = float(truss.xy[list(truss.bearing_joints), 0].mean())
    places = np.unique(np.round(truss.xy[:, 0], 3))
    possible = [
        cut
        for left, right in pairwise(places.tolist())
        if right <= middle + TOLERANCES.same_point and (cut := _cut(truss, (left + right) / 2.0)) is not None
    ]
    return [possible[at] for at in sorted({0, len(possible) // 2, len(possible) - 1})] if possible else []


def _cut(truss: Truss, x: float) -> Cut | None:
    spans = np.sort(truss.xy[truss.ends, 0], axis=1)
    met = np.flatnonzero((spans[:, 0] < x) & (spans[:, 1] > x))
    by_role = {truss.roles[bar].split()[0]: int(bar) for bar in met}
    webs = [int(bar) for bar in met if "chord" not in truss.roles[bar]]
    if len(met) != 3 or len(webs) != 1 or not {"top", "bottom"} <= by_role.keys():
        return None
    return Cut(x, by_role["top"], by_role["bottom"], webs[0])


def at_cut(truss: Truss, analysis: Analysis, cut: Cut, combination: int) -> Iterator[Comparison]:
    """Yield the three bars of a cut in one combination, by hand and as found."""
    factored = analysis.combinations[combination]
    factors = dict(factored.factors)
    shares = np.array([factors.get(case.name, 0.0) for case in analysis.cases])
    outside = analysis.loads @ shares + analysis.reactions[:, :, combination]
    left = truss.xy[:, 0] < cut.x
    force = outside[left].sum(axis=0)
    found = analysis.forces[:, combination]
    by_hand = {}
    for bar, other in ((cut.top, cut.bottom), (cut.bottom, cut.top)):
        centre = crossing(truss, other, cut.web)
        if centre is None:
            return
        moment = _moment(truss.xy[left] - centre, outside[left])
        arm = _moment(truss.xy[[truss.ends[bar, 0]]] - centre, truss.directions[[bar]])
        if abs(arm) < TOLERANCES.same_point:
            return
        by_hand[bar] = -moment / arm
        yield compared(
            f"{truss.bar_names[bar]}, force N = M/h",
            f"{factored.name}",
            f"M = {abs(moment) / 1e6:.3f} kN m about {_named(truss, centre)}, h = {abs(arm) / 1e3:.4f} m",
            by_hand[bar],
            float(found[bar]),
            "N",
        )
    upright = float(truss.directions[cut.web, 1])
    shear = float(force[1] + sum(by_hand[bar] * truss.directions[bar, 1] for bar in by_hand))
    if abs(upright) > TOLERANCES.straight:
        yield compared(
            f"{truss.bar_names[cut.web]}, by the shear at x = {cut.x / 1e3:.3f} m",
            factored.name,
            f"{shear / 1e3:.3f} kN upright from loads, bearing and chords to its left; it "
            f"{'rises' if upright > 0 else 'falls'} by {abs(upright):.4f} of its length",
            -shear / upright,
            float(found[cut.web]),
            "N",
            max(abs(value) for value in by_hand.values()),
        )


def crossing(truss: Truss, first: int, second: int) -> FloatArray | None:
    """Return the point where the lines of two bars cross, mm; None where they run side by side."""
    a, b = truss.directions[first], truss.directions[second]
    sine = float(a[0] * b[1] - a[1] * b[0])
    if abs(sine) < TOLERANCES.straight:
        return None
    start = truss.xy[truss.ends[first, 0]]
    gap = truss.xy[truss.ends[second, 0]] - start
    point: FloatArray = start + a * float(gap[0] * b[1] - gap[1] * b[0]) / sine
    return point


def _moment(offsets: FloatArray, forces: FloatArray) -> float:
    return float((offsets[:, 0] * forces[:, 1] - offsets[:, 1] * forces[:, 0]).sum())


def _named(truss: Truss, point: FloatArray) -> str:
    away = np.hypot(*(truss.xy - point).T)
    joint = int(np.argmin(away))
    if away[joint] <= TOLERANCES.same_point:
        return truss.joint_names[joint]
    return f"({point[0] / 1e3:.3f} m, {point[1] / 1e3:.3f} m)"
