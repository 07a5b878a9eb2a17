"""The table [site] of a project file, and what [loads] may leave to it."""

from __future__ import annotations

import pytest

from spanwright.design.project import Project
from spanwright.io.project_file import parse_project
from spanwright.loads.inputs import MostLeast, WindInput
from spanwright.loads.site_inputs import Opening, SiteInput, SnowInput
from spanwright.truss.errors import InputError

LEAST = """
title = "Shed"
actions = "SANS 10160:2011"
[truss]
form = "Howe"
span = "15 m"
pitch = "12 deg"
spacing = "5 m"
[site]
length = "40 m"
eaves_height = "6 m"
terrain = "B"
basic_wind_speed = "28 m/s"
[restraint]
anchored_purlins = "all"
anchored_by = "diaphragm"
bearings_held = true
[members]
steel = "S355JR"
"""


def site(*lines: str, more: str = "") -> SiteInput:
    text = LEAST.replace('terrain = "B"', "\n".join(['terrain = "B"', *lines])) + more
    found = parse_project(text).site
    assert found is not None
    return found


def refusal(text: str) -> InputError:
    with pytest.raises(InputError) as caught:
        parse_project(text)
    return caught.value


def test_a_site_and_no_loads_is_a_whole_project() -> None:
    project = parse_project(LEAST)
    assert project.site == SiteInput(
        40e3, 6e3, "B", 28.0, derive=frozenset({"roof_permanent", "roof_imposed", "man_load", "wind"})
    )
    taken = dict(project.defaults_used)
    assert taken["loads.wind"] == "by the loading standard, from the site"
    assert taken["site.truss"] == "typical interior"
    assert taken["site.width"] == "the span"


def test_what_loads_states_is_not_left_to_the_site() -> None:
    more = """
[loads]
roof_permanent = "0.2 kPa"
roof_imposed = "0.4 kPa"
[[loads.wind]]
name = "gale"
left = "-0.5 kPa"
right = "-0.4 kPa"
"""
    project = parse_project(LEAST + more)
    assert project.site is not None
    assert project.site.derive == {"man_load"}
    assert project.loads.roof_permanent == MostLeast(0.2e-3, 0.2e-3)
    assert project.loads.wind == (WindInput("gale", -0.5e-3, -0.4e-3),)


def test_no_wind_is_an_answer_too() -> None:
    project = parse_project(LEAST + '[loads]\nwind = "none"\n')
    assert project.site is not None
    assert "wind" not in project.site.derive
    assert project.loads.wind == ()


def test_without_a_site_the_loads_are_required() -> None:
    text = LEAST[: LEAST.index("[site]")] + LEAST[LEAST.index("[restraint]") :]
    error = refusal(text)
    assert error.key == "loads.roof_permanent"
    assert "missing" in error.found
    assert "loads.roof_imposed, loads.wind" in error.remedy


def test_every_key() -> None:
    found = site(
        'width = "16 m"',
        'gable_overhang = "300 mm"',
        'truss = "12.5 m"',
        'altitude = "1500 m"',
        "topography = 1.2",
        'return_period = "100 years"',
        "internal_pressure = [0.2, -0.3]",
        "column_head_share = 0.375",
        'national_values = "UK"',
        more="""
[[site.openings]]
face = "near gable"
area = "16 m2"
start = "6 m"
end = "10 m"
shut_in_storms = true
[site.snow]
ground = "0.65 kPa"
exposure = 0.8
guards = true
""",
    )
    assert found == SiteInput(
        length=40e3,
        eaves_height=6e3,
        terrain="B",
        wind_speed=28.0,
        position=12.5e3,
        width=16e3,
        gable_overhang=300.0,
        altitude=1500e3,
        topography=1.2,
        return_period=100.0,
        internal=(0.2, -0.3),
        openings=(Opening("near gable", 16e6, 6e3, 10e3, True),),
        column_head_share=0.375,
        snow=SnowInput(0.65e-3, 0.8, 1.0, True, None),
        national="UK",
        derive=frozenset({"roof_permanent", "roof_imposed", "man_load", "wind", "snow"}),
    )


@pytest.mark.parametrize(("text", "speed"), [("36 km/h", 10.0), ("100 mph", 44.704), ("28 m/s", 28.0)])
def test_speeds(text: str, speed: float) -> None:
    """1 mile = 5280 ft of 304.8 mm (international foot of 1959)."""
    project = parse_project(LEAST.replace("28 m/s", text))
    assert project.site is not None
    assert project.site.wind_speed == pytest.approx(speed, rel=1e-12)


def test_one_internal_coefficient_needs_no_list() -> None:
    assert site("internal_pressure = -0.72").internal == (-0.72,)


@pytest.mark.parametrize(
    ("line", "key", "found", "remedy"),
    [
        ('truss = "first inner"', "site.truss", '"first inner"', 'did you mean "first interior"'),
        ("truss = 12.5", "site.truss", "has no unit", "12.5 m"),
        ('return_period = "50"', "site.return_period", '"50" is not understood', "50 years"),
        ('return_period = "1 years"', "site.return_period", "plausible", "2 years"),
        ("internal_pressure = [0.2, 3]", "site.internal_pressure", "3 is not", "-1.5 to 1.5"),
        ("internal_pressure = []", "site.internal_pressure", "no coefficient", "[0.2, -0.3]"),
        ('altitude = "1500 kPa"', "site.altitude", "is a pressure, not a length", "m"),
        ('width = "20 m/s"', "site.width", "is a speed, not a length", "m"),
        ('lenght = "40 m"', "site.lenght", 'no key is called "lenght"', 'did you mean "length"'),
        ("topography = 9", "site.topography", "outside", "3"),
        ('basic_windspeed = "28 m/s"', "site.basic_windspeed", "no key", "basic_wind_speed"),
    ],
)
def test_mistakes(line: str, key: str, found: str, remedy: str) -> None:
    error = refusal(LEAST.replace('terrain = "B"', f'terrain = "B"\n{line}'))
    assert error.key == key
    assert found in error.found
    assert remedy in error.remedy


def test_a_mistake_in_the_site_does_not_make_loads_required() -> None:
    error = refusal(LEAST.replace('"6 m"', "6"))
    assert error.key == "site.eaves_height"
    assert "loads" not in error.remedy


def test_openings_name_their_face() -> None:
    error = refusal(LEAST + '[[site.openings]]\nface = "front"\narea = "4 m2"\n')
    assert error.key == "site.openings[1].face"
    assert '"near gable"' in error.remedy


def test_projects_without_a_site_have_none() -> None:
    from spanwright.io.starter import starter_text

    project: Project = parse_project(starter_text())
    assert project.site is None
