"""Deflection against its limits, the movement of the sliding end, and the camber that follows."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.project import DeflectionLimits
from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.model import Truss

CAMBER_STEP = 5.0
"""mm: camber is rounded to this (common practice)."""
CAMBER_LEAST = 15.0
"""mm: a smaller permanent deflection is not cambered for (common practice)."""


@dataclass(frozen=True)
class Deflection:
    """The deflection that comes nearest its limit, of any joint against the line between the bearings beside it.

    name : "variable" or "total". value : mm, down +. joint, combination : where and when.
    limit : mm, of the span that the joint stands in. span_over : the number that divides the span.
    """

    name: str
    value: float
    joint: str
    combination: str
    limit: float
    span_over: float

    @property
    def ratio(self) -> float:
        """Deflection over its limit, up or down."""
        return abs(self.value) / self.limit


@dataclass(frozen=True)
class Serviceability:
    """Deflections with their limits; sliding : mm, greatest movement of the sliding end in `sliding_combination`
    (0 where both ends are held); camber : mm, for the permanent load, 0 where none is worth it.
    """

    deflections: tuple[Deflection, ...]
    sliding: float
    sliding_combination: str
    camber: float

    @property
    def passes(self) -> bool:
        """Whether every deflection is within its limit."""
        return all(deflection.ratio <= 1.0 for deflection in self.deflections)


def serviceability(truss: Truss, limits: DeflectionLimits, analysis: Analysis) -> Serviceability:
    """Return deflections, sliding and camber from the serviceability combinations.

    Variable: the variable actions alone (wind at its serviceability factor); total: the serviceability combinations.
    """
    sagging = below_bearing_line(truss, analysis.displacements)
    total = analysis.columns("SLS")
    sliding, when = _sliding(truss, analysis, total)
    return Serviceability(
        (
            *_greatest(truss, analysis, sagging, "variable", analysis.columns("SLS variable"), limits.variable),
            *_greatest(truss, analysis, sagging, "total", total, limits.total),
        ),
        sliding,
        when,
        _camber(truss, analysis),
    )


def below_bearing_line(truss: Truss, displacements: FloatArray) -> FloatArray:
    """Return (j, c) mm: how far each joint moves below the line between the bearings beside it, down +."""
    left, right = _bearings_beside(truss)
    share = (truss.xy[:, 0] - truss.xy[left, 0]) / _spans(truss)
    vertical = displacements[:, 1, :]
    line = vertical[left] + share[:, None] * (vertical[right] - vertical[left])
    below: FloatArray = line - vertical
    return below


def _bearings_beside(truss: Truss) -> tuple[IntArray, IntArray]:
    """Return (j,) the bearing joints left and right of each joint; beyond the outermost, those of the end span."""
    bearings = np.array(truss.bearing_joints)
    right = np.searchsorted(truss.xy[bearings, 0], truss.xy[:, 0]).clip(1, len(bearings) - 1)
    return bearings[right - 1], bearings[right]


def _spans(truss: Truss) -> FloatArray:
    """Return (j,) mm: the span that each joint stands in, between neighbouring bearings."""
    left, right = _bearings_beside(truss)
    spans: FloatArray = truss.xy[right, 0] - truss.xy[left, 0]
    return spans


def _greatest(
    truss: Truss, analysis: Analysis, sagging: FloatArray, name: str, columns: list[int], span_over: float
) -> tuple[Deflection, ...]:
    if not columns:
        return ()
    here, limits = sagging[:, columns], _spans(truss) / span_over
    joint, column = np.unravel_index(int(np.argmax(np.abs(here) / limits[:, None])), here.shape)
    return (
        Deflection(
            name,
            float(here[joint, column]),
            truss.joint_names[joint],
            analysis.combinations[columns[column]].name,
            float(limits[joint]),
            span_over,
        ),
    )


def _sliding(truss: Truss, analysis: Analysis, columns: list[int]) -> tuple[float, str]:
    moves = np.abs(analysis.displacements[list(truss.bearing_joints), 0, :][:, columns])
    if moves.size == 0:
        return 0.0, ""
    _, column = np.unravel_index(int(np.argmax(moves)), moves.shape)
    return float(moves.max()), analysis.combinations[columns[column]].name


def _camber(truss: Truss, analysis: Analysis) -> float:
    most = next(at for at, case in enumerate(analysis.cases) if case.name == "most")
    sag = float(below_bearing_line(truss, analysis.solutions[0].displacements[:, :, [most]]).max())
    return CAMBER_STEP * round(sag / CAMBER_STEP) if sag >= CAMBER_LEAST else 0.0
