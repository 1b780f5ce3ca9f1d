"""Plain text for a terminal or a drawing sheet."""

from __future__ import annotations

from envcheck.report import outline, plain_text
from envcheck.report.explain import Explained
from envcheck.report.view import View

NAME = "text"
TITLE = "plain text, 100 columns"
EXTENSION = "txt"


def render(view: View) -> str:
    """Lay the view out as text; colour only where the view asks for it."""
    return plain_text.write(outline.page(view), view.width, view.colour)


def explain(explained: Explained) -> str:
    """Lay the page of one element or assembly out as text."""
    return plain_text.write(explained.page, explained.width, False)
