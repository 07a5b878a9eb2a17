"""What a user types and sees: help that teaches, one message for a mistake, an exit status, and no traceback."""

from __future__ import annotations

import math
import os
import re
import shlex
import subprocess
import sys
from importlib import import_module
from pathlib import Path

import pytest

from spanwright.io.command_line import main
from spanwright.io.project_file import parse_project
from spanwright.io.starter import starter_text

COMMANDS = ("design", "check", "wireframe", "strut", "sections", "starter")
SECOND_LOAD = 'joint = "B2"\ndown = "1 kN"\n[[loads.at_joint]]\ncase = "hoist"\nkind = "imposed"'
HEAVY = ("numpy", "scipy", "networkx", "matplotlib", "pydantic", "rich", "ezdxf")

# A truss with a panel that no diagonal stiffens.
QUADRANGLE = """
actions = "SANS 10160:2011"
[truss]
spacing = "5 m"
bars = [
  ["A", "T1", "top chord"], ["T1", "T2", "top chord"], ["T2", "D", "top chord"],
  ["A", "B1", "bottom chord"], ["B1", "B2", "bottom chord"], ["B2", "D", "bottom chord"],
  ["B1", "T1", "post"], ["B2", "T2", "post"],
]
[truss.joints]
A = ["0 m", "0 m"]
B1 = ["3 m", "0 m"]
B2 = ["6 m", "0 m"]
D = ["9 m", "0 m"]
T1 = ["3 m", "1.5 m"]
T2 = ["6 m", "1.5 m"]
[truss.joint_supports]
A = "pinned"
D = "sliding"
[restraint]
anchored_purlins = "all"
anchored_by = "roof bracing"
bearings_held = true
[loads]
roof_permanent = "0.2 kPa"
roof_imposed = "0.3 kPa"
wind = "none"
"""


def in_a_process(*arguments: str, **environment: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "spanwright", *arguments],
        capture_output=True,
        text=True,
        encoding="utf-8",
        errors="replace",
        env={**os.environ, **environment},
        check=False,
    )


def changed(key: str, line: str) -> str:
    text, times = re.subn(rf"(?m)^{re.escape(key)}\s*=.*$", lambda _: line, starter_text(), count=1)
    assert times == 1, key
    return text


# Help


def test_help_names_every_command_and_the_caution(capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit) as stopped:
        main(["--help"])
    assert stopped.value.code == 0
    text = capsys.readouterr().out
    for command in COMMANDS:
        assert re.search(rf"^\s+{command}\s+\w", text, re.MULTILINE)
    assert "competent, licensed engineer" in text
    assert "spanwright starter roof.toml" in text


def test_help_imports_nothing_heavy() -> None:
    probe = (
        "import sys\nfrom spanwright.__main__ import main\n"
        "try:\n    main(['--help'])\nexcept SystemExit:\n    pass\n"
        f"print('heavy:', [name for name in {HEAVY!r} if name in sys.modules])"
    )
    run = subprocess.run([sys.executable, "-c", probe], capture_output=True, text=True, check=True)
    assert "heavy: []" in run.stdout


@pytest.mark.parametrize("command", COMMANDS)
def test_the_help_of_a_command_has_examples_and_exit_status(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit):
        main([command, "--help"])
    text = capsys.readouterr().out
    assert f"spanwright {command}" in text.partition("example")[2]


def test_no_command_shows_the_help(capsys: pytest.CaptureFixture[str]) -> None:
    assert main([]) == 2
    assert "commands:" in capsys.readouterr().out


@pytest.mark.parametrize("arguments", [["design"], ["strut", "--section", "L 6x6x1"], ["starter", "--oot"]])
def test_a_wrong_command_line_ends_with_2(arguments: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit) as stopped:
        main(arguments)
    assert stopped.value.code == 2
    assert "usage: spanwright" in capsys.readouterr().err


def examples(command: str) -> list[list[str]]:
    text = import_module(f"spanwright.io.commands.{command}").TEXT.replace("\\\n", " ")
    return [shlex.split(line)[1:] for line in text.splitlines() if line.startswith(f"  spanwright {command}")]


