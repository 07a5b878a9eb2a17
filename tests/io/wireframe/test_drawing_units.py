"""Units: the user first, the header second, else the readings and the spans they would give (exchange finding 3)."""

from pathlib import Path

import pytest
from ezdxf.filemanagement import new
from wireframes import HEADER, PRATT, assert_same, codes, draw, imported, lines_of, new_drawing

from spanwright.io.wireframe import RefusedDrawingError
from spanwright.truss.errors import InputError

# exact by definition: the international foot of 1959 and the metric prefixes
FACTORS = {"mm": 1.0, "cm": 10.0, "m": 1000.0, "in": 25.4, "ft": 304.8}


@pytest.mark.parametrize("unit", HEADER)
def test_the_header_s_unit_scales_exactly(tmp_path: Path, unit: str) -> None:
    document = new_drawing(unit)
    draw(document.modelspace(), PRATT, lambda point: (point[0] / FACTORS[unit], point[1] / FACTORS[unit]))
    wireframe = imported(document, tmp_path)
    # the DXF library's own foot is 0.3048000000012 m, which would be 5e-8 mm off at 12 m
    assert_same(wireframe, PRATT, within=0.0 if unit == "mm" else 0.5e-5)
    assert (wireframe.report.facts.unit, wireframe.report.facts.unit_from) == (unit, "the drawing ($INSUNITS)")


def test_the_user_s_unit_goes_before_the_header_s_and_the_contradiction_is_said(tmp_path: Path) -> None:
    document = new_drawing("m")
    draw(document.modelspace(), PRATT)
    wireframe = imported(document, tmp_path, units="mm")
    assert_same(wireframe, PRATT)
    assert codes(wireframe) == ["W-202"]
    assert wireframe.report.with_code("W-202")[0].text == "the drawing says m, the user mm"


def test_a_new_drawing_that_claims_metres_is_refused_with_the_reading_that_would_do(tmp_path: Path) -> None:
    # a new drawing of the library says metres whatever is drawn
    document = new()
    draw(document.modelspace(), PRATT)
    with pytest.raises(RefusedDrawingError, match=r"span is 12000 m") as refused:
        imported(document, tmp_path)
    assert "of the 12000 drawn, mm makes 12 m, cm makes 120 m" in refused.value.remedy
    assert refused.value.key == "units"


@pytest.mark.parametrize("version", ["R12", "R2010"])
def test_without_a_unit_the_readings_and_their_spans_are_listed(tmp_path: Path, version: str) -> None:
    document = new_drawing("", version)
    draw(document.modelspace(), PRATT, lambda point: (point[0] / 1000, point[1] / 1000))
    with pytest.raises(RefusedDrawingError, match="states no unit") as refused:
        imported(document, tmp_path)
    assert refused.value.remedy == "say which it is; of the 12 drawn, m makes 12 m, ft makes 3.658 m"
    assert_same(imported(document, tmp_path, units="m"), PRATT, within=0.5e-5)


def test_a_span_as_small_as_a_hand_is_refused_before_everything_melts_into_one_joint(tmp_path: Path) -> None:
    document = new_drawing("mm")
    draw(document.modelspace(), PRATT, lambda point: (point[0] / 1000, point[1] / 1000))
    with pytest.raises(RefusedDrawingError, match=r"the span is 0\.012 m: no roof truss") as refused:
        imported(document, tmp_path)
    assert "m makes 12 m" in refused.value.remedy


def test_a_span_that_is_possible_but_unusual_is_warned_about(tmp_path: Path) -> None:
    document = new_drawing("m")
    draw(document.modelspace(), PRATT, lambda point: (point[0] / 304.8, point[1] / 304.8))
    wireframe = imported(document, tmp_path, units="ft")
    assert codes(wireframe) == ["W-202"]
    # the same numbers read as metres: 39.4 m is usual, so nobody but the reader of the span can tell
    assert wireframe.report.facts.span == pytest.approx(12000.0)
    long = imported(document, tmp_path)
    assert long.report.facts.span == pytest.approx(39370.08)
    short = new_drawing("mm")
    draw(short.modelspace(), PRATT, lambda point: (point[0] / 3, point[1] / 3))
    assert codes(imported(short, tmp_path)) == ["W-205"]


def test_a_unit_that_is_not_read_is_named(tmp_path: Path) -> None:
    document = new_drawing()
    document.header["$INSUNITS"] = 10  # yards
    draw(document.modelspace(), PRATT)
    with pytest.raises(RefusedDrawingError, match=r"\$INSUNITS = 10"):
        imported(document, tmp_path)


def test_options_that_cannot_be_meant(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    for options, key in (
        ({"units": "furlong"}, "units"),
        ({"tolerance": -1.0}, "tolerance"),
        ({"tolerance": float("nan")}, "tolerance"),
        ({"up": "w"}, "up"),
        ({"bearings": "left"}, "bearings"),
        ({"supports": "none"}, "supports"),
        ({"roles": {"chord": ("A",)}}, "roles"),
        ({"roles": {"post": "P*"}}, "roles.post"),
        ({"marks": {"nails": ("A",)}}, "marks"),
    ):
        with pytest.raises(InputError) as refused:
            imported(document, tmp_path, **options)
        assert refused.value.key == key


def test_the_reading_does_not_depend_on_the_order_of_lines(tmp_path: Path) -> None:
    document = new_drawing()
    for start, end, _ in reversed(lines_of(PRATT)):
        document.modelspace().add_line(end, start)
    assert_same(imported(document, tmp_path), PRATT)


def test_a_header_that_makes_a_toy_of_a_usual_truss_is_refused_unless_the_user_says_the_same(tmp_path: Path) -> None:
    # drawn in cm on a template that says mm: 1.2 m is possible, but 12 m is what is meant (exchange finding 3)
    document = new_drawing("mm")
    draw(document.modelspace(), PRATT, lambda point: (point[0] / 10, point[1] / 10))
    with pytest.raises(RefusedDrawingError, match=r"the span is 1\.2 m: hardly a roof truss") as refused:
        imported(document, tmp_path)
    assert refused.value.remedy == (
        "say which unit it is; of the 1200 drawn, mm makes 1.2 m, cm makes 12 m, in makes 30.48 m"
    )
    assert refused.value.key == "units"
    assert codes(imported(document, tmp_path, units="mm")) == ["W-205"]
    assert imported(document, tmp_path, units="cm").report.facts.span == pytest.approx(12000.0)
    # the truss alone is judged, however wide what is drawn around it
    document.modelspace().add_line((0, -5000), (9000, -5000))
    with pytest.raises(RefusedDrawingError, match="hardly a roof truss"):
        imported(document, tmp_path)
