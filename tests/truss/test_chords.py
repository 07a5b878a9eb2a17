"""Chords followed through kinks, and the slopes of top chords of every shape."""

import numpy as np
import pytest

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.chords import slopes, trace_chords
from spanwright.truss.errors import GeometryError
from spanwright.truss.model import Chord, Role, Support, Truss

Bars = list[tuple[int, int, Role]]


def trace(points: list[tuple[float, float]], bars: Bars, overhang: float = 0.0) -> tuple[Chord, Chord]:
    names = [chr(ord("A") + i) for i in range(len(points))]
    return trace_chords(names, *arrays(points, bars), overhang)


def arrays(points: list[tuple[float, float]], bars: Bars) -> tuple[FloatArray, IntArray, list[Role]]:
    ends = np.array([(a, b) for a, b, _ in bars], dtype=np.intp)
    return np.array(points, dtype=float), ends, [role for _, _, role in bars]


def under(points: list[tuple[float, float]]) -> Truss:
    """Return a truss whose top chord runs through the points over a bottom chord between the outer ones."""
    last = len(points) - 1
    bars: Bars = [(i, i + 1, "top chord") for i in range(last)] + [(0, last, "bottom chord")]
    xy, ends, roles = arrays(points, bars)
    top, bottom = trace([*points], bars)
    names = tuple(str(i) for i in range(len(points)))
    supports = (Support(0, True, True), Support(last, False, True))
    return Truss(names, xy, tuple(f"b{i}" for i in range(len(bars))), ends, tuple(roles), supports, top, bottom)


def test_a_chord_is_followed_from_the_left_whatever_the_order_of_its_bars() -> None:
    points = [(6000.0, 0.0), (3000.0, 4000.0), (0.0, 0.0), (3000.0, 1000.0)]
    bars: Bars = [(0, 1, "top chord"), (0, 3, "bottom chord"), (1, 2, "top chord"), (3, 2, "bottom chord")]
    top, bottom = trace(points, bars)
    assert (top.joints, top.bars) == ((2, 1, 0), (2, 0))
    assert (bottom.joints, bottom.bars) == ((2, 3, 0), (3, 1))
    assert top.along == pytest.approx([0.0, 5000.0, 10000.0])
    assert top.length == pytest.approx(10000.0)


def test_an_upright_piece_belongs_to_the_chord() -> None:
    # a roof with a step, as of a lantern
    top = under([(0.0, 0.0), (2000.0, 0.0), (2000.0, 500.0), (5000.0, 900.0)]).top
    assert top.along[2] == pytest.approx(2500.0)


def test_the_overhang_follows_the_slope_of_each_end() -> None:
    points = [(0.0, 0.0), (3000.0, 4000.0), (15000.0, -1000.0)]
    top, bottom = trace(points, [(0, 1, "top chord"), (1, 2, "top chord"), (0, 2, "bottom chord")], 300.0)
    assert top.overhang == pytest.approx((500.0, 325.0))
    assert bottom.overhang == (0.0, 0.0)


def test_an_overhang_of_an_upright_end_is_refused() -> None:
    points = [(0.0, 0.0), (0.0, 900.0), (6000.0, 900.0)]
    with pytest.raises(GeometryError, match="ends vertically at A"):
        trace(points, [(0, 1, "top chord"), (1, 2, "top chord"), (0, 2, "bottom chord")], 300.0)


SQUARE = [(0.0, 0.0), (3000.0, 1000.0), (6000.0, 0.0), (3000.0, 0.0), (9000.0, 0.0)]
BOTTOM: Bars = [(0, 3, "bottom chord")]


@pytest.mark.parametrize(
    ("bars", "says"),
    [
        ([(0, 1, "post")], "no bar is a top chord"),
        ([(0, 1, "top chord"), (1, 2, "top chord"), (1, 3, "top chord")], "branches at B"),
        ([(0, 1, "top chord"), (2, 4, "top chord")], "broken: its bars do not meet between A, B / C, E"),
        ([(0, 1, "top chord"), (1, 2, "top chord"), (2, 0, "top chord")], "closes on itself through A, B, C"),
    ],
)
def test_what_is_no_chord_is_refused_with_its_joints(bars: Bars, says: str) -> None:
    with pytest.raises(GeometryError) as refused:
        trace(SQUARE, bars + BOTTOM)
    assert says in str(refused.value)
    assert refused.value.key == "truss.bars"


def test_slopes_of_a_duopitch() -> None:
    slope = slopes(under([(0.0, 0.0), (3000.0, 4000.0), (15000.0, -1000.0)]))
    assert slope.side == ("left", "right")
    assert slope.directions == pytest.approx(np.array([[0.6, 0.8], [12 / 13, -5 / 13]]))
    assert slope.apex_joint == 1
    assert slope.apex_along == pytest.approx(5000.0)


def test_the_apex_of_a_mono_pitch_is_its_high_end() -> None:
    rising = slopes(under([(0.0, 0.0), (4000.0, 300.0), (8000.0, 600.0)]))
    falling = slopes(under([(0.0, 600.0), (4000.0, 300.0), (8000.0, 0.0)]))
    assert (rising.side, rising.apex_joint) == (("left", "left"), 2)
    assert (falling.side, falling.apex_joint, falling.apex_along) == (("right", "right"), 0, 0.0)


def test_a_level_chord_is_split_at_mid_span_even_if_drawn_a_little_askew() -> None:
    for tilt in (0.0, 2.0, -2.0):
        slope = slopes(under([(i * 3000.0, tilt * i / 4) for i in range(5)]))
        assert slope.side == ("left", "left", "right", "right")
        assert slope.apex_joint == 2
        assert slope.apex_along == pytest.approx(6000.0)


def test_a_level_bar_across_mid_span_counts_as_left() -> None:
    slope = slopes(under([(0.0, 0.0), (3000.0, 0.0), (6000.0, 0.0), (9000.0, 0.0)]))
    assert slope.side == ("left", "left", "right")
    assert slope.apex_joint == 1


def test_the_apex_of_a_flat_top_is_the_joint_nearest_mid_span() -> None:
    points = [(0.0, 0.0), (2000.0, 900.0), (4000.0, 900.0), (6500.0, 900.0), (9000.0, 900.0), (11000.0, 0.0)]
    slope = slopes(under(points))
    assert slope.side == ("left", "left", "left", "right", "right")
    assert slope.apex_joint == 3
