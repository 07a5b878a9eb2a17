"""The plane of drawing (exchange finding 7): in plan, upright, at a level, turned, far from the origin."""

import math
from collections.abc import Callable, Sequence
from pathlib import Path

import pytest
from wireframes import HIGH_HEEL, PRATT, assert_same, codes, draw, imported, lines_of, new_drawing

from spanwright.io.wireframe import RefusedDrawingError

Point = Sequence[float]


def turned(degrees: float) -> Callable[[Point], Point]:
    angle = math.radians(degrees)
    return lambda p: (p[0] * math.cos(angle), p[0] * math.sin(angle), p[1])


PLACES: dict[str, tuple[Callable[[Point], Point], str, float]] = {
    "plan": (lambda p: (p[0], p[1], 0), "in plan; y was taken as vertical, x as to the right", 0.0),
    "level": (lambda p: (p[0], p[1], 3000), "in plan; y was taken as vertical, x as to the right", 0.0),
    "front": (lambda p: (p[0], 700, p[1]), "in a vertical plane; z was taken as vertical, x as to the right", 0.0),
    "side": (lambda p: (-40, p[0], p[1]), "in a vertical plane; z was taken as vertical, y as to the right", 0.0),
    "turned": (turned(33), "the direction (0.8387, 0.5446, 0.0000) as to the right", 2e-5),
    "turned left": (turned(120), "the direction (0.5000, -0.8660, 0.0000) as to the right", 2e-5),
    "turned back": (turned(-101), "the direction (0.1908, 0.9816, 0.0000) as to the right", 2e-5),
    "far": (lambda p: (p[0] + 4.5e6, p[1] - 4.5e6, 0), "in plan", 2e-5),
    "very far": (lambda p: (p[0] + 4.5e9, 2e9, p[1]), "in a vertical plane", 2e-5),
}


@pytest.mark.parametrize("name", PLACES)
def test_the_truss_comes_back_from_any_plane_and_the_vertical_axis_is_said(tmp_path: Path, name: str) -> None:
    place, words, within = PLACES[name]
    document = new_drawing()
    draw(document.modelspace(), HIGH_HEEL, place)
    wireframe = imported(document, tmp_path)
    assert words in wireframe.report.facts.vertical
    assert wireframe.report.with_code("W-203")[0].text == wireframe.report.facts.vertical
    assert codes(wireframe) == []
    assert_same(wireframe, HIGH_HEEL, within)


def test_seen_from_behind_a_mono_pitch_rises_the_other_way(tmp_path: Path) -> None:
    # drawn in the plane x = 0 towards negative y: "to the right" is towards greater y, whatever side one drew from
    lines = [((0, 0), (6000, 0)), ((0, 0), (6000, 1500)), ((6000, 0), (6000, 1500))]
    lines += [((3000, 0), (3000, 750)), ((3000, 750), (6000, 0))]
    document = new_drawing()
    for start, end in lines:
        document.modelspace().add_line((0, -start[0], start[1]), (0, -end[0], end[1]))
    given = imported(document, tmp_path).given
    assert {name: (x, y) for name, x, y in given.joints}["T0"] == (0.0, 1500.0)


def test_a_light_polyline_at_a_level_keeps_its_level(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    for start, end, _ in lines_of(PRATT):
        space.add_lwpolyline([start.tolist(), end.tolist()], dxfattribs={"elevation": 3000})
    assert_same(imported(document, tmp_path), PRATT)
    document.modelspace().add_line((0, 0, 0), (500, 0, 0))
    with pytest.raises(RefusedDrawingError, match=r"lie in no one plane: LINE .* is 3000 mm off") as refused:
        imported(document, tmp_path)
    assert refused.value.entity == document.modelspace()[-1].dxf.handle
    assert refused.value.at == (0.0, 0.0, 0.0)


def test_a_light_polyline_drawn_upright_by_its_extrusion(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    for start, end, _ in lines_of(PRATT):
        # object axes of the normal (0, -1, 0): x to world x, y to world z
        space.add_lwpolyline([start.tolist(), end.tolist()], dxfattribs={"extrusion": (0, -1, 0), "elevation": 9})
    wireframe = imported(document, tmp_path)
    assert "z was taken as vertical" in wireframe.report.facts.vertical
    assert_same(wireframe, PRATT, within=1e-9)


def test_scatter_within_the_tolerance_is_flattened_and_said(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    for k, (start, end, _) in enumerate(lines_of(PRATT)):
        space.add_line((*start, (-1) ** k * 1.5), (*end, 1.5))
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, PRATT)
    (finding,) = wireframe.report.with_code("W-204")
    assert "up to 1.5 mm off the plane" in finding.text


def test_an_inclined_plane_needs_the_user_s_word(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT, lambda p: (p[0], 0.6 * p[1], 0.8 * p[1]))
    with pytest.raises(RefusedDrawingError, match="neither level nor vertical") as refused:
        imported(document, tmp_path)
    assert refused.value.key == "up"
    assert_same(imported(document, tmp_path, up="z"), PRATT, within=2e-5)


@pytest.mark.parametrize(
    ("up", "place"),
    [
        ("x", lambda p: (p[1], -p[0])),
        ("-x", lambda p: (-p[1], p[0])),
        ("-y", lambda p: (-p[0], -p[1])),
        ("-z", lambda p: (-p[0], 5, -p[1])),
    ],
)
def test_the_user_may_say_which_axis_is_up(tmp_path: Path, up: str, place: Callable[[Point], Point]) -> None:
    document = new_drawing()
    draw(document.modelspace(), HIGH_HEEL, place)
    assert_same(imported(document, tmp_path, up=up), HIGH_HEEL)


def test_a_truss_on_its_end_is_refused_with_the_remedy(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), HIGH_HEEL, lambda p: (p[1], -p[0]))
    with pytest.raises(RefusedDrawingError) as refused:
        imported(document, tmp_path)
    assert refused.value.key in ("up", "bearings")


def test_an_axis_square_to_the_plane_cannot_be_up(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    with pytest.raises(RefusedDrawingError, match="square to the plane"):
        imported(document, tmp_path, up="z")
