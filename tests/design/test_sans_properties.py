"""Invariants of the member rules, and what the standard object says of itself."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from members import member_demand, sections

from spanwright.design.candidates import FAMILIES, Candidates, Family
from spanwright.design.sans import constants
from spanwright.design.sans.member import SANS_10162_1
from spanwright.design.standard import Check, Demand, Packs, Standard
from spanwright.truss.arrays import FloatArray

SOME: dict[Family, Candidates] = {family: sections(family).take(list(range(0, 96, 12))) for family in FAMILIES}
BENDS: tuple[Family, ...] = ("2L", "CHS", "SHS", "RHS")
LENGTHS = ("in_plane", "out_of_plane", "torsional", "minor", "panel")


def greatest(checks: tuple[Check, ...]) -> FloatArray:
    worst: FloatArray = np.max([check.ratio for check in checks], axis=0)
    return worst


def a_demand(family: Family, axial: float, length: float, moment: float) -> Demand:
    bent = moment if family in BENDS else 0.0
    demand = member_demand([[axial, -axial / 2]], length, sag=np.array([[bent, 0.0]]), hog=np.array([[0.0, bent]]))
    return replace(demand, end_moments=np.array([[[bent, -bent], [0.0, -bent / 2]]]), point_loads=np.array([1]))


family_st = st.sampled_from(FAMILIES)
axial_st = st.floats(-3e5, 3e5)
length_st = st.floats(300.0, 5000.0)
moment_st = st.floats(0.0, 3e6)
more_st = st.floats(1.0, 3.0)


@settings(max_examples=60)
@given(family_st, axial_st, length_st, moment_st, more_st)
def test_a_longer_member_is_never_stronger(
    family: Family, axial: float, length: float, moment: float, more: float
) -> None:
    """With the packs held at one spacing: more of them would be found for the longer one."""
    short = replace(a_demand(family, axial, length, moment), packs=Packs(12))
    long = replace(short, **{name: getattr(short, name) * more for name in LENGTHS if name != "panel"})
    before, after = SANS_10162_1.checks(SOME[family], short), SANS_10162_1.checks(SOME[family], long)
    for check, longer in zip(before, after, strict=True):
        if "packs" not in check.name:
            assert np.all(longer.ratio >= check.ratio * (1 - 1e-9)), check.name


@settings(max_examples=60)
@given(family_st, axial_st, length_st, moment_st, more_st)
def test_more_force_is_never_safer(family: Family, axial: float, length: float, moment: float, more: float) -> None:
    """All forces and moments together; packs held, as more force may ask for more of them."""
    base = replace(a_demand(family, axial, length, moment), packs=Packs(12))
    scaled = {name: getattr(base, name) * more for name in ("axial", "sideways", "sag", "hog", "end_moments")}
    before = SANS_10162_1.checks(SOME[family], base)
    after = SANS_10162_1.checks(SOME[family], replace(base, **scaled))
    for check, harder in zip(before, after, strict=True):
        assert np.all(harder.ratio >= check.ratio * (1 - 1e-9)), check.name


@settings(max_examples=40)
@given(family_st, st.floats(1.0, 3e5), length_st, more_st)
def test_more_compression_never_lowers_a_ratio(family: Family, force: float, length: float, more: float) -> None:
    base = member_demand([[-force]], length, packs=Packs(12))
    harder = member_demand([[-force * more]], length, packs=Packs(12))
    before = greatest(SANS_10162_1.checks(SOME[family], base))
    assert np.all(greatest(SANS_10162_1.checks(SOME[family], harder)) >= before * (1 - 1e-12))


@settings(max_examples=40)
@given(family_st, st.floats(1e3, 3e5), length_st)
def test_no_strut_is_stronger_than_its_euler_load_or_its_stub(family: Family, force: float, length: float) -> None:
    some = SOME[family]
    for check in SANS_10162_1.checks(some, member_demand([[-force]], length)):
        if check.name.startswith("buckling") and check.unit == "N":
            euler = 0.9 * np.pi**2 * 200e3 * some.inertia_major / length**2
            assert np.all(check.resistance[:, 0] <= np.minimum(euler, 0.9 * some.area * 355) * (1 + 1e-9))


@pytest.mark.parametrize("family", FAMILIES)
def test_one_section_and_one_bar_give_what_many_give(family: Family) -> None:
    draw = np.random.default_rng(5)
    many = member_demand(draw.normal(0, 5e4, (4, 3)), draw.uniform(800, 3000, 4))
    checks = SANS_10162_1.checks(SOME[family], many)
    for s, b in ((0, 0), (3, 2), (7, 3)):
        alone = member_demand(many.axial[b : b + 1], many.in_plane[b : b + 1])
        for check, single in zip(checks, SANS_10162_1.checks(SOME[family].take([s]), alone), strict=True):
            assert single.ratio[0, 0] == pytest.approx(check.ratio[s, b], rel=1e-12), check.name


@pytest.mark.parametrize("family", FAMILIES)
def test_a_member_without_force_has_no_utilisation(family: Family) -> None:
    for check in SANS_10162_1.checks(SOME[family], member_demand([[0.0]])):
        if check.kind == "strength":
            assert np.all(check.ratio == 0) and np.all(check.combination == -1)


def test_the_object_is_a_member_standard() -> None:
    standard: Standard = SANS_10162_1
    assert standard.name == "SANS 10162-1:2011"
    assert (standard.modulus, standard.expansion, standard.restraint_share) == (200e3, 12e-6, 0.02)
    assert "memory" in standard.restraint_clause


def test_every_number_has_a_mark_and_a_source() -> None:
    for table, entries in constants._tables().items():
        if table == "doubts":
            continue
        for name, entry in entries.items():
            assert entry["mark"] in ("seen", "memory", "decision"), f"{table}.{name}"
            assert entry["unit"], f"{table}.{name}"
            assert entry["source"] or entry["mark"] == "memory", f"{table}.{name}"


def test_notes_name_the_clauses_from_memory_and_the_doubts() -> None:
    notes = SANS_10162_1.verify_notes()
    assert all(note.endswith(".") for note in notes)
    for clause in ("9.2", "10.4.2.1", "13.6", "19.2"):
        assert clause in notes[0]
    assert len(notes) > 8
