"""The command `strut`."""

from __future__ import annotations

from argparse import ArgumentParser, Namespace
from pathlib import Path
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from rich.console import Console

    from spanwright.design.candidates import Candidates
    from spanwright.design.standard import Check, Demand, Standard

SUMMARY = "work one compression member by hand: every intermediate value with unit and clause"
TEXT = """\
Check one compression member and print every intermediate value with its symbol, formula, unit and clause:
the hand calculation that goes with a computed design, or a quick answer without one.

Lengths are effective lengths between the points that hold the member: --in-plane for bowing in the plane of the truss,
--out-of-plane for bowing sideways. Compression is negative. Every quantity carries its unit.

examples:
  spanwright strut --section "2L 80x80x6" --in-plane "1.6 m" --out-of-plane "3.2 m" --force "-120 kN"
  spanwright strut --section "2L 100x75x8 long legs together" --gap "10 mm" --packs 3 --pack-fixing welded \\
                   --in-plane "1.8 m" --out-of-plane "1.8 m" --force "-200 kN"
  spanwright strut --section "L 60x60x6" --one-leg --in-plane "1.4 m" --out-of-plane "1.4 m" --force "-25 kN"
  spanwright strut --section "CHS 76.1x3.6" --in-plane "2 m" --out-of-plane "2 m" --force "-90 kN" --pdf strut.pdf

exit status: 0 it passes; 1 it fails; 2 the input is wrong
"""


def arguments(parser: ArgumentParser) -> None:
    """Declare the arguments."""
    needed = parser.add_argument_group("the member")
    needed.add_argument("--section", required=True, help='such as "2L 80x80x6"; `spanwright sections` lists them')
    needed.add_argument("--in-plane", required=True, metavar="LENGTH", help="effective length in the truss's plane")
    needed.add_argument("--out-of-plane", required=True, metavar="LENGTH", help="effective length sideways")
    needed.add_argument("--force", required=True, metavar="FORCE", help='factored, compression negative: "-120 kN"')
    more = parser.add_argument_group("where it differs")
    more.add_argument("--torsional", metavar="LENGTH", help="length for twist (default: the out-of-plane one)")
    more.add_argument("--panel", metavar="LENGTH", help="joint to joint, which packs divide (default: --in-plane)")
    more.add_argument("--steel", default="S355JR", help="grade of angles; tubes take its twin (default: %(default)s)")
    more.add_argument("--gap", default="8 mm", metavar="LENGTH", help="between angles of a pair (default: %(default)s)")
    more.add_argument("--packs", type=int, default=2, metavar="N", help="a panel, of a pair (default: %(default)s)")
    more.add_argument("--pack-fixing", choices=["snug", "welded"], default="snug", help="(default: %(default)s)")
    more.add_argument("--one-leg", action="store_true", help="a web fixed by one leg, all on one side of the gusset")
    more.add_argument("--first-web", action="store_true", help="the first compression web from a bearing")
    more.add_argument("--pdf", type=Path, metavar="FILE", help="write the working as a page to sign, too")
    more.add_argument("--standard", default="SANS 10162-1", help="member standard (default: %(default)s)")


def _write(
    path: Path, arguments: Namespace, section: Candidates, standard: Standard, checks: tuple[Check, ...]
) -> None:
    """Write the member as a worked page of the calculation."""
    from spanwright.design.sizing import governing
    from spanwright.io.calculation.document import write_worked_member
    from spanwright.io.calculation.working import work

    about = (
        ("Standard", standard.name),
        ("Section", f"{section.names[0]}, {_grade(arguments, section)}"),
        ("Force", f"{arguments.force}, factored"),
        ("In plane", arguments.in_plane),
        ("Out of plane", arguments.out_of_plane),
    )
    decides = governing(checks, ("strut",), None).check
    member = work("Compression member", about, checks, 0, lambda _: "", decides)
    write_worked_member(path, f"{section.names[0]}, compression member", member)


def run(arguments: Namespace) -> int:
    """Work the member and print it; return the exit status."""
    from rich.console import Console
    from rich.text import Text

    from spanwright.design.families import find
    from spanwright.design.registry import standard_named
    from spanwright.design.sizing import governing, worst_ratio
    from spanwright.io.commands.options import length, naming_options
    from spanwright.io.worked import print_worked, result

    demand = _demand(arguments)
    with naming_options():
        standard = standard_named(arguments.standard)
        section = find(arguments.section, steel=arguments.steel, gap=length(arguments, "gap"), key="--section")
        checks = standard.checks(section, demand)
    console = Console(highlight=False)
    _print_head(console, arguments, section, standard)
    print_worked(console, checks)
    if arguments.pdf:
        _write(arguments.pdf, arguments, section, standard, checks)
    found = governing(checks, demand.bars, None)
    decides = next(check for check in checks if check.name == found.check)
    console.print(Text(f"\n{found.check}, {found.clause}, governs: {result(decides)}", style="bold"))
    return 0 if worst_ratio(checks).max() <= 1 else 1


def _demand(arguments: Namespace) -> Demand:
    """Return what the member must resist: one bar, one combination, no moments."""
    import numpy as np

    from spanwright.design.standard import Demand, Ends, Packs
    from spanwright.io.commands.options import compression, length
    from spanwright.io.schema_members import PACK_FACTORS

    force = np.array([[compression(arguments)]])
    in_plane, out_of_plane = length(arguments, "in_plane"), length(arguments, "out_of_plane")
    return Demand(
        bars=("strut",),
        axial=force,
        sideways=-force,
        panel=np.array([length(arguments, "panel", otherwise=in_plane)]),
        in_plane=np.array([in_plane]),
        out_of_plane=np.array([out_of_plane]),
        torsional=np.array([length(arguments, "torsional", otherwise=out_of_plane)]),
        minor=np.array([max(in_plane, out_of_plane)]),
        sag=np.zeros((1, 1)),
        hog=np.zeros((1, 1)),
        end_moments=np.zeros((1, 2, 1)),
        point_loads=np.zeros(1, dtype=np.intp),
        first_web=np.array([[arguments.first_web]]),
        one_leg=np.array([arguments.one_leg]),
        ends=Ends(),
        packs=Packs(_packs(arguments), PACK_FACTORS[arguments.pack_fixing]),
    )


def _packs(arguments: Namespace) -> int:
    from spanwright.io.schema_fields import counted
    from spanwright.truss.errors import InputError

    try:
        return counted(1, 20)(arguments.packs)
    except InputError as error:
        raise error.located(key="--packs") from None


def _grade(arguments: Namespace, section: Candidates) -> str:
    """Return the name of the steel that the section takes."""
    from spanwright.design.families import TUBES
    from spanwright.design.steels import steel

    return steel(arguments.steel, hollow=section.family in TUBES).name


def _print_head(console: Console, arguments: Namespace, section: Candidates, standard: Standard) -> None:
    from rich.text import Text

    from spanwright.design.cautions import SHORT_CAUTION

    console.print(Text(f"{section.names[0]}, {_grade(arguments, section)}, by {standard.name}", style="bold"))
    console.print(
        Text(
            f"{arguments.force} over {arguments.in_plane} in plane and {arguments.out_of_plane} out of plane. "
            f"Factored; compression negative; N, mm, MPa below.\n{SHORT_CAUTION}"
        )
    )
