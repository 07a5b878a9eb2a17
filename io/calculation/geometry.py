"""Geometry and supports: the sketch with its dimensions, and the joints."""

from __future__ import annotations

from itertools import pairwise

from spanwright.design.result import Design
from spanwright.io.calculation.blocks import Column, Dimension, Mark, Section, Sketch, Stroke, Table
from spanwright.io.calculation.figures import kilo
from spanwright.truss.model import Truss


def geometry(design: Design) -> Section:
    """Return the sketch of the truss and the tables of joints and supports."""
    truss = design.setting.truss
    return Section("Geometry and supports", (sketch(truss), _supports(truss), _joints(truss)))


def sketch(truss: Truss) -> Sketch:
    """Return the truss with names and dimensions."""
    shapes = {support.joint: "pinned" if support.x else "sliding" for support in truss.supports if support.y}
    marks = tuple(Mark(shape, *_point(truss, joint)) for joint, shape in shapes.items())
    below = {*truss.bottom.joints} - {*truss.top.joints}
    names = tuple(
        Mark("bearing" if joint in shapes else "below" if joint in below else "above", *_point(truss, joint), name)
        for joint, name in enumerate(truss.joint_names)
    )
    caption = (
        "Setting-out lines to scale; lengths in m. Joints and members by name. Triangle: held both ways; triangle on "
        "rollers: slides along the span."
    )
    return framed(truss, strokes(truss), marks, names, _dimensions(truss), caption)


def strokes(truss: Truss, *, named: bool = True) -> tuple[Stroke, ...]:
    """Return the bars as lines, chords heavy."""
    return tuple(
        Stroke(
            "chord" if "chord" in truss.roles[bar] else "web",
            _point(truss, int(truss.ends[bar, 0])),
            _point(truss, int(truss.ends[bar, 1])),
            name if named else "",
        )
        for bar, name in enumerate(truss.bar_names)
    )


def framed(
    truss: Truss,
    lines: tuple[Stroke, ...],
    marks: tuple[Mark, ...],
    names: tuple[Mark, ...],
    dimensions: tuple[Dimension, ...],
    caption: str,
) -> Sketch:
    """Return a sketch that holds the truss and all marks."""
    x = [*(truss.xy[:, 0] / 1e3), *(mark.x for mark in marks)]
    y = [*(truss.xy[:, 1] / 1e3), *(mark.y for mark in marks)]
    left, bottom = float(min(x)), float(min(y))
    return Sketch(lines, marks, names, dimensions, left, bottom, float(max(x)) - left, float(max(y)) - bottom, caption)


def _point(truss: Truss, joint: int) -> tuple[float, float]:
    return float(truss.xy[joint, 0]) / 1e3, float(truss.xy[joint, 1]) / 1e3


def _dimensions(truss: Truss) -> tuple[Dimension, ...]:
    """Return panel by panel along the bottom chord, the span, the depth at the left end and the height in all."""
    chain = [_point(truss, joint) for joint in truss.bottom.joints]
    panels = tuple(Dimension(start, end, kilo((end[0] - start[0]) * 1e3, 3), 1) for start, end in pairwise(chain))
    first, last = (_point(truss, joint) for joint in (truss.bearing_joints[0], truss.bearing_joints[-1]))
    heel = _point(truss, truss.top.joints[0])
    lowest, highest = (float(end) / 1e3 for end in (truss.xy[:, 1].min(), truss.xy[:, 1].max()))
    height = Dimension((last[0], lowest), (last[0], highest), kilo((highest - lowest) * 1e3, 3), 1, upright=True)
    depth = Dimension(chain[0], heel, kilo((heel[1] - chain[0][1]) * 1e3, 3), -1, upright=True)
    return (*panels, Dimension(first, last, kilo(truss.span, 3), 2), height, *((depth,) if heel != chain[0] else ()))


def _supports(truss: Truss) -> Table:
    words = {
        (True, True): "both ways",
        (False, True): "up and down; slides along the span",
        (True, False): "sideways only",
    }
    rows = tuple(
        (
            truss.joint_names[support.joint],
            kilo(float(truss.xy[support.joint, 0]), 3),
            kilo(float(truss.xy[support.joint, 1]), 3),
            words.get((support.x, support.y), "not at all"),
        )
        for support in truss.supports
    )
    columns = (
        Column("joint", align="left"),
        Column("x", "m"),
        Column("y", "m"),
        Column("held", align="left", share=1.0),
    )
    return Table(columns, rows, title="Supports")


def _joints(truss: Truss) -> Table:
    rows = tuple(
        (name, kilo(float(x), 3), kilo(float(y), 3)) for name, (x, y) in zip(truss.joint_names, truss.xy, strict=True)
    )
    columns = (Column("joint", align="left"), Column("x", "m"), Column("y", "m"))
    return Table(columns, rows, title="Joints", dense=True, side_by_side=4)
