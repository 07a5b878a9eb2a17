"""Files that are damaged, hostile or no drawing at all (exchange finding 8): a clear refusal, in bounded time."""

import pickle
import random
from collections.abc import Callable
from pathlib import Path

import pytest
from ezdxf.filemanagement import readfile
from wireframes import PRATT, assert_same, codes, draw, draw_segments, imported, new_drawing, save

from spanwright.io.wireframe import Limits, Options, RefusedDrawingError, import_wireframe, report_text
from spanwright.io.wireframe.options import AS_DRAWN
from spanwright.truss.errors import DrawingError


@pytest.fixture
def good(tmp_path: Path) -> Path:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    return save(document, tmp_path)


def refuse(path: Path, match: str, options: Options = AS_DRAWN) -> RefusedDrawingError:
    with pytest.raises(RefusedDrawingError, match=match) as refused:
        import_wireframe(path, options)
    assert refused.value.file == str(path)
    assert "\n" not in refused.value.found
    assert refused.value.report is not None
    return refused.value


def test_a_name_that_leads_nowhere(tmp_path: Path) -> None:
    refuse(tmp_path / "none.dxf", "there is no such file")
    refuse(tmp_path, "this is a folder")
    (tmp_path / "roof.dwg").write_bytes(b"AC1032" + bytes(100))
    assert "save it from the drawing program as DXF" in refuse(tmp_path / "roof.dwg", 'not in ".dxf"').remedy
    refuse(Path("nul\0byte.dxf"), "there is no such file|cannot be read")


@pytest.mark.parametrize("share", [0.001, 0.01, 0.3, 0.7, 0.95, 0.999])
def test_a_file_cut_short_is_refused_and_never_half_read(good: Path, share: float) -> None:
    content = good.read_bytes()
    good.write_bytes(content[: int(share * len(content))])
    refuse(good, "cut short, or is no DXF file")


@pytest.mark.parametrize(
    ("content", "match"),
    [
        (b"", "the file is empty"),
        (random.Random(1).randbytes(4000), "no DXF file"),
        (random.Random(2).randbytes(4000) + b"\n  0\nEOF\n", "no DXF file"),
        (b"hello\nworld\n" * 50 + b"EOF\n", "no DXF file"),
        (b"  0\nSECTION\n  2\nENTITIES\n  0\nENDSEC\n  0\nEOF\n", "no straight line that is read"),
        (b"AutoCAD Binary DXF\r\n\x1a\x00" + bytes(30) + b"EOF\x00", "no DXF file|no straight line"),
    ],
)
def test_what_is_no_drawing(tmp_path: Path, content: bytes, match: str) -> None:
    path = tmp_path / "roof.dxf"
    path.write_bytes(content)
    refuse(path, match)


def test_a_damaged_number_is_recovered_and_that_is_said(good: Path) -> None:
    # a real exporter wrote "1.0E 20" for numbers
    text = good.read_text()
    at = text.index("AcDbLine")
    start = text.index(" 10\n", at) + 4
    good.write_text(text[:start] + "0.0E 0" + text[text.index("\n", start) :])
    wireframe = import_wireframe(good)
    (finding,) = wireframe.report.with_code("W-101")
    assert finding.severity == "warning"
    assert "strict reading stopped" in finding.text
    assert "compare the result with the drawing" in finding.done


@pytest.mark.parametrize("damage", ["", "x"])
def test_an_entity_that_only_its_own_program_knows_is_named(
    good: Path, capfd: pytest.CaptureFixture[str], damage: str
) -> None:
    document = readfile(good)
    last = document.modelspace().add_line((0, 0), (12000, 0))
    document.saveas(good)
    text = good.read_text()
    at = text.rindex("LINE\n", 0, text.index("OBJECTS"))
    good.write_text(text[:at] + "PROXY_TRUSS\n" + text[at + 5 :].replace("12000.0\n", f"12000.0{damage}\n", 1))
    wireframe = import_wireframe(good)
    assert_same(wireframe, PRATT)
    (finding,) = wireframe.report.with_code("W-103")
    assert finding.text == "PROXY_TRUSS: it is no straight line"
    assert finding.handle == last.dxf.handle
    # what the reader mends is told in the report, not on the screen
    assert capfd.readouterr() == ("", "")
    assert codes(wireframe).count("W-101") == len(damage)


def test_bytes_changed_at_random_never_end_in_anything_but_a_refusal(good: Path) -> None:
    content = good.read_bytes()
    chance = random.Random(3)
    for _ in range(12):
        changed = bytearray(content)
        for _ in range(40):
            changed[chance.randrange(len(changed) - 20)] = chance.randrange(256)
        good.write_bytes(bytes(changed))
        try:
            import_wireframe(good)
        except DrawingError:
            continue


