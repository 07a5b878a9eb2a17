"""The pictures of wind from the site: what they show, to scale, the same bytes each time."""

from __future__ import annotations

import re
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest
from matplotlib.collections import PolyCollection
from matplotlib.colors import to_rgba
from matplotlib.text import Text
from pictured import outlines
from roofs import mono_pitch
from shapely import Polygon

from spanwright.design.result import Design
from spanwright.design.run import finish, prepare, size
from spanwright.io.pictures.sheet import Sheet, drawing_board
from spanwright.io.pictures.style import PALE
from spanwright.io.pictures.wind import wind_sheets
from spanwright.io.pictures.wind_cases import LONGEST
from spanwright.io.pictures.wind_steps import draw_steps
from spanwright.io.pictures.wind_zones import wind_zones_sheet
from spanwright.io.project_file import parse_project
from spanwright.loads.cases import loads_on
from spanwright.loads.combinations import combine
from spanwright.loads.pressures import WindField
from spanwright.loads.site import actions_from_site
from spanwright.truss.arrays import FloatArray
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

SHED = """
title = "Shed"
actions = "SANS 10160:2019"
[truss]
form = "Howe"
span = "15 m"
pitch = "12 deg"
overhang = "0.6 m"
spacing = "5 m"
[site]
length = "40 m"
eaves_height = "6 m"
terrain = "B"
basic_wind_speed = "36 m/s"
[restraint]
anchored_purlins = "all"
anchored_by = "diaphragm"
bearings_held = true
[members]
steel = "S355JR"
top_chord = "2L 100x100x8"
bottom_chord = "2L 100x100x8"
posts = "L 80x80x8"
diagonals = "L 80x80x8"
"""


WITH_OVERHANG = """
title = "Shed with overhangs"
actions = "EN 1990:2002, 6.10"
[truss]
form = "Howe"
span = "12 m"
pitch = "20 deg"
overhang = "0.5 m"
spacing = "5 m"
[site]
length = "40 m"
eaves_height = "5 m"
terrain = "II"
basic_wind_speed = "26 m/s"
[site.snow]
ground = "0.65 kPa"
[restraint]
purlins = "1.5 m"
anchored_purlins = "all"
anchored_by = "diaphragm"
bearings_held = true
[members]
steel = "S355JR"
top_chord = "2L 100x100x8"
bottom_chord = "2L 100x100x8"
posts = "L 80x80x8"
diagonals = "L 80x80x8"
"""


@pytest.fixture(scope="module")
def design() -> Design:
    return designed(SHED)


def designed(text: str) -> Design:
    """Return a truss of given sections, so that one pass designs it."""
    project = parse_project(text)
    setting = prepare(project)
    load_set = loads_on(
        setting.truss,
        setting.restraint.lines,
        project.loads,
        project.site,
        project.actions,
        spacing=project.spacing,
        tributary=project.tributary,
    )
    setting = replace(setting, load_set=load_set, combinations=combine(load_set.cases, project.actions, project.site))
    return finish(setting, *size(setting, [0] * len(setting.groups)))


@pytest.fixture(scope="module")
def field(design: Design) -> WindField:
    site = design.setting.load_set.site
    assert site is not None
    assert site.wind is not None
    return site.wind


