"""Hand checks of what comes in: pressure times area, closed forms of a triangle, uplift, loads between joints."""

from __future__ import annotations

from collections.abc import Iterator
from math import tan

import numpy as np

from spanwright.design.analysis import Analysis
from spanwright.design.comparison import Comparison, compared
from spanwright.design.project import Project
from spanwright.design.rules_of_thumb import rule
from spanwright.loads.bending import Stations
from spanwright.loads.cases import Case
from spanwright.loads.strips import strips
from spanwright.truss.arrays import FloatArray
from spanwright.truss.chords import slopes
from spanwright.truss.model import Truss
from spanwright.truss.purlins import PurlinLine
from spanwright.truss.tolerances import TOLERANCES


def totals(truss: Truss, project: Project, analysis: Analysis) -> Iterator[Comparison]:
    """Yield pressure times area against the sum of each case's loads, upright."""
    cases = {case.name: case for case in analysis.cases}
    plan = dict(zip(("left", "right"), plan_by_slope(truss), strict=True))
    wide = project.tributary
    if "imposed" in cases and project.loads.roof_imposed:
        area = sum(plan.values()) * wide
        at_joints = sum(load.down for load in project.loads.at_joint if load.case == "imposed")
        yield _total(
            cases["imposed"],
            f"{project.loads.roof_imposed * 1e3:.3f} kPa x {area / wide / 1e3:.3f} m x {wide / 1e3:.3f} m on plan",
            -project.loads.roof_imposed * area - at_joints,
        )
    for wind in project.loads.wind:
        if wind.name not in cases:
            continue
        at_joints = sum(load.down for load in project.loads.at_joint if load.case == wind.name)
        up = -(wind.left * plan["left"] + wind.right * plan["right"]) * wide
        yield _total(
            cases[wind.name],
            f"({-wind.left * 1e3:.3f} kPa x {plan['left'] / 1e3:.3f} m + {-wind.right * 1e3:.3f} kPa x "
            f"{plan['right'] / 1e3:.3f} m) x {wide / 1e3:.3f} m: across a slope acts on its plan",
            up - at_joints,
        )


def _total(case: Case, working: str, by_hand: float) -> Comparison:
    return compared(
        "load against area", f"case {case.name}, upright", working, by_hand, float(case.joint_loads[:, 1].sum()), "N"
    )


def plan_by_slope(truss: Truss) -> tuple[float, float]:
    """Return mm on plan of the left and the right slope, overhangs included."""
    roof = slopes(truss)
    across = np.abs(roof.directions[:, 0]) * truss.lengths[list(truss.top.bars)]
    across[0] += truss.top.overhang[0] * abs(float(roof.directions[0, 0]))
    across[-1] += truss.top.overhang[1] * abs(float(roof.directions[-1, 0]))
    left = np.array([side == "left" for side in roof.side])
    return float(across[left].sum()), float(across[~left].sum())


def closed_forms(truss: Truss, project: Project, analysis: Analysis) -> Iterator[Comparison]:
    """Yield the ties of a triangular truss with equal panels under the imposed load, by closed form."""
    imposed = [at for at, case in enumerate(analysis.cases) if case.name == "imposed"]
    free = [
        solution
        for reading, solution in zip(analysis.arrangements, analysis.solutions, strict=True)
        if sum(support.x for support in reading.supports) == 1
    ]
    if not (imposed and free and _is_plain_triangle(truss, project)):
        return
    panels = len(truss.top.bars)
    slope = tan(float(np.arctan2(*truss.directions[truss.top.bars[0], ::-1])))
    whole = project.loads.roof_imposed * project.tributary * truss.span
    end_tie = (1.0 - 1.0 / panels) * whole / (2.0 * slope)
    forces = free[0].forces[:, imposed[0]]
    formula = f"(1 − 1/n) W/(2 tan) with n = {panels}, W = {whole / 1e3:.3f} kN, tan = {slope:.4f}"
    rafter, tie = truss.top.bars[0], truss.bottom.bars[0]
    yield compared(
        f"{truss.bar_names[tie]}, tie at the heel", "case imposed", formula, end_tie, float(forces[tie]), "N"
    )
    cosine = abs(float(truss.directions[rafter, 0]))
    yield compared(
        f"{truss.bar_names[rafter]}, rafter at the heel",
        "case imposed",
        f"minus the tie's {end_tie / 1e3:.3f} kN over the cosine {cosine:.4f}",
        -end_tie / cosine,
        float(forces[rafter]),
        "N",
    )


def _is_plain_triangle(truss: Truss, project: Project) -> bool:
    heels = truss.top.joints[0] == truss.bottom.joints[0] and truss.top.joints[-1] == truss.bottom.joints[-1]
    panels = truss.lengths[list(truss.top.bars)]
    plain = project.restraint.purlins == "at joints" and project.restraint.ridge_pair is None
    level = np.ptp(truss.xy[list(truss.bottom.joints), 1]) <= TOLERANCES.same_point
    joined = any(load.case == "imposed" for load in project.loads.at_joint)
    one_kink = len({round(abs(float(y)), 6) for y in truss.directions[list(truss.top.bars), 1]}) == 1
    ends = truss.bearing_joints == (truss.bottom.joints[0], truss.bottom.joints[-1])
    equal = bool(np.ptp(panels) <= TOLERANCES.same_point)
    return bool(
        heels and plain and level and equal and one_kink and ends and not joined and not any(truss.top.overhang)
    )


