"""Means of U that a mean of R would have hidden."""

from __future__ import annotations

from collections.abc import Iterator
from math import fsum

from envcheck.judge.compare import compare, own_term, rounded
from envcheck.judge.crosschecks import Check, Facts
from envcheck.model.judged import CERTAIN, Finding, Group


def mean_by_resistance(facts: Facts) -> Iterator[Finding]:
    """A mean over its limit where the area-weighted mean of the resistances would be within."""
    for group in facts.groups:
        if group.kind != "mean" or group.state != "fail" or not group.decides:
            continue
        line = next((x for x in facts.lines if x.element == group.parts[0].element), None)
        limit = next(
            (x.limit for x in facts.lines if x.group == group.name and x.ruleset == group.ruleset),
            line.limit if line is not None else None,
        )
        if limit is None or not limit.metric.startswith("U_"):
            continue
        ruleset, term = facts.rulesets[group.ruleset], own_term(limit)
        slip = compare(by_resistance(group), term, limit, ruleset)
        own = compare(group.value, term, limit, ruleset)
        if not slip.within or own.within:
            continue
        yield Finding(
            "mean-by-resistance",
            "N",
            group.name,
            "",
            f"mean U {rounded(own.value, own.decimals + 1)}, over {term.text}; the mean of the "
            f"resistances would give {rounded(slip.value, slip.decimals + 1)}",
            "heat flows add by U A: a mean of R flatters a group with a weak member",
            f"a better {group.worst.element}, which weighs the most",
        )


def by_resistance(group: Group) -> float:
    """U of the mean of resistances: sum of A over sum of A / U, W/(m2 K); never above the mean."""
    return fsum(p.amount for p in group.parts) / fsum(p.amount / p.value for p in group.parts)


CHECKS = (
    Check("mean-by-resistance", "Within only by a mean of R-values", mean_by_resistance, CERTAIN),
)
