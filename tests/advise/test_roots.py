"""False position against closed forms."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.advise.roots import root


@pytest.mark.parametrize(
    ("function", "low", "high", "exact"),
    [
        (lambda x: x * x - 2.0, 0.0, 2.0, math.sqrt(2.0)),
        (lambda x: math.cos(x) - x, 0.0, 1.0, 0.7390851332151607),  # Dottie number
        (lambda x: math.exp(-x) - 1e-6, 0.0, 100.0, 6.0 * math.log(10.0)),
        (lambda x: 3.0 - x, 0.0, 10.0, 3.0),
        (lambda x: 2.0 - x**3, 5.0, 0.0, 2.0 ** (1.0 / 3.0)),
    ],
)
def test_known_roots(function: object, low: float, high: float, exact: float) -> None:
    assert callable(function)
    assert root(function, low, high, 1.0) == pytest.approx(exact, rel=1e-9)


@given(st.floats(0.01, 10.0), st.floats(0.001, 0.1), st.floats(0.1, 5.0))
def test_a_series_wall_is_solved_as_by_hand(rest: float, k: float, extra: float) -> None:
    """R_rest + d/k = target gives d = k (target - R_rest): a straight line in d."""
    target = rest + extra
    found = root(lambda d: target - (rest + d / k), 0.0, 10.0, 1e-3)
    assert found == pytest.approx(k * extra, rel=1e-6)


def test_ends_of_one_sign_are_refused() -> None:
    with pytest.raises(ValueError, match="sign"):
        root(lambda x: x + 1.0, 0.0, 1.0, 1.0)


def test_an_end_may_be_the_root() -> None:
    assert root(lambda x: x, 0.0, 1.0, 1.0) == 0.0
    assert root(lambda x: x - 1.0, 0.0, 1.0, 1.0) == 1.0
