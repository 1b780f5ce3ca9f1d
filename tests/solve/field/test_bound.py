"""Bounds against independent solutions, exact results, and theory."""

from __future__ import annotations

import math
import time

import numpy as np
import pytest

from envcheck.solve.field.bound import Bounds, bound
from envcheck.solve.field.section import ModelError, Section
from tests.solve.field.sections import BLOCK, CHEEK, WOOD, accepted, c_stud, random_section, section


def wide(of: Section) -> tuple[float, float]:
    """Parallel paths and isothermal planes, written out."""
    k, w = np.array(of.conductivities), np.array(of.widths)
    d = np.array(of.depths)[:, None]
    films = of.outside + of.inside
    shares = w / w.sum()
    low = (shares / (films + (d / k).sum(axis=0))).sum()
    high = 1.0 / (films + (d[:, 0] / (shares * k).sum(axis=1)).sum())
    return float(low), float(high)


# Values of quadratic triangles on the same graded grid by scikit-fem 12.0.2, a general-purpose
# finite-element library, computed independently (an upper bound that falls with refinement).
INDEPENDENT = [
    ("wood stud", WOOD, 0.301149),
    ("C-stud", c_stud(), 0.673762),
    ("C-stud with outer insulation", c_stud(outer=True), 0.354289),
    ("C-stud with lips", c_stud(lip=12.7), 0.674394),
    ("C-stud in a dormer cheek", CHEEK, 0.273209),
    ("block with filled cores", BLOCK, 1.164652),
]


@pytest.mark.parametrize(("of", "value"), [c[1:] for c in INDEPENDENT], ids=lambda v: str(v)[:8])
def test_encloses_an_independent_solution(of: Section, value: float) -> None:
    found = bound(of, 2e-4)
    assert found.stopped_by == "tolerance"
    assert found.low <= value <= found.high
    assert found.gap <= 2e-4


def test_checkerboard_has_its_exact_value_inside() -> None:
    # Keller (1964), Dykhne (1970): a 2 x 2 square between adiabatic sides conducts like
    # sqrt(k1 k2). Films are made so small that they hardly count, and are in the exact value.
    for contrast in (2.0, 4.0, 10.0):
        film = 1e-9
        board = Section(
            (0.5, 0.5), (0.5, 0.5), ((1.0, contrast), (contrast, 1.0)), film, film, False
        )
        found = bound(board, 1e-3)
        exact = 1.0 / (1.0 / math.sqrt(contrast) + 2 * film)
        assert found.low <= exact <= found.high


def test_layers_without_members_have_no_gap() -> None:
    found = bound(section([100, 200], [100, 50, 7], [[0.5] * 2, [0.04] * 2, [160.0] * 2]))
    exact = 1.0 / (0.04 + 0.1 / 0.5 + 0.05 / 0.04 + 0.007 / 160 + 0.13)
    assert found.rounds == 1
    assert found.low == pytest.approx(exact, rel=1e-10)
    assert found.high == pytest.approx(exact, rel=1e-10)


def test_the_chain_of_bounds_holds_on_random_sections() -> None:
    """parallel paths <= low <= high <= isothermal planes, never violated."""
    rng = np.random.default_rng(20260302)
    for of in accepted(random_section, rng, 500):
        found = bound(of, 1e-2, most_rounds=4)
        low, high = wide(of)
        slack = 1.0 + 1e-9
        assert low <= found.low * slack
        assert found.low <= found.high
        assert found.high <= high * slack


def meets(one: Bounds, other: Bounds) -> bool:
    return one.low <= other.high and other.low <= one.high


def test_mirroring_reversing_and_scaling_change_nothing() -> None:
    of = c_stud(outer=True, lip=12.7)
    there = bound(of)
    mirrored = of._replace(
        widths=of.widths[::-1], conductivities=tuple(row[::-1] for row in of.conductivities)
    )
    reversed_ = of._replace(
        depths=of.depths[::-1],
        conductivities=of.conductivities[::-1],
        outside=of.inside,
        inside=of.outside,
    )
    scaled = of._replace(
        widths=tuple(3.0 * w for w in of.widths),
        depths=tuple(3.0 * d for d in of.depths),
        conductivities=tuple(tuple(3.0 * k for k in row) for row in of.conductivities),
    )
    for other in (mirrored, reversed_, scaled):
        assert meets(there, bound(other))


def test_where_the_repeat_is_cut_changes_nothing() -> None:
    of = c_stud()
    turned = of._replace(
        widths=of.widths[2:] + of.widths[:2],
        conductivities=tuple(row[2:] + row[:2] for row in of.conductivities),
    )
    assert meets(bound(of), bound(turned))
    # Cut at mid-bay, where hardly any heat crosses, adiabatic sides tell nearly the same.
    assert meets(bound(of), bound(of._replace(periodic=False)))


def test_more_steel_and_less_insulation_never_lower_u() -> None:
    values = [bound(c_stud(steel=k), 3e-4) for k in (10.0, 50.0, 62.0)]
    assert values[0].high < values[1].low
    assert values[1].low <= values[2].high
    assert bound(c_stud(outer=True)).high < bound(c_stud()).low


def test_gap_falls_with_about_the_first_power_of_the_nodes() -> None:
    steps = [bound(c_stud(), tolerance) for tolerance in (3e-3, 1e-3, 3e-4)]
    gaps = np.log([found.gap for found in steps])
    nodes = np.log([found.nodes for found in steps])
    rate = -np.polyfit(nodes, gaps, 1)[0]
    assert 0.8 < rate < 1.3


def test_caps_return_the_interval_reached() -> None:
    found = bound(c_stud(), 1e-9, most_rounds=3)
    assert (found.stopped_by, found.rounds) == ("rounds", 3)
    assert found.low <= 0.673762 <= found.high
    found = bound(c_stud(), 1e-9, most_nodes=2000)
    assert found.stopped_by == "nodes"
    assert found.nodes <= 2000


@pytest.mark.parametrize(
    ("change", "words"),
    [
        ({"conductivities": ((1e-5, 1.0), (1.0, 1.0))}, "row 1, column 1 conducts 1e-05"),
        ({"conductivities": ((50.0, 0.04), (0.04, 50.0))}, "touch in a corner only"),
        ({"widths": (0.1, 0.0)}, "no width or no depth"),
        ({"outside": 0.0}, "no film"),
        ({"depths": (0.1,)}, "do not match"),
    ],
)
def test_what_cannot_be_meant_is_refused(change: dict[str, object], words: str) -> None:
    plain = Section((0.1, 0.1), (0.1, 0.1), ((1.0, 1.0), (1.0, 1.0)), 0.04, 0.13)
    with pytest.raises(ModelError, match=words):
        bound(plain._replace(**change))


def test_a_thin_steel_stud_is_quick() -> None:
    """Not a benchmark: only that nothing has grown by an order of magnitude."""
    start = time.perf_counter()
    bound(c_stud(), 1e-3)
    assert time.perf_counter() - start < 5.0
