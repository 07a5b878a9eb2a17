"""The command `wireframe`."""

from __future__ import annotations

import shlex
import sys
from argparse import ArgumentParser, Namespace
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from spanwright.io.wireframe import Options, Report, Wireframe

SUMMARY = "read a truss from a drawing (DXF), say what was found, and write a project file"
TEXT = """\
Read the wireframe of one truss from a drawing: its lines and polylines in model space, also those within blocks, in
whichever plane and however far from the origin. Prints what was understood, every finding with its place and what was
done about it, and what became of every entity. Writes beside the drawing (--out moves them):

  roof.toml         a project file with joints, bars, bearings and the restraint that was marked, for you to complete
  roof_marked.dxf   a copy of the drawing in which every finding is circled, each code on a layer of its own

The unit is the one that the drawing states; give --units where it states none, or a wrong one. LAYERS are patterns
such as "TC*", in any case; several may follow one option. Put them in quotes, or the shell may take them for files.

examples:
  spanwright wireframe roof.dxf
  spanwright wireframe roof.dxf --units cm --layers "STEEL*" "PURLIN*" --purlins "PURLIN*"
  spanwright wireframe roof.dxf --top-chord "TC*" --bottom-chord "BC*" --ties TIE --supports BEARING
  spanwright wireframe roof.dxf --tolerance "2 mm" --split-crossings --up=-z --bearings "top chord" --out import

exit status: 0 a truss was found; 2 none was, or there is a project file of that name already
"""

_READING = {
    "layers": "layers that are read (default: all that are on, thawed and plotted)",
    "ignore": "layers that are not read",
}
_ROLES = {
    "top_chord": "layers of the top chord's bars (default: roles follow from the geometry)",
    "bottom_chord": "layers of the bottom chord's bars",
    "posts": "layers of posts",
    "diagonals": "layers of diagonals",
}
_MARKS = {
    "purlins": "layers of points, circles and blocks that mark purlins",
    "knee_braces": "layers that mark knee braces",
    "ties": "layers that mark ties along the bottom chord",
    "supports": "layers that mark the bearings",
}
_SINGLE = ("units", "tolerance", "up", "bearings")
_TOLERANCE = 'how far apart line ends that meet may be (default: "5 mm", or 0.1 %% of the span if that is less)'


def arguments(parser: ArgumentParser) -> None:
    """Declare the arguments."""
    parser.add_argument("drawing", type=Path, metavar="DRAWING.dxf", help="the drawing")
    parser.add_argument("--out", type=Path, metavar="DIR", help="folder for what is written (default: the drawing's)")
    parser.add_argument("--force", action="store_true", help="replace a project file of that name")
    reading = parser.add_argument_group("how the drawing is read")
    reading.add_argument("--units", metavar="UNIT", help="mm, cm, m, in or ft (default: as the drawing states)")
    _layers(reading, _READING)
    reading.add_argument("--tolerance", metavar="LENGTH", help=_TOLERANCE)
    reading.add_argument("--split-crossings", action="store_true", help="make a joint where two bars cross without one")
    reading.add_argument("--up", metavar="AXIS", help="vertical axis: x, y, z, --up=-y (default: y of a plan, else z)")
    parts = parser.add_argument_group("what is what in it")
    _layers(parts, _ROLES | _MARKS)
    parts.add_argument("--bearings", metavar="CHORD", help='chord whose ends bear: "bottom chord" or "top chord"')
    parts.add_argument("--overhang", metavar="LENGTH", help="of the top chord in plan, each side (default: as drawn)")
    parts.add_argument("--both-pinned", action="store_true", help="both bearings hold sideways (default: the left one)")


def _layers(group: Any, meanings: dict[str, str]) -> None:
    for name, meaning in meanings.items():
        group.add_argument(_option(name), nargs="+", action="extend", metavar="LAYERS", help=meaning)


def _option(key: str) -> str:
    """Return the option that gives a key of [truss.drawing], such as "roles.top_chord"."""
    return f"--{key.partition('[')[0].rpartition('.')[2].replace('_', '-')}"


def run(arguments: Namespace) -> int:
    """Import, print and write; return the exit status."""
    from spanwright.io.schema_drawing import key_of
    from spanwright.io.wireframe import RefusedDrawingError, import_wireframe, report_text

    options = _options(arguments)
    drawing: Path = arguments.drawing
    folder: Path = arguments.out or drawing.parent
    try:
        wireframe = import_wireframe(drawing, options)
    except RefusedDrawingError as error:
        if error.report is not None and error.report.tally:
            sys.stdout.write(report_text(error.report))
            _mark(drawing, error.report, folder)
        raise replace(error, key=_option(key_of(error.key)) if key_of(error.key) else "") from error
    sys.stdout.write(report_text(wireframe.report))
    _mark(drawing, wireframe.report, folder)
    _write(wireframe, drawing, folder, replacing=arguments.force)
    return 0


def _options(arguments: Namespace) -> Options:
    """Read the options as the table [truss.drawing] is read."""
    from pydantic import ValidationError

    from spanwright.io.commands.options import length
    from spanwright.io.schema_drawing import DrawingTable
    from spanwright.io.schema_errors import first_mistake

    given = {name: value for name, value in vars(arguments).items() if value is not None}
    table: dict[str, Any] = {name: given[name] for name in (*_SINGLE, *_READING) if name in given}
    for place, names in (("roles", _ROLES), ("marks", _MARKS)):
        table[place] = {name: given[name] for name in names if name in given}
    overhang = None if arguments.overhang is None else length(arguments, "overhang", "0 m")
    try:
        read = DrawingTable.model_validate(table | {"split_crossings": arguments.split_crossings})
    except ValidationError as error:
        mistake = first_mistake(error)
        raise replace(mistake, key=_option(mistake.key)) from None
    return read.options("both pinned" if arguments.both_pinned else "left pinned, right sliding", overhang)


def _mark(drawing: Path, report: Report, folder: Path) -> None:
    from spanwright.io.files import make_folder
    from spanwright.io.wireframe import write_marked_copy
    from spanwright.truss.errors import OutputError

    make_folder(folder)
    copy = folder / f"{drawing.stem}_marked.dxf"
    try:
        marks = write_marked_copy(drawing, report, copy)
    except OutputError as error:
        sys.stdout.write(f"\nno marked copy of the drawing: {error.found}\n")
    else:
        count = f"{marks} finding{'' if marks == 1 else 's'}"
        sys.stdout.write(f'\n{copy} is written: {count} marked, each code on a layer "SPANWRIGHT W-..."\n')


def _write(wireframe: Wireframe, drawing: Path, folder: Path, *, replacing: bool) -> None:
    from spanwright.io.files import write_atomically
    from spanwright.io.wireframe import project_text
    from spanwright.truss.errors import OutputError

    path = folder / f"{drawing.stem}.toml"
    if path.exists() and not replacing:
        remedy = "leave it as it is, write over it with --force, or give another folder with --out"
        raise OutputError("there is a project file of this name already", remedy, file=str(path))
    write_atomically(path, project_text(wireframe, drawing.name).encode())
    sys.stdout.write(
        f"{path} is written. Complete the lines marked REQUIRED (spacing, loads, what holds the chords), then:\n"
        f"  spanwright design {shlex.quote(str(path))}\n"
        "To read the drawing anew in every run instead, leave out joints and bars and write under [truss]\n"
        f'  wireframe = "{drawing.name}"\n'
        "and what you stated here under [truss.drawing]; `spanwright starter` shows the keys.\n"
    )
