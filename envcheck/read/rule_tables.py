"""A printed table in long form: every cell becomes a limit with its zone, row, metric, conditions.

The sheet gives the figures, ``tables`` in ``ruleset.yaml`` their meaning: what a row covers
(``rows``), what a head means (``head_levels`` or ``heads``), what a slash or a plus stands for.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import Problem, problem
from envcheck.model.ruleset import Condition, Limit, Note
from envcheck.read.cells import Branch, Cell, CellError, Grammar, read_cell
from envcheck.read.sheets import Column, Row
from envcheck.read.table_entry import METRICS, CellKey, Head, Table, at
from envcheck.read.table_meaning import (
    categories_of,
    check_zones,
    conditions_of,
    head_of,
    metric_of,
    notes_of,
    row_settings,
    slash_of,
)


def expand(table: Table, problems: list[Problem]) -> dict[CellKey, tuple[Limit, ...]]:
    """Turn a table into limits, cell by cell; a cell marked unchanged is left out."""
    cells: dict[CellKey, tuple[Limit, ...]] = {}
    heads = [h for h in (head_of(table, c, problems) for c in table.sheet.columns) if h is not None]
    check_zones(table, heads, problems)
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
    heads: list[Head],
    above: dict[int, tuple[str, str]],
    problems: list[Problem],
) -> Iterator[tuple[Column, tuple[Limit, ...]]]:
    settings = row_settings(table, row, problems)
    when = conditions_of(table, row, problems)
    if settings is None or when is None:
        return
    left: tuple[str, str] = ("", "")
    first = table.sheet.columns[0].at
    for head in heads:
        spot = _spot(table, row, head, settings, when, problems)
        if spot is None:
            left = ("", "")
            continue
        text = row.cells[head.column.at - first]
        merged = {"<": left, "^": above.get(head.column.at, ("", ""))}.get(text)
        if merged is not None:
            if merged[1] != spot.metric:
                problems.append(at(table, row, head, "merged-across-quantities", text))
                continue
            text = merged[0]
        left = above[head.column.at] = (text, spot.metric)
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
    head: Head,
    settings: Mapping[str, Any],
    when: tuple[Condition, ...],
    problems: list[Problem],
) -> _Spot | None:
    merged = {**settings, **head.settings}
    path = str(merged.get("path", "")) or table.path
    metric = metric_of(table, row, head, merged.get("metric"), path, problems)
    categories = categories_of(table, row, merged.get("element"), problems)
    if metric is None or categories is None:
        return None
    sense = str(merged.get("limit", METRICS[metric].sense))
    if sense != METRICS[metric].sense and METRICS[metric].key:
        expected = f"{METRICS[metric].sense} for {metric}"
        problems.append(at(table, row, head, "sense-against-metric", sense, expected))
        return None
    key = METRICS[metric].key
    unit = table.units.get(key, "")
    if key and not unit:
        problems.append(
            at(table, row, head, "missing-table-unit", metric, f"units: {{{key}: ...}}")
        )
        return None
    kind, roles, slash = slash_of(table, merged.get("slash"), problems)
    zone = row.key if table.settings.get("orientation") == "zones_down" else head.zone
    grammar = Grammar(
        metric,
        sense,
        unit == units.label(METRICS[metric].quantity, "SI"),
        str(table.other.get("decimal", ".")),
        tuple(map(str, merged.get("plus") or ())) if metric == "R_insulation" else (),
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
    table: Table, row: Row, head: Head, spot: _Spot, text: str, problems: list[Problem]
) -> Cell | None:
    try:
        cell = read_cell(text, spot.grammar)
    except CellError as error:
        p = at(table, row, head, error.kind, text, error.expected, error.fix)
        problems.append(p)
        return None
    if cell.refers.startswith("see "):
        expected = "a figure (references to another row are not yet read)"
        problems.append(at(table, row, head, "cell-not-executed", text, expected))
        return None
    if cell.refers == "unchanged" and not table.unchanged:
        problems.append(at(table, row, head, "unchanged-without-base", text))
        return None
    if spot.metric != "R_insulation" and not all(map(_has_own_number, cell.branches)):
        expected = f"one number of the row's own metric, {spot.metric}"
        problems.append(at(table, row, head, "cell-not-executed", text, expected))
        return None
    return cell


def _has_own_number(branch: Branch) -> bool:
    """Whether a branch names no figure, or one of the row's own metric."""
    return branch.kind != "number" or any(
        len(alternative) == 1 and not alternative[0].metric for alternative in branch.alternatives
    )


def _limits(
    table: Table, row: Row, head: Head, spot: _Spot, cell: Cell, problems: list[Problem]
) -> tuple[Limit, ...]:
    notes = notes_of(table, row, head, (*cell.marks, *row.marks, *head.column.marks), problems)
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
