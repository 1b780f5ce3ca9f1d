"""Tapered layers: exact means of U over the three basic shapes of ISO 6946.

R0 is the resistance of everything else, films and the layer's least thickness included; R1 is
that of the greatest thickness beyond the least. Assumption: slope of at most 5 %.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import NamedTuple

from envcheck.model.layers import TaperedLayer, TaperedPiece
from envcheck.model.solved import Block, Operand, Step
from envcheck.solve.cells import homogeneous, material_cell
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.registry import Context, Method

SOURCE = "ISO 6946:2017, annex E"


def tapered_rectangle(r0: float, r1: float) -> float:
    """U of a rectangle that rises from one side: U = ln(1 + R1/R0) / R1.

    r0, r1: R0 and R1, m2 K/W, both above 0, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E (2007: annex C): the mean of 1/R over the area.
    """
    return ln_of_one_plus(r1 / r0) / r1


def tapered_triangle_thickest_apex(r0: float, r1: float) -> float:
    """U of a triangle thickest at its apex: U = 2/R1 ((1 + R0/R1) ln(1 + R1/R0) - 1).

    r0, r1: R0 and R1, m2 K/W, both above 0, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E.
    """
    return 2.0 / r1 * ((1.0 + r0 / r1) * ln_of_one_plus(r1 / r0) - 1.0)


def tapered_triangle_thinnest_apex(r0: float, r1: float) -> float:
    """U of a triangle thinnest at its apex: U = 2/R1 (1 - R0/R1 ln(1 + R1/R0)).

    r0, r1: R0 and R1, m2 K/W, both above 0, any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E.
    """
    return 2.0 / r1 * (1.0 - r0 / r1 * ln_of_one_plus(r1 / r0))


class Shape(NamedTuple):
    """A basic shape of a tapered area."""

    u_factor: Callable[[float, float], float]
    expression: str
    """The same for the worksheet."""
    mean: float
    """Where the mean thickness lies between the least (0) and the greatest (1)."""


SHAPES = {
    "rectangle": Shape(tapered_rectangle, "ln(1 + {R_taper} / {R_rest}) / {R_taper}", 1 / 2),
    "triangle_thickest_apex": Shape(
        tapered_triangle_thickest_apex,
        "2 / {R_taper} * ((1 + {R_rest} / {R_taper}) * ln(1 + {R_taper} / {R_rest}) - 1)",
        1 / 3,
    ),
    "triangle_thinnest_apex": Shape(
        tapered_triangle_thinnest_apex,
        "2 / {R_taper} * (1 - {R_rest} / {R_taper} * ln(1 + {R_taper} / {R_rest}))",
        2 / 3,
    ),
}


class Way(NamedTuple):
    """A way of counting a tapered layer and what it gives."""

    beside: str
    """Name beside the value that decides."""
    words: str
    expression: str
    value: float
    operands: tuple[Operand, ...] = ()
    before: tuple[Step, ...] = ()
    """Steps that lead to the operands."""


def mean_thickness(layer: TaperedLayer) -> float:
    """Mean thickness by volume, m: 1/2, 1/3 or 2/3 of the way from least to greatest.

    Of pieces: the mean of theirs by area.
    """
    if layer.pieces:
        volume = sum(piece.area * piece_mean(piece) for piece in layer.pieces)
        return volume / sum(piece.area for piece in layer.pieces)
    return layer.least + SHAPES[layer.shape].mean * (layer.greatest - layer.least)


def piece_mean(piece: TaperedPiece) -> float:
    """Mean thickness of a piece, m; a general triangle has that of its three corners."""
    if piece.middle is not None:
        return (piece.least + piece.middle + piece.greatest) / 3.0
    return piece.least + SHAPES[piece.shape].mean * (piece.greatest - piece.least)


def draw_tapered(layer: TaperedLayer, context: Context) -> Block:
    """Draw the layer at its least thickness; :func:`envcheck.solve.taper.taper` counts the rest."""
    title = f"{layer.title}, least thickness"
    cell = material_cell(context.symbol, title, layer.least, layer.material)
    return homogeneous(cell, layer.least)


METHODS = (
    Method(
        name="tapered",
        title="Tapered layer",
        formula="U = ln(1 + R1/R0) / R1 for a rectangle, and its like for two triangles",
        source=SOURCE,
        valid="slope of at most 5 %; one tapered layer in an assembly",
        draws=(("tapered", draw_tapered),),
    ),
)
