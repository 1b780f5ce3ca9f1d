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
from tests.solve.field.elements import lines, u_by
from tests.solve.field.sections import BLOCK, CHEEK, WOOD, accepted, c_stud, random_section


def by_elements(of: Section, pieces: int) -> float:
    """U by quadratic triangles with adiabatic sides, as the energy of the field."""
    x, y = lines(of.widths, pieces), lines(of.depths, pieces)
    mesh = skfem.MeshTri.init_tensor(x, y)
    middle = mesh.p[:, mesh.t].mean(axis=1)
    column = np.searchsorted(np.cumsum(of.widths), middle[0])
    row = np.searchsorted(np.cumsum(of.depths), middle[1])
    conductivity = np.array(of.conductivities)[row, column]
    films = (of.outside, of.inside)
    width, depth = sum(of.widths), sum(of.depths)
    return u_by(mesh, skfem.ElementTriP2(), conductivity, films, depth, width)


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