@pytest.fixture(scope="module")
def written(design: Design, tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("wind")
    with drawing_board():
        for name, sheet in wind_sheets(design).items():
            sheet.write(folder, name)
    return folder


def words(path: Path) -> list[str]:
    return re.findall(r">([^<>]+)</text>", path.read_text(encoding="utf-8"))


def test_both_pictures_are_written(written: Path) -> None:
    assert sorted(path.name for path in written.iterdir()) == [
        "wind_pressures.png",
        "wind_pressures.svg",
        "wind_zones.png",
        "wind_zones.svg",
    ]


def test_no_picture_of_wind_that_is_stated(design: Design) -> None:
    setting = replace(design.setting, load_set=replace(design.setting.load_set, site=None))
    assert wind_sheets(replace(design, setting=setting)) == {}


def test_every_zone_and_coefficient_is_named(written: Path) -> None:
    """At 12 degrees, by hand in our rule sheet: F -1.14/+0.14, J -0.88/+0.06; along the ridge F -1.39."""
    text = " ".join(words(written / "wind_zones.svg"))
    for expected in (
        "F \u22121.14 / +0.14",
        "J \u22120.88 / +0.06",
        "F \u22121.39",
        "from the far gable",
        "vb0",
        "from memory",
    ):
        assert expected in text
    letters = [entry for entry in words(written / "wind_zones.svg") if entry in tuple("FGHIJ")]
    assert {letter: letters.count(letter) for letter in "FGHIJ"} == {"F": 8, "G": 6, "H": 6, "I": 6, "J": 2}


def test_every_value_stands_in_words_with_its_symbol(field: WindField, written: Path) -> None:
    text = words(written / "wind_zones.svg")
    for step in field.peak.steps:
        assert any(line.startswith(f"{step.symbol} = ") for line in text)
        assert step.meaning in text


def test_inside_coefficients_say_which_cases_they_are_of(field: WindField, written: Path) -> None:
    text = " ".join(words(written / "wind_zones.svg"))
    named = re.findall("cases \u201c(inside [^\u201d]+)\u201d", text)
    assert len(named) == len(field.internal)
    assert set(named) == {case.name.rpartition(", ")[2] for case in field.cases}
    assert [f"cpi = {name.removeprefix('inside ')}".replace("-", "\u2212") in text for name in named] == [True, True]


def test_values_that_the_sheet_has_no_room_for_are_counted(field: WindField) -> None:
    sheet = Sheet()
    end = draw_steps(sheet, field, 0.0, 100.0, (92.0, 40.0))
    assert end >= 60.0
    shown = [text.get_text() for text in sheet.figure.findobj(Text)]
    more = next(int(text.split()[1]) for text in shown if text.endswith("more: see calculation.pdf"))
    assert sum(" = " in text for text in shown) + more == len(field.peak.steps) + len(field.internal)


def test_every_case_is_shown_with_its_pressures(field: WindField, written: Path) -> None:
    text = words(written / "wind_pressures.svg")
    for case in field.cases:
        assert case.name in text
        assert f"{case.walls[0] * 1e3:+.2f}".replace("-", "\u2212") in text
    assert len([line for line in text if line.startswith("roof in all")]) == len(field.cases)


def test_blocks_are_as_high_as_their_pressures(design: Design, field: WindField) -> None:
    sheet = wind_sheets(design)["wind_pressures"]
    sheet.finish()
    expected = np.array([abs(value) for case in field.cases for value in (*case.net, *case.walls)])
    expected = expected / max(abs(case.net).max() for case in field.cases) * LONGEST
    heights = np.array([float(np.hypot(*(block[3] - block[0]))) for block in blocks(sheet)])
    assert heights.max() == pytest.approx(max(expected))
    assert all(np.isclose(expected, height).any() for height in heights)
    assert all(np.isclose(heights, height).any() for height in expected)


@pytest.fixture(scope="module")
def with_overhang() -> Design:
    """Howe, 12 m, 20 degrees: the end of a zone meets the ridge but for rounding, so that two cuts are one."""
    return designed(WITH_OVERHANG)


def test_a_stretch_without_length_is_not_drawn(with_overhang: Design) -> None:
    """It has no direction, so drawing it would divide by zero: a warning, which is an error here."""
    site = with_overhang.setting.load_set.site
    assert site is not None
    assert site.wind is not None
    assert np.diff(site.wind.cuts).min() < TOLERANCES.same_point
    drawn = blocks_of(wind_sheets(with_overhang)["wind_pressures"])
    assert all(np.isfinite(block).all() for block in drawn)
    assert min(float(np.hypot(*(block[1] - block[0]))) for block in drawn) > 0.1


@pytest.mark.parametrize("roof", ["design", "with_overhang"])
def test_every_block_has_its_number_clear_of_blocks_and_numbers(roof: str, request: pytest.FixtureRequest) -> None:
    """By what the letters cover as drawn, not by the room that was kept for them."""
    sheet = wind_sheets(request.getfixturevalue(roof))["wind_pressures"]
    drawn = [Polygon(block) for block in blocks_of(sheet)]
    numbers = [shape for text, shape in outlines(sheet) if re.fullmatch(r"[+\u2212]\d\.\d\d", text.get_text())]
    assert len(numbers) == len(drawn)
    assert not any(number.intersects(block) for number in numbers for block in drawn)
    assert not any(one.intersects(other) for at, one in enumerate(numbers) for other in numbers[:at])


def test_pressures_bear_their_unit_and_their_sign(field: WindField, written: Path) -> None:
    text = words(written / "wind_pressures.svg")
    assert text.count("net, kPa") == len(field.cases)
    assert any("+ presses on the surface, \u2212 sucks" in line for line in text)
    assert not any("Tension +" in line for line in text)


def blocks_of(sheet: Sheet) -> list[FloatArray]:
    sheet.finish()
    return blocks(sheet)


def blocks(sheet: Sheet) -> list[FloatArray]:
    pale = [one for one in sheet.figure.findobj(PolyCollection) if np.allclose(one.get_facecolor(), to_rgba(PALE))]
    return [np.asarray(path.vertices) for collection in pale for path in collection.get_paths()]


def test_the_same_design_gives_the_same_bytes(design: Design, written: Path, tmp_path: Path) -> None:
    with drawing_board():
        wind_sheets(design)["wind_zones"].write(tmp_path, "wind_zones")
    for name in ("wind_zones.svg", "wind_zones.png"):
        assert (tmp_path / name).read_bytes() == (written / name).read_bytes()


@pytest.mark.parametrize(
    "truss", [mono_pitch(), build_form(FormInput("Pratt", 20e3, 0.05, 900.0, 8))], ids=["monopitch", "flat"]
)
def test_other_roofs_are_drawn(design: Design, truss: Truss, tmp_path: Path) -> None:
    project = design.setting.project
    assert project.site is not None
    found = actions_from_site(truss, project.site, project.actions, project.loads, spacing=5e3, tributary=5e3)
    assert found.wind is not None
    with drawing_board():
        wind_zones_sheet(design, found, found.wind).write(tmp_path, "wind_zones")
    shown = " ".join(words(tmp_path / "wind_zones.svg"))
    for zone in (zone for zones in found.wind.zones.values() for zone in zones):
        assert f"{zone.name} \u2212" in shown
