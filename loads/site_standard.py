"""What a loading standard answers about a site: the seam between one file a standard and the way to the truss."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, Protocol

from spanwright.loads.intermediate import Intermediate
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import SiteInput

SnowKind = Literal["snow", "exceptional snow"]
"""Of a load case: exceptional falls are an accidental action."""


@dataclass(frozen=True)
class Imposed:
    """Imposed load of a roof that people tread only to maintain it: MPa on plan, and the alternative of one man, N."""

    pressure: float
    man: float
    steps: tuple[Intermediate, ...]


@dataclass(frozen=True)
class PeakPressure:
    """Peak velocity pressure at a height, MPa; steps in the order of calculation, the pressure last."""

    pressure: float
    steps: tuple[Intermediate, ...]
    warnings: tuple[str, ...] = ()


@dataclass(frozen=True)
class SnowArrangement:
    """One arrangement of snow: MPa on plan of each slope, and N/mm along each eaves where snow hangs over it.

    On a roof of one slope both slopes carry the same.
    """

    name: str
    left: float
    right: float
    edge_left: float = 0.0
    edge_right: float = 0.0
    steps: tuple[Intermediate, ...] = ()
    kind: SnowKind = "snow"


class SiteStandard(Protocol):
    """A loading standard with its edition and national values."""

    @property
    def name(self) -> str:
        """As the project file spells it: "SANS 10160:2019"."""

    @property
    def internal_pair(self) -> tuple[Intermediate, ...]:
        """Internal pressure coefficients to take where nothing is known of the openings."""

    def imposed(self, site: SiteInput, shape: RoofShape, area: float) -> Imposed:
        """Return the imposed load for a loaded area, mm2 on plan."""

    def peak_pressure(self, site: SiteInput, height: float) -> PeakPressure:
        """Return the peak velocity pressure at a height above ground, mm.

        Raises InputError (keys site.wind_speed, site.terrain, ...) for what is missing, unknown or mismatched with the
        edition.
        """

    def snow(self, site: SiteInput, shape: RoofShape) -> tuple[SnowArrangement, ...]:
        """Return every arrangement of snow, none where the site has none.

        Raises InputError where the standard does not cover the site, or has no snow part.
        """
