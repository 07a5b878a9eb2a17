"""How long a design takes, as ratios: `python tests/benchmarks/design.py` prints them and asserts nothing.

- the whole design of the second demo in memory, all candidates, over its compression rule alone (aim: at most 15);
- the command, cold: `--help`, and `design` with every output over the bare import of what it uses.
"""

from __future__ import annotations

import subprocess
import sys
import tempfile
import time
from collections.abc import Callable
from pathlib import Path

import numpy as np

from spanwright.design.demand import of_bars
from spanwright.design.run import design
from spanwright.design.sans.case import case_of
from spanwright.design.sans.struts import compression_checks
from spanwright.design.setting import demand_of
from spanwright.io.project_file import read_project

DEMO = Path(__file__).parents[2] / "demo_projects" / "pratt_store" / "roof.toml"
EDGES = "import numpy, scipy.interpolate, scipy.linalg, networkx, pydantic, rich.console, xlsxwriter"


def best(run: Callable[[], object], rounds: int = 10) -> float:
    """Return the shortest of several runs, s."""
    times = []
    for _ in range(rounds):
        start = time.perf_counter()
        run()
        times.append(time.perf_counter() - start)
    return min(times)


def cold(*arguments: str) -> float:
    """Return the shortest of three runs of a fresh interpreter, s."""
    return best(lambda: subprocess.run([sys.executable, "-P", *arguments], capture_output=True, check=False), 3)


def show(line: str) -> None:
    """Print one line."""
    sys.stdout.write(line + "\n")


def in_memory() -> None:
    """Print the whole design over its compression rule."""
    project = read_project(DEMO)
    setting = design(project).setting
    _, wanted = demand_of(setting, [0] * len(setting.groups))
    parts = [
        (options, of_bars(wanted, group.bars)) for group, options in zip(setting.groups, setting.options, strict=True)
    ]

    def rule() -> None:
        for options, demand in parts:
            compression_checks(case_of(options, demand, hot_formed_tubes=False))

    whole, alone = best(lambda: design(project)), best(rule)
    candidates = int(np.sum([len(options) for options in setting.options]))
    show(f"whole design, {candidates} candidates: {whole * 1e3:.1f} ms; compression rule alone: {alone * 1e3:.1f} ms")
    show(f"  ratio {whole / alone:.1f}")


def commands() -> None:
    """Print cold runs of the command over bare imports."""
    bare, drawn = cold("-c", EDGES), cold("-c", EDGES + ", matplotlib.figure, matplotlib.backends.backend_agg")
    show(f"--help: {cold('-m', 'spanwright', '--help'):.3f} s")
    with tempfile.TemporaryDirectory() as folder:
        run = ("-m", "spanwright", "design", str(DEMO), "--out", folder)
        everything = cold(*run)
        show(f"bare import {bare:.2f} s, with matplotlib {drawn:.2f} s; design with every output {everything:.2f} s")
        show(f"  ratio to the import with matplotlib {everything / drawn:.1f}")


if __name__ == "__main__":
    in_memory()
    commands()
