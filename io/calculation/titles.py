"""The title block, with the data fields of ISO 7200; what is not given is left for signature."""

from __future__ import annotations

from typing import Any

from spanwright.design.project import Project

KIND = "Structural calculation"

FIELDS = (
    ("owner", "Legal owner"),
    ("client", "Client"),
    ("project", "Project"),
    ("department", "Department"),
    ("reference", "Technical reference"),
    ("number", "Identification number"),
    ("status", "Document status"),
    ("language", "Language"),
)
"""Keys of [title_block] with their names in print; printed where given, and the number always."""

SIGNED = (
    ("revision", "Revision"),
    ("creator", "Prepared"),
    ("checker", "Checked"),
    ("approver", "Approved"),
    ("date", "Date of issue"),
)
"""Fields that are left blank for the hand where they are not given."""

LONGEST_RUNNING = 70
"""Signs of the running title."""


def title_block(project: Project, date: str) -> dict[str, Any]:
    """Return the title block: fields that are given, and fields for signature."""
    given = project.title_block
    values = given | ({"date": date} if date else {})
    return {
        "kind": KIND,
        "title": project.title,
        "supplementary": given.get("supplementary_title", ""),
        "mark": project.mark,
        "fields": [(name, given[key]) for key, name in FIELDS if given.get(key)],
        "running": _running(project.mark, project.title),
        "signed": [(name, values.get(key, "")) for key, name in SIGNED],
        "author": given.get("creator", ""),
    }


def _running(mark: str, title: str) -> str:
    """Return what stands at the head of every page, in one line."""
    text = f"{mark}   {title}".strip()
    return text if len(text) <= LONGEST_RUNNING else f"{text[: LONGEST_RUNNING - 1]}…"


def plain_block(title: str) -> dict[str, Any]:
    """Return the title block of a page that belongs to no project."""
    return {
        "kind": KIND,
        "title": title,
        "supplementary": "",
        "mark": "",
        "running": _running("", title),
        "fields": [],
        "signed": [(name, "") for _, name in SIGNED],
        "author": "",
    }
