"""A project file that takes its truss from a drawing: the same results as from a form, the restraint that is marked,
what is recorded, and what is refused."""

from __future__ import annotations

import hashlib
import json
import math
import tomllib
from collections import Counter
from collections.abc import Sequence
from importlib.resources import files
from pathlib import Path
from typing import Any

import jsonschema
import numpy as np
import pytest
from demos import FOLDER, demo
from ezdxf.document import Drawing
from ezdxf.filemanagement import readfile
from scissor import HALF, INNER_PITCH, OVERHANG, PANEL, PANELS, PITCH, TIES, scissor_drawing
from wireframes import draw, new_drawing, save

from spanwright.design.project import Project
from spanwright.design.run import build_truss, design
from spanwright.io import outputs
from spanwright.io.command_line import main
from spanwright.io.files import input_hash
from spanwright.io.outputs import write_all
from spanwright.io.project_file import parse_project, read_project
from spanwright.io.results.document import document
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import DrawingError, InputError, SpanwrightError
from spanwright.truss.inputs import FormInput, GivenInput

SCHEMA: dict[str, Any] = json.loads(files("spanwright.io.results").joinpath("results.schema.json").read_text())
DRAWN = 'wireframe = "roof.dxf"'
MARKS = '[truss.drawing.marks]\npurlins = ["PURLIN"]\nknee_braces = ["KNEE"]\nties = ["TIE"]\n'
REST = """
[loads]
roof_permanent = { most = "0.25 kPa", least = "0.18 kPa" }
roof_imposed = "0.30 kPa"
[[loads.wind]]
name = "across ridge, suction"
left = "-0.70 kPa"
right = "-0.50 kPa"
"""


@pytest.fixture
def results_only(monkeypatch: pytest.MonkeyPatch) -> None:
    """Leave out what takes long to write and is no concern here."""
    for name in ("_calculation", "_drawing", "_schedules"):
        monkeypatch.setattr(outputs, name, lambda *_, **__: None)


def project_text(truss: str, restraint: str = "", more: str = "") -> str:
    """Return a project file; `more` are tables within [truss]."""
    held = 'anchored_purlins = "all"\nanchored_by = "roof bracing"\nbearings_held = true'
    head = 'actions = "SANS 10160:2011"\n[truss]\nspacing = "5 m"'
    return f"{head}\n{truss}\n{more}[restraint]\n{held}\n{restraint}\n{REST}"


def in_folder(folder: Path, text: str, drawing: Drawing) -> Path:
    save(drawing, folder)
    path = folder / "roof.toml"
    path.write_text(text, encoding="utf-8")
    return path


def mark(drawing: Drawing, layer: str, points: Sequence[Sequence[float]] | FloatArray) -> None:
    for point in points:
        drawing.modelspace().add_circle(point, 40, dxfattribs={"layer": layer})


def drawn_from(form: Project, *, braces: Sequence[str] = (), ties: Sequence[str] = ()) -> Drawing:
    """Draw the truss of a form with its overhang, purlins at all top joints and roof edges, braces and ties."""
    truss, given = build_truss(form), form.truss
    assert isinstance(given, FormInput)
    drawing = new_drawing()
    draw(drawing.modelspace(), truss)
    mark(drawing, "PURLIN", truss.xy[list(truss.top.joints)])
    if given.overhang:
        for end, out in ((truss.top.joints[0], -1.0), (truss.top.joints[-1], 1.0)):
            tip = truss.xy[end] + [out * given.overhang, -given.overhang * math.tan(given.pitch)]
            drawing.modelspace().add_line(truss.xy[end], tip)
            mark(drawing, "PURLIN", [tip])
    mark(drawing, "KNEE", [truss.xy[truss.joint(name)] for name in braces])
    mark(drawing, "TIE", [truss.xy[truss.joint(name)] for name in ties])
    return drawing


HOWE = 'form = "Howe"\nspan = "15 m"\npitch = "18 deg"\npanels = 10'
PRATT = 'form = "Pratt"\nspan = "18 m"\npitch = "10 deg"\nheel_depth = "0.9 m"\npanels = 12\noverhang = "0.5 m"'
FINK = 'form = "Fink"\nspan = "13.5 m"\npitch = "30 deg"\npanels = 8'


