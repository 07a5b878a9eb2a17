"""Snow and wind found from the site, laid on the roof over one truss."""

from __future__ import annotations

from collections.abc import Iterator

from spanwright.loads.bending import Part
from spanwright.loads.pressures import WindField
from spanwright.loads.roof import Roof
from spanwright.loads.site_standard import SnowArrangement, SnowKind
from spanwright.loads.walls import wall_forces, wall_sides


def snow_parts(roof: Roof, snow: tuple[SnowArrangement, ...]) -> Iterator[tuple[str, SnowKind, Part]]:
    """Yield the name and the kind of each arrangement of snow and what it does."""
    for fallen in snow:
        edges = (fallen.edge_left, fallen.edge_right)
        part = roof.snow(fallen.left, fallen.right, edges, tuple(map(str, fallen.steps)))
        yield fallen.name, fallen.kind, part


def wind_parts(roof: Roof, field: WindField) -> Iterator[tuple[str, Part, Part]]:
    """Yield the name of each wind case and what it does on the roof and on the walls.

    The first case tells how the peak pressure came about, the others only what it is.
    """
    walls = wall_sides(roof.truss, field.shape)
    peak = tuple(map(str, field.peak.steps))
    for number, case in enumerate(field.cases):
        head = (*(peak if number == 0 else peak[-1:]), *case.derivation)
        forces = wall_forces(roof.truss, walls, case.walls, field.wall_width, field.site.column_head_share)
        yield case.name, roof.surface(field.cuts, case.net, head), roof.beams.at_joints(*forces)
