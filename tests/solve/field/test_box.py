"""Bounds of boxes against a validation case, an independent library, and theory."""

from __future__ import annotations

import numpy as np
import pytest

from envcheck.solve.box import Box, wirings
from envcheck.solve.field.bound import bound
from envcheck.solve.field.box_bound import BoxBounds, bound_box
from envcheck.solve.field.box_grid import first_grid, refined
from envcheck.solve.field.box_networks import indicators, lower, upper
from envcheck.solve.field.section import ModelError
from tests.solve.field import boxes
from tests.solve.field.boxes import accepted, battens, blocks, crossing, iron_bar, random_box
from tests.solve.field.sections import BLOCK, WOOD, c_stud


def meets(one: BoxBounds, other: BoxBounds) -> bool:
    return one.low <= other.high and other.low <= one.high


def test_iso_10211_case_4() -> None:
    """ISO 10211:2017, annex C, case 4 (from memory): .540 W within 1 % for 1 K, and a highest
    temperature of the outer face of .805 within .005 K."""
    of = iron_bar()
    found = bound_box(of, 2e-3)
    flow = 4 * of.area  # the whole of a quarter, W per K
    assert found.stopped_by == "tolerance"
    assert found.low * flow <= 0.540 + 5e-4
    assert found.high * flow >= 0.540 - 5e-4
    assert found.high / found.low <= 1.002
    assert found.temperatures[0].max() == pytest.approx(0.805, abs=0.005)


def test_a_part_that_stands_out_outside_is_the_same_seen_from_the_other_side() -> None:
    """Exchanging both sides of the wall, films included, changes nothing."""
    of = iron_bar()._replace(outside=0.05, inside=0.2)
    k = np.asarray(of.conductivities)[::-1]
    other = of._replace(
        depths=of.depths[::-1], conductivities=blocks(k), outside=of.inside, inside=of.outside
    )
    one, two = bound_box(of), bound_box(other)
    assert two.low == pytest.approx(one.low, rel=1e-4)
    assert two.high == pytest.approx(one.high, rel=1e-4)


def test_the_chain_of_bounds_holds_on_random_boxes() -> None:
    """parallel paths <= low <= high <= isothermal planes, never violated."""
    slack = 1.0 + 1e-9
    for of in accepted(random_box, np.random.default_rng(20260304), 60):
        found = bound_box(of, 2e-2, most_rounds=4)
        low, high = wirings(of)
        assert low <= found.low * slack
        assert found.low <= found.high
        assert found.high <= high * slack


def test_the_gap_is_the_sum_of_its_shares() -> None:
    """The energy of the disagreement is the gap itself (Prager and Synge, 1947)."""
    rng = np.random.default_rng(5)
    for of in [*accepted(random_box, rng, 20), iron_bar()]:
        grid = first_grid(of)
        for _ in range(2):
            k = np.asarray(of.conductivities)[np.ix_(*grid.blocks)]
            high, low = upper(of, grid, k), lower(of, grid, k)
            shares = indicators(of, grid, k, high, low)
            gap = high.conductance - low.conductance
            assert sum(s.sum() for s in shares) == pytest.approx(gap, abs=1e-9 * high.conductance)
            assert min(s.min() for s in shares) >= 0
            rows, courses, columns = (rng.random(len(s)) < 0.5 for s in grid.sizes)
            grid = refined(grid, (rows, courses, columns))


@pytest.mark.parametrize("of", [WOOD, BLOCK, c_stud()], ids=["wood", "block", "steel"])
def test_what_does_not_change_with_height_is_the_section(of) -> None:
    section = bound(of, 1e-3)
    for box in (boxes.upright(of), boxes.level(of)):
        found = bound_box(box, 3e-3)
        assert found.stopped_by == "tolerance"
        assert found.low <= section.high
        assert section.low <= found.high


def test_which_way_a_box_repeats_matters() -> None:
    """A C cut through its middle by an adiabatic plane is another wall (see the section's test)."""
    of = c_stud()
    through = of._replace(
        widths=(of.widths[2] / 2, *of.widths[3:], *of.widths[:2], of.widths[2] / 2),
        conductivities=tuple((row[2], *row[3:], *row[:2], row[2]) for row in of.conductivities),
        periodic=False,
    )
    closed = bound(through)
    for box in (boxes.upright(through), boxes.level(through)):
        found = bound_box(box, 3e-3)
        assert found.low <= closed.high < 0.85 * bound(of).low
        assert closed.low <= found.high


def test_layers_without_members_have_no_gap() -> None:
    k = np.array([0.5, 0.04, 160.0])[:, None, None] * np.ones((3, 2, 2))
    found = bound_box(boxes.box([100, 200], [100, 300], [100, 50, 7], k))
    exact = 1.0 / (0.04 + 0.1 / 0.5 + 0.05 / 0.04 + 0.007 / 160 + 0.13)
    assert found.rounds == 1
    # Not the rounding of a direct solution: the residual of the conjugate gradients, squared.
    assert found.low == pytest.approx(exact, rel=1e-9)
    assert found.high == pytest.approx(exact, rel=1e-9)