@pytest.mark.parametrize(
    ("value", "match"),
    [("nan", "coordinates nan"), ("inf", "coordinates inf"), ("1e300", r"1e\+300"), ("-1e13", "-10000000000000")],
)
@pytest.mark.parametrize("add", ["line", "light", "block", "mark"])
def test_absurd_coordinates_name_the_entity(tmp_path: Path, value: str, match: str, add: str) -> None:
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT)
    number = float(value)
    draw(document.blocks.new("B"), PRATT)
    adders: dict[str, Callable[[], object]] = {
        "line": lambda: space.add_line((number, 0), (0, 0)),
        "light": lambda: space.add_lwpolyline([(number, 0), (0, 0)]),
        "block": lambda: space.add_blockref("B", (number, 0)),
        "mark": lambda: space.add_point((number, 0), dxfattribs={"layer": "P"}),
    }
    adders[add]()
    with pytest.raises(RefusedDrawingError, match=match) as refused:
        imported(document, tmp_path, marks={"purlins": ("P",)})
    assert refused.value.entity
    assert refused.value.at


def test_a_block_scaled_by_nothing_or_by_absurd_numbers(tmp_path: Path) -> None:
    for scale in (0.0, float("nan"), 1e300, float("inf")):
        document = new_drawing()
        draw(document.modelspace(), PRATT)
        draw(document.blocks.new("B"), PRATT)
        scales = {"xscale": scale, "yscale": scale, "zscale": scale}
        document.modelspace().add_blockref("B", (0, 0), dxfattribs=scales)
        if scale == 0.0:
            assert_same(imported(document, tmp_path), PRATT)
        else:
            with pytest.raises(RefusedDrawingError):
                imported(document, tmp_path)


def test_too_much_is_refused(good: Path) -> None:
    refuse(good, "at most 20 are read", Options(limits=Limits(entities=20)))
    refuse(good, "the file has 0 MB; at most 0 MB", Options(limits=Limits(bytes=1000)))


def test_the_sides_of_polylines_in_blocks_are_counted(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    document.blocks.new("ZIGZAG").add_lwpolyline([(k, k % 2) for k in range(1000)])
    array = {"column_count": 3, "column_spacing": 2000}
    document.modelspace().add_blockref("ZIGZAG", (0, 9000), dxfattribs=array)
    with pytest.raises(RefusedDrawingError, match=r"the drawing holds 30\d\d entities"):
        imported(document, tmp_path, limits=Limits(entities=3000))


@pytest.mark.parametrize("pitch", [12.0, 60.0])
def test_a_flood_of_findings_is_refused(tmp_path: Path, pitch: float) -> None:
    # a net of lines that cross, or that end near each other
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    for k in range(40):
        document.modelspace().add_line((k * pitch, 3000), (k * pitch, 6000))
        document.modelspace().add_line((-100, 3100 + k * pitch), (4000, 3100 + k * pitch))
    with pytest.raises(RefusedDrawingError, match="too crowded"):
        imported(document, tmp_path, limits=Limits(findings=70 if pitch == 12.0 else 1000))


def test_a_crowd_of_line_ends_is_counted_before_it_is_paired(tmp_path: Path) -> None:
    chance = random.Random(4)
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    crowd = [((chance.random(), chance.random()), (chance.uniform(3, 9) * 1000, 0.0)) for _ in range(400)]
    draw_segments(document.modelspace(), crowd)
    with pytest.raises(RefusedDrawingError, match=r"the lines are too crowded: .* pairs"):
        imported(document, tmp_path, limits=Limits(pairs=50_000))


def test_names_of_layers_cannot_disturb_the_screen(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    draw_segments(document.modelspace(), [((0, 9000), (900, 9000))], "\x1b[31m")
    text = report_text(imported(document, tmp_path).report)
    assert "\x1b" not in text


def test_the_refusal_keeps_its_fields_through_pickling(tmp_path: Path) -> None:
    document = new_drawing("")
    draw(document.modelspace(), PRATT)
    with pytest.raises(RefusedDrawingError) as refused:
        imported(document, tmp_path)
    again = pickle.loads(pickle.dumps(refused.value))
    assert str(again) == str(refused.value)
    assert again.report == refused.value.report


def test_one_layer_0_block_used_a_thousand_times_is_read_once(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.blocks.new("T"), PRATT, layer="0")
    for _ in range(300):
        document.modelspace().add_blockref("T", (0, 0))
    wireframe = imported(document, tmp_path)
    assert_same(wireframe, PRATT)
    assert codes(wireframe) == ["W-306"] * 299 * 21
