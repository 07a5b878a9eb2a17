"""Lists of bar names, short enough to read: "TC1 to TC12, D3"."""

from __future__ import annotations

import re
from collections.abc import Sequence

_NUMBERED = re.compile(r"(.*?)([0-9]+)")
_SHORTEST = 3
"""Two names are listed; from three on a range reads better."""


def in_ranges(names: Sequence[str]) -> str:
    """Return the names in their order, those that count up by one drawn together: "TC1 to TC4, TC9"."""
    runs: list[list[str]] = []
    for name in names:
        if runs and _next_after(runs[-1][-1]) == name:
            runs[-1].append(name)
        else:
            runs.append([name])
    return ", ".join(f"{run[0]} to {run[-1]}" if len(run) >= _SHORTEST else ", ".join(run) for run in runs)


def _next_after(name: str) -> str | None:
    match = _NUMBERED.fullmatch(name)
    return f"{match[1]}{int(match[2]) + 1}" if match else None
