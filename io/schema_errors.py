"""What pydantic found wrong with a project file, in the trade's words: key, value found, remedy."""

from __future__ import annotations

from collections.abc import Iterator
from types import UnionType
from typing import Annotated, Any, Union, get_args, get_origin

from pydantic import ValidationError
from pydantic.fields import FieldInfo
from pydantic_core import ErrorDetails

from spanwright.io.schema import ProjectFile
from spanwright.io.schema_fields import Table
from spanwright.io.schema_truss import GIVEN_KEYS
from spanwright.io.units import shown
from spanwright.truss.errors import InputError, UnknownNameError

_WANTED = {
    "model_type": "a table of keys",
    "dict_type": "a table of keys",
    "list_type": "a list in square brackets",
}


def first_mistake(error: ValidationError) -> InputError:
    """Return the mistake to report: an unknown key before a missing one, as it may be that one misspelled.

    The remedy also names the keys of the other mistakes.
    """
    details = sorted(error.errors(include_url=False), key=lambda detail: detail["type"] != "extra_forbidden")
    mistakes = [_translate(detail) for detail in details]
    first = mistakes[0]
    others = list(dict.fromkeys(mistake.key for mistake in mistakes[1:] if mistake.key != first.key))
    if others:
        listed = ", ".join(others[:6]) + (", ..." if len(others) > 6 else "")
        first.remedy += f"\n  {len(others)} more to mend: {listed}"
    return first


def _translate(detail: ErrorDetails) -> InputError:
    place = _place(detail["loc"])
    if detail["type"] == "refused":
        error: InputError = detail["ctx"]["error"]
        error.key = ".".join(part for part in (_dotted(place), error.key) if part)
        return error
    if detail["type"] == "missing":
        return InputError("this key is required and missing", _meaning(place), _dotted(place))
    if detail["type"] == "extra_forbidden":
        return _unknown_key(place)
    wanted = _WANTED.get(detail["type"], detail["msg"])
    return InputError(f"{shown(detail['input'])} stands where something else is due", f"write {wanted}", _dotted(place))


def _place(location: tuple[int | str, ...]) -> tuple[int | str, ...]:
    """Return the place without what is not in the file: the way of [truss], the mark of a key."""
    place = tuple(part for part in location if part != "[key]")
    return place[:1] + place[2:] if place[:1] == ("truss",) and len(place) > 1 else place


def _dotted(place: tuple[int | str, ...]) -> str:
    """Write a place as a dotted key; entries of a list count from 1."""
    text = ""
    for part in place:
        text += f"[{part + 1}]" if isinstance(part, int) else f".{part}" if text else part
    return text


def _unknown_key(place: tuple[int | str, ...]) -> InputError:
    name = str(place[-1])
    known = list(dict.fromkeys(key for table in _tables_at(place[:-1]) for key in table.model_fields))
    where = _dotted(place)
    if name in known:
        return InputError(
            "a form does not go with joints and bars given one by one",
            f"leave out {name}, or leave out {', '.join(sorted(GIVEN_KEYS))}",
            where,
        )
    error = UnknownNameError.among(name, known, what="key", key=where)
    homes = [home for home, table in _all_tables() if name in table.model_fields]
    if homes:
        error.remedy = "it belongs " + " or ".join(f"in [{home}]" if home else "above all tables" for home in homes)
    return error


def _meaning(place: tuple[int | str, ...]) -> str:
    for table in _tables_at(place[:-1]):
        info = table.model_fields.get(str(place[-1]))
        if info is not None and info.description:
            return info.description
    return ""


def _tables_at(place: tuple[int | str, ...]) -> list[type[Table]]:
    """Return the tables that may stand at a place; [truss] has one for each way of giving it."""
    tables: list[type[Table]] = [ProjectFile]
    for part in place:
        if isinstance(part, str):
            tables = [
                inner for table in tables if part in table.model_fields for inner in _inner(table.model_fields[part])
            ]
    return tables


def _all_tables(path: str = "", table: type[Table] = ProjectFile) -> Iterator[tuple[str, type[Table]]]:
    yield path, table
    for name, info in table.model_fields.items():
        for inner in _inner(info):
            yield from _all_tables(f"{path}.{name}" if path else name, inner)


def _inner(info: FieldInfo) -> list[type[Table]]:
    return list(_tables_in(info.annotation))


def _tables_in(annotation: Any) -> Iterator[type[Table]]:
    if isinstance(annotation, type) and issubclass(annotation, Table):
        yield annotation
    elif get_origin(annotation) in (list, Union, UnionType, Annotated):
        for part in get_args(annotation):
            yield from _tables_in(part)
