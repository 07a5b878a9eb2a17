"""The closing table as it grows: every entity goes one way, converted, ignored by rule or not understood."""

from __future__ import annotations

from collections import defaultdict

import numpy as np

from spanwright.io.wireframe.report import Finding, Origin, Outcome, TallyRow
from spanwright.truss.arrays import FloatArray

LAYER_RULE = "layer is "
"""How the reasons begin for which a layer is left out."""


class Counting:
    """Counts entities and collects the findings about them."""

    def __init__(self) -> None:
        self._rows: defaultdict[tuple[Outcome, str, str, str], list[str]] = defaultdict(list)
        self._findings: list[Finding] = []

    def count(self, origin: Origin, outcome: Outcome, reason: str) -> None:
        """Count an entity."""
        self._rows[outcome, origin.kind, origin.layer, reason].append(origin.handle)

    def not_understood(self, origin: Origin, code: str, about: str, at: FloatArray | None) -> None:
        """Count an entity that is not understood, and say so."""
        self.count(origin, "not understood", about)
        self.say(origin, code, f"{origin.kind}: {about}", "not read", at)

    def say(self, origin: Origin, code: str, text: str, done: str, at: FloatArray | None) -> None:
        """Add a finding about an entity; `at` (3,) in drawing units."""
        place = () if at is None or not np.isfinite(at).all() else tuple(at.tolist())
        self._findings.append(Finding.on(origin, code, text, done, place))

    @property
    def tally(self) -> tuple[TallyRow, ...]:
        """The rows of the closing table."""
        return tuple(
            TallyRow(kind, layer, outcome, reason, tuple(handles))
            for (outcome, kind, layer, reason), handles in sorted(self._rows.items())
        )

    @property
    def findings(self) -> tuple[Finding, ...]:
        """The findings, with one for each layer that was left out."""
        left_out: defaultdict[tuple[str, str], int] = defaultdict(int)
        for (_, _, layer, reason), handles in self._rows.items():
            if reason.startswith(LAYER_RULE):
                left_out[layer, reason] += len(handles)
        layers = (
            Finding("W-102", f'layer "{layer}": {reason}', f"entities not read: {count}", layer=layer)
            for (layer, reason), count in sorted(left_out.items())
        )
        return (*layers, *self._findings)
