"""Load cases of a small roof: 8 m span, 3-4-5 slopes, trusses 5 m apart."""

import math
from typing import Literal

import numpy as np
import pytest
from scipy.constants import g

from spanwright.loads.cases import Case, LoadSet, load_cases, own_mass_loads
from spanwright.loads.inputs import JointLoad, LoadsInput, MostLeast, WindInput
from spanwright.truss.errors import InputError, UnknownNameError
from spanwright.truss.forms import build_form
from spanwright.truss.given import build_given
from spanwright.truss.inputs import FormInput, GivenInput, RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import lay_purlins

ROOF = FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4)
AT_JOINTS = RestraintInput("at joints", "all", "roof bracing", True)
BETWEEN = RestraintInput((0.0, 1250.0, 2500.0), "all", "roof bracing", True)
SUCTION = WindInput("gale", -0.8e-3, -0.5e-3, 6000.0, 3000.0)

MONO = GivenInput(
    joints=(("A", 0.0, 0.0), ("B", 4000.0, 0.0), ("C", 8000.0, 0.0), ("D", 4000.0, 1500.0), ("E", 8000.0, 3000.0)),
    bars=(
        ("A", "D", "top chord"),
        ("D", "E", "top chord"),
        ("A", "B", "bottom chord"),
        ("B", "C", "bottom chord"),
        ("B", "D", "post"),
        ("C", "E", "post"),
        ("B", "E", "diagonal"),
    ),
    supports=(("A", "pinned"), ("C", "sliding")),
)


def loads(
    *at_joint: JointLoad,
    roof: MostLeast = MostLeast(0.25e-3, 0.18e-3),  # noqa: B008  # frozen
    imposed: float = 0.3e-3,
    wind: tuple[WindInput, ...] = (),
    ceiling: MostLeast = MostLeast(0.0, 0.0),  # noqa: B008  # frozen
    man: float = 0.0,
) -> LoadsInput:
    return LoadsInput(roof, imposed, wind, ceiling, man, at_joint)


def load_set(given: LoadsInput, truss: Truss | None = None, restraint: RestraintInput = AT_JOINTS) -> LoadSet:
    truss = truss or build_form(ROOF)
    return load_cases(truss, lay_purlins(truss, restraint), given, 5000.0)


def named(found: LoadSet) -> dict[str, Case]:
    return {case.name: case for case in found.cases}


def on(case: Case, truss: Truss, joint: str) -> list[float]:
    return [float(force) for force in case.joint_loads[truss.joint(joint)]]


def test_names_and_kinds() -> None:
    found = load_set(loads(wind=(SUCTION,), man=900.0))
    assert [(case.name, case.kind) for case in found.cases] == [
        ("most", "permanent"),
        ("least", "permanent"),
        ("imposed", "imposed"),
        ("imposed left", "imposed"),
        ("imposed right", "imposed"),
        ("man at T1", "man"),
        ("man at T2", "man"),
        ("man at T3", "man"),
        ("gale", "wind"),
        ("gale mirrored", "wind"),
    ]


def test_permanent_on_the_slope_and_imposed_on_plan() -> None:
    truss, cases = build_form(ROOF), named(load_set(loads()))
    # 2.5 m of slope or 2.0 m of plan at an inner joint, half of it at a heel, 5 m of roof along the ridge
    assert on(cases["most"], truss, "T1") == pytest.approx([0.0, -0.25 * 2.5 * 5.0 * 1e3])
    assert on(cases["least"], truss, "T1") == pytest.approx([0.0, -0.18 * 2.5 * 5.0 * 1e3])
    assert on(cases["imposed"], truss, "T2") == pytest.approx([0.0, -0.30 * 2.0 * 5.0 * 1e3])
    assert on(cases["imposed left"], truss, "T2") == pytest.approx([0.0, -0.30 * 1.0 * 5.0 * 1e3])
    assert on(cases["imposed left"], truss, "T3") == [0.0, 0.0]
    assert on(cases["imposed right"], truss, "B4") == pytest.approx([0.0, -0.30 * 1.0 * 5.0 * 1e3])


