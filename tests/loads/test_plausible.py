"""Loads that a user hardly means are warned about. Limits: loads/data/usual_loads.csv."""

import math
from dataclasses import replace
from typing import Any

import pytest

from spanwright.loads.cases import load_cases
from spanwright.loads.inputs import LoadsInput, MostLeast, WindInput
from spanwright.loads.plausible import unusual_loads
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.purlins import lay_purlins

GALE = WindInput("gale", -0.8e-3, -0.5e-3)
USUAL = LoadsInput(MostLeast(0.25e-3, 0.18e-3), 0.25e-3, (GALE,))  # 0.25 kPa: SANS 10160-2, from memory


def warnings(derived: tuple[str, ...] = (), **changes: Any) -> tuple[str, ...]:
    loads = replace(USUAL, **changes)
    return unusual_loads(loads, frozenset(derived), wind_acts=bool(loads.wind))


def test_usual_loads_pass() -> None:
    assert warnings() == ()
    assert warnings(roof_imposed=2e-3, roof_permanent=MostLeast(2e-3, 0.0)) == ()


@pytest.mark.parametrize(
    ("changes", "said"),
    [
        ({"roof_imposed": 0.24e-3}, "roof_imposed is 0.240 kPa, less than the usual 0.25 kPa"),
        ({"roof_imposed": 0.0}, "roof_imposed is 0.000 kPa, less than the usual 0.25 kPa"),
        ({"roof_imposed": 2.1e-3}, "roof_imposed is 2.100 kPa, more than the usual 2 kPa"),
        ({"roof_permanent": MostLeast(2.5e-3, 0.0)}, "roof_permanent is 2.500 kPa, more than the usual 2 kPa"),
        ({"ceiling_permanent": MostLeast(2.5e-3, 0.0)}, "ceiling_permanent is 2.500 kPa, more than the usual 2 kPa"),
        ({"wind": (replace(GALE, right=-3.5e-3),)}, 'wind case "gale" has a pressure of 3.500 kPa, more than'),
        ({"wind": ()}, "no wind acts on this roof"),
    ],
)
def test_implausible_loads_are_warned_about(changes: dict[str, Any], said: str) -> None:
    """Reviewed: 0.03 kPa for 0.30 kPa and a roof without wind passed without a word."""
    (sentence,) = warnings(**changes)
    assert sentence.startswith(said)


def test_what_was_found_from_the_site_is_not_judged() -> None:
    assert warnings(("roof_imposed",), roof_imposed=0.0) == ()


def test_they_reach_the_load_set() -> None:
    truss = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4))
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    (said,) = load_cases(truss, lines, replace(USUAL, wind=()), 5e3).warnings
    assert said.startswith("no wind acts")
