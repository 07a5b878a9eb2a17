"""The house: data flows one way between rooms, and what is heavy is imported only where it is needed."""

from __future__ import annotations

import ast
import subprocess
import sys
from importlib.util import find_spec
from pathlib import Path

import pytest

MAY_IMPORT = {
    "truss": {"truss"},
    "loads": {"truss", "loads"},
    "design": {"truss", "loads", "design"},
    "io": {"truss", "loads", "design", "io"},
}
EDGES_ONLY = {"pydantic", "ezdxf", "matplotlib", "xlsxwriter", "rich", "typst", "tomllib"}


def sources(room: str) -> list[Path]:
    spec = find_spec(f"spanwright.{room}")
    assert spec is not None and spec.submodule_search_locations
    return sorted(Path(next(iter(spec.submodule_search_locations))).rglob("*.py"))


def imported(path: Path) -> set[str]:
    found: set[str] = set()
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.ImportFrom) and node.module:
            found.add(node.module)
        elif isinstance(node, ast.Import):
            found |= {alias.name for alias in node.names}
    return found


@pytest.mark.parametrize("room", MAY_IMPORT)
def test_a_room_imports_only_what_it_may(room: str) -> None:
    for path in sources(room):
        rooms = {name.split(".")[1] for name in imported(path) if name.startswith("spanwright.")}
        assert rooms <= MAY_IMPORT[room], path.name


@pytest.mark.parametrize("room", ["truss", "loads", "design"])
def test_what_reads_and_writes_files_stays_at_the_edge(room: str) -> None:
    for path in sources(room):
        outside = {name.split(".")[0] for name in imported(path)} & EDGES_ONLY
        # standards keep their constants as TOML data beside them
        assert outside <= {"tomllib"}, path.name


def test_a_design_in_memory_imports_no_writer() -> None:
    heavy = {"pydantic", "ezdxf", "matplotlib", "rich"}
    code = f"import sys, spanwright.design.run; print(sorted(set(sys.modules) & {heavy}))"
    found = subprocess.run([sys.executable, "-P", "-c", code], capture_output=True, text=True, check=True)
    assert found.stdout.strip() == "[]"


def test_no_source_file_is_a_catch_all() -> None:
    """The house limit: no file of ours beyond 450 lines, the median below 200."""
    lengths = sorted(
        len(path.read_text(encoding="utf-8").splitlines()) for room in MAY_IMPORT for path in sources(room)
    )
    assert lengths[-1] <= 450
    assert lengths[len(lengths) // 2] < 200
