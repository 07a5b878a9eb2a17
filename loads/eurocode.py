"""EN 1991: imposed load of roofs of category H, snow, and the way from basic wind speed to peak pressure.

First-generation Eurocodes: EN 1990:2002, EN 1991-1-1:2002, EN 1991-1-3:2003, EN 1991-1-4:2005. Values that nations may
choose come from `national`; the others lie in loads/data/eurocode.toml and en_terrain.csv. The printed standards were
not at hand: values from memory are marked so.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Any, Literal

from spanwright.loads import derivation as say
from spanwright.loads.intermediate import Intermediate, Mark
from spanwright.loads.national import national_basis, national_value, refuse_not_covered
from spanwright.loads.return_period import return_period_factor, return_period_formula
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.site_standard import Imposed, PeakPressure, SnowArrangement
from spanwright.loads.snow import snow_arrangements
from spanwright.loads.tables import read_table, read_values
from spanwright.truss.errors import InputError, UnknownNameError

Expressions = Literal["6.10", "6.10a and 6.10b"]
_SPEED = "EN 1991-1-4 cl. 4.2"
_MEAN = "EN 1991-1-4 cl. 4.3"
_TURBULENCE = "EN 1991-1-4 cl. 4.4"
_PEAK = "EN 1991-1-4 cl. 4.5"
_INSIDE = "EN 1991-1-4 cl. 7.2.9"


@dataclass(frozen=True)
class Eurocode:
    """EN 1990 with the actions of EN 1991; `expressions` are those of EN 1990 that combinations follow."""

    expressions: Expressions

    @property
    def name(self) -> str:
        """As the project file spells it."""
        return f"EN 1990:2002, {self.expressions}"

    @property
    def internal_pair(self) -> tuple[Intermediate, ...]:
        """Internal pressure coefficients where nothing is known of the openings (EN 1991-1-4 cl. 7.2.9)."""
        return tuple(
            Intermediate("cpi", "inside, openings not known", value, "-", _INSIDE, mark="from memory")
            for value in _values()["internal"]["pair"]
        )

    def imposed(self, site: SiteInput, shape: RoofShape, area: float) -> Imposed:  # noqa: ARG002  # the same on every area
        """Return the imposed load of a roof of category H (EN 1991-1-1 cl. 6.3.4): on the whole area, to be safe.

        Where it depends on the pitch the flatter slope decides.
        """
        pitch = math.degrees(min(abs(shape.left), abs(shape.right)))
        pressure, man = national_value(site.national, "qk", pitch), national_value(site.national, "Qk")
        flatter = Intermediate("a", "pitch of the flatter slope", pitch, "deg")
        steps = (*national_basis(site.national), flatter, pressure, man)
        return Imposed(pressure.value / 1e3, man.value * 1e3, steps)

    def peak_pressure(self, site: SiteInput, height: float) -> PeakPressure:
        """Return the peak velocity pressure at a height above ground, mm (EN 1991-1-4 cl. 4.2 to 4.5).

        Raises InputError for a speed that is missing or implausible, for a terrain that is missing or unknown, above
        200 m, and where the nation has a method of its own.
        """
        refuse_not_covered(site.national, "EN 1991-1-4", "state wind pressures in [loads]", "site.national_values")
        steps = tuple(_peak_steps(site, height))
        return PeakPressure(steps[-1].value / 1e3, steps, tuple(_warnings(height)))

    def snow(self, site: SiteInput, shape: RoofShape) -> tuple[SnowArrangement, ...]:
        """Return every arrangement of snow (EN 1991-1-3): see `snow.snow_arrangements`."""
        return () if site.snow is None else snow_arrangements(site.snow, site, shape)


def _peak_steps(site: SiteInput, height: float) -> Iterator[Intermediate]:
    """Yield every value from the basic speed to the peak pressure."""
    found = (*_speed(site), *_roughness(site.terrain, height))
    yield from found
    value = {step.symbol: step.value for step in found}
    turbulence, density = (national_value(site.national, symbol) for symbol in ("kl", "rho"))
    mean = value["cr"] * site.topography * value["vb"]
    intensity = turbulence.value / (site.topography * math.log(value["z"] / value["z0"]))
    peak = _values()["gust"]["peak"]
    pressure = (1.0 + peak * intensity) * density.value * mean**2 / 2 / 1e3
    yield Intermediate("co", "orography", site.topography, "-", _MEAN, mark="stated")
    yield Intermediate("vm", "mean speed", mean, "m/s", _MEAN, "cr*co*vb", "seen")
    yield turbulence
    yield Intermediate("Iv", "turbulence", intensity, "-", _TURBULENCE, "kl/(co*log(z/z0))", "from memory")
    yield density
    formula = f"(1 + {peak:g}*Iv)*rho*vm**2/2/1000"
    yield Intermediate("qp", "peak velocity pressure", pressure, "kPa", _PEAK, formula, "seen")


def _speed(site: SiteInput) -> Iterator[Intermediate]:
    """Yield what leads to the basic speed at the site (EN 1991-1-4 cl. 4.2)."""
    basic = _refuse_speed(site.wind_speed)
    shape, exponent, direction, season = (
        national_value(site.national, symbol) for symbol in ("K", "n", "cdir", "cseason")
    )
    probability = return_period_factor(site.return_period, shape.value, exponent.value)
    speed = probability * direction.value * season.value * basic
    formula = return_period_formula(shape.value, exponent.value)
    yield from national_basis(site.national)
    yield Intermediate("vb0", "basic speed, 10-minute mean", basic, "m/s", _SPEED, mark="stated")
    yield Intermediate("T", "return period", site.return_period, "years", mark="stated")
    yield from (shape, exponent)
    yield Intermediate("cprob", "return period factor", probability, "-", _SPEED, formula, "seen")
    yield from (direction, season)
    yield Intermediate("vb", "basic speed at the site", speed, "m/s", _SPEED, "cprob*cdir*cseason*vb0", "seen")


def _roughness(category: str | None, height: float) -> Iterator[Intermediate]:
    """Yield what leads to the roughness factor of a terrain category at a height, mm (EN 1991-1-4 cl. 4.3.2)."""
    terrains = {row["category"]: row for row in read_table("en_terrain.csv")}
    if category is None:
        listed = ", ".join(f'"{name}" ({row["ground"]})' for name, row in terrains.items())
        raise InputError("the terrain category is missing", f"state one of {listed}", "site.terrain")
    if category not in terrains:
        raise UnknownNameError.among(
            category, list(terrains), what="terrain category of EN 1991-1-4", key="site.terrain"
        )
    profile, row = _values()["profile"], terrains[category]
    mark: Mark = row["mark"]  # type: ignore[assignment]  # a word of Mark
    lowest, roughness = float(row["zmin_m"]), float(row["z0_m"])
    if height / 1e3 > profile["highest"]:
        raise InputError(
            f"the roof is {say.metres(height)} high, and EN 1991-1-4 reaches to {profile['highest']:g} m",
            "check the height",
            "site.eaves_height",
        )
    z = max(height / 1e3, lowest)
    factor = profile["factor"] * (roughness / profile["reference"]) ** profile["exponent"]
    table = f"EN 1991-1-4 Table 4.1, terrain {category}"
    yield Intermediate("zmin", f"least height, {row['ground']}", lowest, "m", table, mark=mark)
    yield Intermediate("z", "reference height, the highest point, not below zmin", z, "m", _MEAN)
    yield Intermediate("z0", f"roughness length, {row['ground']}", roughness, "m", table, mark=mark)
    formula = f"{profile['factor']:g}*(z0/{profile['reference']:g})**{profile['exponent']:g}"
    yield Intermediate("kr", "terrain factor", factor, "-", _MEAN, formula, "seen")
    yield Intermediate("cr", "roughness", factor * math.log(z / roughness), "-", _MEAN, "kr*log(z/z0)", "seen")


def _warnings(height: float) -> Iterator[str]:
    limit = _values()["gust"]["dynamic"]
    if height >= limit * 1e3:
        yield (
            f"the roof is {say.metres(height)} high: the structural factor cscd is taken as 1, which EN 1991-1-4 "
            f"cl. 6.2 grants without more to buildings below {limit:g} m"
        )


def _refuse_speed(speed: float | None) -> float:
    least, most = _values()["speed"]["least"], _values()["speed"]["most"]
    wanted = (
        f"EN 1991-1-4 takes the 10-minute mean speed 10 m above open country, {least:g} to {most:g} m/s on European "
        "maps; a gust speed is larger by about half"
    )
    if speed is None:
        raise InputError("the basic wind speed is missing", wanted, "site.basic_wind_speed")
    if not least <= speed <= most:
        raise InputError(
            f"a basic wind speed of {speed:g} m/s is not plausible as EN 1991-1-4 defines it",
            wanted,
            "site.basic_wind_speed",
        )
    return speed


def _values() -> dict[str, Any]:
    return read_values("eurocode.toml")
