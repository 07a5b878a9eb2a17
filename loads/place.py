"""Where a truss stands in the building, and the strip of roof that it carries."""

from __future__ import annotations

from dataclasses import replace

from spanwright.loads import derivation as say
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import POSITIONS, NamedPosition, SiteInput
from spanwright.truss.errors import InputError
from spanwright.truss.tolerances import TOLERANCES


def at_every_position(site: SiteInput, spacing: float) -> dict[NamedPosition, SiteInput]:
    """Return the site with the truss at the end, at the first interior place and at the typical interior one, as far as
    the building is long enough to have them.
    """
    bays = site.length / spacing
    return {name: replace(site, position=name) for at, name in enumerate(POSITIONS) if bays >= 2 * at or at == 0}


def truss_position(site: SiteInput, spacing: float) -> float:
    """Return how far the truss stands from the near gable, mm.

    "end" stands at the gable, "first interior" one spacing from it, "typical interior" two, or at mid-length of a
    shorter building: of the trusses beyond the first interior one the most exposed.

    Raises InputError (key "site.truss") for a place outside the building.
    """
    if isinstance(site.position, str):
        bays = POSITIONS.index(site.position)
        position = bays * spacing if bays < 2 else min(bays * spacing, site.length / 2)
    else:
        position = site.position
    if not 0.0 <= position <= site.length:
        raise InputError(
            f"the truss stands {say.metres(position)} from the near gable, outside a building "
            f"{say.metres(site.length)} long",
            f"state a distance from 0 m to {say.metres(site.length)}, or one of {', '.join(POSITIONS)}",
            "site.truss",
        )
    return position


def truss_strip(shape: RoofShape, position: float, spacing: float, tributary: float) -> tuple[float, float]:
    """Return from where to where along the ridge, mm, a truss carries the roof.

    Half-way to its neighbours, which stand one spacing away or at the gable where that is nearer; at a gable to the
    roof's edge. A tributary width that differs from the spacing is taken as stated, about the truss, within the roof.
    """
    start, end = shape.ends
    if abs(tributary - spacing) > TOLERANCES.same_point:
        low = min(max(position - tributary / 2, start), end - tributary)
        if low < start:
            length = say.metres(end - start)
            raise InputError(
                f"a tributary width of {say.metres(tributary)} is more than the roof is long, {length}",
                "check tributary_width and the building's length",
                "truss.tributary_width",
            )
        return low, low + tributary
    from_end = shape.length - position
    at_near, at_far = position <= TOLERANCES.same_point, from_end <= TOLERANCES.same_point
    return (
        start if at_near else position - min(spacing, position) / 2,
        end if at_far else position + min(spacing, from_end) / 2,
    )
