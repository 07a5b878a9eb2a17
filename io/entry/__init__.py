"""Spanwright: steel roof trusses from span and pitch to a checked, drawn and scheduled design.

    import spanwright

    project = spanwright.read_project("roof.toml")
    result = spanwright.design_truss(project)      # or check_truss, where every section is given
    print(result)                                  # sections, mass, utilisation
    spanwright.write_all(result, "roof.out")       # what `spanwright design roof.toml` writes

Inside everything is in N, mm, MPa and rad; tension is positive. A user's mistake raises a `SpanwrightError`.
Names load when first used, so that importing this package costs nothing.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from spanwright.design.project import Project
    from spanwright.design.result import Design
    from spanwright.design.run import check as check_truss
    from spanwright.design.run import design as design_truss
    from spanwright.io.outputs import write_all
    from spanwright.io.project_file import parse_project, read_project
    from spanwright.truss.errors import (
        DrawingError,
        GeometryError,
        InputError,
        MechanismError,
        OutputError,
        SpanwrightError,
        UnheldEndError,
        UnknownNameError,
    )
    from spanwright.truss.model import Truss

__version__ = "0.1.0"

__all__ = [
    "Design",
    "DrawingError",
    "GeometryError",
    "InputError",
    "MechanismError",
    "OutputError",
    "Project",
    "SpanwrightError",
    "Truss",
    "UnheldEndError",
    "UnknownNameError",
    "__version__",
    "check_truss",
    "design_truss",
    "parse_project",
    "read_project",
    "write_all",
]

_ERRORS = "spanwright.truss.errors"
_HOMES = {
    "Design": ("spanwright.design.result", "Design"),
    "DrawingError": (_ERRORS, "DrawingError"),
    "GeometryError": (_ERRORS, "GeometryError"),
    "InputError": (_ERRORS, "InputError"),
    "MechanismError": (_ERRORS, "MechanismError"),
    "OutputError": (_ERRORS, "OutputError"),
    "Project": ("spanwright.design.project", "Project"),
    "SpanwrightError": (_ERRORS, "SpanwrightError"),
    "Truss": ("spanwright.truss.model", "Truss"),
    "UnheldEndError": (_ERRORS, "UnheldEndError"),
    "UnknownNameError": (_ERRORS, "UnknownNameError"),
    # `spanwright.design` is the room, so the functions say what they do it to.
    "check_truss": ("spanwright.design.run", "check"),
    "design_truss": ("spanwright.design.run", "design"),
    "parse_project": ("spanwright.io.project_file", "parse_project"),
    "read_project": ("spanwright.io.project_file", "read_project"),
    "write_all": ("spanwright.io.outputs", "write_all"),
}


def __getattr__(name: str) -> object:
    if name not in _HOMES:
        raise AttributeError(f"module {__name__!r} has no attribute {name!r}")
    module, attribute = _HOMES[name]
    value = getattr(import_module(module), attribute)
    globals()[name] = value
    return value


def __dir__() -> list[str]:
    return sorted(set(globals()) | set(__all__))
