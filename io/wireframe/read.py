"""From a file to a DXF document: strict reading first, recovering second, and always saying which."""

from __future__ import annotations

import logging
from pathlib import Path

from ezdxf import recover
from ezdxf.audit import Auditor
from ezdxf.document import Drawing
from ezdxf.filemanagement import readfile
from ezdxf.lldxf.const import DXFError

from spanwright.io.wireframe.options import Limits
from spanwright.io.wireframe.report import Finding
from spanwright.truss.errors import DrawingError

READER_TROUBLE = (
    DXFError,
    OSError,
    ArithmeticError,
    AssertionError,
    AttributeError,
    LookupError,
    MemoryError,
    RuntimeError,
    StopIteration,
    TypeError,
    ValueError,
)
"""What the DXF library may raise over a file's content: it checks structure by using it."""

logging.getLogger("ezdxf").addHandler(logging.NullHandler())  # what it mends is told by W-101, not on the screen

_TAIL = 1024  # bytes at the end of a file among which a whole drawing says EOF
_QUOTED_FAULTS = 3
_SAVE_AS = "save it from the drawing program as DXF, release 2010 or later"


def read_drawing(path: Path, limits: Limits) -> tuple[Drawing, tuple[Finding, ...]]:
    """Read a DXF file; the finding, if any, says that the recovering reader was used and what it met.

    Raises DrawingError for what is no whole DXF file.
    """
    _refuse_at_sight(path, limits)
    try:
        return readfile(path), ()
    except READER_TROUBLE as strict:
        document, auditor = _recovered(path)
        return document, (_damage(strict, auditor),)


def _refuse_at_sight(path: Path, limits: Limits) -> None:
    try:
        if not path.is_file():  # a pipe or a device would be waited for without end
            what = "this is a folder or a device, not a drawing" if path.exists() else "there is no such file"
            raise DrawingError(what, "give the name of a DXF file", file=str(path))
        if path.suffix.lower() != ".dxf":
            raise DrawingError(f'the file\'s name ends in "{path.suffix}", not in ".dxf"', _SAVE_AS, file=str(path))
        size = path.stat().st_size
        with path.open("rb") as file:
            file.seek(max(0, size - _TAIL))
            tail = file.read()
    except (OSError, ValueError) as error:
        raise DrawingError(f"cannot be read: {error}", "check the name and the permissions", file=str(path)) from error
    if size == 0:
        raise DrawingError("the file is empty", _SAVE_AS, file=str(path))
    if size > limits.bytes:
        found = f"the file has {size / 1e6:.0f} MB; at most {limits.bytes / 1e6:.0f} MB are read"
        raise DrawingError(found, "save the truss alone in a drawing of its own", file=str(path))
    if b"EOF" not in tail:
        found = "the file is cut short, or is no DXF file: it does not end in EOF"
        raise DrawingError(found, f"get a whole copy; {_SAVE_AS}", file=str(path))


def _recovered(path: Path) -> tuple[Drawing, Auditor]:
    try:
        return recover.readfile(path)
    except READER_TROUBLE as error:
        raise DrawingError(f"this is no DXF file that can be read: {_line(error)}", _SAVE_AS, file=str(path)) from error


def _damage(strict: BaseException, auditor: Auditor) -> Finding:
    faults = [*auditor.errors, *auditor.fixes]
    listed = "; ".join(_line(fault.message) for fault in faults[:_QUOTED_FAULTS])
    more = f"; and {len(faults) - _QUOTED_FAULTS} more" if len(faults) > _QUOTED_FAULTS else ""
    return Finding(
        "W-101",
        f"strict reading stopped: {_line(strict)}",
        f"recovered, {len(faults)} faults ({listed}{more}); compare the result with the drawing",
    )


def _line(message: object) -> str:
    """Return a message of the reader as one printable line of bounded length."""
    text = " ".join(str(message).split())
    return "".join(c if c.isprintable() else "?" for c in text)[:200] or type(message).__name__
