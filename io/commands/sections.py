"""The command `sections`."""

from __future__ import annotations

from argparse import ArgumentParser, Namespace
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from rich.console import Console

    from spanwright.design.candidates import Candidates

SUMMARY = "list the sections of the catalogue with their properties"
TEXT = """\
List the sections that a design may choose from, with properties computed from the outline, in mm, in the truss's
axes: "in" bends in the plane of the truss, "out" bends sideways. With a name, every property of that section.

examples:
  spanwright sections --family 2L
  spanwright sections --family L --min-leg "50 mm" --stocked "South Africa"
  spanwright sections "2L 100x75x8 long legs together" --gap "10 mm"
"""


_LISTED = ("mass", "area", "inertia_in", "inertia_out", "radius_in", "radius_out", "radius_minor", "torsion")
# Of each field of Candidates: what it is called here, and its unit.
_PROPERTIES = {
    "mass": ("mass", "kg/m"),
    "area": ("A", "mm2"),
    "inertia_in": ("I in", "mm4"),
    "inertia_out": ("I out", "mm4"),
    "inertia_minor": ("I minor", "mm4"),
    "inertia_major": ("I major", "mm4"),
    "radius_in": ("r in", "mm"),
    "radius_out": ("r out", "mm"),
    "radius_minor": ("r minor", "mm"),
    "radius_major": ("r major", "mm"),
    "modulus_heel": ("W at the outstanding legs, in plane", "mm3"),
    "modulus_toe": ("W at the toes, in plane", "mm3"),
    "modulus_plastic": ("W plastic, in plane", "mm3"),
    "torsion": ("J", "mm4"),
    "warping": ("Cw", "mm6"),
    "shear_sym": ("shear centre from centroid, along the axis of symmetry", "mm"),
    "shear_major": ("shear centre from centroid, along the major axis", "mm"),
    "shear_minor": ("shear centre from centroid, along the minor axis", "mm"),
    "depth": ("depth in the plane", "mm"),
    "width": ("width across it", "mm"),
    "surface": ("surface", "m2/m"),
    "steel_fy": ("fy", "MPa"),
    "steel_fu": ("fu", "MPa"),
}
_NARROWEST = 132


def arguments(parser: ArgumentParser) -> None:
    """Declare the arguments."""
    parser.add_argument("section", nargs="?", metavar="NAME", help='one section, such as "2L 80x80x6"; none: a list')
    parser.add_argument("--family", help='"L", "2L", "2L star", "CHS", "SHS" or "RHS" (default: all)')
    parser.add_argument("--min-leg", default="0 mm", metavar="LENGTH", help="least leg of angles")
    parser.add_argument("--min-thickness", default="0 mm", metavar="LENGTH", help="least thickness of angles")
    parser.add_argument("--min-wall", default="0 mm", metavar="LENGTH", help="least wall of tubes")
    parser.add_argument("--stocked", default="any", help='"South Africa" or "any" (default: %(default)s)')
    parser.add_argument("--steel", default="S355JR", help="grade of angles; tubes take its twin (default: %(default)s)")
    parser.add_argument("--gap", default="8 mm", metavar="LENGTH", help="of a pair (default: %(default)s)")


def run(arguments: Namespace) -> int:
    """Print the list or the one section; return the exit status."""
    from rich.console import Console

    from spanwright.design.candidates import FAMILIES
    from spanwright.design.families import candidates, find
    from spanwright.io.commands.options import length, naming_options

    console = Console(highlight=False)
    gap = length(arguments, "gap")
    with naming_options():
        if arguments.section is not None:
            _print_one(console, find(arguments.section, steel=arguments.steel, gap=gap, key="NAME"))
            return 0
        for family in FAMILIES if arguments.family is None else (arguments.family,):
            found = candidates(
                family,
                steel=arguments.steel,
                gap=gap,
                min_leg=length(arguments, "min_leg", "0 mm"),
                min_thickness=length(arguments, "min_thickness", "0 mm"),
                min_wall=length(arguments, "min_wall", "0 mm"),
                stocked=arguments.stocked,
            )
            _print_list(Console(highlight=False, width=max(console.width, _NARROWEST)), family, found)
    return 0


def _print_list(console: Console, family: str, found: Candidates) -> None:
    from rich.table import Table
    from rich.text import Text

    from spanwright.io.text import figures

    console.print(Text(f"\n{family}: {len(found)} sections", style="bold"))
    table = Table(box=None, pad_edge=False, header_style="bold")
    table.add_column("section", no_wrap=True)
    for field in _LISTED:
        name, unit = _PROPERTIES[field]
        table.add_column(f"{name}\n{unit}", justify="right", no_wrap=True)
    table.add_column("stock mark", no_wrap=True)
    columns = [[figures(value) for value in getattr(found, field)] for field in _LISTED]
    for name, *values, mark in zip(found.names, *columns, found.stock, strict=True):
        table.add_row(*(Text(cell) for cell in (name, *values, mark)))
    console.print(table)


def _print_one(console: Console, found: Candidates) -> None:
    from rich.table import Table
    from rich.text import Text

    from spanwright.io.text import figures

    console.print(Text(found.names[0], style="bold"))
    table = Table(box=None, pad_edge=False, show_header=False)
    for justify in ("left", "right", "left"):
        table.add_column(justify=justify)
    for field, (name, unit) in _PROPERTIES.items():
        table.add_row(Text(name), Text(figures(float(getattr(found, field)[0]))), Text(unit))
    console.print(table)
    console.print(Text(f"stock mark: {found.stock[0] or 'none known'}"))
