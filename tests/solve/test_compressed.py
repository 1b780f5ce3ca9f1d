"""Batts thicker than their cavity."""

from __future__ import annotations

import csv
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

import envcheck
from envcheck.model.project import Fill
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.solve.methods.compressed import compressed_cell, installed_resistance
from envcheck.units import parse
from tests.solve.samples import INCH, R_IP, assert_recomputes, context


def rows() -> tuple[TableRow, ...]:
    path = Path(envcheck.__file__).parent / "data" / "compressed_batts.csv"
    with path.open(newline="", encoding="utf-8") as file:
        return tuple(
            TableRow(
                "compressed_batts",
                {
                    "label": parse(row["label"], "resistance"),
                    "product_thickness": parse(row["product_thickness"], "length"),
                    "cavity_depth": parse(row["cavity_depth"], "length"),
                },
                parse(row["resistance"], "resistance"),
                row["resistance"],
                row["src"],
            )
            for row in csv.DictReader(file)
        )


ROWS = rows()
CONVENTIONS = Conventions(tables={"compressed_batts": ROWS})


# R-19 of 6-1/4 in acts as R-18 in 5-1/2 in and as R-13 in 3-1/2 in: trade journal, questions and
# answers on compressed batts.
@pytest.mark.parametrize(("depth", "printed"), [(5.5, 18.0), (3.5, 13.0)])
def test_published_rows(depth: float, printed: float) -> None:
    found = installed_resistance(19 * R_IP, 6.25 * INCH, depth * INCH, rows=ROWS)
    assert found.resistance / R_IP == pytest.approx(printed)
    assert found.way == "table"


def test_the_nominal_millimetres_find_the_same_row() -> None:
    assert installed_resistance(3.35, 0.159, 0.140, rows=ROWS).way == "table"


def test_batt_of_the_cavitys_depth_keeps_its_label() -> None:
    assert installed_resistance(2.3, 0.089, 0.0889 + 0.0002).resistance == 2.3
    assert installed_resistance(2.3, None, 0.0889).resistance == 2.3


def test_the_maker_s_value_in_place_comes_first() -> None:
    found = installed_resistance(19 * R_IP, 6.25 * INCH, 5.5 * INCH, 17.5 * R_IP, ROWS)
    assert (found.resistance, found.way) == (17.5 * R_IP, "maker")


def test_without_a_row_the_label_shrinks_with_the_thickness() -> None:
    found = installed_resistance(4.0, 0.2, 0.15, rows=ROWS)
    assert found.resistance == pytest.approx(3.0)
    assert "in proportion" in found.source


@given(st.floats(0.5, 10.0), st.floats(0.03, 0.4), st.floats(0.03, 0.4))
def test_never_above_the_label(label: float, product: float, depth: float) -> None:
    assert installed_resistance(label, product, depth).resistance <= label


@pytest.mark.parametrize("row", ROWS, ids=lambda row: row.text)
def test_rows_lie_between_proportion_and_label(row: TableRow) -> None:
    # A compressed batt loses resistance, but less than thickness: every published figure does so.
    label, thickness, depth = (float(row.keys[name]) for name in ROWS[0].keys)
    assert depth < thickness
    assert label * depth / thickness < row.value + 1e-9
    assert row.value < label
    assert row.source


@pytest.mark.parametrize(
    ("fill", "words"),
    [
        (Fill(label=19 * R_IP, product_thickness=6.25 * INCH, source="label"), "published"),
        (Fill(label=19 * R_IP, product_thickness=7.0 * INCH, source="label"), "compressed"),
        (Fill(label=19 * R_IP, installed_label=18 * R_IP, source="label"), "maker"),
    ],
)
def test_cell_says_where_its_value_comes_from(fill: Fill, words: str) -> None:
    cell = compressed_cell("R3_fill", fill, 5.5 * INCH, context(conventions=CONVENTIONS))
    assert cell.symbol == cell.steps[-1].symbol == "R3_fill"
    assert words in cell.steps[-1].title
    assert "label" in cell.steps[-1].source
    assert_recomputes(cell.steps)