@pytest.mark.parametrize(
    ("form", "supports", "braces", "ties"),
    [
        (HOWE, "left pinned, right sliding", (), ("B3", "B5", "B7")),
        (PRATT, "both pinned", ("B2", "B4", "B6", "B8", "B10"), ()),
        (FINK, "left pinned, right sliding", (), ("B2", "B3")),
    ],
    ids=["Howe", "raised Pratt", "compound Fink"],
)
def test_a_generated_truss_drawn_and_imported_gives_the_same_results(
    form: str, supports: str, braces: tuple[str, ...], ties: tuple[str, ...], tmp_path: Path
) -> None:
    """Invariant: how a truss is described changes no digit of what is found about it."""
    stated = f"knee_braces = {json.dumps(braces or 'none')}\nbottom_ties = {json.dumps(ties or 'none')}"
    marks = [("purlins", "PURLIN"), *[("knee_braces", "KNEE")][: len(braces)], *[("ties", "TIE")][: len(ties)]]
    table = "[truss.drawing.marks]\n" + "".join(f'{key} = ["{layer}"]\n' for key, layer in marks)
    how = f'supports = "{supports}"'
    generated = parse_project(project_text(f"{form}\n{how}", stated), "roof.toml")
    drawing = drawn_from(generated, braces=braces, ties=ties)
    drawn = read_project(in_folder(tmp_path, project_text(f"{DRAWN}\n{how}", "", table), drawing))
    assert isinstance(drawn.truss, GivenInput)
    assert drawn.restraint == generated.restraint
    found, expected = document(design(drawn)), document(design(generated))
    assert set(found) == set(expected)
    for key in set(found) - {"input_sha256", "project", "defaults_used", "drawing", "findings"}:
        assert found[key] == expected[key], key
    assert found["passes"]


def test_what_the_drawing_marks_is_no_default_and_what_it_leaves_is(tmp_path: Path) -> None:
    form = parse_project(project_text(HOWE))
    project = read_project(in_folder(tmp_path, project_text(DRAWN, "", MARKS), drawn_from(form, ties=("B5",))))
    defaults = dict(project.defaults_used)
    assert not {"restraint.purlins", "restraint.ridge_purlins", "restraint.bottom_ties"} & set(defaults)
    assert defaults["restraint.knee_braces"] == "none"
    assert defaults["truss.overhang"] == "as drawn"
    assert defaults["truss.drawing.units"] == "as the drawing states"
    assert defaults["truss.drawing.roles.top_chord"] == "by geometry"


def test_what_the_file_states_goes_before_what_the_drawing_marks(tmp_path: Path) -> None:
    form = parse_project(project_text(HOWE))
    drawing = drawn_from(form, ties=("B3", "B7"), braces=("B5",))
    stated = 'bottom_ties = ["B5"]\npurlins = "at joints"\nknee_braces = "none"'
    project = read_project(in_folder(tmp_path, project_text(DRAWN, stated, MARKS), drawing))
    assert project.restraint.bottom_ties == ("B5",)
    assert project.restraint.knee_braces == "none"
    assert [warning.split()[0] for warning in project.warnings] == ["restraint.knee_braces", "restraint.bottom_ties"]
    assert set(project.warnings) <= set(design(project).warnings)


def test_a_ridge_pair_and_distances_that_are_marked(tmp_path: Path) -> None:
    truss = build_truss(parse_project(project_text(HOWE)))
    drawing = new_drawing()
    draw(drawing.modelspace(), truss)
    left = [(x, math.tan(math.radians(18)) * x) for x in (400.0, 1900.0, 3400.0, 4900.0, 6400.0, 7300.0)]
    mark(drawing, "PURLIN", [*left, *((15000.0 - x, y) for x, y in left)])
    restraint = read_project(in_folder(tmp_path, project_text(DRAWN, "", MARKS), drawing)).restraint
    along = [x / math.cos(math.radians(18)) for x in (400.0, 1900.0, 3400.0, 4900.0, 6400.0)]
    assert restraint.purlins == pytest.approx(along, abs=0.051)
    assert restraint.ridge_pair == pytest.approx(200.0 / math.cos(math.radians(18)), abs=0.051)


