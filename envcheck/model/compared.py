"""What differs between two revisions of a project, and what that did to their lines; numbers SI."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.model.judged import Finding, Group, Line, Ratio


class Difference(NamedTuple):
    """One thing that is not the same in both."""

    kind: str
    """What it is of: ``project``, ``site``, ``fact``, ``rule_set``, ``material``, ``assembly``,
    ``detail``, ``surface``, ``element``, ``exception``, ``options``; found while judging:
    ``setting``, ``class``, ``group``, ``ratio``"""
    name: str
    """Its id, tag or name; empty where there is one."""
    where: tuple[str, ...]
    """Parts within it, the outer one first: ``("Steel studs", "fill")``."""
    field: str
    """Empty where the whole part is meant."""
    what: str
    """``changed``, ``added``, ``dropped``, ``replaced``, ``moved`` or ``renamed``"""
    before: object
    """Number SI, word or record; None where there was none."""
    after: object
    quantity: str = ""
    """Of a number; empty for words, records and plain numbers."""


class LineChange(NamedTuple):
    """One line of both revisions that is not the same in both."""

    before: Line
    after: Line
    aspects: tuple[str, ...]
    """``verdict``, ``value``, ``limit``, ``category``, ``assembly``, ``area``, ``evidence``,
    ``method``, ``claim``, ``room``"""
    causes: tuple[Difference, ...]


class Moved(NamedTuple):
    """Area of a dropped element that elements of the same surface took over, m2."""

    dropped: tuple[str, ...]
    gained: tuple[str, ...]
    surface: str
    area: float


class Compared(NamedTuple):
    """Two revisions held against each other."""

    changed: tuple[LineChange, ...]
    added: tuple[Line, ...]
    dropped: tuple[Line, ...]
    unchanged: int
    """Lines that are the same in both."""
    differences: tuple[Difference, ...]
    """Everything that differs in what was read, in the order of the file."""
    same: tuple[tuple[str, int], ...]
    """How many of each kind are the same in both."""
    renamed: tuple[tuple[str, str], ...]
    """Elements whose tag alone changed."""
    moved: tuple[Moved, ...]
    settled: tuple[Finding, ...]
    """Findings that the first had and the second has not."""
    new: tuple[Finding, ...]
    ratios: tuple[tuple[Ratio | None, Ratio | None], ...]
    """Area ratios that changed."""
    groups: tuple[tuple[Group | None, Group | None], ...]
    """Means and trade-offs that changed."""
    rule_sets: tuple[tuple[str, str], ...]
    """Which rule set of the first stands for which of the second."""
