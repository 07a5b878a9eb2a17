"""Families of sections to choose from, and single sections by name, as candidates in the truss's axes."""

from __future__ import annotations

from typing import Any

import numpy as np

from spanwright.design.candidates import FAMILIES, Candidates, Family
from spanwright.design.catalogue import COMMERCIAL, DENSITY, STOCKS, Catalogue, Process, shipped
from spanwright.design.section_names import SectionName, angle_name, parse, tube_name
from spanwright.design.section_rows import AngleRows, TubeRows, angle_rows, tube_rows
from spanwright.design.steels import steel as grade_of
from spanwright.design.steels import strength
from spanwright.design.turning import Turned, back_to_back, single_angle, starred, tube
from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.errors import InputError, UnknownNameError

TUBES: tuple[Family, ...] = ("CHS", "SHS", "RHS")
PROCESS_WORDS = {"hot": ", hot finished", "cold": ", cold formed"}
M2_PER_MM2 = 1e-6
M_PER_MM = 1e-3


def candidates(
    family: Family,
    *,
    steel: str,
    gap: float,
    min_leg: float,
    min_thickness: float,
    min_wall: float,
    stocked: str,
    equal_legs: bool = False,
    process: Process = "cold",
    catalogue: Catalogue | None = None,
) -> Candidates:
    """Return every section of a family that the limits let through, in the order of the catalogue.

    steel : grade of the angles; tubes take its hollow-section twin.
    gap : mm between the angles of a pair. min_leg, min_thickness : mm, of angles. min_wall : mm, of tubes.
    stocked : a market whose stock marks filter the angles that have them, or "any". A size stocked in commercial
        quality only is kept for steels without a certificate alone. Tables without marks pass;
        see `spanwright.design.section_warnings`.
    equal_legs : of angles, only those with equal legs.
    process : "cold" formed or "hot" finished tubes. catalogue : the shipped one unless given.
    Sections thicker than the grade's values reach are left out. Unequal legs come both ways round, and so do
    rectangular tubes.
    Raises `UnknownNameError` for an unknown family, steel or market.
    """
    if family not in FAMILIES:
        raise UnknownNameError.among(family, list(FAMILIES), what="section family", key="members")
    if stocked not in STOCKS:
        raise UnknownNameError.among(stocked, list(STOCKS), what="stock list", key="members.stocked")
    rows = family_rows(catalogue or shipped(), family)
    shape = rows.shape
    grade = grade_of(steel, hollow=isinstance(rows, TubeRows))
    keep = shape.thickness <= grade.greatest_thickness
    if isinstance(rows, AngleRows):
        keep &= (np.minimum(rows.shape.upright, rows.shape.level) >= min_leg) & (shape.thickness >= min_thickness)
        keep &= _in_stock(rows, stocked, certified=grade.certified)
        keep &= (rows.shape.upright == rows.shape.level) | (not equal_legs)
        return _angles(family, rows.take(keep), steel, gap)
    return _tubes(family, rows.take(keep & (shape.thickness >= min_wall) & (rows.hot == (process == "hot"))), steel)


def family_rows(catalogue: Catalogue, family: Family) -> AngleRows | TubeRows:
    """Return all sections of a family, each way round."""
    if family in TUBES:
        return tube_rows(catalogue, family)
    return angle_rows(catalogue, equal_only=family == "2L star")


def find(
    name: str,
    *,
    steel: str,
    gap: float = 0.0,
    process: Process = "cold",
    key: str = "members",
    catalogue: Catalogue | None = None,
) -> Candidates:
    """Return one section by the name a user writes, as candidates of length 1; no limit or stock mark is applied.

    steel : grade of angles; a tube takes its hollow-section twin. gap : mm, of a pair whose name states none.
    process : of a tube whose name states none, where the catalogue has the size so; else as it has it.
    key : project-file key for messages.
    Raises `InputError` for a text that is no section name or leaves open which way round, `UnknownNameError` for a
    size that is not in the catalogue.
    """
    said = parse(name, key=key)
    rows = family_rows(catalogue or shipped(), said.family)
    here = np.array([size == said.size for size in rows.sizes])
    if isinstance(rows, TubeRows):
        here = _of_process(here, rows.hot, said.process, process)
    if not here.any():
        raise _unknown(said, rows, key)
    picked = rows.take(here)
    readings = _turned(said.family, picked, steel, gap if said.gap is None else said.gap)
    if said.way:
        readings = readings.take(np.array([way == said.way for way in picked.ways]))
    if len(readings) != 1:
        names = _turned(said.family, picked, steel, gap).names
        raise InputError(
            f'"{name}" does not say which way round' if len(readings) else f'"{name}" cannot stand that way round',
            "write " + " or ".join(f'"{full}"' for full in names),
            key,
        )
    return readings


