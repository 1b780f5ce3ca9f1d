"""The networks on the grid: what holds exactly, and sections on which a solution might fail."""

from __future__ import annotations

import numpy as np
import pytest

from envcheck.solve.field.bound import bound
from envcheck.solve.field.networks import BALANCE, indicators, lower, upper
from envcheck.solve.field.section import Section, first_grid, refined
from tests.solve.field.sections import BLOCK, CHEEK, WOOD, accepted, c_stud, random_section, section
from tests.solve.field.test_bound import meets, wide


def test_the_gap_is_the_sum_of_its_shares() -> None:
    """The energy of the disagreement is the gap itself (Prager and Synge, 1947)."""
    rng = np.random.default_rng(17)
    for of in accepted(random_section, rng, 50):
        grid = first_grid(of)
        for _ in range(2):
            k = np.asarray(of.conductivities)[np.ix_(grid.rows, grid.columns)]
            high, low = upper(of, grid, k), lower(of, grid, k)
            columns, rows = indicators(of, grid, k, high, low)
            gap = high.conductance - low.conductance
            assert columns.sum() + rows.sum() == pytest.approx(gap, abs=1e-12 * high.conductance)
            assert min(columns.min(), rows.min()) >= 0
            grid = refined(grid, rng.random(len(grid.hx)) < 0.5, rng.random(len(grid.hy)) < 0.5)


def metal_in_insulation(rng: np.random.Generator) -> Section:
    """Two rectangles of metal in insulation, thin and thick pieces in any order."""
    k = np.full((5, 5), 0.03)
    for _ in range(2):
        (top, bottom), (left, right) = np.sort(rng.integers(0, 5, (2, 2)))
        k[top : bottom + 1, left : right + 1] = rng.choice([50.0, 160.0, 380.0])
    sizes = [0.0005, 0.001, 0.05, 0.2]
    return Section(
        tuple(map(float, rng.choice(sizes, 5))),
        tuple(map(float, rng.choice(sizes, 5))),
        tuple(tuple(map(float, row)) for row in k),
        0.04,
        0.13,
        bool(rng.integers(2)),
    )


def test_metal_of_any_proportion_is_solved_to_the_tolerance() -> None:
    """Neither a heat balance lost in rounding nor a refinement that stalls in one direction."""
    rng = np.random.default_rng(11)
    for of in accepted(metal_in_insulation, rng, 80):
        found = bound(of)
        assert found.stopped_by == "tolerance", of
        assert found.imbalance <= BALANCE
        low, high = wide(of)
        assert low <= found.low * (1 + 1e-9)
        assert found.high <= high * (1 + 1e-9)


@pytest.mark.parametrize(
    ("widths", "k"),
    [
        # The gap sits at a face of metal that reaches through the wall: its rows must be cut too.
        ([0.5, 0.5, 50, 0.5, 1], [[50.0, 50.0, 50.0, 0.03, 0.03]] * 5),
        # A sliver of 2 micrometres: conductances differ by ten orders of magnitude.
        ([0.002], [[4.0], [80.0], [80.0], [0.01], [0.01]]),
    ],
)
def test_slender_pieces(widths: list[float], k: list[list[float]]) -> None:
    found = bound(section(widths, [1, 0.5, 1, 50, 50], k))
    assert found.stopped_by == "tolerance"
    assert found.nodes < 20_000


def test_neither_cutting_a_piece_nor_a_larger_repeat_changes_anything() -> None:
    of = c_stud(lip=12.7)
    cut = of._replace(
        widths=(0.05, of.widths[0] - 0.05, *of.widths[1:]),
        depths=(0.004, of.depths[0] - 0.004, *of.depths[1:]),
        conductivities=tuple((row[0], *row) for row in (of.conductivities[0], *of.conductivities)),
    )
    twice = of._replace(
        widths=of.widths * 2, conductivities=tuple(row * 2 for row in of.conductivities)
    )
    assert meets(bound(of), bound(cut))
    assert meets(bound(of), bound(twice))


def test_u_scales_with_all_conductances() -> None:
    """Twice all conductivities and film conductances: twice U, exactly (linear conduction)."""
    for of in (WOOD, BLOCK, CHEEK):
        twice = of._replace(
            conductivities=tuple(tuple(2 * k for k in row) for row in of.conductivities),
            outside=of.outside / 2,
            inside=of.inside / 2,
        )
        one, two = bound(of), bound(twice)
        assert two.low == pytest.approx(2 * one.low, rel=1e-9)
        assert two.high == pytest.approx(2 * one.high, rel=1e-9)


def test_a_contact_counts_the_same_however_thin_it_is_drawn() -> None:
    """A contact resistance is a thin layer; its depth must not matter."""
    resistance = 0.03

    def with_contact(depth: float) -> Section:
        of = c_stud()
        row = (depth / resistance,) * len(of.widths)
        return of._replace(
            depths=(*of.depths[:1], depth, *of.depths[1:]),
            conductivities=(of.conductivities[0], row, *of.conductivities[1:]),
        )

    thin, thinner = bound(with_contact(3e-5)), bound(with_contact(5e-6))
    assert meets(thin, thinner)
    assert thin.high < bound(c_stud()).low


def test_an_asymmetric_member_needs_its_repeat() -> None:
    """A C cut through its middle by an adiabatic plane is another wall, and looks far better."""
    of = c_stud()
    through = of._replace(
        widths=(of.widths[2] / 2, *of.widths[3:], *of.widths[:2], of.widths[2] / 2),
        conductivities=tuple((row[2], *row[3:], *row[:2], row[2]) for row in of.conductivities),
    )
    assert meets(bound(of), bound(through))
    assert bound(through._replace(periodic=False)).high < 0.85 * bound(of).low
