"""Bounds of outlines against exact results, sections, theory and finite elements."""

from __future__ import annotations

import math
from itertools import islice

import numpy as np
import pytest
import skfem

from envcheck.solve.field import outline_networks
from envcheck.solve.field.bound import bound
from envcheck.solve.field.outline import Outline, cells_of, first_outline_grid
from envcheck.solve.field.outline_bound import OutlineBounds, bound_outline
from envcheck.solve.field.section import ModelError, Section
from tests.solve.field.outlines import (
    GAP,
    IN,
    OUT,
    corner,
    insulated_corner,
    mirrored,
    of_section,
    outline,
    random_outlines,
    transposed,
)
from tests.solve.field.sections import BLOCK, CHEEK, WOOD, c_stud


def meets(one: OutlineBounds, other: OutlineBounds, scale: float = 1.0) -> bool:
    return one.low * scale <= other.high and other.low <= one.high * scale


@pytest.mark.parametrize("of", [WOOD, c_stud(lip=12.7), CHEEK, BLOCK])
def test_a_rectangle_is_the_section_that_it_is(of: Section) -> None:
    by_section = bound(of._replace(periodic=False), 3e-4)
    found, width = bound_outline(of_section(of), 3e-4), sum(of.widths)
    assert found.stopped_by == "tolerance"
    assert found.low / width <= by_section.high
    assert by_section.low <= found.high / width


# The extra squares of a plain right-angled corner between surfaces of given temperatures: exactly
# 1 - 2 ln 2 / pi = .5587 by conformal mapping (from memory); heat-transfer textbooks print .54 per
# metre for the edge of two adjoining walls (Incropera and DeWitt, Table 4.1, case 8, seen in a
# quotation; Holman likewise, from memory), for walls longer than a fifth of their thickness.
CORNER, PRINTED_CORNER = 1.0 - 2.0 * math.log(2.0) / math.pi, 0.54


@pytest.mark.parametrize(("thickness", "k"), [(0.3, 1.0), (0.1, 0.04)])
def test_plain_corner_has_its_exact_shape_factor_inside(thickness: float, k: float) -> None:
    leg = 6.0 * thickness
    found = bound_outline(corner(thickness, leg, k), 1e-4)
    low, high = (end / k - 2.0 * leg / thickness for end in (found.low, found.high))
    assert low <= CORNER <= high
    assert high - low < 2e-3
    assert (low + high) / 2.0 == pytest.approx(PRINTED_CORNER, abs=0.02)


def test_room_within_walls_has_four_corners() -> None:
    """Solids around a hole: no flow path needs to reach an edge of the drawing."""
    t, a, b = 0.2, 1.5, 2.5
    found = bound_outline(
        outline(
            [0.1, t, a, t, 0.1],
            [0.1, t, b, t, 0.1],
            [
                [GAP, OUT, OUT, OUT, GAP],
                [OUT, 1.0, 1.0, 1.0, OUT],
                [OUT, 1.0, IN, 1.0, OUT],
                [OUT, 1.0, 1.0, 1.0, OUT],
                [GAP, OUT, OUT, OUT, GAP],
            ],
            1e-9,
            1e-9,
        ),
        2e-4,
    )
    exact = 2.0 * (a + b) / t + 4.0 * CORNER
    assert found.low <= exact * (1 + 1e-6)
    assert exact <= found.high


def test_bounds_enclose_on_random_outlines_at_every_fineness() -> None:
    for of in random_outlines(np.random.default_rng(10211), 150):
        coarse = bound_outline(of, 1e-9, most_rounds=1)
        fine = bound_outline(of, 5e-3, most_rounds=7)
        assert 0 < coarse.low <= fine.low <= fine.high <= coarse.high


def test_any_flow_gives_a_lower_bound_and_any_field_an_upper_one() -> None:
    """Green's formula leaves no room: not even a heat balance in ruins lifts the lower bound."""
    rng = np.random.default_rng(3)
    for of in random_outlines(rng, 40):
        true = bound_outline(of, 2e-3, most_rounds=8)
        cells = cells_of(of, first_outline_grid(of))
        flows, field = outline_networks.lower(cells), outline_networks.upper(cells)
        for size in (1e-3, 0.03, 0.3):
            x, y = flows.flow_x.copy(), flows.flow_y.copy()
            for flow in (x, y):
                through = flow != 0  # none through adiabatic faces
                flow[through] *= 1.0 + size * rng.standard_normal(int(through.sum()))
            assert outline_networks._bound(cells, x, y) <= true.high
            other = field.temperatures + size * rng.standard_normal(field.temperatures.shape)
            assert outline_networks._energy(cells, other) >= true.low


