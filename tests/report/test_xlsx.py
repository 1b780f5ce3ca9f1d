"""The workbook: formulas live, texts texts, the same bytes; recalculated in tests/e2e."""

from __future__ import annotations

import sys
from io import BytesIO

import openpyxl
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck import formulas
from envcheck.report import registry, view
from envcheck.report.formats.xlsx import lines
from envcheck.report.registry import MissingExtra
from envcheck.report.view import ViewOptions
from envcheck.report.workbook.cells import Head
from envcheck.report.workbook.lists import number
from tests.report.fixture import JUDGED, PROJECT, RULESETS


def written() -> bytes:
    asked = ViewOptions(details=True, workings=True)
    made = registry.format_named("xlsx").render(view.build(PROJECT, RULESETS, JUDGED, asked))
    assert isinstance(made, bytes)
    return made


def test_the_same_view_gives_the_same_bytes() -> None:
    assert written() == written()


def test_every_line_is_a_row_and_its_figures_are_numbers() -> None:
    sheet = openpyxl.load_workbook(BytesIO(written()), data_only=True)["Lines"]
    heads, *rows = sheet.iter_rows(values_only=True)
    made = view.build(PROJECT, RULESETS, JUDGED)
    assert [row[1] for row in rows] == [row.tag for row in made.rows]
    values = [row[heads.index("value, printed unit")] for row in rows]
    own = [row.comparison.value if row.comparison else None for row in made.rows]
    assert values == own and any(isinstance(value, float) for value in values)


def test_rounding_and_verdict_are_formulas() -> None:
    sheet = openpyxl.load_workbook(BytesIO(written()))["Lines"]
    cells = {cell.value: cell.column for cell in sheet[1]}
    row = next(r for r in sheet.iter_rows(min_row=2) if r[1].value == "N-1")
    number = row[0].row
    assert row[cells["as compared"] - 1].value == (
        f"=ROUND(ROUND(K{number},11-INT(LOG10(ABS(K{number})+1E-300))),3)"
    )
    assert row[cells["room left"] - 1].value == f"=M{number}-K{number}"
    assert str(row[cells["verdict of this sheet"] - 1].value).startswith(
        f"=IF(L{number}<=M{number},"
    )


def test_an_expression_becomes_a_formula_of_cells() -> None:
    """A leading minus is set in parentheses: spreadsheets take -2^2 as 4."""
    cells = {"L": "$C$4", "k": "$C$5"}
    assert formulas.spreadsheet("{L} / {k}", cells) == "$C$4/$C$5"
    assert formulas.spreadsheet("ln(1 + {L} / {k}) / {k}", cells) == "LN(1+($C$4/$C$5))/$C$5"
    assert formulas.spreadsheet("-{L} ** 2", cells) == "-($C$4^2)"
    assert formulas.spreadsheet("min({L}, {k})", cells) == "MIN($C$4,$C$5)"
    with pytest.raises(ValueError, match="formula"):
        formulas.spreadsheet("{L}.real", cells)


def test_without_its_library_the_format_names_the_extra(monkeypatch: pytest.MonkeyPatch) -> None:
    """None among the loaded modules makes an import fail, as Python documents it."""
    monkeypatch.setitem(sys.modules, "xlsxwriter", None)
    with pytest.raises(MissingExtra) as found:
        written()
    assert (found.value.extra, found.value.library) == ("xlsx", "xlsxwriter")


@given(st.text(alphabet="=+-@'0123456789.eE ", max_size=12))
def test_only_printed_numbers_become_numbers(text: str) -> None:
    found = number(text)
    assert found == text or text.lstrip("+-")[0].isdigit()
    assert number("=1+1") == "=1+1" and number("-0.5") == -0.5


def test_rows_are_as_high_as_their_longest_text() -> None:
    assert lines(("a" * 40, 1.0, None), (20, 5, 5)) == 3
    assert lines((Head("ab"), "c"), (20, 5)) == 1
