"""The sheet: sizes, scales, viewports, layers, lettering and fields, all read back from the file."""

import itertools
import re

import numpy as np
import pytest
import shapely
from draughted import VARIANTS, arranged, designed, drawing, outline_of, texts
from ezdxf.entities.viewport import Viewport

from spanwright.design.cautions import CAUTIONS
from spanwright.io.drawing.standards import LAYERS
from spanwright.io.drawing.title_block import HEIGHT, MARGIN, REVISIONS_HEIGHT, WIDTH
from spanwright.io.files import input_hash

NAMES = tuple(VARIANTS)
PAPERS = {"A3": (420.0, 297.0), "A2": (594.0, 420.0), "A1": (841.0, 594.0)}  # ISO 216
SCALES = {1, 2, 5, 10, 20, 50, 100, 200}  # ISO 5455
LINE_WIDTHS = {13, 18, 25, 35, 50, 70, 100}  # ISO 128-2, 1/100 mm


def views(name: str) -> list[Viewport]:
    """Return the viewports but for the sheet's own."""
    found = drawing(name).paperspace("Sheet 1").query("VIEWPORT")
    return [view for view in found if isinstance(view, Viewport) and view.dxf.id != 1]


def lettered(name: str) -> list[str]:
    return [text.plain_text() for text in texts(drawing(name).paperspace("Sheet 1"))]


@pytest.mark.parametrize("name", NAMES)
def test_the_sheet_is_a_standard_size_and_says_so(name: str) -> None:
    sheet = drawing(name).paperspace("Sheet 1")
    size = (sheet.dxf.paper_width, sheet.dxf.paper_height)
    paper = next(paper for paper, known in PAPERS.items() if known == size)
    assert f"{paper} ISO 216" in lettered(name)


@pytest.mark.parametrize("name", NAMES)
def test_viewports_are_locked_at_the_standard_scale_that_is_printed(name: str) -> None:
    found = views(name)
    denominators = [round(1.0 / view.get_scale(), 6) for view in found]
    assert len(found) == 2
    assert set(denominators) <= SCALES
    printed = lettered(name)
    for denominator, view in zip(denominators, found, strict=True):
        assert f"1:{denominator:g}" in printed
        assert view.dxf.flags & 0x4000  # zoom locked (DXF reference, VIEWPORT, code 90)
    assert f"1:{denominators[0]:g}, 1:{denominators[1]:g}" in printed
    assert denominators[1] < denominators[0]


@pytest.mark.parametrize("name", NAMES)
def test_all_of_model_space_is_seen_in_one_of_the_viewports(name: str) -> None:
    windows = [shapely.box(*view.get_modelspace_limits()) for view in views(name)]
    for text in texts(drawing(name).modelspace()):
        box = outline_of(text)
        assert any(window.contains(box) for window in windows), text.plain_text()
    for line in drawing(name).modelspace().query("LINE LWPOLYLINE"):
        points = [line.dxf.start, line.dxf.end] if line.dxftype() == "LINE" else line.vertices_in_wcs()  # type: ignore[attr-defined]
        path = shapely.LineString([(point.x, point.y) for point in points])
        assert any(window.contains(path) for window in windows)
    for dimension in drawing(name).modelspace().query("DIMENSION"):
        block = dimension.get_geometry_block()  # type: ignore[attr-defined]
        for one in block.query("LINE"):
            path = shapely.LineString([one.dxf.start.vec2, one.dxf.end.vec2])
            assert any(window.contains(path) for window in windows)


@pytest.mark.parametrize("name", NAMES)
def test_nothing_on_the_sheet_lies_on_anything_else(name: str) -> None:
    sheet = arranged(name)
    spots = [sheet.elevation_spot, sheet.sections_spot, *(spot for _, spot in sheet.blocks)]
    boxes = [shapely.box(spot.left, spot.bottom, spot.right, spot.top) for spot in spots]
    right = sheet.width - MARGIN
    boxes.append(shapely.box(right - WIDTH, MARGIN, right, MARGIN + HEIGHT + REVISIONS_HEIGHT))
    frame = shapely.box(20.0, 10.0, right, sheet.height - 10.0)  # ISO 5457
    assert all(frame.covers(box) for box in boxes)
    assert not any(a.intersects(b) for a, b in itertools.combinations(boxes, 2))


