"""Compression by SANS 10162-1: which route a section takes, with which length and force."""

from __future__ import annotations

import numpy as np
import pytest
from members import check_named, member_demand, named, sections

from spanwright.design.sans.member import SANS_10162_1, Sans10162
from spanwright.design.sans.one_leg import EccentricAngle
from spanwright.design.standard import Check, Ends
from spanwright.design.steps import explain

KN = 1e3


def printed(check: Check, place: tuple[int, int] = (0, 0)) -> dict[str, float]:
    """Return every printed value of a check by symbol; a later rule overrides an earlier one."""
    return {line.symbol: line.value for rule in check.rules for line in explain(rule, place)}


def test_a_square_tube_by_hand() -> None:
    """SHS 80x80x4, S355, 2000 and 3000 mm: KL/r = 3000/r, n = 1.34, whole area effective (80/4 - 4 = 16 < 35.6)."""
    tube = named("SHS", "SHS 80x80x4")
    checks = SANS_10162_1.checks(tube, member_demand([[-100 * KN]], in_plane=2000, out_of_plane=3000))
    area, radius = tube.area[0], tube.radius_out[0]
    slenderness = 3000 / radius * np.sqrt(355 / (np.pi**2 * 200e3))
    resistance = 0.9 * area * 355 * (1 + slenderness**2.68) ** (-1 / 1.34)
    out = check_named(checks, "buckling out of plane")
    assert out.resistance[0, 0] == pytest.approx(resistance)
    assert out.ratio[0, 0] == pytest.approx(100 * KN / resistance)
    assert check_named(checks, "buckling in plane").ratio[0, 0] < out.ratio[0, 0]


def test_only_hot_formed_tubes_take_the_better_curve_and_only_when_told() -> None:
    better = Sans10162(hot_formed_tubes=True)
    demand = member_demand([[-100 * KN]], 2500.0)
    for hot in (False, True):
        tubes = sections("CHS", hot=hot)
        plain = check_named(SANS_10162_1.checks(tubes, demand), "buckling in plane").resistance
        told = check_named(better.checks(tubes, demand), "buckling in plane").resistance
        assert np.all(told > plain) if hot else np.array_equal(told, plain)


def test_flexural_torsional_routes_keep_the_general_exponent() -> None:
    better = Sans10162(hot_formed_tubes=True)
    pairs, demand = sections("2L"), member_demand([[-100 * KN]], 2500.0)
    for plain, told in zip(SANS_10162_1.checks(pairs, demand), better.checks(pairs, demand), strict=True):
        np.testing.assert_array_equal(plain.ratio, told.ratio)


def test_class_4_legs_lose_area_but_keep_their_elastic_stress() -> None:
    """60x60x5 in S355: 60/5 = 12 > 10.61, the everyday class 4 angle; in commercial steel (200 MPa) it is not."""
    demand = member_demand([[-30 * KN]], 1000.0)
    class_4 = check_named(SANS_10162_1.checks(named("2L", "2L 60x60x5"), demand), "buckling in plane")
    whole = check_named(
        SANS_10162_1.checks(named("2L", "2L 60x60x5", steel="commercial quality"), demand), "buckling in plane"
    )
    area = named("2L", "2L 60x60x5").area[0]
    assert printed(class_4)["A_e"] == pytest.approx(area - 2 * 2 * (12 - 200 / np.sqrt(355)) * 5**2)
    assert printed(whole)["A_e"] == area
    assert printed(class_4)["f_e"] == printed(whole)["f_e"]


def test_wide_walls_lose_area() -> None:
    """RHS and CHS beyond 670/sqrt(fy) and 23000/fy."""
    demand = member_demand([[-30 * KN]], 1000.0)
    for family in ("RHS", "CHS"):
        tubes = sections(family)
        check = check_named(SANS_10162_1.checks(tubes, demand), "buckling in plane")
        effective = check.rules[0].effective_area[:, 0]  # type: ignore[attr-defined]  # the class rule comes first
        over = tubes.leg_connected / tubes.thickness > (670 / np.sqrt(355) + 4 if family == "RHS" else 23000 / 355)
        assert over.any()
        assert np.all(effective[over] < tubes.area[over])
        wide = tubes.leg_outstanding / tubes.thickness > 670 / np.sqrt(355) + 4
        np.testing.assert_array_equal(effective[~over & ~wide], tubes.area[~over & ~wide])


