"""A printed table in long form: every cell becomes a limit with its zone, row, metric, conditions.

The sheet gives the figures, ``tables`` in ``ruleset.yaml`` their meaning: what a row covers
(``rows``), what a head means (``head_levels`` or ``heads``), what a slash or a plus stands for,
what a footnote does. A cell with conditional footnotes becomes a limit for each case.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from itertools import pairwise

from envcheck.errors import Problem, problem
from envcheck.model.days import ordinal
from envcheck.model.ruleset import Condition, Limit
from envcheck.read.cell_limits import limits_of, plain_limits
from envcheck.read.cells import Branch, Cell, CellError, known_cell
from envcheck.read.condition_text import period_of
from envcheck.read.expansion import Expansion, Line
from envcheck.read.sheets import MOST_PROBLEMS, Row
from envcheck.read.spots import Spot, spot_of
from envcheck.read.table_entry import CellKey, Head, Table, at
from envcheck.read.table_meaning import (
    check_zones,
    conditions_of,
    head_of,
    head_periods,
    row_pattern,
)


def expand(table: Table, problems: list[Problem]) -> dict[CellKey, tuple[Limit, ...]]:
    """Turn a table into limits, cell by cell; a cell marked unchanged is left out."""
    periods = head_periods(table, problems)
    found = (head_of(table, column, periods, problems) for column in table.sheet.columns)
    heads = [h for h in found if h is not None]
    check_zones(table, heads, problems)
    cells: dict[CellKey, tuple[Limit, ...]] = {}
    expansion = Expansion(table, problems, heads)
    before = len(problems)
    seen: dict[tuple[str, tuple[tuple[str, str], ...]], int] = {}
    ends = _days(table)
    for row in table.sheet.rows:
        if len(problems) - before > MOST_PROBLEMS:
            break
        same = (row.key, row.when)
        if same in seen:
            fill = {"found": row.key, "where": f"line {seen[same]}"}
            problems.append(problem("repeated-row", table.sheet.file, row.line, **fill))
            continue
        seen[same] = row.line
        line = _line(expansion, row, ends)
        if line is not None:
            for key, limits in _row_limits(expansion, line):
                cells[key] = limits
    return cells


def _line(e: Expansion, row: Row, ends: Mapping[tuple[str, object], float]) -> Line | None:
    pattern = row_pattern(e.table, row, e.problems)
    when = None if pattern is None else conditions_of(e.table, row, pattern, e.problems)
    if pattern is None or when is None:
        return None
    if ends:
        when = tuple(_until(c, row, e.table, ends) for c in when)
    return Line(row, pattern, when)


# ------------------------------------------------------------------------------- rows by date


def _days(table: Table) -> dict[tuple[str, object], float]:
    """By dimension and row, the day on which the next row of the same key begins."""
    dates = [d for d in table.sheet.when if table.dimensions[d].kind == "date"]
    ends: dict[tuple[str, object], float] = {}
    for d in dates:
        same: dict[object, list[tuple[str, Row]]] = {}
        for row in table.sheet.rows:
            typed = dict(row.when)
            if d in typed and not typed[d].startswith("["):
                rest = tuple(pair for pair in row.when if pair[0] != d)
                same.setdefault((row.key, rest), []).append((typed[d], row))
        for rows in same.values():
            rows.sort(key=lambda item: item[0])
            for (_, row), (following, _) in pairwise(rows):
                end = ordinal(following)
                if end is not None:  # no day is said where the row itself is read
                    ends[(d, (row.key, row.when))] = end
    return ends


def _until(
    c: Condition, row: Row, table: Table, ends: Mapping[tuple[str, object], float]
) -> Condition:
    end = ends.get((c.dimension, (row.key, row.when)))
    if end is None or c.low is None or c.low >= end:
        return c
    return period_of(c.dimension, c.low, end)


# ------------------------------------------------------------------------------------ one row


def _row_limits(e: Expansion, line: Line) -> Iterator[tuple[CellKey, tuple[Limit, ...]]]:
    table, row = e.table, line.row
    blank_is_fine = table.settings.get("blank") == "not_printed"
    spots = e.spots.get(line.pattern)
    if spots is None:
        found = [spot_of(table, row, h, line.pattern, e.problems) for h in e.heads]
        spots = e.spots[line.pattern] = found
    for head, spot in zip(e.heads, spots, strict=True):
        if head.trigger_of:
            _threshold(e, line, head, spot)
    plain = not (row.marks or line.triggers or table.inherited)
    left: tuple[str, str] = ("", "")
    for head, spot in zip(e.heads, spots, strict=True):
        if head.trigger_of:
            continue
        if spot is None:
            left = ("", "")
            continue
        place = head.column.at
        text = row.cells[place - e.first]
        if text in _MERGED:
            merged = left if text == "<" else e.above.get(place, ("", ""))
            if merged[1] != spot.metric:
                e.problems.append(at(table, row, head, "merged-across-quantities", text))
                continue
            text = merged[0]
        left = e.above[place] = (text, spot.metric)
        if not text and blank_is_fine:
            continue
        cell = spot.cells.get(text) or _cell(e, line, head, spot, text)
        if cell is None or cell.refers == "unchanged":
            continue
        key = (e.id, row.key, row.when, head.column.heads)
        if plain and spot.plain and not head.when and not head.marks and cell.plain:
            yield key, plain_limits(e, line, head, spot, cell)
        else:
            yield key, limits_of(e, line, head, spot, cell)


_MERGED = ("<", "^")


def _threshold(e: Expansion, line: Line, head: Head, spot: Spot | None) -> None:
    """Read the threshold of a row; its target stands in another column."""
    text = line.row.cells[head.column.at - e.first]
    cell = None if spot is None else _cell(e, line, head, spot, text)
    if cell is None or cell.branches[0].kind != "number":
        return
    line.triggers[head.trigger_of] = cell.branches[0].alternatives[0][0], cell.text


def _cell(e: Expansion, line: Line, head: Head, spot: Spot, text: str) -> Cell | None:
    """Read a cell that this row and column have not met yet."""
    try:
        cell = known_cell(text, spot.grammar)
    except CellError as error:
        p = at(e.table, line.row, head, error.kind, text, error.expected, error.fix)
        e.problems.append(p)
        return None
    if cell.refers == "unchanged" and not e.table.unchanged:
        e.problems.append(at(e.table, line.row, head, "unchanged-without-base", text))
        return None
    if spot.metric != "R_insulation" and not all(map(_has_own_number, cell.branches)):
        expected = f"one number of the row's own metric, {spot.metric}"
        e.problems.append(at(e.table, line.row, head, "cell-not-executed", text, expected))
        return None
    spot.cells[text] = cell
    return cell


def _has_own_number(branch: Branch) -> bool:
    """Whether a branch names no figure, or one of the row's own metric."""
    return branch.kind != "number" or any(
        len(alternative) == 1 and not alternative[0].metric for alternative in branch.alternatives
    )
