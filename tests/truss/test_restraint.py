"""What holds and what does not: paths to the anchor, knee braces, ties, missing parts.

Purlins count only on an anchored line, and do nothing for the other chord: practice notes 2.1 (common practice).
Counting of braces and ties, reach and heights: the project's convention.
"""

import pickle

import pytest
from roofs import fink, hand_made, mono_pitch, parallel, raised, restraint, scissor, shallow, triangular

from spanwright.truss.errors import InputError, UnknownNameError
from spanwright.truss.model import Truss
from spanwright.truss.restraint import (
    ANCHOR,
    THE_ANCHOR,
    Restraint,
    held_points,
    parts,
    restrain,
    without,
)


def by(truss: Truss, held: Restraint, chord: str) -> list[str]:
    return [point.by for point in held_points(truss, held)[chord]]


def braced(truss: Truss, **changes: object) -> list[str]:
    return [brace.at for brace in restrain(truss, restraint(**changes)).braces]


def tied(truss: Truss, **changes: object) -> list[str]:
    return [tie.at for tie in restrain(truss, restraint(**changes)).ties]


def test_an_anchored_line_holds_the_top_chord_and_not_the_bottom_one() -> None:
    truss = raised()
    held = restrain(truss, restraint())
    assert by(truss, held, "top") == [f"purlin line {number}" for number in range(1, 10)]
    assert by(truss, held, "bottom") == ["bearing B0", "bearing B8"]


def test_a_loose_line_holds_nothing_nor_does_a_brace_to_it() -> None:
    truss = shallow()
    held = restrain(truss, restraint(anchored=(1, 5, 7, 9), knee_braces=("B2", "B6")))
    assert by(truss, held, "top") == ["purlin line 1", "purlin line 5", "purlin line 7", "purlin line 9"]
    assert by(truss, held, "bottom") == ["bearing B0", "knee brace B6 to line 7", "bearing B8"]
    loose, counted = held.braces
    assert (loose.at, loose.line, loose.counted, loose.why_not) == ("B2", 3, False, "purlin line 3 is not anchored")
    assert counted.counted
    assert "The knee brace B2 holds nothing: purlin line 3 is not anchored." in held.warnings
    assert any("lines 2, 3, 4, 6, 8 are not anchored" in warning for warning in held.warnings)


def test_where_nothing_anchors_only_bearings_hold() -> None:
    truss = raised()
    held = restrain(truss, restraint(anchored_by="nothing", knee_braces="every purlin", bottom_ties=("B4",)))
    assert by(truss, held, "top") == []
    assert by(truss, held, "bottom") == ["bearing B0", "bearing B8"]
    assert held.counted == {"bearing B0", "bearing B8"}
    assert not any(brace.counted for brace in held.braces)
    assert any("nothing anchors them" in warning for warning in held.warnings)
    assert "The tie at B4 holds nothing: nothing anchors the lines." in held.warnings


def test_a_diaphragm_anchors_as_roof_bracing_does() -> None:
    truss = shallow()
    bracing = restrain(truss, restraint(knee_braces="every 2nd purlin"))
    diaphragm = restrain(truss, restraint(knee_braces="every 2nd purlin", anchored_by="diaphragm"))
    assert held_points(truss, bracing) == held_points(truss, diaphragm)


def test_a_bearing_holds_only_the_joint_that_bears_and_only_if_stated() -> None:
    truss = raised()
    assert by(truss, restrain(truss, restraint(anchored="none")), "top") == []
    assert by(truss, restrain(truss, restraint(bearings_held=False)), "bottom") == []


def test_a_heel_that_both_chords_share_is_held_for_both() -> None:
    truss = triangular()
    bearing = restrain(truss, restraint(anchored="none"))
    assert by(truss, bearing, "top") == by(truss, bearing, "bottom") == ["bearing B0", "bearing B8"]
    line = restrain(truss, restraint(anchored=(1, 9), bearings_held=False))
    assert by(truss, line, "bottom") == ["purlin line 1", "purlin line 9"]


