"""Tapered layers against numerical integrals and hand sums."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.layers import TaperedLayer, TaperedPiece
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand, Step
from envcheck.solve.methods.tapered import SHAPES, draw_tapered, mean_thickness
from envcheck.solve.registry import Decision, NotDecided
from envcheck.solve.taper import taper
from tests.changed import changed
from tests.solve.samples import INCH, R_IP, U_IP, assert_recomputes, context, material

POLYISO = material("polyiso", INCH / (5.7 * R_IP), "insulation")
PIR = material("PIR", 0.023, "insulation")


def layer(of: object, least: float, greatest: float, shape: str = "rectangle") -> TaperedLayer:
    return TaperedLayer("tapered", "insulation", 1, of, least, greatest, shape)


def at_least(resistance: float) -> Decision:
    """A decision as a wiring leaves it: U = 1/R with the layer at its least thickness."""
    operand = Operand("R", resistance, "resistance")
    total = Step("R", "sum", "", (), resistance, "resistance")
    step = Step("U", "U-factor", "1 / {R}", (operand,), 1 / resistance, "u_factor")
    return Decision(1 / resistance, steps=(total, step))


def integral(shape: str, r0: float, r1: float) -> float:
    """Mean of 1/R over the area by the midpoint rule; density of area by height over the shape."""
    x = (np.arange(50_000) + 0.5) / 50_000
    density = {
        "rectangle": np.ones_like(x),
        "triangle_thickest_apex": 2 * (1 - x),
        "triangle_thinnest_apex": 2 * x,
    }[shape]
    return float(np.mean(density / (r0 + r1 * x)))


@pytest.mark.parametrize("shape", SHAPES)
@given(r0=st.floats(0.1, 5.0), r1=st.floats(0.1, 10.0))
def test_formula_is_the_mean_of_u(shape: str, r0: float, r1: float) -> None:
    assert SHAPES[shape].u_factor(r0, r1) == pytest.approx(integral(shape, r0, r1), rel=1e-6)


@pytest.mark.parametrize("shape", SHAPES)
def test_mean_thickness_is_the_mean_of_the_shape(shape: str) -> None:
    # Volume of a wedge, of a pyramid and of their complement: 1/2, 1/3, 2/3 of the rise.
    x = (np.arange(10_000) + 0.5) / 10_000
    density = {"rectangle": 1 + 0 * x, "triangle_thickest_apex": 2 * (1 - x)}.get(shape, 2 * x)
    expected = 0.1 + 0.2 * float(np.mean(density * x))
    assert mean_thickness(layer(PIR, 0.1, 0.3, shape)) == pytest.approx(expected, rel=1e-6)


@pytest.mark.parametrize("shape", SHAPES)
def test_arrays_give_what_floats_give(shape: str) -> None:
    function: Callable[..., object] = SHAPES[shape].u_factor
    found = function(np.array([0.5, 1.0]), np.array([4.0, 2.0]))
    assert list(found) == pytest.approx([function(0.5, 4.0), function(1.0, 2.0)])


# Hand sums: U = ln(1 + R1/R0) / R1 with per inch over R0 = .78 h ft2 F/Btu.
@pytest.mark.parametrize(
    ("least", "greatest", "by_integral", "by_mean"),
    [(3, 9, 0.0313, 0.0286), (5, 8, 0.0269, 0.0264)],
)
def test_low_slope_roof(least: float, greatest: float, by_integral: float, by_mean: float) -> None:
    roof = layer(POLYISO, least * INCH, greatest * INCH)
    found = taper(at_least((0.78 + 5.7 * least) * R_IP), roof, Conventions())
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(by_integral, abs=5e-5)
    beside = {b.name: b.value / U_IP for b in found.beside}
    assert beside["mean_thickness"] == pytest.approx(by_mean, abs=5e-5)
    assert beside["least_thickness"] == pytest.approx(1 / (0.78 + 5.7 * least))
    assert_recomputes(found.steps)
    assert found.steps[-1].symbol == "U_tapered"
    assert any("5 %" in said for said in found.assumptions)


def test_porch_roof_in_si() -> None:
    # Hand sum: Rsi .10, Rse .04, slab .16/2.3, PIR 100 to 200 mm of .023: .154, mean .149.
    found = taper(at_least(0.14 + 0.16 / 2.3 + 0.1 / 0.023), layer(PIR, 0.1, 0.2), Conventions())
    assert found.value == pytest.approx(0.154, abs=5e-4)
    assert found.beside[0].value == pytest.approx(0.149, abs=5e-4)


@pytest.mark.parametrize(
    ("way", "within", "symbol"),
    [
        ("integral", None, "integral"),
        ("integral", 0.05, "integral"),
        ("integral", 0.1, "mean_thickness"),
        ("mean", None, "mean_thickness"),
        ("minimum", None, "least_thickness"),
    ],
)
def test_convention_picks_the_way(way: str, within: float | None, symbol: str) -> None:
    conventions = changed(Conventions(), tapered=way, tapered_mean_within=within)
    found = taper(at_least(5.0), layer(PIR, 0.1, 0.2), conventions)
    expected = {
        "integral": SHAPES["rectangle"].u_factor(5.0, 0.1 / 0.023),
        "mean_thickness": 1 / (5.0 + 0.05 / 0.023),
        "least_thickness": 0.2,
    }
    assert found.value == pytest.approx(expected.pop(symbol))
    assert {b.name: b.value for b in found.beside} == pytest.approx(expected)
    assert found.assumptions
    assert_recomputes(found.steps)


@pytest.mark.parametrize("shape", SHAPES)
@given(r0=st.floats(0.1, 5.0), rise=st.floats(0.001, 0.3))
def test_mean_flatters_and_minimum_is_safe(shape: str, r0: float, rise: float) -> None:
    # Jensen's inequality: 1/R is convex, so that U at the mean thickness is never above the mean U.
    found = taper(at_least(r0), layer(PIR, 0.1, 0.1 + rise, shape), Conventions())
    mean, least = (b.value for b in found.beside)
    assert found.value is not None
    assert mean <= found.value * (1 + 1e-9)
    assert found.value <= least * (1 + 1e-9)


def test_flat_layer_changes_nothing() -> None:
    decision = at_least(5.0)
    assert taper(decision, layer(PIR, 0.1, 0.1), Conventions()) is decision


def test_drawn_at_its_least_thickness() -> None:
    cell = draw_tapered(layer(PIR, 0.1, 0.2), context()).cells[0][0]
    assert cell.value == pytest.approx(0.1 / 0.023)
    assert "least thickness" in cell.title
    assert_recomputes(cell.steps)


def test_a_stated_run_that_is_too_steep_has_no_exact_value() -> None:
    steep = layer(PIR, 0.1, 0.2)._replace(run=1.9)
    with pytest.raises(NotDecided, match=r"at most 5 %.*5\.26 %"):
        taper(at_least(5.0), steep, Conventions())
    assert taper(at_least(5.0), steep, Conventions(tapered="minimum")).value == pytest.approx(0.2)
    level = taper(at_least(5.0), steep._replace(run=2.0), Conventions())
    assert level.value == taper(at_least(5.0), layer(PIR, 0.1, 0.2), Conventions()).value
    piece = TaperedPiece("rectangle", 1.0, 0.1, 0.2, None, 1.0)
    with pytest.raises(NotDecided, match="10 %"):
        taper(at_least(5.0), steep._replace(run=None, pieces=(piece,)), Conventions())


def test_pieces_by_every_way_of_counting() -> None:
    # Two halves: a wedge 100 to 200 mm (mean 150) and a level part of 200 mm; mean 175 mm.
    pieces = (
        TaperedPiece("rectangle", 5.0, 0.1, 0.2),
        TaperedPiece("rectangle", 5.0, 0.2, 0.2),
    )
    roof = layer(PIR, 0.1, 0.2)._replace(pieces=pieces)
    assert mean_thickness(roof) == pytest.approx(0.175)
    corner = TaperedPiece("triangle", 2.0, 0.10, 0.22, 0.13)  # a prism cut aslant: mean of corners
    assert mean_thickness(roof._replace(pieces=(corner,))) == pytest.approx(0.15)
    rest = 0.2 + 0.1 / 0.023
    by = {
        way: taper(at_least(rest), roof, Conventions(tapered=way))
        for way in ("integral", "mean", "minimum")
    }
    wedge = np.log(1 + 0.1 / 0.023 / rest) / (0.1 / 0.023)
    level = 1 / (rest + 0.1 / 0.023)
    assert by["integral"].value == pytest.approx((wedge + level) / 2)
    assert by["mean"].value == pytest.approx(1 / (0.2 + 0.175 / 0.023))
    assert by["minimum"].value == pytest.approx(1 / rest)
    for found in by.values():
        assert_recomputes(found.steps)
