"""A copy of the drawing with every finding marked at its place, each code on a layer of its own."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterator
from contextlib import contextmanager
from io import StringIO
from pathlib import Path

from ezdxf._options import options as library
from ezdxf.document import Drawing
from ezdxf.layouts.layout import Modelspace
from ezdxf.math import OCS, Vec3

from spanwright.io.files import write_atomically
from spanwright.io.units import LENGTH
from spanwright.io.wireframe.options import AS_DRAWN
from spanwright.io.wireframe.read import READER_TROUBLE, read_drawing
from spanwright.io.wireframe.report import Facts, Finding, Report
from spanwright.truss.errors import OutputError

_RADIUS = 0.01  # of the span
_USUAL_SPAN = 10_000.0  # mm, for the size of marks where the import did not get as far as a span
_COLOURS = {"warning": 1, "note": 150}  # red and a light blue of the format's colour index
_LONGEST = 120  # characters beside a mark
_LEAN = 45.0  # degrees: words that rise do not run over those of the next joint


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
    """Return a copy of a drawing, as a DXF file, in which each finding is circled at its place and told in a line.

    The marks of a code are on the layer "SPANWRIGHT <code>", in the plane of drawing. `mark_of_input`, if any, is
    the property "Input" of the file.

    Raises DrawingError if the drawing cannot be read, OutputError if it cannot be written again.
    """
    document, _ = read_drawing(path, AS_DRAWN.limits)
    findings = placed(report)
    try:
        for code, severity in sorted({(finding.code, finding.severity) for finding in findings}):
            if layer_name(code) not in document.layers:
                document.layers.add(layer_name(code), color=_COLOURS[severity])
        _Marker(document.modelspace(), report.facts).mark(findings)
        if mark_of_input:
            properties = document.header.custom_vars
            change = properties.replace if properties.has_tag("Input") else properties.append
            change("Input", mark_of_input)
        return _content(document)
    except READER_TROUBLE as error:
        found = f"the drawing cannot be written again ({type(error).__name__}: {error})"
        raise OutputError(found, "mend the drawing in a drawing program first") from error


def placed(report: Report) -> list[Finding]:
    """Return the findings that have a place to mark."""
    return [finding for finding in report.findings if finding.at and all(map(math.isfinite, finding.at))]


def layer_name(code: str) -> str:
    """Return the layer that marks of a code are on."""
    return f"SPANWRIGHT {code}"


class _Marker:
    """Draws marks in the plane of drawing."""

    def __init__(self, space: Modelspace, facts: Facts) -> None:
        self._space = space
        self._ocs = OCS(facts.normal)
        self._extrusion = Vec3(facts.normal)
        right = self._ocs.from_wcs(Vec3(facts.up).cross(self._extrusion))
        self._rotation = math.degrees(math.atan2(right.y, right.x)) + _LEAN
        self._radius = _RADIUS * (facts.span or _USUAL_SPAN) / LENGTH.factors[facts.unit or "mm"]

    def mark(self, findings: list[Finding]) -> None:
        """Circle every finding and tell it beside the circle; those at one place stand line under line."""
        there: Counter[tuple[int, ...]] = Counter()
        down = Vec3(0, -1).rotate_deg(self._rotation)
        across = Vec3(1, 0).rotate_deg(self._rotation)
        for finding in findings:
            cell = tuple(round(value / self._radius) for value in finding.at)
            centre = self._ocs.from_wcs(Vec3(finding.at))
            attributes = {"layer": layer_name(finding.code), "extrusion": self._extrusion}
            self._space.add_circle(centre, self._radius, dxfattribs=attributes)
            text = self._space.add_text(
                _told(finding), height=self._radius / 2, rotation=self._rotation, dxfattribs=attributes
            )
            text.dxf.insert = centre + (across * 1.2 + down * there[cell]) * self._radius
            there[cell] += 1


def _told(finding: Finding) -> str:
    told = f"{finding.code} {finding.text}" + (f"; {finding.done}" if finding.done else "")
    return "".join(c if c.isprintable() else "?" for c in told)[:_LONGEST]


def _content(document: Drawing) -> bytes:
    stream = StringIO()
    with _fixed_dates():
        document.write(stream)
    return document.encode(stream.getvalue())


@contextmanager
def _fixed_dates() -> Iterator[None]:
    """Let the DXF library write no dates and no chance numbers, so that the same input gives the same bytes."""
    before = library.write_fixed_meta_data_for_testing
    library.write_fixed_meta_data_for_testing = True
    try:
        yield
    finally:
        library.write_fixed_meta_data_for_testing = before
