"""Plain text for a terminal or a drawing sheet."""

from __future__ import annotations

from envcheck.report import outline, plain_text
from envcheck.report.answer import Answer
from envcheck.report.view import View

NAME = "text"
TITLE = "plain text, 100 columns"
EXTENSION = "txt"


def render(view: View) -> str:
    """Lay the view out as text; colour only where the view asks for it."""
    return plain_text.write(outline.page(view), view.width, view.colour)


def answer(made: Answer, width: int) -> str:
    """Lay the page of another command out as text."""
    return plain_text.write(made.page, width, False)
