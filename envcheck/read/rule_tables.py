"""A printed table in long form: every cell becomes a limit with its zone, row, metric, conditions.

The sheet gives the figures, ``tables`` in ``ruleset.yaml`` their meaning: what a row covers
(``rows``), what a head means (``head_levels`` or ``heads``), what a slash or a plus stands for.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from fnmatch import fnmatchcase
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.ruleset import Condition, Dimension, Limit, Note
from envcheck.read.cells import Branch, Cell, CellError, Grammar, read_cell, read_condition
from envcheck.read.rule_documents import Document
from envcheck.read.sheets import Column, Row, Sheet


class Metric(NamedTuple):
    """What a limit may speak of: key of ``units``, quantity, usual sense."""

    key: str
    quantity: str
    sense: str


METRICS = {
    "U_assembly": Metric("U", "u_factor", "max"),
    "U_product": Metric("U", "u_factor", "max"),
    "C_factor": Metric("C", "u_factor", "max"),
    "F_factor": Metric("F", "linear_transmittance", "max"),
    "R_insulation": Metric("R", "resistance", "min"),
    "SHGC": Metric("", "number", "max"),
    "VT": Metric("", "number", "min"),
}
LATER = (
    "R_total", "R_construction", "RSI_effective", "R_old_and_new", "U_glazing", "U_curtain_wall",
    "U_mean", "K_global", "VT_per_SHGC", "solar_admittance", "solar_absorptance",
)  # fmt: skip
"""Metrics that the format knows and that are not judged yet."""
MEANINGS = ("element", "metric", "limit", "when", "path", "applies_to", "plus", "slash", "extent")
CellKey = tuple[str, str, tuple[tuple[str, str], ...], tuple[str, ...]]
"""(table id, row key, conditions as typed, heads): finds the cell that an amendment replaces."""


class Table(NamedTuple):
    """One entry of ``tables`` with its sheet and what it needs of the rule set around it."""

    document: Document
    at: tuple[str | int, ...]
    """Path of the entry in the document, for its lines."""
    settings: Mapping[str, Any]
    sheet: Sheet
    dimensions: Mapping[str, Dimension]
    zones: tuple[str, ...]
    units: Mapping[str, str]
    """Unit key -> label of :mod:`envcheck.units`."""
    notes: Mapping[str, Any]
    """mark -> note"""
    other: Mapping[str, Any]
    """Rule-set-wide settings: decimal, suffixes, other_metrics, no_requirement_words."""
    categories: tuple[str, ...]
    path: str
    """Path of the whole table, where ``paths`` names tables."""
    unchanged: bool
    """A cell may be ``.``: the table amends another."""

    @property
    def id(self) -> str:
        """Id of the table."""
        return str(self.settings["id"])


class _Head(NamedTuple):
    """What a printed column means."""

    column: Column
    zone: str
    settings: dict[str, Any]
    when: tuple[Condition, ...]


def expand(table: Table, problems: list[Problem]) -> dict[CellKey, tuple[Limit, ...]]:
    """Turn a table into limits, cell by cell; a cell marked unchanged is left out."""
    cells: dict[CellKey, tuple[Limit, ...]] = {}
    heads = [h for h in (_head(table, c, problems) for c in table.sheet.columns) if h is not None]
    _check_zones(table, heads, problems)
    first_line: dict[tuple[str, tuple[tuple[str, str], ...]], int] = {}
    above: dict[int, tuple[str, str]] = {}
    for row in table.sheet.rows:
        same = (row.key, row.when)
        if same in first_line:
            found, where = row.key, f"line {first_line[same]}"
            p = problem("repeated-row", table.sheet.file, row.line, found=found, where=where)
            problems.append(p)
            continue
        first_line[same] = row.line
        for column, limits in _row_limits(table, row, heads, above, problems):
            cells[(table.id, row.key, row.when, column.heads)] = limits
    return cells


def _row_limits(
    table: Table,
    row: Row,
    heads: list[_Head],
    above: dict[int, tuple[str, str]],
    problems: list[Problem],
) -> Iterator[tuple[Column, tuple[Limit, ...]]]:
    settings = _row_settings(table, row, problems)
    when = _sheet_conditions(table, row, problems)
    if settings is None or when is None:
        return
    left: tuple[str, str] = ("", "")
    first = table.sheet.columns[0].index
    for head in heads:
        spot = _spot(table, row, head, settings, when, problems)
        if spot is None:
            left = ("", "")
            continue
        text = row.cells[head.column.index - first]
        merged = {"<": left, "^": above.get(head.column.index, ("", ""))}.get(text)
        if merged is not None:
            if merged[1] != spot.metric:
                problems.append(_at(table, row, head, "merged-across-quantities", text))
                continue
            text = merged[0]
        left = above[head.column.index] = (text, spot.metric)
        if not text and table.settings.get("blank") == "not_printed":
            continue
        cell = _cell(table, row, head, spot, text, problems)
        if cell is not None and cell.refers != "unchanged":
            yield head.column, _limits(table, row, head, spot, cell, problems)


# ---------------------------------------------------------------------------------- one cell


class _Spot(NamedTuple):
    """Where row and column meet: everything but the figure."""

    zone: str
    metric: str
    sense: str
    path: str
    applies_to: str
    categories: tuple[str, ...]
    when: tuple[Condition, ...]
    slash: tuple[tuple[Condition, ...], ...]
    grammar: Grammar


def _spot(
    table: Table,
    row: Row,
    head: _Head,
    settings: Mapping[str, Any],
    when: tuple[Condition, ...],
    problems: list[Problem],
) -> _Spot | None:
    merged = {**settings, **head.settings}
    path = str(merged.get("path", "")) or table.path
    metric = _metric(table, row, head, merged.get("metric"), path, problems)
    categories = _categories(table, row, merged.get("element"), problems)
    if metric is None or categories is None:
        return None
    sense = str(merged.get("limit", METRICS[metric].sense))
    if sense != METRICS[metric].sense and METRICS[metric].key:
        expected = f"{METRICS[metric].sense} for {metric}"
        problems.append(_at(table, row, head, "sense-against-metric", sense, expected))
        return None
    key = METRICS[metric].key
    unit = table.units.get(key, "")
    if key and not unit:
        problems.append(_at(table, row, head, "missing-table-unit", metric, f"units: {{{key}: ...}}"))
        return None
    kind, roles, slash = _slash(table, merged.get("slash"), problems)
    zone = row.key if table.settings.get("orientation") == "zones_down" else head.zone
    grammar = Grammar(
        metric,
        sense,
        unit == units.label(METRICS[metric].quantity, "SI"),
        str(table.other.get("decimal", ".")),
        tuple(merged.get("plus", ())) if metric == "R_insulation" else (),
        kind,
        roles,
        str(merged.get("extent", "")),
        tuple(table.other.get("suffixes", ())),
        tuple(table.other.get("no_requirement_words", ())),
        tuple(table.other.get("other_metrics", ())),
    )
    applies_to = str(merged.get("applies_to", "each_component"))
    every = (*when, *head.when)
    return _Spot(zone, metric, sense, path, applies_to, categories, every, slash, grammar)


def _cell(
    table: Table, row: Row, head: _Head, spot: _Spot, text: str, problems: list[Problem]
) -> Cell | None:
    try:
        cell = read_cell(text, spot.grammar)
    except CellError as error:
        found = text or "a blank cell"
        p = _at(table, row, head, error.kind, found, error.expected, error.fix)
        problems.append(p)
        return None
    if cell.refers.startswith("see "):
        expected = "a figure (references to another row are not yet read)"
        problems.append(_at(table, row, head, "cell-not-executed", text, expected))
        return None
    if cell.refers == "unchanged" and not table.unchanged:
        problems.append(_at(table, row, head, "unchanged-without-base", text))
        return None
    return cell


def _limits(
    table: Table, row: Row, head: _Head, spot: _Spot, cell: Cell, problems: list[Problem]
) -> tuple[Limit, ...]:
    notes = _notes(table, row, head, (*cell.marks, *row.marks, *head.column.marks), problems)
    single = len(cell.branches) == 1
    extra = ((),) if single else spot.slash
    return tuple(
        _limit(table, row, spot, cell, branch, (*spot.when, *conditions), notes)
        for branch, conditions in zip(cell.branches, extra, strict=True)
    )


def _limit(
    table: Table,
    row: Row,
    spot: _Spot,
    cell: Cell,
    branch: Branch,
    when: tuple[Condition, ...],
    notes: tuple[Note, ...],
) -> Limit:
    ruleset = table.document.id
    conditions = ",".join(f"{c.dimension}={c.text}" for c in when)
    place = f"{ruleset}/{table.id}/{spot.zone}/{row.key}/{spot.metric}"
    return Limit(
        id=f"{place}[{conditions}]" if conditions else place,
        ruleset=ruleset,
        table=table.id,
        clause=str(table.settings["clause"]),
        zone=spot.zone,
        row=row.key,
        label=row.label,
        categories=spot.categories,
        metric=spot.metric,
        sense=spot.sense,
        unit=table.units.get(METRICS[spot.metric].key, ""),
        cell=cell.text,
        kind=branch.kind,
        alternatives=branch.alternatives,
        when=when,
        path=spot.path,
        applies_to=spot.applies_to,
        notes=notes,
        src=row.src,
        file=f"{ruleset}/{table.settings['file']}",
        line=row.line,
    )


# ------------------------------------------------------------------------------ rows and heads


def best_pattern(name: str, patterns: Mapping[str, Any]) -> str | None:
    """Give the most specific pattern that a name matches; None without one."""
    if name in patterns:
        return name
    fits = [p for p in patterns if fnmatchcase(name, p)]
    return max(fits, key=lambda p: (len(p.replace("*", "")), p)) if fits else None


def _row_settings(table: Table, row: Row, problems: list[Problem]) -> Mapping[str, Any] | None:
    """Settings of the table under those of the row."""
    general = {k: table.settings[k] for k in MEANINGS if k in table.settings and k != "when"}
    if table.settings.get("orientation") == "zones_down":
        if row.key in table.zones:
            return general
        problems.append(_zone_problem(table, row.key, row.line))
        return None
    rows: Mapping[str, Any] = table.settings.get("rows") or {}
    pattern = best_pattern(row.key, rows)
    if pattern is None and rows and row.key not in table.categories:
        expected, fix = one_of(rows), did_you_mean(row.key, rows)
        fix = fix or f"add {row.key!r} under `rows:` and name its `element:`"
        file, line = table.sheet.file, row.line
        p = problem("unmapped-row", file, line, found=row.key, expected=expected, fix=fix)
        problems.append(p)
        return None
    return general if pattern is None else {**general, **rows[pattern]}


def _categories(
    table: Table, row: Row, element: Any, problems: list[Problem]
) -> tuple[str, ...] | None:
    """Categories that the row covers: those stated, else the row's key itself."""
    names = [element] if isinstance(element, str) else list(element or [row.key])
    for name in names:
        if not any(fnmatchcase(known, name) for known in table.categories):
            fix = did_you_mean(name, table.categories)
            fix = fix or f"name an envcheck category: `rows: {{{row.key}: {{element: ...}}}}`"
            file, line = table.sheet.file, row.line
            p = problem("unmapped-row", file, line, found=name, expected="a category", fix=fix)
            if p not in problems:
                problems.append(p)
            return None
    return tuple(names)


