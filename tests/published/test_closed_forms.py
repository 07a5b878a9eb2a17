"""Bar forces of the classical forms against closed forms and coefficient tables.

Unless a check names another source: statics of pin-jointed trusses, derived by sections and recomputed by joint
equilibrium without stiffness (practice notes 1.3 and 1.4). Loads P at the interior top joints, tension positive.
Printed number lists have three decimals; closed forms are exact.
"""

import math
from dataclasses import replace

import numpy as np
import pytest

from spanwright.truss.arrays import FloatArray
from spanwright.truss.forms import build_form
from spanwright.truss.given import build_given
from spanwright.truss.inputs import FormInput, GivenInput, Lean
from spanwright.truss.model import Role, Truss
from spanwright.truss.stiffness import solve

P = 1000.0
HALF_PITCH = math.atan(0.5)
EXACT = 1e-9

Load = dict[str, tuple[float, float]]


def forces(truss: Truss, load: Load) -> dict[str, float]:
    """Return the bar forces in multiples of P; bars of unlike stiffness, since the trusses are determinate."""
    found = solve(truss, _stiffness(truss), _loads(truss, load)).forces[:, 0] / P
    return dict(zip(truss.bar_names, found.tolist(), strict=True))


def _stiffness(truss: Truss) -> FloatArray:
    return np.linspace(1.0e8, 4.0e8, len(truss.bar_names))


def _loads(truss: Truss, load: Load) -> FloatArray:
    loads = np.zeros((len(truss.joint_names), 2, 1))
    for joint, force in load.items():
        loads[truss.joint(joint), :, 0] = np.multiply(force, P)
    return loads


def top_joints(truss: Truss) -> list[str]:
    return [truss.joint_names[joint] for joint in truss.top.joints]


def full(truss: Truss) -> Load:
    """Return P at every interior top joint and P/2 at the ends of the top chord."""
    joints = top_joints(truss)
    return {joint: (0.0, -0.5 if joint in (joints[0], joints[-1]) else -1.0) for joint in joints}


