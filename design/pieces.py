"""Pieces: what the workshop cuts, one mark for identical ones, hands apart; and the packing plates of pairs.

Lengths are nominal until joints are designed: no gussets, cleats, bearings, splices, bolts or welds.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from spanwright.design.catalogue import DENSITY
from spanwright.design.cutting import TUBES, Cut, cuts
from spanwright.design.demand import of_bars
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.design.standard import Demand
from spanwright.design.steels import steel
from spanwright.truss.model import Role
from spanwright.truss.tolerances import TOLERANCES

PREFIX: dict[Role, str] = {"top chord": "TC", "bottom chord": "BC", "post": "P", "diagonal": "D"}
PACK_WIDTH = 60.0
"""mm along the member (common practice: 50 to 75)."""
PACK_PROJECTION = 25.0
"""mm by which a pack is longer than the connected leg, for the welds on both edges (common practice: 20 to 30)."""
STEEPEST_MITRE = 45.0
"""Degrees from square that any band saw reaches (common practice: 45 to 60)."""


Shape = tuple[str, str, str, float, tuple[str, str], str]
"""What makes pieces identical: role, section, grade, cut length, ends, hand."""


@dataclass(frozen=True)
class Piece:
    """Identical pieces under one mark.

    mark : "R1-TC1". description : "top chord". section : of one piece, ISO 5261. grade : of its steel.
    hand : "", "L" or "R" (opposite hands). per_truss, quantity : in one truss and in all of them.
    cut_length : mm, tip to tip. mass : kg each. paint_area : m2 each.
    ends : preparation of the two ends, "square", "mitre 12.0 deg" or "profiled".
    bars : names of the bars it makes up in one truss. remarks : sentences.
    """

    mark: str
    description: str
    section: str
    grade: str
    hand: str
    per_truss: int
    quantity: int
    cut_length: float
    mass: float
    paint_area: float
    ends: tuple[str, str]
    bars: tuple[str, ...]
    remarks: tuple[str, ...] = ()

    @property
    def total_mass(self) -> float:
        """Mass of all of them, kg."""
        return self.mass * self.quantity


@dataclass(frozen=True)
class Assembly:
    """One truss as it is lifted: overall length and height in mm, mass of its pieces in kg, number of trusses."""

    length: float
    height: float
    mass: float
    quantity: int


def pieces_of(setting: Setting, wanted: Demand, choices: tuple[Choice, ...]) -> tuple[Piece, ...]:
    """Return the pieces of a passing design, chords, posts, diagonals, then packs; nothing where a group fails."""
    if not all(choice.passes for choice in choices):
        return ()
    raw = [piece for cut in cuts(setting, choices) for piece in _pieces(setting, cut)]
    return (*_marked(setting, raw), *_packs(setting, wanted, choices))


def assembly(setting: Setting, pieces: tuple[Piece, ...]) -> Assembly:
    """Return overall size and lift mass of one truss: setting-out lines plus the depth of the outermost sections."""
    truss = setting.truss
    slope_overhang = sum(truss.top.overhang)
    end = truss.directions[truss.top.bars[0]]
    length = truss.xy[:, 0].max() - truss.xy[:, 0].min() + slope_overhang * abs(float(end[0]))
    height = truss.xy[:, 1].max() - truss.xy[:, 1].min()
    return Assembly(float(length), float(height), sum(p.mass * p.per_truss for p in pieces), setting.project.quantity)


def _pieces(setting: Setting, cut: Cut) -> list[Piece]:
    section, members = cut.choice.section, setting.project.members
    web = "chord" not in cut.choice.group.role
    step = TOLERANCES.same_length
    length = step * (math.floor(cut.length / step) if web else round(cut.length / step))
    remarks = []
    if length > members.stock_length:
        remarks.append(f"longer than the stock length of {members.stock_length / 1e3:g} m: a splice is needed")
    if max(cut.mitres) > STEEPEST_MITRE:
        remarks.append(f"mitre steeper than {STEEPEST_MITRE:g} deg from square: check the saw")
    names = setting.truss.bar_names
    piece = Piece(
        mark="",
        description=cut.choice.group.role,
        section=section.piece_names[0],
        grade=steel(members.steel, hollow=section.family in TUBES).name,
        hand="",
        per_truss=section.pieces,
        quantity=0,
        cut_length=float(length),
        mass=float(section.mass[0]) / section.pieces * length / 1e3,
        paint_area=float(section.surface[0]) / section.pieces * length / 1e3,
        ends=_ends(cut),
        bars=tuple(names[bar] for bar in cut.bars),
        remarks=tuple(remarks),
    )
    if section.pieces == 2 and cut.mitres[0] != cut.mitres[1]:
        return [replace(piece, hand="L", per_truss=1), replace(piece, hand="R", per_truss=1)]
    return [piece]


def _ends(cut: Cut) -> tuple[str, str]:
    if cut.profiled:
        return "profiled", "profiled"
    named = sorted("square" if angle == 0.0 else f"mitre {angle:.1f} deg" for angle in cut.mitres)
    return named[0], named[1]


def _marked(setting: Setting, raw: list[Piece]) -> list[Piece]:
    """Give one mark to identical pieces and add up their numbers."""
    merged: dict[Shape, Piece] = {}
    for piece in raw:
        key: Shape = (piece.description, piece.section, piece.grade, piece.cut_length, piece.ends, piece.hand)
        if key in merged:
            known = merged[key]
            piece = replace(known, per_truss=known.per_truss + piece.per_truss, bars=(*known.bars, *piece.bars))
        merged[key] = piece
    counters: dict[str, int] = {}
    numbers: dict[Shape, int] = {}
    marked = []
    for key, piece in merged.items():
        prefix = PREFIX[piece.description]  # type: ignore[index]  # the description of a member is its role
        shape = (*key[:-1], "")  # both hands share a number
        if shape not in numbers:
            counters[prefix] = counters.get(prefix, 0) + 1
            numbers[shape] = counters[prefix]
        mark = f"{setting.project.mark}-{prefix}{numbers[shape]}{piece.hand}"
        marked.append(replace(piece, mark=mark, quantity=piece.per_truss * setting.project.quantity))
    return marked


def _packs(setting: Setting, wanted: Demand, choices: tuple[Choice, ...]) -> list[Piece]:
    """Return the packing plates between the angles of pairs, one mark a size."""
    sizes: dict[tuple[float, float], tuple[int, list[str]]] = {}
    for choice in choices:
        section = choice.section
        if section.pieces < 2:
            continue
        counts = setting.standard.packs_per_panel(section, of_bars(wanted, choice.group.bars))[0]
        size = (section.gap, float(section.leg_connected[0]) + PACK_PROJECTION)
        count, names = sizes.get(size, (0, []))
        names += [setting.truss.bar_names[bar] for bar in choice.group.bars]
        sizes[size] = (count + int(counts.sum()), names)
    return [
        _pack(setting, number, thickness, length, count, tuple(names))
        for number, ((thickness, length), (count, names)) in enumerate(sizes.items(), 1)
        if count
    ]


def _pack(setting: Setting, number: int, thickness: float, length: float, count: int, bars: tuple[str, ...]) -> Piece:
    volume = PACK_WIDTH * thickness * length
    area = 2.0 * (PACK_WIDTH * length + (PACK_WIDTH + length) * thickness)
    fixing = "welded" if setting.project.members.packs.factor < 1.0 else "snug-tight bolted or welded"
    return Piece(
        mark=f"{setting.project.mark}-PK{number}",
        description="packing plate",
        section=f"FL {PACK_WIDTH:g}x{thickness:g}",
        grade=setting.project.members.steel,
        hand="",
        per_truss=count,
        quantity=count * setting.project.quantity,
        cut_length=length,
        mass=volume * DENSITY * 1e-9,
        paint_area=area * 1e-6,
        ends=("square", "square"),
        bars=bars,
        remarks=(f"between the angles, equally spaced in each panel, {fixing}",),
    )
