"""What is outside the usual ranges of practice, in sentences with numbers."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.model import Truss
from spanwright.truss.ranges import ranges
from spanwright.truss.tolerances import TOLERANCES


def unusual(truss: Truss) -> tuple[str, ...]:
    """Return a sentence for each measure outside the usual ranges (ranges.csv).

    Looked at: span, pitch, span to depth, depth over the bearings of chords that do not meet, rafter panels, and the
    slope of diagonals to the bottom chord.
    """
    meet = bool({truss.top.joints[0], truss.top.joints[-1]} & set(truss.bottom.joints))
    kind = "triangular" if meet else "flat"
    depths = _depths(truss)
    rafters = np.asarray(truss.top.bars)
    checked = [
        _judge("span", "the span", [truss.span]),
        _judge(f"pitch {kind}", "the pitch", [_pitch(truss)]),
        _judge(f"span to depth {kind}", "span to greatest depth", [truss.span / float(depths.max())]),
        _judge("rafter panel", "the rafter panel{of}", truss.lengths[rafters], _named(truss, rafters)),
        _judge("web slope", "the slope{of} to the bottom chord", *_web_slopes(truss)),
    ]
    if not meet:
        checked.append(_judge("heel depth", "the depth at the heel", [float(depths[[0, len(truss.top.bars)]].min())]))
    return tuple(sentence for sentences in checked for sentence in sentences)


def _judge(quantity: str, what: str, values: Sequence[float] | FloatArray, names: Sequence[str] = ()) -> list[str]:
    """Return one sentence for the values below the usual range and one for those above.

    what : the quantity in words, `{of}` where the names of the bars go.
    """
    limits = ranges()[quantity]
    array = np.asarray(values, dtype=float)
    slack = TOLERANCES.straight if limits.unit == "deg" else 0.0
    below = array < limits.usual_least - slack
    above = array > limits.usual_most + slack
    sentences = []
    for outside, side, limit in ((below, "less", limits.usual_least), (above, "more", limits.usual_most)):
        if outside.any():
            worst = array[outside].min() if side == "less" else array[outside].max()
            reach = "" if outside.sum() == 1 else "down to " if side == "less" else "up to "
            of = f" of {_listed([names[i] for i in range(len(names)) if outside[i]])}" if names else ""
            sentences.append(
                f"{what.format(of=of)} is {reach}{limits.show(worst)}, {side} than the usual {limits.show(limit)}"
            )
    return sentences


def _listed(names: Sequence[str]) -> str:
    return ", ".join(names[:6]) + (f" and {len(names) - 6} more" if len(names) > 6 else "")


def _named(truss: Truss, bars: IntArray) -> list[str]:
    return [truss.bar_names[bar] for bar in bars]


def _pitch(truss: Truss) -> float:
    """Return the steepest slope of the top chord against the horizontal, rad."""
    directions = truss.directions[list(truss.top.bars)]
    return float(np.arctan2(np.abs(directions[:, 1]), np.abs(directions[:, 0])).max())


def _depths(truss: Truss) -> FloatArray:
    """Return the vertical distance between the chords at each joint of the top one, then of the bottom one, mm."""
    top, bottom = truss.xy[list(truss.top.joints)], truss.xy[list(truss.bottom.joints)]
    at = np.concatenate([top[:, 0], bottom[:, 0]])
    depths: FloatArray = np.interp(at, top[:, 0], top[:, 1]) - np.interp(at, bottom[:, 0], bottom[:, 1])
    return depths


def _web_slopes(truss: Truss) -> tuple[list[float], list[str]]:
    """Return the least angle, rad, of each diagonal to the bottom-chord bars that it meets, and its name."""
    slopes, names = [], []
    chord_bars = np.asarray(truss.bottom.bars)
    for bar in truss.bars_with_role("diagonal"):
        met = chord_bars[np.isin(truss.ends[chord_bars], truss.ends[bar]).any(axis=1)]
        if met.size:
            cosines = np.abs(truss.directions[met] @ truss.directions[bar])
            slopes.append(float(np.arccos(np.clip(cosines, 0.0, 1.0)).min()))
            names.append(truss.bar_names[bar])
    return slopes, names
