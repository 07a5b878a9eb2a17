"""How long the import takes beside the DXF library's own reading of the same file.

    python tests/benchmarks/wireframe.py

The drawing is one lattice of square panels, each with a diagonal, its lines in any order and either direction, a tenth
of them drawn twice and a tenth in two pieces. Goal: under 10 times the reading, and nearly linear.
"""

from __future__ import annotations

import sys
import time
from collections.abc import Callable
from pathlib import Path
from tempfile import TemporaryDirectory

import numpy as np
from ezdxf.filemanagement import new, readfile

from spanwright.io.wireframe import Options, import_wireframe
from spanwright.truss.arrays import FloatArray

WIDTH = 100_000.0  # mm


def lattice(count: int) -> FloatArray:
    """Return about `count` lines (n, 2, 2) of a lattice three times as wide as high."""
    columns = round((count / 1.2) ** 0.5)
    rows, step = columns // 3, WIDTH / columns
    x, y = (step * axis.ravel() for axis in np.meshgrid(np.arange(columns + 1), np.arange(rows + 1)))
    corner = np.column_stack([x, y])
    inside_x, inside_y = x < WIDTH - step / 2, y < rows * step - step / 2
    along = [(corner[inside_x], (step, 0)), (corner[inside_y], (0, step)), (corner[inside_x & inside_y], (step, step))]
    lines = np.concatenate([np.stack([start, start + shift], axis=1) for start, shift in along])
    chance = np.random.default_rng(1)
    middle = lines.mean(axis=1)
    cut = chance.random(len(lines)) < 0.1
    halves = np.stack([lines[cut, 0], middle[cut]], axis=1), np.stack([middle[cut], lines[cut, 1]], axis=1)
    twice = lines[chance.random(len(lines)) < 0.1]
    lines = np.concatenate([lines[~cut], *halves, twice])
    chance.shuffle(lines)
    turned = chance.random(len(lines)) < 0.5
    lines[turned] = lines[turned, ::-1]
    return lines


def timed(action: Callable[[], object]) -> float:
    """Return how long an action takes, s."""
    start = time.perf_counter()
    action()
    return time.perf_counter() - start


def main(counts: tuple[int, ...] = (12_500, 25_000, 50_000, 100_000)) -> None:
    """Print one row for each number of lines."""
    sys.stdout.write("lines      read s   import s   import/read   us a line\n")
    with TemporaryDirectory() as folder:
        path = Path(folder) / "lattice.dxf"
        for count in counts:
            document = new("R2010", units=4)
            for start, end in lattice(count).tolist():
                document.modelspace().add_line(start, end)
            lines = len(document.modelspace())
            document.saveas(path)
            reading = timed(lambda: readfile(path))
            importing = timed(lambda: import_wireframe(path, Options(tolerance=2.0)))
            ratio, each = importing / reading, 1e6 * importing / lines
            sys.stdout.write(f"{lines:6d} {reading:10.2f} {importing:10.2f} {ratio:13.2f} {each:11.0f}\n")


if __name__ == "__main__":
    main()
