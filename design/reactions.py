"""Greatest forces on the bearings, for whoever designs what stands below: each with what acts at the same time."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, get_args

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

Direction = Literal["down", "up", "along the span"]
VARIABLE = ("imposed", "man", "snow", "wind")


@dataclass(frozen=True)
class BearingForce:
    """The greatest force of the truss on one bearing in one direction.

    joint : name. direction : "down" presses on the support, "up" lifts from it, "along the span" pushes it
        to the left or right in the plane of the truss.
    factored : True for the strength and holding-down combinations, False for characteristic values.
    value : N, >= 0, 0 where the direction does not arise. combination : in words.
    right, down : N, both components on the support at that time, + to the right and + down.
    """

    joint: str
    direction: Direction
    factored: bool
    value: float
    combination: str
    right: float
    down: float


def bearing_forces(truss: Truss, analysis: Analysis) -> tuple[BearingForce, ...]:
    """Return the greatest forces on every bearing, factored first, then characteristic.

    Characteristic: each permanent set alone, with each variable case, and with that and all loads at joints that may
    accompany it, all at factor 1.0, for every arrangement of the supports. Of combinations that give the same force,
    the one that pushes most sideways is reported.
    """
    columns = analysis.columns("STR", "STR-P", "EQU")
    factored = analysis.reactions[:, :, columns]
    names = tuple(analysis.combinations[column].name for column in columns)
    characteristic, labels = _characteristic(analysis)
    return tuple(
        _greatest(truss, joint, direction, forces, labels_of, is_factored)
        for forces, labels_of, is_factored in ((factored, names, True), (characteristic, labels, False))
        for joint in truss.bearing_joints
        for direction in get_args(Direction)
    )


def _characteristic(analysis: Analysis) -> tuple[FloatArray, tuple[str, ...]]:
    cases = analysis.cases
    permanent = [at for at, case in enumerate(cases) if case.kind == "permanent"]
    variable = [at for at, case in enumerate(cases) if case.kind in VARIABLE]
    beside = [at for at, case in enumerate(cases) if case.psi]  # hoists and the like, which accompany the rest
    acting = [(), *((case,) for case in variable)]
    acting += [(case, *beside) for case in variable if beside and case not in beside]
    columns, labels = [], []
    for reading, solution in zip(analysis.arrangements, analysis.solutions, strict=True):
        for lasting in permanent:
            for others in acting:
                columns.append(solution.reactions[:, :, [lasting, *others]].sum(axis=-1))
                labels.append(" + ".join(cases[case].name for case in (lasting, *others)) + reading.suffix)
    return np.stack(columns, axis=-1), tuple(labels)


def _greatest(
    truss: Truss, joint: int, direction: Direction, reactions: FloatArray, labels: tuple[str, ...], factored: bool
) -> BearingForce:
    right, down = -reactions[joint, 0], reactions[joint, 1]  # on the support: opposite to the reaction on the truss
    measure = {"down": down, "up": -down, "along the span": np.abs(right)}[direction]
    rounding = TOLERANCES.tiny_force * float(np.abs(reactions).max(initial=0.0))
    at = int(np.argmax(np.where(measure >= measure.max() - rounding, np.abs(right), -1.0)))
    return BearingForce(
        truss.joint_names[joint],
        direction,
        factored,
        max(float(measure[at]), 0.0),
        labels[at] if measure[at] > 0 else "",
        float(right[at]),
        float(down[at]),
    )


def greatest_factored(forces: tuple[BearingForce, ...]) -> dict[Direction, BearingForce]:
    """Return the greatest factored force of all bearings in each direction."""
    return {
        direction: max(
            (force for force in forces if force.factored and force.direction == direction),
            key=lambda force: force.value,
        )
        for direction in get_args(Direction)
    }
