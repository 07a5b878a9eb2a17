"""Runs of bars, their ends and cut lengths, against lengths worked by hand and geometry found another way."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from roofs import hand_made, scissor
from shapely import Polygon
from strategies import trusses
from workshop import FINK, HOWE, PRATT, Shop, hand_made_shop, shop

from spanwright.design.cut_ends import Passing, web_end
from spanwright.design.cutting import Cut, cuts
from spanwright.design.families import find
from spanwright.design.lying import edges, lying
from spanwright.truss.errors import InputError
from spanwright.truss.model import Truss

# Worked by hand with a calculator. Centroids as printed in handbooks: 80x8 22.6, 70x7 19.7, 60x6 16.9 mm from the back.
# So the toes of the chords are 80 - 22.6 = 57.4 (top) and 70 - 19.7 = 50.3 mm (bottom) from the setting-out line, and
# the farther edge of a web is 60 - 16.9 = 43.1 mm from its own. A web at the angle b to a chord loses there
# (edge + setback 20 + 43.1 cos b) / sin b.
#
# Howe 15 m, 18 degrees, panels of 1500 mm: 1500 tan 18 = 487.38 mm of height a panel.
#   TC1  7500/cos 18 + 22.6 tan 18 (tip of the mitre)         = 7885.97 + 7.34             = 7893.31
#   P1   bottom, 90: 50.3 + 20 = 70.3; top, 72: (77.4 + 13.32)/0.95106 = 95.39;   487.38 - 165.69       =  321.69
#   P5   2436.90 - 165.69                                                                   = 2271.21
#   D2   bottom, 18: (70.3 + 40.99)/0.30902 = 360.14; top, 36: (77.4 + 34.87)/0.58779 = 191.00;
#        1577.19 - 551.14                                                                   = 1026.05
BY_HAND_HOWE = {"TC1": 7893.31, "BC1": 15000.0, "P1": 321.69, "P5": 2271.21, "D2": 1026.05}
# Pratt 18 m, 5 degrees, heel 900, panels of 1500 mm: 131.23 mm of height a panel.
#   TC1  9000/cos 5 + 22.6 tan 5                              = 9034.38 + 1.98             = 9036.36
#   P0   70.3; top, 85: (77.4 + 3.76)/0.99619 = 81.47;        900 - 151.77                  =  748.23
#   P6   1687.40 - 151.77                                                                   = 1535.63
#   D1   T0 to B1, 1749.29 long at 30.964: bottom (70.3 + 36.96)/0.51450 = 208.47;
#        top, 35.964: (77.4 + 34.89)/0.58727 = 191.20;        1749.29 - 399.67              = 1349.62
BY_HAND_PRATT = {"TC1": 9036.36, "BC1": 18000.0, "P0": 748.23, "P6": 1535.63, "D1": 1349.62}
# Compound Fink 13.5 m, 30 degrees: struts square to the rafter, other webs at 60 to the tie and at 30 to the rafter.
#   losses: tie, 60: (70.3 + 21.55)/0.86603 = 106.06; rafter, 90: 77.4; rafter, 30: (77.4 + 37.33)/0.5 = 229.45;
#   at M1 the sling B2-M1-T4 runs past, edge 43.1, at 60: (63.1 + 21.55)/0.86603 = 97.75
#   TC1  7794.23 + 22.6 tan 30 = 7807.28;   P1  1125 - 183.46 = 941.54;   P2  2250 - 183.46 = 2066.54
#   P3   1125 - 97.75 - 77.4 = 949.85;      D1  2250 - 335.51 = 1914.49;  D2  2250 - 97.75 - 229.45 = 1922.80
#   D3 and D4 in one piece, B2-M1-T4: 4500 - 335.51 = 4164.49
BY_HAND_FINK = {
    "TC1": 7807.28,
    "BC1": 13500.0,
    "P1": 941.54,
    "P2": 2066.54,
    "P3": 949.85,
    "D1": 1914.49,
    "D2": 1922.80,
    "D3": 4164.49,
}
ROUNDING = 0.5
"""mm: what centroids printed to 0.1 mm leave at the flattest web, 0.05 (1 + 1)/sin 18 at each end."""


def cut_of(where: Shop, bar: str) -> Cut:
    index = where.setting.truss.bar(bar)
    return next(cut for cut in cuts(where.setting, where.choices) if index in cut.bars)


def length(cut: Cut) -> float:
    return cut.length(lying(cut.choice.section, cut.choice.group.role)[0])


@pytest.mark.parametrize(
    ("roof", "by_hand"),
    [(HOWE, BY_HAND_HOWE), (PRATT, BY_HAND_PRATT), (FINK, BY_HAND_FINK)],
    ids=["Howe", "Pratt", "Fink"],
)
def test_lengths_are_those_worked_by_hand(roof: str, by_hand: dict[str, float]) -> None:
    where = shop(roof)
    for bar, expected in by_hand.items():
        assert length(cut_of(where, bar)) == pytest.approx(expected, abs=ROUNDING), bar


def bars_by_cut(where: Shop) -> list[str]:
    names = where.setting.truss.bar_names
    return [" ".join(names[bar] for bar in cut.bars) for cut in cuts(where.setting, where.choices)]


def test_a_chord_is_one_piece_between_kinks() -> None:
    found = bars_by_cut(shop(HOWE))
    assert found[:3] == [
        "TC1 TC2 TC3 TC4 TC5",
        "TC6 TC7 TC8 TC9 TC10",
        "BC1 BC2 BC3 BC4 BC5 BC6 BC7 BC8 BC9 BC10",
    ]


def test_a_chord_is_split_where_its_group_changes_and_butts_there_square() -> None:
    where = shop(HOWE, more='[groups]\ntie = ["BC5", "BC6"]\n[members.groups]\ntie = "2L 60x60x6"')
    assert bars_by_cut(where)[2:5] == ["BC1 BC2 BC3 BC4", "BC5 BC6", "BC7 BC8 BC9 BC10"]
    middle = cut_of(where, "BC5")
    assert [end.kind for end in middle.ends] == ["square", "square"]
    assert length(middle) == 3000.0


def test_webs_in_line_through_an_inner_joint_are_one_piece_and_others_end_at_it() -> None:
    found = bars_by_cut(shop(FINK))
    assert {"D3 D4", "D5 D6", "D2", "P3", "P5"} <= set(found)


def test_webs_in_line_of_two_groups_are_two_pieces_that_end_beside_their_joint() -> None:
    """Each stands one setback of 20 from M1, half-way along 4500: 2250 - 20 - 106.06 and 2250 - 20 - 229.45."""
    where = shop(FINK, more='[groups]\nupper = ["D4", "D5"]')
    assert {"D3", "D4", "D5", "D6"} <= set(bars_by_cut(where))
    assert length(cut_of(where, "D3")) == pytest.approx(2123.94, abs=ROUNDING)
    assert length(cut_of(where, "D4")) == pytest.approx(2000.55, abs=ROUNDING)


def test_webs_in_line_at_a_chord_are_two_pieces() -> None:
    truss = hand_made(
        "A 0 0, T1 4 3, T2 8 3, E 12 0, B1 4 0, B2 8 0, C1 4 -3, C2 8 -3",
        "top A T1 T2 E, bottom A B1 B2 E, web B1 T1, web B2 T2, web T1 B2, web C1 B1, web C2 B2, web C1 C2",
        "A E",
    )
    assert {"B1-T1", "C1-B1"} <= set(bars_by_cut(hand_made_shop(truss)))


@settings(max_examples=40, deadline=None)
@given(trusses())
def test_every_bar_is_in_exactly_one_cut(truss: Truss) -> None:
    where = hand_made_shop(truss, SLENDER, setback=0.0)
    found = [bar for cut in _cuts_or_none(where) for bar in cut.bars]
    assert sorted(found) in ([], list(range(len(truss.bar_names))))


SLENDER = {"top_chord": "2L 50x50x5", "bottom_chord": "2L 50x50x5", "posts": "L 50x50x5", "diagonals": "L 50x50x5"}


def _cuts_or_none(where: Shop) -> tuple[Cut, ...]:
    try:
        return cuts(where.setting, where.choices)
    except InputError as error:
        assert error.key == "members.setback"
        return ()


@settings(max_examples=40, deadline=None)
@given(trusses())
def test_every_web_is_one_setback_clear_of_the_chords(truss: Truss) -> None:
    """Second opinion on lengths: the distance between the outlines as polygons."""
    where = hand_made_shop(truss, SLENDER)
    found = _cuts_or_none(where)
    chords = [Polygon(cut.outline) for cut in found if "chord" in cut.choice.group.role]
    for cut in found:
        if "chord" in cut.choice.group.role:
            continue
        outline = Polygon(cut.outline)
        gap = min(outline.distance(chord) for chord in chords)
        assert gap >= 20.0 - 1e-6
        if set(truss.ends[cut.bars[0]]) & set(truss.bottom.joints):
            assert gap == pytest.approx(20.0)


@settings(max_examples=40, deadline=None)
@given(trusses())
def test_the_two_halves_of_a_symmetrical_truss_are_cut_alike(truss: Truss) -> None:
    found = _cuts_or_none(hand_made_shop(truss, SLENDER))
    half = truss.span / 2.0

    def left(cut: Cut) -> float:
        return float(cut.start[0] + cut.finish[0]) / 2.0

    lengths = sorted(round(length(cut), 3) for cut in found if left(cut) < half - 1e-3)
    assert lengths == pytest.approx(sorted(round(length(cut), 3) for cut in found if left(cut) > half + 1e-3), abs=2e-3)


def test_an_overhang_is_added_along_the_slope() -> None:
    plain, long = shop(HOWE), shop(f'{HOWE}\noverhang = "0.6 m"')
    added = length(cut_of(long, "TC1")) - length(cut_of(plain, "TC1"))
    assert added == pytest.approx(600.0 / math.cos(math.radians(18)))


def test_rafters_meet_at_the_ridge_without_gap_or_overlap() -> None:
    where = shop(HOWE)
    left, right = (Polygon(cut_of(where, bar).outline) for bar in ("TC1", "TC10"))
    assert left.intersection(right).area == pytest.approx(0.0, abs=1e-6)
    # the shared edge is the section's depth over the cosine of the pitch
    assert left.buffer(1e-6).intersection(right).length / 2 == pytest.approx(
        80.0 / math.cos(math.radians(18)), abs=1e-3
    )


def test_a_bottom_chord_that_peaks_is_measured_to_the_tip_of_its_toe() -> None:
    """A scissor's bottom chord kinks like a ridge; its heel is below, so its toe is the long edge."""
    where = hand_made_shop(scissor())
    cut = cut_of(where, "A-B1")
    pitch = math.atan(0.25)
    toe = 70.0 - 19.7
    assert length(cut) == pytest.approx(8000.0 / math.cos(pitch) + toe * math.tan(pitch), abs=0.1)


