"""What holds for every form that can be drawn."""

import numpy as np
from hypothesis import given, settings
from strategies import trusses

from spanwright.truss.chords import slopes
from spanwright.truss.model import ROLES, Truss
from spanwright.truss.unusual import unusual


@given(trusses())
@settings(max_examples=60, deadline=None)
def test_every_form_is_a_whole_truss(truss: Truss) -> None:
    joints, bars = len(truss.joint_names), len(truss.bar_names)
    assert bars == 2 * joints - 3
    assert len(set(truss.joint_names)) == joints
    assert len(set(truss.bar_names)) == bars
    assert set(truss.roles) <= set(ROLES)
    assert truss.lengths.min() > 50.0
    assert np.linalg.matrix_rank(_equilibrium(truss)) == bars
    assert not any(warning for warning in truss.warnings if "nan" in warning)


def _equilibrium(truss: Truss) -> np.ndarray[tuple[int, ...], np.dtype[np.float64]]:
    matrix = np.zeros((2 * len(truss.joint_names), len(truss.bar_names)))
    for bar, (first, last) in enumerate(truss.ends):
        matrix[2 * first : 2 * first + 2, bar] = truss.directions[bar]
        matrix[2 * last : 2 * last + 2, bar] = -truss.directions[bar]
    return matrix


@given(trusses())
@settings(max_examples=60, deadline=None)
def test_every_form_mirrors_into_itself(truss: Truss) -> None:
    mirrored = truss.xy * [-1.0, 1.0] + [truss.span, 0.0]
    distances = np.linalg.norm(truss.xy[:, None] - mirrored[None], axis=2)
    assert distances.min(axis=1).max() < 1e-6
    partner = distances.argmin(axis=1)
    bars = {(role, frozenset(ends.tolist())) for role, ends in zip(truss.roles, truss.ends, strict=True)}
    assert bars == {(role, frozenset(partner[list(ends)].tolist())) for role, ends in bars}


@given(trusses())
@settings(max_examples=60, deadline=None)
def test_bars_run_from_left_to_right_then_up(truss: Truss) -> None:
    steps = truss.vectors
    upright = np.abs(steps[:, 0]) < 1e-6
    assert (steps[~upright, 0] > 0).all()
    assert (steps[upright, 1] > 0).all()
    centres = truss.xy[truss.ends].mean(axis=1)[:, 0]
    for role in ROLES:
        numbers = {int(truss.bar_names[bar].lstrip("TCBPD")): centres[bar] for bar in truss.bars_with_role(role)}
        assert sorted(numbers, key=lambda number: (numbers[number], number)) == sorted(numbers)


@given(trusses())
@settings(max_examples=60, deadline=None)
def test_the_top_chord_rises_to_the_ridge_and_falls(truss: Truss) -> None:
    slope = slopes(truss)
    half = len(truss.top.bars) // 2
    assert slope.side == ("left",) * half + ("right",) * half
    assert truss.xy[slope.apex_joint, 0] == truss.span / 2
    assert np.isclose(slope.apex_along, truss.top.length / 2)
    assert np.isclose(truss.top.length, truss.lengths[list(truss.top.bars)].sum())
    assert np.isclose(truss.bottom.length, truss.span)
    assert slope.apex_joint == int(np.argmax(truss.xy[:, 1]))


@given(trusses())
@settings(max_examples=20, deadline=None)
def test_warnings_depend_on_the_geometry_alone(truss: Truss) -> None:
    assert set(unusual(truss)) <= set(truss.warnings)
