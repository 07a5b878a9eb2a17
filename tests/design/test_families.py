"""Families and names: which way round a section stands, what is let through, how names are read."""

from __future__ import annotations

from dataclasses import fields
from typing import Any

import numpy as np
import pytest

from spanwright.design.candidates import FAMILIES, Candidates, Family
from spanwright.design.families import candidates, find
from spanwright.design.section_warnings import stock_notes
from spanwright.truss.errors import InputError, UnknownNameError


def choose(family: Family, **changes: Any) -> Candidates:
    limits: dict[str, Any] = {
        "steel": "S355JR",
        "gap": 8.0,
        "min_leg": 0.0,
        "min_thickness": 0.0,
        "min_wall": 0.0,
        "stocked": "any",
    }
    return candidates(family, **(limits | changes))


def one(name: str, **options: Any) -> Candidates:
    return find(name, steel="S355JR", **({"gap": 8.0} | options))


@pytest.mark.parametrize("family", FAMILIES)
def test_all_fields_have_one_value_for_each_section(family: Family) -> None:
    options = choose(family)
    assert len(options) > 30
    assert len(set(options.names)) == len(options)
    for entry in fields(options):
        value = getattr(options, entry.name)
        if isinstance(value, np.ndarray):
            assert value.shape == (len(options),), entry.name
            assert value.dtype == bool or np.all(np.isfinite(value) & (value >= 0)), entry.name
        elif isinstance(value, tuple):
            assert len(value) == len(options), entry.name


@pytest.mark.parametrize("family", FAMILIES)
def test_every_name_finds_its_own_section(family: Family) -> None:
    options = choose(family, gap=10.0)
    for i in range(0, len(options), 11):
        found, listed = one(options.names[i]), options.take([i])
        assert found.names == listed.names
        for entry in fields(found):
            value = getattr(found, entry.name)
            assert np.array_equal(value, getattr(listed, entry.name)), entry.name


@pytest.mark.parametrize("family", FAMILIES)
def test_values_of_one_section_fit_together(family: Family) -> None:
    options = choose(family)
    assert options.mass == pytest.approx(options.area * 7850e-6)
    assert options.inertia_minor + options.inertia_major == pytest.approx(options.inertia_in + options.inertia_out)
    assert options.radius_in**2 * options.area == pytest.approx(options.inertia_in)
    assert options.radius_out**2 * options.area == pytest.approx(options.inertia_out)
    assert np.all(options.radius_minor <= options.radius_in * (1 + 1e-12))
    assert np.all(options.piece_radius_minor <= options.radius_major)
    assert np.all(options.modulus_plastic > np.minimum(options.modulus_heel, options.modulus_toe))
    assert np.all(options.inertia_major >= options.inertia_minor)


@pytest.mark.parametrize(
    ("written", "name"),
    [
        ("2L 80x80x6", "2L 80x80x6, gap 8"),
        ("2l80x80x6", "2L 80x80x6, gap 8"),
        ("2L 80×80×6, gap 10", "2L 80x80x6, gap 10"),
        ("2L 80 x 80 x 6 gap 12 mm", "2L 80x80x6, gap 12"),
        ("2L 80x80x6 star", "2L 80x80x6, star, gap 8"),
        ("2L star 80x80x6", "2L 80x80x6, star, gap 8"),
        ("L 50x50x5", "L 50x50x5"),
        ("2L 100x75x8 short legs together", "2L 100x75x8, short legs together, gap 8"),
        ("2L 75x100x8, Long legs together", "2L 100x75x8, long legs together, gap 8"),
        ("L 100x75x8 short leg connected", "L 100x75x8, short leg connected"),
        ("CHS 76,1x3,6", "CHS 76.1x3.6, hot finished"),
        ("CHS 76.1x4", "CHS 76.1x4"),
        ("SHS 80x80x4", "SHS 80x80x4"),
        ("SHS 80x80x4 hot finished", "SHS 80x80x4, hot finished"),
        ("RHS 120x60x5 flat", "RHS 120x60x5, flat"),
        ("rhs 120x60x5, upright, cold formed", "RHS 120x60x5, upright"),
    ],
)
def test_names_are_read_as_users_write_them(written: str, name: str) -> None:
    assert one(written).names == (name,)


