"""Outlines of sections as polygons, and their moments by Green's theorem: a second opinion on every closed formula."""

from __future__ import annotations

import numpy as np
import shapely

ARC = 200
"""Chords that stand for a quarter circle; the area lost to them is below 1e-5 of a section's."""


Angle = tuple[float, float, float, float, float]
"""Upright leg, level leg, thickness, root and toe radius, mm."""

Tube = tuple[float, float, float, float, float]
"""Depth, width, wall, outer and inner corner radius, mm."""


def angle_outline(size: Angle, *, arc: int = ARC) -> shapely.Polygon:
    """Return an angle, heel at the origin, sharp heel, rounded root and inner toe corners."""
    upright, level, t, root, toe = size
    turn = np.linspace(0, np.pi / 2, arc + 1)
    quarter = np.column_stack([np.cos(turn), np.sin(turn)])
    points = [np.array([(0, 0), (level, 0)])]
    points.append(np.array([level - toe, t - toe]) + toe * quarter)
    points.append(np.array([t + root, t + root]) - root * quarter[:, ::-1])
    points.append(np.array([t - toe, upright - toe]) + toe * quarter)
    points.append(np.array([(0, upright)]))
    return shapely.make_valid(shapely.remove_repeated_points(shapely.Polygon(np.vstack(points))))


def tube_outline(size: Tube) -> shapely.Polygon:
    """Return a rectangular tube with its centre at the origin, depth along y."""
    depth, width, t, outer, inner = size

    def rounded(h: float, b: float, r: float) -> shapely.Polygon:
        return shapely.box(r - b / 2, r - h / 2, b / 2 - r, h / 2 - r).buffer(r, quad_segs=ARC)

    return rounded(depth, width, outer).difference(rounded(depth - 2 * t, width - 2 * t, inner))


def moments(shape: shapely.Geometry) -> dict[str, float]:
    """Return area, centroid x and y, and Ix, Iy, Ixy about the centroidal axes, of a polygon with its holes."""
    polygons = shapely.get_parts(shapely.orient_polygons(shape))
    rings = [np.array(ring.coords) for p in polygons for ring in (p.exterior, *p.interiors)]
    area, sx, sy, xx, yy, xy = np.sum([_ring(ring) for ring in rings], axis=0)
    x, y = sx / area, sy / area
    return {
        "area": area,
        "x": x,
        "y": y,
        "Ix": yy - area * y**2,
        "Iy": xx - area * x**2,
        "Ixy": xy - area * x * y,
    }


def _ring(points: np.ndarray) -> list[float]:
    x, y = points[:-1].T
    u, v = points[1:].T
    cross = x * v - u * y
    return [
        np.sum(cross) / 2,
        np.sum(cross * (x + u)) / 6,
        np.sum(cross * (y + v)) / 6,
        np.sum(cross * (x * x + x * u + u * u)) / 12,
        np.sum(cross * (y * y + y * v + v * v)) / 12,
        np.sum(cross * (x * v + 2 * x * y + 2 * u * v + u * y)) / 24,
    ]
