"""Pieces: what the workshop cuts, one mark for identical ones, hands apart; and the packing plates of pairs.

Lengths are nominal until joints are designed: no gussets, cleats, bearings, splices, bolts or welds.
"""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, replace

from spanwright.design.cutting import Cut, cuts
from spanwright.design.hands import SQUARE_WORDS, Ends, ends_and_hand
from spanwright.design.lying import TUBES, lying, way_round
from spanwright.design.packs import PACK_WIDTH, Pack, packs
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.design.slots import SLOT_CLEARANCE, slotted_ends
from spanwright.design.standard import Demand
from spanwright.design.steels import steel
from spanwright.truss.model import Truss
from spanwright.truss.tolerances import TOLERANCES

STEEPEST_MITRE = 45.0
"""Degrees from square that any band saw reaches (common practice: 45 to 60)."""

Shape = tuple[str, str, str, str, float, Ends]
"""What makes pieces identical but for their hand: role, section, way round, grade, cut length, ends."""


@dataclass(frozen=True)
class Piece:
    """Identical pieces under one mark.

    mark : "R1-TC1", after the first bar it makes up. description : "top chord". section : of one piece, ISO 5261.
    grade : of its steel.
    hand : "" where both hands are the same piece; else "L" or "R": seen from the inside of the angle with its
        outstanding leg on top, the first of `ends` is at the left or at the right.
    per_truss, quantity : in one truss and in all of them.
    cut_length : mm, tip to tip along the piece; of webs rounded down. mass : kg each, without deduction for mitres.
    paint_area : m2 each, the whole outline, contact faces of pairs included, ends not.
    ends : preparation of the two ends: "square", "mitre 12.0 deg, long at heel" (degrees from square),
        "profile to CHS 139.7x5 at 48.0 deg" (between the axes).
    bars : names of the bars it makes up in one truss.
    way : which way round it stands, "short leg to the gusset"; "" where there is one way only.
    remarks : sentences, the way round first.
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
    ends: Ends
    bars: tuple[str, ...]
    way: str = ""
    remarks: tuple[str, ...] = ()

    @property
    def total_mass(self) -> float:
        """Mass of all of them, kg."""
        return self.mass * self.quantity

    @property
    def total_paint_area(self) -> float:
        """Paint area of all of them, m2."""
        return self.paint_area * self.quantity


def pieces_of(setting: Setting, wanted: Demand, choices: tuple[Choice, ...]) -> tuple[Piece, ...]:
    """Return the pieces of a passing design, chords, posts, diagonals, then packs; nothing where a group fails.

    Raises InputError where a web has no room between the members at its ends.
    """
    if not all(choice.passes for choice in choices):
        return ()
    raw = [piece for cut in cuts(setting, choices) for piece in _pieces(setting, cut)]
    plates = [_plate(setting, number, pack) for number, pack in enumerate(packs(setting, wanted, choices), 1)]
    return (*_marked(setting, raw), *plates)


def _pieces(setting: Setting, cut: Cut) -> Iterator[Piece]:
    """Make the pieces that lie side by side in one run, as yet without marks."""
    section, role = cut.choice.section, cut.choice.group.role
    step = TOLERANCES.same_length
    way = way_round(section)
    for lies in lying(section, role):
        length = cut.length(lies) / step
        whole = round(length) if "chord" in role else math.floor(length + TOLERANCES.length_dust / step)
        ends, hand = ends_and_hand(cut, lies)
        yield Piece(
            mark="",
            description=role,
            section=section.piece_names[0],
            grade=steel(setting.project.members.steel, hollow=section.family in TUBES).name,
            hand=hand,
            per_truss=1,
            quantity=0,
            cut_length=step * whole,
            mass=float(section.mass[0]) / section.pieces * step * whole / 1e3,
            paint_area=float(section.surface[0]) / section.pieces * step * whole / 1e3,
            ends=ends,
            bars=tuple(setting.truss.bar_names[bar] for bar in cut.bars),
            way=way,
            remarks=((way,) if way else ()) + _remarks(setting, cut, step * whole),
        )


def _remarks(setting: Setting, cut: Cut, length: float) -> tuple[str, ...]:
    """Say what the workshop should know of a piece."""
    found = []
    stock = setting.project.members.stock_length
    if length > stock:
        splices = math.ceil(length / stock) - 1
        wanted = "1 splice" if splices == 1 else f"{splices} splices"
        found.append(f"longer than the stock length of {stock / 1e3:g} m: {wanted} at least")
    mitres = [math.degrees(math.atan(abs(end.slant))) for end in cut.ends if end.kind == "mitre"]
    if mitres and max(mitres) > STEEPEST_MITRE:
        found.append(f"a mitre of more than {STEEPEST_MITRE:g} deg from square: check that the saw reaches it")
    if _ends_on_other_chord(setting.truss, cut):
        found.append("meets the other chord at the heel: nominal to the joint, trim to suit the heel detail")
    slots = _slots(setting, cut)
    weld = _end_weld(setting, cut, slots)
    if slots:
        where, wide = "both ends" if slots > 1 else "one end", setting.project.members.gap + SLOT_CLEARANCE
        found.append(
            f"slotted over the gusset at {where}: slots {wide:g} mm wide, at least {weld:.0f} mm of "
            "weld along each side of the gusset"
        )
    if length < 2.0 * weld:
        found.append(f"too short for the end welds assumed, {weld:.0f} mm along each edge at each end")
    return tuple(found)


def _slots(setting: Setting, cut: Cut) -> int:
    """Return how many ends of a piece are slotted over a gusset."""
    ends = slotted_ends(setting.truss, setting.groups, setting.options)
    return min(2, int(ends[list(cut.bars)].sum()))


def _end_weld(setting: Setting, cut: Cut, slots: int) -> float:
    """Return mm of weld along each edge that the checks assume at an end of a web; 0 where they assume none."""
    choice, ends = cut.choice, setting.project.ends
    angle = "chord" not in choice.group.role and choice.section.family not in TUBES and ends.kind == "welded"
    if not (slots or angle):
        return 0.0
    return ends.weld_length * float(choice.section.leg_connected[0])


def _ends_on_other_chord(truss: Truss, cut: Cut) -> bool:
    """Whether a chord piece without overhang ends at a joint where the other chord ends too."""
    ends = {truss.top.joints[0], truss.top.joints[-1]} & {truss.bottom.joints[0], truss.bottom.joints[-1]}
    for chord, bar, overhang in (
        (truss.top, truss.top.bars[0], truss.top.overhang[0]),
        (truss.top, truss.top.bars[-1], truss.top.overhang[1]),
        (truss.bottom, truss.bottom.bars[0], 0.0),
        (truss.bottom, truss.bottom.bars[-1], 0.0),
    ):
        joint = chord.joints[0] if bar == chord.bars[0] else chord.joints[-1]
        if bar in cut.bars and joint in ends and overhang == 0.0:
            return True
    return False


def _marked(setting: Setting, raw: list[Piece]) -> list[Piece]:
    """Give one mark to identical pieces and add up their numbers; opposite hands share it but for the last letter."""
    merged: dict[tuple[Shape, str], Piece] = {}
    for piece in raw:
        key = (_shape(piece), piece.hand)
        if key in merged:
            known = merged[key]
            bars, remarks = dict.fromkeys((*known.bars, *piece.bars)), dict.fromkeys((*known.remarks, *piece.remarks))
            piece = replace(known, per_truss=known.per_truss + 1, bars=tuple(bars), remarks=tuple(remarks))
        merged[key] = piece
    marks: dict[Shape, str] = {}
    marked = []
    for (shape, hand), piece in merged.items():
        base = marks.setdefault(shape, _free_name(piece.bars[0], set(marks.values())))
        mark = f"{setting.project.mark}-{base}{hand}"
        marked.append(replace(piece, mark=mark, quantity=piece.per_truss * setting.project.quantity))
    return marked


def _shape(piece: Piece) -> Shape:
    return piece.description, piece.section, piece.way, piece.grade, piece.cut_length, piece.ends


def _free_name(name: str, taken: set[str]) -> str:
    """Return the name, or where another shape of the same run has it, the name with a number behind."""
    number = 2
    free = name
    while free in taken:
        free = f"{name}.{number}"
        number += 1
    return free


def _plate(setting: Setting, number: int, pack: Pack) -> Piece:
    return Piece(
        mark=f"{setting.project.mark}-PK{number}",
        description="packing plate",
        section=f"FL {PACK_WIDTH:g}x{pack.thickness:g}",
        grade=setting.project.members.steel,
        hand="",
        per_truss=pack.count,
        quantity=pack.count * setting.project.quantity,
        cut_length=pack.length,
        mass=pack.mass,
        paint_area=pack.surface,
        ends=(SQUARE_WORDS, SQUARE_WORDS),
        bars=tuple(setting.truss.bar_names[bar] for bar in pack.bars),
        remarks=pack.remarks,
    )
