"""How a report lists the layers of an assembly, and what was assumed while drawing them."""

from __future__ import annotations

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
    wall: Wall, notes: dict[int, str], outer: tuple[LayerRow, ...]
) -> tuple[LayerRow, ...]:
    """All layers, those outside a ventilated cavity first; bridged ones without a resistance."""
    found = list(outer)
    for index, (layer, block) in enumerate(zip(wall.layers, wall.blocks, strict=True)):
        row = plain_row(layer, notes.get(index, ""))
        if not block.pattern:
            row = row._replace(resistance=sum(cells[0].value for cells in block.cells))
        found.append(row)
    return tuple(found)


def plain_row(layer: Layer, note: str = "") -> LayerRow:
    """One layer by its own description."""
    match layer:
        case MaterialLayer():
            k, source = layer.material.conductivity, layer.material.source
            return LayerRow(layer.title, layer.thickness, k, layer.thickness / k, source, note)
        case ResistanceLayer():
            r = layer.resistance
            return LayerRow(layer.title, layer.thickness, None, r, layer.source, note)
        case ContactLayer():
            return LayerRow(layer.title, 0.0, None, layer.resistance, layer.source, note)
        case AirSpaceLayer():
            words = note or f"air space, {VENTILATION[layer.ventilation]}"
            return LayerRow(layer.title, layer.thickness, None, None, "", words)
        case TaperedLayer():
            words = f"tapered {layer.least:.3g} m to {layer.greatest:.3g} m, {layer.shape}"
            k, source = layer.material.conductivity, layer.material.source
            return LayerRow(layer.title, layer.least, k, None, source, note or words)
        case FramedLayer():
            words = "; ".join(part for part in (_framing(layer), note) if part)
            return LayerRow(
                layer.title, layer.thickness, None, None, _fill_source(layer.fill), words
            )
        case MasonryLayer():
            words = f"webs {layer.web_share * 100:.3g} % of the area"
            k, source = layer.material.conductivity, layer.material.source
            return LayerRow(layer.title, layer.thickness, k, None, source, note or words)
    raise TypeError(f"a layer of kind {layer.kind!r} has no row")


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
