"""The shipped sizes: complete headers, no double rows, stock marks as the merchant's list has them."""

from __future__ import annotations

from importlib.resources import files

import numpy as np
import pytest

from spanwright.design.catalogue import COMMERCIAL, TO_ORDER, shipped
from spanwright.design.section_rows import angle_rows, tube_rows

TABLES = ["equal_angles.csv", "unequal_angles.csv", "chs.csv", "shs.csv", "rhs.csv", "corner_radii.csv", "steels.csv"]

MERCHANT = """25x3 25x5 30x3 30x5 40x3 40x4 40x5 40x6 45x3 45x4 45x5 45x6 50x3 50x4 50x5 50x6 50x8
60x4 60x5 60x6 60x8 60x10 70x6 70x8 70x10 80x6 80x8 80x10 80x12 90x6 90x8 90x10 90x12 100x8 100x10 100x12 100x15
120x8 120x10 120x12 120x15 150x10 150x12 150x15 150x18 200x16 200x18 200x20 200x24"""
"""Macsteel (South Africa) data sheet of equal angles; its 2 and 2.5 mm thick sizes have no known radii."""


@pytest.mark.parametrize("name", TABLES)
def test_every_table_names_source_confidence_and_units(name: str) -> None:
    text = files("spanwright.design.data").joinpath(name).read_text(encoding="utf-8")
    head = [line for line in text.splitlines() if line.startswith("#")]
    for word in ("source", "confidence", "units"):
        assert any(line.startswith(f"# {word}:") for line in head), word


def test_every_size_is_there_once() -> None:
    catalogue = shipped()
    angles = angle_rows(catalogue, equal_only=False)
    rows = list(zip(angles.sizes, angles.ways, strict=True))
    assert len(rows) == len(set(rows)) == 200 + 2 * 56
    for family, count in (("CHS", 274), ("SHS", 274), ("RHS", 2 * 449)):
        tubes = tube_rows(catalogue, family)
        listed = list(zip(tubes.sizes, tubes.ways, tubes.hot.tolist(), strict=True))
        assert len(listed) == len(set(listed)) == count


def test_sizes_are_possible() -> None:
    catalogue = shipped()
    for table in (catalogue.equal_angles, catalogue.unequal_angles):
        assert np.all((table.short <= table.long) & (table.thickness < table.short / 2) & (table.root > 0))
        assert np.all((table.toe >= 0) & (table.toe <= table.root))
    for tubes in (catalogue.chs, catalogue.shs, catalogue.rhs):
        assert np.all((tubes.width <= tubes.depth) & (2 * tubes.outer <= tubes.width))
        assert np.all(2 * tubes.thickness < tubes.width)


def test_stock_marks_are_the_merchants() -> None:
    angles = shipped().equal_angles
    marks = dict(
        zip([f"{b:g}x{t:g}" for b, t in zip(angles.long, angles.thickness, strict=True)], angles.stock, strict=True)
    )
    assert {size for size, mark in marks.items() if mark} == set(MERCHANT.split())
    for leg, thickness, mark in zip(angles.long, angles.thickness, angles.stock, strict=True):
        assert mark in ("", COMMERCIAL if leg <= 50 else "S355JR", f"S355JR {TO_ORDER}"), (leg, thickness)
    assert {size for size, mark in marks.items() if mark.endswith(TO_ORDER)} == {"100x15", "120x15"}


def test_corner_radii_follow_process_and_wall() -> None:
    """EN 10210-2 and EN 10219-2, from memory; confirmed by the printed properties (tests/published)."""
    for tubes in (shipped().shs, shipped().rhs):
        outer, inner = tubes.outer / tubes.thickness, tubes.inner / tubes.thickness
        cold, t = ~tubes.hot, tubes.thickness
        for here, rule in (
            (tubes.hot, (1.5, 1.0)),
            (cold & (t <= 6), (2.0, 1.0)),
            (cold & (t > 6) & (t <= 10), (2.5, 1.5)),
            (cold & (t > 10), (3.0, 2.0)),
        ):
            assert here.any()
            assert outer[here] == pytest.approx(rule[0])
            assert inner[here] == pytest.approx(rule[1])
