"""Roofs to draw, and what stands on a sheet, read back from its figure: an independent look at where things lie."""

from collections.abc import Iterator
from functools import cache
from typing import Any

import numpy as np
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.collections import LineCollection, PolyCollection
from matplotlib.colors import to_hex
from matplotlib.text import Text
from shapely import Polygon, affinity

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.io.pictures.restraint import restraint_sheet
from spanwright.io.pictures.sheet import DOTS_PER_INCH, Sheet, drawing_board
from spanwright.io.pictures.utilisation import utilisation_sheet
from spanwright.io.project_file import parse_project
from spanwright.truss.arrays import FloatArray

_ROOF = """
title = "{title}"
mark = "R7"
quantity = 6
standard = "SANS 10162-1"
actions = "SANS 10160:2011"
[truss]
{truss}
spacing = "5 m"
supports = "left pinned, right sliding"
[restraint]
purlins = "at joints"
anchored_by = "roof bracing"
bearings_held = true
{restraint}
[loads]
roof_permanent = {{ most = "0.25 kPa", least = "0.18 kPa" }}
roof_imposed = "0.30 kPa"
[[loads.wind]]
name = "across ridge, suction"
left = "-0.95 kPa"
right = "-0.65 kPa"
[members]
top_chord = "{top}"
bottom_chord = "2L"
posts = "L"
diagonals = "{diagonals}"
"""

_HOWE = 'form = "Howe"\nspan = "15 m"\npitch = "{pitch} deg"\npanels = 10'
_PRATT = (
    'form = "Pratt"\nspan = "{span} m"\npitch = "5 deg"\nheel_depth = "0.9 m"\noverhang = "0.4 m"\npanels = {panels}'
)
_FINK = 'form = "Fink"\nspan = "13.5 m"\npitch = "30 deg"\npanels = 8'

_TIED = 'anchored_purlins = "all"\nbottom_ties = ["B2", "B5", "B8"]'
_FINK_TIED = 'anchored_purlins = "all"\nbottom_ties = ["B1", "B2", "B3", "B4"]'
_BRACED = 'ridge_purlins = "pair, 0.2 m from the apex"\nknee_braces = "every 2nd purlin"\nanchored_purlins = {anchored}'
_LOOSE = "[1, 2, 3, 4, 7, 8, 9, 10, 11, 12, 13, 14, 15, 16]"

_ROOFS: dict[str, dict[str, str]] = {
    "howe": {"truss": _HOWE.format(pitch=18), "restraint": _TIED},
    "steep": {"truss": _HOWE.format(pitch=40), "restraint": _TIED},
    "pratt": {"truss": _PRATT.format(span=18, panels=12), "restraint": _BRACED.format(anchored='"all"')},
    "large": {"truss": _PRATT.format(span=27, panels=20), "restraint": _BRACED.format(anchored='"all"')},
    "fink": {"truss": _FINK, "restraint": _FINK_TIED},
    "loose": {
        "truss": _PRATT.format(span=18, panels=12),
        "restraint": _BRACED.format(anchored=_LOOSE),
        "top": "2L 50x50x5",
    },
    "limits": {"truss": _HOWE.format(pitch=18), "restraint": _TIED, "diagonals": "L 50x50x5"},
    "odd words": {"truss": _HOWE.format(pitch=18), "restraint": _TIED, "title": "A <b> & $x_2$ \u4e2d " + 15 * "long "},
}


ROOFS = tuple(_ROOFS)
"""Small and large, deep and flat, passing and not, with loose purlins, failing limits and odd words."""


@cache
def drawn(name: str) -> Design:
    """Return the design of one of the roofs, by name."""
    words = {"title": "Feed store", "top": "2L", "diagonals": "L"} | _ROOFS[name]
    return design(parse_project(_ROOF.format(**words), "roof.toml"))


PAGES = {"utilisation": utilisation_sheet, "restraint": restraint_sheet}


@cache
def laid(page: str, roof: str) -> Sheet:
    """Return one of the pages of one of the roofs, finished."""
    with drawing_board():
        sheet = PAGES[page](drawn(roof))
        sheet.finish()
    return sheet


PIXELS_PER_MM = DOTS_PER_INCH / 25.4


def texts(sheet: Sheet) -> list[Text]:
    return [artist for artist in sheet.figure.artists if isinstance(artist, Text)]


def words(sheet: Sheet) -> list[str]:
    return [text.get_text() for text in texts(sheet)]


def outlines(sheet: Sheet) -> list[tuple[Text, Polygon]]:
    """Return every text with the outline of its letters on the sheet, mm, as the renderer measures them."""
    with drawing_board():
        return list(_outlines(sheet))


def _outlines(sheet: Sheet) -> Iterator[tuple[Text, Polygon]]:
    sheet.figure.dpi = DOTS_PER_INCH
    canvas = FigureCanvasAgg(sheet.figure)
    renderer = canvas.get_renderer()  # type: ignore[no-untyped-call]  # one for all: each holds a whole page of pixels
    for text in texts(sheet):
        angle = text.get_rotation()
        text.set_rotation(0.0)
        box = text.get_window_extent(renderer)
        text.set_rotation(angle)
        size = float(text.get_fontsize()) * DOTS_PER_INCH / 72.0
        x, y = text.get_transform().transform(text.get_position())
        top, low = (
            y + 0.73 * size,
            y - (0.24 if set(text.get_text()) & set("gjpqy,;()") else 0.02) * size,
        )  # DejaVu Sans
        level = Polygon([(box.x0, low), (box.x1, low), (box.x1, top), (box.x0, top)])
        turned = affinity.rotate(level, angle, origin=(x, y))
        yield text, affinity.scale(turned, 1 / PIXELS_PER_MM, 1 / PIXELS_PER_MM, origin=(0.0, 0.0))


def lines(sheet: Sheet) -> Iterator[tuple[FloatArray, float, str]]:
    """Yield every line drawn: its points, mm; its width, mm; its colour."""
    for artist in sheet.figure.artists:
        if isinstance(artist, LineCollection):
            widths: Any = artist.get_linewidth()
            colours: Any = artist.get_color()
            styles: Any = artist.get_linestyle()
            assert styles == [(0, None)], "dashes are left to the reader of the SVG"
            for path in artist.get_paths():
                yield np.asarray(path.vertices), float(widths[0]) * 25.4 / 72.0, to_hex(colours[0])


def lines_on(sheet: Sheet, segment: FloatArray) -> list[tuple[float, str, float]]:
    """Return width, colour and length of the lines drawn along a segment, whole or in part, mm."""
    span = segment[1] - segment[0]
    length = float(np.hypot(*span))
    along, across = span / length, np.array([-span[1], span[0]]) / length
    found = []
    for points, width, colour in lines(sheet):
        places = (points - segment[0]) @ along
        beside = np.abs((points - segment[0]) @ across)
        if points.shape == (2, 2) and beside.max() < 1e-6 and places.min() > -1e-6 and places.max() < length + 1e-6:
            found.append((width, colour, float(np.ptp(places))))
    return found


def fill_of(sheet: Sheet, outline: FloatArray) -> str:
    """Return the colour that an outline is filled with."""
    for artist in sheet.figure.artists:
        if isinstance(artist, PolyCollection):
            colours: Any = artist.get_facecolor()
            for path in artist.get_paths():
                points = np.asarray(path.vertices)
                if len(points) == len(outline) + 1 and np.allclose(points[:-1], outline):
                    return to_hex(colours[0])
    raise AssertionError("nothing is drawn there")
