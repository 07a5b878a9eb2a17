"""SANS 10160-2 and -3: imposed load of inaccessible roofs, and the way from basic wind speed to peak pressure.

The edition moves the meaning of the wind map and the gust factor here, and the load factor of wind in the combinations.
The printed standard was not at hand: values from memory are marked so (loads/data/sans_10160.toml).
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal

import numpy as np

from spanwright.loads import return_period
from spanwright.loads.intermediate import Intermediate, Mark
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.site_standard import Imposed, PeakPressure, SnowArrangement
from spanwright.loads.tables import read_table, read_values
from spanwright.truss.errors import InputError, UnknownNameError

_SPEED = "10160-3 cl. 7.2"
_PEAK = "10160-3 cl. 7.3"
_PRESSURE = "10160-3 cl. 7.4"
_ROOFS = "10160-2 Table 5"


@dataclass(frozen=True)
class Sans10160:
    """SANS 10160 of one edition, "2011" or "2019"."""

    edition: Literal["2011", "2019"]

    @property
    def name(self) -> str:
        """As the project file spells it."""
        return f"SANS 10160:{self.edition}"

    @property
    def internal_pair(self) -> tuple[Intermediate, ...]:
        """Internal pressure coefficients where nothing is known of the openings (10160-3 cl. 8.3)."""
        return tuple(
            Intermediate("cpi", "inside, openings not known", value, "-", "10160-3 cl. 8.3", mark="from memory")
            for value in _values()["internal"]["pair"]
        )

    def imposed(self, site: SiteInput, shape: RoofShape, area: float) -> Imposed:  # noqa: ARG002  # the same on every roof
        """Return the imposed load of an inaccessible roof by tributary area, mm2 on plan (10160-2 Table 5).

        Raises InputError (key "site.national_values"): the standard leaves nothing to nations.
        """
        if site.national:
            raise InputError(
                f"national values of {site.national} are stated, and {self.name} leaves none open",
                "leave the key out, or state a Eurocode under actions",
                "site.national_values",
            )
        values = _values()["imposed"]
        pressure = float(np.interp(area / 1e6, values["areas"], values["pressures"]))
        formula = "0.3 + (15 - A)/60, within 0.30 and 0.50"
        return Imposed(
            pressure / 1e3,
            values["man"] * 1e3,
            (
                Intermediate("A", "area on plan that the truss carries", area / 1e6, "m2"),
                Intermediate("q", "imposed load, inaccessible roof", pressure, "kPa", _ROOFS, formula, "assumed"),
                Intermediate("Q", "concentrated load instead", values["man"], "kN", _ROOFS, mark="from memory"),
            ),
        )

    def peak_pressure(self, site: SiteInput, height: float) -> PeakPressure:
        """Return the peak wind pressure at a height above ground, mm (10160-3 cl. 7.2 to 7.4).

        Raises InputError for a speed that is missing, implausible or of the other edition's map, and for an unknown
        terrain.
        """
        edition = _values()[self.edition]
        basic = _refuse_speed(site.wind_speed, self.edition)
        probability = return_period_factor(site.return_period)
        mean = probability * basic
        roughness = _roughness(site.terrain, height)
        density = air_density(site.altitude)
        gust = edition["gust"]
        peak = roughness[-1].value * site.topography * gust * mean
        pressure = 0.5 * density * peak**2 / 1e3
        remembered: Mark = "from memory"
        formula = return_period.return_period_formula(**_values()["return_period"])
        steps = (
            Intermediate("vb0", f"basic speed, {edition['map']}", basic, "m/s", _SPEED, mark="stated"),
            Intermediate("T", "return period", site.return_period, "years", mark="stated"),
            Intermediate("cprob", "return period factor", probability, "-", _SPEED, formula, "seen"),
            Intermediate("vb", "basic speed for the return period", mean, "m/s", _SPEED, "cprob*vb0", remembered),
            Intermediate("cg", "gust factor", gust, "-", _PEAK, mark=remembered),
            *roughness,
            Intermediate("co", "topography", site.topography, "-", _PEAK, mark="stated"),
            Intermediate("vp", "peak speed", peak, "m/s", _PEAK, "cr*co*cg*vb", remembered),
            Intermediate("alt", "altitude of the site", site.altitude / 1e3, "m", mark="stated"),
            Intermediate("rho", "air density", density, "kg/m3", "10160-3 Table 4", mark=remembered),
            Intermediate("qp", "peak wind pressure", pressure, "kPa", _PRESSURE, "rho*vp**2/2/1000", "seen"),
        )
        return PeakPressure(pressure / 1e3, steps)

    def snow(self, site: SiteInput, shape: RoofShape) -> tuple[SnowArrangement, ...]:  # noqa: ARG002  # as the seam asks
        """Return no snow; InputError (key "site.snow") where some is stated: SANS 10160 has no snow part."""
        if site.snow is None:
            return ()
        raise InputError(
            "SANS 10160 has no part on snow",
            "leave site.snow out, or choose a loading standard with snow in the key actions",
            "site.snow",
        )


def return_period_factor(years: float) -> float:
    """Return cprob for a return period (10160-3 cl. 7.2): 1 for 50 years."""
    return return_period.return_period_factor(years, **_values()["return_period"])


def air_density(altitude: float) -> float:
    """Return the density of air at an altitude, mm, in kg/m3 (10160-3 Table 4)."""
    table = [(float(row["altitude_m"]), float(row["rho_kg_m3"])) for row in read_table("sans_air_density.csv")]
    return float(np.interp(altitude / 1e3, *np.array(table).T))


def roughness_factor(category: str, height: float) -> float:
    """Return cr of a terrain category at a height, mm (10160-3 cl. 7.3)."""
    return _roughness(category, height)[-1].value


def _roughness(category: str | None, height: float) -> tuple[Intermediate, ...]:
    terrains = {row["category"]: row for row in read_table("sans_terrain.csv")}
    known = ", ".join(f'"{name}"' for name in terrains)
    if category is None:
        raise InputError("the terrain category is missing", f"state one of {known}", "site.terrain")
    if category not in terrains:
        raise UnknownNameError.among(
            category, list(terrains), what="terrain category of SANS 10160", key="site.terrain"
        )
    zg, zc, alpha, lowest = (float(terrains[category][key]) for key in ("zg_m", "zc_m", "alpha", "zmin_m"))
    z = max(height / 1e3, lowest)
    factor = float(_values()["roughness"]["factor"])
    cr = factor * ((z - zc) / (zg - zc)) ** alpha
    table = f"{_PEAK}, terrain {category}"
    formula = f"{factor:g}*((z - zc)/(zg - zc))**alpha"
    reference = f"reference height, not below {lowest:g} m"
    return (
        Intermediate("z", reference, z, "m", _PEAK, mark="assumed" if z == lowest else "computed"),
        Intermediate("zg", "gradient height", zg, "m", table, mark="from memory"),
        Intermediate("zc", "height of the zero plane", zc, "m", table, mark="from memory"),
        Intermediate("alpha", "exponent of the profile", alpha, "-", table, mark="from memory"),
        Intermediate("cr", "roughness", cr, "-", _PEAK, formula, "from memory"),
    )


def _refuse_speed(speed: float | None, edition: str) -> float:
    values = _values()[edition]
    low, high = values["speeds"]
    wanted = f"SANS 10160:{edition} takes its own map of {values['map']} speeds, {low:g} to {high:g} m/s"
    if speed is None:
        raise InputError("the basic wind speed is missing", wanted, "site.basic_wind_speed")
    if low <= speed <= high:
        return speed
    other = "2019" if edition == "2011" else "2011"
    low, high = _values()[other]["speeds"]
    if low <= speed <= high:
        wanted += f"; {speed:g} m/s would go with SANS 10160:{other}, whose map and load factor of wind go together"
    raise InputError(
        f"a basic wind speed of {speed:g} m/s does not go with SANS 10160:{edition}", wanted, "site.basic_wind_speed"
    )


def _values() -> dict[str, Any]:
    return read_values("sans_10160.toml")
