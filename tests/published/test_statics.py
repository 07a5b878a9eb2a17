"""Plane trusses solved by others: textbooks, problem collections and closed forms, each named in data/statics.json."""

from __future__ import annotations

import json
import math
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from bare import bare_truss

from spanwright.truss.arrays import FloatArray
from spanwright.truss.equilibrium import second_solution
from spanwright.truss.model import Truss
from spanwright.truss.stiffness import Solution, solve

MM = {"m": 1000.0, "ft": 304.8}
N = {"N": 1.0, "kN": 1000.0, "lb": 4.4482216152605, "kip": 4448.2216152605}
DATA = json.loads((Path(__file__).parent / "data" / "statics.json").read_text(encoding="utf-8"))
EXAMPLES: dict[str, dict[str, Any]] = {example["name"]: example for example in DATA["examples"]}


@dataclass(frozen=True)
class Example:
    """An example in N and mm."""

    given: dict[str, Any]
    truss: Truss
    axial_stiffness: FloatArray
    loads: FloatArray
    strains: FloatArray
    settlements: FloatArray

    @classmethod
    def named(cls, name: str) -> Example:
        given = EXAMPLES[name]
        mm, newton = MM[given["length_unit"]], N[given["force_unit"]]
        joints = {joint: (x * mm, y * mm) for joint, (x, y) in given["joints"].items()}
        truss = bare_truss(joints, given["bars"], given["supports"])
        strains = np.array([[given.get("strains", {}).get(bar, 0.0)] for bar in truss.bar_names])
        return cls(
            given,
            truss,
            np.full(len(truss.bar_names), given["axial_stiffness"] * newton),
            cls._at_joints(truss, given["loads"]) * newton,
            strains,
            cls._at_joints(truss, given.get("settlements", {})) * mm,
        )

    @staticmethod
    def _at_joints(truss: Truss, values: dict[str, tuple[float, float]]) -> FloatArray:
        return np.array([[[float(part)] for part in values.get(name, (0.0, 0.0))] for name in truss.joint_names])

    @property
    def force_unit(self) -> float:
        return N[self.given["force_unit"]]

    @property
    def tolerance(self) -> float:
        return float(self.given["relative_tolerance"])

    @property
    def expected(self) -> dict[str, Any]:
        return dict(self.given["expected"])

    def solve(self) -> Solution:
        return solve(self.truss, self.axial_stiffness, self.loads, strains=self.strains, settlements=self.settlements)

    def second_solution(self) -> FloatArray:
        return second_solution(
            self.truss, self.axial_stiffness, self.loads, strains=self.strains, settlements=self.settlements
        )

    def negligible_force(self) -> float:
        """Force that counts as zero, N: rounding of the largest load, or of a bar strained against rigid joints."""
        largest = max(float(np.abs(self.loads).max()), float(np.max(self.axial_stiffness * np.abs(self.strains[:, 0]))))
        return 1e-9 * largest


FORCES = [name for name, example in EXAMPLES.items() if "forces" in example["expected"]]
REACTIONS = [name for name, example in EXAMPLES.items() if "reactions" in example["expected"]]
DISPLACEMENTS = [name for name, example in EXAMPLES.items() if "displacements_mm" in example["expected"]]


@pytest.mark.parametrize("name", FORCES)
def test_bar_forces_are_as_published_both_ways(name: str) -> None:
    example = Example.named(name)
    for forces in (example.solve().forces, example.second_solution()):
        found = {bar: forces[example.truss.bar(bar), 0] / example.force_unit for bar in example.expected["forces"]}
        negligible = example.negligible_force() / example.force_unit
        assert found == pytest.approx(example.expected["forces"], rel=example.tolerance, abs=negligible)


@pytest.mark.parametrize("name", REACTIONS)
def test_reactions_are_as_published(name: str) -> None:
    example = Example.named(name)
    reactions = example.solve().reactions[:, :, 0] / example.force_unit
    for joint, published in example.expected["reactions"].items():
        for axis, value in enumerate(published):
            if value is not None:
                found = reactions[example.truss.joint(joint), axis]
                assert found == pytest.approx(value, rel=example.tolerance, abs=1e-9 * np.abs(reactions).max())


