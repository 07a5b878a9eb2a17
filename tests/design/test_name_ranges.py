"""Lists of names are short and say the same."""

import pytest

from spanwright.design.name_ranges import in_ranges


@pytest.mark.parametrize(
    ("names", "text"),
    [
        ([], ""),
        (["P5"], "P5"),
        (["P1", "P2"], "P1, P2"),
        (["P1", "P2", "P3"], "P1 to P3"),
        (["TC9", "TC10", "TC11", "BC1", "BC2", "BC3", "D4"], "TC9 to TC11, BC1 to BC3, D4"),
        (["P1", "P9"], "P1, P9"),
        (["P3", "P2", "P1"], "P3, P2, P1"),
        (["rafter", "tie"], "rafter, tie"),
        (["P1", "Q2", "P3"], "P1, Q2, P3"),
    ],
)
def test_names_that_count_up_are_drawn_together(names: list[str], text: str) -> None:
    assert in_ranges(names) == text
