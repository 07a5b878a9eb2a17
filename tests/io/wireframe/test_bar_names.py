"""Bars given one by one may carry names, so that a truss read from a drawing keeps its own through a project file."""

from dataclasses import replace

import pytest

from spanwright.io.project_file import parse_project
from spanwright.io.starter import starter_text
from spanwright.truss.errors import InputError
from spanwright.truss.given import build_given
from spanwright.truss.inputs import GivenInput

KING_POST = GivenInput(
    joints=(("A", 0.0, 0.0), ("B", 2500.0, 1200.0), ("C", 5000.0, 0.0), ("D", 2500.0, 0.0)),
    bars=(
        ("B", "D", "post"),
        ("C", "B", "top chord"),
        ("A", "B", "top chord"),
        ("D", "C", "bottom chord"),
        ("A", "D", "bottom chord"),
    ),
    supports=(("A", "pinned"), ("C", "sliding")),
)
NAMES = ("king", "east", "west", "tie east", "tie west")


def test_bars_keep_their_names_and_their_order() -> None:
    truss = build_given(replace(KING_POST, bar_names=NAMES))
    assert truss.bar_names == NAMES
    assert [truss.bar_names[bar] for bar in truss.top.bars] == ["west", "east"]


@pytest.mark.parametrize(
    ("names", "match"),
    [(NAMES[:4], "5 bars and 4 names"), ((*NAMES[:4], "king"), 'bar name "king" is given more than')],
)
def test_names_for_some_bars_or_twice_are_refused(names: tuple[str, ...], match: str) -> None:
    with pytest.raises(InputError, match=match) as refused:
        build_given(replace(KING_POST, bar_names=names))
    assert refused.value.key == "truss.bars"


def project(fourth: str) -> str:
    bars = f'bars = [["A", "B", "top chord"{fourth}], ["B", "C", "top chord", "E"], ["A", "C", "bottom chord", "F"]]'
    joints = 'A = ["0 m", "0 m"]\nB = ["3 m", "1 m"]\nC = ["6 m", "0 m"]'
    supports = 'A = "pinned"\nC = "sliding"'
    table = f'[truss]\nspacing = "5 m"\n{bars}\n[truss.joints]\n{joints}\n[truss.joint_supports]\n{supports}\n'
    before, rest = starter_text().split("[truss]", 1)
    return before + table + rest[rest.index("[restraint]") :]


def test_a_project_file_states_a_bar_s_name_after_its_role() -> None:
    truss = parse_project(project(', "W"')).truss
    assert isinstance(truss, GivenInput)
    assert truss.bar_names == ("W", "E", "F")
    some = parse_project(project("")).truss
    assert isinstance(some, GivenInput)
    with pytest.raises(InputError, match="3 bars and 2 names"):
        build_given(some)
