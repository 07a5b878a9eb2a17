"""Chords, posts, diagonals, bearings, overhangs and marks, by geometry and by layers."""

import itertools
from collections.abc import Sequence
from pathlib import Path
from typing import Any

import pytest
from wireframes import PRATT, assert_same, codes, draw, draw_segments, imported, lines_of, new_drawing

from spanwright.io.wireframe import RefusedDrawingError, Wireframe
from spanwright.truss.forms import build_form
from spanwright.truss.given import build_given
from spanwright.truss.inputs import FormInput

Point = tuple[float, float]
Segments = Sequence[tuple[Point, Point]]


def chain(*points: Point) -> list[tuple[Point, Point]]:
    return list(itertools.pairwise(points))


def read(tmp_path: Path, segments: Segments, **options: Any) -> Wireframe:
    document = new_drawing()
    draw_segments(document.modelspace(), segments)
    return imported(document, tmp_path, **options)


def along(wireframe: Wireframe, role: str) -> list[str]:
    truss = build_given(wireframe.given)
    chord = truss.top if role == "top chord" else truss.bottom
    return [truss.joint_names[joint] for joint in chord.joints]


def role_of(wireframe: Wireframe, start: Point, end: Point) -> str:
    names = {(x, y): name for name, x, y in wireframe.given.joints}
    pair = {names[start], names[end]}
    return next(role for one, other, role in wireframe.given.bars if {one, other} == pair)


SCISSOR = [
    *chain((0, 0), (3000, 1800), (6000, 3600), (9000, 1800), (12000, 0)),
    *chain((0, 0), (3000, 600), (6000, 1200), (9000, 600), (12000, 0)),
    ((3000, 600), (3000, 1800)),
    ((6000, 1200), (6000, 3600)),
    ((9000, 600), (9000, 1800)),
    ((3000, 1800), (6000, 1200)),
    ((9000, 1800), (6000, 1200)),
]


def test_a_scissor_truss(tmp_path: Path) -> None:
    wireframe = read(tmp_path, SCISSOR)
    assert along(wireframe, "top chord") == ["B0", "T1", "T2", "T3", "B4"]
    assert along(wireframe, "bottom chord") == ["B0", "B1", "B2", "B3", "B4"]
    assert wireframe.given.supports == (("B0", "pinned"), ("B4", "sliding"))
    assert wireframe.given.bar_names[-5:] == ("P1", "P2", "P3", "D2", "D3")
    assert codes(wireframe) == []


def test_a_mono_pitch_truss(tmp_path: Path) -> None:
    segments = [
        ((0, 0), (8000, 0)),
        ((0, 500), (8000, 1300)),
        *(((x, 0), (x, 500 + x / 10)) for x in (0, 2000, 4000, 6000, 8000)),
        *(((x, 500 + x / 10), (x + 2000, 0)) for x in (0, 2000, 4000, 6000)),
    ]
    wireframe = read(tmp_path, segments)
    assert along(wireframe, "top chord") == ["T0", "T1", "T2", "T3", "T4"]
    assert along(wireframe, "bottom chord") == ["B0", "B1", "B2", "B3", "B4"]
    assert [name for name in wireframe.given.bar_names if name[0] in "PD"] == [
        "P0",
        "P1",
        "P2",
        "P3",
        "P4",
        "D1",
        "D2",
        "D3",
        "D4",
    ]
    assert set(codes(wireframe)) == {"W-304"}


def warren(panels: int, depth: float) -> list[tuple[Point, Point]]:
    """A parallel-chord truss whose end bars are diagonals: the top chord is a panel shorter."""
    step = 2000.0
    lower = [(k * step, 0.0) for k in range(panels + 1)]
    upper = [((k + 0.5) * step, depth) for k in range(panels)]
    webs = [pair for k in range(panels) for pair in ((lower[k], upper[k]), (upper[k], lower[k + 1]))]
    return [*chain(*lower), *chain(*upper), *webs]


def test_a_warren_truss_has_end_diagonals(tmp_path: Path) -> None:
    wireframe = read(tmp_path, warren(6, 1500.0))
    assert along(wireframe, "top chord") == [f"T{k}" for k in range(6)]
    assert role_of(wireframe, (0, 0), (1000, 1500)) == "diagonal"
    assert codes(wireframe) == ["W-403", "W-403"]


