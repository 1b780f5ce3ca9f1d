"""Temperatures and flows against ISO 10211's validation cases, hand sums and balances."""

from __future__ import annotations

import math

import numpy as np
import pytest

from envcheck.solve.field.bound import bound
from envcheck.solve.field.outline_bound import bound_outline
from envcheck.solve.field.surfaces import (
    coldest_inside,
    coldest_of_section,
    flow_through,
    flux,
    section_with_still_air,
    temperature_at,
    temperature_in_section,
    with_still_air,
)
from envcheck.solve.surface import STILL, plain_factor
from tests.published.field_adapters import AIR, column
from tests.solve.field.outlines import insulated_corner, of_section
from tests.solve.field.sections import WOOD, c_stud, section

# The figures of ISO 10211, cases 1 and 2, stand in `tests/published`.


def by_series(x: float, y: float) -> float:
    """Temperature of a unit square, 20 at y = 0 and 0 on its three other sides."""
    return sum(
        80.0 / (n * math.pi) * math.sin(n * math.pi * x) * math.sinh(n * math.pi * (1 - y))
        / math.sinh(n * math.pi)
        for n in range(1, 200, 2)
    )  # fmt: skip


def test_square_with_given_surface_temperatures_against_its_series() -> None:
    """Fourier's series of the square of ISO 10211, case 1, between the printed places as well."""
    for x in (0.06, 0.2, 0.33, 0.5):
        for y in (0.1, 0.3, 0.47, 0.8):
            at = 20.0 * temperature_at(column(), AIR + x, AIR + y)
            assert at == pytest.approx(by_series(x, y), abs=0.1)


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


def test_a_section_has_the_temperatures_of_its_outline() -> None:
    of = c_stud(outer=True)._replace(periodic=False)
    one, other = bound(of, 3e-4), bound_outline(of_section(of), 3e-4)
    for x in (0.0, 0.1, 0.183, 0.2, 0.3, 0.406):
        for y in (0.0, 0.02, 0.05, 0.1, sum(of.depths)):
            at = temperature_in_section(one, x, y)
            assert at == pytest.approx(temperature_at(other, x, 0.1 + y), abs=2e-3)
    with pytest.raises(ValueError, match="nothing solid"):
        temperature_in_section(one, 0.5, 0.1)


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
    row = len(drawn.y) - 1
    beside = drawn.along[row, found.cells.k[row] > 0]
    assert beside == pytest.approx(np.full(len(beside), -u), rel=0.03)
    assert np.all(drawn.across[found.cells.k == 0] == 0)


def test_places_without_a_value_are_refused() -> None:
    found = bound_outline(insulated_corner(), 1e-2)
    with pytest.raises(ValueError, match="nothing solid at x = 1"):
        temperature_at(found, 1.2, 1.2)
    with pytest.raises(ValueError, match="neither upright nor level"):
        flow_through(found, x=(0.0, 1.0), y=(0.0, 1.0))
    with pytest.raises(ValueError, match="no line of the drawing"):
        flow_through(found, x=(0.0123, 0.0123), y=(0.0, 1.0))
