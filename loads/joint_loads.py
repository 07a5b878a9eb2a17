"""Loads that go straight to joints: the ceiling, the wind on the walls, loads at one joint, the bars' own mass."""

from __future__ import annotations

import numpy as np
from scipy.constants import g

from spanwright.loads import derivation as say
from spanwright.loads.inputs import JointLoad, MostLeast
from spanwright.truss.arrays import FloatArray
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

Derived = tuple[FloatArray, tuple[str, ...]]
"""Forces on the joints (j, 2) N, and how they came about."""


def ceiling(truss: Truss, pressure: float, tributary: float) -> Derived:
    """Return the load of a ceiling, MPa on plan: each bottom joint carries half of each panel beside it."""
    joints = list(truss.bottom.joints)
    halves = np.abs(np.diff(truss.xy[joints, 0])) / 2
    widths = np.append(halves, 0.0) + np.append(0.0, halves)
    forces = np.zeros((len(truss.joint_names), 2))
    forces[joints, 1] = -pressure * tributary * widths
    line_load = f"{say.kilopascals(pressure)} x {say.metres(tributary)} = {pressure * tributary:.3f} kN/m on plan"
    lines = [
        f"{truss.joint_names[joint]}, {say.metres(width)} on plan: {say.force(*forces[joint].tolist())}"
        for joint, width in zip(joints, widths.tolist(), strict=True)
    ]
    return forces, (f"ceiling: {line_load}", *lines)


def ceiling_warnings(truss: Truss, pressures: MostLeast) -> tuple[str, ...]:
    """Return what a user should know of a ceiling, in sentences; none where there is no ceiling."""
    if pressures.most == 0.0:
        return ()
    x = truss.xy[list(truss.bottom.joints), 0]
    bars = [truss.bar_names[bar] for bar in truss.bottom.bars]
    limit = TOLERANCES.long_ceiling_panel
    long = [bar for bar, width in zip(bars, np.diff(x), strict=True) if width > limit]
    warnings = []
    if long:
        warnings.append(
            "the ceiling is taken to hang from the bottom joints alone; longer on plan than "
            f"{say.metres(limit)}: {', '.join(long)}; hangers between their joints bend the bottom chord, "
            "which is not checked"
        )
    if x[-1] - x[0] < truss.span - TOLERANCES.same_point:
        warnings.append(
            f"the ceiling is reckoned under the bottom chord only, from x {say.metres(x[0])} to {say.metres(x[-1])}, "
            "which does not reach both bearings"
        )
    return tuple(warnings)


def at_eaves(truss: Truss, left: float, right: float) -> Derived:
    """Return horizontal forces, N, + to the right, at the left and the right bearing, from wind on the walls."""
    forces = np.zeros((len(truss.joint_names), 2))
    lines = []
    for side, joint, sideways in (
        ("left", truss.bearing_joints[0], left),
        ("right", truss.bearing_joints[-1], right),
    ):
        forces[joint, 0] += sideways
        if sideways:
            lines.append(f"wind on the {side} wall: {say.force(sideways, 0.0)} at {truss.joint_names[joint]}")
    return forces, tuple(lines)


def at_joint(truss: Truss, load: JointLoad) -> Derived:
    """Return a load at one joint; UnknownNameError (key "loads.at_joint") where there is no such joint."""
    joint = truss.joint(load.joint, key="loads.at_joint")
    forces = np.zeros((len(truss.joint_names), 2))
    forces[joint] = load.right, -load.down
    return forces, (f"{load.case}: {say.force(load.right, -load.down)} at {load.joint}",)


def own_mass_warnings(truss: Truss) -> tuple[str, ...]:
    """Return a sentence that names the parts of the chords that their own mass bends noticeably, if there are any.

    A cantilever is bent like a span twice as long: w l2/2 = w (2 l)2/8.
    """
    limit = TOLERANCES.long_chord_panel
    bars = (*truss.top.bars, *truss.bottom.bars)
    long = [truss.bar_names[bar] for bar in bars if truss.lengths[bar] > limit]
    long += [
        f"{side} overhang"
        for side, length in zip(("left", "right"), truss.top.overhang, strict=True)
        if 2 * length > limit
    ]
    if not long:
        return ()
    return (
        f"longer than {say.metres(limit)} between joints, or half of that as an overhang: {', '.join(long)}; "
        "bending by own mass between joints (w L2/8, w l2/2) is left out and should be added there",
    )


def own_mass_loads(truss: Truss, mass_per_m: FloatArray) -> FloatArray:
    """Return (j, 2) N: the weight of the bars, half of each to each of its joints; an overhang's to the end joint.

    mass_per_m : (b,) kg/m.
    """
    weight_per_mm = mass_per_m * g / 1e3
    loads = np.zeros((len(truss.joint_names), 2))
    np.subtract.at(loads[:, 1], truss.ends, (weight_per_mm * truss.lengths / 2)[:, None])
    for end, length in zip((0, -1), truss.top.overhang, strict=True):
        loads[truss.top.joints[end], 1] -= weight_per_mm[truss.top.bars[end]] * length
    return loads