def test_turned_mirrored_and_scaled_details_are_the_same() -> None:
    of = insulated_corner(slab=True)
    there = bound_outline(of)
    for other in (transposed(of), mirrored(of), transposed(mirrored(of))):
        assert meets(there, bound_outline(other))
    larger = of._replace(
        widths=tuple(3.0 * w for w in of.widths),
        heights=tuple(3.0 * h for h in of.heights),
        kinds=tuple(kind._replace(film=3.0 * kind.film) for kind in of.kinds),
    )
    assert meets(there, bound_outline(larger))
    better = of._replace(
        conductivities=tuple(tuple(2.0 * k for k in row) for row in of.conductivities),
        kinds=tuple(kind._replace(film=kind.film / 2.0) for kind in of.kinds),
    )
    assert meets(there, bound_outline(better), 2.0)
    assert not meets(there, bound_outline(insulated_corner()))


def test_a_cut_far_enough_changes_nothing() -> None:
    """Beyond about a metre a longer wall only adds its U times its length."""
    u = 1.0 / (0.04 + 0.1 / 0.035 + 0.2 / 0.8 + 0.13)
    near, far = (bound_outline(insulated_corner(legs), 5e-5) for legs in ((1.0, 1.2), (1.9, 2.4)))
    grown = u * (0.9 + 1.2)
    assert near.low + grown <= far.high
    assert far.low <= near.high + grown
    cut_short = bound_outline(insulated_corner((0.02, 0.02)), 5e-5)
    assert cut_short.high + u * (1.88 + 2.38) < far.low


def test_more_conductivity_never_lowers_the_flow() -> None:
    rng = np.random.default_rng(8)
    for of in random_outlines(rng, 25):
        more = of._replace(
            conductivities=tuple(
                tuple(k * float(rng.uniform(1.0, 2.0)) for k in row) for row in of.conductivities
            )
        )
        try:
            assert bound_outline(of, 5e-3).low <= bound_outline(more, 5e-3).high
        except ModelError as why:
            assert "corner" in str(why)  # two good conductors came to meet in a point


# ------------------------------------------------------------------------- finite elements


def by_elements(of: Outline, pieces: int) -> float:
    """L by quadratic triangles of scikit-fem on an even mesh of its own, as the field's energy."""
    x = np.concatenate([[0.0], *_split(of.widths, pieces)])
    y = np.concatenate([[0.0], *_split(of.heights, pieces)])
    mesh = skfem.MeshTri.init_tensor(x, y)
    k = np.array(of.conductivities)
    row, column = _cell(of, mesh.p[:, mesh.t].mean(axis=1))
    solid = np.flatnonzero(k[row, column] > 0)
    mesh, conductivity = mesh.restrict(solid), k[row, column][solid][:, None]
    element = skfem.ElementTriP2()
    basis = skfem.Basis(mesh, element)
    conduction = skfem.BilinearForm(
        lambda u, v, w: w.k * (u.grad[0] * v.grad[0] + u.grad[1] * v.grad[1])
    )
    film = skfem.BilinearForm(lambda u, v, w: u * v / w.resistance)
    air = skfem.LinearForm(lambda v, w: v / w.resistance)
    matrix, load, constant = conduction.assemble(basis, k=conductivity), 0.0, 0.0
    facets = mesh.boundary_facets()
    ends = mesh.p[:, mesh.facets[:, facets]]
    for number, kind in enumerate(of.kinds):
        these = facets[_faces_air(of, ends, number)]
        edge = skfem.FacetBasis(mesh, element, facets=these)
        matrix = matrix + film.assemble(edge, resistance=kind.film)
        if kind.indoors:
            load = air.assemble(edge, resistance=kind.film)
            sizes = np.abs(np.diff(mesh.p[:, mesh.facets[:, these]], axis=1)).sum()
            constant = float(sizes) / kind.film
    field = skfem.solve(matrix, load)
    return constant - float(load @ field)