@pytest.mark.parametrize(
    "written",
    [
        "",
        "80x80x6",
        "2L",
        "2L 80x80",
        "CHS 76.1",
        "L 80x80x6 upside down",
        "3L 80x80x6",
        "L 8..0x80x6",
        "CHS star 76.1x4",
        "2L 80x80x6 gap -8",
        "2L 80x80xx6",
    ],
)
def test_what_is_no_section_name_is_refused(written: str) -> None:
    with pytest.raises(InputError, match="write it like") as caught:
        one(written, key="members.posts")
    assert caught.value.key == "members.posts"


@pytest.mark.parametrize(
    ("written", "nearest"),
    [
        ("2L 80x80x7.2", "2L 80x80x7"),
        ("L 86x86x8", "L 90x90x8"),
        ("CHS 76.3x4", "CHS 76.1x4"),
        ("SHS 80x80x4.1", "SHS 80x80x4"),
        ("CHS 76.1x3.6, cold formed", "CHS 76.1x4, cold formed"),
    ],
)
def test_unknown_sizes_name_the_nearest(written: str, nearest: str) -> None:
    with pytest.raises(UnknownNameError) as caught:
        one(written)
    assert caught.value.nearest == nearest


@pytest.mark.parametrize("written", ["2L 100x75x8", "L 100x75x8", "RHS 120x60x5"])
def test_a_name_that_leaves_the_way_round_open_lists_the_readings(written: str) -> None:
    with pytest.raises(InputError) as caught:
        one(written)
    readings = [name for name in choose(written.split()[0]).names if name.startswith(written)]  # type: ignore[arg-type]  # a family
    assert len(readings) == 2
    assert all(reading in caught.value.remedy for reading in readings)


def test_equal_legs_have_one_way_round() -> None:
    with pytest.raises(InputError, match="cannot stand that way"):
        one("2L 80x80x6, long legs together")


def test_long_legs_together_are_stiff_in_the_plane_and_short_legs_sideways() -> None:
    long, short = one("2L 100x50x8, long legs together"), one("2L 100x50x8, short legs together")
    assert long.radius_in[0] > long.radius_out[0]
    assert short.radius_out[0] > short.radius_in[0]
    assert (long.leg_connected[0], long.leg_outstanding[0], long.depth[0], long.width[0]) == (100, 50, 100, 108)
    assert (short.leg_connected[0], short.leg_outstanding[0], short.depth[0], short.width[0]) == (50, 100, 50, 208)
    # the shear centre lies on the axis of symmetry: major where sideways is stiffer
    assert long.shear_minor[0] == long.shear_sym[0] > 0 == long.shear_major[0]
    assert short.shear_major[0] == short.shear_sym[0] > 0 == short.shear_minor[0]


def test_the_shear_centre_of_an_equal_angle_lies_on_its_axis_of_symmetry_the_major_one() -> None:
    angle = one("L 80x80x8")
    assert angle.shear_major[0] == pytest.approx(np.sqrt(2) * (angle.piece_centroid_connected[0] - 4))
    assert angle.shear_minor[0] == angle.shear_sym[0] == 0
    assert one("L 100x75x8, long leg connected").shear_minor[0] > 0


def test_a_pair_has_twice_the_mass_and_the_surface_of_its_angle() -> None:
    single = one("L 80x80x8")
    for name in ("2L 80x80x8", "2L 80x80x8 star"):
        pair = one(name)
        assert (pair.mass[0], pair.surface[0]) == (2 * single.mass[0], 2 * single.surface[0])
        assert pair.piece_radius_minor[0] == single.radius_minor[0]
        assert (pair.pieces, pair.piece_names) == (2, single.names)


def test_the_gap_stiffens_sideways_alone() -> None:
    narrow, wide = choose("2L", gap=6.0), choose("2L", gap=12.0)
    assert np.array_equal(narrow.inertia_in, wide.inertia_in)
    assert np.all(narrow.inertia_out < wide.inertia_out)


def test_the_outstanding_legs_of_a_pair_are_the_stiffer_fibre() -> None:
    equal = one("2L 80x80x8")
    assert equal.modulus_heel[0] > equal.modulus_toe[0]
    assert equal.inertia_in[0] / equal.modulus_heel[0] == pytest.approx(equal.piece_centroid_outstanding[0])


def test_the_axis_parallel_to_the_connected_leg_is_weak_where_the_long_leg_is_connected() -> None:
    """practice: the one-leg rule takes ry for a connected long leg, rx for a short one (ANSI/AISC 360 E5)."""
    long, short = one("L 100x75x8, long leg connected"), one("L 100x75x8, short leg connected")
    assert long.piece_radius_parallel[0] < short.piece_radius_parallel[0]
    assert long.piece_radius_parallel[0] == long.radius_out[0] == short.radius_in[0]
    assert long.piece_centroid_connected[0] == short.piece_centroid_outstanding[0]


