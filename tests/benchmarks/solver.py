"""Speed of the stiffness solution beside SciPy's sparse one, in the same run: `python tests/benchmarks/solver.py`.

Truss: parallel chords with a support every 20 panels, 20 load cases. Ours is `solve` as users call it: ordering,
assembly, factor, judgement of mechanisms, cases and bar forces, and also checks of input, reactions and residuals.
Reference: the bars' matrices by broadcasting, `coo_array` to `csc_array`, SuperLU factor and solve of the same matrix,
without bar forces; "from triplets" leaves the bars' matrices out too. Ratio: median of rounds; the aim is at most 1.
"""

from __future__ import annotations

import timeit
from collections.abc import Callable

import numpy as np
from scipy.sparse import coo_array
from scipy.sparse.linalg import splu

from spanwright.truss.arrays import FloatArray, IntArray
from spanwright.truss.elongation import held_directions
from spanwright.truss.model import Chord, Role, Support, Truss
from spanwright.truss.stiffness import solve

CASES = 20
ROUNDS = 9
PANELS_AND_RUNS = ((12, 200), (250, 40), (5000, 4))  # about 50, 1 000 and 20 000 bars; runs in a round


def parallel_chords(panels: int) -> Truss:
    """Make the truss: panels of 3 m, 2 m deep, bottom joints first."""
    x = np.arange(panels + 1) * 3000.0
    xy = np.vstack([np.column_stack([x, 0 * x]), np.column_stack([x, 0 * x + 2000.0])])
    bottom = np.arange(panels + 1)
    top = bottom + panels + 1
    ends = np.vstack(
        [
            np.column_stack([bottom[:-1], bottom[1:]]),
            np.column_stack([top[:-1], top[1:]]),
            np.column_stack([bottom, top]),
            np.column_stack([top[:-1], bottom[1:]]),
        ]
    )
    bearings = sorted({*range(0, panels + 1, 20), panels})
    chord = Chord("top", (0,), (), np.zeros(1))
    role: Role = "diagonal"
    return Truss(
        tuple(f"J{joint}" for joint in range(len(xy))),
        xy,
        tuple(f"D{bar}" for bar in range(len(ends))),
        ends,
        (role,) * len(ends),
        tuple(Support(joint, joint == 0, True) for joint in bearings),
        chord,
        chord,
    )


class Reference:
    """SciPy's way to the displacements of the free directions."""

    def __init__(self, truss: Truss, axial_stiffness: FloatArray, loads: FloatArray) -> None:
        held = held_directions(truss).ravel()
        self.truss, self.axial_stiffness = truss, axial_stiffness
        self.size = int(np.sum(~held))
        self.number = np.full(held.size, -1)
        self.number[~held] = np.arange(self.size)
        self.loads = loads.reshape(held.size, -1)[~held]
        self.prepared = self.triplets()

    def triplets(self) -> tuple[IntArray, IntArray, FloatArray]:
        directions = np.hstack([-self.truss.directions, self.truss.directions])
        stiffness = self.axial_stiffness / self.truss.lengths
        values = stiffness[:, None, None] * directions[:, :, None] * directions[:, None, :]
        freedoms = self.number[2 * self.truss.ends[:, [0, 0, 1, 1]] + np.array([0, 1, 0, 1])]
        rows = np.broadcast_to(freedoms[:, :, None], values.shape).ravel()
        columns = np.broadcast_to(freedoms[:, None, :], values.shape).ravel()
        free = (rows >= 0) & (columns >= 0)
        return rows[free], columns[free], values.ravel()[free]

    def solve(self, triplets: tuple[IntArray, IntArray, FloatArray]) -> FloatArray:
        rows, columns, values = triplets
        matrix = coo_array((values, (rows, columns)), shape=(self.size, self.size)).tocsc()
        return splu(matrix).solve(self.loads)


def rounds(runs: int, *ways: Callable[[], object]) -> FloatArray:
    """Return (rounds, ways) times of one run in ms; in a round each way runs so many times, one way after the other."""
    times = [[timeit.timeit(way, number=runs) for way in ways] for _ in range(ROUNDS)]
    return 1000.0 * np.array(times) / runs


def compare(panels: int, runs: int) -> str:
    """Return one line of the table."""
    truss = parallel_chords(panels)
    axial_stiffness = np.full(len(truss.ends), 4e8)
    loads = np.random.default_rng(0).normal(size=(len(truss.xy), 2, CASES)) * 1e4
    reference = Reference(truss, axial_stiffness, loads)
    times = rounds(
        runs,
        lambda: reference.solve(reference.triplets()),
        lambda: reference.solve(reference.prepared),
        lambda: solve(truss, axial_stiffness, loads),
    )
    scipy, from_triplets, ours = np.median(times, axis=0)
    ratio, ratio_from_triplets = np.median(times[:, 2:] / times[:, :2], axis=0)
    return f"{len(truss.ends):6d}{scipy:12.2f}{from_triplets:16.2f}{ours:12.2f}{ratio:12.2f}{ratio_from_triplets:16.2f}"


def main() -> None:
    """Print the table."""
    lines = ["  bars   SciPy, ms   from triplets    ours, ms       ratio   from triplets"]
    lines += [compare(panels, runs) for panels, runs in PANELS_AND_RUNS]
    print("\n".join(lines))  # noqa: T201  # the table is what this is for


if __name__ == "__main__":
    main()
