"""What is kept while a table is expanded: looked up once, used for many cells."""

from __future__ import annotations

from envcheck.errors import Problem
from envcheck.model.ruleset import Condition, Note, Term
from envcheck.read.footnotes import Footnote
from envcheck.read.sheets import Row
from envcheck.read.spots import Spot
from envcheck.read.table_entry import Head, Table
from envcheck.read.table_meaning import Cover


class Expansion:
    """A table being expanded: what is looked up once and used for many cells."""

    def __init__(self, table: Table, problems: list[Problem], heads: list[Head]) -> None:
        self.table = table
        self.problems = problems
        self.heads = heads
        self.id = table.id
        self.first = table.sheet.columns[0].at
        self.spots: dict[str, list[Spot | None]] = {}
        """By row pattern, one for each head."""
        self.covers: dict[tuple[str, str], tuple[Cover, ...]] = {}
        self.footnotes: dict[str, Footnote | None] = {}
        self.plain: dict[tuple[str, ...], tuple[Note, ...]] = {}
        """Footnotes by marks, where they only are printed."""
        self.above: dict[int, tuple[str, str]] = {}


class Line:
    """A row being expanded."""

    def __init__(self, row: Row, pattern: str, when: tuple[Condition, ...]) -> None:
        self.row = row
        self.pattern = pattern
        self.when = when
        self.words = ",".join([f"{c.dimension}={c.text}" for c in when])
        self.triggers: dict[str, tuple[Term, str]] = {}
        """Head of a target -> its threshold, and how it is printed."""
        self.covers: dict[str, tuple[Cover, ...]] = {}
