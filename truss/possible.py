"""What no form can be: refused before anything is built."""

from __future__ import annotations

import math
from typing import get_args

from spanwright.truss.decimals import decimal
from spanwright.truss.errors import InputError, UnknownNameError
from spanwright.truss.fink import FINK_NAMES
from spanwright.truss.inputs import FormInput, FormName, Lean
from spanwright.truss.ranges import ranges, refuse_outside

FINK_STEEPEST = math.pi / 4
"""rad: from this pitch on, struts square to the rafter meet the bottom chord at or beyond mid-span (geometry)."""

DEEPEST_HEEL = 0.5
"""Share of the span: a heel deeper than this is a slip of unit (the project's own limit)."""

WIDEST_OVERHANG = 0.5
"""Share of the span: an overhang wider than this is a slip of unit (the project's own limit)."""


def refuse_impossible(form: FormInput) -> None:
    """Raise InputError (key "truss....") with the remedy for a form that cannot be built."""
    if form.form not in get_args(FormName):
        raise UnknownNameError.among(form.form, list(get_args(FormName)), what="form", key="truss.form")
    refuse_outside(form.span, "span", key="truss.span", what="the span")
    refuse_outside(form.pitch, "pitch triangular", key="truss.pitch", what="the pitch")
    refuse_overhang(form.overhang, form.span)
    if form.lean is not None and form.lean not in get_args(Lean):
        known = " or ".join(f'"{lean}"' for lean in get_args(Lean))
        raise InputError(f'the diagonals lean "{form.lean}"', f"state {known}, or leave it out", "truss.diagonals")
    if form.form == "Fink":
        _refuse_impossible_fink(form)
    else:
        _refuse_impossible_heel(form)
        _refuse_impossible_panels(form)


def refuse_overhang(overhang: float, span: float) -> None:
    """Raise InputError (key "truss.overhang") for an overhang, mm in plan, that is negative or absurd."""
    if not 0 <= overhang <= WIDEST_OVERHANG * span:
        raise InputError(
            f"the overhang is {decimal(overhang)} mm",
            f"it must be from 0 to half the span, {decimal(WIDEST_OVERHANG * span)} mm",
            "truss.overhang",
        )


def _refuse_impossible_heel(form: FormInput) -> None:
    if form.heel_depth == 0:
        return
    refuse_outside(
        form.heel_depth,
        "heel depth",
        key="truss.heel_depth",
        what="the heel depth",
        otherwise=", or 0 for a triangular heel",
    )
    if form.heel_depth > DEEPEST_HEEL * form.span:
        raise InputError(
            f"the heel depth is {decimal(form.heel_depth)} mm, more than half the span of {decimal(form.span)} mm",
            "usual is span/25 to span/15; 0 makes a triangular heel",
            "truss.heel_depth",
        )


def _refuse_impossible_panels(form: FormInput) -> None:
    panels = form.panels
    if panels is None:
        return
    if panels % 2 or panels < 2:
        near = max(2, panels + 1)
        raise InputError(
            f"{panels} panels: the number must be even and at least 2, so that a joint stands at mid-span",
            f"state panels = {near}" + (f" or {near - 2}" if near > 2 else ""),
            "truss.panels",
        )
    shortest = ranges()["rafter panel"].possible_least
    panel = form.span / math.cos(form.pitch) / panels
    if panel <= shortest:
        most = 2 * math.floor(form.span / math.cos(form.pitch) / shortest / 2)
        raise InputError(
            f"{panels} panels make rafter panels of {panel:.0f} mm",
            f"they must be longer than {shortest:.0f} mm: at most {most} panels here",
            "truss.panels",
        )


def _refuse_impossible_fink(form: FormInput) -> None:
    if form.heel_depth != 0:
        raise InputError(
            f"a Fink is always triangular, but the heel depth is {decimal(form.heel_depth)} mm",
            'state heel_depth = "0 m", or choose a Pratt or Howe',
            "truss.heel_depth",
        )
    if form.panels is not None and form.panels not in FINK_NAMES:
        listed = ", ".join(f"{panels} ({name})" for panels, name in FINK_NAMES.items())
        raise InputError(f"a Fink has no {form.panels} rafter panels", f"state one of {listed}", "truss.panels")
    if form.lean is not None:
        raise InputError(
            f'a Fink has no lean to state, but the diagonals are "{form.lean}"',
            "leave diagonals out: struts stand square to the rafter",
            "truss.diagonals",
        )
    if form.pitch >= FINK_STEEPEST:
        raise InputError(
            f"a Fink of {decimal(math.degrees(form.pitch), 4)} deg: its struts meet the bottom chord beyond mid-span",
            f"the pitch must be less than {decimal(math.degrees(FINK_STEEPEST))} deg, or choose a Pratt or Howe",
            "truss.pitch",
        )
