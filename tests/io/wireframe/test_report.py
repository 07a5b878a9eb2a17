"""What the import says: codes, text, record, the marked copy and the project file."""

import json
import re
import tomllib
from collections.abc import Callable, Sequence
from importlib.resources import files
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from ezdxf.document import Drawing
from ezdxf.filemanagement import readfile
from wireframes import HIGH_HEEL, PRATT, bars_by_name, draw, draw_segments, imported, new_drawing, save

from spanwright.io.project_file import parse_project
from spanwright.io.wireframe import (
    RefusedDrawingError,
    import_wireframe,
    project_text,
    report_record,
    report_text,
    write_marked_copy,
)
from spanwright.io.wireframe.codes import CODES
from spanwright.io.wireframe.marked_copy import layer_name
from spanwright.truss.errors import InputError, OutputError
from spanwright.truss.given import build_given
from spanwright.truss.inputs import GivenInput


def sloppy(place: Callable[[Sequence[float]], Sequence[float]] = lambda point: point) -> Drawing:
    """Return a drawing with one of most mistakes."""
    document = new_drawing()
    space = document.modelspace()
    draw(space, PRATT, place)
    draw_segments(space, [(place((20000, 500)), place((21000, 500))), (place((0, 0)), place((0, -3000)))], "GRID")
    draw_segments(space, [(place((2000, 0)), place((8000, 0)))], "COPY")
    space.add_circle(place((3000, 3000)), 10, dxfattribs={"layer": "BUBBLE"})
    return document


def test_every_code_in_the_program_is_in_the_table_and_the_other_way_round() -> None:
    sources = [path.read_text() for path in files("spanwright.io.wireframe").iterdir() if path.name.endswith(".py")]
    used = {code for source in sources if "CODES: dict" not in source for code in re.findall(r'"(W-\d\d\d)"', source)}
    assert used == set(CODES)


def test_the_text_has_every_code_the_places_and_the_closing_table(tmp_path: Path) -> None:
    report = imported(sloppy(), tmp_path).report
    text = report_text(report)
    assert "  span 12 m, depth 1.532 m, 12 joints, 21 bars\n" in text
    for finding in report.findings:
        assert f"{finding.code} {finding.severity}: {finding.meaning}" in text
    assert re.search(
        r'a bar ends in the air; left out \[at 0, -3000 \(drawing units, mm\), layer "GRID", entity \w+\]', text
    )
    assert text.index("warning") < text.index(" note:")
    assert "read 25 entities: 24 converted, 0 ignored by rule, 1 not understood" in text
    assert re.search(r'1 CIRCLE +layer "BUBBLE": not understood, it is no straight line \(\w+\)', text)


def test_the_text_of_many_findings_is_short_and_the_record_whole(tmp_path: Path) -> None:
    document = sloppy()
    for k in range(40):
        document.modelspace().add_circle((k, 0), 1)
    report = imported(document, tmp_path).report
    assert "    and 29 more\n" in report_text(report)
    record = report_record(report)
    assert json.loads(json.dumps(record)) == record
    assert len(record["findings"]) == len(report.findings)
    assert record["span_mm"] == 12000.0
    assert record["read"] == sum(row["count"] for row in record["entities"])


def marks_of(path: Path) -> list[Any]:
    document = readfile(path)
    assert not document.audit().errors
    return [entity for entity in document.modelspace() if entity.dxf.layer.startswith("SPANWRIGHT")]


