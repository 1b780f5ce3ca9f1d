"""What a command other than ``check`` says: a page for people, and the same as data."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.report.parts import Grid, Page


class Answer(NamedTuple):
    """A page, its data and one table of it; a format lays out one of them."""

    page: Page
    data: dict[str, object]
    table: Grid
    """For spreadsheets: one meaning per column."""
