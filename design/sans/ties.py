"""Checks in tension: which net section the stated ends leave."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.design.sans.case import Case
from spanwright.design.sans.checking import strength_check
from spanwright.design.sans.compression import PHI
from spanwright.design.sans.effects import column
from spanwright.design.sans.tension import BoltedAngle, GrossYield, NetFracture, SlottedTube, WeldedAngle, WeldedTube
from spanwright.design.standard import Check
from spanwright.truss.arrays import FloatArray

TUBES = ("CHS", "SHS", "RHS")

NetSection = WeldedAngle | BoltedAngle | WeldedTube | SlottedTube


@dataclass(frozen=True, eq=False)
class Tie:
    """The rules of a member in tension."""

    net: NetSection
    gross_yield: GrossYield
    fracture: NetFracture

    @property
    def resistance(self) -> FloatArray:
        """(s, b) or narrower: the lesser of yield and fracture, N."""
        return np.minimum(self.gross_yield.resistance, self.fracture.resistance)


def tie_of(case: Case) -> Tie:
    """Return the tension rules for the family and the stated ends."""
    net, force = net_section(case), case.effects.tension.force
    area, fu = column(case.candidates.area), column(case.candidates.steel_fu)
    return Tie(net, GrossYield(force, area, case.fy, PHI), NetFracture(force, net.net_area, fu, PHI))


def tension_checks(case: Case, tie: Tie) -> tuple[Check, Check]:
    """Return yield of the gross section and fracture of the net section."""
    force, shape = case.effects.tension, case.shape
    return (
        strength_check("tension, gross section", "13.2", force, tie.gross_yield.resistance, (tie.gross_yield,), shape),
        strength_check("tension, net section", "13.2", force, tie.fracture.resistance, (tie.net, tie.fracture), shape),
    )


def net_section(case: Case) -> NetSection:
    """Return the net section: angles by their stated ends, tubes welded, all round or where slotted over a gusset."""
    c, ends = case.candidates, case.demand.ends
    connected, thickness = column(c.leg_connected), column(c.thickness)
    if c.family in TUBES:
        slots = case.demand.slots
        if slots is None or not slots.any():
            return WeldedTube(column(c.area))
        weld = ends.weld_length * connected
        return SlottedTube(column(c.area), thickness, slots, weld)
    if ends.kind == "welded":
        weld = ends.weld_length * connected
        return WeldedAngle(c.pieces, connected, column(c.leg_outstanding), thickness, weld, weld)
    return BoltedAngle(
        pieces=c.pieces,
        area=column(c.area),
        thickness=thickness,
        diameter=ends.bolt_diameter,
        lines=ends.bolts,
        across=1,
        punched=float(ends.punched),
    )
