"""The pictures of a design: how far each member is used, what holds the chords sideways, and the wind on the roof."""

from __future__ import annotations

from pathlib import Path

from spanwright.design.result import Design
from spanwright.io.pictures.restraint import restraint_sheet
from spanwright.io.pictures.sheet import drawing_board
from spanwright.io.pictures.utilisation import utilisation_sheet
from spanwright.io.pictures.wind import wind_sheets


def write_pictures(design: Design, folder: Path) -> None:
    """Write utilisation and restraint, and where loads follow from the site wind_zones and wind_pressures, each as
    .png and .svg, into a folder; the same design gives the same bytes.

    Raises OutputError where that cannot be done.
    """
    with drawing_board():
        utilisation_sheet(design).write(folder, "utilisation")
        restraint_sheet(design).write(folder, "restraint")
        for name, sheet in wind_sheets(design).items():
            sheet.write(folder, name)