def _split(sizes: tuple[float, ...], pieces: int) -> list[np.ndarray]:
    starts = np.concatenate([[0.0], np.cumsum(sizes)])
    grade = (1 - np.cos(np.linspace(0, np.pi, pieces + 1)[1:])) / 2
    grade = grade**1.5 / (grade**1.5 + (1 - grade) ** 1.5)
    return [start + size * grade for start, size in zip(starts, sizes, strict=False)]


def _cell(of: Outline, points: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
    column = np.searchsorted(np.cumsum(of.widths), points[0])
    row = np.searchsorted(np.cumsum(of.heights), points[1])
    return np.clip(row, 0, len(of.heights) - 1), np.clip(column, 0, len(of.widths) - 1)


def _faces_air(of: Outline, ends: np.ndarray, number: int) -> np.ndarray:
    """Whether there is air of that kind on one side of boundary facets; (2, 2, facets) ends."""
    middle, along = ends.mean(axis=1), np.diff(ends, axis=1)[:, 0]
    normal = np.array([-along[1], along[0]]) / np.hypot(*along) * 1e-6
    airs = np.array(of.airs)
    size = np.array([[sum(of.widths)], [sum(of.heights)]])
    found = np.zeros(ends.shape[2], dtype=bool)
    for side in (middle + normal, middle - normal):
        within = ((side > 0) & (side < size)).all(axis=0)
        found |= within & (airs[_cell(of, side)] == number)
    return found


def drawn() -> list[Outline]:
    """Three by hand and six at random; not those where conductors nearly meet in a corner: there
    triangles without a refinement of their own come down too slowly to compare.
    """
    found = [insulated_corner(), insulated_corner(slab=True), corner(0.2, 1.0, 0.5, 0.04, 0.13)]
    shapes = random_outlines(np.random.default_rng(21), 40)
    return [*found, *islice((of for of in shapes if 1 < bound_outline(of).rounds <= 11), 6)]


@pytest.mark.parametrize("of", drawn(), ids=lambda of: f"{len(of.heights)}x{len(of.widths)}")
def test_elements_fall_towards_the_interval(of: Outline) -> None:
    found = bound_outline(of, 1e-3)
    coarse, fine = by_elements(of, 3), by_elements(of, 16)
    rounding = 1 + 1e-8
    assert found.low <= fine * rounding
    assert fine <= coarse * rounding
    assert fine <= found.high


# ------------------------------------------------------------------------------ refusals


@pytest.mark.parametrize(
    ("cells", "words"),
    [
        ([[OUT, IN], [1.0, 1.0]], "air meet with nothing between them at x = 100 mm, y = 0 mm"),
        ([[1.0, OUT], [IN, 1.0]], "meet|touch in a corner only"),
        ([[OUT, 1.0], [1.0, GAP], [IN, GAP]], "touch in a corner only, at x = 100 mm, y = 100 mm"),
        ([[OUT, 50.0, 0.04], [GAP, 0.04, 50.0], [GAP, GAP, IN]], "touch in a corner only"),
        ([[OUT, 1.0, IN], [GAP, GAP, GAP], [1.0, 1.0, 1.0]], "y = 200 mm faces no air"),
        ([[OUT, 1.0, GAP, 1.0, IN]], "no solid reaches"),
        ([[OUT, 1e-6, IN]], "conducts 1e-06"),
        ([[OUT, 1e5, IN]], "conducts 1e.05"),
    ],
)
def test_what_cannot_be_meant_is_refused(cells: list[list[float | str]], words: str) -> None:
    widths, heights = [0.1] * len(cells[0]), [0.1] * len(cells)
    with pytest.raises(ModelError, match=words):
        bound_outline(outline(widths, heights, cells))


def test_sizes_and_films_must_be_there() -> None:
    of = corner(0.2, 1.0)
    with pytest.raises(ModelError, match="no width"):
        bound_outline(of._replace(widths=(0.1, 0.0, 1.0)))
    with pytest.raises(ModelError, match="no film"):
        bound_outline(of._replace(kinds=(of.kinds[0], of.kinds[1]._replace(film=0.0))))
    with pytest.raises(ModelError, match="do not match"):
        bound_outline(of._replace(heights=(0.1, 1.0)))
    with pytest.raises(ModelError, match="nodes, more than 20"):
        bound_outline(of, most_nodes=20)
    with pytest.raises(ModelError, match="solid and air"):
        bound_outline(of._replace(airs=((0, 0, 0),) * 3))
