"""Short names for the combinations, which one table of the document spells out."""

from __future__ import annotations

from spanwright.design.result import Design


def labels(design: Design) -> dict[str, str]:
    """Return a number ("C12") for each combination's name, in the order of analysis."""
    return {combination.name: f"C{at}" for at, combination in enumerate(design.analysis.combinations, 1)}


def strength_labels(design: Design) -> tuple[str, ...]:
    """Return the numbers of the strength combinations, in the order of `Design.strength_names`."""
    numbered = labels(design)
    return tuple(numbered[name] for name in design.strength_names)
