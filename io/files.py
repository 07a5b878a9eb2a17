"""Files as they leave the program: whole or not at all, marked with the input they came from, safe to open."""

from __future__ import annotations

import hashlib
import os
from contextlib import suppress
from pathlib import Path

from spanwright.truss.errors import OutputError

_HASH_LENGTH = 12
# What a spreadsheet takes for the start of a formula, with the full-width forms (OWASP, CSV injection).
_FORMULA_STARTS = ("=", "+", "-", "@", "\t", "\r", "\n", "\uff1d", "\uff0b", "\uff0d", "\uff20")


def write_atomically(path: Path, content: bytes) -> None:
    """Write a file so that its place holds the old content or the new, never a part.

    The content goes to a temporary file beside it, which is then renamed; if the run is interrupted before that,
    the temporary file is removed. OutputError if it cannot be written.
    """
    temporary = path.with_name(f".{path.name}.{os.getpid()}.part")
    try:
        temporary.write_bytes(content)
        temporary.replace(path)
    except OSError as error:
        raise _not_written(path, error) from error
    finally:
        with suppress(OSError):  # renamed, or never made
            temporary.unlink()


def make_folder(path: Path) -> None:
    """Make a folder and those above it, if they are missing. OutputError if that cannot be."""
    try:
        path.mkdir(parents=True, exist_ok=True)
    except OSError as error:
        raise _not_written(path, error) from error


def remove(path: Path) -> None:
    """Remove a file that an earlier run left, if it is there. OutputError if that cannot be."""
    try:
        path.unlink(missing_ok=True)
    except OSError as error:
        raise _not_written(path, error) from error


def input_hash(text: str) -> str:
    """Return the mark of an input that every output carries: the first 12 hex digits of its SHA-256."""
    return hashlib.sha256(text.encode()).hexdigest()[:_HASH_LENGTH]


def safe_cell(text: str) -> str:
    """Return text for a CSV or XLSX cell; a leading apostrophe keeps a spreadsheet from taking it for a formula."""
    return f"'{text}" if text.startswith(_FORMULA_STARTS) else text


def _not_written(path: Path, error: OSError) -> OutputError:
    reason = error.strerror or str(error)
    return OutputError(
        f"cannot be written: {reason}", "give another folder with --out, or free this one", file=str(path)
    )
