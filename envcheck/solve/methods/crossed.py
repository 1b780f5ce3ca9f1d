"""Outer insulation that continuous metal crosses: girts, furring, rails."""

from __future__ import annotations

from envcheck.model.project import FramedLayer, Layer
from envcheck.solve.cells import homogeneous, stated_cell
from envcheck.solve.methods.fills import fill_resistor
from envcheck.solve.methods.framed import is_metal
from envcheck.solve.registry import Context, Method, NotDecided, Wall

NOT_COUNTED = "crossed by continuous metal: counts 0 by the rule set's convention"


def is_crossed(layer: Layer) -> bool:
    """Whether a layer is insulation outside the framing that metal members interrupt."""
    return isinstance(layer, FramedLayer) and layer.crosses_insulation and is_metal(layer)


def count_crossed(wall: Wall) -> tuple[Wall, dict[int, str]]:
    """Count crossed insulation by the rule set's convention.

    Returns the wall to decide and, for each layer counted otherwise than drawn, what is counted.
    The bracket is that of the wall as drawn. Errors: NotDecided where the convention accepts a
    two-dimensional solution or a test only.
    """
    if not any(is_crossed(layer) for layer in wall.layers):
        return wall, {}
    blocks, changed = list(wall.blocks), {}
    for index, layer in enumerate(wall.layers):
        if not (isinstance(layer, FramedLayer) and is_crossed(layer)):
            continue
        convention = wall.conventions.crossed_insulation
        if convention == "two_dimensional":
            raise NotDecided(
                f"a two-dimensional value or a test for {layer.title!r}: metal crosses it, and "
                "the rule set accepts no other method"
            )
        symbol = wall.blocks[index].symbol
        if convention == "zero":
            cell = stated_cell(symbol, layer.title, 0.0, NOT_COUNTED)
            blocks[index] = homogeneous(cell, layer.thickness)
            changed[index] = NOT_COUNTED
        else:
            context = Context(symbol, wall.setting, wall.conventions)
            fill = fill_resistor(layer.fill, layer.thickness, context)
            blocks[index] = homogeneous(fill, layer.thickness)
            changed[index] = "crossed by continuous metal: counted in full by the rule set"
    return wall._replace(blocks=tuple(blocks)), changed


METHODS = (
    Method(
        name="crossed_insulation",
        title="Outer insulation crossed by continuous metal",
        formula="R = 0, unless tested or solved in two or three dimensions",
        source="common practice of codes that define continuous insulation (fasteners aside), "
        "no single source; the rule set says how it counts",
        valid="continuous members; point brackets enter by chi or drawn as boxes",
    ),
)
