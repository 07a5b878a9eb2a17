"""Pressure coefficients of roofs, walls and inside a building: tables of EN 1991-1-4, which SANS 10160-3 follows.

Every cell lies in loads/data with its source and mark (from memory). Pitches in degrees here, as the tables print them;
- sucks away from the surface, + presses on it.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cache
from typing import Literal, get_args

import numpy as np

from spanwright.loads.tables import read_table
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError
from spanwright.truss.tolerances import TOLERANCES

Sign = Literal["suction", "pressure"]
Area = Literal["cpe10", "cpe1"]
SIGNS: tuple[Sign, ...] = ("suction", "pressure")
RoofTable = Literal["duopitch 0", "duopitch 90", "monopitch 0", "monopitch 180", "monopitch 90", "flat"]
FLAT_BELOW = 5.0
"""Degrees: a flatter roof takes the table of flat roofs (EN 1991-1-4 cl. 7.2.3; from memory)."""
SMALL_AREA, LARGE_AREA = 1e6, 10e6
"""mm2: at and below the first the local coefficient cpe,1 holds, from the second on the overall cpe,10."""

_FILES: dict[RoofTable, str] = {
    "duopitch 0": "cpe_duopitch_0deg.csv",
    "duopitch 90": "cpe_duopitch_90deg.csv",
    "monopitch 0": "cpe_monopitch_0deg.csv",
    "monopitch 180": "cpe_monopitch_180deg.csv",
    "monopitch 90": "cpe_monopitch_90deg.csv",
    "flat": "cpe_flat_roof.csv",
}
CLAUSES: dict[RoofTable, str] = {
    "duopitch 0": "cpe table of duopitch roofs, wind across the ridge",
    "duopitch 90": "cpe table of duopitch roofs, wind along the ridge",
    "monopitch 0": "cpe table of monopitch roofs, wind on the low eaves",
    "monopitch 180": "cpe table of monopitch roofs, wind on the high eaves",
    "monopitch 90": "cpe table of monopitch roofs, wind along the eaves",
    "flat": "cpe table of flat roofs with sharp eaves",
}


@dataclass(frozen=True, eq=False)
class _Table:
    """pitches : (p,) degrees, ascending. zones : (n,). values : for each sign and area class (p, n), NaN = no value."""

    pitches: FloatArray
    zones: tuple[str, ...]
    values: dict[tuple[Sign, Area], FloatArray]


def roof_coefficients(table: RoofTable, zones: tuple[str, ...], pitch: float, area: float) -> dict[Sign, FloatArray]:
    """Return for each signed line of a table that holds at this pitch the coefficients (n,) of the zones asked for.

    zones : those of one slope, whose signs are never mixed. pitch : degrees; the flat table takes no notice of it.
    area : mm2 loaded; below 10 m2 the coefficient grows with the logarithm of the area towards cpe,1.

    Between two rows of a table a line runs straight between values of the same sign. Where a line holds at one row
    only, or in some zones of a row only, the others take 0.0 (project rule: no suction on a line meant for pressure).

    Raises InputError (key "truss.pitch") for a pitch outside the table.
    """
    rows = _read(table)
    columns = [rows.zones.index(zone) for zone in zones]
    below, share = _between(table, rows.pitches, pitch)
    lines: dict[Sign, FloatArray] = {}
    for sign in SIGNS:
        large = rows.values[sign, "cpe10"][:, columns]
        beside = [below, below + 1] if share else [below]
        if np.isnan(large[beside]).all():
            continue
        overall = _straight(large, below, share)
        local = _straight(rows.values[sign, "cpe1"][:, columns], below, share)
        lines[sign] = local - (local - overall) * _area_share(area)
    return lines


def is_flat(pitch: float) -> bool:
    """Return whether a pitch, degrees, takes the table of flat roofs."""
    return abs(pitch) < FLAT_BELOW - math.degrees(TOLERANCES.straight)


def wall_coefficients(height_over_depth: float) -> dict[str, float]:
    """Return cpe,10 of the wall zones A to E for the building's height over its depth along the wind."""
    rows = sorted(read_table("cpe_walls.csv"), key=lambda row: float(row["h_over_d"]))
    ratios = [float(row["h_over_d"]) for row in rows]
    return {zone: float(np.interp(height_over_depth, ratios, [float(row[zone]) for row in rows])) for zone in "ABCDE"}


