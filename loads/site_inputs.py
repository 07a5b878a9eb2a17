"""What a user states about the place and the building, as frozen values: mm, MPa, N; speeds in m/s."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Face = Literal["left wall", "right wall", "near gable", "far gable"]
"""Faces of the building, seen along the ridge from the gable that truss positions are measured from."""

NamedPosition = Literal["end", "first interior", "typical interior"]
POSITIONS: tuple[NamedPosition, ...] = ("end", "first interior", "typical interior")

Derivable = Literal["roof_permanent", "roof_imposed", "man_load", "wind", "snow"]
"""Keys of [loads] that can be found from the site."""


@dataclass(frozen=True)
class Opening:
    """Openings in one face of the building.

    area : mm2. start, end : mm along the face between which they lie, from the left wall on a gable, from the near
    gable on a wall; None: anywhere on the face.
    shut_in_storms : they are shut whenever the wind is strong, and count as closed at the ultimate limit state.
    """

    face: Face
    area: float
    start: float | None = None
    end: float | None = None
    shut_in_storms: bool = False


@dataclass(frozen=True)
class SnowInput:
    """Snow at the site.

    ground : MPa, characteristic load on the ground at the site's altitude. exposure, thermal : factors Ce and Ct.
    guards : snow guards or parapets keep the snow from sliding off.
    exceptional : factor on the ground load for exceptional falls; None where the site has none.
    """

    ground: float
    exposure: float = 1.0
    thermal: float = 1.0
    guards: bool = False
    exceptional: float | None = None


@dataclass(frozen=True)
class SiteInput:
    """The place and the building.

    length : mm, of the building along the ridge, from gable to gable.
    width : mm, from wall to wall; None: the distance between the truss's bearings.
    eaves_height : mm, from the ground to the roof's surface above the lower wall.
    gable_overhang : mm, of the roof beyond each gable.
    position : of the truss: a name, or mm from the near gable.
    terrain : category, as the loading standard names it. wind_speed : m/s, basic speed as the standard's map gives it.
    Both are None only where no wind is to be found from the site.
    altitude : mm above the sea. topography : factor on the speed. return_period : years.
    internal : internal pressure coefficients as stated; empty: from the openings, or the standard's pair where none
    are stated.
    column_head_share : share of the wind on a wall that its columns pass to the truss at their heads: 1/2 where they
    are pinned at the base, 3/8 where fixed, 0 where something else takes it.
    national : which national values, where the standard leaves them open; "" = the recommended ones.
    derive : the keys of [loads] that the user left to the site.
    """

    length: float
    eaves_height: float
    terrain: str | None = None
    wind_speed: float | None = None
    position: NamedPosition | float = "typical interior"
    width: float | None = None
    gable_overhang: float = 0.0
    altitude: float = 0.0
    topography: float = 1.0
    return_period: float = 50.0
    internal: tuple[float, ...] = ()
    openings: tuple[Opening, ...] = ()
    column_head_share: float = 0.5
    snow: SnowInput | None = None
    national: str = ""
    derive: frozenset[Derivable] = frozenset()
