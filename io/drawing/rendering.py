"""The sheet as PDF: ezdxf interprets the drawing, matplotlib sets what it finds on a page of the sheet's size."""

from __future__ import annotations

import io
import random
from collections import defaultdict
from collections.abc import Iterable, Iterator
from contextlib import contextmanager

import numpy as np
from ezdxf.addons.drawing.backend import Backend, BkPath2d, BkPoints2d, ImageData
from ezdxf.addons.drawing.config import BackgroundPolicy, ColorPolicy, Configuration
from ezdxf.addons.drawing.frontend import UniversalFrontend
from ezdxf.addons.drawing.pipeline import RenderPipeline2d
from ezdxf.addons.drawing.properties import BackendProperties, RenderContext
from ezdxf.addons.drawing.unified_text_renderer import UnifiedTextRenderer
from ezdxf.document import Drawing
from ezdxf.fonts.font_face import FontFace
from ezdxf.fonts.fonts import AbstractFont
from ezdxf.math import Vec2
from ezdxf.npshapes import to_matplotlib_path
from matplotlib.backends.backend_pdf import FigureCanvasPdf
from matplotlib.collections import LineCollection
from matplotlib.figure import Figure
from matplotlib.patches import PathPatch
from matplotlib.path import Path
from numpy.typing import ArrayLike

from spanwright.io.drawing.lettering import sheet_font
from spanwright.truss.arrays import FloatArray

POINTS_PER_INCH = 72.0
POINTS_PER_MM = POINTS_PER_INCH / 25.4
DECIMALS = 2
"""Decimals of a point that are written: 0.004 mm."""
FLATNESS = 0.02
"""mm on paper by which a curve may be drawn straight."""


class OneFont(UnifiedTextRenderer):
    """Letters everything in the sheet's font, whatever fonts the machine has."""

    def get_font(self, font_face: FontFace) -> AbstractFont:  # noqa: ARG002  # what the base class is given
        """Return the sheet's font."""
        return sheet_font()


class SheetPipeline(RenderPipeline2d):
    """The way from the drawing to the page, with the sheet's font and with line types in mm on paper.

    ezdxf applies the pattern of a line where it is on paper already, so the viewport's scale must not come in again.
    """

    text_engine = OneFont()

    def get_vp_ltype_scale(self) -> float:
        """Return 1: patterns are in mm on paper in every viewport."""
        return 1.0


class Page(Backend):
    """Collects what is drawn: lines by width in mm, and areas."""

    def __init__(self) -> None:
        super().__init__()
        self.lines: dict[float, list[list[tuple[float, float]]]] = defaultdict(list)
        self.areas: list[Path] = []

    def set_background(self, color: str) -> None:
        """Paper is white."""

    def draw_point(self, pos: Vec2, properties: BackendProperties) -> None:
        """Points are not drawn: the drawing has none to be seen."""

    def draw_line(self, start: Vec2, end: Vec2, properties: BackendProperties) -> None:
        """Take a line."""
        self.lines[properties.lineweight].append([(start.x, start.y), (end.x, end.y)])

    def draw_solid_lines(self, lines: Iterable[tuple[Vec2, Vec2]], properties: BackendProperties) -> None:
        """Take lines of one kind."""
        for start, end in lines:
            self.draw_line(start, end, properties)

    def draw_path(self, path: BkPath2d, properties: BackendProperties) -> None:
        """Take a curve."""
        self.lines[properties.lineweight].append([(point.x, point.y) for point in path.flattening(FLATNESS)])

    def draw_filled_paths(self, paths: Iterable[BkPath2d], _: BackendProperties) -> None:
        """Take areas with holes, such as letters."""
        self.areas.append(to_matplotlib_path(paths))

    def draw_filled_polygon(self, points: BkPoints2d, _: BackendProperties) -> None:
        """Take an area."""
        self.areas.append(Path([(point.x, point.y) for point in points.vertices()], closed=False))

    def draw_image(self, image_data: ImageData, properties: BackendProperties) -> None:
        """Images are not drawn: the drawing has none."""

    def clear(self) -> None:
        """Forget everything."""
        self.lines.clear()
        self.areas.clear()


def pdf_of(doc: Drawing, layout: str, title: str) -> bytes:
    """Return a paper-space layout as a PDF page of its size, black on white, with no date."""
    sheet = doc.paperspace(layout)
    page = Page()
    config = Configuration(
        background_policy=BackgroundPolicy.WHITE,
        color_policy=ColorPolicy.BLACK,
        lineweight_scaling=1.0,
        max_flattening_distance=FLATNESS,
    )
    with _no_chance():
        UniversalFrontend(RenderContext(doc), SheetPipeline(page), config).draw_layout(sheet)
    return _set(page, sheet.dxf.paper_width, sheet.dxf.paper_height, title)


@contextmanager
def _no_chance() -> Iterator[None]:
    """Let ezdxf, which shifts hatching lines by random numbers below 0.001 mm, shift them alike in every run."""
    before = random.getstate()
    random.seed(0)
    try:
        yield
    finally:
        random.setstate(before)


def _in_points(places: ArrayLike) -> FloatArray:
    """Return places on the page, mm, in points, so rounded that the file stays small."""
    return np.round(np.asarray(places, dtype=float) * POINTS_PER_MM, DECIMALS)


def _set(page: Page, width: float, height: float, title: str) -> bytes:
    size = np.array([width, height]) * POINTS_PER_MM
    figure = Figure(figsize=tuple(size / POINTS_PER_INCH), dpi=POINTS_PER_INCH)
    axes = figure.add_axes((0.0, 0.0, 1.0, 1.0), xlim=(0.0, size[0]), ylim=(0.0, size[1]))
    axes.set_axis_off()
    for line_width, lines in sorted(page.lines.items()):
        placed = [_in_points(line) for line in lines]
        widths = line_width * POINTS_PER_MM
        axes.add_collection(LineCollection(placed, linewidths=widths, colors="black", capstyle="round"), autolim=False)
    if page.areas:
        whole = Path.make_compound_path(*page.areas)
        axes.add_artist(PathPatch(Path(_in_points(whole.vertices), whole.codes), facecolor="black", linewidth=0.0))
    buffer = io.BytesIO()
    metadata = {"Creator": "Spanwright", "Producer": None, "CreationDate": None, "Title": title}
    FigureCanvasPdf(figure)
    figure.savefig(buffer, format="pdf", metadata=metadata)
    return buffer.getvalue()
