"""What point restraints must resist and how stiff they must be, and what reaches the anchor.

2 % of the compression, and k = 2 beta Cu/Lb with beta = 4: SANS 10162-1 cl. 9.2 by S16-01 9.2.6 (from memory).
"""

from __future__ import annotations

import numpy as np
import pytest
from roofs import raised, restraint, shallow, triangular

from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.restraint import Restraint, restrain
from spanwright.truss.restraint_forces import RestraintForce, anchor_force, restraint_forces


def forces_of(truss: Truss, held: Restraint, compression: FloatArray) -> tuple[RestraintForce, ...]:
    """Return the forces for one combination."""
    return restraint_forces(truss, held, compression[:, None], 0.02, 4.0)


def test_a_restraint_resists_its_share_of_the_greater_compression_beside_it() -> None:
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B2", "B6")))
    compression = np.zeros(len(truss.bar_names))
    compression[list(truss.top.bars)] = [10e3, 20e3, 30e3, 40e3, 50e3, 60e3, 70e3, 80e3]
    compression[list(truss.bottom.bars)] = [0, 5e3, 90e3, 8e3, 7e3, 6e3, 2e3, 1e3]
    found = forces_of(truss, held, compression)
    assert [(force.part, force.kind, force.at) for force in found] == [
        *((f"purlin line {k}", "purlin line", f"T{k - 1}") for k in range(1, 10)),
        ("bearing B0", "bearing", "B0"),
        ("knee brace B2", "knee brace", "B2"),
        ("knee brace B6", "knee brace", "B6"),
        ("bearing B8", "bearing", "B8"),
    ]
    # a line on every joint: 2 % of the greater of the two bars beside it
    assert [force.force for force in found[:9]] == pytest.approx([200, 400, 600, 800, 1000, 1200, 1400, 1600, 1600])
    # the runs beside B2 reach from B0 to B6, those beside B6 from B2 to B8; the end bar of the bottom chord carries
    # nothing, but the run that the bearing ends does
    assert [force.force for force in found[9:]] == pytest.approx([100, 1800, 1800, 40])


def test_between_joints_the_place_is_told_by_the_joints_beside_it() -> None:
    truss = raised(overhang=800.0)
    held = restrain(truss, restraint(purlins=2500.0))
    compression = np.full(len(truss.bar_names), 100e3)
    forces = [force for force in forces_of(truss, held, compression) if force.kind == "purlin line"]
    assert [force.at for force in forces][:3] == ["left of T0", "T0 to T1", "T1 to T2"]
    assert forces[-1].at == "right of T8"
    assert [force.force for force in forces] == pytest.approx([2000.0] * len(forces))


def test_a_bearing_that_holds_both_chords_takes_the_greater() -> None:
    truss = triangular()
    compression = np.zeros(len(truss.bar_names))
    compression[truss.bar("TC1")], compression[truss.bar("BC1")] = 40e3, 10e3
    forces = forces_of(truss, restrain(truss, restraint(anchored="none")), compression)
    assert [force.part for force in forces] == ["bearing B0", "bearing B8"]
    assert [force.force for force in forces] == pytest.approx([800.0, 800.0])


def test_every_restraint_of_a_chord_that_is_never_pressed_resists_nothing() -> None:
    truss = raised()
    forces = forces_of(truss, restrain(truss, restraint()), np.zeros(len(truss.bar_names)))
    assert [(force.force, force.stiffness) for force in forces] == [(0.0, 0.0)] * len(forces)
    assert len(forces) == 11


def test_a_restraint_is_as_stiff_as_8_times_the_compression_over_the_length_of_its_run() -> None:
    """By hand: the brace at B2 ends runs of 4 m with 20 kN and 12 m with 90 kN: 8 x 90/12 = 60 N/mm, not 40."""
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B2",)))
    compression = np.zeros(len(truss.bar_names))
    compression[list(truss.bottom.bars)] = [20e3, 5e3, 90e3, 8e3, 7e3, 6e3, 2e3, 1e3]
    stiff = {force.part: force.stiffness for force in forces_of(truss, held, compression)}
    assert stiff["knee brace B2"] == pytest.approx(60.0)
    assert stiff["bearing B0"] == pytest.approx(8 * 20e3 / 4e3)
    assert stiff["bearing B8"] == pytest.approx(60.0)


def test_force_and_stiffness_are_the_worst_of_the_combinations_and_the_force_names_its_own() -> None:
    """By hand, runs of 8 m: 2 % of 30 kN, and 8 x 30/8 = 30 N/mm, in the second of three combinations."""
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B4",)))
    compression = np.zeros((len(truss.bar_names), 3))
    compression[list(truss.bottom.bars)] = [10e3, 30e3, 20e3]
    (brace,) = [force for force in restraint_forces(truss, held, compression, 0.02, 4.0) if force.kind == "knee brace"]
    assert (brace.force, brace.combination, brace.stiffness) == pytest.approx((600.0, 1, 30.0))


def test_the_anchor_takes_all_but_the_bearings_of_all_trusses() -> None:
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B4",)))
    found = anchor_force(truss, held, np.full((len(truss.bar_names), 1), 50e3), 0.02, 6)
    # nine lines and one brace, 1 kN each, six trusses
    assert (found.force, found.combination) == pytest.approx((60e3, 0))
    assert anchor_force(truss, restrain(truss, restraint(anchored="none")), np.ones((33, 1)), 0.02, 6).force == 0.0


def test_the_anchor_sums_the_forces_of_one_combination_not_the_worst_of_each_bar() -> None:
    """By hand: gravity presses the top chord, 50 kN at nine lines; uplift the bottom one, 80 kN at one brace."""
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B4",)))
    compression = np.zeros((len(truss.bar_names), 2))
    compression[list(truss.bottom.bars), 0] = 80e3
    compression[list(truss.top.bars), 1] = 50e3
    found = anchor_force(truss, held, compression, 0.02, 1)
    assert (found.force, found.combination) == pytest.approx((9e3, 1))
