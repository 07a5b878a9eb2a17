"""Hypothesis strategies that draw whole trusses for property tests: at most 16 panels, none under 0.6 m."""

from __future__ import annotations

import math
from typing import get_args

from hypothesis import strategies as st

from spanwright.truss.fink import FINK_NAMES
from spanwright.truss.forms import Supports, build_form
from spanwright.truss.inputs import FormInput, Lean
from spanwright.truss.model import Truss


def _within(least: float, most: float) -> st.SearchStrategy[float]:
    return st.floats(least, most, allow_nan=False, width=64)


def spans() -> st.SearchStrategy[float]:
    """Draw spans in mm, in whole steps so that failing examples read well."""
    return st.integers(60, 360).map(lambda tenths: tenths * 100.0)


@st.composite
def forms(draw: st.DrawFn) -> FormInput:
    """Draw a form that can be built: every name, heel, lean and number of panels of ordinary roofs."""
    span = draw(spans())
    overhang = draw(st.sampled_from([0.0, 0.0, 300.0, 900.0]))
    name = draw(st.sampled_from(["Pratt", "Howe", "Fink"]))
    if name == "Fink":
        pitch = math.radians(draw(_within(10, 40)))
        return FormInput("Fink", span, pitch, panels=draw(st.sampled_from(sorted(FINK_NAMES))), overhang=overhang)
    heel_depth = draw(st.sampled_from([0.0, 0.0, 500.0, 900.0, 1500.0]))
    pitch = math.radians(draw(_within(3 if heel_depth else 8, 40)))
    panels = 2 * draw(st.integers(1, min(8, int(span / 1200))))
    lean: Lean | None = draw(st.sampled_from([None, *get_args(Lean)]))
    return FormInput("Pratt" if name == "Pratt" else "Howe", span, pitch, heel_depth, panels, overhang, lean)


@st.composite
def trusses(draw: st.DrawFn) -> Truss:
    """Draw a whole truss of a form, on either kind of supports."""
    supports = draw(st.sampled_from(get_args(Supports)))
    return build_form(draw(forms()), supports)
