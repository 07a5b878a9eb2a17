"""Deflection, sliding end, camber, and the forces on the bearings."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from demos import DEMOS, demo

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.design.serviceability import below_bearing_line
from spanwright.truss.model import Role
from spanwright.truss.stiffness import solve


@pytest.fixture(scope="module", params=DEMOS)
def done(request: pytest.FixtureRequest) -> Design:
    return design(demo(request.param))


def test_deflection_agrees_with_virtual_work(done: Design) -> None:
    """Unit-load theorem: v = sum(N n L / EA), n from a unit load at the joint; bearings do not settle."""
    truss, analysis = done.setting.truss, done.analysis
    row = next(row for row in done.serviceability.deflections if row.name == "total")
    column = next(at for at, combo in enumerate(analysis.combinations) if combo.name == row.combination)
    joint = truss.joint(row.joint)
    unit = np.zeros((len(truss.joint_names), 2, 1))
    unit[joint, 1, 0] = -1.0
    virtual = solve(truss, analysis.axial_stiffness, unit).forces[:, 0]
    work = float((analysis.forces[:, column] * virtual * truss.lengths / analysis.axial_stiffness).sum())
    assert row.value == pytest.approx(work, rel=1e-9)


def test_limits_are_the_span_over_the_stated_numbers(done: Design) -> None:
    spans = {row.name: row.limit for row in done.serviceability.deflections}
    assert spans == {"variable": done.setting.truss.span / 300.0, "total": done.setting.truss.span / 250.0}


def test_settlement_of_both_bearings_alike_is_no_deflection(done: Design) -> None:
    truss = done.setting.truss
    sunk = np.zeros((len(truss.joint_names), 2, 1))
    sunk[:, 1] = -12.0
    assert np.abs(below_bearing_line(truss, sunk)).max() < 1e-9


def test_steel_is_added_where_it_lowers_deflection_until_the_limit_holds() -> None:
    project = demo("pratt_store")
    loose = design(project)
    total = next(row for row in loose.serviceability.deflections if row.name == "total")
    tighter = 0.8 * total.value
    strict = design(replace(project, deflection=replace(project.deflection, total=loose.setting.truss.span / tighter)))
    assert strict.passes
    assert strict.mass > loose.mass
    fails = [lighter.fails for lighter in strict.next_lighter if lighter.fails is not None]
    assert any(failed.check == "deflection, total" for failed in fails)


def test_given_sections_that_deflect_too_much_fail_the_design() -> None:
    project = demo("howe_workshop")
    sections: dict[Role, str] = {
        "top chord": "2L 80x80x8",
        "bottom chord": "2L 80x80x8",
        "post": "L 80x80x8",
        "diagonal": "L 80x80x8",
    }
    given = replace(project, members=replace(project.members, by_role=sections))
    strict = design(replace(given, deflection=replace(project.deflection, total=5000.0)))
    assert all(choice.passes for choice in strict.choices)
    assert not strict.passes


def test_the_sliding_end_moves_and_the_pinned_one_does_not(done: Design) -> None:
    assert done.serviceability.sliding > 0.0
    pinned = done.setting.truss.bearing_joints[0]
    assert np.abs(done.analysis.displacements[pinned]).max() < 1e-9


def test_bearing_forces_are_the_greatest_of_the_combinations(done: Design) -> None:
    truss, analysis = done.setting.truss, done.analysis
    columns = analysis.columns("STR", "STR-P", "EQU")
    for force in done.bearing_forces:
        if not force.factored:
            continue
        vertical = analysis.reactions[truss.joint(force.joint), 1, columns]
        expected = {"down": vertical.max(), "up": -vertical.min()}.get(force.direction)
        if expected is not None:
            assert force.value == pytest.approx(max(expected, 0.0))
            assert force.down == pytest.approx(expected if force.direction == "down" else -expected)


def test_characteristic_uplift_is_the_least_permanent_load_with_the_wind() -> None:
    done = design(demo("pratt_store"))
    up = max(
        (force for force in done.bearing_forces if force.direction == "up" and not force.factored),
        key=lambda force: force.value,
    )
    assert up.combination.startswith("least + across ridge, suction")


def test_a_hoist_presses_on_the_bearings_beside_the_imposed_load() -> None:
    """Characteristic: permanent + imposed + hoist, all at 1.0; the hoist of 10 kN hangs at mid-span, half to each."""
    done = design(demo("howe_workshop"))
    found = [force for force in done.bearing_forces if force.joint == "B0" and not force.factored]
    down = next(force for force in found if force.direction == "down")
    assert down.combination == "most + imposed + hoist"
    cases = {case.name: at for at, case in enumerate(done.analysis.cases)}
    bearing = done.setting.truss.joint("B0")
    vertical = done.analysis.solutions[0].reactions[bearing, 1]
    assert down.value == pytest.approx(vertical[cases["most"]] + vertical[cases["imposed"]] + 5000.0)
