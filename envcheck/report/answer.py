"""What a command other than ``check`` says: a page for people, and the same as data."""

from __future__ import annotations

from typing import NamedTuple

from envcheck.report.parts import Page


class Answer(NamedTuple):
    """A page and its data; formats lay out the one or write the other."""

    page: Page
    data: dict[str, object]