def uplift(analysis: Analysis) -> Iterator[Comparison]:
    """Yield the balance of wind against permanent load in the combination that lifts most."""
    strength = np.flatnonzero(analysis.strength)
    upright = analysis.reactions[:, 1][:, strength].sum(axis=0)
    at = int(strength[int(np.argmin(upright))])
    held = float(upright.min())
    if held >= 0.0:
        return
    factored = analysis.combinations[at]
    sums = {case.name: float(case.joint_loads[:, 1].sum()) for case in analysis.cases}
    terms = " + ".join(f"{factor:g} x {sums[name] / 1e3:.3f}" for name, factor in factored.factors)
    yield compared(
        "uplift held by the bearings",
        factored.name,
        f"minus ({terms}) kN, loads of the cases, up +",
        -sum(factor * sums[name] for name, factor in factored.factors),
        held,
        "N",
    )


def between_joints(
    truss: Truss, project: Project, lines: tuple[PurlinLine, ...], stations: Stations, cases: tuple[Case, ...]
) -> Iterator[Comparison]:
    """Yield the moment of loads between joints, by the simple beam between them and by the rule P L/6.

    The load is a man midway between two joints; without one, the imposed load of the purlins that stand there.
    """
    for bar in np.flatnonzero(stations.loads_between):
        name = truss.bar_names[bar]
        length = float(truss.lengths[bar])
        square = abs(float(truss.directions[bar, 0]))
        man = next((case for case in cases if case.name == f"man in {name}"), None)
        if man is not None:
            point = (length / 2.0, project.loads.man_load * square)
            yield _free_moment(stations, man, int(bar), name, length, (point,))
            yield _rafter_rule(stations, man, int(bar), name, length, point)
            return
        imposed = next((case for case in cases if case.name == "imposed"), None)
        if imposed is not None:
            carried = strips(truss, lines).plan() * project.loads.roof_imposed * project.tributary * square
            start = float(truss.top.along[truss.top.bars.index(int(bar))])
            points = tuple(
                (line.along - start, float(load))
                for line, load in zip(lines, carried, strict=True)
                if line.bar == bar and line.joint is None
            )
            yield _free_moment(stations, imposed, int(bar), name, length, points)
            return


def _moments(stations: Stations, case: Case, bar: int, at: float) -> tuple[float, float, float]:
    """Return the moments at the joints of a bar and at the station nearest to a place between them, N mm."""
    here = np.flatnonzero(stations.bar == bar)
    moments = case.moments[here]
    nearest = int(np.argmin(np.abs(stations.at[here] - at)))
    return float(moments[0]), float(moments[-1]), float(moments[nearest])


def _free_moment(
    stations: Stations, case: Case, bar: int, name: str, length: float, points: tuple[tuple[float, float], ...]
) -> Comparison:
    at, _ = max(points, key=lambda point: point[1] * point[0] * (length - point[0]))
    left, right, found = _moments(stations, case, bar, at)
    ends = left + (right - left) * at / length
    free = sum(
        force * min(at, place) * (length - max(at, place)) / length for place, force in points
    )  # of a beam on two joints
    listed = ", ".join(f"{force / 1e3:.4f} kN at {place / 1e3:.3f} m" for place, force in points)
    return compared(
        "moment between joints",
        f"{name} at {at / 1e3:.3f} m, case {case.name}",
        f"P a b/L over L = {length / 1e3:.3f} m, {listed} across the chord, with {ends / 1e6:.3f} kN m from its ends",
        free + ends,
        found,
        "N mm",
    )


def _rafter_rule(
    stations: Stations, case: Case, bar: int, name: str, length: float, point: tuple[float, float]
) -> Comparison:
    at, load = point
    found = _moments(stations, case, bar, at)[2]
    divisor = float(rule("rafter")["divisor"])
    return Comparison(
        f"moment between joints, P L/{divisor:g}",
        f"{name} at {at / 1e3:.3f} m, case {case.name}",
        f"{rule('rafter')['source']}; must lie between P L/8 (ends fixed) and P L/4 (ends free)",
        load * length / divisor,
        found,
        "N mm",
        load * length / 8.0 <= found <= load * length / 4.0,
        exact=False,
    )


def by_virtual_work(extensions: FloatArray, unit_forces: FloatArray, names: tuple[str, ...]) -> tuple[float, str]:
    """Return the sum of N n L/EA over the bars, mm, and its three largest terms in words."""
    terms = extensions * unit_forces
    largest = np.argsort(-np.abs(terms), kind="stable")[:3]
    listed = ", ".join(f"{names[bar]} {terms[bar]:.3f}" for bar in largest)
    return float(terms.sum()), f"sum of N n L/EA over {len(terms)} bars; largest terms, mm: {listed}"
