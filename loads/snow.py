"""Snow on one roof by EN 1991-1-3: lying evenly, drifted to either slope, exceptional, and hanging over the eaves."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, replace
from typing import Any

from spanwright.loads.intermediate import Intermediate
from spanwright.loads.national import national_value
from spanwright.loads.roof_shape import RoofShape
from spanwright.loads.site_inputs import SiteInput, SnowInput
from spanwright.loads.site_standard import SnowArrangement, SnowKind
from spanwright.loads.strips import SIDES
from spanwright.loads.tables import read_values
from spanwright.truss.chords import SlopeSide
from spanwright.truss.errors import InputError
from spanwright.truss.tolerances import TOLERANCES

_LOAD = "EN 1991-1-3 cl. 5.2"
_SHAPE = "EN 1991-1-3 cl. 5.3"
_EXCEPTIONAL = "EN 1991-1-3 cl. 4.3"
_HANGING = "EN 1991-1-3 cl. 6.3"

Steps = tuple[Intermediate, ...]


def snow_arrangements(snow: SnowInput, site: SiteInput, shape: RoofShape) -> tuple[SnowArrangement, ...]:
    """Return every arrangement of snow on a roof of one slope, or of two that meet at a ridge.

    Balanced; on two slopes also drifted to the left and to the right, where that differs; all once more for exceptional
    falls where the site has them.

    Raises InputError for a site above 1500 m (key "site.altitude") and for a trough (key "site.snow").
    """
    highest = _values()["snow"]["highest"]
    otherwise = 'leave [site.snow] out, and state the snow in [[loads.at_joint]] with kind = "snow"'
    if site.altitude > highest * 1e3:
        raise InputError(
            f"the site lies {site.altitude / 1e3:g} m above the sea, and EN 1991-1-3 covers snow to {highest:g} m",
            otherwise,
            "site.altitude",
        )
    if shape.kind == "trough":
        raise InputError(
            "the slopes meet in a trough, where snow drifts together: no shape is known here for such a roof alone",
            otherwise,
            "site.snow",
        )
    ground = (
        Intermediate("sk", "snow on the ground", snow.ground * 1e3, "kPa", mark="stated"),
        Intermediate("Ce", "exposure factor", snow.exposure, "-", _LOAD, mark="stated"),
        Intermediate("Ct", "thermal factor", snow.thermal, "-", _LOAD, mark="stated"),
    )
    falls = [_Fall("snow", ground, "Ce*Ct*sk", snow, site, shape)]
    if snow.exceptional is not None:
        factor = Intermediate("Cesl", "exceptional falls", snow.exceptional, "-", _EXCEPTIONAL, mark="stated")
        falls.append(_Fall("exceptional snow", (*ground, factor), "Ce*Ct*Cesl*sk", snow, site, shape))
    return tuple(arrangement for fall in falls for arrangement in fall.arrangements())


@dataclass(frozen=True)
class _Fall:
    """One kind of snowfall; `product` of the `ground` steps is the load for a shape coefficient of 1."""

    kind: SnowKind
    ground: Steps
    product: str
    snow: SnowInput
    site: SiteInput
    shape: RoofShape

    def arrangements(self) -> Iterator[SnowArrangement]:
        """Yield the balanced arrangement, then the drifted ones that differ from it."""
        left, right = (self._coefficient(side, "mu1") for side in SIDES)
        balanced = self._arrangement("balanced", left, right)
        yield balanced
        if not self.shape.two_slopes:
            return
        onto_left, onto_right = (self._coefficient(side, "mu_drifted") for side in SIDES)
        for drifted in (
            self._arrangement("drifted to the left", onto_left, self._relieved("right")),
            self._arrangement("drifted to the right", self._relieved("left"), onto_right),
        ):
            if (drifted.left, drifted.right) != (balanced.left, balanced.right):
                yield drifted

    def _arrangement(self, name: str, left: Steps, right: Steps) -> SnowArrangement:
        """Return the arrangement of two slopes, each with the steps to its shape coefficient."""
        on_left, on_right = self._load("left", left[-1]), self._load("right", right[-1])
        hanging = {side: self._hanging(side) for side in SIDES}
        edges = {side: steps[-1].value if steps else 0.0 for side, steps in hanging.items()}
        return SnowArrangement(
            f"{self.kind} {name}",
            on_left.value / 1e3,
            on_right.value / 1e3,
            edges["left"],
            edges["right"],
            (*self.ground, *left, on_left, *right, on_right, *hanging["left"], *hanging["right"]),
            self.kind,
        )

    def _load(self, side: SlopeSide, coefficient: Intermediate) -> Intermediate:
        load = coefficient.value * math.prod(step.value for step in self.ground)
        formula = f"{coefficient.symbol}*{self.product}"
        return Intermediate(
            f"s_{side}", f"{self.kind} on the {side} slope, on plan", load, "kPa", _LOAD, formula, "seen"
        )

    def _coefficient(self, side: SlopeSide, symbol: str, printed: str = "mu") -> Steps:
        """Return the pitch of a slope and its shape coefficient: at least 0.8 where guards keep the snow on it."""
        pitch = math.degrees(getattr(self.shape, side))
        found = national_value(self.site.national, symbol, pitch)
        meaning = f"{found.meaning}, {side} slope"
        guarded = _values()["snow"]["guarded"]
        if self.snow.guards and found.value < guarded:
            found = replace(found, value=guarded, clause=_SHAPE, mark="from memory")
            meaning += ", guards keep the snow on it"
        angle = Intermediate(f"a_{side}", f"pitch of the {side} slope", pitch, "deg")
        return angle, replace(found, symbol=f"{printed}_{side}", meaning=meaning)

    def _relieved(self, side: SlopeSide) -> Steps:
        """Return the steps to the shape coefficient of the slope that loses snow to the other."""
        lying = self._coefficient(side, "mu1", "mu1")
        relief = national_value(self.site.national, "relief")
        mu = Intermediate(
            f"mu_{side}",
            f"shape coefficient, {side} slope, drifted",
            relief.value * lying[-1].value,
            "-",
            _SHAPE,
            f"relief*mu1_{side}",
            relief.mark,
        )
        return *lying, relief, mu

    def _hanging(self, side: SlopeSide) -> Steps:
        """Return the steps to the snow, kN/m, that hangs over an eaves beyond the wall; none where it does not.

        It follows from the balanced load, in every arrangement.
        """
        lying = self._load(side, self._coefficient(side, "mu1")[-1]).value
        lowest = national_value(self.site.national, "hanging_from")
        if not self._eaves_overhang(side) or lying == 0.0 or self.site.altitude <= lowest.value * 1e3:
            return ()
        density, shape = _values()["hanging"]["density"], _values()["hanging"]["shape"]
        s = f"s0_{side}"
        depth = lying / density
        k = min(shape / depth, depth * density)
        where = f"over the {side} eaves"
        return (
            lowest,
            Intermediate(s, f"balanced snow on the {side} slope", lying, "kPa", _LOAD),
            Intermediate(
                f"d_{side}", f"depth of the snow {where}", depth, "m", _HANGING, f"{s}/{density:g}", "assumed"
            ),
            Intermediate(
                f"k_{side}",
                f"irregular shape of the snow {where}",
                k,
                "-",
                _HANGING,
                f"min({shape:g}/d_{side}, d_{side}*{density:g})",
                "from memory",
            ),
            Intermediate(
                f"se_{side}",
                f"snow that hangs {where}",
                k * lying**2 / density,
                "kN/m",
                _HANGING,
                f"k_{side}*{s}**2/{density:g}",
                "from memory",
            ),
        )

    def _eaves_overhang(self, side: SlopeSide) -> bool:
        """Return whether the roof falls to this side and goes beyond the wall there."""
        if self.shape.kind == f"rises to the {side}":
            return False
        at = SIDES.index(side)
        return abs(self.shape.edges[at] - self.shape.walls[at]) > TOLERANCES.same_point


def _values() -> dict[str, Any]:
    return read_values("eurocode.toml")
