"""Mechanisms of every kind are found, told in words, and held by what the message suggests."""

from __future__ import annotations

import pickle
import re
from collections.abc import Callable
from dataclasses import replace

import numpy as np
import pytest
from bare import bare_truss, by_pairs, parallel_chords

from spanwright.truss.elongation import held_directions
from spanwright.truss.errors import MechanismError
from spanwright.truss.holding import what_would_hold
from spanwright.truss.mechanism import MOST_TOLD, free_motions, refuse_mechanism
from spanwright.truss.model import Support, Truss
from spanwright.truss.stiffness import solve


def with_joint(truss: Truss, name: str, xy: tuple[float, float], *, to: tuple[str, ...], instead_of: str = "") -> Truss:
    """Add a joint and bars from it to others, in place of one bar."""
    new = len(truss.joint_names)
    kept = np.array([bar != instead_of for bar in truss.bar_names])
    bars = tuple(bar for bar in truss.bar_names if bar != instead_of) + tuple(f"{name}-{other}" for other in to)
    added = np.array([(new, truss.joint(other)) for other in to], dtype=np.intp).reshape(-1, 2)
    return replace(
        truss,
        joint_names=(*truss.joint_names, name),
        xy=np.vstack([truss.xy, xy]),
        bar_names=bars,
        ends=np.vstack([truss.ends[kept], added]),
        roles=(truss.roles[0],) * len(bars),
    )


def missing_diagonal() -> Truss:
    return parallel_chords(6, without=["D3"])


def missing_support() -> Truss:
    return parallel_chords(6, supports={"B0": "xy"})


def both_slide() -> Truss:
    return parallel_chords(6, supports={"B0": "y", "B6": "y"})


def collinear_joint() -> Truss:
    return with_joint(parallel_chords(6), "X", (4500, 2000), to=("T1", "T2"), instead_of="TC2")


def square_in_the_middle() -> Truss:
    # bars and reactions enough in number: one diagonal too many elsewhere, none in the middle panel
    joints = {f"{row}{i}": (i * 3000.0, y) for i in range(4) for row, y in (("B", 0.0), ("T", 3000.0))}
    chords = "B0-B1 B1-B2 B2-B3 T0-T1 T1-T2 T2-T3 B0-T0 B1-T1 B2-T2 B3-T3"
    return bare_truss(joints, by_pairs(chords + " T0-B1 B0-T1 T3-B2"), {"B0": "xy", "B3": "y"})


def loose_bar() -> Truss:
    truss = with_joint(parallel_chords(6), "L", (9000, 3500), to=())
    return with_joint(truss, "M", (11000, 4000), to=("L",))


def short_of_a_chord() -> Truss:
    return parallel_chords(6, without=["BC3"])


def free_in_space() -> Truss:
    return parallel_chords(4, supports={})


def hanging_joint() -> Truss:
    return with_joint(parallel_chords(6), "H", (9000, -800), to=("B3",))


def supports_side_by_side() -> Truss:
    # both reactions of the sliding bearings and the sideways one pass through one point
    return bare_truss(
        {"A": (0, 0), "B": (4000, 0), "C": (2000, 3000)},
        by_pairs("A-B B-C A-C"),
        {"A": "y", "B": "y", "C": "y"},
    )


KINDS = [
    (missing_diagonal, 1),
    (missing_support, 1),
    (both_slide, 1),
    (collinear_joint, 1),
    (square_in_the_middle, 1),
    (loose_bar, 3),
    (short_of_a_chord, 1),
    (free_in_space, 3),
    (hanging_joint, 1),
    (supports_side_by_side, 1),
]