def internal_without_dominant_face(mu: float, height_over_depth: float) -> float:
    """Return cpi by the share `mu` of the openings, by area, that lies where cpe is not positive."""
    curves: dict[float, list[tuple[float, float]]] = {}
    for row in read_table("cpi_no_dominant_face.csv"):
        curves.setdefault(float(row["h_over_d"]), []).append((float(row["mu"]), float(row["cpi"])))
    ratios = sorted(curves)
    on_curves = [float(np.interp(mu, *np.array(curves[ratio]).T)) for ratio in ratios]
    return float(np.interp(height_over_depth, ratios, on_curves))


def dominance(area: float, others: float) -> float:
    """Return the share of its cpe that a face with openings of `area` passes inside: 0.75 where all others together
    have half of it, 0.90 where a third or less, between by the ratio, 0 where it does not dominate (both mm2).
    """
    ratio = area / others if others else math.inf
    return float(np.interp(min(ratio, 3.0), [2.0, 3.0], [0.75, 0.90])) if area and ratio >= 2.0 else 0.0


def _straight(values: FloatArray, below: int, share: float) -> FloatArray:
    known = np.nan_to_num(values)
    line: FloatArray = known[below] if share == 0.0 else known[below] + share * (known[below + 1] - known[below])
    return line


def _area_share(area: float) -> float:
    """Return how far an area is from 1 m2 to 10 m2, by its logarithm."""
    return float(np.interp(math.log10(area), [math.log10(SMALL_AREA), math.log10(LARGE_AREA)], [0.0, 1.0]))


def _between(table: RoofTable, pitches: FloatArray, pitch: float) -> tuple[int, float]:
    """Return the row below a pitch and the share of the way to the next row."""
    if table == "flat":
        return 0, 0.0
    slack = math.degrees(TOLERANCES.straight)
    least, most = float(pitches[0]), float(pitches[-1])
    if is_flat(pitch) or not least - slack <= pitch <= most + slack:
        raise InputError(
            f"a pitch of {pitch:.4g} deg lies outside the {CLAUSES[table]}, {least:g} to {most:g} deg",
            "state wind pressures in [loads]",
            "truss.pitch",
        )
    nearest = int(np.argmin(np.abs(pitches - pitch)))
    if abs(float(pitches[nearest]) - pitch) <= slack:
        return nearest, 0.0
    below = int(np.searchsorted(pitches, pitch)) - 1
    return below, float((pitch - pitches[below]) / (pitches[below + 1] - pitches[below]))


@cache
def _read(table: RoofTable) -> _Table:
    rows = [row for row in read_table(_FILES[table]) if row.get("eaves_type", "sharp") == "sharp"]
    pitches = sorted({_pitch(row) for row in rows})
    zones = tuple(dict.fromkeys(row["zone"] for row in rows))

    def grid(column: str) -> FloatArray:
        values = np.full((len(pitches), len(zones)), np.nan)
        for row in rows:
            if row.get(column):
                values[pitches.index(_pitch(row)), zones.index(row["zone"])] = float(row[column])
        return values

    def line(sign: Sign, kind: Area) -> FloatArray:
        ending = "_neg" if sign == "suction" else "_pos"
        if kind in rows[0]:  # a table of one line holds suction only
            return grid(kind) if sign == "suction" else grid("")
        values = grid(kind + ending)
        if table == "flat":  # zones of one value, F to H, keep it beside either value of I
            other = grid(kind + ("_pos" if sign == "suction" else "_neg"))
            values = np.where(np.isnan(values), other, values)
        return values

    values = {(sign, kind): line(sign, kind) for sign in SIGNS for kind in get_args(Area)}
    return _Table(np.array(pitches), zones, values)


def _pitch(row: dict[str, str]) -> float:
    return float(row.get("pitch_deg", 0.0))
