"""A design with Eurocode actions: what the site and the kind of a case do on the way."""

from __future__ import annotations

from dataclasses import replace

import pytest
from demos import demo

from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.loads.inputs import JointLoad
from spanwright.loads.site_inputs import SiteInput

SLIDE = JointLoad("slide", "snow", "T2", down=40e3)


@pytest.fixture(scope="module")
def done() -> Design:
    project = demo("pratt_store")
    return design(
        replace(
            project,
            actions="EN 1990:2002, 6.10",
            loads=replace(project.loads, at_joint=(SLIDE,)),
            site=SiteInput(40e3, 6e3, altitude=1200e3),
        )
    )


def test_the_altitude_of_the_site_sets_what_snow_adds_to_wind(done: Design) -> None:
    """EN 1990 Table A1.1: psi0 of snow is 0.7 above 1000 m, from memory."""
    assert any(" + 1.05 slide + 1.5 " in name for name in done.strength_names)
    assert not any(" 0.75 slide" in name for name in done.strength_names)


def test_snow_counts_among_the_characteristic_forces_on_the_bearings(done: Design) -> None:
    """By hand: 40 kN stand near the left bearing, far above what the wind adds there."""
    down = [one for one in done.bearing_forces if not one.factored and one.direction == "down"]
    assert down[0].combination == "most + slide"
