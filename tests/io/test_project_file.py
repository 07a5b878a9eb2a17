"""A project file becomes the values it states."""

from __future__ import annotations

import math
import tomllib
from pathlib import Path

import pytest
from scipy import constants

from spanwright.design.project import DeflectionLimits, Project
from spanwright.design.standard import Ends, Packs
from spanwright.io.project_file import parse_project, read_project
from spanwright.io.schema import ProjectFile, all_tables
from spanwright.io.starter import starter_text
from spanwright.loads.inputs import JointLoad, MostLeast, WindInput
from spanwright.truss.errors import InputError
from spanwright.truss.inputs import FormInput, GivenInput, RestraintInput

LEAST = """
actions = "SANS 10160:2011"
[truss]
form = "Howe"
span = "50 ft"
rise = "10 ft"
spacing = "15 ft"
[restraint]
anchored_purlins = [1, 4, 7]
anchored_by = "diaphragm"
bearings_held = false
[loads]
roof_permanent = "5 psf"
roof_imposed = "20 psf"
wind = "none"
"""

BY_JOINTS = """
actions = "SANS 10160:2011"
[truss]
spacing = "4 m"
tributary_width = "3 m"
bars = [["A", "B", "top chord"], ["B", "C", "top chord"], ["A", "C", "bottom chord"]]
[truss.joints]
A = ["0 m", "0 m"]
B = ["3 m", "1 m"]
C = ["6 m", "0 m"]
[truss.joint_supports]
A = "pinned"
C = "sliding"
[restraint]
anchored_purlins = "none"
anchored_by = "nothing"
bearings_held = true
[loads]
roof_permanent = { most = "0.25 kPa", least = "0.18 kPa" }
roof_imposed = "0.3 kPa"
wind = "none"
"""


def starter_with(line: str, instead_of: str) -> Project:
    text = starter_text()
    assert instead_of in text
    return parse_project(text.replace(instead_of, line, 1))


def test_the_starter_is_read_as_it_stands() -> None:
    project = parse_project(starter_text(), "roof.toml")
    assert project.truss == FormInput("Pratt", 18000.0, math.radians(10), 900.0, 12)
    assert (project.mark, project.quantity, project.spacing, project.tributary) == ("R1", 6, 5000.0, 5000.0)
    assert project.restraint == RestraintInput("at joints", "all", "roof bracing", True, knee_braces="every 2nd purlin")
    assert project.loads.roof_permanent == MostLeast(0.00025, 0.00018)
    assert project.loads.wind == (WindInput("across ridge, suction", -0.00075, -0.00055, 6000.0),)
    assert project.loads.at_joint == (JointLoad("hoist", "imposed", "B6", 5000.0),)
    assert project.members.by_role == {"top chord": "2L", "bottom chord": "2L", "post": "L", "diagonal": "L"}
    assert project.members.packs == Packs(2, 1.0)
    assert project.ends == Ends("welded", 1.5, 2, 20.0, True, "8.8")
    assert project.deflection == DeflectionLimits(300.0, 250.0)
    assert (project.source, project.source_name) == (starter_text(), "roof.toml")


def test_the_starter_names_every_key() -> None:
    text = starter_text()
    for place, table in all_tables():
        for key in table.model_fields:
            assert f"{key} " in text or f"[{place}.{key}]" in text or f"[{key}]" in text, f"{place}.{key}"


def test_the_least_file_lists_its_defaults() -> None:
    project = parse_project(LEAST)
    assert project.truss == FormInput("Howe", 15240.0, math.atan2(6096.0, 15240.0))
    assert project.restraint.anchored == (1, 4, 7)
    five_psf = 5 * constants.pound_force / constants.foot**2 / constants.mega
    assert (project.loads.roof_permanent.most, project.loads.roof_permanent.least) == pytest.approx(
        (five_psf, five_psf)
    )
    assert project.loads.wind == ()
    taken = dict(project.defaults_used)
    assert taken["members.gusset"] == "8 mm"
    assert taken["members.fixings"] == "8 %"
    assert taken["members.deflection.total"] == "span/250"
    assert taken["loads.man_load"] == "0.9 kN"
    assert taken["restraint.effective_length_factor.in_plane"] == "1.0"
    assert taken["restraint.knee_braces"] == "none"
    assert taken["truss.panels"].startswith("the fewest even number")
    assert taken["truss.tributary_width"] == "the spacing"
    assert not {"truss.pitch", "truss.span", "loads.wind", "title_block.owner"} & set(taken)


def test_the_psi_of_a_hoist_is_stated_or_recorded_as_a_default() -> None:
    assert dict(parse_project(starter_text()).defaults_used)["loads.at_joint[1].psi"] == "1 where it is imposed"
    stated = starter_with("psi = 0.3", "# psi = 1.0 ")
    assert stated.loads.at_joint == (JointLoad("hoist", "imposed", "B6", 5000.0, psi=0.3),)
    assert "loads.at_joint[1].psi" not in dict(stated.defaults_used)


def test_every_default_listed_is_a_key_that_may_be_written() -> None:
    written = {(place, key) for place, table in all_tables() for key in table.model_fields}
    for key, _ in parse_project(LEAST).defaults_used:
        place, _, name = key.rpartition(".")
        assert (place, name) in written, key


