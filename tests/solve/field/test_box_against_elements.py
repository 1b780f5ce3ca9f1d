"""Boxes against hexahedra of a general-purpose library (scikit-fem), on meshes of its own.

Its conforming elements give an upper bound that falls with refinement: never below ``low``, and
towards the interval.
"""

from __future__ import annotations

import numpy as np
import pytest
import skfem

from envcheck.solve.box import Box
from envcheck.solve.field.box_bound import bound_box
from tests.solve.field.boxes import battens, crossing
from tests.solve.field.elements import lines, u_by


def by_hexahedra(of: Box, pieces: int) -> float:
    """U by trilinear hexahedra with adiabatic sides, as the energy of the field."""
    places = [lines(sizes, pieces) for sizes in (of.widths, of.heights, of.depths)]
    mesh = skfem.MeshHex.init_tensor(*places)
    middle = mesh.p[:, mesh.t].mean(axis=1)
    at = [
        np.searchsorted(np.cumsum(sizes), middle[axis])
        for axis, sizes in enumerate((of.widths, of.heights, of.depths))
    ]
    conductivity = np.array(of.conductivities)[at[2], at[1], at[0]]
    films = (of.outside, of.inside)
    return u_by(mesh, skfem.ElementHex1(), conductivity, films, sum(of.depths), of.area)


@pytest.mark.parametrize(
    ("of", "coarse", "fine"), [(battens(), 2, 5), (crossing(), 1, 3)], ids=["battens", "steel"]
)
def test_elements_fall_towards_the_interval(of: Box, coarse: int, fine: int) -> None:
    of = of._replace(repeats_along=False, repeats_up=False)
    found = bound_box(of)
    first, second = by_hexahedra(of, coarse), by_hexahedra(of, fine)
    assert found.low <= second
    assert second <= first
    assert second - found.high < 0.3 * (first - found.high) or second <= found.high
