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
            graph.add_edge(brace.joint, brace.name)
            if brace.counted:
                graph.add_edge(brace.name, self.line(brace.line).name)
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
