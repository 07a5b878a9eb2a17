"""Warnings of the chosen sections: supply in one sentence, joints of tubes outside the usual range."""

from __future__ import annotations

from dataclasses import replace

import pytest
from demos import demo, with_any_legs
from workshop import FINK, HOWE, PRATT, Shop, shop

from spanwright.design.families import find
from spanwright.design.run import design
from spanwright.design.section_warnings import section_warnings, stock_notes

TUBES = {"top_chord": "SHS 80x80x4", "bottom_chord": "SHS 80x80x4", "posts": "SHS 50x50x3", "diagonals": "SHS 50x50x3"}
UNCHECKED = "joints of tubes are not checked"


def joints(where: Shop) -> str:
    return " ".join(text for text in section_warnings(where.setting, where.choices) if "stock list" not in text)


def test_unequal_angles_without_a_stock_list_are_named_in_one_sentence() -> None:
    names = ("L 65x50x5 short leg connected", "2L 80x60x6 long legs together", "L 65x50x5 long leg connected")
    chosen = [find(name, steel="S355JR", gap=8.0) for name in names]
    assert stock_notes(chosen, steel="S355JR", stocked="South Africa") == (
        "no stock list of unequal angles for South Africa is known: L 65x50x5, L 80x60x6: ask the merchant, or state "
        'legs = "equal"',
    )


def test_a_whole_design_warns_once_of_unequal_angles_and_equal_legs_cure_it() -> None:
    project = with_any_legs(demo("howe_workshop"))
    assert sum("no stock list" in text for text in design(project).warnings) == 1
    equal = design(replace(project, members=replace(project.members, equal_legs=True)))
    assert equal.passes
    assert not any("stock list" in text for text in equal.warnings)
    assert all(choice.section.leg_connected[0] == choice.section.leg_outstanding[0] for choice in equal.choices)


def test_joints_of_tubes_are_said_to_be_unchecked() -> None:
    assert joints(shop(PRATT, sections=TUBES)).startswith(UNCHECKED)
    assert joints(shop(HOWE)) == ""
    assert joints(shop(HOWE, sections={"posts": "SHS 50x50x3"})) == ""  # on chords of angles


@pytest.mark.parametrize(
    ("changes", "told"),
    [
        ({"top_chord": "SHS 120x120x3"}, "top chord SHS 120x120x3 is 40.0 walls wide, more than 35"),
        ({"top_chord": "CHS 323.9x6"}, "top chord CHS 323.9x6 is 54.0 walls wide, more than 50"),
        ({"bottom_chord": "RHS 120x60x3 upright"}, "bottom chord RHS 120x60x3, upright is 40.0 walls wide"),
        (
            {"bottom_chord": "SHS 150x150x6"},
            "posts SHS 50x50x3 is 0.33 of the width of the bottom chord, less than 0.35",
        ),
        (
            {"posts": "CHS 33.7x3", "bottom_chord": "CHS 219.1x6.3"},
            "0.15 of the width of the bottom chord, less than 0.2",
        ),
    ],
)
def test_tube_joints_outside_the_usual_range_are_named(changes: dict[str, str], told: str) -> None:
    """Limits of EN 1993-1-8 7.1.2 and table 7.8, from memory: b/t 35, d/t 50, width ratio 0.35, round 0.2."""
    assert told in joints(shop(FINK, sections=TUBES | changes))


@pytest.mark.parametrize("chord", ["SHS 100x100x4", "CHS 139.7x4", "RHS 120x60x5 flat"])
def test_tube_joints_within_the_range_are_not(chord: str) -> None:
    sections = TUBES | {"top_chord": chord, "bottom_chord": chord}
    told = joints(shop(FINK, sections=sections))
    assert "walls wide" not in told
    assert "of the width" not in told


def test_flat_webs_on_tube_chords_are_named() -> None:
    """Less than 30 degrees (EN 1993-1-8 7.1.2, from memory): D2 of a flat Howe meets the chord at 18 degrees."""
    assert "D2, D9: less than 30 deg to the chord" in joints(shop(HOWE, sections=TUBES))


def test_hot_finished_tubes_are_chosen_from_their_own_table() -> None:
    project = demo("pratt_store")
    roles = dict.fromkeys(project.members.by_role, "SHS")
    for process in ("cold", "hot"):
        members = replace(project.members, by_role=roles, by_group={}, tube_process=process)
        done = design(replace(project, members=members))
        assert all(bool(choice.section.hot[0]) == (process == "hot") for choice in done.choices)
