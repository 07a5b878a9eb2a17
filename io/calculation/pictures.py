"""The pictures that a run wrote beside the calculation, each on a page of its own, at its own scale."""

from __future__ import annotations

from pathlib import Path

from spanwright.design.result import Design
from spanwright.io.calculation.blocks import Picture, Section
from spanwright.io.files import input_hash

NAMES = {
    "utilisation.svg": "The truss coloured by utilisation",
    "restraint.svg": "Both chords with their buckling lengths and what holds them",
}


def pictures(design: Design, folder: Path | None) -> tuple[Section, ...]:
    """Return the pictures that carry the mark of this design's input; none where the folder holds none."""
    mark = f"input {input_hash(design.setting.project.source)}"
    found = [(caption, _read(folder / name)) for name, caption in NAMES.items()] if folder else []
    blocks = tuple(Picture(svg, caption) for caption, svg in found if mark in svg)
    return (Section("Pictures", blocks),) if blocks else ()


def _read(path: Path) -> str:
    try:
        return path.read_text(encoding="utf-8")
    except (OSError, UnicodeDecodeError):  # left out, or not ours
        return ""
