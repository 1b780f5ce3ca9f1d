"""One solved assembly as blocks: facts, layers, values beside."""

from __future__ import annotations

from envcheck.report import wording, workings
from envcheck.report.details import AssemblyView
from envcheck.report.parts import Block, Facts, Grid, Pair


def blocks(each: AssemblyView) -> tuple[Block, ...]:
    """Facts, layers and values beside of one assembly."""
    value = f"{each.symbol} = {each.value} {each.unit}" if each.value else "not computed"
    pairs = (
        ("drawn on", each.sheet),
        ("used by", wording.listed(each.elements, 30)),
        ("as drawn", each.declared),
        ("method", f"{each.method} [{each.method_from}]" if each.method_from else each.method),
        ("value", value),
        ("missing", "; ".join(each.missing)),
        ("bounds", each.bracket),
        ("by stated ranges", each.ranges),
        ("films", "; ".join(each.films)),
        ("assumed", "; ".join(each.assumptions)),
    )
    blocks: list[Block] = [Facts(tuple(Pair(label, text) for label, text in pairs if text))]
    if each.layers:
        blocks.append(_layers(each))
    if each.beside:
        blocks.append(_beside(each))
    if each.workings is not None:
        blocks += workings.blocks(each.workings)
    return tuple(blocks)


def _layers(each: AssemblyView) -> Grid:
    rows = tuple(
        (
            layer.title,
            layer.thickness,
            layer.conductivity,
            layer.resistance,
            layer.note,
            layer.source,
        )
        for layer in each.layers
    )
    heads = (
        "layer, outside first",
        "thickness",
        f"k, {each.conductivity_unit}",
        f"R, {each.resistance_unit}",
        "note",
        "source",
    )
    return Grid(heads, rows, (1, 2, 3), (5, 4, 0))


def _beside(each: AssemblyView) -> Grid:
    rows = tuple((b.name, b.value, b.distance, b.note) for b in each.beside)
    heads = ("beside it", f"{each.symbol}, {each.unit}".rstrip(", "), "distance", "note")
    return Grid(heads, rows, (1, 2), (3, 0))