@pytest.mark.parametrize(("build", "ways"), KINDS)
def test_every_kind_of_mechanism_is_refused_with_its_motion(build: Callable[[], Truss], ways: int) -> None:
    truss = build()
    loads = np.zeros((len(truss.joint_names), 2, 1))
    loads[-1, 1] = -1000.0
    with pytest.raises(MechanismError) as refused:
        solve(truss, np.full(len(truss.bar_names), 4e8), loads)
    error = refused.value
    assert (f"in {ways} ways" in error.found) == (ways > 1)
    motion = np.zeros((len(truss.joint_names), 2))
    for name, x, y in error.motions:
        motion[truss.joint(name)] = x, y
    assert np.hypot(motion[:, 0], motion[:, 1]).max() == pytest.approx(1.0)
    relative = motion[truss.ends[:, 1]] - motion[truss.ends[:, 0]]
    assert np.sum(relative * truss.directions, axis=1) == pytest.approx(np.zeros(len(truss.ends)), abs=1e-9)
    assert np.abs(motion[held_directions(truss)]).max(initial=0.0) < 1e-9
    assert {name for name, _, _ in error.motions} == {
        truss.joint_names[joint] for joint in np.flatnonzero(motion.any(1))
    }


@pytest.mark.parametrize(("build", "ways"), KINDS)
def test_what_is_suggested_holds_the_truss(build: Callable[[], Truss], ways: int) -> None:
    truss = build()
    held = held_directions(truss)
    motions, independent = free_motions(truss, held)
    assert independent == ways
    holds = what_would_hold(truss, held, motions)
    assert len(holds) == ways
    supports = truss.supports + tuple(hold for hold in holds if isinstance(hold, Support))
    bars = [hold for hold in holds if not isinstance(hold, Support)]
    mended = replace(
        truss,
        bar_names=truss.bar_names + tuple(f"new {number}" for number in range(len(bars))),
        ends=np.vstack([truss.ends, np.array(bars, dtype=np.intp).reshape(-1, 2)]),
        roles=(truss.roles[0],) * (len(truss.ends) + len(bars)),
        supports=supports,
    )
    refuse_mechanism(mended)


@pytest.mark.parametrize(
    ("build", "found", "remedy"),
    [
        (
            missing_diagonal,
            "without straining a bar, the piece with B3, T3, B4, T4, B5, T5 and T6 turns about B6 and the piece with "
            "T0, B1, T1, B2 and T2 turns about B0. There are 24 bar forces and 3 reactions for the 28 equations of "
            "joint equilibrium: at least 1 too few",
            "a bar from B2 to T3 would hold it",
        ),
        (missing_support, "the whole truss turns about B0", "a support that holds B6 vertically would hold it"),
        (both_slide, "the whole truss slides to the right", "a support that holds B0 sideways would hold it"),
        (collinear_joint, "without straining a bar, X moves down", "a bar from B2 to X would hold it"),
        (
            square_in_the_middle,
            "There are 13 bar forces and 3 reactions for the 16 equations of joint equilibrium: "
            "enough in number, but not where they are needed",
            "a bar from B1 to T2 would hold it",
        ),
        (loose_bar, "is a mechanism in 3 ways: without straining a bar, (1) L moves", "together these would hold"),
        (hanging_joint, "H moves to the right", "a bar from B2 to H would hold it"),
    ],
)
def test_the_message_names_joints_directions_and_remedy(build: Callable[[], Truss], found: str, remedy: str) -> None:
    with pytest.raises(MechanismError) as refused:
        refuse_mechanism(build())
    assert found in refused.value.found
    assert remedy in refused.value.remedy
    assert str(pickle.loads(pickle.dumps(refused.value))) == str(refused.value)


def test_independent_motions_are_told_apart() -> None:
    truss = with_joint(parallel_chords(6), "X", (4500, 2000), to=("T1", "T2"), instead_of="TC2")
    truss = with_joint(truss, "Y", (13500, 0), to=("B4", "B5"), instead_of="BC5")
    motions, independent = free_motions(truss, held_directions(truss))
    assert independent == 2
    moving = [{truss.joint_names[joint] for joint in np.flatnonzero(motion.any(axis=1))} for motion in motions]
    assert sorted(moving, key=min) == [{"X"}, {"Y"}]


