"""Layers and what is left out by rule (exchange findings 4, 6 and 8): what is seen is read, and the rest is said."""

from pathlib import Path
from typing import Any

import pytest
from wireframes import PRATT, assert_same, codes, draw, draw_segments, imported, lines_of, new_drawing

from spanwright.io.wireframe import RefusedDrawingError, Wireframe

STRAY = (((0, 500), (12000, 500)),)


def reasons(wireframe: Wireframe) -> dict[str, str]:
    return {row.layer: row.reason for row in wireframe.report.tally if row.outcome == "ignored by rule"}


def with_stray(layer: str) -> Any:
    document = new_drawing()
    draw(document.modelspace(), PRATT, layer="STEEL")
    document.layers.add(layer)
    draw_segments(document.modelspace(), STRAY, layer)
    return document


def test_layers_that_are_off_frozen_or_not_plotted_are_not_read_and_that_is_said(tmp_path: Path) -> None:
    document = with_stray("OFF")
    for layer in ("ICE", "INK"):
        document.layers.add(layer)
        draw_segments(document.modelspace(), STRAY, layer)
    draw_segments(document.modelspace(), STRAY, "DefPoints")
    document.layers.get("OFF").off()
    document.layers.get("ICE").freeze()
    document.layers.get("INK").dxf.plot = 0
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, PRATT)
    expected = {"OFF": "off", "ICE": "frozen", "INK": "not plotted", "DefPoints": "not plotted"}
    assert reasons(wireframe) == {layer: f"layer is {state}" for layer, state in expected.items()}
    assert codes(wireframe) == ["W-102"] * 4
    assert {finding.done for finding in wireframe.report.with_code("W-102")} == {"entities not read: 1"}


def test_the_state_of_a_layer_holds_in_any_case_of_its_name(tmp_path: Path) -> None:
    document = with_stray("Notes")
    document.layers.get("Notes").off()
    draw_segments(document.modelspace(), STRAY, "NOTES")
    assert_same(imported(document, tmp_path), PRATT)


def test_the_user_names_layers_by_patterns_in_any_case(tmp_path: Path) -> None:
    assert_same(imported(with_stray("GRID"), tmp_path, layers=("st*",)), PRATT)
    wireframe = imported(with_stray("GRID"), tmp_path, ignore=("gr?d",))
    assert_same(wireframe, PRATT)
    assert reasons(wireframe) == {"GRID": "layer is ignored on request"}


def test_a_pattern_that_matches_nothing_is_said(tmp_path: Path) -> None:
    wireframe = imported(with_stray("GRID"), tmp_path, layers=("steel", "tekton*"), marks={"ties": ("TIE",)})
    texts = [finding.text for finding in wireframe.report.with_code("W-108")]
    assert texts == [
        'layers: "tekton*" matches no layer that holds anything',
        'marks.ties: "TIE" matches no layer that holds anything',
    ]


def test_text_dimensions_hatches_and_paper_space_are_counted_not_read(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT)
    space.add_text("TRUSS T1")
    space.add_mtext("all joints welded")
    space.add_linear_dim(base=(0, -500), p1=(0, 0), p2=(12000, 0)).render()
    space.add_hatch().paths.add_polyline_path([(0, 0), (12000, 0), (6000, -900)])
    draw_segments(document.paperspace(), STRAY)
    space.add_line((0, 900), (12000, 900), dxfattribs={"invisible": 1})
    block = document.blocks.new("LABEL")
    block.add_attdef("NO", (0, 0))
    space.add_blockref("LABEL", (0, 0)).add_attrib("NO", "T1", (0, 0))
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, PRATT)
    ignored = {(row.kind, row.reason) for row in wireframe.report.tally if row.outcome == "ignored by rule"}
    assert ignored == {
        ("TEXT", "text"),
        ("MTEXT", "text"),
        ("ATTDEF", "text"),
        ("ATTRIB", "text"),
        ("DIMENSION", "dimension"),
        ("HATCH", "hatch"),
        ("LINE", "invisible"),
        ("LINE", "paper space"),
    }


def test_curves_and_all_else_are_named_with_handle_and_place(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT)
    entities = [
        space.add_arc((6000, 0), 6000, 0, 180),
        space.add_circle((1, 2, 3), 50),
        space.add_ellipse((0, 0), (600, 0), 0.5),
        space.add_spline([(0, 0), (3000, 900), (6000, 1500)]),
        space.add_point((4, 5, 6)),
        space.add_solid([(7, 8), (9, 8), (8, 9)]),
        space.add_3dface([(0, 0), (1, 0), (1, 1), (0, 1)]),
        space.add_polymesh((3, 3)),
        space.add_ray((0, 0), (1, 1)),
    ]
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, PRATT)
    found = wireframe.report.with_code("W-103")
    assert [finding.handle for finding in found] == [entity.dxf.handle for entity in entities]
    assert [finding.at for finding in found][1] == (1.0, 2.0, 3.0)
    assert [finding.at for finding in found][4] == (4.0, 5.0, 6.0)
    assert found[0].at == (12000.0, 0.0, 0.0)
    assert found[0].text == "ARC: it is no straight line"
    assert wireframe.report.count("not understood") == len(entities)


def test_arcs_within_a_polyline_are_not_straightened(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT)
    light = space.add_lwpolyline([(0, 0, 0.0), (2000, 0, 0.5), (4000, 0, 0.0), (6000, 0, 0.0)], format="xyb")
    old = space.add_polyline2d([(8000, 0), (10000, 0)], close=True)
    old.vertices[1].dxf.bulge = 1.0
    found = imported(document, tmp_path).report.with_code("W-104")
    assert [finding.handle for finding in found] == [light.dxf.handle, old.dxf.handle]
    assert found[0].at == (3000.0, 0.0, 0.0)
    fitted = space.add_polyline2d([(0, 0), (6000, 1500), (12000, 0)])
    fitted.dxf.flags |= 4  # spline-fit vertices, DXF reference
    assert "fitted curve" in imported(document, tmp_path).report.with_code("W-103")[0].text


def test_every_entity_goes_one_way(tmp_path: Path) -> None:
    document = with_stray("OFF")
    document.layers.get("OFF").off()
    document.modelspace().add_circle((0, 0), 5)
    report = imported(document, tmp_path).report
    assert report.read == len(document.modelspace())
    assert [report.count(way) for way in ("converted", "ignored by rule", "not understood")] == [
        len(lines_of(PRATT)),
        1,
        1,
    ]
    assert {handle for row in report.tally for handle in row.handles} == {
        entity.dxf.handle for entity in document.modelspace()
    }


def test_a_drawing_with_nothing_to_read_says_what_it_holds(tmp_path: Path) -> None:
    document = new_drawing()
    document.modelspace().add_text("see sheet 2")
    with pytest.raises(RefusedDrawingError, match=r"no straight line that is read .0 converted, 1 ignored") as refused:
        imported(document, tmp_path)
    assert refused.value.report is not None
    assert refused.value.report.tally[0].kind == "TEXT"