def test_no_path_leads_through_a_joint() -> None:
    # a loose line on the heel, which its bearing holds: the line is no better for it, nor is a brace to it
    truss = hand_made("A 0 0, T 4 3, E 8 0, M 0.2 -0.1", "top A T E, bottom A M E, web M T", "A E")
    held = restrain(truss, restraint(anchored=(2, 3), knee_braces=("M",)))
    assert held.graph.has_edge("purlin line 1", truss.joint("A"))
    assert held.graph.has_edge("bearing A", truss.joint("A"))
    assert not {"purlin line 1", "knee brace M"} & held.counted
    assert held.holding(truss.joint("M")) == ()


def test_the_graph_names_its_nodes_and_cannot_be_changed() -> None:
    truss = shallow()
    graph = restrain(truss, restraint(knee_braces=("B4",), bottom_ties=("B2",))).graph
    kinds = {str(data["kind"]) for _, data in graph.nodes(data=True)}
    assert kinds == {"joint", "purlin line", "knee brace", "bottom tie", "bearing", "anchor"}
    assert set(graph.adj["knee brace B4"]) == {truss.joint("B4"), "purlin line 5"}
    assert set(graph.adj["tie at B2"]) == {truss.joint("B2"), ANCHOR}
    with pytest.raises(Exception, match="Frozen"):
        graph.add_edge("purlin line 1", ANCHOR)


def test_a_purlin_between_joints_holds_the_chord_where_it_stands() -> None:
    truss = raised()
    point = held_points(truss, restrain(truss, restraint(purlins=(0.0, 3750.0))))["top"][1]
    assert (point.joint, point.by) == (None, "purlin line 2")
    assert point.along == pytest.approx(3750.0)


def test_every_2nd_purlin_counts_from_the_ridge() -> None:
    assert braced(raised(), knee_braces="every 2nd purlin") == ["B2", "B4", "B6"]
    assert braced(raised(), knee_braces="every 3rd purlin") == ["B1", "B4", "B7"]
    assert braced(raised(), knee_braces="every purlin") == [f"B{k}" for k in range(1, 8)]
    # with four panels on each side the 4th line stands above the bearing, which is not braced
    assert braced(raised(), knee_braces="every 4th purlin") == ["B4"]


def test_a_ridge_pair_is_number_0_and_gets_one_brace_below() -> None:
    held = restrain(raised(), restraint(knee_braces="every 2nd purlin", ridge_pair=200.0))
    assert [brace.at for brace in held.braces] == ["B2", "B4", "B6"]
    # lines 1 2 3 4 [5 6] 7 8 9 10: the brace at mid-span runs to one of the pair
    assert [brace.line for brace in held.braces if brace.at != "B4"] == [3, 8]
    assert held.braces[1].line in (5, 6)


def test_of_two_lines_within_reach_the_anchored_one_takes_the_brace() -> None:
    held = restrain(shallow(), restraint(knee_braces=("B4",), ridge_pair=200.0, anchored=(1, 6, 10)))
    assert (held.braces[0].line, held.braces[0].counted) == (6, True)


def test_a_mono_pitch_counts_from_its_high_end() -> None:
    truss = mono_pitch()
    # line 4 stands over the bearing B3, line 1 on the heel
    assert braced(truss, knee_braces="every 2nd purlin") == ["B1"]


def test_lines_with_no_joint_below_are_not_braced_and_none_at_all_is_warned() -> None:
    held = restrain(raised(), restraint(purlins=(0.0, 1200.0), ridge_pair=1000.0, knee_braces="every purlin"))
    assert held.braces == ()
    assert any("No knee brace stands" in warning for warning in held.warnings)


