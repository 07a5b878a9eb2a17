"""Members and sections for tests of member rules."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

import numpy as np

from spanwright.design.candidates import Candidates, Family
from spanwright.design.families import candidates
from spanwright.design.standard import Check, Demand, Ends, Packs
from spanwright.truss.arrays import FloatArray

LENGTHS = ("panel", "in_plane", "out_of_plane", "torsional", "minor")


def member_demand(
    axial: Sequence[Sequence[float]] | FloatArray,
    lengths: Sequence[float] | FloatArray | float = 2000.0,
    **changes: Any,
) -> Demand:
    """Return a demand without moments: axial (b, c) in N, every length (b,) in mm the same unless changed.

    Changes may be arrays, lists that stand for them, or for lengths one number.
    """
    forces = np.array(axial, dtype=float)
    bars, combinations = forces.shape
    values: dict[str, Any] = {
        "bars": tuple(f"M{bar}" for bar in range(bars)),
        "axial": forces,
        "sideways": np.maximum(-forces, 0.0),
        **dict.fromkeys(LENGTHS, lengths),
        "sag": np.zeros((bars, combinations)),
        "hog": np.zeros((bars, combinations)),
        "end_moments": np.zeros((bars, 2, combinations)),
        "point_loads": np.zeros(bars, dtype=np.intp),
        "first_web": np.zeros((bars, combinations), dtype=np.bool_),
        "one_leg": np.ones(bars, dtype=np.bool_),
        "ends": Ends(),
        "packs": Packs(),
    }
    values |= {name: np.array(value) if isinstance(value, list) else value for name, value in changes.items()}
    values |= {name: np.broadcast_to(np.asarray(values[name], dtype=float), (bars,)) for name in LENGTHS}
    return Demand(**values)


def sections(family: Family, steel: str = "S355JR", *, gap: float = 8.0, hot: bool = False) -> Candidates:
    """Return all sections of a family, whatever is stocked."""
    return candidates(
        family,
        steel=steel,
        gap=gap,
        min_leg=20.0,
        min_thickness=3.0,
        min_wall=2.0,
        stocked="any",
        process="hot" if hot else "cold",
    )


def named(family: Family, name: str, **options: Any) -> Candidates:
    """Return the one section of a family whose name is, or begins with, `name`."""
    every = sections(family, **options)
    places = [place for place, full in enumerate(every.names) if full == name or full.startswith(f"{name},")]
    assert places, f"no {family} is called {name}"
    return every.take(places[:1])


def check_named(checks: Sequence[Check], name: str) -> Check:
    """Return the check with this name."""
    return next(check for check in checks if check.name == name)
