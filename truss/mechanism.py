"""Mechanisms: the motions that strain no bar, found one by one, and the error that explains them."""

from __future__ import annotations

import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.elongation import elongation_of, held_directions
from spanwright.truss.errors import MechanismError
from spanwright.truss.factor import factorise
from spanwright.truss.holding import hold_in_words, what_would_hold
from spanwright.truss.model import Support, Truss
from spanwright.truss.motion import motion_in_words
from spanwright.truss.tolerances import TOLERANCES

MOST_TOLD = 6
"""Independent motions told in one message: whoever mends these finds the rest in the next run."""


def refuse_mechanism(truss: Truss, supports: tuple[Support, ...] | None = None) -> None:
    """Raise MechanismError if joints can move without straining a bar.

    supports : instead of the truss's own.
    The error's `motions` are the sum of the independent ones, which is a motion without strain too.
    """
    held = held_directions(truss, supports)
    motions, independent = free_motions(truss, held)
    if independent:
        raise _explained(truss, held, motions, independent)


def free_motions(truss: Truss, held: BoolArray) -> tuple[FloatArray, int]:
    """Return independent motions (m, j, 2) that strain no bar, at most MOST_TOLD, and how many there are in all.

    held : (j, 2). The largest displacement of a joint in each motion is 1, and more joints sink than rise. Motions
    that share no joint come out one by one. Method: hold one loose degree of freedom after the other until the truss
    stands, then displace each of them alone.
    """
    elongation = elongation_of(truss)
    stiffness = 1.0 / truss.lengths
    fixed = held.copy()
    loose: list[int] = []
    while (factor := factorise(truss, elongation, stiffness, fixed)).loose is not None:
        loose.append(factor.loose)
        fixed.flat[factor.loose] = True
    told = min(len(loose), MOST_TOLD)
    moved = np.zeros((held.size, told))
    moved[loose[:told], range(told)] = 1.0
    forces = -elongation.carried(stiffness[:, None] * elongation.of_bars(moved))
    motions = (factor.displacements(forces) + moved).T.copy()
    for motion in motions:
        motion[np.abs(motion) < TOLERANCES.motionless * np.abs(motion).max()] = 0.0
        sinking = motion[1::2].sum() <= 0.0
        motion *= (1.0 if sinking else -1.0) / np.hypot(motion[::2], motion[1::2]).max()
    return motions.reshape(told, *held.shape), len(loose)


def _explained(truss: Truss, held: BoolArray, motions: FloatArray, independent: int) -> MechanismError:
    told = [motion_in_words(truss, motion) for motion in motions]
    if independent == 1:
        found = f"the truss is a mechanism: without straining a bar, {told[0]}"
    else:
        numbered = "; ".join(f"({number}) {words}" for number, words in enumerate(told, 1))
        more = f"; and {independent - len(told)} more" if independent > len(told) else ""
        found = f"the truss is a mechanism in {independent} ways: without straining a bar, {numbered}{more}"
    holds = ", ".join(hold_in_words(truss, hold) for hold in what_would_hold(truss, held, motions))
    remedy = f"{holds} would hold it" if independent == 1 else f"together these would hold what is named: {holds}"

    whole = motions.sum(axis=0)
    whole /= np.hypot(whole[:, 0], whole[:, 1]).max()
    whole[np.abs(whole) < TOLERANCES.motionless] = 0.0
    moving = np.flatnonzero(np.any(whole, axis=1))
    listed = tuple((truss.joint_names[joint], float(whole[joint, 0]), float(whole[joint, 1])) for joint in moving)
    return MechanismError(f"{found}. {_count(truss, held)}", remedy, motions=listed)


def _count(truss: Truss, held: BoolArray) -> str:
    bars, reactions, equations = len(truss.ends), int(held.sum()), held.size
    short = equations - bars - reactions
    verdict = f"at least {short} too few" if short > 0 else "enough in number, but not where they are needed"
    return (
        f"There are {bars} bar forces and {reactions} reactions for the {equations} equations of joint equilibrium: "
        f"{verdict}"
    )
