"""What holds for wind from the site on every roof, wherever its trusses and purlins stand."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from itertools import pairwise

import numpy as np
import pytest
import shapely
from hypothesis import given, settings
from hypothesis import strategies as st
from strategies import forms

from spanwright.loads.cases import Case, LoadSet, loads_on
from spanwright.loads.coefficients import RoofTable, Sign, is_flat, roof_coefficients
from spanwright.loads.inputs import LoadsInput, MostLeast
from spanwright.loads.pressures import SurfaceCase, WindField
from spanwright.loads.sans_10160 import Sans10160
from spanwright.loads.site import actions_from_site
from spanwright.loads.site_inputs import SiteInput
from spanwright.loads.zones import Zone
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import lay_purlins

SPACINGS = st.sampled_from([3e3, 5e3, 6.5e3])
NOTHING = LoadsInput(MostLeast(0.0, 0.0), 0.0, ())


@dataclass(frozen=True)
class Blown:
    truss: Truss
    found: LoadSet

    @property
    def field(self) -> WindField:
        assert self.found.site is not None
        assert self.found.site.wind is not None
        return self.found.site.wind

    def winds(self) -> list[Case]:
        return [case for case in self.found.cases if case.kind == "wind"]


def blow(truss: Truss, site: SiteInput, spacing: float) -> Blown:
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    found = loads_on(truss, lines, NOTHING, site, "SANS 10160:2019", spacing=spacing, tributary=spacing)
    return Blown(truss, found)


@st.composite
def sites(draw: st.DrawFn) -> SiteInput:
    """Draw buildings of any length and height, with the truss anywhere; no wind reaches the column heads."""
    bays = draw(st.integers(1, 12))
    return SiteInput(
        length=bays * 5e3,
        eaves_height=draw(st.integers(20, 160)) * 100.0,
        terrain=draw(st.sampled_from("ABCD")),
        wind_speed=draw(st.sampled_from([32.0, 36.0, 44.0])),
        position=draw(st.integers(0, bays * 5)) * 1e3,
        gable_overhang=draw(st.sampled_from([0.0, 0.0, 700.0])),
        column_head_share=0.0,
        derive=frozenset({"wind"}),
    )


def pressed_down(field: WindField, case: SurfaceCase) -> float:
    """Return the vertical load of a case, N, zone by zone from shapely's areas: a second opinion on every share."""
    strip = shapely.box(field.shape.edges[0], field.strip[0], field.shape.edges[1], field.strip[1])
    down = 0.0
    for zone in field.zones[case.wind]:
        area = strip.intersection(shapely.box(zone.x0, zone.z0, zone.x1, zone.z1)).area
        down += coefficient(field, case, zone) * area
    for (x0, x1), under in zip(pairwise(field.cuts), case.under, strict=True):
        down -= under * (x1 - x0) * (field.strip[1] - field.strip[0])
    return down * field.peak.pressure


def coefficient(field: WindField, case: SurfaceCase, zone: Zone) -> float:
    signs = dict(case.signs)
    names = tuple(one.name for one in field.zones[case.wind] if one.part == zone.part)
    lines = roof_coefficients(zone.table, names, math.degrees(zone.pitch), field.area)
    return float(lines[signs[zone.part]][names.index(zone.name)])


@settings(max_examples=40, deadline=None)
@given(forms(), sites(), SPACINGS)
def test_total_vertical_load_is_pressure_times_area(form: FormInput, site: SiteInput, spacing: float) -> None:
    roof = blow(build_form(form), site, spacing)
    for case, surface in zip(roof.winds(), roof.field.cases, strict=True):
        assert case.name == surface.name
        expected = pressed_down(roof.field, surface)
        assert -case.joint_loads[:, 1].sum() == pytest.approx(expected, rel=1e-9, abs=1e-3)


@settings(max_examples=40, deadline=None)
@given(forms(), sites(), SPACINGS)
def test_pressures_along_the_roof_times_rise_push_sideways(form: FormInput, site: SiteInput, spacing: float) -> None:
    """On a symmetric duopitch the roof pushes by the difference of its slopes' pressures times the rise."""
    roof = blow(build_form(form), site, spacing)
    field, tangent = roof.field, math.tan(roof.field.shape.left)
    at = (field.cuts[:-1] + field.cuts[1:]) / 2 < field.shape.middle
    side = np.where(at, 1.0, -1.0) * np.diff(field.cuts) * tangent * (field.strip[1] - field.strip[0])
    faces = np.array([heel(roof)] * len(field.cases)) * [
        (case.walls[0] - case.walls[1]) * field.wall_width for case in field.cases
    ]
    for case, surface, face in zip(roof.winds(), field.cases, faces, strict=True):
        assert case.joint_loads[:, 0].sum() == pytest.approx(float(side @ surface.net) + face, rel=1e-9, abs=1e-3)


