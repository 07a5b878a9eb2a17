"""Which layers are read: what is seen and plotted is read, unless the user narrows it."""

from __future__ import annotations

from ezdxf.document import Drawing
from ezdxf.entities.layer import Layer

from spanwright.io.wireframe.options import MarkKind, Options, layer_mark, matches

NOT_ASKED = "layer is not among those asked for"
"""Why a layer is left out that the user did not name, having named others."""

_NEVER_PLOTTED = "defpoints"  # the format's own layer of dimension points


class LayerRules:
    """The rule for each layer, by name in any case; looked up once for each name."""

    def __init__(self, document: Drawing, options: Options) -> None:
        self._options = options
        self._states = {layer.dxf.name.casefold(): _state(layer) for layer in document.layers}
        self._reasons: dict[str, str] = {}
        self._marks: dict[str, MarkKind | None] = {}

    def why_not(self, layer: str) -> str:
        """Return why a layer is not read, or ""."""
        if layer not in self._reasons:
            self._reasons[layer] = self._reason(layer)
        return self._reasons[layer]

    def mark(self, layer: str) -> MarkKind | None:
        """Return the kind of marks that the user said the layer holds, or None."""
        if layer not in self._marks:
            self._marks[layer] = layer_mark(layer, self._options)
        return self._marks[layer]

    def hides_insert(self, layer: str) -> str:
        """Return why a block inserted on this layer is not read whatever layers its parts are on, or "".

        A frozen layer hides a block with all that is in it; a layer that is off hides only what is drawn on it.
        """
        return "layer is frozen" if self._states.get(layer.casefold(), "") == "layer is frozen" else ""

    def _reason(self, layer: str) -> str:
        state = self._states.get(layer.casefold(), "")
        if state:
            return state
        if layer.casefold() == _NEVER_PLOTTED:
            return "layer is not plotted"
        if matches(layer, self._options.ignore):
            return "layer is ignored on request"
        options = self._options
        named = (options.layers, *options.marks.values())
        if options.layers and not any(matches(layer, patterns) for patterns in named):
            return NOT_ASKED
        return ""


def _state(layer: Layer) -> str:
    if layer.is_frozen():
        return "layer is frozen"
    if layer.is_off():
        return "layer is off"
    return "" if layer.dxf.get("plot", 1) else "layer is not plotted"
