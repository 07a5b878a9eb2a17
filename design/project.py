"""The project: everything a user states, as frozen values in N, mm, MPa and rad. Knows nothing of files or units."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Any, Literal

from spanwright.design.catalogue import Process
from spanwright.design.standard import Ends, Packs
from spanwright.loads.inputs import LoadsInput
from spanwright.loads.site_inputs import SiteInput
from spanwright.truss.inputs import FormInput, GivenInput, RestraintInput
from spanwright.truss.model import Role


@dataclass(frozen=True)
class MembersInput:
    """What the members may be made of.

    steel : grade of the angles; tubes take its hollow-section twin.
    gap : mm, gusset thickness between back-to-back angles.
    by_role : for each role a family to choose from ("2L") or one section ("2L 80x80x6").
    by_group : the same for groups that the user names; overrides the role.
    min_leg, min_thickness, min_wall : mm; legs and thickness of angles, wall of tubes.
    stocked : "South Africa" or "any". equal_legs : of angles to choose from, only those with equal legs.
    tube_process : whether tubes are taken from the "cold" formed or the "hot" finished sizes; struts have the strength
        of cold-formed ones either way.
    fixings : share of the own mass added for gussets and bolts; absent where it helps.
    packs, stock_length (mm), setback (mm), web_angles : as in the project file.
    """

    steel: str
    by_role: dict[Role, str]
    by_group: dict[str, str] = field(default_factory=dict)
    gap: float = 8.0
    min_leg: float = 50.0
    min_thickness: float = 5.0
    min_wall: float = 3.0
    stocked: str = "South Africa"
    equal_legs: bool = False
    tube_process: Process = "cold"
    fixings: float = 0.08
    packs: Packs = Packs()
    stock_length: float = 12000.0
    setback: float = 20.0
    one_side: bool = True


@dataclass(frozen=True)
class DeflectionLimits:
    """Span over these numbers; any joint against the line between bearings."""

    variable: float = 300.0
    total: float = 250.0


@dataclass(frozen=True)
class DrawingRecord:
    """The drawing that a truss was read from, for the record: the design takes nothing from it.

    name : as the project file spells it. sha256 : of the file's bytes, hexadecimal.
    record : what was understood, every finding, and what became of every entity, as plain values for JSON.
    marked : the drawing with the findings marked, as a DXF file; empty where it cannot be written again.
    """

    name: str
    sha256: str
    record: dict[str, Any]
    marked: bytes = field(default=b"", repr=False)


@dataclass(frozen=True)
class Project:
    """One truss, as the user states it.

    title, mark, quantity : for the schedule. standard, actions : names with edition as the project file spells them.
    truss : a form or joints and bars. supports : "left pinned, right sliding", "both pinned" or "as given".
    site : the place and the building, from which loads are found that the user did not state; None: all are stated.
    spacing : mm truss to truss; tributary : mm of roof carried, equal to the spacing unless stated.
    groups : members (bar names) that get one section, beyond the grouping by role.
    title_block : ISO 7200 fields for documents (owner, number, revision, creator, approver...), all text.
    defaults_used : (key, value as text) of every default taken, for the record.
    warnings : sentences on the input, from reading it.
    source : the text of the input that was read, whose hash every output carries, closed by a remark with the hash of
        the drawing where there is one; source_name : its file name. drawing : what the truss was read from, if any.
    """

    title: str
    standard: str
    actions: str
    truss: FormInput | GivenInput
    supports: Literal["left pinned, right sliding", "both pinned", "as given"]
    spacing: float
    tributary: float
    restraint: RestraintInput
    loads: LoadsInput
    members: MembersInput
    site: SiteInput | None = None
    ends: Ends = Ends()
    mark: str = "R1"
    quantity: int = 1
    deflection: DeflectionLimits = DeflectionLimits()
    groups: dict[str, tuple[str, ...]] = field(default_factory=dict)
    title_block: dict[str, str] = field(default_factory=dict)
    defaults_used: tuple[tuple[str, str], ...] = ()
    warnings: tuple[str, ...] = ()
    source: str = ""
    source_name: str = ""
    drawing: DrawingRecord | None = None
