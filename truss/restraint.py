"""The restraint graph: what holds the chords sideways, and by which path.

The nodes are joints (indices), purlin lines, knee braces, bottom ties and bearings (their names in print) and the
anchor: the braced bay or diaphragm, and for bearings what holds them. A joint is held sideways only if a path leads
from it through parts to the anchor; a joint is no part, so no path leads through one.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import cached_property

import networkx as nx
import numpy as np

from spanwright.truss.arrays import FloatArray
from spanwright.truss.braces import BottomTie, KneeBrace, place_bottom_ties, place_knee_braces
from spanwright.truss.errors import UnknownNameError
from spanwright.truss.inputs import RestraintInput
from spanwright.truss.model import Chord, Truss
from spanwright.truss.purlins import PurlinLine, lay_purlins
from spanwright.truss.restraint_warnings import restraint_warnings

ANCHOR = "anchor"
THE_ANCHOR = "the anchor: all lines, braces and ties; bearings stay"


@dataclass(frozen=True)
class HeldBearing:
    """A bearing joint (index; `at` is its name) that is held sideways."""

    joint: int
    at: str

    @property
    def name(self) -> str:
        """The bearing's name in print."""
        return f"bearing {self.at}"


@dataclass(frozen=True)
class Held:
    """A point where a chord is held sideways, and one part that holds it there; two parts at a point are two.

    along : mm, developed length along the chord from its first joint. joint : index, or None between joints.
    by : in words ("knee brace B4 to line 5"). part : the part's name, as `parts` lists it ("knee brace B4").
    """

    along: float
    joint: int | None
    by: str
    part: str


@dataclass(frozen=True)
class RestraintForce:
    """The force, N, that a part must resist sideways, to either side, where it holds a chord.

    part : its name. kind : "purlin line", "knee brace", "bottom tie" or "bearing". at : where, in words.
    """

    part: str
    kind: str
    at: str
    force: float


@dataclass(frozen=True)
class Restraint:
    """What stands there to hold the chords sideways.

    lines : purlin lines, left to right. fixed : numbers of those fixed to this truss (all, unless one is taken away).
    braces, ties : counted or not. bearings : those that are held.
    warnings : sentences.
    """

    lines: tuple[PurlinLine, ...]
    fixed: frozenset[int]
    braces: tuple[KneeBrace, ...]
    ties: tuple[BottomTie, ...]
    bearings: tuple[HeldBearing, ...]
    warnings: tuple[str, ...] = ()

    @cached_property
    def graph(self) -> nx.Graph[int | str]:
        """The undirected graph; nodes carry their `kind`."""
        graph: nx.Graph[int | str] = nx.Graph()
        graph.add_node(ANCHOR, kind="anchor")
        for line in self.lines:
            graph.add_node(line.name, kind="purlin line")
            if line.anchored:
                graph.add_edge(line.name, ANCHOR)
            if line.joint is not None and line.number in self.fixed:
                graph.add_edge(line.name, line.joint)
        for brace in self.braces:
            graph.add_node(brace.name, kind="knee brace")
            graph.add_edges_from([(brace.joint, brace.name), (brace.name, self.line(brace.line).name)])
        for tie in self.ties:
            graph.add_node(tie.name, kind="bottom tie")
            graph.add_edge(tie.joint, tie.name)
            if tie.counted:
                graph.add_edge(tie.name, ANCHOR)
        for bearing in self.bearings:
            graph.add_node(bearing.name, kind="bearing")
            graph.add_edges_from([(bearing.joint, bearing.name), (bearing.name, ANCHOR)])
        for node in graph:
            if isinstance(node, int):
                graph.nodes[node]["kind"] = "joint"
        nx.freeze(graph)
        return graph

    @cached_property
    def counted(self) -> frozenset[str]:
        """Names of the parts from which a path leads to the anchor through parts alone."""
        parts = self.graph.subgraph([node for node in self.graph if isinstance(node, str)])
        return frozenset(str(node) for node in nx.node_connected_component(parts, ANCHOR)) - {ANCHOR}

    def line(self, number: int) -> PurlinLine:
        """Return a purlin line by its number."""
        return self.lines[number - 1]

    def holding(self, joint: int) -> tuple[str, ...]:
        """Return the names of the counted parts that hold a joint, none if nothing does."""
        if joint not in self.graph:
            return ()
        return tuple(str(part) for part in self.graph.adj[joint] if part in self.counted)


def restrain(truss: Truss, restraint: RestraintInput) -> Restraint:
    """Lay the purlins, braces and ties and return what holds the truss sideways.

    Raises InputError as `lay_purlins`, `place_knee_braces` and `place_bottom_ties` do.
    """
    lines = lay_purlins(truss, restraint)
    held = truss.bearing_joints if restraint.bearings_held else ()
    laid = Restraint(
        lines=lines,
        fixed=frozenset(line.number for line in lines),
        braces=place_knee_braces(truss, restraint, lines),
        ties=place_bottom_ties(truss, restraint),
        bearings=tuple(HeldBearing(joint, truss.joint_names[joint]) for joint in held),
    )
    return replace(laid, warnings=restraint_warnings(truss, restraint, laid.lines, laid.braces, laid.ties))


