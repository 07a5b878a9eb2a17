"""Buckling lengths by hand, on small trusses with round measures.

In plane joint to joint, sideways between counted restraints, webs their full length: practice notes 2.5 (common
practice) and SANS 10162-1 cl. 15 (from memory). The ridge, unheld ends and inner joints: the project's rules.
"""

import math

import numpy as np
import pytest
from roofs import fink, hand_made, mono_pitch, parallel, raised, restraint, scissor, shallow, triangular

from spanwright.truss.errors import InputError, UnheldEndError
from spanwright.truss.lengths import BucklingLengths, buckling_lengths
from spanwright.truss.model import Truss
from spanwright.truss.restraint import THE_ANCHOR, restrain, without
from spanwright.truss.runs import opposite


def lengths(truss: Truss, **changes: object) -> BucklingLengths:
    given = restraint(**changes)
    return buckling_lengths(truss, restrain(truss, given), given)


def sideways(truss: Truss, bar: str, **changes: object) -> float:
    return float(lengths(truss, **changes).out_of_plane[truss.bar(bar)])


def between(truss: Truss, bar: str, **changes: object) -> tuple[str, str]:
    return lengths(truss, **changes).out_of_plane_between[truss.bar(bar)]


def mates(truss: Truss, bar: str, **changes: object) -> list[str]:
    together = lengths(truss, **changes).together[truss.bar(bar)]
    return [truss.bar_names[k] for k in np.flatnonzero(together)]


def unheld(truss: Truss, **changes: object) -> str:
    with pytest.raises(UnheldEndError) as caught:
        lengths(truss, **changes)
    assert caught.value.key == "restraint"
    return caught.value.joint


# Chords


def test_a_chord_between_purlins_on_every_joint_has_its_panel_both_ways() -> None:
    truss = raised()
    found = lengths(truss)
    top = list(truss.top.bars)
    assert found.in_plane[top] == pytest.approx([2500.0] * 8)
    assert found.out_of_plane[top] == pytest.approx([2500.0] * 8)
    assert found.in_plane_between[truss.bar("TC3")] == ("T2", "T3")
    assert found.out_of_plane_between[truss.bar("TC3")] == ("purlin line 3", "purlin line 4")


def test_under_uplift_the_bottom_chord_runs_sideways_from_brace_to_brace() -> None:
    # load reversal: in plane one panel of 2 m, sideways two panels between braces, not one
    truss = shallow()
    found = lengths(truss, knee_braces="every 2nd purlin")
    bottom = list(truss.bottom.bars)
    assert found.in_plane[bottom] == pytest.approx([2000.0] * 8)
    assert found.out_of_plane[bottom] == pytest.approx([4000.0] * 8)
    assert found.out_of_plane_between[truss.bar("BC4")] == ("knee brace B2 to line 3", "knee brace B4 to line 5")


def test_purlins_alone_leave_the_bottom_chord_its_whole_length() -> None:
    truss = raised()
    assert sideways(truss, "BC4") == pytest.approx(16000.0)
    assert between(truss, "BC4") == ("bearing B0", "bearing B8")


def test_braces_to_loose_lines_leave_it_too() -> None:
    truss = shallow()
    assert sideways(truss, "BC4", knee_braces=("B4",), anchored=(1, 2, 3, 7, 8, 9)) == pytest.approx(16000.0)


def test_a_brace_that_rises_too_far_leaves_it_too() -> None:
    assert sideways(shallow(), "BC4", knee_braces=("B4",)) == pytest.approx(8000.0)
    assert sideways(raised(), "BC4", knee_braces=("B4",)) == pytest.approx(16000.0)  # 4 m below the ridge


def test_ties_hold_the_bottom_chord_where_they_cross() -> None:
    truss = raised()
    found = lengths(truss, bottom_ties=("B3",))
    assert found.out_of_plane[list(truss.bottom.bars)] == pytest.approx([6000.0] * 3 + [10000.0] * 5)
    assert found.out_of_plane_between[truss.bar("BC4")] == ("tie at B3", "bearing B8")


