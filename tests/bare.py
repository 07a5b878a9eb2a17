"""Bare trusses for tests: joints, bars and supports, without roles or chords that mean anything."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

import numpy as np

from spanwright.truss.model import Chord, Role, Support, Truss


def bare_truss(
    joints: Mapping[str, Sequence[float]], bars: Mapping[str, tuple[str, str]], supports: Mapping[str, str]
) -> Truss:
    """Make a truss; a support holds "x", "y" or "xy"."""
    number = {name: joint for joint, name in enumerate(joints)}
    chord = Chord("top", (0,), (), np.zeros(1))
    role: Role = "diagonal"
    return Truss(
        tuple(joints),
        np.array(list(joints.values()), dtype=float),
        tuple(bars),
        np.array([[number[a], number[b]] for a, b in bars.values()], dtype=np.intp).reshape(-1, 2),
        (role,) * len(bars),
        tuple(Support(number[name], "x" in held, "y" in held) for name, held in supports.items()),
        chord,
        chord,
    )


def by_pairs(pairs: str) -> dict[str, tuple[str, str]]:
    """Make bars from pairs of joints: "A-B B-C" makes the bars A-B and B-C."""
    bars = {}
    for pair in pairs.split():
        first, second = pair.split("-")
        bars[pair] = (first, second)
    return bars


def parallel_chords(
    panels: int,
    *,
    a: float = 3000.0,
    h: float = 2000.0,
    without: Sequence[str] = (),
    supports: Mapping[str, str] | None = None,
) -> Truss:
    """Make a parallel-chord truss: joints B0.., T0.., bars BC, TC, P and D with the panel's or joint's number.

    Diagonals fall towards mid-span. a, h : mm, panel length and depth. without : bars left out. supports : by default
    pinned at B0 and sliding at the other end.
    """
    joints: dict[str, tuple[float, float]] = {}
    for i in range(panels + 1):
        joints[f"B{i}"] = (i * a, 0.0)
        joints[f"T{i}"] = (i * a, h)
    bars = {f"P{i}": (f"B{i}", f"T{i}") for i in range(panels + 1)}
    for i in range(1, panels + 1):
        bars[f"BC{i}"] = (f"B{i - 1}", f"B{i}")
        bars[f"TC{i}"] = (f"T{i - 1}", f"T{i}")
        bars[f"D{i}"] = (f"T{i - 1}", f"B{i}") if i <= panels // 2 else (f"B{i - 1}", f"T{i}")
    kept = {name: ends for name, ends in bars.items() if name not in without}
    return bare_truss(joints, kept, supports if supports is not None else {"B0": "xy", f"B{panels}": "y"})
