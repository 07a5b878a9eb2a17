"""The picture `restraint`: every length, what bounds it, and what bounds nothing."""

import re
from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from pictured import ROOFS, drawn, laid, lines, outlines, texts, words

from spanwright.io.pictures.bands import spread
from spanwright.io.pictures.notes import web_lengths
from spanwright.io.pictures.restraint import ROWS_SHOWN
from spanwright.io.pictures.runs import chord_holding
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import INK
from spanwright.io.text import kilonewtons, metres, rounded_up

EVERY_ROOF = pytest.mark.parametrize("roof", ROOFS)


@EVERY_ROOF
def test_every_length_of_both_chords_is_written(roof: str) -> None:
    """As many times as the restraint graph has it, in plane and out of plane."""
    design, page = drawn(roof), words(laid("restraint", roof))
    setting = design.setting
    runs = [run for run in setting.lengths.runs if run.chord != "web"]
    expected = [metres(run.length) for run in runs]
    for chord in (setting.truss.top, setting.truss.bottom):
        expected += [
            metres(float(setting.truss.lengths[bar])) for bar in chord.bars
        ]  # no joint is passed in plane here
    for length in set(expected):
        assert page.count(length.removesuffix(" m")) == expected.count(length)


def bottom_on_sheet(sheet: Sheet, roof: str) -> tuple[float, float]:
    """Return where on the sheet the level bottom chord begins, mm from the left, and the scale."""
    truss = drawn(roof).setting.truss
    scale = next(float(text[2:].split()[0]) for text in words(sheet) if text.startswith("1:"))
    first = truss.vectors[truss.bottom.bars[0]] / scale
    bars = [points for points, width, *_ in lines(sheet) if width == pytest.approx(0.5) and points.shape == (2, 2)]
    return min(float(points[0, 0]) for points in bars if np.allclose(points[1] - points[0], first)), scale


@EVERY_ROOF
def test_lengths_stand_between_the_points_that_bound_them(roof: str) -> None:
    """The words of a length are centred between the two points of the chord, and the points bear the names."""
    design, sheet = drawn(roof), laid("restraint", roof)
    left, scale = bottom_on_sheet(sheet, roof)
    placed = [(text.get_text(), text.get_position()[0]) for text in texts(sheet)]
    for run in (run for run in design.setting.lengths.runs if run.chord == "bottom"):
        start, end = (left + along / scale for along in (run.from_along, run.to_along))
        written = [x for text, x in placed if text == metres(run.length).removesuffix(" m")]
        assert min(abs(x - (start + end) / 2.0) for x in written) < 0.01
        for x_of_end, names in zip((start, end), run.between, strict=True):
            for name in names.split(" and "):
                brace = name.partition(" to ")[0]
                found = [x for text, x in placed if text == brace or text.startswith(f"{brace}:")]
                assert min(abs(x - x_of_end) for x in found) < 4.0


@EVERY_ROOF
def test_what_holds_is_named_with_its_force(roof: str) -> None:
    design, page = drawn(roof), words(laid("restraint", roof))
    for force in design.restraint_forces:
        assert any(
            text == f"{force.part}: {kilonewtons(force.force)}"  # a knee brace's force stands in its second line
            or (text == force.part and f"{kilonewtons(force.force)}" in " ".join(page))
            for text in page
        )
    assert any(kilonewtons(design.anchor_force) in text for text in page)


def test_what_is_loose_is_named_bounds_nothing_and_is_grey() -> None:
    design, sheet = drawn("loose"), laid("restraint", "loose")
    loose = {text.get_text(): text for text in texts(sheet) if text.get_text().endswith((": loose", ": no hold"))}
    assert set(loose) == {"purlin line 5: loose", "purlin line 6: loose", "knee brace B4: no hold"}
    assert all(text.get_color() != INK for text in loose.values())
    top = chord_holding(design, design.setting.truss.top)
    lines_4_and_5 = [line.along for line in design.setting.restraint.lines if not line.anchored]
    run = next(run for run in design.setting.lengths.runs if run.from_along < lines_4_and_5[0] < run.to_along)
    assert run.from_along < lines_4_and_5[1] < run.to_along
    assert max(stretch.length for stretch in top.out_of_plane) == run.length


