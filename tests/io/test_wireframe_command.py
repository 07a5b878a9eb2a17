"""The command `wireframe`: what is printed and written, what is refused, and which option is named for a mistake."""

from __future__ import annotations

import re
import shutil
import subprocess
import sys
from argparse import ArgumentParser
from collections.abc import Sequence
from pathlib import Path
from typing import get_args

import pytest
from demos import FOLDER
from ezdxf.filemanagement import readfile
from scissor import LEFT_BEARING
from wireframes import PRATT, draw, new_drawing, save

from spanwright.design.run import design
from spanwright.io.command_line import main
from spanwright.io.commands import wireframe
from spanwright.io.project_file import read_project
from spanwright.io.schema_drawing import MARK_KEYS, ROLE_KEYS, Axis, BearingChord, DrawingTable
from spanwright.io.units import LENGTH
from spanwright.io.wireframe import Options
from spanwright.io.wireframe.options import MARK_KINDS, check_options
from spanwright.truss.model import ROLES

HALL = FOLDER / "scissor_hall" / "roof.dxf"
HALL_OPTIONS = ("--units", "cm", "--ignore", "COLUMN", "AXIS", "--purlins", "PURLIN*", "--ties", "TIE*")


@pytest.fixture
def hall(tmp_path: Path) -> Path:
    return Path(shutil.copy(HALL, tmp_path))


@pytest.fixture
def unitless(hall: Path) -> Path:
    """Return the hall's drawing as a template without a unit would have it, and with one bearing marked."""
    document = readfile(hall)
    document.units = 0
    document.modelspace().add_point(LEFT_BEARING, dxfattribs={"layer": "BEARING"})
    document.saveas(hall)
    return hall


def names(folder: Path) -> list[str]:
    return sorted(path.name for path in folder.iterdir())


def test_it_prints_the_report_and_writes_both_files(hall: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["wireframe", str(hall), *HALL_OPTIONS]) == 0
    printed = capsys.readouterr()
    assert printed.err == ""
    assert re.search(r"span 12 m, depth 3\.46\d m, 16 joints, 29 bars", printed.out)
    assert "W-313 warning: a loose piece was left out" in printed.out
    assert re.search(r"read \d+ entities: \d+ converted, \d+ ignored by rule, 1 not understood", printed.out)
    assert f"  spanwright design {hall.with_suffix('.toml')}" in printed.out
    assert names(hall.parent) == ["roof.dxf", "roof.toml", "roof_marked.dxf"]
    marked = readfile(hall.parent / "roof_marked.dxf")
    assert not marked.audit().errors
    assert "SPANWRIGHT W-313" in marked.layers


def test_the_project_file_that_it_writes_can_be_completed_and_designed(hall: Path, tmp_path: Path) -> None:
    out = tmp_path / "import" / "here"
    assert main(["wireframe", str(hall), *HALL_OPTIONS, "--out", str(out)]) == 0
    project = out / "roof.toml"
    assert main(["design", str(project), "--no-pictures"]) == 2
    project.write_text(re.sub(r"(?m)^# (?=\w+ = .*REQUIRED)", "", project.read_text(encoding="utf-8")))
    completed, from_drawing = read_project(project), read_project(FOLDER / "scissor_hall" / "roof.toml")
    assert completed.truss == from_drawing.truss
    assert completed.restraint == from_drawing.restraint
    assert design(completed).mass > 0


def test_a_project_file_is_not_written_over_unless_asked(hall: Path, capsys: pytest.CaptureFixture[str]) -> None:
    project = hall.with_suffix(".toml")
    project.write_text("mine")
    assert main(["wireframe", str(hall), *HALL_OPTIONS]) == 2
    printed = capsys.readouterr()
    assert "16 joints" in printed.out
    assert str(project) in printed.err
    assert "--force" in printed.err
    assert project.read_text() == "mine"
    assert names(hall.parent) == ["roof.dxf", "roof.toml", "roof_marked.dxf"]
    assert main(["wireframe", str(hall), *HALL_OPTIONS, "--force"]) == 0
    assert project.read_text(encoding="utf-8").startswith("# Read from roof.dxf")


