"""A load case: a name, a kind, forces on joints, moments in the top chord, and how they came about."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Literal

from spanwright.loads.bending import Part
from spanwright.truss.arrays import FloatArray

CaseKind = Literal["permanent", "imposed", "man", "snow", "exceptional snow", "wind"]
PERMANENT = ("most", "least")
"""The two sets of permanent loads: the greatest and the least credible."""


@dataclass(frozen=True, eq=False)
class Case:
    """One load case, unfactored.

    name : unique ("most", "least", "imposed left", "man at T3", "man in TC4", "across ridge, suction mirrored").
    kind : "permanent", "imposed", "man" (takes the place of imposed in a combination), "snow", "exceptional snow" or
        "wind".
    joint_loads : (j, 2) N, x to the right, y up.
    moments : (m,) N mm in the top chord at the stations, sagging (tension at the lower fibre) +.
    derivation : lines for the checker: what, value, unit, how.
    psi : of imposed loads at joints that are a case of their own ("hoist"): the share of it that accompanies other
        variable loads, 0 to 1; None for all other cases.
    """

    name: str
    kind: CaseKind
    joint_loads: FloatArray
    moments: FloatArray
    derivation: tuple[str, ...] = ()
    psi: float | None = None

    def joined_by(self, part: Part) -> Case:
        """Return the case with a part added."""
        return replace(
            self,
            joint_loads=self.joint_loads + part.joint_loads,
            moments=self.moments + part.moments,
            derivation=self.derivation + part.derivation,
        )


def case_of(name: str, kind: CaseKind, part: Part, psi: float | None = None) -> Case:
    """Return the case that a part of it makes."""
    return Case(name, kind, part.joint_loads, part.moments, part.derivation, psi)
