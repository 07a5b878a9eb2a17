"""What holds for the loads on every roof, however its purlins stand."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from strategies import trusses

from spanwright.loads.bending import chord_beams
from spanwright.loads.cases import Case, LoadSet, load_cases
from spanwright.loads.inputs import LoadsInput, MostLeast, WindInput
from spanwright.loads.strips import strips
from spanwright.truss.arrays import FloatArray
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine, lay_purlins
from spanwright.truss.tolerances import TOLERANCES

PERMANENT, IMPOSED = 0.25e-3, 0.4e-3


@dataclass(frozen=True)
class Loaded:
    truss: Truss
    lines: tuple[PurlinLine, ...]
    wind: WindInput
    tributary: float
    load_set: LoadSet

    def case(self, name: str) -> Case:
        (found,) = [case for case in self.load_set.cases if case.name == name]
        return found


@st.composite
def roofs(draw: st.DrawFn) -> Loaded:
    truss = draw(trusses())
    slope = truss.top.length / 2 + truss.top.overhang[0]
    panel = truss.lengths[truss.top.bars[0]]
    pair = draw(st.sampled_from([None, 0.3]))
    ridge_pair = None if pair is None else pair * panel
    room = slope - (ridge_pair or 0.0)
    listed = st.lists(st.integers(0, 40), min_size=1, max_size=7, unique=True)
    purlins: tuple[float, ...] | str = "at joints"
    if draw(st.booleans()):
        purlins = tuple(room * share / 40 for share in sorted(draw(listed)))
    restraint = RestraintInput(purlins, "all", "roof bracing", True, ridge_pair=ridge_pair)  # type: ignore[arg-type]  # a plain string
    lines = lay_purlins(truss, restraint)
    pressure = st.integers(-12, 12).map(lambda tenths: tenths * 1e-4)
    wind = WindInput("gale", draw(pressure), draw(pressure), draw(st.sampled_from([0.0, 5000.0])), 2000.0)
    tributary = draw(st.sampled_from([3000.0, 5500.0]))
    loads = LoadsInput(MostLeast(PERMANENT, 0.0), IMPOSED, (wind,), man_load=900.0)
    return Loaded(truss, lines, wind, tributary, load_cases(truss, lines, loads, tributary))


def slope_length(truss: Truss) -> float:
    return truss.top.length + sum(truss.top.overhang)


def plan_length(truss: Truss) -> float:
    slope = truss.vectors[truss.top.bars[0]]
    return slope_length(truss) * abs(float(slope[0])) / float(np.hypot(*slope))


def mirror_image(truss: Truss) -> list[int]:
    turned = truss.xy.copy()
    turned[:, 0] = truss.span - turned[:, 0]
    return [int(np.argmin(np.hypot(*(truss.xy - point).T))) for point in turned]


@given(roofs())
def test_total_is_pressure_times_area(loaded: Loaded) -> None:
    truss, tributary = loaded.truss, loaded.tributary
    slope, plan = slope_length(truss), plan_length(truss)
    for name, weight in (
        ("most", PERMANENT * slope),
        ("imposed", IMPOSED * plan),
        ("imposed left", IMPOSED * plan / 2),
        ("imposed right", IMPOSED * plan / 2),
    ):
        total = loaded.case(name).joint_loads.sum(axis=0)
        assert total == pytest.approx([0.0, -weight * tributary], rel=1e-9, abs=1e-6)
    wind, rise = loaded.wind, float(np.sqrt(slope**2 - plan**2)) / 2
    expected = [
        (wind.left - wind.right) * rise * tributary + wind.eaves_left + wind.eaves_right,
        -(wind.left + wind.right) * plan / 2 * tributary,
    ]
    assert loaded.case("gale").joint_loads.sum(axis=0) == pytest.approx(expected, rel=1e-6, abs=1e-3)


@given(roofs())
def test_halves_make_the_whole(loaded: Loaded) -> None:
    whole, left, right = (loaded.case(name) for name in ("imposed", "imposed left", "imposed right"))
    assert left.joint_loads + right.joint_loads == pytest.approx(whole.joint_loads, rel=1e-9, abs=1e-6)
    assert left.moments + right.moments == pytest.approx(whole.moments, rel=1e-9, abs=1e-3)


@given(roofs(), st.randoms(use_true_random=False))
def test_joints_take_the_forces_and_their_moment(loaded: Loaded, random: np.random.Generator) -> None:
    """Whatever forces stand at the purlins, the joint forces have the same sum and the same moment about any point."""
    truss = loaded.truss
    carried = strips(truss, loaded.lines)
    forces = np.array([[random.uniform(-1e3, 1e3), random.uniform(-1e3, 1e3)] for _ in loaded.lines])
    part = chord_beams(truss, carried.places, man=False).influence(carried.places).part(forces, ())
    at = np.array([[line.x, line.y] for line in loaded.lines])
    assert part.joint_loads.sum(axis=0) == pytest.approx(forces.sum(axis=0), abs=1e-6)
    assert turning(truss.xy, part.joint_loads) == pytest.approx(
        turning(at, forces), rel=1e-9, abs=1e-9 * truss.span * 1e3
    )


def turning(points: FloatArray, forces: FloatArray) -> float:
    return float((points[:, 0] * forces[:, 1] - points[:, 1] * forces[:, 0]).sum())


@given(roofs())
def test_mirrored_wind_mirrors_every_force(loaded: Loaded) -> None:
    names = [case.name for case in loaded.load_set.cases]
    original = loaded.case("gale")
    image = original.joint_loads[mirror_image(loaded.truss)] * [-1.0, 1.0]
    twin = loaded.case("gale mirrored") if "gale mirrored" in names else original
    assert twin.joint_loads == pytest.approx(image, rel=1e-6, abs=1e-3)
    assert twin.moments == pytest.approx(original.moments[::-1], rel=1e-6, abs=1.0)


@given(roofs())
def test_hinges_carry_no_moment_and_ends_only_their_overhang(loaded: Loaded) -> None:
    truss, stations = loaded.truss, loaded.load_set.stations
    apex = truss.top.bars[len(truss.top.bars) // 2]
    (at_apex,) = np.flatnonzero((stations.bar == apex) & (stations.at == 0.0))
    for case in loaded.load_set.cases:
        scale = float(np.abs(case.joint_loads).max()) * truss.span
        assert case.moments[at_apex] == pytest.approx(0.0, abs=1e-9 * scale)
        if truss.top.overhang == (0.0, 0.0):
            assert case.moments[[0, -1]] == pytest.approx([0.0, 0.0], abs=1e-9 * scale)


@given(trusses().filter(lambda truss: max(truss.top.overhang) <= TOLERANCES.sheeting_cantilever))
def test_purlins_at_joints_do_not_bend_the_chord(truss: Truss) -> None:
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    loads = LoadsInput(MostLeast(PERMANENT, 0.0), IMPOSED, (WindInput("gale", -1e-3, 0.5e-3),), man_load=900.0)
    found = load_cases(truss, lines, loads, 5000.0)
    for case in found.cases:
        assert case.moments == pytest.approx(np.zeros(len(case.moments)), abs=1e-3)
    assert not found.stations.loads_between.any()
