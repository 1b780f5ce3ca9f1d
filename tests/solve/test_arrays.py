"""Pure functions on numpy arrays give what they give on floats, and what they define.

Every registered method stands here with its functions, or with the reason why it has none.
"""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import numpy.typing as npt
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.project import Fill, Member
from envcheck.model.ruleset import Conventions
from envcheck.solve import network, shells
from envcheck.solve.assembly import draw
from envcheck.solve.lights import in_series
from envcheck.solve.methods.air_space import (
    air_space_iso6946,
    convective_coefficient,
    effective_emittance,
    radiative_coefficient,
)
from envcheck.solve.methods.air_voids import void_correction
from envcheck.solve.methods.bridges import added_by_bridge
from envcheck.solve.methods.compressed import in_proportion
from envcheck.solve.methods.curved import at_radius, critical, cylinder_layer, sphere_layer
from envcheck.solve.methods.en673_glazing import (
    Gas,
    gas_conductance,
    glazing_u,
    radiation_conductance,
)
from envcheck.solve.methods.fasteners import (
    fastener_area,
    fastener_correction,
    penetration_factor,
)
from envcheck.solve.methods.inverted_roof import rain_correction
from envcheck.solve.methods.iso10077_window import window_geometry, window_u
from envcheck.solve.methods.iso10456_conversion import design_conductivity
from envcheck.solve.methods.iso13370_basement import (
    basement_floor_u,
    basement_u,
    basement_wall_u,
    wall_thickness,
)
from envcheck.solve.methods.iso13370_edge import edge_psi, edge_thickness, slab_with_edge
from envcheck.solve.methods.iso13370_slab import (
    bare_ground_u,
    characteristic_dimension,
    equivalent_thickness,
    slab_u,
)
from envcheck.solve.methods.iso13370_suspended import SuspendedFloor, suspended_u, underfloor_air_u
from envcheck.solve.methods.iso13370_unheated import UnheatedBasement, unheated_basement_u
from envcheck.solve.methods.iso13788_condensation import rate
from envcheck.solve.methods.slightly_ventilated import between_closed_and_open
from envcheck.solve.methods.steel_framing import effective_resistance
from envcheck.solve.methods.surface_films import convection_by_wind, surface_resistance
from envcheck.solve.methods.tapered import (
    tapered_rectangle,
    tapered_triangle_thickest_apex,
    tapered_triangle_thinnest_apex,
)
from envcheck.solve.methods.tapered_pieces import Piece, drained_roof_u, tapered_triangle
from envcheck.solve.methods.weighted import bre_weight, decide_weighted, weighted
from envcheck.solve.methods.wirings import decide_isothermal_planes, decide_parallel_path
from envcheck.solve.methods.zone import zone_u, zone_width
from envcheck.solve.registry import Decision, Wall, methods
from envcheck.solve.surface import plain_factor
from envcheck.solve.wiring import bounds
from tests.solve.samples import WOOD, WOOL, XPS, assembly, framed, plane, setting, stated
from tests.solve.test_invariants import few

Function = Callable[..., object]
Numbers = npt.NDArray[np.float64] | float
AIR = Gas(1.232, 1.761e-5, 0.02496, 1008.0)
WEDGE = Piece("triangle_thinnest_apex", 2.0, 3.0)


def wall(thickness: Numbers, conductivity: Numbers, wood: Numbers, lining: Numbers) -> Wall:
    """A wall of studs, whose numbers across the wall may be arrays."""
    wool = WOOL._replace(conductivity=conductivity / 100.0)
    member = Member(WOOD._replace(conductivity=wood / 10.0), 0.038, 0.4)
    of = assembly(
        plane("board", XPS, thickness / 100.0),
        framed("studs", 0.14, member, Fill(material=wool)),
        stated("lining", lining),
    )
    return draw(of, setting(), Conventions())[0]


def by(decide: Callable[[Wall], Decision]) -> tuple[Function, int]:
    return lambda *numbers: decide(wall(*numbers)).value, 4


