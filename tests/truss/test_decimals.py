"""Numbers in messages: no exponent, nothing of the whole part lost."""

import pytest

from spanwright.truss.decimals import decimal, fixed


@pytest.mark.parametrize(
    ("value", "figures", "text"),
    [
        (18000.0, 4, "18000"),
        (1836210.123, 6, "1836210"),
        (12.3456, 4, "12.35"),
        (0.0418123, 3, "0.0418"),
        (12.0, 4, "12"),
        (-0.0, 3, "0"),
        (-1e-14, 3, "0"),
        (100, 3, "100"),
        (float("inf"), 3, "inf"),
        (1e300, 3, "1e+300"),
    ],
)
def test_a_number_keeps_its_whole_part_and_has_no_exponent(value: float, figures: int, text: str) -> None:
    assert decimal(value, figures) == text


def test_a_place_far_from_the_origin_keeps_its_thousandths() -> None:
    assert [fixed(value, 3) for value in (412345.678, 1836210.1234, -0.0001, 500.0)] == [
        "412345.678",
        "1836210.123",
        "0",
        "500",
    ]
