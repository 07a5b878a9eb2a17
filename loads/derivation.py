"""How loads came about, in lines a checking engineer can follow: kN, m and kPa."""

from __future__ import annotations

import numpy as np

from spanwright.loads.bending import ChordBeams, Stations
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss


def metres(length: float) -> str:
    """Return a length in mm as text in m."""
    return f"{length / 1e3:.3f} m"


def kilopascals(pressure: float) -> str:
    """Return a pressure in MPa as text in kPa."""
    return f"{pressure * 1e3:.3f} kPa"


def force(x: float, y: float) -> str:
    """Return a force in N (x to the right, y up) as text in kN with its direction in words."""
    parts = []
    if x == 0.0 or y != 0.0:
        parts.append(f"{abs(y) / 1e3:.3f} kN {'up' if y > 0 else 'down'}")
    if x != 0.0:
        parts.append(f"{abs(x) / 1e3:.3f} kN to the {'right' if x > 0 else 'left'}")
    return " and ".join(parts)


def shares(truss: Truss, column: FloatArray, along_to: int, along: float) -> str:
    """Return as text where one force goes: its part across the chord by shares (j,), that along it, N, to one joint."""
    listed = [(f"{share:.3f}", truss.joint_names[joint]) for joint, share in enumerate(column)]
    listed = [(share, name) for share, name in listed if float(share) != 0.0]
    if len(listed) == 1:
        return f"to {listed[0][1]}"
    across = ", ".join(f"{share} to {name}" for share, name in listed)
    return (
        "shared by the joints as supports of a continuous beam: of its part across the chord the shares "
        f"{across}; its part along the slope, {along / 1e3:.3f} kN, to {truss.joint_names[along_to]}"
    )


def total(forces: FloatArray) -> str:
    """Return the sum of forces (p, 2) N as text."""
    x, y = forces.sum(axis=0)
    return f"in all {force(round(float(x), 6), round(float(y), 6))}"


def bending(beams: ChordBeams, moments: FloatArray) -> tuple[str, ...]:
    """Return a line on the greatest moments (m,) in the top chord, none where nothing bends it."""
    lines = []
    for word, values in (("sagging", moments), ("hogging", -moments)):
        at = int(np.argmax(values))
        if round(float(values[at]) / 1e6, 3) > 0.0:
            lines.append(f"{values[at] / 1e6:.3f} kN m {word} {_section(beams.truss, beams.stations, at)}")
    return (f"top chord between its joints: at most {', '.join(lines)}",) if lines else ()


def _section(truss: Truss, stations: Stations, at: int) -> str:
    bar = stations.bar[at]
    left = truss.joint_names[truss.top.joints[truss.top.bars.index(bar)]]
    return f"in {truss.bar_names[bar]} {metres(float(stations.at[at]))} from {left}"
