"""The command `check`."""

from __future__ import annotations

from argparse import Namespace
from typing import TYPE_CHECKING

from spanwright.io.commands.design import arguments, carry_out

if TYPE_CHECKING:
    from spanwright.design.project import Project
    from spanwright.design.result import Design

__all__ = ["SUMMARY", "TEXT", "arguments", "run"]

SUMMARY = "check the sections given in a project file"
TEXT = """\
Check a truss whose sections are all given: [members] names one section for every role and group, such as
top_chord = "2L 80x80x6". Says what fails and by how much, and writes the same results as `design`.

example:
  spanwright check roof.toml

exit status: 0 every member passes; 1 something fails; 2 the input is wrong
"""


def run(arguments: Namespace) -> int:
    """Check, print and write; return the exit status."""
    return carry_out(arguments, _check)


def _check(project: Project) -> Design:
    from spanwright.design.run import check

    return check(project)
