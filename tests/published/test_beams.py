"""Coefficients of continuous beams over equal spans, as tabulated in structural handbooks to three places.

Source: "Continuous beams, equal spans, all spans loaded" (tables of this kind stand in the Steel Designers' Manual and
in Reynolds and Steedman, Reinforced Concrete Designer's Handbook). Values from memory, half a unit of the last place.
"""

import numpy as np
import pytest

from spanwright.truss.arrays import FloatArray
from spanwright.truss.beam import Beam

PLACES = 0.00051
"""Half a unit of the third decimal."""

# spans: reactions / (w L), moments over supports / (w L^2), greatest moments in spans / (w L^2); left half of the beam
UNIFORM = {
    2: ([0.375, 1.250], [0.0, -0.125], [0.070]),
    3: ([0.400, 1.100], [0.0, -0.100], [0.080, 0.025]),
    4: ([0.393, 1.143, 0.929], [0.0, -0.107, -0.071], [0.077, 0.036]),
    5: ([0.395, 1.132, 0.974], [0.0, -0.105, -0.079], [0.078, 0.033, 0.046]),
}
# spans: reactions / P, moments over supports / (P L), moments at mid-span / (P L); a load P at the middle of every span
MIDDLE = {
    2: ([0.313, 1.375], [0.0, -0.188], [0.156]),
    3: ([0.350, 1.150], [0.0, -0.150], [0.175, 0.100]),
    4: ([0.339, 1.214, 0.893], [0.0, -0.161, -0.107], [0.170, 0.116]),
    5: ([0.342, 1.197, 0.961], [0.0, -0.158, -0.118], [0.171, 0.112, 0.132]),
}


def beam_of(spans: int) -> tuple[Beam, FloatArray]:
    supports = np.arange(spans + 1.0)
    return Beam(supports), supports


def parts(first: float, spans: int, count: int) -> FloatArray:
    return np.arange(first, spans * count) / count


@pytest.mark.parametrize("spans", UNIFORM)
def test_uniform_load_as_many_points(spans: int) -> None:
    beam, supports = beam_of(spans)
    count = 400
    loads = parts(0.5, spans, count)
    over, reactions = beam.moments(supports, loads).sum(axis=1) / count, beam.reactions(loads).sum(axis=1) / count
    sections = parts(0.0, spans, count)
    within = beam.moments(sections, loads).sum(axis=1) / count
    expected_reactions, expected_over, expected_within = UNIFORM[spans]
    assert reactions[: len(expected_reactions)] == pytest.approx(expected_reactions, abs=PLACES)
    assert over[: len(expected_over)] == pytest.approx(expected_over, abs=PLACES)
    greatest = [within[span * count : (span + 1) * count].max() for span in range(len(expected_within))]
    assert greatest == pytest.approx(expected_within, abs=PLACES)


@pytest.mark.parametrize("spans", MIDDLE)
def test_point_load_at_the_middle_of_every_span(spans: int) -> None:
    beam, supports = beam_of(spans)
    loads = parts(0.5, spans, 1)
    expected_reactions, expected_over, expected_within = MIDDLE[spans]
    assert beam.reactions(loads).sum(axis=1)[: len(expected_reactions)] == pytest.approx(expected_reactions, abs=PLACES)
    assert beam.moments(supports, loads).sum(axis=1)[: len(expected_over)] == pytest.approx(expected_over, abs=PLACES)
    within = beam.moments(loads, loads).sum(axis=1)
    assert within[: len(expected_within)] == pytest.approx(expected_within, abs=PLACES)


def test_two_equal_spans_one_loaded() -> None:
    """One of two equal spans loaded at its middle: R = 13/32, 22/32, -3/32 of P, M = -3/32 P L (handbook case)."""
    beam, supports = beam_of(2)
    assert beam.reactions(np.array([0.5]))[:, 0] * 32.0 == pytest.approx([13.0, 22.0, -3.0])
    assert beam.moments(supports, np.array([0.5]))[1, 0] * 32.0 == pytest.approx(-3.0)
