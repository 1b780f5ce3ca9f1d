"""What holds for the building: area ratios, surfaces that close, area-weighted means."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

from envcheck.judge.compare import compare, own_term
from envcheck.model.judged import Closing, Line, Mean, Ratio
from envcheck.model.patterns import matches
from envcheck.model.project import Element, Project, Surface
from envcheck.model.ruleset import Averaging, Limit, RuleSet

COMPARED = ("pass", "fail")
"""Verdicts that a comparison gives, and that a mean may replace."""
RATIO_PARTS = {
    "window_wall_ratio": ("wall", "fenestration.*", "fenestration.skylight"),
    "skylight_roof_ratio": ("roof", "fenestration.skylight", ""),
}
"""Ratio -> kind of surface below the line, category above it, category left out above it."""


def closings(project: Project) -> tuple[Closing, ...]:
    """Hold the parts of each surface against its gross area."""
    found = []
    for surface in project.surfaces.values():
        parts = tuple(
            (element.tag, element.net_area)
            for element in project.elements.values()
            if element.surface == surface.name and element.net_area is not None
        )
        missing = surface.gross_area - sum(area for _, area in parts)
        found.append(Closing(surface.name, surface.sheet, surface.gross_area, parts, missing))
    return tuple(found)


def ratios(project: Project, ruleset: RuleSet, categories: Mapping[str, str]) -> tuple[Ratio, ...]:
    """Area ratios that the rule set caps, over the surfaces of the project's main space.

    categories: by tag, the class in which each element is judged.
    """
    return tuple(
        _ratio(project, categories, limit.of, limit.most, limit.clause)
        for limit in ruleset.area_limits
    )


def _ratio(
    project: Project, categories: Mapping[str, str], name: str, most: float, clause: str
) -> Ratio:
    kind, counted, left_out = RATIO_PARTS[name]
    surfaces = [s for s in project.surfaces.values() if _counts(s, kind, project)]
    names = {surface.name for surface in surfaces}
    denominator = sum(surface.gross_area - surface.below_grade_area for surface in surfaces)
    elements = [
        element
        for element in project.elements.values()
        if matches(counted, categories[element.tag])
        and categories[element.tag] != left_out
        and element.surface in names
    ]
    numerator = sum(element.net_area or 0.0 for element in elements)
    missing = [] if surfaces else [f"surfaces of kind {kind!r} with their gross area"]
    missing += [f"the area of {element.tag}" for element in elements if element.net_area is None]
    value = numerator / denominator if denominator else 0.0
    return Ratio(
        name, numerator, denominator, value, most, clause, value > most + 1e-9, tuple(missing)
    )


def _counts(surface: Surface, kind: str, project: Project) -> bool:
    main = next((str(f.value) for f in project.facts if f.name == "space_category"), "")
    return (
        surface.kind == kind
        and surface.adjoins == "outdoors"
        and surface.space_category in ("", main)
    )


def closed_rows(ruleset: RuleSet, found: Sequence[Ratio]) -> dict[str, Ratio]:
    """Category patterns whose rows an area cap closes, with the ratio that does so."""
    return {
        pattern: ratio
        for limit, ratio in zip(ruleset.area_limits, found, strict=True)
        if ratio.passed
        for pattern in limit.closes
    }


def take_means(
    lines: Sequence[Line], project: Project, ruleset: RuleSet
) -> tuple[list[Line], list[Mean]]:
    """Give the members of a mean that the project asks for the verdict of the mean."""
    groups: dict[str, list[Line]] = {}
    for line in lines:
        element = project.elements[line.element]
        limit = line.limit if element.mean_with else None
        if limit is not None and limit.kind == "number" and limit.metric.startswith("U_"):
            groups.setdefault(element.mean_with, []).append(line)
    replaced: dict[int, Line] = {}
    means = []
    for name, members in groups.items():
        outcome, mean = _take_mean(name, members, project, ruleset)
        replaced.update({id(old): new for old, new in zip(members, outcome, strict=True)})
        if mean is not None:
            means.append(mean)
    return [replaced.get(id(line), line) for line in lines], means


def _take_mean(
    name: str, members: list[Line], project: Project, ruleset: RuleSet
) -> tuple[list[Line], Mean | None]:
    rule = _permitted(members, ruleset)
    if isinstance(rule, str):
        return [_undecided(line, name, rule) for line in members], None
    elements = [project.elements[line.element] for line in members]
    waits = next((why for line in members if (why := _waits_for(line, project))), "")
    if waits:
        why = f"the mean {name!r} waits for {waits}"
        return [
            _undecided(line, name, why) if line.verdict in COMPARED else line for line in members
        ], None
    areas = [element.net_area or 0.0 for element in elements]
    values = [line.solved.value or 0.0 for line in members if line.solved is not None]
    value = area_weighted_mean(areas, values)
    limit = members[0].limit
    assert limit is not None
    cap, over_cap = _individual_cap(members, elements, limit, rule, ruleset)
    comparison = compare(value, own_term(limit), limit, ruleset)
    within = comparison.within and not over_cap
    worst = members[values.index(max(values))]
    mean = Mean(
        name,
        ruleset.id,
        tuple(zip((line.element for line in members), areas, values, strict=True)),
        value,
        worst.element,
        rule.clause,
        cap,
    )
    reason = f"area-weighted mean of {name!r} by {rule.clause}; worst member {worst.element}"
    return [
        line._replace(
            verdict="pass" if within else "fail",
            own=line.comparison,
            comparison=comparison,
            group=name,
            reasons=(reason, *((cap,) if over_cap else ())),
        )
        for line in members
    ], mean


def _waits_for(line: Line, project: Project) -> str:
    """What a mean lacks of one member; a line settled before its comparison keeps its verdict."""
    if line.solved is None or line.solved.value is None:
        return f"the value of {line.element}"
    if project.elements[line.element].net_area is None:
        return f"the area of {line.element}"
    return "" if line.verdict in COMPARED else f"the decision on {line.element}"


def area_weighted_mean(areas: Sequence[float], values: Sequence[float]) -> float:
    """Area-weighted mean U: sum of U_i A_i over sum of A_i.

    areas: m2; values: W/(m2 K). Returns W/(m2 K). Source: heat flows of parallel areas add.
    """
    return sum(a * u for a, u in zip(areas, values, strict=True)) / sum(areas)


def _permitted(members: list[Line], ruleset: RuleSet) -> Averaging | str:
    """The clause that permits a mean of these lines, or why there is none."""
    rows = {(line.limit.row, line.limit.cell) for line in members if line.limit is not None}
    if len(rows) != 1:
        return "a mean is taken within one row of the table; these elements fall under several"
    for rule in ruleset.averaging:
        if all(any(matches(p, line.category) for p in rule.scope) for line in members):
            return rule
    return f"{ruleset.title} permits no mean for these elements"


def _individual_cap(
    members: list[Line],
    elements: Iterable[Element],
    limit: Limit,
    rule: Averaging,
    ruleset: RuleSet,
) -> tuple[str, bool]:
    """What the individual cap says, and whether a member is over it."""
    if rule.individual_cap is None:
        return "no individual cap", False
    bound = rule.individual_cap * own_term(limit).number
    over = []
    for line, element in zip(members, elements, strict=True):
        exempt = (
            rule.cap_exempt == element.category
            and rule.cap_exempt_area is not None
            and (element.net_area or 0.0) <= rule.cap_exempt_area + 1e-9
        )
        own = line.comparison
        if own is not None and own.value > bound and not exempt:
            over.append(line.element)
    words = f"no member above {rule.individual_cap:g} x the limit ({rule.clause})"
    if over:
        return f"{words}: {', '.join(over)} above it", True
    return f"{words}: kept", False


def _undecided(line: Line, group: str, why: str) -> Line:
    return line._replace(verdict="not_decided", own=line.comparison, group=group, reasons=(why,))
