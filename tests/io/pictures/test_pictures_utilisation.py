"""The picture `utilisation`: every value there and in its place, states told apart by more than colour."""

import math
from functools import cache
from pathlib import Path
from xml.etree import ElementTree

import numpy as np
import pytest
from matplotlib.colors import to_rgb
from pictured import ROOFS, drawn, fill_of, laid, lines, lines_on, outlines, words
from shapely import LineString

from spanwright.design.result import Design
from spanwright.io.pictures.page import HEADING_BOTTOM
from spanwright.io.pictures.sheet import Sheet, drawing_board
from spanwright.io.pictures.state import MemberState, group_states, letters_from, member_states
from spanwright.io.pictures.style import BANDS, INK, OVER, PAPER, Pen, band_of
from spanwright.io.pictures.symbols import purlin_outlines
from spanwright.io.text import rounded_up
from spanwright.truss.arrays import FloatArray

EVERY_ROOF = pytest.mark.parametrize("roof", ROOFS)


def states_of(design: Design) -> dict[str, MemberState]:
    return {state.name: state for state in member_states(design, group_states(design))}


@cache
def segments_of(roof: str) -> FloatArray:
    """Return (b, 2, 2) where the bars lie on the sheet, found from the lines drawn as long as the bottom chord's."""
    sheet, truss = laid("utilisation", roof), drawn(roof).setting.truss
    scale = next(float(text[2:].split()[0]) for text in words(sheet) if text.startswith("1:"))
    found = np.array([points for points, *_ in lines(sheet) if points.shape == (2, 2)])
    left, right = truss.xy[[truss.bottom.joints[0], truss.bottom.joints[-1]]]
    first = truss.vectors[truss.bottom.bars[0]] / scale
    starts = found[np.isclose(found[:, 1] - found[:, 0], first).all(axis=1), 0]
    origin = next(
        start for start in starts if np.isclose(found[:, 1], start + (right - left) / scale).all(axis=1).any()
    )
    placed: FloatArray = origin + (truss.xy[truss.ends] - left) / scale
    return placed


@EVERY_ROOF
def test_every_members_value_is_text_in_the_svg(roof: str, tmp_path: Path) -> None:
    design = drawn(roof)
    with drawing_board():
        laid("utilisation", roof).write(tmp_path, "utilisation")
    groups = ElementTree.parse(tmp_path / "utilisation.svg").getroot().iter("{http://www.w3.org/2000/svg}g")
    marked = {group.get("id"): "".join(group.itertext()).strip() for group in groups}
    for bar, name in enumerate(design.setting.truss.bar_names):
        value = rounded_up(float(design.utilisation[bar]))
        direct, keyed = marked.get(f"value-{name}", ""), marked.get(f"key-{name}", "")
        assert direct.split(" ")[0] == value or f" {name} {value}" in keyed


@EVERY_ROOF
def test_values_stand_beside_members_and_on_none(roof: str) -> None:
    """Letters of the key may stand on their own member where even they find no room beside it."""
    sheet, design = laid("utilisation", roof), drawn(roof)
    bars = range(len(design.setting.truss.bar_names))
    middle = [LineString(segment) for segment in segments_of(roof)]
    shapes = [(text, shape) for text, shape in outlines(sheet) if str(text.get_gid()).startswith("value-")]
    assert len(shapes) >= 0.9 * len(bars)
    for text, shape in shapes:
        if len(text.get_text()) > 2:
            assert not any(line.intersects(shape) for line in middle), text.get_text()
            name = str(text.get_gid()).removeprefix("value-")
            nearest = min(bars, key=lambda bar: middle[bar].distance(shape.centroid))
            assert design.setting.truss.bar_names[nearest] == name


@EVERY_ROOF
def test_most_values_stand_at_their_members(roof: str) -> None:
    """The largest has 81 members and a heel of 7 mm on paper, where no value fits."""
    keyed = [text for text in laid("utilisation", roof).figure.artists if str(text.get_gid()).startswith("key-")]
    assert len(keyed) <= (20 if roof == "large" else 2)


