"""Load cases: each a name, a kind, forces on joints, moments in the top chord, and how they came about."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from spanwright.loads.bending import Stations
from spanwright.loads.inputs import LoadsInput
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine

CaseKind = Literal["permanent", "imposed", "man", "wind"]


@dataclass(frozen=True, eq=False)
class Case:
    """One load case, unfactored.

    name : unique ("most", "least", "imposed left", "man at T3", "man in TC4", "across ridge, suction mirrored").
    kind : "permanent", "imposed", "man" (takes the place of imposed in a combination) or "wind".
    joint_loads : (j, 2) N, x to the right, y up.
    moments : (m,) N mm in the top chord at the stations, sagging (tension at the lower fibre) +.
    derivation : lines for the checker: what, value, unit, how.
    """

    name: str
    kind: CaseKind
    joint_loads: FloatArray
    moments: FloatArray
    derivation: tuple[str, ...] = ()


@dataclass(frozen=True, eq=False)
class LoadSet:
    """All load cases of a truss, the stations of their moments, and what a user should know, in sentences."""

    cases: tuple[Case, ...]
    stations: Stations
    warnings: tuple[str, ...] = ()


def load_cases(truss: Truss, lines: tuple[PurlinLine, ...], loads: LoadsInput, tributary: float) -> LoadSet:
    """Return every load case; "most" and "least" come without the own mass (see `own_mass_loads`).

    tributary : mm of roof along the ridge that the truss carries.
    """
    raise NotImplementedError


def own_mass_loads(truss: Truss, mass_per_m: FloatArray) -> FloatArray:
    """Return (j, 2) N: the weight of the bars on the joints. mass_per_m : (b,) kg/m."""
    raise NotImplementedError
