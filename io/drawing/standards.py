"""What a drawing office sets up before it draws: layers, line types, lettering and dimension styles."""

from __future__ import annotations

from dataclasses import dataclass

from ezdxf.document import Drawing

from spanwright.io.drawing.lettering import TEXT, WIDTH_FACTOR

STYLE = "LETTERING"
ELEVATION_STYLE, SECTION_STYLE = "STEEL-ELEVATION", "STEEL-SECTIONS"
FONT = "arial.ttf"
CENTRE, HIDDEN, PHANTOM = "CENTRE", "HIDDEN", "PHANTOM"

LINE_TYPES = {
    CENTRE: ("long dash, dot", [12.5, 8.0, -2.0, 0.5, -2.0]),
    HIDDEN: ("dashes", [4.5, 3.0, -1.5]),
    PHANTOM: ("long dash, two dots", [15.0, 8.0, -2.0, 0.5, -2.0, 0.5, -2.0]),
}
"""Patterns in mm on paper, for narrow lines (ISO 128-2): whole length, dash +, gap -."""

DIMENSION_GAP = 0.8
"""mm on paper between a dimension line and its text."""
TICK = 2.5
"""mm on paper: length of the 45 degree ticks that end dimension lines (common practice in steelwork)."""
EXTENSION_OFFSET, EXTENSION_ABOVE = 1.0, 1.5
"""mm on paper by which an extension line starts off its point and passes the dimension line (ISO 129-1)."""
EXTENSION_LENGTH = 5.0
"""mm on paper: extension lines are broken off this far from the dimension line, clear of signs and names."""


@dataclass(frozen=True)
class Layer:
    """One layer: name, colour number on the screen, line width in 1/100 mm (ISO 128-2), line type, what lies on it."""

    name: str
    colour: int
    width: int
    holds: str
    line_type: str = "Continuous"
    plotted: bool = True


SETTING_OUT = Layer("SETTING-OUT", 1, 18, "setting-out lines, joint to joint: the centroids of the members", CENTRE)
MEMBERS = Layer("MEMBERS", 7, 35, "outlines of members, true to size")
LEGS = Layer("MEMBERS-LEGS", 8, 18, "visible edges of outstanding legs")
HIDDEN_LEGS = Layer("MEMBERS-HIDDEN", 8, 18, "edges that other steel hides", HIDDEN)
PURLINS = Layer("PURLINS", 3, 35, "purlin lines, as symbols")
BRACES = Layer("KNEE-BRACES", 30, 35, "knee braces, as symbols", HIDDEN)
TIES = Layer("BOTTOM-TIES", 30, 35, "bottom ties, as symbols")
SUPPORTS = Layer("SUPPORTS", 5, 35, "bearings, as symbols")
MARKS = Layer("MARKS", 7, 18, "marks and section names")
JOINTS = Layer("JOINTS", 8, 18, "joint names")
DIMENSIONS = Layer("DIMENSIONS", 4, 18, "dimensions")
SECTIONS = Layer("SECTIONS", 7, 50, "cut steel in cross-sections")
SECTION_HATCH = Layer("SECTIONS-HATCH", 8, 13, "hatching of cut steel")
PACKS = Layer("PACKS", 6, 35, "packing plates in cross-sections")
GUSSETS = Layer("GUSSETS", 8, 18, "where gussets will stand; they are not designed", PHANTOM)
TABLES = Layer("TABLES", 7, 18, "schedules and tables")
TABLE_FRAMES = Layer("TABLES-FRAMES", 7, 35, "outlines of tables")
NOTES = Layer("NOTES", 7, 18, "titles of views and general notes")
TITLE_BLOCK = Layer("TITLE-BLOCK", 7, 35, "title block and revisions")
FRAME = Layer("FRAME", 7, 70, "frame of the sheet")
TRIM = Layer("SHEET-EDGE", 8, 18, "edge of the sheet")
VIEWPORTS = Layer("VIEWPORTS", 9, 18, "edges of viewports", plotted=False)

LAYERS = (
    SETTING_OUT,
    MEMBERS,
    LEGS,
    HIDDEN_LEGS,
    PURLINS,
    BRACES,
    TIES,
    SUPPORTS,
    MARKS,
    JOINTS,
    DIMENSIONS,
    SECTIONS,
    SECTION_HATCH,
    PACKS,
    GUSSETS,
    TABLES,
    TABLE_FRAMES,
    NOTES,
    TITLE_BLOCK,
    FRAME,
    TRIM,
    VIEWPORTS,
)


def set_up(doc: Drawing, elevation: int, sections: int) -> None:
    """Give a new document its layers, line types, lettering, and dimension styles for both scales 1:n."""
    for name, (description, pattern) in LINE_TYPES.items():
        doc.linetypes.add(name, pattern, description=description)
    for layer in LAYERS:
        added = doc.layers.add(
            layer.name,
            color=layer.colour,
            lineweight=layer.width,
            linetype=layer.line_type,
            plot=layer.plotted,
        )
        added.description = layer.holds
    style = doc.styles.add(STYLE, font=FONT)
    style.dxf.width = WIDTH_FACTOR
    style.set_extended_font_data("Arial")
    _dimension_style(doc, ELEVATION_STYLE, elevation, decimals=0)
    _dimension_style(doc, SECTION_STYLE, sections, decimals=1)
    doc.header["$TEXTSTYLE"] = STYLE
    doc.header["$DIMSTYLE"] = ELEVATION_STYLE
    doc.header["$LTSCALE"] = 1.0
    doc.header["$PSLTSCALE"] = 1
    doc.header["$LWDISPLAY"] = 1


def _dimension_style(doc: Drawing, name: str, denominator: int, *, decimals: int) -> None:
    """Add a style whose sizes are mm on paper, times the scale; lengths are as measured, in mm."""
    style = doc.dimstyles.add(name)
    values = {
        "dimscale": float(denominator),
        "dimlfac": 1.0,
        "dimtxsty": STYLE,
        "dimtxt": TEXT,
        "dimgap": DIMENSION_GAP,
        "dimtsz": TICK / 2.0,
        "dimasz": TICK,
        "dimexo": EXTENSION_OFFSET,
        "dimexe": EXTENSION_ABOVE,
        "dimfxlon": 1,
        "dimfxl": EXTENSION_LENGTH,
        "dimdle": 0.0,
        "dimtad": 1,
        "dimjust": 0,
        "dimtih": 0,
        "dimtoh": 0,
        "dimtix": 1,
        "dimtofl": 1,
        "dimtmove": 2,
        "dimdec": decimals,
        "dimzin": 8,
        "dimlunit": 2,
        "dimdsep": ord("."),
        "dimclrd": 256,
        "dimclre": 256,
        "dimclrt": 256,
        "dimlwd": -1,
        "dimlwe": -1,
    }
    for name, value in values.items():
        style.dxf.set(name, value)
