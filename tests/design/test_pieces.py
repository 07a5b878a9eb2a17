"""Pieces: marks, hands, numbers, masses and remarks, and the packing plates."""

from __future__ import annotations

from collections import Counter
from dataclasses import replace
from typing import cast

import numpy as np
import pytest
from demos import DEMOS, demo
from roofs import parallel
from workshop import FINK, HOWE, PRATT, Shop, hand_made_shop, shop

from spanwright.design.candidates import Candidates
from spanwright.design.cutting import cuts
from spanwright.design.packs import packs_by_bar
from spanwright.design.pieces import Piece
from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.design.standard import Demand, Standard
from spanwright.truss.arrays import IntArray
from spanwright.truss.errors import InputError


@pytest.fixture(scope="module", params=DEMOS)
def done(request: pytest.FixtureRequest) -> Design:
    return design(demo(request.param))


def members_only(pieces: tuple[Piece, ...]) -> list[Piece]:
    return [piece for piece in pieces if piece.description != "packing plate"]


def test_marks_are_named_after_the_first_bar_and_listed_in_order() -> None:
    marks = [piece.mark for piece in shop(HOWE).pieces]
    webs = ["R1-P1", "R1-P2", "R1-P3", "R1-P4", "R1-P5", "R1-D2", "R1-D3", "R1-D4", "R1-D5"]
    assert marks == ["R1-TC1L", "R1-TC1R", "R1-BC1", *webs, "R1-PK1", "R1-PK2"]


def test_identical_pieces_share_a_mark_and_list_their_bars() -> None:
    where = shop(HOWE)
    assert where.piece("R1-D2").bars == ("D2", "D9")
    assert (where.piece("R1-D2").per_truss, where.piece("R1-D2").quantity) == (2, 12)
    assert (where.piece("R1-P5").per_truss, where.piece("R1-P5").quantity) == (1, 6)
    # a triangular Fink's struts: B1-T1 and its mirror; the inner ones end at the sling and are shorter
    assert [shop(FINK).piece(mark).bars for mark in ("R1-P1", "R1-P3")] == [("P1", "P7"), ("P3", "P5")]


def test_the_two_angles_of_a_mitred_pair_and_the_two_slopes_are_opposite_hands() -> None:
    """Near left and far right are one hand, far left and near right the other: two of each in a truss."""
    where = shop(HOWE)
    left, right = where.piece("R1-TC1L"), where.piece("R1-TC1R")
    assert (left.hand, right.hand) == ("L", "R")
    assert (left.per_truss, right.per_truss) == (2, 2)
    assert left.cut_length == right.cut_length == 7893.0
    assert left.ends == right.ends == ("square", "mitre 18.0 deg, long at heel")


def test_a_square_cut_pair_has_one_mark() -> None:
    bottom = shop(PRATT).piece("R1-BC1")
    assert (bottom.hand, bottom.per_truss, bottom.ends) == ("", 2, ("square", "square"))


def test_tubes_have_no_hands() -> None:
    where = shop(PRATT, sections={"top_chord": "SHS 100x100x5"})
    assert where.piece("R1-TC1").per_truss == 2
    assert where.piece("R1-TC1").grade == "S355JRH"


def test_the_angles_of_a_starred_rafter_differ_in_length() -> None:
    """The upper angle's long edge is its toe, 4 + 80 mm above the line; the lower one's its heel, 4 mm below."""
    where = shop(FINK, sections={"top_chord": "2L star 80x80x8"})
    found = {piece.mark: piece for piece in where.pieces if piece.description == "top chord"}
    assert set(found) == {"R1-TC1L", "R1-TC1R", "R1-TC1.2L", "R1-TC1.2R"}
    slope, tangent = 7794.2286, 1 / np.sqrt(3)
    assert found["R1-TC1L"].cut_length == round(slope + 84 * tangent)
    assert found["R1-TC1.2L"].cut_length == round(slope - 4 * tangent)
    assert all(piece.per_truss == 1 for piece in found.values())
    assert "long at toe" in found["R1-TC1L"].ends[1]
    assert "long at heel" in found["R1-TC1.2L"].ends[1]