def relative_luminance(colour: str) -> float:
    """WCAG 2.1, definition of relative luminance."""
    linear = [c / 12.92 if c <= 0.04045 else ((c + 0.055) / 1.055) ** 2.4 for c in to_rgb(colour)]
    return float(np.dot([0.2126, 0.7152, 0.0722], linear))


def test_bands_darken_in_steps_that_grey_keeps_apart() -> None:
    light = [relative_luminance(band.colour) for band in BANDS]
    contrast = [(lighter + 0.05) / (darker + 0.05) for lighter, darker in zip(light, [*light[1:], 0.0], strict=True)]
    assert min(contrast) > 1.4
    assert light[0] > 0.9


def test_bands_compare_unrounded() -> None:
    edges = [0.50, 0.70, 0.85, 0.95, 1.00]  # practice.md 7
    assert [band_of(edge) for edge in edges] == [0, 1, 2, 3, 4]
    assert [band_of(math.nextafter(edge, 2.0)) for edge in edges] == [1, 2, 3, 4, OVER]
    assert band_of(0.0) == 0
    assert band_of(math.inf) == OVER


def test_a_member_over_one_is_barred_in_black_and_white_and_no_other_is() -> None:
    design, sheet = drawn("loose"), laid("utilisation", "loose")
    assert 0 < np.count_nonzero(design.utilisation > 1.0) < len(design.utilisation)
    colours = {band.colour for band in BANDS}
    for bar, utilisation in enumerate(design.utilisation):
        segment = segments_of("loose")[bar]
        length = float(np.hypot(*(segment[1] - segment[0])))
        drawn_on = lines_on(sheet, segment)
        white = [part for _, colour, part in drawn_on if colour == PAPER]
        if utilisation > 1.0:
            assert len(white) > 5
            assert sum(white) == pytest.approx(length / 2.0, abs=1.2)  # bar by bar, black between
            assert {colour for _, colour, _ in drawn_on} == {INK, PAPER}
        else:
            assert not white
            assert {colour for _, colour, _ in drawn_on} & colours
    assert any(text.startswith("NOT PASSING: greatest utilisation") for text in words(sheet))


def test_its_value_is_white_on_black() -> None:
    design = drawn("loose")
    for text in laid("utilisation", "loose").figure.artists:
        if str(text.get_gid()).startswith("value-"):
            bar = design.setting.truss.bar(str(text.get_gid()).removeprefix("value-"))
            assert text.get_color() == (PAPER if design.utilisation[bar] > 1.0 else INK)  # type: ignore[attr-defined]


def test_colours_go_by_band() -> None:
    design, sheet = drawn("howe"), laid("utilisation", "howe")
    for bar, utilisation in enumerate(design.utilisation):
        colours = {colour for _, colour, _ in lines_on(sheet, segments_of("howe")[bar])}
        assert colours == {INK, BANDS[band_of(float(utilisation))].colour}


def test_compression_is_drawn_stouter_than_tension_and_says_so() -> None:
    design, sheet = drawn("howe"), laid("utilisation", "howe")
    widths: dict[str, set[float]] = {"C": set(), "T": set()}
    for bar, (name, state) in enumerate(states_of(design).items()):
        choice, place = design.choice_for(bar)
        governing = design.governing_of(choice, place).check
        assert state.sign == ("T" if governing.startswith("tension") else "C"), name
        assert state.words.endswith(f" {state.sign}")
        widths[state.sign].add(min(width for width, *_ in lines_on(sheet, segments_of("howe")[bar])))
    assert min(widths["C"]) > 1.5 * max(widths["T"])


