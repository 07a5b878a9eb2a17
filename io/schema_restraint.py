"""The table [restraint] of a project file: where the purlins stand and what holds the chords sideways."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import model_validator

from spanwright.io.schema_fields import (
    Answer,
    Table,
    Text,
    any_length,
    counted,
    field,
    key,
    names,
    number,
    one_of,
    refused,
    spelled,
    subtable,
)
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import RestraintInput

Anchor = Literal["roof bracing", "diaphragm", "nothing"]

_ORDINAL = r"every ([2-9]|[1-9][0-9])(?:st|nd|rd|th)"
_line_number = counted(1, 1000)


def _purlins(value: object) -> str | float | tuple[float, ...]:
    if isinstance(value, list):
        return tuple(any_length(entry) for entry in value)
    if isinstance(value, str) and not any(character.isdigit() for character in value):
        spelled("at joints", value, '"at joints", a greatest spacing such as "1.5 m", or a list of distances')
        return "at joints"
    return any_length(value)


def _ridge(value: object) -> float | None:
    if value == "one":
        return None
    return any_length(spelled(r"pair, (.+) from the apex", value, '"one" or "pair, 0.2 m from the apex"')[1])


def _anchored(value: object) -> str | tuple[int, ...]:
    if isinstance(value, list):
        return tuple(_line_number(entry) for entry in value)
    return spelled("all|none", value, '"all", "none" or numbers counted from the left eaves, such as [1, 4, 7]')[0]


def _knee_braces(value: object) -> str | tuple[str, ...]:
    if isinstance(value, list):
        return names(value)
    spelling = '"none", "every purlin", "every 2nd purlin", or a list of bottom joints such as ["B2", "B6"]'
    return spelled(rf"none|every purlin|{_ORDINAL} purlin", value, spelling)[0]


def _bottom_ties(value: object) -> str | tuple[str, ...]:
    if isinstance(value, list):
        return names(value)
    spelling = '"none", "every 2nd joint", or a list of bottom joints such as ["B3", "B6"]'
    return spelled(rf"none|{_ORDINAL} joint", value, spelling)[0]


class FactorTable(Table):
    """The table restraint.effective_length_factor."""

    in_plane: Annotated[float, number(0.5, 3)] = key("in the plane of the truss", 1.0)
    out_of_plane: Annotated[float, number(0.5, 3)] = key("sideways", 1.0)
    reason: Text = key("why a factor below 1 is right", "")


class RestraintTable(Table):
    """The table [restraint]."""

    purlins: Annotated[str | float | tuple[float, ...], field(_purlins)] = key("where the purlins stand", "at joints")
    ridge_purlins: Annotated[float | None, field(_ridge)] = key("one line at the ridge or a pair", "one")
    anchored_purlins: Annotated[str | tuple[int, ...], field(_anchored)] = key(
        "which purlin lines end at a node of a braced bay or diaphragm; a line that does not holds nothing sideways. "
        'Write "all", "none", or their numbers counted from the left eaves over the ridge to the right, such as [1, 4]'
    )
    anchored_by: Annotated[Anchor, one_of(Anchor)] = key(
        "what takes the restraint forces out of the anchored purlin lines. "
        'Write "roof bracing", "diaphragm" or "nothing"'
    )
    bearings_held: Answer = key(
        "whether the bearing joints are held sideways, by an eaves strut or tie that runs to a braced bay. "
        "Write true or false"
    )
    knee_braces: Annotated[str | tuple[str, ...], field(_knee_braces)] = key("purlin to bottom chord", "none")
    bottom_ties: Annotated[str | tuple[str, ...], field(_bottom_ties)] = key("lines to a braced bay", "none")
    effective_length_factor: FactorTable = subtable(FactorTable)
    twist_held: Text = key("what prevents twist", "", otherwise="nothing is stated to prevent twist")

    @model_validator(mode="after")
    def _anchor_exists(self) -> Self:
        if self.anchored_by == "nothing" and self.anchored_purlins != "none":
            raise refused(
                InputError(
                    'anchored_by = "nothing" contradicts anchored purlins',
                    'write anchored_purlins = "none", or say what anchors them: "roof bracing" or "diaphragm"',
                    "anchored_by",
                )
            )
        return self

    def value(self) -> RestraintInput:
        """Return the restraint as the truss room takes it."""
        factor = self.effective_length_factor
        return RestraintInput(
            purlins=self.purlins,  # type: ignore[arg-type]  # _purlins returns "at joints" as its only text
            anchored=self.anchored_purlins,  # type: ignore[arg-type]  # _anchored returns "all" or "none" as text
            anchored_by=self.anchored_by,
            bearings_held=self.bearings_held,
            ridge_pair=self.ridge_purlins,
            knee_braces=self.knee_braces,
            bottom_ties=self.bottom_ties,
            factor_in=factor.in_plane,
            factor_out=factor.out_of_plane,
            reason=factor.reason,
            twist_held=self.twist_held,
        )
