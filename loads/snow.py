"""Snow on one roof by EN 1991-1-3: lying evenly, drifted to either slope, exceptional, and hanging over the eaves."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, replace
from typing import Any

from spanwright.loads.intermediate import Intermediate
from spanwright.loads.national import national_basis, national_value
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
    _refuse(site, shape)
    ground = snow.ground * 1e3
    steps = (
        *national_basis(site.national),
        Intermediate("sk", "snow on the ground", ground, "kPa", mark="stated"),
        Intermediate("Ce", "exposure factor", snow.exposure, "-", _LOAD, mark="stated"),
        Intermediate("Ct", "thermal factor", snow.thermal, "-", _LOAD, mark="stated"),
    )
    even = snow.exposure * snow.thermal * ground
    falls = [_Fall("snow", even, "Ce*Ct*sk", steps, snow, site, shape)]
    if snow.exceptional is not None:
        factor = Intermediate("Cesl", "exceptional falls", snow.exceptional, "-", _EXCEPTIONAL, mark="stated")
        falls.append(
            _Fall("exceptional snow", snow.exceptional * even, "Ce*Ct*Cesl*sk", (*steps, factor), snow, site, shape)
        )
    return tuple(arrangement for fall in falls for arrangement in fall.arrangements())


@dataclass(frozen=True)
class _Fall:
    """One kind of snowfall.

    even : kPa on plan for a shape coefficient of 1; product : its formula; steps : the values in it.
    """

    kind: SnowKind
    even: float
    product: str
    steps: Steps
    snow: SnowInput
    site: SiteInput
    shape: RoofShape

    def arrangements(self) -> Iterator[SnowArrangement]:
        """Yield the balanced arrangement, then the drifted ones that differ from it."""
        balanced = self._arrangement("balanced", *(self._coefficient(side, "mu1", "mu") for side in SIDES))
        yield balanced
        if not self.shape.two_slopes:
            return
        onto_left, onto_right = (self._coefficient(side, "mu_drifted", "mu") for side in SIDES)
        for drifted in (
            self._arrangement("drifted to the left", onto_left, self._relieved("right")),
            self._arrangement("drifted to the right", self._relieved("left"), onto_right),
        ):
            if (drifted.left, drifted.right) != (balanced.left, balanced.right):
                yield drifted

    def _arrangement(self, name: str, left: Steps, right: Steps) -> SnowArrangement:
        """Return an arrangement; left, right : the steps to the shape coefficients. One slope is told once."""
        on_left, on_right = self._load("left", left[-1]), self._load("right", right[-1])
        over_left, over_right = (self._hanging(side) for side in SIDES)
        second = (*right, on_right) if self.shape.two_slopes else ()
        return SnowArrangement(
            f"{self.kind} {name}",
            on_left.value / 1e3,
            on_right.value / 1e3,
            over_left[-1].value if over_left else 0.0,
            over_right[-1].value if over_right else 0.0,
            (*self.steps, *left, on_left, *second, *over_left, *over_right),
            self.kind,
        )

    def _load(self, side: SlopeSide, mu: Intermediate) -> Intermediate:
        formula = f"{mu.symbol}*{self.product}"
        meaning = f"{self.kind} on the {self._where(side)}, on plan"
        return Intermediate(self._symbol("s", side), meaning, mu.value * self.even, "kPa", _LOAD, formula, "seen")

    def _coefficient(self, side: SlopeSide, symbol: str, printed: str) -> Steps:
        """Return the pitch of a slope and its shape coefficient: at least 0.8 where guards keep the snow on it."""
        pitch = math.degrees(self.shape.left if side == "left" else self.shape.right)
        found = national_value(self.site.national, symbol, pitch)
        guarded = _values()["snow"]["guarded"]
        if self.snow.guards and found.value < guarded:
            meaning = f"{found.meaning}, not below {guarded:g} as guards keep the snow on"
            found = replace(found, value=guarded, meaning=meaning, clause=_SHAPE, mark="from memory")
        return (
            Intermediate(self._symbol("a", side), f"pitch of the {self._where(side)}", pitch, "deg"),
            replace(found, symbol=self._symbol(printed, side)),
        )

    def _relieved(self, side: SlopeSide) -> Steps:
        """Return the steps to the shape coefficient of the slope that loses snow to the other."""
        pitch, lying = self._coefficient(side, "mu1", "mu1")
        relief = national_value(self.site.national, "relief")
        left_on = Intermediate(
            self._symbol("mu", side),
            "shape coefficient, slope that the snow drifts from",
            relief.value * lying.value,
            "-",
            relief.clause,
            f"{relief.symbol}*{lying.symbol}",
            relief.mark,
        )
        return pitch, lying, relief, left_on

    def _hanging(self, side: SlopeSide) -> Steps:
        """Return the steps to the snow, kN/m, that hangs over an eaves beyond the wall; none where it does not.

        It follows from the balanced load, in every arrangement.
        """
        lowest = national_value(self.site.national, "hanging_from")
        lying = self._coefficient(side, "mu1", "mu")[-1].value * self.even
        if not self._has_eaves_overhang(side) or lying == 0.0 or self.site.altitude <= lowest.value * 1e3:
            return ()
        density, factor = _values()["hanging"]["density"], _values()["hanging"]["shape"]
        depth = lying / density
        shape = min(factor / depth, depth * density)
        s, d, k = (self._symbol(symbol, side) for symbol in ("s0", "d", "k"))
        where = f"over the {side} eaves"
        return (
            lowest,
            Intermediate(s, f"balanced snow, {side}", lying, "kPa", _LOAD),
            Intermediate(d, f"its depth, at {density:g} kN/m3", depth, "m", _HANGING, f"{s}/{density:g}", "assumed"),
            Intermediate(
                k,
                f"irregular shape of the snow that hangs {where}",
                shape,
                "-",
                _HANGING,
                f"min({factor:g}/{d}, {d}*{density:g})",
                "from memory",
            ),
            Intermediate(
                self._symbol("se", side),
                f"snow that hangs {where}",
                shape * lying**2 / density,
                "kN/m",
                _HANGING,
                f"{k}*{s}**2/{density:g}",
                "from memory",
            ),
        )

    def _has_eaves_overhang(self, side: SlopeSide) -> bool:
        """Return whether the roof falls to this side and goes beyond the wall there."""
        at = SIDES.index(side)
        beyond = abs(self.shape.edges[at] - self.shape.walls[at]) > TOLERANCES.same_point
        return beyond and self.shape.kind != f"rises to the {side}"

    def _symbol(self, symbol: str, side: SlopeSide) -> str:
        return f"{symbol}_{side}" if self.shape.two_slopes else symbol

    def _where(self, side: SlopeSide) -> str:
        return f"{side} slope" if self.shape.two_slopes else "roof"


def _refuse(site: SiteInput, shape: RoofShape) -> None:
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


def _values() -> dict[str, Any]:
    return read_values("eurocode.toml")