def _sheet_conditions(
    table: Table, row: Row, problems: list[Problem]
) -> tuple[Condition, ...] | None:
    """Conditions of the table, of the row's settings and of its ``when:`` cells."""
    rows: Mapping[str, Any] = table.settings.get("rows") or {}
    pattern = best_pattern(row.key, rows)
    stated = rows[pattern].get("when", {}) if pattern is not None else {}
    typed = {**(table.settings.get("when") or {}), **stated}
    found = [
        *(_condition(table, d, t, table.document.name, _line(table), problems) for d, t in typed.items()),
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
        joined = "|".join(text) if isinstance(text, list) else str(text)
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


def _head(table: Table, column: Column, problems: list[Problem]) -> _Head | None:
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
                problems.append(_zone_problem(table, level, None))
                return None
            continue
        if not isinstance(meaning, Mapping) or level not in meaning:
            known = list(meaning) if isinstance(meaning, Mapping) else []
            fix = did_you_mean(level, known) or f"say under `head_levels` or `heads` what {level!r} means"
            fill = {"found": level, "expected": one_of(known), "fix": fix, "found_head": level}
            problems.append(problem("unknown-head", table.sheet.file, 1, **fill))
            return None
        said = dict(meaning[level] or {})
        typed = {**(said.pop("when", None) or {})}
        typed |= {k: v for k, v in said.items() if k not in MEANINGS}
        settings |= {k: v for k, v in said.items() if k in MEANINGS}
        conditions += [
            _condition(table, d, t, table.document.name, _line(table), problems)
            for d, t in typed.items()
        ]
    if None in conditions:
        return None
    return _Head(column, zone, settings, tuple(c for c in conditions if c is not None))


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


def _check_zones(table: Table, heads: list[_Head], problems: list[Problem]) -> None:
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


# ------------------------------------------------------------------------------------- meaning


def _metric(
    table: Table, row: Row, head: _Head, stated: Any, path: str, problems: list[Problem]
) -> str | None:
    name = stated.get(path) if isinstance(stated, Mapping) else stated
    if name in METRICS:
        return str(name)
    if name in LATER:
        expected = f"one that is judged: {', '.join(METRICS)}"
        problems.append(_at(table, row, head, "metric-not-executed", name, expected))
        return None
    fix = did_you_mean(str(name), METRICS) if name else ""
    found = name or (f"no metric for the path {path!r}" if path else "no metric")
    problems.append(_at(table, row, head, "unknown-metric", found, one_of(METRICS), fix))
    return None


def _slash(
    table: Table, stated: Any, problems: list[Problem]
) -> tuple[str, tuple[str, ...], tuple[tuple[Condition, ...], ...]]:
    """Give kind, roles and conditions of a slash."""
    if not stated:
        return "", (), ()
    kind, sides = next(iter(stated.items()))
    if kind != "when":
        return kind, tuple(sides), ()
    conditions = []
    for side in sides:
        read = [
            _condition(table, d, t, table.document.name, _line(table), problems)
            for d, t in side.items()
        ]
        conditions.append(tuple(c for c in read if c is not None))
    return "when", ("",) * len(sides), tuple(conditions)


def _notes(
    table: Table, row: Row, head: _Head, marks: tuple[str, ...], problems: list[Problem]
) -> tuple[Note, ...]:
    notes = []
    for mark in dict.fromkeys(marks):
        stated = table.notes.get(mark)
        if stated is None:
            fix = f"add {mark!r} under `notes: {{{table.id}: ...}}`"
            p = _at(table, row, head, "undefined-footnote", f"[{mark}]", one_of(table.notes), fix)
            problems.append(p)
            continue
        effect = str(stated["effect"])
        decided = effect in ("info", "define") and stated.get("check") != "reviewer"
        text = str(stated.get("text", "")) or f"footnote {mark} of {table.settings['clause']}: {effect}"
        notes.append(Note(mark, effect, text, not decided))
    return tuple(notes)


# -------------------------------------------------------------------------------------- places


def _at(
    table: Table,
    row: Row,
    head: _Head,
    kind: str,
    found: object,
    expected: object = "",
    fix: str = "",
) -> Problem:
    """A problem of a cell, with its column in words."""
    where = f"row {row.key!r}, column {head.column.name!r}"
    fill = {"found": found, "expected": expected, "fix": fix, "where": where}
    return problem(kind, table.sheet.file, row.line, **fill)


def _zone_problem(table: Table, zone: str, line: int | None) -> Problem:
    fix = did_you_mean(zone, table.zones)
    expected = one_of(table.zones)
    line = line or 1
    file = table.sheet.file
    return problem("unknown-zone-head", file, line, found=zone, expected=expected, fix=fix)


def _line(table: Table) -> int | None:
    return table.document.line(*table.at)
