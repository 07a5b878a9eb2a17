"""Blocks: mirrored, turned, nested, in arrays, and the special layer 0 (exchange findings 1 and 5)."""

from pathlib import Path
from typing import Any

import numpy as np
import pytest
from ezdxf.math import Matrix44
from wireframes import HIGH_HEEL, PRATT, assert_same, codes, draw, imported, lines_of, new_drawing

from spanwright.io.wireframe import Limits, RefusedDrawingError
from spanwright.io.wireframe.flatten import flatten
from spanwright.io.wireframe.options import AS_DRAWN
from spanwright.truss.model import Truss

MIDDLE = PRATT.span / 2


def half_block(document: Any, truss: Truss = PRATT, flip: float = 1.0) -> Any:
    """Make a block of the left half of a truss, as polylines, its y times `flip`."""
    block = document.blocks.new("HALF")
    for start, end, _ in lines_of(truss):
        if max(start[0], end[0]) <= truss.span / 2 + 1e-6:
            block.add_lwpolyline([(start[0], flip * start[1]), (end[0], flip * end[1])])
    return block


@pytest.mark.parametrize("kind", ["line", "light polyline", "polyline"])
def test_a_half_truss_and_its_mirror_image_are_the_whole(tmp_path: Path, kind: str) -> None:
    document = new_drawing()
    block = document.blocks.new("HALF")
    for start, end, _ in lines_of(HIGH_HEEL):
        if max(start[0], end[0]) <= HIGH_HEEL.span / 2 + 1e-6:
            add = {"line": block.add_line, "light polyline": block.add_lwpolyline, "polyline": block.add_polyline2d}
            points = (start, end)
            add[kind](*points) if kind == "line" else add[kind]([tuple(point) for point in points])  # type: ignore[operator]  # by table
    space = document.modelspace()
    space.add_blockref("HALF", (0, 0))
    space.add_blockref("HALF", (HIGH_HEEL.span, 0), dxfattribs={"xscale": -1})
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, HIGH_HEEL, within=1e-9)
    # the ridge post lies on the mirror line and is drawn by both
    assert codes(wireframe) == ["W-306"]


@pytest.mark.parametrize(
    ("attributes", "flip"),
    [
        ({"xscale": -1, "yscale": -1}, -1.0),
        ({"rotation": 180}, -1.0),
        ({"xscale": -1}, 1.0),
        ({"yscale": -1, "rotation": 180}, 1.0),
        # looked at from behind: the block's axes are mirrored, its stored x is minus world x
        ({"extrusion": (0, 0, -1)}, 1.0),
    ],
)
def test_however_the_right_half_is_turned_it_lands_on_its_side(
    tmp_path: Path, attributes: dict[str, Any], flip: float
) -> None:
    document = new_drawing()
    half_block(document, flip=flip)
    space = document.modelspace()
    space.add_blockref("HALF", (0, 0), dxfattribs={"yscale": flip})
    at = -PRATT.span if "extrusion" in attributes else PRATT.span
    space.add_blockref("HALF", (at, 0), dxfattribs=attributes)
    assert_same(imported(document, tmp_path), PRATT, within=1e-9)


def test_a_block_mirrored_and_turned_stands_where_its_own_matrix_puts_each_point() -> None:
    # second opinion: each point is moved by the insert's own matrix from the library, one entity at a time
    document = new_drawing()
    block = half_block(document)
    insert = document.modelspace().add_blockref(
        "HALF", (700, -300, 20), dxfattribs={"xscale": -2, "yscale": 2, "rotation": 30, "extrusion": (0, -1, 0)}
    )
    block.block.dxf.base_point = (100, 50, 0)
    matrix: Matrix44 = insert.matrix44()
    expected = [[tuple(matrix.transform(point)) for point in line.vertices_in_wcs()] for line in block]
    np.testing.assert_allclose(flatten(document, AS_DRAWN).lines, np.array(expected), atol=1e-9)


def test_blocks_in_blocks_and_the_path_in_the_report(tmp_path: Path) -> None:
    document = new_drawing()
    half = half_block(document)
    half.add_circle((0, 0), 5)
    whole = document.blocks.new("WHOLE")
    whole.add_blockref("HALF", (0, 0))
    whole.add_blockref("HALF", (PRATT.span, 0), dxfattribs={"xscale": -1})
    document.modelspace().add_blockref("WHOLE", (5000, 1000), dxfattribs={"layer": "TRUSS"})
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, PRATT, within=1e-8)
    circle, _ = wireframe.report.with_code("W-103")
    assert circle.blocks == ("WHOLE", "HALF")
    assert circle.layer == "TRUSS"
    assert circle.at == (5000.0, 1000.0, 0.0)


def test_an_array_of_one_panel_is_a_parallel_chord_truss(tmp_path: Path) -> None:
    document = new_drawing()
    panel = document.blocks.new("PANEL")
    for start, end in (((0, 0), (1500, 0)), ((0, 1200), (1500, 1200)), ((0, 0), (0, 1200)), ((0, 1200), (1500, 0))):
        panel.add_line(start, end)
    space = document.modelspace()
    array = {"column_count": 8, "column_spacing": 1500, "row_count": 3, "row_spacing": 0}
    space.add_blockref("PANEL", (0, 0), dxfattribs=array)
    space.add_line((12000, 0), (12000, 1200))
    given = imported(document, tmp_path).given
    assert [name for name, *_ in given.joints] == [f"B{k}" for k in range(9)] + [f"T{k}" for k in range(9)]
    assert [role for *_, role in given.bars].count("diagonal") == 8
    assert given.bar_names[-8:] == tuple(f"D{k}" for k in range(1, 9))


