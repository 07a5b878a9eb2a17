"""Names of sections: how they are written (ISO 5261, with the way round behind) and how they are read."""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import cast

from spanwright.design.candidates import Family
from spanwright.design.section_rows import size_text
from spanwright.truss.errors import InputError

SPELLINGS = '"2L 80x80x6", "L 50x50x5", "2L 100x75x8 short legs together", "CHS 76.1x3.6", "RHS 120x60x5 flat"'

_NAME = re.compile(r"(2l|l|chs|shs|rhs)\s*(star(?:red)?)?\s*([\d.]+(?:\s*x\s*[\d.]+)+)(.*)")
_WORDS = {
    "way": re.compile(r"\b(long|short)\s+legs?\s+(?:together|connected)\b|\b(upright|flat)\b"),
    "star": re.compile(r"\b(star)(?:red)?\b"),
    "gap": re.compile(r"\bgap\s*=?\s*(\d+(?:\.\d+)?)\s*(?:mm)?"),
    "process": re.compile(r"\b(hot)[\s-]+finished\b|\b(cold)[\s-]+formed\b"),
}
_LENGTHS = {"L": 3, "2L": 3, "2L star": 3, "CHS": 2, "SHS": 3, "RHS": 3}


@dataclass(frozen=True)
class SectionName:
    """A section name taken apart; what it does not state is "" or None.

    size : as the catalogue writes it, longer side first. way : "long", "short", "upright", "flat".
    process : "hot" or "cold". gap : mm.
    """

    family: Family
    size: str
    way: str = ""
    process: str = ""
    gap: float | None = None


def parse(text: str, *, key: str = "members") -> SectionName:
    """Take a section name as users write it apart; capitals, spaces, commas and the multiplication sign are free.

    Raises `InputError` for a text that is not the name of a section.
    """
    plain = re.sub(r"(?<=\d),(?=\d)", ".", text.casefold().replace("×", "x"))
    match = _NAME.fullmatch(plain.strip())
    if match is None:
        raise InputError(f'"{text}" is not the name of a section', f"write it like {SPELLINGS}", key)
    letters, star, lengths, rest = match.groups()
    said, left = _words(rest)
    family = cast(Family, "2L star" if letters == "2l" and (star or said["star"]) else letters.upper())
    try:
        sides = [float(side) for side in lengths.split("x")]
    except ValueError:
        sides = []
    if left.strip(" ,") or len(sides) != _LENGTHS[family] or (star and letters != "2l"):
        raise InputError(f'"{text}" cannot be read as a section', f"write it like {SPELLINGS}", key)
    size = size_text(*sorted(sides[:-1], reverse=True), sides[-1])
    return SectionName(family, size, said["way"], said["process"], float(said["gap"]) if said["gap"] else None)


def angle_name(family: Family, size: str, way: str, gap: float) -> str:
    """Return the full name of an angle or a pair; `way` is "long", "short" or ""."""
    parts = [f"L {size}" if family == "L" else f"2L {size}"]
    if way:
        parts.append(f"{way} leg connected" if family == "L" else f"{way} legs together")
    if family == "2L star":
        parts.append("star")
    if family != "L":
        parts.append(f"gap {gap:g}")
    return ", ".join(parts)


def tube_name(family: Family, size: str, way: str, *, hot: bool) -> str:
    """Return the full name of a hollow section; `way` is "upright", "flat" or ""."""
    return ", ".join(part for part in (f"{family} {size}", way, "hot finished" if hot else "") if part)


def _words(rest: str) -> tuple[dict[str, str], str]:
    """Pick what the words behind the size say; return it and what is left over."""
    said = {}
    for name, pattern in _WORDS.items():
        found = pattern.search(rest)
        said[name] = next(filter(None, found.groups()), "") if found else ""
        rest = pattern.sub(" ", rest, count=1)
    return said, rest.replace(",", " ")