def test_no_imposed_load_no_imposed_case() -> None:
    assert [case.name for case in load_set(loads(imposed=0.0)).cases] == ["most", "least"]


def test_least_above_most_is_refused() -> None:
    with pytest.raises(InputError) as caught:
        load_set(loads(ceiling=MostLeast(0.1e-3, 0.2e-3)))
    assert caught.value.key == "loads.ceiling_permanent"


def test_no_purlins_are_refused() -> None:
    with pytest.raises(InputError) as caught:
        load_cases(build_form(ROOF), (), loads(), 5000.0)
    assert caught.value.key == "restraint.purlins"


def test_ceiling_by_half_panels_on_the_bottom_joints() -> None:
    truss = build_form(ROOF)
    bare, with_ceiling = named(load_set(loads())), named(load_set(loads(ceiling=MostLeast(0.1e-3, 0.0))))
    added = with_ceiling["most"].joint_loads - bare["most"].joint_loads
    downward = {name: -added[truss.joint(name), 1] for name in truss.joint_names}
    expected = {"B0": 500, "B1": 1000, "B2": 1000, "B3": 1000, "B4": 500}
    assert downward == pytest.approx(dict.fromkeys(truss.joint_names, 0) | expected)
    assert with_ceiling["least"].joint_loads == pytest.approx(bare["least"].joint_loads)


def test_long_bottom_panels_warn_under_a_ceiling_only() -> None:
    fink = build_form(FormInput("Fink", 12000.0, math.radians(30.0), panels=4))  # bottom panels of 4 m
    assert not [text for text in load_set(loads(), fink).warnings if "hangers" in text]
    (warning,) = [text for text in load_set(loads(ceiling=MostLeast(0.1e-3, 0.0)), fink).warnings if "hangers" in text]
    assert "BC1" in warning


def test_bending_by_own_mass_is_left_out_and_said() -> None:
    """Reviewed: own mass bends no chord here. A cantilever of 1.6 m is bent like a span of 3.2 m."""
    assert "bending by own mass between joints is left out" in named(load_set(loads()))["most"].derivation
    usual = build_form(FormInput("Howe", 12000.0, math.atan2(3.0, 4.0), panels=4, overhang=1100.0))  # panels of 3.75 m
    (warning,) = [text for text in load_set(loads(), usual).warnings if "own mass" in text]
    assert "TC1, TC2, TC3, TC4; " in warning
    assert not [text for text in load_set(loads()).warnings if "own mass" in text]
    far = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=1280.0))  # 1.6 m of slope
    (warning,) = [text for text in load_set(loads(), far).warnings if "own mass" in text]
    assert "left overhang, right overhang" in warning


def test_own_mass_goes_to_the_joints() -> None:
    truss = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=800.0))
    mass = np.arange(1.0, len(truss.bar_names) + 1)
    own = own_mass_loads(truss, mass)
    rafter, tie = mass[truss.bar("TC1")], mass[truss.bar("BC1")]
    # half of TC1 (2.5 m) and of BC1 (2 m), and 1 m of overhang
    assert own[truss.joint("B0")] == pytest.approx([0.0, -(rafter * (1.25 + 1.0) + tie * 1.0) * g])
    overhangs = (rafter + mass[truss.bar("TC4")]) * 1.0
    assert own.sum(axis=0) == pytest.approx([0.0, -((mass * truss.lengths / 1e3).sum() + overhangs) * g])


def test_a_man_stands_at_joints_and_where_purlins_stand_between_them() -> None:
    truss = build_form(ROOF)
    found = load_set(loads(man=900.0), restraint=BETWEEN)
    men = {case.name: case for case in found.cases if case.kind == "man"}
    assert list(men) == [f"man at T{k}" for k in (1, 2, 3)] + ["man in TC1", "man in TC4"]
    assert on(men["man at T1"], truss, "T1") == [0.0, -900.0]
    # midway in the first of two equal panels: 13/32 to the heel, -3/32 to the ridge, 13/64 P L under him
    assert on(men["man in TC1"], truss, "B0") == pytest.approx([720.0 * 13 / 32 * 0.6, -720.0 * 13 / 32 * 0.8])
    assert men["man in TC1"].moments.max() == pytest.approx(13 / 64 * 900.0 * 0.8 * 2500.0)
    assert men["man at T1"].moments == pytest.approx(np.zeros(len(found.stations.at)))


