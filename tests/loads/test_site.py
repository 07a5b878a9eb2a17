"""From the site to the loads of one truss: place, strip, what is derived, and what is refused."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest
from roofs import hand_made, mono_pitch

from spanwright.loads.cases import Case, LoadSet, loads_on
from spanwright.loads.inputs import JointLoad, LoadsInput, MostLeast, WindInput
from spanwright.loads.internal import face_size
from spanwright.loads.place import at_every_position, truss_position
from spanwright.loads.roof_shape import roof_shape
from spanwright.loads.site_inputs import Derivable, NamedPosition, Opening, SiteInput
from spanwright.truss.errors import InputError, UnknownNameError
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.model import Truss
from spanwright.truss.purlins import lay_purlins

ALL: frozenset[Derivable] = frozenset({"roof_permanent", "roof_imposed", "man_load", "wind", "snow"})
SITE = SiteInput(40e3, 6e3, "B", 36.0, derive=ALL)
NOTHING = LoadsInput(MostLeast(0.0, 0.0), 0.0, ())


def raised(overhang: float = 0.0, heel: float = 1000.0) -> Truss:
    return build_form(FormInput("Pratt", 16e3, math.radians(12.0), heel, 8, overhang))


def found_for(
    site: SiteInput = SITE,
    truss: Truss | None = None,
    loads: LoadsInput = NOTHING,
    *,
    spacing: float = 5e3,
    tributary: float = 5e3,
    actions: str = "SANS 10160:2019",
) -> LoadSet:
    truss = truss or raised()
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    return loads_on(truss, lines, loads, site, actions, spacing=spacing, tributary=tributary)


def winds(found: LoadSet) -> dict[str, Case]:
    return {case.name: case for case in found.cases if case.kind == "wind"}


def strip(found: LoadSet) -> tuple[float, float]:
    assert found.site is not None
    return found.site.strip


@pytest.mark.parametrize(
    ("position", "expected"),
    [
        ("end", (-600.0, 2500.0)),
        ("first interior", (2500.0, 7500.0)),
        ("typical interior", (7500.0, 12500.0)),
        (12e3, (9500.0, 14500.0)),
        (3e3, (1500.0, 5500.0)),  # its neighbour stands at the gable
        (40e3, (37500.0, 40600.0)),
    ],
)
def test_a_truss_carries_half_way_to_its_neighbours(
    position: NamedPosition | float, expected: tuple[float, float]
) -> None:
    assert strip(found_for(replace(SITE, position=position, gable_overhang=600.0))) == pytest.approx(expected)


def test_a_tributary_width_of_its_own_is_kept() -> None:
    assert strip(found_for(tributary=3e3)) == pytest.approx((8500.0, 11500.0))
    assert strip(found_for(replace(SITE, position="end"), tributary=3e3)) == pytest.approx((0.0, 3000.0))


def test_typical_interior_in_a_short_building_stands_at_mid_length() -> None:
    assert truss_position(replace(SITE, length=15e3), 5e3) == 7.5e3


def test_every_position_that_the_building_has() -> None:
    assert list(at_every_position(SITE, 5e3)) == ["end", "first interior", "typical interior"]
    assert list(at_every_position(replace(SITE, length=10e3), 5e3)) == ["end", "first interior"]
    assert at_every_position(SITE, 5e3)["end"].position == "end"


def test_what_is_left_open_is_found_and_said() -> None:
    found = found_for()
    assert found.site is not None
    loads = found.site.loads
    assert loads.roof_imposed == pytest.approx(0.3e-3)  # 80 m2 is more than 15 m2
    assert loads.man_load == 900.0
    # sheet 0.083 + blanket 0.02 on the slope, purlins 0.07, bracing 0.015 and services 0.10 on plan
    assert loads.roof_permanent.most == pytest.approx((0.103 + 0.185 * math.cos(math.radians(12))) * 1e-3)
    assert loads.roof_permanent.least == pytest.approx((0.041 + 0.030 * math.cos(math.radians(12))) * 1e-3)
    assert {case.kind for case in found.cases} == {"permanent", "imposed", "man", "wind"}
    assert any("roof_permanent is not stated" in warning for warning in found.warnings)
    assert any("printed standard" in caution and "air density" in caution for caution in found.cautions)
    assert any("assumption" in caution and "imposed load" in caution for caution in found.cautions)


def test_what_is_stated_wins_and_the_difference_is_said() -> None:
    stated = LoadsInput(MostLeast(0.2e-3, 0.1e-3), 0.5e-3, (WindInput("gale", -0.5e-3, -0.4e-3),))
    found = found_for(replace(SITE, derive=frozenset({"man_load"})), loads=stated)
    assert list(winds(found)) == ["gale", "gale mirrored"]
    assert found.site is not None
    assert found.site.loads == replace(stated, man_load=900.0)
    text = " ".join(found.warnings)
    assert "roof_imposed as stated, 0.500 kPa, is used; the site would give 0.300 kPa" in text
    assert "wind as stated" in text
    assert not any("air density" in caution for caution in found.cautions)


def test_without_a_site_nothing_is_found() -> None:
    truss = raised()
    lines = lay_purlins(truss, RestraintInput("at joints", "all", "roof bracing", True))
    found = loads_on(truss, lines, NOTHING, None, "SANS 10160:2019", spacing=5e3, tributary=5e3)
    assert (found.site, found.cautions, winds(found)) == (None, (), {})


def test_an_end_truss_sees_more_suction_a_square_metre() -> None:
    """Common practice: corner and edge zones make the roof near a gable worse."""
    lift = {}
    for name, site in at_every_position(SITE, 5e3).items():
        found = found_for(site)
        assert found.site is not None
        up = max(float(case.joint_loads[:, 1].sum()) for case in winds(found).values())
        lift[name] = up / found.site.tributary
    assert lift["end"] > lift["first interior"] > lift["typical interior"]


def test_wind_on_the_walls_goes_to_the_column_heads_and_the_heel() -> None:
    truss = raised()
    with_walls = winds(found_for(truss=truss))
    without = winds(found_for(replace(SITE, column_head_share=0.0), truss))
    name = "wind from left, suction and suction, inside +0.2"
    found = found_for(truss=truss)
    assert found.site is not None
    assert found.site.wind is not None
    qp = found.site.wind.peak.pressure
    ratio = found.site.shape.height / 16e3
    windward, lee = np.interp(ratio, [0.25, 1.0], [0.7, 0.8]), np.interp(ratio, [0.25, 1.0], [-0.3, -0.5])
    heads = with_walls[name].joint_loads - without[name].joint_loads
    # 5 m of wall to the bearing, half of it to the head; 5 m along the ridge
    assert heads[truss.joint("B0")] == pytest.approx([qp * (windward - 0.2) * 5e3 * 5e3 / 2, 0.0])
    assert heads[truss.joint("B8")] == pytest.approx([-qp * (lee - 0.2) * 5e3 * 5e3 / 2, 0.0])
    # 1 m of heel, half of it to the bearing and half to the joint above
    assert without[name].joint_loads[truss.joint("B0"), 0] == pytest.approx(qp * (windward - 0.2) * 1e3 * 5e3 / 2)
    assert heads.sum(axis=1)[truss.joint("T0")] == pytest.approx(0.0)


def test_suction_below_the_lee_overhang_and_pressure_below_the_windward_one() -> None:
    """By hand: at x in the left overhang the net coefficient is cpe of the roof less that of the wall below."""
    found = found_for(truss=raised(overhang=800.0))
    assert found.site is not None
    field = found.site.wind
    assert field is not None
    case = next(case for case in field.cases if case.name == "wind from left, suction and suction, inside -0.3")
    assert (field.cuts[0], field.cuts[-1]) == pytest.approx((-800.0, 16800.0))
    walls = {zone.name: cpe for zone, cpe in field.walls("left")}
    assert case.under[0] == walls["D"] > 0.7
    assert case.under[-1] == walls["E"] < -0.3
    assert case.under[3] == -0.3
    assert case.net == pytest.approx(field.peak.pressure * (case.external - case.under))


def test_below_a_gable_overhang_stands_the_gable() -> None:
    site = replace(SITE, position="end", gable_overhang=2500.0)
    found = found_for(site)
    assert found.site is not None
    field = found.site.wind
    assert field is not None
    case = next(case for case in field.cases if case.name == "wind from near gable, suction, inside +0.2")
    gable = {zone.name: cpe for zone, cpe in field.walls("near gable")}["D"]
    # the strip is half overhang, half inside
    assert case.under == pytest.approx(np.full(len(case.under), (gable + 0.2) / 2))


def test_cases_that_act_alike_are_kept_once() -> None:
    """At mid-length wind from either gable does the same to a truss."""
    names = list(winds(found_for(replace(SITE, position=20e3))))
    assert "wind from near gable, suction, inside +0.2" in names
    assert not [name for name in names if "far gable" in name]
    assert len(names) == 18


def test_a_load_at_a_joint_may_join_a_wind_case_of_the_site() -> None:
    name = "wind from left, suction and suction, inside +0.2"
    load = JointLoad(name, "wind", "B4", down=1e3)
    plain, joined = found_for(), found_for(loads=replace(NOTHING, at_joint=(load,)))
    change = winds(joined)[name].joint_loads - winds(plain)[name].joint_loads
    assert change.sum(axis=0) == pytest.approx([0.0, -1e3])
    assert len(winds(joined)) == len(winds(plain))


def test_the_derivation_tells_the_way() -> None:
    first, second, *_ = winds(found_for()).values()
    text = "\n".join(first.derivation)
    for expected in ("vb0 = 36 m/s", "cr = ", "qp = ", "e = min(b, 2h)", "zone G", "cpi", "in all", "column head"):
        assert expected in text
    assert "vb0" not in "\n".join(second.derivation)


def test_monopitch_roofs() -> None:
    found = found_for(truss=mono_pitch())
    assert found.site is not None
    assert found.site.shape.kind == "rises to the right"
    assert found.site.shape.eaves == (6e3, 15e3)
    assert found.site.shape.height == 15e3
    names = list(winds(found))
    assert names[:4] == [
        "wind from left, suction, inside +0.2",
        "wind from left, suction, inside -0.3",
        "wind from left, pressure, inside +0.2",
        "wind from left, pressure, inside -0.3",
    ]
    assert [name for name in names if "right" in name] == [
        "wind from right, suction, inside +0.2",
        "wind from right, suction, inside -0.3",
    ]


def test_area_of_the_faces() -> None:
    shape = roof_shape(raised(), SITE)
    rise = 8e3 * math.tan(math.radians(12.0))
    assert face_size(shape, "left wall") == (40e3, 40e3 * 6e3)
    assert face_size(shape, "near gable") == pytest.approx((16e3, 16e3 * (6e3 + rise / 2)))
    assert face_size(roof_shape(mono_pitch(), SITE), "far gable") == pytest.approx((12e3, 12e3 * (6e3 + 15e3) / 2))


@pytest.mark.parametrize(
    ("openings", "names"),
    [
        ((), ["inside +0.2", "inside -0.3"]),
        # by hand: h/d = 7.70/16 = 0.481; no face dominates, 20 of 30 m2 lie under suction, mu = 2/3: -0.0339 at
        # h/d 0.25, -0.1116 at 1.0
        ((("left wall", 10e6), ("right wall", 10e6), ("near gable", 10e6)), ["inside -0.0579"]),
        ((("left wall", 10e6),), ["inside +0.658"]),  # 0.9 x 0.7308 of zone D
    ],
)
def test_inside_by_openings(openings: tuple[tuple[str, float], ...], names: list[str]) -> None:
    site = replace(SITE, openings=tuple(Opening(face, area) for face, area in openings))  # type: ignore[arg-type]
    found = winds(found_for(site))
    across = [name.split(", ")[-1] for name in found if name.startswith("wind from left, suction and suction")]
    assert across == names


def test_a_door_anywhere_on_a_side_wall_gives_both_extremes() -> None:
    found = winds(found_for(replace(SITE, openings=(Opening("left wall", 10e6),))))
    along = [name.split(", ")[-1] for name in found if name.startswith("wind from near gable")]
    assert along == ["inside -1.08", "inside -0.45"]  # 0.9 x cpe of zones A and C


def test_stated_coefficients_win_over_openings() -> None:
    found = winds(found_for(replace(SITE, internal=(0.1,), openings=(Opening("left wall", 10e6),))))
    assert {name.split(", ")[-1] for name in found} == {"inside +0.1"}


def test_doors_shut_in_storms_count_as_closed_and_are_named() -> None:
    found = found_for(replace(SITE, openings=(Opening("left wall", 10e6, shut_in_storms=True),)))
    assert {name.split(", ")[-1] for name in winds(found)} == {"inside +0.2", "inside -0.3"}
    assert any("10 m2 in the left wall" in warning for warning in found.warnings)


@pytest.mark.parametrize(
    ("changes", "key", "message"),
    [
        ({"position": 41e3}, "site.truss", "outside a building"),
        ({"position": "first interior", "length": 4e3}, "site.truss", "outside a building"),
        ({"width": 15e3}, "site.width", "less than the truss spans"),
        ({"eaves_height": 800.0}, "site.eaves_height", "1.000 m deep"),
        ({"wind_speed": 28.0}, "site.basic_wind_speed", "does not go with"),
        ({"openings": (Opening("left wall", 75e6), Opening("near gable", 40e6))}, "site.openings", "canopy"),
        ({"openings": (Opening("left wall", 5e6, 38e3, 42e3),)}, "site.openings", "lies off"),
        ({"openings": (Opening("left wall", 500e6),)}, "site.openings", "are more than"),
    ],
)
def test_what_is_refused(changes: dict[str, object], key: str, message: str) -> None:
    with pytest.raises(InputError, match=message) as caught:
        found_for(replace(SITE, **changes))  # type: ignore[arg-type]  # fields of SiteInput
    assert caught.value.key == key


def test_unknown_standards_are_refused() -> None:
    with pytest.raises(UnknownNameError):
        found_for(actions="SANS 10160:2010")


def test_a_roof_of_another_shape_is_refused() -> None:
    mansard = hand_made(
        "A 0 0, T1 3 3, T2 8 4, T3 13 3, E 16 0, B2 8 0",
        "top A T1 T2 T3 E, bottom A B2 E, web T1 B2, web T2 B2, web T3 B2",
        "A E",
    )
    with pytest.raises(InputError, match="no other roof") as caught:
        found_for(truss=mansard)
    assert caught.value.key == "site"


def test_a_pitch_outside_the_tables_is_refused() -> None:
    steep = hand_made("A 0 0, T1 1 5, E 2 0", "top A T1 E, bottom A E", "A E")
    with pytest.raises(InputError, match="outside") as caught:
        found_for(truss=steep)
    assert caught.value.key == "truss.pitch"
