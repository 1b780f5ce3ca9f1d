"""What the rows and heads of a printed table mean: categories, metrics, conditions, footnotes."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.patterns import best_pattern, fits_any
from envcheck.model.ruleset import Condition, Note
from envcheck.read.cells import CellError
from envcheck.read.condition_text import read_condition
from envcheck.read.sheets import Column, Row
from envcheck.read.table_entry import (
    LATER,
    MEANINGS,
    METRICS,
    Head,
    Table,
    at,
    line_of_table,
    zone_problem,
)


def row_settings(table: Table, row: Row, problems: list[Problem]) -> Mapping[str, Any] | None:
    """Settings of the table under those of the row."""
    general = {k: table.settings[k] for k in MEANINGS if k in table.settings and k != "when"}
    if table.settings.get("orientation") == "zones_down":
        if row.key in table.zones:
            return general
        problems.append(zone_problem(table, row.key, row.line))
        return None
    rows: Mapping[str, Any] = table.settings.get("rows") or {}
    pattern = best_pattern(row.key, rows)
    own = table.other.get("elements") or {}
    if pattern is None and rows and row.key not in table.categories and row.key not in own:
        expected, fix = one_of(rows), did_you_mean(row.key, rows)
        fix = fix or f"add {row.key!r} under `rows:` and name its `element:`"
        file, line = table.sheet.file, row.line
        p = problem("unmapped-row", file, line, found=row.key, expected=expected, fix=fix)
        problems.append(p)
        return None
    return general if pattern is None else {**general, **rows[pattern]}


UNJUDGED = ("monotone",)
"""Keys of a head that only a plausibility check reads."""


def categories_of(
    table: Table, row: Row, element: Any, problems: list[Problem]
) -> tuple[str, ...] | None:
    """Categories that the row covers: those stated, else the row's key itself.

    A name of the rule set's own (``elements``) stands for the categories that it lists.
    """
    stated = [element] if isinstance(element, str) else [str(e) for e in element or ()]
    own: Mapping[str, Any] = table.other.get("elements") or {}
    found: list[str] = []
    for name in stated or [row.key]:
        listed = own.get(name, name)
        for category in [listed] if isinstance(listed, str) else listed:
            if not fits_any(category, table.categories):
                _unmapped(table, row, category, bool(stated), problems)
                return None
            found.append(category)
    return tuple(dict.fromkeys(found))


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


def conditions_of(table: Table, row: Row, problems: list[Problem]) -> tuple[Condition, ...] | None:
    """Conditions of the table, of the row's settings and of its ``when:`` cells."""
    rows: Mapping[str, Any] = table.settings.get("rows") or {}
    pattern = best_pattern(row.key, rows)
    stated = rows[pattern].get("when", {}) if pattern is not None else {}
    typed = {**(table.settings.get("when") or {}), **stated}
    found = [
        *(
            _condition(table, d, t, table.document.name, line_of_table(table), problems)
            for d, t in typed.items()
        ),
        *(_condition(table, d, t, table.sheet.file, row.line, problems, True) for d, t in row.when),
    ]
    kept = tuple(c for c in found if c is not None)
    return kept if len(kept) == len(found) else None


def _condition(
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
            return read_condition(joined, name, dimension.values, dimension.unit, decimal)
        except CellError as error:
            fix = error.fix or did_you_mean(joined, dimension.values)
            fill = {"expected": error.expected, "fix": fix, "name": name, "where": repr(name)}
            p = problem(_condition_kind(error.kind), file, line, found=joined, **fill)
    if p not in problems:
        problems.append(p)
    return None


def _condition_kind(kind: str) -> str:
    return "unknown-condition-word" if kind == "unknown-word" else kind


def head_of(table: Table, column: Column, problems: list[Problem]) -> Head | None:
    """Give what the heads of a column mean."""
    zone = str(table.settings.get("zone", "*"))
    settings: dict[str, Any] = {}
    conditions: list[Condition | None] = []
    for level, meaning in zip(column.heads, _levels(table, column), strict=True):
        if meaning == "check_only":
            continue
        if meaning == "zone" or (isinstance(meaning, Mapping) and "map_zone" in meaning):
            mapped = meaning if isinstance(meaning, Mapping) else {}
            zone = str(mapped.get("map_zone", {}).get(level, level))
            if zone not in table.zones:
                problems.append(zone_problem(table, level, None))
                return None
            continue
        if not isinstance(meaning, Mapping) or level not in meaning:
            known = list(meaning) if isinstance(meaning, Mapping) else []
            fix = (
                did_you_mean(level, known)
                or f"say under `head_levels` or `heads` what {level!r} means"
            )
            fill = {"found": level, "expected": one_of(known), "fix": fix, "found_head": level}
            problems.append(problem("unknown-head", table.sheet.file, 1, **fill))
            return None
        said = dict(meaning[level] or {})
        typed = {**(said.pop("when", None) or {})}
        if said.pop("then", None) or said.pop("role", None):
            file, line = table.document.name, line_of_table(table)
            what = "a threshold that calls for another figure"
            problems.append(problem("not-executed", file, line, found=level, what=what))
            return None
        typed |= {k: v for k, v in said.items() if k not in MEANINGS and k not in UNJUDGED}
        settings |= {k: v for k, v in said.items() if k in MEANINGS}
        conditions += [
            _condition(table, d, t, table.document.name, line_of_table(table), problems)
            for d, t in typed.items()
        ]
    if None in conditions:
        return None
    return Head(column, zone, settings, tuple(c for c in conditions if c is not None))


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
    if name in LATER:
        expected = f"one that is judged: {', '.join(METRICS)}"
        p = at(table, row, head, "metric-not-executed", name, expected)
        if not any((p.kind, p.line, p.file) == (q.kind, q.line, q.file) for q in problems):
            problems.append(p)
        return None
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
            _condition(table, d, t, table.document.name, line_of_table(table), problems)
            for d, t in side.items()
        ]
        conditions.append(tuple(c for c in read if c is not None))
    return "when", ("",) * len(sides), tuple(conditions)


def notes_of(
    table: Table, row: Row, head: Head, marks: tuple[str, ...], problems: list[Problem]
) -> tuple[Note, ...]:
    """Give the footnotes of a cell, its row and its heads."""
    notes = []
    for mark in dict.fromkeys(marks):
        stated = table.notes.get(mark)
        if stated is None:
            fix = f"add {mark!r} under `notes: {{{table.id}: ...}}`"
            p = at(table, row, head, "undefined-footnote", f"[{mark}]", one_of(table.notes), fix)
            problems.append(p)
            continue
        effect = str(stated["effect"])
        decided = effect in ("info", "define") and stated.get("check") != "reviewer"
        text = (
            str(stated.get("text", ""))
            or f"footnote {mark} of {table.settings['clause']}: {effect}"
        )
        notes.append(Note(mark, effect, text, not decided))
    return tuple(notes)
