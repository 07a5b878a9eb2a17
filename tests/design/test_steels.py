"""Strengths by thickness, the grade of hollow sections, names nobody knows."""

from __future__ import annotations

import numpy as np
import pytest

from spanwright.design.steels import steel, steels, strength
from spanwright.truss.errors import InputError, UnknownNameError


@pytest.mark.parametrize(
    ("grade", "thickness", "fy", "fu"),
    [
        # SANS 50025-2 and SANS 1431, from memory; fu of S355JR is the safer of two printed values
        ("S355JR", [5, 16, 16.1, 40, 63], [355, 355, 345, 345, 335], 450),
        ("S275JR", [16, 40, 63], [275, 265, 255], 410),
        ("350WA", [16, 40, 63], [350, 340, 330], 480),
        ("300WA", [16, 40, 63], [300, 290, 280], 450),
        ("commercial quality", [5, 40], [200, 200], 365),
    ],
)
def test_strength_by_thickness(grade: str, thickness: list[float], fy: list[float], fu: float) -> None:
    found_fy, found_fu = strength(grade, np.array(thickness, dtype=np.float64))
    assert found_fy.tolist() == fy
    assert set(found_fu.tolist()) == {fu}


@pytest.mark.parametrize(
    ("grade", "twin", "fy", "fu"),
    [
        ("S355JR", "S355JRH", 355, 450),  # mill data sheet, structural tube grade 355
        ("350WA", "S355JRH", 355, 450),
        ("S355JRH", "S355JRH", 355, 450),
        ("300WA", "Grade 300 tube", 300, 450),  # from memory
        ("commercial quality", "commercial tube", 200, 365),  # from memory
    ],
)
def test_hollow_sections_take_the_twin(grade: str, twin: str, fy: float, fu: float) -> None:
    assert steel(grade, hollow=True).name == twin
    found_fy, found_fu = strength(grade, np.array([4.0]), hollow=True)
    assert (found_fy[0], found_fu[0]) == (fy, fu)


def test_thicker_is_never_stronger_and_every_twin_exists() -> None:
    for grade in steels().values():
        limits, fy, fu = np.array(grade.steps).T
        assert np.all(np.diff(limits) > 0)
        assert np.all(np.diff(fy) <= 0)
        assert np.all(fu > fy)
        assert grade.hollow_twin in steels()
        assert grade.confidence


def test_only_commercial_steel_has_no_certificate() -> None:
    assert [name for name, grade in steels().items() if not grade.certified] == [
        "commercial quality",
        "commercial tube",
    ]


def test_capitals_and_spaces_do_not_matter() -> None:
    assert steel("s355jr").name == "S355JR"
    assert steel("Commercial  Quality").name == "commercial quality"


def test_unknown_steel_names_the_key_and_the_nearest() -> None:
    with pytest.raises(UnknownNameError) as caught:
        steel("S355J")
    assert caught.value.key == "members.steel"
    assert caught.value.nearest == "S355JR"


def test_thickness_beyond_the_table_is_refused() -> None:
    with pytest.raises(InputError, match="70 mm"):
        strength("S355JR", np.array([10.0, 70.0]))
