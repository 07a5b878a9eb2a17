"""Every mistake in a project file names file, key, what was found and the remedy; no other error escapes."""

from __future__ import annotations

import re
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from spanwright.design.run import prepare
from spanwright.io.project_file import parse_project, read_project
from spanwright.io.starter import starter_text
from spanwright.truss.errors import InputError, SpanwrightError, UnknownNameError

STARTER = starter_text()
WINDLESS = """
actions = "SANS 10160:2011"
[truss]
form = "Howe"
span = "12 m"
pitch = "18 deg"
spacing = "5 m"
[restraint]
anchored_purlins = "all"
anchored_by = "diaphragm"
bearings_held = true
[loads]
roof_permanent = "0.2 kPa"
roof_imposed = "0.3 kPa"
"""


def changed(key: str, line: str) -> str:
    """The starter with the line that gives `key` replaced; "" takes it out."""
    text, times = re.subn(rf"(?m)^{re.escape(key)}\s*=.*$", lambda _: line, STARTER, count=1)
    assert times == 1, key
    return text


def mistake(text: str) -> InputError:
    with pytest.raises(InputError) as caught:
        parse_project(text, "roof.toml")
    assert str(caught.value).startswith(f"roof.toml: {caught.value.key}")
    assert caught.value.remedy
    return caught.value


@pytest.mark.parametrize(
    ("key", "line", "place", "found", "remedy"),
    [
        # units
        ("span", "span = 18", "truss.span", "18 has no unit", 'write "18 m"'),
        ("span", 'span = "18 kN"', "truss.span", '"18 kN" is a force', "mm, cm, m, in, ft"),
        ("span", 'span = "18,5 m"', "truss.span", '"18,5 m"', "full stop"),
        ("gusset", "gusset = 8", "members.gusset", "8 has no unit", 'write "8 mm"'),
        ("roof_imposed", 'roof_imposed = "0.3"', "loads.roof_imposed", '"0.3" has no unit', 'write "0.3 kPa"'),
        ("left", 'left = "-0.75 kN"', "loads.wind[1].left", "is a force, not a pressure", "kPa"),
        ("down", "psi = 1.5", "loads.at_joint[1].psi", "outside", "from 0 to 1"),
        ("down", 'psi = "1"', "loads.at_joint[1].psi", "is not a number", "no quotes"),
        ("down", 'down = "5 kPa"', "loads.at_joint[1].down", "is a pressure, not a force", "kN"),
        ("pitch", 'pitch = "10 m"', "truss.pitch", "is a length, not an angle", "deg"),
        ("fixings", 'fixings = "0.08"', "members.fixings", '"0.08" has no unit', "%"),
        # not finite, negative, absurd
        ("span", "span = nan", "truss.span", "nan is not a finite number", '"1.5 m"'),
        ("span", 'span = "inf m"', "truss.span", "inf m", "a length"),
        ("span", 'span = "-18 m"', "truss.span", "-18 m", "more than 1 m"),
        ("span", 'span = "18 km"', "truss.span", '"18 km" has an unknown unit', 'did you mean "18 m"?'),
        ("span", 'span = "18000 m"', "truss.span", "m", "less than 150 m"),
        ("spacing", 'spacing = "-5 m"', "truss.spacing", '"-5 m" is negative', "0.3 m to 30 m"),
        ("spacing", 'spacing = "5000 m"', "truss.spacing", "outside the plausible range", "0.3 m to 30 m"),
        ("roof_imposed", 'roof_imposed = "-1 kPa"', "loads.roof_imposed", "is negative", "0 kPa to 20 kPa"),
        ("roof_imposed", 'roof_imposed = "0.3 MPa"', "loads.roof_imposed", '"0.3 MPa" is outside', "0 kPa to 20 kPa"),
        ("left", 'left = "-750 kPa"', "loads.wind[1].left", "outside", "-10 kPa to 10 kPa"),
        ("quantity", "quantity = 0", "quantity", "0 is outside", "1 to 10000"),
        ("quantity", "quantity = 2.5", "quantity", "2.5 is not a whole number", "1 to 10000"),
        ("quantity", 'quantity = "two"', "quantity", '"two" is not a whole number', "1 to 10000"),
        ("gusset", 'gusset = "8 m"', "members.gusset", "outside", "3 mm to 60 mm"),
        ("fixings", 'fixings = "80 %"', "members.fixings", "outside", "0 % to 50 %"),
        # forms
        ("panels", "panels = 13", "truss.panels", "13", "12"),
        ("panels", 'panels = "12"', "truss.panels", '"12" is not a number of panels', "whole number"),
        ("heel_depth", 'heel_depth = "12 m"', "truss.heel_depth", "more than half the span", "span/25"),
        ("form", 'form = "prat"', "truss.form", '"prat"', 'did you mean "Pratt"?'),
        ("form", 'form = "Warren"', "truss.form", '"Warren"', '"Howe"'),
        ("pitch", "", "truss.pitch", "missing", "rise ="),
        ("pitch", 'pitch = "10 deg"\nrise = "1 m"', "truss.rise", "both given", "one of them"),
        ("pitch", 'pitch = "80 deg"', "truss.pitch", "80", "60"),
        ("supports", 'supports = "fixed"', "truss.supports", '"fixed"', '"both pinned"'),
        # words and choices
        ("knee_braces", 'knee_braces = "evry 2nd purlin"', "restraint.knee_braces", "evry", '"every 2nd purlin"'),
        ("knee_braces", "knee_braces = 2", "restraint.knee_braces", "2", '"every 2nd purlin"'),
        ("bottom_ties", 'bottom_ties = "every joint"', "restraint.bottom_ties", "every joint", '"every 2nd joint"'),
        ("purlins", 'purlins = "on joints"', "restraint.purlins", "on joints", '"at joints"'),
        ("purlins", "purlins = 1.5", "restraint.purlins", "1.5 has no unit", '"1.5 m"'),
        ("ridge_purlins", 'ridge_purlins = "two"', "restraint.ridge_purlins", "two", "pair, 0.2 m from the apex"),
        ("anchored_purlins", 'anchored_purlins = "some"', "restraint.anchored_purlins", "some", '"all"'),
        ("anchored_purlins", "anchored_purlins = [0]", "restraint.anchored_purlins", "0", "1 to"),
        ("anchored_by", 'anchored_by = "hope"', "restraint.anchored_by", "hope", '"diaphragm"'),
        ("anchored_by", 'anchored_by = "nothing"', "restraint.anchored_by", "contradicts", '"none"'),
        ("bearings_held", 'bearings_held = "yes"', "restraint.bearings_held", '"yes"', "true or false"),
        ("packs", 'packs = "two"', "members.packs", "two", '"2 a panel"'),
        ("deflection", 'deflection = { total = "L/250" }', "members.deflection.total", "L/250", '"span/300"'),
        ("bolts", 'bolts = "2M20"', "connections.bolts", "2M20", '"2 x M20 8.8"'),
        ("bolts", 'bolts = "0 x M20 8.8"', "connections.bolts", "0", "1 to 12"),
        ("weld_length", 'weld_length = "150 mm"', "connections.weld_length", "150 mm", '"1.5 legs"'),
        ("top_chord", "top_chord = 2", "members.top_chord", "2 is not text", "quotes"),
        ("steel", 'steel = ""', "members.steel", "empty", "name"),
        ("title", 'title = "a\\u0000b"', "title", "control character", "one line"),
        ("title", 'title = """a\nb"""', "title", "line break", "one line"),
        # loads
        ("kind", 'kind = "dead"', "loads.at_joint[1].kind", '"dead"', '"permanent"'),
        ("roof_permanent", 'roof_permanent = { most = "1 kPa" }', "loads.roof_permanent.least", "missing", "helps"),
    ],
)
def test_a_mistake_names_key_value_and_remedy(key: str, line: str, place: str, found: str, remedy: str) -> None:
    error = mistake(changed(key, line))
    assert error.key == place
    assert found in error.found
    assert remedy in error.remedy


