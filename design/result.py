"""The Design: a truss that is analysed, sized and explained, as one frozen value that the writers lay out."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from scipy.constants import g

from spanwright.design.analysis import Analysis
from spanwright.design.cautions import CAUTIONS
from spanwright.design.certificate import NextLighter
from spanwright.design.dispatch import Assembly, assembly
from spanwright.design.missing import Missing
from spanwright.design.pieces import Piece
from spanwright.design.reactions import BearingForce
from spanwright.design.serviceability import Serviceability
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice, Governing, governing
from spanwright.design.standard import Demand
from spanwright.loads.cases import own_mass_loads
from spanwright.loads.combinations import combination_cautions
from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.restraint import Held
from spanwright.truss.restraint_forces import AnchorForce, RestraintForce


@dataclass(frozen=True, eq=False)
class Design:
    """Everything found about one truss. N, mm, MPa, kg; tension +, sagging +.

    choices, next_lighter : one a group. analysis, demand : for exactly the chosen sections.
    missing : what this roof cannot lose, worst first.
    held : for each chord ("top", "bottom") the points where it is held sideways.
    restraint_forces : what each counted restraint must resist; anchor : their sum at the anchor, for all trusses of
        the project, in the worst strength combination.
    second_difference : N, largest difference of the bar forces found without stiffness.
    pieces : what the workshop cuts, empty where a member does not pass.
    warnings : sentences.
    """

    setting: Setting
    analysis: Analysis
    demand: Demand
    choices: tuple[Choice, ...]
    next_lighter: tuple[NextLighter, ...]
    serviceability: Serviceability
    missing: tuple[Missing, ...]
    held: dict[str, tuple[Held, ...]]
    restraint_forces: tuple[RestraintForce, ...]
    anchor: AnchorForce
    bearing_forces: tuple[BearingForce, ...]
    second_difference: float
    pieces: tuple[Piece, ...]
    warnings: tuple[str, ...]

    @property
    def passes(self) -> bool:
        """Whether every member passes every check and the truss its deflection limits."""
        return all(choice.passes for choice in self.choices) and self.serviceability.passes

    @property
    def cautions(self) -> tuple[str, ...]:
        """What every output must say: the standing cautions, then what each standard used leaves to verify."""
        setting, project = self.setting, self.setting.project
        combined = combination_cautions(setting.load_set.cases, project.actions, project.site)
        return (*CAUTIONS, *setting.standard.verify_notes(), *setting.load_set.cautions, *combined)

    @cached_property
    def strength_names(self) -> tuple[str, ...]:
        """Names of the strength combinations, in the order of `demand.axial`."""
        pairs = zip(self.analysis.combinations, self.analysis.strength, strict=True)
        return tuple(combination.name for combination, counts in pairs if counts)

    @property
    def anchor_force(self) -> float:
        """The plain sum of restraint forces at the anchor, N, of all trusses and one combination: the safe reading."""
        return self.anchor.force

    @property
    def anchor_combination(self) -> str:
        """Name of the strength combination that gives `anchor_force`, "" where nothing reaches the anchor."""
        return self.strength_names[self.anchor.combination] if self.anchor.combination >= 0 else ""

    @property
    def anchor_force_relieved(self) -> float:
        """`anchor_force`, N, with the relief that the standard gives to parallel trusses."""
        return self.anchor.force * self.setting.standard.restraint_relief(self.setting.project.quantity)

    @cached_property
    def utilisation(self) -> FloatArray:
        """(b,) greatest strength ratio of each member over checks and combinations."""
        return self._greatest("strength")

    @cached_property
    def limit_failed(self) -> BoolArray:
        """(b,) True where a pass-or-fail row (slenderness, pack spacing) fails."""
        failed: BoolArray = self._greatest("limit") > 1.0
        return failed

    @cached_property
    def assembly(self) -> Assembly:
        """One truss as it leaves the workshop; its mass is that of the pieces."""
        return assembly(self.setting, self.choices, self.pieces)

    def _greatest(self, kind: str) -> FloatArray:
        greatest = np.zeros(len(self.setting.truss.bar_names))
        for choice in self.choices:
            ratios = [check.ratio[0] for check in choice.checks if check.kind == kind]
            greatest[choice.group.bars] = np.max([np.zeros(len(choice.group.bars)), *ratios], axis=0)
        return greatest

    def governing_of(self, choice: Choice, place: int | None = None) -> Governing:
        """Return the check that governs a group, or its member number `place`."""
        bars = tuple(self.setting.truss.bar_names[bar] for bar in choice.group.bars)
        return governing(choice.checks, bars, self.strength_names, place)

    def choice_for(self, bar: int) -> tuple[Choice, int]:
        """Return the choice that a bar belongs to and the bar's place among the group's bars."""
        for choice in self.choices:
            place = np.flatnonzero(choice.group.bars == bar)
            if place.size:
                return choice, int(place[0])
        raise IndexError(bar)

    @cached_property
    def sections(self) -> tuple[str, ...]:
        """(b,) names of the members' sections."""
        return tuple(self.choice_for(bar)[0].name for bar in range(len(self.setting.truss.bar_names)))

    def group_mass(self, choice: Choice) -> float:
        """Return the mass of a group's members, joint to joint and with the overhangs, kg: that of the own mass."""
        mass_per_m = np.zeros(len(self.setting.truss.bar_names))
        mass_per_m[choice.group.bars] = choice.section.mass[0]
        return -float(own_mass_loads(self.setting.truss, mass_per_m)[:, 1].sum()) / g

    @property
    def mass(self) -> float:
        """Mass of all members, joint to joint and with the overhangs, without gussets and fixings, kg."""
        return sum(self.group_mass(choice) for choice in self.choices)

    def __repr__(self) -> str:
        sections = ", ".join(f"{choice.group.name} {choice.name}" for choice in self.choices)
        verdict = "passes" if self.passes else "NOT PASSING"
        return (
            f"<Design {self.setting.project.title!r}: {sections}; {self.mass:.0f} kg, "
            f"utilisation {self.utilisation.max():.2f}, {verdict}>"
        )
