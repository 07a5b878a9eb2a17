"""The two pictures of a design: how far each member is used, and what holds the chords sideways."""

from __future__ import annotations

from pathlib import Path

from spanwright.design.result import Design
from spanwright.io.pictures.restraint import restraint_sheet
from spanwright.io.pictures.sheet import drawing_board
from spanwright.io.pictures.utilisation import utilisation_sheet


def write_pictures(design: Design, folder: Path) -> None:
    """Write utilisation.png, .svg and restraint.png, .svg into a folder; the same design gives the same bytes.

    Raises OutputError where that cannot be done.
    """
    with drawing_board():
        utilisation_sheet(design).write(folder, "utilisation")
        restraint_sheet(design).write(folder, "restraint")
