"""The top chord as continuous beams: what a load between joints gives to the joints, and how it bends the chord."""

from __future__ import annotations

from dataclasses import dataclass

from spanwright.truss.arrays import FloatArray, IntArray


@dataclass(frozen=True, eq=False)
class Stations:
    """Sections of the top chord at which its moment is known; between them it runs straight.

    Sorted by the chord's bars from left to right, within a bar from its left joint to its right one: the first and
    the last station of a bar are its joints, those between are the places of loads.

    bar : (m,) bar indices. at : (m,) mm from the bar's left joint.
    loads_between : (b,) over all bars of the truss: purlins strictly between the joints of each bar, and the man
        where he may stand there.
    """

    bar: IntArray
    at: FloatArray
    loads_between: IntArray
