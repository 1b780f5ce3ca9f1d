"""Text of a user steers no terminal, no page and no spreadsheet."""

from __future__ import annotations

from io import BytesIO

import openpyxl
import pytest
from pypdf import PdfReader

from envcheck.report import registry, view
from envcheck.report.inert import as_code, clean, for_csv, for_markdown
from tests.changed import changed
from tests.report.fixture import JUDGED, PROJECT, RULESETS

HOSTILE = "=cmd|' /C calc'!A0 \x1b[31mred\x07 \u202egnp.exe <script>alert(1)</script> | **x** `y`"


def texts_of(made: str | bytes) -> str:
    """The text itself, or the texts of the cells of a workbook, a line each."""
    if isinstance(made, str):
        return made
    if made.startswith(b"%PDF-"):
        pages = PdfReader(BytesIO(made)).pages
        text = "\n".join(page.extract_text() for page in pages)
        return text.replace("\u200b", "")  # where a long word may break
    book = openpyxl.load_workbook(BytesIO(made))
    cells = (cell for sheet in book for row in sheet.iter_rows() for cell in row)
    return "\n".join(str(cell.value) for cell in cells if cell.data_type == "s")


def hostile(name: str) -> str:
    assemblies = dict(PROJECT.assemblies)
    assemblies["W1"] = changed(assemblies["W1"], title=HOSTILE, sheet="a\nb")
    project = changed(PROJECT, title=HOSTILE, prepared_by=HOSTILE, assemblies=assemblies)
    lines = tuple(changed(line, reasons=(HOSTILE, *line.reasons)) for line in JUDGED.lines)
    judged = changed(JUDGED, lines=lines, remarks=(HOSTILE,))
    asked = view.ViewOptions(details=True)
    made = registry.format_named(name).render(view.build(project, RULESETS, judged, asked))
    return texts_of(made)


@pytest.mark.parametrize("name", registry.names())
def test_no_control_or_direction_character_comes_through(name: str) -> None:
    page = hostile(name)
    assert "red" in page and "gnp.exe" in page
    for char in page:
        assert char == "\n" or char.isprintable(), repr(char)


def test_markdown_holds_no_markup_of_the_user() -> None:
    page = hostile("markdown")
    assert "<script" not in page.replace("\\<script", "")
    table = [line for line in page.splitlines() if line.startswith("| N-1 ")]
    assert len(table) == 1
    assert table[0].replace("\\|", "").count("|") == 8


def test_csv_guards_formulas() -> None:
    assert ",'=cmd|" in hostile("csv") or "\"'=cmd|" in hostile("csv")
    assert for_csv("+1") == "'+1"
    assert for_csv("@x") == "'@x"
    assert for_csv("-") == "'-"
    assert for_csv("W1") == "W1"


def test_plain_text_stays_as_it_is() -> None:
    assert clean("Mur extérieur, 外壁") == "Mur extérieur, 外壁"
    assert clean("می‌خواهم") == "می‌خواهم"  # a zero-width non-joiner within a word
    assert clean("two\nlines\tand\u00a0more") == "two lines and more"
    assert clean("\x1b[2J") == "\\x1b[2J"
    assert clean("\u202e") == "\\u202e"
    assert for_markdown("a|b_c") == "a\\|b\\_c"
    assert as_code("a`b") == "`a'b`"
