"""Layers as the extraction needs them: visible or not, why, and with which linetype."""

from __future__ import annotations

from typing import NamedTuple

from ezdxf.document import Drawing
from ezdxf.entities.layer import Layer

from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.fates import LAYER_FROZEN, LAYER_OFF
from dxfcheck.drawing.primitives import Fate
from dxfcheck.tolerances.drawing import NEVER_PLOTTED

__all__ = ["CONTINUOUS", "LayerState", "LayerStates"]

CONTINUOUS = "CONTINUOUS"


class LayerState(NamedTuple):
    """One layer. ``hidden`` is the fate of what lies on it, None where it shows; ``linetype`` is upper case.

    ``plots`` is False for a layer set not to plot, and for DEFPOINTS, which never does.
    """

    name: str
    is_zero: bool
    hidden: Fate | None
    frozen: bool
    linetype: str
    plots: bool = True


class LayerStates(dict[str, LayerState]):
    """Layers by the name an entity states, made on first use; one that the table does not hold is simply on."""

    def __init__(self, document: Drawing) -> None:
        super().__init__()
        self._table = document.layers

    def __missing__(self, name: str) -> LayerState:
        """Look a layer up in the drawing's table, without case."""
        layer = self._table.get(name) if self._table.has_entry(name) else None
        state = _state(name, layer if isinstance(layer, Layer) else None)
        self[name] = state
        return state

    def unplotted(self) -> frozenset[str]:
        """Names of the layers looked up so far that are not plotted."""
        return frozenset(state.name for state in self.values() if not state.plots)


def _state(name: str, layer: Layer | None) -> LayerState:
    if layer is None:
        return LayerState(clean(name), name == "0", None, frozen=False, linetype=CONTINUOUS, plots=_may_plot(name))
    frozen = layer.is_frozen()
    hidden = LAYER_FROZEN if frozen else LAYER_OFF if layer.is_off() else None
    linetype = clean(str(layer.dxf.get("linetype", CONTINUOUS))).upper()
    plots = bool(layer.dxf.get("plot", 1)) and _may_plot(name)  # DXF Reference, LAYER group 290, from memory
    return LayerState(clean(name), name == "0", hidden, frozen, linetype or CONTINUOUS, plots)


def _may_plot(name: str) -> bool:
    """Whether a layer of that name is ever plotted."""
    return name.upper() != NEVER_PLOTTED
