"""A project with a site, from the command line: one truss, or one for each place in the building."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from demos import FOLDER

from spanwright.io.command_line import main


def test_loads_left_to_the_site_act_and_are_derived(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    project = FOLDER / "coast_shed" / "roof.toml"
    assert main(["design", str(project), "--out", str(tmp_path), "--no-pictures"]) == 0
    found = json.loads((tmp_path / "results.json").read_text())
    winds = [case for case in found["cases"] if case["kind"] == "wind"]
    assert len(winds) > 8
    assert all(case["derivation"] for case in winds)
    assert {step["symbol"] for step in found["site"]["steps"]} >= {"cr", "qp"}
    assert any("verify against the printed standard" in caution for caution in found["cautions"])
    assert "written to" in capsys.readouterr().out


def test_every_place_in_the_building_gets_a_folder_and_loads_of_its_own(tmp_path: Path) -> None:
    project = FOLDER / "coast_shed" / "roof.toml"
    assert main(["design", str(project), "--out", str(tmp_path), "--no-pictures", "--every-truss"]) == 0
    found = {
        name: json.loads((tmp_path / name / "results.json").read_text())
        for name in ("end", "first-interior", "typical-interior")
    }
    marks = {result["project"]["mark"] for result in found.values()}
    assert marks == {"N1E", "N1F", "N1T"}, "pieces of different designs never share a mark"
    uplift = {name: result["reactions"]["up"]["factored"][0]["value_N"] for name, result in found.items()}
    assert uplift["end"] < uplift["typical-interior"] < uplift["first-interior"]


def test_without_a_site_there_is_only_one_truss(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    project = FOLDER / "howe_workshop" / "roof.toml"
    assert main(["design", str(project), "--out", str(tmp_path), "--every-truss"]) == 2
    assert "state [site]" in capsys.readouterr().err
    assert not list(tmp_path.iterdir())