@pytest.mark.parametrize(
    ("key", "meaning"),
    [
        ("actions", "load factors"),
        ("form", '"Fink"'),
        ("span", "between supports"),
        ("spacing", "truss to truss"),
        ("anchored_purlins", "holds nothing sideways"),
        ("anchored_by", '"roof bracing"'),
        ("bearings_held", "eaves strut"),
        ("roof_permanent", "uplift"),
        ("roof_imposed", "loading standard"),
        ("kind", "load factors"),
    ],
)
def test_a_required_key_that_is_missing_is_explained(key: str, meaning: str) -> None:
    error = mistake(changed(key, ""))
    assert error.key.rpartition(".")[2] == key
    assert "required and missing" in error.found
    assert meaning in error.remedy


def test_a_wind_case_states_a_pressure_on_every_slope_there_is() -> None:
    """A roof of one slope may leave the other out, so it is the loads room that asks."""
    with pytest.raises(InputError, match="no pressure on the left slope") as caught:
        prepare(parse_project(changed("left", "")))
    assert caught.value.key == "loads.wind"
    assert 'left = "' in caught.value.remedy
    assert mistake(changed("left", "").replace('right       = "-0.55 kPa"', "")).key == "loads.wind[1]"


def test_most_and_least_of_a_load_at_a_joint_are_for_permanent_ones() -> None:
    pair = 'down = { most = "8 kN", least = "5 kN" }'
    error = mistake(changed("down", pair))
    assert error.key == "loads.at_joint[1]"
    assert "permanent" in error.remedy
    permanent = changed("down", pair).replace('kind  = "imposed"', 'kind  = "permanent"')
    (load,) = parse_project(permanent).loads.at_joint
    assert (load.down, load.least_down, load.least_right) == (8000.0, 5000.0, None)
    assert mistake(permanent.replace('least = "5 kN"', 'less = "5 kN"')).key == "loads.at_joint[1].down.less"


