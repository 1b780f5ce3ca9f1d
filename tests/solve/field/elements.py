"""U of a drawing by conforming finite elements of a general library, as the energy of the field."""

from __future__ import annotations

import numpy as np
import skfem


def lines(sizes: tuple[float, ...], pieces: int) -> np.ndarray:
    """Lines of a mesh that grows finer towards both ends of every size."""
    spread = (1 - np.cos(np.linspace(0, np.pi, pieces + 1))) / 2
    spread = spread**1.5 / (spread**1.5 + (1 - spread) ** 1.5)
    places, start = [0.0], 0.0
    for size in sizes:
        places += list(start + size * spread[1:])
        start += size
    return np.array(places)


def u_by(
    mesh: skfem.Mesh,
    element: skfem.Element,
    conductivity: np.ndarray,
    films: tuple[float, float],
    depth: float,
    area: float,
) -> float:
    """U with adiabatic sides; along the last axis the outer face lies at 0, the inner at ``depth``.

    conductivity: of each element, W/(m K). films: outer and inner, m2 K/W. area: of the faces, m2
    (or their width, m, in two dimensions).
    """
    basis = skfem.Basis(mesh, element)

    @skfem.BilinearForm
    def conduction(u, v, w):
        return w.k * sum(u.grad[axis] * v.grad[axis] for axis in range(mesh.dim()))

    @skfem.BilinearForm
    def film(u, v, w):
        return u * v / w.resistance

    @skfem.LinearForm
    def air(v, w):
        return v / w.resistance

    faces = [
        skfem.FacetBasis(mesh, element, facets=mesh.facets_satisfying(on))
        for on in (lambda p: np.isclose(p[-1], 0), lambda p: np.isclose(p[-1], depth))
    ]
    outside, inside = films
    matrix = conduction.assemble(basis, k=conductivity[:, None])
    matrix += film.assemble(faces[0], resistance=outside)
    matrix += film.assemble(faces[1], resistance=inside)
    load = air.assemble(faces[1], resistance=inside)
    field = skfem.solve(matrix, load)
    # E(T) = T.A.T - 2 b.T + A / Ri, at its minimum
    return float((area / inside - load @ field) / area)
