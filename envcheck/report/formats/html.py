"""One HTML file for screen and paper: no script, no network, black and white."""

from __future__ import annotations

import re
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING

from envcheck.report import desk, drawing
from envcheck.report.answer import Answer
from envcheck.report.parts import Block, Facts, Grid, Items, Page, Paragraph, Picture
from envcheck.report.view import View

if TYPE_CHECKING:
    from jinja2 import Environment
    from markupsafe import Markup


NAME = "html"
TITLE = "one HTML file for screen and paper"
EXTENSION = "html"
DETAILS = True
WORKINGS = True
MACROS = {Paragraph: "paragraph", Facts: "facts", Items: "items", Grid: "grid"}
"""Of the template of blocks, each with the block and the heading that it stands under."""
SHORT = 12
"""Characters of a hash that every printed page carries."""


def render(view: View) -> str:
    """Lay the view out as one HTML file."""
    digest = next((f"{h.label}: sha256 {h.text[:SHORT]}" for h in view.hashes), "")
    date = next((pair.text for pair in view.facts if pair.label == "report date"), "")
    return write(desk.page(view), f"report date {date}" if date else "", digest)


def answer(made: Answer, width: int) -> str:
    """Lay the page of another command out as HTML."""
    return write(made.page)


def write(page: Page, date: str = "", digest: str = "") -> str:
    """Write a page; ``date`` and ``digest`` run along on every printed sheet."""
    from markupsafe import Markup

    decided = (n for n, s in enumerate(page.sections, 1) if s.heading)
    return (
        _environment()
        .get_template("page.html")
        .render(
            page=page,
            style=Markup(_style()),
            running_title=css_text(page.title),
            running_date=css_text(date),
            running_hash=css_text(digest),
            first=f"s{next(decided, 1)}",
            laid_out=_laid_out,
        )
        .rstrip()
        + "\n"
    )


def css_text(text: str) -> Markup:
    """Write a text as a string of CSS that nothing in it can end."""
    from markupsafe import Markup

    return Markup('"' + re.sub(r"[^\w .,:()-]", _escaped, text, flags=re.ASCII) + '"')


def _escaped(found: re.Match[str]) -> str:
    return f"\\{ord(found[0]):06x}"


@cache
def _environment() -> Environment:
    from jinja2 import Environment, FileSystemLoader, StrictUndefined

    return Environment(
        loader=FileSystemLoader(Path(__file__).parent.parent / "templates"),
        autoescape=True,
        undefined=StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )


@cache
def _style() -> str:
    return (Path(__file__).parent.parent / "templates" / "page.css").read_text(encoding="utf-8")


def _laid_out(block: Block, part: int, place: int, heading: str) -> Markup:
    """One block as HTML; ``part`` and ``place`` make the ids of drawings unique."""
    from markupsafe import Markup

    if isinstance(block, Picture):
        svg = drawing.ladder(block.ladder, f"p{part}-{place}")
        return Markup(f'<div class="drawing">{svg}</div>')
    macro = getattr(_environment().get_template("blocks.html").module, MACROS[type(block)])
    return Markup(macro(block, heading or "table"))