@pytest.mark.parametrize("answer", ["", "wind = []", 'wind = "no"', "wind = 3"])
def test_wind_must_be_answered(answer: str) -> None:
    error = mistake(WINDLESS + answer)
    assert error.key == "loads.wind"
    assert 'wind = "none"' in error.remedy


def test_none_is_an_answer() -> None:
    assert parse_project(WINDLESS + 'wind = "none"').loads.wind == ()


def test_a_load_without_a_force() -> None:
    load = '[[loads.at_joint]]\ncase = "hoist"\nkind = "imposed"\njoint = "B6"\n'
    error = mistake(WINDLESS + 'wind = "none"\n' + load)
    assert error.key == "loads.at_joint[1]"
    assert "down =" in error.remedy


@pytest.mark.parametrize(
    ("key", "line", "place", "nearest"),
    [
        ("span", 'spann = "18 m"', "truss.spann", "span"),
        ("heel_depth", 'heel_dept = "0.9 m"', "truss.heel_dept", "heel_depth"),
        ("mark", 'marc = "R1"', "marc", "mark"),
        ("knee_braces", 'knee_brace = "none"', "restraint.knee_brace", "knee_braces"),
        ("left", 'lefft = "-1 kPa"', "loads.wind[1].lefft", "left"),
        ("joint", 'joints = "B6"', "loads.at_joint[1].joints", "joint"),
        ("gusset", 'guset = "8 mm"', "members.guset", "gusset"),
        ("deflection", 'deflection = { totel = "span/250" }', "members.deflection.totel", "total"),
        ("[title_block]", "", "titel_block", "title_block"),
    ],
)
def test_an_unknown_key_suggests_the_nearest(key: str, line: str, place: str, nearest: str) -> None:
    text = STARTER.replace("[title_block]", "[titel_block]") if key.startswith("[") else changed(key, line)
    error = mistake(text)
    assert isinstance(error, UnknownNameError)
    assert (error.key, error.nearest) == (place, nearest)


def test_wind_on_an_unknown_slope() -> None:
    error = mistake(changed("right", 'windward = "-0.5 kPa"'))
    assert error.key == "loads.wind[1].windward"
    assert "left, right" in error.remedy


def test_a_key_in_the_wrong_table_is_sent_home() -> None:
    assert "[members]" in mistake(changed("span", 'span = "18 m"\nsteel = "S355JR"')).remedy
    assert "above all tables" in mistake(changed("span", 'span = "18 m"\nactions = "x"')).remedy


def test_a_form_and_joints_exclude_each_other() -> None:
    error = mistake(changed("span", 'span = "18 m"\nbars = [["A", "B", "post"]]'))
    assert "does not go with joints and bars" in error.found


@pytest.mark.parametrize(
    ("bars", "found"),
    [
        ('["A", "B"]', '"A" is not a bar'),
        ('[["A", "B"]]', "a list is not a bar"),
        ('[["A", "B", "rafter"]]', '"rafter" is not one of the choices'),
        ('[["A", 1, "post"]]', "1 is not text"),
    ],
)
def test_bars_that_are_none(bars: str, found: str) -> None:
    text = f'[truss]\nspacing = "5 m"\nbars = {bars}\n[truss.joints]\nA = ["0 m", "0 m"]\n'
    error = mistake('actions = "x"\n' + text)
    assert error.key.startswith("truss.bars")
    assert found in error.found


def test_a_joint_absurdly_far_away() -> None:
    text = 'actions = "x"\n[truss]\nspacing = "5 m"\nbars = []\n[truss.joints]\nA = ["1e9 m", "0 m"]\n'
    assert (error := mistake(text)).key == "truss.joints.A"
    assert "absurdly far" in error.found


def test_a_group_nobody_named() -> None:
    text = STARTER + '[groups]\ntie = ["BC3"]\n[members.groups]\ntye = "2L"\n'
    error = mistake(text)
    assert isinstance(error, UnknownNameError)
    assert (error.key, error.nearest) == ("members.groups.tye", "tie")


def test_a_bar_listed_twice() -> None:
    assert mistake(STARTER + '[groups]\ntie = ["BC3", "BC3"]\n').key == "groups.tie"


def test_other_mistakes_are_named_too() -> None:
    text = changed("span", "span = 18").replace('gusset        = "8 mm"', "gusset = 8")
    error = mistake(text)
    assert error.key == "truss.span"
    assert "members.gusset" in error.remedy


