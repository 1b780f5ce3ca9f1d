"""A tagged PDF with its fonts inside: the desk page, the same figures, the same bytes each time."""

from __future__ import annotations

import json
import re
from pathlib import Path

from envcheck.report import desk, drawing
from envcheck.report.parts import Block, Entry, Facts, Grid, Items, Page, Paragraph, Picture
from envcheck.report.registry import MissingExtra
from envcheck.report.view import View

NAME = "pdf"
TITLE = "PDF, tagged, for print and file"
EXTENSION = "pdf"
DETAILS = True
WORKINGS = True
PAPERS = {"IP": "us-letter", "SI": "a4"}
SHORT = 12
NARROW = 14
"""Characters up to which a column keeps the width of its words."""
_LONG = re.compile(r"\S{25,}")
_PIECE = re.compile(r"[^/_;=-]{0,23}[/_;=-](?=\S)|[^/_;=-]{24}(?=\S)")


def render(view: View) -> bytes:
    """Lay the view out as a PDF. Errors: MissingExtra without the library that sets it."""
    try:
        import typst
    except ImportError as error:
        raise MissingExtra("pdf", "typst") from error

    template = Path(__file__).parent.parent / "templates" / "page.typ"
    made: bytes = typst.compile(
        template,
        format="pdf",
        sys_inputs={"page": json.dumps(data(view))},
        ignore_system_fonts=True,
    )
    return made


def data(view: View) -> dict[str, object]:
    """The page as plain data: nothing in it is markup."""
    page: Page = desk.page(view)
    date = next((pair.text for pair in view.facts if pair.label == "report date"), "")
    return {
        "title": page.title,
        "date": f"report date {date}" if date else "",
        "digest": next((f"{h.label}: sha256 {h.text[:SHORT]}" for h in view.hashes), ""),
        "paper": PAPERS[view.units],
        "sections": [
            {
                "heading": section.heading,
                "level": section.level,
                "blocks": [_block(block) for block in section.blocks],
            }
            for section in page.sections
        ],
    }


def _block(block: Block) -> dict[str, object]:
    match block:
        case Paragraph(text):
            return {"kind": "paragraph", "text": breakable(text)}
        case Facts(pairs):
            found = [{"label": pair.label, "text": breakable(pair.text)} for pair in pairs]
            return {"kind": "facts", "pairs": found}
        case Items(entries, numbered):
            return {"kind": "items", "numbered": numbered, "entries": list(map(_entry, entries))}
        case Grid(heads, rows, right, _, tones):
            cells = [[breakable(cell) for cell in row] for row in rows]
            parts = {"heads": heads, "rows": cells, "right": right, "tones": tones}
            return {"kind": "grid", "columns": _columns(block), **parts}
        case Picture(ladder):
            return {
                "kind": "picture",
                "svg": drawing.ladder(ladder, "p"),
                "spoken": drawing.spoken(ladder),
            }


def _entry(entry: Entry) -> dict[str, object]:
    return {
        "head": breakable(entry.head),
        "lines": [breakable(line) for line in entry.lines],
        "sums": [breakable(line) for line in entry.sums],
    }


def breakable(text: str) -> str:
    """A text whose long words may break: after a sign, or else every so many letters."""
    return _LONG.sub(lambda word: _PIECE.sub("\\g<0>\u200b", word[0]), text)


def _columns(block: Grid) -> list[float]:
    """Share of the width that each column takes; 0 where it takes what its words need."""
    longest = [
        max(len(head), *(len(row[at]) for row in block.rows)) if block.rows else len(head)
        for at, head in enumerate(block.heads)
    ]
    return [0 if wide <= NARROW else min(wide, 60) / 10 for wide in longest]
