"""Where a row and a column meet: everything that a cell needs but its figure."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any, NamedTuple

from envcheck import units
from envcheck.errors import Problem, problem
from envcheck.model.metrics import METRICS
from envcheck.model.ruleset import Condition
from envcheck.read.cells import Cell, Grammar
from envcheck.read.sheets import Row
from envcheck.read.table_entry import Head, Table, at, line_of_table
from envcheck.read.table_meaning import merged_settings, metric_of, slash_of


class Spot(NamedTuple):
    """What row pattern and column say of a cell."""

    metric: str
    sense: str
    unit: str
    path: str
    applies_to: str
    element: Any
    element_key: str
    slash: tuple[tuple[Condition, ...], ...]
    """Conditions of each side of a slash."""
    grammar: Grammar
    see: Any
    depth_to: float | None
    zones_down: bool
    special: bool
    """The limit carries more than most: weights, a depth, the row for all other cases."""
    ruleset: str
    prefix: str
    """Of the limit's id: rule set and table."""
    clause: str
    file: str
    cells: dict[str, Cell]
    """Cells read so far, by text."""

    @property
    def plain(self) -> bool:
        """Nothing but a figure is asked of the cell."""
        return not self.special


def spot_of(
    table: Table, row: Row, head: Head, pattern: str, problems: list[Problem]
) -> Spot | None:
    """Give what row and head say together; None after a problem."""
    merged = merged_settings(table, head, pattern)
    path = str(merged.get("path", "")) or table.path
    metric = metric_of(table, row, head, merged.get("metric"), path, problems)
    if metric is None:
        return None
    known = METRICS[metric]
    sense = str(merged.get("limit", known.sense))
    if sense != known.sense and known.key:
        expected = f"{known.sense} for {metric}"
        problems.append(at(table, row, head, "sense-against-metric", sense, expected))
        return None
    unit = table.units.get(known.key, "")
    if known.key and not unit:
        expected = f"units: {{{known.key}: ...}}"
        problems.append(at(table, row, head, "missing-table-unit", metric, expected))
        return None
    kind, roles, slash = slash_of(table, merged.get("slash"), problems)
    depth = _depth(table, merged.get("depth_to"), problems)
    element, settings = merged.get("element"), table.settings
    special = bool(table.weights or depth is not None or settings.get("otherwise_row"))
    return Spot(
        metric, sense, unit, path, _applies_to(table, merged, problems), element, repr(element),
        slash, _grammar(table, merged, metric, sense, unit, kind, roles), merged.get("see"), depth,
        settings.get("orientation") == "zones_down", special, table.document.id,
        f"{table.document.id}/{table.id}/", str(settings["clause"]),
        f"{table.document.id}/{settings['file']}", {},
    )  # fmt: skip


def _applies_to(table: Table, merged: Mapping[str, Any], problems: list[Problem]) -> str:
    """Give what the limit holds for; ``by_head`` leaves that to each head."""
    stated = str(merged.get("applies_to", "each_component"))
    if stated == "by_head":
        line = line_of_table(table)
        fill = {"found": "by_head", "what": "`applies_to:` of each head, and one states none"}
        p = problem("not-executed", table.document.name, line, **fill)
        if p not in problems:
            problems.append(p)
    return stated


def _depth(table: Table, text: Any, problems: list[Problem]) -> float | None:
    if text is None:
        return None
    return table.document.figure(str(text), "length", table.at, problems)


def _grammar(
    table: Table,
    merged: Mapping[str, Any],
    metric: str,
    sense: str,
    unit: str,
    slash: str,
    roles: tuple[str, ...],
) -> Grammar:
    other = table.other
    bands: Mapping[str, Any] = other.get("bands") or {}
    return Grammar(
        metric,
        sense,
        unit == units.label(METRICS[metric].quantity, "SI"),
        str(other.get("decimal", ".")),
        tuple(map(str, merged.get("plus") or ())) if metric == "R_insulation" else (),
        slash,
        roles,
        str(merged.get("extent", "")),
        tuple(other.get("suffixes", ())),
        tuple(other.get("no_requirement_words", ())),
        tuple(other.get("other_metrics", ())),
        tuple((name, tuple(map(str, b))) for name, b in bands.items() if isinstance(b, list)),
    )