SERIES: list[tuple[Function, int]] = [(network.series, 3), (network.plane_wall, 2)]
SLAB: list[tuple[Function, int]] = [
    (characteristic_dimension, 2),
    (equivalent_thickness, 5),
    (bare_ground_u, 3),
    (slab_u, 3),
]
FUNCTIONS: dict[str, list[tuple[Function, int]]] = {
    "air_space": [
        (lambda a, b: effective_emittance(a / 6.0, b / 6.0), 2),
        (radiative_coefficient, 1),
        *(
            (lambda d, way=way: convective_coefficient(d / 20.0, way), 1)
            for way in ("up", "horizontal", "down")
        ),
        (lambda d, a, b, t: air_space_iso6946(d / 20.0, "down", a / 6.0, b / 6.0, t), 4),
    ],
    "air_voids": [(void_correction, 3)],
    "bridges": [(added_by_bridge, 3)],
    "compressed": [(in_proportion, 3)],
    "en673_glazing": [
        (lambda gap, by_kelvin: gas_conductance(AIR, gap / 100.0, by_kelvin), 2),
        (lambda a, b: radiation_conductance(a / 6.0, b / 6.0), 2),
        (
            lambda a, b: glazing_u(
                [0.004] * 3, [a / 100.0, b / 100.0], [AIR] * 2, [(0.8, 0.8)] * 2
            ),
            2,
        ),
    ],
    "fasteners": [(penetration_factor, 2), (fastener_area, 1), (fastener_correction, 7)],
    "cavity_fill": SERIES,
    "framed_layer": [(lambda a, b, c: network.parallel([0.25, 0.75], [a + c, b]), 3)],
    "c_factor": [(lambda a, b: 1.0 / network.series(a, b), 2)],
    "inverted_roof": [(rain_correction, 4)],
    "iso10077_window": [
        (lambda w, h: window_geometry(w + 1.0, h + 1.0, 0.1).area_glass, 2),
        (window_u, 6),
        (in_series, 3),
    ],
    "iso10456_conversion": [(design_conductivity, 5)],
    "iso12631_curtain_wall": [(window_u, 6)],
    "iso13370_basement": [
        (wall_thickness, 4),
        (basement_wall_u, 4),
        (basement_floor_u, 4),
        (basement_u, 5),
    ],
    "iso13370_basement_floor": [(basement_floor_u, 4)],
    "iso13370_basement_wall": [(basement_wall_u, 4)],
    "iso13370_unheated": [(lambda *given: unheated_basement_u(UnheatedBasement(*given)), 9)],
    "curved": [
        (lambda r, more, k: cylinder_layer(r, r, r + more, k), 3),
        (lambda r, more, k: sphere_layer(r, r, r + more, k), 3),
        (at_radius, 3),
        (critical, 2),
    ],
    "slightly_ventilated": [(lambda a, b: between_closed_and_open(9e-4, a, b), 2)],
    "iso13370_edge": [(edge_thickness, 3), (edge_psi, 4), (slab_with_edge, 3)],
    "iso13370_slab": SLAB,
    "iso13370_suspended": [
        (lambda *given: suspended_u(SuspendedFloor(*given)), 9),
        (lambda *given: underfloor_air_u(SuspendedFloor(*given)), 9),
    ],
    "masonry_unit": [(lambda a, b, c: a + network.parallel([0.2, 0.8], [b, c]) + a, 3)],
    "plane_layer": SERIES,
    "stated_resistance": SERIES,
    "contact": [(shells.contact_resistance, 2), (shells.equivalent_thickness, 2)],
    "cavity_factor": [(effective_resistance, 2)],
    "surface_films": [(surface_resistance, 3), (convection_by_wind, 1)],
    "tapered": [
        (tapered_rectangle, 2),
        (tapered_triangle_thickest_apex, 2),
        (tapered_triangle_thinnest_apex, 2),
    ],
    "tapered_pieces": [
        (lambda r0, r1, more: tapered_triangle(r0, r1, r1 + more), 3),
        (lambda r0, r1, more: drained_roof_u(r0, [Piece("rectangle", more, r1), WEDGE]), 3),
    ],
    "weighted": [
        (bre_weight, 4),
        (lambda p, a, b: weighted(p / 6.0, a, b), 3),
        by(decide_weighted),
    ],
    "series": SERIES,
    "parallel_path": [
        by(decide_parallel_path),
        (lambda *numbers: bounds(wall(*numbers))[0], 4),
    ],
    "isothermal_planes": [
        by(decide_isothermal_planes),
        (lambda *numbers: bounds(wall(*numbers))[1], 4),
    ],
    "zone": [(zone_width, 2), (zone_u, 4)],
    "iso13788_surface": [(plain_factor, 2)],
    "iso13788_condensation": [
        (lambda d1, d2, p0, p1, p2: rate((0.0, p0), (d1, p1), (d1 + d2, p2)), 5)
    ],
}
NO_FUNCTION = {
    "crossed_insulation": "a convention, no formula",
    "f_factor": "looked up row by row, never computed",
    "rated": "the stated value itself",
    "effective_layer": "looked up row by row, never computed",
    "two_dimensional": "solved section by section",
    "drawn_section": "cut into layers and air spaces, which stand above; solved section by section",
}
SHELLS: list[tuple[Function, int]] = [
    (lambda r, d, k, length: shells.cylinder_resistance(r, r + d, k, length), 4),
    (lambda r, d, k: shells.sphere_resistance(r, r + d, k), 3),
    (shells.cylinder_area, 2),
    (shells.convection_resistance, 2),
    (shells.critical_radius, 2),
]
EVERY = [(name, *each) for name, found in FUNCTIONS.items() for each in found] + [
    ("shells", *each) for each in SHELLS
]


