"""The standards a project may name."""

from __future__ import annotations

from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.standard import Standard
from spanwright.truss.errors import UnknownNameError

STANDARDS: dict[str, Standard] = {"SANS 10162-1": SANS_10162_1}


def standard_named(name: str) -> Standard:
    """Return the member standard a project names; UnknownNameError (key "standard") if there is none."""
    if name not in STANDARDS:
        raise UnknownNameError.among(name, list(STANDARDS), what="member standard", key="standard")
    return STANDARDS[name]
