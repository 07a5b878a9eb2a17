"""The whole of results.json, put together from its parts."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

from spanwright import __version__
from spanwright.design.project import DrawingRecord
from spanwright.design.result import Design
from spanwright.io.files import input_hash, write_atomically
from spanwright.io.results.actions import cases, combinations, deflection, equilibrium, reactions, site
from spanwright.io.results.members import assembly_of, groups, members, pieces
from spanwright.io.results.numbers import kilograms, millimetres
from spanwright.io.results.restraint import restraint

SCHEMA = "spanwright-results-1"


def document(design: Design) -> dict[str, Any]:
    """Return results.json as a dictionary; its keys are held by tests/io/results.schema.json."""
    setting = design.setting
    truss, project = setting.truss, setting.project
    return {
        "schema": SCHEMA,
        "program": {"name": "Spanwright", "version": __version__},
        "input_sha256": input_hash(project.source),
        "passes": design.passes,
        "sign_convention": "x right, y up; tension +, compression -; sagging +; reactions act on the truss",
        "project": {
            "title": project.title,
            "mark": project.mark,
            "quantity": project.quantity,
            "file": project.source_name,
            "standard": setting.standard.name,
            "actions": project.actions,
            "form": truss.form,
            "diagonals": truss.lean,
            "as_read": project.source,
        },
        "defaults_used": [{"key": key, "value": value} for key, value in project.defaults_used],
        "joints": [
            {"name": name, "x_mm": millimetres(float(x)), "y_mm": millimetres(float(y))}
            for name, (x, y) in zip(truss.joint_names, truss.xy, strict=True)
        ],
        "supports": [
            {"joint": truss.joint_names[support.joint], "holds_x": support.x, "holds_y": support.y}
            for support in truss.supports
        ],
        "site": site(design),
        "cases": cases(design),
        "combinations": combinations(design),
        "reactions": reactions(design),
        "members": members(design),
        "groups": groups(design),
        "pieces": pieces(design),
        "assembly": assembly_of(design),
        "restraint": restraint(design),
        "equilibrium": equilibrium(design),
        "deflection": deflection(design),
        "mass_kg": kilograms(design.mass),
        "drawing": _drawing(project.drawing),
        "findings": project.drawing.record["findings"] if project.drawing else [],
        "warnings": list(design.warnings),
        "cautions": list(design.cautions),
    }


def _drawing(drawing: DrawingRecord | None) -> dict[str, Any] | None:
    if drawing is None:
        return None
    return {"sha256": drawing.sha256} | {key: value for key, value in drawing.record.items() if key != "findings"}


def write_results(design: Design, folder: Path) -> Path:
    """Write results.json into a folder and return its path; OutputError where that cannot be done."""
    path = folder / "results.json"
    text = json.dumps(document(design), indent=1, ensure_ascii=False, allow_nan=False)
    write_atomically(path, (text + "\n").encode())
    return path
