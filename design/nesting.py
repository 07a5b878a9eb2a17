"""The cutting list: how the pieces come out of stock bars, longest first, then the longest that still fits."""

from __future__ import annotations

from dataclasses import dataclass

from spanwright.design.pieces import Piece

KERF = 3.0
"""mm lost at each cut (common practice, from memory: band saw 2 to 4)."""
END_TRIM = 10.0
"""mm cut off a bar first, unless one piece takes the whole of it (common practice, from memory: 10 to 15)."""


@dataclass(frozen=True)
class Pattern:
    """Stock bars that are cut alike.

    bars : how many. parts : (piece, how many of it from one bar), longest first. left : mm, offcut of each bar.
    """

    bars: int
    parts: tuple[tuple[Piece, int], ...]
    left: float


@dataclass(frozen=True)
class Nest:
    """All pieces of one section and grade.

    stock_length : mm. patterns : in the order of cutting. too_long : pieces that need a splice, not nested.
    """

    section: str
    grade: str
    stock_length: float
    patterns: tuple[Pattern, ...]
    too_long: tuple[Piece, ...]

    @property
    def bars(self) -> int:
        """Number of stock bars."""
        return sum(pattern.bars for pattern in self.patterns)

    @property
    def used(self) -> float:
        """Share of the stock that ends up in pieces; 0 where there is none."""
        cut = sum(
            pattern.bars * number * piece.cut_length for pattern in self.patterns for piece, number in pattern.parts
        )
        return cut / (self.bars * self.stock_length) if self.bars else 0.0


def nest(pieces: tuple[Piece, ...], stock_length: float) -> tuple[Nest, ...]:
    """Allot all pieces (of all trusses) to stock bars (mm), one entry a section and grade, first fit decreasing.

    Pieces longer than a bar are listed and not allotted: they need a splice first.
    """
    kinds = dict.fromkeys((piece.section, piece.grade) for piece in pieces)
    return tuple(_nest(section, grade, pieces, stock_length) for section, grade in kinds)


def _nest(section: str, grade: str, pieces: tuple[Piece, ...], stock_length: float) -> Nest:
    alike = [piece for piece in pieces if (piece.section, piece.grade) == (section, grade)]
    ordered = sorted(alike, key=lambda piece: -piece.cut_length)
    too_long = tuple(piece for piece in ordered if piece.cut_length > stock_length)
    waiting = {piece.mark: piece.quantity for piece in ordered if piece.cut_length <= stock_length}
    patterns = []
    while any(waiting.values()):
        parts, left = _fill([piece for piece in ordered if waiting.get(piece.mark)], waiting, stock_length)
        repeats = min(waiting[piece.mark] // number for piece, number in parts)
        for piece, number in parts:
            waiting[piece.mark] -= repeats * number
        patterns.append(Pattern(repeats, parts, left))
    return Nest(section, grade, stock_length, tuple(patterns), too_long)


def _fill(
    ordered: list[Piece], waiting: dict[str, int], stock_length: float
) -> tuple[tuple[tuple[Piece, int], ...], float]:
    """Fill one bar with what waits, longest first; return the parts and what is left over."""
    room = max(stock_length - END_TRIM, ordered[0].cut_length)
    parts = []
    for piece in ordered:
        # the last cut of a bar needs no kerf where it ends with the bar
        number = min(waiting[piece.mark], int((room + KERF) // (piece.cut_length + KERF)))
        if number > 0:
            parts.append((piece, number))
            room -= number * (piece.cut_length + KERF)
    return tuple(parts), max(room, 0.0)