def test_a_brace_that_rises_more_than_2_5_m_is_too_soft_to_count() -> None:
    """Project rule. Rises of 1, 2.5, 4 and 5.5 m from B0 to B3 up to their purlins; one warning for all."""
    truss = raised()
    held = restrain(truss, restraint(knee_braces=("B3", "B2", "B1", "B0")))
    assert [brace.rise for brace in held.braces] == pytest.approx([1000.0, 2500.0, 4000.0, 5500.0])
    assert [brace.counted for brace in held.braces] == [True, True, False, False]
    assert held.braces[2].why_not == "purlin line 3 is 4.00 m above it, more than 2.5 m"
    assert sorted(by(truss, held, "bottom")) == [
        "bearing B0",
        "bearing B8",
        "knee brace B0 to line 1",
        "knee brace B1 to line 2",
    ]
    assert not {"knee brace B2", "knee brace B3"} & set(parts(held))
    (warned,) = held.warnings
    assert "B2 (4.00 m), B3 (5.50 m)" in warned


def test_a_listed_brace_reaches_300_mm_in_plan() -> None:
    # slope 3 in 4: 2500 mm is the joint above B1; 370 mm of slope is 296 mm in plan, 380 mm is 304 mm
    assert braced(raised(), purlins=(0.0, 2870.0), knee_braces=("B1",)) == ["B1"]
    with pytest.raises(InputError, match=r"0\.3 m in plan of B1: the nearest, purlin line 2, is 0\.304 m") as caught:
        braced(raised(), purlins=(0.0, 2880.0), knee_braces=("B1",))
    assert caught.value.key == "restraint.knee_braces"


@pytest.mark.parametrize(
    ("truss", "changes", "key", "found"),
    [
        (raised(), {"knee_braces": ("B44",)}, "knee_braces", 'no joint is called "B44"'),
        (raised(), {"knee_braces": ("T3",)}, "knee_braces", "T3 is not on the bottom chord"),
        (triangular(), {"knee_braces": ("B0",)}, "knee_braces", "on the top chord too"),
        (raised(), {"knee_braces": "every other purlin"}, "knee_braces", "every other purlin"),
        (raised(), {"knee_braces": "every 0th purlin"}, "knee_braces", "every 0th purlin"),
        (raised(), {"knee_braces": "every 2nd joint"}, "knee_braces", "every 2nd joint"),
        (fink(), {"knee_braces": "every 2nd purlin"}, "knee_braces", "Fink"),
        (fink(), {"bottom_ties": "every 2nd joint"}, "bottom_ties", "Fink"),
        (raised(), {"bottom_ties": "every 2nd purlin"}, "bottom_ties", "every 2nd purlin"),
        (raised(), {"bottom_ties": ("M1",)}, "bottom_ties", 'no joint is called "M1"'),
        (mono_pitch(), {"bottom_ties": "every 2nd joint"}, "bottom_ties", "mid-span"),
    ],
)
def test_refused(truss: Truss, changes: dict[str, object], key: str, found: str) -> None:
    with pytest.raises(InputError, match=found) as caught:
        restrain(truss, restraint(**changes))
    assert caught.value.key == f"restraint.{key}"
    assert caught.value.remedy


def test_ties_count_from_mid_span_and_leave_out_bearings() -> None:
    assert tied(raised(), bottom_ties="every 2nd joint") == ["B2", "B4", "B6"]
    assert tied(raised(), bottom_ties="every 3rd joint") == ["B1", "B4", "B7"]
    assert tied(scissor(), bottom_ties="every joint") == ["B1", "B2", "B3"]
    assert tied(fink(), bottom_ties=("B3", "B2")) == ["B2", "B3"]


def test_the_ends_of_a_chord_that_do_not_bear_are_counted() -> None:
    assert tied(parallel(), bottom_ties="every joint") == ["B1", "B2", "B3"]


def test_an_end_held_only_on_the_overhang_is_warned() -> None:
    truss = raised(overhang=800.0)
    beyond = restrain(truss, restraint(purlins=2500.0)).warnings
    assert [warning for warning in beyond if "Nothing holds T0 itself" in warning and "purlin line 1." in warning]
    assert [warning for warning in beyond if "Nothing holds T8 itself" in warning and "purlin line 11." in warning]
    assert restrain(truss, restraint()).warnings == ()


