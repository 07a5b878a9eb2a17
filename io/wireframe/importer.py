"""The whole import on one page: a drawing becomes joints and bars with names, roles and bearings, and a report.

read > flatten > unit and plane > clean (cluster, split, merge, pieces) > roles, bearings > names > marks
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field, replace
from pathlib import Path
from typing import Literal

import numpy as np

from spanwright.io.wireframe.bearings import find_bearings, find_overhang, judge_stiffness
from spanwright.io.wireframe.clean import clean
from spanwright.io.wireframe.cluster import default_tolerance
from spanwright.io.wireframe.drawing_units import Unit, judge_span, settle_unit
from spanwright.io.wireframe.flatten import Drawn, flatten
from spanwright.io.wireframe.hints import unnamed_marks
from spanwright.io.wireframe.marks import FlatMark, joints_marked
from spanwright.io.wireframe.naming import name_all
from spanwright.io.wireframe.network import Remark
from spanwright.io.wireframe.options import AS_DRAWN, MarkKind, Options, check_options, layer_role, unused_patterns
from spanwright.io.wireframe.pieces import nearly_closed
from spanwright.io.wireframe.plane import Plane, find_plane, plane_findings
from spanwright.io.wireframe.purlin_marks import MarkedPurlins, place_purlins
from spanwright.io.wireframe.read import read_drawing
from spanwright.io.wireframe.report import OUTCOMES, Facts, Finding, Origin, RefusedDrawingError, Report, TallyRow
from spanwright.io.wireframe.roles import Recognised, recognise
from spanwright.truss.arrays import FloatArray
from spanwright.truss.assembly import NamedBar, assemble
from spanwright.truss.errors import DrawingError, SpanwrightError
from spanwright.truss.inputs import GivenInput
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

Bearing = Literal["pinned", "sliding"]
_AT_BOTTOM_JOINTS: tuple[MarkKind, MarkKind] = ("knee braces", "ties")


@dataclass(frozen=True)
class Wireframe:
    """A truss as a drawing gives it.

    given : joints and bars in mm, the left bearing at the origin. purlins : as marked.
    knee_braces, ties : joints of the bottom chord as marked, left to right. report : everything there is to say.
    """

    given: GivenInput
    purlins: MarkedPurlins
    knee_braces: tuple[str, ...]
    ties: tuple[str, ...]
    report: Report


def import_wireframe(path: str | Path, options: Options = AS_DRAWN) -> Wireframe:
    """Read a truss from a DXF file.

    Raises RefusedDrawingError (a DrawingError that carries the report so far) where the drawing gives no truss or
    more than one, and InputError for options that cannot be meant.
    """
    check_options(options)
    path = Path(path)
    log = _Log(path.name)
    try:
        return _import(path, options, log)
    except SpanwrightError as error:
        entity, at = (error.entity, error.at) if isinstance(error, DrawingError) else ("", ())
        raise RefusedDrawingError(error.found, error.remedy, error.key, str(path), entity, at, log.report()) from error


@dataclass
class _Log:
    """What the report will say, as it grows."""

    drawing: str
    findings: list[Finding] = field(default_factory=list)
    tally: tuple[TallyRow, ...] = ()
    facts: Facts = field(default_factory=Facts)

    def report(self) -> Report:
        return Report(self.drawing, tuple(self.findings), self.tally, self.facts)


@dataclass(frozen=True, eq=False)
class _Flat:
    """The drawing in its plane: lines (n, 2, 2) in mm, marks, and where lines, then marks, came from."""

    plane: Plane
    lines: FloatArray
    marks: tuple[FlatMark, ...]
    origins: tuple[Origin, ...]

    def located(self, remarks: Iterable[Remark]) -> list[Finding]:
        """Return remarks as findings: with the entity they are about, and their place in the drawing."""
        nowhere = Origin("", "", "")
        return [
            Finding.on(
                self.origins[remark.source] if remark.source >= 0 else nowhere,
                remark.code,
                remark.text,
                remark.done,
                tuple(self.plane.drawn(np.array(remark.at)).tolist()) if remark.at else (),
            )
            for remark in remarks
        ]


def _import(path: Path, options: Options, log: _Log) -> Wireframe:
    flat, unit = _read(path, options, log)

    def say(remarks: Sequence[Remark]) -> None:
        log.findings += flat.located(remarks)

    tolerance = log.facts.tolerance
    layers = [origin.layer for origin in flat.origins[: len(flat.lines)]]
    role_of = {layer: layer_role(layer, options) for layer in set(layers)}
    roles = [role_of[layer] for layer in layers]
    trunk = clean(flat.lines, roles, flat.marks, options, tolerance, say)
    truss, remarks = recognise(trunk.network, [roles[line] for line in trunk.network.sources], tolerance)
    say(remarks)
    overhang, remarks = find_overhang(trunk, truss, options.overhang, tolerance)
    say(remarks)
    xy = truss.network.xy
    marked = joints_marked(flat.marks, "supports", xy, range(len(xy)))
    say(marked.remarks)
    bearings, remarks = find_bearings(truss, marked.joints, options.bearings, tolerance)
    say((*remarks, *judge_stiffness(len(xy), len(truss.roles))))
    span, depth = float(np.ptp(xy[list(bearings), 0])), float(np.ptp(xy[:, 1]))
    log.facts = replace(log.facts, span=span, depth=depth, joints=len(xy), bars=len(truss.roles))
    log.findings += judge_span(span, unit)
    given = _given(truss, bearings, overhang, options, tolerance)
    return _with_marks(given, xy[bearings[0]], flat, log)


def _read(path: Path, options: Options, log: _Log) -> tuple[_Flat, Unit]:
    """Read the file and lay its lines into their plane."""
    document, damage = read_drawing(path, options.limits)
    log.findings += damage
    drawn = flatten(document, options)
    log.tally = drawn.tally
    log.findings += drawn.findings
    for key, pattern in unused_patterns(drawn.layers, options):
        log.findings.append(Finding("W-108", f'{key}: "{pattern}" matches no layer that holds anything'))
    log.findings += unnamed_marks(drawn.tally, options)
    if not len(drawn.lines):
        raise _nothing_drawn(log.report())
    unit, findings = settle_unit(int(document.header.get("$INSUNITS", 0)), options.units, drawn.lines)
    log.findings += findings
    log.facts = Facts(unit=unit.name, unit_from=unit.stated_by)
    origins = tuple(drawn.origins[source] for source in drawn.sources.tolist())
    plane = find_plane(drawn.lines, unit.factor, options.tolerance or TOLERANCES.ends_meet, options.up, origins)
    log.findings += plane_findings(plane)
    lines = plane.flat(drawn.lines)
    tolerance = options.tolerance or default_tolerance(lines)
    normal, up = (tuple(axis.tolist()) for axis in (plane.normal, plane.up))
    log.facts = replace(log.facts, vertical=plane.vertical, normal=normal, up=up, tolerance=tolerance)
    flat = _Flat(plane, lines, _flat_marks(drawn, plane), (*origins, *(mark.origin for mark in drawn.marks)))
    log.findings += flat.located(nearly_closed(_open_ends(drawn, plane), tolerance))
    return flat, unit


def _nothing_drawn(report: Report) -> DrawingError:
    counts = ", ".join(f"{report.count(outcome)} {outcome}" for outcome in OUTCOMES)
    found = f"the drawing holds no straight line that is read ({counts})"
    return DrawingError(found, "draw bars as LINE or POLYLINE in model space, on layers that are on and plotted")


def _flat_marks(drawn: Drawn, plane: Plane) -> tuple[FlatMark, ...]:
    first = len(drawn.lines)
    return tuple(FlatMark(mark.kind, plane.flat(mark.at), first + k) for k, mark in enumerate(drawn.marks))


def _open_ends(drawn: Drawn, plane: Plane) -> Iterator[tuple[int, FloatArray]]:
    """Yield for each open polyline one of its lines, and its ends (2, 2) in mm."""
    for origin, start, end in drawn.open_ends:
        line = int(np.searchsorted(drawn.sources, origin))
        if line < len(drawn.sources) and drawn.sources[line] == origin:
            yield line, plane.flat(np.array([start, end]))


def _given(
    truss: Recognised, bearings: Sequence[int], overhang: float, options: Options, tolerance: float
) -> GivenInput:
    named = name_all(truss, tolerance)
    xy = truss.network.xy - truss.network.xy[bearings[0]]
    joints = tuple((name, *xy[joint].tolist()) for joint, name in named.joints)
    names = dict(named.joints)
    others: Bearing = "sliding" if options.supports == "left pinned, right sliding" else "pinned"
    supports = tuple((names[joint], others if k else "pinned") for k, joint in enumerate(bearings))
    bars = tuple((start, end, role) for _, start, end, role in named.bars)
    return GivenInput(joints, bars, supports, overhang, tuple(name for name, *_ in named.bars))


def _assembled(given: GivenInput) -> Truss:
    """Return the truss to set marks against; what cannot be a truss for other reasons is refused when it is built."""
    bars = [NamedBar(name, *bar) for name, bar in zip(given.bar_names, given.bars, strict=True)]
    joints = {name: (x, y) for name, x, y in given.joints}
    bearings = {joint: kind == "pinned" for joint, kind in given.supports}
    return assemble(joints, bars, bearings, overhang=given.overhang)


def _with_marks(given: GivenInput, bearing: FloatArray, flat: _Flat, log: _Log) -> Wireframe:
    """Set purlins, braces and ties as marked against the truss; `bearing` (2,) is the place of its origin."""
    truss = _assembled(given)
    marks = [mark._replace(at=mark.at - bearing) for mark in flat.marks]
    purlins, remarks = place_purlins(truss, marks)
    inner = [joint for joint in truss.bottom.joints if joint not in truss.bearing_joints]
    braces, ties = (joints_marked(marks, kind, truss.xy, inner) for kind in _AT_BOTTOM_JOINTS)
    for remark in (*remarks, *braces.remarks, *ties.remarks):
        at = (remark.at[0] + bearing[0], remark.at[1] + bearing[1]) if remark.at else ()
        log.findings += flat.located([remark._replace(at=at)])
    names = truss.joint_names
    braced, tied = (tuple(names[joint] for joint in found.joints) for found in (braces, ties))
    return Wireframe(given, purlins, braced, tied, log.report())
