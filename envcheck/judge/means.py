"""Area-weighted means that a project asks for and the rule set permits."""

from __future__ import annotations

from collections.abc import Container, Sequence
from math import fsum

from envcheck.judge.building import area_weighted_mean
from envcheck.judge.compare import compare, own_term
from envcheck.judge.sums import COMPARED, OVER_R, Taken, by_itself, lacks, part
from envcheck.judge.values import of_metric
from envcheck.judge.weights import weight_of
from envcheck.model.judged import Group, Line, Part
from envcheck.model.patterns import matches
from envcheck.model.project import Project, RuleSetChoice
from envcheck.model.ruleset import Averaging, RuleSet


def means(
    lines: Sequence[Line],
    project: Project,
    ruleset: RuleSet,
    choice: RuleSetChoice,
    traded: Container[int],
) -> list[Taken]:
    """Means of the lines that name one group, those of one quantity together.

    traded: ids of lines that a trade-off speaks for: a mean of these is information.
    """
    permitted = {_kind(rule.metric) for rule in ruleset.averaging} | {"U"}
    groups: dict[tuple[str, str], list[Line]] = {}
    for line in lines:
        name = project.elements[line.element].mean_with
        limit = line.limit if name and not by_itself(line) else None
        if limit is not None and limit.kind == "number" and _kind(limit.metric) in permitted:
            groups.setdefault((name, _kind(limit.metric)), []).append(line)
    return [
        _mean(name, members, project, ruleset, choice, not any(id(x) in traded for x in members))
        for (name, _), members in groups.items()
    ]


def _kind(metric: str) -> str:
    """U-factors of assemblies and products are one quantity under two rows of a table."""
    return "U" if metric in ("", "U_assembly", "U_product", "U_mean") else metric


def _mean(
    name: str,
    members: Sequence[Line],
    project: Project,
    ruleset: RuleSet,
    choice: RuleSetChoice,
    elected: bool,
) -> Taken:
    rule = _permitted(members, ruleset)
    weights = [
        weight_of(project.elements[line.element], line.limit, project, ruleset)
        for line in members
        if line.limit is not None
    ]
    parts = tuple(
        weighted._replace(amount=weighted.amount * factor)
        for line, (factor, _) in zip(members, weights, strict=True)
        if not lacks(line, project)
        for weighted in [part(line, project)]
    )
    group = Group(
        kind="mean",
        name=name,
        ruleset=ruleset.id,
        decides=choice.decides,
        clause="" if isinstance(rule, str) else rule.clause,
        elected=elected,
        state="not_decided",
        parts=parts,
        drawn=fsum(each.drawn for each in parts),
        table=fsum(each.table for each in parts),
    )
    if isinstance(rule, str):
        return Taken(group._replace(waits=(rule,)), tuple(members), None, (rule,))
    waits = _waits(members, weights, parts, rule, project)
    if waits:
        why = f"the mean {name!r} waits for {waits[0]}"
        return Taken(group._replace(waits=waits), tuple(members), None, (why,))
    limit = members[0].limit
    assert limit is not None
    cap, over_cap = _individual_cap(members, project, rule)
    cap = "; ".join((cap, *_weighed(members, weights)))
    value = area_weighted_mean([p.amount for p in parts], [p.value for p in parts])
    shown = of_metric(limit.metric, value) if limit.metric in OVER_R else value
    comparison = compare(shown, own_term(limit), limit, ruleset)
    within = comparison.within and not over_cap
    group = group._replace(state="pass" if within else "fail", cap=cap)
    reason = f"area-weighted mean of {name!r} by {rule.clause}; worst member {group.worst.element}"
    return Taken(group, tuple(members), comparison, (reason, *((cap,) if over_cap else ())))


def _waits(
    members: Sequence[Line],
    weights: Sequence[tuple[float, str]],
    parts: Sequence[Part],
    rule: Averaging,
    project: Project,
) -> tuple[str, ...]:
    """What a permitted mean waits for; empty where it can be taken."""
    waits = [why for line in members if (why := lacks(line, project))]
    waits += dict.fromkeys(why for _, why in weights if why)
    if members[0].metric in OVER_R and rule.individual_cap is not None:
        waits.append(f"the official's word on the individual cap of {rule.clause}")
    if not waits and not any(each.amount for each in parts):
        waits.append("areas that count: it weighs all of them 0")
    return tuple(waits)


def _weighed(members: Sequence[Line], weights: Sequence[tuple[float, str]]) -> list[str]:
    """Areas that do not count in full, in words."""
    return [
        f"the area of {line.element} counts {factor:g}"
        for line, (factor, _) in zip(members, weights, strict=True)
        if factor != 1.0
    ]


def _permitted(members: Sequence[Line], ruleset: RuleSet) -> Averaging | str:
    """The clause that permits a mean of these lines, or why there is none."""
    limits = [line.limit for line in members if line.limit is not None]
    if len({(limit.row, limit.cell) for limit in limits}) != 1:
        return "a mean is taken within one row of the table; these elements fall under several"
    for rule in ruleset.averaging:
        kin = _kind(rule.metric) == _kind(limits[0].metric)
        if kin and all(any(matches(p, line.category) for p in rule.scope) for line in members):
            return rule
    return f"{ruleset.title} permits no mean for these elements"


def _individual_cap(members: Sequence[Line], project: Project, rule: Averaging) -> tuple[str, bool]:
    """What the individual cap says, and whether a member is over it."""
    if rule.individual_cap is None:
        return "no individual cap", False
    over = []
    for line in members:
        element, each = project.elements[line.element], part(line, project)
        exempt = (
            rule.cap_exempt == element.category
            and rule.cap_exempt_area is not None
            and each.amount <= rule.cap_exempt_area + 1e-9
        )
        above = each.value > rule.individual_cap * each.limit * (1 + 1e-12)
        if line.verdict in COMPARED and above and not exempt:
            over.append(line.element)
    words = f"no member above {rule.individual_cap:g} x the limit ({rule.clause})"
    if over:
        return f"{words}: {', '.join(over)} above it", True
    return f"{words}: kept", False
