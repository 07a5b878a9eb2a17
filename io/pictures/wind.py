"""The pictures of wind found from the site: roof plans with zones, and the truss under every case."""

from __future__ import annotations

from spanwright.design.result import Design
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.wind_cases import wind_case_sheets
from spanwright.io.pictures.wind_zones import wind_zones_sheet


def wind_sheets(design: Design) -> dict[str, Sheet]:
    """Return the sheets by file name; none where wind is stated, or there is none."""
    site = design.setting.load_set.site
    if site is None or site.wind is None:
        return {}
    sheets = {"wind_zones": wind_zones_sheet(design, site, site.wind)}
    for number, sheet in enumerate(wind_case_sheets(design, site.wind), 1):
        sheets["wind_pressures" if number == 1 else f"wind_pressures_{number}"] = sheet
    return sheets