def test_neither_mirrors_nor_turns_nor_another_cut_changes_anything() -> None:
    of = crossing()
    there = bound_box(of)
    k = np.asarray(of.conductivities)
    mirrored = of._replace(widths=of.widths[::-1], conductivities=blocks(k[:, :, ::-1]))
    cut = of._replace(
        heights=of.heights[2:] + of.heights[:2], conductivities=blocks(np.roll(k, -2, axis=1))
    )
    for other in (mirrored, boxes.turned(of), cut):
        assert meets(there, bound_box(other))


def test_u_scales_with_all_conductances_and_not_with_the_size_of_the_drawing() -> None:
    of = battens()
    k = np.asarray(of.conductivities)
    twice = of._replace(conductivities=blocks(2 * k), outside=of.outside / 2, inside=of.inside / 2)
    larger = of._replace(
        widths=tuple(3 * w for w in of.widths), heights=tuple(3 * h for h in of.heights),
        depths=tuple(3 * d for d in of.depths), conductivities=blocks(3 * k),
    )  # fmt: skip
    one, two, three = bound_box(of), bound_box(twice), bound_box(larger)
    assert two.low == pytest.approx(2 * one.low, rel=1e-6)
    assert two.high == pytest.approx(2 * one.high, rel=1e-6)
    assert three.low == pytest.approx(one.low, rel=1e-6)
    assert three.high == pytest.approx(one.high, rel=1e-6)


def test_more_steel_never_lowers_u() -> None:
    least, less, more = (
        bound_box(crossing(girt, stud)) for girt, stud in ((0.036, 0.04), (0.036, 50), (50, 50))
    )
    assert least.high < less.low
    assert less.high < more.low


def test_one_percent_of_a_steel_crossing_takes_no_more_than_fifty_thousand_nodes() -> None:
    found = bound_box(crossing())
    assert found.stopped_by == "tolerance"
    assert found.gap <= 0.01
    assert found.nodes <= 50_000


def test_caps_return_the_interval_reached() -> None:
    reference = bound_box(battens(), 1e-3)
    found = bound_box(battens(), 1e-9, most_rounds=2)
    assert (found.stopped_by, found.rounds) == ("rounds", 2)
    assert found.low <= reference.high
    assert reference.low <= found.high
    found = bound_box(battens(), 1e-9, most_nodes=1500)
    assert found.stopped_by == "nodes"
    assert found.nodes <= 1500


def test_an_inexact_solution_still_bounds(monkeypatch: pytest.MonkeyPatch) -> None:
    """Flows that the network loses are moved, not forgotten: wide bounds, but bounds."""
    exact = bound_box(battens(), 1e-3)
    monkeypatch.setattr("envcheck.solve.field.box_networks.RESIDUAL", 0.1)
    loose = bound_box(battens(), 1e-3, most_rounds=3)
    assert loose.imbalance > 1e-4
    assert loose.low <= exact.high
    assert exact.low <= loose.high


PLAIN = Box((0.1, 0.1), (0.1, 0.1), (0.1, 0.1), blocks(np.ones((2, 2, 2))), 0.04, 0.13)


def with_air(*places: tuple[int, int, int]) -> Box:
    k = np.ones((3, 2, 2))
    for place in places:
        k[place] = 0.0
    return PLAIN._replace(depths=(0.1, 0.1, 0.1), conductivities=blocks(k))


def along_an_edge() -> Box:
    k = np.full((2, 2, 2), 0.04)
    k[0, :, 0], k[1, :, 1] = 50.0, 50.0
    return PLAIN._replace(conductivities=blocks(k))


@pytest.mark.parametrize(
    ("of", "words"),
    [
        (PLAIN._replace(conductivities=blocks(np.full((2, 2, 2), 1e-5))), "conducts 1e-05"),
        (PLAIN._replace(widths=(0.1, 0.0)), "no width, height or depth"),
        (PLAIN._replace(inside=0.0), "no film"),
        (PLAIN._replace(depths=(0.1,)), "do not match"),
        (along_an_edge(), "touch along an edge only"),
        (with_air((1, 0, 0)), "course 1, column 1 of the box holds several parts"),
        (with_air((0, 1, 0), (1, 1, 0), (2, 1, 0)), "course 2, column 1 of the box holds nothing"),
        (with_air((0, 0, 0), (1, 0, 0), (1, 0, 1), (2, 0, 1)), "outdoor air meets indoor air"),
    ],
)
def test_what_cannot_be_meant_is_refused(of: Box, words: str) -> None:
    with pytest.raises(ModelError, match=words):
        bound_box(of)
