"""What the rows and heads of a printed table mean: categories, metrics, conditions, dates."""

from __future__ import annotations

from collections.abc import Mapping
from functools import lru_cache
from itertools import pairwise
from typing import Any, NamedTuple

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.metrics import METRICS
from envcheck.model.patterns import best_pattern, fits_any
from envcheck.model.ruleset import Condition
from envcheck.read.cells import CellError
from envcheck.read.condition_text import period_of, read_condition, read_period
from envcheck.read.rule_parts import DATE_TESTED, written_out
from envcheck.read.sheets import Column, Row
from envcheck.read.table_entry import (
    MEANINGS,
    Head,
    Table,
    at,
    line_of_table,
    zone_problem,
)

UNJUDGED = ("monotone",)
"""Keys of a head that only a plausibility check reads."""
EVERY_ROW = "*"


def row_pattern(table: Table, row: Row, problems: list[Problem]) -> str | None:
    """Give the entry of ``rows`` that fits a row, or empty; None after a problem."""
    if table.settings.get("orientation") == "zones_down":
        if row.key in table.zones:
            return ""
        problems.append(zone_problem(table, row.key, row.line))
        return None
    rows: Mapping[str, Any] = table.settings.get("rows") or {}
    pattern = row.key if row.key in rows else best_pattern(row.key, rows)
    own = table.other.get("elements") or {}
    if pattern is None and rows and row.key not in table.categories and row.key not in own:
        expected, fix = one_of(rows), did_you_mean(row.key, rows)
        fix = fix or f"add {row.key!r} under `rows:` and name its `element:`"
        file, line = table.sheet.file, row.line
        p = problem("unmapped-row", file, line, found=row.key, expected=expected, fix=fix)
        problems.append(p)
        return None
    return pattern or ""


def merged_settings(table: Table, head: Head, pattern: str) -> dict[str, Any]:
    """Settings where row and column meet: the row's over the head's over the table's.

    A row entry ``*`` speaks of all rows, so a head says more than it.
    """
    rows: Mapping[str, Any] = table.settings.get("rows") or {}
    found = {k: table.settings[k] for k in MEANINGS if k in table.settings and k != "in_force"}
    own = rows.get(pattern) or {}
    if pattern == EVERY_ROW:
        return {**found, **own, **head.settings}
    return {**found, **head.settings, **own}


def listed_categories(table: Table, element: Any) -> list[str]:
    """Categories that names stand for; those of the rule set's own (``elements``) written out."""
    own: Mapping[str, Any] = table.other.get("elements") or {}
    names = [element] if isinstance(element, str) else [str(e) for e in element]
    return [c for name in names for c in written_out(own, name)[0]]


class Cover(NamedTuple):
    """Categories that a row covers, under conditions that their name carries."""

    categories: tuple[str, ...]
    when: tuple[Condition, ...]


def covers_of(
    table: Table, row: Row, element: Any, problems: list[Problem]
) -> tuple[Cover, ...] | None:
    """What the row covers: what is stated, else the row's key itself; None if unknown.

    Nothing at all: the rule set says that envcheck knows no such element (``elements: {x: []}``).
    """
    own: Mapping[str, Any] = table.other.get("elements") or {}
    names = [element] if isinstance(element, str) else [str(e) for e in element or [row.key]]
    found: dict[tuple[Condition, ...], list[str]] = {}
    for name in names:
        categories, typed = written_out(own, name)
        file, line = table.document.name, line_of_table(table) if typed else None
        read = [condition(table, d, t, file, line, problems) for d, t in typed.items()]
        if None in read:
            return None
        listed = found.setdefault(tuple(c for c in read if c is not None), [])
        for category in categories:
            if not _fits(category, table.categories) and category != ENVELOPE:
                _unmapped(table, row, category, bool(element) or name != category, problems)
                return None
            listed.append(category)
    return tuple(Cover(tuple(dict.fromkeys(c)), when) for when, c in found.items() if c)


ENVELOPE = "envelope"
"""Name of the whole envelope, which is no element."""
_fits = lru_cache(maxsize=1024)(fits_any)


def _unmapped(table: Table, row: Row, name: str, stated: bool, problems: list[Problem]) -> None:
    """A name that is no category: of the row itself, or stated for it in ``ruleset.yaml``."""
    fix = did_you_mean(name, table.categories)
    if stated:
        file, line = table.document.name, line_of_table(table)
        fix = fix or f"say under `elements:` which categories {name!r} stands for"
    else:
        file, line = table.sheet.file, row.line
        fix = fix or f"name an envcheck category: `rows: {{{row.key}: {{element: ...}}}}`"
    expected = one_of(table.categories)
    p = problem("unmapped-row", file, line, found=name, expected=expected, fix=fix)
    if p not in problems:
        problems.append(p)