def test_purlins_that_no_rule_tells_must_be_stated(tmp_path: Path) -> None:
    truss = build_truss(parse_project(project_text(HOWE)))
    drawing = new_drawing()
    draw(drawing.modelspace(), truss)
    mark(drawing, "PURLIN", truss.xy[list(truss.top.joints[:-2])])
    path = in_folder(tmp_path, project_text(DRAWN, "", MARKS), drawing)
    with pytest.raises(InputError, match="marks purlins that no rule says") as refused:
        read_project(path)
    assert (refused.value.key, refused.value.file) == ("restraint.purlins", str(path))
    path.write_text(project_text(DRAWN, "", '[truss.drawing.marks]\npurlins = ["P"]\n'), encoding="utf-8")
    with pytest.raises(InputError, match="marks no purlin"):
        read_project(path)
    path.write_text(project_text(DRAWN, 'purlins = "at joints"', MARKS), encoding="utf-8")
    project = read_project(path)
    assert project.restraint.purlins == "at joints"
    assert "W-408" in project.warnings[0]


def test_an_edge_line_that_is_not_marked_is_not_added(tmp_path: Path) -> None:
    """Purlins "at joints" have lines at the roof's edges too; where the drawing marks none there, none stand there."""
    form = parse_project(project_text(PRATT))
    truss = build_truss(form)
    drawing = drawn_from(form)
    space = drawing.modelspace()
    edges = [mark for mark in space if mark.dxftype() == "CIRCLE" and not 0.0 <= mark.dxf.center.x <= truss.span]
    for edge in edges:
        space.delete_entity(edge)
    project = read_project(in_folder(tmp_path, project_text(DRAWN, "", MARKS), drawing))
    assert len(edges) == 2
    assert len(design(project).setting.restraint.lines) == len(truss.top.joints)


def test_a_stated_overhang_goes_before_the_drawn_one_and_purlins_stay_where_they_are(tmp_path: Path) -> None:
    form = parse_project(project_text(HOWE))
    text = project_text(f'{DRAWN}\noverhang = "0.6 m"', "", MARKS)
    project = read_project(in_folder(tmp_path, text, drawn_from(form)))
    assert isinstance(project.truss, GivenInput)
    assert project.truss.overhang == 600.0
    lines = design(project).setting.restraint.lines
    assert [line.joint for line in lines] == list(build_truss(form).top.joints)
    drawn = read_project(
        in_folder(tmp_path, text, drawn_from(parse_project(project_text(f'{HOWE}\noverhang = "0.5 m"'))))
    )
    assert any("W-410" in warning for warning in drawn.warnings)


# The record


def test_the_hash_of_the_input_covers_the_drawing(tmp_path: Path) -> None:
    form = parse_project(project_text(HOWE))
    drawing = drawn_from(form)
    path = in_folder(tmp_path, project_text(DRAWN), drawing)
    first = read_project(path)
    assert tomllib.loads(first.source) == tomllib.loads(path.read_text(encoding="utf-8"))
    digest = hashlib.sha256((tmp_path / "roof.dxf").read_bytes()).hexdigest()
    assert first.source.splitlines()[-1] == f"# roof.dxf as read: SHA-256 {digest}"
    drawing.modelspace().add_text("a word that changes nothing")
    save(drawing, tmp_path)
    second = read_project(path)
    assert second.truss == first.truss
    assert input_hash(second.source) != input_hash(first.source)


@pytest.mark.usefixtures("results_only")
def test_the_results_hold_findings_and_drawing_and_the_marked_copy_stands_beside(tmp_path: Path) -> None:
    out = tmp_path / "out"
    project = demo("scissor_hall")
    result = design(project)
    assert write_all(result, out, pictures=False) == ()
    results = json.loads((out / "results.json").read_text(encoding="utf-8"))
    jsonschema.Draft202012Validator(SCHEMA).validate(results)
    circles = [entity.dxf.layer for entity in readfile(out / "wireframe_marked.dxf").modelspace().query("CIRCLE")]
    placed = Counter(f"SPANWRIGHT {row['code']}" for row in results["findings"] if row["at"])
    assert Counter(layer for layer in circles if layer != "PURLIN") == placed
    content = (FOLDER / "scissor_hall" / "roof.dxf").read_bytes()
    assert results["drawing"]["sha256"] == hashlib.sha256(content).hexdigest()
    assert results["drawing"]["read"] == sum(row["count"] for row in results["drawing"]["entities"])
    marked = readfile(out / "wireframe_marked.dxf").header.custom_vars
    assert marked.get("Input") == results["input_sha256"]


@pytest.mark.usefixtures("results_only")
def test_a_run_without_a_drawing_removes_the_marked_copy_of_an_earlier_one(tmp_path: Path) -> None:
    (tmp_path / "wireframe_marked.dxf").write_text("of another run")
    result = design(demo("howe_workshop"))
    write_all(result, tmp_path, pictures=False)
    assert not (tmp_path / "wireframe_marked.dxf").exists()
    assert document(result)["drawing"] is None
    assert document(result)["findings"] == []


