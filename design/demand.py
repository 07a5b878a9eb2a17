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
    greatest = compression.copy()
    for bar in np.flatnonzero(lengths.together.sum(axis=1) > 1):
        greatest[bar] = compression[lengths.together[bar]].max(axis=0)
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
    """Return (b, c) True where a bar is reduced as the first compression web from a bearing in that combination.

    SANS 10162-1 cl. 15 reduces the resistance of one; which, it does not say for every form. The safe reading: every
    compression web that meets the bearing joint or stands over it, and on each side of it the nearest other one along
    the span. A web with less than `TOLERANCES.idle_web` of the combination's greatest web compression is reduced where
    it comes first, but does not stand for the next.
    """
    first = np.zeros(axial.shape, dtype=np.bool_)
    webs = np.flatnonzero([role in WEBS for role in truss.roles])
    if webs.size == 0:
        return first
    compression = np.maximum(-axial[webs], 0.0)
    pressed = compression > TOLERANCES.tiny_force * max(float(np.abs(axial).max()), 1.0)
    counts = pressed & (compression >= TOLERANCES.idle_web * compression.max(axis=0))
    reduced = np.zeros_like(pressed)
    for bearing in truss.bearing_joints:
        offsets = truss.xy[truss.ends[webs], 0] - truss.xy[bearing, 0]
        near = (truss.ends[webs] == bearing).any(axis=1) | (np.abs(offsets) <= TOLERANCES.same_point).all(axis=1)
        reduced |= pressed & near[:, None]
        middle = offsets.mean(axis=1)
        for side in (middle <= 0.0, middle >= 0.0):
            reduced |= _up_to_the_nearest(np.abs(middle), pressed, counts, side & ~near)
    first[webs] = reduced
    return first


def _up_to_the_nearest(distance: FloatArray, pressed: BoolArray, counts: BoolArray, side: BoolArray) -> BoolArray:
    """Return (w, c) the pressed webs of one side that are no farther away than the nearest that counts."""
    away = np.where(counts & side[:, None], distance[:, None], np.inf).min(axis=0)
    found: BoolArray = pressed & side[:, None] & (distance[:, None] <= away + TOLERANCES.same_point)
    return found


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
