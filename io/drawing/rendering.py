"""The sheet as PDF: ezdxf interprets the drawing, matplotlib sets what it finds on a page of the sheet's size."""

from __future__ import annotations

import io
from collections import defaultdict
from collections.abc import Iterable

from ezdxf.addons.drawing.backend import Backend, BkPath2d, BkPoints2d, ImageData
from ezdxf.addons.drawing.config import BackgroundPolicy, ColorPolicy, Configuration
from ezdxf.addons.drawing.frontend import UniversalFrontend
from ezdxf.addons.drawing.pipeline import RenderPipeline2d
from ezdxf.addons.drawing.properties import BackendProperties, RenderContext
from ezdxf.addons.drawing.unified_text_renderer import UnifiedTextRenderer
from ezdxf.document import Drawing
from ezdxf.fonts import fonts
from ezdxf.math import Vec2
from ezdxf.npshapes import to_matplotlib_path
from matplotlib.backends.backend_pdf import FigureCanvasPdf
from matplotlib.collections import LineCollection
from matplotlib.figure import Figure
from matplotlib.patches import PathPatch
from matplotlib.path import Path

from spanwright.io.drawing.lettering import sheet_font

MM_PER_INCH, POINTS_PER_INCH = 25.4, 72.0
FLATNESS = 0.02
"""mm on paper by which a curve may be drawn straight."""


class OneFont(UnifiedTextRenderer):
    """Letters everything in the sheet's font, whatever fonts the machine has."""

    def get_font(self, font_face: fonts.FontFace) -> fonts.AbstractFont:
        """Return the sheet's font."""
        return sheet_font()


class SheetPipeline(RenderPipeline2d):
    """The way from the drawing to the page, with the sheet's font and with line types in mm on paper.

    ezdxf applies the pattern of a line where it is on paper already, so the scale of the viewport must not come in again.
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

    def draw_filled_paths(self, paths: Iterable[BkPath2d], properties: BackendProperties) -> None:
        """Take areas with holes, such as letters."""
        self.areas.append(to_matplotlib_path(paths))

    def draw_filled_polygon(self, points: BkPoints2d, properties: BackendProperties) -> None:
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
    UniversalFrontend(RenderContext(doc), SheetPipeline(page), config).draw_layout(sheet)
    return _set(page, sheet.dxf.paper_width, sheet.dxf.paper_height, title)


def _set(page: Page, width: float, height: float, title: str) -> bytes:
    figure = Figure(figsize=(width / MM_PER_INCH, height / MM_PER_INCH))
    axes = figure.add_axes((0.0, 0.0, 1.0, 1.0), xlim=(0.0, width), ylim=(0.0, height))
    axes.set_axis_off()
    for line_width, lines in sorted(page.lines.items()):
        points = line_width / MM_PER_INCH * POINTS_PER_INCH
        axes.add_collection(LineCollection(lines, linewidths=points, colors="black", capstyle="round"), autolim=False)
    if page.areas:
        patch = PathPatch(Path.make_compound_path(*page.areas), facecolor="black", linewidth=0.0)
        axes.add_artist(patch)
    buffer = io.BytesIO()
    metadata = {"Creator": "Spanwright", "Producer": None, "CreationDate": None, "Title": title}
    FigureCanvasPdf(figure).print_pdf(buffer, metadata=metadata)
    return buffer.getvalue()
