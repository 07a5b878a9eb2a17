"""The summary on the screen: what moves which way, and what the mass includes."""

from __future__ import annotations

from dataclasses import replace
from io import StringIO

from demos import demo
from rich.console import Console

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.io.screen import print_summary
from spanwright.truss.inputs import FormInput


def screen(found: Design) -> str:
    text = StringIO()
    print_summary(found, Console(file=text, width=200, highlight=False))
    return text.getvalue()


def test_a_deflection_says_its_way_in_words() -> None:
    found = design(demo("pratt_store"))
    shown = screen(found)
    for row in found.serviceability.deflections:
        way = "down" if row.value > 0.0 else "up"
        assert f"deflection, {row.name}: {abs(row.value):.1f} mm {way} at {row.joint}" in shown
    assert " mm up at " in shown
    assert " mm down at " in shown
    assert "mm at" not in shown


def test_the_sliding_end_and_the_camber_stand_on_the_screen() -> None:
    found = design(demo("howe_workshop"))
    serviceability = found.serviceability
    words = f"sliding end moves {serviceability.sliding:.1f} mm, {serviceability.sliding_combination}"
    assert f"{words}; no camber" in screen(found)
    raised = replace(found, serviceability=replace(serviceability, camber=20.0))
    assert f"{words}; camber 20 mm" in screen(raised)


def test_the_mass_says_what_it_includes() -> None:
    project = demo("howe_workshop")
    assert isinstance(project.truss, FormInput)
    wide = design(replace(project, truss=replace(project.truss, overhang=600.0)))
    assert "members joint to joint and over the overhang, without gussets and fixings" in screen(wide)
    assert "members joint to joint, without gussets and fixings" in screen(design(project))
