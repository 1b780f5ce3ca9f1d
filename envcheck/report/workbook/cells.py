"""What stands in a cell of the workbook, and what a sheet is."""

from __future__ import annotations

from typing import NamedTuple


class Formula(NamedTuple):
    """A live formula (without the equals sign) and the value that is stored with it."""

    text: str
    value: float | str


class Input(NamedTuple):
    """A number that a reader may change."""

    value: float


class Head(NamedTuple):
    """A text that heads a table or a part."""

    text: str


Cell = str | float | Formula | Input | Head | None
Cells = tuple[Cell, ...]


class Sheet(NamedTuple):
    """One sheet: rows of cells, the widths of its columns, rows that stay in sight."""

    name: str
    rows: tuple[Cells, ...]
    widths: tuple[int, ...]
    frozen: int = 0


LINES, ASSEMBLIES = "Lines", "Assemblies"
"""Sheets that formulas of others name."""
Place = tuple[str, str, str]
"""Rule set, tag, metric."""