@pytest.mark.parametrize(
    "place", [lambda p: (p[0], p[1], 0), lambda p: (p[0], 40, p[1]), lambda p: (0.6 * p[0], 0.8 * p[0], p[1] + 4e6)]
)
def test_the_marked_copy_circles_every_finding_at_its_place(tmp_path: Path, place: Any) -> None:
    path = save(sloppy(place), tmp_path)
    report = import_wireframe(path).report
    copy = tmp_path / "marked.dxf"
    placed = [finding for finding in report.findings if finding.at]
    assert write_marked_copy(path, report, copy) == len(placed) >= 5
    marks = marks_of(copy)
    circles = [mark for mark in marks if mark.dxftype() == "CIRCLE"]
    assert [circle.dxf.layer for circle in circles] == [layer_name(finding.code) for finding in placed]
    centres = [circle.ocs().to_wcs(circle.dxf.center).xyz for circle in circles]
    np.testing.assert_allclose(centres, [finding.at for finding in placed], atol=1e-6)
    # seen square on, the number beside it, level in the drawing
    normal = np.array(circles[0].dxf.extrusion)
    assert abs(normal @ np.subtract(place((1, 0)), place((0, 0)))) < 1e-9
    texts = [mark for mark in marks if mark.dxftype() == "TEXT"]
    assert all(text.dxf.layer.removeprefix("SPANWRIGHT ") in text.dxf.text for text in texts)
    right, up = (np.subtract(place(axis), place((0, 0))) for axis in ((1, 0), (0, 1)))
    where = [np.array(text.ocs().to_wcs(text.dxf.insert).xyz) for text in texts]
    assert where[0] - np.array(placed[0].at) == pytest.approx(120.0 * (1.2 * right + 0.2 * up), abs=1e-6)
    # every finding is told in the list to the right of all marks, warnings first; those with a place by number
    listed = texts[len(placed) :]
    assert len(listed) == len(report.findings)
    assert min(point @ right for point in where[len(placed) :]) > max(
        np.array(finding.at) @ right for finding in placed
    )
    told = [text.dxf.text for text in listed]
    assert sum(": W-" in line for line in told) == len(placed)
    warned = [CODES[text.dxf.layer.removeprefix("SPANWRIGHT ")].severity == "warning" for text in listed]
    assert warned == sorted(warned, reverse=True)
    assert warned[0]
    original = len(readfile(path).modelspace())
    assert len(readfile(copy).modelspace()) == original + len(marks)


def test_the_marked_copy_has_the_same_bytes_every_time_and_never_replaces_the_drawing(tmp_path: Path) -> None:
    path = save(sloppy(), tmp_path)
    report = import_wireframe(path).report
    copies = [tmp_path / name for name in ("a.dxf", "b.dxf")]
    for copy in copies:
        write_marked_copy(path, report, copy)
    assert copies[0].read_bytes() == copies[1].read_bytes()
    with pytest.raises(OutputError, match="would replace the drawing"):
        write_marked_copy(path, report, path)
    with pytest.raises(OutputError, match="cannot be written"):
        write_marked_copy(path, report, tmp_path / "no folder" / "a.dxf")


def test_a_refused_drawing_can_be_marked_up_too(tmp_path: Path) -> None:
    document = sloppy()
    draw(document.modelspace(), PRATT, lambda point: (point[0], point[1] + 9000))
    path = save(document, tmp_path)
    with pytest.raises(RefusedDrawingError) as refused:
        import_wireframe(path)
    assert refused.value.report is not None
    assert write_marked_copy(path, refused.value.report, tmp_path / "marked.dxf") > 0


def completed(text: str) -> str:
    """Take the # away from every key that is required."""
    return re.sub(r"(?m)^# (?=\w+ = .*REQUIRED)", "", text)


@pytest.mark.parametrize("truss", [PRATT, HIGH_HEEL])
def test_the_project_file_is_complete_but_for_what_only_the_user_knows(tmp_path: Path, truss: Any) -> None:
    document = new_drawing()
    draw(document.modelspace(), truss)
    for joint in truss.top.joints:
        document.modelspace().add_point(truss.xy[joint], dxfattribs={"layer": "PURLIN"})
    document.modelspace().add_point((truss.span / 2, 0), dxfattribs={"layer": "TIE"})
    wireframe = imported(document, tmp_path, marks={"purlins": ("PURLIN",), "ties": ("TIE",)})
    text = project_text(wireframe, 'roof "north".dxf')
    tomllib.loads(text)
    with pytest.raises(InputError, match=r"missing|REQUIRED|required"):
        parse_project(text)
    project = parse_project(completed(text))
    assert isinstance(project.truss, GivenInput)
    assert project.title == 'roof "north".dxf'
    assert project.truss == wireframe.given
    again = build_given(project.truss)
    assert (again.xy == truss.xy).all()
    assert bars_by_name(again) == bars_by_name(truss)
    assert project.restraint.purlins == "at joints"
    middle = truss.joint_names[truss.bottom.joints[len(truss.bottom.joints) // 2]]
    assert project.restraint.bottom_ties == (middle,)


def test_a_project_file_without_marks_leaves_the_purlins_to_choose(tmp_path: Path) -> None:
    text = project_text(imported(sloppy(), tmp_path), "roof\n.dxf")
    assert '# purlins = "at joints"' in text
    assert tomllib.loads(text)["restraint"] == {"knee_braces": "none", "bottom_ties": "none"}
    assert text.splitlines()[0].startswith("# Read from roof?.dxf: span 12 m, 12 joints, 21 bars; 3 warnings")
