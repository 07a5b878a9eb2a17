"""The seam between a run and a standard: what members must resist, what a check says, what a standard offers."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, Protocol

from spanwright.design.candidates import Candidates
from spanwright.design.steps import Rule
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray


@dataclass(frozen=True)
class Ends:
    """End connections that tension checks assume until joints are designed, and then require of them.

    kind : "welded" or "bolted".
    weld_length : least length of the weld along each edge of the connected leg, in multiples of that leg; of a tube
        slotted over a gusset: along each side of the gusset at both slots, in multiples of its depth.
    bolts : bolts in one line along the member; `bolt_diameter` mm; `punched` holes (else drilled); `bolt_grade` "8.8".
    """

    kind: Literal["welded", "bolted"] = "welded"
    weld_length: float = 1.5
    bolts: int = 2
    bolt_diameter: float = 20.0
    punched: bool = True
    bolt_grade: str = "8.8"


@dataclass(frozen=True)
class Packs:
    """Connectors between the angles of a pair.

    per_panel : least number in panels that see compression (ties take at least one).
    factor : K_i of the equivalent slenderness: 1.0 snug-tight bolted, 0.65 welded.
    """

    per_panel: int = 2
    factor: float = 1.0


@dataclass(frozen=True, eq=False)
class Demand:
    """What members (b) must resist over the strength combinations (c). N, mm, N mm; tension positive.

    bars : (b,) bar names, for messages.
    axial : (b, c) axial force, tension +.
    sideways : (b, c) >= 0, greatest compression among the bars that buckle out of plane together with this one
        (the bar itself included): goes with `out_of_plane`, `torsional` and `minor`.
    panel : (b,) mm, joint to joint: what packs divide.
    in_plane, out_of_plane, torsional, minor : (b,) mm effective lengths (factor included).
    sag, hog : (b, c) greatest moment that tensions the lower fibre (>= 0) and greatest that tensions the upper
        fibre (>= 0) over all sections of the bar, N mm. Zero without chord bending.
    end_moments : (b, 2, c) N mm, sagging +, at the bar's left and right end.
    point_loads : (b,) number of transverse loads that stand between the bar's joints (0: none).
    first_web : (b, c) True where the bar is reduced as a first compression web from a bearing in that combination.
    one_leg : (b,) True for webs that may use the one-leg rule (plane truss web, webs all on one side).
    ends, packs : end connections and connectors assumed.
    gusset : mm, thickness of the gussets: eccentricity of single angles that the one-leg rule does not cover.
    heel_up : (b,) True where the outstanding legs of a pair lie at the upper fibre; None: of every member, as in
        a top chord.
    slots : (b,) mm, width of the slots of a tube that is fitted over a gusset at an end, 0 where it is welded all
        round; None: nowhere.
    """

    bars: tuple[str, ...]
    axial: FloatArray
    sideways: FloatArray
    panel: FloatArray
    in_plane: FloatArray
    out_of_plane: FloatArray
    torsional: FloatArray
    minor: FloatArray
    sag: FloatArray
    hog: FloatArray
    end_moments: FloatArray
    point_loads: IntArray
    first_web: BoolArray
    one_leg: BoolArray
    ends: Ends
    packs: Packs
    gusset: float = 8.0
    heel_up: BoolArray | None = None
    slots: FloatArray | None = None


CheckKind = Literal["strength", "limit"]


@dataclass(frozen=True, eq=False)
class Check:
    """One check of all candidates (s) for all members (b).

    name : in the trade's words ("buckling out of plane").
    clause : of the standard.
    kind : "strength" colours the picture and is the utilisation; "limit" is a pass-or-fail row with its own ratio
        (slenderness, pack spacing).
    ratio : (s, b) greatest over the combinations, 0 where the check does not arise.
    combination : (s, b) index of the combination that governs; -1 where the ratio does not depend on one.
    demand, resistance : (s, b) factored effect and resistance at that combination, in `unit`.
        Where the check is an interaction sum, demand is the sum, resistance 1 and unit "-".
    rules : the rules whose steps explain it, each indexed by (section, bar) of this check.
    """

    name: str
    clause: str
    kind: CheckKind
    ratio: FloatArray
    combination: IntArray
    demand: FloatArray
    resistance: FloatArray
    unit: str
    rules: tuple[Rule, ...] = ()


class Standard(Protocol):
    """A member standard: everything a run asks of it."""

    @property
    def name(self) -> str:
        """With edition, as printed: "SANS 10162-1:2011"."""

    @property
    def modulus(self) -> float:
        """Modulus of elasticity E, MPa."""

    @property
    def expansion(self) -> float:
        """Coefficient of linear expansion, per K."""

    @property
    def restraint_share(self) -> float:
        """Share of the compression in a chord that a point restraint must resist."""

    @property
    def restraint_clause(self) -> str:
        """Clause of `restraint_share`."""

    @property
    def restraint_beta(self) -> float:
        """Factor beta of the stiffness 2 beta Cu/Lb that a point restraint must have, for many points."""

    def restraint_relief(self, trusses: int) -> float:
        """Share of the plain sum of restraint forces that the bracing of n parallel trusses must resist."""

    def checks(self, candidates: Candidates, demand: Demand) -> tuple[Check, ...]:
        """Check every candidate for every member; the order of the checks is the order of printing."""

    def packs_per_panel(self, candidates: Candidates, demand: Demand) -> IntArray:
        """(s, b) number of connectors between the joints of each member; 0 for single sections."""

    def verify_notes(self) -> tuple[str, ...]:
        """What a licensed copy of the standard must confirm, in sentences, for every output's cautions."""