def test_stating_a_default_changes_only_the_record() -> None:
    taken = parse_project(LEAST)
    stated = parse_project(LEAST + '[members]\ngusset = "8 mm"\ndeflection = { variable = "span/300" }\n')
    assert stated.members == taken.members
    assert stated.deflection == taken.deflection
    assert set(taken.defaults_used) - set(stated.defaults_used) == {
        ("members.gusset", "8 mm"),
        ("members.deflection.variable", "span/300"),
    }


def test_joints_and_bars_one_by_one() -> None:
    project = parse_project(BY_JOINTS)
    assert project.truss == GivenInput(
        joints=(("A", 0.0, 0.0), ("B", 3000.0, 1000.0), ("C", 6000.0, 0.0)),
        bars=(("A", "B", "top chord"), ("B", "C", "top chord"), ("A", "C", "bottom chord")),
        supports=(("A", "pinned"), ("C", "sliding")),
    )
    assert project.supports == "as given"
    assert (project.spacing, project.tributary) == (4000.0, 3000.0)


@pytest.mark.parametrize(
    ("line", "purlins"),
    [
        ('purlins = "at joints"', "at joints"),
        ('purlins = "1.5 m"', 1500.0),
        ('purlins = ["0.1 m", "1.6 m"]', (100.0, 1600.0)),
    ],
)
def test_purlins(line: str, purlins: object) -> None:
    assert starter_with(line, 'purlins          = "at joints"').restraint.purlins == purlins


def test_ridge_pair() -> None:
    restraint = starter_with('ridge_purlins = "pair, 200 mm from the apex"', 'ridge_purlins    = "one"').restraint
    assert restraint.ridge_pair == 200.0


@pytest.mark.parametrize(
    ("line", "braces"),
    [
        ('"none"', "none"),
        ('"every purlin"', "every purlin"),
        ('"every 3rd purlin"', "every 3rd purlin"),
        ('["B2", "B6"]', ("B2", "B6")),
    ],
)
def test_knee_braces(line: str, braces: object) -> None:
    assert starter_with(line, '"every 2nd purlin"').restraint.knee_braces == braces


def test_groups_with_a_family_of_their_own() -> None:
    project = parse_project(LEAST + '[groups]\ntie = ["BC3"]\n[members.groups]\ntie = "2L 70x70x6"\n')
    assert project.groups == {"tie": ("BC3",)}
    assert project.members.by_group == {"tie": "2L 70x70x6"}


def test_equal_legs_and_hot_finished_tubes_are_stated() -> None:
    """Stock lists cover equal angles alone; tubes are sized from one table of dimensions."""
    taken = parse_project(LEAST).members
    assert (taken.equal_legs, taken.tube_process) == (False, "cold")
    stated = parse_project(LEAST + '[members]\nlegs = "equal"\ntubes = "hot finished"\n').members
    assert (stated.equal_legs, stated.tube_process) == (True, "hot")


@pytest.mark.parametrize("line", ['legs = "unequal"', 'tubes = "hot"'])
def test_words_for_legs_and_tubes_nobody_knows_are_refused(line: str) -> None:
    with pytest.raises(InputError, match="is not one of the choices"):
        parse_project(f"{LEAST}[members]\n{line}\n")


def test_title_block_takes_any_script_and_a_date() -> None:
    text = 'title = "Dachbinder \u00dc \u2013 \u5c4b\u6839 \u0633\u0642\u0641"\n' + LEAST
    project = parse_project(text + '[title_block]\ndate = 2025-03-01\nowner = "\u0141\u00f3d\u017a"\n')
    assert project.title == "Dachbinder \u00dc \u2013 \u5c4b\u6839 \u0633\u0642\u0641"
    assert project.title_block == {"date": "2025-03-01", "owner": "\u0141\u00f3d\u017a"}


def test_a_factor_below_one_with_its_reason() -> None:
    restraint = starter_with(
        '{ in_plane = 0.9, reason = "continuous chord" }', "{ in_plane = 1.0, out_of_plane = 1.0 }"
    ).restraint
    assert (restraint.factor_in, restraint.factor_out, restraint.reason) == (0.9, 1.0, "continuous chord")


@pytest.mark.parametrize("content", [starter_text().encode("utf-8-sig"), starter_text().replace("\n", "\r\n").encode()])
def test_files_of_other_editors(tmp_path: Path, content: bytes) -> None:
    path = tmp_path / "roof.toml"
    path.write_bytes(content)
    project = read_project(path)
    assert project.source_name == "roof.toml"
    assert project.truss == parse_project(starter_text()).truss


def test_the_order_of_keys_does_not_matter() -> None:
    head, *tables = LEAST.split("\n[")
    turned = head + "".join(f"\n[{table}" for table in reversed(tables))
    assert tomllib.loads(turned) == tomllib.loads(LEAST)
    first, second = parse_project(LEAST), parse_project(turned)
    assert (first.truss, first.loads, first.defaults_used) == (second.truss, second.loads, second.defaults_used)


def test_every_required_key_says_what_it_means() -> None:
    for place, table in all_tables():
        for key, info in table.model_fields.items():
            if info.is_required():
                assert len(info.description or "") > 20, f"{place}.{key}"
    assert ProjectFile.model_fields["actions"].is_required()
