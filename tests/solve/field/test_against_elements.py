"""Bounds against finite elements of a general-purpose library (scikit-fem), on meshes of its own.

Its conforming elements give an upper bound that falls with refinement: never below ``low``, and
soon within the interval.
"""

from __future__ import annotations

from itertools import islice

import numpy as np
import pytest
import skfem

from envcheck.solve.field.bound import bound
from envcheck.solve.field.section import Section
from tests.solve.field.sections import BLOCK, CHEEK, WOOD, accepted, c_stud, random_section


def lines(sizes: tuple[float, ...], pieces: int) -> np.ndarray:
    """Lines of a mesh that grows finer towards both ends of every size."""
    spread = (1 - np.cos(np.linspace(0, np.pi, pieces + 1))) / 2
    spread = spread**1.5 / (spread**1.5 + (1 - spread) ** 1.5)
    places, start = [0.0], 0.0
    for size in sizes:
        places += list(start + size * spread[1:])
        start += size
    return np.array(places)


def by_elements(of: Section, pieces: int) -> float:
    """U by quadratic triangles with adiabatic sides, as the energy of the field."""
    x, y = lines(of.widths, pieces), lines(of.depths, pieces)
    mesh = skfem.MeshTri.init_tensor(x, y)
    basis = skfem.Basis(mesh, skfem.ElementTriP2())
    middle = mesh.p[:, mesh.t].mean(axis=1)
    column = np.searchsorted(np.cumsum(of.widths), middle[0])
    row = np.searchsorted(np.cumsum(of.depths), middle[1])
    conductivity = np.array(of.conductivities)[row, column][:, None]

    @skfem.BilinearForm
    def conduction(u, v, w):
        return w.k * (u.grad[0] * v.grad[0] + u.grad[1] * v.grad[1])

    @skfem.BilinearForm
    def film(u, v, w):
        return u * v / w.resistance

    @skfem.LinearForm
    def air(v, w):
        return v / w.resistance

    depth = sum(of.depths)
    faces = [
        skfem.FacetBasis(mesh, skfem.ElementTriP2(), facets=mesh.facets_satisfying(at))
        for at in (lambda p: np.isclose(p[1], 0), lambda p: np.isclose(p[1], depth))
    ]
    matrix = conduction.assemble(basis, k=conductivity)
    matrix += film.assemble(faces[0], resistance=of.outside)
    matrix += film.assemble(faces[1], resistance=of.inside)
    load = air.assemble(faces[1], resistance=of.inside)
    field = skfem.solve(matrix, load)
    width = sum(of.widths)
    # E(T) = T.A.T - 2 b.T + width / Ri, at its minimum
    return float((width / of.inside - load @ field) / width)


def sections() -> list[Section]:
    """Six drawn by hand and six drawn at random, all with adiabatic sides.

    Left out at random: conductors that nearly meet in a corner (many rounds), where triangles
    without a refinement of their own come down too slowly to compare.
    """
    found = [WOOD, c_stud(), c_stud(outer=True), c_stud(lip=12.7), CHEEK, BLOCK]
    rng = np.random.default_rng(4)
    drawn = accepted(random_section, rng, 100)
    found += islice((of for of in drawn if 1 < bound(of).rounds <= 12), 6)
    return [of._replace(periodic=False) for of in found]


@pytest.mark.parametrize("of", sections(), ids=lambda of: f"{len(of.depths)}x{len(of.widths)}")
def test_elements_fall_towards_the_interval(of: Section) -> None:
    found = bound(of, 5e-4)
    coarse, fine = by_elements(of, 4), by_elements(of, 16)
    rounding = 1 + 1e-8  # of the energy, a difference of larger numbers
    assert found.low <= fine * rounding
    assert fine <= coarse * rounding
    assert fine <= found.high
