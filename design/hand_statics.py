"""Hand checks of equilibrium: sums, moments about a bearing, bars that meet a straight line alone, symmetry."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from spanwright.design.analysis import Analysis, Arrangement
from spanwright.design.comparison import Comparison, compared
from spanwright.truss.model import Truss
from spanwright.truss.runs import meeting_bars, opposite
from spanwright.truss.stiffness import Solution, reaction_sums
from spanwright.truss.tolerances import TOLERANCES


def statics(truss: Truss, analysis: Analysis, second_difference: float) -> Iterator[Comparison]:
    """Yield the checks of equilibrium, for every arrangement of the supports.

    second_difference : N, largest difference of the bar forces found a second way.
    """
    for reading, solution in zip(analysis.arrangements, analysis.solutions, strict=True):
        yield from _sums(analysis, reading, solution)
        yield from _no_thrust(truss, analysis, reading, solution)
        yield from _about_first_bearing(truss, analysis, reading, solution)
    yield from _one_bar_across(truss, analysis)
    yield from _symmetry(truss, analysis)
    yield _residual(analysis)
    yield _second_way(analysis, second_difference)


def _sums(analysis: Analysis, reading: Arrangement, solution: Solution) -> Iterator[Comparison]:
    sums = reaction_sums(solution, analysis.loads)
    scale = float(np.abs(sums.loads).max())
    for axis, word in enumerate(("along the span", "upright")):
        at = int(np.argmax(np.abs(sums.loads + sums.reactions)[axis]))
        if not np.any(sums.loads[axis]) and not np.any(np.abs(sums.reactions[axis]) > TOLERANCES.by_hand * scale):
            continue
        at = at if np.any(sums.loads[axis, at]) else int(np.argmax(np.abs(sums.loads[axis])))
        yield compared(
            f"sum of {word} reactions{reading.suffix}",
            f"case {analysis.cases[at].name}, the worst of {len(analysis.cases)}",
            "minus the sum of the loads",
            -float(sums.loads[axis, at]),
            float(sums.reactions[axis, at]),
            "N",
            scale,
        )


def _no_thrust(truss: Truss, analysis: Analysis, reading: Arrangement, solution: Solution) -> Iterator[Comparison]:
    """With one bearing held sideways, loads straight down cause no sideways reaction."""
    if sum(support.x for support in reading.supports) != 1:
        return
    straight = [at for at in range(len(analysis.cases)) if not np.any(analysis.loads[:, 0, at])]
    if not straight:
        return
    sideways = np.abs(solution.reactions[:, 0, straight]).max(axis=0)
    worst = straight[int(np.argmax(sideways))]
    yield compared(
        f"no thrust under loads straight down{reading.suffix}",
        f"case {analysis.cases[worst].name}, the worst of {len(straight)}",
        f"one bearing slides: nothing can push against {_held_name(truss, reading)}",
        0.0,
        float(sideways.max()),
        "N",
        float(np.abs(analysis.loads).max()),
    )


def _held_name(truss: Truss, reading: Arrangement) -> str:
    return next(truss.joint_names[support.joint] for support in reading.supports if support.x)


def _about_first_bearing(
    truss: Truss, analysis: Analysis, reading: Arrangement, solution: Solution
) -> Iterator[Comparison]:
    """The last bearing's reaction by moments about the first, for trusses on two bearings."""
    if len(truss.bearing_joints) != 2:
        return
    first, last = truss.bearing_joints
    offset = truss.xy - truss.xy[first]
    at = int(np.argmax(np.abs(analysis.loads[:, 1]).sum(axis=0)))
    load = analysis.loads[:, :, at]
    moment = float((offset[:, 0] * load[:, 1] - offset[:, 1] * load[:, 0]).sum())
    thrust = float(offset[last, 1] * solution.reactions[last, 0, at])
    yield compared(
        f"reaction at {truss.joint_names[last]} by moments{reading.suffix}",
        f"case {analysis.cases[at].name}",
        f"{-moment / 1e6:.3f} kN m of loads about {truss.joint_names[first]}, over {truss.span / 1e3:.3f} m",
        (thrust - moment) / truss.span,
        float(solution.reactions[last, 1, at]),
        "N",
    )