def test_a_steep_gable_keeps_its_rafters_as_chords(tmp_path: Path) -> None:
    # 45 degrees, one bar on the left slope, three on the right
    top = [(0.0, 0.0), (2000.0, 2000.0), (4000.0, 4000 / 3), (6000.0, 2000 / 3), (8000.0, 0.0)]
    webs = [((x, 0.0), (x, y)) for x, y in top[1:-1]] + [(top[1], (4000.0, 0.0)), (top[2], (6000.0, 0.0))]
    wireframe = read(tmp_path, [*chain(*top), ((0, 0), (8000, 0)), *webs])
    assert along(wireframe, "top chord") == ["B0", "T1", "T2", "T3", "B4"]
    assert "W-403" not in codes(wireframe)


def test_a_bowstring_and_a_form_nobody_named(tmp_path: Path) -> None:
    arch = [(x, 3000 - (x - 6000) ** 2 / 12000.0) for x in range(0, 12001, 1500)]
    webs: list[tuple[Point, Point]] = []
    for k, (x, y) in enumerate(arch[1:-1], start=1):
        webs.append(((x, 0.0), (x, y)))
        if 1 < k < 7:
            webs.append(((x, 0.0), arch[k - 1] if k > 4 else arch[k + 1]))
    bowstring = read(tmp_path, [*chain(*arch), ((0, 0), (12000, 0)), *webs])
    assert len(along(bowstring, "top chord")) == 9
    assert "W-403" not in codes(bowstring)
    # a sawtooth: a steep glazed front, a long back, and a web from neither chord
    sawtooth = [
        *chain((0, 0), (1000, 3000), (4000, 2000), (7000, 1000), (10000, 0)),
        *chain((0, 0), (4000, 0), (7000, 0), (10000, 0)),
        ((1000, 3000), (2000, 1000)),
        ((0, 0), (2000, 1000)),
        ((2000, 1000), (4000, 2000)),
        ((2000, 1000), (4000, 0)),
        ((4000, 0), (4000, 2000)),
        ((4000, 2000), (7000, 0)),
        ((7000, 0), (7000, 1000)),
    ]
    wireframe = read(tmp_path, sawtooth)
    assert along(wireframe, "top chord") == ["B0", "T1", "T2", "T3", "B3"]
    assert along(wireframe, "bottom chord") == ["B0", "B1", "B2", "B3"]
    assert ("M1", 2000.0, 1000.0) in wireframe.given.joints
    assert "W-401" not in codes(wireframe)


def test_struts_square_to_the_rafter_are_posts_as_in_a_fink(tmp_path: Path) -> None:
    for panels in (4, 6, 8):
        fink = build_form(FormInput("Fink", 15000.0, 0.5, panels=panels))
        document = new_drawing()
        draw(document.modelspace(), fink)
        assert_same(imported(document, tmp_path), fink)


def test_two_readings_of_the_bearings_are_refused_with_both(tmp_path: Path) -> None:
    # a truss hung from its top chord: the bottom chord is shorter, its end bars are diagonals
    hung = [(start, end) for start, end in ((flip(a), flip(b)) for a, b in warren(6, 1500.0))]
    with pytest.raises(RefusedDrawingError, match=r"two ways: .*\(0, 1500\).*\(1000, 0\)") as refused:
        read(tmp_path, hung)
    assert refused.value.key == "bearings"
    by_word = read(tmp_path, hung, bearings="top chord")
    assert by_word.given.supports == (("T0", "pinned"), ("T6", "sliding"))
    assert ("T0", 0.0, 0.0) in by_word.given.joints
    document = new_drawing()
    draw_segments(document.modelspace(), hung)
    for x in (0.0, 12000.0):
        document.modelspace().add_point((x, 1400), dxfattribs={"layer": "Bearing"})
    by_mark = imported(document, tmp_path, marks={"supports": ("bear*",)})
    assert by_mark.given == by_word.given


def flip(point: Point) -> Point:
    return point[0], 1500.0 - point[1]