def held_points(truss: Truss, restraint: Restraint) -> dict[str, tuple[Held, ...]]:
    """Return for each chord ("top", "bottom") the points where it is held sideways, left to right.

    A part holds a joint on every chord that passes it: a purlin at a heel that both chords share holds both. A purlin
    between joints or on an overhang holds the top chord alone.
    """
    words = {brace.name: f"{brace.name} to line {brace.line}" for brace in restraint.braces}
    between = [
        Held(line.along, None, line.name, line.name)
        for line in restraint.lines
        if line.joint is None and line.number in restraint.fixed and line.name in restraint.counted
    ]
    top = [*_held_joints(truss.top, restraint, words), *between]
    return {
        "top": tuple(sorted(top, key=lambda held: held.along)),
        "bottom": tuple(_held_joints(truss.bottom, restraint, words)),
    }


def _held_joints(chord: Chord, restraint: Restraint, words: dict[str, str]) -> Iterator[Held]:
    for joint, along in zip(chord.joints, chord.along.tolist(), strict=True):
        for part in restraint.holding(joint):
            yield Held(along, joint, words.get(part, part), part)


def parts(restraint: Restraint) -> tuple[str, ...]:
    """Return the names of everything that counts and can go missing.

    Each purlin line with the braces that run to it; where braces do, also its connection to this truss alone
    ("connection of purlin line 3"); each brace, tie and held bearing; the whole anchor.
    """
    counted = restraint.counted
    braced = {brace.line for brace in restraint.braces if brace.counted}
    lines = [line.name for line in restraint.lines if line.name in counted and line.number in restraint.fixed | braced]
    connections = [
        _connection(line)
        for line in restraint.lines
        if line.name in counted and line.number in restraint.fixed & braced
    ]
    points = [brace.name for brace in restraint.braces if brace.name in counted]
    points += [tie.name for tie in restraint.ties if tie.name in counted]
    bearings = [bearing.name for bearing in restraint.bearings]
    anchor = [THE_ANCHOR] if lines or points else []
    return (*lines, *connections, *points, *bearings, *anchor)


def _connection(line: PurlinLine) -> str:
    return f"connection of {line.name}"


def without(restraint: Restraint, part: str) -> Restraint:
    """Return the restraint where one part holds nothing; UnknownNameError for a name that `parts` does not list."""
    known = parts(restraint)
    if part not in known:
        raise UnknownNameError.among(part, list(known), what="restraint")
    if part == THE_ANCHOR:
        lines = tuple(replace(line, anchored=False) for line in restraint.lines)
        return replace(restraint, lines=lines, braces=tuple(_missing(brace) for brace in restraint.braces), ties=())
    lines = tuple(replace(line, anchored=line.anchored and line.name != part) for line in restraint.lines)
    loose = {line.number for line in lines if not line.anchored}
    return replace(
        restraint,
        lines=lines,
        fixed=restraint.fixed - {line.number for line in lines if _connection(line) == part},
        braces=tuple(
            _missing(brace) if brace.line in loose else brace for brace in restraint.braces if brace.name != part
        ),
        ties=tuple(tie for tie in restraint.ties if tie.name != part),
        bearings=tuple(bearing for bearing in restraint.bearings if bearing.name != part),
    )


def _missing(brace: KneeBrace) -> KneeBrace:
    return replace(brace, why_not=brace.why_not or "its line is missing")


def restraint_forces(
    truss: Truss, restraint: Restraint, compression: FloatArray, share: float
) -> tuple[RestraintForce, ...]:
    """Return the force that each counted part must resist where it holds a chord.

    compression : (b,) N, >= 0, greatest of each bar over all combinations. share : of that compression, by the
    member standard (SANS 10162-1 cl. 9.2, simplified: 0.02, from memory).

    The compression is the greatest in the two runs that meet at the point: at least that of the two adjacent bars,
    and more where the chord is pressed harder further on. A part that holds both chords at a shared joint takes the
    greater. A purlin line must carry its own force and those of the braces that run to it.
    """
    greatest: dict[str, RestraintForce] = {}
    points = held_points(truss, restraint)
    for chord in (truss.top, truss.bottom):
        places = sorted({held.along for held in points[chord.name]})
        for held in points[chord.name]:
            force = share * _compression_beside(chord, places, held.along, compression)
            if held.part not in greatest or force > greatest[held.part].force:
                kind = restraint.graph.nodes[held.part]["kind"]
                greatest[held.part] = RestraintForce(held.part, kind, _where(truss, chord, held), force)
    return tuple(greatest.values())


def _compression_beside(chord: Chord, places: list[float], along: float, compression: FloatArray) -> float:
    lower = max((place for place in places if place < along), default=-np.inf)
    upper = min((place for place in places if place > along), default=np.inf)
    beside = (chord.along[:-1] < upper) & (chord.along[1:] > lower)
    return float(compression[list(chord.bars)][beside].max(initial=0.0))


def _where(truss: Truss, chord: Chord, held: Held) -> str:
    if held.joint is not None:
        return truss.joint_names[held.joint]
    after = int(np.searchsorted(chord.along, held.along))
    if after == 0:
        return f"left of {truss.joint_names[chord.joints[0]]}"
    if after == len(chord.joints):
        return f"right of {truss.joint_names[chord.joints[-1]]}"
    return f"{truss.joint_names[chord.joints[after - 1]]} to {truss.joint_names[chord.joints[after]]}"


def anchor_force(forces: tuple[RestraintForce, ...], quantity: int) -> float:
    """Return the sum of restraint forces that reaches the anchor from `quantity` trusses, N.

    The plain sum over lines, braces and ties (bearings have ties of their own), all in one direction and with each
    chord's own worst combination: the safe reading. Standards let parallel trusses share less, such as
    0.2 + 0.8/sqrt(n) of the sum (CSA S16 cl. 9.2, from memory); that is left to the designer of the bracing.
    """
    return quantity * sum(force.force for force in forces if force.kind != "bearing")
