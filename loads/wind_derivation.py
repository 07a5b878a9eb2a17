"""How the pressures of one wind case came about, in lines a checking engineer can follow."""

from __future__ import annotations

from itertools import pairwise

import numpy as np

from spanwright.loads import derivation as say
from spanwright.loads.coefficients import CLAUSES, RoofTable
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.zones import WindFrom, Zone, sides, zone_measure
from spanwright.truss.arrays import FloatArray


def zones(shape: RoofShape, wind: WindFrom, table: RoofTable, strip: tuple[float, float]) -> tuple[str, ...]:
    """Return the measures of the zones, the strip of roof that the truss carries, and the table of coefficients."""
    (b, d), e = sides(shape, wind), zone_measure(shape, wind)
    return (
        f"wind from the {wind}: side across it b {say.metres(b)}, along it d {say.metres(d)}, height h "
        f"{say.metres(shape.height)}, e = min(b, 2h) = {say.metres(e)}: zones by e/10 {say.metres(e / 10)}, "
        f"e/4 {say.metres(e / 4)}, e/2 {say.metres(e / 2)}",
        f"strip of roof from {say.metres(strip[0])} to {say.metres(strip[1])} of the near gable; "
        f"{CLAUSES[table]}, from memory",
    )


def stretches(
    zones: tuple[Zone, ...],
    cuts: FloatArray,
    shares: FloatArray,
    external: FloatArray,
    under: FloatArray,
    net: FloatArray,
) -> tuple[str, ...]:
    """Return a line for each stretch of the strip of roof, neighbours alike taken together.

    cuts : (q + 1,) x, mm. shares : (q, n) of the zones by area. external, under : (q,) coefficients. net : (q,) MPa.
    """
    alike = np.isclose(shares[1:], shares[:-1]).all(axis=1) & np.isclose(net[1:], net[:-1], atol=0.0)
    first = [0, *(np.flatnonzero(~alike) + 1).tolist()]
    return tuple(
        f"x {say.metres(float(cuts[at]))} to {say.metres(float(cuts[after]))}, zone {_named(zones, shares[at])}: cpe "
        f"{external[at]:+.3f}, below {under[at]:+.3f}: w = qp*(cpe - below) = {say.kilopascals(float(net[at]))}"
        for at, after in pairwise([*first, len(net)])
    )


def walls(external: list[float], inside: str, pressures: list[float]) -> tuple[str, ...]:
    """Return a line for each wall: its coefficient, what stands inside, and its net pressure, MPa."""
    return tuple(
        f"{side} wall: cpe {cpe:+.3f}, {inside}: {say.kilopascals(pressure)}, + presses in"
        for side, cpe, pressure in zip(("left", "right"), external, pressures, strict=True)
    )


def _named(zones: tuple[Zone, ...], shares: FloatArray) -> str:
    parts: dict[str, float] = {}
    for zone, share in zip(zones, shares.tolist(), strict=True):
        if share > 0.0:
            parts[zone.name] = parts.get(zone.name, 0.0) + share
    return ", ".join(f"{name} {share:.1%}" if len(parts) > 1 else name for name, share in parts.items())
