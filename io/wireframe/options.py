"""What the user states about a drawing, and how much of a drawing is read at most."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from fnmatch import fnmatchcase
from typing import Literal, get_args

from spanwright.io.units import LENGTH
from spanwright.truss.decimals import decimal
from spanwright.truss.errors import InputError
from spanwright.truss.model import ROLES, Role

MarkKind = Literal["purlins", "knee braces", "ties", "supports"]
MARK_KINDS: tuple[MarkKind, ...] = get_args(MarkKind)
BearingChord = Literal["", "top chord", "bottom chord"]
DrawnSupports = Literal["left pinned, right sliding", "both pinned"]

_AXES = ("x", "y", "z")


@dataclass(frozen=True)
class Limits:
    """How much is read at most, so that a hostile file ends in a message and not in a machine without memory.

    bytes : size of the file; reading takes some eight times as much memory.
    entities : after the blocks are taken apart, sides of polylines counted one by one. depth : of blocks within blocks.
    pairs : of neighbouring line ends or bars that are looked at; a drawn truss has some ten for each line.
    findings : of near misses, and of crossings.
    """

    bytes: int = 100_000_000
    entities: int = 500_000
    depth: int = 16
    pairs: int = 20_000_000
    findings: int = 100_000


@dataclass(frozen=True)
class Options:
    """What the user states. Layer patterns are shell patterns (`TC*`), in any case.

    units : "mm", "cm", "m", "in" or "ft"; "" takes the drawing's own statement.
    layers : only layers that match are read; empty: all. ignore : layers that match are not read.
    roles : for each role the layers of its bars; roles not named follow from the geometry.
    marks : for each kind of mark the layers of its points, circles and block inserts.
    tolerance : mm, how far apart line ends that meet may be; None: the lesser of 5 mm and 0.1 % of the span.
    split_crossings : make a joint where two bars cross without one.
    up : the drawing's axis that is vertical, "x", "-x", "y", "-y", "z" or "-z"; "" takes y in plan, else z.
    bearings : the chord that bears; "" takes the lowest of the outermost joints.
    overhang : mm in plan, of the top chord beyond its end joints, each side; None: as drawn.
    supports : what the left and the right bearing hold.
    """

    units: str = ""
    layers: tuple[str, ...] = ()
    ignore: tuple[str, ...] = ()
    roles: Mapping[Role, tuple[str, ...]] = field(default_factory=dict)
    marks: Mapping[MarkKind, tuple[str, ...]] = field(default_factory=dict)
    tolerance: float | None = None
    split_crossings: bool = False
    up: str = ""
    bearings: BearingChord = ""
    overhang: float | None = None
    supports: DrawnSupports = "left pinned, right sliding"
    limits: Limits = Limits()


AS_DRAWN = Options()
"""Nothing stated: everything as the drawing has it."""


def matches(layer: str, patterns: tuple[str, ...]) -> bool:
    """Return whether a layer's name matches one of the patterns, in any case."""
    folded = layer.casefold()
    return any(fnmatchcase(folded, pattern.casefold()) for pattern in patterns)


def layer_role(layer: str, options: Options) -> Role | None:
    """Return the role that the user gave to a layer."""
    return next((role for role in ROLES if matches(layer, options.roles.get(role, ()))), None)


def layer_mark(layer: str, options: Options) -> MarkKind | None:
    """Return the kind of marks that the user said a layer holds."""
    return next((kind for kind in MARK_KINDS if matches(layer, options.marks.get(kind, ()))), None)


def unused_patterns(layers: Iterable[str], options: Options) -> tuple[tuple[str, str], ...]:
    """Return (key, pattern) of every pattern that matches none of the layers."""
    named = {"layers": options.layers, "ignore": options.ignore}
    named |= {f"roles.{role}": patterns for role, patterns in options.roles.items()}
    named |= {f"marks.{kind}": patterns for kind, patterns in options.marks.items()}
    seen = tuple(layers)
    return tuple(
        (key, pattern)
        for key, patterns in named.items()
        for pattern in patterns
        if not any(matches(layer, (pattern,)) for layer in seen)
    )


def check_options(options: Options) -> None:
    """Raise InputError for options that cannot be meant."""
    if options.units and options.units not in LENGTH.factors:
        raise InputError(f'"{options.units}" is no unit of length', f"give one of {', '.join(LENGTH.factors)}", "units")
    tolerance = options.tolerance
    if tolerance is not None and not (math.isfinite(tolerance) and tolerance > 0):
        raise InputError(
            f"the tolerance is {decimal(tolerance)} mm", 'give a positive length such as "5 mm"', "tolerance"
        )
    overhang = options.overhang
    if overhang is not None and not (math.isfinite(overhang) and overhang >= 0):
        raise InputError(f"the overhang is {decimal(overhang)} mm", 'give a length such as "0.4 m"', "overhang")
    if options.up and options.up.removeprefix("-") not in _AXES:
        raise InputError(f'"{options.up}" is no axis', "give x, -x, y, -y, z or -z", "up")
    _check_choice(options.bearings, BearingChord, "bearings")
    _check_choice(options.supports, DrawnSupports, "supports")
    _check_patterns(options.roles.items(), ROLES, "roles")
    _check_patterns(options.marks.items(), MARK_KINDS, "marks")


def _check_choice(value: str, choices: object, key: str) -> None:
    known = get_args(choices)
    if value not in known:
        listed = ", ".join(f'"{choice}"' for choice in known if choice)
        raise InputError(f'"{value}" is not known', f"give one of {listed}, or leave it out", key)


def _check_patterns(given: Iterable[tuple[str, tuple[str, ...]]], known: tuple[str, ...], key: str) -> None:
    for name, patterns in given:
        if name not in known:
            raise InputError(f'"{name}" is not known', f"known: {', '.join(known)}", key)
        if isinstance(patterns, str) or not all(isinstance(pattern, str) for pattern in patterns):
            found = f"{patterns!r} is no list of layer patterns"
            raise InputError(found, 'write a list such as ["TC*"]', f"{key}.{name}")
