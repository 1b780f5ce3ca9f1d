"""A drawn section: rectangles of materials and of air, later ones on top."""

from __future__ import annotations

from collections.abc import Sequence

from envcheck.model.project import SectionLayer, SectionPiece
from envcheck.model.rectangles import cut
from envcheck.model.solved import Block, Resistor
from envcheck.solve.cells import material_cell, part_of
from envcheck.solve.methods.air_space import air_space_cell
from envcheck.solve.registry import Context, Method
from envcheck.solve.section import sizes


def draw_section(layer: SectionLayer, context: Context) -> Block:
    """Cut the drawing at every edge of its pieces.

    A void conducts like an air space over the whole depth of its piece.
    """
    drawn = cut([piece[2:6] for piece in layer.pieces], layer.repeat, layer.thickness)
    depths = sizes(drawn.rows)
    rows = []
    for number, (depth, seen) in enumerate(zip(depths, drawn.top, strict=True), 1):
        alike = {index: _first_alike(layer.pieces, index) for index in seen}
        cells = {first: _cell(layer, first, depth, number, context) for first in alike.values()}
        rows.append(tuple(cells[alike[index]] for index in seen))
    return Block(
        context.symbol,
        layer.title,
        tuple(sizes(drawn.columns)),
        tuple(depths),
        tuple(rows),
        f"{layer.orientation}@{layer.repeat:.6f}",
        True,
    )


def _first_alike(pieces: Sequence[SectionPiece], index: int) -> int:
    """Number of the first piece of the same name and stuff: they are one in the worksheet."""
    piece = pieces[index]
    return next(
        number
        for number, other in enumerate(pieces)
        if (other.title, other.material, _void(other))
        == (piece.title, piece.material, _void(piece))
    )


def _void(piece: SectionPiece) -> object:
    return piece.air and (piece.air.emittances, piece.air.ventilation, piece.inner - piece.outer)


def _cell(layer: SectionLayer, index: int, depth: float, row: int, context: Context) -> Resistor:
    """The part of a piece that lies in one row of the drawing."""
    piece, symbol = layer.pieces[index], f"{context.symbol}_piece{index + 1}"
    name = f"{symbol}_row{row}"
    if piece.material is not None:
        return material_cell(name, piece.title, depth, piece.material)
    assert piece.air is not None, "a piece is of a material or of air"
    whole = air_space_cell(symbol, piece.air, context)
    return part_of(whole, depth, piece.air.thickness, name)


def visible_areas(layer: SectionLayer) -> list[float]:
    """Area of each piece that is seen in the drawing, m2 per m perpendicular to it."""
    drawn = cut([piece[2:6] for piece in layer.pieces], layer.repeat, layer.thickness)
    widths, areas = sizes(drawn.columns), [0.0] * len(layer.pieces)
    for depth, seen in zip(sizes(drawn.rows), drawn.top, strict=True):
        for width, number in zip(widths, seen, strict=True):
            areas[number] += width * depth
    return areas


METHODS = (
    Method(
        name="drawn_section",
        title="Drawn section: rectangles of materials and air",
        formula="R = L / k of each rectangle; a void: k = d / R of an air space d deep",
        source="ISO 10211:2017, 5 and 6.1: geometrical model of rectangles, equivalent thermal "
        "conductivity of air cavities",
        valid="rectilinear drawings; voids by the rule for air spaces, as deep as their piece",
        draws=(("section", draw_section),),
    ),
)