def test_the_ridge_is_no_restraint() -> None:
    # purlins 7 m up each slope of 10 m and none that is anchored at the ridge: 2 x 3 m over the apex
    truss = triangular()
    changes: dict[str, object] = {"purlins": (0.0, 7000.0), "anchored": (1, 2, 4, 5)}
    assert sideways(truss, "TC4", **changes) == pytest.approx(6000.0)
    assert between(truss, "TC4", **changes) == ("purlin line 2", "purlin line 4")
    # bars wholly or partly between 7 m and 13 m along the chord: panels of 2.5 m
    assert mates(truss, "TC4", **changes) == ["TC3", "TC4", "TC5", "TC6"]
    assert mates(truss, "TC5", **changes) == ["TC3", "TC4", "TC5", "TC6"]


def test_with_nothing_anchored_a_triangular_top_chord_buckles_from_heel_to_heel() -> None:
    truss = triangular()
    found = lengths(truss, anchored_by="nothing")
    assert found.out_of_plane[list(truss.top.bars)] == pytest.approx([20000.0] * 8)
    assert found.out_of_plane_between[truss.bar("TC1")] == ("bearing B0", "bearing B8")
    assert found.together[np.ix_(truss.top.bars, truss.top.bars)].all()
    assert not found.together[np.ix_(truss.top.bars, truss.bottom.bars)].any()


def test_a_ridge_pair_leaves_the_piece_over_the_apex_short_and_the_next_ones_shorter() -> None:
    truss = raised()
    found = lengths(truss, ridge_pair=250.0)
    # TC4 lies in two runs: 7500 to 9750 and, over the apex, 9750 to 10250; it takes the longer
    assert found.out_of_plane[truss.bar("TC4")] == pytest.approx(2250.0)
    assert [run.length for run in found.runs if run.chord == "top"] == pytest.approx(
        [2500, 2500, 2500, 2250, 500, 2250, 2500, 2500, 2500]
    )
    assert mates(truss, "TC4", ridge_pair=250.0) == ["TC4", "TC5"]


def test_a_purlin_between_joints_holds_and_the_bar_takes_its_longest_run() -> None:
    # lines at 0, 3.5, 6 and 10 m up a slope of 2.5 m panels
    truss = raised()
    found = lengths(truss, purlins=(0.0, 3500.0, 6000.0))
    assert found.out_of_plane[list(truss.top.bars[:4])] == pytest.approx([3500.0, 3500.0, 4000.0, 4000.0])
    assert mates(truss, "TC2", purlins=(0.0, 3500.0, 6000.0)) == ["TC1", "TC2", "TC3"]
    assert found.in_plane[truss.bar("TC2")] == pytest.approx(2500.0)


def test_a_loose_line_between_two_anchored_ones_is_passed() -> None:
    assert sideways(raised(), "TC2", anchored=(1, 3, 4, 5, 6, 7, 8, 9)) == pytest.approx(5000.0)


# Ends


def test_the_top_joint_above_a_raised_heel_needs_its_own_purlin() -> None:
    # bearings held: they hold B0 and B8, not T0 and T8
    assert unheld(raised(), anchored=tuple(range(2, 10))) == "T0"
    assert unheld(raised(), anchored=tuple(range(1, 9))) == "T8"
    assert unheld(raised(), purlins=(1000.0, 5000.0)) == "T0"


def test_with_nothing_anchored_a_raised_heel_is_an_error() -> None:
    assert unheld(raised(), anchored_by="nothing") == "T0"


def test_bearings_that_are_not_held_leave_the_bottom_chord_unheld() -> None:
    assert unheld(raised(), bearings_held=False) == "B0"
    # a brace at the bearing joint itself mends it
    assert sideways(raised(), "BC1", bearings_held=False, knee_braces=("B0", "B8")) == pytest.approx(16000.0)