def conditions_of(
    table: Table, row: Row, pattern: str, problems: list[Problem]
) -> tuple[Condition, ...] | None:
    """Conditions of the table, of the row's settings and of its ``when:`` cells."""
    own: Mapping[str, Any] = (table.settings.get("rows") or {}).get(pattern) or {}
    typed = {**(table.settings.get("when") or {}), **(own.get("when") or {})}
    file, line = table.document.name, line_of_table(table) if typed or own.get("in_force") else 0
    found = [
        *(condition(table, d, t, file, line, problems) for d, t in typed.items()),
        *(condition(table, d, t, table.sheet.file, row.line, problems, True) for d, t in row.when),
    ]
    if own.get("in_force"):
        found.append(period(table, own["in_force"], problems))
    kept = tuple(c for c in found if c is not None)
    return kept if len(kept) == len(found) else None


def condition(
    table: Table,
    name: str,
    text: Any,
    file: str,
    line: int | None,
    problems: list[Problem],
    printed: bool = False,
) -> Condition | None:
    """Read one condition; ``printed`` ones use the table's decimal mark."""
    dimension = table.dimensions.get(name)
    p: Problem
    if dimension is None:
        fix = did_you_mean(name, table.dimensions) or f"declare {name!r} under `dimensions:`"
        p = problem("undeclared-condition", file, line, found=name, fix=fix)
    else:
        joined = "|".join(map(str, text)) if isinstance(text, list) else str(text)
        decimal = str(table.other.get("decimal", ".")) if printed else "."
        try:
            if dimension.kind == "date":
                return read_period(joined, name)
            return _read(joined, name, dimension.values, dimension.unit, decimal)
        except CellError as error:
            fix = error.fix or did_you_mean(joined[:80], dimension.values)
            fill = {"expected": error.expected, "fix": fix, "name": name, "where": repr(name)}
            p = problem(_condition_kind(error.kind), file, line, found=joined, **fill)
    if p not in problems:
        problems.append(p)
    return None


_read = lru_cache(maxsize=4096)(read_condition)


def period(table: Table, stated: Any, problems: list[Problem]) -> Condition | None:
    """Read ``in_force``: a day, or ``{from: ..., until: ...}``."""
    if not isinstance(stated, Mapping):
        line = line_of_table(table)
        return condition(table, DATE_TESTED, stated, table.document.name, line, problems)
    text = f"[{stated.get('from') or ''},{stated.get('until') or ''})"
    line = line_of_table(table)
    return condition(table, DATE_TESTED, text, table.document.name, line, problems)


def head_periods(table: Table, problems: list[Problem]) -> dict[str, Condition]:
    """Periods of printed heads (``in_force``); a day alone holds until the next one begins."""
    stated = table.settings.get("in_force") or {}
    if not isinstance(stated, Mapping) or not stated.keys() - {"from", "until"}:
        return {}
    found = {h: c for h, s in stated.items() if (c := period(table, s, problems)) is not None}
    ordered = sorted(found.items(), key=lambda item: item[1].low or 0)
    for (head, first), (other, second) in pairwise(ordered):
        if second.low is None or (first.high is not None and first.high <= second.low):
            continue
        found[head] = period_of(DATE_TESTED, first.low, second.low)
        if first.high is not None:
            words = f"{head} {first.text} and {other} {second.text}"
            line = line_of_table(table)
            problems.append(problem("dates-overlap", table.document.name, line, found=words))
    return found


def _condition_kind(kind: str) -> str:
    return "unknown-condition-word" if kind == "unknown-word" else kind


