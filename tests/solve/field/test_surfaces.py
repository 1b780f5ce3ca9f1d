"""Temperatures and flows against ISO 10211's validation cases, hand sums and balances."""

from __future__ import annotations

import math

import numpy as np
import pytest

from envcheck.solve.field.bound import bound
from envcheck.solve.field.outline_bound import OutlineBounds, bound_outline
from envcheck.solve.field.surfaces import (
    coldest_inside,
    coldest_of_section,
    flow_through,
    flux,
    section_with_still_air,
    temperature_at,
    with_still_air,
)
from envcheck.solve.surface import STILL, plain_factor
from tests.solve.field.outlines import GAP, IN, OUT, insulated_corner, of_section, outline
from tests.solve.field.sections import WOOD, section

# ------------------------------------------------------------------ ISO 10211:2017, annex C
# Case 1: half a square column, 20 degrees on top, 0 elsewhere, given at the surfaces; 28 places on
# a grid of an eighth of the side, the symmetry line last. Figures from memory; the series of
# Fourier in `by_series` gives them all. Criterion of the standard: 0.1 K. The heat flow has no
# value, as two temperatures meet in a corner without a film: a test of temperatures alone, on an
# even grid, as refining would go to that corner for ever.
CASE_1 = [
    [9.7, 13.4, 14.7, 15.1],
    [5.3, 8.6, 10.3, 10.8],
    [3.2, 5.6, 7.0, 7.5],
    [2.0, 3.6, 4.7, 5.0],
    [1.3, 2.3, 3.0, 3.2],
    [0.7, 1.4, 1.8, 1.9],
    [0.3, 0.6, 0.8, 0.9],
]


def by_series(x: float, y: float) -> float:
    """Temperature of a unit square, 20 at y = 0 and 0 on its three other sides."""
    return sum(
        80.0 / (n * math.pi) * math.sin(n * math.pi * x) * math.sinh(n * math.pi * (1 - y))
        / math.sinh(n * math.pi)
        for n in range(1, 200, 2)
    )  # fmt: skip


def test_iso_10211_case_1() -> None:
    cells = [[GAP, *[IN] * 16], *[[OUT, *[1.0] * 16] for _ in range(32)], [GAP, *[OUT] * 16]]
    sizes = [0.1, *[1 / 32] * 16], [0.1, *[1 / 32] * 32, 0.1]
    found = bound_outline(outline(*sizes, cells, outside=1e-9, inside=1e-9), most_rounds=1)
    for row, figures in enumerate(CASE_1, 1):
        for place, printed in enumerate(figures, 1):
            at = 20.0 * temperature_at(found, 0.1 + place / 8, 0.1 + row / 8)
            assert at == pytest.approx(printed, abs=0.1)
            assert at == pytest.approx(by_series(place / 8, row / 8), abs=0.05)


# Case 2: concrete, wood, insulation and aluminium; nine temperatures and the flow, criteria 0.1 K
# and 0.1 W/m; figures seen, position of the aluminium from memory. Places from the outer face, mm.
CASE_2 = {
    "A": (0, 0, 7.1),
    "B": (500, 0, 0.8),
    "C": (0, 6, 7.9),
    "D": (15, 6, 6.3),
    "E": (500, 6, 0.8),
    "F": (0, 11, 16.4),
    "G": (15, 11, 16.3),
    "H": (0, 47.5, 16.8),
    "I": (500, 47.5, 18.3),
}


@pytest.fixture(scope="module")
def case_2() -> OutlineBounds:
    wool, metal = 0.029, 230.0
    return bound_outline(
        of_section(
            section(
                [1.5, 13.5, 485],
                [6, 5, 1.5, 33.5, 1.5],
                [[1.15] * 3, [0.12, 0.12, wool], [metal, metal, wool], [metal, wool, wool],
                 [metal] * 3],
                0.06,
                0.11,
                periodic=False,
            )
        )
    )  # fmt: skip


@pytest.mark.parametrize("name", CASE_2)
def test_iso_10211_case_2_temperatures(case_2: OutlineBounds, name: str) -> None:
    x, y, printed = CASE_2[name]
    found = 20.0 * temperature_at(case_2, x / 1e3, 0.1 + y / 1e3)
    assert found == pytest.approx(printed, abs=0.1)


