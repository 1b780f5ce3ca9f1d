"""The general triangle and drained roofs against numerical means of 1/R over the area."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.layers import TaperedLayer, TaperedPiece
from envcheck.model.solved import Step
from envcheck.solve.methods.tapered import tapered_triangle_thickest_apex
from envcheck.solve.methods.tapered_pieces import (
    Piece,
    drained_roof_u,
    piece_u,
    pieces_way,
    tapered_triangle,
)
from tests.solve.samples import assert_recomputes, material

SIDE = 800
PIR = material("PIR", 0.023, "insulation")


def mean_over_triangle(r0: float, r1: float, r2: float) -> float:
    """Mean of 1/R where R is linear with R0, R0 + R1, R0 + R2 at the corners: midpoint rule."""
    u, v = np.meshgrid((np.arange(SIDE) + 0.5) / SIDE, (np.arange(SIDE) + 0.5) / SIDE)
    second, third = u * (1 - v), u * v  # the square folded onto the triangle, density u
    return float(np.sum(u / (r0 + r1 * second + r2 * third)) / np.sum(u))


@given(r0=st.floats(0.2, 3.0), r1=st.floats(0.3, 3.0), more=st.floats(0.3, 5.0))
def test_general_triangle_is_the_mean_of_u(r0: float, r1: float, more: float) -> None:
    expected = mean_over_triangle(r0, r1, r1 + more)
    assert tapered_triangle(r0, r1, r1 + more) == pytest.approx(expected, rel=2e-5)


def test_general_triangle_becomes_the_special_one() -> None:
    # Two corners at the least thickness: thickest at the apex.
    special = tapered_triangle_thickest_apex(0.5, 4.0)
    assert tapered_triangle(0.5, 1e-4, 4.0) == pytest.approx(special, rel=1e-3)


def test_drained_roof_by_numbers() -> None:
    # 12 x 8 m falling to a drain in the middle: four triangles, thinnest at their common apex.
    width, depth, r0, rise = 12.0, 8.0, 0.6, 5.0
    x, y = np.meshgrid((np.arange(SIDE) + 0.5) / SIDE - 0.5, (np.arange(SIDE) + 0.5) / SIDE - 0.5)
    expected = float(np.mean(1 / (r0 + rise * 2 * np.maximum(np.abs(x), np.abs(y)))))
    pieces = [Piece("triangle_thinnest_apex", width * depth / 4, rise)] * 4
    assert drained_roof_u(r0, pieces) == pytest.approx(expected, rel=1e-4)


SHAPES = ("rectangle", "triangle_thickest_apex", "triangle_thinnest_apex", "triangle")


def drained(*pieces: TaperedPiece) -> TaperedLayer:
    least, greatest = min(p.least for p in pieces), max(p.greatest for p in pieces)
    return TaperedLayer("tapered", "falls", 1, PIR, least, greatest, "rectangle", None, pieces)


def test_worksheet_recomputes() -> None:
    pieces = [
        TaperedPiece(shape, 3.0 + n, 0.06 + n / 100, 0.2, 0.13 if shape == "triangle" else None)
        for n, shape in enumerate(SHAPES)
    ]
    level = TaperedPiece("rectangle", 2.0, 0.06, 0.06)
    way = pieces_way(drained(*pieces, level), 0.5)
    rest = Step("R_rest", "rest", "", (), 0.5, "resistance")
    closing = Step("U", "roof", way.expression, way.operands, way.value, "u_factor")
    assert_recomputes((rest, *way.before, closing))
    # By the formulas of single pieces, each over its own least thickness.
    k = PIR.conductivity
    single = [
        3.0 * piece_u(0.5, Piece("rectangle", 1.0, 0.14 / k)),
        4.0 * piece_u(0.5 + 0.01 / k, Piece(SHAPES[1], 1.0, 0.13 / k)),
        5.0 * piece_u(0.5 + 0.02 / k, Piece(SHAPES[2], 1.0, 0.12 / k)),
        6.0 * piece_u(0.5 + 0.03 / k, Piece("triangle", 1.0, 0.04 / k, 0.11 / k)),
        2.0 / 0.5,
    ]
    assert way.value == pytest.approx(sum(single) / 20.0)


def test_pieces_of_one_least_thickness() -> None:
    # .549306, .735939, .362673 (R1 4) and .46008: numerical integrals over the shapes.
    same = [Piece(shape, 1.0, 4.0) for shape in SHAPES[:3]] + [Piece("triangle", 1.0, 2.0, 4.0)]
    mean = (0.549306 + 0.735939 + 0.362673 + 0.46008) / 4
    assert drained_roof_u(0.5, same) == pytest.approx(mean, abs=1e-4)