def test_a_refused_drawing_is_reported_and_marked_all_the_same(
    unitless: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    hall = unitless
    assert main(["wireframe", str(hall)]) == 2
    printed = capsys.readouterr()
    assert "W-102 note: a layer was left out by rule" in printed.out
    assert "11 not understood" in printed.out  # nobody said that circles mark purlins
    assert printed.err.startswith(f"spanwright: {hall}: --units: the drawing states no unit")
    assert "cm makes 12" in printed.err
    assert names(hall.parent) == ["roof.dxf", "roof_marked.dxf"]
    assert not readfile(hall.parent / "roof_marked.dxf").audit().errors


@pytest.mark.parametrize(
    ("name", "content", "found"),
    [
        ("none.dxf", None, "no such file"),
        ("folder.dxf", "folder", "folder"),
        ("roof.dwg", HALL.read_bytes(), "not in"),
        ("roof.dxf", b"", "empty"),
        ("roof.dxf", HALL.read_bytes()[:9000], "cut short"),
        ("roof.dxf", b"\x89PNG" + bytes(range(256)) + b"EOF", "no DXF file"),
    ],
)
def test_what_is_no_drawing_writes_nothing(
    name: str, content: bytes | str | None, found: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = tmp_path / name
    if content == "folder":
        path.mkdir()
    elif isinstance(content, bytes):
        path.write_bytes(content)
    before = names(tmp_path)
    assert main(["wireframe", str(path), "--out", str(tmp_path / "out")]) == 2
    printed = capsys.readouterr()
    assert printed.out == ""
    assert printed.err.startswith(f"spanwright: {path}: ")
    assert found in printed.err
    assert names(tmp_path) == before


@pytest.mark.parametrize(
    ("given", "option", "found"),
    [
        (["--units", "parsec"], "--units", '"mm"'),
        (["--tolerance", "5"], "--tolerance", "no unit"),
        (["--tolerance", "2 m"], "--tolerance", "200 mm"),
        (["--up", "north"], "--up", '"-y"'),
        (["--bearings", "chord"], "--bearings", '"top chord"'),
        (["--overhang", "-1 m"], "--overhang", "negative"),
        (["--layers", ""], "--layers", "can be no layer"),
        (["--knee-braces", "A", "b" * 300], "--knee-braces", "1 to 255"),
        (["--top-chord", "a\x1b"], "--top-chord", "control character"),
        # found only in the drawing
        ([], "--units", "states no unit"),
        (["--units", "cm", "--supports", "BEARING"], "--supports", "mark both bearings"),
        (["--units", "cm", "--bottom-chord", "STEEL"], "--bottom-chord", "the bottom chord, as its layers give it"),
    ],
)
def test_a_mistake_names_the_option(
    given: list[str], option: str, found: str, unitless: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    assert main(["wireframe", str(unitless), *given]) == 2
    complaint = capsys.readouterr().err
    assert f"{option}: " in complaint.splitlines()[0]
    assert found in complaint


def options(*given: str) -> Options:
    parser = ArgumentParser()
    wireframe.arguments(parser)
    return wireframe._options(parser.parse_args(["roof.dxf", *given]))


def test_every_option_reaches_the_import() -> None:
    plain = options()
    assert plain == Options(roles=dict.fromkeys(ROLES, ()), marks=dict.fromkeys(MARK_KINDS, ()))
    words = "--units ft --split-crossings --up=-z --both-pinned --layers A B --layers C --ignore D --top-chord E"
    layers = "--bottom-chord F --posts G --diagonals H --purlins I --knee-braces J --ties K --supports L"
    found = options(
        *words.split(), *layers.split(), "--tolerance", "1/8 in".replace("1/8", "0.125"), "--bearings", "top chord",
        "--overhang", "0.4 m",
    )  # fmt: skip
    assert found == Options(
        units="ft",
        layers=("A", "B", "C"),
        ignore=("D",),
        roles={"top chord": ("E",), "bottom chord": ("F",), "post": ("G",), "diagonal": ("H",)},
        marks={"purlins": ("I",), "knee braces": ("J",), "ties": ("K",), "supports": ("L",)},
        tolerance=3.175,
        split_crossings=True,
        up="-z",
        bearings="top chord",
        overhang=400.0,
        supports="both pinned",
    )


def test_the_words_of_the_table_are_those_of_the_import() -> None:
    assert tuple(ROLE_KEYS.values()) == ROLES
    assert tuple(MARK_KEYS.values()) == MARK_KINDS
    words: Sequence[tuple[str, Sequence[str]]] = [
        ("units", tuple(LENGTH.factors)),
        ("up", get_args(Axis)),
        ("bearings", get_args(BearingChord)),
    ]
    for key, choices in words:
        for choice in choices:
            check_options(DrawingTable.model_validate({key: choice}).options("both pinned", None))


def test_both_pinned_and_an_overhang_reach_the_project_file(tmp_path: Path) -> None:
    document = new_drawing()
    draw(document.modelspace(), PRATT)
    path = save(document, tmp_path)
    assert main(["wireframe", str(path), "--both-pinned", "--overhang", "0.25 m"]) == 0
    text = path.with_suffix(".toml").read_text(encoding="utf-8")
    assert text.count('"pinned"') == 2
    assert 'overhang = "250 mm"' in text


@pytest.mark.parametrize(
    "arguments", [["wireframe", "--help"], ["design", str(FOLDER / "howe_workshop" / "roof.toml")]]
)
def test_the_dxf_library_is_loaded_only_where_a_drawing_is_read(arguments: list[str], tmp_path: Path) -> None:
    probe = (
        "import sys\nfrom spanwright.io.command_line import main\nfrom spanwright.io.project_file import read_project\n"
        f"arguments = {arguments!r}\n"
        "if arguments[0] == 'design':\n    read_project(arguments[1])\nelse:\n    try:\n        main(arguments)\n"
        "    except SystemExit:\n        pass\nprint('loaded:', 'ezdxf' in sys.modules)"
    )
    run = subprocess.run([sys.executable, "-c", probe], capture_output=True, text=True, check=True, cwd=tmp_path)
    assert "loaded: False" in run.stdout
