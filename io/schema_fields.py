"""The kinds of values that a project file holds, each read from its text: the vocabulary of the schema.

A reader turns one TOML value into the value used inside and raises InputError; `field` makes it a pydantic type.
"""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Callable, Iterable
from datetime import date
from difflib import get_close_matches
from typing import Annotated, Any, get_args

from pydantic import BaseModel, ConfigDict, Field, PlainValidator
from pydantic_core import PydanticCustomError

from spanwright.io.units import LENGTH, SHARE, Kind, quantity, shown
from spanwright.truss.errors import InputError

_LONGEST_NAME = 60
_UNPRINTABLE = {"Cc", "Zl", "Zp"}
_TURNING = set("\u202a\u202b\u202c\u202d\u202e\u2066\u2067\u2068\u2069")  # they reorder what stands around them


class Table(BaseModel):
    """A table of the project file: no unknown keys, no conversion between TOML types."""

    model_config = ConfigDict(extra="forbid", strict=True, frozen=True)


def key(meaning: str, default: Any = ..., *, otherwise: str = "") -> Any:
    """Declare a key of a table: its meaning, its default as it would be written, and what holds where it is None."""
    return Field(default, description=meaning, validate_default=True, json_schema_extra={"otherwise": otherwise})


def subtable(model: type[Table]) -> Any:
    """Declare a table that may be left out where all its keys have defaults."""
    return Field(default_factory=dict, validate_default=True, description=f"the table {model.__name__}")


def refused(error: InputError) -> PydanticCustomError:
    """Wrap an InputError so that pydantic carries it with its place."""
    return PydanticCustomError("refused", "{found}", {"found": error.found, "error": error})


def field(read: Callable[[Any], object]) -> PlainValidator:
    """Make a reader a pydantic type."""

    def validate(value: Any) -> object:
        try:
            return read(value)
        except InputError as error:
            raise refused(error) from error

    return PlainValidator(validate)


def ranged(kind: Kind, usual: str, least: str, most: str) -> Callable[[object], float]:
    """Return a reader of a quantity that refuses what is outside the plausible range."""
    low, high = quantity(least, kind, usual), quantity(most, kind, usual)

    def read(value: object) -> float:
        result = quantity(value, kind, usual)
        _within(value, result, low, high, least, most)
        return result

    return read


def any_length(value: object) -> float:
    """Read a length, mm, whose range the truss room judges."""
    return quantity(value, LENGTH, "m")


def length(least: str, most: str, usual: str = "m") -> PlainValidator:
    """Make the type of a length within a plausible range, mm."""
    return field(ranged(LENGTH, usual, least, most))


def counted(least: int, most: int) -> Callable[[object], int]:
    """Return a reader of a whole number within a plausible range."""

    def read(value: object) -> int:
        if isinstance(value, bool) or not isinstance(value, int):
            raise InputError(f"{shown(value)} is not a whole number", f"write a whole number from {least} to {most}")
        _within(value, value, least, most, str(least), str(most))
        return value

    return read


def number(least: float, most: float) -> PlainValidator:
    """Make the type of a number without a unit within a plausible range."""

    def read(value: object) -> float:
        if isinstance(value, bool) or not isinstance(value, int | float):
            raise InputError(f"{shown(value)} is not a number", f"write a number from {least:g} to {most:g}, no quotes")
        _within(value, float(value), least, most, f"{least:g}", f"{most:g}")
        return float(value)

    return field(read)


def one_of(literal: Any) -> PlainValidator:
    """Make the type of a choice among the words of a `Literal`."""
    words: tuple[str, ...] = get_args(literal)
    return field(lambda value: choose(value, words))


def choose(value: object, words: tuple[str, ...]) -> str:
    """Return `value` if it is one of the words; InputError with the choices and the nearest one otherwise."""
    if isinstance(value, str) and value in words:
        return value
    plain = {word.casefold(): word for word in words}
    near = get_close_matches(value.casefold(), plain, n=1) if isinstance(value, str) else []
    hint = f'did you mean "{plain[near[0]]}"? ' if near else ""
    raise InputError(f"{shown(value)} is not one of the choices", hint + "write " + listed(words))


def listed(words: Iterable[str]) -> str:
    """List the choices in quotes."""
    return " or ".join(f'"{word}"' for word in words)


def line_of_text(value: object) -> str:
    """Read text of one line in any script; line breaks and control characters are refused."""
    if isinstance(value, date):
        return value.isoformat()
    if not isinstance(value, str):
        raise InputError(f"{shown(value)} is not text", f'write it in quotes, such as "{shown(value).strip(chr(34))}"')
    if any(unicodedata.category(sign) in _UNPRINTABLE or sign in _TURNING for sign in value):
        raise InputError(f"{shown(value)} holds a line break or control character", "write plain text on one line")
    return value.strip()


def name(value: object) -> str:
    """Read the name of something: one line of text, not empty, not longer than a label can be."""
    text = line_of_text(value)
    if not text:
        raise InputError("the name is empty", 'write a name, such as "A1"')
    if len(text) > _LONGEST_NAME:
        raise InputError(f"{shown(value)} has {len(text)} characters", f"a name has at most {_LONGEST_NAME}")
    return text


def names(value: object) -> tuple[str, ...]:
    """Read a list of different names."""
    if not isinstance(value, list) or not value:
        raise InputError(f"{shown(value)} is not a list of names", 'write a list, such as ["B2", "B4"]')
    read = tuple(name(entry) for entry in value)
    repeated = next((entry for entry in read if read.count(entry) > 1), None)
    if repeated is not None:
        raise InputError(f'"{repeated}" is listed twice', "name each one once")
    return read


def yes_or_no(value: object) -> bool:
    """Read true or false."""
    if not isinstance(value, bool):
        raise InputError(f"{shown(value)} is not an answer", "write true or false, without quotes")
    return value


def spelled(pattern: str, value: object, spelling: str) -> re.Match[str]:
    """Match a phrase; InputError that shows the spelling otherwise."""
    match = re.fullmatch(pattern, " ".join(value.split()), re.ASCII) if isinstance(value, str) else None
    if match is None:
        raise InputError(f"{shown(value)} is not understood", f"write {spelling}")
    return match


def _within(value: object, result: float, low: float, high: float, least: str, most: str) -> None:
    if low <= result <= high:
        return
    what = "is negative" if result < 0 <= low else f"is outside the plausible range, {least} to {most}"
    raise InputError(f"{shown(value)} {what}", f"write a value from {least} to {most}; check the number and its unit")


Text = Annotated[str, field(line_of_text)]
Name = Annotated[str, field(name)]
Names = Annotated[tuple[str, ...], field(names)]
Answer = Annotated[bool, field(yes_or_no)]
Length = Annotated[float, field(any_length)]
Share = Annotated[float, field(ranged(SHARE, "%", "0 %", "50 %"))]
