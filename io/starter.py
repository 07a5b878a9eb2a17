"""The starter: a commented project file that is valid as it stands and teaches every key."""

from __future__ import annotations

from importlib.resources import files


def starter_text() -> str:
    """Return the text of the starter project file."""
    return files("spanwright.io").joinpath("starter.toml").read_text(encoding="utf-8")
