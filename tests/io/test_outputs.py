"""A run's folder: whole or visibly not, whatever goes wrong on the way."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

import pytest
from demos import FOLDER, demo

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.io import outputs
from spanwright.io.command_line import main
from spanwright.io.outputs import write_all
from spanwright.truss.errors import OutputError


@pytest.fixture(scope="module")
def done() -> Design:
    return design(demo("howe_workshop"))


def test_an_output_that_fails_is_told_and_the_rest_is_written(
    done: Design, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def fails(design: Design, folder: Path, *, every_member: bool) -> None:
        raise OutputError("the typesetter said no", file=str(folder / "calculation.pdf"))

    (tmp_path / "calculation.pdf").write_bytes(b"of an earlier run")
    monkeypatch.setattr(outputs, "_calculation", fails)
    monkeypatch.setattr(outputs, "_drawing", lambda design, folder: None)
    failures = write_all(done, tmp_path, pictures=False)
    assert [failure.found for failure in failures] == ["the typesetter said no"]
    assert not (tmp_path / "calculation.pdf").exists()
    assert (tmp_path / "results.json").exists()
    assert (tmp_path / "schedule.xlsx").exists()


def test_an_interrupted_run_leaves_no_results_that_make_the_folder_look_whole(
    done: Design, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def interrupted(design: Design, folder: Path) -> None:
        raise KeyboardInterrupt

    (tmp_path / "results.json").write_text("{}")
    monkeypatch.setattr(outputs, "_drawing", interrupted)
    with pytest.raises(KeyboardInterrupt):
        write_all(done, tmp_path, pictures=False)
    assert not (tmp_path / "results.json").exists()


def test_a_place_that_is_taken_by_a_folder_is_a_failure_like_any_other(
    done: Design, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(outputs, "_calculation", lambda design, folder, *, every_member: None)
    monkeypatch.setattr(outputs, "_drawing", lambda design, folder: None)
    (tmp_path / "schedule.csv").mkdir()
    failures = write_all(done, tmp_path, pictures=False)
    assert failures
    assert (tmp_path / "results.json").exists()


def test_a_pipe_is_no_drawing(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    pipe = tmp_path / "pipe.dxf"
    os.mkfifo(pipe)
    assert main(["wireframe", str(pipe)]) == 2
    assert "a folder or a device" in capsys.readouterr().err


def test_a_screen_that_takes_nothing_is_said_to_be_so() -> None:
    command = [sys.executable, "-P", "-m", "spanwright", "check", str(FOLDER / "howe_workshop" / "roof.toml")]
    closed = subprocess.run([*command], stdout=subprocess.DEVNULL, stderr=subprocess.PIPE, text=True, check=False)
    assert closed.returncode == 2
    with Path("/dev/full").open("w") as full:
        starter = [sys.executable, "-P", "-m", "spanwright", "starter"]
        found = subprocess.run(starter, stdout=full, stderr=subprocess.PIPE, text=True, check=False)
    assert found.returncode == 1
    assert "the output cannot be shown" in found.stderr