def test_webs_are_rounded_down_and_chords_to_the_nearest() -> None:
    where = shop(HOWE)
    for cut in cuts(where.setting, where.choices):
        name = where.setting.truss.bar_names[cut.bars[0]]
        piece = next(piece for piece in where.pieces if name in piece.bars)
        if "chord" in piece.description:
            assert abs(piece.cut_length - round(piece.cut_length)) == 0.0
        else:
            assert 0.0 <= cut.axis - piece.cut_length < 1.0


def test_the_dust_of_doubles_does_not_make_two_marks_of_one_piece() -> None:
    """Posts of a flat truss, 2000 between joints and 1900 between chords of 100 mm; one is 1e-7 mm too short."""
    truss = parallel()
    xy = truss.xy.copy()
    xy[truss.joint_names.index("T1")] -= (0.0, 1e-7)
    tubes = dict.fromkeys(("top_chord", "bottom_chord"), "SHS 100x100x5") | {"diagonals": "SHS 50x50x4"}
    where = hand_made_shop(replace(truss, xy=xy), tubes)
    post = next(piece for piece in where.pieces if "B1-T1" in piece.bars)
    assert (post.bars, post.cut_length) == (("B1-T1", "B2-T2", "B3-T3"), 1900.0)


def test_mass_and_paint_area_are_the_handbook_s_times_the_length() -> None:
    """L 60x60x6: 5.42 kg/m and 0.233 m2/m; L 80x80x8: 9.63 kg/m and 0.311 m2/m, as printed in handbooks."""
    where = shop(HOWE)
    post, chord = where.piece("R1-P5"), where.piece("R1-TC1L")
    assert post.mass == pytest.approx(5.42 * post.cut_length / 1e3, rel=2e-3)
    assert post.paint_area == pytest.approx(0.233 * post.cut_length / 1e3, rel=5e-3)
    assert chord.mass == pytest.approx(9.63 * 7.893, rel=2e-3)
    assert chord.paint_area == pytest.approx(0.311 * 7.893, rel=5e-3)
    assert post.total_mass == post.mass * 6
    assert post.total_paint_area == post.paint_area * 6


def test_every_bar_is_cut_once_for_each_angle_of_its_member(done: Design) -> None:
    """Lengths of all pieces of one truss, by mark, make up the lengths of all cuts."""
    cut_length = {piece.mark: piece.cut_length * piece.per_truss for piece in members_only(done.pieces)}
    axes = sum(cut.axis * cut.choice.section.pieces for cut in cuts(done.setting, done.choices))
    assert sum(cut_length.values()) == pytest.approx(axes, rel=2e-3)
    without_hands = {piece.mark.rstrip("LR"): piece.bars for piece in members_only(done.pieces)}
    counted = Counter(bar for bars in without_hands.values() for bar in bars)
    assert counted == Counter(done.setting.truss.bar_names)


def test_pieces_weigh_about_what_the_members_do(done: Design) -> None:
    mass = sum(piece.mass * piece.per_truss for piece in members_only(done.pieces))
    assert 0.9 * done.mass < mass < done.mass


def test_a_design_that_does_not_pass_has_no_pieces() -> None:
    where = shop(HOWE)
    failed = (*where.choices[:-1], replace(where.choices[-1], passes=False))
    assert Shop(where.setting, where.demand, failed).pieces == ()


# Remarks


def test_pieces_longer_than_the_stock_are_marked_with_the_splices_they_need() -> None:
    where = shop(PRATT, 'stock_length = "6 m"')
    assert "longer than the stock length of 6 m: 2 splices at least" in where.piece("R1-BC1").remarks
    assert "longer than the stock length of 6 m: 1 splice at least" in where.piece("R1-TC1L").remarks
    assert where.piece("R1-D1").remarks == ()
    assert "longer than the stock length of 12 m: 1 splice at least" in shop(PRATT).piece("R1-BC1").remarks