def _in_stock(rows: AngleRows, stocked: str, *, certified: bool) -> BoolArray:
    """True where a row's table has no marks for the market, or its mark offers the quality asked for."""
    if stocked == "any":
        return np.ones(len(rows.sizes), dtype=np.bool_)
    unlisted: BoolArray = np.array([market != stocked for market in rows.market])
    offered: BoolArray = np.array([mark != "" and not (certified and mark == COMMERCIAL) for mark in rows.stock])
    return unlisted | offered


def _unknown(said: SectionName, rows: AngleRows | TubeRows, key: str) -> UnknownNameError:
    """The error for a size that is not in the catalogue, with the size that is nearest in its lengths."""
    made = ""
    if isinstance(rows, TubeRows) and said.process:
        made = PROCESS_WORDS[said.process]
        rows = rows.take(_of_process(np.ones(len(rows.sizes), dtype=np.bool_), rows.hot, said.process, ""))
    prefix = said.family.removesuffix(" star")
    known = np.array([_lengths(size) for size in rows.sizes])
    nearest = f"{prefix} {rows.sizes[np.argmin(np.sum(np.abs(known - _lengths(said.size)) / known, axis=1))]}{made}"
    found = f'no section in the catalogue is called "{prefix} {said.size}{made}"'
    return UnknownNameError(found, f'the nearest is "{nearest}"', key, "", nearest)


def _lengths(size: str) -> list[float]:
    return [float(length) for length in size.split("x")]


def _of_process(here: BoolArray, hot: BoolArray, stated: str, usual: str) -> BoolArray:
    """Keep the process stated; where none is, the usual one if the size is made so."""
    kept: BoolArray = here & (hot == ((stated or usual) == "hot"))
    return kept if stated or kept.any() else here


def _turned(family: Family, rows: AngleRows | TubeRows, steel: str, gap: float) -> Candidates:
    return _tubes(family, rows, steel) if isinstance(rows, TubeRows) else _angles(family, rows, steel, gap)


def _angles(family: Family, rows: AngleRows, steel: str, gap: float) -> Candidates:
    shape = rows.shape
    if family == "L":
        gap, turned = 0.0, single_angle(shape)
    else:
        turned = back_to_back(shape, gap) if family == "2L" else starred(shape, gap)
    return Candidates(
        **_whole(turned, shape.thickness, steel, hollow=False),
        names=tuple(angle_name(family, size, way, gap) for size, way in zip(rows.sizes, rows.ways, strict=True)),
        family=family,
        piece_names=tuple(f"L {size}" for size in rows.sizes),
        pieces=1 if family == "L" else 2,
        leg_connected=shape.upright,
        leg_outstanding=shape.level,
        root_radius=shape.root,
        piece_radius_minor=np.sqrt(shape.inertia_v / shape.area),
        piece_radius_parallel=np.sqrt(shape.inertia_y / shape.area),
        piece_centroid_connected=shape.centroid_x,
        piece_centroid_outstanding=shape.centroid_y,
        gap=gap,
        stock=rows.stock,
        hot=np.zeros(len(rows.sizes), dtype=np.bool_),
    )


def _tubes(family: Family, rows: TubeRows, steel: str) -> Candidates:
    shape = rows.shape
    turned = tube(shape)
    return Candidates(
        **_whole(turned, shape.thickness, steel, hollow=True),
        names=tuple(
            tube_name(family, size, way, hot=bool(hot))
            for size, way, hot in zip(rows.sizes, rows.ways, rows.hot, strict=True)
        ),
        family=family,
        piece_names=tuple(
            tube_name(family, size, "", hot=bool(hot)) for size, hot in zip(rows.sizes, rows.hot, strict=True)
        ),
        pieces=1,
        leg_connected=shape.depth,
        leg_outstanding=shape.width,
        root_radius=shape.corner,
        piece_radius_minor=np.sqrt(turned.inertia_minor / turned.area),
        piece_radius_parallel=np.sqrt(turned.inertia_out / turned.area),
        piece_centroid_connected=shape.width / 2,
        piece_centroid_outstanding=shape.depth / 2,
        gap=0.0,
        stock=("",) * len(rows.sizes),
        hot=rows.hot,
    )


def _whole(turned: Turned, thickness: FloatArray, steel: str, *, hollow: bool) -> dict[str, Any]:
    """The fields of the whole section that all families share."""
    fy, fu = strength(steel, thickness, hollow=hollow)
    return {
        **{name: values for name, values in vars(turned).items() if name != "perimeter"},
        "mass": turned.area * M2_PER_MM2 * DENSITY,
        "surface": turned.perimeter * M_PER_MM,
        "radius_in": np.sqrt(turned.inertia_in / turned.area),
        "radius_out": np.sqrt(turned.inertia_out / turned.area),
        "radius_minor": np.sqrt(turned.inertia_minor / turned.area),
        "radius_major": np.sqrt(turned.inertia_major / turned.area),
        "thickness": thickness,
        "steel_fy": fy,
        "steel_fu": fu,
    }
