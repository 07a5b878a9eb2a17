"""Text with its unit, to N, mm, MPa, rad and m/s and back. Only this module knows units.

The factors are exact: 1 in = 25.4 mm, 1 ft = 12 in, 1 lbf = 0.45359237 kg x 9.80665 m/s2 (international foot and
avoirdupois pound of 1959; standard gravity, CGPM 1901). A bare number is refused: nobody can tell feet from metres.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from decimal import Decimal
from difflib import get_close_matches

from spanwright.truss.errors import InputError

_INCH = Decimal("25.4")
_FOOT = 12 * _INCH
_POUND = Decimal("0.45359237") * Decimal("9.80665")
_ONE = Decimal(1)
_THOUSAND = Decimal(1000)
_MILLION = Decimal(1_000_000)


@dataclass(frozen=True)
class Kind:
    """A kind of quantity: its name and its units, each `times / over` of the inside unit.

    Decimal arithmetic keeps the text exact until the end: "0.18 kPa" is the double nearest to 0.00018 MPa.
    """

    name: str
    article: str
    units: dict[str, tuple[Decimal, Decimal]]

    def __str__(self) -> str:
        return f"{self.article} {self.name}"

    @property
    def factors(self) -> dict[str, float]:
        """How much of the inside unit each unit is."""
        return {unit: float(times / over) for unit, (times, over) in self.units.items()}

    @property
    def spellings(self) -> str:
        """The units that may be written."""
        return f"{self.name}: {', '.join(self.units)}"


LENGTH = Kind(
    "length",
    "a",
    {
        "mm": (_ONE, _ONE),
        "cm": (Decimal(10), _ONE),
        "m": (_THOUSAND, _ONE),
        "in": (_INCH, _ONE),
        "ft": (_FOOT, _ONE),
    },
)
PRESSURE = Kind(
    "pressure",
    "a",
    {
        "kPa": (_ONE, _THOUSAND),
        "kN/m2": (_ONE, _THOUSAND),
        "Pa": (_ONE, _MILLION),
        "N/m2": (_ONE, _MILLION),
        "MPa": (_ONE, _ONE),
        "N/mm2": (_ONE, _ONE),
        "psf": (_POUND, _FOOT**2),
        "ksf": (1000 * _POUND, _FOOT**2),
    },
)
FORCE = Kind(
    "force",
    "a",
    {"kN": (_THOUSAND, _ONE), "N": (_ONE, _ONE), "kip": (1000 * _POUND, _ONE), "lbf": (_POUND, _ONE)},
)
ANGLE = Kind("angle", "an", {"deg": (Decimal(math.pi), Decimal(180)), "rad": (_ONE, _ONE)})
SHARE = Kind("percentage", "a", {"%": (_ONE, Decimal(100))})
SPEED = Kind(
    "speed",
    "a",
    {
        "m/s": (_ONE, _ONE),
        "km/h": (Decimal(10), Decimal(36)),
        "mph": (5280 * _FOOT, Decimal(3600) * _THOUSAND),
    },
)
AREA = Kind(
    "area",
    "an",
    {"m2": (_MILLION, _ONE), "mm2": (_ONE, _ONE), "ft2": (_FOOT**2, _ONE)},
)
_KINDS = (LENGTH, PRESSURE, FORCE, ANGLE, SHARE, SPEED, AREA)

_NUMBER = r"[+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]+)?"
_QUANTITY = re.compile(rf"({_NUMBER})\s*(.*)", re.DOTALL)
_RATIO = re.compile(rf"({_NUMBER})\s*:\s*({_NUMBER})")
_COMMA = re.compile(r"[+-]?[0-9]+,[0-9]")
_NOT_FINITE = re.compile(r"[+-]?(nan|inf(inity)?)\b", re.IGNORECASE)
_LONGEST_QUOTE = 60


def quantity(value: object, kind: Kind, usual: str) -> float:
    """Read a value such as "18 m" in N, mm, MPa, rad or as a share of 1.

    `usual` is the unit that a message suggests. InputError for a bare number, another kind of unit, a decimal comma,
    NaN, infinity, or anything that is no quantity.
    """
    if not isinstance(value, str):
        raise _not_text(value, kind, usual)
    text = _plain(value)
    if _COMMA.match(text):
        raise InputError(
            f"{shown(value)} holds a comma",
            f'the decimal mark is a full stop, and thousands are not separated: "1.5 {usual}", "1500 {usual}"',
        )
    if _NOT_FINITE.match(text):
        raise InputError(f"{shown(value)} is not a finite number", f'write {kind} such as "1.5 {usual}"')
    match = _QUANTITY.fullmatch(text)
    if match is None:
        raise InputError(f"{shown(value)} is not {kind}", f'write a number and a unit, such as "1.5 {usual}"')
    number, unit = match.groups()
    if unit not in kind.units:
        raise _wrong_unit(value, number, unit, kind, usual)
    if not math.isfinite(float(number)):
        raise InputError(f"{shown(value)} is too large to compute with", "check the number and its unit")
    times, over = kind.units[unit]
    return float(Decimal(number) * times / over)


def slope(value: object) -> float:
    """Read a slope in rad: an angle ("12 deg"), a percentage ("21 %") or rise to run ("1:5")."""
    text = _plain(value) if isinstance(value, str) else ""
    ratio = _RATIO.fullmatch(text)
    if ratio is not None:
        rise, run = float(ratio[1]), float(ratio[2])
        if run == 0 and rise == 0:
            raise InputError(f"{shown(value)} is no slope", 'write rise to run, such as "1:5"')
        return math.atan2(rise, run)
    if text.endswith("%"):
        return math.atan(quantity(value, SHARE, "%"))
    return quantity(value, ANGLE, "deg")


def written(value: float, kind: Kind, unit: str) -> str:
    """Write a value of the inside unit as text with its unit: `written(18000.0, LENGTH, "m")` is "18 m"."""
    return f"{value / kind.factors[unit]:.12g} {unit}"


def shown(value: object) -> str:
    """Show a value of a project file as it was written there, shortened, on one line."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, str):
        text = value if len(value) <= _LONGEST_QUOTE else value[:_LONGEST_QUOTE] + "..."
        return '"' + "".join(c if c.isprintable() else c.encode("unicode_escape").decode() for c in text) + '"'
    if isinstance(value, dict):
        return "a table"
    if isinstance(value, list):
        return "a list"
    text = str(value)
    return text if len(text) <= _LONGEST_QUOTE else text[:_LONGEST_QUOTE] + "..."


