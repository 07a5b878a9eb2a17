"""The table [site] of a project file: the place and the building, from which loads are found."""

from __future__ import annotations

from typing import Annotated, Any

from spanwright.io.schema_fields import (
    Answer,
    Name,
    Table,
    Text,
    choose,
    field,
    key,
    length,
    number,
    one_of,
    ranged,
    spelled,
)
from spanwright.io.units import AREA, LENGTH, PRESSURE, SPEED, shown
from spanwright.loads.site_inputs import POSITIONS, Derivable, Face, NamedPosition, Opening, SiteInput, SnowInput
from spanwright.truss.errors import InputError

Speed = Annotated[float, field(ranged(SPEED, "m/s", "10 m/s", "100 m/s"))]
OpeningArea = Annotated[float, field(ranged(AREA, "m2", "0 m2", "10000 m2"))]
GroundSnow = Annotated[float, field(ranged(PRESSURE, "kPa", "0 kPa", "20 kPa"))]
Along = Annotated[float, length("0 m", "2000 m")]
WholeSide = Annotated[float, length("1 m", "2000 m")]
Height = Annotated[float, length("0.5 m", "100 m")]
Overhang = Annotated[float, length("0 m", "5 m")]
Altitude = Annotated[float, length("-400 m", "5000 m")]
_distance = ranged(LENGTH, "m", "0 m", "2000 m")
_years = range(2, 10_001)
_widest = 1.5  # no internal pressure coefficient of a standard is larger


def _position(value: object) -> NamedPosition | float:
    named = isinstance(value, str) and value[:1].isalpha()
    position: Any = choose(value, POSITIONS) if named else _distance(value)
    return position  # type: ignore[no-any-return]  # a word of POSITIONS, or a length


def _period(value: object) -> float:
    years = float(spelled(r"([0-9]+) years", value, 'the return period in years, such as "50 years"')[1])
    if years not in _years:
        raise InputError(
            f"{shown(value)} is outside the plausible range", "write 2 years to 10000 years; usual: 50 years"
        )
    return years


def _coefficients(value: object) -> tuple[float, ...]:
    entries: list[Any] = value if isinstance(value, list) else [value]
    for entry in entries:
        if isinstance(entry, bool) or not isinstance(entry, int | float) or not abs(entry) <= _widest:
            raise InputError(
                f"{shown(entry)} is not an internal pressure coefficient",
                f"write numbers from -{_widest} to {_widest}, such as [0.2, -0.3]; + presses outward",
            )
    if not entries:
        raise InputError("no coefficient is given", "write numbers such as [0.2, -0.3], or leave the key out")
    return tuple(float(entry) for entry in entries)


class OpeningTable(Table):
    """A table [[site.openings]]: openings in one face of the building."""

    face: Annotated[Face, one_of(Face)] = key(
        'the face they are in, seen along the ridge: "left wall", "right wall", "near gable" or "far gable"'
    )
    area: OpeningArea = key('their area together, such as "16 m2"')
    start: Along | None = key(
        "where they begin along the face: on a gable from the left wall, on a wall from the near gable",
        None,
        otherwise="anywhere on the face",
    )
    end: Along | None = key("where they end along the face", None, otherwise="anywhere on the face")
    shut_in_storms: Answer = key("whether they are shut in every storm", False)


class SnowTable(Table):
    """The table [site.snow]."""

    ground: GroundSnow = key('the characteristic snow load on the ground at the site, such as "0.65 kPa"')
    exposure: Annotated[float, number(0.5, 2.0)] = key("exposure factor: windswept less than 1, sheltered more", 1.0)
    thermal: Annotated[float, number(0.1, 1.0)] = key("thermal factor", 1.0)
    guards: Answer = key("whether snow guards or parapets keep the snow from sliding off", False)
    exceptional: Annotated[float, number(1.0, 5.0)] | None = key(
        "factor on the ground load for exceptional falls", None, otherwise="no exceptional falls"
    )


class SiteTable(Table):
    """The table [site]."""

    length: WholeSide = key('length of the building along the ridge, from gable to gable, such as "40 m"')
    eaves_height: Height = key('height from the ground to the roof\'s surface above the lower wall, such as "6 m"')
    width: WholeSide | None = key("width of the building from wall to wall", None, otherwise="the span")
    gable_overhang: Overhang = key("of the roof beyond each gable", "0 m")
    truss: Annotated[NamedPosition | float, field(_position)] = key(
        'where the truss stands: "end", "first interior", "typical interior", or its distance from the near gable',
        "typical interior",
    )
    terrain: Name | None = key("terrain category of the loading standard", None)
    basic_wind_speed: Speed | None = key("as the loading standard's own map gives it", None)
    altitude: Altitude = key("of the site above the sea", "0 m")
    topography: Annotated[float, number(0.5, 3.0)] = key("factor on the wind speed of hills and ridges", 1.0)
    return_period: Annotated[float, field(_period)] = key("of the wind speed", "50 years")
    internal_pressure: Annotated[tuple[float, ...], field(_coefficients)] | None = key(
        "internal pressure coefficients",
        None,
        otherwise="by the openings, or the loading standard's pair where none are given",
    )
    openings: list[OpeningTable] = key("openings in the faces of the building", [])
    column_head_share: Annotated[float, number(0.0, 1.0)] = key(
        "share of the wind on a wall that its columns pass to the truss: 0.5 pinned at the base, 0.375 fixed, 0 none",
        0.5,
    )
    snow: SnowTable | None = key("snow at the site", None)
    national_values: Text = key("whose national values of the loading standard", "", otherwise="the recommended values")

    def value(self, left_open: frozenset[Derivable]) -> SiteInput:
        """Return the site as the loads room takes it; `left_open` are the keys that [loads] leaves to it."""
        return SiteInput(
            length=self.length,
            eaves_height=self.eaves_height,
            terrain=self.terrain,
            wind_speed=self.basic_wind_speed,
            position=self.truss,
            width=self.width,
            gable_overhang=self.gable_overhang,
            altitude=self.altitude,
            topography=self.topography,
            return_period=self.return_period,
            internal=self.internal_pressure or (),
            openings=tuple(Opening(o.face, o.area, o.start, o.end, o.shut_in_storms) for o in self.openings),
            column_head_share=self.column_head_share,
            snow=None
            if self.snow is None
            else SnowInput(
                self.snow.ground, self.snow.exposure, self.snow.thermal, self.snow.guards, self.snow.exceptional
            ),
            national=self.national_values,
            derive=left_open | ({"snow"} if self.snow is not None else set()),
        )
