"""The unit of a drawing: the user's statement first, the file's own second, and never a guess.

The header's unit is a label that scales nothing and is often wrong, so a span that no roof truss has is refused with
the readings that would do. Factors are exact (`spanwright.io.units`), not the DXF library's.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from spanwright.io.units import LENGTH
from spanwright.io.wireframe.report import Finding
from spanwright.truss.arrays import FloatArray
from spanwright.truss.decimals import decimal
from spanwright.truss.errors import DrawingError
from spanwright.truss.ranges import ranges

_HEADER_UNITS = {1: "in", 2: "ft", 4: "mm", 5: "cm", 6: "m"}  # $INSUNITS, DXF reference
_USER = "the user"
_SHORT = 0.5  # share of the least usual span: a shorter one on the header's word alone is doubted (the project's own)
_FLAT = 1e-3  # share of the width: a drawing lower than this in z was drawn in plan


@dataclass(frozen=True)
class Unit:
    """The unit of a drawing: its name, mm for one drawing unit, and who stated it."""

    name: str
    factor: float
    stated_by: str


def settle_unit(header: int, asked: str, lines: FloatArray) -> tuple[Unit, tuple[Finding, ...]]:
    """Return the unit.

    header : the drawing's $INSUNITS; 0 is none. asked : the user's unit, or "".
    lines : (n, 2, 3) in drawing units, for the readings.

    Raises DrawingError where neither states a unit, or where the whole drawing is smaller than any truss.
    """
    stated = _HEADER_UNITS.get(header, "")
    if not asked and not stated:
        what = f"states a unit that is not read ($INSUNITS = {header})" if header else "states no unit"
        raise DrawingError(f"the drawing {what}", f"say which it is; {_readings(_drawn_span(lines))}", "units")
    name = asked or stated
    unit = Unit(name, LENGTH.factors[name], _USER if asked else "the drawing ($INSUNITS)")
    findings = [Finding("W-201", f"the unit is {name}, stated by {unit.stated_by}")]
    if asked and stated and asked != stated:
        findings.append(Finding("W-202", f"the drawing says {stated}, the user {asked}", f"{asked} was taken"))
    if _too_short(float(np.ptp(lines.reshape(-1, 3), axis=0).max()) * unit.factor, unit):
        raise _absurd(_drawn_span(lines), unit)
    return unit, tuple(findings)


def judge_span(span: float, unit: Unit) -> tuple[Finding, ...]:
    """Return a finding for an unusual span (mm).

    Raises DrawingError, with the readings, for an absurd one, and for a short one that only the header states.
    """
    usual = ranges()["span"]
    drawn = span / unit.factor
    if span >= usual.possible_most or _too_short(span, unit):
        raise _absurd(drawn, unit)
    if usual.usual_least <= span <= usual.usual_most:
        return ()
    return (Finding("W-205", f"the span is {_metres(span)}", f"taken so; {_readings(drawn)}"),)


def _too_short(span: float, unit: Unit) -> bool:
    """Return whether no truss is so short, or the header alone says so and another unit gives a usual span."""
    limits = ranges()["span"]
    if span <= limits.possible_least:
        return True
    others = (span / unit.factor * factor for factor in LENGTH.factors.values())
    usual = any(limits.usual_least <= other <= limits.usual_most for other in others)
    return unit.stated_by != _USER and span < _SHORT * limits.usual_least and usual


def _absurd(drawn: float, unit: Unit) -> DrawingError:
    limits = ranges()["span"]
    possible = limits.possible_least < drawn * unit.factor < limits.possible_most
    what = "hardly a roof truss" if possible else "no roof truss"
    found = f"in {unit.name}, stated by {unit.stated_by}, the span is {_metres(drawn * unit.factor)}: {what}"
    return DrawingError(found, f"say which unit it is; {_readings(drawn)}", "units")


def _readings(drawn: float) -> str:
    """Return the spans that the units would make of a width as drawn; only possible ones, if there are any."""
    limits = ranges()["span"]
    spans = {unit: drawn * factor for unit, factor in LENGTH.factors.items()}
    possible = {unit: span for unit, span in spans.items() if limits.possible_least < span < limits.possible_most}
    listed = ", ".join(f"{unit} makes {_metres(span)}" for unit, span in (possible or spans).items())
    return f"of the {decimal(drawn)} drawn, {listed}"


def _drawn_span(lines: FloatArray) -> float:
    """Return the width of everything drawn, in drawing units: along x in plan, else along the ground."""
    if not lines.size:
        return 0.0
    x, y, z = np.ptp(lines.reshape(-1, 3), axis=0)
    return float(x) if z <= _FLAT * max(x, y) else float(np.hypot(x, y))


def _metres(length: float) -> str:
    return f"{decimal(length / 1000, 4)} m"
