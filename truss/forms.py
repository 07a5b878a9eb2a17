"""The parametric forms: from span, pitch, heel and panels to a truss; how many panels a purlin spacing asks for."""

from __future__ import annotations

import math
from dataclasses import replace
from itertools import pairwise
from typing import Literal, get_args

from spanwright.truss.assembly import assemble
from spanwright.truss.errors import InputError
from spanwright.truss.fink import FINK_NAMES, fink
from spanwright.truss.inputs import FormInput, Lean
from spanwright.truss.model import Truss
from spanwright.truss.possible import refuse_impossible
from spanwright.truss.ranges import refuse_outside
from spanwright.truss.tolerances import TOLERANCES
from spanwright.truss.triangulated import triangulated
from spanwright.truss.unusual import unusual

AT_JOINTS_SPACING = 1800.0
"""mm: longest rafter panel where purlins stand at joints and panels are left out (the project's convention)."""

Supports = Literal["left pinned, right sliding", "both pinned"]


def build_form(form: FormInput, supports: str = "left pinned, right sliding") -> Truss:
    """Build the truss of a form: left bearing at the origin, x to the right, y up, mm.

    form : its `panels`, where left out, keep rafter panels within 1.8 m (see `settle_panels` for purlin spacings).
    supports : "left pinned, right sliding" or "both pinned".

    Raises InputError (key "truss....") for what is impossible; what is unusual is in the truss's warnings.
    """
    refuse_impossible(form)
    if supports not in get_args(Supports):
        known = " or ".join(f'"{name}"' for name in get_args(Supports))
        raise InputError(f'the supports are "{supports}"', f"state {known}", "truss.supports")
    panels = panels_for(form, AT_JOINTS_SPACING) if form.panels is None else form.panels
    if form.form == "Fink":
        name, lean = FINK_NAMES[panels], ""
        joints, bars = fink(form.span, form.pitch, panels)
    else:
        king_post = panels == 2 and form.heel_depth == 0
        name, lean = ("king post", "") if king_post else (form.form, _lean(form))
        joints, bars = triangulated(form.span, form.pitch, form.heel_depth, panels, _lean(form))
    right = max((name for name in joints if name.startswith("B")), key=lambda name: joints[name][0])
    bearings = {"B0": True, right: supports == "both pinned"}
    truss = assemble(joints, bars, bearings, overhang=form.overhang, form=name, lean=lean)
    return replace(truss, warnings=_lean_warning(form, lean) + unusual(truss))


def panels_for(form: FormInput, purlin_spacing: float) -> int:
    """Return the fewest panels that keep rafter panels within the purlin spacing, even; for a Fink 4, 6 or 8.

    purlin_spacing : mm up the slope. `form.panels` is not looked at.

    Raises InputError for a spacing below the shortest rafter panel, and (key "truss.panels") if no Fink does.
    """
    refuse_impossible(replace(form, panels=None))
    refuse_outside(purlin_spacing, "rafter panel", key="restraint.purlins", what="the purlin spacing")
    rafter = _rafter(form)
    wanted = 2 * max(1, math.ceil(rafter / (purlin_spacing + TOLERANCES.same_length)))
    if form.form != "Fink":
        return wanted
    enough = [panels for panels in FINK_NAMES if panels >= wanted]
    if not enough:
        raise InputError(
            f"a Fink has at most {max(FINK_NAMES)} rafter panels, here {_metres(rafter / 4)} long; "
            f"purlins {_metres(purlin_spacing)} apart need {wanted}",
            f"choose a Pratt or Howe, or state panels = {max(FINK_NAMES)} and the purlins as a list of distances",
            "truss.panels",
        )
    return min(enough)


def settle_panels(form: FormInput, purlins: Literal["at joints"] | float | tuple[float, ...]) -> FormInput:
    """Return the form with its number of panels settled by where the purlins stand (as in `RestraintInput.purlins`).

    Left out, panels follow from the spacing: the stated one, the greatest of a list of distances, or 1.8 m at joints.
    A stated number is checked against a stated spacing by `check_panels`.
    """
    if isinstance(purlins, tuple):
        gaps = [upper - lower for lower, upper in pairwise(sorted(purlins))]
        spacing = max(gaps, default=AT_JOINTS_SPACING)
    else:
        spacing = AT_JOINTS_SPACING if purlins == "at joints" else purlins
    if form.panels is None:
        return replace(form, panels=panels_for(form, spacing))
    if isinstance(purlins, float | int):
        check_panels(form, purlins)
    return form


def check_panels(form: FormInput, purlin_spacing: float) -> None:
    """Refuse stated panels that contradict a stated greatest purlin spacing.

    They contradict if the rafter panel is longer than the spacing and no whole number of spacings makes a panel:
    then purlins stand at no joint in particular, which nobody asks for with a spacing. Purlins at every joint and
    between, or wider apart than the joints, are no contradiction; a list of distances may stand anywhere.

    Raises InputError (key "truss.panels") that names both.
    """
    if form.panels is None:
        return
    follows = panels_for(form, purlin_spacing)
    panel = _rafter(form) / (form.panels / 2)
    parts = math.ceil(panel / (purlin_spacing + TOLERANCES.same_length))
    if parts == 1 or abs(parts * purlin_spacing - panel) <= TOLERANCES.on_joint:
        return
    share = f'purlins = "{math.ceil(panel / parts) / 1000:g} m" ({parts} to a panel), ' if form.overhang == 0 else ""
    raise InputError(
        f"{form.panels} panels make rafter panels of {_metres(panel)}, but purlins stand at most "
        f"{_metres(purlin_spacing)} apart (restraint.purlins), which asks for {follows} panels",
        f'leave panels out or state panels = {follows}; or state {share}purlins = "at joints", '
        "or a list of distances where purlins are to stand between joints",
        "truss.panels",
    )


def _rafter(form: FormInput) -> float:
    """Return the length of one slope from bearing to ridge, mm."""
    return form.span / 2 / math.cos(form.pitch)


def _lean_by_name(form: FormInput) -> Lean:
    triangular = form.heel_depth == 0
    return "up to centre" if (form.form == "Pratt") == triangular else "down to centre"


def _lean(form: FormInput) -> Lean:
    return form.lean or _lean_by_name(form)


def _lean_warning(form: FormInput, lean: str) -> tuple[str, ...]:
    if lean in ("", _lean_by_name(form)):
        return ()
    heel = "a triangular heel" if form.heel_depth == 0 else "a raised heel"
    other = "Howe" if form.form == "Pratt" else "Pratt"
    return (
        f'the diagonals lean "{lean}" as stated; with {heel} a {form.form} leans "{_lean_by_name(form)}" '
        f"and this lean is usually called {other}",
    )


def _metres(value: float) -> str:
    return f"{value / 1000:.4g} m"