@pytest.mark.parametrize("arguments", [*examples("strut"), *examples("sections")])
def test_the_examples_of_the_help_run(
    arguments: list[str], tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.chdir(tmp_path)  # an example may write a file
    assert main(arguments) in (0, 1)
    out = capsys.readouterr()
    assert len(out.out) > 500
    assert out.err == ""


# starter


def test_starter_prints_a_valid_file(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["starter"]) == 0
    assert parse_project(capsys.readouterr().out).mark == "R1"


def test_starter_writes_a_file_once(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = tmp_path / "roof.toml"
    assert main(["starter", str(path)]) == 0
    assert path.read_text(encoding="utf-8") == starter_text()
    path.write_text("mine")
    assert main(["starter", str(path)]) == 2
    assert path.read_text() == "mine"
    assert str(path) in capsys.readouterr().err


# strut and sections


def test_strut_gives_the_resistance_of_the_column_curve(capsys: pytest.CaptureFixture[str]) -> None:
    # CHS 76.1x3.6: A = 8.20 cm2, i = 2.57 cm in the published table; SANS 10162-1, 13.3.1 with n = 1.34, f_y = 355 MPa.
    area, radius, length, fy, n = 820.0, 25.7, 2000.0, 355.0, 1.34
    slenderness = length / radius * math.sqrt(fy / (math.pi**2 * 200e3))
    resistance = 0.9 * area * fy * (1 + slenderness ** (2 * n)) ** (-1 / n)
    arguments = ["strut", "--section", "CHS 76.1x3.6", "--in-plane", "2 m", "--out-of-plane", "2 m", "--force"]
    assert main([*arguments, "-100 kN"]) == 0
    printed = re.search(r"^C_r\s+([\d.]+)\s+N\s+13\.3\.1", capsys.readouterr().out, re.MULTILINE)
    assert printed is not None
    assert float(printed[1]) == pytest.approx(resistance, rel=0.005)
    assert main([*arguments, f"{-1.02 * resistance:.0f} N"]) == 1


def test_strut_prints_every_step_with_formula_unit_and_clause(capsys: pytest.CaptureFixture[str]) -> None:
    main(["strut", "--section", "2L 80x80x6", "--in-plane", "1.6 m", "--out-of-plane", "3.2 m", "--force", "-120 kN"])
    text = capsys.readouterr().out
    assert re.search(r"^rho_e\s+[\d.]+\s+19\.1\.4", text, re.MULTILINE)
    assert "= sqrt(rho_0**2 + rho_i**2)" in text
    assert "competent, licensed engineer" in text
    assert re.search(r"governs: [\d.]+ N of [\d.]+\s+N: 0\.\d\d, passes", text)


def test_strut_buckles_the_way_that_is_held_less(capsys: pytest.CaptureFixture[str]) -> None:
    member = ["strut", "--section", "2L 80x80x6", "--force", "-120 kN"]
    for in_plane, out_of_plane, way in [("1 m", "4 m", "out of plane"), ("3 m", "1 m", "in plane")]:
        main([*member, "--in-plane", in_plane, "--out-of-plane", out_of_plane])
        assert re.search(rf"^buckling {way}[^\n]*governs", capsys.readouterr().out, re.MULTILINE)


@pytest.mark.parametrize(
    ("option", "value", "found"),
    [
        ("--section", "2L 81x81x6", "2L 80x80x6"),
        ("--section", "beam", "is not the name of a section"),
        ("--in-plane", "1.6", "has no unit"),
        ("--out-of-plane", "0 m", "outside"),
        ("--force", "120 kN", "compression is negative"),
        ("--force", "-120 kPa", "is a pressure, not a force"),
        ("--steel", "S355JX", "S355JR"),
        ("--standard", "SANS 10162", "SANS 10162-1"),
        ("--packs", "0", "1 to 20"),
        ("--gap", "8", "has no unit"),
    ],
)
def test_a_mistake_on_the_command_line_names_the_option(
    option: str, value: str, found: str, capsys: pytest.CaptureFixture[str]
) -> None:
    given = {"--section": "2L 80x80x6", "--in-plane": "1.6 m", "--out-of-plane": "3.2 m", "--force": "-120 kN"}
    given[option] = value
    assert main(["strut", *(part for pair in given.items() for part in pair)]) == 2
    complaint = capsys.readouterr().err
    assert complaint.startswith(f"spanwright: {option}: ")
    assert found in complaint


def test_sections_lists_what_the_limits_let_through(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["sections", "--family", "L", "--min-leg", "60 mm"]) == 0
    text = capsys.readouterr().out
    assert "L 60x60x6 " in text
    assert "L 50x50x5 " not in text
    assert main(["sections", "--family", "Z"]) == 2
    assert "--family" in capsys.readouterr().err


# design and check: mistakes that show only once the truss is built


@pytest.mark.parametrize(
    ("key", "line", "place", "found"),
    [
        ("panels", "panels = 13", "truss.panels", "13"),
        ("heel_depth", 'heel_depth = "10 m"', "truss.heel_depth", "10"),
        ("purlins", 'purlins = "0.01 m"', "restraint.purlins", "0.01 m"),
        ("knee_braces", 'knee_braces = ["T3"]', "restraint.knee_braces", "T3"),
        ("knee_braces", 'knee_braces = ["B99"]', "restraint.knee_braces", "B99"),
        ("bottom_ties", 'bottom_ties = ["B99"]', "restraint.bottom_ties", "B99"),
        ("anchored_purlins", "anchored_purlins = [99]", "restraint.anchored_purlins", "99"),
        ("bearings_held", "bearings_held = false", "", "B0"),
        ("joint", 'joint = "B99"', "loads.at_joint", "B99"),
        ("kind", f'kind = "wind"\n{SECOND_LOAD}', "loads.at_joint", "hoist"),
        ("effective_length_factor", "effective_length_factor = { in_plane = 0.8 }", "restraint.effective", "0.8"),
        ("steel", 'steel = "S355JX"', "members.steel", "S355JX"),
        ("top_chord", 'top_chord = "2L 81x81x6"', "members.top_chord", "2L 81x81x6"),
        ("posts", 'posts = "channel"', "members.posts", "channel"),
        ("standard", 'standard = "SANS 10162"', "standard", "SANS 10162"),
        ("actions", 'actions = "SANS 10160:1999"', "actions", "SANS 10160:1999"),
    ],
)
def test_a_mistake_stops_the_run_before_anything_is_written(
    key: str, line: str, place: str, found: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = tmp_path / "roof.toml"
    path.write_text(changed(key, line), encoding="utf-8")
    assert main(["design", str(path)]) == 2
    complaint = capsys.readouterr().err
    assert complaint.startswith(f"spanwright: {path}: {place}")
    assert found in complaint
    assert complaint.count("\n") >= 2, "a remedy"
    assert [entry.name for entry in tmp_path.iterdir()] == ["roof.toml"]


def complaint_about(text: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> str:
    path = tmp_path / "roof.toml"
    path.write_text(text, encoding="utf-8")
    assert main(["design", str(path)]) == 2
    assert [entry.name for entry in tmp_path.iterdir()] == ["roof.toml"]
    complaint = capsys.readouterr().err
    assert complaint.startswith(f"spanwright: {path}: ")
    return complaint


def test_a_knee_brace_where_no_purlin_stands(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    text = changed("purlins", 'purlins = ["0 m", "4 m"]').replace('"every 2nd purlin"   #', '["B4"]   #')
    complaint = complaint_about(text, tmp_path, capsys)
    assert "restraint.knee_braces: no purlin stands" in complaint
    assert "B4" in complaint


def test_a_mechanism_names_the_joints_that_move(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    complaint = complaint_about(QUADRANGLE, tmp_path, capsys)
    assert "T1" in complaint
    assert "mechanism" in complaint


def test_check_wants_given_sections(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = tmp_path / "roof.toml"
    path.write_text(starter_text(), encoding="utf-8")
    assert main(["check", str(path)]) == 2
    assert "members.top_chord" in capsys.readouterr().err


def test_a_hostile_name_does_not_reach_the_terminal(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    complaint = complaint_about('"\\u001b[2J" = 1\n' + starter_text(), tmp_path, capsys)
    assert "\x1b" not in complaint
    assert "\\x1b[2J" in complaint


def test_a_path_that_cannot_be_read(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["design", str(tmp_path / "none.toml")]) == 2
    assert "no such file" in capsys.readouterr().err


def test_a_path_that_cannot_be_written(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = tmp_path / "roof.toml"
    path.write_text(starter_text(), encoding="utf-8")
    blocking = tmp_path / "file"
    blocking.write_text("not a folder")
    assert main(["design", str(path), "--no-pictures", "--out", str(blocking / "out")]) == 2
    assert "cannot be written" in capsys.readouterr().err


# design and check: results


def test_design_writes_beside_the_project_and_exits_with_0(tmp_path: Path) -> None:
    path = tmp_path / "roof.toml"
    path.write_text(changed("title", 'title = "\u5c4b\u6839 [bold]"'), encoding="utf-8")
    run = in_a_process("design", str(path), "--no-pictures", PYTHONIOENCODING="ascii")
    assert (run.returncode, run.stderr) == (0, "")
    assert "?? [bold]" in run.stdout
    assert (tmp_path / "roof.out" / "results.json").exists()


def test_check_exits_with_1_where_something_fails(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    path = tmp_path / "roof.toml"
    text = starter_text()
    for role, section in [("top_chord", "2L"), ("bottom_chord", "2L"), ("posts", "L"), ("diagonals", "L")]:
        text = re.sub(rf'(?m)^{role}\s*=\s*"{section}"', f'{role} = "{section} 50x50x5"', text)
    path.write_text(text, encoding="utf-8")
    assert main(["check", str(path), "--no-pictures", "--out", str(tmp_path / "results")]) == 1
    assert "NOT PASSING" in capsys.readouterr().out
    assert (tmp_path / "results" / "results.json").exists()
    assert not (tmp_path / "roof.out").exists()


# What goes wrong beyond the input


def test_an_interrupt_is_one_line(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    def interrupted() -> str:
        raise KeyboardInterrupt

    monkeypatch.setattr("spanwright.io.starter.starter_text", interrupted)
    assert main(["starter"]) == 130
    assert capsys.readouterr().err == "spanwright: interrupted; every file that was written is whole\n"


def test_a_fault_of_the_program_shows_no_traceback(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def faulty() -> str:
        raise ZeroDivisionError("division by zero")

    monkeypatch.setattr("spanwright.io.starter.starter_text", faulty)
    monkeypatch.delenv("SPANWRIGHT_TRACEBACK", raising=False)
    assert main(["starter"]) == 70
    complaint = capsys.readouterr().err
    assert "ZeroDivisionError: division by zero" in complaint
    assert "Traceback" not in complaint
    monkeypatch.setenv("SPANWRIGHT_TRACEBACK", "1")
    with pytest.raises(ZeroDivisionError):
        main(["starter"])


@pytest.mark.parametrize("command", ["starter", "sections"])
def test_a_reader_that_leaves_early_sees_no_traceback(command: str) -> None:
    # `sections` writes more than a pipe holds; a failed member's status 1 must not come of that.
    line = f"{shlex.quote(sys.executable)} -m spanwright {command} | head -n 1; echo ${{PIPESTATUS[0]}}"
    run = subprocess.run(["bash", "-c", line], capture_output=True, text=True, check=True)
    assert run.stderr == ""
    assert run.stdout.splitlines()[-1] in ("0", "141")


def test_a_misspelt_command_is_met_with_the_nearest(capsys: pytest.CaptureFixture[str]) -> None:
    assert main(["desing", "roof.toml"]) == 2
    assert 'did you mean "spanwright design"?' in capsys.readouterr().err
