"""The README is true: its project file designs, its Python runs, its summary is what the program prints."""

from __future__ import annotations

import re
from io import StringIO
from pathlib import Path

import pytest
from demos import FOLDER, demo
from rich.console import Console

from spanwright.design.run import design
from spanwright.io.command_line import main
from spanwright.io.project_file import parse_project
from spanwright.io.screen import print_summary

README = (FOLDER.parent / "README.md").read_text(encoding="utf-8")


def block(language: str) -> str:
    found = re.search(rf"```{language}\n(.*?)```", README, re.DOTALL)
    assert found is not None
    return found.group(1)


def test_the_least_project_file_designs_and_passes() -> None:
    assert design(parse_project(block("toml"))).passes


def test_the_python_runs(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "demo_projects").symlink_to(FOLDER)
    monkeypatch.chdir(tmp_path)
    exec(block("python"), {})
    assert "Feed store" in capsys.readouterr().out
    assert (tmp_path / "roof.out" / "results.json").exists()


def test_the_summary_is_what_the_program_prints() -> None:
    stream = StringIO()
    print_summary(design(demo("pratt_store")), Console(file=stream, width=120, highlight=False))
    printed = {line.strip() for line in stream.getvalue().splitlines()}
    shown = README.partition("(shortened):")[2].partition("\n## ")[0]
    for line in shown.splitlines():
        assert not line.strip() or line.strip() in printed, line


def test_every_command_of_the_table_is_there(capsys: pytest.CaptureFixture[str]) -> None:
    commands = re.findall(r"\| `spanwright (\w+)", README)
    with pytest.raises(SystemExit):
        main(["--help"])
    text = capsys.readouterr().out
    assert len(commands) >= 6
    assert all(re.search(rf"^ +{command}\b", text, re.MULTILINE) for command in commands)


def test_every_path_it_names_exists() -> None:
    for path in re.findall(r"(?:demo_projects|io)/[\w/]+\.(?:toml|png|json)", README):
        assert (FOLDER.parent / path).exists(), path