def test_a_tube_turned_flat_swaps_its_axes() -> None:
    upright, flat = one("RHS 120x60x5 upright"), one("RHS 120x60x5 flat")
    assert upright.inertia_in[0] == flat.inertia_out[0] > flat.inertia_in[0] == upright.inertia_out[0]
    assert (upright.depth[0], flat.depth[0]) == (120, 60)
    assert upright.torsion[0] == pytest.approx(flat.torsion[0])


def test_least_sizes_filter() -> None:
    angles = choose("2L", min_leg=60.0, min_thickness=6.0)
    assert np.all(np.minimum(angles.leg_connected, angles.leg_outstanding) >= 60)
    assert np.all(angles.thickness >= 6)
    assert 60 in angles.leg_connected
    assert 6 in angles.thickness
    assert np.min(choose("SHS", min_wall=4.0).thickness) == 4


def test_process_picks_the_tubes() -> None:
    assert not choose("SHS").hot.any()
    assert choose("SHS", process="hot").hot.all()
    assert not choose("2L").hot.any()


def test_a_certified_grade_is_not_chosen_from_commercial_stock() -> None:
    certified, commercial = (
        choose("L", stocked="South Africa"),
        choose("L", stocked="South Africa", steel="commercial quality"),
    )
    assert "L 60x60x5" in certified.names
    assert "L 50x50x5" not in certified.names
    assert {"L 50x50x5", "L 60x60x5"} <= set(commercial.names)
    assert "L 75x75x8" not in commercial.names


def test_unequal_angles_pass_the_stock_filter_with_a_note() -> None:
    stocked, free = choose("2L", stocked="South Africa"), choose("2L")
    unequal = [name for name in free.names if "together" in name]
    assert [name for name in stocked.names if "together" in name] == unequal


@pytest.mark.parametrize("family", ["L", "2L"])
def test_equal_legs_keep_to_what_the_stock_list_covers(family: Family) -> None:
    equal, free = choose(family, equal_legs=True, stocked="South Africa"), choose(family, stocked="South Africa")
    assert equal.names == tuple(name for name in free.names if "leg" not in name)
    assert all(equal.stock)


def test_a_size_stands_as_the_project_makes_its_tubes_unless_its_name_says_so() -> None:
    assert one("SHS 80x80x4", process="hot").names == ("SHS 80x80x4, hot finished",)
    assert one("SHS 80x80x4 cold formed", process="hot").names == ("SHS 80x80x4",)
    assert one("SHS 80x80x3", process="hot").names == ("SHS 80x80x3",)  # not made hot finished
    assert one("CHS 76.1x3.6").names == ("CHS 76.1x3.6, hot finished",)  # not made cold formed


@pytest.mark.parametrize(
    ("name", "steel", "note"),
    [
        ("2L 80x80x8", "S355JR", ""),
        ("2L 50x50x5", "S355JR", "commercial quality only"),
        ("2L 50x50x5", "commercial quality", ""),
        ("2L 75x75x8", "S355JR", "not on the stock list"),
        ("2L 100x100x15", "S355JR", "subject to availability"),
        ("2L 100x75x8, long legs together", "S355JR", "no stock list of unequal angles"),
        ("SHS 80x80x4", "S355JR", "no stock list of hollow sections"),
    ],
)
def test_stock_notes_say_what_is_in_doubt(name: str, steel: str, note: str) -> None:
    notes = stock_notes([one(name)], steel=steel, stocked="South Africa")
    assert [note in text for text in notes] == ([True] if note else [])
    assert stock_notes([one(name)], steel=steel, stocked="any") == ()


def test_steel_goes_by_thickness_and_tubes_take_the_twin() -> None:
    angles = choose("L")
    assert set(angles.steel_fy[angles.thickness <= 16]) == {355.0}
    assert set(angles.steel_fy[angles.thickness > 16]) == {345.0}
    assert set(choose("CHS", steel="350WA").steel_fy) == {355.0}


def test_unknown_family_steel_and_market_are_refused() -> None:
    for changes in ({"family": "3L"}, {"steel": "S999"}, {"stocked": "Mars"}):
        with pytest.raises(UnknownNameError):
            choose(**({"family": "2L"} | changes))  # type: ignore[arg-type]  # wrong on purpose
