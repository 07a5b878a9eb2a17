"""What pydantic found wrong with a project file, in the trade's words: key, value found, remedy."""

from __future__ import annotations

from pydantic import ValidationError
from pydantic_core import ErrorDetails

from spanwright.io.schema import all_tables, tables_at
from spanwright.io.schema_truss import DECIDING_KEYS
from spanwright.io.units import shown
from spanwright.truss.errors import InputError, UnknownNameError

_WAYS = {"given": "joints and bars given one by one", "drawn": "a truss read from a drawing"}
_WANTED = {
    "model_type": "a table of keys",
    "dict_type": "a table of keys",
    "list_type": "a list in square brackets",
}


def first_mistake(error: ValidationError) -> InputError:
    """Return the mistake to report: first unknown keys, then wrong values, then what is missing.

    A missing key may be an unknown one misspelled. The remedy also names the keys of the other mistakes.
    """
    details = error.errors(include_url=False)
    details.sort(key=lambda detail: ("extra_forbidden", "", "missing").index(_kind(detail)))
    mistakes = [_translate(detail) for detail in details]
    first = mistakes[0]
    others = list(dict.fromkeys(mistake.key for mistake in mistakes[1:] if mistake.key != first.key))
    if others:
        listed = ", ".join(others[:6]) + (", ..." if len(others) > 6 else "")
        first.remedy += f"\n  {len(others)} more to mend: {listed}"
    return first


def _kind(detail: ErrorDetails) -> str:
    return detail["type"] if detail["type"] in ("extra_forbidden", "missing") else ""


def _translate(detail: ErrorDetails) -> InputError:
    place = _place(detail["loc"])
    if detail["type"] == "refused":
        error: InputError = detail["ctx"]["error"]
        error.key = ".".join(part for part in (_dotted(place), error.key) if part)
        return error
    if detail["type"] == "missing":
        return InputError("this key is required and missing", _meaning(place), _dotted(place))
    if detail["type"] == "extra_forbidden":
        return _unknown_key(place, str(detail["loc"][1]) if len(place) > 1 else "")
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


def _unknown_key(place: tuple[int | str, ...], way: str) -> InputError:
    """Return the mistake; `way` is how [truss] gives the truss, where the place is in it."""
    name = str(place[-1])
    known = list(dict.fromkeys(key for table in tables_at(place[:-1]) for key in table.model_fields))
    where = _dotted(place)
    if name in known and way in _WAYS:
        return InputError(
            f"{name} does not go with {_WAYS[way]}",
            f"leave out {name}, or leave out {', '.join(DECIDING_KEYS[way])}",
            where,
        )
    error = UnknownNameError.among(name, known, what="key", key=where)
    homes = [home for home, table in all_tables() if name in table.model_fields]
    if homes:
        error.remedy = "it belongs " + " or ".join(f"in [{home}]" if home else "above all tables" for home in homes)
    return error


def _meaning(place: tuple[int | str, ...]) -> str:
    for table in tables_at(place[:-1]):
        info = table.model_fields.get(str(place[-1]))
        if info is not None and info.description:
            return info.description
    return ""
