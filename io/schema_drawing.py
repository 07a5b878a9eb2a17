"""The table [truss.drawing] of a project file: how a drawing is read; the command `wireframe` takes the same."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated, Literal

from spanwright.io.schema_fields import (
    Answer,
    Table,
    choose,
    field,
    key,
    line_of_text,
    one_of,
    ranged,
    subtable,
)
from spanwright.io.units import LENGTH, shown
from spanwright.truss.errors import InputError
from spanwright.truss.model import Role

if TYPE_CHECKING:
    from spanwright.io.wireframe.options import DrawnSupports, MarkKind, Options

# The package `wireframe` loads the DXF library; its words are repeated here, and a test holds them together.
Axis = Literal["x", "-x", "y", "-y", "z", "-z"]
BearingChord = Literal["top chord", "bottom chord"]

ROLE_KEYS: dict[str, Role] = {
    "top_chord": "top chord",
    "bottom_chord": "bottom chord",
    "posts": "post",
    "diagonals": "diagonal",
}
MARK_KEYS: dict[str, MarkKind] = {
    "purlins": "purlins",
    "knee_braces": "knee braces",
    "ties": "ties",
    "supports": "supports",
}
_LONGEST_LAYER = 255  # characters, DXF reference


def _patterns(value: object) -> tuple[str, ...]:
    if not isinstance(value, list):
        raise InputError(f"{shown(value)} is not a list of layers", 'write a list of patterns, such as ["STEEL*"]')
    read = tuple(line_of_text(entry) for entry in value)
    wrong = next((entry for entry in read if not 0 < len(entry) <= _LONGEST_LAYER), None)
    if wrong is not None:
        raise InputError(f"{shown(wrong)} can be no layer", f"a layer's name has 1 to {_LONGEST_LAYER} characters")
    return read


Patterns = Annotated[tuple[str, ...], field(_patterns)]
Unit = Annotated[str, field(lambda value: choose(value, tuple(LENGTH.factors)))]


class RolesTable(Table):
    """The table truss.drawing.roles: the layers of each role's lines."""

    top_chord: Patterns = key("layers of the top chord", [], otherwise="by geometry")
    bottom_chord: Patterns = key("layers of the bottom chord", [], otherwise="by geometry")
    posts: Patterns = key("layers of posts", [], otherwise="by geometry")
    diagonals: Patterns = key("layers of diagonals", [], otherwise="by geometry")


class MarksTable(Table):
    """The table truss.drawing.marks: the layers of points, circles and block inserts that mark something."""

    purlins: Patterns = key("layers that mark purlins", [], otherwise="[restraint] says where purlins stand")
    knee_braces: Patterns = key("layers that mark knee braces", [], otherwise="[restraint] says where")
    ties: Patterns = key("layers that mark bottom ties", [], otherwise="[restraint] says where")
    supports: Patterns = key("layers that mark the bearings", [], otherwise="the bearings are found by geometry")


class DrawingTable(Table):
    """The table [truss.drawing]."""

    units: Unit | None = key("unit of the drawing", None, otherwise="as the drawing states")
    layers: Patterns = key("layers that are read", [], otherwise="all that are on, thawed and plotted")
    ignore: Patterns = key("layers that are not read", [], otherwise="none beyond those off, frozen or not plotted")
    roles: RolesTable = subtable(RolesTable)
    marks: MarksTable = subtable(MarksTable)
    tolerance: Annotated[float, field(ranged(LENGTH, "mm", "0.01 mm", "200 mm"))] | None = key(
        "how far apart line ends that meet may be", None, otherwise="the lesser of 5 mm and 0.1 % of the span"
    )
    split_crossings: Answer = key("whether bars that cross without a joint get one. Write true or false", False)
    up: Annotated[Axis, one_of(Axis)] | None = key(
        "axis of the drawing that is vertical", None, otherwise="y of a drawing in plan, else z"
    )
    bearings: Annotated[BearingChord, one_of(BearingChord)] | None = key(
        "chord whose ends bear", None, otherwise="the lowest of the outermost joints bear"
    )

    def options(self, supports: DrawnSupports, overhang: float | None) -> Options:
        """Return what the import takes; overhang in mm, None: as drawn. It loads the DXF library."""
        from spanwright.io.wireframe.options import Options

        return Options(
            units=self.units or "",
            layers=self.layers,
            ignore=self.ignore,
            roles={role: getattr(self.roles, name) for name, role in ROLE_KEYS.items()},
            marks={kind: getattr(self.marks, name) for name, kind in MARK_KEYS.items()},
            tolerance=self.tolerance,
            split_crossings=self.split_crossings,
            up=self.up or "",
            bearings=self.bearings or "",
            overhang=overhang,
            supports=supports,
        )


def key_of(option: str) -> str:
    """Return the key under [truss.drawing] of an option of the import, such as "roles.top chord"; "" where none is."""
    renamed = {f"roles.{role}": f"roles.{name}" for name, role in ROLE_KEYS.items()}
    renamed |= {f"marks.{kind}": f"marks.{name}" for name, kind in MARK_KEYS.items()}
    return renamed.get(option, option if option in DrawingTable.model_fields else "")