def test_a_man_stands_at_the_outermost_purlin_of_an_overhang() -> None:
    truss = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=800.0))
    found = named(load_set(loads(man=900.0), truss, RestraintInput((200.0, 3500.0), "all", "roof bracing", True)))
    assert found["man on left overhang"].moments.min() == pytest.approx(-900.0 * 0.8 * 800.0)
    assert "man on right overhang" in found


def test_an_overhang_is_bent_as_a_cantilever_with_purlins_at_joints() -> None:
    """Reviewed: it was not bent at all. 1 m of slope, 3 in 4, 5 m of roof: w l2/2 across the chord at the heel."""
    truss = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=800.0))
    found = load_set(loads(man=900.0, wind=(SUCTION,)), truss)
    cases, at_heel = named(found), 0
    assert cases["most"].moments[at_heel] == pytest.approx(-0.25 * 5.0 * 0.8 * 1.0**2 / 2 * 1e6)
    assert cases["imposed"].moments[at_heel] == pytest.approx(-0.30 * 5.0 * 0.8 * 0.8 * 1.0**2 / 2 * 1e6)
    assert cases["gale"].moments[[0, -1]] == pytest.approx([0.8 * 5.0 / 2 * 1e6, 0.5 * 5.0 / 2 * 1e6])
    assert cases["man on left overhang"].moments[at_heel] == pytest.approx(-900.0 * 0.8 * 1000.0)


def test_wind_and_its_mirror_image() -> None:
    truss = build_form(ROOF)
    cases = named(load_set(loads(wind=(SUCTION,))))
    # normal to the slopes, 2.5 m at T1: -w s dx up, w s dz sideways
    assert on(cases["gale"], truss, "T1") == pytest.approx([-0.8 * 5.0 * 1.5 * 1e3, 0.8 * 5.0 * 2.0 * 1e3])
    assert on(cases["gale"], truss, "T3") == pytest.approx([0.5 * 5.0 * 1.5 * 1e3, 0.5 * 5.0 * 2.0 * 1e3])
    assert on(cases["gale mirrored"], truss, "T1") == pytest.approx([-0.5 * 5.0 * 1.5 * 1e3, 0.5 * 5.0 * 2.0 * 1e3])
    roof_only = named(load_set(loads(wind=(WindInput("gale", -0.8e-3, -0.5e-3),))))
    walls = cases["gale"].joint_loads - roof_only["gale"].joint_loads
    assert walls.sum(axis=0) == pytest.approx([9000.0, 0.0])
    assert walls[truss.joint("B0")] == pytest.approx([6000.0, 0.0])
    mirrored = cases["gale mirrored"].joint_loads - roof_only["gale mirrored"].joint_loads
    assert mirrored[truss.joint("B0")] == pytest.approx([-3000.0, 0.0])
    assert mirrored[truss.joint("B4")] == pytest.approx([-6000.0, 0.0])


@pytest.mark.parametrize(
    "wind",
    [
        WindInput("along", -0.7e-3, -0.7e-3),
        WindInput("along", -0.7e-3, -0.7e-3, 2000.0, -2000.0),
        WindInput("one way", -0.7e-3, -0.2e-3, mirrored=False),
    ],
)
def test_no_twin_where_it_is_identical_or_not_wanted(wind: WindInput) -> None:
    assert [case.name for case in load_set(loads(wind=(wind,))).cases if case.kind == "wind"] == [wind.name]


