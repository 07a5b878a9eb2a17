"""Loads at joints against published figures."""

import math

import pytest

from spanwright.loads.cases import load_cases
from spanwright.loads.inputs import LoadsInput, MostLeast
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.purlins import lay_purlins


@pytest.mark.parametrize(("pressure", "expected"), [(0.536e-3, 1929.6), (0.75e-3, 2700.0)])
def test_load_at_an_inner_joint(pressure: float, expected: float) -> None:
    """Ubani (2017), "Practical analysis and design of steel roof trusses to Eurocode 3: a sample design", p. 2:
    joints 1.2 m apart on plan, trusses 3.0 m apart: 0.536 kN/m2 gives 1.9296 kN, 0.75 kN/m2 gives 2.7 kN."""
    truss = build_form(FormInput("Howe", 7200.0, math.radians(20.0), panels=6))
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    load_set = load_cases(truss, lines, LoadsInput(MostLeast(0.0, 0.0), pressure, ()), 3000.0)
    (imposed,) = [case for case in load_set.cases if case.name == "imposed"]
    for name in ("T1", "T2", "T3", "T4", "T5"):
        assert -imposed.joint_loads[truss.joint(name), 1] == pytest.approx(expected)
    assert -imposed.joint_loads[truss.joint("B0"), 1] == pytest.approx(expected / 2)
