"""The cutting list against allotments made by hand, and that nothing is lost or overfilled."""

from __future__ import annotations

from collections import Counter

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from spanwright.design.nesting import END_TRIM, KERF, Nest, nest
from spanwright.design.pieces import Piece


def piece(mark: str, length: float, quantity: int, section: str = "L 60x60x6", grade: str = "S355JR") -> Piece:
    return Piece(mark, "post", section, grade, "", 1, quantity, length, 1.0, 1.0, ("square", "square"), (mark,))


def as_lists(found: Nest) -> list[tuple[int, list[tuple[str, int]], float]]:
    return [(pattern.bars, [(p.mark, n) for p, n in pattern.parts], pattern.left) for pattern in found.patterns]


def test_longest_first_then_the_longest_that_still_fits() -> None:
    """Bars of 12 m, 10 mm trimmed: 11 990. 5000 + 5000 with 3 mm a cut leave 1984: one 1900 more, 81 left.

    The fifth 5000 leaves 6987: of 3000 two (6006), then 981. The three 1900 left over make the last bar.
    """
    (found,) = nest((piece("A", 5000, 5), piece("B", 3000, 2), piece("C", 1900, 5)), 12000.0)
    assert as_lists(found) == [
        (2, [("A", 2), ("C", 1)], 81.0),
        (1, [("A", 1), ("B", 2)], 981.0),
        (1, [("C", 3)], 11990.0 - 3 * 1903.0),
    ]
    assert found.bars == 4
    assert found.used == pytest.approx((5 * 5000 + 2 * 3000 + 5 * 1900) / 48000)


def test_a_piece_as_long_as_the_bar_takes_it_whole() -> None:
    (found,) = nest((piece("A", 12000, 2), piece("B", 11995, 1)), 12000.0)
    assert as_lists(found) == [(2, [("A", 1)], 0.0), (1, [("B", 1)], 0.0)]


def test_the_last_cut_of_a_bar_may_end_with_the_bar() -> None:
    """2 x 5993.5 + one kerf of 3 = 11 990."""
    (found,) = nest((piece("A", 5993.5, 2),), 12000.0)
    assert as_lists(found) == [(1, [("A", 2)], 0.0)]


def test_pieces_longer_than_a_bar_are_listed_and_not_allotted() -> None:
    (found,) = nest((piece("A", 18000, 12), piece("B", 1000, 1)), 12000.0)
    assert [p.mark for p in found.too_long] == ["A"]
    assert as_lists(found) == [(1, [("B", 1)], 10987.0)]


def test_nothing_but_too_long_pieces_takes_no_bars() -> None:
    (found,) = nest((piece("A", 18000, 12),), 12000.0)
    assert (found.bars, found.used) == (0, 0.0)


def test_sections_and_grades_are_kept_apart() -> None:
    found = nest((piece("A", 1000, 1), piece("B", 1000, 1, grade="S275JR"), piece("C", 1000, 1, "FL 60x8")), 6000.0)
    assert [(kind.section, kind.grade) for kind in found] == [
        ("L 60x60x6", "S355JR"),
        ("L 60x60x6", "S275JR"),
        ("FL 60x8", "S355JR"),
    ]


@settings(max_examples=60, deadline=None)
@given(st.lists(st.tuples(st.integers(50, 7000), st.integers(1, 400)), min_size=1, max_size=12))
def test_every_piece_is_cut_and_no_bar_is_overfilled(orders: list[tuple[int, int]]) -> None:
    pieces = tuple(piece(f"M{at}", float(length), quantity) for at, (length, quantity) in enumerate(orders))
    (found,) = nest(pieces, 6000.0)
    allotted: Counter[str] = Counter()
    for pattern in found.patterns:
        cut = sum(number * p.cut_length for p, number in pattern.parts)
        pieces_cut = sum(number for _, number in pattern.parts)
        assert cut + (pieces_cut - 1) * KERF <= max(6000.0 - END_TRIM, pattern.parts[0][0].cut_length)
        for p, number in pattern.parts:
            allotted[p.mark] += pattern.bars * number
    wanted = Counter({p.mark: p.quantity for p in pieces if p.cut_length <= 6000.0})
    assert allotted == wanted
    # first fit decreasing leaves at most one bar half empty for each half that fits together
    half_full = [p for p in found.patterns if p.left > 3000.0 + KERF]
    assert sum(p.bars for p in half_full) <= 1
