"""Cross-sections: shapes against the areas and centroids of the catalogue, dimensions against the section's sizes."""

import numpy as np
import pytest
import shapely
from draughted import VARIANTS, designed, drawing, texts
from shapely.affinity import translate

from spanwright.design.candidates import Candidates
from spanwright.design.families import find
from spanwright.design.packs import PACK_PROJECTION
from spanwright.io.drawing.cross_shapes import shapes
from spanwright.truss.model import Role

SECTIONS: tuple[tuple[str, Role], ...] = (
    ("2L 100x75x8, long legs together, gap 10", "top chord"),
    ("2L 100x75x8, short legs together, gap 10", "bottom chord"),
    ("2L 80x80x8, gap 8", "top chord"),
    ("L 80x60x7, long leg connected", "diagonal"),
    ("L 60x60x6", "post"),
    ("2L 60x60x6, star, gap 8", "post"),
    ("CHS 76.1x4", "top chord"),
    ("SHS 80x80x4", "post"),
    ("RHS 100x60x4, upright", "bottom chord"),
    ("RHS 100x60x4, flat", "bottom chord"),
)


def section(name: str) -> Candidates:
    return find(name, steel="S355JR", gap=8.0)


def polygon(found: Candidates, role: Role) -> shapely.Geometry:
    pieces = shapes(found, role, 0.0 if found.pieces == 2 else 8.0)
    return shapely.union_all([shapely.Polygon(piece.rings[0], list(piece.rings[1:])) for piece in pieces])


@pytest.mark.parametrize(("name", "role"), SECTIONS)
def test_the_area_drawn_is_that_of_the_catalogue(name: str, role: Role) -> None:
    """The toes are drawn with half the root radius (EN 10056-1), the curves as chords: within 1 %."""
    found = section(name)
    drawn = polygon(found, role)
    assert drawn.is_valid
    assert drawn.area == pytest.approx(float(found.area[0]), rel=0.01)


@pytest.mark.parametrize(("name", "role"), SECTIONS)
def test_the_setting_out_line_is_the_centroid(name: str, role: Role) -> None:
    found = section(name)
    centroid = polygon(found, role).centroid
    assert centroid.y == pytest.approx(0.0, abs=0.2)
    aside = float(found.piece_centroid_connected[0]) + 4.0 if found.family == "L" else 0.0
    assert centroid.x == pytest.approx(aside, abs=0.2)


@pytest.mark.parametrize(("name", "role"), SECTIONS)
def test_depth_and_width_are_those_of_the_section(name: str, role: Role) -> None:
    found = section(name)
    left, low, right, high = polygon(found, role).bounds
    assert (high - low, right - left) == pytest.approx((float(found.depth[0]), float(found.width[0])), abs=1e-6)


@pytest.mark.parametrize(("name", "role", "up"), [(*SECTIONS[0], True), (*SECTIONS[1], False), (*SECTIONS[3], True)])
def test_outstanding_legs_lie_at_the_outer_edge_of_a_chord(name: str, role: Role, up: bool) -> None:
    """On top in a top chord, below in a bottom chord; webs heel up."""
    drawn = polygon(section(name), role)
    _, low, _, high = drawn.bounds
    lower, upper = (
        drawn.intersection(shapely.box(-500, a, 500, b)).area for a, b in ((low, low + 4), (high - 4, high))
    )
    assert (upper > lower) == up


def test_pairs_are_mirror_images_with_the_gap_between() -> None:
    found = section("2L 100x75x8, long legs together, gap 10")
    one, other = (shapely.Polygon(piece.rings[0]) for piece in shapes(found, "top chord", 0.0))
    assert one.distance(other) == pytest.approx(10.0)
    assert not one.intersects(translate(other, xoff=9.99))
    assert one.intersects(translate(other, xoff=10.01)) or one.intersects(translate(other, xoff=-10.01))


@pytest.mark.parametrize("name", VARIANTS)
def test_sizes_gap_and_packs_are_dimensioned(name: str) -> None:
    design = designed(name)
    printed = []
    for one in drawing(name).modelspace().query("DIMENSION"):
        if one.dxf.dimstyle == "STEEL-SECTIONS":
            block = one.get_geometry_block()  # type: ignore[attr-defined]
            printed += [text.plain_text() for text in block.query("MTEXT")]
    for choice in design.choices:
        of = choice.section
        if of.family in ("L", "2L", "2L star"):
            for length in (of.leg_connected, of.leg_outstanding, of.thickness):
                assert f"{float(length[0]):g}" in printed
        else:
            assert f"\u00d8{float(of.depth[0]):g}" in printed
        if of.pieces == 2:
            assert f"{of.gap:g}" in printed
            assert f"{np.ceil(float(of.depth[0]) + PACK_PROJECTION):g}" in printed


@pytest.mark.parametrize("name", VARIANTS)
def test_captions_say_which_way_round_a_section_stands(name: str) -> None:
    words = " ".join(text.plain_text() for text in texts(drawing(name).modelspace(), "NOTES"))
    for choice in designed(name).choices:
        assert choice.name in words
        assert choice.group.name.upper() in words