def test_marked_supports_go_first_and_one_is_not_enough(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    marks = {"supports": ("S",)}
    document.modelspace().add_circle((2000, -50), 40, dxfattribs={"layer": "S"})
    with pytest.raises(RefusedDrawingError, match="supports are marked at one joint only"):
        imported(document, tmp_path, marks=marks)
    document.modelspace().add_circle((10000, -50), 40, dxfattribs={"layer": "S"})
    given = imported(document, tmp_path, marks=marks, supports="both pinned").given
    assert given.supports == (("B1", "pinned"), ("B5", "pinned"))
    assert ("B0", -2000.0, 0.0) in given.joints


def test_chords_by_layers_in_any_case(tmp_path: Path) -> None:
    document = new_drawing()
    for start, end in warren(6, 1500.0):
        top = start[1] == end[1] == 1500.0 or {start[0], end[0]} in ({0.0, 1000.0}, {11000.0, 12000.0})
        layer = "S-TC-1" if top else "S-BC" if start[1] == end[1] else "S-WEB"
        document.modelspace().add_line(start, end, dxfattribs={"layer": layer})
    wireframe = imported(document, tmp_path, roles={"top chord": ("s-tc*",), "bottom chord": ("*bc",)})
    assert along(wireframe, "top chord") == ["B0", *(f"T{k}" for k in range(1, 7)), "B6"]
    assert codes(wireframe) == []


def test_webs_by_layers(tmp_path: Path) -> None:
    document = new_drawing()
    for start, end in SCISSOR:
        upright = start[0] == end[0]
        document.modelspace().add_line(start, end, dxfattribs={"layer": "TIE ROD" if upright else "REST"})
    wireframe = imported(document, tmp_path, roles={"diagonal": ("tie*",)})
    assert role_of(wireframe, (6000, 1200), (6000, 3600)) == "diagonal"


def test_a_chord_whose_layers_break_it_is_refused_with_the_place(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    document.modelspace()[2].dxf.layer = "0"
    with pytest.raises(RefusedDrawingError, match="top chord, as its layers give it, is broken") as refused:
        imported(document, tmp_path, roles={"top chord": ("top*",)})
    assert refused.value.key == "roles.top chord"


def test_a_bar_on_layers_of_two_roles_is_said(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    start, end, _ = next(line for line in lines_of(PRATT) if line[2] == "post")
    document.modelspace().add_line(start, end, dxfattribs={"layer": "diagonal"})
    wireframe = imported(document, tmp_path, roles={"post": ("post",), "diagonal": ("diag*",)})
    assert_same(wireframe, PRATT)
    assert wireframe.report.with_code("W-409")[0].text == "a bar is drawn as diagonal and as post"


@pytest.mark.parametrize("heel", [0.0, 900.0])
def test_what_runs_on_beyond_the_bearings_is_the_overhang(tmp_path: Path, heel: float) -> None:
    form = FormInput("Howe", 12000.0, 0.25, heel, 6, overhang=600.0)
    truss = build_form(form)
    document = new_drawing()
    space = document.modelspace()
    draw(space, truss)
    for at, tip in ((0.0, -600.0), (12000.0, 12600.0)):
        foot = (at, heel)
        space.add_line(foot, (tip, heel - 600.0 * 0.25534192122103627))  # tan 0.25 rad
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, truss)
    assert wireframe.given.overhang == pytest.approx(600.0, abs=1e-9)
    assert codes(wireframe) == ["W-404", "W-404"]
    space.delete_entity(space[-1])
    one_sided = imported(document, tmp_path)
    assert codes(one_sided) == ["W-404", "W-405"]
    assert one_sided.given.overhang == pytest.approx(600.0)


def purlins(document: Any, points: Sequence[tuple[float, float]]) -> None:
    for x, y in points:
        document.modelspace().add_point((x, y), dxfattribs={"layer": "PURLIN"})


def marked(tmp_path: Path, points: Sequence[tuple[float, float]]) -> Wireframe:
    document = new_drawing()
    draw(document.modelspace(), SLOPE)
    purlins(document, points)
    return imported(document, tmp_path, marks={"purlins": ("purlin*",)})


# a slope of 3 in 4: a rafter of 2500 mm rises 1500
SLOPE = build_form(FormInput("Howe", 8000.0, 0.6435011087932844, panels=4))


def test_purlins_on_all_joints_of_the_top_chord(tmp_path: Path) -> None:
    # 100 mm above the chord, as purlins are drawn
    wireframe = marked(tmp_path, [(x, min(x, 8000 - x) * 0.75 + 100) for x in (0.0, 2000.0, 4000.0, 6000.0, 8000.0)])
    assert wireframe.purlins.rule != "at joints"  # 60 mm along the chord is not on the joint
    on_axis = marked(tmp_path, [(x, min(x, 8000 - x) * 0.75) for x in (0.0, 2000.0, 4000.0, 6000.0, 8000.0)])
    assert on_axis.purlins.rule == "at joints"
    assert [purlin.joint for purlin in on_axis.purlins.purlins] == ["B0", "T1", "T2", "T3", "B4"]


def test_purlins_as_distances_up_the_slope_and_a_ridge_pair(tmp_path: Path) -> None:
    rise = [200.0, 1600.0, 3200.0]  # in plan; along the slope 250, 2000, 4000
    left = [(x, 0.75 * x) for x in (*rise, 3840.0)]
    wireframe = marked(tmp_path, [*left, *((8000 - x, y) for x, y in left)])
    assert wireframe.purlins.rule == (250.0, 2000.0, 4000.0)
    assert wireframe.purlins.ridge_pair == 200.0
    assert len(wireframe.purlins.purlins) == 8
    assert wireframe.purlins.purlins[0].along == pytest.approx(250.0)


def test_purlins_that_no_rule_tells_are_given_and_said(tmp_path: Path) -> None:
    wireframe = marked(tmp_path, [(200, 150), (4000, 3000), (7000, 750)])
    assert wireframe.purlins.rule is None
    assert [round(purlin.along) for purlin in wireframe.purlins.purlins] == [250, 5000, 8750]
    assert "at 250 mm and at 1250 mm" in wireframe.report.with_code("W-408")[0].text
    no_ridge = marked(tmp_path, [(200, 150), (7800, 150)])
    assert "none is marked at the ridge" in no_ridge.report.with_code("W-408")[0].text


def test_marks_that_belong_to_nothing_are_said(tmp_path: Path) -> None:
    wireframe = marked(tmp_path, [(4000, 3000), (4000, 5000)])
    (finding,) = wireframe.report.with_code("W-406")
    assert finding.text == "a mark of purlins is 2000 mm from the top chord"
    assert finding.at == pytest.approx((4000.0, 5000.0, 0.0))


def test_knee_braces_and_ties_from_circles_and_blocks_also_within_blocks(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT)
    symbol = document.blocks.new("KNEE SYMBOL", base_point=(50, 50))
    symbol.add_line((0, 0), (100, 100))
    holder = document.blocks.new("HOLDER")
    holder.add_blockref("KNEE SYMBOL", (2000, -40), dxfattribs={"layer": "KNEE"})
    space.add_blockref("HOLDER", (2000, 0))
    array = {"layer": "KNEE", "column_count": 2, "column_spacing": 2000}
    space.add_blockref("KNEE SYMBOL", (6000, 0), dxfattribs=array)
    space.add_circle((6000, 30), 20, dxfattribs={"layer": "TIES"})
    space.add_circle((0, 0), 20, dxfattribs={"layer": "TIES"})
    space.add_line((0, 0), (1, 1), dxfattribs={"layer": "TIES"})
    wireframe = imported(document, tmp_path, marks={"knee braces": ("knee",), "ties": ("ties",)})
    assert wireframe.knee_braces == ("B2", "B3", "B4")
    assert wireframe.ties == ("B3",)
    # a bearing is no place for a tie, and a line is no mark
    assert sorted(codes(wireframe)) == ["W-103", "W-406"]


def test_too_few_bars_are_said(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    document.modelspace().delete_entity(document.modelspace()[-1])
    (finding,) = imported(document, tmp_path).report.with_code("W-401")
    assert finding.text == "20 bars for 12 joints; a truss on two bearings is just stiff with 21"