def test_the_compression_of_a_length_is_that_of_its_bars() -> None:
    design = drawn("pratt")
    held = chord_holding(design, design.setting.truss.bottom)
    runs = [run for run in design.setting.lengths.runs if run.chord == "bottom"]
    for stretch, run in zip(held.out_of_plane, runs, strict=True):
        assert stretch.compression == pytest.approx(-min(design.demand.axial[bar].min() for bar in run.bars))
        assert stretch.compression > 0.0  # uplift presses the bottom chord


@EVERY_ROOF
def test_what_the_roof_cannot_lose_is_listed_worst_first(roof: str) -> None:
    design, sheet = drawn(roof), laid("restraint", roof)
    level = {text.get_text(): text.get_position()[1] for text in texts(sheet) if not text.get_rotation()}
    shown = design.missing[:ROWS_SHOWN]
    heights = [level[row.part] for row in shown]
    assert heights == sorted(heights, reverse=True)
    for row in shown:
        assert (f"nothing holds {', '.join(row.unheld)}" if row.unheld else rounded_up(row.utilisation)) in level


@EVERY_ROOF
def test_what_is_not_listed_is_counted(roof: str) -> None:
    """Rows shown and rows counted make all; unsafe rows come first, so none is counted unless all shown are unsafe."""
    design = drawn(roof)
    counted = [text for text in words(laid("restraint", roof)) if text.endswith("see calculation.pdf")]
    assert len(counted) == (len(design.missing) > ROWS_SHOWN)
    for text in counted:
        more, unsafe = (int(number) for number in re.findall(r"and (\d+) more, (\d+) of them", text)[0])
        assert ROWS_SHOWN + more == len(design.missing)
        assert unsafe == max(sum(bool(row.unheld) or row.utilisation > 1.0 for row in design.missing) - ROWS_SHOWN, 0)


@EVERY_ROOF
def test_a_list_of_webs_that_goes_on_says_so(roof: str) -> None:
    """Every entry but the last is followed by a semicolon, at the end of a line too."""
    page = words(laid("restraint", roof))
    first = next(at for at, text in enumerate(page) if text.startswith("Webs, buckling lengths")) + 1
    webs = [text for text in page[first:] if re.match(r"[A-Z]+\d+.* \d+\.\d\d;?$", text)]
    assert webs
    assert all(text.endswith(";") for text in webs[:-1])


def test_lengths_of_webs_in_and_out_of_plane() -> None:
    """A compound Fink's long diagonals pass an inner joint: half their length in plane, all of it out of plane."""
    design = drawn("fink")
    setting = design.setting
    listed = web_lengths(design)
    names = " ".join(listed).replace(",", "").split()
    for name, role in zip(setting.truss.bar_names, setting.truss.roles, strict=True):
        assert names.count(name) == ("chord" not in role)
    at_inner = (setting.truss.ends == setting.truss.joint("M1")).any(axis=1)
    lengths = [round(float(length)) for length in setting.truss.lengths[at_inner]]
    longest = max(lengths) / 1e3
    assert any(text.endswith(f" {longest:.2f} / {2.0 * longest:.2f}") for text in listed)


def test_upright_names_keep_clear_of_each_other_at_a_ridge_pair() -> None:
    sheet = laid("restraint", "large")
    names = [shape for text, shape in outlines(sheet) if text.get_rotation() == 90.0]
    assert len(names) > 20
    assert all(not one.intersects(other) for k, one in enumerate(names) for other in names[:k])


@given(st.lists(st.floats(0.0, 250.0), min_size=1, max_size=30), st.floats(0.5, 6.0))
def test_places_are_spread_as_little_as_can_be(places: list[float], gap: float) -> None:
    places = sorted(places)
    found = spread(places, [gap] * (len(places) - 1))
    assert all(after - before >= gap - 1e-9 for before, after in pairwise(found))
    assert sum(found) == pytest.approx(sum(places))  # blocks are centred on what they stand for
    if all(after - before >= gap for before, after in pairwise(places)):
        assert found == pytest.approx(places)
