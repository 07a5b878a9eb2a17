"""Boxes at any angle on the sheet, and whether they overlap: so that no label lies on another.

A box is a row (6,): centre x, y, unit vector along it x, y, half its length, half its height, mm.
"""

from __future__ import annotations

import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray


def box(centre: FloatArray, angle: float, length: float, height: float) -> FloatArray:
    """Return the (6,) box about a point, its length turned by `angle` in rad."""
    return np.array([centre[0], centre[1], np.cos(angle), np.sin(angle), length / 2.0, height / 2.0])


def boxes_along(segments: FloatArray, width: float | FloatArray) -> FloatArray:
    """Return (n, 6) boxes of that width about (n, 2, 2) segments."""
    spans = segments[:, 1] - segments[:, 0]
    lengths = np.hypot(spans[:, 0], spans[:, 1])
    widths = np.broadcast_to(np.asarray(width, dtype=float), lengths.shape)
    return np.column_stack([segments.mean(axis=1), spans / lengths[:, None], lengths / 2.0, widths / 2.0])


def corners(one: FloatArray) -> FloatArray:
    """Return the (4, 2) outline of a box."""
    along, upward = one[4] * one[2:4], one[5] * np.array([-one[3], one[2]])
    outline: FloatArray = one[:2] + np.array([-along - upward, along - upward, along + upward, upward - along])
    return outline


def overlaps(one: FloatArray, others: FloatArray) -> BoolArray:
    """Return (n,) True where (n, 6) boxes overlap `one`: no axis of either separates them."""
    apart = others[:, :2] - one[:2]
    cos = np.abs(others[:, 2:4] @ one[2:4])
    sin = np.abs(others[:, 2:4] @ np.array([-one[3], one[2]]))
    overlap = np.ones(len(others), dtype=bool)
    for axis, half_one, half_others in (
        (one[2:4], one[4], others[:, 4] * cos + others[:, 5] * sin),
        (np.array([-one[3], one[2]]), one[5], others[:, 4] * sin + others[:, 5] * cos),
        (others[:, 2:4], one[4] * cos + one[5] * sin, others[:, 4]),
        (others[:, [3, 2]] * [-1.0, 1.0], one[4] * sin + one[5] * cos, others[:, 5]),
    ):
        overlap &= np.abs((apart * axis).sum(axis=1)) < half_one + half_others
    return overlap
