"""Forces on the bearings where both ends are held: thrust, one end sliding, and which of equal forces is told."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from demos import demo

from spanwright.design.reactions import BearingForce, bearing_forces
from spanwright.design.result import Design
from spanwright.design.run import design


@pytest.fixture(scope="module")
def pinned() -> Design:
    return design(replace(demo("pratt_store"), supports="both pinned"))


def of(found: Design, direction: str, *, factored: bool) -> list[BearingForce]:
    return [force for force in found.bearing_forces if (force.direction, force.factored) == (direction, factored)]


def test_both_pinned_warns_of_the_thrust_that_columns_must_resist(pinned: Design) -> None:
    (warned,) = [warning for warning in pinned.warnings if "thrusts" in warning]
    columns = pinned.analysis.columns("STR", "STR-P", "EQU")
    for joint in pinned.setting.truss.bearing_joints:
        thrust = np.abs(pinned.analysis.reactions[joint, 0, columns]).max()
        assert f"{thrust / 1e3:.1f} kN at {pinned.setting.truss.joint_names[joint]}" in warned
    assert not any("thrusts" in warning for warning in design(demo("pratt_store")).warnings)


def test_the_thrust_is_that_of_a_truss_whose_ends_cannot_part(pinned: Design) -> None:
    """Force method: the thrust closes the gap that the sliding truss opens, H = movement / movement by H = 1."""
    analysis, truss = pinned.analysis, pinned.setting.truss
    stated, sliding = analysis.solutions
    case = next(at for at, case in enumerate(analysis.cases) if case.name == "imposed")
    end = truss.bearing_joints[-1]
    bottom = list(truss.bottom.bars)
    per_newton = float((truss.lengths[bottom] / analysis.axial_stiffness[bottom]).sum())
    opened = float(sliding.displacements[end, 0, case])
    assert abs(stated.reactions[end, 0, case]) == pytest.approx(opened / per_newton, rel=1e-9)


def test_characteristic_reactions_know_every_arrangement_of_the_supports(pinned: Design) -> None:
    """A push on the right bearing goes into it where it is held, and to the left one where the right one slides."""
    project = pinned.setting.project
    winds = (replace(project.loads.wind[0], left=0.0, right=0.0, eaves_right=100e3, mirrored=False),)
    pushed = design(replace(project, loads=replace(project.loads, wind=winds)))
    named = {force.joint: force for force in of(pushed, "along the span", factored=False)}
    assert named["B0"].value == pytest.approx(100e3, rel=1e-9)
    assert named["B0"].combination.endswith(", one end sliding")


def test_of_equal_forces_down_the_one_that_pushes_most_sideways_is_told(pinned: Design) -> None:
    """Held at both ends or at one, the bearing carries the same load down; with both it is thrust besides."""
    for factored in (True, False):
        for force in of(pinned, "down", factored=factored):
            assert not force.combination.endswith("one end sliding")
            assert abs(force.right) > 1e3


def test_ties_within_rounding_are_ties(pinned: Design) -> None:
    """The sliding arrangement, a trifle heavier by rounding, does not hide the thrust."""
    analysis = pinned.analysis
    reactions = analysis.reactions.copy()
    half = reactions.shape[2] // 2
    reactions[:, 1, half:] *= 1.0 + 1e-12
    nudged = bearing_forces(pinned.setting.truss, replace(analysis, reactions=reactions))
    assert nudged[0].combination == pinned.bearing_forces[0].combination
