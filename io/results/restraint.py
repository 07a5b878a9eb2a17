"""The restraint of the chords in results.json."""

from __future__ import annotations

from typing import Any

from spanwright.design.result import Design
from spanwright.io.results.numbers import millimetres, newtons, ratio


def restraint(design: Design) -> dict[str, Any]:
    """Return the lines, what holds each chord where, the forces that takes, and what this roof cannot lose."""
    setting = design.setting
    names = setting.truss.joint_names
    return {
        "anchored_by": setting.project.restraint.anchored_by,
        "lines": [
            {
                "number": line.number,
                "x_mm": millimetres(line.x),
                "y_mm": millimetres(line.y),
                "joint": None if line.joint is None else names[line.joint],
                "counted": line.anchored,
            }
            for line in setting.restraint.lines
        ],
        "held": [
            {
                "chord": chord,
                "along_mm": millimetres(point.along),
                "joint": None if point.joint is None else names[point.joint],
                "by": point.by,
            }
            for chord, points in design.held.items()
            for point in points
        ],
        "forces_N": [
            {
                "part": force.part,
                "at": force.at,
                "force_N": newtons(force.force),
                "combination": design.strength_names[force.combination] if force.force else "",
                "required_stiffness_N_per_mm": newtons(force.stiffness),
            }
            for force in design.restraint_forces
        ],
        "anchor_force_N": newtons(design.anchor_force),
        "anchor_force_combination": design.anchor_combination if design.anchor_force else "",
        "anchor_force_relieved_N": newtons(design.anchor_force_relieved),
        "if_missing": [
            {
                "part": row.part,
                "unheld": list(row.unheld),
                "utilisation": ratio(row.utilisation),
                "bar": row.bar,
                "out_of_plane_mm": millimetres(row.out_of_plane),
            }
            for row in design.missing
        ],
    }