def test_an_unheld_end_says_what_would_hold_it() -> None:
    with pytest.raises(UnheldEndError, match=r"T0 and T8 sideways[^!]*anchor purlin line 1"):
        lengths(raised(), anchored="none")
    with pytest.raises(UnheldEndError, match=r"B0 and B8 sideways[^!]*bearings_held = true or brace it"):
        lengths(raised(), bearings_held=False)
    with pytest.raises(UnheldEndError, match="let an anchored purlin line stand there"):
        lengths(raised(), purlins=(1000.0, 5000.0))


def test_a_purlin_on_the_overhang_bounds_the_run_beyond_the_heel() -> None:
    # lines at -1000, 1200, 3400: T0 lies inside the run of 2.2 m, which is longer than from T0 to the line
    truss = raised(overhang=800.0)
    assert sideways(truss, "TC1", purlins=2500.0) == pytest.approx(2200.0)
    assert between(truss, "TC1", purlins=2500.0) == ("purlin line 1", "purlin line 2")


def test_a_mono_pitch_needs_a_purlin_at_its_high_end() -> None:
    truss = mono_pitch()
    assert unheld(truss, anchored=(1, 2, 3)) == "T3"
    assert sideways(truss, "T1-T2", anchored=(1, 4)) == pytest.approx(15000.0)
    assert sideways(truss, "B1-B2") == pytest.approx(12000.0)
    assert between(truss, "A-B1") == ("purlin line 1 and bearing A", "bearing B3")


def test_a_bottom_chord_that_ends_in_the_air_needs_both_ends_held() -> None:
    truss = parallel()
    assert unheld(truss) == "B1"
    assert unheld(truss, bottom_ties=("B1",)) == "B3"
    assert unheld(truss, knee_braces=("B2",)) == "B1"
    found = lengths(truss, bottom_ties=("B1", "B3"))
    assert found.out_of_plane[truss.bar("B1-B2")] == pytest.approx(6000.0)
    # the end diagonals run from the top chord to the end of the bottom one
    assert found.out_of_plane_between[truss.bar("T0-B1")] == ("top chord at T0", "bottom chord at B1")


def test_a_scissors_bottom_chord_is_followed_through_its_kink() -> None:
    truss = scissor()
    leg = math.hypot(8.0, 2.0) * 1000.0
    assert sideways(truss, "B1-B2") == pytest.approx(2 * leg)
    assert between(truss, "B1-B2", bottom_ties=("B2",))[1] == "tie at B2"
    assert sideways(truss, "B1-B2", bottom_ties=("B2",)) == pytest.approx(leg)
    # B1 and B2 in plane: half a leg
    assert lengths(truss).in_plane[truss.bar("A-B1")] == pytest.approx(leg / 2)


def test_a_variant_reports_unheld_ends_and_infinite_lengths() -> None:
    truss, given = raised(), restraint()
    held = restrain(truss, given)
    found = buckling_lengths(truss, without(held, "purlin line 1"), given, allow_unheld=True)
    assert found.unheld == ("T0",)
    assert found.out_of_plane[truss.bar("TC1")] == math.inf
    assert found.minor[truss.bar("TC1")] == math.inf
    assert found.out_of_plane_between[truss.bar("TC1")] == ("nothing", "purlin line 2")
    assert found.out_of_plane[truss.bar("TC2")] == pytest.approx(2500.0)
    bare = buckling_lengths(truss, without(held, THE_ANCHOR), given, allow_unheld=True)
    assert bare.unheld == ("T0", "T8")
    assert np.isinf(bare.out_of_plane[list(truss.top.bars)]).all()
    assert bare.out_of_plane[list(truss.bottom.bars)] == pytest.approx([16000.0] * 8)
    (whole,) = [run for run in bare.runs if run.chord == "top"]
    assert (whole.from_along, whole.to_along, whole.between) == (0.0, truss.top.length, ("nothing", "nothing"))


# Webs and inner joints


