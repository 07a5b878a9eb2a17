"""Reads the tables that ship in `design/data`: CSV with `#` lines that state source, confidence and units."""

from __future__ import annotations

import csv
from importlib.resources import files


def read_table(name: str) -> list[dict[str, str]]:
    """Return the rows of a shipped table, each by column name."""
    text = files("spanwright.design.data").joinpath(name).read_text(encoding="utf-8")
    return list(csv.DictReader(line for line in text.splitlines() if not line.startswith("#")))
