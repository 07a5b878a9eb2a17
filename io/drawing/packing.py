"""Packs rectangles onto a sheet. Sizes in mm on paper, from the lower left corner."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import islice, permutations

import numpy as np

FREE = (24.0, 18.0, 12.0, 8.0, 6.0, 4.0)
"""Left free between blocks, the most that there is room for."""
LARGEST = 5
"""Blocks whose order is varied; the smaller ones always come after them."""
SLACK = 1e-6
"""mm: what adding up doubles may leave."""
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
        near = free - SLACK
        return (
            self.left >= other.right + near
            or other.left >= self.right + near
            or self.bottom >= other.top + near
            or other.bottom >= self.top + near
        )

    def within(self, other: Spot) -> bool:
        """Whether the spot lies inside another."""
        return (
            self.left >= other.left - SLACK
            and self.right <= other.right + SLACK
            and self.bottom >= other.bottom - SLACK
            and self.top <= other.top + SLACK
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
    found = [
        (number, spot)
        for number, size in enumerate(block.sizes)
        if (spot := _highest(sheet, taken, size, free, at_right=block.at_right))
    ]
    return max(found, key=lambda one: (round(one[1].bottom, 6), -one[0]), default=None)


def _highest(sheet: Spot, taken: list[Spot], size: Size, free: float, *, at_right: bool) -> Spot | None:
    """Return the highest free spot against edges of the sheet and of what is taken, there the one farthest aside."""
    left, right, bottom, top = np.reshape([(spot.left, spot.right, spot.bottom, spot.top) for spot in taken], (-1, 4)).T
    tops = np.unique(np.append(bottom - free, sheet.top))[::-1]
    lefts = np.unique(np.concatenate([right + free, left - free - size[0], [sheet.left, sheet.right - size[0]]]))
    tops = tops[(tops <= sheet.top + SLACK) & (tops - size[1] >= sheet.bottom - SLACK)]
    lefts = lefts[(lefts >= sheet.left - SLACK) & (lefts + size[0] <= sheet.right + SLACK)]
    if at_right:
        lefts = lefts[::-1]
    near = free - SLACK
    beside = (lefts[:, None] >= right + near) | (left >= lefts[:, None] + size[0] + near)
    over = (tops[:, None] - size[1] >= top + near) | (bottom >= tops[:, None] + near)
    free_here = (over[:, None, :] | beside[None, :, :]).all(axis=2)
    if not free_here.any():
        return None
    row, column = np.unravel_index(int(np.argmax(free_here)), free_here.shape)
    return Spot(float(lefts[column]), float(tops[row]), *size)
