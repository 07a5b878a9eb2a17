"""Packing as invariants."""

import itertools

from hypothesis import given, settings
from hypothesis import strategies as st

from spanwright.io.drawing.packing import FREE, Block, Spot, pack

SHEET = Spot(26.0, 404.0, 552.0, 388.0)
SIZES = st.tuples(st.floats(20.0, 250.0), st.floats(15.0, 150.0))
BLOCKS = st.lists(st.builds(Block, st.lists(SIZES, min_size=1, max_size=3).map(tuple), st.booleans()), max_size=7)


@settings(max_examples=40, deadline=None)
@given(BLOCKS)
def test_blocks_keep_clear_of_each_other_and_inside(blocks: list[Block]) -> None:
    taken = [Spot(404.0, 120.0, 180.0, 110.0)]
    packed = pack(SHEET, taken, blocks)
    if packed is None:
        return
    spots = [spot for _, spot in packed]
    assert all(spot.within(SHEET) for spot in spots)
    for (number, spot), block in zip(packed, blocks, strict=True):
        assert (spot.width, spot.height) == block.sizes[number]
    for one, other in itertools.combinations([*taken, *spots], 2):
        beside = max(one.left, other.left) - min(one.right, other.right)
        over = max(one.bottom, other.bottom) - min(one.top, other.top)
        assert max(beside, over) >= FREE[-1] - 1e-5


def test_what_is_too_large_is_not_packed() -> None:
    assert pack(SHEET, [], [Block(((600.0, 10.0),))]) is None
    assert pack(SHEET, [], [Block(((500.0, 200.0),)), Block(((500.0, 200.0),))]) is None


def test_a_second_size_is_taken_where_the_first_has_no_room() -> None:
    packed = pack(SHEET, [], [Block(((600.0, 10.0), (300.0, 20.0)))])
    assert packed == [(1, Spot(SHEET.left, SHEET.top, 300.0, 20.0))]


def test_room_that_is_there_is_left_between_blocks() -> None:
    packed = pack(SHEET, [], [Block(((100.0, 50.0),)), Block(((100.0, 50.0),))])
    assert packed is not None
    assert abs(packed[1][1].left - packed[0][1].left) == 100.0 + FREE[0]