def _one_bar_across(truss: Truss, analysis: Analysis) -> Iterator[Comparison]:
    """Where two bars run straight on and a third comes in, it alone carries the load across them, or nothing."""
    bearings = {support.joint for support in truss.supports}
    worst: tuple[float, int, int, float, int] | None = None
    count = 0
    for joint, here in meeting_bars(truss).items():
        if joint in bearings or len(here) != 3:
            continue
        for bar, (x, y) in here.items():
            along, other = (direction for number, direction in here.items() if number != bar)
            if not opposite(along, other) or opposite((x, y), along) or opposite((x, y), other):
                continue
            count += 1
            across = np.array([-along[1], along[0]])
            by_hand = -(across @ analysis.loads[joint]) / float(across @ np.array([x, y]))
            apart = np.abs(by_hand - analysis.case_forces[bar])
            at = int(np.argmax(apart)) if apart.max() > 0.0 else int(np.argmax(np.abs(by_hand)))
            if worst is None or apart[at] > worst[0]:
                worst = float(apart[at]), joint, bar, float(by_hand[at]), at
    if worst is None:
        return
    _, joint, bar, by_hand_there, at = worst
    yield compared(
        "bars that meet a straight line alone",
        f"{truss.bar_names[bar]} at {truss.joint_names[joint]}, case {analysis.cases[at].name}, the worst of {count}",
        "it carries the load across the line, nothing where there is none",
        by_hand_there,
        float(analysis.case_forces[bar, at]),
        "N",
        float(np.abs(analysis.loads).max()),
    )


def _symmetry(truss: Truss, analysis: Analysis) -> Iterator[Comparison]:
    """Under a load that is its own mirror image, mirrored bars of a symmetrical truss carry the same."""
    twin = mirror(truss)
    if twin is None:
        return
    bars = {frozenset(ends): bar for bar, ends in enumerate(truss.ends.tolist())}
    turned = [bars.get(frozenset((twin[start], twin[end]))) for start, end in truss.ends.tolist()]
    if None in turned:
        return
    order = np.array(turned, dtype=np.intp)
    stiffness = analysis.axial_stiffness
    if np.any(np.abs(stiffness[order] - stiffness) > TOLERANCES.by_hand * stiffness):
        return  # in a redundant truss unlike sections draw unlike forces
    scale = float(np.abs(analysis.loads).max())
    image = analysis.loads[list(twin)] * np.array([-1.0, 1.0])[:, None]
    alike = np.flatnonzero(np.abs(image - analysis.loads).max(axis=(0, 1)) <= TOLERANCES.by_hand * scale)
    loaded = [int(at) for at in alike if np.any(analysis.loads[:, :, at])]
    if not loaded:
        return
    apart = np.abs(analysis.case_forces[order] - analysis.case_forces)[:, loaded]
    bar, column = np.unravel_index(int(np.argmax(apart)), apart.shape)
    at = loaded[int(column)]
    yield compared(
        "symmetry",
        f"{truss.bar_names[bar]} and {truss.bar_names[order[bar]]}, case {analysis.cases[at].name}, the worst pair of "
        f"{len(loaded)} symmetrical {'case' if len(loaded) == 1 else 'cases'}",
        "mirrored bars carry the same",
        float(analysis.case_forces[order[bar], at]),
        float(analysis.case_forces[bar, at]),
        "N",
        scale,
    )


def mirror(truss: Truss) -> tuple[int, ...] | None:
    """Return for each joint its mirror image about mid-span, to rounding, or None where one has none."""
    middle = float(truss.xy[[truss.bearing_joints[0], truss.bearing_joints[-1]], 0].sum())
    image = np.column_stack([middle - truss.xy[:, 0], truss.xy[:, 1]])
    away = np.hypot(*(truss.xy[:, None, :] - image[None, :, :]).transpose(2, 0, 1))
    nearest = away.argmin(axis=0)
    if np.any(away.min(axis=0) > TOLERANCES.drawing_noise):
        return None
    return tuple(int(joint) for joint in nearest)


def _residual(analysis: Analysis) -> Comparison:
    largest = max(solution.largest_residual for solution in analysis.solutions)
    scale = float(np.abs(analysis.loads).max())
    return Comparison(
        "equilibrium of every joint",
        "largest residual of all joints and cases",
        f"zero, but for rounding: at most {TOLERANCES.residual:g} of the largest load",
        0.0,
        largest,
        "N",
        largest <= TOLERANCES.residual * scale,
    )


def _second_way(analysis: Analysis, difference: float) -> Comparison:
    scale = max(float(np.abs(solution.forces).max()) for solution in analysis.solutions)
    return Comparison(
        "bar forces found a second way",
        "largest difference of all bars and cases",
        "from equilibrium of the joints, without a stiffness matrix; no difference but rounding",
        0.0,
        difference,
        "N",
        difference <= TOLERANCES.second_solution * scale,
    )