@pytest.mark.parametrize("name", NAMES)
def test_every_text_of_the_sheet_stays_in_its_block(name: str) -> None:
    sheet = arranged(name)
    boxes = [shapely.box(spot.left, spot.bottom, spot.right, spot.top) for _, spot in sheet.blocks]
    for text in texts(drawing(name).paperspace("Sheet 1"), "TABLES"):
        assert any(box.buffer(0.2).contains(outline_of(text)) for box in boxes), text.plain_text()


@pytest.mark.parametrize("name", NAMES)
def test_texts_of_the_sheet_do_not_overlap(name: str) -> None:
    found = texts(drawing(name).paperspace("Sheet 1"))
    boxes = [outline_of(text) for text in found]
    first, second = shapely.STRtree(boxes).query(boxes, predicate="intersects")
    pairs = [(found[a].plain_text(), found[b].plain_text()) for a, b in zip(first, second, strict=True) if a < b]
    assert not pairs


@pytest.mark.parametrize("name", NAMES)
def test_lettering_is_at_least_2_5_mm_high_on_paper(name: str) -> None:
    scale, sections = (1.0 / view.get_scale() for view in views(name))
    doc = drawing(name)
    assert min(text.dxf.height for text in texts(doc.paperspace("Sheet 1"))) >= 2.5
    for text in texts(doc.modelspace()):
        on_paper = scale if text.dxf.insert.y > arranged(name).elevation.low[1] else sections
        assert text.dxf.height / on_paper >= 2.5 - 1e-9
    for style, denominator in (("STEEL-ELEVATION", scale), ("STEEL-SECTIONS", sections)):
        dimension = doc.dimstyles.get(style).dxf
        assert (dimension.dimlfac, dimension.dimscale) == (1.0, pytest.approx(denominator))
        assert dimension.dimtxt >= 2.5


@pytest.mark.parametrize("name", NAMES)
def test_everything_lies_on_a_layer_of_the_trade_with_a_standard_line_width(name: str) -> None:
    doc = drawing(name)
    own = {layer.name for layer in LAYERS}
    used = {one.dxf.layer for space in (doc.modelspace(), doc.paperspace("Sheet 1")) for one in space}
    assert used - {"0"} <= own
    assert not [one for one in doc.modelspace() if one.dxf.layer == "0"]
    for layer in LAYERS:
        assert doc.layers.get(layer.name).dxf.lineweight in LINE_WIDTHS
    assert doc.layers.get("SETTING-OUT").dxf.linetype == "CENTRE"
    assert doc.layers.get("VIEWPORTS").dxf.plot == 0


@pytest.mark.parametrize("name", NAMES)
def test_units_are_millimetres_in_every_place(name: str) -> None:
    header = drawing(name).header
    assert (header["$INSUNITS"], header["$MEASUREMENT"]) == (4, 1)
    assert drawing(name).acad_release in ("R2010", "R2013", "R2018")
    assert "mm" in lettered(name)


@pytest.mark.parametrize("name", NAMES)
def test_the_file_opens_on_the_truss(name: str) -> None:
    active = next(iter(drawing(name).viewports.get("*ACTIVE")))  # type: ignore[call-overload]  # a list: names repeat
    view = active.dxf
    xy = designed(name).setting.truss.xy
    middle = np.array([view.center[0], view.center[1]])
    half = np.array([view.height * view.aspect_ratio, view.height]) / 2.0
    assert np.all(xy >= middle - half)
    assert np.all(xy <= middle + half)
    assert np.ptp(xy[:, 0]) > 0.4 * view.height * view.aspect_ratio
    assert drawing(name).header["$TILEMODE"] == 1


@pytest.mark.parametrize("name", NAMES)
def test_the_caution_and_the_mark_of_the_input_stand_on_the_sheet(name: str) -> None:
    words = " ".join(lettered(name))
    for caution in CAUTIONS:
        assert caution in words
    assert f"input {input_hash(designed(name).setting.project.source)}" in words
    assert "Gussets and connections are not shown" in words
    assert re.search(r"Estimate: no gussets", words)


def test_the_smallest_sheet_that_shows_everything_is_taken() -> None:
    assert (arranged("pratt_store").paper, arranged("pratt_store").elevation.scale) == ("A2", 50)


@pytest.mark.parametrize("name", NAMES)
def test_every_mark_finds_a_place(name: str) -> None:
    bare, _ = arranged(name).elevation.wanting
    assert bare == 0
