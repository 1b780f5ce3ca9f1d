"""What a page is made of: a heading and blocks, which a format lays out and never rewords."""

from __future__ import annotations

from typing import TYPE_CHECKING, NamedTuple

if TYPE_CHECKING:
    from envcheck.report.ladder import Ladder


class Pair(NamedTuple):
    """A label and what it says."""

    label: str
    text: str


class Paragraph(NamedTuple):
    """Running text."""

    text: str


class Facts(NamedTuple):
    """Labels and texts below each other."""

    pairs: tuple[Pair, ...]


class Entry(NamedTuple):
    """One item of a list: a head and lines beneath it."""

    head: str
    lines: tuple[str, ...] = ()
    sums: tuple[str, ...] = ()
    """Lines of arithmetic, set off as such."""


class Items(NamedTuple):
    """A list; ``numbered`` counts from 1."""

    entries: tuple[Entry, ...]
    numbered: bool = False


class Grid(NamedTuple):
    """A table of text cells."""

    heads: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    right: tuple[int, ...] = ()
    """Columns of figures, set flush right."""
    wrap: tuple[int, ...] = ()
    """Columns that give way where the page is narrow, widest first."""
    tones: tuple[str, ...] = ()
    """``bad``, ``open`` or ``good`` for each row: a colour beside the words, never in place."""


class Picture(NamedTuple):
    """A drawing of what a table beside it says in figures; formats of plain text leave it out."""

    ladder: Ladder


Block = Paragraph | Facts | Items | Grid | Picture


class Section(NamedTuple):
    """A heading (may be empty) and its blocks."""

    heading: str
    blocks: tuple[Block, ...]
    level: int = 2
    """2 for a part of the page, 3 within one."""


class Page(NamedTuple):
    """A title and sections."""

    title: str
    sections: tuple[Section, ...]
