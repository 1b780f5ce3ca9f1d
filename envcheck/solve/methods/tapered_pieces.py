"""Roofs drained by several slopes: the general triangle, and the mean over pieces by area.

A roof is cut into rectangles and triangles that each fall in one direction (ISO 6946). R0 is the
resistance of everything else, films and the least thickness of the tapered layer included.
"""

from __future__ import annotations

from collections.abc import Sequence
from typing import NamedTuple

from envcheck.model.solved import Operand, Step
from envcheck.solve.elementary import ln_of_one_plus
from envcheck.solve.methods.tapered import SHAPES, SOURCE
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
    """Greatest resistance beyond the least, above 0, m2 K/W; of ``triangle``: at the middle
    corner."""
    r2: float = 0.0
    """Of ``triangle``: at the thickest corner, m2 K/W."""


def piece_u(r0: float, piece: Piece) -> float:
    """U of one piece, W/(m2 K). r0: R0, m2 K/W."""
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
    "2 * ({R_taper} * ({R_rest} + {R_2}) * ln(1 + {R_2} / {R_rest}) - {R_2} * "
    "({R_rest} + {R_taper}) * ln(1 + {R_taper} / {R_rest})) / ({R_taper} * {R_2} * "
    "({R_2} - {R_taper}))"
)
"""The general triangle for the worksheet, R_taper being R1; the other shapes as in a taper."""


def drained_roof_steps(r0: float, pieces: Sequence[Piece]) -> tuple[Step, ...]:
    """Worksheet to ``U`` of a roof of several pieces. Floats."""
    steps: list[Step] = []
    closing: list[Operand] = []
    for number, piece in enumerate(pieces, 1):
        title = f"piece {number}, {piece.shape.replace('_', ' ')}"
        operands = [Operand("R_rest", r0, "resistance"), Operand("R_taper", piece.r1, "resistance")]
        if piece.shape == "triangle":
            operands.append(Operand("R_2", piece.r2, "resistance"))
        value = piece_u(r0, piece)
        expression = GENERAL if piece.shape == "triangle" else SHAPES[piece.shape].expression
        steps.append(
            Step(f"U_{number}", title, expression, tuple(operands), value, "u_factor", SOURCE)
        )  # fmt: skip
        closing.append(Operand(f"A_{number}", piece.area, "area"))
        closing.append(Operand(f"U_{number}", value, "u_factor"))
    numbers = range(1, len(pieces) + 1)
    flow = " + ".join(f"{{A_{n}}} * {{U_{n}}}" for n in numbers)
    area = " + ".join(f"{{A_{n}}}" for n in numbers)
    total = drained_roof_u(r0, pieces)
    title = "whole roof by area"
    steps.append(
        Step("U", title, f"({flow}) / ({area})", tuple(closing), total, "u_factor", SOURCE)
    )
    return tuple(steps)


METHODS = (
    Method(
        name="tapered_pieces",
        title="Roof drained by several slopes",
        formula="U = sum of A_i U_i / sum of A_i; U_i of rectangles and triangles, the general "
        "one: U = 2 (R1 (R0 + R2) ln(1 + R2/R0) - R2 (R0 + R1) ln(1 + R1/R0)) / "
        "(R1 R2 (R2 - R1))",
        source=SOURCE,
        valid="slopes of at most 5 %; each piece falls in one direction; not yet joined to an "
        "assembly",
    ),
)