def test_holds_are_chosen_for_what_earlier_ones_leave_free() -> None:
    truss = with_joint(parallel_chords(6), "X", (4500, 2000), to=("T1", "T2"), instead_of="TC2")
    truss = with_joint(truss, "Y", (13500, 0), to=("B4", "B5"), instead_of="BC5")
    x, y = np.zeros((2, len(truss.joint_names), 2))
    x[truss.joint("X"), 1] = y[truss.joint("Y"), 1] = -1.0
    holds = what_would_hold(truss, held_directions(truss), np.stack([x, x + 0.2 * y]))
    assert [truss.joint_names[hold[1]] for hold in holds if isinstance(hold, tuple)] == ["X", "Y"]


def test_a_truss_hung_from_its_top_chord_is_to_be_held_at_a_bearing() -> None:
    with pytest.raises(MechanismError) as refused:
        refuse_mechanism(parallel_chords(6, supports={"T0": "y", "T6": "y"}))
    assert refused.value.remedy == "a support that holds T0 sideways would hold it"


def test_many_motions_are_counted_and_the_first_ones_told() -> None:
    truss = parallel_chords(12, without=[f"D{i}" for i in range(1, 13)])
    with pytest.raises(MechanismError) as refused:
        refuse_mechanism(truss)
    assert "is a mechanism in 12 ways" in refused.value.found
    assert f"; and {12 - MOST_TOLD} more" in refused.value.found
    assert refused.value.remedy.count("a bar from") == MOST_TOLD


def test_a_truss_of_named_joints_only_lists_the_first_of_many() -> None:
    with pytest.raises(MechanismError, match=r"and \d+ more turns about B0") as refused:
        refuse_mechanism(parallel_chords(60, without=["D30"]))
    assert len(refused.value.motions) > 100
    assert len(str(refused.value)) < 600


@pytest.mark.parametrize("panels", [12, 50, 100, 500, 1000, 5000])
@pytest.mark.parametrize("turned", [0.0, 0.3])
@pytest.mark.parametrize("kind", ["pinned left", "pinned right", "sliding", "no diagonal", "no first diagonal"])
def test_rounding_hides_no_mechanism_in_a_long_truss(panels: int, turned: float, kind: str) -> None:
    # pivots alone miss some of these from 50 panels on
    far = f"B{panels}"
    supports = {"pinned left": {"B0": "xy"}, "pinned right": {far: "xy"}, "sliding": {"B0": "y", far: "y"}}
    without = {"no diagonal": [f"D{panels // 2}"], "no first diagonal": ["D1"]}
    truss = parallel_chords(panels, supports=supports.get(kind), without=without.get(kind, []))
    turn = 0.0 if kind == "sliding" else turned
    cosine, sine = np.cos(turn), np.sin(turn)
    truss = replace(truss, xy=truss.xy @ np.array([[cosine, sine], [-sine, cosine]]))
    stiffness = np.random.default_rng(1).uniform(1e8, 9e8, len(truss.bar_names))
    with pytest.raises(MechanismError, match="would hold it"):
        solve(truss, stiffness, np.ones((len(truss.joint_names), 2, 1)))


def test_bars_that_meet_almost_in_a_line_still_stand() -> None:
    # 1 mm in 1 m, the straightness that counts as collinear, still carries load, at a thousand times the force
    truss = bare_truss({"A": (0, 0), "B": (1000, 1), "C": (2000, 0)}, by_pairs("A-B B-C"), {"A": "xy", "C": "xy"})
    loads = np.zeros((3, 2, 1))
    loads[1, 1] = -1.0
    assert solve(truss, np.full(2, 1e8), loads).forces[:, 0] == pytest.approx([-500.0, -500.0], rel=1e-5)


def test_a_flat_pair_of_bars_is_a_mechanism() -> None:
    truss = bare_truss({"A": (0, 0), "B": (1000, 5e-3), "C": (2000, 0)}, by_pairs("A-B B-C"), {"A": "xy", "C": "xy"})
    with pytest.raises(MechanismError, match=re.escape("B moves down")) as refused:
        solve(truss, np.full(2, 1e8), np.ones((3, 2, 1)))
    assert refused.value.remedy == "a support that holds B vertically would hold it"
