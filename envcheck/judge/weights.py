"""Weights that a table gives areas in the mean that it limits."""

from __future__ import annotations

from envcheck.judge.facts import fact_of
from envcheck.judge.zones import holds
from envcheck.model.project import Element, Project
from envcheck.model.ruleset import Limit, RuleSet


def weight_of(
    element: Element, limit: Limit, project: Project, ruleset: RuleSet
) -> tuple[float, str]:
    """Give the weight of an element's area, or what stands in the way.

    Weights whose conditions hold multiply; one in words alone needs a person.
    """
    found = 1.0
    for weight in limit.weights:
        if not weight.when:
            return 1.0, f"the official's word on the weight {weight.factor:g} of {weight.text}"
        met = True
        for condition in weight.when:
            dimension = ruleset.dimensions[condition.dimension]
            known = fact_of(condition.dimension, element, project, {}, dimension)
            if known.value is None or not known.usable:
                name = condition.dimension.replace("_", " ")
                return 1.0, f"the {name} of {element.tag}, for the weight of {weight.text}"
            met = met and holds(condition, known.value)
        if met:
            found *= weight.factor
    return found, ""
