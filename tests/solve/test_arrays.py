"""Pure functions on numpy arrays give what they give on floats, and what they define."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.solve import network
from envcheck.solve.methods.bridges import added_by_bridge
from envcheck.solve.methods.compressed import in_proportion
from envcheck.solve.methods.fasteners import (
    fastener_area,
    fastener_correction,
    penetration_factor,
)
from envcheck.solve.methods.steel_framing import effective_resistance
from envcheck.solve.methods.weighted import weighted
from tests.solve.test_invariants import few

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
