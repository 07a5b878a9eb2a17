"""Draws the wireframe of the demo project `scissor_hall`, with what real drawings are full of.

    python tests/scissor.py demo_projects/scissor_hall/roof.dxf

One half is a block of which the other is the mirror image. It is drawn in cm at site coordinates, from a template that
says mm; rafters run in one line from the eaves to the ridge; webs end a millimetre or two short; the middle post comes
twice; a stretch of chord was copied over itself; an older scheme is frozen.
"""

from __future__ import annotations

import math
import sys
from pathlib import Path

from ezdxf._options import options
from ezdxf.document import Drawing
from ezdxf.filemanagement import new
from ezdxf.layouts.blocklayout import BlockLayout
from ezdxf.layouts.layout import Modelspace

PANELS, PANEL = 8, 150.0  # cm
HALF = PANELS * PANEL / 2
PITCH, INNER_PITCH = math.tan(math.radians(30)), math.tan(math.radians(12))
OVERHANG = 45.0
LEFT_BEARING = (412350.0, 1836200.0)  # cm, on the site's grid
SHORT = 0.15  # cm by which webs stop short of the chords
TIES = (2, 4, 6)
_LAYERS = {"STEEL": 7, "PURLIN": 3, "TIE": 4, "COLUMN": 8, "AXIS": 1, "NOTES": 2, "OLD SCHEME": 9}


def scissor_drawing() -> Drawing:
    """Return the drawing."""
    document = new("R2010")
    document.units = 4  # the template's: mm
    for name, colour in _LAYERS.items():
        document.layers.add(name, color=colour)
    document.layers.get("OLD SCHEME").freeze()
    _draw_half(document.blocks.new("HALF TRUSS"))
    tie = document.blocks.new("TIE MARK")
    tie.add_lwpolyline([(-4, -4), (4, -4), (4, 4), (-4, 4)], close=True)
    space = document.modelspace()
    x, y = LEFT_BEARING
    steel = {"layer": "STEEL"}
    space.add_blockref("HALF TRUSS", (x, y), dxfattribs=steel)
    space.add_blockref("HALF TRUSS", (x + 2 * HALF, y), dxfattribs=steel | {"xscale": -1})
    _draw_sloppy_copies(space)
    _draw_marks(space)
    _draw_all_else(space)
    return document


def _top(along: float) -> tuple[float, float]:
    return along, along * PITCH


def _bottom(along: float) -> tuple[float, float]:
    return along, along * INNER_PITCH


def _draw_half(block: BlockLayout) -> None:
    """Draw the left half, the left bearing at its origin, on layer 0, which takes the insert's layer."""
    block.add_line(_top(-OVERHANG), _top(HALF - 0.1))
    block.add_lwpolyline([_bottom(k * PANEL) for k in range(PANELS // 2 + 1)])
    for k in range(1, PANELS // 2 + 1):
        at = k * PANEL
        block.add_line((at, at * INNER_PITCH + SHORT), (at, at * PITCH - SHORT))
        if k > 1:
            block.add_line((at - PANEL + 0.1, (at - PANEL) * INNER_PITCH), _top(at))


def _draw_sloppy_copies(space: Modelspace) -> None:
    """Draw a stretch of chord over itself, and a line of no length."""
    x, y = LEFT_BEARING
    steel = {"layer": "STEEL"}
    start, end = _bottom(1.5 * PANEL), _bottom(2.5 * PANEL)
    space.add_line((x + start[0], y + start[1]), (x + end[0], y + end[1]), dxfattribs=steel)
    at = _top(2 * PANEL)
    space.add_line((x + at[0], y + at[1]), (x + at[0], y + at[1]), dxfattribs=steel)


def _draw_marks(space: Modelspace) -> None:
    """Draw purlins as circles on top of the rafters, and tie lines as blocks at bottom joints."""
    x, y = LEFT_BEARING
    for k in range(PANELS + 1):
        along = k * PANEL
        side = 0 if 2 * k == PANELS else 1 if 2 * k > PANELS else -1
        rise = min(along, 2 * HALF - along) * PITCH
        across = (side * 8 * math.sin(math.atan(PITCH)), 8 * (math.cos(math.atan(PITCH)) if side else 1))
        space.add_circle((x + along + across[0], y + rise + across[1]), 5, dxfattribs={"layer": "PURLIN"})
    for k in TIES:
        at = k * PANEL, min(k, PANELS - k) * PANEL * INNER_PITCH
        space.add_blockref("TIE MARK", (x + at[0], y + at[1]), dxfattribs={"layer": "TIE"})


def _draw_all_else(space: Modelspace) -> None:
    """Draw what belongs to the sheet and not to the truss."""
    x, y = LEFT_BEARING
    for side in (0.0, 2 * HALF):
        space.add_line((x + side, y), (x + side, y - 420), dxfattribs={"layer": "COLUMN"})
    space.add_line((x + HALF, y - 450), (x + HALF, y + 400), dxfattribs={"layer": "AXIS"})
    space.add_line((x + 480, y + 180), (x + 560, y + 150), dxfattribs={"layer": "NOTES"})
    space.add_arc((x + HALF, y - 420), 150, 0, 180, dxfattribs={"layer": "NOTES"})
    space.add_text("TRUSS S1, 5 OFF", height=18, dxfattribs={"layer": "NOTES", "insert": (x, y - 520)})
    words = {"layer": "NOTES", "insert": (x, y - 545), "char_height": 12}
    space.add_mtext("All sizes to be confirmed by the engineer.", words)
    space.add_linear_dim(
        base=(x, y - 600), p1=(x, y), p2=(x + 2 * HALF, y), override={"dimtxt": 18}, dxfattribs={"layer": "NOTES"}
    ).render()
    for k in range(PANELS):
        space.add_line(
            (x + k * PANEL, y - 60), (x + (k + 1) * PANEL, y - 60 + 30 * (k % 2)), dxfattribs={"layer": "OLD SCHEME"}
        )


if __name__ == "__main__":
    options.write_fixed_meta_data_for_testing = True
    scissor_drawing().saveas(Path(sys.argv[1]))
