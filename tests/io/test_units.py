"""Units against scipy.constants (CODATA and NIST SP 811 factors), and the refusals of what is ambiguous."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import constants

from spanwright.io.units import ANGLE, FORCE, LENGTH, PRESSURE, SHARE, Kind, quantity, shown, slope, written
from spanwright.truss.errors import InputError

# Of each unit in SI (m, N, Pa, rad), then of the inside unit (mm, N, MPa, rad) in SI.
SI = [
    (LENGTH, "mm", constants.milli, constants.milli),
    (LENGTH, "cm", constants.centi, constants.milli),
    (LENGTH, "m", 1.0, constants.milli),
    (LENGTH, "in", constants.inch, constants.milli),
    (LENGTH, "ft", constants.foot, constants.milli),
    (FORCE, "N", 1.0, 1.0),
    (FORCE, "kN", constants.kilo, 1.0),
    (FORCE, "lbf", constants.pound_force, 1.0),
    (FORCE, "kip", constants.kilo * constants.pound_force, 1.0),
    (PRESSURE, "Pa", 1.0, constants.mega),
    (PRESSURE, "kPa", constants.kilo, constants.mega),
    (PRESSURE, "N/m2", 1.0, constants.mega),
    (PRESSURE, "kN/m2", constants.kilo, constants.mega),
    (PRESSURE, "MPa", constants.mega, constants.mega),
    (PRESSURE, "N/mm2", 1.0 / constants.milli**2, constants.mega),
    (PRESSURE, "psf", constants.pound_force / constants.foot**2, constants.mega),
    (PRESSURE, "ksf", constants.kilo * constants.pound_force / constants.foot**2, constants.mega),
    (ANGLE, "deg", constants.degree, 1.0),
    (ANGLE, "rad", 1.0, 1.0),
    (SHARE, "%", constants.centi, 1.0),
]


@pytest.mark.parametrize(("kind", "unit", "in_si", "inside"), SI)
def test_factors_are_those_of_scipy(kind: Kind, unit: str, in_si: float, inside: float) -> None:
    assert quantity(f"7 {unit}", kind, unit) == pytest.approx(7 * in_si / inside, rel=1e-15)


def test_every_unit_is_compared() -> None:
    assert {(kind.name, unit) for kind, unit, _, _ in SI} == {
        (kind.name, unit) for kind in (LENGTH, FORCE, PRESSURE, ANGLE, SHARE) for unit in kind.units
    }


@pytest.mark.parametrize(
    ("text", "kind", "exactly"),
    [
        ("0.18 kPa", PRESSURE, 0.00018),
        ("60 ft", LENGTH, 18288.0),
        ("8 %", SHARE, 0.08),
        ("1 lbf", FORCE, 4.4482216152605),
    ],
)
def test_decimal_text_gives_the_nearest_double(text: str, kind: Kind, exactly: float) -> None:
    assert quantity(text, kind, "") == exactly


@given(st.sampled_from(SI), st.floats(-1e9, 1e9, allow_subnormal=False))
@settings(max_examples=60)
def test_written_is_read_back(entry: tuple[Kind, str, float, float], value: float) -> None:
    kind, unit, _, _ = entry
    assert quantity(written(value, kind, unit), kind, unit) == pytest.approx(value, rel=1e-11, abs=1e-300)


@pytest.mark.parametrize("text", ["18 m", "18m", " 18  m ", "+18 m", "1.8e1 m", "18. m", "18\u00a0m"])
def test_spellings_of_a_length(text: str) -> None:
    assert quantity(text, LENGTH, "m") == 18000.0


@pytest.mark.parametrize("text", ["-0.75 kPa", "\u22120.75 kPa", "-0.75 kN/m\u00b2", "-0.75 kN/m^2"])
def test_typographic_signs_are_understood(text: str) -> None:
    assert quantity(text, PRESSURE, "kPa") == -0.00075


@pytest.mark.parametrize(
    ("text", "tangent"), [("1:4", 0.25), ("3 : 12", 0.25), ("25 %", 0.25), ("45 deg", 1.0), ("45\u00b0", 1.0)]
)
def test_slopes(text: str, tangent: float) -> None:
    assert slope(text) == pytest.approx(math.atan(tangent), rel=1e-15)


@pytest.mark.parametrize(
    ("value", "found", "remedy"),
    [
        (18, "18 has no unit", 'write "18 m"'),
        (18.5, "18.5 has no unit", 'write "18.5 m"'),
        ("18", '"18" has no unit', 'write "18 m"'),
        ("18 kN", '"18 kN" is a force, not a length', 'write "18 m"'),
        ("18 deg", '"18 deg" is an angle, not a length', "mm, cm, m, in, ft"),
        ("18 M", '"18 M" has an unknown unit', 'did you mean "18 m"?'),
        ("18 yard", '"18 yard" has an unknown unit', "mm, cm, m, in, ft"),
        ("18,5 m", '"18,5 m" holds a comma', "full stop"),
        ("18,000 mm", '"18,000 mm" holds a comma', "thousands are not separated"),
        ("nan m", "not a finite number", '"1.5 m"'),
        ("-inf m", "not a finite number", '"1.5 m"'),
        (math.nan, "nan is not a finite number", '"1.5 m"'),
        (math.inf, "inf is not a finite number", '"1.5 m"'),
        ("1e999 m", "too large", "check the number"),
        ("1e999999999999 m", "too large", "check the number"),
        ("wide", '"wide" is not a length', '"1.5 m"'),
        ("", '"" is not a length', '"1.5 m"'),
        ("1_000 m", "unknown unit", "mm, cm, m, in, ft"),
        ("\u0661\u0668 m", "is not a length", '"1.5 m"'),
        (True, "true is not a length", '"1.5 m"'),
        ([], "a list is not a length", '"1.5 m"'),
        ({}, "a table is not a length", '"1.5 m"'),
    ],
)
def test_refusals_name_value_and_remedy(value: object, found: str, remedy: str) -> None:
    with pytest.raises(InputError) as caught:
        quantity(value, LENGTH, "m")
    assert found in caught.value.found
    assert remedy in caught.value.remedy


@pytest.mark.parametrize("text", ["0:0", "1:x", "12", "steep", "12 m"])
def test_slopes_that_are_none(text: str) -> None:
    with pytest.raises(InputError):
        slope(text)


def test_shown_stays_on_one_short_line() -> None:
    assert shown("a\nb\x07") == r'"a\nb\x07"'
    assert len(shown("x" * 1000)) < 80
