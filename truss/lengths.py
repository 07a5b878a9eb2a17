"""Buckling lengths: in the plane between joints, sideways between points that are held, each with what bounds it."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from spanwright.truss.arrays import BoolArray, FloatArray
from spanwright.truss.errors import InputError, UnheldEndError
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Chord, Truss
from spanwright.truss.restraint import Restraint, held_points, parts, without
from spanwright.truss.runs import NOTHING, Meeting, Run, chord_runs, meeting_bars, opposite, straight_run, web_runs
from spanwright.truss.tolerances import TOLERANCES

Pair = tuple[str, str]

FACTOR_KEY = "restraint.effective_length_factor"


@dataclass(frozen=True, eq=False)
class BucklingLengths:
    """The buckling lengths of the bars (b), mm, effective length factors included.

    in_plane : between joints. out_of_plane : sideways, between held points; infinite where an end is not held.
    torsional : between points held against twist. minor : for the minor axis of sections whose principal axes are
    inclined: the greater of in_plane and out_of_plane.
    in_plane_between : joint names. out_of_plane_between : what holds the ends of its longest run, in words.
    together : (b, b) True where two bars share a run, and so buckle sideways in the same event.
    runs : what buckles sideways in one piece, chords first.
    unheld : names of the joints at chord ends (and of inner joints) that nothing holds.
    """

    in_plane: FloatArray
    out_of_plane: FloatArray
    torsional: FloatArray
    minor: FloatArray
    in_plane_between: tuple[Pair, ...]
    out_of_plane_between: tuple[Pair, ...]
    together: BoolArray
    runs: tuple[Run, ...]
    unheld: tuple[str, ...]


def buckling_lengths(
    truss: Truss, restraint: Restraint, given: RestraintInput, *, allow_unheld: bool = False
) -> BucklingLengths:
    """Return the buckling lengths of all bars.

    - In plane a length ends at joints with a bar that is not collinear, and at bearings.
    - Sideways a chord is followed along its developed length, through every kink (the ridge is no restraint), until a
      held point, at a joint or between two; a bar that lies in several runs takes the longest.
    - Webs count as held by the chords at their ends. A joint on no chord is not held by itself: bars collinear through
      it take the whole run between chord joints, and webs that end there count as held by a run that passes.
    - Twist is held where the bar is held sideways; with `given.twist_held` stated, at every joint besides.

    given : for its effective length factors and `twist_held`. allow_unheld : report unheld ends instead of raising.

    Raises UnheldEndError for an end of a chord, or an inner joint, that nothing holds; InputError for a factor below 1
    without a reason.
    """
    _refuse_factors(given)
    return _lengths(truss, restraint, given, _webs(truss, restraint), allow_unheld=allow_unheld)


def lengths_without(truss: Truss, restraint: Restraint, given: RestraintInput) -> dict[str, BucklingLengths]:
    """Return the buckling lengths that remain without each part that can go missing, unheld ends reported.

    What does not depend on purlins, braces and ties (panels and the runs of webs) is found once.
    """
    whole = _webs(truss, restraint)
    found = {}
    for part in parts(restraint):
        left = without(restraint, part)
        webs = whole if left.bearings == restraint.bearings else _webs(truss, left)
        found[part] = _lengths(truss, left, given, webs, allow_unheld=True)
    return found


@dataclass(frozen=True, eq=False)
class _Webs:
    """What bars and bearings alone decide: runs of webs, loose joints, lengths in plane (b,) and what bounds them."""

    runs: tuple[Run, ...]
    loose: tuple[int, ...]
    panels: FloatArray
    between: tuple[Pair, ...]


def _webs(truss: Truss, restraint: Restraint) -> _Webs:
    meeting = meeting_bars(truss)
    return _Webs(
        *web_runs(truss, meeting, [bearing.joint for bearing in restraint.bearings]), *_in_plane(truss, meeting)
    )


def _lengths(
    truss: Truss, restraint: Restraint, given: RestraintInput, webs: _Webs, *, allow_unheld: bool
) -> BucklingLengths:
    points = held_points(truss, restraint)
    chords = (truss.top, truss.bottom)
    on_chords = [run for chord in chords for run in chord_runs(chord, points[chord.name])]
    ends = _unheld_ends(chords, on_chords)
    if (ends or webs.loose) and not allow_unheld:
        raise _unheld_error(truss, restraint, ends, webs.loose)
    runs = (*on_chords, *webs.runs)
    sideways, between, together = _sideways(truss, runs)
    in_plane, out_of_plane = given.factor_in * webs.panels, given.factor_out * sideways
    return BucklingLengths(
        in_plane=in_plane,
        out_of_plane=out_of_plane,
        torsional=np.minimum(out_of_plane, webs.panels) if given.twist_held else out_of_plane,
        minor=np.maximum(in_plane, out_of_plane),
        in_plane_between=webs.between,
        out_of_plane_between=between,
        together=together,
        runs=runs,
        unheld=tuple(truss.joint_names[joint] for joint in (*ends, *webs.loose)),
    )


def _sideways(truss: Truss, runs: tuple[Run, ...]) -> tuple[FloatArray, tuple[Pair, ...], BoolArray]:
    """Return the longest run of each bar, what bounds it, and which bars share a run."""
    within = np.zeros((len(runs), len(truss.bar_names)))
    for row, run in enumerate(runs):
        within[row, list(run.bars)] = 1.0
    lengths = np.array([run.length for run in runs])
    longest = np.where(within > 0.0, lengths[:, None], 0.0).argmax(axis=0)
    return lengths[longest], tuple(runs[row].between for row in longest), within.T @ within > 0.0


def _in_plane(truss: Truss, meeting: Meeting) -> tuple[FloatArray, tuple[Pair, ...]]:
    """Return the length of each bar between the joints that hold it in the plane, and their names."""
    bearings = {support.joint for support in truss.supports}
    through = {joint for joint, here in meeting.items() if len(here) == 2 and opposite(*here.values())} - bearings
    between = [straight_run(truss, meeting, bar, through) for bar in range(len(truss.bar_names))]
    lengths = truss.lengths.tolist()
    return (
        np.array([sum(lengths[bar] for bar in bars) for bars, _ in between]),
        tuple((truss.joint_names[start], truss.joint_names[end]) for _, (start, end) in between),
    )


def _unheld_ends(chords: tuple[Chord, Chord], runs: list[Run]) -> tuple[int, ...]:
    """Return the joints at which a chord ends that nothing holds."""
    ends = {chord.name: (chord.joints[0], chord.joints[-1]) for chord in chords}
    unheld = [
        joint
        for run in runs
        if run.chord != "web"
        for joint, holding in zip(ends[run.chord], run.between, strict=True)
        if holding == NOTHING
    ]
    return tuple(dict.fromkeys(unheld))


def _unheld_error(truss: Truss, restraint: Restraint, ends: tuple[int, ...], loose: tuple[int, ...]) -> UnheldEndError:
    listed = " and ".join(truss.joint_names[joint] for joint in ends or loose)
    if not ends:
        return UnheldEndError(
            f"nothing holds {listed} sideways: on no chord, and no web held at both ends runs straight through",
            "let a web run straight through it from chord to chord",
            "truss.bars",
            joint=truss.joint_names[loose[0]],
        )
    return UnheldEndError(
        f"nothing holds {listed} sideways, where a chord ends: it has no buckling length",
        f"to hold {truss.joint_names[ends[0]]}: {' or '.join(_ways_to_hold(truss, restraint, ends[0]))}",
        "restraint",
        joint=truss.joint_names[ends[0]],
    )


def _ways_to_hold(truss: Truss, restraint: Restraint, joint: int) -> list[str]:
    ways = []
    if joint in truss.bearing_joints:
        ways.append("hold the bearings by an eaves strut or tie to a braced bay and state bearings_held = true")
    if joint in truss.top.joints:
        loose = [line.name for line in restraint.lines if line.joint == joint and not line.anchored]
        ways += [f"anchor {name} (anchored_purlins, anchored_by)" for name in loose]
        if not loose:
            ways.append("let an anchored purlin line stand there (purlins, anchored_purlins)")
    else:
        ways.append("brace it to an anchored purlin line (knee_braces) or tie it to a braced bay (bottom_ties)")
    return ways


def _refuse_factors(given: RestraintInput) -> None:
    for factor in (given.factor_in, given.factor_out):
        if not (math.isfinite(factor) and factor >= TOLERANCES.least_length_factor):
            raise InputError(
                f"an effective length factor of {factor:g}",
                f"state at least {TOLERANCES.least_length_factor:g}, that of a member fixed at both ends",
                FACTOR_KEY,
            )
        if factor < 1.0 and not given.reason.strip():
            raise InputError(
                f"an effective length factor of {factor:g} is stated without a reason",
                'state 1.0, or reason = "..." for the calculation',
                FACTOR_KEY,
            )