def test_wind_on_a_slope_that_does_not_exist() -> None:
    truss = build_given(MONO)
    with pytest.raises(InputError) as caught:
        load_set(loads(wind=(SUCTION,)), truss)
    assert caught.value.key == "loads.wind"
    assert "no right slope" in caught.value.found
    assert caught.value.remedy.startswith("leave right out")


def test_on_one_slope_the_pressure_of_the_other_may_be_left_out() -> None:
    """Reviewed: left and right were both required, and one of them refused."""
    gale = WindInput("gale", -0.8e-3, 0.0, unstated=("right",))
    alone = named(load_set(loads(wind=(gale,)), build_given(MONO)))["gale"]
    stated = named(load_set(loads(wind=(WindInput("gale", -0.8e-3, 0.0),)), build_given(MONO)))["gale"]
    assert alone.joint_loads == pytest.approx(stated.joint_loads)


@pytest.mark.parametrize(("truss", "unstated"), [(MONO, "left"), (ROOF, "left"), (ROOF, "right")])
def test_a_wind_pressure_left_out_on_a_slope_that_exists_is_refused(
    truss: FormInput | GivenInput, unstated: Literal["left", "right"]
) -> None:
    built = build_given(truss) if isinstance(truss, GivenInput) else build_form(truss)
    with pytest.raises(InputError, match=f"no pressure on the {unstated} slope") as caught:
        load_set(loads(wind=(WindInput("gale", 0.0, 0.0, unstated=(unstated,)),)), built)
    assert caught.value.key == "loads.wind"


def test_one_slope_is_not_mirrored_and_says_so() -> None:
    found = load_set(loads(wind=(WindInput("gale", -0.8e-3, 0.0),)), build_given(MONO))
    assert [case.name for case in found.cases if case.kind == "wind"] == ["gale"]
    assert any("one slope" in warning for warning in found.warnings)


def test_mirrored_wind_on_an_unsymmetric_truss_warns() -> None:
    joints = tuple((name, 3000.0 if name in "BD" else x, y) for name, x, y in MONO.joints)
    uneven = GivenInput(
        joints=(*joints[:3], ("D", 3000.0, 2000.0)),
        bars=(
            ("A", "D", "top chord"),
            ("D", "C", "top chord"),
            ("A", "B", "bottom chord"),
            ("B", "C", "bottom chord"),
            ("B", "D", "post"),
        ),
        supports=MONO.supports,
    )
    found = load_set(loads(wind=(SUCTION,)), build_given(uneven))
    assert "gale mirrored" in named(found)
    assert any("not symmetric" in warning for warning in found.warnings)


@pytest.mark.parametrize("names", [("gale", "gale"), ("imposed", "gale"), ("gale", "gale mirrored")])
def test_two_cases_of_one_name_are_refused(names: tuple[str, str]) -> None:
    wind = tuple(WindInput(name, -0.8e-3, -0.5e-3) for name in names)
    with pytest.raises(InputError) as caught:
        load_set(loads(wind=wind))
    assert caught.value.key == "loads.wind"


def test_imposed_load_at_a_joint_is_a_case_of_its_own_or_joins() -> None:
    truss, bare = build_form(ROOF), named(load_set(loads()))
    hoist = (JointLoad("hoist", "imposed", "B2", down=5000.0), JointLoad("hoist", "imposed", "B1", right=1000.0))
    case = named(load_set(loads(*hoist)))["hoist"]
    assert case.kind == "imposed"
    assert on(case, truss, "B2") == [0.0, -5000.0]
    assert on(case, truss, "B1") == [1000.0, 0.0]
    joined = named(load_set(loads(JointLoad("imposed left", "imposed", "B2", down=5000.0))))
    assert list(joined) == list(bare)
    assert (joined["imposed left"].joint_loads - bare["imposed left"].joint_loads).sum() == pytest.approx(-5000.0)


