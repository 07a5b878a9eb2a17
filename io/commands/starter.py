"""The command `starter`."""

from __future__ import annotations

import sys
from argparse import ArgumentParser, Namespace
from pathlib import Path

SUMMARY = "write a commented project file to begin with"
TEXT = """\
Write a project file in which every key stands with its unit, its choices and its meaning. It is complete:
`spanwright design` runs it as it is. Without a file name it is printed.

examples:
  spanwright starter roof.toml
  spanwright starter | less
"""


def arguments(parser: ArgumentParser) -> None:
    """Declare the arguments."""
    parser.add_argument("file", type=Path, nargs="?", metavar="FILE.toml", help="the file to write; it must not exist")


def run(arguments: Namespace) -> int:
    """Print or write the starter; return the exit status."""
    from spanwright.io.files import write_atomically
    from spanwright.io.starter import starter_text
    from spanwright.truss.errors import OutputError

    path: Path | None = arguments.file
    if path is None:
        sys.stdout.write(starter_text())
        return 0
    if path.exists():
        raise OutputError("there is something of this name already", "name a new file", file=str(path))
    write_atomically(path, starter_text().encode())
    sys.stdout.write(f"{path} is written. Change it to your roof, then: spanwright design {path}\n")
    return 0