# What can go missing


def test_every_counted_part_can_go_missing_and_loose_ones_cannot() -> None:
    held = restrain(shallow(), restraint(anchored=(1, 3, 9), knee_braces=("B2", "B4"), bottom_ties=("B6",)))
    assert parts(held) == (
        "purlin line 1",
        "purlin line 3",
        "purlin line 9",
        "connection of purlin line 3",
        "knee brace B2",
        "tie at B6",
        "bearing B0",
        "bearing B8",
        THE_ANCHOR,
    )


def test_a_missing_line_takes_its_braces_along_and_a_missing_connection_does_not() -> None:
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B2", "B4")))
    line = without(held, "purlin line 3")
    assert "purlin line 3" not in by(truss, line, "top")
    assert by(truss, line, "bottom") == ["bearing B0", "knee brace B4 to line 5", "bearing B8"]
    assert [brace.counted for brace in line.braces] == [False, True]
    connection = without(held, "connection of purlin line 3")
    assert "purlin line 3" not in by(truss, connection, "top")
    assert by(truss, connection, "bottom") == by(truss, held, "bottom")
    assert "connection of purlin line 3" not in parts(connection)


def test_a_line_between_joints_can_lose_its_connection_too() -> None:
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B4",), ridge_pair=200.0, anchored=(1, 6, 10)))
    assert by(truss, held, "top") == ["purlin line 1", "purlin line 6", "purlin line 10"]
    left = without(held, "connection of purlin line 6")
    assert by(truss, left, "top") == ["purlin line 1", "purlin line 10"]
    assert by(truss, left, "bottom") == by(truss, held, "bottom")


def test_a_missing_brace_tie_or_bearing_takes_one_point() -> None:
    truss = shallow()
    held = restrain(truss, restraint(knee_braces=("B2",), bottom_ties=("B4",)))
    assert by(truss, held, "bottom") == ["bearing B0", "knee brace B2 to line 3", "tie at B4", "bearing B8"]
    assert by(truss, without(held, "knee brace B2"), "bottom") == ["bearing B0", "tie at B4", "bearing B8"]
    assert by(truss, without(held, "tie at B4"), "bottom") == ["bearing B0", "knee brace B2 to line 3", "bearing B8"]
    assert by(truss, without(held, "bearing B0"), "bottom") == ["knee brace B2 to line 3", "tie at B4", "bearing B8"]
    assert by(truss, without(held, "knee brace B2"), "top") == by(truss, held, "top")


def test_without_the_anchor_only_bearings_stay() -> None:
    truss = shallow()
    bare = without(restrain(truss, restraint(knee_braces=("B2",), bottom_ties=("B4",))), THE_ANCHOR)
    assert held_points(truss, bare)["top"] == ()
    assert by(truss, bare, "bottom") == ["bearing B0", "bearing B8"]
    assert parts(bare) == ("bearing B0", "bearing B8")


def test_only_what_counts_can_be_taken_away() -> None:
    held = restrain(raised(), restraint(anchored=(1, 9)))
    with pytest.raises(UnknownNameError, match="purlin line 5"):
        without(held, "purlin line 5")


def test_every_point_belongs_to_a_part() -> None:
    truss = shallow()
    held = restrain(truss, restraint(knee_braces="every 2nd purlin", bottom_ties=("B3",), ridge_pair=300.0))
    points = [point for chord in held_points(truss, held).values() for point in chord]
    assert {point.part for point in points} <= set(parts(held))
    for point in points:
        left = held_points(truss, without(held, point.part))
        assert point not in left["top"] + left["bottom"]


def test_a_restraint_survives_pickling() -> None:
    held = restrain(shallow(), restraint(knee_braces="every 2nd purlin"))
    assert held.counted
    assert pickle.loads(pickle.dumps(held)) == held
