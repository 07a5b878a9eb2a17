"""What a user states about a truss, as frozen values in mm and rad: the form or the joints, and the restraint."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from spanwright.truss.model import Role

FormName = Literal["Pratt", "Howe", "Fink"]
Lean = Literal["up to centre", "down to centre"]
AnchoredBy = Literal["roof bracing", "diaphragm", "nothing"]


@dataclass(frozen=True)
class FormInput:
    """A parametric form.

    span : mm between supports.
    pitch : rad, slope of the top chord.
    heel_depth : mm between chord lines over the support; 0 = triangular.
    panels : over the span, even; Fink: rafter panels of both slopes together (4, 6 or 8); None: from purlin spacing.
    overhang : mm in plan, top chord beyond the support, each side.
    lean : lean of the diagonals; None: by name (practice: Pratt = up to centre when triangular, down to centre
        with a raised heel; Howe the other way round).
    """

    form: FormName
    span: float
    pitch: float
    heel_depth: float = 0.0
    panels: int | None = None
    overhang: float = 0.0
    lean: Lean | None = None


@dataclass(frozen=True)
class GivenInput:
    """Joints and bars given one by one, for any plane truss.

    joints : (name, x mm, y mm) each. bars : (joint, joint, role) each. supports : (joint, "pinned" or "sliding") each.
    overhang : mm in plan, top chord beyond its end joints, each side.
    bar_names : the names of the bars in their order, or () to number them by role from the left.
    """

    joints: tuple[tuple[str, float, float], ...]
    bars: tuple[tuple[str, str, Role], ...]
    supports: tuple[tuple[str, Literal["pinned", "sliding"]], ...]
    overhang: float = 0.0
    bar_names: tuple[str, ...] = ()


@dataclass(frozen=True)
class RestraintInput:
    """Where the purlins stand and what holds the chords sideways.

    purlins : "at joints", a greatest spacing up the slope in mm, or distances up the slope from the roof's edge, mm.
    ridge_pair : None for one ridge line, else the distance of each of a pair from the apex up the slope, mm.
    anchored : lines that end at a node of a braced bay or diaphragm: "all", "none" or their numbers.
    anchored_by : "roof bracing", "diaphragm" or "nothing"; printed.
    bearings_held : are the bearing joints held sideways?
    knee_braces : "none", "every purlin", "every 2nd purlin" (or 3rd, ...), or bottom joint names.
    bottom_ties : "none", "every 2nd joint" (or another ordinal), or bottom joint names.
    factor_in, factor_out : effective length factors; below 1 needs `reason`.
    twist_held : what prevents twist at every joint ("" = nothing stated: the torsional length is the out-of-plane one).
    """

    purlins: Literal["at joints"] | float | tuple[float, ...]
    anchored: Literal["all", "none"] | tuple[int, ...]
    anchored_by: AnchoredBy
    bearings_held: bool
    ridge_pair: float | None = None
    knee_braces: str | tuple[str, ...] = "none"
    bottom_ties: str | tuple[str, ...] = "none"
    factor_in: float = 1.0
    factor_out: float = 1.0
    reason: str = ""
    twist_held: str = ""