@pytest.mark.parametrize("name", DISPLACEMENTS)
def test_joints_move_as_published(name: str) -> None:
    example = Example.named(name)
    displacements = example.solve().displacements[:, :, 0]
    for joint, published in example.expected["displacements_mm"].items():
        for axis, value in enumerate(published):
            if value is not None:
                found = displacements[example.truss.joint(joint), axis]
                assert found == pytest.approx(value, rel=example.tolerance, abs=1e-9 * np.abs(displacements).max())


def test_unit_load_sum_of_a_textbook_truss() -> None:
    # from memory: Hibbeler, Structural Analysis, Example 9-1: sum of n N L = 246.47 kip2 ft
    loaded, unit = (Example.named(f"unit-load method, {which}") for which in ("loads", "unit load"))
    sums = np.sum(unit.solve().forces * loaded.solve().forces * loaded.truss.lengths[:, None])
    assert sums / (N["kip"] ** 2 * MM["ft"]) == pytest.approx(246.47, rel=5e-5)


def test_two_bars_give_the_exact_displacements() -> None:
    # from memory: Hibbeler, Structural Analysis, Example 14-1: exact 4.5 / AE and -19 / AE in kip and ft
    displacements = Example.named("two bars by direct stiffness").solve().displacements[0, :, 0] / MM["ft"]
    assert displacements == pytest.approx([4.5, -19.0], rel=1e-12)


@pytest.mark.parametrize("panels", [2, 4, 6, 10, 16])
def test_parallel_chord_pratt_by_the_method_of_sections(panels: int) -> None:
    # closed form: chord = M / h, diagonal = V / sin, post = -(V + joint load), loads W on every top joint
    a, h, W = 3000.0, 2000.0, 12000.0
    joints = {f"b{i}": (i * a, 0.0) for i in range(panels + 1)} | {f"t{i}": (i * a, h) for i in range(panels + 1)}
    bars = {f"V{i}": (f"b{i}", f"t{i}") for i in range(panels + 1)}
    for i in range(1, panels + 1):
        bars[f"B{i}"] = (f"b{i - 1}", f"b{i}")
        bars[f"T{i}"] = (f"t{i - 1}", f"t{i}")
        bars[f"D{i}"] = (f"t{i - 1}", f"b{i}") if i <= panels / 2 else (f"b{i - 1}", f"t{i}")
    truss = bare_truss(joints, bars, {"b0": "xy", f"b{panels}": "y"})
    loads = np.zeros((len(joints), 2, 1))
    for i in range(panels + 1):
        loads[truss.joint(f"t{i}"), 1] = -W if 0 < i < panels else -W / 2
    expected = {"V0": -panels * W / 2, f"V{panels // 2}": -W}
    for i in range(1, panels // 2 + 1):
        expected[f"T{i}"] = -W * a * i * (panels - i) / (2 * h)
        expected[f"B{i}"] = W * a * (i - 1) * (panels - i + 1) / (2 * h)
        expected[f"D{i}"] = W * (panels - 2 * i + 1) / 2 * math.hypot(a, h) / h
        if i < panels // 2:
            expected[f"V{i}"] = -(panels - 2 * i - 1) * W / 2 - W
    forces = solve(truss, np.full(len(bars), 3e8), loads).forces[:, 0]
    assert {bar: forces[truss.bar(bar)] for bar in expected} == pytest.approx(expected, rel=1e-9, abs=1e-9 * W)


def test_reciprocal_displacements_and_load_paths_of_a_fink() -> None:
    # J. C. Maxwell 1864 and E. Betti 1872: u_ij = u_ji. Maxwell 1870: the sum of N L equals that of F . x
    fink = Example.named("compound Fink")
    truss = fink.truss
    near, far = truss.joint("t1"), truss.joint("t3'")
    loads = np.zeros((len(truss.joint_names), 2, 2))
    loads[near, 1, 0] = loads[far, 1, 1] = 1000.0
    moved = solve(truss, fink.axial_stiffness, loads).displacements
    assert moved[far, 1, 0] == pytest.approx(moved[near, 1, 1], rel=1e-9)

    solution = fink.solve()
    paths = np.sum(solution.forces[:, 0] * truss.lengths)
    external = np.sum((fink.loads + solution.reactions)[:, :, 0] * truss.xy)
    assert paths == pytest.approx(external, rel=1e-9)
    assert paths / 1e6 == pytest.approx(-20.0, rel=1e-6)  # kN m, of rounded joint coordinates
