"""Candidate sections turned into the truss's axes: the one place where "which way round" is decided.

`in_plane` and `out_of_plane` name the direction in which the member bows when it buckles: bending in the plane of
the truss (about the axis perpendicular to it) and sideways. Nothing downstream says x or y.
"""

from __future__ import annotations

from dataclasses import dataclass, fields, replace
from typing import Literal, Self

import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray

Family = Literal["L", "2L", "2L star", "CHS", "SHS", "RHS"]
FAMILIES: tuple[Family, ...] = ("L", "2L", "2L star", "CHS", "SHS", "RHS")


@dataclass(frozen=True, eq=False)
class Candidates:
    """Sections (s) of one family, as arrays, in the truss's axes. mm, mm2, mm3, mm4, mm6, kg/m, MPa.

    Whole section:
    names : ISO 5261 names that say which way round ("2L 90x75x8, long legs together, gap 8").
    family : the family of all of them.
    area, mass : mm2, kg/m of the whole member (both angles of a pair).
    surface : m2 per m, outer perimeter of all pieces (contact faces of a pair included).
    inertia_in, inertia_out : second moments for bending in the plane and sideways, mm4. For `L` and `2L star`
        these are about the axes parallel to and normal to the plane of the truss (for `2L star` at 45 degrees to
        the principal ones).
    radius_in, radius_out : radii of gyration of these, mm.
    inertia_minor, radius_minor, inertia_major, radius_major : principal values; for sections whose principal
        axes lie in the truss's axes the smaller and the greater of the two above.
    modulus_heel, modulus_toe : elastic moduli for bending in the plane, mm3, at the fibre of the outstanding legs
        (the upper one of a top chord, the lower one of a bottom chord) and at the fibre of the toes. Tubes: equal.
    modulus_plastic : plastic modulus for bending in the plane, mm3.
    torsion, warping : St Venant torsion constant mm4, warping constant mm6 (pair: of both angles).
    shear_minor, shear_major : distance of the shear centre from the centroid along the minor and along the
        major principal axis, mm. For a back-to-back pair the one along the axis of symmetry is `shear_sym`.
    shear_sym : distance from centroid to shear centre along the axis of symmetry that lies in the plane (2L), mm.
    depth, width : overall size in the plane and across it, mm; ties in mass are broken by depth.
    steel_fy, steel_fu : yield and tensile strength by thickness and grade, MPa.

    One piece (the single angle of a pair, or the section itself):
    piece_names : section name of one piece ("L 90x75x8", "CHS 76.1x3.6").
    pieces : how many pieces make the member (1 or 2).
    leg_connected, leg_outstanding, thickness : legs in the plane (against the gusset) and across it, wall, mm.
        Tubes: leg_connected = depth in the plane, leg_outstanding = width.
    root_radius : mm (tubes: outer corner radius).
    piece_radius_minor : least radius of gyration of one piece, mm.
    piece_radius_parallel : of one angle about the axis parallel to the connected leg, mm.
    piece_centroid_connected : distance of one angle's centroid from the back of the connected leg, mm.
    piece_centroid_outstanding : distance of its centroid from the back of the outstanding leg, mm.
    gap : mm between the pieces of a pair, 0 otherwise.
    stock : stock mark of the piece ("" = none known), see the catalogue.
    hot : True for hot-finished hollow sections.
    """

    names: tuple[str, ...]
    family: Family
    area: FloatArray
    mass: FloatArray
    surface: FloatArray
    inertia_in: FloatArray
    inertia_out: FloatArray
    radius_in: FloatArray
    radius_out: FloatArray
    inertia_minor: FloatArray
    inertia_major: FloatArray
    radius_minor: FloatArray
    radius_major: FloatArray
    modulus_heel: FloatArray
    modulus_toe: FloatArray
    modulus_plastic: FloatArray
    torsion: FloatArray
    warping: FloatArray
    shear_minor: FloatArray
    shear_major: FloatArray
    shear_sym: FloatArray
    depth: FloatArray
    width: FloatArray
    steel_fy: FloatArray
    steel_fu: FloatArray
    piece_names: tuple[str, ...]
    pieces: int
    leg_connected: FloatArray
    leg_outstanding: FloatArray
    thickness: FloatArray
    root_radius: FloatArray
    piece_radius_minor: FloatArray
    piece_radius_parallel: FloatArray
    piece_centroid_connected: FloatArray
    piece_centroid_outstanding: FloatArray
    gap: float
    stock: tuple[str, ...]
    hot: BoolArray

    def __len__(self) -> int:
        return len(self.names)

    def take(self, keep: BoolArray | FloatArray | list[int] | np.ndarray[tuple[int, ...], np.dtype[np.intp]]) -> Self:
        """Return the candidates picked by a mask or by indices, in that order."""
        picked = np.flatnonzero(keep) if np.asarray(keep).dtype == bool else np.asarray(keep, dtype=np.intp)
        changes: dict[str, object] = {}
        for entry in fields(self):
            value = getattr(self, entry.name)
            if isinstance(value, tuple):
                changes[entry.name] = tuple(value[i] for i in picked)
            elif isinstance(value, np.ndarray):
                changes[entry.name] = value[picked]
        return replace(self, **changes)  # type: ignore[arg-type]  # the values keep their fields' types
