import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spanwright.truss.arrays import FloatArray
from spanwright.truss.beam import Beam
from spanwright.truss.errors import GeometryError

spans = st.lists(st.floats(300.0, 4000.0), min_size=1, max_size=8)


def places(lengths: list[float]) -> FloatArray:
    return np.concatenate([[0.0], np.cumsum(lengths)])


@pytest.mark.parametrize("supports", [[0.0], [0.0, 0.0, 1000.0], [1000.0, 0.0]])
def test_beam_needs_two_supports_in_order(supports: list[float]) -> None:
    with pytest.raises(GeometryError):
        Beam(np.array(supports))


def test_single_span_is_the_lever() -> None:
    beam = Beam(np.array([0.0, 4000.0]))
    load = np.array([1000.0])
    assert beam.reactions(load)[:, 0] == pytest.approx([0.75, 0.25])
    assert beam.moments(load, load)[0, 0] == pytest.approx(1000.0 * 3000.0 / 4000.0)  # P a b / L


def test_overhang_is_a_cantilever() -> None:
    beam = Beam(np.array([0.0, 1500.0, 3000.0]))
    sections = np.array([-600.0, -300.0, 0.0, 1500.0, 3000.0])
    moments = beam.moments(sections, np.array([-600.0]))[:, 0]
    assert moments[:3] == pytest.approx([0.0, -300.0, -600.0])
    # moment spread: an end moment M on two equal spans leaves -M/4 over the middle support (three-moment equation)
    assert moments[3:] == pytest.approx([150.0, 0.0])


@given(spans, st.floats(-0.5, 1.5))
def test_reactions_balance_the_load(lengths: list[float], share: float) -> None:
    supports = places(lengths)
    load = share * supports[-1]
    reactions = Beam(supports).reactions(np.array([load]))[:, 0]
    assert reactions.sum() == pytest.approx(1.0, abs=1e-9)
    assert reactions @ supports == pytest.approx(load, abs=1e-9 * supports[-1])


@given(spans, st.integers(0, 7), st.floats(0.0, 1.0))
def test_three_moment_equation(lengths: list[float], span: int, share: float) -> None:
    """Clapeyron (1857): over every inner support the slopes of its two spans agree."""
    supports = places(lengths)
    span = span % len(lengths)
    from_left = share * lengths[span]
    over = Beam(supports).moments(supports, np.array([supports[span] + from_left]))[:, 0]
    for inner in range(1, len(lengths)):
        left, right = lengths[inner - 1], lengths[inner]
        bending = over[inner - 1] * left + 2.0 * over[inner] * (left + right) + over[inner + 1] * right
        loading = 0.0
        if span == inner - 1:
            loading = from_left * (left**2 - from_left**2) / left
        elif span == inner:
            from_right = right - from_left
            loading = from_right * (right**2 - from_right**2) / right
        assert bending + loading == pytest.approx(0.0, abs=1e-6 * supports[-1] ** 2)
    assert over[[0, -1]] == pytest.approx([0.0, 0.0], abs=1e-9 * supports[-1])


@given(spans)
def test_a_load_on_a_support_goes_into_it(lengths: list[float]) -> None:
    supports = places(lengths)
    beam = Beam(supports)
    assert beam.reactions(supports) == pytest.approx(np.eye(len(supports)), abs=1e-9)
    assert beam.moments(supports, supports) == pytest.approx(np.zeros((len(supports),) * 2), abs=1e-8 * supports[-1])
