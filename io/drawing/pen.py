"""The pen: draws on one layout, with sizes of lettering in mm on paper."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np
from ezdxf.enums import TextEntityAlignment
from ezdxf.layouts.base import BaseLayout

from spanwright.io.drawing.lettering import TEXT, printable
from spanwright.io.drawing.standards import STYLE, Layer
from spanwright.truss.arrays import FloatArray

Across = Literal["left", "centre", "right"]
Up = Literal["base", "middle"]
Point = Sequence[float] | FloatArray

_PLACES = {
    ("left", "base"): TextEntityAlignment.LEFT,
    ("centre", "base"): TextEntityAlignment.CENTER,
    ("right", "base"): TextEntityAlignment.RIGHT,
    ("left", "middle"): TextEntityAlignment.MIDDLE_LEFT,
    ("centre", "middle"): TextEntityAlignment.MIDDLE_CENTER,
    ("right", "middle"): TextEntityAlignment.MIDDLE_RIGHT,
}


@dataclass(frozen=True)
class Pen:
    """Draws on a layout in the layout's own mm; `scale` of them make one mm on paper (50 in model space at 1:50).
    dimension_style : name of the style that dimensions take.
    """

    layout: BaseLayout
    scale: float = 1.0
    dimension_style: str = ""

    def line(self, layer: Layer, start: Point, end: Point) -> None:
        """Draw a line."""
        self.layout.add_line(_pair(start), _pair(end), dxfattribs={"layer": layer.name})

    def path(self, layer: Layer, points: FloatArray, *, closed: bool = False) -> None:
        """Draw lines through (n, 2) points."""
        self.layout.add_lwpolyline([_pair(point) for point in points], close=closed, dxfattribs={"layer": layer.name})

    def circle(self, layer: Layer, centre: Point, radius: float) -> None:
        """Draw a circle."""
        self.layout.add_circle(_pair(centre), radius, dxfattribs={"layer": layer.name})

    def area(self, layer: Layer, points: FloatArray) -> None:
        """Fill the inside of (n, 2) points."""
        hatch = self.layout.add_hatch(dxfattribs={"layer": layer.name, "color": 256})
        hatch.paths.add_polyline_path([_pair(point) for point in points], is_closed=True)

    def hatching(self, layer: Layer, rings: Sequence[FloatArray], spacing: float) -> None:
        """Hatch the inside of rings at 45 degrees, lines `spacing` mm on paper apart; inner rings stay free."""
        hatch = self.layout.add_hatch(dxfattribs={"layer": layer.name, "color": 256})
        apart = spacing * self.scale
        offset = (-apart * np.sqrt(0.5), apart * np.sqrt(0.5))
        hatch.set_pattern_fill("ANSI31", scale=1.0, definition=[[45.0, (0.0, 0.0), offset, []]])
        for place, ring in enumerate(rings):
            hatch.paths.add_polyline_path([_pair(point) for point in ring], is_closed=True, flags=16 if place else 1)

    def text(
        self,
        layer: Layer,
        at: Point,
        text: str,
        height: float = TEXT,
        *,
        across: Across = "left",
        up: Up = "base",
        angle: float = 0.0,
    ) -> None:
        """Letter one line of text, `height` mm on paper, turned by `angle` degrees."""
        if not (shown := printable(text)).strip():
            return
        attributes = {"layer": layer.name, "style": STYLE, "rotation": angle}
        entity = self.layout.add_text(shown, height=height * self.scale, dxfattribs=attributes)
        entity.dxf.width = self.layout.doc.styles.get(STYLE).dxf.width
        entity.set_placement(_pair(at), align=_PLACES[across, up])

    def dimension(
        self,
        layer: Layer,
        start: Point,
        end: Point,
        line: Point,
        angle: float,
        *,
        shift: float = 0.0,
        sign: str = "",
    ) -> None:
        """Dimension the distance of two points in a direction, degrees; `line` is a point of the dimension line.

        shift : mm on paper by which its text stands off its middle, in that direction. sign : stands before the length.
        """
        dimension = self.layout.add_linear_dim(
            base=_pair(line),
            p1=_pair(start),
            p2=_pair(end),
            angle=angle,
            text=f"{sign}<>",
            dimstyle=self.dimension_style,
            dxfattribs={"layer": layer.name},
        )
        if shift:
            dimension.shift_text(shift * self.scale, 0.0)
        dimension.render()


def _pair(point: Point) -> tuple[float, float]:
    return float(point[0]), float(point[1])
