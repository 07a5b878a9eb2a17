"""Options that hold a quantity, and messages that name the option instead of the project file's key."""

from __future__ import annotations

from argparse import Namespace
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import replace

from spanwright.io.schema_fields import ranged
from spanwright.io.units import FORCE, LENGTH, shown
from spanwright.truss.errors import InputError

_OPTIONS = {
    "members": "--family",
    "members.steel": "--steel",
    "members.stocked": "--stocked",
    "standard": "--standard",
}


def length(arguments: Namespace, name: str, least: str = "1 mm", otherwise: float | None = None) -> float:
    """Read the length of an option, mm; `otherwise` where it is not given."""
    text: str | None = getattr(arguments, name)
    if text is None and otherwise is not None:
        return otherwise
    try:
        return ranged(LENGTH, "m", least, "150 m")(text)
    except InputError as error:
        raise error.located(key=f"--{name.replace('_', '-')}") from None


def compression(arguments: Namespace) -> float:
    """Read the option --force, N; InputError unless it is compression, which is negative."""
    try:
        force = ranged(FORCE, "kN", "-100000 kN", "100000 kN")(arguments.force)
    except InputError as error:
        raise error.located(key="--force") from None
    if force >= 0:
        remedy = 'compression is negative: write --force "-120 kN"'
        raise InputError(f"{shown(arguments.force)} does not compress the member", remedy, "--force")
    return force


@contextmanager
def naming_options() -> Iterator[None]:
    """Turn the project-file key of a mistake into the option that gave the value."""
    try:
        yield
    except InputError as error:
        raise replace(error, key=_OPTIONS.get(error.key, error.key)) from None