def test_an_end_with_no_chord_and_nothing_through_stands_one_setback_from_the_joint() -> None:
    truss = hand_made("A 0 0, T 6 4, E 12 0, M 6 2", "top A T E, bottom A E, web A M, web E M, web M T", "A E")
    where = hand_made_shop(truss)
    top = (77.4 + 43.1 * math.sin(math.atan(4 / 6))) / math.cos(math.atan(4 / 6))
    assert length(cut_of(where, "M-T")) == pytest.approx(2000.0 - 20.0 - top, abs=0.2)


def test_a_web_without_room_is_refused_with_its_name_and_key() -> None:
    with pytest.raises(InputError, match=r"no room for P1 \(L 60x60x6\): it is 264 mm long") as caught:
        where = shop('form = "Howe"\nspan = "15 m"\npitch = "10 deg"\npanels = 10', 'setback = "80 mm"')
        cuts(where.setting, where.choices)
    assert caught.value.key == "members.setback"


# Tubes


TUBES = {
    "top_chord": "SHS 100x100x5",
    "bottom_chord": "SHS 100x100x5",
    "posts": "SHS 50x50x4",
    "diagonals": "SHS 50x50x4",
}


def test_square_tubes_are_mitred_to_the_flat_faces_of_chords() -> None:
    """Axis to the face at 50/sin b, and beyond it at each end half the web's depth times cot b, to the tip."""
    where = shop(PRATT, sections=TUBES)
    post = cut_of(where, "P6")
    assert [end.kind for end in post.ends] == ["square", "mitre"]
    diagonal = cut_of(where, "D1")
    low, high = math.atan(900 / 1500), math.atan(900 / 1500) + math.radians(5)
    expected = math.hypot(900, 1500) - sum((50 - 25 * math.cos(b)) / math.sin(b) for b in (low, high))
    assert length(diagonal) == pytest.approx(expected)
    outline = Polygon(diagonal.outline)
    for chord in ("TC1", "BC1"):
        touching = outline.buffer(1e-6).intersection(Polygon(cut_of(where, chord).outline))
        assert touching.area == pytest.approx(0.0, abs=1e-3)
        assert touching.length > 100.0