def test_wind_load_at_a_joint_joins_the_twin_at_the_mirror_image() -> None:
    truss, bare = build_form(ROOF), named(load_set(loads(wind=(SUCTION,))))
    load = JointLoad("gale", "wind", "B1", down=700.0, right=300.0)
    cases = named(load_set(loads(load, wind=(SUCTION,))))
    added = {name: cases[name].joint_loads - bare[name].joint_loads for name in ("gale", "gale mirrored")}
    assert added["gale"][truss.joint("B1")] == pytest.approx([300.0, -700.0])
    assert added["gale mirrored"][truss.joint("B3")] == pytest.approx([-300.0, -700.0])
    assert added["gale mirrored"][truss.joint("B1")] == pytest.approx([0.0, 0.0])


def test_wind_load_at_a_joint_alone_has_a_twin_unless_it_is_its_own() -> None:
    sideways = load_set(loads(JointLoad("sign", "wind", "T2", right=300.0)))
    assert [case.name for case in sideways.cases[-2:]] == ["sign", "sign mirrored"]
    upward = load_set(loads(JointLoad("sign", "wind", "T2", down=-300.0)))
    assert [case.name for case in upward.cases if case.kind == "wind"] == ["sign"]


def test_wind_load_at_a_joint_without_mirror_image_warns() -> None:
    truss = build_form(ROOF)
    joints = tuple((name, float(x), float(y)) for name, (x, y) in zip(truss.joint_names, truss.xy, strict=True))
    joints = tuple((name, x + 200.0 if name == "B1" else x, y) for name, x, y in joints)
    pairs = [(truss.joint_names[a], truss.joint_names[b]) for a, b in truss.ends]
    bars = tuple((a, b, role) for (a, b), role in zip(pairs, truss.roles, strict=True))
    lopsided = build_given(GivenInput(joints, bars, (("B0", "pinned"), ("B4", "sliding"))))
    found = load_set(loads(JointLoad("gale", "wind", "B1", right=300.0), wind=(SUCTION,)), lopsided)
    assert any("no mirror image" in warning for warning in found.warnings)
    bare = named(load_set(loads(wind=(SUCTION,)), lopsided))
    assert named(found)["gale mirrored"].joint_loads == pytest.approx(bare["gale mirrored"].joint_loads)


def test_joining_a_case_of_another_kind_is_refused() -> None:
    with pytest.raises(InputError) as caught:
        load_set(loads(JointLoad("imposed", "wind", "B2", down=1.0)))
    assert caught.value.key == "loads.at_joint"


def test_load_at_an_unknown_joint() -> None:
    with pytest.raises(UnknownNameError) as caught:
        load_set(loads(JointLoad("hoist", "imposed", "B9", down=1.0)))
    assert caught.value.key == "loads.at_joint"


def test_wind_on_an_overhang_is_said() -> None:
    truss = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4, overhang=800.0))
    (warning,) = load_set(loads(wind=(SUCTION,)), truss).warnings
    assert "undersides" in warning


def test_derivation_holds_what_a_checker_needs() -> None:
    plant = JointLoad("plant", "permanent", "B2", down=5000.0)
    cases = named(load_set(loads(plant, wind=(SUCTION,)), restraint=BETWEEN))
    most = cases["most"].derivation
    assert most[0] == "roof: 0.250 kPa x 5.000 m = 1.250 kN/m of slope"
    assert most[1].startswith("purlin line 1 at x 0.000 m, 0.625 m of slope: 0.781 kN down, to B0")
    assert "0.406 to B0, 0.688 to T1, -0.094 to T2" in most[2]
    assert "in all 12.500 kN down" in most
    assert any(line.startswith("top chord between its joints: at most") for line in most)
    assert most[-1] == "plant: 5.000 kN down at B2"
    gale = cases["gale"].derivation
    assert "left -0.800 kPa x 5.000 m = -4.000 kN/m" in gale[0]
    assert any("up and 3.000 kN to the left" in line for line in gale)
    assert gale[-1] == "wind on the right wall: 3.000 kN to the right at B4"
    assert cases["gale mirrored"].derivation[0] == "mirror image of gale"
    assert len(cases["imposed left"].derivation) < len(cases["imposed"].derivation)  # unloaded lines are left out
