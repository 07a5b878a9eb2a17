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
    """Return what to verify against a licensed copy: the clauses with values from memory, then the open doubts."""
    clauses = {
        entry["clause"] or name
        for table, entries in _tables().items()
        if table != "doubts"
        for name, entry in entries.items()
        if entry["mark"] == "memory"
    }
    listed = sorted(clauses, key=lambda clause: (not clause[0].isdigit(), *_parts(clause)))
    return (f"Values wholly or partly from memory, by clause: {', '.join(listed)}.", *_tables()["doubts"]["texts"])


def _parts(clause: str) -> list[int]:
    return [int(part) for part in clause.split(".") if part.isdigit()]
