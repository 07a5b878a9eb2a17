"""The numbers of SANS 10162-1, read from their data file with source and confidence mark."""

from __future__ import annotations

import tomllib
from functools import cache
from importlib.resources import files
from typing import Any

FILE = "sans_10162_1.toml"


@cache
def _tables() -> dict[str, dict[str, Any]]:
    return tomllib.loads((files("spanwright.design.data") / FILE).read_text(encoding="utf-8"))


def number(table: str, name: str) -> float:
    """Return one number of the standard; see the data file for its unit, clause and source."""
    return float(_tables()[table][name]["value"])


def verify_notes() -> tuple[str, ...]:
    """Return what to verify against a licensed copy: the values from memory by clause, then the open doubts."""
    clauses: dict[str, None] = {}
    for table, entries in _tables().items():
        for name, entry in entries.items():
            if table != "doubts" and entry["mark"] == "memory":
                clauses[f"{entry['clause'] or name}"] = None
    return (f"From memory, in part or whole: {', '.join(clauses)}.", *_tables()["doubts"]["texts"])
