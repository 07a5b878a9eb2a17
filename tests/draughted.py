"""Drawings of the demos and of variants of them, drawn once, and what can be read off them."""

from __future__ import annotations

import io
import re
from functools import cache

import ezdxf
import numpy as np
import shapely
from demos import FOLDER
from ezdxf.document import Drawing
from ezdxf.entities.text import Text
from matplotlib.font_manager import FontProperties
from matplotlib.textpath import TextPath

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.io.drawing.arrangement import Arrangement, arrange
from spanwright.io.drawing.document import draw
from spanwright.io.dxf_bytes import dxf_bytes, fixed_marks
from spanwright.io.project_file import parse_project

_CAPITAL = 0.729
"""Height of a capital over the size of DejaVu Sans (its own metrics)."""


def _text(name: str) -> str:
    return (FOLDER / name / "roof.toml").read_text(encoding="utf-8")


def _families(text: str, chords: str, webs: str) -> str:
    text = re.sub(r'((?:top|bottom)_chord +)= "2L"', rf'\1= "{chords}"', text)
    return re.sub(r'((?:posts|diagonals) +)= "L"', rf'\1= "{webs}"', text)


VARIANTS = {
    "pratt_store": lambda: _text("pratt_store"),
    "fink_barn": lambda: _text("fink_barn"),
    "round_tubes": lambda: _families(_text("howe_workshop"), "CHS", "CHS"),
    "starred": lambda: _families(_text("howe_workshop"), "2L", "2L star").replace(
        "panels  = 10", 'panels  = 10\noverhang = "0.6 m"'
    ),
    "loose": lambda: (
        _text("pratt_store")
        .replace('anchored_purlins = "all"', "anchored_purlins = [1, 3, 5, 7, 8, 10, 12, 14]")
        .replace('"every 2nd purlin"', '"every purlin"')
    ),
}
"""Project texts by name: demos, tubes, starred pairs with overhangs, and a roof with loose purlins."""


@cache
def designed(name: str) -> Design:
    """Return the design of a variant."""
    return design(parse_project(VARIANTS[name]()))


@cache
def arranged(name: str) -> Arrangement:
    """Return how its sheet is arranged."""
    return arrange(designed(name))


@cache
def drawing(name: str) -> Drawing:
    """Return its drawing as it comes back from the file's text."""
    with fixed_marks():
        content = dxf_bytes(draw(designed(name), arranged(name)))
    return ezdxf.read(io.StringIO(content.decode()))  # type: ignore[attr-defined]  # re-exported without saying so


@cache
def _extents(text: str) -> tuple[float, float]:
    """Return where the letters of a text begin and end, for capitals 1 high."""
    path = TextPath((0.0, 0.0), text, size=1.0 / _CAPITAL, prop=FontProperties(family="DejaVu Sans"))
    return float(path.get_extents().x0), float(path.get_extents().x1)


def outline_of(entity: Text) -> shapely.Polygon:
    """Return the box of a text's letters, measured by matplotlib, in the units of its layout."""
    height, turn = entity.dxf.height, np.radians(entity.dxf.rotation)
    low, high = (height * entity.dxf.width * edge for edge in _extents(entity.plain_text()))
    align, start, end = entity.get_placement()
    at = np.array((start if align.name == "LEFT" or end is None else end).vec2)
    shift = {"LEFT": 0.0, "CENTER": -0.5, "RIGHT": -1.0}[align.name.split("_")[-1]] * (high + low)
    drop = -height / 2.0 if align.name.startswith("MIDDLE") else 0.0
    corners = np.array([[low, 0.0], [high, 0.0], [high, height], [low, height]]) + np.array([shift, drop])
    turned = corners @ np.array([[np.cos(turn), np.sin(turn)], [-np.sin(turn), np.cos(turn)]])
    return shapely.Polygon(at + turned)


def texts(space: object, *layers: str) -> list[Text]:
    """Return the texts of a layout, on some layers or on all."""
    return [one for one in space.query("TEXT") if not layers or one.dxf.layer in layers]  # type: ignore[attr-defined]
