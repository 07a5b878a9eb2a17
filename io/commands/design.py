"""The command `design`."""

from __future__ import annotations

from argparse import ArgumentParser, Namespace
from collections.abc import Callable
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from spanwright.design.project import Project
    from spanwright.design.result import Design

SUMMARY = "choose a section for every member of the truss in a project file"
TEXT = """\
Analyse the truss of a project file under every combination of its loads, and choose for each group of
members the lightest section that passes every check. Prints a summary on one screen and writes, to a folder beside the
project file (roof.out/ for roof.toml):

  results.json                  everything, for machines
  calculation.pdf               loads, forces, lengths and members worked line by line, for the checking engineer
  drawing.dxf, drawing.pdf      elevation, sections and lists on a sheet, for the drawing office
  schedule.csv, schedule.xlsx   members and parts, for the workshop
  utilisation.png, .svg         the truss coloured by utilisation
  restraint.png, .svg           both chords with what holds them
  wind_zones, wind_pressures    the roof in plan and the truss under wind, where loads follow from [site]
  wireframe_marked.dxf          the drawing with every finding marked, where the truss is read from one

A group that names one section ("2L 80x80x6") instead of a family ("2L") is checked.

examples:
  spanwright starter roof.toml
  spanwright design roof.toml
  spanwright design roof.toml --out results --no-pictures

exit status: 0 every member passes; 1 something fails or an output cannot be written; 2 the input is wrong
"""


def arguments(parser: ArgumentParser) -> None:
    """Declare the arguments of a command that carries out a project file."""
    parser.add_argument("project", type=Path, metavar="PROJECT.toml", help="the project file")
    parser.add_argument("--out", type=Path, metavar="DIR", help="folder for results (default: PROJECT.out beside it)")
    parser.add_argument(
        "--every-truss",
        action="store_true",
        help="with [site]: the end, the first interior and a typical interior truss, a folder each",
    )
    parser.add_argument("--no-pictures", action="store_true", help="leave out the pictures, which take longest")
    parser.add_argument(
        "--every-member", action="store_true", help="work every member in calculation.pdf, not one of each group"
    )


def run(arguments: Namespace) -> int:
    """Design, print and write; return the exit status."""
    return carry_out(arguments, _design)


def _design(project: Project) -> Design:
    from spanwright.design.run import design

    return design(project)


def carry_out(arguments: Namespace, station: Callable[[Project], Design]) -> int:
    """Read the project, design or check it, write the results and print the summary; return the exit status."""
    from spanwright.io.outputs import write_all
    from spanwright.io.project_file import read_project
    from spanwright.io.screen import print_summary
    from spanwright.truss.errors import SpanwrightError

    path: Path = arguments.project
    base: Path = arguments.out or path.with_name(f"{path.stem}.out")
    status = 0
    for name, project in _trusses(read_project(path), every=arguments.every_truss).items():
        try:
            result = station(project)
        except SpanwrightError as error:
            raise error.located(file=str(path)) from error
        folder = base / name.replace(" ", "-")
        failures = write_all(result, folder, pictures=not arguments.no_pictures, every_member=arguments.every_member)
        print_summary(result, written_to=folder, failures=failures)
        status = max(status, 0 if result.passes and not failures else 1)
    return status


def _trusses(project: Project, *, every: bool) -> dict[str, Project]:
    """Return the project as it stands under "", or with `every` one for each place in the building by its name."""
    if not every:
        return {"": project}
    from spanwright.loads.place import at_every_position
    from spanwright.truss.errors import InputError

    if project.site is None:
        raise InputError(
            "trusses differ by their place in the building only where the site is stated",
            "state [site], or leave --every-truss out",
            "site",
            project.source_name,
        )
    sites = at_every_position(project.site, project.spacing)
    note = f"one of {len(sites)} designs, by place in the building; the quantity of {project.quantity} is all of them"
    return {
        name: replace(
            project,
            site=site,
            title=f"{project.title}, {name} truss",
            mark=f"{project.mark}{name[0].upper()}",
            warnings=(*project.warnings, f"{note}: order from the one that is built, or say how many of each"),
        )
        for name, site in sites.items()
    }