def left_half(truss: Truss) -> Load:
    """Return the same load on the left slope only, half of it at the heel and at the ridge."""
    joints = top_joints(truss)[: len(truss.top.bars) // 2 + 1]
    return {joint: (0.0, -0.5 if joint in (joints[0], joints[-1]) else -1.0) for joint in joints}


def run(found: dict[str, float], prefix: str, numbers: range) -> list[float]:
    return [found[f"{prefix}{number}"] for number in numbers]


# Triangular Howe and Pratt


@pytest.mark.parametrize("panels", [4, 6, 8, 10, 16])
@pytest.mark.parametrize("pitch", [math.radians(12), HALF_PITCH, math.radians(40)])
def test_howe_closed_forms(panels: int, pitch: float) -> None:
    n, m = panels, panels // 2
    truss = build_form(FormInput("Howe", 24000.0, pitch, panels=panels))
    found = forces(truss, full(truss))
    for k in range(1, m + 1):
        assert found[f"BC{k}"] == pytest.approx(min(n - 1, n - k + 1) / (2 * math.tan(pitch)), rel=EXACT)
        assert found[f"TC{k}"] == pytest.approx(-(n - k) / (2 * math.sin(pitch)), rel=EXACT)
    for i in range(1, m):
        assert found[f"P{i}"] == pytest.approx((i - 1) / 2, rel=EXACT, abs=EXACT)
        assert found[f"D{i + 1}"] == pytest.approx(-math.sqrt(i**2 + 1 / math.tan(pitch) ** 2) / 2, rel=EXACT)
    assert found[f"P{m}"] == pytest.approx(m - 1, rel=EXACT)


@pytest.mark.parametrize("panels", [4, 6, 8, 10, 16])
@pytest.mark.parametrize("pitch", [math.radians(12), HALF_PITCH, math.radians(40)])
def test_pratt_closed_forms(panels: int, pitch: float) -> None:
    n, m = panels, panels // 2
    truss = build_form(FormInput("Pratt", 24000.0, pitch, panels=panels))
    found = forces(truss, full(truss))
    for k in range(1, m + 1):
        assert found[f"BC{k}"] == pytest.approx((n - k) / (2 * math.tan(pitch)), rel=EXACT)
        assert found[f"TC{k}"] == pytest.approx(-min(n - 1, n - k + 1) / (2 * math.sin(pitch)), rel=EXACT)
    for i in range(1, m):
        assert found[f"P{i}"] == pytest.approx(-(i + 1) / 2, rel=EXACT)
        assert found[f"D{i + 1}"] == pytest.approx(math.sqrt((i + 1) ** 2 + 1 / math.tan(pitch) ** 2) / 2, rel=EXACT)
    assert found[f"P{m}"] == pytest.approx(0.0, abs=EXACT)


LISTS: list[tuple[FormInput, dict[str, list[float]]]] = [
    (
        FormInput("Howe", 24000.0, HALF_PITCH, panels=8),
        {
            "BC": [7, 7, 6, 5],
            "TC": [-7.826, -6.708, -5.590, -4.472],
            "P": [0, 0.5, 1.0, 3.0],
            "D": [math.nan, -1.118, -1.414, -1.803],
        },
    ),
    (
        FormInput("Pratt", 24000.0, HALF_PITCH, panels=8),
        {
            "BC": [7, 6, 5, 4],
            "TC": [-7.826, -7.826, -6.708, -5.590],
            "P": [-1.0, -1.5, -2.0, 0],
            "D": [math.nan, 1.414, 1.803, 2.236],
        },
    ),
    (
        FormInput("Fink", 24000.0, HALF_PITCH, panels=4),
        {"TC": [-3.354, -2.907], "BC": [3, 2], "P": [-0.894], "D": [1.0]},
    ),
    (
        FormInput("Fink", 24000.0, HALF_PITCH, panels=6),
        {"TC": [-5.590, -4.547, -4.696], "BC": [5, 3], "P": [-1.075, -1.075], "D": [2.0]},
    ),
    (
        FormInput("Fink", 24000.0, HALF_PITCH, panels=8),
        {
            "TC": [-7.826, -7.379, -6.932, -6.485],
            "BC": [7, 6, 4],
            "P": [-0.894, -1.789, -0.894],
            "D": [1.0, 1.0, 2.0, 3.0],
        },
    ),
]


@pytest.mark.parametrize(("form", "lists"), LISTS)
def test_number_lists_for_a_rise_of_a_quarter_of_the_span(form: FormInput, lists: dict[str, list[float]]) -> None:
    truss = build_form(form)
    found = forces(truss, full(truss))
    for prefix, values in lists.items():
        for number, value in enumerate(values, 1):
            if not math.isnan(value):
                assert found[f"{prefix}{number}"] == pytest.approx(value, abs=0.0006), f"{prefix}{number}"


@pytest.mark.parametrize(("name", "bottom"), [("Howe", [5, 5, 4, 3, 2, 2, 2, 2]), ("Pratt", [5, 4, 3, 2, 2, 2, 2, 2])])
def test_load_on_one_slope_leaves_the_other_slopes_webs_without_force(name: str, bottom: list[float]) -> None:
    form = replace(LISTS[0][0], form="Howe" if name == "Howe" else "Pratt")
    truss = build_form(form)
    both, one = forces(truss, full(truss)), forces(truss, left_half(truss))
    assert run(one, "BC", range(1, 9)) == pytest.approx(bottom, rel=EXACT)
    for k in range(1, 4):
        assert one[f"P{8 - k}"] == pytest.approx(0.0, abs=EXACT)
        assert one[f"D{8 - k}"] == pytest.approx(0.0, abs=EXACT)
        assert one[f"P{k}"] == pytest.approx(both[f"P{k}"], rel=EXACT, abs=EXACT)
        assert one[f"D{k + 1}"] == pytest.approx(both[f"D{k + 1}"], rel=EXACT)
    assert one["P4"] == pytest.approx(both["P4"] / 2, rel=EXACT, abs=EXACT)


def test_reactions_under_load_on_one_slope() -> None:
    truss = build_form(LISTS[0][0])
    reactions = solve(truss, _stiffness(truss), _loads(truss, left_half(truss))).reactions[:, :, 0] / P
    assert reactions[truss.joint("B0")] == pytest.approx([0.0, 3.0], abs=EXACT)
    assert reactions[truss.joint("B8")] == pytest.approx([0.0, 1.0], abs=EXACT)


# Fink


@pytest.mark.parametrize("pitch", [math.radians(18), math.radians(26.565), math.radians(38)])
def test_simple_fink_closed_forms(pitch: float) -> None:
    truss = build_form(FormInput("Fink", 9000.0, pitch, panels=4))
    found = forces(truss, full(truss))
    assert found["P1"] == pytest.approx(-math.cos(pitch), rel=EXACT)
    assert found["D1"] == pytest.approx(1 / (2 * math.tan(pitch)), rel=EXACT)
    assert found["BC1"] == pytest.approx(3 / (2 * math.tan(pitch)), rel=EXACT)
    assert found["BC2"] == pytest.approx(1 / math.tan(pitch), rel=EXACT)


def test_compound_fink_coefficients_of_the_handbooks() -> None:
    # roof-truss coefficient tables (e.g. Ketchum, Structural Engineers' Handbook; Grinter), Fink truss, 30 degrees,
    # equal panel loads, 3 figures, from memory; the surds are those figures recomputed
    truss = build_form(FormInput("Fink", 17320.508, math.radians(30), panels=8))
    found = forces(truss, full(truss))
    printed = {"TC1": -7.0, "TC2": -6.5, "TC3": -6.0, "TC4": -5.5, "BC1": 6.06, "BC2": 5.2, "BC3": 3.46}
    printed |= {"P1": -0.866, "P2": -1.732, "P3": -0.866, "D1": 0.866, "D2": 0.866, "D3": 1.732, "D4": 2.598}
    root = math.sqrt(3.0)
    recomputed = [-7, -6.5, -6, -5.5, 3.5 * root, 3 * root, 2 * root]
    recomputed += [-root / 2, -root, -root / 2, root / 2, root / 2, root, 1.5 * root]
    for (bar, value), surd in zip(printed.items(), recomputed, strict=True):
        assert found[bar] == pytest.approx(value, rel=2e-3), bar
        assert found[bar] == pytest.approx(surd, rel=EXACT), bar


def test_load_path_of_a_compound_fink() -> None:
    # J. C. Maxwell 1864, 1870: the sum of force times length equals the sum of external forces times position.
    # Seven loads P and two of P/2 on a rise of 5 m give -(2 (1.25 + 2.5 + 3.75) + 5) P m = -20 P m
    truss = build_form(FormInput("Fink", 17320.508075688773, math.radians(30), panels=8))
    found = forces(truss, full(truss))
    assert np.dot(list(found.values()), truss.lengths) == pytest.approx(-20000.0, rel=EXACT)


# Raised heel


@pytest.mark.parametrize("lean", ["down to centre", "up to centre"])
def test_raised_heel_diagonals_by_the_method_of_sections(lean: Lean) -> None:
    # cut through panel k: moments about the joint where the other two cut bars meet give the sloping chord,
    # the rest of the panel's shear is in the diagonal
    span, heel, slope, n = 24000.0, 1000.0, 0.1, 16
    truss = build_form(
        FormInput("Pratt", span, math.atan(slope), heel, n, lean="up to centre" if lean[0] == "u" else None)
    )
    assert truss.lean == lean
    found = forces(truss, full(truss))
    panel = span / n
    for k in range(1, n // 2 + 1):
        shear = n / 2 - 0.5 - (k - 1)
        pole = k if lean == "down to centre" else k - 1
        moment = panel * pole * (n - pole) / 2
        depth = heel + slope * pole * panel
        vertical = shear - slope * moment / depth
        ends = truss.xy[truss.ends[truss.bar(f"D{k}")]]
        sine = abs(ends[1, 1] - ends[0, 1]) / math.dist(*ends)
        sign = 1.0 if lean == "down to centre" else -1.0
        assert found[f"D{k}"] == pytest.approx(sign * vertical / sine, rel=EXACT, abs=EXACT)


def test_diagonals_of_a_raised_heel_change_sign_where_the_web_shear_does() -> None:
    # span 24 m, heel 1 m, slope 0.10: x* = (-h0 + sqrt(h0^2 + t L h0)) / t = 8.44 m
    span, heel, slope = 24000.0, 1000.0, 0.1
    change = (-heel + math.sqrt(heel**2 + slope * span * heel)) / slope
    assert change == pytest.approx(8439.0, abs=0.5)
    truss = build_form(FormInput("Pratt", span, math.atan(slope), heel, 16))
    found = forces(truss, full(truss))
    signs = [found[f"D{k}"] > 0 for k in range(1, 9)]
    assert signs == [True] * 6 + [False] * 2
    assert math.ceil(change / 1500.0) == 6


@pytest.mark.parametrize(("name", "swapped"), [("Pratt", 5), ("Howe", 6)])
def test_webs_near_mid_span_swap_sign_under_load_on_one_half(name: str, swapped: int) -> None:
    form = FormInput("Pratt" if name == "Pratt" else "Howe", 24000.0, math.atan(0.1), 1000.0, 16)
    truss = build_form(form)
    both, one = forces(truss, full(truss)), forces(truss, left_half(truss))
    webs = [bar for bar in truss.bar_names if bar[0] in "PD"]
    reversing = [bar for bar in webs if both[bar] * one[bar] < -1e-12]
    assert len(reversing) == swapped
    assert all(5 <= int(bar[1:]) <= 12 for bar in reversing)
    assert any(abs(one[bar]) > abs(both[bar]) / 2 for bar in reversing)


# Given joint by joint


@pytest.mark.parametrize("panels", [4, 6, 10])
def test_parallel_chord_pratt_closed_forms(panels: int) -> None:
    # chord = M/h, diagonal = V/sin, post = -(V + joint load)
    n, width, depth, m = panels, 3000.0, 2000.0, panels // 2
    joints = [(f"{row}{i}", i * width, y) for row, y in (("b", 0.0), ("t", depth)) for i in range(n + 1)]
    bars: list[tuple[str, str, Role]] = []
    for i in range(1, n + 1):
        bars += [(f"b{i - 1}", f"b{i}", "bottom chord"), (f"t{i - 1}", f"t{i}", "top chord")]
        bars.append((f"t{i - 1}", f"b{i}", "diagonal") if i <= m else (f"b{i - 1}", f"t{i}", "diagonal"))
    bars += [(f"b{i}", f"t{i}", "post") for i in range(n + 1)]
    truss = build_given(GivenInput(tuple(joints), tuple(bars), (("b0", "pinned"), (f"b{n}", "sliding"))))
    found = forces(truss, full(truss))
    sine = depth / math.hypot(width, depth)
    for i in range(1, m + 1):
        assert found[f"TC{i}"] == pytest.approx(-width * i * (n - i) / (2 * depth), rel=EXACT)
        assert found[f"BC{i}"] == pytest.approx(width * (i - 1) * (n - i + 1) / (2 * depth), rel=EXACT, abs=EXACT)
        assert found[f"D{i}"] == pytest.approx((n - 2 * i + 1) / 2 / sine, rel=EXACT)
    for i in range(1, m):
        assert found[f"P{i + 1}"] == pytest.approx(-(n - 2 * i - 1) / 2 - 1, rel=EXACT)
    assert found["P1"] == pytest.approx(-n / 2, rel=EXACT)
    assert found[f"P{m + 1}"] == pytest.approx(-1.0, rel=EXACT)


def test_double_fink_number_list() -> None:
    # six rafter panels over five equal bottom panels, zig-zag webs, rise a quarter of the span
    rafter = [(f"U{i}", 4000.0 * i, 2000.0 * min(i, 6 - i)) for i in range(1, 6)]
    bottom = [(f"L{i}", 4800.0 * i, 0.0) for i in range(6)]
    upper, lower = ["L0", "U1", "U2", "U3", "U4", "U5", "L5"], [name for name, _, _ in bottom]
    zigzag = ["U1", "L1", "U2", "L2", "U3", "L3", "U4", "L4", "U5"]
    roles: list[tuple[list[str], Role]] = [(upper, "top chord"), (lower, "bottom chord"), (zigzag, "diagonal")]
    bars = tuple((line[i], line[i + 1], role) for line, role in roles for i in range(len(line) - 1))
    truss = build_given(GivenInput((*bottom, *rafter), bars, (("L0", "pinned"), ("L5", "sliding"))))
    found = forces(truss, full(truss))
    assert run(found, "TC", range(1, 4)) == pytest.approx([-5.590, -5.217, -3.913], abs=0.0006)
    assert run(found, "BC", range(1, 4)) == pytest.approx([5, 4, 3], rel=EXACT)
    assert run(found, "D", range(1, 5)) == pytest.approx([-0.898, 1.067, -1.346, 1.346], abs=0.0006)
