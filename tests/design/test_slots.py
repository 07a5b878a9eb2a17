"""Tube webs on chords of angles: slotted over a gusset, so with slots, shear lag and words for the workshop."""

from __future__ import annotations

from dataclasses import replace
from functools import cache

import numpy as np
import pytest
from demos import demo
from formulas import assert_formulas_hold
from members import check_named, member_demand, named
from workshop import FINK, HOWE, Shop, shop

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.sans.tension import SlottedTube
from spanwright.design.standard import Ends
from spanwright.io.schedule.notes import notes_table
from spanwright.truss.model import Role

ANGLE_CHORDS = {"posts": "SHS 50x50x3", "diagonals": "CHS 60.3x3"}
TUBE_CHORDS = {"top_chord": "SHS 80x80x4", "bottom_chord": "SHS 80x80x4"}


def net(tube: str, legs: float, slot: float) -> float:
    """Resistance of the net section of a slotted tube, N."""
    family = tube[:3]
    demand = member_demand([[10e3]], ends=Ends(weld_length=legs), slots=[slot])
    checks = SANS_10162_1.checks(named(family, tube), demand)  # type: ignore[arg-type]  # a family
    return float(check_named(checks, "tension, net section").resistance[0, 0])


@pytest.mark.parametrize(
    ("tube", "legs", "fixed", "by_length"),
    [
        # half of the wall between its welds is about 79 mm wide for both tubes
        ("SHS 50x50x3", 5.0, 1.0, 0.0),  # L >= 2 w, from memory
        ("SHS 50x50x3", 2.0, 0.5, 0.25),
        ("SHS 50x50x3", 1.5, 0.0, 0.75),  # L < w, from memory
        ("CHS 60.3x3", 1.5, 0.5, 0.25),
    ],
)
def test_slotted_tubes_lose_the_slots_and_lag(tube: str, legs: float, fixed: float, by_length: float) -> None:
    """S16-01 12.3.3.3: elements welded along two edges; slots 11 mm wide taken off (12.3.2)."""
    section = named(tube[:3], tube)  # type: ignore[arg-type]  # a family
    area = section.area[0] - 2 * 11 * 3
    length, width = legs * section.depth[0], area / (2 * 3)
    expected = 0.85 * 0.9 * (fixed + by_length * length / width) * area * 450
    assert net(tube, legs, 11.0) == pytest.approx(expected)


def test_no_slot_no_loss() -> None:
    tube = named("SHS", "SHS 50x50x3")
    assert net("SHS 50x50x3", 1.5, 0.0) == pytest.approx(0.85 * 0.9 * tube.area[0] * 450)


def test_bars_of_one_group_may_differ() -> None:
    tube = named("SHS", "SHS 50x50x3")
    check = check_named(
        SANS_10162_1.checks(tube, member_demand([[9e3], [9e3]], slots=[0.0, 11.0])), "tension, net section"
    )
    assert check.resistance[0, 0] == pytest.approx(0.85 * 0.9 * tube.area[0] * 450)
    assert check.resistance[0, 1] == pytest.approx(net("SHS 50x50x3", 1.5, 11.0))


def test_printed_formulas_of_slotted_tubes_give_their_values() -> None:
    lengths = np.array([[20.0], [80.0], [120.0], [400.0]])
    rule = SlottedTube(np.full((4, 1), 540.0), np.full((4, 1), 3.0), np.array([0.0, 11.0]), lengths)
    assert sum(assert_formulas_hold(rule, (row, bar)) for row in range(4) for bar in range(2)) == 32


def test_longer_welds_never_weaken_a_slotted_tube() -> None:
    area, thickness, slot = np.array([[540.0]]), np.array([[3.0]]), np.array([11.0])
    areas = [float(SlottedTube(area, thickness, slot, np.array([[L]])).net_area[0, 0]) for L in range(20, 400)]
    assert np.all(np.diff(areas) >= -1e-9)
    assert areas[-1] == pytest.approx(540.0 - 66.0)


def slots(where: Shop) -> dict[str, float]:
    assert where.demand.slots is not None
    return dict(zip(where.demand.bars, where.demand.slots.tolist(), strict=True))


def test_tube_webs_on_chords_of_angles_are_slotted_over_a_gusset() -> None:
    found = slots(shop(HOWE, sections=ANGLE_CHORDS))
    assert {width for bar, width in found.items() if bar[0] in "DP"} == {11.0}
    assert {width for bar, width in found.items() if bar[0] in "TB"} == {0.0}


def test_tubes_on_tubes_and_angles_are_not_slotted() -> None:
    assert not any(slots(shop(HOWE, sections=ANGLE_CHORDS | TUBE_CHORDS)).values())
    assert not any(slots(shop(HOWE)).values())
    assert not any(slots(shop(HOWE, sections={**TUBE_CHORDS, "posts": "SHS 50x50x3"})).values())


def test_one_chord_of_angles_is_enough() -> None:
    found = slots(shop(HOWE, sections=ANGLE_CHORDS | {"top_chord": "SHS 80x80x4"}))
    assert found["D2"] == found["P3"] == 11.0


def test_at_a_joint_on_no_chord_any_angle_asks_for_a_gusset() -> None:
    found = slots(shop(FINK, sections={**TUBE_CHORDS, "posts": "SHS 50x50x3"}))
    joints = {"P1", "P2", "P3", "P4", "P5", "P6"} & found.keys()
    on_inner = {bar for bar in joints if found[bar]}
    assert on_inner
    assert on_inner < joints  # the others run from chord to chord


def test_the_workshop_is_told_slot_and_weld() -> None:
    remark = (
        "slotted over the gusset at both ends: slots 11 mm wide, at least 75 mm of weld along each side of the gusset"
    )
    assert remark in shop(HOWE, sections=ANGLE_CHORDS).piece("R1-P1").remarks
    half = shop(HOWE, sections=ANGLE_CHORDS | {"top_chord": "SHS 80x80x4"}).piece("R1-P1").remarks
    assert any(text.startswith("slotted over the gusset at one end") for text in half)
    assert shop(HOWE, sections=ANGLE_CHORDS | TUBE_CHORDS).piece("R1-P1").remarks == ()


@cache
def _tubes_on_angles() -> Design:
    project = demo("howe_workshop")
    roles: dict[Role, str] = {"post": "SHS", "diagonal": "SHS"}
    return design(replace(project, members=replace(project.members, by_role={**project.members.by_role, **roles})))


def test_a_design_counts_the_slots() -> None:
    done = _tubes_on_angles()
    diagonals = next(choice for choice in done.choices if choice.group.name == "diagonals")
    check = check_named(diagonals.checks, "tension, net section")
    assert done.passes
    assert np.all(check.resistance < 0.85 * 0.9 * diagonals.section.area[0] * diagonals.section.steel_fu[0])
    required = {note: text for note, text in notes_table(done).rows if isinstance(note, str)}["Ends required"]
    assert "Tubes slotted over gussets: four welds a slotted end, 1.5 times the depth long." in str(required)
