"""The table [loads] of a project file."""

from __future__ import annotations

from typing import Annotated, Any, ClassVar, Literal, Self

from pydantic import WrapValidator, model_validator

from spanwright.io.schema_fields import Answer, Name, Table, field, key, number, one_of, ranged, refused
from spanwright.io.units import FORCE, PRESSURE, shown
from spanwright.loads.inputs import JointLoad, LoadsInput, MostLeast, WindInput
from spanwright.loads.site_inputs import Derivable
from spanwright.loads.strips import SIDES
from spanwright.truss.errors import InputError

CaseKind = Literal["permanent", "imposed", "snow", "wind"]

_surface_load = ranged(PRESSURE, "kPa", "0 kPa", "20 kPa")
SurfaceLoad = Annotated[float, field(_surface_load)]
WindPressure = Annotated[float, field(ranged(PRESSURE, "kPa", "-10 kPa", "10 kPa"))]
WallForce = Annotated[float, field(ranged(FORCE, "kN", "-500 kN", "500 kN"))]
_point_force = ranged(FORCE, "kN", "-2000 kN", "2000 kN")
PointForce = Annotated[float, field(_point_force)]
ManForce = Annotated[float, field(ranged(FORCE, "kN", "0 kN", "10 kN"))]


class PermanentTable(Table):
    """A permanent load with its greatest and its least credible value."""

    most: SurfaceLoad = key('the greatest credible value, such as "0.25 kPa"')
    least: SurfaceLoad = key('the least credible value, such as "0.18 kPa"; it counts where the load helps')

    def value(self) -> MostLeast:
        """Return it as the loads room takes it."""
        return MostLeast(self.most, self.least)


def _one_or_two(value: Any, table: Any) -> Any:
    if isinstance(value, dict):
        return table(value)
    try:
        load = _surface_load(value)
    except InputError as error:
        raise refused(error) from error
    return PermanentTable.model_construct(most=load, least=load)


Permanent = Annotated[PermanentTable, WrapValidator(_one_or_two)]


class WindTable(Table):
    """A table [[loads.wind]]. Whether a slope exists whose pressure is left out, the loads room judges."""

    name: Name = key('the name of the wind case, such as "across ridge, suction"')
    left: WindPressure | None = key(
        "net pressure normal to the left slope; + presses the roof in, - lifts it", None, otherwise="no such slope"
    )
    right: WindPressure | None = key(
        "net pressure normal to the right slope; + presses the roof in, - lifts it", None, otherwise="no such slope"
    )
    eaves_left: WallForce = key("horizontal force at the left bearing, + to the right", "0 kN")
    eaves_right: WallForce = key("horizontal force at the right bearing, + to the right", "0 kN")
    mirrored: Answer = key("whether the mirrored case is added", True)

    @model_validator(mode="after")
    def _presses(self) -> Self:
        if self.left is None and self.right is None:
            raise refused(
                InputError("a wind case without a pressure", 'write left = "-0.75 kPa" and right = "-0.55 kPa"')
            )
        return self

    def value(self) -> WindInput:
        """Return it as the loads room takes it."""
        unstated = tuple(side for side in SIDES if getattr(self, side) is None)
        left, right = self.left or 0.0, self.right or 0.0
        return WindInput(self.name, left, right, self.eaves_left, self.eaves_right, self.mirrored, unstated)


class PermanentForceTable(Table):
    """A permanent load at a joint with its greatest and its least credible value."""

    most: PointForce = key('the greatest credible value, such as "8 kN"')
    least: PointForce = key('the least credible value, such as "5 kN"; it counts where the load helps')


def _force(value: Any, _: Any) -> float | PermanentForceTable:
    if isinstance(value, dict):
        return PermanentForceTable.model_validate(value)
    try:
        return _point_force(value)
    except InputError as error:
        raise refused(error) from error


JointForce = Annotated[float | PermanentForceTable, WrapValidator(_force)]


