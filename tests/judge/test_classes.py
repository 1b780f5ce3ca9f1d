"""Class tests by slope, depth and insulation; the rules are invented."""

from __future__ import annotations

from typing import Any

import pytest

from envcheck.judge.classes import Class, classify
from envcheck.model.ruleset import ClassTest, Conventions
from tests.judge import crosscheck_models as m

STEEP = ClassTest("wall.*", "tilt", 60.0, "60 deg", "whole", "2.1", False, "roof.other")
FLAT = ClassTest("roof.*", "tilt", 60.0, "60 deg", "whole", "2.1", False, "wall.other", True)
DEEP = ClassTest(
    "wall.below_grade", "below_grade_share", 0.85, "85 %", "whole", "2.2", False, "wall.mass"
)
ABOVE = ClassTest(
    "roof.above_deck", "continuous_share", 1.0, "100 %", "whole", "2.3", False, "roof.other"
)
HEAVY = ClassTest("wall.mass", "heat_capacity", 1e5, "100 kJ/(m2*K)", "whole", "2.4")


def found(category: str, *tests: ClassTest, made: Any = None, **element: Any) -> Class:
    rules = m.ruleset(conventions=Conventions(class_tests=tests))
    properties = made or m.properties()
    one = m.element("E1", "A1", category=category, **element)
    return classify(one, m.assembly("A1"), properties, rules)


@pytest.mark.parametrize("tilt", [90.0, 60.0])
def test_a_steep_wall_is_a_wall(tilt: float) -> None:
    told = found("wall.mass", STEEP, tilt=tilt)
    assert told.category == "wall.mass" and told.finding is None
    assert told.choice is not None and f"tilt {tilt:g} deg is at least 60 deg" in told.choice.why


def test_a_wall_below_sixty_degrees_is_a_roof() -> None:
    told = found("wall.mass", STEEP, tilt=59.9)
    assert told.category == "roof.other"
    assert told.finding is not None and "tilt 59.9 deg, at least 60 deg needed" in told.finding.seen


def test_a_steep_roof_is_a_wall() -> None:
    assert found("roof.rafter", FLAT, tilt=59.0).category == "roof.rafter"
    assert found("roof.rafter", FLAT, tilt=60.0).category == "wall.other"


def test_a_wall_is_below_grade_by_its_share() -> None:
    deep = found("wall.below_grade", DEEP, depth_below_grade=2.55, wall_height=3.0)
    assert deep.category == "wall.below_grade"  # 85 %
    shallow = found("wall.below_grade", DEEP, depth_below_grade=2.5, wall_height=3.0)
    assert shallow.category == "wall.mass"
    assert shallow.choice is not None and "83.3 % is not at least 85 %" in shallow.choice.why
    unknown = found("wall.below_grade", DEEP, depth_below_grade=2.5)
    assert "wall_height of E1" in unknown.missing


def test_insulation_between_members_is_not_above_deck() -> None:
    above = m.properties(cavity_resistance=None, continuous_resistance=4.0)
    assert found("roof.above_deck", ABOVE, made=above).category == "roof.above_deck"
    between = m.properties(cavity_resistance=2.0, continuous_resistance=2.0)
    told = found("roof.above_deck", ABOVE, made=between)
    assert told.category == "roof.other"
    assert told.finding is not None and "50 %" in told.finding.seen
    none = m.properties(cavity_resistance=None, continuous_resistance=0.0)
    assert "insulation in A1" in found("roof.above_deck", ABOVE, made=none).missing


def test_every_test_of_a_class_is_asked_and_the_first_that_fails_decides() -> None:
    light = m.properties(heat_capacity=5e4)
    assert found("wall.mass", STEEP, HEAVY, made=light, tilt=90.0).category == "wall.steel_frame"
    assert found("wall.mass", STEEP, HEAVY, made=light, tilt=30.0).category == "roof.other"
    heavy = m.properties(heat_capacity=2e5)
    assert found("wall.mass", STEEP, HEAVY, made=heavy, tilt=90.0).category == "wall.mass"