def heel(roof: Blown) -> float:
    xy, truss = roof.truss.xy, roof.truss
    return float(xy[truss.top.joints[0], 1] - xy[truss.bearing_joints[0], 1])


def mirror_image(truss: Truss) -> list[int]:
    turned = truss.xy.copy()
    turned[:, 0] = truss.span - turned[:, 0]
    return [int(np.argmin(np.hypot(*(truss.xy - point).T))) for point in turned]


@settings(max_examples=40, deadline=None)
@given(forms(), sites(), SPACINGS)
def test_wind_from_the_other_side_mirrors_every_force(form: FormInput, site: SiteInput, spacing: float) -> None:
    truss = build_form(form)
    image = mirror_image(truss)
    cases = {case.name: case for case in blow(truss, replace(site, column_head_share=0.5), spacing).winds()}
    scale = max(float(np.abs(case.joint_loads).max()) for case in cases.values())
    for name, case in cases.items():
        if name.startswith("wind from left"):
            twin = cases[name.replace("from left", "from right")]
            assert twin.joint_loads == pytest.approx(case.joint_loads[image] * [-1.0, 1.0], abs=1e-6 * scale)


@settings(max_examples=25, deadline=None)
@given(forms(), sites())
def test_trusses_of_a_building_share_the_whole_roof(form: FormInput, site: SiteInput) -> None:
    """All trusses together carry the external pressures of all zones, each once."""
    truss, bays = build_form(form), round(site.length / 5e3)
    fields = [field_at(truss, replace(site, position=bay * 5e3)) for bay in range(bays + 1)]
    carried: dict[str, float] = {}
    whole: dict[str, float] = {}
    for field in fields:
        for case in field.cases:
            if case.wind == "left":
                width = field.strip[1] - field.strip[0]
                carried[case.name] = carried.get(case.name, 0.0) + float(case.external @ np.diff(field.cuts)) * width
                zones = field.zones["left"]
                whole[case.name] = sum(coefficient(field, case, zone) * area_of(zone) for zone in zones)
    assert carried == pytest.approx(whole, rel=1e-9, abs=1e-3)


def field_at(truss: Truss, site: SiteInput) -> WindField:
    found = actions_from_site(truss, site, "SANS 10160:2019", NOTHING, spacing=5e3, tributary=5e3).wind
    assert found is not None
    return found


def area_of(zone: Zone) -> float:
    return (zone.x1 - zone.x0) * (zone.z1 - zone.z0)


@given(
    st.sampled_from(["duopitch 0", "duopitch 90", "monopitch 0", "monopitch 180", "monopitch 90"]),
    st.floats(-45.0, 74.99),
    st.floats(1.0, 50.0),
)
def test_pressures_are_continuous_in_pitch(table: RoofTable, pitch: float, area: float) -> None:
    """Neighbouring cells differ by at most 0.16 a degree: a small step moves little. A row is met within 0.057 deg."""
    step = 0.005
    if pitch < 5.0 and (table.startswith("mono") or pitch + step > -5.0):
        return
    zones = ("Fup", "Flow", "G", "H", "I") if table == "monopitch 90" else ("F", "G", "H")
    before = roof_coefficients(table, zones, pitch, area * 1e6)
    after = roof_coefficients(table, zones, pitch + step, area * 1e6)
    for sign in before.keys() & after.keys():
        assert np.abs(before[sign] - after[sign]).max() <= 0.16 * (step + 0.058)


@given(st.floats(-45.0, 75.0), st.sampled_from(["suction", "pressure"]))
def test_lines_keep_their_sign(pitch: float, sign: Sign) -> None:
    if is_flat(pitch):
        return
    for zones in (("F", "G", "H"), ("I", "J")):
        line = roof_coefficients("duopitch 0", zones, pitch, 50e6).get(sign, np.zeros(1))
        assert (line <= 0.0).all() if sign == "suction" else (line >= 0.0).all()


@given(st.floats(1.0, 200.0), st.floats(32.0, 44.0), st.floats(0.0, 3000.0))
def test_more_exposed_terrain_never_lowers_the_pressure(height: float, speed: float, altitude: float) -> None:
    site = SiteInput(40e3, 6e3, "A", speed, altitude=altitude * 1e3)
    standard = Sans10160("2019")
    pressures = [standard.peak_pressure(replace(site, terrain=name), height * 1e3).pressure for name in "DCBA"]
    assert pressures == sorted(pressures)


@given(st.floats(1.0, 200.0), st.floats(1.0, 200.0))
def test_higher_never_lowers_the_pressure(one: float, other: float) -> None:
    site, standard = SiteInput(40e3, 6e3, "C", 36.0), Sans10160("2019")
    low, high = sorted((one, other))
    assert standard.peak_pressure(site, low * 1e3).pressure <= standard.peak_pressure(site, high * 1e3).pressure
