"""results.json: its schema holds, its numbers are the design's, and the same input gives the same bytes."""

from __future__ import annotations

import json
from dataclasses import replace
from importlib.resources import files
from pathlib import Path
from typing import Any

import jsonschema
import numpy as np
import pytest
from demos import DEMOS, demo

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.io.results.document import document, write_results

SCHEMA: dict[str, Any] = json.loads(files("spanwright.io.results").joinpath("results.schema.json").read_text())


@pytest.fixture(scope="module", params=DEMOS)
def done(request: pytest.FixtureRequest) -> Design:
    return design(demo(request.param))


def test_the_document_keeps_its_schema(done: Design) -> None:
    jsonschema.Draft202012Validator.check_schema(SCHEMA)
    jsonschema.Draft202012Validator(SCHEMA).validate(document(done))


def test_a_design_that_fails_keeps_it_too() -> None:
    project = demo("howe_workshop")
    crushed = design(replace(project, loads=replace(project.loads, roof_imposed=0.1)))
    found = document(crushed)
    jsonschema.Draft202012Validator(SCHEMA).validate(found)
    assert found["passes"] is False
    assert found["pieces"] == []


def test_every_promised_key_is_there(done: Design) -> None:
    """The keys that design and README promise to machines."""
    promised = (
        "schema program project defaults_used joints supports cases combinations reactions members groups pieces "
        "restraint equilibrium deflection mass_kg findings warnings cautions"
    )
    assert set(promised.split()) <= set(document(done))


def test_joints_balance_in_the_printed_numbers(done: Design) -> None:
    """Equilibrium of every joint from what is printed alone: bar forces, loads, reactions of each case."""
    found = document(done)
    place = {joint["name"]: np.array([joint["x_mm"], joint["y_mm"]]) for joint in found["joints"]}
    for case in found["cases"]:
        sums = {name: np.array(case["loads_N"].get(name, [0.0, 0.0])) for name in place}
        for name, reaction in case["reactions_N"].items():
            sums[name] = sums[name] + reaction
        for member in found["members"]:
            start, end = member["joints"]
            along = (place[end] - place[start]) / np.linalg.norm(place[end] - place[start])
            force = member["force_N"][case["name"]]
            sums[start] = sums[start] + force * along
            sums[end] = sums[end] - force * along
        assert all(np.abs(left).max() < 1.0 for left in sums.values()), case["name"]


def test_combined_forces_are_the_factors_times_the_cases(done: Design) -> None:
    found = document(done)
    member = found["members"][3]
    for combination in found["combinations"]:
        expected = sum(factor * member["force_N"][case] for case, factor in combination["factors"].items())
        assert member["force_by_combination_N"][combination["name"]] == pytest.approx(expected, abs=1.0)


def test_the_same_input_gives_the_same_bytes(done: Design, tmp_path: Path) -> None:
    first = write_results(done, tmp_path).read_bytes()
    again = write_results(design(done.setting.project), tmp_path).read_bytes()
    assert first == again
    assert (
        done.setting.project.source.encode() and json.loads(first)["project"]["as_read"] == done.setting.project.source
    )


def test_pieces_of_unequal_angles_say_which_leg_goes_to_the_gusset() -> None:
    found = document(design(demo("howe_workshop")))
    unequal = [piece for piece in found["pieces"] if piece["section"].startswith("L ")]
    assert unequal
    for piece in unequal:
        words = ("long legs together", "short legs together", "long leg to the gusset", "short leg to the gusset")
        assert piece["remarks"][0] in words
