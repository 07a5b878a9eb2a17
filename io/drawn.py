"""A truss that a project file takes from a drawing: its joints and bars, and the restraint that the drawing marks."""

from __future__ import annotations

import hashlib
from collections import Counter
from dataclasses import dataclass, replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

from spanwright.design.project import DrawingRecord
from spanwright.io.files import input_hash
from spanwright.io.schema_drawing import key_of
from spanwright.io.schema_restraint import RestraintTable
from spanwright.io.schema_truss import DrawnTruss
from spanwright.truss.errors import DrawingError, InputError, OutputError
from spanwright.truss.inputs import GivenInput, RestraintInput

if TYPE_CHECKING:
    from spanwright.io.wireframe import Report, Wireframe

_FIELDS = {
    "purlins": "purlins",
    "ridge_purlins": "ridge_pair",
    "knee_braces": "knee_braces",
    "bottom_ties": "bottom_ties",
}
"""Keys of [restraint] that a drawing can mark, and the fields of `RestraintInput` that they are."""


@dataclass(frozen=True)
class Drawn:
    """What a project takes from a drawing.

    keys_marked : dotted keys that the drawing answers, so that no default was used for them. warnings : sentences.
    source : the text of the project file, closed by a remark with the hash of the drawing.
    """

    truss: GivenInput
    restraint: RestraintInput
    keys_marked: frozenset[str]
    warnings: tuple[str, ...]
    source: str
    drawing: DrawingRecord


def read_drawn(table: DrawnTruss, restraint: RestraintTable, text: str, folder: Path) -> Drawn:
    """Read the drawing that a project file names. It loads the DXF library.

    text : of the project file. folder : what the drawing's path is relative to.

    Raises DrawingError or InputError, with the project file's key, where the drawing gives no truss or where it
    marks purlins by no rule and [restraint] states none.
    """
    from spanwright.io.wireframe import report_record

    path = folder / table.wireframe
    wireframe = _imported(table, path)
    digest = hashlib.sha256(path.read_bytes()).hexdigest()
    source = f"{text}\n# {table.wireframe} as read: SHA-256 {digest}\n"
    marked, beaten = _marked(table, restraint, wireframe)
    copy, trouble = _marked_copy(path, wireframe.report, source)
    return Drawn(
        truss=wireframe.given,
        restraint=replace(restraint.value(), **{_FIELDS[name]: value for name, value in marked.items()}),
        keys_marked=frozenset(f"restraint.{name}" for name in marked),
        warnings=(*_warnings(table.wireframe, wireframe.report), *beaten, *trouble),
        source=source,
        drawing=DrawingRecord(table.wireframe, digest, report_record(wireframe.report), copy),
    )


def _imported(table: DrawnTruss, path: Path) -> Wireframe:
    """Import the drawing; what is wrong with it names the project file's key."""
    from spanwright.io.wireframe import import_wireframe

    try:
        return import_wireframe(path, table.drawing.options(table.supports, table.overhang))
    except (DrawingError, InputError) as error:
        whole = f"spanwright wireframe {table.wireframe} prints the whole report and marks a copy of the drawing"
        remedy = f"{error.remedy}\n  {whole}" if path.is_file() else _near_by(path) or error.remedy
        found = f"{table.wireframe}: {error.found}"
        raise replace(error, found=found, remedy=remedy, key=_project_key(error.key), file="") from error


def _near_by(path: Path) -> str:
    others = sorted(entry.name for entry in path.parent.glob("*.[dD][xX][fF]"))[:6] if path.parent.is_dir() else []
    return f"in that folder: {', '.join(others)}" if others else ""


def _project_key(option: str) -> str:
    """Return the project file's key of an option of the import; that of the drawing where it is none."""
    if option in ("supports", "overhang"):
        return f"truss.{option}"
    return f"truss.drawing.{key_of(option)}" if key_of(option) else "truss.wireframe"


def _marked(table: DrawnTruss, restraint: RestraintTable, wireframe: Wireframe) -> tuple[dict[str, Any], list[str]]:
    """Return what the drawing answers of [restraint], by key, and sentences where the file states something else."""
    stated, purlins = restraint.value(), wireframe.purlins
    drawn: dict[str, Any] = {"knee_braces": wireframe.knee_braces, "bottom_ties": wireframe.ties}
    drawn = {name: joints for name, joints in drawn.items() if joints}
    if purlins.rule is not None:
        drawn |= {"purlins": purlins.rule, "ridge_purlins": purlins.ridge_pair}
    elif table.drawing.marks.purlins and "purlins" not in restraint.model_fields_set:
        found = "marks purlins that no rule says" if purlins.purlins else "marks no purlin on the top chord"
        raise InputError(
            f"{table.wireframe} {found}, and the file does not say where they stand",
            'write "at joints", a greatest spacing such as "1.5 m", or a list of distances; '
            f"spanwright wireframe {table.wireframe} reports the marks",
            "restraint.purlins",
        )
    beaten = [
        f"restraint.{name} is stated and differs from what {table.wireframe} marks; the statement was taken"
        for name, value in drawn.items()
        if name in restraint.model_fields_set and getattr(stated, _FIELDS[name]) != value
    ]
    return {name: value for name, value in drawn.items() if name not in restraint.model_fields_set}, beaten


def _warnings(name: str, report: Report) -> list[str]:
    counts = Counter((finding.code, finding.meaning) for finding in report.findings if finding.severity == "warning")
    if not counts:
        return []
    listed = "; ".join(f"{code} {meaning}" + (f" ({n})" if n > 1 else "") for (code, meaning), n in counts.items())
    many = "s" if counts.total() > 1 else ""
    return [f"the import of {name} gave {counts.total()} warning{many}: {listed}; the findings say where"]


def _marked_copy(path: Path, report: Report, source: str) -> tuple[bytes, list[str]]:
    """Return the marked copy of the drawing, or a sentence on why there is none."""
    from spanwright.io.wireframe import marked_copy

    try:
        return marked_copy(path, report, input_hash(source)), []
    except (DrawingError, OutputError) as error:
        return b"", [f"no marked copy of the drawing could be made: {error.found}"]
