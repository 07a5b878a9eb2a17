"""A value found by hand beside the one that the program found."""

from __future__ import annotations

from dataclasses import dataclass

from spanwright.truss.tolerances import TOLERANCES


@dataclass(frozen=True)
class Comparison:
    """One hand check.

    name : what is compared. where : of what, and under which load. working : how the hand comes to its value.
    by_hand, found : values in `unit` ("N", "N mm", "mm", "kg/m2" or "-" for a ratio).
    passes : whether they agree; for a rule of thumb, whether the design keeps within it.
    exact : True where mechanics asks for the same value; False for a rule of thumb, which only asks for a look.
    """

    name: str
    where: str
    working: str
    by_hand: float
    found: float
    unit: str
    passes: bool
    exact: bool = True


def compared(
    name: str, where: str, working: str, by_hand: float, found: float, unit: str, scale: float = 0.0
) -> Comparison:
    """Return an exact comparison; it passes within `TOLERANCES.by_hand` of the larger value, or of a larger `scale`."""
    allowed = TOLERANCES.by_hand * max(abs(by_hand), abs(found), scale)
    return Comparison(name, where, working, by_hand, found, unit, abs(by_hand - found) <= allowed)