def _plain(text: str) -> str:
    """Take typographic signs for the plain ones: minus, superscript two, degree sign."""
    plain = text.replace("\u2212", "-").replace("\u00b2", "2").replace("^2", "2").replace("\u00b0", "deg")
    return " ".join(plain.split())


def _not_text(value: object, kind: Kind, usual: str) -> InputError:
    if isinstance(value, bool) or not isinstance(value, int | float):
        return InputError(f"{shown(value)} is not {kind}", f'write a number and a unit, such as "1.5 {usual}"')
    if not math.isfinite(value):
        return InputError(f"{value} is not a finite number", f'write {kind} such as "1.5 {usual}"')
    return InputError(f"{shown(value)} has no unit", f'write "{shown(value)} {usual}" ({kind.spellings})')


def _wrong_unit(value: object, number: str, unit: str, kind: Kind, usual: str) -> InputError:
    if not unit:
        return InputError(f"{shown(value)} has no unit", f'write "{number} {usual}" ({kind.spellings})')
    for other in _KINDS:
        if unit in other.units:
            return InputError(f"{shown(value)} is {other}, not {kind}", f'write "{number} {usual}" ({kind.spellings})')
    same_letters = [known for known in kind.units if known.lower() == unit.lower()]
    near = same_letters or get_close_matches(unit, kind.units, n=1)
    hint = f'did you mean "{number} {near[0]}"? ' if near else ""
    return InputError(f"{shown(value)} has an unknown unit", f"{hint}{kind.spellings}")
