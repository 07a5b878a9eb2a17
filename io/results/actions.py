"""What acts and what it does to the whole truss: cases, combinations, reactions, equilibrium, deflection."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Any, get_args

from spanwright.design.analysis import Analysis
from spanwright.design.reactions import BearingForce, Direction
from spanwright.design.result import Design
from spanwright.io.results.numbers import millimetres, newtons, pairs, ratio
from spanwright.truss.stiffness import Solution, reaction_sums

Vectors = dict[str, list[float | None]]


def site(design: Design) -> dict[str, Any] | None:
    """Return how the site became loads, value by value; None where the user stated every load."""
    found = design.setting.load_set.site
    if found is None:
        return None
    return {
        "standard": found.standard,
        "truss_from_gable_mm": millimetres(found.position),
        "strip_mm": [millimetres(edge) for edge in found.strip],
        "steps": [
            {
                "symbol": step.symbol,
                "meaning": step.meaning,
                "value": step.value,
                "unit": step.unit,
                "clause": step.clause,
                "formula": step.formula,
                "mark": step.mark,
            }
            for step in found.steps
        ],
    }


def cases(design: Design) -> list[dict[str, Any]]:
    """Return one row a load case, unfactored, for every arrangement of the supports."""
    names = design.setting.truss.joint_names
    as_stated, *sliding = design.analysis.solutions
    return [
        {
            "name": case.name,
            "kind": case.kind,
            "derivation": list(case.derivation),
            "loads_N": pairs(case.joint_loads, names),
            "reactions_N": pairs(as_stated.reactions[:, :, at], names),
            "reactions_one_end_sliding_N": _only(pairs(solution.reactions[:, :, at], names) for solution in sliding),
            "deflections_mm": _displacements(as_stated, at, names),
            "deflections_one_end_sliding_mm": _only(_displacements(solution, at, names) for solution in sliding),
        }
        for at, case in enumerate(design.analysis.cases)
    ]


def _displacements(solution: Solution, case: int, names: tuple[str, ...]) -> Vectors:
    return {
        name: [millimetres(float(value)) for value in solution.displacements[joint, :, case]]
        for joint, name in enumerate(names)
    }


def _only(found: Iterable[Vectors]) -> Vectors:
    """Return the vectors of the one arrangement found, empty where there is none."""
    return next(iter(found), {})


def combinations(design: Design) -> list[dict[str, Any]]:
    """Return one row a combination."""
    names = design.setting.truss.joint_names
    return [
        {
            "name": combination.name,
            "limit_state": combination.limit_state,
            "supports": _supports(design.analysis, at),
            "factors": dict(combination.factors),
            "reactions_N": pairs(design.analysis.reactions[:, :, at], names),
        }
        for at, combination in enumerate(design.analysis.combinations)
    ]


def _supports(analysis: Analysis, combination: int) -> str:
    """Return which arrangement of the supports a combination stands on: "as stated" or "one end sliding"."""
    of_each = len(analysis.combinations) // len(analysis.arrangements)
    return analysis.arrangements[combination // of_each].suffix.removeprefix(", ") or "as stated"


def reactions(design: Design) -> dict[str, Any]:
    """Return the greatest forces on the bearings by direction, factored and characteristic.

    The key "sideways" holds those along the span.
    """
    table: dict[str, Any] = {}
    for key, direction in zip(("down", "up", "sideways"), get_args(Direction), strict=True):
        rows = [force for force in design.bearing_forces if force.direction == direction]
        table[key] = {
            "factored": [_bearing_force(force) for force in rows if force.factored],
            "characteristic": [_bearing_force(force) for force in rows if not force.factored],
        }
    return table


def _bearing_force(force: BearingForce) -> dict[str, Any]:
    return {
        "joint": force.joint,
        "value_N": newtons(force.value),
        "combination": force.combination,
        "on_support_right_N": newtons(force.right),
        "on_support_down_N": newtons(force.down),
    }


def equilibrium(design: Design) -> dict[str, Any]:
    """Return how well the solution closes: joint residuals, sums by case, and the second, independent bar forces."""
    solutions = design.analysis.solutions
    sums = reaction_sums(solutions[0], design.analysis.loads)
    return {
        "largest_residual_N": max(solution.largest_residual for solution in solutions),
        "second_solution_difference_N": design.second_difference,
        "reaction_sums_N": {
            case.name: {
                "applied": [newtons(float(value)) for value in sums.loads[:, at]],
                "carried": [newtons(float(value)) for value in sums.reactions[:, at]],
            }
            for at, case in enumerate(design.analysis.cases)
        },
    }


def deflection(design: Design) -> dict[str, Any]:
    """Return deflections with their limits, the movement of the sliding end, and camber."""
    found = design.serviceability
    return {
        "limits": [
            {
                "name": row.name,
                "value_mm": millimetres(row.value),
                "limit_mm": millimetres(row.limit),
                "span_over": row.span_over,
                "ratio": ratio(row.ratio),
                "joint": row.joint,
                "combination": row.combination,
            }
            for row in found.deflections
        ],
        "sliding_end_mm": millimetres(found.sliding),
        "sliding_end_combination": found.sliding_combination,
        "camber_mm": millimetres(found.camber),
    }
