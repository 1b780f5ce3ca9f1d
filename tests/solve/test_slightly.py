"""Slightly ventilated air spaces by their openings, between a closed and an open space."""

from __future__ import annotations

import pytest

from envcheck.model.project import AirSpaceLayer, Assembly, TaperedLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Solved
from envcheck.solve.assembly import solve
from tests.solve.samples import WOOL, assembly, assert_recomputes, material, plane, setting, stated

BOARD = plane("boarding", material("wood", 0.13, "wood"), 0.022)
BRICK = stated("brick", 0.15)
WALL = (plane("wool", WOOL, 0.1), BRICK)


def space(openings: float | None, ventilation: str = "slightly", per: str = "length") -> object:
    return AirSpaceLayer("air-space", "gap", 1, 0.025, ventilation, (0.9, 0.9), openings, per)


def run(
    of: object, direction: str = "horizontal", method: str = "series", **more: object
) -> Solved:
    wall: Assembly = assembly(BOARD, of, *WALL)._replace(**more)
    return solve(wall, setting(direction, method), Conventions())


def resistance(of: object) -> float:
    solved = run(of)
    assert solved.value is not None, solved.missing
    assert_recomputes(solved.steps)
    return 1.0 / solved.value


def test_ends_are_the_two_walls() -> None:
    closed, opened = resistance(space(None, "unventilated")), resistance(space(None, "well"))
    assert closed > opened
    assert resistance(space(500.0001e-6)) == pytest.approx(closed, rel=1e-6)
    assert resistance(space(1499.999e-6)) == pytest.approx(opened, rel=1e-6)
    assert resistance(space(1000e-6)) == pytest.approx((closed + opened) / 2)


def test_no_bracket_is_claimed_for_an_interpolation() -> None:
    solved = run(space(900e-6))
    assert (solved.low, solved.high, solved.tree) == (None, None, None)
    assert "interpolated" in solved.bracket_note
    assert [one.resistance is None for one in solved.counted] == [False] * 4


def test_level_spaces_state_their_openings_by_area() -> None:
    assert "openings_per_area of the level" in run(space(900e-6), "up").missing[0]
    assert "openings_per_length of the upright" in run(space(900e-6, per="area")).missing[0]
    assert run(space(900e-6, per="area"), "up").missing == ()


@pytest.mark.parametrize(
    ("layers", "method", "words"),
    [
        ((space(900e-6), space(900e-6)), "series", "not the only one"),
        ((space(900e-6),), "two_dimensional", "interpolated"),
        (
            (space(900e-6), TaperedLayer("tapered", "falls", 1, WOOL, 0.1, 0.2, "rectangle")),
            "series",
            "tapered layer",
        ),
    ],
)
def test_what_cannot_be_interpolated_says_so(
    layers: tuple[object, ...], method: str, words: str
) -> None:
    solved = run(space(900e-6), method=method, layers=(BOARD, *layers, *WALL))
    assert solved.value is None
    assert words in solved.missing[0]