def test_iso_10211_case_2_flow(case_2: OutlineBounds) -> None:
    assert 20.0 * case_2.low == pytest.approx(9.5, abs=0.1)
    assert 20.0 * case_2.high == pytest.approx(9.5, abs=0.1)


# --------------------------------------------------------------------------- f_Rsi and flows


def test_plain_wall_has_the_factor_of_its_definition() -> None:
    """ISO 13788: f_Rsi = 1 - U Rsi of a plain wall, U with the same Rsi of .25.

    R without the inside film 3.2033: .92761, computed by hand.
    """
    wall = of_section(section([1000], [100], [[0.1 / (3.2033 - 0.04)]]))
    found = coldest_inside(bound_outline(with_still_air(wall, STILL)))
    assert found.factor == pytest.approx(plain_factor(3.2033), abs=1e-6)
    assert found.factor == pytest.approx(0.92761, abs=1e-5)


def test_coldest_place_of_a_corner_is_its_inner_edge() -> None:
    found = bound_outline(with_still_air(insulated_corner(), STILL), 3e-4)
    spot = coldest_inside(found)
    assert (spot.x, spot.y) == pytest.approx((0.6, 0.6))
    assert spot.factor == pytest.approx(temperature_at(found, 0.6, 0.6))
    assert spot.factor < temperature_at(found, 1.5, 0.6) - 0.01
    slab = coldest_inside(bound_outline(with_still_air(insulated_corner(slab=True), STILL), 3e-4))
    assert slab.factor < spot.factor
    with_less = coldest_inside(bound_outline(insulated_corner(), 3e-4))
    assert with_less.factor > spot.factor  # .13 instead of .25 is no answer to the question


def test_coldest_place_of_a_stud_wall_is_before_the_stud() -> None:
    of = section_with_still_air(WOOD._replace(periodic=False), STILL)
    spot = coldest_of_section(bound(of))
    assert spot.x == pytest.approx(0.203, abs=0.02)
    same = coldest_inside(bound_outline(of_section(of)))
    assert spot.factor == pytest.approx(same.factor, abs=1e-3)


def test_what_enters_leaves_and_what_is_drawn_adds_up() -> None:
    found = bound_outline(insulated_corner(slab=True), 3e-4)
    level = flow_through(found, x=(0.6, 1.6), y=(0.6, 0.6))
    upright = flow_through(found, x=(0.6, 0.6), y=(0.6, 2.3))
    assert -level - upright == pytest.approx(found.low, rel=2e-3)
    outer = flow_through(found, x=(0.3, 1.6), y=(0.3, 0.3))
    outer += flow_through(found, x=(0.3, 0.3), y=(0.3, 2.3))
    assert outer == pytest.approx(level + upright, rel=1e-9)
    half = flow_through(found, x=(0.6, 1.1), y=(0.6, 0.6))
    assert half + flow_through(found, x=(1.1, 1.6), y=(0.6, 0.6)) == pytest.approx(level)


def test_flux_far_from_the_corner_is_that_of_the_wall() -> None:
    found = bound_outline(insulated_corner(), 3e-4)
    drawn = flux(found)
    u = 1.0 / (0.04 + 0.1 / 0.035 + 0.2 / 0.8 + 0.13)
    column = len(drawn.x) - 1
    through = drawn.across[found.cells.k[:, column] > 0, column]
    assert through == pytest.approx(np.full(len(through), -u), rel=0.03)
    assert np.all(drawn.across[found.cells.k == 0] == 0)


def test_places_without_a_value_are_refused() -> None:
    found = bound_outline(insulated_corner(), 1e-2)
    with pytest.raises(ValueError, match="nothing solid at x = 1"):
        temperature_at(found, 1.2, 1.2)
    with pytest.raises(ValueError, match="neither upright nor level"):
        flow_through(found, x=(0.0, 1.0), y=(0.0, 1.0))
    with pytest.raises(ValueError, match="no line of the drawing"):
        flow_through(found, x=(0.0123, 0.0123), y=(0.0, 1.0))