def test_first_compression_web_governs_where_its_share_makes_it_worse() -> None:
    """Cl. 15: 90 kN on 0.85 of the resistance is worse than 100 kN on the whole; 84 kN is not."""
    tube = named("SHS", "SHS 60x60x3")
    for force, governing in ((90.0, 1), (84.0, 0)):
        first = np.array([[False, True]])
        demand = member_demand([[-100 * KN, -force * KN]], 2000.0, first_web=first)
        check = check_named(SANS_10162_1.checks(tube, demand), "buckling in plane")
        assert check.combination[0, 0] == governing
        share = 0.85 if governing else 1.0
        assert check.demand[0, 0] == pytest.approx(force * KN if governing else 100 * KN)
        assert check.resistance[0, 0] == pytest.approx(share * printed(check)["C_r"])


def test_sideways_buckling_takes_the_greatest_force_of_the_run() -> None:
    pair = named("2L", "2L 80x80x8")
    demand = member_demand([[-50 * KN, 20 * KN]], 2000.0, sideways=np.array([[70 * KN, 90 * KN]]))
    checks = SANS_10162_1.checks(pair, demand)
    assert check_named(checks, "buckling in plane").demand[0, 0] == 50 * KN
    out = check_named(checks, "buckling out of plane, flexure and torsion")
    assert (out.demand[0, 0], out.combination[0, 0]) == (90 * KN, 1)


def test_forces_below_the_tolerance_are_no_compression() -> None:
    """Rounding in a tie must not turn it into a strut with a limit of 200."""
    demand = member_demand([[100 * KN, -1e-5]], 2000.0)
    checks = SANS_10162_1.checks(named("2L", "2L 60x60x6"), demand)
    slenderness = check_named(checks, "slenderness in plane")
    assert slenderness.resistance[0, 0] == 300
    assert check_named(checks, "buckling in plane").ratio[0, 0] == 0


def test_reversal_brings_the_limit_of_200() -> None:
    demand = member_demand([[100 * KN, -1 * KN], [100 * KN, 2 * KN]], 2000.0)
    check = check_named(SANS_10162_1.checks(named("L", "L 60x60x6"), demand), "slenderness, minor axis")
    assert check.resistance.tolist() == [[200, 300]]
    assert check.kind == "limit"


class TestOneLeg:
    def names(self, **changes: object) -> set[str]:
        """Names of the buckling checks that arise for a 60x60x6 web with 25 kN."""
        demand = member_demand([[-25 * KN]], 1400.0, **changes)
        checks = SANS_10162_1.checks(named("L", "L 60x60x6"), demand)
        return {check.name for check in checks if "buckling" in check.name and check.ratio[0, 0] > 0}

    def test_both_routes_are_checked(self) -> None:
        assert self.names() == {"buckling as a concentric strut", "buckling, connected by one leg"}

    @pytest.mark.parametrize(
        "changes",
        [
            {"one_leg": np.array([False])},
            {"ends": Ends("bolted", bolts=1)},
            {"point_loads": np.array([1])},
        ],
    )
    def test_a_condition_not_met_closes_it_for_the_eccentric_strut(self, changes: dict[str, object]) -> None:
        assert self.names(**changes) == {"buckling as a concentric strut", "buckling with eccentric ends"}

    def test_two_bolts_keep_it_open(self) -> None:
        assert "buckling, connected by one leg" in self.names(ends=Ends("bolted", bolts=2))

    def test_slender_legs_close_it(self) -> None:
        """Leg ratio 1.7 and more: 100x50, 150x75 and 200x100 angles."""
        angles = sections("L")
        long_leg = np.maximum(angles.leg_connected, angles.leg_outstanding)
        ratio = long_leg / np.minimum(angles.leg_connected, angles.leg_outstanding)
        checks = SANS_10162_1.checks(angles, member_demand([[-25 * KN]], 1400.0))
        by_rule = check_named(checks, "buckling, connected by one leg").ratio[:, 0] > 0
        np.testing.assert_array_equal(by_rule, ratio < 1.7)
        eccentric = check_named(checks, "buckling with eccentric ends").ratio[:, 0] > 0
        np.testing.assert_array_equal(eccentric, ratio >= 1.7)

    def test_its_slenderness_has_a_limit(self) -> None:
        """L/ra = 134.4 gives 200 (AISC 360-22 E5)."""
        angle = named("L", "L 60x60x6")
        length = 134.4 * angle.piece_radius_parallel[0]
        check = check_named(
            SANS_10162_1.checks(angle, member_demand([[-KN]], length)), "slenderness, connected by one leg"
        )
        assert check.ratio[0, 0] == pytest.approx(1.0, abs=1e-6)

    def test_the_concentric_strut_can_be_the_smaller(self) -> None:
        """Short webs by the one-leg rule, slender ones by the minor axis."""
        angle = named("L", "L 60x60x6")
        demand = member_demand([[-KN], [-KN]], [600.0, 2300.0])
        checks = SANS_10162_1.checks(angle, demand)
        concentric = check_named(checks, "buckling as a concentric strut").ratio[0]
        by_leg = check_named(checks, "buckling, connected by one leg").ratio[0]
        assert concentric[0] < by_leg[0]
        assert concentric[1] > by_leg[1]


