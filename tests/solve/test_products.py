"""Rated products and windows from their parts."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.project import Fill, Member, Rated, Window
from envcheck.model.ruleset import Conventions
from envcheck.model.windows import Between, FramePart, Gas, Glazing, Infill, Joint, Light, Space
from envcheck.solve.lights import in_series
from envcheck.solve.methods.en673_glazing import solve_glazing
from envcheck.solve.methods.iso10077_window import solve_window, window_geometry, window_u
from envcheck.solve.methods.iso12631_curtain_wall import solve_curtain_wall
from envcheck.solve.methods.rated import solve_rated
from envcheck.solve.registry import NotDecided
from tests.changed import changed
from tests.solve.samples import (
    WOOD,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
    setting,
)

RATED = Rated(2.0, 0.4, 0.5, "whole_product", "label", "a rating standard", "label.txt")
FRAME = (FramePart("the frame", None, 1.4),)


def light(infill: Infill, width: float, height: float, psi: float, count: int = 1) -> Light:
    size = width, height, width * height, 2 * (width + height)
    return Light("glass", 1, bool(infill.layers), *size, count, psi, infill)


GLASS = light(Infill(1.1), 1.0, 1.3, 0.06)
WINDOW = Window(1.2, 1.5, 0.1, (GLASS,), FRAME, sources=("glass: data sheet",))
AIR = Gas(1.232, 1.761e-5, 0.02496, 1008.0)
ARGON = Gas(1.699, 2.164e-5, 0.01684, 519.0)
DOUBLE = Glazing((0.004, 0.004), (Space(0.016, ARGON, AIR, 0.9, (0.837, 0.0366), "argon", "x"),))
STILL = Space(0.05, AIR, AIR, 1.0, (0.837, 0.837), "air", "x")


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


def test_glazing_alone_decides_nothing_and_recomputes() -> None:
    found = solve_glazing(assembly(kind="glazing", glazing=DOUBLE), setting(), Conventions())
    assert found.value is None
    assert "frame and edge are needed" in found.missing[0]
    # A usual data-sheet value of 4-16-4 with 90 % argon and a coating of 0.03 is 1.1.
    assert found.beside[0].value == pytest.approx(1.1, abs=0.05)
    assert_recomputes(found.steps)


def test_glazing_is_for_vertical_panes() -> None:
    roof = assembly(kind="glazing", glazing=DOUBLE)
    with pytest.raises(NotDecided, match="vertical glazing only"):
        solve_glazing(roof, setting("up"), Conventions())


def test_single_pane_is_its_films_and_its_glass() -> None:
    # Data sheets give 5.8 for 4 mm and 5.7 for 6 mm (common practice, no source).
    for thickness, usual in ((0.004, 5.8), (0.006, 5.7)):
        pane = assembly(kind="glazing", glazing=Glazing((thickness,), ()))
        found = solve_glazing(pane, setting(), Conventions())
        assert found.beside[0].value == pytest.approx(1 / (1 / 25 + thickness + 1 / 7.7))
        assert found.beside[0].value == pytest.approx(usual, abs=0.05)


def test_window_with_its_glazing_described_differs_by_the_glazing_alone() -> None:
    glazed = changed(GLASS, infill=Infill(glazing=DOUBLE))
    window = changed(WINDOW, lights=(glazed,))
    found = solve_window(assembly(kind="window", window=window), setting(), Conventions())
    centre = solve_glazing(assembly(kind="glazing", glazing=DOUBLE), setting(), Conventions())
    u_glass = centre.beside[0].value
    assert found.value == pytest.approx(window_u(1.3, u_glass, 0.5, 1.4, 4.6, 0.06))
    assert_recomputes(found.steps)
    assert [step.symbol for step in found.steps[found.layer_steps :]] == ["A_g", "A_f", "l_g", "U"]


def test_door_with_panel_and_two_lights_by_hand() -> None:
    # Panel 0.6 x 0.8 of 30 mm of 0.030: R 1.17, U 0.8547. Two lights of 0.2 x 0.8.
    # Frame 2.1 - 0.48 - 0.32 = 1.3.
    # (0.48 x 0.8547 + 0.32 x 1.2 + 1.3 x 1.5 + 4.0 x 0.05 + 2.0 x 0.02) / 2.1 = 1.4211.
    board = plane("board", material("foam", 0.030), 0.030)
    panel = light(Infill(layers=(board,)), 0.6, 0.8, 0.0)
    lights = (panel, light(Infill(1.2), 0.2, 0.8, 0.05, count=2))
    bars = (Joint("bars", 2.0, 0.02),)
    door = Window(1.0, 2.1, None, lights, (FramePart("leaf", None, 1.5),), bars)
    found = solve_window(assembly(kind="window", window=door), setting(), Conventions())
    assert found.value == pytest.approx(1.4211, abs=5e-5)
    assert_recomputes(found.steps)


def test_a_panel_with_framing_in_it_is_not_decided() -> None:
    studs = framed("studs", 0.1, Member(WOOD, 0.04, 0.4), Fill(label=2.0))
    door = Window(1.0, 2.1, None, (light(Infill(layers=(studs,)), 0.6, 0.8, 0.0),), FRAME)
    with pytest.raises(NotDecided, match="'studs' is no plane one"):
        solve_window(assembly(kind="window", window=door), setting(), Conventions())


def test_two_windows_in_series_by_hand() -> None:
    # Two windows of 1.3367 with 0.18 between: 1 / (2 / 1.3367 - 0.17 + 0.18) = 0.6639.
    inner, between = changed(WINDOW, sources=()), Between(None, 0.18, "a test")
    double = changed(WINDOW, inner=inner, between=between)
    found = solve_window(assembly(kind="window", window=double), setting(), Conventions())
    assert found.value == pytest.approx(0.6639, abs=5e-5)
    assert "3 mm" in found.assumptions[0]
    assert_recomputes(found.steps)


def test_no_space_between_two_windows_leaves_two_panes_with_the_films_counted_once() -> None:
    # R1 = R2 = films + r: in series without a space 2 (films + r) - films.
    assert 1 / in_series(1 / 0.5, 1 / 0.4, 0.0) == pytest.approx(0.5 + 0.4 - 0.17)


def test_coupled_glazing_counts_the_printed_space() -> None:
    # ISO 10077-1:2006, Table C.1 (from memory): 50 mm between uncoated panes has 0.179.
    coupled = changed(GLASS, second=Infill(5.7), between=Between(STILL, None, ""))
    single = Window(1.2, 1.5, 0.1, (changed(coupled, infill=Infill(5.7)),), FRAME)
    found = solve_window(assembly(kind="window", window=single), setting(), Conventions())
    u_glass = in_series(5.7, 5.7, 0.179)
    expected = window_u(1.3, u_glass, 0.5, 1.4, 4.6, 0.06)
    assert found.value == pytest.approx(expected, rel=2e-3)
    assert_recomputes(found.steps)


@pytest.mark.parametrize(("thickness", "said"), [(0.05, 1), (0.12, 2)])
def test_spaces_wider_than_printed_are_said(thickness: float, said: int) -> None:
    wide = Between(changed(STILL, thickness=thickness), None, "")
    double = changed(WINDOW, inner=changed(WINDOW, sources=()), between=wide)
    found = solve_window(assembly(kind="window", window=double), setting(), Conventions())
    assert len(found.assumptions) == said


def test_a_room_between_two_windows_is_no_air_space() -> None:
    room = Between(changed(STILL, thickness=0.31), None, "")
    double = changed(WINDOW, inner=changed(WINDOW, sources=()), between=room)
    with pytest.raises(NotDecided, match="300 mm"):
        solve_window(assembly(kind="window", window=double), setting(), Conventions())


def test_curtain_wall_by_hand() -> None:
    # (2.64 x 1.1 + 1.0 x 0.35 + 0.36 x 2.2 + 0.32 x 1.9 + 7.0 x 0.11 + 4.02 x 0.08 + 2 x 0.02)
    # / 4.32 = 1.3393.
    spandrel = Light("spandrel", 1, True, None, None, 1.0, 4.02, 1, 0.08, Infill(0.35))
    lights = (light(Infill(1.1), 1.1, 2.4, 0.11), spandrel)
    frames = (FramePart("mullion", 0.36, 2.2), FramePart("transoms", 0.32, 1.9))
    module = Window(1.2, 3.6, None, lights, frames, (Joint("mullion to frame", 2.0, 0.02),))
    found = solve_curtain_wall(
        assembly(kind="curtain-wall", window=module), setting(), Conventions()
    )
    assert found.value == pytest.approx(1.3393, abs=5e-5)
    assert "ISO 12631" in found.steps[-1].source
    assert_recomputes(found.steps)


@given(st.floats(0.1, 6.0), st.floats(0.1, 6.0), st.floats(0.01, 0.2))
def test_without_an_edge_the_window_lies_between_glass_and_frame(
    glass: float, frame: float, width: float
) -> None:
    parts = window_geometry(1.2, 1.5, width)
    value = window_u(parts.area_glass, glass, parts.area_frame, frame, parts.edge_length, 0.0)
    assert min(glass, frame) - 1e-9 <= value <= max(glass, frame) + 1e-9
