"""Conditions that leave a gap: an interval between two rows, a word that no row uses, a zone."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Mapping

from envcheck.errors import Problem, problem
from envcheck.model.ruleset import Condition, Limit
from envcheck.read.table_entry import CellKey, Table
from envcheck.read.table_meaning import head_of

Group = tuple[tuple[str, ...], str, str]


def check_coverage(
    table: Table, cells: Mapping[CellKey, tuple[Limit, ...]], problems: list[Problem]
) -> None:
    """Report what rows and heads of a sheet leave open, unless ``uncovered_allowed`` says why."""
    if table.unchanged:
        return
    allowed = table.settings.get("uncovered_allowed") or {}
    for name in (*table.sheet.when, *_of_heads(table)):
        dimension = table.dimensions[name]
        if name in allowed or dimension.kind == "date" or dimension.interpolate:
            continue
        if dimension.values:
            _words(table, name, cells, problems)
        else:
            _intervals(table, name, cells, problems)


def _of_heads(table: Table) -> tuple[str, ...]:
    """Dimensions on which heads state intervals, and the sheet has no column for."""
    levels = table.settings.get("head_levels") or [table.settings.get("heads") or {}]
    if not any(isinstance(level, Mapping) for level in levels):
        return ()
    found = (head_of(table, column, {}, []) for column in table.sheet.columns)
    names = (c.dimension for head in found if head is not None for c in head.when if not c.words)
    return tuple(n for n in dict.fromkeys(names) if n not in table.sheet.when)


def _words(
    table: Table, name: str, cells: Mapping[CellKey, tuple[Limit, ...]], problems: list[Problem]
) -> None:
    """Each declared word is used by some row, or some row asks nothing."""
    used: set[str] = set()
    for row in table.sheet.rows:
        typed = dict(row.when).get(name)
        if typed is None:
            return
        used |= {word.strip().casefold() for word in typed.split("|")}
    missing = [v for v in table.dimensions[name].values if v.casefold() not in used]
    if missing and cells:
        _report(table, name, " and ".join(missing[:4]), table.sheet.rows[-1].line, problems)


def _intervals(
    table: Table, name: str, cells: Mapping[CellKey, tuple[Limit, ...]], problems: list[Problem]
) -> None:
    """Intervals of the same element and metric leave no hole between them and no open end."""
    groups: dict[Group, dict[Condition, int]] = defaultdict(dict)
    by_row = name in table.sheet.when
    met: set[tuple[int, str, str]] = set()
    for limits in cells.values():
        for limit in limits:
            place = (limit.line, limit.metric, limit.path)
            if by_row and len(limits) == 1 and place in met:  # the same row in another zone
                continue
            met.add(place)
            own = next((c for c in limit.when if c.dimension == name), None)
            key = (limit.categories, limit.metric, limit.path)
            groups[key].setdefault(own or Condition(name), limit.line)
    seen: set[str] = set()
    for found in groups.values():
        hole = _hole(found)
        if hole and hole not in seen:
            seen.add(hole)
            _report(table, name, hole, max(found.values()), problems)


def _hole(conditions: Iterable[Condition]) -> str:
    """What the intervals leave out, in words; empty where nothing."""
    ordered = sorted(
        conditions, key=lambda c: (float("-inf") if c.low is None else c.low, not c.low_closed)
    )
    first = ordered[0]
    if first.low is not None and first.low > 0:
        return f"what lies below {first.text}"
    reach, closed, text = first.high, first.high_closed, first.text
    for c in ordered[1:]:
        if reach is None:
            return ""
        low = float("-inf") if c.low is None else c.low
        if low > reach or (low == reach and not (closed or c.low_closed)):
            return f"what lies between {text} and {c.text}"
        if c.high is None or (c.high, c.high_closed) > (reach, closed):
            reach, closed, text = c.high, c.high_closed, c.text
    return "" if reach is None else f"what lies above {text}"


def _report(table: Table, name: str, found: str, line: int, problems: list[Problem]) -> None:
    fill = {"found": found, "name": name}
    problems.append(problem("conditions-leave-gap", table.sheet.file, line, **fill))
