"""Packs rectangles onto a sheet. Sizes in mm on paper, from the lower left corner."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import islice, permutations, product

FREE = (15.0, 10.0, 6.0)
"""Left free between blocks, the most that there is room for."""
LARGEST = 5
"""Blocks whose order is varied; the smaller ones always come after them."""
ORDERS = 120
"""Orders that are tried."""

Size = tuple[float, float]


@dataclass(frozen=True)
class Spot:
    """A rectangle on the sheet, by its upper left corner."""

    left: float
    top: float
    width: float
    height: float

    @property
    def right(self) -> float:
        """Its right edge."""
        return self.left + self.width

    @property
    def bottom(self) -> float:
        """Its lower edge."""
        return self.top - self.height

    def clear_of(self, other: Spot, free: float) -> bool:
        """Whether two spots have so much between them."""
        near = free - 1e-9
        return (
            self.left >= other.right + near
            or other.left >= self.right + near
            or self.bottom >= other.top + near
            or other.bottom >= self.top + near
        )

    def within(self, other: Spot) -> bool:
        """Whether the spot lies inside another."""
        return (
            self.left >= other.left - 1e-9
            and self.right <= other.right + 1e-9
            and self.bottom >= other.bottom - 1e-9
            and self.top <= other.top + 1e-9
        )


@dataclass(frozen=True)
class Block:
    """What is to be packed: the sizes it can take, and whether it is wanted at the right of the sheet."""

    sizes: tuple[Size, ...]
    at_right: bool = False

    def area(self, free: float) -> float:
        """Return the least area it takes, with the room around it."""
        return min((width + free) * (height + free) for width, height in self.sizes)


Packed = list[tuple[int, Spot]]


def pack(sheet: Spot, taken: Sequence[Spot], blocks: Sequence[Block]) -> Packed | None:
    """Return for each block which of its sizes it takes and where, clear of all others and of what is taken, or None.

    Each stands as high as can be, and there as far to the left (or right) as can be; the larger ones are laid first.
    """
    return next((found for free in FREE if (found := _pack(sheet, taken, blocks, free))), None)


def _pack(sheet: Spot, taken: Sequence[Spot], blocks: Sequence[Block], free: float) -> Packed | None:
    room = (sheet.width + free) * (sheet.height + free) - sum(
        (spot.width + free) * (spot.height + free) for spot in taken
    )
    if sum(block.area(free) for block in blocks) > room:
        return None
    for order in _orders(blocks):
        found: dict[int, tuple[int, Spot]] = {}
        for at in order:
            placed = _place(sheet, [*taken, *(spot for _, spot in found.values())], blocks[at], free)
            if placed is None:
                break
            found[at] = placed
        else:
            return [found[at] for at in range(len(blocks))]
    return None


def _orders(blocks: Sequence[Block]) -> Iterator[tuple[int, ...]]:
    by_area = sorted(range(len(blocks)), key=lambda at: (not blocks[at].at_right, -blocks[at].area(0.0)))
    for first in islice(permutations(by_area[:LARGEST]), ORDERS):
        yield (*first, *by_area[LARGEST:])


def _place(sheet: Spot, taken: list[Spot], block: Block, free: float) -> tuple[int, Spot] | None:
    """Return the size and the spot of a block whose lower edge is highest."""
    best: tuple[int, Spot] | None = None
    for number, size in enumerate(block.sizes):
        for spot in _spots(sheet, taken, size, free, at_right=block.at_right):
            if best is not None and spot.bottom <= best[1].bottom + 1e-9:
                break
            if spot.within(sheet) and all(spot.clear_of(other, free) for other in taken):
                best = number, spot
                break
    return best


def _spots(sheet: Spot, taken: list[Spot], size: Size, free: float, *, at_right: bool) -> Iterator[Spot]:
    """Give the spots against edges of the sheet and of what is taken, high ones first."""
    tops = {sheet.top, *(spot.bottom - free for spot in taken)}
    lefts = {sheet.left, sheet.right - size[0]}
    lefts |= {spot.right + free for spot in taken} | {spot.left - free - size[0] for spot in taken}
    for top, left in product(sorted(tops, reverse=True), sorted(lefts, reverse=at_right)):
        yield Spot(left, top, *size)
