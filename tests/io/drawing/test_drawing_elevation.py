"""The elevation against the truss, its pieces and the rules for lettering, all read back from the file."""

import numpy as np
import pytest
import shapely
from draughted import VARIANTS, designed, drawing, outline_of, texts
from ezdxf.entities.dimension import Dimension as DimensionEntity
from ezdxf.entities.dxfentity import DXFEntity

from spanwright.design.cutting import cuts
from spanwright.design.dispatch import assembly
from spanwright.design.pieces import Piece
from spanwright.io.drawing.dimensions import dimensions
from spanwright.io.drawing.steel import outlines

NAMES = tuple(VARIANTS)


def on(name: str, kind: str, layer: str) -> list[DXFEntity]:
    return list(drawing(name).modelspace().query(f'{kind}[layer=="{layer}"]'))


def rings(name: str) -> list[np.ndarray]:
    return [np.array(one.get_points("xy")) for one in on(name, "LWPOLYLINE", "MEMBERS")]  # type: ignore[attr-defined]


def shown(dimension: DimensionEntity) -> str:
    """Return the text that stands in the drawing, from the block that every viewer shows."""
    block = dimension.get_geometry_block()
    assert block is not None
    return "".join(one.plain_text() for one in block.query("MTEXT TEXT"))  # type: ignore[attr-defined]


def cut_pieces(name: str) -> list[Piece]:
    return [piece for piece in designed(name).pieces if piece.description != "packing plate"]


@pytest.mark.parametrize("name", NAMES)
def test_setting_out_lines_read_back_are_the_members(name: str) -> None:
    truss = designed(name).setting.truss
    axes = [line for line in on(name, "LINE", "SETTING-OUT") if line.dxf.start.y >= truss.xy[:, 1].min() - 1e-6]
    lengths = sorted((line.dxf.end - line.dxf.start).magnitude for line in axes)
    overhangs = [length for length in truss.top.overhang if length > 0.0]
    assert np.allclose(lengths, sorted([*truss.lengths, *overhangs]), atol=1e-6)


@pytest.mark.parametrize("name", NAMES)
def test_outlines_read_back_are_as_long_as_the_pieces_are_cut(name: str) -> None:
    """A pair back to back shows one of its two angles; webs are rounded down to 1 mm, chords to the nearest."""
    drawn = list(zip(outlines(designed(name)), rings(name), strict=True))
    assert drawn
    for outline, ring in drawn:
        length = float(np.ptp(ring @ outline.along))
        pieces = [piece for piece in cut_pieces(name) if outline.bars[0] in piece.bars]
        assert pieces
        for piece in pieces:
            chord = "chord" in piece.description
            assert piece.cut_length == pytest.approx(round(length) if chord else np.floor(length + 1e-3))


@pytest.mark.parametrize("name", NAMES)
def test_outlines_are_as_wide_as_the_legs(name: str) -> None:
    sizes = {bar: choice for choice in designed(name).choices for bar in choice.group.bars.tolist()}
    truss = designed(name).setting.truss
    for outline, ring in zip(outlines(designed(name)), rings(name), strict=True):
        section = sizes[truss.bar(outline.bars[0])].section
        across = np.array([-outline.along[1], outline.along[0]])
        assert np.ptp(ring @ across) == pytest.approx(float(section.leg_connected[0]), abs=1e-6)


@pytest.mark.parametrize("name", [name for name in NAMES if not name.endswith("tubes")])
def test_webs_are_drawn_clear_of_the_chords(name: str) -> None:
    """Tubes reach to the chord's face: see the test of their ends."""
    design = designed(name)
    runs = [cut for cut in cuts(design.setting, design.choices) if "chord" in cut.choice.group.role]
    chords = shapely.union_all([shapely.Polygon(cut.outline) for cut in runs])
    for outline, ring in zip(outlines(design), rings(name), strict=True):
        if not outline.bars[0].startswith(("TC", "BC")):
            assert shapely.Polygon(ring).intersection(chords).area < 1e-6


@pytest.mark.parametrize("name", NAMES)
def test_dimensions_show_what_they_measure_in_whole_millimetres(name: str) -> None:
    found = on(name, "DIMENSION", "DIMENSIONS")
    style = {one.dxf.dimstyle for one in found}
    assert style == {"STEEL-ELEVATION", "STEEL-SECTIONS"}
    for one in found:
        decimals = 0 if one.dxf.dimstyle == "STEEL-ELEVATION" else 1
        text = shown(one).lstrip("Ø")  # type: ignore[arg-type]
        assert float(text) == round(one.get_measurement(), decimals), (name, text)  # type: ignore[attr-defined]