@pytest.mark.parametrize("way", ["row", "column"])
def test_an_array_turned_with_its_block_steps_along_the_turned_axes(tmp_path: Path, way: str) -> None:
    # in the block the panels go up (rows) or to the left (columns, of a negative spacing); turned they go right
    def in_block(x: float, y: float) -> tuple[float, float]:
        return (-y, x) if way == "row" else (-x, -y)

    document = new_drawing()
    panel = document.blocks.new("PANEL")
    for (x, y), end in (((0, 0), (1500, 0)), ((0, 1200), (1500, 1200)), ((0, 0), (0, 1200)), ((0, 1200), (1500, 0))):
        panel.add_line(in_block(x, y), in_block(*end))
    space = document.modelspace()
    turn, spacing = (-90, 1500) if way == "row" else (180, -1500)
    array = {"rotation": turn, f"{way}_count": 8, f"{way}_spacing": spacing}
    space.add_blockref("PANEL", (0, 0), dxfattribs=array)
    space.add_line((12000, 0), (12000, 1200))
    assert len(imported(document, tmp_path).given.joints) == 18


def test_layer_0_in_a_block_takes_the_layer_of_the_nearest_named_insert(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    for role in ("top chord", "bottom chord"):
        inner = document.blocks.new(f"INNER {role}")
        for start, end, of in lines_of(PRATT):
            if of == role:
                inner.add_line(start, end)
        outer = document.blocks.new(f"OUTER {role}")
        outer.add_blockref(inner.name, (0, 0))
        space.add_blockref(outer.name, (0, 0), dxfattribs={"layer": role.upper()})
    for start, end, role in lines_of(PRATT):
        if role not in ("top chord", "bottom chord"):
            space.add_line(start, end, dxfattribs={"layer": "WEB"})
    roles = {"top chord": ("top*",), "bottom chord": ("bottom*",)}
    wireframe = imported(document, tmp_path, roles=roles)
    assert_same(wireframe, PRATT)
    assert {row.layer for row in wireframe.report.tally if row.kind == "LINE"} == {"TOP CHORD", "BOTTOM CHORD", "WEB"}


def test_a_frozen_layer_hides_a_block_and_a_layer_that_is_off_only_what_is_on_it(tmp_path: Path) -> None:
    document = new_drawing()
    document.layers.add("HOLDER")
    block = document.blocks.new("TRUSS")
    draw(block, PRATT, layer="STEEL")
    document.modelspace().add_blockref("TRUSS", (0, 0), dxfattribs={"layer": "HOLDER"})
    document.layers.get("HOLDER").off()
    assert_same(imported(document, tmp_path), PRATT)
    document.layers.get("HOLDER").freeze()
    with pytest.raises(RefusedDrawingError, match="no straight line that is read"):
        imported(document, tmp_path)


def test_layer_0_may_be_frozen_where_the_insert_s_layer_is_not(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.blocks.new("TRUSS"), PRATT, layer="0")
    document.modelspace().add_blockref("TRUSS", (0, 0), dxfattribs={"layer": "STEEL"})
    document.layers.get("0").freeze()
    assert_same(imported(document, tmp_path), PRATT)


def test_a_block_that_is_missing_or_another_drawing_is_named(tmp_path: Path) -> None:
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT)
    space.add_blockref("NOWHERE", (0, 0))
    document.add_xref_def("other.dxf", "OTHER")
    space.add_blockref("OTHER", (0, 0))
    found = imported(document, tmp_path).report.with_code("W-107")
    assert ["NOWHERE" in found[0].text, "external reference" in found[1].text] == [True, True]


def test_a_block_that_contains_itself_is_refused_by_name(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    document.blocks.new("A").add_blockref("B", (0, 0))
    document.blocks.new("B").add_blockref("a", (1, 0))
    document.modelspace().add_blockref("A", (0, 0))
    with pytest.raises(RefusedDrawingError, match='contains itself: "a" in "b" in "a"'):
        imported(document, tmp_path)


def test_blocks_too_deep_are_refused(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.blocks.new("D0"), PRATT)
    for depth in range(1, 6):
        document.blocks.new(f"D{depth}").add_blockref(f"D{depth - 1}", (0, 0))
    document.modelspace().add_blockref("D5", (0, 0))
    assert_same(imported(document, tmp_path, limits=Limits(depth=6)), PRATT)
    with pytest.raises(RefusedDrawingError, match="more than 5 deep"):
        imported(document, tmp_path, limits=Limits(depth=5))


def test_arrays_of_arrays_are_counted_before_they_are_taken_apart(tmp_path: Path) -> None:
    document = new_drawing()
    document.blocks.new("D0")
    for depth in range(1, 8):
        array = {"row_count": 30000, "row_spacing": 1, "column_count": 30000, "column_spacing": 1}
        document.blocks.new(f"D{depth}").add_blockref(f"D{depth - 1}", (0, 0), dxfattribs=array)
    document.modelspace().add_blockref("D7", (0, 0))
    with pytest.raises(RefusedDrawingError, match=r"entities with those in blocks; at most 500000"):
        imported(document, tmp_path)
