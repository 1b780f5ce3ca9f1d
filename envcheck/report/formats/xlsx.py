"""A workbook with live formulas (Office Open XML): no macro, no link, texts stay texts."""

from __future__ import annotations

from datetime import datetime
from io import BytesIO
from typing import TYPE_CHECKING

from envcheck.report import workbook
from envcheck.report.registry import MissingExtra
from envcheck.report.view import View
from envcheck.report.workbook.cells import Cell, Formula, Head, Input, Sheet

if TYPE_CHECKING:
    from xlsxwriter.format import Format
    from xlsxwriter.worksheet import Worksheet

NAME = "xlsx"
TITLE = "workbook with live formulas"
EXTENSION = "xlsx"
DETAILS = True
WORKINGS = True
MADE = datetime(2000, 1, 1)
"""Written in place of the clock's time: same input, same bytes."""
MOST = 32000
"""Characters of a cell; the file format holds 32,767."""
SHORT = 12
LINE, FULL = 15.0, 0.9
"""Height of a line in points; share of a column's characters that words fill before they break."""
WIDE, WIDE_PAPER = 220, 8
"""Sheets of more characters a row are printed on A3 (paper 8 of the file format)."""


def render(view: View) -> bytes:
    """Write the view as a workbook. Errors: MissingExtra without the library that writes it."""
    try:
        import xlsxwriter
    except ImportError as error:
        raise MissingExtra("xlsx", "xlsxwriter") from error

    made = BytesIO()
    book = xlsxwriter.Workbook(
        made,
        {"in_memory": True, "strings_to_formulas": False, "strings_to_urls": False},
    )
    book.set_properties({"title": view.title[:200], "created": MADE, "comments": view.deferral})
    styles = {
        Head: book.add_format({"bold": True, "text_wrap": True, "valign": "top", "bottom": 1}),
        Input: book.add_format({"border": 1, "valign": "top"}),
        str: book.add_format({"text_wrap": True, "valign": "top"}),
        Alone: book.add_format({"valign": "top"}),
        Title: book.add_format({"bold": True, "valign": "top"}),
        float: book.add_format({"valign": "top"}),
        Formula: book.add_format({"valign": "top", "num_format": "0.0#####"}),
    }
    date = next((pair.text for pair in view.facts if pair.label == "report date"), "")
    digest = next((pair.text[:SHORT] for pair in view.hashes), "")
    running = _plain(f"{view.title[:80]}, {date}"), _plain(f"sha256 {digest}" if digest else "")
    for sheet in workbook.build(view):
        page = book.add_worksheet(sheet.name[:31])
        _lay_out(page, sheet, running)
        for row, cells in enumerate(sheet.rows):
            if len(cells) > 1:
                page.set_row(row, LINE * lines(cells, sheet.widths))
            for column, cell in enumerate(cells):
                _write(page, row, column, alone(cell) if len(cells) == 1 else cell, styles)
    book.close()
    return made.getvalue()


class Alone(str):
    """A text that has its row for itself and runs over the columns beside it."""


class Title(str):
    """The same, of a part."""


def alone(cell: Cell) -> Cell:
    """A lone text of a row."""
    if isinstance(cell, Head):
        return Title(cell.text)
    return Alone(cell) if isinstance(cell, str) else cell


def lines(cells: tuple[Cell, ...], widths: tuple[int, ...]) -> int:
    """Lines that the longest text of a row takes in its column; viewers do not all reckon it."""
    texts = (cell.text if isinstance(cell, Head) else cell for cell in cells)
    return max(
        -(-len(text[:MOST]) // max(int(width * FULL), 1)) if isinstance(text, str) and text else 1
        for text, width in zip(texts, widths, strict=False)
    )


def _lay_out(page: Worksheet, sheet: Sheet, running: tuple[str, str]) -> None:
    for column, width in enumerate(sheet.widths):
        page.set_column(column, column, width)
    if sheet.frozen:
        page.freeze_panes(sheet.frozen, 0)
        page.repeat_rows(0, sheet.frozen - 1)
    page.set_landscape()
    page.set_paper(WIDE_PAPER if sum(sheet.widths) > WIDE else 0)
    page.fit_to_pages(1, 0)
    page.set_header(f"&L{running[0]}&R&A")
    page.set_footer(f"&L{running[1]}&Rpage &P of &N")


def _plain(text: str) -> str:
    """A text in which nothing is a code of headers and footers."""
    return text.replace("&", "&&")


def _write(page: Worksheet, row: int, column: int, cell: Cell, styles: dict[type, Format]) -> None:
    match cell:
        case None | "":
            return
        case Formula(text, value):
            page.write_formula(row, column, f"={text}", styles[Formula], value)
        case Input(value):
            page.write_number(row, column, value, styles[Input])
        case Head(text):
            page.write_string(row, column, text[:MOST], styles[Head])
        case str():
            page.write_string(row, column, cell[:MOST], styles[type(cell)])
        case _:
            page.write_number(row, column, cell, styles[float])
