"""Rated products and windows from their parts."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.project import Rated, Window
from envcheck.model.ruleset import Conventions
from envcheck.solve.methods.iso10077_window import solve_window, window_geometry, window_u
from envcheck.solve.methods.rated import solve_rated
from envcheck.solve.registry import NotDecided
from tests.changed import changed
from tests.solve.samples import assembly, assert_recomputes, setting

RATED = Rated(2.0, 0.4, 0.5, "whole_product", "label", "a rating standard", "label.txt")
WINDOW = Window(1.2, 1.5, 0.1, 1.1, 1.4, 0.06, ("glass: data sheet",))


def test_whole_product_decides_as_stated() -> None:
    found = solve_rated(assembly(kind="rated", rated=RATED), setting(), Conventions())
    assert found.value == 2.0
    assert found.missing == ()
    assert "a rating standard" in found.steps[0].source


def test_centre_of_glass_never_decides_but_is_shown() -> None:
    rated = changed(RATED, basis="centre_of_glass")
    found = solve_rated(assembly(kind="rated", rated=rated), setting(), Conventions())
    assert found.value is None
    assert "only the centre of glass is stated" in found.missing[0]
    assert found.beside[0].value == 2.0


def test_default_value_is_said() -> None:
    rated = changed(RATED, basis="default")
    found = solve_rated(assembly(kind="rated", rated=rated), setting(), Conventions())
    assert found.value == 2.0
    assert "default" in found.assumptions[0]


def test_no_u_factor_is_missing() -> None:
    rated = changed(RATED, u_factor=None)
    with pytest.raises(NotDecided, match="whole product"):
        solve_rated(assembly(kind="rated", rated=rated), setting(), Conventions())


def test_window_by_hand() -> None:
    # Hand sum: 1.00 x 1.30 of glass, 0.50 of frame, 4.60 m of edge:
    # (1.30 x 1.1 + 0.50 x 1.4 + 4.60 x 0.06) / 1.80 = 1.3367.
    assert window_geometry(1.2, 1.5, 0.1) == pytest.approx((1.3, 0.5, 4.6))
    found = solve_window(assembly(kind="window", window=WINDOW), setting(), Conventions())
    assert found.value == pytest.approx(1.3367, abs=5e-5)
    assert_recomputes(found.steps)
    assert "data sheet" in found.steps[-1].source


def test_frame_without_glass_is_refused() -> None:
    window = changed(WINDOW, frame_width=0.6)
    with pytest.raises(NotDecided, match="leaves glass"):
        solve_window(assembly(kind="window", window=window), setting(), Conventions())


@given(st.floats(0.1, 6.0), st.floats(0.1, 6.0), st.floats(0.01, 0.2))
def test_without_an_edge_the_window_lies_between_glass_and_frame(
    glass: float, frame: float, width: float
) -> None:
    parts = window_geometry(1.2, 1.5, width)
    value = window_u(parts.area_glass, glass, parts.area_frame, frame, parts.edge_length, 0.0)
    assert min(glass, frame) - 1e-9 <= value <= max(glass, frame) + 1e-9
