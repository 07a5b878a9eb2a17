"""Partial factors and combination factors of EN 1990 for a site."""

from __future__ import annotations

from dataclasses import replace

from spanwright.loads.intermediate import Intermediate
from spanwright.loads.national import national_value
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.tables import read_values

_PLAIN = ("gG_sup", "gG_inf", "gQ", "xi", "gG_inf_EQU", "gQ_EQU", "psi0_imposed", "psi0_wind", "psi1_wind")
_BY_ALTITUDE = ("psi0_snow", "psi2_snow")


def en_1990_factors(site: SiteInput | None) -> dict[str, Intermediate]:
    """Return the factors by the names that loads/data/combinations_en_1990.csv gives them (EN 1990 Tables A1.1, A1.2).

    site : None: the recommended values, for a site not above 1000 m.
    """
    nation = "" if site is None else site.national
    limit = read_values("eurocode.toml")["combinations"]["high_site"]
    ending = "_high" if site is not None and site.altitude > limit * 1e3 else ""
    found = {symbol: national_value(nation, symbol) for symbol in _PLAIN}
    for symbol in _BY_ALTITUDE:
        found[symbol] = replace(national_value(nation, symbol + ending), symbol=symbol)
    return found
