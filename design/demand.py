"""From forces and lengths to what the members of a group must resist."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import fields, replace
from typing import Any

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.project import Project
from spanwright.design.standard import Demand
from spanwright.loads.cases import Stations
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray
from spanwright.truss.lengths import BucklingLengths
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

WEBS = ("post", "diagonal")


def demand(truss: Truss, project: Project, lengths: BucklingLengths, stations: Stations, analysis: Analysis) -> Demand:
    """Return what every bar must resist over the strength combinations."""
    axial = analysis.forces[:, analysis.strength]
    sag, hog, ends = _chord_moments(truss, stations, analysis.moments[:, analysis.strength])
    web = np.array([role in WEBS for role in truss.roles])
    return Demand(
        bars=truss.bar_names,
        axial=axial,
        sideways=sideways_compression(axial, lengths),
        panel=truss.lengths,
        in_plane=lengths.in_plane,
        out_of_plane=lengths.out_of_plane,
        torsional=lengths.torsional,
        minor=lengths.minor,
        sag=sag,
        hog=hog,
        end_moments=ends,
        point_loads=stations.loads_between,
        first_web=first_compression_webs(truss, axial),
        one_leg=web & project.members.one_side,
        ends=project.ends,
        packs=project.members.packs,
        gusset=project.members.gap,
    )


def sideways_compression(axial: FloatArray, lengths: BucklingLengths) -> FloatArray:
    """Return (b, c) the greatest compression, >= 0, among the bars that buckle sideways together with each bar.

    A run between held points buckles as one, so each of its bars is checked with the greatest compression in it
    (the safe reading where the force changes along the run).
    """
    compression = np.maximum(-axial, 0.0)
    greatest: FloatArray = np.where(lengths.together[:, :, None], compression, 0.0).max(axis=1)
    return greatest


def _chord_moments(truss: Truss, stations: Stations, moments: FloatArray) -> tuple[FloatArray, FloatArray, FloatArray]:
    bars, columns = len(truss.bar_names), moments.shape[1]
    sag, hog = np.zeros((bars, columns)), np.zeros((bars, columns))
    ends = np.zeros((bars, 2, columns))
    for bar in np.unique(stations.bar):
        here = np.flatnonzero(stations.bar == bar)
        here = here[np.argsort(stations.at[here])]
        sag[bar] = np.maximum(moments[here].max(axis=0), 0.0)
        hog[bar] = np.maximum(-moments[here].min(axis=0), 0.0)
        ends[bar] = moments[here[[0, -1]]]
    return sag, hog, ends


def first_compression_webs(truss: Truss, axial: FloatArray) -> BoolArray:
    """Return (b, c) True where a bar is the first compression web from a bearing in that combination.

    SANS 10162-1 cl. 15 reduces its resistance. Every compression web that meets the bearing joint counts; where
    none does, the nearest one along the span (the safe reading where a post stands over the bearing).
    """
    first = np.zeros(axial.shape, dtype=np.bool_)
    webs = np.flatnonzero([role in WEBS for role in truss.roles])
    if webs.size == 0:
        return first
    threshold = TOLERANCES.tiny_force * max(float(np.abs(axial).max()), 1.0)
    pressed = axial[webs] < -threshold
    for bearing in truss.bearing_joints:
        meets = (truss.ends[webs] == bearing).any(axis=1)
        first[webs[meets]] |= pressed[meets]
        order = _by_distance(truss, webs, bearing)
        nearest = order[np.argmax(pressed[order], axis=0)]
        columns = np.flatnonzero(pressed.any(axis=0) & ~pressed[meets].any(axis=0))
        first[webs[nearest[columns]], columns] = True
    return first


def _by_distance(truss: Truss, webs: IntArray, bearing: int) -> IntArray:
    middle = truss.xy[truss.ends[webs]].mean(axis=1)
    return np.argsort(np.abs(middle[:, 0] - truss.xy[bearing, 0]), kind="stable")


def of_bars(whole: Demand, bars: IntArray) -> Demand:
    """Return the demand on some of the bars."""
    return _over_bars(whole, tuple(whole.bars[bar] for bar in bars), lambda name: getattr(whole, name)[bars])


def side_by_side(variants: list[Demand]) -> Demand:
    """Return one demand whose bars are those of all variants, one after the other, so that one evaluation checks all.

    The end connections and packs of the first go for all.
    """
    names = tuple(bar for variant in variants for bar in variant.bars)
    return _over_bars(variants[0], names, lambda name: np.concatenate([getattr(v, name) for v in variants]))


def _over_bars(whole: Demand, bars: tuple[str, ...], array: Callable[[str], Any]) -> Demand:
    """Return a demand with other bars, each array over bars made anew, the rest kept."""
    arrays = [entry.name for entry in fields(whole) if isinstance(getattr(whole, entry.name), np.ndarray)]
    changes: dict[str, Any] = {name: array(name) for name in arrays}
    return replace(whole, bars=bars, **changes)
