"""Forms that cannot be built, and those that are unusual."""

import math
from dataclasses import replace
from typing import Any

import pytest

from spanwright.truss.errors import InputError, UnknownNameError
from spanwright.truss.forms import build_form, panels_for
from spanwright.truss.inputs import FormInput

PRATT = FormInput("Pratt", 18000.0, math.radians(12), 900.0, 12)
FINK = FormInput("Fink", 12000.0, math.radians(25), panels=4)
NAN, INFINITE = math.nan, math.inf

IMPOSSIBLE: list[tuple[FormInput, dict[str, Any], str, str]] = [
    (PRATT, {"panels": 7}, "truss.panels", "8 or 6"),
    (PRATT, {"panels": 0}, "truss.panels", "even and at least 2"),
    (PRATT, {"panels": -4}, "truss.panels", "even and at least 2"),
    (PRATT, {"panels": 600}, "truss.panels", "at most 60"),
    (PRATT, {"span": -18000.0}, "truss.span", "more than 1 m"),
    (PRATT, {"span": 0.0}, "truss.span", "more than 1 m"),
    (PRATT, {"span": 18.0}, "truss.span", "0.018 m"),
    (PRATT, {"span": 18e6}, "truss.span", "less than 150 m"),
    (PRATT, {"span": NAN}, "truss.span", "nan"),
    (PRATT, {"span": INFINITE}, "truss.span", "inf"),
    (PRATT, {"pitch": 0.0}, "truss.pitch", "more than 0 deg"),
    (PRATT, {"pitch": -0.1}, "truss.pitch", "more than 0 deg"),
    (PRATT, {"pitch": math.radians(60)}, "truss.pitch", "less than 60 deg"),
    (PRATT, {"pitch": NAN}, "truss.pitch", "nan"),
    (PRATT, {"heel_depth": 9100.0}, "truss.heel_depth", "half the span"),
    (PRATT, {"heel_depth": INFINITE}, "truss.heel_depth", "inf"),
    (PRATT, {"heel_depth": NAN}, "truss.heel_depth", "nan"),
    (PRATT, {"heel_depth": -600.0}, "truss.heel_depth", "0 for a triangular heel"),
    (PRATT, {"heel_depth": 0.6}, "truss.heel_depth", "0 for a triangular heel"),
    (PRATT, {"overhang": -1.0}, "truss.overhang", "from 0"),
    (PRATT, {"overhang": 9100.0}, "truss.overhang", "half the span"),
    (PRATT, {"overhang": NAN}, "truss.overhang", "nan"),
    (PRATT, {"lean": "sideways"}, "truss.diagonals", "down to centre"),
    (FINK, {"heel_depth": 600.0}, "truss.heel_depth", "Pratt or Howe"),
    (FINK, {"panels": 10}, "truss.panels", "8 (compound Fink)"),
    (FINK, {"panels": 5}, "truss.panels", "4 (Fink)"),
    (FINK, {"lean": "up to centre"}, "truss.diagonals", "leave diagonals out"),
    (FINK, {"pitch": math.radians(45)}, "truss.pitch", "less than 45 deg"),
]


@pytest.mark.parametrize(("form", "change", "key", "says"), IMPOSSIBLE)
def test_the_impossible_is_refused_with_its_key_and_remedy(
    form: FormInput, change: dict[str, Any], key: str, says: str
) -> None:
    with pytest.raises(InputError) as refused:
        build_form(replace(form, **change))
    assert refused.value.key == key
    assert says in str(refused.value)
    assert refused.value.remedy


def test_an_unknown_form_names_the_nearest() -> None:
    with pytest.raises(UnknownNameError, match="Pratt") as refused:
        build_form(replace(PRATT, form="Prat"))  # type: ignore[arg-type]  # what a slip in a notebook passes
    assert refused.value.nearest == "Pratt"


def test_unknown_supports_are_refused() -> None:
    with pytest.raises(InputError, match="both pinned"):
        build_form(PRATT, "fixed")


@pytest.mark.parametrize("spacing", [0.0, -1500.0, NAN, 1.5])
def test_an_absurd_purlin_spacing_is_refused(spacing: float) -> None:
    with pytest.raises(InputError) as refused:
        panels_for(PRATT, spacing)
    assert refused.value.key == "restraint.purlins"


# Limits of the usual ranges: practice notes 1.1, common practice.

UNUSUAL: list[tuple[FormInput, dict[str, Any], str]] = [
    (PRATT, {"span": 48000.0, "panels": 32}, "the span is 48 m, more than the usual 40 m"),
    (PRATT, {"span": 5000.0, "panels": 4}, "the span is 5 m, less than the usual 6 m"),
    (PRATT, {"pitch": math.radians(2)}, "the pitch is 2 deg, less than the usual 3 deg"),
    (FINK, {"pitch": math.radians(38)}, "the pitch is 38 deg, more than the usual 35 deg"),
    (FINK, {"pitch": math.radians(9)}, "the pitch is 9 deg, less than the usual 10 deg"),
    (FINK, {"pitch": math.radians(9)}, "span to greatest depth is 12.6, more than the usual 8"),
    (PRATT, {"pitch": math.radians(1), "heel_depth": 500.0}, "span to greatest depth is 27.4, more than the usual 20"),
    (PRATT, {"panels": 4}, "the rafter panel of TC1, TC2, TC3, TC4 is up to 4.601 m, more than the usual 3 m"),
    (PRATT, {"panels": 16}, "is down to 1.15 m, less than the usual 1.2 m"),
    (PRATT, {"panels": 16}, "TC5, TC6 and 10 more"),
    (
        PRATT,
        {"panels": 4},
        "the slope of D1, D2, D3, D4 to the bottom chord is down to 11.31 deg, less than",
    ),
    (PRATT, {"pitch": math.radians(35)}, "to the bottom chord is up to 76.3 deg, more than the usual 60 deg"),
    (PRATT, {"heel_depth": 400.0}, "the depth at the heel is 0.4 m, less than the usual 0.5 m"),
]


@pytest.mark.parametrize(("form", "change", "says"), UNUSUAL)
def test_the_unusual_is_warned_about_with_numbers(form: FormInput, change: dict[str, Any], says: str) -> None:
    assert any(says in warning for warning in build_form(replace(form, **change)).warnings)


@pytest.mark.parametrize(
    "form",
    [
        FormInput("Pratt", 18000.0, math.radians(5), 900.0, 12),
        FormInput("Fink", 13500.0, math.radians(30), panels=8),
        FormInput("Fink", 9000.0, math.radians(22), panels=4),
    ],
)
def test_an_ordinary_roof_is_not_warned_about(form: FormInput) -> None:
    assert build_form(form).warnings == ()
