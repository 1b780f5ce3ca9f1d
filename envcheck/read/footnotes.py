"""Footnotes of a table as read: their conditions, and the readings of a cell that follow.

A footnote with conditions makes two readings of the cell: one for where they hold, one for where
they do not. So each reading has plain conditions, and selection knows no footnotes. What a machine
cannot decide (`check: reviewer`, or an effect without its figure) waits for the official.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any, NamedTuple

from envcheck.errors import Problem, problem
from envcheck.model.ruleset import Condition, Note, Term
from envcheck.read.cells import Grammar
from envcheck.read.condition_text import complement
from envcheck.read.rule_parts import intersect
from envcheck.read.table_entry import Table
from envcheck.read.table_meaning import condition

Conditions = tuple[Condition, ...]
NOT_HERE = "does not apply"
MOST_READINGS = 64
"""Of one cell; a cell with six conditional footnotes has 64."""


class Reading(NamedTuple):
    """One reading of a cell and the conditions under which it holds."""

    cell: str
    kind: str
    alternatives: tuple[tuple[Term, ...], ...]
    when: Conditions
    notes: tuple[Note, ...]
    metric: str
    sense: str
    unit: str


class Place(NamedTuple):
    """The cell that a footnote stands at."""

    zone: str
    categories: tuple[str, ...]
    printed: str
    grammar: Grammar
    where: str
    """Row and column, for messages."""
    line: int


class Footnote(NamedTuple):
    """A footnote of a table, its conditions read."""

    mark: str
    stated: Mapping[str, Any]
    text: str
    holding: tuple[Conditions, ...]
    """Any one of these sets; one empty set where it always holds."""
    others: tuple[Conditions, ...]
    """Where it does not hold, in sets that do not overlap."""
    steps: tuple[tuple[Conditions, str], ...] = ()
    """Of an exchange: conditions and the cell that holds under them."""


def read_footnote(table: Table, mark: str, problems: list[Problem]) -> Footnote | None:
    """Read the conditions of a footnote; None where the mark is not defined."""
    stated = table.notes.get(mark)
    if stated is None:
        return None
    line = line_of(table, mark)
    text = str(stated.get("text", ""))
    if not text and for_official(stated):
        p = problem("footnote-without-text", table.document.name, line, found=f"[{mark}]")
        if p not in problems:
            problems.append(p)
    text = text or f"footnote {mark} of {table.settings['clause']}: {stated['effect']}"
    typed = stated.get("when_any") or ([stated["when"]] if stated.get("when") else [])
    sets = [_conditions(table, entry, line, problems) for entry in typed]
    holding, others = _split(table, [s for s in sets if s is not None])
    steps = tuple(
        (read, str(cell))
        for bounds, cell in (stated.get("cells") or {}).items()
        if (read := _conditions(table, {stated.get("by"): bounds}, line, problems)) is not None
    )
    return Footnote(mark, stated, text, holding, others, steps)


def line_of(table: Table, mark: str) -> int:
    """Line of the rule set where a footnote is stated."""
    for owner in (table.id, "*"):
        if mark in ((table.document.get("notes") or {}).get(owner) or {}):
            return table.document.line("notes", owner, mark)
    return table.document.line(*table.at)


def _conditions(
    table: Table, typed: Mapping[str, Any], line: int, problems: list[Problem]
) -> Conditions | None:
    found = [condition(table, d, t, table.document.name, line, problems) for d, t in typed.items()]
    return None if None in found else tuple(c for c in found if c is not None)


def _split(
    table: Table, sets: Sequence[Conditions]
) -> tuple[tuple[Conditions, ...], tuple[Conditions, ...]]:
    """Cut all cases into sets of conditions that do not overlap: those that hold, the others."""
    if not sets:
        return ((),), ()
    holding: list[Conditions] = []
    rest: list[Conditions] = [()]
    for wanted in sets:
        holding += [joined for r in rest if (joined := join(r, wanted)) is not None]
        without = [
            (*wanted[:i], other)
            for i, c in enumerate(wanted)
            for other in complement(c, table.dimensions[c.dimension])
        ]
        rest = [joined for r in rest for w in without if (joined := join(r, w)) is not None]
    return tuple(holding), tuple(rest)


def join(a: Conditions, b: Conditions) -> Conditions | None:
    """Both sets of conditions; None where they cannot hold at once."""
    if any(x.dimension == y.dimension and not intersect(x, y) for x in a for y in b):
        return None
    return (*a, *(y for y in b if y not in a))


def for_official(stated: Mapping[str, Any]) -> bool:
    """Whether only a person can decide the footnote."""
    effect = stated["effect"]
    if stated.get("check") == "reviewer":
        return True
    needs = {
        "replace": stated.get("cell") or stated.get("by_zone"),
        "alternative": stated.get("cell") or stated.get("by_zone"),
        "add": stated.get("add"),
        "scale": stated.get("factor"),
        "convert": stated.get("metric"),
        "exchange": stated.get("cells"),
        "exempt": stated.get("when") or stated.get("when_any") or stated.get("zones"),
        "require": stated.get("when") or stated.get("when_any"),
    }
    return effect in needs and (not needs[effect] or bool(stated.get("part")))
