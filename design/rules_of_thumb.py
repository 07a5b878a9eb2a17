"""Published rules of thumb, from their data file with source and confidence mark."""

from __future__ import annotations

import tomllib
from functools import cache
from importlib.resources import files
from typing import Any

FILE = "rules_of_thumb.toml"


@cache
def _tables() -> dict[str, dict[str, Any]]:
    return tomllib.loads((files("spanwright.design.data") / FILE).read_text(encoding="utf-8"))


def rule(name: str) -> dict[str, Any]:
    """Return the entries of one rule; see the data file for their units."""
    return _tables()[name]
