"""The table [truss] of a project file: a form, joints and bars one by one, or a drawing that holds them."""

from __future__ import annotations

import math
from typing import Annotated, Any, Literal, Self

from pydantic import Discriminator, Tag, model_validator

from spanwright.io.schema_drawing import DrawingTable
from spanwright.io.schema_fields import (
    Length,
    Name,
    Table,
    any_length,
    choose,
    field,
    key,
    length,
    line_of_text,
    name,
    one_of,
    refused,
    subtable,
)
from spanwright.io.units import shown, slope
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import FormInput, FormName, GivenInput, Lean
from spanwright.truss.model import ROLES, Role

FormSupports = Literal["left pinned, right sliding", "both pinned"]
Supports = Literal["left pinned, right sliding", "both pinned", "as given"]
Bearing = Literal["pinned", "sliding"]

_FURTHEST = 1e6  # mm: 1 km, further from the origin than any drawing of one truss
DECIDING_KEYS = {"given": ("joints", "bars", "joint_supports"), "drawn": ("wireframe", "drawing")}
"""Keys that decide how [truss] gives the truss; without any of them it is a form."""


def _whole(value: object) -> int:
    if isinstance(value, bool) or not isinstance(value, int):
        raise InputError(f"{shown(value)} is not a number of panels", "write an even whole number, without quotes")
    return value


def _point(value: object) -> tuple[float, float]:
    if not isinstance(value, list) or len(value) != 2:
        raise InputError(f"{shown(value)} is not a point", 'write x and y, such as ["3 m", "0.9 m"]')
    x, y = (any_length(entry) for entry in value)
    if max(abs(x), abs(y)) > _FURTHEST:
        raise InputError(f"a joint at {shown(value[0])}, {shown(value[1])} is absurdly far away", "check the units")
    return x, y


def _bar(value: object) -> tuple[str, str, Role, str]:
    if not isinstance(value, list) or len(value) not in (3, 4):
        raise InputError(
            f"{shown(value)} is not a bar",
            'write two joints and a role, such as ["A", "B", "top chord"]; a name may follow',
        )
    role: Any = choose(value[2], ROLES)
    return name(value[0]), name(value[1]), role, name(value[3]) if len(value) == 4 else ""


def _drawing(value: object) -> str:
    path = line_of_text(value)
    if not path:
        raise InputError("the name of the drawing is empty", 'write its path from this file, such as "roof.dxf"')
    return path


class _AnyTruss(Table):
    spacing: Annotated[float, length("0.3 m", "30 m")] = key('distance from truss to truss, such as "5 m"')
    tributary_width: Annotated[float, length("0.1 m", "30 m")] | None = key(
        "width of roof that one truss carries", None, otherwise="the spacing"
    )

    @property
    def tributary(self) -> float:
        """Width of roof carried, mm."""
        return self.spacing if self.tributary_width is None else self.tributary_width


class _StatedTruss(_AnyTruss):
    overhang: Length = key("top chord beyond the support, in plan, each side", "0 m")


class FormTruss(_StatedTruss):
    """The table [truss] with a form."""

    form: Annotated[FormName, one_of(FormName)] = key('the form of the truss: "Pratt", "Howe" or "Fink"')
    span: Length = key('distance between supports, such as "18 m"')
    pitch: Annotated[float, field(slope)] | None = key("slope of the top chord", None)
    rise: Annotated[float, length("0 m", "100 m")] | None = key("ridge above the top chord at the support", None)
    heel_depth: Length = key("depth between chord lines over the support", "0 m")
    panels: Annotated[int, field(_whole)] | None = key(
        "panels over the span",
        None,
        otherwise="the fewest even number that keeps rafter panels within the purlin spacing",
    )
    diagonals: Annotated[Lean, one_of(Lean)] | None = key("lean of the diagonals", None, otherwise="by the form's name")
    supports: Annotated[FormSupports, one_of(FormSupports)] = key("the bearings", "left pinned, right sliding")

    @model_validator(mode="after")
    def _pitch_or_rise(self) -> Self:
        if self.pitch is None and self.rise is None:
            raise refused(
                InputError(
                    "the slope of the top chord is missing",
                    'write pitch = "12 deg", or rise = "1.9 m" (ridge above the top chord\'s level at the support)',
                    "pitch",
                )
            )
        if self.pitch is not None and self.rise is not None:
            raise refused(
                InputError("pitch and rise are both given", "give one of them; the other follows from the span", "rise")
            )
        return self

    def value(self) -> FormInput:
        """Return the form as the truss room takes it; a rise becomes a pitch."""
        rise = 0.0 if self.rise is None else self.rise
        pitch = math.atan2(2 * rise, self.span) if self.pitch is None else self.pitch
        return FormInput(self.form, self.span, pitch, self.heel_depth, self.panels, self.overhang, self.diagonals)


class GivenTruss(_StatedTruss):
    """The table [truss] with joints and bars one by one."""

    joints: dict[Name, Annotated[tuple[float, float], field(_point)]] = key(
        'the joints, one a line under [truss.joints]: A = ["0 m", "0 m"]'
    )
    bars: list[Annotated[tuple[str, str, Role, str], field(_bar)]] = key(
        'the bars, each with its two joints and its role: [["A", "B", "top chord"], ["A", "C", "bottom chord"]]; '
        'a bar\'s own name may follow, ["A", "B", "top chord", "TC1"]'
    )
    joint_supports: dict[Name, Annotated[Bearing, one_of(Bearing)]] = key(
        'the bearings, under [truss.joint_supports]: A = "pinned", C = "sliding"'
    )

    @property
    def supports(self) -> Supports:
        """The bearings are those of `joint_supports`."""
        return "as given"

    def value(self) -> GivenInput:
        """Return the joints and bars as the truss room takes them."""
        joints = tuple((joint, x, y) for joint, (x, y) in self.joints.items())
        bars = tuple((start, end, role) for start, end, role, _ in self.bars)
        bar_names = tuple(bar_name for *_, bar_name in self.bars if bar_name)
        return GivenInput(joints, bars, tuple(self.joint_supports.items()), self.overhang, bar_names)


class DrawnTruss(_AnyTruss):
    """The table [truss] with a drawing; what it holds is read by `spanwright.io.drawn`."""

    wireframe: Annotated[str, field(_drawing)] = key('the drawing (DXF), by its path from this file: "roof.dxf"')
    drawing: DrawingTable = subtable(DrawingTable)
    overhang: Length | None = key("top chord beyond the support, in plan, each side", None, otherwise="as drawn")
    supports: Annotated[FormSupports, one_of(FormSupports)] = key("the bearings", "left pinned, right sliding")


def _way(table: Any) -> str:
    keys = set(table) if isinstance(table, dict) else set()
    return next((way for way in ("drawn", "given") if not keys.isdisjoint(DECIDING_KEYS[way])), "form")


TrussTable = Annotated[
    Annotated[FormTruss, Tag("form")] | Annotated[GivenTruss, Tag("given")] | Annotated[DrawnTruss, Tag("drawn")],
    Discriminator(_way),
]
