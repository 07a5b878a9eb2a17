"""Hand checks: what a checking engineer does with pencil and calculator before trusting a result, with pass or fail.

Each takes a way of its own, not that of the analysis: equilibrium of a part, closed forms, virtual work with forces
found from the joints alone, areas times pressures, published rules of thumb.
"""

from __future__ import annotations

from collections.abc import Iterator
from math import sqrt

import numpy as np
from scipy.constants import g

from spanwright.design.comparison import Comparison, compared
from spanwright.design.families import TUBES
from spanwright.design.hand_cuts import cuts
from spanwright.design.hand_loads import between_joints, by_virtual_work, closed_forms, totals, uplift
from spanwright.design.hand_statics import statics
from spanwright.design.result import Design
from spanwright.design.rules_of_thumb import rule
from spanwright.truss.equilibrium import second_solution

__all__ = ["Comparison", "hand_checks", "mass_per_area"]


def hand_checks(design: Design) -> tuple[Comparison, ...]:
    """Return every hand check of a design; those that do not arise are left out."""
    setting, analysis = design.setting, design.analysis
    truss, project = setting.truss, setting.project
    return (
        *statics(truss, analysis, design.second_difference),
        *totals(truss, project, analysis),
        *closed_forms(truss, project, analysis),
        *cuts(truss, analysis),
        *uplift(analysis),
        *between_joints(truss, project, setting.restraint.lines, setting.load_set.stations, analysis.cases),
        *_deflections(design),
        *_stocky(design),
        _mass(design),
    )


def _deflections(design: Design) -> Iterator[Comparison]:
    """Each deflection that decided, by virtual work; the forces of the unit load come from equilibrium alone."""
    truss, analysis = design.setting.truss, design.analysis
    names = [combination.name for combination in analysis.combinations]
    flexibility = truss.lengths / analysis.axial_stiffness
    for row in design.serviceability.deflections:
        column = names.index(row.combination)
        reading = analysis.arrangements[column // (len(names) // len(analysis.arrangements))]
        unit_load = np.zeros((len(truss.joint_names), 2, 1))
        unit_load[truss.joint(row.joint), 1, 0] = -1.0
        unit = second_solution(truss, analysis.axial_stiffness, unit_load, supports=reading.supports)[:, 0]
        by_hand, working = by_virtual_work(analysis.forces[:, column] * flexibility, unit, truss.bar_names)
        yield compared(f"deflection, {row.name}", f"{row.joint}, {row.combination}", working, by_hand, row.value, "mm")


def _stocky(design: Design) -> Iterator[Comparison]:
    """Whether bars are slim enough to leave out the moments of stiff joints."""
    limits = rule("stocky")
    for choice in design.choices:
        lengths = design.setting.truss.lengths[choice.group.bars]
        place = int(np.argmin(lengths))
        kind = "tube" if choice.section.family in TUBES else "chord" if "chord" in choice.group.role else "web"
        depth, least = float(choice.section.depth[0]), float(limits[kind]["least"])
        ratio = float(lengths[place]) / depth
        yield Comparison(
            f"length over depth, {choice.group.name}",
            design.setting.truss.bar_names[choice.group.bars[place]],
            f"at least this, or the moments of stiff joints count ({limits[kind]['source']})",
            least,
            ratio,
            "-",
            ratio >= least,
            exact=False,
        )


def mass_per_area(design: Design) -> float:
    """Return the mass of the members of one truss over the plan that it covers, kg/m2."""
    setting = design.setting
    return design.mass / (setting.truss.span * setting.project.spacing) * 1e6


def _mass(design: Design) -> Comparison:
    """The mass against Thayer's formula, with the greatest permanent and the imposed load as the load on the truss."""
    setting = design.setting
    plan = setting.truss.span * setting.project.tributary / 1e6
    down = sum(
        max(-float(case.joint_loads[:, 1].sum()), 0.0)
        for case in design.analysis.cases
        if case.name in ("most", "imposed")
    )
    load, spacing, span = down / g / plan, setting.project.spacing / 1e3, setting.truss.span / 1e3
    formula, other = rule("mass_thayer"), rule("mass_span")
    by_hand = sqrt(load / spacing) * (span / formula["divisor"] + formula["constant"])
    found = mass_per_area(design)
    return Comparison(
        "mass of the truss",
        f"to be within {formula['within']:.0%} of the rule",
        f"{formula['source']}: sqrt(q/s)(L/{formula['divisor']:g} + {formula['constant']:g}), q = {load:.1f} kg/m², "
        f"s = {spacing:.2f} m, L = {span:.2f} m. {other['source']}, L/{other['divisor']:g} + {other['constant']:g}: "
        f"{span / other['divisor'] + other['constant']:.1f}",
        by_hand,
        found,
        "kg/m2",
        abs(found - by_hand) <= formula["within"] * by_hand,
        exact=False,
    )
