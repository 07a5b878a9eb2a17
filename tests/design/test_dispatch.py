"""Overall size and lift mass of one truss, and the roads it is too large for."""

from __future__ import annotations

import math

import pytest
from workshop import HOWE, PRATT, Shop, shop

from spanwright.design.dispatch import Assembly, assembly, road_limits


def of(where: Shop) -> Assembly:
    return assembly(where.setting, where.choices, where.pieces)


def test_size_of_a_triangular_truss_with_its_sections() -> None:
    """Length: the back of each rafter's square end leans 22.6 sin 18 = 6.98 mm out beyond the bearing line.

    Height: ridge 7500 tan 18 = 2436.90, up to the tip of the backs 22.6/cos 18 = 23.76, down to the bottom back 19.7.
    """
    whole = of(shop(HOWE))
    assert whole.length == pytest.approx(15000 + 2 * 6.98, abs=0.1)
    # the toe of a rafter's square end is below the bottom chord: 57.4 cos 18
    assert whole.height == pytest.approx(2436.90 + 23.76 + 57.4 * math.cos(math.radians(18)), abs=0.2)
    assert whole.width == 80 + 8 + 80


def test_an_overhang_makes_the_truss_longer_and_hangs_lower() -> None:
    plain, long = of(shop(HOWE)), of(shop(f'{HOWE}\noverhang = "0.6 m"'))
    assert long.length - plain.length == pytest.approx(1200.0)
    assert long.height - plain.height == pytest.approx(600 * math.tan(math.radians(18)))


def test_the_end_posts_of_a_raised_heel_count() -> None:
    """The farther edge of the post, 43.1 mm outside the bearing line at either end."""
    assert of(shop(PRATT)).length == pytest.approx(18000 + 2 * 43.1, abs=0.2)


def test_the_lift_mass_has_the_stated_allowance_for_fixings() -> None:
    where = shop(HOWE, 'fixings = "5 %"')
    whole = of(where)
    assert whole.mass == pytest.approx(sum(piece.total_mass for piece in where.pieces) / 6)
    assert whole.lift_mass == pytest.approx(1.05 * whole.mass)
    assert whole.quantity == 6


def test_a_truss_larger_than_a_road_takes_is_told_which() -> None:
    """15.01 m x 2.52 m: within 18.65 m and 3.5 m, and 15.8 m and 2.59 m; beyond 13.6 m, beyond a container."""
    (remark,) = of(shop(HOWE)).remarks
    assert "EU semi-trailer (13.60 m x 2.60 m, from memory)" in remark
    assert "40 ft container" in remark
    assert "Great Britain" not in remark
    assert "USA" not in remark


def test_a_small_truss_travels_everywhere() -> None:
    assert of(shop('form = "Howe"\nspan = "9 m"\npitch = "20 deg"\npanels = 6')).remarks == ()


def test_limits_say_where_they_come_from() -> None:
    assert all(limit.confidence in ("seen", "from memory") for limit in road_limits())
    assert min(limit.length for limit in road_limits()) == 12000.0
