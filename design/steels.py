"""Steel grades: yield and tensile strength by thickness, and which grade hollow sections take."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np

from spanwright.design.tables import read_table
from spanwright.truss.arrays import FloatArray
from spanwright.truss.errors import InputError, UnknownNameError

KEY = "members.steel"


@dataclass(frozen=True)
class Steel:
    """One grade.

    steps : (greatest thickness mm, fy MPa, fu MPa), thinnest first.
    certified : sold with guaranteed properties.
    hollow_twin : grade of the hollow sections that go with it.
    confidence : where the values come from, for the record.
    """

    name: str
    steps: tuple[tuple[float, float, float], ...]
    certified: bool
    hollow_twin: str
    confidence: str

    @property
    def greatest_thickness(self) -> float:
        """Greatest thickness, mm, that the grade's values cover."""
        return self.steps[-1][0]


@cache
def steels() -> dict[str, Steel]:
    """Return every grade by name, in the order of the table."""
    steps: dict[str, list[tuple[float, float, float]]] = {}
    rows = read_table("steels.csv")
    for row in rows:
        steps.setdefault(row["grade"], []).append((float(row["up_to_mm"]), float(row["fy_MPa"]), float(row["fu_MPa"])))
    return {
        row["grade"]: Steel(
            row["grade"], tuple(steps[row["grade"]]), row["certified"] == "yes", row["hollow_twin"], row["confidence"]
        )
        for row in rows
    }


def steel(name: str, *, hollow: bool = False) -> Steel:
    """Return a grade by its name, or with `hollow` the grade that hollow sections take in its place.

    Capitals and spaces do not matter. Raises `UnknownNameError` for a name nobody knows.
    """
    by_plain_name = {_plain(known): grade for known, grade in steels().items()}
    found = by_plain_name.get(_plain(name))
    if found is None:
        raise UnknownNameError.among(name, list(steels()), what="steel", key=KEY)
    return steels()[found.hollow_twin] if hollow else found


def strength(name: str, thickness: FloatArray, *, hollow: bool = False) -> tuple[FloatArray, FloatArray]:
    """Return (fy, fu) in MPa of a grade at each thickness (mm), same shape.

    hollow : take the grade's hollow-section twin.
    Raises `UnknownNameError` for an unknown grade, `InputError` for a thickness that its values do not cover.
    """
    grade = steel(name, hollow=hollow)
    limits, fy, fu = np.array(grade.steps).T
    if np.any(thickness > grade.greatest_thickness):
        raise InputError(
            f"{grade.name} has no strength for a thickness of {np.max(thickness):g} mm",
            f"its values reach to {grade.greatest_thickness:g} mm: take a thinner section or another steel",
            KEY,
        )
    step = np.searchsorted(limits, thickness)
    return fy[step], fu[step]


def _plain(name: str) -> str:
    return "".join(name.split()).casefold()