def test_eccentric_angle_against_the_inertia_tensor() -> None:
    """Stress of biaxial bending from the inertia tensor about the geometric axes, no second order (mechanics).

    Geometry is rebuilt from the angle's own inertias; the corner coordinates are those of its outline.
    """
    angles = sections("L")
    force, gusset = 1.0, 10.0
    demand = member_demand([[-force]], 500.0, one_leg=np.array([False]), gusset=gusset)
    check = check_named(SANS_10162_1.checks(angles, demand), "buckling with eccentric ends")
    rule = check.rules[-1]
    assert isinstance(rule, EccentricAngle)
    product = -np.sqrt((angles.inertia_major - angles.inertia_in) * (angles.inertia_in - angles.inertia_minor))
    for s in range(0, len(angles), 7):
        p, q = angles.piece_centroid_outstanding[s], angles.piece_centroid_connected[s]
        tensor = np.array([[angles.inertia_in[s], product[s]], [product[s], angles.inertia_out[s]]])
        gradient = np.linalg.solve(tensor, force * np.array([0.0, -(q + gusset / 2)]))
        corners = {
            "stress_heel": (-p, -q),
            "stress_connected": (angles.leg_connected[s] - p, -q),
            "stress_outstanding": (-p, angles.leg_outstanding[s] - q),
        }
        scale = abs(gradient).max() * angles.leg_connected[s]
        for name, corner in corners.items():
            assert getattr(rule, name)[s, 0] == pytest.approx(gradient @ corner, abs=1e-3 * scale)


def test_eccentricity_costs_resistance() -> None:
    """A web on the other side of the gusset carries less than the concentric strut, and less with a thicker gusset."""
    angle = named("L", "L 70x70x7")
    ratios = []
    for gusset in (0.0, 8.0, 16.0):
        demand = member_demand([[-40 * KN]], 1500.0, one_leg=np.array([False]), gusset=gusset)
        checks = SANS_10162_1.checks(angle, demand)
        ratios.append(check_named(checks, "buckling with eccentric ends").ratio[0, 0])
    concentric = check_named(checks, "buckling as a concentric strut").ratio[0, 0]
    assert concentric < ratios[0] < ratios[1] < ratios[2]


def test_every_length_has_its_own_place() -> None:
    """Doubling one length at a time moves only the checks that go with it."""
    pair, angle, star = named("2L", "2L 80x80x8"), named("L", "L 60x60x6"), named("2L star", "2L 60x60x6")
    moved = {
        ("2L", "in_plane"): {"buckling in plane", "slenderness in plane", "spacing of packs"},
        ("2L", "out_of_plane"): {
            "buckling out of plane, flexure and torsion",
            "slenderness out of plane",
            "slenderness out of plane, equivalent",
            "spacing of packs",
        },
        ("2L", "torsional"): {"buckling out of plane, flexure and torsion"},
        ("L", "torsional"): {"buckling as a concentric strut"},
        ("L", "minor"): {
            "buckling as a concentric strut",
            "buckling, connected by one leg",
            "slenderness, minor axis",
            "slenderness, connected by one leg",
        },
        ("L", "in_plane"): set(),
        ("2L star", "torsional"): {"buckling, minor axis or torsion"},
    }
    short = {"in_plane": 700.0, "out_of_plane": 700.0, "torsional": 700.0, "minor": 700.0}
    for (family, length), expected in moved.items():
        section = {"2L": pair, "L": angle, "2L star": star}[family]
        before = SANS_10162_1.checks(section, member_demand([[-20 * KN]], 700.0, **short))
        after = SANS_10162_1.checks(section, member_demand([[-20 * KN]], 700.0, **{**short, length: 1400.0}))
        differ = {b.name for b, a in zip(before, after, strict=True) if not np.array_equal(b.ratio, a.ratio)}
        assert differ - {"spacing of packs"} == expected - {"spacing of packs"}, (family, length)


def test_the_one_leg_rule_takes_the_longer_of_panel_and_effective_length() -> None:
    angle = named("L", "L 60x60x6")
    for panel, minor in ((1000.0, 1500.0), (1500.0, 1000.0)):
        checks = SANS_10162_1.checks(angle, member_demand([[-KN]], panel=panel, minor=minor))
        assert printed(check_named(checks, "buckling, connected by one leg"))["L"] == 1500.0
