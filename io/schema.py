"""The project file as a whole: its tables, what must agree between them, and the defaults that were taken."""

from __future__ import annotations

from collections.abc import Iterator
from types import UnionType
from typing import Annotated, Any, Self, Union, get_args, get_origin

from pydantic import ValidationInfo, WrapValidator, model_validator
from pydantic.fields import FieldInfo

from spanwright.io.schema_fields import Name, Names, Table, Text, counted, field, key, refused, subtable
from spanwright.io.schema_loads import LoadsAtSiteTable, LoadsTable
from spanwright.io.schema_members import ConnectionsTable, MembersTable
from spanwright.io.schema_restraint import RestraintTable
from spanwright.io.schema_site import SiteTable
from spanwright.io.schema_truss import FormTruss, TrussTable
from spanwright.io.units import shown
from spanwright.truss.errors import UnknownNameError


class TitleBlockTable(Table):
    """The table [title_block]: data fields of a document's title block by ISO 7200, and the client and project."""

    owner: Text = key("legal owner of the document", "")
    client: Text = key("for whom", "")
    project: Text = key("the whole works", "")
    number: Text = key("identification number", "")
    revision: Text = key("revision index", "")
    date: Text = key("date of issue", "")
    creator: Text = key("who made it", "")
    checker: Text = key("who checked it", "")
    approver: Text = key("who approves it", "")
    department: Text = key("responsible department", "")
    reference: Text = key("technical contact", "")
    supplementary_title: Text = key("second line of the title", "")
    status: Text = key("document status", "")
    language: Text = key("language code", "")


def _by_site(value: Any, _: Any, info: ValidationInfo) -> LoadsTable | LoadsAtSiteTable:
    """Read [loads]; with a site, even one that is not understood, its keys may be left out."""
    alone = info.data.get("site", value) is None
    return (LoadsTable if alone else LoadsAtSiteTable).model_validate(value)


class ProjectFile(Table):
    """A project file."""

    title: Text = key("what the truss is called on documents", "Roof truss")
    mark: Name = key("mark of the truss; pieces are marked with it", "R1")
    quantity: Annotated[int, field(counted(1, 10_000))] = key("how many alike", 1)
    standard: Name = key("the member standard", "SANS 10162-1")
    actions: Name = key(
        'the loading standard with its edition: "SANS 10160:2011", "SANS 10160:2019", "EN 1990:2002, 6.10" or '
        '"EN 1990:2002, 6.10a and 6.10b"; it sets the load factors. An edition\'s wind factor goes with its own wind '
        "map only"
    )
    truss: TrussTable = subtable(FormTruss)
    restraint: RestraintTable = subtable(RestraintTable)
    site: SiteTable | None = key("the place and the building: loads that [loads] leaves out are found from it", None)
    loads: Annotated[LoadsTable | LoadsAtSiteTable, WrapValidator(_by_site)] = subtable(LoadsTable)
    members: MembersTable = subtable(MembersTable)
    connections: ConnectionsTable = subtable(ConnectionsTable)
    groups: dict[Name, Names] = key("members that get a section of their own", {}, otherwise="members group by role")
    title_block: TitleBlockTable = subtable(TitleBlockTable)

    @model_validator(mode="after")
    def _groups_are_named(self) -> Self:
        for group in self.members.groups:
            if group not in self.groups:
                key = f"members.groups.{group}"
                raise refused(UnknownNameError.among(group, list(self.groups), what="group", key=key))
        return self


def defaults_taken(table: Table, path: str = "") -> Iterator[tuple[str, str]]:
    """Yield (dotted key, value as it would be written) of every default that a project file relies on."""
    for name, info in type(table).model_fields.items():
        where = f"{path}{name}"
        if name in table.model_fields_set or info.default_factory is not None:
            yield from _defaults_inside(getattr(table, name), where)
            continue
        extra = info.json_schema_extra
        otherwise = str(extra["otherwise"]) if isinstance(extra, dict) else ""
        text = otherwise if info.default in (None, "", {}, []) else _as_written(info.default)
        if text:
            yield where, text


def _defaults_inside(value: Any, where: str) -> Iterator[tuple[str, str]]:
    if isinstance(value, Table):
        yield from defaults_taken(value, f"{where}.")
    elif isinstance(value, list):
        for number, entry in enumerate(value, 1):
            if isinstance(entry, Table):
                yield from defaults_taken(entry, f"{where}[{number}].")


def _as_written(default: object) -> str:
    return default if isinstance(default, str) else shown(default)


def tables_at(place: tuple[int | str, ...]) -> list[type[Table]]:
    """Return the tables that may stand at a place; [truss] has one for each way of giving it."""
    tables: list[type[Table]] = [ProjectFile]
    for part in place:
        if isinstance(part, str):
            tables = [
                inner for table in tables if part in table.model_fields for inner in _inner(table.model_fields[part])
            ]
    return tables


def all_tables(path: str = "", table: type[Table] = ProjectFile) -> Iterator[tuple[str, type[Table]]]:
    """Yield (dotted place, table) of every table that a project file may hold; "" is the file itself."""
    yield path, table
    for name, info in table.model_fields.items():
        for inner in _inner(info):
            yield from all_tables(f"{path}.{name}" if path else name, inner)


def _inner(info: FieldInfo) -> list[type[Table]]:
    return list(_tables_in(info.annotation))


def _tables_in(annotation: Any) -> Iterator[type[Table]]:
    if isinstance(annotation, type) and issubclass(annotation, Table):
        yield annotation
    elif get_origin(annotation) in (list, Union, UnionType, Annotated):
        for part in get_args(annotation):
            yield from _tables_in(part)
