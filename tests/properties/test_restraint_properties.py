"""Invariants of restraint on whole drawn trusses: what is taken away never shortens a length, mirroring mirrors all."""

import itertools
from dataclasses import replace
from typing import Literal

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st
from strategies import trusses

from spanwright.truss.assembly import NamedBar, assemble
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.lengths import BucklingLengths, buckling_lengths
from spanwright.truss.model import Chord, Truss
from spanwright.truss.purlins import lay_purlins
from spanwright.truss.restraint import held_points, parts, restrain, without
from spanwright.truss.restraint_forces import anchor_force, restraint_forces
from spanwright.truss.tolerances import TOLERANCES

SLACK = 1e-6  # mm, rounding of sums of lengths


@st.composite
def restraints(draw: st.DrawFn, truss: Truss) -> RestraintInput:
    slope = truss.top.length / 2 + truss.top.overhang[0]
    pair = draw(st.sampled_from([None, None, 150.0, 300.0]))
    top = slope - (pair or 0.0)
    at_joints: st.SearchStrategy[Literal["at joints"]] = st.just("at joints")
    spacings = st.sampled_from([900.0, 1500.0, 2500.0])
    listed = draw(st.lists(st.integers(0, 20), min_size=1, max_size=6, unique=True))
    distances = tuple(top * step / 20 for step in sorted(listed))
    purlins = draw(at_joints | spacings | st.just(distances))
    laid = RestraintInput(purlins, "all", "roof bracing", draw(st.booleans()), pair)
    lines = lay_purlins(truss, laid)
    every: st.SearchStrategy[Literal["all"]] = st.just("all")
    nothing: st.SearchStrategy[Literal["none"]] = st.just("none")
    some = st.sets(st.integers(1, len(lines))).map(sorted).map(tuple)
    bottom = [truss.joint_names[joint] for joint in truss.bottom.joints]
    below = [
        truss.joint_names[joint]
        for joint in truss.bottom.joints
        if joint not in truss.top.joints and min(abs(line.x - truss.xy[joint, 0]) for line in lines) < 299.0
    ]
    braces, ties = ["none"], ["none"]
    if "Fink" not in truss.form:
        braces += ["every purlin", "every 2nd purlin", "every 3rd purlin"]
        ties += ["every 2nd joint"]
    return replace(
        laid,
        anchored=draw(st.one_of(every, nothing, some)),
        anchored_by=draw(st.sampled_from(["roof bracing", "roof bracing", "diaphragm", "nothing"])),
        knee_braces=draw(st.sampled_from(braces) | subsets(below)),
        bottom_ties=draw(st.sampled_from(ties) | subsets(bottom)),
        twist_held=draw(st.sampled_from(["", "webs"])),
    )


def subsets(names: list[str]) -> st.SearchStrategy[tuple[str, ...]]:
    return st.lists(st.sampled_from(names), unique=True).map(tuple) if names else st.just(())


@st.composite
def roofs(draw: st.DrawFn) -> tuple[Truss, RestraintInput]:
    truss = draw(trusses().filter(lambda truss: truss.lengths[list(truss.top.bars)].min() > 400.0))
    return truss, draw(restraints(truss))


def lengths(truss: Truss, wanted: RestraintInput) -> BucklingLengths:
    return buckling_lengths(truss, restrain(truss, wanted), wanted, allow_unheld=True)


def assert_nowhere_shorter(longer: BucklingLengths, shorter: BucklingLengths) -> None:
    for name in ("in_plane", "out_of_plane", "torsional", "minor"):
        assert (getattr(longer, name) >= getattr(shorter, name) - SLACK).all(), name
    assert set(longer.unheld) >= set(shorter.unheld)
    assert (longer.together | ~shorter.together).all()


@given(roofs())
@settings(max_examples=60, deadline=None)
def test_a_removed_restraint_never_shortens_a_length(roof: tuple[Truss, RestraintInput]) -> None:
    truss, wanted = roof
    held = restrain(truss, wanted)
    whole = buckling_lengths(truss, held, wanted, allow_unheld=True)
    for part in parts(held):
        left = without(held, part)
        assert_nowhere_shorter(buckling_lengths(truss, left, wanted, allow_unheld=True), whole)
        assert set(parts(left)) < set(parts(held))


@given(roofs(), st.data())
@settings(max_examples=60, deadline=None)
def test_an_added_restraint_never_lengthens_one(roof: tuple[Truss, RestraintInput], data: st.DataObject) -> None:
    truss, wanted = roof
    count = len(lay_purlins(truss, wanted))
    bottom = tuple(truss.joint_names[joint] for joint in truss.bottom.joints)
    anchored = wanted.anchored if isinstance(wanted.anchored, tuple) else ()
    ties = wanted.bottom_ties if isinstance(wanted.bottom_ties, tuple) else ()
    changes: dict[str, object] = {
        "bearings_held": True,
        "anchored": "all",
        "twist_held": "webs",
        "bottom_ties": (*ties, data.draw(st.sampled_from(bottom))) if wanted.bottom_ties in ("none", ties) else bottom,
    }
    if wanted.anchored != "all":
        changes["anchored"] = tuple(sorted({*anchored, data.draw(st.integers(1, count))}))
    if wanted.knee_braces == "every 2nd purlin":
        changes["knee_braces"] = "every purlin"
    name = data.draw(st.sampled_from(sorted(changes)))
    more = replace(wanted, **{name: changes[name]})  # type: ignore[arg-type]  # one field of its own type
    assert_nowhere_shorter(lengths(truss, wanted), lengths(truss, more))


