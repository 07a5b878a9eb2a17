"""The demo projects: figures by hand, and the figures each folder states in expected.toml."""

from __future__ import annotations

import math
import tomllib
from typing import Any

import pytest
from demos import DEMOS, FOLDER, demo

from spanwright.design.result import Design
from spanwright.design.run import design


@pytest.fixture(scope="module", params=DEMOS)
def done(request: pytest.FixtureRequest) -> Design:
    return design(demo(request.param))


def expected(done: Design) -> dict[str, Any]:
    name = next(
        name for name in DEMOS if demo(name) is done.setting.project or demo(name).title == done.setting.project.title
    )
    return tomllib.loads((FOLDER / name / "expected.toml").read_text(encoding="utf-8"))


def force(done: Design, bar: str, case: str) -> float:
    at = next(at for at, other in enumerate(done.analysis.cases) if other.name == case)
    return float(done.analysis.case_forces[done.setting.truss.bar(bar), at])


def test_the_stated_figures_stand(done: Design) -> None:
    figures = expected(done)
    assert {choice.group.name: choice.name for choice in done.choices} == figures["sections"]
    assert done.mass == pytest.approx(figures["mass_kg"], abs=0.5)
    governing = {choice.group.name: done.governing_of(choice) for choice in done.choices}
    for group, (bar, check, use) in figures["governing"].items():
        assert (governing[group].bar, governing[group].check) == (bar, check)
        assert governing[group].ratio == pytest.approx(use, abs=0.005)
    total = next(row for row in done.serviceability.deflections if row.name == "total")
    assert total.value == pytest.approx(figures["deflection_total_mm"], abs=0.05)
    assert done.passes is figures["passes"]


def test_the_howe_by_closed_forms() -> None:
    """Howe, pitched, n equal panels, load P a joint: tie (n-1)P/(2 tan), rafter -(n-1)P/(2 sin), king post (m-1)P
    (closed forms of practice, verified there by an independent solver).
    """
    done = design(demo("howe_workshop"))
    panels, pitch = 10, math.radians(18)
    load = 0.30e-3 * 6000 * 1500
    assert load == pytest.approx(2700)
    assert force(done, "BC1", "imposed") == pytest.approx((panels - 1) * load / (2 * math.tan(pitch)), rel=1e-9)
    assert force(done, "TC1", "imposed") == pytest.approx(-(panels - 1) * load / (2 * math.sin(pitch)), rel=1e-9)
    assert force(done, "P5", "imposed") == pytest.approx((panels / 2 - 1) * load, rel=1e-9)


def test_the_pratt_by_moments() -> None:
    """Chord force = moment about the opposite joint over its depth (method of sections); diagonals lean down to centre,
    so the joint opposite BC6 is T5, 7.5 m from the bearing. Reaction: 0.30 kPa x 5 m x 9 m.
    """
    done = design(demo("pratt_store"))
    truss = done.setting.truss
    case = next(case for case in done.analysis.cases if case.name == "imposed")
    pole = truss.xy[truss.joint("T5")]
    assert pole == pytest.approx([7500.0, 900.0 + 7500.0 * math.tan(math.radians(5))])
    arms = truss.xy - pole
    turning = arms[:, 0] * case.joint_loads[:, 1] - arms[:, 1] * case.joint_loads[:, 0]
    reaction = 1.5 * 9000.0
    moment = reaction * 7500.0 - float(turning[arms[:, 0] < 0].sum())
    assert force(done, "BC6", "imposed") == pytest.approx(moment / pole[1], rel=1e-9)


def test_the_fink_by_closed_forms() -> None:
    """Compound Fink, 8 rafter panels: tie 7P/(2 tan), first strut -P cos (closed forms of practice)."""
    done = design(demo("fink_barn"))
    pitch = math.radians(30)
    load = 0.30e-3 * 4500 * 13500 / 8
    assert force(done, "BC1", "imposed") == pytest.approx(7 * load / (2 * math.tan(pitch)), rel=1e-9)
    assert force(done, "P1", "imposed") == pytest.approx(-load * math.cos(pitch), rel=1e-9)
