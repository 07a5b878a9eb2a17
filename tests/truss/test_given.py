"""Trusses given joint by joint."""

from itertools import pairwise
from typing import Any

import pytest

from spanwright.truss.errors import GeometryError, InputError, SpanwrightError, UnknownNameError
from spanwright.truss.forms import build_form
from spanwright.truss.given import build_given
from spanwright.truss.inputs import FormInput, GivenInput
from spanwright.truss.model import Role, Truss

Joints = tuple[tuple[str, float, float], ...]
Bars = tuple[tuple[str, str, Role], ...]

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


def chain(names: str, role: Role) -> Bars:
    return tuple((a, b, role) for a, b in pairwise(names))


def along(truss: Truss, name: str) -> str:
    chord = truss.top if name == "top" else truss.bottom
    return "".join(truss.joint_names[joint] for joint in chord.joints)


def test_bars_are_named_by_role_from_left_to_right_and_joints_keep_their_names() -> None:
    truss = build_given(KING_POST)
    assert truss.joint_names == ("A", "B", "C", "D")
    ends = [truss.joint_names[a] + truss.joint_names[b] for a, b in truss.ends]
    named = dict(zip(truss.bar_names, ends, strict=True))
    assert named == {"TC1": "AB", "TC2": "BC", "BC1": "AD", "BC2": "DC", "P1": "DB"}
    assert (truss.form, truss.lean, truss.span) == ("as given", "", 5000.0)
    assert [(truss.joint_names[s.joint], s.x, s.y) for s in truss.supports] == [("A", True, True), ("C", False, True)]


@pytest.mark.parametrize(
    "form",
    [
        FormInput("Howe", 18000.0, 0.3, panels=8, overhang=500.0),
        FormInput("Pratt", 18000.0, 0.1, 900.0, 12),
        FormInput("Fink", 12000.0, 0.5, panels=6),
    ],
)
def test_a_form_given_joint_by_joint_is_the_same_truss(form: FormInput) -> None:
    built = build_form(form)
    names = built.joint_names
    bars = [(names[a], names[b], role) for (a, b), role in zip(built.ends, built.roles, strict=True)]
    half = len(bars) - 5
    truss = build_given(
        GivenInput(
            tuple((name, float(x), float(y)) for name, (x, y) in zip(names, built.xy, strict=True)),
            tuple(bars[half:] + bars[:half]),
            ((names[built.supports[0].joint], "pinned"), (names[built.supports[1].joint], "sliding")),
            form.overhang,
        )
    )
    assert truss.top.joints == built.top.joints
    assert truss.bottom.along == pytest.approx(built.bottom.along)
    assert truss.top.overhang == pytest.approx(built.top.overhang)
    assert len(truss.warnings) == len(built.warnings)
    assert [truss.ends[truss.bar(f"D{k}")].tolist() for k in (1, 2)] == [
        built.ends[bar].tolist() for bar in built.bars_with_role("diagonal")[:2]
    ]


def test_a_scissor_truss_has_a_kinked_bottom_chord() -> None:
    joints: Joints = (("A", 0, 0), ("F", 3000, 600), ("G", 5000, 1000), ("K", 7000, 600), ("L", 10000, 0))
    joints += (("B", 3000, 1500), ("C", 5000, 2500), ("D", 7000, 1500))
    bars = chain("ABCDL", "top chord") + chain("AFGKL", "bottom chord")
    bars += (("F", "B", "post"), ("G", "C", "post"), ("K", "D", "post"), ("B", "G", "diagonal"), ("D", "G", "diagonal"))
    truss = build_given(GivenInput(joints, bars, (("A", "pinned"), ("L", "sliding"))))
    assert (along(truss, "top"), along(truss, "bottom")) == ("ABCDL", "AFGKL")
    assert truss.bottom.length > truss.span
    # the flatter of the two angles at the kink: atan 0.25 - atan 0.20
    assert any("of D1, D2 to the bottom chord is down to 2.726 deg" in warning for warning in truss.warnings)


def test_a_lean_to_and_a_parallel_chord_truss_are_trusses_too() -> None:
    # MATHalino, problem 422 (after F. L. Singer): a top chord that falls to the right support
    lean_to: Joints = (
        ("A", 0, 0),
        ("B", 3000, 6000),
        ("C", 3000, 0),
        ("D", 9000, 3000),
        ("E", 9000, 0),
        ("F", 15000, 0),
    )
    bars = chain("ABDF", "top chord") + chain("ACEF", "bottom chord")
    bars += (("B", "C", "post"), ("D", "E", "post"), ("C", "D", "diagonal"))
    truss = build_given(GivenInput(lean_to, bars, (("A", "pinned"), ("F", "sliding"))))
    assert (along(truss, "top"), along(truss, "bottom")) == ("ABDF", "ACEF")

    parallel: Joints = (
        ("A", 0, 0),
        ("B", 3000, 0),
        ("C", 6000, 0),
        ("D", 0, 1500),
        ("E", 3000, 1500),
        ("F", 6000, 1500),
    )
    bars = chain("DEF", "top chord") + chain("ABC", "bottom chord")
    bars += (("A", "D", "post"), ("B", "E", "post"), ("C", "F", "post"), ("D", "B", "diagonal"), ("B", "F", "diagonal"))
    truss = build_given(GivenInput(parallel, bars, (("A", "pinned"), ("C", "pinned"))))
    assert (along(truss, "top"), along(truss, "bottom")) == ("DEF", "ABC")
    assert any("the pitch is 0 deg" in warning for warning in truss.warnings)