@pytest.mark.parametrize("table", ["truss", "restraint", "loads", "members", "connections", "groups", "title_block"])
def test_a_table_that_is_none(table: str) -> None:
    error = mistake(f'actions = "x"\n{table} = 5\n')
    assert table in str(error)


@pytest.mark.parametrize(
    ("text", "found", "remedy"),
    [
        ("", "empty", "starter"),
        (" \n", "empty", "starter"),
        ("[truss]\nspan = 18 m\n", "not valid TOML", "line 2 reads: span = 18 m"),
        ("title = \u201cFeed store\u201d", "not valid TOML", "quotes"),
        ("x = " + "[" * 100_000, "", ""),
        ("x = " + "9" * 10_000, "", ""),
        ('title = "a"\ntitle = "b"', "not valid TOML", ""),
        ("title = 'a\x00b'", "not valid TOML", ""),
    ],
)
def test_text_that_is_no_project(text: str, found: str, remedy: str) -> None:
    error = mistake(text)
    assert found in error.found
    assert remedy in error.remedy


def test_files_that_cannot_be_read(tmp_path: Path) -> None:
    (tmp_path / "utf16.toml").write_bytes(STARTER.encode("utf-16"))
    (tmp_path / "latin.toml").write_bytes('title = "D\u00e4cher"'.encode("latin-1"))
    (tmp_path / "large.toml").write_bytes(b"#" * 3_000_000)
    (tmp_path / "empty.toml").write_bytes(b"")
    for name, found in [
        ("utf16.toml", "not UTF-8"),
        ("latin.toml", "byte 0xe4 at position 10"),
        ("large.toml", "3000000 bytes"),
        ("empty.toml", "empty"),
        ("none.toml", "no such file"),
        ("none\x00.toml", ""),
        (".", "folder"),
    ]:
        path = tmp_path / name
        with pytest.raises(InputError) as caught:
            read_project(path)
        assert caught.value.file == str(path)
        assert found in caught.value.found
        assert caught.value.remedy
    with pytest.raises(InputError, match=r"empty\.toml, large\.toml"):
        read_project(tmp_path / "none.toml")


def test_a_file_without_permission(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "roof.toml"
    path.write_text(STARTER)

    def denied(self: Path) -> bytes:
        raise PermissionError(13, "Permission denied", str(self))

    monkeypatch.setattr(Path, "read_bytes", denied)
    with pytest.raises(InputError, match="cannot be read: Permission denied"):
        read_project(path)


# Fuzz: only a SpanwrightError ever escapes.

UNITS = st.sampled_from(["m", "mm", "kPa", "%", ""])
QUANTITIES = st.builds("{}{}{}".format, st.floats(), st.sampled_from(["", " "]), UNITS)
BARE = st.sampled_from(["true", "2025-03-01", "07:32:00"])
SCALARS = st.one_of(
    st.sampled_from(["none", "all", "2L", "every 2nd purlin", "pair, nan m from the apex", "span/0", "0 x M20 8.8"]),
    QUANTITIES,
    st.text(max_size=8),
).map(lambda text: '"' + text.encode("unicode_escape").decode("ascii").replace('"', "").replace("\\x", "\\u00") + '"')
VALUES = st.recursive(
    st.one_of(
        SCALARS, st.integers().map(str), st.floats().map(str), st.sampled_from(["true", "2025-03-01", "07:32:00"])
    ),
    lambda inner: (
        st.lists(inner, max_size=3).map(lambda items: "[" + ", ".join(items) + "]")
        | st.dictionaries(st.sampled_from(["most", "least", "in_plane", "x"]), inner, max_size=2).map(
            lambda table: "{ " + ", ".join(f"{key} = {value}" for key, value in table.items()) + " }"
        )
    ),
    max_leaves=4,
)
LINES = [number for number, line in enumerate(STARTER.splitlines()) if re.match(r"\w+\s*=", line)]


@given(st.dictionaries(st.sampled_from(LINES), VALUES, min_size=1, max_size=4))
@settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.too_slow])
def test_any_value_at_any_key(values: dict[int, str]) -> None:
    lines = STARTER.splitlines()
    for number, value in values.items():
        lines[number] = lines[number].partition("=")[0] + f"= {value}"
    try:
        parse_project("\n".join(lines), "roof.toml")
    except SpanwrightError as error:
        assert str(error).startswith("roof.toml: ")


@given(st.text(max_size=60) | st.binary(max_size=60).map(lambda raw: raw.decode("latin-1")))
@settings(max_examples=100, deadline=None)
def test_any_text(text: str) -> None:
    with pytest.raises(SpanwrightError):
        parse_project(text)
