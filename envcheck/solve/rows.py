"""How a report lists the layers of an assembly, and what was assumed while drawing them."""

from __future__ import annotations

from collections.abc import Mapping

from envcheck.model.project import (
    AirSpaceLayer,
    ContactLayer,
    Fill,
    FramedLayer,
    Layer,
    MasonryLayer,
    MaterialLayer,
    ResistanceLayer,
    TaperedLayer,
)
from envcheck.model.solved import LayerRow
from envcheck.solve.methods.framed import area_shares
from envcheck.solve.registry import Wall


def layer_rows(
    wall: Wall, notes: Mapping[int, str], outer: tuple[LayerRow, ...]
) -> tuple[LayerRow, ...]:
    """All layers, those outside a ventilated cavity first; bridged ones without a resistance."""
    found = list(outer)
    for index, (layer, block) in enumerate(zip(wall.layers, wall.blocks, strict=True)):
        note = notes.get(index, "") if notes else ""
        if block.pattern:
            found.append(plain_row(layer, note))
        else:
            found.append(plain_row(layer, note, sum([cells[0].value for cells in block.cells])))
    return tuple(found)


def plain_row(layer: Layer, note: str = "", counted: float | None = None) -> LayerRow:
    """One layer by its own description; ``counted`` is the resistance that it has in a wall."""
    match layer:
        case MaterialLayer(_, title, _, material, thickness):
            k = material.conductivity
            r = thickness / k if counted is None else counted
            return LayerRow(title, thickness, k, r, material.source, note)
        case ResistanceLayer() | ContactLayer():
            thickness = layer.thickness if isinstance(layer, ResistanceLayer) else 0.0
            return LayerRow(layer.title, thickness, None, layer.resistance, layer.source, note)
        case AirSpaceLayer():
            words = note or f"air space, {VENTILATION[layer.ventilation]}"
            return LayerRow(layer.title, layer.thickness, None, counted, "", words)
        case TaperedLayer():
            words = note or f"tapered ({layer.shape.replace('_', ' ')}), at its least thickness"
            k, source = layer.material.conductivity, layer.material.source
            return LayerRow(layer.title, layer.least, k, counted, source, words)
        case FramedLayer():
            words = "; ".join(part for part in (_framing(layer), note) if part)
            source = _fill_source(layer.fill)
            return LayerRow(layer.title, layer.thickness, None, counted, source, words)
        case MasonryLayer():
            webs = f"webs {layer.web_share * 100:.3g} % of the area"
            words = note or (webs if layer.web_share < 1 else "solid units")
            k, source = layer.material.conductivity, layer.material.source
            return LayerRow(layer.title, layer.thickness, k, counted, source, words)


VENTILATION = {
    "unventilated": "unventilated",
    "slightly": "slightly ventilated",
    "well": "well ventilated",
}


def _fill_source(fill: Fill) -> str:
    return fill.material.source if fill.material is not None else fill.source


def _framing(layer: FramedLayer) -> str:
    """Members, spacing and share in words without units that a report would convert."""
    if layer.member.profile is not None:
        return f"steel profile {layer.member.profile.id}"
    shares = area_shares(layer)
    words = f"members {shares.member * 100:.3g} % of the area"
    for extra, share in zip(layer.extras, shares.extras, strict=True):
        words += f", {extra.title} {share * 100:.3g} %"
    return words


def drawing_assumptions(wall: Wall) -> tuple[str, ...]:
    """What was assumed to draw the wall as rectangles."""
    found = []
    framed = [layer for layer in wall.layers if isinstance(layer, FramedLayer)]
    for layer in framed:
        if layer.share is not None and layer.member.profile is None:
            whose = layer.share_from or "the project"
            words = f"{layer.title}: framing share {layer.share * 100:.3g} % (from {whose})"
            if layer.member.spacing is not None:
                words += ", drawn as one member of share x spacing"
            found.append(words)
    patterns = dict.fromkeys(block.pattern for block in wall.blocks if block.pattern)
    if len(patterns) > 1:
        found.append("layers of members that run differently are taken to cross each other")
    return tuple(found)
