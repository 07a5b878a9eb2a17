"""Reads the tables that ship in `loads/data`: CSV and TOML with `#` lines that state source, confidence and units."""

from __future__ import annotations

import csv
import tomllib
from functools import cache
from importlib.resources import files
from typing import Any


@cache
def read_table(name: str) -> tuple[dict[str, str], ...]:
    """Return the rows of a shipped CSV table, each by column name."""
    return tuple(csv.DictReader(line for line in _text(name).splitlines() if not line.startswith("#")))


@cache
def read_values(name: str) -> dict[str, Any]:
    """Return the values of a shipped TOML file."""
    return tomllib.loads(_text(name))


def _text(name: str) -> str:
    return files("spanwright.loads.data").joinpath(name).read_text(encoding="utf-8")
