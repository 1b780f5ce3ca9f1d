"""Markdown with pipe tables."""

from __future__ import annotations

from collections.abc import Iterable

from envcheck.report import outline, tabular
from envcheck.report.answer import Answer
from envcheck.report.inert import as_code, for_markdown
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Paragraph, Picture
from envcheck.report.view import View

NAME = "markdown"
TITLE = "Markdown with tables"
EXTENSION = "md"


def render(view: View) -> str:
    """Lay the view out as Markdown."""
    return write(outline.page(view))


def answer(made: Answer, width: int) -> str:
    """Lay the page of another command out as Markdown."""
    return write(made.page)


def write(page: Page) -> str:
    """Write a page; ends with a line feed."""
    lines = [f"# {for_markdown(page.title)}"]
    for section in page.sections:
        if section.heading:
            lines += ["", f"## {for_markdown(section.heading)}"]
        for block in section.blocks:
            lines += ["", *_block(block)]
    return "\n".join(lines) + "\n"


def _block(block: Block) -> Iterable[str]:
    match block:
        case Paragraph(text):
            return [for_markdown(text)]
        case Facts(pairs):
            return [f"- **{for_markdown(p.label)}**: {for_markdown(p.text)}" for p in pairs]
        case Items(entries, numbered):
            return _items(entries, numbered)
        case Grid():
            return _grid(block)
        case Picture():
            return []


def _items(entries: Iterable[Entry], numbered: bool) -> list[str]:
    found = []
    for number, entry in enumerate(entries, 1):
        lead = f"{number}. " if numbered else "- "
        found.append(lead + for_markdown(entry.head))
        indent = " " * len(lead)
        found += [f"{indent}- {for_markdown(line)}" for line in entry.lines]
        found += [f"{indent}- {as_code(line)}" for line in entry.sums]
    return found


def _grid(block: Grid) -> list[str]:
    rows = [[for_markdown(cell) for cell in row] for row in block.rows]
    heads = [for_markdown(head) for head in block.heads]
    return tabular.lines(rows, block.right, "pipe", heads)
