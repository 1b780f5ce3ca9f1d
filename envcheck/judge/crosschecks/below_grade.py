"""Walls called below grade that mostly stand above it."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import length, system
from envcheck.model.judged import LOOK, Finding
from envcheck.model.patterns import matches
from envcheck.model.project import Element

CLASS = "wall.below_grade"


def mostly_above(facts: Facts) -> Iterator[Finding]:
    """The larger share above grade, where no deciding rule set has a test of its own for it."""
    units = system(facts.project, facts.rulesets)
    if _tested(facts):
        return
    for element in facts.project.elements.values():
        depth, height = element.depth_below_grade, element.wall_height
        if element.category != CLASS or depth is None or height is None or depth >= height / 2:
            continue
        yield _finding(element, length(depth, units), length(height, units), depth / height)


def _tested(facts: Facts) -> bool:
    return any(
        test.measure == "below_grade_share" and matches(test.category, CLASS)
        for choice in facts.project.rule_sets
        if choice.decides
        for test in facts.rulesets[choice.id].conventions.class_tests
    )


def _finding(element: Element, depth: str, height: str, share: float) -> Finding:
    return Finding(
        "mostly-above-grade",
        "W",
        element.tag,
        element.sheet,
        f"entered as wall below grade; {depth} of {height} ({share * 100:.0f} %) lies below",
        "some codes part such a wall at grade, others take it whole by its larger share; this rule "
        "set states no test",
        "two elements, parted at grade, or the clause that calls the whole below grade",
    )


CHECKS = (Check("mostly-above-grade", "Wall below grade mostly above it", mostly_above, LOOK),)