def test_a_piece_as_long_as_the_stock_needs_no_splice() -> None:
    where = shop(HOWE, 'stock_length = "15 m"')
    assert not any("stock length" in remark for remark in where.piece("R1-BC1").remarks)


def heel_remarks(where: Shop) -> list[str]:
    return [p.mark for p in where.pieces if any(remark.startswith("meets the other chord") for remark in p.remarks)]


def test_chords_that_meet_at_a_heel_are_to_be_trimmed() -> None:
    assert heel_remarks(shop(HOWE)) == ["R1-TC1L", "R1-TC1R", "R1-BC1"]
    assert heel_remarks(shop(f'{HOWE}\noverhang = "0.5 m"')) == ["R1-BC1"]
    assert heel_remarks(shop(PRATT)) == []


def test_a_web_too_short_for_its_welds_is_marked() -> None:
    """Legs of 60 mm and welds of 1.5 legs: 90 mm at each end. The first post is 321 mm; welds of 3 legs need 360."""
    assert shop(HOWE).piece("R1-P1").remarks == ()
    long_welds = shop(HOWE, more='[connections]\nweld_length = "3 legs"')
    assert long_welds.piece("R1-P1").remarks == (
        "too short for the end welds assumed, 180 mm along each edge at each end",
    )
    assert shop(HOWE, more='[connections]\nends = "bolted"').piece("R1-P1").remarks == ()


def test_a_mitre_beyond_the_saw_is_marked() -> None:
    where = shop(PRATT, sections=dict.fromkeys(("top_chord", "bottom_chord", "posts", "diagonals"), "SHS 50x50x4"))
    steep = [p.mark for p in where.pieces if any("check that the saw" in remark for remark in p.remarks)]
    # diagonal 1 stands at 31 degrees to the bottom chord, a mitre of 59; at mid-span the diagonals stand at 47
    assert "R1-D1" in steep
    assert "R1-P1" not in steep


def test_a_web_without_room_leaves_no_list() -> None:
    with pytest.raises(InputError, match="no room for P1"):
        assert shop('form = "Howe"\nspan = "15 m"\npitch = "10 deg"\npanels = 10', 'setback = "80 mm"').pieces


# Packing plates


def test_packs_are_those_the_standard_counts(done: Design) -> None:
    counts = packs_by_bar(done.setting, done.demand, done.choices)
    plates = [piece for piece in done.pieces if piece.description == "packing plate"]
    assert sum(plate.per_truss for plate in plates) == counts.sum()
    names = done.setting.truss.bar_names
    assert {bar for plate in plates for bar in plate.bars} == {names[bar] for bar in np.flatnonzero(counts)}
    for choice in done.choices:
        assert (counts[choice.group.bars] > 0).all() == (choice.section.pieces == 2)


def test_packs_are_as_thick_as_the_gap_and_longer_than_the_leg() -> None:
    """60 mm wide, 8 thick, leg 80 + 25 long: 60 x 8 x 105 x 7850e-9 = 0.396 kg; 2 (60 x 105 + 165 x 8) = 15 240 mm2."""
    pack = shop(HOWE).piece("R1-PK1")
    assert (pack.section, pack.cut_length) == ("FL 60x8", 105.0)
    assert pack.mass == pytest.approx(0.39564)
    assert pack.paint_area == pytest.approx(0.01524)
    assert pack.per_truss == 20
    assert pack.remarks[0] == "2 in each of TC1 to TC10, 526 mm apart"
    assert "welded, or bolted snug-tight" in pack.remarks[1]
    assert shop(HOWE).piece("R1-PK2").cut_length == 95.0


