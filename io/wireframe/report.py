"""What the import says about a drawing: findings with their places, and the closing table."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal, NamedTuple

from spanwright.io.wireframe.codes import CODES, Severity
from spanwright.truss.decimals import fixed
from spanwright.truss.errors import DrawingError

Outcome = Literal["converted", "ignored by rule", "not understood"]
OUTCOMES: tuple[Outcome, ...] = ("converted", "ignored by rule", "not understood")

_PLACE_DECIMALS = 3  # of the drawing unit: what a drawing program takes to find the spot


def place_text(at: Sequence[float]) -> str:
    """Return a place in drawing units, "412345.678, 1836210.123"; z is left out where it is 0."""
    x, y, *rest = (fixed(value, _PLACE_DECIMALS) for value in at)
    return ", ".join([x, y, *(z for z in rest if z != "0")])


class Origin(NamedTuple):
    """Where something came from: the entity's handle and kind, its layer as seen, and the blocks it stands in."""

    handle: str
    kind: str
    layer: str
    blocks: tuple[str, ...] = ()


@dataclass(frozen=True)
class Finding:
    """One finding.

    code : stable, see `codes.py`. text : what was found. done : what was done about it.
    handle, layer, blocks : of the entity, or empty. at : x, y, z in drawing units, or empty.
    """

    code: str
    text: str
    done: str = ""
    handle: str = ""
    layer: str = ""
    blocks: tuple[str, ...] = ()
    at: tuple[float, ...] = ()

    @property
    def severity(self) -> Severity:
        """How much it weighs: "note" or "warning"."""
        return CODES[self.code].severity

    @property
    def meaning(self) -> str:
        """What the code means."""
        return CODES[self.code].meaning

    @classmethod
    def on(cls, origin: Origin, code: str, text: str, done: str = "", at: tuple[float, ...] = ()) -> Finding:
        """Make a finding about an entity."""
        return cls(code, text, done, origin.handle, origin.layer, origin.blocks, at)


@dataclass(frozen=True)
class TallyRow:
    """Entities of one kind on one layer that went one way; `reason` says by which rule."""

    kind: str
    layer: str
    outcome: Outcome
    reason: str
    handles: tuple[str, ...]

    @property
    def count(self) -> int:
        """How many."""
        return len(self.handles)


@dataclass(frozen=True)
class Facts:
    """What was understood of the drawing as a whole; empty until the import got so far.

    unit, unit_from : the unit and who stated it. vertical : which axis was taken as vertical, in words.
    normal, up : (3,) unit vectors of the plane of drawing. tolerance, span, depth : mm.
    """

    unit: str = ""
    unit_from: str = ""
    vertical: str = ""
    normal: tuple[float, ...] = (0.0, 0.0, 1.0)
    up: tuple[float, ...] = (0.0, 1.0, 0.0)
    tolerance: float = 0.0
    span: float = 0.0
    depth: float = 0.0
    joints: int = 0
    bars: int = 0


@dataclass(frozen=True)
class Report:
    """Everything the import says: findings in the order of work, the closing table, the facts."""

    drawing: str
    findings: tuple[Finding, ...]
    tally: tuple[TallyRow, ...]
    facts: Facts = Facts()

    def with_code(self, code: str) -> tuple[Finding, ...]:
        """Return the findings with one code."""
        return tuple(finding for finding in self.findings if finding.code == code)

    def count(self, outcome: Outcome) -> int:
        """Return how many entities went one way."""
        return sum(row.count for row in self.tally if row.outcome == outcome)

    @property
    def read(self) -> int:
        """How many entities were read in all."""
        return sum(row.count for row in self.tally)


@dataclass(eq=False)
class RefusedDrawingError(DrawingError):
    """A drawing that gave no truss; `report` holds what was found up to there, to print and to mark up."""

    report: Report | None = None
