"""What stands in model space or in one block: straight lines, points that may be marks, blocks, and all the rest."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import NamedTuple, cast

import numpy as np
from ezdxf.entities.arc import Arc
from ezdxf.entities.circle import Circle
from ezdxf.entities.dxfentity import DXFEntity
from ezdxf.entities.ellipse import Ellipse
from ezdxf.entities.insert import Insert
from ezdxf.entities.lwpolyline import LWPolyline
from ezdxf.entities.polyline import Polyline
from ezdxf.entities.spline import Spline
from ezdxf.math import UVec, Vec3

from spanwright.io.wireframe.read import READER_TROUBLE
from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.decimals import decimal

Point = tuple[float, float, float]

_BY_RULE = {
    "text": ("TEXT", "MTEXT", "ATTRIB", "ATTDEF", "RTEXT", "ARCTEXT"),
    "dimension": (
        "DIMENSION",
        "ARC_DIMENSION",
        "LARGE_RADIAL_DIMENSION",
        "LEADER",
        "MULTILEADER",
        "MLEADER",
        "TOLERANCE",
        "ACAD_TABLE",
    ),
    "hatch": ("HATCH", "MPOLYGON"),
    "viewport": ("VIEWPORT",),
}
RULE_OF_KIND = {kind: rule for rule, kinds in _BY_RULE.items() for kind in kinds}
"""Kinds of entity that are left out by rule, and the rule's name."""

_CURVE_FLAGS = Polyline.CURVE_FIT_VERTICES_ADDED | Polyline.SPLINE_FIT_VERTICES_ADDED
_PLACES = ("location", "insert", "start", "vtx0")


class Entity(NamedTuple):
    """An entity of a block or of model space.

    use : "bars", "mark", "block", a rule of `RULE_OF_KIND`, "invisible", or "" where it is not understood.
    at : a place to point at in the axes of the block, or (). about : why it is not understood, where more can be said.
    """

    handle: str
    kind: str
    layer: str
    use: str
    at: tuple[float, ...] = ()
    about: str = ""


class Aside(NamedTuple):
    """Something to say about an entity: code, text, done, and a place in the axes of the block."""

    entity: int
    code: str
    text: str
    done: str
    at: Point


@dataclass(frozen=True, eq=False)
class Content:
    """Model space or one block.

    lines : (n, 2, 3) in the axes of the block. owners : (n,) indices into `entities`.
    inserts : (index into `entities`, the insert) each. open_ends : (entity, first point, last point) of polylines.
    """

    lines: FloatArray
    owners: IntArray
    entities: tuple[Entity, ...]
    inserts: tuple[tuple[int, Insert], ...]
    open_ends: tuple[tuple[int, Point, Point], ...]
    asides: tuple[Aside, ...]


class _Gathered:
    def __init__(self) -> None:
        self.lines: list[tuple[float, ...]] = []
        self.owners: list[int] = []
        self.entities: list[Entity] = []
        self.inserts: list[tuple[int, Insert]] = []
        self.open_ends: list[tuple[int, Point, Point]] = []
        self.asides: list[Aside] = []


def read_content(space: Iterable[DXFEntity]) -> Content:
    """Read every entity of model space or of a block once."""
    gathered = _Gathered()
    for entity in space:
        try:
            _read_entity(entity, gathered)
        except READER_TROUBLE as trouble:
            about = f"its data is damaged ({type(trouble).__name__})"
            gathered.entities.append(record(entity, "", (), about))
    return Content(
        np.array(gathered.lines, dtype=float).reshape(-1, 2, 3),
        np.array(gathered.owners, dtype=np.intp),
        tuple(gathered.entities),
        tuple(gathered.inserts),
        tuple(gathered.open_ends),
        tuple(gathered.asides),
    )