@pytest.mark.parametrize("name", NAMES)
def test_every_rafter_panel_is_dimensioned_with_its_members_length(name: str) -> None:
    truss = designed(name).setting.truss
    printed = [shown(one) for one in on(name, "DIMENSION", "DIMENSIONS") if one.dxf.dimstyle == "STEEL-ELEVATION"]  # type: ignore[arg-type]
    for bar in (*truss.top.bars, *truss.bottom.bars):
        assert f"{truss.lengths[bar]:.0f}" in printed


@pytest.mark.parametrize("name", NAMES)
def test_span_rise_heel_and_overall_sizes_are_dimensioned(name: str) -> None:
    design = designed(name)
    truss = design.setting.truss
    printed = [shown(one) for one in on(name, "DIMENSION", "DIMENSIONS")]  # type: ignore[arg-type]
    whole = assembly(design.setting, design.choices, design.pieces)
    top = truss.xy[list(truss.top.joints), 1]
    heel = top[0] - truss.xy[truss.bearing_joints[0], 1]
    for length in (truss.span, top.max() - top[0], whole.length, whole.height, *([heel] if heel else [])):
        assert f"{length:.0f}" in printed
    if truss.top.overhang[0]:
        assert printed.count("600") == 2


@pytest.mark.parametrize("name", NAMES)
def test_dimensions_of_the_elevation_do_not_cross_the_steel(name: str) -> None:
    steel = shapely.union_all([shapely.Polygon(ring) for ring in rings(name)])
    outer = np.vstack(rings(name))
    for one in dimensions(designed(name).setting.truss, outer, 50.0):
        along = np.array([np.cos(np.radians(one.angle)), np.sin(np.radians(one.angle))])
        feet = [one.line + along * ((point - one.line) @ along) for point in (one.start, one.end)]
        assert not shapely.LineString(feet).intersects(steel), one.what


@pytest.mark.parametrize("name", NAMES)
def test_no_text_lies_on_another_or_on_steel(name: str) -> None:
    space = drawing(name).modelspace()
    found = texts(space, "MARKS", "JOINTS", "PURLINS")
    boxes = [outline_of(text) for text in found]
    tree = shapely.STRtree(boxes)
    first, second = tree.query(boxes, predicate="intersects")
    clashes = {(found[a].plain_text(), found[b].plain_text()) for a, b in zip(first, second, strict=True) if a < b}
    assert not clashes
    steel = shapely.union_all([shapely.Polygon(ring) for ring in rings(name)])
    assert not [text.plain_text() for text, box in zip(found, boxes, strict=True) if box.intersects(steel)]


@pytest.mark.parametrize("name", NAMES)
def test_every_member_carries_mark_and_section(name: str) -> None:
    lettered = " ".join(text.plain_text() for text in texts(drawing(name).modelspace(), "MARKS"))
    for piece in cut_pieces(name):
        assert piece.mark in lettered
    for choice in designed(name).choices:
        assert choice.name.split(",")[0] in lettered
    runs = len(cuts(designed(name).setting, designed(name).choices))
    sections = sum(lettered.count(name) for name in {choice.name.split(",")[0] for choice in designed(name).choices})
    assert sections >= runs


@pytest.mark.parametrize("name", NAMES)
def test_every_joint_and_purlin_line_is_named(name: str) -> None:
    space, setting = drawing(name).modelspace(), designed(name).setting
    assert {text.plain_text() for text in texts(space, "JOINTS")} == set(setting.truss.joint_names)
    assert [text.plain_text() for text in texts(space, "PURLINS")] == [
        str(line.number) for line in setting.restraint.lines
    ]


def test_signs_are_filled_where_they_count() -> None:
    restraint = designed("loose").setting.restraint
    filled, outlined = on("loose", "HATCH", "PURLINS"), on("loose", "LWPOLYLINE", "PURLINS")
    assert len(outlined) == len(restraint.lines)
    assert len(filled) == sum(line.anchored for line in restraint.lines) < len(outlined)
    assert len(on("loose", "LINE", "KNEE-BRACES")) == len(restraint.braces)
    assert len(on("fink_barn", "HATCH", "BOTTOM-TIES")) == 2


def test_a_profiled_end_reaches_as_far_as_the_tip_that_the_cut_length_counts() -> None:
    design = designed("round_tubes")
    profiled = [cut for cut in cuts(design.setting, design.choices) if cut.ends[1].kind == "profile"]
    assert profiled
    drawn = {outline.bars: outline for outline in outlines(design)}
    for cut in profiled:
        outline = drawn[tuple(design.setting.truss.bar_names[bar] for bar in cut.bars)]
        tip = float((outline.ring @ cut.direction).max() - cut.finish @ cut.direction)
        assert tip == pytest.approx(cut.ends[1].beyond, abs=0.15)  # a curve of 17 points