def test_members_that_fail_a_limit_are_hatched_and_no_others() -> None:
    design, sheet = drawn("limits"), laid("utilisation", "limits")
    assert 0 < np.count_nonzero(design.limit_failed) < len(design.limit_failed)
    strokes = [points for points, _, colour in lines(sheet) if colour == INK]
    for bar, failed in enumerate(design.limit_failed):
        segment = segments_of("limits")[bar]
        span = segment[1] - segment[0]
        crossing = [
            stroke
            for stroke in strokes
            if stroke.shape == (2, 2)
            and np.hypot(*(stroke[1] - stroke[0])) == pytest.approx(3.8)
            and abs(np.dot(stroke[1] - stroke[0], span)) == pytest.approx(1.9 * np.hypot(*span))  # at 60 degrees
            and LineString(segment).intersects(LineString(stroke))
        ]
        assert (len(crossing) > 3) == bool(failed)


def test_loose_purlins_are_open_and_counted_ones_filled() -> None:
    design, sheet = drawn("loose"), laid("utilisation", "loose")
    truss, restraint = design.setting.truss, design.setting.restraint
    left, right = (segments_of("loose")[bar] for bar in (truss.bottom.bars[0], truss.bottom.bars[-1]))
    scale = truss.span / (right[1, 0] - left[0, 0])
    fills = {}
    for line in restraint.lines:
        foot = left[0] + (np.array([line.x, line.y]) - truss.xy[truss.bottom.joints[0]]) / scale
        fills[line.number] = _square_above(sheet, foot)
    assert {number for number, fill in fills.items() if fill == PAPER} == {5, 6}
    assert set(fills.values()) == {PAPER, INK}


def _square_above(sheet: Sheet, foot: FloatArray) -> str:
    """Return the fill of the square of a purlin that stands on a point."""
    for outline in _quadrilaterals(sheet):
        base = outline[:2].mean(axis=0)
        if np.hypot(*(base - foot)) < 2.0 and np.hypot(*(outline[1] - outline[0])) == pytest.approx(Pen(1.0).square):
            return fill_of(sheet, outline)
    raise AssertionError("no purlin there")


def _quadrilaterals(sheet: Sheet) -> list[FloatArray]:
    paths = [path for artist in sheet.figure.artists for path in getattr(artist, "get_paths", list)()]
    return [np.asarray(path.vertices)[:4] for path in paths if len(path.vertices) == 5]


def test_the_table_calls_out_what_governs_each_group() -> None:
    for roof in ("howe", "limits"):
        design, page = drawn(roof), words(laid("utilisation", roof))
        for group in group_states(design):
            found = group.governing
            assert group.choice.group.name in page
            assert group.choice.name in page
            assert {found.bar, rounded_up(found.ratio), found.combination or "any"} <= set(page)
            assert any(text.endswith(f"{found.check} ({found.clause})") for text in page)
            assert page.count(group.letter) >= 2  # in the table and on the member


def test_the_table_lies_below_the_truss() -> None:
    sheet = laid("utilisation", "steep")
    points = segments_of("steep")
    headings = [text for text in sheet.figure.artists if getattr(text, "get_text", str)() == "governing check"]
    assert headings[0].get_position()[1] + 20.0 < points[..., 1].min()  # type: ignore[attr-defined]
    assert points[..., 1].max() < HEADING_BOTTOM


def test_letters_go_on_after_z() -> None:
    letters = letters_from("a")
    found = [next(letters) for _ in range(26 + 26 * 26 + 1)]
    assert found[:2] == ["a", "b"]
    assert found[25:28] == ["z", "aa", "ab"]
    assert found[-2:] == ["zz", "aaa"]
    assert len(set(found)) == len(found)


def test_purlins_stand_on_the_chord_and_point_away_from_the_truss() -> None:
    from spanwright.io.pictures.view import Zone, view_of

    setting = drawn("pratt").setting
    view = view_of(setting.truss, setting.restraint, Zone(0.0, 0.0, 270.0, 100.0))
    for line, outline in zip(
        setting.restraint.lines, purlin_outlines(setting.truss, setting.restraint, view, Pen(1.0)), strict=True
    ):
        foot = view.onto(np.array([line.x, line.y]))
        assert (outline[:, 1] > foot[1]).all()
        assert np.hypot(*(outline[:2].mean(axis=0) - foot)) == pytest.approx(Pen(1.0).lift)
