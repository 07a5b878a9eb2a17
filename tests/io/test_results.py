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
from demos import DEMOS, demo, with_any_legs

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


def test_combinations_with_one_end_sliding_can_be_rebuilt_from_the_cases() -> None:
    """Both pinned: bar forces and reactions of every combination from the case values that its supports name."""
    found = document(design(replace(demo("pratt_store"), supports="both pinned")))
    jsonschema.Draft202012Validator(SCHEMA).validate(found)
    cases = {case["name"]: case for case in found["cases"]}
    assert {combination["supports"] for combination in found["combinations"]} == {"as stated", "one end sliding"}
    for combination in found["combinations"]:
        sliding = combination["supports"] == "one end sliding"
        assert sliding == combination["name"].endswith(", one end sliding")
        infix = "_one_end_sliding" if sliding else ""
        for member in found["members"]:
            forces = member[f"force{infix}_N"]
            expected = sum(factor * forces[case] for case, factor in combination["factors"].items())
            assert member["force_by_combination_N"][combination["name"]] == pytest.approx(expected, abs=1.0)
        for joint in ("B0", "B12"):
            parts = [
                factor * np.array(cases[case][f"reactions{infix}_N"].get(joint, [0.0, 0.0]))
                for case, factor in combination["factors"].items()
            ]
            assert combination["reactions_N"][joint] == pytest.approx(sum(parts), abs=1.0)
    moved = cases["imposed"]["deflections_one_end_sliding_mm"]["B12"][0]
    assert moved > 0.1
    assert cases["imposed"]["deflections_mm"]["B12"] == [0.0, 0.0]


def test_with_one_arrangement_of_the_supports_nothing_is_said_of_another(done: Design) -> None:
    found = document(done)
    assert {combination["supports"] for combination in found["combinations"]} == {"as stated"}
    assert all(member["force_one_end_sliding_N"] == {} for member in found["members"])
    assert all(case["reactions_one_end_sliding_N"] == {} for case in found["cases"])


def test_restraints_say_how_stiff_they_must_be_and_the_anchor_what_reaches_it(done: Design) -> None:
    found = document(done)["restraint"]
    named = {force["part"]: force for force in found["forces_N"]}
    for force in done.restraint_forces:
        assert named[force.part]["required_stiffness_N_per_mm"] == pytest.approx(force.stiffness, abs=0.05)
        assert named[force.part]["combination"] == done.strength_names[force.combination]
    assert found["anchor_force_N"] == pytest.approx(done.anchor_force, abs=0.05)
    assert found["anchor_force_combination"] in done.strength_names
    assert found["anchor_force_relieved_N"] < found["anchor_force_N"]


def test_a_design_by_the_eurocode_keeps_the_schema_too() -> None:
    """Its combinations have a limit state of their own."""
    found = document(design(replace(demo("howe_workshop"), actions="EN 1990:2002, 6.10")))
    jsonschema.Draft202012Validator(SCHEMA).validate(found)
    assert "SLS quasi-permanent" in {combination["limit_state"] for combination in found["combinations"]}


def test_the_same_input_gives_the_same_bytes(done: Design, tmp_path: Path) -> None:
    first = write_results(done, tmp_path).read_bytes()
    again = write_results(design(done.setting.project), tmp_path).read_bytes()
    assert first == again
    assert (
        done.setting.project.source.encode() and json.loads(first)["project"]["as_read"] == done.setting.project.source
    )


def test_pieces_of_unequal_angles_say_which_leg_goes_to_the_gusset() -> None:
    found = document(design(with_any_legs(demo("howe_workshop"))))
    unequal = [piece for piece in found["pieces"] if piece["section"].startswith("L ")]
    assert unequal
    for piece in unequal:
        words = ("long legs together", "short legs together", "long leg to the gusset", "short leg to the gusset")
        assert piece["remarks"][0] in words
