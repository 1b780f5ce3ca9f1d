"""ISO 13370 beyond the plain slab: limits that follow from physics, and worksheets.

The figures of the tests are invented but for those whose source is named.
"""

from __future__ import annotations

import pytest

from envcheck.solve.methods.air_voids import LEVELS, void_steps
from envcheck.solve.methods.inverted_roof import rain_steps
from envcheck.solve.methods.iso13370_basement import (
    HeatedBasement,
    basement_floor_u,
    basement_steps,
    basement_u,
    basement_wall_u,
)
from envcheck.solve.methods.iso13370_edge import Edge, edge_psi, edge_steps, slab_with_edge
from envcheck.solve.methods.iso13370_slab import bare_ground_u, equivalent_thickness, slab_u
from envcheck.solve.methods.iso13370_suspended import (
    SuspendedFloor,
    suspended_steps,
    suspended_u,
)
from envcheck.solve.methods.iso13370_unheated import UnheatedBasement, unheated_basement_u
from tests.solve.samples import assert_recomputes

CLAY = 1.5
"""W/(m K); ISO 13370, clay or silt."""
GROUND = equivalent_thickness(0.3, CLAY, 0.17, 0.0)
FLOOR = SuspendedFloor(
    dimension=8.0, floor=1.8, soil=CLAY, ground=GROUND, height=0.3, wall=1.7, openings=0.0015,
    wind=5.0,
)  # fmt: skip


def test_suspended_floor_between_its_limits() -> None:
    # Sealed and flush with the ground: floor and ground in series. Open to the wind: floor alone.
    sealed = FLOOR._replace(height=0.0, openings=0.0)
    below = bare_ground_u(CLAY, 8.0, GROUND)
    assert 1 / suspended_u(sealed) == pytest.approx(1 / 1.8 + 1 / below)
    assert below == pytest.approx(slab_u(CLAY, 8.0, GROUND))
    assert suspended_u(FLOOR._replace(openings=1e9)) == pytest.approx(1.8)
    assert suspended_u(sealed) < suspended_u(FLOOR) < 1.8


def test_printed_threshold_lies_between_usual_openings() -> None:
    # Scottish Annex 6.C (2003 consultation), text 6.C.0: suspended floors without insulation reach
    # 0.25 W/(m2 K) at P/A 0.09 on clay; the openings are not printed. 1500 and 3000 mm2/m, Rf 0.2,
    # h 0.3 m, Uw 1.7, 5 m/s, average shielding: usual figures, from memory.
    floor = FLOOR._replace(dimension=2.0 / 0.09, floor=1.0 / (0.17 + 0.2 + 0.17))
    tight, open_ = (suspended_u(floor._replace(openings=area)) for area in (0.0015, 0.003))
    assert tight < 0.25 < open_
    assert open_ - tight < 0.02


def test_basement_of_no_depth_is_a_slab() -> None:
    for dimension in (0.5, 4.0, 20.0):
        assert basement_floor_u(0.0, 0.6, dimension, CLAY) == slab_u(CLAY, dimension, 0.6)
    assert basement_u(100.0, 40.0, 0.0, 0.3, 9.9) == pytest.approx(0.3)


def test_wall_of_a_shallow_basement_is_its_own_resistance_twice_weighted() -> None:
    # z -> 0: ln(z/dw + 1) -> z/dw, so that U -> 3 k / (pi dw) whatever the floor.
    assert basement_wall_u(1e-9, 0.8, 0.6, CLAY) == pytest.approx(3 * CLAY / (3.14159265 * 0.8))
    deep = [basement_wall_u(z, 0.8, 0.6, CLAY) for z in (0.5, 1.0, 2.0, 4.0)]
    assert deep == sorted(deep, reverse=True)


def test_the_smaller_equivalent_thickness_counts_for_walls() -> None:
    assert basement_wall_u(2.0, 0.5, 0.9, CLAY) == basement_wall_u(2.0, 0.5, 0.5, CLAY)
    assert basement_wall_u(2.0, 0.9, 0.5, CLAY) != basement_wall_u(2.0, 0.9, 0.9, CLAY)


def test_unheated_basement_between_its_limits() -> None:
    cellar = UnheatedBasement(80.0, 36.0, 1.5, 0.5, 0.7, 0.3, 0.6, 1.5)
    assert unheated_basement_u(cellar._replace(changes=1e12)) == pytest.approx(0.7)
    sealed = unheated_basement_u(cellar._replace(changes=0.0))
    # By hand: 80 x 0.3 + 36 x (1.5 x 0.6 + 0.5 x 1.5) = 83.4 W/K outwards.
    assert 1 / sealed == pytest.approx(1 / 0.7 + 80 / 83.4)
    # With 0.3 air changes of 160 m3: 0.33 x 0.3 x 160 = 15.84 W/K more.
    assert 1 / unheated_basement_u(cellar) == pytest.approx(1 / 0.7 + 80 / 99.24)


def test_edge_insulation_to_infinity_is_a_better_slab() -> None:
    # Insulation without an end, under a floor without an end, adds d' to dt everywhere; both
    # formulas of ISO 13370 must then give the same change along the perimeter, U B'/2.
    wide, thin, added = 1e7, 0.6, 2.4
    change = (slab_u(CLAY, wide, thin + added) - slab_u(CLAY, wide, thin)) * wide / 2
    assert edge_psi(CLAY, 1e12, thin, added) == pytest.approx(change, rel=1e-4)
    assert edge_psi(CLAY, 0.0, thin, added) == 0.0
    assert edge_psi(CLAY, 1.0, thin, 0.0) == 0.0
    assert slab_with_edge(0.4, -0.2, 8.0) == pytest.approx(0.35)


@pytest.mark.parametrize("vertical", [True, False])
def test_worksheets_recompute(vertical: bool) -> None:
    edge = edge_steps(Edge(vertical, 0.6, 2.5, 0.1), 2.0, 0.615)
    assert_recomputes(edge)
    reach = 1.2 if vertical else 0.6
    assert edge[-1].value == pytest.approx(edge_psi(2.0, reach, 0.615, 4.9))
    assert_recomputes(suspended_steps(FLOOR))
    assert suspended_steps(FLOOR)[-1].value == suspended_u(FLOOR)
    for floor in (0.6, 9.0):  # below and above B'
        assert_recomputes(basement_steps(HeatedBasement(CLAY, 2.0, floor, 0.8, 80.0, 36.0)))
    assert_recomputes(rain_steps(3.0, 4.0, 4.5))
    for level in LEVELS:
        assert_recomputes(void_steps(level, 2.342, 3.18))