def test_a_tube_on_a_pair_of_angles_is_cut_square_with_the_setback() -> None:
    where = shop(PRATT, sections={"posts": "SHS 50x50x4"})
    # 900 - (50.3 + 20) - (57.4 + 20 + 25 cos 85)/sin 85
    assert length(cut_of(where, "P0")) == pytest.approx(900 - 70.3 - 79.88, abs=0.2)


@pytest.mark.parametrize("degrees", [30.0, 45.0, 60.0, 75.0, 90.0])
@pytest.mark.parametrize("web", ["CHS 60.3x4", "CHS 114.3x5", "SHS 60x60x4"])
def test_a_profile_to_a_round_tube_reaches_its_deepest_point(degrees: float, web: str) -> None:
    """Second opinion: follow generators of the web in space until they meet the cylinder of the chord."""
    chord, section = find("CHS 139.7x5", steel="S355JR"), find(web, steel="S355JR")
    angle = math.radians(degrees)
    along = np.array([math.cos(angle), -math.sin(angle)])
    radius = 139.7 / 2
    found = web_end(section, "diagonal", along, [Passing(np.array([1.0, 0.0]), radius, chord)], 20.0)
    assert found.end.kind == "profile"
    depths = []
    half = float(section.depth[0]) / 2
    for turn in np.linspace(0.0, 2 * math.pi, 2001):
        across, beside = half * math.cos(turn), half * math.sin(turn)
        if web.startswith("SHS"):
            scale = half / max(abs(across), abs(beside))
            across, beside = across * scale, beside * scale
        # a point s up the web from the joint: height s sin a + across cos a, and sideways `beside`
        depths.append((math.sqrt(max(radius**2 - beside**2, 0.0)) - across * math.cos(angle)) / math.sin(angle))
    assert found.length - found.end.beyond == pytest.approx(min(depths), abs=0.05)


