"""Turns shapes into the axes of the truss: the one place where a section learns which way it stands.

A shape's upright leg or depth is put into the plane of the truss. In a chord the level (outstanding) legs of a pair
are at the outer fibre: on top in a top chord, below in a bottom chord.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.shapes import AngleShape
from spanwright.design.tubes import TubeShape
from spanwright.truss.arrays import FloatArray


@dataclass(frozen=True, eq=False)
class Turned:
    """Whole sections (s) in the truss's axes; fields as in `Candidates`, with `perimeter` in mm."""

    area: FloatArray
    perimeter: FloatArray
    inertia_in: FloatArray
    inertia_out: FloatArray
    inertia_minor: FloatArray
    inertia_major: FloatArray
    modulus_heel: FloatArray
    modulus_toe: FloatArray
    modulus_plastic: FloatArray
    torsion: FloatArray
    warping: FloatArray
    shear_minor: FloatArray
    shear_major: FloatArray
    shear_sym: FloatArray
    depth: FloatArray
    width: FloatArray


def single_angle(angle: AngleShape) -> Turned:
    """Return one angle, its upright leg connected and in the plane.

    The elastic moduli hold for a moment in the plane while the angle is free to move sideways (unsymmetric bending);
    the plastic modulus is about the parallel axis, as if sideways movement were prevented.
    """
    x, y = angle.centroid_x, angle.centroid_y
    h, b, t, q = angle.upright, angle.level, angle.thickness, angle.toe
    sharp = np.zeros_like(t)
    inertias = (angle.inertia_x, angle.inertia_y, angle.product)
    return Turned(
        area=angle.area,
        perimeter=angle.perimeter,
        inertia_in=angle.inertia_x,
        inertia_out=angle.inertia_y,
        inertia_minor=angle.inertia_v,
        inertia_major=angle.inertia_u,
        modulus_heel=_free_modulus(*inertias, ((-x, -y, sharp), (b - x, -y, sharp), (b - x - q, t - y - q, q))),
        modulus_toe=_free_modulus(*inertias, ((-x, h - y, sharp), (t - x - q, h - y - q, q))),
        modulus_plastic=angle.plastic_x,
        torsion=angle.torsion,
        warping=angle.warping,
        shear_minor=angle.shear_v,
        shear_major=angle.shear_u,
        shear_sym=sharp,
        depth=h,
        width=b,
    )


def back_to_back(angle: AngleShape, gap: float) -> Turned:
    """Return two angles on both sides of a gusset of thickness `gap` (mm), their upright legs against it.

    The axis of symmetry lies in the plane of the truss: bending in the plane is about the axis through both
    centroids, independent of the gap; bending sideways is about the axis of symmetry and couples with torsion.
    The warping constant is that of two separate angles, which is on the safe side.
    """
    inertia_in = 2 * angle.inertia_x
    inertia_out = 2 * (angle.inertia_y + angle.area * (angle.centroid_x + gap / 2) ** 2)
    shear = angle.centroid_y - angle.thickness / 2
    sideways_is_major = inertia_out >= inertia_in
    return Turned(
        area=2 * angle.area,
        perimeter=2 * angle.perimeter,
        inertia_in=inertia_in,
        inertia_out=inertia_out,
        inertia_minor=np.minimum(inertia_in, inertia_out),
        inertia_major=np.maximum(inertia_in, inertia_out),
        modulus_heel=inertia_in / angle.centroid_y,
        modulus_toe=inertia_in / (angle.upright - angle.centroid_y),
        modulus_plastic=2 * angle.plastic_x,
        torsion=2 * angle.torsion,
        warping=2 * angle.warping,
        shear_minor=np.where(sideways_is_major, 0.0, shear),
        shear_major=np.where(sideways_is_major, shear, 0.0),
        shear_sym=shear,
        depth=angle.upright,
        width=2 * angle.level + gap,
    )


def starred(angle: AngleShape, gap: float) -> Turned:
    """Return two equal angles in opposite corners, heel to heel, `gap` (mm) apart in both directions.

    Legs parallel and normal to the plane of the truss; one principal axis runs through both heels. Elastic moduli
    hold for a moment in the plane while the member is free to move sideways. Warping as for a pair back to back.
    """
    shift = angle.centroid_x + gap / 2
    across = 2 * (angle.inertia_v + 2 * angle.area * shift**2)
    along = 2 * angle.inertia_u
    inertia = 2 * (angle.inertia_x + angle.area * shift**2)
    product = 2 * (angle.product + angle.area * shift**2)
    none = np.zeros_like(inertia)
    near, q = none + gap / 2, angle.toe
    far, inner = near + angle.upright, near + angle.thickness
    heel_and_tips = ((near, near, none), (near, far, none), (far, near, none))
    toes = ((inner - q, far - q, q), (far - q, inner - q, q))
    modulus = _free_modulus(inertia, inertia, product, heel_and_tips + toes)
    return Turned(
        area=2 * angle.area,
        perimeter=2 * angle.perimeter,
        inertia_in=inertia,
        inertia_out=inertia,
        inertia_minor=np.minimum(across, along),
        inertia_major=np.maximum(across, along),
        modulus_heel=modulus,
        modulus_toe=modulus,
        modulus_plastic=2 * angle.area * shift,
        torsion=2 * angle.torsion,
        warping=2 * angle.warping,
        shear_minor=none,
        shear_major=none,
        shear_sym=none,
        depth=2 * angle.upright + gap,
        width=2 * angle.level + gap,
    )


def tube(shape: TubeShape) -> Turned:
    """Return a hollow section, its depth in the plane."""
    none = np.zeros_like(shape.area)
    return Turned(
        area=shape.area,
        perimeter=shape.perimeter,
        inertia_in=shape.inertia_x,
        inertia_out=shape.inertia_y,
        inertia_minor=np.minimum(shape.inertia_x, shape.inertia_y),
        inertia_major=np.maximum(shape.inertia_x, shape.inertia_y),
        modulus_heel=shape.elastic_x,
        modulus_toe=shape.elastic_x,
        modulus_plastic=shape.plastic_x,
        torsion=shape.torsion,
        warping=none,
        shear_minor=none,
        shear_major=none,
        shear_sym=none,
        depth=shape.depth,
        width=shape.width,
    )


def _free_modulus(
    ix: FloatArray, iy: FloatArray, ixy: FloatArray, rounds: tuple[tuple[FloatArray, FloatArray, FloatArray], ...]
) -> FloatArray:
    """Least modulus, mm3, for a moment about x while bending about y is free.

    rounds : (x, y, radius) of circles that bound the outline, from the centroid; a sharp corner has radius 0.
    The stress is M (Iy y - Ixy x) / (Ix Iy - Ixy^2), mechanics of unsymmetric bending.
    """
    gradient = np.hypot(iy, ixy)
    worst = np.max([np.abs(iy * y - ixy * x) + radius * gradient for x, y, radius in rounds], axis=0)
    return np.asarray((ix * iy - ixy**2) / worst)
