"""Pressures on the outline of a roof: blocks to scale, arrows that show their way, and a number at every block."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from spanwright.io.pictures.boxes import box, boxes_along
from spanwright.io.pictures.labels import Occupied, Words
from spanwright.io.pictures.lettering import height_of, width_of
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import HAIR, INK, PALE, SOFT
from spanwright.io.pictures.view import Zone
from spanwright.truss.arrays import FloatArray

TINY = 5.2
"""Size of the letters of pressures, points."""

ARROW_STEP = 4.5
"""mm between arrows along the roof."""

LEAST_ARROW = 0.4
"""mm: a shorter arrow would be a blot."""

NEAR, FAR, STEP = 0.3, 9.0, 0.4
"""mm from a block to its number: the least, the most that is tried, and the steps between."""

LEADER = 1.0
"""mm: a number further off than this has a line to its block."""

TURNS = (0.0, 15.0, -15.0, 30.0, -30.0, 45.0, -45.0, 60.0, -60.0, 75.0, -75.0)
"""Degrees off the way out of a block in which its number is tried, in this order."""

PLACES = (0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8)
"""Shares of a block's length from which its number is tried, in this order."""


@dataclass(frozen=True, eq=False)
class Block:
    """A pressure on a stretch: its feet (2, 2) on the surface, mm; how far it stands off, mm; and what it says."""

    feet: FloatArray
    outward: FloatArray
    height: float
    presses: bool
    words: str

    @property
    def off(self) -> FloatArray:
        """From its feet to its head, (2,) mm."""
        off: FloatArray = self.height * self.outward
        return off

    @property
    def length(self) -> float:
        """Along the surface, mm."""
        return float(np.hypot(*(self.feet[1] - self.feet[0])))

    @property
    def box(self) -> FloatArray:
        """The (6,) box that it takes on the sheet."""
        along = self.feet[1] - self.feet[0]
        return box(
            self.feet.mean(axis=0) + self.off / 2.0, float(np.arctan2(along[1], along[0])), self.length, self.height
        )


def draw_block(sheet: Sheet, block: Block) -> None:
    """Draw a block outside its stretch, with its arrows."""
    start, end = block.feet
    sheet.areas([np.array([start, end, end + block.off, start + block.off])], PALE, edge=SOFT, width=HAIR, order=2.0)
    if block.height > LEAST_ARROW:
        count = max(1, round(block.length / ARROW_STEP))
        feet = [start + (end - start) * (number + 0.5) / count for number in range(count)]
        heads = [foot + block.off for foot in feet]
        tails, tips = (heads, feet) if block.presses else (feet, heads)
        sheet.lines([_arrow(tail, tip) for tail, tip in zip(tails, tips, strict=True)], HAIR, order=2.5)


def draw_numbers(sheet: Sheet, blocks: list[Block], cell: Zone, taken: FloatArray) -> None:
    """Write the number of every block within a cell: clear of blocks, of other numbers and of `taken` (n, 6) boxes.

    The shortest blocks choose first, because the numbers of long ones can stand anywhere along them.
    """
    occupied = Occupied(np.vstack([taken, *(block.box for block in blocks)]))
    for block in sorted(blocks, key=lambda block: block.length):
        words = Words(width_of(block.words, TINY), height_of(TINY))
        head, centre = next(
            (
                (head, centre)
                for head, centre in _places(block, words)
                if _within(cell, words, centre) and _take(occupied, block, words, head, centre)
            ),
            next(_places(block, words)),
        )
        sheet.text(centre[0], centre[1] - words.height / 2.0, block.words, TINY, across="center")
        leader = _leader(head, words, centre)
        if float(np.hypot(*(leader[1] - leader[0]))) > LEADER:
            sheet.lines([leader], HAIR, INK, order=4.0)


def _places(block: Block, words: Words) -> Iterator[tuple[FloatArray, FloatArray]]:
    """Yield points on the head of a block, each with a centre for its number; the nearest centres first."""
    shares = PLACES if block.length > words.length else PLACES[:1]
    heads = [block.feet[0] + share * (block.feet[1] - block.feet[0]) + block.off for share in shares]
    for reach in np.arange(NEAR, FAR, STEP):
        for turn in np.radians(TURNS):
            towards = np.array([[np.cos(turn), -np.sin(turn)], [np.sin(turn), np.cos(turn)]]) @ block.outward
            out = reach + abs(towards[0]) * words.length / 2.0 + abs(towards[1]) * words.height / 2.0
            for head in heads:
                yield head, head + out * towards


def _take(occupied: Occupied, block: Block, words: Words, head: FloatArray, centre: FloatArray) -> bool:
    """Let a number and its leader be taken if both are clear, and return whether they were."""
    leader = _leader(head, words, centre)
    if float(np.hypot(*(leader[1] - leader[0]))) <= LEADER:
        return occupied.take(words.at(centre))
    line = boxes_along((leader + 0.1 * block.outward)[None], HAIR / 2.0)[0]
    before = occupied.boxes
    if occupied.take(line) and occupied.take(words.at(centre)):
        return True
    occupied.boxes = before
    return False


def _leader(head: FloatArray, words: Words, centre: FloatArray) -> FloatArray:
    """Return the line (2, 2) from a block's head to just before the nearest point of its number."""
    half = np.array([words.length, words.height]) / 2.0 + 0.4
    return np.array([head, np.clip(head, centre - half, centre + half)])


def _within(cell: Zone, words: Words, centre: FloatArray) -> bool:
    half = np.array([words.length, words.height]) / 2.0
    low, high = centre - half, centre + half
    return bool(cell.left <= low[0] and high[0] <= cell.right and cell.bottom <= low[1] and high[1] <= cell.top)


def _arrow(tail: FloatArray, tip: FloatArray) -> FloatArray:
    """Return an arrow as one line: the shaft, then the head's two barbs."""
    shaft = tip - tail
    size = min(1.0, 0.5 * float(np.hypot(*shaft)))
    back = size * shaft / np.hypot(*shaft)
    aside = 0.4 * np.array([-back[1], back[0]])
    return np.array([tail, tip, tip - back + aside, tip, tip - back - aside])
