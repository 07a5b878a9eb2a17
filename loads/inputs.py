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
    """

    name: str
    left: float
    right: float
    eaves_left: float = 0.0
    eaves_right: float = 0.0
    mirrored: bool = True


@dataclass(frozen=True)
class JointLoad:
    """A load at one joint; the name of an existing case joins that case. N; `right` + to the right."""

    case: str
    kind: Literal["permanent", "imposed", "snow", "wind"]
    joint: str
    down: float = 0.0
    right: float = 0.0


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
