"""Where strength is met but deflection is not: which group to make heavier next."""

from __future__ import annotations

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.serviceability import Deflection, serviceability
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.truss.arrays import FloatArray
from spanwright.truss.stiffness import solve


def stiffened(setting: Setting, analysis: Analysis, choices: tuple[Choice, ...]) -> list[int] | None:
    """Return the candidates to start from next, one heavier in one group, or None where nothing is to be done.

    None: deflection is within its limits, a group fails in strength, or no sized group has a heavier candidate.
    The group made heavier is the one whose steel lowers the greatest deflection most for its mass.
    """
    found = serviceability(setting.truss, setting.project.deflection, analysis)
    if found.passes or not all(choice.passes for choice in choices):
        return None
    worst = max(found.deflections, key=lambda row: row.ratio)
    work = _virtual_work(setting, analysis, worst)
    lengths = setting.truss.lengths
    gains = {
        at: float(work[choice.group.bars].sum() / (lengths[choice.group.bars].sum() * choice.section.mass[0]))
        for at, choice in enumerate(choices)
        if choice.group.sized and choice.joinable[choice.index + 1 :].any()
    }
    if not gains:
        return None
    best = max(gains, key=lambda at: gains[at])
    return [_next(choice) if at == best else choice.index for at, choice in enumerate(choices)]


def _virtual_work(setting: Setting, analysis: Analysis, row: Deflection) -> FloatArray:
    """Return (b,) mm: what each bar adds to a deflection, by the unit-load theorem."""
    truss = setting.truss
    column = next(at for at, combination in enumerate(analysis.combinations) if combination.name == row.combination)
    unit = np.zeros((len(truss.joint_names), 2, 1))
    unit[truss.joint(row.joint), 1, 0] = -np.sign(row.value)
    virtual = solve(truss, analysis.axial_stiffness, unit).forces[:, 0]
    work: FloatArray = analysis.forces[:, column] * virtual * truss.lengths / analysis.axial_stiffness
    return work


def _next(choice: Choice) -> int:
    return choice.index + 1 + int(np.argmax(choice.joinable[choice.index + 1 :]))
