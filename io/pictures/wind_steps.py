"""The values of the picture `wind_zones`: what each one is in words, its symbol and value, and where it comes from."""

from __future__ import annotations

import numpy as np

from spanwright.io.pictures.lettering import cut_to, width_of
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import BODY, HAIR, LEAST, SMALL, SOFT, THICK
from spanwright.io.text import figures
from spanwright.loads.intermediate import Intermediate
from spanwright.loads.pressures import WindField
from spanwright.truss.arrays import FloatArray

STEP = 6.6
"""mm from value to value: two lines of words."""

LEAST_STEP = 5.0
"""mm: values do not stand closer; what then has no room is counted below the last."""

HEADING = 4.4
"""Height of the heading, mm."""


def draw_steps(sheet: Sheet, field: WindField, left: float, top: float, size: tuple[float, float]) -> float:
    """Draw the values down from `top`, in a width and at most a height, mm, and return the height where they end."""
    width, height = size
    rows = [*(_row(step) for step in field.peak.steps), *(_inside(step) for step in field.internal)]
    step = float(np.clip((height - HEADING) / len(rows), LEAST_STEP, STEP))
    room = int((height - HEADING) / step + 0.01)
    if len(rows) > room:
        rows = [*rows[: room - 1], (f"and {len(rows) - room + 1} more: see calculation.pdf", "", "")]
    ends = np.array([left, left + width])
    sheet.text(left, top - 3.0, "peak pressure and inside pressure", BODY, colour=SOFT)
    sheet.text(left + width, top - 3.0, "value", BODY, across="right", colour=SOFT)
    sheet.lines([np.column_stack([ends, np.full(2, top - HEADING)])], THICK)
    for number, row in enumerate(rows):
        _draw_row(sheet, row, ends, top - HEADING - number * step, step)
    return top - HEADING - len(rows) * step


def _draw_row(sheet: Sheet, row: tuple[str, str, str], ends: FloatArray, top: float, step: float) -> None:
    meaning, value, source = row
    left, right = (float(end) for end in ends)
    sheet.text(left, top - 0.43 * step, cut_to(meaning, right - left - width_of(value, SMALL) - 2.0, SMALL), SMALL)
    sheet.text(right, top - 0.43 * step, value, SMALL, across="right")
    sheet.text(left, top - 0.87 * step, cut_to(source, right - left, LEAST), LEAST, colour=SOFT)
    sheet.lines([np.array([[left, top - step], [right, top - step]])], HAIR, "#c8c8c8")


def _row(step: Intermediate) -> tuple[str, str, str]:
    unit = "" if step.unit == "-" else f" {step.unit}"
    source = ", ".join(part for part in (step.clause, step.mark) if part)
    return step.meaning, f"{step.symbol} = {figures(step.value)}{unit}", source


def _inside(step: Intermediate) -> tuple[str, str, str]:
    """Return a row for an internal coefficient, with the words by which the cases name it."""
    meaning, _, source = _row(step)
    value = f"{step.value:+.3g}"
    return f"{meaning}: cases \u201cinside {value}\u201d", f"{step.symbol} = {value}".replace("-", "\u2212"), source