def test_names_and_numbers_of_a_hostile_drawing_do_not_spoil_the_results(tmp_path: Path) -> None:
    drawing = drawn_from(parse_project(project_text(HOWE)))
    for layer in ("a\x1b[2J", "b\udce4"):
        drawing.modelspace().add_circle((0, 0), 5, dxfattribs={"layer": layer})
    drawing.modelspace().add_circle((math.nan, math.inf), 5, dxfattribs={"layer": "nowhere"})
    path = in_folder(tmp_path, project_text(DRAWN), drawing)
    result = design(read_project(path))
    text = json.dumps(document(result), allow_nan=False, ensure_ascii=False)
    assert text.encode()
    assert "\\u001b" not in text
    layers = {row["layer"] for row in document(result)["findings"] if row["code"] == "W-103"}
    assert layers == {"a?[2J", "b?", "nowhere", "PURLIN"}
    assert result.setting.project.drawing is not None
    assert result.setting.project.drawing.marked


# What is refused


@pytest.mark.parametrize(
    ("name", "content", "found"),
    [
        ("none.dxf", None, "none.dxf: there is no such file"),
        ("../none.dxf", None, "../none.dxf: there is no such file"),
        ("folder.dxf", "folder", "this is a folder"),
        ("roof.toml", None, 'ends in ".toml"'),
        ("text.dxf", b"a roof, EOF", "no DXF file"),
        ("empty.dxf", b"", "empty"),
        ("cut.dxf", b"  0\nSECTION\n  2\nHEADER\n", "cut short"),
    ],
)
def test_what_is_no_drawing_names_file_and_key(
    name: str, content: bytes | str | None, found: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    if content == "folder":
        (tmp_path / name).mkdir()
    elif isinstance(content, bytes):
        (tmp_path / name).write_bytes(content)
    save(new_drawing(), tmp_path)
    path = tmp_path / "roof.toml"
    path.write_text(project_text(f'wireframe = "{name}"'), encoding="utf-8")
    assert main(["design", str(path)]) == 2
    complaint = capsys.readouterr().err
    assert complaint.startswith(f"spanwright: {path}: truss.wireframe: ")
    assert found in complaint
    assert complaint.count("\n") >= 2, "a remedy"
    assert not (tmp_path / "roof.out").exists()
    if name == "none.dxf":
        assert "in that folder: roof.dxf" in complaint


@pytest.mark.parametrize(
    ("line", "table", "key", "found"),
    [
        ("", "units = 'm'", "truss.drawing.units", "roof.dxf: in m, stated by the user"),
        ("", "up = '-x'\nbearings = 'top chord'", "truss.drawing.up", "high"),
        ("", "roles = { bottom_chord = ['post'] }", "truss.drawing.roles.bottom_chord", "is broken or closed"),
        ("", "marks = { supports = ['ONE'] }", "truss.drawing.marks.supports", "at one joint only"),
        ("", "layers = ['nothing']", "truss.wireframe", "no straight line that is read"),
        ("overhang = '-1 m'", "", "truss.overhang", "-1000 mm"),
    ],
)
def test_a_refused_drawing_names_the_key_that_decides(
    line: str, table: str, key: str, found: str, tmp_path: Path
) -> None:
    drawing = drawn_from(parse_project(project_text(HOWE)))
    mark(drawing, "ONE", [(0.0, 0.0)])
    path = in_folder(tmp_path, project_text(f"{DRAWN}\n{line}", "", f"[truss.drawing]\n{table}\n"), drawing)
    with pytest.raises(SpanwrightError) as refused:
        read_project(path)
    assert isinstance(refused.value, DrawingError | InputError)
    assert (refused.value.key, refused.value.file) == (key, str(path))
    assert found in refused.value.found
    assert "spanwright wireframe roof.dxf" in refused.value.remedy


@pytest.mark.parametrize(
    ("truss", "key", "found"),
    [
        ('wireframe = ""', "truss.wireframe", "empty"),
        ("wireframe = 3", "truss.wireframe", "3 is not text"),
        ('wireframe = "a\\u0000.dxf"', "truss.wireframe", "control character"),
        (f'{DRAWN}\ndrawing = "mm"', "truss.drawing", "stands where something else is due"),
        (f"{DRAWN}\ndrawing.units = 'km'", "truss.drawing.units", '"km"'),
        (f"{DRAWN}\ndrawing.tolerance = '5'", "truss.drawing.tolerance", "no unit"),
        (f"{DRAWN}\ndrawing.tolerance = '-5 mm'", "truss.drawing.tolerance", "-5 mm"),
        (f"{DRAWN}\ndrawing.layers = 'STEEL'", "truss.drawing.layers", "not a list of layers"),
        (f"{DRAWN}\ndrawing.split_crossings = 'yes'", "truss.drawing.split_crossings", "answer"),
        (f"{DRAWN}\ndrawing.unit = 'mm'", "truss.drawing.unit", 'no key is called "unit"'),
        (f"{DRAWN}\ndrawing.marks.purlin = ['P']", "truss.drawing.marks.purlin", 'no key is called "purlin"'),
        (f"{DRAWN}\nspan = '12 m'", "truss.span", "span does not go with a truss read from a drawing"),
        (f"{DRAWN}\nbars = []", "truss.bars", "bars does not go with a truss read from a drawing"),
        ("drawing.units = 'mm'", "truss.wireframe", "required and missing"),
    ],
)
def test_a_mistake_in_the_table_names_its_key(truss: str, key: str, found: str) -> None:
    with pytest.raises(InputError) as refused:
        parse_project(project_text(truss), "roof.toml")
    assert refused.value.key == key
    assert found in refused.value.found
    assert refused.value.remedy


# The demo project


def test_the_demo_s_drawing_is_the_one_that_its_script_draws(tmp_path: Path) -> None:
    text = (FOLDER / "scissor_hall" / "roof.toml").read_text(encoding="utf-8")
    again = read_project(in_folder(tmp_path, text, scissor_drawing()))
    kept = demo("scissor_hall")
    assert again.truss == kept.truss
    assert again.drawing is not None
    assert kept.drawing is not None
    assert again.drawing.record == kept.drawing.record


def test_the_demo_s_drawing_gives_what_was_drawn() -> None:
    project = demo("scissor_hall")
    truss = build_truss(project)
    x = np.arange(PANELS + 1) * PANEL * 10
    rise = np.minimum(x, 2 * HALF * 10 - x)
    assert truss.xy[list(truss.top.joints)] == pytest.approx(np.column_stack([x, rise * PITCH]), abs=3.0)
    assert truss.xy[list(truss.bottom.joints)] == pytest.approx(np.column_stack([x, rise * INNER_PITCH]), abs=3.0)
    assert isinstance(project.truss, GivenInput)
    assert project.truss.overhang == pytest.approx(10 * OVERHANG, abs=3.0)
    assert project.restraint.bottom_ties == tuple(f"B{k}" for k in TIES)
    lines = design(project).setting.restraint.lines
    assert [line.joint for line in lines] == list(truss.top.joints)


def test_the_demo_s_findings() -> None:
    """What a draughtsman who drew this would expect to be told, read off the script that draws it."""
    drawing = demo("scissor_hall").drawing
    assert drawing is not None
    findings = drawing.record["findings"]
    warned = {row["code"]: row["found"] for row in findings if row["severity"] == "warning"}
    assert set(warned) == {"W-103", "W-202", "W-309", "W-313"}
    assert warned["W-202"] == "the drawing says mm, the user cm"
    noted = Counter(row["code"] for row in findings if row["severity"] == "note")
    assert {code: noted[code] for code in ("W-102", "W-303", "W-306", "W-404")} == {
        "W-102": 3,  # COLUMN, AXIS, OLD SCHEME
        "W-303": 1,  # the line of no length
        "W-306": 1,  # the middle post of both halves
        "W-404": 2,  # the rafter's tips
    }
    assert {"W-301", "W-304", "W-305", "W-307", "W-308"} <= set(noted)
    assert {tuple(row["blocks"]) for row in findings if row["code"] == "W-404"} == {("HALF TRUSS",)}
    (warning,) = demo("scissor_hall").warnings
    assert warning.startswith("the import of roof.dxf gave 4 warnings: W-")


def test_the_demo_passes_with_sensible_sections() -> None:
    result = design(demo("scissor_hall"))
    assert result.passes
    assert 0.5 < result.utilisation.max() <= 1.0
    assert 6.0 < result.mass / (12.0 * 4.0) < 10.0  # kg/m2 of plan, under tiles (common practice)
