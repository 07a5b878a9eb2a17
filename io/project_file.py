"""Read a project file (TOML) into a Project: the only way from text to values.

    parse_project(text)            text > TOML > checked tables (schema.py) > Project
    read_project("roof.toml")      the same from a file

Every mistake is an InputError that names the file, the dotted key, what was found and what would be right; where the
truss stands in a drawing that gives none, it is a DrawingError that names the same.
"""

from __future__ import annotations

import tomllib
from dataclasses import replace
from pathlib import Path
from typing import Any

from pydantic import ValidationError

from spanwright.design.project import Project
from spanwright.io.drawn import read_drawn
from spanwright.io.schema import ProjectFile, defaults_taken
from spanwright.io.schema_errors import first_mistake
from spanwright.io.schema_truss import DrawnTruss
from spanwright.truss.errors import DrawingError, InputError
from spanwright.truss.inputs import FormInput, GivenInput, RestraintInput
from spanwright.truss.possible import refuse_impossible

_LARGEST_FILE = 2_000_000  # bytes: a project file has some thousand; this refuses a device or a wrong file
_FROM_STARTER = "spanwright starter roof.toml writes a commented one to begin with"


def read_project(path: str | Path) -> Project:
    """Read a project file.

    InputError if the file cannot be read, is not UTF-8 or not TOML, or holds a mistake; DrawingError if the drawing
    that it names gives no truss.
    """
    path = Path(path)
    try:
        return parse_project(_text_of(path), path.name, path.parent)
    except (InputError, DrawingError) as error:
        error.file = str(path)
        raise


def parse_project(text: str, name: str = "", folder: str | Path = ".") -> Project:
    """Read a project from the text of a project file.

    name : the file's name for messages and records. folder : what paths in the text are relative to.

    InputError if it is not TOML or holds a mistake; DrawingError if the drawing that it names gives no truss.
    """
    try:
        project = _project(ProjectFile.model_validate(_tables(text)), text, name, Path(folder))
        if isinstance(project.truss, FormInput):
            refuse_impossible(project.truss)
    except ValidationError as error:
        raise first_mistake(error).located(file=name) from None
    except (InputError, DrawingError) as error:
        raise error.located(file=name) from None
    return project


def _project(file: ProjectFile, text: str, name: str, folder: Path) -> Project:
    if not isinstance(file.truss, DrawnTruss):
        return _stated(file, file.truss.value(), file.restraint.value(), text, name)
    drawn = read_drawn(file.truss, file.restraint, text, folder)
    project = _stated(file, drawn.truss, drawn.restraint, drawn.source, name)
    return replace(
        project,
        supports="as given",
        defaults_used=tuple((key, value) for key, value in project.defaults_used if key not in drawn.keys_marked),
        warnings=drawn.warnings,
        drawing=drawn.drawing,
    )


def _stated(
    file: ProjectFile, truss: FormInput | GivenInput, restraint: RestraintInput, source: str, name: str
) -> Project:
    return Project(
        title=file.title,
        standard=file.standard,
        actions=file.actions,
        truss=truss,
        supports=file.truss.supports,
        spacing=file.truss.spacing,
        tributary=file.truss.tributary,
        restraint=restraint,
        loads=file.loads.value(),
        site=None if file.site is None else file.site.value(file.loads.left_open),
        members=file.members.value(),
        ends=file.connections.value(),
        mark=file.mark,
        quantity=file.quantity,
        deflection=file.members.deflection_limits(),
        groups=dict(file.groups),
        title_block={key: text for key, text in file.title_block.model_dump().items() if text},
        defaults_used=tuple(defaults_taken(file)),
        source=source,
        source_name=name,
    )


def _text_of(path: Path) -> str:
    try:
        if path.is_dir():
            raise InputError("this is a folder, not a project file", f"name the file in it; {_FROM_STARTER}")
        if not path.is_file():
            raise InputError("there is no such file", _near_by(path))
        if path.stat().st_size > _LARGEST_FILE:
            raise InputError(f"the file has {path.stat().st_size} bytes, too many for a project file", "check the name")
        content = path.read_bytes()
    except (OSError, ValueError) as error:
        reason = error.strerror if isinstance(error, OSError) else str(error)
        raise InputError(f"cannot be read: {reason}", "check the name and the permissions") from error
    try:
        return content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        raise InputError(
            f"not UTF-8 text: byte 0x{content[error.start]:02x} at position {error.start}",
            "save the file as UTF-8 in a text editor",
        ) from error


def _near_by(path: Path) -> str:
    others = sorted(entry.name for entry in path.parent.glob("*.toml"))[:6] if path.parent.is_dir() else []
    return f"in that folder: {', '.join(others)}" if others else _FROM_STARTER


def _tables(text: str) -> dict[str, Any]:
    if not text.strip():
        raise InputError("the file is empty", _FROM_STARTER)
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise InputError(f"not valid TOML: {error}", _toml_remedy(text, str(error))) from error
    except (ValueError, RecursionError) as error:
        raise InputError(
            f"not a project file: {error}", "check the file; a value in it is absurdly long or deep"
        ) from error


def _toml_remedy(text: str, message: str) -> str:
    """Show the line at fault; the usual cause is a quantity without quotes."""
    hint = 'text and quantities stand in quotes, as in span = "18 m"'
    _, found, rest = message.partition("(at line ")
    number = int(rest.split(",")[0]) if found else 0
    lines = text.splitlines()
    if not 1 <= number <= len(lines):
        return hint
    return f"line {number} reads: {lines[number - 1].strip()[:80]}\n  {hint}"
