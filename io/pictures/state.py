"""What the picture says of each member: how far it is used, in tension or compression, and what governs its group."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import count

import numpy as np

from spanwright.design.result import Design
from spanwright.design.sizing import Choice, Governing
from spanwright.design.standard import Check
from spanwright.io.pictures.style import OVER, band_of
from spanwright.io.text import rounded_up


@dataclass(frozen=True)
class MemberState:
    """One member as drawn.

    sign : what governs it: "T" tension, "C" compression, "" nothing.
    band : index of its band of utilisation. hatched : it fails a pass-or-fail row.
    letter : of its group's row in the table where it governs the group, else "".
    """

    name: str
    utilisation: float
    sign: str
    band: int
    hatched: bool
    letter: str

    @property
    def over(self) -> bool:
        """Whether it is used over 1.00."""
        return self.band == OVER

    @property
    def words(self) -> str:
        """The label: "0.87 C"."""
        value = rounded_up(self.utilisation) if np.isfinite(self.utilisation) else "no strength"
        return f"{value} {self.sign}".rstrip()


@dataclass(frozen=True)
class GroupState:
    """One group's row: its letter, the group, and what governs it."""

    letter: str
    choice: Choice
    governing: Governing


def group_states(design: Design) -> tuple[GroupState, ...]:
    """Return one state a group, with letters from A on."""
    return tuple(
        GroupState(letter, choice, design.governing_of(choice))
        for letter, choice in zip(letters_from("A"), design.choices, strict=False)
    )


def letters_from(first: str) -> Iterator[str]:
    """Yield "a", "b"... "z", "aa", "ab"..., or the same from "A"."""
    for number in count():
        letters = ""
        while number >= 0:
            letters = chr(ord(first) + number % 26) + letters
            number = number // 26 - 1
        yield letters


def member_states(design: Design, groups: tuple[GroupState, ...]) -> tuple[MemberState, ...]:
    """Return one state a bar, in the truss's order."""
    letters = {group.governing.bar: group.letter for group in groups}
    signs = _signs(design)
    return tuple(
        MemberState(
            name=name,
            utilisation=float(design.utilisation[bar]),
            sign=signs[bar],
            band=band_of(float(design.utilisation[bar])),
            hatched=bool(design.limit_failed[bar]),
            letter=letters.get(name, ""),
        )
        for bar, name in enumerate(design.setting.truss.bar_names)
    )


def _signs(design: Design) -> list[str]:
    """Return for each bar whether its greatest strength ratio is one of tension or of compression.

    The name of the check tells; where it does not, the axial force in the combination that governs. A bar that bears
    little itself but buckles together with a pressed neighbour is governed in compression.
    """
    signs = [""] * len(design.setting.truss.bar_names)
    for choice in design.choices:
        checks = [check for check in choice.checks if check.kind == "strength"]
        governs = np.argmax([check.ratio[0] for check in checks], axis=0)
        for place, bar in enumerate(choice.group.bars.tolist()):
            check = checks[governs[place]]
            if check.ratio[0, place] > 0.0:
                signs[bar] = _sign(check, float(design.demand.axial[bar, check.combination[0, place]]))
    return signs


def _sign(check: Check, axial: float) -> str:
    for word, sign in (("tension", "T"), ("compression", "C"), ("buckling", "C")):
        if word in check.name:
            return sign
    return "T" if axial > 0.0 else "C"
