"""What every output must say: the standing cautions, and what the standard's rule sheet leaves to verify."""

from __future__ import annotations

CAUTIONS: tuple[str, ...] = (
    "These results are for review by a competent, licensed engineer, who alone can take responsibility for them.",
    "Local codes and the printed standard take precedence over anything stated here.",
    "The truss is taken as simply supported and pin-jointed, with no moment passed to columns; "
    "setting-out lines are centroid lines and eccentricities at joints are waived.",
    "Erection, lifting and temporary stability are not covered; no restraint exists until it is built.",
    "Joints, gussets, welds, bolts and bearings are not designed yet: the end connections stated are requirements.",
)
"""Printed in every output, in this order."""

SHORT_CAUTION = (
    "For review by a competent, licensed engineer. Local codes and the printed standard take precedence. "
    "Erection stability is not covered."
)
"""For pictures and headings."""
