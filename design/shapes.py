"""Section properties of a rolled angle, exact for its outline, over arrays of sizes.

The outline is the one of EN 10056-1: two legs, a quarter circle of radius r1 in the root, one of radius r2 at the
inner corner of each toe, a sharp heel. It is put together from two rectangles, the spandrel (the piece between a
square corner and its quarter circle) that fills the root, and the spandrels missing at the toes.

Axes of a shape: the heel is at the origin, the upright leg runs along +y, the level leg along +x. Lengths in mm.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.truss.arrays import FloatArray

# Spandrel of radius 1: area, distance of its centroid from either straight edge, second moment about such an edge,
# product moment about both. Integrals of the unit square less the quarter circle.
SPANDREL_AREA = 1 - np.pi / 4
SPANDREL_CENTROID = (10 - 3 * np.pi) / (12 - 3 * np.pi)
SPANDREL_INERTIA = 1 - 5 * np.pi / 16
SPANDREL_PRODUCT = 19 / 24 - np.pi / 4

# A square corner that is rounded loses this times its radius from the perimeter.
ROUNDING_SAVES = 2 - np.pi / 2

# Newton steps for the plastic axis: it converges from one side and quadratically, so these are ample for doubles.
PLASTIC_AXIS_STEPS = 12


@dataclass(frozen=True, eq=False)
class AngleShape:
    """Properties of angles (s), mm to the power that fits.

    upright, level, thickness, root, toe : the legs, t, r1 and r2.
    area, perimeter : mm2, mm.
    centroid_x, centroid_y : distance from the back of the upright leg and from the back of the level leg.
    inertia_x, inertia_y : second moments about the centroidal axes parallel to the level and to the upright leg.
    product : product of inertia, negative in these axes.
    inertia_u, inertia_v : major and minor principal second moment. angle : from x to u, rad.
    plastic_x : plastic modulus for bending about the x axis alone.
    torsion, warping : St Venant torsion constant, warping constant.
    shear_u, shear_v : position of the shear centre from the centroid in principal axes.
    """

    upright: FloatArray
    level: FloatArray
    thickness: FloatArray
    root: FloatArray
    toe: FloatArray
    area: FloatArray
    perimeter: FloatArray
    centroid_x: FloatArray
    centroid_y: FloatArray
    inertia_x: FloatArray
    inertia_y: FloatArray
    product: FloatArray
    inertia_u: FloatArray
    inertia_v: FloatArray
    angle: FloatArray
    plastic_x: FloatArray
    torsion: FloatArray
    warping: FloatArray
    shear_u: FloatArray
    shear_v: FloatArray


def angle_shape(
    upright: FloatArray, level: FloatArray, thickness: FloatArray, root: FloatArray, toe: FloatArray
) -> AngleShape:
    """Return the properties of angles from legs, thickness, root radius r1 and toe radius r2, each (s,) in mm.

    A toe radius greater than the thickness (four thin sizes have one in the tables) cannot be rolled; it is cut down
    to the thickness. Zero radii give the sharp-cornered outline of North American tables.
    """
    h, b, t, r = upright, level, thickness, root
    q = np.minimum(toe, t)
    zero = np.zeros_like(t)
    area = _area(h, b, t, r, q)
    x = _first_moment(b, h, t, r, q) / area
    y = _first_moment(h, b, t, r, q) / area
    ix = _second_moment(h, b, t, r, q) - area * y**2
    iy = _second_moment(b, h, t, r, q) - area * x**2
    ixy = _product_moment(h, b, t, r, q) - area * x * y
    mean, half, alpha = (ix + iy) / 2, np.hypot((ix - iy) / 2, ixy), np.arctan2(-2 * ixy, ix - iy) / 2
    xs, ys = t / 2 - x, t / 2 - y
    return AngleShape(
        upright=h,
        level=b,
        thickness=t,
        root=r,
        toe=q,
        area=area,
        perimeter=2 * (h + b) - ROUNDING_SAVES * (r + 2 * q),
        centroid_x=x,
        centroid_y=y,
        inertia_x=ix,
        inertia_y=iy,
        product=ixy,
        inertia_u=mean + half,
        inertia_v=mean - half,
        angle=alpha,
        plastic_x=_plastic_modulus(h, b, t, r, q),
        torsion=angle_torsion(h, b, t, r),
        warping=t**3 * ((h - t / 2) ** 3 + (b - t / 2) ** 3) / 36,
        shear_u=np.where(h == b, np.hypot(xs, ys), np.abs(xs * np.cos(alpha) + ys * np.sin(alpha))),
        shear_v=np.where(h == b, zero, np.abs(ys * np.cos(alpha) - xs * np.sin(alpha))),
    )


def angle_torsion(upright: FloatArray, level: FloatArray, thickness: FloatArray, root: FloatArray) -> FloatArray:
    """Return the St Venant torsion constant of angles, mm4, by the junction formula.

    Source: El Darwish and Johnston, "Torsion of structural shapes", Journal of the Structural Division ASCE 91 (ST1),
    1965; formula from memory, confirmed by the printed values of 81 angles. Two rectangles, plus the circle inscribed
    in the junction (diameter D), less the end losses of two toes. The toe radii are left out: with them the exact value
    is 2.0 to 2.4 % lower (tests/published/test_torsion.py); printed tables use the formula as it is.
    """
    h, b, t, r = upright, level, thickness, root
    alpha = 0.0768 + 0.0479 * r / t
    inscribed: FloatArray = 2 * ((3 * r + 2 * t) - np.sqrt(2) * (2 * r + t))
    return b * t**3 / 3 + (h - t) * t**3 / 3 + alpha * inscribed**4 - 0.21 * t**4


def _area(h: FloatArray, b: FloatArray, t: FloatArray, r: FloatArray, q: FloatArray) -> FloatArray:
    return (h + b - t) * t + SPANDREL_AREA * r**2 - 2 * SPANDREL_AREA * q**2


def _first_moment(h: FloatArray, b: FloatArray, t: FloatArray, r: FloatArray, q: FloatArray) -> FloatArray:
    """About the back of the leg b, which stands across h."""
    legs = t * h**2 / 2 + (b - t) * t**2 / 2
    root = SPANDREL_AREA * r**2 * (t + SPANDREL_CENTROID * r)
    toes = SPANDREL_AREA * q**2 * (h + t - 2 * SPANDREL_CENTROID * q)
    return legs + root - toes


def _second_moment(h: FloatArray, b: FloatArray, t: FloatArray, r: FloatArray, q: FloatArray) -> FloatArray:
    """About the back of the leg b, which stands across h."""
    legs = t * h**3 / 3 + (b - t) * t**3 / 3
    return legs + _moved(r, t) - _moved(-q, h) - _moved(-q, t)


def _moved(radius: FloatArray, corner: FloatArray) -> FloatArray:
    """Second moment of a spandrel about an axis at distance `corner` from its edge; a negative radius points back."""
    area, first = SPANDREL_AREA * radius**2, SPANDREL_AREA * SPANDREL_CENTROID * radius**3
    return area * corner**2 + 2 * corner * first + SPANDREL_INERTIA * radius**4


def _product_moment(h: FloatArray, b: FloatArray, t: FloatArray, r: FloatArray, q: FloatArray) -> FloatArray:
    """About the backs of both legs."""
    legs = t**2 * h**2 / 4 + t**2 * (b**2 - t**2) / 4
    return legs + _moved_product(r, t, t) - _moved_product(-q, t, h) - _moved_product(-q, b, t)


def _moved_product(radius: FloatArray, x: FloatArray, y: FloatArray) -> FloatArray:
    """Product moment of a spandrel whose corner is at (x, y); a negative radius points back in both directions."""
    area, first = SPANDREL_AREA * radius**2, SPANDREL_AREA * SPANDREL_CENTROID * radius**3
    return area * x * y + (x + y) * first + SPANDREL_PRODUCT * radius**4


def _plastic_modulus(h: FloatArray, b: FloatArray, t: FloatArray, r: FloatArray, q: FloatArray) -> FloatArray:
    """Plastic modulus for bending about the axis parallel to the leg b.

    The width of an angle never grows with the distance from the back of b, so the area below a level is concave in
    it, and Newton's method from zero comes up to the level of half the area without passing it.
    """
    area, first = _area(h, b, t, r, q), _first_moment(h, b, t, r, q)
    level = np.zeros_like(t)
    for _ in range(PLASTIC_AXIS_STEPS):
        below, _, width = _below(level, h, b, t, r, q)
        level = level + (area / 2 - below) / width
    below, first_below, _ = _below(level, h, b, t, r, q)
    return (first - first_below) - level * (area - below) + level * below - first_below


def _below(
    level: FloatArray, h: FloatArray, b: FloatArray, t: FloatArray, r: FloatArray, q: FloatArray
) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Area and first moment (about the back of b) of what lies below a level, and the width there."""
    in_leg, in_web = np.minimum(level, t), np.maximum(level, t)
    area = b * in_leg + t * (in_web - t)
    first = b * in_leg**2 / 2 + t * (in_web**2 - t**2) / 2
    width = np.where(level <= t, b, t)
    whole, whole_first = SPANDREL_AREA * q**2, SPANDREL_AREA * SPANDREL_CENTROID * q**3
    root_area, root_first, root_width = _spandrel_within(level - t, r)
    area, first, width = area + root_area, first + t * root_area + root_first, width + root_width
    for corner in (t, h):
        above_area, above_first, toe_width = _spandrel_within(corner - level, q)
        area = area - (whole - above_area)
        first = first - (corner * (whole - above_area) - (whole_first - above_first))
        width = width - toe_width
    return area, first, width


def _spandrel_within(distance: FloatArray, radius: FloatArray) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Area and first moment of a spandrel within a distance of one of its straight edges, and its width there."""
    u = np.clip(distance, 0, radius)
    c = radius - u
    chord = np.sqrt(radius**2 - c**2)
    swept = radius**2 * np.arctan2(chord, c)
    area = radius * u - (swept - c * chord) / 2
    first = radius * area - radius * (radius**2 - c**2) / 2 + chord**3 / 3
    width = np.where((distance >= 0) & (distance <= radius), radius - chord, 0.0)
    return area, first, width
