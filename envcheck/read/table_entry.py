"""One printed table with its meaning and its surroundings, and problems placed in it."""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType
from typing import Any, NamedTuple

from envcheck.errors import Problem, did_you_mean, one_of, problem
from envcheck.model.ruleset import Condition, Dimension, Weight
from envcheck.read.rule_documents import Document
from envcheck.read.sheets import Column, Row, Sheet

MEANINGS = (
    "element", "metric", "limit", "when", "path", "applies_to", "plus", "slash", "extent", "see",
    "in_force", "depth_to",
)  # fmt: skip
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
    inherited: Mapping[tuple[str, ...], tuple[str, ...]] = MappingProxyType({})
    """Footnote marks of the base's heads (by heads) and rows (by key), which an amendment keeps."""
    weights: tuple[Weight, ...] = ()

    @property
    def id(self) -> str:
        """Id of the table."""
        return str(self.settings["id"])


class Head(NamedTuple):
    """What a printed column means."""

    column: Column
    zone: str
    settings: dict[str, Any]
    when: tuple[Condition, ...]
    marks: tuple[str, ...] = ()
    trigger_of: str = ""
    """Printed head of the target, where the column holds the threshold for it."""


def at(
    table: Table,
    row: Row,
    head: Head,
    kind: str,
    found: object,
    expected: object = "",
    fix: str = "",
) -> Problem:
    """A problem of a cell, with its column in words."""
    where = f"row {row.key!r}, column {head.column.name!r}"
    fill: dict[str, Any] = {"found": found, "expected": expected, "fix": fix, "where": where}
    return problem(kind, table.sheet.file, row.line, **fill)


def zone_problem(table: Table, zone: str, line: int | None) -> Problem:
    """A zone that the order does not know."""
    fix = did_you_mean(zone, table.zones)
    expected = one_of(table.zones)
    line = line or 1
    file = table.sheet.file
    return problem("unknown-zone-head", file, line, found=zone, expected=expected, fix=fix)


def line_of_table(table: Table) -> int:
    """Line of the table's entry in ``ruleset.yaml``."""
    return table.document.line(*table.at)