def test_round_tubes_are_measured_to_the_tips_of_their_saddles() -> None:
    """A web of 60.3 meets one of 139.7 square: the saddle is sqrt(69.85^2 - 30.15^2) = 63.01 from the axis.

    At 85 degrees it is as deep, farther round. The post is 900 between joints: 900 - 2 x 63.01.
    """
    round_tubes = {
        "top_chord": "CHS 139.7x5",
        "bottom_chord": "CHS 139.7x5",
        "posts": "CHS 60.3x4",
        "diagonals": "CHS 60.3x4",
    }
    assert length(cut_of(shop(PRATT, sections=round_tubes), "P0")) == pytest.approx(773.98, abs=0.02)


def test_the_angles_of_a_starred_pair_are_in_opposite_corners() -> None:
    upper, lower = lying(find("2L star 60x60x6", steel="S355JR", gap=8.0), "top chord")
    assert (upper.lower, upper.upper, lower.lower, lower.upper) == (4.0, 64.0, -64.0, -4.0)
    assert (upper.heel_up, lower.heel_up) == (False, True)
    assert upper.far != lower.far


def test_edges_of_a_web_allow_for_either_way_round() -> None:
    section = find("L 60x60x6", steel="S355JR")
    lower, upper = edges(section, "diagonal")
    assert (lower, upper) == pytest.approx((-43.1, 43.1), abs=0.1)
    assert edges(find("2L star 60x60x6", steel="S355JR", gap=8.0), "post") == (-64.0, 64.0)
