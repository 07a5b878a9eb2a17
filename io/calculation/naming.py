"""Short names for load cases and combinations, which one list of the document spells out."""

from __future__ import annotations

from spanwright.design.result import Design


def case_labels(design: Design) -> dict[str, str]:
    """Return a number ("L3") for each load case's name, in the order of analysis."""
    return {case.name: f"L{at}" for at, case in enumerate(design.analysis.cases, 1)}


def labels(design: Design) -> dict[str, str]:
    """Return a number ("C12") for each combination's name, in the order of analysis."""
    return {combination.name: f"C{at}" for at, combination in enumerate(design.analysis.combinations, 1)}


def strength_labels(design: Design) -> tuple[str, ...]:
    """Return the numbers of the strength combinations, in the order of `Design.strength_names`."""
    numbered = labels(design)
    return tuple(numbered[name] for name in design.strength_names)
