"""The tables [members] and [connections] of a project file."""

from __future__ import annotations

from typing import Annotated, Any, Literal

from spanwright.design.project import DeflectionLimits, MembersInput
from spanwright.design.standard import Ends, Packs
from spanwright.io.schema_fields import Name, Share, Table, counted, field, key, length, one_of, spelled, subtable
from spanwright.truss.errors import InputError

Stock = Literal["South Africa", "any"]
Legs = Literal["any", "equal"]
TubeMaking = Literal["cold formed", "hot finished"]
PackFixing = Literal["snug", "welded"]
WebAngles = Literal["all on one side", "on both sides"]
EndKind = Literal["welded", "bolted"]
Holes = Literal["punched", "drilled"]

# K_i of the equivalent slenderness, SANS 10162-1; 0.65 from memory.
PACK_FACTORS: dict[PackFixing, float] = {"snug": 1.0, "welded": 0.65}
_DECIMAL = r"([0-9]+(?:\.[0-9]+)?)"
_packs_a_panel = counted(1, 20)
_bolts_in_line = counted(1, 12)


def _packs(value: object) -> int:
    return _packs_a_panel(int(spelled(r"([0-9]{1,3}) a panel", value, 'a number a panel, such as "2 a panel"')[1]))


def _span_over(value: object) -> float:
    part = float(spelled(rf"span ?/ ?{_DECIMAL}", value, 'a part of the span, such as "span/300"')[1])
    if not 50 <= part <= 2000:
        raise InputError(
            f"span/{part:g} is outside the plausible range, span/50 to span/2000", 'write such as "span/300"'
        )
    return part


def _weld(value: object) -> float:
    legs = float(spelled(rf"{_DECIMAL} legs?", value, 'a multiple of the connected leg, such as "1.5 legs"')[1])
    if not 0.5 <= legs <= 5:
        raise InputError(f"{legs:g} legs is outside the plausible range, 0.5 to 5 legs", 'write such as "1.5 legs"')
    return legs


def _bolts(value: object) -> tuple[int, float, str]:
    pattern = r"([0-9]{1,3}) ?x ?M(12|16|20|22|24|27|30) (4\.6|8\.8|10\.9)"
    match = spelled(pattern, value, 'number, size and grade, such as "2 x M20 8.8" (M12 to M30; 4.6, 8.8, 10.9)')
    return _bolts_in_line(int(match[1])), float(match[2]), match[3]


class DeflectionTable(Table):
    """The table members.deflection."""

    variable: Annotated[float, field(_span_over)] = key("under variable load alone", "span/300")
    total: Annotated[float, field(_span_over)] = key("under the serviceability combinations", "span/250")


class MembersTable(Table):
    """The table [members]. Families and sections are judged by the catalogue, grades by the steels."""

    steel: Name = key("grade of the angles; tubes take its hollow-section twin", "S355JR")
    gusset: Annotated[float, length("3 mm", "60 mm", "mm")] = key("gap between back-to-back angles", "8 mm")
    top_chord: Name = key("a family to choose from, or one section", "2L")
    bottom_chord: Name = key("a family to choose from, or one section", "2L")
    posts: Name = key("a family to choose from, or one section", "L")
    diagonals: Name = key("a family to choose from, or one section", "L")
    groups: dict[Name, Name] = key("the same for the groups named in [groups]", {}, otherwise="groups go by their role")
    min_leg: Annotated[float, length("20 mm", "300 mm", "mm")] = key("least leg of angles", "50 mm")
    min_thickness: Annotated[float, length("2 mm", "40 mm", "mm")] = key("least thickness of angles", "5 mm")
    min_wall: Annotated[float, length("1.5 mm", "40 mm", "mm")] = key("least wall of tubes", "3 mm")
    stocked: Annotated[Stock, one_of(Stock)] = key("whose stock marks limit the choice", "South Africa")
    legs: Annotated[Legs, one_of(Legs)] = key("of angles to choose from", "any")
    tubes: Annotated[TubeMaking, one_of(TubeMaking)] = key("how hollow sections are made", "cold formed")
    fixings: Share = key("of own mass, for gussets and bolts", "8 %")
    packs: Annotated[int, field(_packs)] = key("packing plates in panels that see compression", "2 a panel")
    pack_fixing: Annotated[PackFixing, one_of(PackFixing)] = key("how packs are fixed", "snug")
    stock_length: Annotated[float, length("2 m", "30 m")] = key("longest piece", "12 m")
    setback: Annotated[float, length("0 mm", "500 mm", "mm")] = key("of webs beyond the chord's edge", "20 mm")
    web_angles: Annotated[WebAngles, one_of(WebAngles)] = key("side of the gusset", "all on one side")
    deflection: DeflectionTable = subtable(DeflectionTable)

    def value(self) -> MembersInput:
        """Return the members as the design room takes them."""
        return MembersInput(
            steel=self.steel,
            by_role={
                "top chord": self.top_chord,
                "bottom chord": self.bottom_chord,
                "post": self.posts,
                "diagonal": self.diagonals,
            },
            by_group=dict(self.groups),
            gap=self.gusset,
            min_leg=self.min_leg,
            min_thickness=self.min_thickness,
            min_wall=self.min_wall,
            stocked=self.stocked,
            equal_legs=self.legs == "equal",
            tube_process="hot" if self.tubes == "hot finished" else "cold",
            fixings=self.fixings,
            packs=Packs(self.packs, PACK_FACTORS[self.pack_fixing]),
            stock_length=self.stock_length,
            setback=self.setback,
            one_side=self.web_angles == "all on one side",
        )

    def deflection_limits(self) -> DeflectionLimits:
        """Return the deflection limits as the design room takes them."""
        return DeflectionLimits(self.deflection.variable, self.deflection.total)


class ConnectionsTable(Table):
    """The table [connections]."""

    ends: Annotated[EndKind, one_of(EndKind)] = key("how member ends are fixed", "welded")
    weld_length: Annotated[float, field(_weld)] = key("least weld along each edge of the connected leg", "1.5 legs")
    bolts: Annotated[Any, field(_bolts)] = key("bolts in one line along the member", "2 x M20 8.8")
    holes: Annotated[Holes, one_of(Holes)] = key("how holes are made", "punched")

    def value(self) -> Ends:
        """Return the ends as the standard takes them."""
        count, diameter, grade = self.bolts
        return Ends(self.ends, self.weld_length, count, diameter, self.holes == "punched", grade)