def _read_entity(entity: DXFEntity, gathered: _Gathered) -> None:
    kind = entity.dxftype()
    if kind in RULE_OF_KIND:
        gathered.entities.append(record(entity, RULE_OF_KIND[kind]))
    elif _value(entity, "invisible", 0):
        gathered.entities.append(record(entity, "invisible"))
    elif kind == "LINE":
        start, end = entity.dxf.start, entity.dxf.end
        gathered.lines.append((start.x, start.y, start.z, end.x, end.y, end.z))
        gathered.owners.append(len(gathered.entities))
        gathered.entities.append(record(entity, "bars"))
    elif isinstance(entity, LWPolyline | Polyline):
        _read_polyline(entity, gathered)
    elif isinstance(entity, Insert):
        gathered.inserts.append((len(gathered.entities), entity))
        gathered.entities.append(record(entity, "block", entity.ocs().to_wcs(entity.dxf.insert).xyz))
        for attribute in entity.attribs:
            gathered.entities.append(record(attribute, "text"))
    elif kind in ("POINT", "CIRCLE"):
        gathered.entities.append(record(entity, "mark", _place(entity)))
    else:
        gathered.entities.append(record(entity, "", _place(entity)))


def _read_polyline(entity: LWPolyline | Polyline, gathered: _Gathered) -> None:
    if isinstance(entity, Polyline):
        if not (entity.is_2d_polyline or entity.is_3d_polyline):
            gathered.entities.append(record(entity, "", (), "it is a mesh"))
            return
        if entity.dxf.flags & _CURVE_FLAGS:
            gathered.entities.append(record(entity, "", _place(entity), "it is a fitted curve"))
            return
        points = [point.xyz for point in entity.points_in_wcs()]
        bulges = [float(vertex.dxf.get("bulge", 0.0)) for vertex in entity.vertices]
    else:
        points = [point.xyz for point in entity.vertices_in_wcs()]
        bulges = [float(bulge) for (bulge,) in entity.get_points("b")]
    index = len(gathered.entities)
    gathered.entities.append(record(entity, "bars", points[0] if points else ()))
    _add_sides(points, bulges, bool(entity.is_closed), index, gathered)


def _add_sides(points: list[Point], bulges: list[float], closed: bool, index: int, gathered: _Gathered) -> None:
    if closed and len(points) > 2 and points[0] == points[-1]:
        text = "the polyline is closed and its last point repeats the first"
        gathered.asides.append(Aside(index, "W-105", text, "the side of no length was dropped", points[0]))
        points, bulges = points[:-1], bulges[:-1]
    sides = list(zip(points[:-1], points[1:], bulges, strict=False))
    if closed and len(points) > 1:
        sides.append((points[-1], points[0], bulges[len(points) - 1]))
    elif len(points) > 2:
        gathered.open_ends.append((index, points[0], points[-1]))
    for start, end, bulge in sides:
        if bulge:
            middle = tuple((a + b) / 2 for a, b in zip(start, end, strict=True))
            text = f"a side of the polyline is an arc (bulge {decimal(bulge)})"
            gathered.asides.append(Aside(index, "W-104", text, "not read; draw a straight bar", cast(Point, middle)))
        else:
            gathered.lines.append((*start, *end))
            gathered.owners.append(index)


def record(entity: DXFEntity, use: str, at: tuple[float, ...] = (), about: str = "") -> Entity:
    """Return the record of an entity; the arguments are fields of `Entity`."""
    handle, layer = (str(_value(entity, name, default)) for name, default in (("handle", ""), ("layer", "0")))
    return Entity(handle, entity.dxftype(), layer, use, at, about)


def _value(entity: DXFEntity, name: str, default: object) -> object:
    """Return an attribute; entities of kinds that the library only stores have none."""
    return entity.dxf.get(name, default) if entity.dxf.is_supported(name) else default


def _place(entity: DXFEntity) -> tuple[float, ...]:
    """Return a place to point at in the axes of the block, or () where the entity has none."""
    if isinstance(entity, Arc | Ellipse):
        return _xyz(entity.start_point)
    if isinstance(entity, Circle):
        return _xyz(entity.ocs().to_wcs(entity.dxf.center))
    if isinstance(entity, Polyline):
        return next(map(_xyz, entity.points_in_wcs()), ())
    if isinstance(entity, Spline):
        return next(map(_xyz, (*entity.control_points, *entity.fit_points)), ())
    named = (name for name in _PLACES if entity.dxf.is_supported(name) and entity.dxf.hasattr(name))
    return next((_xyz(entity.dxf.get(name)) for name in named), ())


def _xyz(point: UVec) -> Point:
    x, y, z = Vec3(point).xyz
    return float(x), float(y), float(z)
