"""Everything a run writes, in order; results.json comes last, so that its presence means the folder is whole."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

from spanwright.design.result import Design
from spanwright.io.files import make_folder, remove, write_atomically
from spanwright.io.results.document import write_results
from spanwright.truss.errors import OutputError

RESULTS = "results.json"
_MARKED = "wireframe_marked.dxf"


@dataclass(frozen=True)
class Output:
    """One kind of output: its file names (or patterns), how it is written, and whether it is due now.

    What is not due, or fails, leaves no file of an earlier run behind.
    """

    names: tuple[str, ...]
    write: Callable[[Design, Path], object]
    due: bool


def write_all(
    design: Design, folder: Path | str, *, pictures: bool = True, every_member: bool = False
) -> tuple[OutputError, ...]:
    """Write pictures, schedules, drawing, calculation and results into a folder.

    Schedules and drawing are written only where every member passes. pictures : leave them out with False.
    every_member : work all members in full in the calculation.
    Returns what failed; everything else is written all the same. Raises OutputError where there can be no folder.
    """
    folder = Path(folder)
    make_folder(folder)
    failures: list[OutputError] = []
    _remove(folder, (RESULTS,), failures)  # an interrupted run leaves a folder that does not look whole
    for output in _outputs(design, pictures=pictures, every_member=every_member):
        try:
            if output.due:
                output.write(design, folder)
                continue
        except OutputError as error:
            failures.append(error)
        _remove(folder, output.names, failures)
    return tuple(failures)


def _remove(folder: Path, names: tuple[str, ...], failures: list[OutputError]) -> None:
    for pattern in names:
        for path in folder.glob(pattern):
            try:
                remove(path)
            except OutputError as error:
                failures.append(error)


def _outputs(design: Design, *, pictures: bool, every_member: bool) -> tuple[Output, ...]:
    cut = bool(design.pieces)
    drawing = design.setting.project.drawing
    marked = drawing.marked if drawing else b""
    return (
        Output(("utilisation.*", "restraint.*", "wind_*.*"), _pictures, pictures),
        Output(("schedule.*",), _schedules, cut),
        Output(("drawing.*",), _drawing, cut),
        Output(
            ("calculation.pdf",), lambda design, folder: _calculation(design, folder, every_member=every_member), True
        ),
        Output((_MARKED,), lambda _, folder: write_atomically(folder / _MARKED, marked), bool(marked)),
        Output((RESULTS,), write_results, True),
    )


def _pictures(design: Design, folder: Path) -> None:
    from spanwright.io.pictures import write_pictures

    write_pictures(design, folder)


def _schedules(design: Design, folder: Path) -> None:
    from spanwright.io.schedule import write_schedules

    write_schedules(design, folder)


def _drawing(design: Design, folder: Path) -> None:
    from spanwright.io.drawing.document import write_drawing

    write_drawing(design, folder)


def _calculation(design: Design, folder: Path, *, every_member: bool) -> None:
    from spanwright.io.calculation.document import write_calculation

    write_calculation(design, folder, every_member=every_member)
