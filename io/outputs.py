"""Everything a run writes, in order; results.json comes last, so that its presence means the folder is whole."""

from __future__ import annotations

from pathlib import Path

from spanwright.design.result import Design
from spanwright.io.files import make_folder, remove
from spanwright.io.results.document import write_results

SCHEDULES = ("schedule.csv", "schedule.xlsx")


def write_all(design: Design, folder: Path | str, *, pictures: bool = True) -> None:
    """Write results, schedules (where every member passes) and pictures into a folder.

    A schedule that an earlier run left is removed where nothing may be cut now. Raises OutputError.
    """
    folder = Path(folder)
    make_folder(folder)
    if pictures:
        from spanwright.io.pictures import write_pictures

        write_pictures(design, folder)
    if design.pieces:
        from spanwright.io.schedule import write_schedules

        write_schedules(design, folder)
    else:
        for name in SCHEDULES:
            remove(folder / name)
    write_results(design, folder)