def test_a_beam_strutted_from_below_has_a_straight_top_chord() -> None:
    joints: Joints = (("A", 0, 0), ("B", 4000, 0), ("C", 8000, 0), ("D", 4000, -1200))
    bars = chain("ABC", "top chord") + chain("ADC", "bottom chord") + (("B", "D", "post"),)
    truss = build_given(GivenInput(joints, bars, (("A", "pinned"), ("C", "sliding"))))
    assert not any("span to greatest depth" in warning for warning in truss.warnings)
    assert along(truss, "bottom") == "ADC"


IN_METRES = tuple((name, x / 1000, y / 1000) for name, x, y in KING_POST.joints)
EXTRA_POST: Bars = (("D", "B", "post"),)
REFUSED: list[tuple[dict[str, Any], type[SpanwrightError], str, tuple[str, ...]]] = [
    ({"joints": ()}, InputError, "truss.joints", ("no joint",)),
    ({"joints": (*KING_POST.joints, ("A", 1.0, 1.0))}, InputError, "truss.joints", ('"A"', "more than once")),
    ({"joints": (*KING_POST.joints, ("E", 0.3, 0.3))}, GeometryError, "truss.joints", ('"A", "E"', "0.424 mm")),
    ({"joints": (*KING_POST.joints, ("E", 9.0, 9.0))}, GeometryError, "truss.joints", ('no bar reaches joint "E"',)),
    ({"joints": (*KING_POST.joints, ("E", float("nan"), 9.0))}, InputError, "truss.joints", ('"E"', "nan")),
    (
        {"joints": tuple((n, x / 1000, y / 1000) for n, x, y in KING_POST.joints)},
        InputError,
        "truss.joints",
        ("0.005 m",),
    ),
    ({"bars": ()}, InputError, "truss.bars", ("no bar",)),
    ({"bars": (*KING_POST.bars, *EXTRA_POST)}, GeometryError, "truss.bars", ('"B to D"', "more than once")),
    ({"bars": (*KING_POST.bars, ("D", "D", "post"))}, GeometryError, "truss.bars", ('"D" to itself',)),
    ({"bars": (*KING_POST.bars, ("A", "X", "post"))}, UnknownNameError, "truss.bars", ('"X"', "A, B, C, D")),
    ({"bars": (*KING_POST.bars, ("A", "C", "post"))}, GeometryError, "truss.bars", ('"A to C"', 'joint "D"')),
    ({"bars": (*KING_POST.bars[1:], ("B", "D", "strut"))}, UnknownNameError, "truss.bars", ('"strut"',)),
    ({"bars": (*KING_POST.bars[1:], ("B", "D", "bottom chord"))}, GeometryError, "truss.bars", ("branches at D",)),
    ({"supports": ()}, GeometryError, "truss.joint_supports", ("no support", '"A", "C"')),
    ({"supports": KING_POST.supports[:1]}, GeometryError, "truss.joint_supports", ('only support is at "A"', '"C"')),
    ({"supports": (*KING_POST.supports, ("X", "sliding"))}, UnknownNameError, "truss.joint_supports", ('"X"',)),
    ({"supports": (*KING_POST.supports, ("A", "sliding"))}, InputError, "truss.joint_supports", ('"A"', "more than")),
    ({"supports": (("A", "sliding"), ("C", "sliding"))}, GeometryError, "truss.joint_supports", ("slides",)),
    ({"supports": (("A", "fixed"), ("C", "sliding"))}, InputError, "truss.joint_supports", ('"fixed"',)),
    ({"supports": (("D", "pinned"), ("B", "pinned"))}, GeometryError, "truss.joint_supports", ('"D"', "no span")),
    ({"overhang": -5.0}, InputError, "truss.overhang", ("-5 mm",)),
    ({"overhang": float("nan")}, InputError, "truss.overhang", ("nan",)),
]


@pytest.mark.parametrize(("change", "kind", "key", "says"), REFUSED)
def test_what_cannot_stand_is_refused_by_name(
    change: dict[str, Any], kind: type[SpanwrightError], key: str, says: tuple[str, ...]
) -> None:
    parts = {"joints": KING_POST.joints, "bars": KING_POST.bars, "supports": KING_POST.supports, **change}
    with pytest.raises(kind) as refused:
        build_given(GivenInput(**parts))
    assert refused.value.key == key
    assert refused.value.remedy
    for part in says:
        assert part in str(refused.value)


def test_chords_the_wrong_way_round_are_refused() -> None:
    upside_down = tuple((name, x, -y) for name, x, y in KING_POST.joints)
    with pytest.raises(GeometryError, match="top chord lies 1200 mm below the bottom chord"):
        build_given(GivenInput(upside_down, KING_POST.bars, KING_POST.supports))
