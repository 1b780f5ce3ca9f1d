"""The small parts of a rule set: zones, dimensions, area caps, means, exceptions, trade-offs."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from envcheck import units
from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.patterns import fits_any
from envcheck.model.ruleset import (
    AreaLimit,
    Averaging,
    Condition,
    Dimension,
    ExceptionClause,
    Trigger,
    Zones,
)
from envcheck.read.cells import CellError
from envcheck.read.condition_text import read_condition
from envcheck.read.rule_documents import Document

MEASURES = {
    "hdd65": "degF*d", "hdd50": "degF*d", "cdd65": "degF*d", "cdd50": "degF*d",
    "hdd18": "K*d", "hdd17": "K*d", "hdd20": "K*d", "cdd18": "K*d", "cdd10": "K*d",
    "altitude": "m",
}  # fmt: skip
"""Measures of a site that bound zones, with the unit of their printed numbers."""
RATIOS = {
    "window_wall_ratio": "area of vertical fenestration over gross wall area above grade",
    "skylight_roof_ratio": "area of skylights over gross roof area",
}
"""Dimensions that need no declaration: the program computes them."""
DATE_TESTED = "date_tested"
"""Dimension of columns and rows by date, which needs no declaration either."""
TESTED = "day that the rule set tests: the permit application date of the project"


def read_zones(document: Document, problems: list[Problem]) -> Zones:
    """Read zone order, members, bounds and suffix letters."""
    stated: Mapping[str, Any] = document.get("zones") or {}
    order = tuple(stated.get("order") or ())
    members = {k: tuple(v) for k, v in (stated.get("members") or {}).items()}
    _zone_names(document, "members", members, order, problems)
    bounds: dict[str, dict[str, Condition]] = {}
    for measure, by_zone in (stated.get("bounds") or {}).items():
        at = ("zones", "bounds", measure)
        if measure not in MEASURES:
            fix = did_you_mean(measure, MEASURES)
            fill = {"found": measure, "expected": one_of(MEASURES), "fix": fix}
            problems.append(problem("unknown-measure", document.name, document.line(*at), **fill))
            continue
        _zone_names(document, f"bounds {measure}", by_zone, order, problems, at)
        bounds[measure] = {}
        for zone, text in by_zone.items():
            condition = _bound(document, measure, zone, text, problems)
            if condition is not None:
                bounds[measure][zone] = condition
        _overlaps(document, measure, bounds[measure], problems)
    suffixes = tuple(stated.get("suffixes") or ())
    criteria = stated.get("criteria", "")
    return Zones(order, members, bounds, stated.get("chosen_by", ""), suffixes, criteria)


def _zone_names(
    document: Document,
    where: str,
    named: Mapping[str, Any],
    order: tuple[str, ...],
    problems: list[Problem],
    at: tuple[str, ...] = ("zones", "members"),
) -> None:
    for zone in named:
        if zone not in order:
            fix = did_you_mean(zone, order)
            fill = {"found": f"{zone} ({where})", "expected": one_of(order), "fix": fix}
            line = document.line(*at, zone)
            problems.append(problem("unknown-zone-head", document.name, line, **fill))


def _bound(
    document: Document, measure: str, zone: str, text: str, problems: list[Problem]
) -> Condition | None:
    try:
        return read_condition(text, measure, (), MEASURES[measure])
    except CellError as error:
        line = document.line("zones", "bounds", measure, zone)
        fill = {"found": text, "expected": error.expected, "name": measure}
        problems.append(problem("unreadable-condition", document.name, line, **fill))
        return None


def _overlaps(
    document: Document, measure: str, bounds: Mapping[str, Condition], problems: list[Problem]
) -> None:
    items = list(bounds.items())
    for i, (zone, condition) in enumerate(items):
        for other, further in items[i + 1 :]:
            if intersect(condition, further):
                line = document.line("zones", "bounds", measure, other)
                found = f"{zone} {condition.text} and {other} {further.text}"
                problems.append(problem("zones-overlap", document.name, line, found=found))


def intersect(a: Condition, b: Condition) -> bool:
    """Whether two conditions on one dimension can hold at once."""
    if a.words or b.words:
        if len(a.words) == 1 == len(b.words):
            return a.words[0].casefold() == b.words[0].casefold()
        return bool({w.casefold() for w in a.words} & {w.casefold() for w in b.words})
    for low, high in ((a, b), (b, a)):
        if low.low is not None and high.high is not None:
            if low.low > high.high:
                return False
            if low.low == high.high and not (low.low_closed and high.high_closed):
                return False
    return True


def read_dimensions(document: Document, problems: list[Problem]) -> dict[str, Dimension]:
    """Read what conditions may ask for."""
    found = {name: Dimension(name, meaning=words) for name, words in RATIOS.items()}
    found[DATE_TESTED] = Dimension(DATE_TESTED, meaning=TESTED, sheet="cover sheet", kind="date")
    for name, stated in (document.get("dimensions") or {}).items():
        read = _dimension(document, name, stated, problems)
        if read is not None:
            found[name] = read
    return found


def _dimension(
    document: Document, name: str, stated: Mapping[str, Any], problems: list[Problem]
) -> Dimension | None:
    line = document.line("dimensions", name)
    values, unit = tuple(stated.get("values") or ()), stated.get("unit", "")
    unit = "" if unit == "-" or stated.get("interpolate") else unit
    if not values and not stated.get("type"):
        problems.append(problem("dimension-without-values", document.name, line, found=name))
        return None
    if unit and not units.quantity_of(unit):
        hint = "use a spelling such as Btu/(ft2*degF)"
        problems.append(problem("unknown-unit", document.name, line, found=unit, hint=hint))
        return None
    default, sheet = stated.get("default", ""), stated.get("sheet", "")
    if default and values and default not in values:
        fix = did_you_mean(default, values)
        fill = {"found": default, "expected": one_of(values), "fix": fix, "name": name}
        problems.append(problem("unknown-condition-word", document.name, line, **fill))
        return None
    kind = "date" if stated.get("type") == "date" else ""
    return Dimension(
        name, values, unit, stated.get("meaning", ""), default, sheet, kind,
        bool(stated.get("interpolate")), stated.get("outside", "hold"),
    )  # fmt: skip


# --------------------------------------------------------------------------- caps, means, others


def read_area_limits(
    document: Document, categories: tuple[str, ...], problems: list[Problem]
) -> tuple[tuple[AreaLimit, ...], tuple[str, ...]]:
    """Read the caps on area ratios and the rows that each closes; one in prose is a remark."""
    found, remarks = [], []
    for i, stated in enumerate(document.get("area_limits") or ()):
        at = ("area_limits", i)
        if stated["of"] not in RATIOS:
            if " " in stated["of"]:
                remarks.append(f"{stated['clause']} caps {stated['of']}; it is not judged here")
                continue
            fix = did_you_mean(stated["of"], RATIOS)
            fill = {"found": stated["of"], "expected": one_of(RATIOS), "fix": fix}
            problems.append(problem("unknown-ratio", document.name, document.line(*at), **fill))
            continue
        most = _number(document, stated["max"], (*at, "max"), problems)
        closes = own_names(document, tuple(stated.get("closes") or ()))
        if not closes:
            p = problem("cap-closes-nothing", document.name, document.line(*at))
            problems.append(p)
        check_patterns(document, closes, categories, (*at, "closes"), problems)
        if most is not None:
            found.append(AreaLimit(stated["of"], most, stated["clause"], closes))
    return tuple(found), tuple(remarks)


def read_averaging(
    document: Document, categories: tuple[str, ...], problems: list[Problem]
) -> tuple[tuple[Averaging, ...], tuple[str, ...]]:
    """Read the means that the code permits; a scope in prose becomes a remark."""
    found, remarks = [], []
    for i, stated in enumerate(document.get("averaging") or ()):
        at = ("averaging", i)
        scope = stated["scope"]
        patterns = own_names(document, (scope,) if isinstance(scope, str) else tuple(scope))
        if any(" " in p for p in patterns):
            remarks.append(f"{stated['clause']} permits a mean over {scope}; it is not taken here")
            continue
        check_patterns(document, patterns, categories, (*at, "scope"), problems)
        cap = stated.get("individual_cap")
        exempt, area = stated.get("cap_exempt", ""), stated.get("cap_exempt_area")
        if exempt:
            check_patterns(document, (exempt,), categories, (*at, "cap_exempt"), problems)
        cap_value = (
            None if cap is None else _number(document, cap, (*at, "individual_cap"), problems)
        )
        square = (
            None
            if area is None
            else _number(document, area, (*at, "cap_exempt_area"), problems, "area")
        )
        metric, clause = stated.get("metric", "U_assembly"), stated["clause"]
        found.append(Averaging(clause, patterns, metric, cap_value, exempt, square))
    return tuple(found), tuple(remarks)


def read_trigger(document: Document, problems: list[Problem]) -> Trigger | None:
    """Read the share of renewal above which an alteration must meet the target."""
    stated = document.get("trigger")
    if not stated:
        return None
    at = ("trigger", "renewed_more_than")
    share = _number(document, stated["renewed_more_than"], at, problems, "share")
    if share is None:
        return None
    return Trigger(share, stated.get("clause", ""), stated.get("text", ""))


def read_exceptions(*documents: Document) -> tuple[ExceptionClause, ...]:
    """Exception clauses of all documents, base first."""
    return tuple(
        ExceptionClause(e["clause"], e["text"])
        for document in documents
        for e in document.get("exceptions") or ()
    )


def own_names(document: Document, names: tuple[str, ...]) -> tuple[str, ...]:
    """Write the rule set's own names (``elements``) out as categories."""
    own: Mapping[str, Any] = document.get("elements") or {}
    return tuple(c for name in names for c in written_out(own, name)[0])


def written_out(own: Mapping[str, Any], name: str) -> tuple[list[str], Mapping[str, Any]]:
    """Categories and conditions that a name stands for; a category stands for itself."""
    listed = own.get(name, name)
    if isinstance(listed, Mapping):
        return list(listed.get("categories") or ()), listed.get("when") or {}
    return ([listed] if isinstance(listed, str) else list(listed)), {}


def check_patterns(
    document: Document,
    patterns: tuple[str, ...],
    categories: tuple[str, ...],
    at: tuple[str | int, ...],
    problems: list[Problem],
) -> None:
    """Each pattern fits a category."""
    for pattern in patterns:
        if not fits_any(pattern, categories):
            fix, line = did_you_mean(pattern, categories), document.line(*at)
            fill = {"found": pattern, "expected": one_of(categories), "name": pattern}
            fill["hint"] = fix or "use a category, or a pattern such as wall.*"
            problems.append(problem("unknown-category", document.name, line, **fill))


def _number(
    document: Document,
    text: str,
    at: tuple[str | int, ...],
    problems: list[Problem],
    quantity: str = "number",
) -> float | None:
    share = quantity == "number" and text.endswith("%")
    return document.figure(text, "share" if share else quantity, at, problems)
