"""Pure functions on numpy arrays give what they give on floats, and what they define."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.solve import network
from envcheck.solve.lights import in_series
from envcheck.solve.methods.air_voids import void_correction
from envcheck.solve.methods.bridges import added_by_bridge
from envcheck.solve.methods.compressed import in_proportion
from envcheck.solve.methods.en673_glazing import Gas, gas_conductance, glazing_u
from envcheck.solve.methods.fasteners import (
    fastener_area,
    fastener_correction,
    penetration_factor,
)
from envcheck.solve.methods.inverted_roof import rain_correction
from envcheck.solve.methods.iso10456_conversion import design_conductivity
from envcheck.solve.methods.iso13370_basement import (
    UnheatedBasement,
    basement_floor_u,
    basement_u,
    basement_wall_u,
    unheated_basement_u,
    wall_thickness,
)
from envcheck.solve.methods.iso13370_edge import edge_psi, edge_thickness, slab_with_edge
from envcheck.solve.methods.iso13370_suspended import SuspendedFloor, suspended_u
from envcheck.solve.methods.steel_framing import effective_resistance
from envcheck.solve.methods.surface_films import convection_by_wind, surface_resistance
from envcheck.solve.methods.tapered_pieces import Piece, drained_roof_u, tapered_triangle
from envcheck.solve.methods.weighted import bre_weight, weighted
from envcheck.solve.methods.zone import zone_u, zone_width
from tests.solve.test_invariants import few

AIR = Gas(1.232, 1.761e-5, 0.02496, 1008.0)
WEDGE = Piece("triangle_thinnest_apex", 2.0, 3.0)
FUNCTIONS: list[tuple[Callable[..., object], int]] = [
    (network.series, 3),
    (lambda a, b, c: network.parallel([0.25, 0.75], [a + c, b]), 3),
    (network.plane_wall, 2),
    (lambda p, a, b: weighted(p / 6.0, a, b), 3),
    (effective_resistance, 2),
    (added_by_bridge, 3),
    (penetration_factor, 2),
    (fastener_area, 1),
    (fastener_correction, 7),
    (in_proportion, 3),
    (void_correction, 3),
    (rain_correction, 4),
    (design_conductivity, 5),
    (in_series, 3),
    (bre_weight, 4),
    (surface_resistance, 3),
    (convection_by_wind, 1),
    (zone_width, 2),
    (zone_u, 4),
    (wall_thickness, 4),
    (basement_wall_u, 4),
    (basement_floor_u, 4),
    (basement_u, 5),
    (lambda *given: unheated_basement_u(UnheatedBasement(*given)), 9),
    (edge_thickness, 3),
    (edge_psi, 4),
    (slab_with_edge, 3),
    (lambda *given: suspended_u(SuspendedFloor(*given)), 9),
    (lambda r0, r1, more: tapered_triangle(r0, r1, r1 + more), 3),
    (lambda r0, r1, more: drained_roof_u(r0, [Piece("rectangle", more, r1), WEDGE]), 3),
    (lambda gap, by: gas_conductance(AIR, gap / 100.0, by), 2),
    (lambda a, b: glazing_u([0.004] * 3, [a / 100.0, b / 100.0], [AIR] * 2, [(0.8, 0.8)] * 2), 2),
]


@pytest.mark.parametrize(("function", "arguments"), FUNCTIONS)
@few
@given(data=st.data())
def test_arrays_give_what_floats_give(
    function: Callable[..., object], arguments: int, data: st.DataObject
) -> None:
    # One argument along each of two axes, so that they broadcast against each other.
    numbers = st.lists(st.floats(0.1, 5.0), min_size=2, max_size=2)
    given_ = [np.array(data.draw(numbers)) for _ in range(arguments)]
    shaped = [array.reshape(2, 1) if i % 2 else array for i, array in enumerate(given_)]
    found = np.asarray(function(*shaped))
    assert found.shape == ((2, 2) if arguments > 1 else (2,))
    for index in np.ndindex(*found.shape):
        picked = [float(array[index[0] if i % 2 else index[-1]]) for i, array in enumerate(given_)]
        assert found[index] == pytest.approx(function(*picked), rel=1e-12)


@few
@given(st.lists(st.floats(0.01, 1.0), min_size=1, max_size=5), st.data())
def test_series_and_parallel_by_definition(raw: list[float], data: st.DataObject) -> None:
    values = data.draw(st.lists(st.floats(0.01, 20.0), min_size=len(raw), max_size=len(raw)))
    shares = [one / sum(raw) for one in raw]
    assert network.series(*values) == pytest.approx(sum(values))
    beside = network.parallel(shares, values)
    assert 1 / beside == pytest.approx(sum(f / r for f, r in zip(shares, values, strict=True)))
    assert min(values) * (1 - 1e-12) <= beside <= max(values) * (1 + 1e-12)
    assert beside <= sum(f * r for f, r in zip(shares, values, strict=True)) * (1 + 1e-12)
