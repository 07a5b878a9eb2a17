"""Designs for the tests of the calculation, each designed once, and reading of what is printed on its pages."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator
from dataclasses import replace
from functools import cache
from typing import Any

from demos import FOLDER, demo
from formulas import FUNCTIONS

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.io.project_file import parse_project

FAMILIES = ("howe_workshop", "pratt_store", "fink_barn", "tubes", "square tubes", "stars, bolted")


@cache
def designed(name: str) -> Design:
    """Return the design of a demo, or of the second one with other families."""
    if name in ("tubes", "square tubes", "stars, bolted"):
        return design(parse_project(_with_families(name)))
    return design(demo(name))


def _with_families(name: str) -> str:
    text = (FOLDER / "pratt_store" / "roof.toml").read_text(encoding="utf-8")
    chord, web = {"tubes": ("CHS", "CHS"), "square tubes": ("SHS", "RHS"), "stars, bolted": ("2L", "2L star")}[name]
    for role, family in (("top_chord", chord), ("bottom_chord", chord), ("posts", web), ("diagonals", web)):
        text = re.sub(rf"(?m)^{role}( *)= .*$", rf'{role}\1= "{family}"', text)
    if name == "stars, bolted":
        text += '\n[connections]\nends = "bolted"\nbolts = "3 x M16 8.8"\n'
    return text


def altered(name: str, old: str, new: str) -> Design:
    """Return the design of a demo whose file is changed in one place."""
    text = (FOLDER / name / "roof.toml").read_text(encoding="utf-8")
    assert text.count(old) == 1
    return design(parse_project(text.replace(old, new)))


def with_warnings(name: str, count: int) -> Design:
    """Return a demo's design with many long warnings."""
    return replace(designed(name), warnings=tuple(f"Warning {number}: {'word ' * 30}" for number in range(count)))


def blocks(document: dict[str, Any], kind: str) -> list[dict[str, Any]]:
    """Return the blocks of one kind from a document's data."""
    return [block for section in document["sections"] for block in section["blocks"] if block["kind"] == kind]


def section(document: dict[str, Any], title: str) -> dict[str, Any]:
    """Return the section with this title."""
    found: dict[str, Any] = next(entry for entry in document["sections"] if entry["title"] == title)
    return found


Worked = tuple[dict[str, Any], dict[str, float]]


def worked_steps(member: dict[str, Any]) -> Iterator[Worked]:
    """Yield every step of a worked member with the values that the page prints before it, by symbol."""
    common = {value["name"]: float(value["number"]) for value in member["common"]}
    for check in member["checks"]:
        printed = common | {taken["value"]["name"]: float(taken["value"]["number"]) for taken in check["taken"]}
        for rule in check["rules"]:
            printed |= {value["name"]: float(value["number"]) for value in rule["given"]}
            for step in rule["steps"]:
                yield step, dict(printed)
                printed[step["value"]["name"]] = float(step["value"]["number"])


def evaluated(expression: str, values: dict[str, float]) -> float:
    """Return the value of a printed formula with printed values."""
    return float(eval(expression, {"__builtins__": {}}, {**FUNCTIONS, **values}))


def half_unit(value: float) -> float:
    """Return half a unit of the last place in which a value is printed: five figures, or the unit of a whole number."""
    if value == 0.0:
        return 0.0
    place = math.floor(math.log10(abs(value))) - 4
    return 0.5 * 10.0 ** min(place, 0) if abs(value) < 1e10 else 0.5 * 10.0**place


def within_print(expression: str, values: dict[str, float], result: float) -> tuple[float, float]:
    """Return how far a formula is from its printed result, and how far the rounding of all values lets it be."""
    found = evaluated(expression, values)
    allowed = half_unit(result)
    for name, value in values.items():
        if re.search(rf"\b{name}\b", expression) and half_unit(value):
            allowed += max(
                abs(evaluated(expression, values | {name: value + side * half_unit(value)}) - found) for side in (-1, 1)
            )
    return abs(found - result), allowed * (1.0 + 1e-3) + 1e-12