@given(roofs())
@settings(max_examples=60, deadline=None)
def test_a_mirrored_truss_has_mirrored_lengths(roof: tuple[Truss, RestraintInput]) -> None:
    truss, wanted = roof
    count = len(lay_purlins(truss, wanted))
    if isinstance(wanted.anchored, tuple):
        turned = replace(wanted, anchored=tuple(count + 1 - number for number in wanted.anchored))
    else:
        turned = wanted
    one, other = lengths(truss, wanted), lengths(mirrored(truss), turned)
    for name in ("in_plane", "out_of_plane", "torsional", "minor"):
        np.testing.assert_allclose(getattr(one, name), getattr(other, name), rtol=1e-9)
    assert (one.together == other.together).all()
    assert set(one.unheld) == set(other.unheld)


def mirrored(truss: Truss) -> Truss:
    """Return the truss turned about an upright line, with the same names in the same order."""
    names, xy = truss.joint_names, truss.xy
    joints = {name: (-float(x), float(y)) for name, (x, y) in zip(names, xy, strict=True)}
    bars = [
        NamedBar(bar, names[a], names[b], role)
        for bar, (a, b), role in zip(truss.bar_names, truss.ends, truss.roles, strict=True)
    ]
    supports = {names[support.joint]: support.x for support in truss.supports}
    slope = truss.directions[truss.top.bars[0], 0]
    turned = assemble(joints, bars, supports, overhang=truss.top.overhang[0] * float(slope), form=truss.form)
    assert turned.bar_names == truss.bar_names
    return turned


@given(roofs())
@settings(max_examples=60, deadline=None)
def test_what_counts_is_what_a_path_leads_from(roof: tuple[Truss, RestraintInput]) -> None:
    truss, wanted = roof
    held = restrain(truss, wanted)
    for line in held.lines:
        assert line.anchored == (line.name in held.counted)
    for brace in held.braces:
        short = brace.rise <= TOLERANCES.longest_knee + TOLERANCES.same_point
        assert brace.counted == (brace.name in held.counted) == (held.line(brace.line).anchored and short)
    for tie in held.ties:
        assert tie.counted == (tie.name in held.counted)
    if wanted.anchored_by == "nothing":
        assert held.counted == {bearing.name for bearing in held.bearings}


@given(roofs())
@settings(max_examples=60, deadline=None)
def test_the_length_of_a_chord_bar_is_the_widest_gap_between_held_points_over_it(
    roof: tuple[Truss, RestraintInput],
) -> None:
    truss, wanted = roof
    found = lengths(truss, wanted)
    points = held_points(truss, restrain(truss, wanted))
    for chord in (truss.top, truss.bottom):
        places = [point.along for point in points[chord.name]]
        for bar, (start, end) in zip(chord.bars, itertools.pairwise(chord.along.tolist()), strict=True):
            gap = max(gap_at(place, places) for place in stations(start, end, places))
            assert np.isclose(found.out_of_plane[bar], gap, rtol=1e-12)


def stations(start: float, end: float, places: list[float]) -> list[float]:
    """Return a place inside every piece into which the held points divide the bar."""
    cuts = sorted({start, end, *(place for place in places if start < place < end)})
    return [(a + b) / 2 for a, b in itertools.pairwise(cuts)]


def gap_at(place: float, places: list[float]) -> float:
    left = [other for other in places if other < place]
    right = [other for other in places if other > place]
    return right_most(right) - left_most(left)


def left_most(places: list[float]) -> float:
    return max(places, default=-np.inf)


def right_most(places: list[float]) -> float:
    return min(places, default=np.inf)


@given(roofs(), st.floats(0.005, 0.05))
@settings(max_examples=40, deadline=None)
def test_restraint_forces_are_shares_of_compressions_of_the_chords_they_hold(
    roof: tuple[Truss, RestraintInput], share: float
) -> None:
    truss, wanted = roof
    held = restrain(truss, wanted)
    each = np.abs(np.sin(np.arange(2 * len(truss.bar_names)))).reshape(-1, 2) * 1e5
    compression = each.max(axis=1)
    found = restraint_forces(truss, held, each, share, 4.0)
    forces = {force.part: force.force for force in found}
    for chord in (truss.top, truss.bottom):
        for point in held_points(truss, held)[chord.name]:
            assert forces[point.part] >= share * beside(chord, point.along, compression) - SLACK
    assert max(forces.values(), default=0.0) <= share * compression.max()
    plain = sum(force.force for force in found if force.kind != "bearing")
    assert anchor_force(truss, held, each, share, 3).force <= 3 * plain * (1 + 1e-12)


def beside(chord: Chord, along: float, compression: np.ndarray) -> float:
    """Return the greater compression of the bars that touch a place."""
    touching = [
        compression[bar]
        for bar, (start, end) in zip(chord.bars, itertools.pairwise(chord.along.tolist()), strict=True)
        if start - TOLERANCES.same_point <= along <= end + TOLERANCES.same_point
    ]
    return max(touching, default=0.0)