def test_packs_of_one_size_share_a_mark_and_say_where_they_go() -> None:
    where = shop(HOWE, 'packs = "3 a panel"\npack_fixing = "welded"', sections={"bottom_chord": "2L 80x80x6"})
    pack = where.piece("R1-PK1")
    assert [p.mark for p in where.pieces if p.description == "packing plate"] == ["R1-PK1"]
    # the bottom chord of this roof is a tie: the standard asks for packs there only by spacing
    tie = int(packs_by_bar(where.setting, where.demand, where.choices)[where.setting.truss.bar("BC1")])
    assert pack.per_truss == 10 * 3 + 10 * tie
    assert tie < 3
    assert pack.remarks[0] == "3 in each of TC1 to TC10, 394 mm apart"
    assert pack.remarks[1] == f"{tie} in each of BC1 to BC10, {1500 / (tie + 1):.0f} mm apart"
    assert "welded;" in pack.remarks[2]


class PacksInStrutsOnly:
    """A standard that asks for no packs in one of the bars."""

    def packs_per_panel(self, candidates: Candidates, demand: Demand) -> IntArray:
        return np.array([[0 if bar == "BC1" else candidates.pieces - 1 for bar in demand.bars]])


def test_members_without_packs_are_not_among_those_of_the_plate() -> None:
    where = shop(HOWE)
    standard = cast(Standard, PacksInStrutsOnly())
    pack = Shop(replace(where.setting, standard=standard), where.demand, where.choices).piece("R1-PK2")
    assert pack.bars == tuple(f"BC{number}" for number in range(2, 11))
    assert pack.per_truss == 9


def test_a_pack_of_a_starred_pair_reaches_over_both_legs() -> None:
    """80 + 8 + 80 + 25 mm."""
    where = shop(FINK, sections={"top_chord": "2L star 80x80x8"})
    pack = where.piece("R1-PK1")
    assert pack.cut_length == 193.0
    assert "in starred pairs in turn" in pack.remarks[-1]


def test_a_roof_without_pairs_has_no_packs() -> None:
    where = shop(PRATT, sections={"top_chord": "SHS 100x100x5", "bottom_chord": "SHS 100x100x5"})
    assert not any(piece.description == "packing plate" for piece in where.pieces)


def test_every_unequal_piece_says_which_leg_goes_to_the_gusset() -> None:
    """Turned the other way the member fails, and the section of a piece does not show it."""
    sections = {
        "top_chord": "2L 80x60x6 long legs together",
        "bottom_chord": "2L 80x60x6 short legs together",
        "posts": "L 65x50x5 short leg connected",
        "diagonals": "L 65x50x5 long leg connected",
    }
    told = {
        "top chord": "long legs together",
        "bottom chord": "short legs together",
        "post": "short leg to the gusset",
        "diagonal": "long leg to the gusset",
    }
    cut = [piece for piece in shop(HOWE, sections=sections).pieces if piece.description != "packing plate"]
    assert {piece.description for piece in cut} == told.keys()
    for piece in cut:
        assert piece.way == piece.remarks[0] == told[piece.description]
    assert all(piece.way == "" for piece in shop(HOWE).pieces)


def test_flat_and_upright_tubes_are_told_apart() -> None:
    sections = {"top_chord": "RHS 120x60x5 flat", "bottom_chord": "RHS 120x60x5 upright"}
    pieces = shop(HOWE, sections=sections).pieces
    assert {piece.way for piece in pieces if "chord" in piece.description} == {
        "flat: its side of 60 mm in the plane of the truss",
        "upright: its side of 120 mm in the plane of the truss",
    }


def test_pieces_that_differ_in_their_way_round_have_marks_of_their_own() -> None:
    middle = '[members.groups]\nmiddle = "L 65x50x5 short leg connected"\n[groups]\nmiddle = ["P1"]'
    where = shop(PRATT, sections={"posts": "L 65x50x5 long leg connected"}, more=middle)
    first, last = where.piece("R1-P1"), where.piece("R1-P11")
    assert (first.bars, last.bars) == (("P1",), ("P11",))
    assert (first.way, last.way) == ("short leg to the gusset", "long leg to the gusset")
    assert first.cut_length == last.cut_length
