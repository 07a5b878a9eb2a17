"""A sheet of A4: everything on it is placed in mm from its lower left corner, so that a drawing scale holds true."""

from __future__ import annotations

import warnings
from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from io import BytesIO
from itertools import pairwise
from pathlib import Path
from typing import Any, Literal

import matplotlib
import numpy as np
from matplotlib.collections import LineCollection, PolyCollection
from matplotlib.figure import Figure
from matplotlib.text import Text
from matplotlib.transforms import Affine2D

from spanwright.io.files import write_atomically
from spanwright.io.pictures.lettering import MM_PER_INCH, POINTS_PER_MM, Weight, font_of, plain
from spanwright.io.pictures.style import BODY, INK, PAGE
from spanwright.truss.arrays import FloatArray

Across = Literal["left", "center", "right"]
Upward = Literal["baseline", "center", "bottom", "top", "center_baseline"]

DOTS_PER_INCH = 200

_PNG = {"Software": "Spanwright"}
_SVG = {"Creator": "Spanwright", "Date": None}

_LineStyle = tuple[float, float, str]
_AreaStyle = tuple[float, str, str, float]
_ABOVE_AREAS = 0.01

_SETTINGS: dict[Any, Any] = {
    "svg.fonttype": "none",
    "svg.hashsalt": "spanwright",
    "text.hinting": "none",
    "font.sans-serif": ["DejaVu Sans", "Verdana", "Arial", "sans-serif"],
}


@contextmanager
def drawing_board() -> Iterator[None]:
    """Give the settings that sheets are drawn with, whatever the user's own are, and give those back.

    Text stays text in SVG, and its marks are the same in every run. Letters that the font lacks are boxes in the PNG,
    without a warning: the SVG has them.
    """
    with warnings.catch_warnings(), matplotlib.rc_context():
        warnings.filterwarnings("ignore", message="Glyph .* missing from", category=UserWarning)
        matplotlib.rcdefaults()
        matplotlib.rcParams.update(_SETTINGS)
        yield


class Sheet:
    """One A4 sheet, landscape, on which lines, areas and text are laid; to be used on a `drawing_board`.

    Lines and areas drawn alike are gathered, and become one collection each when the sheet is finished.
    """

    def __init__(self) -> None:
        size = (PAGE[0] / MM_PER_INCH, PAGE[1] / MM_PER_INCH)
        self.figure = Figure(figsize=size, dpi=DOTS_PER_INCH, facecolor="white")
        self._mm = Affine2D().scale(1.0 / MM_PER_INCH) + self.figure.dpi_scale_trans
        self._lines: dict[_LineStyle, list[FloatArray]] = {}
        self._areas: dict[_AreaStyle, list[FloatArray]] = {}

    def lines(
        self,
        paths: FloatArray | Sequence[FloatArray],
        width: float,
        colour: str = INK,
        *,
        dashes: tuple[float, float] | None = None,
        order: float = 1.0,
    ) -> None:
        """Draw lines, (n, 2, 2) or n arrays (m, 2), mm; `width` and `dashes` (on, off) in mm; higher `order` on top.

        Dashes are cut here: some readers of SVG leave them out, and would show a member over 1.00 as plain white.
        """
        pieces = paths if dashes is None else [piece for path in paths for piece in cut_in_dashes(path, dashes)]
        self._lines.setdefault((order, width, colour), []).extend(pieces)

    def areas(
        self,
        outlines: Sequence[FloatArray] | FloatArray,
        fill: str,
        *,
        edge: str = "none",
        width: float = 0.0,
        order: float = 1.0,
    ) -> None:
        """Fill closed outlines, n arrays (m, 2) in mm; with an edge of that colour and `width` in mm."""
        self._areas.setdefault((order, fill, edge, width), []).extend(outlines)

    def text(
        self,
        x: float,
        y: float,
        words: str,
        size: float = BODY,
        *,
        across: Across = "left",
        upward: Upward = "baseline",
        angle: float = 0.0,
        colour: str = INK,
        weight: Weight = "normal",
        order: float = 5.0,
        mark: str | None = None,
    ) -> None:
        """Write one line at x, y in mm, turned by `angle` in degrees about that point; `mark` is its id in the SVG."""
        written = Text(
            x,
            y,
            plain(words),
            fontproperties=font_of(size, weight),
            horizontalalignment=across,
            verticalalignment=upward,
            rotation=angle,
            rotation_mode="anchor",
            color=colour,
            zorder=order,
            transform=self._mm,
            parse_math=False,
            gid=mark,
        )
        self.figure.add_artist(written)

    def finish(self) -> None:
        """Put what was gathered on the figure: at the same `order` areas below lines below text."""
        for (order, fill, edge, width), outlines in self._areas.items():
            self.figure.add_artist(
                PolyCollection(
                    outlines,
                    facecolors=fill,
                    edgecolors=edge,
                    linewidths=width * POINTS_PER_MM,
                    zorder=order,
                    transform=self._mm,
                )
            )
        for (order, width, colour), paths in self._lines.items():
            self.figure.add_artist(
                LineCollection(
                    paths,
                    linewidths=width * POINTS_PER_MM,
                    colors=colour,
                    capstyle="butt",
                    zorder=order + _ABOVE_AREAS,
                    transform=self._mm,
                )
            )
        self._areas.clear()
        self._lines.clear()

    def write(self, folder: Path, name: str) -> None:
        """Write `name`.png and `name`.svg into a folder; the same sheet gives the same bytes. Raises OutputError."""
        self.finish()
        png, svg = BytesIO(), BytesIO()
        quick = {"compress_level": 3}  # half the time of the default for 5 % more bytes
        self.figure.savefig(png, format="png", dpi=DOTS_PER_INCH, metadata=_PNG, pil_kwargs=quick)
        self.figure.savefig(svg, format="svg", metadata=_SVG)
        write_atomically(folder / f"{name}.png", png.getvalue())
        write_atomically(folder / f"{name}.svg", svg.getvalue())


def cut_in_dashes(path: FloatArray, dashes: tuple[float, float]) -> list[FloatArray]:
    """Return the dashes (2, 2) of a path (m, 2), mm: `dashes` on and off, begun anew at each of its points."""
    pieces = []
    on, off = dashes
    for start, end in pairwise(path):
        length = float(np.hypot(*(end - start)))
        shares = np.arange(0.0, length, on + off)[:, None] / length
        ends = np.minimum(shares + on / length, 1.0)
        corners = start + np.stack([shares, ends], axis=1) * (end - start)
        pieces += list(corners)
    return pieces


def rectangle(x: float, y: float, width: float, height: float) -> FloatArray:
    """Return the outline of a rectangle from its lower left corner, mm."""
    return np.array([[x, y], [x + width, y], [x + width, y + height], [x, y + height]])


def disc(middle: FloatArray, radius: float) -> FloatArray:
    """Return the outline of a circle, mm."""
    turn = np.linspace(0.0, 2.0 * np.pi, 25)[:-1]
    outline: FloatArray = middle + radius * np.column_stack([np.cos(turn), np.sin(turn)])
    return outline
