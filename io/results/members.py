"""Members, groups and pieces in results.json."""

from __future__ import annotations

from typing import Any

import numpy as np

from spanwright.design.result import Design
from spanwright.design.sizing import Choice, Governing
from spanwright.io.results.numbers import in_unit, kilograms, millimetres, newtons, ratio


def members(design: Design) -> list[dict[str, Any]]:
    """Return one row a bar, in the truss's order, with every check of its chosen section."""
    rows: dict[int, dict[str, Any]] = {}
    for choice in design.choices:
        for place, bar in enumerate(choice.group.bars):
            rows[int(bar)] = _member(design, choice, place, int(bar))
    return [rows[bar] for bar in sorted(rows)]


def _member(design: Design, choice: Choice, place: int, bar: int) -> dict[str, Any]:
    truss, lengths, analysis = design.setting.truss, design.setting.lengths, design.analysis
    governing = design.governing_of(choice, place)
    return {
        "bar": truss.bar_names[bar],
        "role": truss.roles[bar],
        "group": choice.group.name,
        "joints": [truss.joint_names[joint] for joint in truss.ends[bar]],
        "length_mm": millimetres(float(truss.lengths[bar])),
        "section": choice.name,
        "buckling": {
            "in_plane_mm": millimetres(float(lengths.in_plane[bar])),
            "out_of_plane_mm": millimetres(float(lengths.out_of_plane[bar])),
            "minor_axis_mm": millimetres(float(lengths.minor[bar])),
            "torsional_mm": millimetres(float(lengths.torsional[bar])),
            "in_plane_between": list(lengths.in_plane_between[bar]),
            "out_of_plane_between": list(lengths.out_of_plane_between[bar]),
        },
        "force_N": {
            case.name: newtons(float(force))
            for case, force in zip(analysis.cases, analysis.case_forces[bar], strict=True)
        },
        "force_one_end_sliding_N": {
            case.name: newtons(float(force))
            for solution in analysis.solutions[1:]
            for case, force in zip(analysis.cases, solution.forces[bar], strict=True)
        },
        "force_by_combination_N": {
            combination.name: newtons(float(force))
            for combination, force in zip(analysis.combinations, analysis.forces[bar], strict=True)
        },
        "tension": _extreme(design, bar, +1.0),
        "compression": _extreme(design, bar, -1.0),
        "checks": _checks(design, choice, place),
        "utilisation": ratio(design.utilisation[bar]),
        "governing": _governing(governing),
    }


def _extreme(design: Design, bar: int, sign: float) -> dict[str, Any]:
    """Return the greatest tension (sign +) or compression (sign -) over the strength combinations, signed."""
    forces = sign * design.demand.axial[bar]
    at = int(np.argmax(forces))
    if forces[at] <= 0.0:
        return {"max_N": 0.0, "combination": ""}
    return {"max_N": newtons(sign * float(forces[at])), "combination": design.strength_names[at]}


def _checks(design: Design, choice: Choice, place: int) -> list[dict[str, Any]]:
    rows = []
    for check in choice.checks:
        at = int(check.combination[0, place])
        rows.append(
            {
                "name": check.name,
                "clause": check.clause,
                "kind": check.kind,
                "demand": in_unit(float(check.demand[0, place]), check.unit),
                "resistance": in_unit(float(check.resistance[0, place]), check.unit),
                "unit": check.unit,
                "utilisation": ratio(float(check.ratio[0, place])),
                "combination": design.strength_names[at] if at >= 0 else "",
            }
        )
    return rows


def _governing(found: Governing) -> dict[str, Any]:
    return {
        "check": found.check,
        "clause": found.clause,
        "bar": found.bar,
        "combination": found.combination,
        "utilisation": ratio(found.ratio),
    }


def groups(design: Design) -> list[dict[str, Any]]:
    """Return one row a group: its section, mass, governing check and the next lighter candidate's failure."""
    rows = []
    for choice, lighter in zip(design.choices, design.next_lighter, strict=True):
        certificate: dict[str, Any] = {"section": lighter.section or None, "reason": lighter.reason}
        if lighter.fails is not None:
            certificate = {
                "section": lighter.section,
                "fails": _governing(lighter.fails),
                "utilisation": ratio(lighter.fails.ratio),
            }
        rows.append(
            {
                "name": choice.group.name,
                "section": choice.name,
                "passes": choice.passes,
                "chosen": choice.group.sized,
                "mass_kg": kilograms(design.group_mass(choice)),
                "governing": _governing(design.governing_of(choice)),
                "next_lighter": certificate,
            }
        )
    return rows


def pieces(design: Design) -> list[dict[str, Any]]:
    """Return one row a mark, as the workshop cuts it; empty where the design does not pass."""
    return [
        {
            "mark": piece.mark,
            "section": piece.section,
            "grade": piece.grade,
            "hand": piece.hand,
            "quantity": piece.quantity,
            "cut_length_mm": millimetres(piece.cut_length),
            "mass_kg": kilograms(piece.mass),
            "ends": list(piece.ends),
            "bars": list(piece.bars),
            "remarks": list(piece.remarks),
        }
        for piece in design.pieces
    ]


def assembly_of(design: Design) -> dict[str, Any] | None:
    """Return one truss as it is lifted; None where the design does not pass."""
    if not design.pieces:
        return None
    whole = design.assembly
    return {
        "length_mm": millimetres(whole.length),
        "height_mm": millimetres(whole.height),
        "width_mm": millimetres(whole.width),
        "mass_kg": kilograms(whole.mass),
        "lift_mass_kg": kilograms(whole.lift_mass),
        "remarks": list(whole.remarks),
    }
