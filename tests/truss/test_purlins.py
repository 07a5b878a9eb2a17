"""Where purlin lines stand, how they are numbered, and what is refused. Counting: the project's convention."""

import pytest
from roofs import hand_made, mono_pitch, parallel, raised, restraint, triangular

from spanwright.truss.errors import InputError
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine, lay_purlins
from spanwright.truss.restraint import restrain


def laid(truss: Truss, **changes: object) -> tuple[PurlinLine, ...]:
    return lay_purlins(truss, restraint(**changes))


def alongs(lines: tuple[PurlinLine, ...]) -> list[float]:
    return [line.along for line in lines]


def test_at_joints_one_line_stands_on_every_top_joint_and_the_end_joints() -> None:
    truss = raised()
    lines = laid(truss)
    assert [line.number for line in lines] == list(range(1, 10))
    assert [line.joint for line in lines] == list(truss.top.joints)
    assert [line.side for line in lines] == ["left"] * 4 + ["ridge"] + ["right"] * 4
    assert [line.bar for line in lines] == [*truss.top.bars, truss.top.bars[-1]]


def test_at_joints_of_a_triangular_truss_the_heels_carry_a_line() -> None:
    truss = triangular()
    lines = laid(truss)
    assert (lines[0].joint, lines[-1].joint) == truss.bearing_joints
    assert len(lines) == 9


def test_at_joints_a_line_stands_at_the_edge_of_an_overhang_that_sheeting_does_not_span() -> None:
    """Reviewed: with purlins at joints the overhang's load went to the heel. Sheeting cantilevers 300 mm (practice)."""
    # 3 in 4: 240 mm in plan is 300 mm of slope, 241 mm is more
    assert alongs(laid(raised(overhang=240.0))) == alongs(laid(raised()))
    lines = laid(raised(overhang=800.0))
    assert alongs(lines) == pytest.approx([-1000, *(2500 * k for k in range(9)), 21000])
    assert [line.number for line in lines] == list(range(1, 12))
    assert (lines[0].joint, lines[0].bar) == (None, None)
    assert (lines[0].x, lines[0].y) == pytest.approx((-800.0, 400.0))
    assert len(laid(raised(overhang=241.0))) == 11


def test_lines_at_the_edges_of_an_overhang_leave_the_braced_purlins_as_they_are() -> None:
    """Counted from the ridge, number 0, they come last, and no joint of the bottom chord stands below them."""
    for every in ("purlin", "2nd purlin", "3rd purlin", "5th purlin"):
        plain, overhanging = (
            [brace.at for brace in restrain(truss, restraint(knee_braces=f"every {every}")).braces]
            for truss in (raised(), raised(overhang=800.0))
        )
        assert overhanging == plain != []


def test_at_joints_a_mono_pitch_has_a_line_at_either_edge() -> None:
    # 400 mm of overhang in plan is 500 mm of slope
    lines = laid(mono_pitch(overhang=400.0))
    assert alongs(lines) == pytest.approx([-500, 0, 5000, 10000, 15000, 15500])
    assert [line.side for line in lines] == ["left"] * 4 + ["ridge", "left"]


def test_a_ridge_pair_replaces_the_ridge_line_by_two() -> None:
    lines = laid(raised(), ridge_pair=250.0)
    assert alongs(lines) == pytest.approx([0, 2500, 5000, 7500, 9750, 10250, 12500, 15000, 17500, 20000])
    left, right = lines[4:6]
    assert (left.joint, left.side, left.number) == (None, "left", 5)
    assert (right.joint, right.side, right.number) == (None, "right", 6)
    # 250 mm down a slope of 3 in 4 from the ridge at (8000, 7000)
    assert (left.x, left.y) == pytest.approx((7800.0, 6850.0))
    assert (right.x, right.y) == pytest.approx((8200.0, 6850.0))


def test_a_greatest_spacing_gives_equal_spacings_from_the_roofs_edge() -> None:
    # 800 mm of overhang in plan is 1000 mm of slope: 11 m from edge to ridge, 5 x 2.2 m within 2.5 m
    lines = laid(raised(overhang=800.0), purlins=2500.0)
    assert alongs(lines) == pytest.approx(
        [-1000, 1200, 3400, 5600, 7800, 10000, 12200, 14400, 16600, 18800, 21000], abs=1e-6
    )
    assert (lines[0].x, lines[0].y) == pytest.approx((-800.0, 400.0))
    assert (lines[0].bar, lines[0].joint, lines[-1].bar) == (None, None, None)
    assert lines[5].side == "ridge"


def test_a_spacing_that_divides_the_slope_is_not_split_further() -> None:
    assert alongs(laid(triangular(), purlins=2500.0)) == pytest.approx([2500.0 * k for k in range(9)])


def test_with_a_ridge_pair_the_spacings_run_to_its_lower_line() -> None:
    lines = laid(raised(), purlins=2000.0, ridge_pair=400.0)
    assert alongs(lines)[:6] == pytest.approx([0, 1920, 3840, 5760, 7680, 9600])
    assert alongs(lines)[6:] == pytest.approx([20000 - along for along in reversed(alongs(lines)[:6])])


def test_listed_distances_stand_on_both_slopes_and_the_ridge_rule_adds_the_ridge() -> None:
    lines = laid(raised(), purlins=(100.0, 3000.0))
    assert alongs(lines) == pytest.approx([100, 3000, 10000, 17000, 19900])
    assert lines[2].side == "ridge"


