"""What is known before sections are, and what members must resist once sections are picked."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from spanwright.design.analysis import Analysis, analyse
from spanwright.design.candidates import Candidates
from spanwright.design.demand import demand
from spanwright.design.groups import Group
from spanwright.design.project import Project
from spanwright.design.slots import slot_widths
from spanwright.design.standard import Demand, Standard
from spanwright.loads.cases import LoadSet
from spanwright.loads.combinations import Combination
from spanwright.truss.arrays import FloatArray
from spanwright.truss.lengths import BucklingLengths
from spanwright.truss.model import Truss
from spanwright.truss.restraint import Restraint


@dataclass(frozen=True, eq=False)
class Setting:
    """What stands there, what holds it, what acts on it, and what each group may be made of.

    options : one set of candidates a group, lightest first.
    """

    project: Project
    standard: Standard
    truss: Truss
    restraint: Restraint
    lengths: BucklingLengths
    load_set: LoadSet
    combinations: tuple[Combination, ...]
    groups: tuple[Group, ...]
    options: tuple[Candidates, ...]


def section_arrays(setting: Setting, chosen: list[int]) -> tuple[FloatArray, FloatArray]:
    """Return (b,) mass in kg/m and (b,) axial stiffness EA in N of the candidates chosen, one index a group."""
    mass = np.zeros(len(setting.truss.bar_names))
    area = np.zeros_like(mass)
    for group, options, index in zip(setting.groups, setting.options, chosen, strict=True):
        mass[group.bars] = options.mass[index]
        area[group.bars] = options.area[index]
    return mass, area * setting.standard.modulus


def demand_of(setting: Setting, chosen: list[int]) -> tuple[Analysis, Demand]:
    """Analyse the truss with these candidates, one index a group, and return what its members must resist."""
    mass, stiffness = section_arrays(setting, chosen)
    fixings = setting.project.members.fixings
    analysis = analyse(setting.truss, setting.load_set, setting.combinations, mass, stiffness, fixings)
    wanted = demand(setting.truss, setting.project, setting.lengths, setting.load_set.stations, analysis)
    slots = slot_widths(setting.truss, setting.groups, setting.options, setting.project.members.gap)
    return analysis, replace(wanted, slots=slots)
