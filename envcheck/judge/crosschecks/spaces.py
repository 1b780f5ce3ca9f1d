"""Spaces claimed as semi-heated or the like, against the output that the rule set asks for."""

from __future__ import annotations

from collections.abc import Iterator

from envcheck.judge.crosschecks import Check, Facts
from envcheck.judge.words import listed, system, trimmed
from envcheck.model.judged import CERTAIN, Finding
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import SpaceTest
from envcheck.units import in_system, label


def space_unproved(facts: Facts) -> Iterator[Finding]:
    """A claimed class of space without the output that bears it out."""
    for choice in facts.project.rule_sets:
        if not choice.decides:
            continue
        for test in facts.rulesets[choice.id].conventions.space_tests:
            wrong: dict[str, list[str]] = {}
            for element in facts.project.elements.values():
                if _fact(test.fact, element, facts.project) == test.value:
                    seen = _contradiction(test, element, facts)
                    if seen:
                        wrong.setdefault(seen, []).append(element.tag)
            for seen, tags in wrong.items():
                yield _finding(test, seen, tags)


def _fact(name: str, element: Element, project: Project) -> str | float | None:
    """A fact of the element, of its surface or of the project."""
    own = next((fact.value for fact in element.facts if fact.name == name), None)
    if own is None and name == "space_category" and element.surface in project.surfaces:
        own = project.surfaces[element.surface].space_category or None
    if own is None:
        own = next((fact.value for fact in project.facts if fact.name == name), None)
    return own


def _contradiction(test: SpaceTest, element: Element, facts: Facts) -> str:
    """What speaks against the claim; empty where the output bears it out."""
    output = _fact(test.measure, element, facts.project)
    if not isinstance(output, float):
        return f"no {test.measure} is stated"
    short = test.at_least is not None and output < test.at_least * (1 - 1e-9)
    over = test.below is not None and output >= test.below * (1 - 1e-9)
    units = system(facts.project, facts.rulesets)
    shown = trimmed(in_system(output, "power_density", units), 2)
    return f"{test.measure} is {shown} {label('power_density', units)}" if short or over else ""


def _finding(test: SpaceTest, seen: str, tags: list[str]) -> Finding:
    return Finding(
        "space-class-unproved",
        "E",
        listed(tags),
        "",
        f"{test.fact} {test.value} claimed; {seen}, {test.words} needed ({test.clause})",
        "the space may belong under another column of the tables",
        f"{test.measure} on the mechanical schedule, or the class that it gives",
    )


CHECKS = (Check("space-class-unproved", "Class of a space not borne out", space_unproved, CERTAIN),)
