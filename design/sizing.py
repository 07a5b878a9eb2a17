"""Sizing: for each group the lightest candidate that passes every check for every member and combination."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from spanwright.design.candidates import Candidates
from spanwright.design.groups import Group
from spanwright.design.standard import Check, Demand, Standard
from spanwright.truss.arrays import BoolArray, FloatArray


@dataclass(frozen=True, eq=False)
class Choice:
    """The section of a group and what decided it.

    index : of the section among the candidates, which are sorted by mass, then depth.
    checks : of that section alone: arrays (1, bars of the group).
    passes : whether every check of every member is at most 1.
    joinable : (s,) False for candidates that do not fit the chords they meet.
    """

    group: Group
    candidates: Candidates
    index: int
    checks: tuple[Check, ...]
    passes: bool
    joinable: BoolArray

    @cached_property
    def section(self) -> Candidates:
        """The chosen section, alone."""
        return self.candidates.take([self.index])

    @property
    def name(self) -> str:
        """Name of the chosen section."""
        return self.candidates.names[self.index]


def worst_ratio(checks: tuple[Check, ...]) -> FloatArray:
    """Return (s, b) the greatest ratio over all checks, strength and limit alike."""
    worst: FloatArray = np.max([check.ratio for check in checks], axis=0)
    return worst


def utilisation_or_failure(checks: tuple[Check, ...]) -> FloatArray:
    """Return (s, b) the utilisation: the greatest strength ratio, or that of a limit that fails if it is greater."""
    greatest: FloatArray = _that_count(checks).max(axis=0)
    return greatest


def _that_count(checks: tuple[Check, ...]) -> FloatArray:
    """Return (checks, s, b) the ratios, with -1 for limits that hold: their own ratio is no utilisation."""
    ratios = np.array([check.ratio for check in checks])
    strength = np.array([check.kind == "strength" for check in checks])[:, None, None]
    return np.where(strength | (ratios > 1.0), ratios, -1.0)


def choose(
    group: Group,
    candidates: Candidates,
    standard: Standard,
    demand: Demand,
    *,
    floor: int = 0,
    joinable: BoolArray | None = None,
) -> Choice:
    """Pick the first candidate from `floor` on that passes; where none does, the one that exceeds least.

    The one at `floor` is tried first, since in the last round it stays; where it fails, all are evaluated at once.
    `joinable` masks those that fit the members they meet.
    """
    fits = np.ones(len(candidates), dtype=np.bool_) if joinable is None else joinable
    as_it_is = settle(group, candidates, floor, standard, demand, fits)
    if as_it_is.passes or floor + 1 == len(candidates):
        return as_it_is
    worst = worst_ratio(standard.checks(candidates.take(np.arange(floor, len(candidates))), demand)).max(axis=1)
    worst = np.where(fits[floor:], worst, np.inf)
    passing = np.flatnonzero(worst <= 1.0)
    index = floor + int(passing[0] if passing.size else np.argmin(worst))
    return settle(group, candidates, index, standard, demand, fits)


def settle(
    group: Group, candidates: Candidates, index: int, standard: Standard, demand: Demand, joinable: BoolArray
) -> Choice:
    """Return the choice of one candidate, with its checks."""
    checks = standard.checks(candidates.take([index]), demand)
    passes = bool(worst_ratio(checks).max() <= 1.0) and bool(joinable[index])
    return Choice(group, candidates, index, checks, passes, joinable)


def fitting(candidates: Candidates, chords: list[Candidates]) -> BoolArray:
    """Return (s,) True for web candidates that can be welded to the chords: a tube no wider than a tube chord's face.

    Common practice; angles are always fitted to a gusset.
    """
    fits = np.ones(len(candidates), dtype=np.bool_)
    tubes = ("CHS", "SHS", "RHS")
    if candidates.family in tubes:
        for chord in chords:
            if chord.family in tubes:
                fits &= candidates.width <= chord.width[0]
    return fits


@dataclass(frozen=True)
class Governing:
    """The check that governs one member or group: greatest strength ratio, or a failed limit above it.

    bar : name. combination : its name, or "" where the check does not depend on one.
    """

    check: str
    clause: str
    kind: str
    bar: str
    combination: str
    ratio: float


def governing(
    checks: tuple[Check, ...], bars: tuple[str, ...], combinations: tuple[str, ...] | None, place: int | None = None
) -> Governing:
    """Return the check that governs the only section of `checks`; a failed limit governs over a passed strength check.

    bars : names along the second axis of the ratios; `place` narrows to one of them.
    combinations : the strength combinations' names; None leaves the name out.
    """
    ranked = _that_count(checks)[:, 0]
    if place is not None:
        ranked = np.where(np.arange(len(bars)) == place, ranked, -2.0)
    which, bar = np.unravel_index(int(np.argmax(ranked)), ranked.shape)
    check = checks[which]
    at = int(check.combination[0, bar])
    name = combinations[at] if combinations and at >= 0 else ""
    return Governing(check.name, check.clause, check.kind, bars[bar], name, float(check.ratio[0, bar]))
