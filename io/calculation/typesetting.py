"""Typesets the data of a document by the template, with the fonts that the compiler carries and no others."""

from __future__ import annotations

import json
import unicodedata
from importlib.resources import as_file, files
from typing import Any

from spanwright.truss.errors import OutputError

TEMPLATE = "calculation.typ"


def typeset(data: dict[str, Any]) -> bytes:
    """Return the PDF of a document; OutputError where the compiler is missing or fails.

    Its text is data to the template and never a part of its source.
    """
    try:
        import typst
    except ImportError as error:
        raise OutputError("the calculation needs the package typst", "pip install typst") from error
    with as_file(files(__package__)) as folder:
        try:
            return bytes(
                typst.compile(
                    folder / TEMPLATE,
                    root=folder,
                    sys_inputs={"data": json.dumps(printable(data))},
                    ignore_system_fonts=True,
                )
            )
        except RuntimeError as error:
            raise OutputError(f"the calculation could not be typeset: {error}") from error


def printable(value: Any) -> Any:
    """Return data whose text holds no control or direction characters, which could change how other text reads."""
    match value:
        case str():
            return "".join(" " if unicodedata.category(sign) in ("Cc", "Cf", "Cs", "Co", "Cn") else sign for sign in value)
        case dict():
            return {key: printable(entry) for key, entry in value.items()}
        case list() | tuple():
            return [printable(entry) for entry in value]
    return value
