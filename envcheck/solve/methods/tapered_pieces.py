"""Roofs drained by several slopes: the general triangle, and the mean over pieces by area.

A roof is cut into rectangles and triangles that each fall in one direction (ISO 6946). R0 is the
resistance of everything else, films and the least thickness of the tapered layer included.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.model.layers import TaperedLayer, TaperedPiece
from envcheck.model.solved import Operand, Step
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.methods.tapered import SHAPES, SOURCE, Way
from envcheck.solve.registry import Method


def tapered_triangle(r0: float, r1: float, r2: float) -> float:
    """U of a triangle with another thickness at each corner.

    U = 2 (R1 (R0 + R2) ln(1 + R2/R0) - R2 (R0 + R1) ln(1 + R1/R0)) / (R1 R2 (R2 - R1)).

    r0: R0. r1: R1 at the corner of middle thickness, r2: R2 at the thickest, both beyond the
    thinnest, m2 K/W; 0 < r1 < r2, not near to each other (there the two special triangles serve),
    any shape. Returns W/(m2 K). Source: ISO 6946:2017, annex E: the mean of 1/R over the area.
    """
    middle = r2 * (r0 + r1) * ln_of_one_plus(r1 / r0)
    thickest = r1 * (r0 + r2) * ln_of_one_plus(r2 / r0)
    return 2.0 * (thickest - middle) / (r1 * r2 * (r2 - r1))


class Piece(NamedTuple):
    """A part of a drained roof."""

    shape: str
    """``rectangle``, ``triangle_thickest_apex``, ``triangle_thinnest_apex`` or ``triangle``."""
    area: float
    """m2 in plan"""
    r1: float
    """Greatest resistance beyond the least, m2 K/W; of ``triangle``: at the middle
    corner."""
    r2: float = 0.0
    """Of ``triangle``: at the thickest corner, m2 K/W."""


def piece_u(r0: float, piece: Piece) -> float:
    """U of one piece, W/(m2 K). r0: R0, m2 K/W. A level piece has an ``r1`` of 0."""
    if isinstance(piece.r1, float) and piece.r1 == 0.0:
        return 1.0 / r0
    if piece.shape == "triangle":
        return tapered_triangle(r0, piece.r1, piece.r2)
    return SHAPES[piece.shape].u_factor(r0, piece.r1)


def drained_roof_u(r0: float, pieces: Sequence[Piece]) -> float:
    """U of a roof of several pieces: U = sum of A_i U_i / sum of A_i.

    r0: R0 of all pieces, m2 K/W. Numbers of the pieces: any shape. Returns W/(m2 K).
    Source: ISO 6946:2017, annex E.
    """
    flow = sum(piece.area * piece_u(r0, piece) for piece in pieces)
    return flow / sum(piece.area for piece in pieces)


GENERAL = (
    "2 * ({R_taper} * ({R_rest} + {R_top}) * ln(1 + {R_top} / {R_rest}) - {R_top} * "
    "({R_rest} + {R_taper}) * ln(1 + {R_taper} / {R_rest})) / ({R_taper} * {R_top} * "
    "({R_top} - {R_taper}))"
)
"""The general triangle for the worksheet, R_taper being R1 and R_top R2."""


def pieces_way(layer: TaperedLayer, rest: float) -> Way:
    """A layer in pieces counted exactly, with the steps to each piece. rest: R0, m2 K/W."""
    steps: list[Step] = []
    closing: list[Operand] = []
    total = 0.0
    for number, piece in enumerate(layer.pieces, 1):
        made = _piece_steps(layer, rest, piece, str(number))
        steps += made
        total += piece.area * made[-1].value
        closing.append(Operand(f"A_{number}", piece.area, "area"))
        closing.append(Operand(f"U_{number}", made[-1].value, "u_factor"))
    numbers = range(1, len(layer.pieces) + 1)
    flow = " + ".join(f"{{A_{n}}} * {{U_{n}}}" for n in numbers)
    area = " + ".join(f"{{A_{n}}}" for n in numbers)
    value = total / sum(piece.area for piece in layer.pieces)
    words = "by the areas of equal thickness, piece by piece"
    return Way("integral", words, f"({flow}) / ({area})", value, tuple(closing), tuple(steps))


def _piece_steps(layer: TaperedLayer, rest: float, piece: TaperedPiece, number: str) -> list[Step]:
    """Steps to the U of one piece, the last of them."""
    title = f"piece {number}, {piece.shape.replace('_', ' ')}"
    steps: list[Step] = []
    base = Operand("R_rest", rest, "resistance")
    if piece.least > layer.least:
        step = _rise(f"R_rest{number}", f"{title}: at its least thickness", layer, layer.least,
                     piece.least, base)  # fmt: skip
        steps.append(step)
        base = Operand(step.symbol, step.value, "resistance")
    rises = [("R_taper", piece.greatest)]
    if piece.middle is not None:
        rises = [("R_taper", piece.middle), ("R_top", piece.greatest)]
    names = {"R_rest": base.name}
    operands = [base]
    for symbol, thickness in rises if piece.greatest > piece.least else ():
        words = f"{title}: {thickness * 1000:.4g} mm beyond {piece.least * 1000:.4g} mm"
        names[symbol] = f"{symbol}{number}"
        steps.append(_rise(names[symbol], words, layer, piece.least, thickness))
        operands.append(Operand(names[symbol], steps[-1].value, "resistance"))
    expression = "1 / {R_rest}"
    if len(operands) > 1:
        general = piece.middle is not None
        expression = GENERAL if general else SHAPES[piece.shape].expression
    for symbol, name in names.items():
        expression = expression.replace(f"{{{symbol}}}", f"{{{name}}}")
    r1, r2 = (*(operand.value for operand in operands[1:]), 0.0, 0.0)[:2]
    value = piece_u(base.value, Piece(piece.shape, piece.area, r1, r2))
    steps.append(Step(f"U_{number}", title, expression, tuple(operands), value, "u_factor", SOURCE))
    return steps


def _rise(
    symbol: str,
    title: str,
    layer: TaperedLayer,
    low: float,
    high: float,
    base: Operand | None = None,
) -> Step:
    """A thickness beyond another as a resistance, added to a base where there is one."""
    k = layer.material.conductivity
    operands = [
        Operand("d_high", high, "length"),
        Operand("d_low", low, "length"),
        Operand("k", k, "conductivity"),
    ]
    expression, value = "({d_high} - {d_low}) / {k}", (high - low) / k
    if base is not None:
        operands.insert(0, base)
        expression, value = f"{{{base.name}}} + {expression}", base.value + value
    return Step(symbol, title, expression, tuple(operands), value, "resistance")


METHODS = (
    Method(
        name="tapered_pieces",
        title="Roof drained by several slopes",
        formula="U = sum of A_i U_i / sum of A_i; U_i of rectangles and triangles, the general "
        "one: U = 2 (R1 (R0 + R2) ln(1 + R2/R0) - R2 (R0 + R1) ln(1 + R1/R0)) / "
        "(R1 R2 (R2 - R1))",
        source=SOURCE,
        valid="slopes of at most 5 %; each piece falls in one direction",
    ),
)
