"""Lightly loaded roofs with given sections, for tests of what the workshop cuts, and hand-made ones without loads."""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cache

import numpy as np

from spanwright.design.families import find
from spanwright.design.pieces import Piece, pieces_of
from spanwright.design.run import prepare
from spanwright.design.setting import Setting, demand_of
from spanwright.design.sizing import Choice
from spanwright.design.standard import Demand
from spanwright.io.project_file import parse_project
from spanwright.truss.model import Truss

ANGLES = {"top_chord": "2L 80x80x8", "bottom_chord": "2L 70x70x7", "posts": "L 60x60x6", "diagonals": "L 60x60x6"}
HOWE = 'form = "Howe"\nspan = "15 m"\npitch = "18 deg"\npanels = 10'
PRATT = 'form = "Pratt"\nspan = "18 m"\npitch = "5 deg"\nheel_depth = "0.9 m"\npanels = 12'
FINK = 'form = "Fink"\nspan = "13.5 m"\npitch = "30 deg"\npanels = 8'


@dataclass(frozen=True, eq=False)
class Shop:
    """A roof on its way to the workshop."""

    setting: Setting
    demand: Demand
    choices: tuple[Choice, ...]

    @property
    def pieces(self) -> tuple[Piece, ...]:
        return pieces_of(self.setting, self.demand, self.choices)

    def piece(self, mark: str) -> Piece:
        return next(piece for piece in self.pieces if piece.mark == mark)


def project_text(truss: str, members: str = "", sections: dict[str, str] | None = None, more: str = "") -> str:
    """Return the text of a project: lines of [truss] and [members], section by role, further tables."""
    lines = "\n".join(f'{role} = "{section}"' for role, section in {**ANGLES, **(sections or {})}.items())
    return f"""
title = "Test roof"
mark = "R1"
quantity = 6
standard = "SANS 10162-1"
actions = "SANS 10160:2011"
[truss]
spacing = "3 m"
{truss}
[restraint]
purlins = "at joints"
anchored_purlins = "all"
anchored_by = "roof bracing"
bearings_held = true
bottom_ties = "none"
[loads]
roof_permanent = "0.1 kPa"
roof_imposed = "0.25 kPa"
wind = "none"
[members]
steel = "S355JR"
{lines}
{members}
{more}
"""


@cache
def _shop(text: str) -> Shop:
    setting = prepare(parse_project(text, "roof.toml"))
    demand = demand_of(setting, [0] * len(setting.groups))[1]
    return Shop(setting, demand, _choices(setting))


def shop(truss: str, members: str = "", sections: dict[str, str] | None = None, more: str = "") -> Shop:
    """Return a roof whose groups have the sections given, whether they pass or not."""
    return _shop(project_text(truss, members, sections, more))


def hand_made_shop(truss: Truss, sections: dict[str, str] | None = None, setback: float = 20.0) -> Shop:
    """Return a roof of any truss, with the sections given by role; loads and restraint are another roof's."""
    setting = shop(HOWE).setting
    given = {**ANGLES, **(sections or {})}
    keys = {"top chord": "top_chord", "bottom chord": "bottom_chord", "post": "posts", "diagonal": "diagonals"}
    groups, options = [], []
    for group in setting.groups:
        bars = truss.bars_with_role(group.role)
        if bars.size:
            groups.append(replace(group, bars=bars))
            options.append(find(given[keys[group.role]], steel="S355JR", gap=8.0))
    members = replace(setting.project.members, setback=setback)
    setting = replace(
        setting,
        truss=truss,
        groups=tuple(groups),
        options=tuple(options),
        project=replace(setting.project, members=members),
    )
    return Shop(setting, shop(HOWE).demand, _choices(setting))


def _choices(setting: Setting) -> tuple[Choice, ...]:
    return tuple(
        Choice(group, options, 0, (), True, np.ones(1, dtype=np.bool_))
        for group, options in zip(setting.groups, setting.options, strict=True)
    )
