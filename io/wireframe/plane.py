"""The plane of drawing: found from the lines, with the axis that was taken as vertical.

In plan (z constant) y is up; in a vertical plane z is up; anything else needs the user's word. Where the drawing is in
millimetres, on coordinate axes and near the origin, coordinates are taken digit for digit; elsewhere turning, scaling
and shifting leave noise in the last digits, which is rounded away.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from spanwright.io.wireframe.report import Finding, Origin, place_text
from spanwright.truss.arrays import FloatArray
from spanwright.truss.decimals import decimal
from spanwright.truss.errors import DrawingError
from spanwright.truss.tolerances import TOLERANCES

_AXES = {"x": (1.0, 0.0, 0.0), "y": (0.0, 1.0, 0.0), "z": (0.0, 0.0, 1.0)}
_DIGITS = round(-np.log10(TOLERANCES.drawing_noise))


@dataclass(frozen=True, eq=False)
class Plane:
    """The plane of drawing.

    origin : (3,) drawing units, taken off before anything else. factor : mm for one drawing unit.
    right, up, normal : (3,) unit vectors in the drawing's axes. vertical : what was taken as vertical, in words.
    scatter : mm, furthest line end off the plane.
    """

    origin: FloatArray
    factor: float
    right: FloatArray
    up: FloatArray
    normal: FloatArray
    level: float
    vertical: str
    scatter: float

    @property
    def exact(self) -> bool:
        """Whether coordinates can be taken digit for digit."""
        on_axes = bool(np.isin(np.abs([self.right, self.up]), (0.0, 1.0)).all())
        return on_axes and self.factor == 1.0 and not self.origin.any()

    def flat(self, points: FloatArray) -> FloatArray:
        """Return x and y (..., 2) in mm of points (..., 3) in drawing units."""
        moved = (points - self.origin) * self.factor
        flat: FloatArray = moved @ np.column_stack([self.right, self.up])
        return flat if self.exact else np.round(flat, _DIGITS)

    def drawn(self, flat: FloatArray) -> FloatArray:
        """Return the place (..., 3) in drawing units of x and y (..., 2) in mm."""
        moved = flat @ np.array([self.right, self.up]) + self.level * self.normal
        drawn: FloatArray = moved / self.factor + self.origin
        return drawn


def find_plane(lines: FloatArray, factor: float, tolerance: float, up: str, origins: Sequence[Origin]) -> Plane:
    """Find the plane of lines (n, 2, 3) in drawing units; `origins` (n) name them; tolerance in mm.

    Raises DrawingError where the lines lie in no one plane, on one line, or in a plane that is neither level nor
    vertical and `up` is not given.
    """
    points = lines.reshape(-1, 3)
    near = np.abs(points).max() * factor <= TOLERANCES.near_origin
    origin = np.zeros(3) if near else points.min(axis=0)
    moved = (points - origin) * factor
    normal = _normal(moved, tolerance)
    centre = (moved.min(axis=0) + moved.max(axis=0)) / 2
    away = (moved - centre) @ normal
    scatter = float(np.ptp(away)) / 2
    if scatter > tolerance:
        raise _not_flat(moved, normal, lines, origins)
    vertical = _up(normal, up)
    flat_up = vertical - (vertical @ normal) * normal
    flat_up = flat_up / np.linalg.norm(flat_up)
    right = np.cross(flat_up, normal)
    level = float(centre @ normal) + float(away.min() + away.max()) / 2
    return Plane(origin, factor, right + 0.0, flat_up + 0.0, normal, level, _words(normal, flat_up, right), scatter)


def plane_findings(plane: Plane) -> tuple[Finding, ...]:
    """Return what to say about the plane."""
    findings = [Finding("W-203", plane.vertical)]
    if plane.scatter > TOLERANCES.drawing_noise:
        findings.append(
            Finding("W-204", f"line ends lie up to {decimal(plane.scatter, 3)} mm off the plane", "moved onto it")
        )
    return tuple(findings)


def _normal(points: FloatArray, tolerance: float) -> FloatArray:
    """Return the unit normal: a coordinate axis where one will do, else level (of a vertical plane), else free."""
    for axis in ("z", "y", "x"):
        if float(np.ptp(points @ np.array(_AXES[axis]))) <= 2 * tolerance:
            return _facing(np.array(_AXES[axis]))
    centred = points - points.mean(axis=0)
    ground = np.linalg.svd(centred[:, :2], full_matrices=False)[2][-1]
    level = np.array([ground[0], ground[1], 0.0])
    if float(np.ptp(centred @ level)) <= 2 * tolerance:
        return _facing(level)
    free: FloatArray = np.linalg.svd(centred, full_matrices=False)[2][-1]
    return _facing(free)


def _facing(normal: FloatArray) -> FloatArray:
    """Return the normal turned to where one looks from: above, else so that "right" leads to greater x, else y."""
    x, y, z = normal
    if abs(z) > TOLERANCES.straight:
        towards = z
    elif abs(y) > TOLERANCES.straight:
        towards = -y
    else:
        towards = x
    return normal if towards > 0 else -normal


def _up(normal: FloatArray, asked: str) -> FloatArray:
    if asked:
        axis = np.array(_AXES[asked[-1]]) * (-1.0 if asked.startswith("-") else 1.0)
        if abs(axis @ normal) > 1 - TOLERANCES.straight:
            raise DrawingError(f"{asked} is asked for as vertical, but is square to the plane of drawing", "", "up")
        return axis
    if abs(normal[2]) > 1 - TOLERANCES.straight**2:
        return np.array(_AXES["y"])
    if abs(normal[2]) <= TOLERANCES.straight:
        return np.array(_AXES["z"])
    listed = ", ".join(f"{value:.4f}" for value in normal)
    raise DrawingError(
        f"the plane of drawing is neither level nor vertical (its normal is {listed})",
        'draw the truss in plan or upright, or say which axis is up, such as up = "z"',
        "up",
    )


def _words(normal: FloatArray, up: FloatArray, right: FloatArray) -> str:
    if abs(normal[2]) > 1 - TOLERANCES.straight**2:
        where = "in plan"
    elif abs(normal[2]) <= TOLERANCES.straight:
        where = "in a vertical plane"
    else:
        where = "in an inclined plane"
    return f"drawn {where}; {_axis(up)} was taken as vertical, {_axis(right)} as to the right"


def _axis(direction: FloatArray) -> str:
    for name, axis in _AXES.items():
        along = float(direction @ np.array(axis))
        if abs(along) == 1.0:
            return f"{'-' if along < 0 else ''}{name}"
    listed = ", ".join(f"{round(value, 4) + 0.0:.4f}" for value in direction.tolist())
    return f"the direction ({listed})"


def _not_flat(points: FloatArray, normal: FloatArray, lines: FloatArray, origins: Sequence[Origin]) -> DrawingError:
    """Name the line end that is furthest from the plane that most ends share."""
    away = np.abs(points @ normal - np.median(points @ normal))
    for axis in ("z", "y", "x"):
        along = points @ np.array(_AXES[axis])
        aside = np.abs(along - np.median(along))
        if np.count_nonzero(aside <= TOLERANCES.ends_meet) > len(points) / 2:
            away = aside
            break
    worst = int(np.argmax(away))
    origin, at = origins[worst // 2], lines.reshape(-1, 3)[worst]
    return DrawingError(
        f'the lines lie in no one plane: {origin.kind} {origin.handle} on layer "{origin.layer}" '
        f"at {place_text(at.tolist())} (drawing units) is {decimal(away[worst], 4)} mm off",
        "draw one truss in one plane, or read only its layers",
        entity=origin.handle,
        at=tuple(at.tolist()),
    )
