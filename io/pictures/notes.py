"""The notes of the picture `restraint`: what forces restraints must resist, and the buckling lengths of the webs."""

from __future__ import annotations

from spanwright.design.result import Design
from spanwright.io.pictures.lettering import POINTS_PER_MM, width_of
from spanwright.io.pictures.sheet import Sheet
from spanwright.io.pictures.style import INK, SMALL, SOFT
from spanwright.io.text import kilonewtons
from spanwright.truss.arrays import FloatArray

STEP = 1.45 * SMALL / POINTS_PER_MM
"""mm from line to line."""

WEB_LINES = 5
"""Lines of web lengths that the sheet has room for; all are in results.json."""


def draw_notes(sheet: Sheet, design: Design, left: float, top: float, width: float) -> None:
    """Write the notes down from `top`."""
    between = ";  "
    webs = wrapped(web_lengths(design), between, width - width_of(between, SMALL))
    webs = [*(f"{line};" for line in webs[:-1]), *webs[-1:]]
    if len(webs) > WEB_LINES:
        webs = [*webs[: WEB_LINES - 1], "\u2026 all in results.json"]
    lines = [*wrapped(_forces(design).split(" "), " ", width), *wrapped(_factors(design).split(" "), " ", width)]
    y = top - STEP
    for words, colour in (*((line, SOFT) for line in (*lines, _WEBS)), *((line, INK) for line in webs)):
        sheet.text(left, y, words, SMALL, colour=colour)
        y -= STEP


_WEBS = "Webs, buckling lengths in m, in plane / out of plane where they differ:"


def _forces(design: Design) -> str:
    standard, project = design.setting.standard, design.setting.project
    return (
        f"Forces at restraints: {standard.restraint_share:.1%} of the greatest compression beside them "
        f"by clause {standard.restraint_clause}, to either side; at the anchor, from {project.quantity} off "
        f"together, {kilonewtons(design.anchor_force)}; {kilonewtons(design.anchor_force_relieved)} if they share."
    )


def _factors(design: Design) -> str:
    given = design.setting.project.restraint
    if given.factor_in == given.factor_out == 1.0:
        return "Lengths in m between what holds; effective length factors 1.0."
    return (
        f"Lengths in m between what holds; times effective length factors {given.factor_in:g} in plane, "
        f"{given.factor_out:g} out of plane: {given.reason}."
    )


def web_lengths(design: Design) -> list[str]:
    """Return "P1, P11 1.03" for the webs of each pair of buckling lengths, in the truss's order."""
    truss, lengths = design.setting.truss, design.setting.lengths
    alike: dict[tuple[str, str], list[str]] = {}
    for bar, role in enumerate(truss.roles):
        if "chord" not in role:
            pair = (_m(lengths.in_plane, bar), _m(lengths.out_of_plane, bar))
            alike.setdefault(pair, []).append(truss.bar_names[bar])
    return [
        f"{', '.join(bars)} {inside if inside == outside else f'{inside} / {outside}'}"
        for (inside, outside), bars in alike.items()
    ]


def _m(lengths: FloatArray, bar: int) -> str:
    return f"{lengths[bar] / 1e3:.2f}"


def wrapped(words: list[str], between: str, width: float) -> list[str]:
    """Return words set into lines that are no wider than `width` mm."""
    lines: list[str] = []
    for word in words:
        longer = f"{lines[-1]}{between}{word}" if lines else word
        if lines and width_of(longer, SMALL) <= width:
            lines[-1] = longer
        else:
            lines.append(word)
    return lines
