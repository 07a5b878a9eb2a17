"""Marks that nobody named: which option would read the points, circles and blocks of a layer."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Iterable

from spanwright.io.wireframe.layers import NOT_ASKED
from spanwright.io.wireframe.options import MARK_KINDS, MarkKind, Options, layer_mark, layer_role
from spanwright.io.wireframe.report import Finding, TallyRow

_WORDS: dict[MarkKind, tuple[str, ...]] = {
    "purlins": ("purlin",),
    "knee braces": ("knee", "brace"),
    "ties": ("tie",),
    "supports": ("support", "bearing"),
}
"""How words in the names of layers begin that hold such marks (common practice)."""

_DOTS = ("POINT", "CIRCLE")


def unnamed_marks(tally: Iterable[TallyRow], options: Options) -> tuple[Finding, ...]:
    """Return a finding for each layer that seems to hold marks though no option names it.

    Points and circles are nothing but marks; blocks, which bars may be drawn in, and what --layers left out are taken
    for marks where the layer's name says so.
    """
    held: dict[str, Counter[str]] = {}
    for row in tally:
        dots = row.kind in _DOTS and row.outcome == "not understood"
        doubtful = row.reason == NOT_ASKED or (row.kind == "INSERT" and row.outcome == "converted")
        named = layer_mark(row.layer, options) or layer_role(row.layer, options)
        if not named and (dots or (doubtful and row.kind in (*_DOTS, "INSERT") and _likely(row.layer))):
            held.setdefault(row.layer, Counter())[row.kind] += row.count
    return tuple(
        Finding("W-109", f"layer {layer} holds {_listed(kinds)}: {_advice(layer)}", layer=layer)
        for layer, kinds in sorted(held.items())
    )


def _likely(layer: str) -> MarkKind | None:
    words = re.findall("[a-z]+", layer.casefold())
    return next((kind for kind in MARK_KINDS if any(word.startswith(_WORDS[kind]) for word in words)), None)


def _listed(kinds: Counter[str]) -> str:
    names = {"POINT": "point", "CIRCLE": "circle", "INSERT": "block"}
    return " and ".join(f"{count} {names[kind]}{'s' if count > 1 else ''}" for kind, count in sorted(kinds.items()))


def _advice(layer: str) -> str:
    kind = _likely(layer)
    if kind:
        return f'{_option(kind)} "{layer}*" reads them as {kind}'
    options = [f"{_option(kind)} (as {kind})" for kind in MARK_KINDS]
    return f'if they are marks, name the layer: {", ".join(options[:-1])} or {options[-1]} "{layer}*"'


def _option(kind: MarkKind) -> str:
    return f"--{kind.replace(' ', '-')}"
