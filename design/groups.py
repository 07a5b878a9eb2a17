"""Groups: the members that get one section."""

from __future__ import annotations

from dataclasses import dataclass
from typing import cast

import numpy as np

from spanwright.design.candidates import FAMILIES, Candidates, Family
from spanwright.design.families import candidates, find
from spanwright.design.project import MembersInput, Project
from spanwright.truss.arrays import IntArray
from spanwright.truss.errors import InputError
from spanwright.truss.model import ROLES, Role, Truss

ROLE_GROUPS: dict[Role, str] = {
    "top chord": "top chord",
    "bottom chord": "bottom chord",
    "post": "posts",
    "diagonal": "diagonals",
}
"""Name of the group that takes every member of a role which no other group claims."""


@dataclass(frozen=True, eq=False)
class Group:
    """Members that get one section.

    name : printed. role : the role they share. bars : (n,) bar indices.
    wanted : a family ("2L") or a section ("2L 80x80x6").
    key : the project-file key that says so.
    """

    name: str
    role: Role
    bars: IntArray
    wanted: str
    key: str

    @property
    def sized(self) -> bool:
        """Whether a section is to be chosen (True) or is given (False)."""
        return self.wanted in FAMILIES


def form_groups(truss: Truss, project: Project) -> tuple[Group, ...]:
    """Return the groups of a truss: those the user names, then by role; empty ones are left out.

    Raises InputError where a named group mixes roles, is claimed twice or has unknown bars.
    """
    claimed: dict[int, str] = {}
    named = []
    for name, bar_names in project.groups.items():
        key = f"groups.{name}"
        if name in ROLE_GROUPS.values():
            raise InputError(f'"{name}" is the group of a whole role already', "give this group another name", key)
        bars = [truss.bar(bar, key=key) for bar in bar_names]
        for bar in bars:
            if bar in claimed:
                raise InputError(f"{truss.bar_names[bar]} is already in group {claimed[bar]}", "name it once", key)
            claimed[bar] = name
        named.append(_named_group(truss, project.members, name, key, bars))
    return (*named, *_role_groups(truss, project.members, set(claimed)))


def _named_group(truss: Truss, members: MembersInput, name: str, key: str, bars: list[int]) -> Group:
    roles = {truss.roles[bar] for bar in bars}
    if len(roles) != 1:
        raise InputError(f"its members are of several roles: {', '.join(sorted(roles))}", "split it by role", key)
    role = roles.pop()
    wanted = members.by_group.get(name, members.by_role[role])
    return Group(
        name, role, _indices(bars), wanted, f"members.groups.{name}" if name in members.by_group else _role_key(role)
    )


def _role_groups(truss: Truss, members: MembersInput, claimed: set[int]) -> list[Group]:
    groups = []
    for role in ROLES:
        bars = [int(bar) for bar in truss.bars_with_role(role) if int(bar) not in claimed]
        if bars:
            groups.append(Group(ROLE_GROUPS[role], role, _indices(bars), members.by_role[role], _role_key(role)))
    return groups


def _indices(bars: list[int]) -> IntArray:
    return np.array(sorted(bars), dtype=np.intp)


def _role_key(role: Role) -> str:
    return "members." + ROLE_GROUPS[role].replace(" ", "_")


def sections_for(group: Group, members: MembersInput) -> Candidates:
    """Return the group's candidate sections, lightest first, ties by depth; one if the section is given.

    Raises InputError where nothing in the catalogue meets the stated least sizes, or the family does not suit.
    """
    if group.role in ("top chord", "bottom chord") and (group.wanted == "L" or group.wanted.startswith("L ")):
        raise InputError(
            "a single angle cannot be a chord here: its connected leg loads it off its axis at every joint",
            'take a pair ("2L") or a tube for the chord',
            group.key,
        )
    if not group.sized:
        return find(group.wanted, steel=members.steel, gap=members.gap, process=members.tube_process, key=group.key)
    options = candidates(
        cast(Family, group.wanted),
        steel=members.steel,
        gap=members.gap,
        min_leg=members.min_leg,
        min_thickness=members.min_thickness,
        min_wall=members.min_wall,
        stocked=members.stocked,
        equal_legs=members.equal_legs,
        process=members.tube_process,
    )
    if len(options) == 0:
        raise InputError(
            f"no {group.wanted} in the catalogue meets the stated least sizes and stock",
            'lower members.min_leg, min_thickness or min_wall, or set members.stocked to "any"',
            group.key,
        )
    return options.take(np.lexsort((options.depth, options.mass)))
