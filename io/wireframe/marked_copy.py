"""A copy of the drawing with every finding marked at its place, each code on a layer of its own."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Sequence
from pathlib import Path

from ezdxf.layouts.layout import Modelspace
from ezdxf.math import OCS, Vec3

from spanwright.io.dxf_bytes import dxf_bytes, fixed_marks
from spanwright.io.files import write_atomically
from spanwright.io.units import LENGTH
from spanwright.io.wireframe.options import AS_DRAWN
from spanwright.io.wireframe.read import READER_TROUBLE, read_drawing
from spanwright.io.wireframe.report import Facts, Finding, Report
from spanwright.truss.errors import OutputError

_RADIUS = 0.01  # of the span
_USUAL_SPAN = 10_000.0  # mm, for the size of marks where the import did not get as far as a span
_COLOURS = {"warning": 1, "note": 150}  # red and a light blue of the format's colour index
_LONGEST = 120  # characters of a line in the list
# of the list of findings, in radii of a mark: how far right of the marks, width of a column; and its rows
_LIST_AWAY = 12.0
_LIST_WIDTH = 60.0
_LIST_ROWS = 60


def write_marked_copy(path_in: Path, report: Report, path_out: Path) -> int:
    """Write the marked copy of a drawing to a file, and return how many marks it has.

    Raises DrawingError if the drawing cannot be read, OutputError if the copy cannot be written or would be written
    over the drawing itself.
    """
    if path_out.exists() and path_out.samefile(path_in):
        raise OutputError("the marked copy would replace the drawing", "give it another name", file=str(path_out))
    try:
        content = marked_copy(path_in, report)
    except OutputError as error:
        raise error.located(file=str(path_out)) from error
    write_atomically(path_out, content)
    return len(placed(report))


def marked_copy(path: Path, report: Report, mark_of_input: str = "") -> bytes:
    """Return a copy of a drawing, as a DXF file, in which each finding is circled and numbered at its place.

    A list on the right tells all findings, warnings first. What belongs to a code is on the layer "SPANWRIGHT <code>",
    in the plane of drawing. `mark_of_input`, if any, is the property "Input" of the file.

    Raises DrawingError if the drawing cannot be read, OutputError if it cannot be written again.
    """
    document, _ = read_drawing(path, AS_DRAWN.limits)
    try:
        for code, severity in sorted({(finding.code, finding.severity) for finding in report.findings}):
            if layer_name(code) not in document.layers:
                document.layers.add(layer_name(code), color=_COLOURS[severity])
        _Marker(document.modelspace(), report.facts).mark(placed(report), report.findings)
        if mark_of_input:
            properties = document.header.custom_vars
            change = properties.replace if properties.has_tag("Input") else properties.append
            change("Input", mark_of_input)
        with fixed_marks():
            return dxf_bytes(document)
    except READER_TROUBLE as error:
        found = f"the drawing cannot be written again ({type(error).__name__}: {error})"
        raise OutputError(found, "mend the drawing in a drawing program first") from error


def placed(report: Report) -> list[Finding]:
    """Return the findings that have a place to mark."""
    return [finding for finding in report.findings if finding.at]


def layer_name(code: str) -> str:
    """Return the layer that marks of a code are on."""
    return f"SPANWRIGHT {code}"


class _Marker:
    """Draws marks in the plane of drawing: lengths and places below are in its own axes, `right` and `down` in it."""

    def __init__(self, space: Modelspace, facts: Facts) -> None:
        self._space = space
        self._ocs = OCS(facts.normal)
        self._extrusion = Vec3(facts.normal)
        self._right = self._ocs.from_wcs(Vec3(facts.up).cross(self._extrusion))
        self._down = -self._ocs.from_wcs(Vec3(facts.up))
        self._radius = _RADIUS * (facts.span or _USUAL_SPAN) / LENGTH.factors[facts.unit or "mm"]

    def mark(self, placed: list[Finding], findings: Sequence[Finding]) -> None:
        """Circle and number what has a place, numbers at one place under each other, and list all on the right."""
        there: Counter[tuple[int, ...]] = Counter()
        centres = [self._ocs.from_wcs(Vec3(finding.at)) for finding in placed]
        for number, (finding, centre) in enumerate(zip(placed, centres, strict=True), 1):
            cell = tuple(round(value / self._radius) for value in centre.xyz)
            self._space.add_circle(centre, self._radius, dxfattribs=self._attributes(finding))
            beside = self._right * 1.2 + self._down * (there[cell] - 0.2)
            self._write(finding, f"{number}: {finding.code}", centre + beside * self._radius)
            there[cell] += 1
        numbers = {id(finding): f"{number}: " for number, finding in enumerate(placed, 1)}
        corner = self._corner(centres or [Vec3()])
        for row, finding in enumerate(sorted(findings, key=_warnings_first)):
            column, line = divmod(row, _LIST_ROWS)
            place = self._right * column * _LIST_WIDTH + self._down * line * 1.2
            self._write(finding, numbers.get(id(finding), "") + _told(finding), corner + place * self._radius)

    def _corner(self, centres: list[Vec3]) -> Vec3:
        """Return where the list begins: right of all marks, at the height of the highest."""
        along = max(centre.dot(self._right) for centre in centres) + _LIST_AWAY * self._radius
        up = max(-centre.dot(self._down) for centre in centres)
        return self._right * along - self._down * up + Vec3(0, 0, centres[0].z)

    def _write(self, finding: Finding, words: str, place: Vec3) -> None:
        rotation = math.degrees(math.atan2(self._right.y, self._right.x))
        text = self._space.add_text(
            words, height=self._radius / 2, rotation=rotation, dxfattribs=self._attributes(finding)
        )
        text.dxf.insert = place

    def _attributes(self, finding: Finding) -> dict[str, object]:
        return {"layer": layer_name(finding.code), "extrusion": self._extrusion}


def _warnings_first(finding: Finding) -> tuple[bool, str]:
    return finding.severity != "warning", finding.code


def _told(finding: Finding) -> str:
    told = f"{finding.code} {finding.text}" + (f"; {finding.done}" if finding.done else "")
    return "".join(c if c.isprintable() else "?" for c in told)[:_LONGEST]