def test_a_listed_ridge_is_not_doubled() -> None:
    assert alongs(laid(raised(), purlins=(0.0, 5000.0, 10000.0))) == pytest.approx([0, 5000, 10000, 15000, 20000])
    assert alongs(laid(raised(), purlins=(0.0, 9700.0), ridge_pair=300.0)) == pytest.approx([0, 9700, 10300, 20000])


def test_the_shorter_of_two_slopes_leaves_out_what_lies_beyond_its_top() -> None:
    uneven = hand_made("A 0 0, R 4 3, T 8 1.5, E 12 0", "top A R T E, bottom A E, web R E", "A E")
    lines = laid(uneven, purlins=(0.0, 4000.0, 7000.0))
    right = uneven.top.length
    assert alongs(lines) == pytest.approx([0, 4000, 5000, right - 7000, right - 4000, right])


def test_a_line_within_ten_millimetres_of_a_joint_stands_on_it() -> None:
    truss = raised()
    near, far = laid(truss, purlins=(0.0, 2491.0))[1], laid(truss, purlins=(0.0, 2489.0))[1]
    assert (near.joint, far.joint, far.bar) == (truss.joint("T1"), None, truss.bar("TC1"))
    assert (near.along, far.along) == pytest.approx((2500.0, 2489.0))


def test_a_mono_pitch_is_one_slope_from_the_low_to_the_high_end() -> None:
    assert alongs(laid(mono_pitch())) == pytest.approx([0, 5000, 10000, 15000])
    spaced = laid(mono_pitch(), purlins=4000.0)
    assert alongs(spaced) == pytest.approx([0, 3750, 7500, 11250, 15000])
    assert [line.side for line in spaced] == ["left"] * 4 + ["ridge"]
    assert alongs(laid(mono_pitch(), purlins=(500.0, 6000.0))) == pytest.approx([500, 6000, 15000])


def test_a_list_on_a_mono_pitch_may_reach_the_high_edge() -> None:
    # 400 mm of overhang in plan is 500 mm of slope at either end
    lines = laid(mono_pitch(overhang=400.0), purlins=(0.0, 8000.0, 16000.0))
    assert alongs(lines) == pytest.approx([-500, 7500, 15000, 15500])
    assert lines[-1].side == "left"


def test_a_level_chord_is_spaced_from_both_edges_to_mid_span() -> None:
    assert alongs(laid(parallel(), purlins=2500.0)) == pytest.approx([0, 2000, 4000, 6000, 8000, 10000, 12000])


def test_only_the_stated_lines_are_anchored() -> None:
    assert all(line.anchored for line in laid(raised()))
    assert [line.number for line in laid(raised(), anchored=(1, 5, 9)) if line.anchored] == [1, 5, 9]
    assert not any(line.anchored for line in laid(raised(), anchored="none"))
    assert all(line.anchored for line in laid(raised(), anchored_by="diaphragm"))


def test_where_nothing_anchors_no_line_is_anchored_whatever_is_stated() -> None:
    assert not any(line.anchored for line in laid(raised(), anchored="all", anchored_by="nothing"))
    assert not any(line.anchored for line in laid(raised(), anchored=(1, 2), anchored_by="nothing"))


@pytest.mark.parametrize(
    ("changes", "key", "found"),
    [
        ({"purlins": 0.0}, "purlins", "spacing is 0 m"),
        ({"purlins": -1500.0}, "purlins", "spacing is -1.5 m"),
        ({"purlins": 1.5}, "purlins", "spacing is 0.0015 m"),
        ({"purlins": 15e3}, "purlins", "spacing is 15 m"),
        ({"purlins": float("nan")}, "purlins", "nan"),
        ({"purlins": "at nodes"}, "purlins", "at nodes"),
        ({"purlins": ()}, "purlins", "empty"),
        ({"purlins": (0.0, 10200.0)}, "purlins", "10.2 m up the slope stands off it: 10 m"),
        ({"purlins": (-200.0, 1000.0)}, "purlins", "-0.2 m up the slope"),
        ({"purlins": (0.0, float("nan"))}, "purlins", "nan m"),
        ({"purlins": (0.0, 2000.0, 2015.0)}, "purlins", "stand on each other"),
        ({"purlins": (0.0, 10000.0), "ridge_pair": 200.0}, "purlins", "lower line of the ridge pair"),
        ({"ridge_pair": 0.0}, "ridge_purlins", "0 m from the apex"),
        ({"ridge_pair": -200.0}, "ridge_purlins", "-0.2 m from the apex"),
        ({"ridge_pair": 2500.0}, "ridge_purlins", "2.5 m from the apex"),
        ({"anchored": (1, 10)}, "anchored_purlins", "no purlin line 10"),
        ({"anchored": (0,)}, "anchored_purlins", "no purlin line 0"),
        ({"anchored": "most"}, "anchored_purlins", "most"),
        ({"anchored_by": "hope"}, "anchored_by", "hope"),
    ],
)
def test_refused(changes: dict[str, object], key: str, found: str) -> None:
    with pytest.raises(InputError, match=found) as caught:
        laid(raised(), **changes)
    assert caught.value.key == f"restraint.{key}"
    assert caught.value.remedy


@pytest.mark.parametrize("truss", [mono_pitch(), parallel()])
def test_a_ridge_pair_needs_a_ridge(truss: Truss) -> None:
    with pytest.raises(InputError, match="no ridge") as caught:
        laid(truss, ridge_pair=200.0)
    assert caught.value.key == "restraint.ridge_purlins"
