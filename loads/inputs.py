"""What a user states about loads, as frozen values: pressures in MPa (N/mm2), forces in N."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal


@dataclass(frozen=True)
class MostLeast:
    """A permanent load's greatest and least credible value, MPa."""

    most: float
    least: float


@dataclass(frozen=True)
class WindInput:
    """One wind case: net pressure normal to each slope, + presses the roof in, - lifts, MPa.

    eaves_left, eaves_right : N, horizontal at the bearings from wind on the walls, + to the right.
    mirrored : whether the mirrored case is added.
    unstated : slopes whose pressure the user left out, here 0: right only where the roof has no such slope.
    """

    name: str
    left: float
    right: float
    eaves_left: float = 0.0
    eaves_right: float = 0.0
    mirrored: bool = True
    unstated: tuple[Literal["left", "right"], ...] = ()


@dataclass(frozen=True)
class JointLoad:
    """A load at one joint; the name of an existing case joins that case. N; `right` + to the right.

    A permanent load with a case name of its own joins "most" with `down` and `right`, and "least" with `least_down` and
    `least_right`. None: not stated, and it counts as nothing in "least", where it would help; a load that lifts then
    counts in "least" alone.
    psi : of an imposed load that is a case of its own, the share of it that accompanies other variable loads, 0 to 1;
        None: not stated, in full.
    """

    case: str
    kind: Literal["permanent", "imposed", "snow", "wind"]
    joint: str
    down: float = 0.0
    right: float = 0.0
    least_down: float | None = None
    least_right: float | None = None
    psi: float | None = None


@dataclass(frozen=True)
class LoadsInput:
    """All loads stated by the user.

    roof_permanent : on the slope. ceiling_permanent : on plan, at the bottom chord. roof_imposed : on plan.
    man_load : N, at any top joint, and between joints of a chord that carries purlins there.
    wind : the wind cases; empty means "none", stated.
    """

    roof_permanent: MostLeast
    roof_imposed: float
    wind: tuple[WindInput, ...]
    ceiling_permanent: MostLeast = MostLeast(0.0, 0.0)
    man_load: float = 0.0
    at_joint: tuple[JointLoad, ...] = ()
