"""SANS 10162-1:2011 as a member standard."""

from __future__ import annotations

import math
from dataclasses import dataclass, field

from spanwright.design.candidates import Candidates
from spanwright.design.sans import constants
from spanwright.design.sans.bent import bending_checks
from spanwright.design.sans.case import case_of
from spanwright.design.sans.constants import number
from spanwright.design.sans.limits import limit_checks
from spanwright.design.sans.struts import compression_checks
from spanwright.design.sans.ties import tension_checks, tie_of
from spanwright.design.standard import Check, Demand
from spanwright.truss.arrays import IntArray


@dataclass(frozen=True)
class Sans10162:
    """The member rules of SANS 10162-1:2011; see `Standard` for what each part means.

    hot_formed_tubes : hot-finished tubes use n = 2.24 of the column curve; only where their supply is certain.
        Every other section, and every tube by default, uses n = 1.34.
    """

    hot_formed_tubes: bool = False
    name: str = field(default="SANS 10162-1:2011", init=False)
    modulus: float = field(default=number("steel", "modulus"), init=False)
    expansion: float = field(default=number("steel", "expansion"), init=False)
    restraint_share: float = field(default=number("restraint", "share"), init=False)
    restraint_clause: str = field(default="9.2 (from memory)", init=False)
    restraint_beta: float = field(default=number("restraint", "beta"), init=False)

    def checks(self, candidates: Candidates, demand: Demand) -> tuple[Check, ...]:
        """Check every candidate (s) for every member (b), in the order of printing: tension, compression, bending,
        limits.

        Raises InputError where a compressed pair has a single bolt at its ends (key "connections.bolts"), and where
        a single or starred angle has a bending moment (key "members").
        """
        case = case_of(candidates, demand, hot_formed_tubes=self.hot_formed_tubes)
        tie = tie_of(case)
        return (
            *tension_checks(case, tie),
            *compression_checks(case),
            *bending_checks(case, tie.resistance),
            *limit_checks(case),
        )

    def packs_per_panel(self, candidates: Candidates, demand: Demand) -> IntArray:
        """Return (s, b) the number of packs between the joints of each member; 0 for single sections.

        Raises InputError as `checks` does.
        """
        return case_of(candidates, demand, hot_formed_tubes=self.hot_formed_tubes).packs

    def restraint_relief(self, trusses: int) -> float:
        """Return 0.2 + 0.8/sqrt(n) of n parallel trusses (cl. 9.2, from memory)."""
        return number("restraint", "relief_base") + number("restraint", "relief_root") / math.sqrt(trusses)

    def verify_notes(self) -> tuple[str, ...]:
        """Return what to verify against a licensed copy of the standard, in short sentences."""
        return constants.verify_notes()


SANS_10162_1 = Sans10162()