def test_a_web_has_its_full_length_both_ways() -> None:
    truss = raised()
    found = lengths(truss)
    web = truss.bar("D2")
    assert found.in_plane[web] == found.out_of_plane[web] == pytest.approx(float(truss.lengths[web]))
    assert np.flatnonzero(found.together[web]).tolist() == [web]


def test_an_inner_joint_of_a_fink_is_passed_sideways_and_holds_in_the_plane() -> None:
    # M1 lies in the middle of B2 to T4, 4 m at 60 degrees: 2 m each part in plane, 4 m sideways
    truss = fink()
    found = lengths(truss)
    lower, upper = truss.bar("D3"), truss.bar("D4")
    assert found.in_plane[[lower, upper]] == pytest.approx([2000.0, 2000.0])
    assert found.out_of_plane[[lower, upper]] == pytest.approx([4000.0, 4000.0])
    assert found.minor[lower] == pytest.approx(4000.0)
    assert found.in_plane_between[lower] == ("B2", "M1")
    assert found.out_of_plane_between[upper] == ("bottom chord at B2", "top chord at T4")
    assert [truss.bar_names[k] for k in np.flatnonzero(found.together[lower])] == ["D3", "D4"]


def test_webs_that_end_at_an_inner_joint_are_held_by_the_run_that_passes() -> None:
    truss = fink()
    found = lengths(truss)
    for name in ("P3", "D2"):
        bar = truss.bar(name)
        assert found.out_of_plane[bar] == pytest.approx(float(truss.lengths[bar]))
        assert "webs that pass M1" in found.out_of_plane_between[bar]


def test_an_inner_joint_that_no_run_passes_is_refused() -> None:
    # M hangs on three webs, none straight on into another
    truss = hand_made(
        "A 0 0, T 4 4, E 8 0, M 4 1.5",
        "top A T E, bottom A E, web M A, web M T, web M E",
        "A E",
    )
    given = restraint()
    with pytest.raises(UnheldEndError, match="M sideways: on no chord") as caught:
        lengths(truss)
    assert caught.value.joint == "M"
    variant = buckling_lengths(truss, restrain(truss, given), given, allow_unheld=True)
    assert variant.unheld == ("M",)
    assert np.isinf(variant.out_of_plane[[truss.bar(name) for name in ("M-A", "M-T", "M-E")]]).all()


def test_a_run_that_hangs_on_another_run_is_held_by_it() -> None:
    # N is passed by A-N-M, which itself ends at M, inside the post B-M-T between the chords
    truss = hand_made(
        "A 0 0, T 4 4, E 8 0, B 4 0, M 4 2, N 2 1, R 2 2",
        "top A R T E, bottom A B E, web B M T, web A N M, web N R, web N B, web M E",
        "A E",
    )
    found = lengths(truss)
    assert found.out_of_plane[truss.bar("A-N")] == pytest.approx(math.hypot(4, 2) * 1000.0)
    assert found.out_of_plane_between[truss.bar("A-N")] == ("bottom chord at A", "webs that pass M")
    assert found.out_of_plane_between[truss.bar("N-R")] == ("webs that pass N", "top chord at R")


def test_a_leg_below_the_chord_is_held_only_by_a_held_bearing() -> None:
    truss = hand_made("A 0 0, T 4 4, E 8 0, F 8 -1", "top A T E, bottom A E, web E F", "A F")
    assert between(truss, "E-F") == ("bearing F", "bottom chord at E")
    with pytest.raises(UnheldEndError, match="F sideways"):
        lengths(truss, bearings_held=False)


def test_in_plane_a_length_passes_a_joint_where_only_collinear_bars_meet() -> None:
    # S splits the bottom chord and nothing else meets there
    truss = hand_made("A 0 0, T 4 3, E 8 0, S 3 0, B 4 0", "top A T E, bottom A S B E, web B T", "A E")
    found = lengths(truss)
    for name in ("A-S", "S-B"):
        assert found.in_plane[truss.bar(name)] == pytest.approx(4000.0)
        assert found.in_plane_between[truss.bar(name)] == ("A", "B")
    assert found.in_plane[truss.bar("B-E")] == pytest.approx(4000.0)


