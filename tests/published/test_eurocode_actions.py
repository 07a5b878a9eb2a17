"""Eurocode actions against printed examples and computed vectors.

"Steel Buildings in Europe" stands for the guides of ArcelorMittal, Peiner Träger and Corus with CTICM and SCI.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from printed import beyond_rounding, half_unit, read_printed

from spanwright.loads.cases import Case, CaseKind, loads_on
from spanwright.loads.combinations import Combination, combine
from spanwright.loads.eurocode import Eurocode
from spanwright.loads.inputs import LoadsInput, MostLeast
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import SiteInput, SnowInput
from spanwright.loads.snow import snow_arrangements
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.purlins import lay_purlins

EN = Eurocode("6.10")


def gable(percent: float, half_width: float = 16e3) -> RoofShape:
    """Return a duopitch roof by its slope in percent; eaves 6 m."""
    pitch, width = math.atan(percent / 100.0), 2 * half_width
    top = 6e3 + half_width * percent / 100.0
    return RoofShape(
        "duopitch", pitch, pitch, (0.0, width), (0.0, width), half_width, (0.0, 60e3), 60e3, width, top, (6e3, 6e3)
    )


def test_peak_pressure_step_by_step() -> None:
    """Steel Buildings in Europe, Single-Storey, Part 3: Actions, Appendix B pp. 47, 48 (seen): v_b 26 m/s, terrain III,
    z 8 m. The source rounds k_r, c_r and c_e on the way; unrounded q_p is 0.662, 0.4 % more than printed.
    """
    found = EN.peak_pressure(SiteInput(60e3, 6e3, "III", 26.0), 8e3)
    value = {step.symbol: step.value for step in found.steps}
    basic = value["rho"] * value["vb"] ** 2 / 2
    assert beyond_rounding("422.5", basic) == 0.0
    assert beyond_rounding("0.215", value["kr"]) == 0.0
    assert value["cr"] == pytest.approx(0.706, rel=0.002)
    assert found.pressure * 1e6 / basic == pytest.approx(1.56, rel=0.005)
    assert found.pressure * 1e3 == pytest.approx(0.659, rel=0.005)
    assert found.pressure * 1e3 == pytest.approx(0.661817, rel=1e-6)  # our recomputation, unrounded


@pytest.mark.parametrize("row", read_printed("en_exposure.csv"), ids=lambda row: row["z_m"])
@pytest.mark.parametrize("terrain", ["0", "I", "II", "III", "IV"])
def test_exposure(row: dict[str, str], terrain: str) -> None:
    """Our rule sheet of the Eurocodes, section 4.3 (computed)."""
    found = EN.peak_pressure(SiteInput(60e3, 6e3, terrain, 26.0), float(row["z_m"]) * 1e3)
    assert found.pressure * 1e6 / 422.5 == pytest.approx(float(row[terrain]), abs=1.01 * half_unit(row[terrain]))


def test_a_second_peak_pressure() -> None:
    """Our rule sheet of the Eurocodes, section 6.2 (computed): v_b 26 m/s, terrain II, z 7.3 m."""
    found = EN.peak_pressure(SiteInput(60e3, 6e3, "II", 26.0), 7.3e3)
    value = {step.symbol: step.value for step in found.steps}
    assert beyond_rounding("0.947", value["cr"]) == 0.0
    assert beyond_rounding("0.2007", value["Iv"]) == 0.0
    assert beyond_rounding("0.911", value["qp"]) == 0.0


@pytest.mark.parametrize("percent", [15.0, 10.0])
def test_snow_on_a_duopitch_roof(percent: float) -> None:
    """Steel Buildings in Europe, Single-Storey, Part 3: Actions, Appendix A (seen): s_k 0.65, slopes of 15 % and 10 %,
    mu 0.8: 0.52 | 0.52, 0.26 | 0.52, 0.52 | 0.26; with C_esl = 2 exceptional 1.04 | 1.04 and 0.52 | 1.04.
    """
    snow = SnowInput(0.65e-3, exceptional=2.0)
    found = snow_arrangements(snow, SiteInput(60e3, 6e3, snow=snow), gable(percent))
    loads = {one.name: (one.left * 1e3, one.right * 1e3) for one in found}
    assert loads == {
        "snow balanced": pytest.approx((0.52, 0.52)),
        "snow drifted to the right": pytest.approx((0.26, 0.52)),
        "snow drifted to the left": pytest.approx((0.52, 0.26)),
        "exceptional snow balanced": pytest.approx((1.04, 1.04)),
        "exceptional snow drifted to the right": pytest.approx((0.52, 1.04)),
        "exceptional snow drifted to the left": pytest.approx((1.04, 0.52)),
    }


def test_line_loads_on_a_frame() -> None:
    """Steel Buildings in Europe, Single-Storey, Part 4, Appendix D p. 84 (seen): frames 7.20 m apart carry snow of
    0.618 as 4.45 kN/m and imposed load of 0.40 as 2.88 kN/m. Here over a truss of 30 m.
    """
    snow = SnowInput(0.618e-3 / 0.8)
    site = SiteInput(72e3, 6e3, snow=snow, derive=frozenset({"snow", "roof_imposed"}))
    truss = build_form(FormInput("Pratt", 30e3, math.radians(10.0), 0.0, 12))
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    loads = LoadsInput(MostLeast(0.0, 0.0), 0.0, ())
    found = loads_on(truss, lines, loads, site, EN.name, spacing=7.2e3, tributary=7.2e3)
    down = {case.name: -case.joint_loads[:, 1].sum() / 30e3 for case in found.cases}
    assert down["imposed"] == pytest.approx(2.88)
    assert beyond_rounding("4.45", down["snow balanced"]) == 0.0


NOTHING = np.zeros((2, 2))
KINDS: tuple[tuple[str, CaseKind], ...] = (
    ("most", "permanent"),
    ("least", "permanent"),
    ("imposed", "imposed"),
    ("snow", "snow"),
    ("wind", "wind"),
)


@pytest.fixture(scope="module")
def printed_forms() -> tuple[Combination, ...]:
    return combine(tuple(Case(name, kind, NOTHING, np.zeros(0)) for name, kind in KINDS), EN.name)


@pytest.mark.parametrize(
    ("limit_state", "form"),
    [
        ("STR", "1.35 most + 1.5 snow + 0.9 wind"),
        ("STR", "1.35 most + 0.75 snow + 1.5 wind"),
        ("STR", "1.0 least + 1.5 wind"),  # uplift: factors seen
        ("EQU", "0.9 least + 1.5 wind"),  # holding down: factors seen
        ("SLS", "1.0 most + 1.0 snow + 0.6 wind"),
        ("SLS", "1.0 most + 0.5 snow + 1.0 wind"),
    ],
)
def test_worked_combinations(printed_forms: tuple[Combination, ...], limit_state: str, form: str) -> None:
    """Steel Buildings in Europe, Multi-Storey, Part 3: Actions pp. 4, 5 (1.35G + 1.5S + 0.9W; 1.35G + 1.5W + 0.75S) and
    Single-Storey Part 3 p. 6 (G + S + 0.6W; G + W + 0.5S), all seen.
    """
    assert (limit_state, form) in {(one.limit_state, one.name) for one in printed_forms}
