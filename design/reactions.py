"""Greatest forces on the bearings, for whoever designs what stands below: each with what acts at the same time."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss

Direction = Literal["down", "up", "sideways"]
VARIABLE = ("imposed", "man", "snow", "wind")


@dataclass(frozen=True)
class BearingForce:
    """The greatest force of the truss on one bearing in one direction.

    joint : name. direction : "down" presses on the support, "up" lifts from it, "sideways" pushes it.
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

    Characteristic: each permanent set alone and with each variable case, all at factor 1.0.
    """
    columns = analysis.columns("STR", "STR-P", "EQU")
    factored = analysis.reactions[:, :, columns]
    names = tuple(analysis.combinations[column].name for column in columns)
    characteristic, labels = _characteristic(analysis)
    return tuple(
        _greatest(truss, joint, direction, forces, labels_of, is_factored)
        for forces, labels_of, is_factored in ((factored, names, True), (characteristic, labels, False))
        for joint in truss.bearing_joints
        for direction in ("down", "up", "sideways")
    )


def _characteristic(analysis: Analysis) -> tuple[FloatArray, tuple[str, ...]]:
    permanent = [at for at, case in enumerate(analysis.cases) if case.kind == "permanent"]
    variable = [at for at, case in enumerate(analysis.cases) if case.kind in VARIABLE]
    reactions = analysis.solutions[0].reactions
    columns, labels = [], []
    for lasting in permanent:
        columns.append(reactions[:, :, lasting])
        labels.append(analysis.cases[lasting].name)
        for acting in variable:
            columns.append(reactions[:, :, lasting] + reactions[:, :, acting])
            labels.append(f"{analysis.cases[lasting].name} + {analysis.cases[acting].name}")
    return np.stack(columns, axis=-1), tuple(labels)


def _greatest(
    truss: Truss, joint: int, direction: Direction, reactions: FloatArray, labels: tuple[str, ...], factored: bool
) -> BearingForce:
    right, down = -reactions[joint, 0], reactions[joint, 1]  # on the support: opposite to the reaction on the truss
    measure = {"down": down, "up": -down, "sideways": np.abs(right)}[direction]
    at = int(np.argmax(measure))
    return BearingForce(
        truss.joint_names[joint],
        direction,
        factored,
        max(float(measure[at]), 0.0),
        labels[at] if measure[at] > 0 else "",
        float(right[at]),
        float(down[at]),
    )
