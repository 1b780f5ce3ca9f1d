"""Outer insulation that metal crosses, by the three conventions; invented rainscreen wall.

Z-girts 3 in deep between mineral wool of R-4.2 per inch, over steel studs with R-13 (cavity factor
.46, number of the model codes, from memory): the drawing adds R-12.6, the studs' wall is R-7.95.
"""

from __future__ import annotations

import pytest

from envcheck.model.project import Fill, Layer, Member, Profile
from envcheck.model.ruleset import Conventions
from envcheck.solve.methods.crossed import is_crossed
from tests.changed import changed
from tests.solve.drawn import solved
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    U_IP,
    WOOD,
    assert_recomputes,
    framed,
    material,
)
from tests.solve.test_steel_framing import FACTORS, FILMS, GYPSUM, STUDS

WOOL = material("mineral wool", INCH / (4.2 * R_IP), "insulation")
Z_GIRT = Profile("Z 3 in, 16 ga", 3 * INCH, 1 * INCH, 0.0538 * INCH, 0.0, "Z")
GIRTS = framed(
    "wool between girts", 3 * INCH, Member(STEEL, 1 * INCH, 16 * INCH, Z_GIRT), Fill(WOOL),
    crosses_insulation=True,
)  # fmt: skip
WALL: list[Layer] = [GIRTS, GYPSUM, STUDS, GYPSUM]


def under(convention: str) -> Conventions:
    return changed(FACTORS, crossed_insulation=convention)


@pytest.mark.parametrize(
    ("convention", "resistance", "note"),
    [("zero", 7.95, "counts 0"), ("counted", 7.95 + 12.6, "counted in full by the rule set")],
)
def test_counted_as_the_rule_set_says(convention: str, resistance: float, note: str) -> None:
    found = solved(WALL, "cavity_factor", under(convention), **FILMS)
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(1 / resistance)
    assert note in found.counted[0].note
    assert_recomputes(found.steps)


def test_only_two_dimensions_or_a_test_accepted() -> None:
    found = solved(WALL, "cavity_factor", under("two_dimensional"), **FILMS)
    assert found.value is None
    assert found.missing == (
        "a two-dimensional value or a test for 'wool between girts': metal crosses it, and the "
        "rule set accepts no other method",
    )


@pytest.mark.parametrize("convention", ["zero", "counted", "two_dimensional"])
def test_bracket_is_that_of_the_wall_as_drawn(convention: str) -> None:
    found = solved(WALL, "two_dimensional", under(convention), **FILMS)
    assert found.missing == ()
    assert found.decided_by_bracket
    assert found.low is not None
    assert found.high is not None
    # A small network solve of the same girts gives about .078: girts cost most of.
    assert found.low / U_IP < 0.078 < found.high / U_IP
    by_clause = solved(WALL, "cavity_factor", under("zero"), **FILMS)
    assert (by_clause.low, by_clause.high) == (found.low, found.high)


@pytest.mark.parametrize(
    ("layer", "crossed"),
    [
        (GIRTS, True),
        (GIRTS._replace(crosses_insulation=False), False),
        (GIRTS._replace(member=Member(WOOD, 0.045, 0.6)), False),
        (GYPSUM, False),
    ],
)
def test_what_is_crossed(layer: object, crossed: bool) -> None:
    assert is_crossed(layer) is crossed


def test_wood_battens_through_insulation_are_drawn() -> None:
    battens = GIRTS._replace(member=Member(WOOD, 0.045, 0.6))
    found = solved([battens], "parallel_path", under("two_dimensional"))
    by_hand = 0.075 / (0.17 + 3 * INCH / 0.13) + 0.925 / (0.17 + 12.6 * R_IP)
    assert found.value == pytest.approx(by_hand)
