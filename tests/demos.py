"""The demo projects, read once."""

from __future__ import annotations

from dataclasses import replace
from functools import cache
from pathlib import Path

from spanwright.design.project import Project
from spanwright.io.project_file import read_project

FOLDER = Path(__file__).parents[1] / "demo_projects"
DEMOS = ("howe_workshop", "pratt_store", "fink_barn", "coast_shed", "scissor_hall")


@cache
def demo(name: str) -> Project:
    """Return the project of a demo folder."""
    return read_project(FOLDER / name / "roof.toml")


def with_any_legs(project: Project) -> Project:
    """Return the project with unequal angles allowed, where a demo keeps to the stocked equal ones."""
    return replace(project, members=replace(project.members, equal_legs=False))