def test_every_method_stands_here() -> None:
    assert {*FUNCTIONS, *NO_FUNCTION} == set(methods())
    assert not FUNCTIONS.keys() & NO_FUNCTION.keys()


@pytest.mark.parametrize("shape", [(), (5,), (3, 4)], ids=str)
@pytest.mark.parametrize(("name", "function", "arguments"), EVERY)
def test_an_array_of_any_shape_gives_one_result_each(
    name: str, function: Function, arguments: int, shape: tuple[int, ...]
) -> None:
    rng = np.random.default_rng(len(name) + arguments)
    numbers = [np.asarray(rng.uniform(0.1, 5.0, shape)) for _ in range(arguments)]
    found = np.asarray(function(*numbers))
    assert found.shape == shape
    for index in np.ndindex(*shape):
        alone = function(*(float(array[index]) for array in numbers))
        assert type(alone) is float, "a float gives a float"
        assert found[index] == pytest.approx(alone, rel=1e-12)


@pytest.mark.parametrize(("name", "function", "arguments"), EVERY)
@few
@given(data=st.data())
def test_arrays_that_broadcast_give_what_floats_give(
    name: str, function: Function, arguments: int, data: st.DataObject
) -> None:
    # One argument along each of two axes, so that they broadcast against each other.
    numbers = st.lists(st.floats(0.1, 5.0), min_size=2, max_size=2)
    given_ = [np.array(data.draw(numbers)) for _ in range(arguments)]
    shaped = [array.reshape(2, 1) if i % 2 else array for i, array in enumerate(given_)]
    found = np.asarray(function(*shaped))
    assert found.shape == ((2, 2) if arguments > 1 else (2,))
    for index in np.ndindex(*found.shape):
        picked = [float(array[index[0] if i % 2 else index[-1]]) for i, array in enumerate(given_)]
        assert found[index] == pytest.approx(function(*picked), rel=1e-12)


@few
@given(st.lists(st.floats(0.01, 1.0), min_size=1, max_size=5), st.data())
def test_series_and_parallel_by_definition(raw: list[float], data: st.DataObject) -> None:
    values = data.draw(st.lists(st.floats(0.01, 20.0), min_size=len(raw), max_size=len(raw)))
    shares = [one / sum(raw) for one in raw]
    assert network.series(*values) == pytest.approx(sum(values))
    beside = network.parallel(shares, values)
    assert 1 / beside == pytest.approx(sum(f / r for f, r in zip(shares, values, strict=True)))
    assert min(values) * (1 - 1e-12) <= beside <= max(values) * (1 + 1e-12)
    assert beside <= sum(f * r for f, r in zip(shares, values, strict=True)) * (1 + 1e-12)
