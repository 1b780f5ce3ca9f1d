"""Cells that name another row: ``see wall.mass`` takes its figure, ``see wall.*`` asks which."""

from __future__ import annotations

from collections.abc import Mapping

from envcheck.errors import Problem, one_of
from envcheck.model.patterns import matches
from envcheck.model.ruleset import Condition, Note
from envcheck.read.cells import Cell, CellError, read_cell
from envcheck.read.footnotes import Reading, join
from envcheck.read.sheets import Row
from envcheck.read.spots import Spot
from envcheck.read.table_entry import Head, Table, at
from envcheck.read.table_meaning import condition

DEEPEST = 8
"""References that may lead to one another."""


def resolve(
    table: Table,
    row: Row,
    head: Head,
    spot: Spot,
    cell: Cell,
    when: tuple[Condition, ...],
    problems: list[Problem],
) -> list[Reading]:
    """Give the readings of a cell that refers to another row, or to one of several."""
    wanted = cell.refers.removeprefix("see ")
    if "*" not in wanted:
        found = _figure(table, row, head, spot, wanted, problems)
        return [_reading(spot, found, when)] if found is not None else []
    if isinstance(spot.see, Mapping):
        return _by_fact(table, row, head, spot, wanted, when, problems)
    if not spot.see:
        _unknown(table, row, head, wanted, problems)
        return []
    note = Note("see", "info", str(spot.see), True)
    reading = Reading(cell.text, "number", (), when, (note,), spot.metric, spot.sense, spot.unit)
    return [reading]


def _by_fact(
    table: Table,
    row: Row,
    head: Head,
    spot: Spot,
    wanted: str,
    when: tuple[Condition, ...],
    problems: list[Problem],
) -> list[Reading]:
    """``see: {by: construction, rows: {mass: wall.mass}}``: a fact of the project says which."""
    readings = []
    dimension = str(spot.see.get("by", ""))
    for word, key in (spot.see.get("rows") or {}).items():
        if not matches(wanted, str(key)):
            _unknown(table, row, head, str(key), problems)
            continue
        found = _figure(table, row, head, spot, str(key), problems)
        own = condition(table, dimension, word, table.document.name, None, problems)
        joined = None if own is None else join(when, (own,))
        if found is not None and joined is not None:
            readings.append(_reading(spot, found, joined))
    return readings


def _figure(
    table: Table, row: Row, head: Head, spot: Spot, key: str, problems: list[Problem]
) -> Cell | None:
    """The cell of another row in this column, read as one of this row's metric."""
    place = head.column.at - table.sheet.columns[0].at
    seen = {row.key}
    for _ in range(DEEPEST):
        rows = [r for r in table.sheet.rows if r.key == key]
        same = [r for r in rows if r.when == row.when] or rows
        if len(same) != 1 or key in seen:
            break
        seen.add(key)
        text = same[0].cells[place]
        try:
            cell = read_cell(text, spot.grammar)
        except CellError as error:
            p = at(table, row, head, error.kind, f"see {key}: {text}", error.expected, error.fix)
            problems.append(p)
            return None
        if cell.refers.startswith("see "):
            key = cell.refers.removeprefix("see ")
            continue
        if cell.refers or len(cell.branches) > 1:
            break
        return cell._replace(text=f"{cell.text} (see {same[0].label})")
    _unknown(table, row, head, key, problems)
    return None


def _reading(spot: Spot, cell: Cell, when: tuple[Condition, ...]) -> Reading:
    branch = cell.branches[0]
    return Reading(
        cell.text, branch.kind, branch.alternatives, when, (), spot.metric, spot.sense, spot.unit
    )


def _unknown(table: Table, row: Row, head: Head, key: str, problems: list[Problem]) -> None:
    keys = [r.key for r in table.sheet.rows if r.key != row.key]
    p = at(table, row, head, "unknown-reference", f"see {key}", one_of(dict.fromkeys(keys)))
    if p not in problems:
        problems.append(p)
