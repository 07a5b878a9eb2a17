"""The chords by geometry: the upper and the lower side of the outline, without the posts and diagonals at its ends."""

from __future__ import annotations

import numpy as np

from spanwright.io.wireframe.network import Network, Remark
from spanwright.io.wireframe.outline import Outline
from spanwright.truss.arrays import FloatArray
from spanwright.truss.tolerances import TOLERANCES

_NO_RIDGE = 0.25  # share of an end bar's slope: where the outline falls more steeply behind it, there is a ridge

Path = tuple[int, ...]


def chords_of(network: Network, outline: Outline, tolerance: float) -> tuple[Path, Path, tuple[Remark, ...]]:
    """Return the joints of the top and the bottom chord, left to right; tolerance in mm.

    Upright bars at the ends are posts. A steep single bar at an end, beside a longer run that does not fall away
    behind it, is an end diagonal (of a truss with parallel chords); that reading is remarked on.
    """
    remarks: list[Remark] = []
    chords: list[Path] = []
    for name, path, inward in (("top", outline.upper, 1.0), ("bottom", outline.lower, -1.0)):
        chord = _without_posts(network.xy, path, tolerance)
        for turned in (False, True):
            ordered = chord[::-1] if turned else chord
            if _begins_with_diagonal(network.xy[list(ordered)], inward):
                remarks.append(_end_diagonal(network, ordered, name))
                ordered = ordered[1:]
            chord = ordered[::-1] if turned else ordered
        chords.append(chord)
    return chords[0], chords[1], tuple(remarks)


def _without_posts(xy: FloatArray, path: Path, tolerance: float) -> Path:
    while len(path) > 2 and upright(xy[path[1]] - xy[path[0]], tolerance):
        path = path[1:]
    while len(path) > 2 and upright(xy[path[-2]] - xy[path[-1]], tolerance):
        path = path[:-1]
    return path


def upright(step: FloatArray, tolerance: float) -> bool:
    """Return whether a step (2,) in mm is vertical, its ends within the tolerance (mm)."""
    return bool(abs(step[0]) <= TOLERANCES.off_upright * abs(step[1]) + 2 * tolerance and step[1] != 0)


def straight_through(before: FloatArray, at: FloatArray, after: FloatArray, tolerance: float) -> bool:
    """Return whether a chord runs straight through a joint (points (2,) in mm, within the tolerance in mm)."""
    step, further = at - before, after - at
    turn = abs(step[0] * further[1] - step[1] * further[0])
    lengths = np.hypot(*step), np.hypot(*further)
    shorter = min(lengths)
    return bool(turn <= (TOLERANCES.off_upright * shorter + 2 * tolerance) * max(lengths) and step @ further > 0)


def _begins_with_diagonal(points: FloatArray, inward: float) -> bool:
    """Return whether a path (n, 2) that begins at an end of the truss begins with an end diagonal.

    inward : 1 for an upper side, where the diagonal rises, -1 for a lower one.
    """
    if len(points) < 4:
        return False
    steps = np.diff(points[:4], axis=0)
    slopes = np.arctan2(inward * steps[:, 1], np.abs(steps[:, 0]))
    runs_on = abs(slopes[2] - slopes[1]) <= TOLERANCES.off_upright
    return bool(
        slopes[0] >= TOLERANCES.steep_end
        and runs_on
        and abs(slopes[1]) <= slopes[0] / 2
        and slopes[1] >= -_NO_RIDGE * slopes[0]
    )


def _end_diagonal(network: Network, ordered: Path, chord: str) -> Remark:
    end = set(ordered[:2])
    bar = next(row for row, pair in enumerate(network.ends.tolist()) if set(pair) == end)
    middle = tuple(network.xy[list(end)].mean(axis=0).tolist())
    text = f"the outline begins with a steep bar beside the {chord} chord"
    done = f"taken for an end diagonal; name the layer of the {chord} chord if it belongs to that"
    return Remark("W-403", text, done, int(network.sources[bar]), middle)
