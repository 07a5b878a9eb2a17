"""The pictures that a run wrote beside the calculation, each on a page of its own, at its own scale."""

from __future__ import annotations

from pathlib import Path

from spanwright.design.result import Design
from spanwright.io.calculation.blocks import Picture, Section
from spanwright.io.files import input_hash

FILES = {
    "utilisation.svg": "The truss coloured by utilisation",
    "restraint.svg": "Both chords with their buckling lengths and what holds them",
    "wind_zones.svg": "The roof in plan with the zones of wind",
    "wind_pressures*.svg": "The truss under every case of wind",
}
"""Files by name or pattern, in the order they are shown, and what they show."""


def pictures(design: Design, folder: Path | None) -> tuple[Section, ...]:
    """Return the pictures that carry the mark of this design's input; none where the folder holds none."""
    mark = f"input {input_hash(design.setting.project.source)}"
    blocks = tuple(
        Picture(svg, caption)
        for pattern, caption in FILES.items()
        for path in (sorted(folder.glob(pattern), key=lambda path: (len(path.name), path.name)) if folder else ())
        if mark in (svg := _read(path))
    )
    return (Section("Pictures", blocks),) if blocks else ()


def _read(path: Path) -> str:
    try:
        return path.read_text(encoding="utf-8")
    except (OSError, UnicodeDecodeError):  # left out, or not ours
        return ""
