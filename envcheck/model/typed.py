"""A rule set as typed: its sheets cell by cell, for those who type and check tables."""

from __future__ import annotations

from collections.abc import Mapping
from typing import NamedTuple

from envcheck.model.ruleset import Condition, Limit, Lock


class Printed(NamedTuple):
    """One reading of a printed cell, footnotes left aside."""

    kind: str
    """``number``, ``no_requirement`` or ``not_covered``."""
    sums: tuple[float, ...]
    """Sum of each alternative, in the printed unit; ratings beside the metric are left out."""
    roles: frozenset[str] = frozenset()
    """What its figures speak of (``cavity``, ``ci``); those of zero left out."""


class TypedCell(NamedTuple):
    """A cell with its place, as typed and as read."""

    table: str
    row: str
    label: str
    when: tuple[tuple[str, str], ...]
    """Conditions of the row as typed."""
    heads: tuple[str, ...]
    beside: tuple[str, ...]
    """The heads that do not name the zone."""
    zone: str
    text: str
    """As typed, footnote marks included."""
    file: str
    line: int
    src: str
    monotone: bool
    """Whether the figure is held to grow stricter toward the cold."""
    categories: tuple[str, ...] = ()
    metric: str = ""
    sense: str = ""
    unit: str = ""
    common: frozenset[Condition] = frozenset()
    """Conditions of every limit that the cell gives."""
    printed: tuple[Printed, ...] = ()
    """One reading, or one for each side of a slash; empty where the cell refers to another."""
    threshold: float | None = None
    """Figure in the printed unit above (or below) which the cell is the target."""
    replaces: str = ""
    """Printed text of the base's cell, where the table amends one."""
    replaced: tuple[Printed, ...] = ()

    @property
    def place(self) -> str:
        """How ``confirmed:`` names it: table, row with its conditions, heads."""
        typed = ",".join(f"{name}={text}" for name, text in self.when)
        row = f"{self.row}[{typed}]" if typed else self.row
        return "/".join((self.table, row, *self.heads))


class TypedTable(NamedTuple):
    """A sheet with what ``ruleset.yaml`` says of it."""

    id: str
    clause: str
    file: str
    across: bool
    """Zones stand in the heads."""
    head_rows: tuple[tuple[str, ...], ...]
    """Every head row as printed, footnote marks included, one text for each printed column."""
    dimensions: tuple[str, ...]
    rows: tuple[tuple[TypedCell, ...], ...]
    labels: tuple[str, ...]
    """Printed labels with their footnote marks, by row."""
    guidance: bool
    notes: tuple[tuple[str, str], ...]
    """(mark, text) of the footnotes that are used."""
    marks: frozenset[str] = frozenset()
    """Every footnote mark that is defined for the sheet."""


class UnusedNote(NamedTuple):
    """A footnote that no mark calls."""

    table: str
    mark: str
    line: int


class TypedSet(NamedTuple):
    """One rule set of a folder as typed; what it amends is only told where a cell replaces one."""

    id: str
    title: str
    edition: str
    jurisdiction: str
    file: str
    zones: tuple[str, ...]
    members: Mapping[str, tuple[str, ...]]
    coldness: bool
    """The zones are in order from warm to cold."""
    tables: tuple[TypedTable, ...]
    unused: tuple[UnusedNote, ...]
    sources: frozenset[str]
    restates: bool
    confirmed: Mapping[str, tuple[str, int]]
    """``L05 PLACE`` -> reason and line."""
    lock: Lock | None
    limits: tuple[Limit, ...] = ()
    """All limits with what the set amends; empty where the set has errors."""


class Range(NamedTuple):
    """Figures that a printed table may plausibly hold."""

    metric: str
    category: str
    """Pattern."""
    unit: str
    """Label of :mod:`envcheck.units`; empty for plain numbers."""
    low: float
    high: float
    source: str


class Fault(NamedTuple):
    """One finding of lint at one place."""

    check: str
    """``L05``, or the id of an input error that has no number."""
    severity: str
    """``error`` stops a check, ``remark`` never does."""
    file: str
    line: int | None
    what: str
    found: str
    expected: str
    fix: str
    row: str = ""
    column: str = ""
    place: str = ""
    """As ``confirmed:`` names it; empty where nothing can be confirmed."""
    confirmed: str = ""
    """Reason by which the rule set silences it."""
