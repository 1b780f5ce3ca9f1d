"""Air spaces against the printed tables of ISO 6946 and of the handbook."""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

import envcheck
from envcheck.model.project import AirSpaceLayer
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.solve.methods.air_space import (
    air_space_iso6946,
    air_space_table,
    convective_coefficient,
    draw_air_space,
    effective_emittance,
)
from envcheck.solve.registry import NotDecided
from envcheck.units import to_si
from tests.changed import changed
from tests.solve.samples import INCH, R_IP, assert_recomputes, context


def space(thickness: float, ventilation: str = "unventilated") -> AirSpaceLayer:
    return AirSpaceLayer("air-space", "cavity", 1, thickness, ventilation, (0.9, 0.9))


def table() -> tuple[TableRow, ...]:
    """The built-in rows of plane air spaces."""
    path = Path(envcheck.__file__).parent / "data" / "air_spaces.csv"
    with path.open(newline="", encoding="utf-8") as file:
        return tuple(
            TableRow(
                "air_spaces",
                {
                    "thickness": to_si(float(row["thickness"]), row["thickness_unit"]),
                    "direction": row["direction"],
                    "emittance": float(row["emittance"]),
                    "mean_temperature": (float(row["mean_temperature"].split()[0]) - 32) * 5 / 9,
                },
                to_si(float(row["resistance"]), row["unit"]),
                row["resistance"],
                row["src"],
            )
            for row in csv.DictReader(file)
        )


# ISO 6946:2017 (and 2007), table of unventilated air layers, emittance 0.9 on both faces: the
# column "downwards", from memory. The other two columns stand in tests/published.
@pytest.mark.parametrize(
    ("millimetres", "printed"),
    list(
        zip(
            (5, 7, 10, 15, 25, 50, 100, 300),
            (0.11, 0.13, 0.15, 0.17, 0.19, 0.21, 0.22, 0.23),
            strict=True,
        )
    ),
)
def test_downwards_column_of_iso_6946(millimetres: int, printed: float) -> None:
    found = air_space_iso6946(millimetres / 1000, "down", 0.9, 0.9)
    assert found == pytest.approx(printed, abs=0.005)


def test_still_air_rules_thin_spaces_and_convection_thick_ones() -> None:
    # ISO 6946:2017, annex D: 0.025/d = 1.25 at d = 20 mm exactly.
    assert convective_coefficient(0.02, "horizontal") == pytest.approx(1.25)
    assert convective_coefficient(0.01, "horizontal") == pytest.approx(2.5)
    assert convective_coefficient(0.10, "horizontal") == pytest.approx(1.25)


def test_numpy_arrays_give_what_floats_give() -> None:
    depths = np.array([0.005, 0.02, 0.3])
    for direction in ("up", "horizontal", "down"):
        found = air_space_iso6946(depths, direction, 0.9, 0.05)
        each = [air_space_iso6946(float(d), direction, 0.9, 0.05) for d in depths]
        assert list(found) == pytest.approx(each)


@given(st.floats(0.002, 0.3), st.floats(0.03, 1.0), st.floats(0.03, 1.0))
def test_downwards_resists_most_and_upwards_least(d: float, e1: float, e2: float) -> None:
    up, across, down = (air_space_iso6946(d, way, e1, e2) for way in ("up", "horizontal", "down"))
    assert up <= across * (1 + 1e-12)
    assert across <= down * (1 + 1e-12)
    assert effective_emittance(e1, e2) <= min(e1, e2) * (1 + 1e-12)


def test_drawn_space_recomputes() -> None:
    for direction in ("up", "horizontal", "down"):
        cell = draw_air_space(space(0.05), context(direction)).cells[0][0]
        assert cell.symbol == "R3"
        assert_recomputes(cell.steps)
        assert cell.value == air_space_iso6946(0.05, direction, 0.9, 0.9)


def test_slightly_ventilated_counts_half_and_says_so() -> None:
    # ISO 6946:1996, 5.3.2: one half of the corresponding value.
    whole = draw_air_space(space(0.05), context()).cells[0][0].value
    cell = draw_air_space(space(0.05, "slightly"), context()).cells[0][0]
    assert cell.value == pytest.approx(whole / 2)
    assert "half" in cell.steps[-1].title
    assert_recomputes(cell.steps)


@pytest.mark.parametrize("thickness", [0.0, 0.301])
def test_outside_the_range_of_the_formula_nothing_is_decided(thickness: float) -> None:
    with pytest.raises(NotDecided, match=r"0\.3 m"):
        draw_air_space(space(thickness), context())


def test_printed_row_of_the_handbook() -> None:
    # ASHRAE Handbook - Fundamentals, plane air spaces, from memory: 1/2 in, horizontal heat flow,
    # mean 50 degF, difference 30 degF, E 0.82.
    found = air_space_table(table(), 0.5 * INCH, "horizontal", 0.82)
    assert found / R_IP == pytest.approx(0.90)


def test_between_rows_the_table_is_linear() -> None:
    rows = table()
    low, high = (air_space_table(rows, 0.5 * INCH, "up", e) for e in (0.5, 0.82))
    assert air_space_table(rows, 0.5 * INCH, "up", 0.66) == pytest.approx((low + high) / 2)
    thin, thick = (air_space_table(rows, d * INCH, "up", 0.82) for d in (0.75, 1.5))
    assert air_space_table(rows, 1.125 * INCH, "up", 0.82) == pytest.approx((thin + thick) / 2)


@pytest.mark.parametrize(
    ("thickness", "emittance", "words"),
    [(0.25, 0.82, "thickness"), (5.0, 0.82, "thickness"), (1.0, 0.9, "emittance")],
)
def test_table_is_never_extrapolated(thickness: float, emittance: float, words: str) -> None:
    with pytest.raises(NotDecided, match=words):
        air_space_table(table(), thickness * INCH, "up", emittance)


def test_table_convention_draws_from_the_table_and_recomputes() -> None:
    conventions = Conventions(air_spaces="table", tables={"air_spaces": table()})
    for depth in (0.75 * INCH, 1.0 * INCH):
        cell = draw_air_space(space(depth), context("up", conventions)).cells[0][0]
        assert_recomputes(cell.steps)
        emittance = effective_emittance(0.9, 0.9)
        assert cell.value == air_space_table(table(), depth, "up", emittance)
        assert all(step.title for step in cell.steps)


def test_missing_table_is_named() -> None:
    with pytest.raises(NotDecided, match="a table of air spaces"):
        draw_air_space(space(0.02), context("up", changed(Conventions(), air_spaces="table")))
