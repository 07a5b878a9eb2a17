"""drawing.dxf and drawing.pdf: model space at 1:1 in mm, and a sheet at a true scale."""

from __future__ import annotations

from pathlib import Path

import numpy as np
from ezdxf import units
from ezdxf.document import Drawing
from ezdxf.filemanagement import new
from ezdxf.layouts.layout import Paperspace

from spanwright.design.result import Design
from spanwright.io.drawing.arrangement import VIEW_TITLE, Arrangement, arrange
from spanwright.io.drawing.cross_sections import draw_cross_sections
from spanwright.io.drawing.elevation import draw_elevation
from spanwright.io.drawing.lettering import LARGE, TEXT, printable
from spanwright.io.drawing.packing import Spot
from spanwright.io.drawing.pen import Pen
from spanwright.io.drawing.rendering import pdf_of
from spanwright.io.drawing.standards import ELEVATION_STYLE, NOTES, SECTION_STYLE, VIEWPORTS, set_up
from spanwright.io.drawing.title_block import MARGIN, draw_frame, draw_title_block
from spanwright.io.dxf_bytes import dxf_bytes, fixed_marks
from spanwright.io.files import input_hash, write_atomically
from spanwright.truss.arrays import FloatArray

VERSION = "R2010"
SHEET = "Sheet 1"
APART = 1000.0
"""mm in model space between the elevation and the cross-sections below it."""
WINDOW = 1.34
"""Width over height of the narrowest window that the first view must fit."""
ZOOM_LOCKED = 16384
"""Bit of a viewport's flags that locks its scale."""


def write_drawing(design: Design, folder: Path) -> None:
    """Write drawing.dxf and drawing.pdf of a passing design into a folder that exists.

    The same design gives the same bytes. Raises OutputError where that cannot be done.
    """
    with fixed_marks():
        doc = draw(design, arrange(design))
        content = dxf_bytes(doc)
    write_atomically(folder / "drawing.dxf", content)
    write_atomically(folder / "drawing.pdf", pdf_of(doc, SHEET, design.setting.project.title))


def draw(design: Design, arranged: Arrangement) -> Drawing:
    """Return the drawing of a passing design, arranged so."""
    doc = new(VERSION)
    doc.units = units.MM
    doc.header["$MEASUREMENT"] = 1
    set_up(doc, arranged.elevation.scale, arranged.sections.scale)
    corner = _draw_model(doc, design, arranged)
    _draw_sheet(doc, design, arranged, corner)
    doc.header.custom_vars.append("Input", input_hash(design.setting.project.source))
    doc.header.custom_vars.append("Title", printable(design.setting.project.title)[:250])
    return doc


def _draw_model(doc: Drawing, design: Design, arranged: Arrangement) -> FloatArray:
    """Draw elevation and, below it, cross-sections; return the upper left corner of these."""
    space = doc.modelspace()
    elevation, sections = arranged.elevation, arranged.sections
    draw_elevation(Pen(space, elevation.scale, ELEVATION_STYLE), design, elevation)
    corner = np.array([elevation.low[0], elevation.low[1] - APART])
    draw_cross_sections(Pen(space, sections.scale, SECTION_STYLE), sections, corner)
    across, up = elevation.high - elevation.low
    middle = (elevation.low + elevation.high) / 2.0
    doc.set_modelspace_vport(max(float(up), float(across) / WINDOW), (float(middle[0]), float(middle[1])))
    low = np.array([elevation.low[0], corner[1] - sections.scale * sections.size[1]])
    doc.header["$EXTMIN"] = (*low.tolist(), 0.0)
    doc.header["$EXTMAX"] = (*elevation.high.tolist(), 0.0)
    return corner


def _draw_sheet(doc: Drawing, design: Design, arranged: Arrangement, corner: FloatArray) -> None:
    doc.layouts.rename("Layout1", SHEET)
    sheet = doc.paperspace(SHEET)
    sheet.page_setup(size=(arranged.width, arranged.height), margins=(0, 0, 0, 0), units="mm")
    pen = Pen(sheet)
    draw_frame(pen, arranged.width, arranged.height)
    elevation, sections = arranged.elevation, arranged.sections
    scales = f"1:{elevation.scale}, 1:{sections.scale}"
    draw_title_block(pen, design, arranged.width - MARGIN, MARGIN, scales, f"{arranged.paper} ISO 216")
    _view(sheet, arranged.elevation_spot, (elevation.low + elevation.high) / 2.0, elevation.scale)
    mark = design.setting.project.mark
    _title(pen, arranged.elevation_spot, f"TRUSS {mark}, ELEVATION", elevation.scale)
    middle = corner + sections.scale * sections.size * np.array([0.5, -0.5])
    _view(sheet, arranged.sections_spot, middle, sections.scale)
    _title(pen, arranged.sections_spot, "CROSS-SECTIONS", sections.scale)
    for block, spot in arranged.blocks:
        block.draw(pen, spot.left, spot.top)


def _view(sheet: Paperspace, spot: Spot, middle: FloatArray, scale: int) -> None:
    """Show a part of model space 1:scale in a locked viewport."""
    width, height = spot.width, spot.height - VIEW_TITLE
    viewport = sheet.add_viewport(
        center=(spot.left + width / 2.0, spot.top - height / 2.0),
        size=(width, height),
        view_center_point=(float(middle[0]), float(middle[1])),
        view_height=height * scale,
        dxfattribs={"layer": VIEWPORTS.name},
    )
    viewport.dxf.flags = viewport.dxf.flags | ZOOM_LOCKED


def _title(pen: Pen, spot: Spot, words: str, scale: int) -> None:
    """Write the title under a view, in the middle."""
    x, y = spot.left + spot.width / 2.0, spot.top - spot.height + VIEW_TITLE
    pen.text(NOTES, (x, y - LARGE - 2.0), words, LARGE, across="centre")
    pen.text(NOTES, (x, y - LARGE - TEXT - 4.0), f"1:{scale}", across="centre")
