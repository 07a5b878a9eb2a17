"""Hands of pieces, against the turning of solids in space: pieces of one hand can be turned into one another."""

from __future__ import annotations

import math

import numpy as np
import pytest
from roofs import hand_made, scissor
from workshop import FINK, HOWE, PRATT, Shop, hand_made_shop, shop

from spanwright.design.cut_ends import SQUARE, End
from spanwright.design.cutting import Cut, cuts
from spanwright.design.hands import ends_and_hand
from spanwright.design.lying import Lying, lying


def turning(cut: Cut, lies: Lying) -> int:
    """Return +1 or -1: the sense of (first end to second end, heel to toe, into the outstanding leg) in space.

    x along the truss, y up, z towards the viewer. The first end is the squarer one.
    """
    slants = [abs(end.slant) for end in cut.ends]
    assert slants[0] != pytest.approx(slants[1])
    ends = (cut.start, cut.finish) if slants[0] < slants[1] else (cut.finish, cut.start)
    along = np.array([*(ends[1] - ends[0]), 0.0])
    upward = np.array([-cut.direction[1], cut.direction[0], 0.0])
    to_toe = -upward if lies.heel_up else upward
    outstanding = np.array([0.0, 0.0, -1.0 if lies.far else 1.0])
    return int(np.sign(np.dot(along, np.cross(to_toe, outstanding))))


def mono_kink() -> Shop:
    """Return a roof whose top chord kinks once, off its middle, with a top chord that is square at both its ends."""
    truss = hand_made("A 0 0, T 6 4, E 14 0, B 6 0", "top A T E, bottom A B E, web B T", "A E")
    return hand_made_shop(truss)


@pytest.mark.parametrize(
    "where",
    [
        shop(HOWE),
        hand_made_shop(shop(PRATT).setting.truss, {"top_chord": "L 100x75x8 long leg connected"}),
        shop(FINK, sections={"top_chord": "2L star 80x80x8"}),
        hand_made_shop(scissor()),
        mono_kink(),
    ],
    ids=["pairs", "single angles", "starred", "both chords kinked", "unequal slopes"],
)
def test_a_hand_is_a_sense_of_turning(where: Shop) -> None:
    """Seen from the inside, outstanding leg on top: to the right, down, towards the eye; that sense is -1, and is L."""
    seen = set()
    for cut in cuts(where.setting, where.choices):
        for lies in lying(cut.choice.section, cut.choice.group.role):
            hand = ends_and_hand(cut, lies)[1]
            seen.add(hand)
            if hand:
                assert turning(cut, lies) == (-1 if hand == "L" else 1)
    assert seen == {"", "L", "R"}


def test_the_near_angle_of_a_left_rafter_is_a_left_hand() -> None:
    where = shop(HOWE)
    left, right = cuts(where.setting, where.choices)[:2]
    near, far = lying(left.choice.section, "top chord")
    assert [ends_and_hand(cut, lies)[1] for cut in (left, right) for lies in (near, far)] == ["L", "R", "R", "L"]


def with_ends(start: End, finish: End) -> Cut:
    where = shop(HOWE)
    cut = cuts(where.setting, where.choices)[0]
    return Cut(cut.bars, cut.choice, np.array([0.0, 0.0]), np.array([1000.0, 0.0]), (start, finish))


TEN, TWENTY = math.tan(math.radians(10)), math.tan(math.radians(20))


def mitred(slant: float) -> End:
    return End("mitre", slant)


def test_a_piece_that_mirrors_itself_has_no_hand() -> None:
    lies = Lying(-60.0, 20.0, heel_up=True)
    assert ends_and_hand(with_ends(SQUARE, SQUARE), lies) == (("square", "square"), "")
    # long at the heel at both ends, as between the two kinks of a mansard
    ends, hand = ends_and_hand(with_ends(mitred(-TEN), mitred(TEN)), lies)
    assert (set(ends), hand) == ({"mitre 10.0 deg, long at heel"}, "")


def test_parallel_cuts_are_opposite_and_make_a_hand() -> None:
    near, far = Lying(-60.0, 20.0, heel_up=True), Lying(-60.0, 20.0, heel_up=True, far=True)
    cut = with_ends(mitred(TEN), mitred(TEN))
    assert ends_and_hand(cut, near) == (("mitre 10.0 deg, long at toe", "mitre 10.0 deg, long at heel"), "L")
    assert ends_and_hand(cut, far)[1] == "R"


def test_a_tube_has_no_hand_and_is_named_alike_however_it_is_turned() -> None:
    tube = Lying(-50.0, 50.0, heel_up=None)
    pairs = [(TEN, TWENTY), (-TEN, -TWENTY), (-TWENTY, -TEN), (TWENTY, TEN)]
    found = {ends_and_hand(with_ends(mitred(a), mitred(b)), tube) for a, b in pairs}
    assert found == {(("mitre 10.0 deg, long at side B", "mitre 20.0 deg, long at side A"), "")}
    other = ends_and_hand(with_ends(mitred(-TEN), mitred(TWENTY)), tube)[0]
    assert other == ("mitre 10.0 deg, long at side A", "mitre 20.0 deg, long at side A")
    assert ends_and_hand(with_ends(SQUARE, mitred(-TEN)), tube)[0] == ("square", "mitre 10.0 deg")


def test_a_profile_names_the_tube_and_the_angle_between_the_axes() -> None:
    tube = Lying(-30.0, 30.0, heel_up=None)
    cut = with_ends(End("profile", 0.0, 5.0, "CHS 139.7x5"), End("profile", TWENTY, 9.0, "CHS 114.3x5"))
    assert ends_and_hand(cut, tube)[0] == ("profile to CHS 139.7x5 at 90.0 deg", "profile to CHS 114.3x5 at 70.0 deg")