def head_of(
    table: Table, column: Column, periods: Mapping[str, Condition], problems: list[Problem]
) -> Head | None:
    """Give what the heads of a column mean."""
    zone = str(table.settings.get("zone", "*"))
    settings: dict[str, Any] = {}
    conditions: list[Condition | None] = []
    trigger = ""
    for level, meaning in zip(column.heads, _levels(table, column), strict=True):
        if level in periods:
            conditions.append(periods[level])
        if meaning == "check_only" or (meaning == "in_force" and level in periods):
            continue
        if meaning == "zone" or (isinstance(meaning, Mapping) and "map_zone" in meaning):
            mapped = meaning if isinstance(meaning, Mapping) else {}
            zone = str(mapped.get("map_zone", {}).get(level, level))
            if zone not in table.zones:
                problems.append(zone_problem(table, level, None))
                return None
            continue
        if not isinstance(meaning, Mapping) or level not in meaning:
            _unknown_head(table, level, meaning, periods, problems)
            return None
        said = dict(meaning[level] or {})
        typed = {**(said.pop("when", None) or {})}
        role, then = said.pop("role", ""), str(said.pop("then", ""))
        if role == "trigger" or then:
            trigger = then
            if all(then != c.heads[-1] for c in table.sheet.columns):
                heads = dict.fromkeys(c.heads[-1] for c in table.sheet.columns)
                _unknown_head(table, then or level, heads, {}, problems)
                return None
        typed |= {k: v for k, v in said.items() if k not in MEANINGS and k not in UNJUDGED}
        settings |= {k: v for k, v in said.items() if k in MEANINGS}
        conditions += [
            condition(table, d, t, table.document.name, line_of_table(table), problems)
            for d, t in typed.items()
        ]
        if said.get("in_force"):
            conditions.append(period(table, settings.pop("in_force"), problems))
    if None in conditions:
        return None
    inherited = table.inherited.get(column.heads, ())
    kept = tuple(c for c in conditions if c is not None)
    return Head(column, zone, settings, kept, (*column.marks, *inherited), trigger)


def _unknown_head(
    table: Table, level: str, meaning: Any, periods: Mapping[str, Any], problems: list[Problem]
) -> None:
    known = [*(meaning if isinstance(meaning, Mapping) else ()), *periods]
    fix = did_you_mean(level, known) or f"say under `head_levels` or `heads` what {level!r} means"
    fill = {"found": level, "expected": one_of(known), "fix": fix, "found_head": level}
    problems.append(problem("unknown-head", table.sheet.file, 1, **fill))


def _levels(table: Table, column: Column) -> list[Any]:
    """Give the meaning of each head row, top row first."""
    stated = table.settings.get("head_levels")
    count = len(column.heads)
    if stated is not None and len(stated) == count:
        return list(stated)
    if table.settings.get("heads") is not None:
        return [*["check_only"] * (count - 1), table.settings["heads"]]
    return ["zone", *["check_only"] * (count - 1)] if _across(table) else [{}] * count


def _across(table: Table) -> bool:
    return str(table.settings.get("orientation", "zones_across")) == "zones_across"


def check_zones(table: Table, heads: list[Head], problems: list[Problem]) -> None:
    """A zone without a column or row is a gap, unless the table or rule set allows it."""
    orientation = table.settings.get("orientation", "zones_across")
    if table.unchanged or orientation == "none":
        return
    present = (
        {h.zone for h in heads}
        if orientation == "zones_across"
        else {row.key for row in table.sheet.rows}
    )
    allowed = set(table.settings.get("gaps_allowed", ()))
    for zone in table.zones:
        if zone not in present | allowed and not any(p.file == table.sheet.file for p in problems):
            what = "column" if orientation == "zones_across" else "row"
            p = problem("zone-missing", table.sheet.file, None, found="none", zone=zone, what=what)
            problems.append(p)


def metric_of(
    table: Table, row: Row, head: Head, stated: Any, path: str, problems: list[Problem]
) -> str | None:
    """Give the metric of a cell, by its path where the row has one for each."""
    name = stated.get(path) if isinstance(stated, Mapping) else stated
    if name in METRICS:
        return str(name)
    fix = did_you_mean(str(name), METRICS) if name else ""
    found = name or (f"no metric for the path {path!r}" if path else "no metric")
    problems.append(at(table, row, head, "unknown-metric", found, one_of(METRICS), fix))
    return None


def slash_of(
    table: Table, stated: Any, problems: list[Problem]
) -> tuple[str, tuple[str, ...], tuple[tuple[Condition, ...], ...]]:
    """Give kind, roles and conditions of a slash."""
    if not stated:
        return "", (), ()
    kind, sides = next(iter(stated.items()))
    if kind != "when":
        return str(kind), tuple(map(str, sides)), ()
    conditions = []
    for side in sides:
        read = [
            condition(table, d, t, table.document.name, line_of_table(table), problems)
            for d, t in side.items()
        ]
        conditions.append(tuple(c for c in read if c is not None))
    return "when", ("",) * len(sides), tuple(conditions)