class JointLoadTable(Table):
    """A table [[loads.at_joint]]."""

    case: Name = key("the case of this load; the name of an existing case joins that case")
    kind: Annotated[CaseKind, one_of(CaseKind)] = key(
        'what acts; it sets the load factors. Write "permanent", "imposed", "snow" or "wind"'
    )
    joint: Name = key('the joint that carries the load, such as "B6"')
    down: JointForce = key(
        'downward; of a permanent load also { most = "8 kN", least = "5 kN" }: one value is nothing where it helps',
        "0 kN",
    )
    right: JointForce = key("to the right; of a permanent load also with most and least", "0 kN")
    psi: Annotated[float, number(0.0, 1.0)] | None = key(
        "share of an imposed load that accompanies roof imposed, man, snow and wind, 0 to 1",
        None,
        otherwise="1 where it is imposed",
    )

    @model_validator(mode="after")
    def _acts(self) -> Self:
        if not self.model_fields_set & {"down", "right"}:
            raise refused(InputError("a load without a force", 'write down = "5 kN" or right = "1 kN"'))
        pairs = [name for name in ("down", "right") if isinstance(getattr(self, name), PermanentForceTable)]
        if pairs and self.kind != "permanent":
            found = f"{pairs[0]} has a most and a least value, and the load is {self.kind}"
            raise refused(InputError(found, 'write one value; most and least are for kind = "permanent"'))
        return self

    def value(self) -> JointLoad:
        """Return it as the loads room takes it."""
        (down, least_down), (right, least_right) = (
            (force.most, force.least) if isinstance(force, PermanentForceTable) else (force, None)
            for force in (self.down, self.right)
        )
        return JointLoad(self.case, self.kind, self.joint, down, right, least_down, least_right, self.psi)


_MOST_WIND = 200  # far beyond what any standard asks for; each adds some ten combinations


def _none_or_cases(value: Any, cases: Any) -> Any:
    if value == "none":
        return []
    if not isinstance(value, list) or not value:
        found = "no wind case is given" if value == [] else f"{shown(value)} is not a wind case"
        raise refused(InputError(found, 'write wind = "none" if there is none, or tables [[loads.wind]]'))
    if len(value) > _MOST_WIND:
        raise refused(
            InputError(f"{len(value)} wind cases are given", f"give at most {_MOST_WIND}: those that can govern")
        )
    return cases(value)


class _AnyLoads(Table):
    ceiling_permanent: Permanent = key("on plan, at the bottom chord", "0 kPa")
    at_joint: list[JointLoadTable] = key("loads at joints", [])

    def _loads(
        self,
        roof_permanent: PermanentTable | None,
        roof_imposed: float | None,
        man_load: float | None,
        wind: list[WindTable] | None,
    ) -> LoadsInput:
        """Return the loads as the loads room takes them; what is None is nothing here and is found from the site."""
        return LoadsInput(
            roof_permanent=MostLeast(0.0, 0.0) if roof_permanent is None else roof_permanent.value(),
            roof_imposed=roof_imposed or 0.0,
            wind=tuple(table.value() for table in wind or ()),
            ceiling_permanent=self.ceiling_permanent.value(),
            man_load=man_load or 0.0,
            at_joint=tuple(table.value() for table in self.at_joint),
        )


class LoadsTable(_AnyLoads):
    """The table [loads] of a project without a site."""

    roof_permanent: Permanent = key(
        "covering, purlins and services, on the slope; the truss's own mass is added. Write the greatest and the "
        'least credible value, { most = "0.25 kPa", least = "0.18 kPa" }, as the least decides under uplift; '
        "one value stands for both"
    )
    roof_imposed: SurfaceLoad = key(
        'the imposed load of the roof, on plan, by the loading standard for the roof\'s use, such as "0.30 kPa"'
    )
    man_load: ManForce = key("a person and tools, at one place", "0.9 kN")
    wind: Annotated[list[WindTable], WrapValidator(_none_or_cases)] = key(
        "net wind pressures normal to the slopes; uplift decides light roofs. "
        'Write tables [[loads.wind]], or wind = "none" where no wind can act'
    )

    left_open: ClassVar[frozenset[Derivable]] = frozenset()

    def value(self) -> LoadsInput:
        """Return the loads as the loads room takes them."""
        return self._loads(self.roof_permanent, self.roof_imposed, self.man_load, self.wind)


class LoadsAtSiteTable(_AnyLoads):
    """The table [loads] of a project with a site, which finds what is left out here."""

    roof_permanent: Permanent | None = key(
        "covering, purlins and services, on the slope", None, otherwise="a usual sheeted roof is assumed"
    )
    roof_imposed: SurfaceLoad | None = key("imposed on plan", None, otherwise="by the loading standard")
    man_load: ManForce | None = key("a person and tools, at one place", None, otherwise="by the loading standard")
    wind: Annotated[list[WindTable], WrapValidator(_none_or_cases)] | None = key(
        "net wind pressures normal to the slopes", None, otherwise="by the loading standard, from the site"
    )

    @property
    def left_open(self) -> frozenset[Derivable]:
        """The keys that are left to the site."""
        keys: tuple[Derivable, ...] = ("roof_permanent", "roof_imposed", "man_load", "wind")
        return frozenset(key for key in keys if getattr(self, key) is None)

    def value(self) -> LoadsInput:
        """Return the loads as the loads room takes them, nothing standing for what is left to the site."""
        return self._loads(self.roof_permanent, self.roof_imposed, self.man_load, self.wind)
