"""What a page is made of: a heading and blocks, which a format lays out and never rewords."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Pair:
    """A label and what it says."""

    label: str
    text: str


@dataclass(frozen=True, slots=True)
class Paragraph:
    """Running text."""

    text: str


@dataclass(frozen=True, slots=True)
class Facts:
    """Labels and texts below each other."""

    pairs: tuple[Pair, ...]


@dataclass(frozen=True, slots=True)
class Entry:
    """One item of a list: a head and lines beneath it."""

    head: str
    lines: tuple[str, ...] = ()
    sums: tuple[str, ...] = ()
    """Lines of arithmetic, set off as such."""


@dataclass(frozen=True, slots=True)
class Items:
    """A list; ``numbered`` counts from 1."""

    entries: tuple[Entry, ...]
    numbered: bool = False


@dataclass(frozen=True, slots=True)
class Grid:
    """A table of text cells."""

    heads: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    right: tuple[int, ...] = ()
    """Columns of figures, set flush right."""
    wrap: tuple[int, ...] = ()
    """Columns that give way where the page is narrow, widest first."""
    tones: tuple[str, ...] = ()
    """``bad``, ``open`` or ``good`` for each row: a colour beside the words, never in place."""


Block = Paragraph | Facts | Items | Grid


@dataclass(frozen=True, slots=True)
class Section:
    """A heading (may be empty) and its blocks."""

    heading: str
    blocks: tuple[Block, ...]


@dataclass(frozen=True, slots=True)
class Page:
    """A title and sections."""

    title: str
    sections: tuple[Section, ...]
