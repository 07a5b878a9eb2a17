"""Both pages of every roof: no words over other words, nothing off the sheet, everything to scale."""

import re
from itertools import chain

import numpy as np
import pytest
from pictured import PAGES, ROOFS, drawn, laid, lines, outlines, texts, words
from shapely import STRtree, box

from spanwright.io.pictures.style import DENOMINATORS

EVERY_PAGE = pytest.mark.parametrize("page", PAGES)
EVERY_ROOF = pytest.mark.parametrize("roof", ROOFS)


@EVERY_PAGE
@EVERY_ROOF
def test_no_words_lie_on_other_words(page: str, roof: str) -> None:
    found = outlines(laid(page, roof))
    shapes = [shape for _, shape in found]
    pairs = STRtree(shapes).query(shapes, predicate="intersects").T
    assert [(found[a][0].get_text(), found[b][0].get_text()) for a, b in pairs if a < b] == []


@EVERY_PAGE
@EVERY_ROOF
def test_everything_lies_within_the_margins(page: str, roof: str) -> None:
    sheet = laid(page, roof)
    inside = box(10.0, 10.0, 287.0, 200.0).buffer(0.5)  # A4 less 10 mm; half a millimetre for letters' overshoot
    outside = [text.get_text() for text, shape in outlines(sheet) if not inside.contains(shape)]
    assert outside == []
    points = np.array(list(chain.from_iterable(points for points, *_ in lines(sheet))))
    assert points.min() >= 9.5
    assert (points.max(axis=0) <= [287.5, 200.5]).all()


@EVERY_PAGE
@EVERY_ROOF
def test_the_scale_that_is_stated_is_true(page: str, roof: str) -> None:
    """The bars are found on the sheet at their length over the stated scale, level and upright alike."""
    sheet, truss = laid(page, roof), drawn(roof).setting.truss
    scale = next(int(match[1]) for text in words(sheet) if (match := re.fullmatch(r"1:(\d+) on A4", text)))
    assert scale in DENOMINATORS
    spans = [points[1] - points[0] for points, *_ in lines(sheet) if points.shape == (2, 2)]
    for vector in truss.vectors:
        assert any(np.allclose(span, vector / scale, atol=1e-6) for span in spans)


@EVERY_PAGE
def test_the_scale_bar_is_as_long_as_it_says(page: str) -> None:
    sheet = laid(page, "pratt")
    found = [(text.get_text(), *text.get_position()) for text in texts(sheet)]
    scale = next(int(text[2:].split()[0]) for text, *_ in found if re.fullmatch(r"1:\d+ on A4", text))
    start, level = next((x, y) for text, x, y in found if text == "0")
    length, end = next((float(text[:-2]), x) for text, x, y in found if re.fullmatch(r"[\d.]+ m", text) and y == level)
    assert end - start == pytest.approx(1000.0 * length / scale)
