"""Draws trusses as wireframes for the import's tests: every drawing of the corpus is built by script."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from pathlib import Path
from typing import Any

import numpy as np
from ezdxf.document import Drawing
from ezdxf.filemanagement import new

from spanwright.io.wireframe import Options, Wireframe, import_wireframe
from spanwright.truss.arrays import FloatArray
from spanwright.truss.forms import build_form
from spanwright.truss.given import build_given
from spanwright.truss.inputs import FormInput
from spanwright.truss.model import Truss

Point = Sequence[float] | FloatArray
HEADER = {"in": 1, "ft": 2, "mm": 4, "cm": 5, "m": 6}

PRATT = build_form(FormInput("Pratt", 12000.0, 0.25, panels=6))
HIGH_HEEL = build_form(FormInput("Pratt", 18000.0, 0.2, 900.0, 8))


def new_drawing(unit: str = "mm", version: str = "R2010") -> Drawing:
    """Return an empty drawing that states a unit; "" states none."""
    document = new(version)
    document.units = HEADER.get(unit, 0)
    return document


def lines_of(truss: Truss) -> list[tuple[FloatArray, FloatArray, str]]:
    """Return every bar as (start, end, role); points (2,) in mm."""
    return [(truss.xy[start], truss.xy[end], role) for (start, end), role in zip(truss.ends, truss.roles, strict=True)]


def draw(space: Any, truss: Truss, place: Callable[[Any], Point] = lambda point: point, layer: str = "") -> None:
    """Draw every bar as a line on a layer, or on a layer of its role's name."""
    for start, end, role in lines_of(truss):
        space.add_line(place(start), place(end), dxfattribs={"layer": layer or role})


def draw_segments(space: Any, segments: Iterable[tuple[Point, Point]], layer: str = "0") -> None:
    """Draw lines between points."""
    for start, end in segments:
        space.add_line(start, end, dxfattribs={"layer": layer})


def save(document: Drawing, folder: Path, name: str = "roof.dxf") -> Path:
    """Save a drawing and return where."""
    path = folder / name
    document.saveas(path)
    return path


def imported(document: Drawing, folder: Path, **options: Any) -> Wireframe:
    """Save a drawing and import it."""
    return import_wireframe(save(document, folder), Options(**options))


def codes(wireframe: Wireframe) -> list[str]:
    """Return the codes of what was found, without those every import has: unit, plane and bearings."""
    return [finding.code for finding in wireframe.report.findings if finding.code not in ("W-201", "W-203", "W-407")]


def assert_same(wireframe: Wireframe, truss: Truss, within: float = 0.0) -> None:
    """Require the truss itself: names, order, roles, supports, and coordinates within a distance in mm."""
    found = build_given(wireframe.given)
    assert found.joint_names == truss.joint_names
    assert set(bars_by_name(found)) == set(bars_by_name(truss))
    assert [found.joint_names[support.joint] for support in found.supports] == [
        truss.joint_names[support.joint] for support in truss.supports
    ]
    assert wireframe.given.overhang == abs(wireframe.given.overhang)
    np.testing.assert_allclose(found.xy, truss.xy, rtol=0, atol=within)


def bars_by_name(truss: Truss) -> list[tuple[str, frozenset[str], str]]:
    """Return (name, names of the two joints, role) of every bar."""
    return [
        (name, frozenset((truss.joint_names[start], truss.joint_names[end])), role)
        for name, (start, end), role in zip(truss.bar_names, truss.ends, truss.roles, strict=True)
    ]
