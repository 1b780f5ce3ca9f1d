"""How the page lists the layers of an assembly."""

from __future__ import annotations

from typing import NamedTuple

from envcheck import units
from envcheck.model.layers import (
    AirSpaceLayer,
    ContactLayer,
    FramedLayer,
    Layer,
    MaterialLayer,
    ResistanceLayer,
    SectionLayer,
    SectionPiece,
    TaperedLayer,
)
from envcheck.model.solved import Counted
from envcheck.report import numbers
from envcheck.report.inert import clean


class LayerView(NamedTuple):
    """One layer, ready to print."""

    title: str
    thickness: str
    conductivity: str
    resistance: str
    source: str
    note: str


def _openings(layer: AirSpaceLayer, system: str) -> str:
    unit = {"SI": "mm2/m", "IP": "in2/ft"}[system] + ("2" if layer.openings_per == "area" else "")
    return f"openings {units.convert(layer.openings or 0.0, unit):.4g} {unit}"


VENTILATION = {
    "unventilated": "unventilated air space",
    "slightly": "slightly ventilated air space",
    "well": "well-ventilated air space",
}


def views(layer: Layer, counted: Counted, system: str) -> tuple[LayerView, ...]:
    """One layer, and the pieces of a drawn section below it."""
    whole = view(layer, counted, system)
    if not isinstance(layer, SectionLayer):
        return (whole,)
    return (whole, *(_piece(piece, system) for piece in layer.pieces))


def _piece(piece: SectionPiece, system: str) -> LayerView:
    """A piece with its place: x from the left side, y from the outer face."""
    left, right, outer, inner = (numbers.place(edge, system) for edge in piece[2:6])
    conductivity, source = None, ""
    if piece.material is not None:
        conductivity, source = piece.material.conductivity, piece.material.source
    return LayerView(
        title=clean(f"- {piece.title}"),
        thickness=numbers.place(piece.inner - piece.outer, system),
        conductivity=numbers.conductivity(conductivity, system),
        resistance="",
        source=clean(source) or ("by the rule for air spaces" if piece.air else "no source"),
        note=f"x {left} to {right}, y {outer} to {inner}",
    )


def view(layer: Layer, counted: Counted, system: str) -> LayerView:
    """One layer in the units of a system; bridged layers have no resistance of their own."""
    conductivity, source = None, ""
    thickness = 0.0 if isinstance(layer, ContactLayer | TaperedLayer) else layer.thickness
    words = [counted.note]
    if isinstance(layer, MaterialLayer):
        conductivity, source = layer.material.conductivity, layer.material.source
    elif isinstance(layer, ResistanceLayer | ContactLayer):
        source = layer.source
    elif isinstance(layer, AirSpaceLayer):
        words.insert(0, VENTILATION[layer.ventilation])
        if layer.openings is not None:
            words.insert(1, _openings(layer, system))
    elif isinstance(layer, TaperedLayer):
        thickness = layer.least
        conductivity, source = layer.material.conductivity, layer.material.source
        most = numbers.length(layer.greatest, system)
        shapes = f" in {len(layer.pieces)} pieces" if layer.pieces else ""
        words.insert(0, f"tapered{shapes} up to {most}, at its least here")
    elif isinstance(layer, FramedLayer):
        fill = layer.fill
        source = fill.material.source if fill.material is not None else fill.source
    elif isinstance(layer, SectionLayer):
        width = numbers.length(layer.repeat, system)
        words.insert(0, f"drawing, {width} wide")
        source = "see its pieces"
    else:
        source = layer.material.source
    return LayerView(
        title=clean(layer.title),
        thickness=numbers.length(thickness, system),
        conductivity=numbers.conductivity(conductivity, system),
        resistance=numbers.resistance(counted.resistance, system),
        source=clean(source) or "no source",
        note=clean("; ".join(part for part in words if part)),
    )
