"""What is kept while a table is expanded: looked up once, used for many cells."""

from __future__ import annotations

from dataclasses import dataclass, field

from envcheck.errors import Problem
from envcheck.model.ruleset import Condition, Note, Term
from envcheck.read.footnotes import Footnote
from envcheck.read.sheets import Row
from envcheck.read.spots import Spot
from envcheck.read.table_entry import Head, Table
from envcheck.read.table_meaning import Cover


@dataclass(slots=True)
class Expansion:
    """A table being expanded: what is looked up once and used for many cells."""

    table: Table
    problems: list[Problem]
    heads: list[Head]
    spots: dict[str, list[Spot | None]] = field(default_factory=dict)
    """By row pattern, one for each head."""
    covers: dict[tuple[str, str], tuple[Cover, ...]] = field(default_factory=dict)
    footnotes: dict[str, Footnote | None] = field(default_factory=dict)
    plain: dict[tuple[str, ...], tuple[Note, ...]] = field(default_factory=dict)
    """Footnotes by marks, where they only are printed."""
    above: dict[int, tuple[str, str]] = field(default_factory=dict)
    first: int = 0
    id: str = ""


@dataclass(slots=True)
class Line:
    """A row being expanded."""

    row: Row
    pattern: str
    when: tuple[Condition, ...]
    triggers: dict[str, tuple[Term, str]] = field(default_factory=dict)
    """Head of a target -> its threshold, and how it is printed."""
    words: str = ""
    covers: dict[str, tuple[Cover, ...]] = field(default_factory=dict)
