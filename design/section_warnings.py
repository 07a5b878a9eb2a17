"""What a user should know of the chosen sections: whether merchants hold them."""

from __future__ import annotations

from collections.abc import Iterable

from spanwright.design.candidates import Candidates
from spanwright.design.catalogue import COMMERCIAL, TO_ORDER
from spanwright.design.lying import TUBES
from spanwright.design.setting import Setting
from spanwright.design.sizing import Choice
from spanwright.design.steels import steel as grade_of
from spanwright.design.tube_joints import joint_warnings


def section_warnings(setting: Setting, choices: tuple[Choice, ...]) -> tuple[str, ...]:
    """Return the warnings of the chosen sections: their supply, then joints of tubes."""
    members = setting.project.members
    sections = [choice.section for choice in choices]
    return (
        *stock_notes(sections, steel=members.steel, stocked=members.stocked),
        *joint_warnings(setting.truss, choices),
    )


def stock_notes(chosen: Iterable[Candidates], *, steel: str, stocked: str) -> tuple[str, ...]:
    """Return what is in doubt about the supply of sections, one sentence a reason; none where `stocked` is "any".

    chosen : sections, each a set of candidates.
    """
    if stocked == "any":
        return ()
    certified = grade_of(steel).certified
    doubts: dict[tuple[str, str], list[str]] = {}
    for section in chosen:
        for at, piece in enumerate(section.piece_names):
            doubt = _doubt(section, at, steel, stocked, certified=certified)
            if doubt:
                doubts.setdefault(doubt, []).append(piece)
    return tuple(f"{begin}: {', '.join(dict.fromkeys(pieces))}{end}" for (begin, end), pieces in doubts.items())


def _doubt(section: Candidates, at: int, steel: str, stocked: str, *, certified: bool) -> tuple[str, str] | None:
    """Return how the sentence begins and ends that doubts the supply of a section, or None."""
    mark = section.stock[at]
    if section.family in TUBES:
        return f"no stock list of hollow sections for {stocked} is known", ": ask the merchant"
    if section.leg_connected[at] != section.leg_outstanding[at]:
        begin = f"no stock list of unequal angles for {stocked} is known"
        return begin, ': ask the merchant, or state legs = "equal"'
    if not mark:
        return f"not on the stock list for {stocked}", ""
    if mark == COMMERCIAL and certified:
        return f"stocked in {COMMERCIAL} only, not as {steel}", ""
    if mark.endswith(TO_ORDER):
        return f"on the stock list for {stocked}, but subject to availability", ""
    return None