def test_in_plane_a_kink_or_a_bearing_ends_a_length() -> None:
    kink = hand_made("A 0 0, T 4 3, E 8 0, S 4 0.2", "top A T E, bottom A S E", "A E")
    assert lengths(kink).in_plane[kink.bar("A-S")] == pytest.approx(math.hypot(4000.0, 200.0))
    bearing = hand_made("A 0 0, T 4 3, E 8 0, S 4 0", "top A T E, bottom A S E", "A S E")
    assert lengths(bearing).in_plane[bearing.bar("A-S")] == pytest.approx(4000.0)


def test_straight_on_is_the_opposite_direction_within_a_milliradian() -> None:
    assert opposite((1.0, 0.0), (-1.0, 0.0))
    assert opposite((1.0, 0.0), (-math.cos(9e-4), math.sin(9e-4)))
    assert not opposite((1.0, 0.0), (-math.cos(1.1e-3), math.sin(1.1e-3)))
    assert not opposite((1.0, 0.0), (1.0, 0.0))


# Factors, twist


def test_factors_stretch_each_direction() -> None:
    truss = raised()
    found = lengths(truss, factor_in=1.1, factor_out=1.2)
    assert found.in_plane[truss.bar("BC2")] == pytest.approx(2200.0)
    assert found.out_of_plane[truss.bar("BC2")] == pytest.approx(19200.0)
    assert found.torsional[truss.bar("BC2")] == pytest.approx(19200.0)
    assert found.minor[truss.bar("BC2")] == pytest.approx(19200.0)
    # what is drawn is the distance itself
    assert {run.length for run in found.runs if run.chord == "bottom"} == {16000.0}


def test_a_factor_below_1_needs_a_reason() -> None:
    for name in ("factor_in", "factor_out"):
        with pytest.raises(InputError, match="without a reason") as caught:
            lengths(raised(), **{name: 0.9})
        assert caught.value.key == "restraint.effective_length_factor"
    assert sideways(raised(), "BC2", factor_out=0.9, reason="ends fixed in the wall") == pytest.approx(14400.0)


@pytest.mark.parametrize("factor", [0.0, -1.0, 0.4, math.nan, math.inf])
def test_an_impossible_factor_is_refused(factor: float) -> None:
    with pytest.raises(InputError, match="effective length factor"):
        lengths(raised(), factor_in=factor, reason="none that could do")


def test_the_torsional_length_is_the_sideways_one_unless_twist_is_held() -> None:
    truss = raised()
    bar = truss.bar("BC4")
    assert lengths(truss).torsional[bar] == pytest.approx(16000.0)
    assert lengths(truss, twist_held="gussets and webs").torsional[bar] == pytest.approx(2000.0)
    # never longer for it: a purlin between joints leaves 1.5 m sideways in panels of 2.5 m
    close = lengths(truss, purlins=1500.0, twist_held="gussets and webs")
    assert close.torsional[truss.bar("TC3")] == close.out_of_plane[truss.bar("TC3")]


def test_minor_is_the_greater_of_the_two() -> None:
    found = lengths(shallow(), knee_braces=("B4",), ridge_pair=300.0)
    assert found.minor == pytest.approx(np.maximum(found.in_plane, found.out_of_plane))


def test_runs_are_listed_for_drawing_and_cover_each_chord() -> None:
    truss = shallow()
    runs = lengths(truss, knee_braces="every 2nd purlin").runs
    for chord in (truss.top, truss.bottom):
        on = [run for run in runs if run.chord == chord.name]
        assert on[0].from_along == 0.0
        assert on[-1].to_along == chord.length
        assert [run.to_along for run in on[:-1]] == [run.from_along for run in on[1:]]
        assert sum(run.length for run in on) == pytest.approx(chord.length)
        assert {bar for run in on for bar in run.bars} == set(chord.bars)
