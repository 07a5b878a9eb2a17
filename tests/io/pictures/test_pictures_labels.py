"""Boxes against shapely, angles that can be read, and lettering against matplotlib's own measure."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from matplotlib.textpath import text_to_path
from shapely import Polygon

from spanwright.io.pictures.boxes import box, corners, overlaps
from spanwright.io.pictures.labels import Occupied, Words, place_along, readable_angle
from spanwright.io.pictures.lettering import POINTS_PER_MM, cut_to, font_of, plain, width_of
from spanwright.io.pictures.sheet import drawing_board
from spanwright.truss.arrays import FloatArray

BOXES = st.builds(
    lambda x, y, angle, length, height: box(np.array([x, y]), angle, length, height),
    st.floats(-10.0, 10.0),
    st.floats(-10.0, 10.0),
    st.floats(-math.pi, math.pi),
    st.floats(0.5, 12.0),
    st.floats(0.5, 4.0),
)


@given(BOXES, BOXES)
def test_boxes_overlap_where_their_outlines_do(one: FloatArray, other: FloatArray) -> None:
    first, second = Polygon(corners(one)), Polygon(corners(other))
    found = bool(overlaps(one, other[None])[0])
    if found != first.intersects(second):  # touching counts as either
        assert first.intersection(second).area < 1e-9
        assert first.distance(second) < 1e-9


@given(st.floats(-math.pi, math.pi))
def test_text_reads_from_below_or_from_the_right(direction: float) -> None:
    angle = readable_angle(np.array([math.cos(direction), math.sin(direction)]))
    assert -math.pi / 2.0 < angle <= math.pi / 2.0 + 1e-6
    assert math.sin(angle - direction) == pytest.approx(0.0, abs=1e-9)


def test_posts_read_upward_whichever_end_comes_first() -> None:
    assert readable_angle(np.array([0.0, -5.0])) == pytest.approx(math.pi / 2.0)
    assert readable_angle(np.array([1e-12, 5.0])) == pytest.approx(math.pi / 2.0)
    assert readable_angle(np.array([-1e-12, 5.0])) == pytest.approx(math.pi / 2.0)


def test_a_label_stands_half_way_then_aside_then_across_then_nowhere() -> None:
    segment = np.array([[0.0, 0.0], [20.0, 0.0]])
    occupied = Occupied(np.zeros((0, 6)))
    places = [place_along(segment, Words(6.0, 2.0), 1.0, (1.0, -1.0), occupied) for _ in range(8)]
    assert places[-1] is None
    found = [tuple(place[:2]) for place in places if place is not None]
    assert found[0] == pytest.approx((10.0, 2.0))
    assert [np.sign(y) for _, y in found] == sorted((np.sign(y) for _, y in found), reverse=True)
    assert {np.sign(y) for _, y in found} == {1.0, -1.0}
    assert all(3.0 <= x <= 17.0 for x, _ in found)


@pytest.mark.parametrize("words", ["0.87 C", "1.2 most + 1.6 imposed left", "2L 65x50x5, short legs together, gap 8"])
def test_widths_are_those_of_the_font(words: str) -> None:
    with drawing_board():
        points, _, _ = text_to_path.get_text_width_height_descent(words, font_of(7.2, "normal"), ismath=False)
        assert width_of(words, 7.2) == pytest.approx(points / POINTS_PER_MM, rel=0.01)  # kerning is left out


def test_words_are_cut_only_where_they_must_be() -> None:
    with drawing_board():
        assert cut_to("short", 50.0, 7.0) == "short"
        cut = cut_to("a title that is longer than there is room for", 30.0, 7.0)
        assert cut.endswith("\u2026")
        assert width_of(cut, 7.0) <= 30.0
        assert width_of(cut[:-1] + "mm\u2026", 7.0) > 30.0


def test_words_stand_on_one_line_without_control_characters() -> None:
    assert plain("a\n b\t\x00c \x1b[1m") == "a b c [1m"
