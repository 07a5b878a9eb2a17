"""What a design warns of: soft braces, unheld bottom chords, groups that few members size, settlement of bearings."""

from __future__ import annotations

import re
from dataclasses import replace

import numpy as np
import pytest
from demos import demo

from spanwright.design.project import Project
from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.truss.inputs import FormInput, GivenInput
from spanwright.truss.model import Role


def warned(found: Design, words: str) -> list[str]:
    return [warning for warning in found.warnings if words in warning]


def braced(heel: float) -> Project:
    """Return the store with its heel, mm, made deeper."""
    project = demo("pratt_store")
    assert isinstance(project.truss, FormInput)
    return replace(project, truss=replace(project.truss, heel_depth=heel))


def test_all_long_knee_braces_stand_in_one_warning_with_the_stiffness_they_must_have() -> None:
    found = design(braced(1200.0))
    (one,) = warned(found, "are soft")
    forces = {force.part: force for force in found.restraint_forces}
    long = [brace for brace in found.setting.restraint.braces if brace.rise > 1500.0]
    assert len(long) > 1
    for brace in long:
        stiffness = forces[brace.name].stiffness
        assert f"{brace.at} (rises {brace.rise / 1000:.2f} m, {stiffness:.0f} N/mm)" in one
    assert "4EI/L" in one
    assert "(from memory)" in one


def test_the_required_stiffness_is_8_cu_over_lb() -> None:
    """S16-01 9.2.6.2 with beta = 4, from memory; the store's braces stand 3 m apart under one compression."""
    found = design(demo("pratt_store"))
    middle = next(force for force in found.restraint_forces if force.part == "knee brace B6")
    bottom = found.demand.axial[list(found.setting.truss.bottom.bars)[4:8]]
    assert middle.stiffness == pytest.approx(8.0 * -bottom.min() / 3000.0, rel=1e-9)
    assert middle.force == pytest.approx(0.02 * -bottom.min(), rel=1e-9)


def test_the_anchor_is_told_with_its_combination_and_with_the_relief_of_parallel_trusses() -> None:
    """0.2 + 0.8/sqrt(n), SANS 10162-1 cl. 9.2 (from memory); six trusses: 0.5266."""
    found = design(demo("pratt_store"))
    every = sum(force.force for force in found.restraint_forces if force.kind != "bearing")
    assert found.anchor_force < 6 * every
    column = found.strength_names.index(found.anchor_combination)
    top = -found.demand.axial[list(found.setting.truss.top.bars), column]
    assert found.anchor_force >= 6 * 0.02 * top.max()
    assert found.anchor_force_relieved == pytest.approx(0.5266 * found.anchor_force, rel=1e-4)


def test_a_bottom_chord_that_nothing_braces_is_told_what_would_make_it_lighter() -> None:
    project = demo("howe_workshop")
    free = design(replace(project, restraint=replace(project.restraint, bottom_ties="none")))
    (told,) = warned(free, "would make it lighter")
    assert told.startswith("bottom chord: held sideways only at B0 and B10 over 15.000 m")
    assert not warned(design(project), "would make it lighter")
    assert free.mass > design(project).mass


def test_a_few_slender_webs_that_size_a_group_are_told_with_what_their_own_group_saves() -> None:
    """The Fink's inner ties D3 to D6 run straight through two joints: try the group that the warning proposes."""
    project = replace(demo("fink_barn"), groups={"tie": ("BC3",)})
    found = design(project)
    (told,) = warned(found, "would save")
    assert told.startswith("diagonals: the slenderness of D3 to D6")
    apart = design(replace(project, groups={**project.groups, "long ties": ("D3", "D4", "D5", "D6")}))
    saved = re.search(r"about (\d+) kg", told)
    assert saved is not None
    assert float(saved[1]) == pytest.approx(found.mass - apart.mass, abs=2.0)
    assert apart.passes
    assert not warned(apart, "would save")


def three_bearings() -> Project:
    """Return a flat truss of 8 m and 4 m beside each other, given joint by joint, with the loads of the workshop."""
    joints = [(f"B{k}", 2000.0 * k, 0.0) for k in range(7)]
    joints += [(f"T{k}", 2000.0 * k, 1500.0 + 20.0 * k) for k in range(7)]
    bars: list[tuple[str, str, Role]] = [(f"B{k}", f"B{k + 1}", "bottom chord") for k in range(6)]
    bars += [(f"T{k}", f"T{k + 1}", "top chord") for k in range(6)]
    bars += [(f"B{k}", f"T{k}", "post") for k in range(7)]
    bars += [(f"T{k}", f"B{k + 1}", "diagonal") for k in range(6)]
    project = demo("howe_workshop")
    given = GivenInput(tuple(joints), tuple(bars), (("B0", "pinned"), ("B4", "sliding"), ("B6", "sliding")))
    winds = (replace(project.loads.wind[0], right=0.0, mirrored=False),)
    return replace(
        project,
        truss=given,
        supports="as given",
        restraint=replace(project.restraint, bottom_ties=("B2", "B4")),
        loads=replace(project.loads, at_joint=(), wind=winds),
    )


def test_over_three_bearings_each_span_has_its_own_line_and_limit() -> None:
    found = design(three_bearings())
    truss = found.setting.truss
    for row in found.serviceability.deflections:
        at = truss.xy[truss.joint(row.joint), 0]
        assert row.limit == pytest.approx((8000.0 if at < 8000.0 else 4000.0) / row.span_over)
        # bearings do not settle: against the line between them is against the ground
        column = next(k for k, c in enumerate(found.analysis.combinations) if c.name == row.combination)
        assert row.value == pytest.approx(-found.analysis.displacements[truss.joint(row.joint), 1, column])
    ratios = {
        joint: np.abs(found.analysis.displacements[joint, 1, found.analysis.columns("SLS")]).max()
        / (8000.0 if truss.xy[joint, 0] <= 8000.0 else 4000.0)
        for joint in range(len(truss.joint_names))
    }
    total = next(row for row in found.serviceability.deflections if row.name == "total")
    assert total.joint == truss.joint_names[max(ratios, key=lambda joint: ratios[joint])]


def test_over_three_bearings_settlement_is_said_not_to_be_considered() -> None:
    (told,) = warned(design(three_bearings()), "settles")
    assert "bears at B0, B4, B6: that B4 settles" in told
    assert not warned(design(demo("howe_workshop")), "settles")


def test_the_mass_counts_the_overhang_as_the_own_mass_does() -> None:
    project = demo("howe_workshop")
    assert isinstance(project.truss, FormInput)
    found = design(replace(project, truss=replace(project.truss, overhang=600.0)))
    bare = {case.name: case.joint_loads[:, 1].sum() for case in found.setting.load_set.cases}
    full = {case.name: case.joint_loads[:, 1].sum() for case in found.analysis.cases}
    assert bare["least"] - full["least"] == pytest.approx(found.mass * 9.80665, rel=1e-9)  # g, CGPM 1901
    chord = found.setting.truss.top
    (top,) = [choice for choice in found.choices if choice.group.name == "top chord"]
    assert found.group_mass(top) == pytest.approx((chord.length + sum(chord.overhang)) / 1e3 * top.section.mass[0])


def test_purlins_that_a_spacing_puts_between_joints_are_told() -> None:
    project = demo("howe_workshop")
    spaced = replace(project.restraint, purlins=788.6)  # two to a rafter panel of 1 577.2 mm
    (told,) = warned(design(replace(project, restraint=spaced)), "stand between joints")
    assert told.startswith("10 of 21 purlin lines")
    assert not warned(design(project), "stand between joints")
