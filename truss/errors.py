"""What can go wrong, named for what happened.

    SpanwrightError
    ├── InputError            a value given by the user is missing, malformed, unknown or impossible
    │   └── UnknownNameError  a key, joint, section or steel nobody knows; carries the nearest known one
    ├── GeometryError         joints and bars do not make a truss that can be analysed
    │   ├── MechanismError    joints can move without straining a bar; carries which and where to
    │   └── UnheldEndError    an end of a chord that nothing holds sideways; carries the joint
    ├── DrawingError          a drawing cannot be read or is ambiguous
    └── OutputError           a result cannot be written

Each error holds its data as fields and survives pickling. `str(error)` is the whole message for the user:
where, what was found, what would be right.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from difflib import get_close_matches
from typing import Self


@dataclass(eq=False)
class SpanwrightError(Exception):
    """A mistake that the user can mend.

    Fields: `found` says what is wrong; `remedy` says what would be right; `key` is the dotted project-file
    key or the parameter's name (may be empty); `file` is the file it came from (may be empty).
    """

    found: str
    remedy: str = ""
    key: str = ""
    file: str = ""

    def __str__(self) -> str:
        place = ": ".join(part for part in (self.file, self.key) if part)
        message = f"{place}: {self.found}" if place else self.found
        return f"{message}\n  {self.remedy}" if self.remedy else message

    def located(self, *, file: str = "", key: str = "") -> Self:
        """Return a copy that names its file and key, where they are not named yet."""
        return replace(self, file=self.file or file, key=self.key or key)

    def __reduce__(self) -> tuple[type[Self], tuple[object, ...]]:
        return type(self), tuple(getattr(self, name) for name in self.__dataclass_fields__)


@dataclass(eq=False)
class InputError(SpanwrightError):
    """A value given by the user is missing, malformed, unknown or impossible."""


@dataclass(eq=False)
class UnknownNameError(InputError):
    """A key, joint, section or steel that nobody knows; `nearest` is the closest known name or empty."""

    nearest: str = ""

    @classmethod
    def among(cls, name: str, known: list[str], *, what: str, key: str = "") -> UnknownNameError:
        """Make the error for `name` that is none of the `known` ones; `what` is the kind of thing, e.g. "joint"."""
        close = get_close_matches(name, known, n=1, cutoff=0.5)
        nearest = close[0] if close else ""
        listed = ", ".join(known[:12]) + (", ..." if len(known) > 12 else "")
        remedy = f'did you mean "{nearest}"?' if nearest else f"known: {listed}"
        return cls(f'no {what} is called "{name}"', remedy, key, "", nearest)


@dataclass(eq=False)
class GeometryError(SpanwrightError):
    """Joints and bars do not make a truss that can be analysed."""


@dataclass(eq=False)
class MechanismError(GeometryError):
    """Joints can move without straining a bar.

    `motions` lists one tuple (joint name, unit motion in x, unit motion in y) for each moving joint,
    the largest motion scaled to 1.
    """

    motions: tuple[tuple[str, float, float], ...] = ()


@dataclass(eq=False)
class UnheldEndError(GeometryError):
    """The end of a chord that nothing holds sideways; `joint` names it."""

    joint: str = ""


@dataclass(eq=False)
class DrawingError(SpanwrightError):
    """A drawing cannot be read or is ambiguous; `entity` is its handle, `at` its coordinates in drawing units."""

    entity: str = ""
    at: tuple[float, ...] = ()


@dataclass(eq=False)
class OutputError(SpanwrightError):
    """A result cannot be written."""
