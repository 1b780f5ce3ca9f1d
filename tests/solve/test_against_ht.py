"""Plane, cylindrical and spherical walls against `ht`, a general heat-transfer library."""

from __future__ import annotations

from math import pi

import ht.conduction as ht
import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.solve import shells
from envcheck.solve.network import parallel, plane_wall, series
from envcheck.units import convert, to_si

CLOSE = 1e-9
# ht converts R-values with the same Btu of 1055.05585262 J, so that only rounding differs.
lengths = st.floats(1e-3, 2.0)
conductivities = st.floats(0.01, 400.0)


@given(lengths, conductivities)
def test_plane_wall(thickness: float, conductivity: float) -> None:
    oracle = ht.k_to_R(k=conductivity, t=thickness)
    assert plane_wall(thickness, conductivity) == pytest.approx(oracle, rel=CLOSE)


@given(lengths, st.floats(1.001, 10.0), conductivities, st.floats(0.1, 100.0))
def test_cylinder(r_in: float, ratio: float, conductivity: float, length: float) -> None:
    computed = shells.cylinder_resistance(r_in, r_in * ratio, conductivity, length)
    oracle = ht.R_cylinder(2 * r_in, 2 * r_in * ratio, conductivity, length)
    assert computed == pytest.approx(oracle, rel=CLOSE)


def test_cylinder_of_two_insulated_layers_with_films() -> None:
    resistances = (
        shells.convection_resistance(60.0, shells.cylinder_area(0.025)),
        shells.cylinder_resistance(0.025, 0.0275, 80.0),
        shells.cylinder_resistance(0.0275, 0.0575, 0.05),
        shells.convection_resistance(18.0, shells.cylinder_area(0.0575)),
    )
    oracle = ht.cylindrical_heat_transfer(
        Ti=593.15, To=278.15, hi=60, ho=18, Di=0.05, ts=[0.0025, 0.03], ks=[80, 0.05]
    )
    assert 315.0 / series(*resistances) == pytest.approx(oracle["Q"], rel=CLOSE)
    assert 1.0 / series(*resistances) == pytest.approx(oracle["UA"], rel=CLOSE)


def test_sphere_in_a_wide_medium_tends_to_the_deeply_buried_sphere() -> None:
    """ht's sphere below a plane tends to the sphere in an endless medium: S = 2 pi D."""
    diameter, depth, conductivity = 1.0, 1e6, 2.0
    oracle = 1.0 / (conductivity * ht.S_isothermal_sphere_to_plane(diameter, depth))
    computed = shells.sphere_resistance(diameter / 2, 1e9, conductivity)
    assert computed == pytest.approx(oracle, rel=1e-6)


@given(lengths, st.floats(1.001, 10.0), conductivities)
def test_sphere_is_the_sum_of_thin_plane_shells(r_in: float, ratio: float, k: float) -> None:
    """By quadrature of dr / (k 4 pi r2), with no use of the closed form."""
    count = 400
    step = r_in * (ratio - 1) / count
    radii = (r_in + (n + 0.5) * step for n in range(count))
    oracle = sum(ht.k_to_R(k=k, t=step, A=4 * pi * r**2) for r in radii)
    assert shells.sphere_resistance(r_in, r_in * ratio, k) == pytest.approx(oracle, rel=1e-3)


@given(conductivities)
def test_conductivity_to_r_per_inch_and_back(conductivity: float) -> None:
    """ht's "R-value" in inch-pound units is for one inch of thickness."""
    inch = to_si(1.0, "in")
    printed = convert(plane_wall(inch, conductivity), "h*ft2*degF/Btu")
    assert ht.R_value_to_k(printed, SI=False) == pytest.approx(conductivity, rel=CLOSE)
    assert ht.k_to_R_value(conductivity, SI=False) == pytest.approx(printed, rel=CLOSE)


@given(st.floats(0.01, 10.0), lengths)
def test_resistance_to_conductivity(resistance: float, thickness: float) -> None:
    conductivity = ht.R_to_k(R=resistance, t=thickness)
    assert plane_wall(thickness, conductivity) == pytest.approx(resistance, rel=CLOSE)


def test_unit_of_the_printed_u_factor() -> None:
    ratio = ht.R_value_to_k(1.0, SI=False) / ht.R_value_to_k(1.0)
    assert to_si(1.0, "Btu/(h*ft2*degF)") == pytest.approx(ratio, rel=CLOSE)


@given(st.lists(st.tuples(lengths, conductivities), min_size=1, max_size=6))
def test_wall_of_layers_is_one_wall_of_the_mean_conductivity(
    layers: list[tuple[float, float]],
) -> None:
    total = series(*(plane_wall(thickness, k) for thickness, k in layers))
    depth = sum(thickness for thickness, _ in layers)
    assert ht.k_to_R(k=ht.R_to_k(R=total, t=depth), t=depth) == pytest.approx(total, rel=CLOSE)
    assert total == pytest.approx(sum(ht.k_to_R(k=k, t=t) for t, k in layers), rel=CLOSE)


@given(st.floats(0.01, 0.99), conductivities, conductivities)
def test_two_materials_side_by_side(share: float, k_1: float, k_2: float) -> None:
    oracle = 1.0 / sum(
        1.0 / ht.k_to_R(k=k, t=0.1, A=a) for k, a in ((k_1, share), (k_2, 1 - share))
    )
    computed = parallel((share, 1 - share), (plane_wall(0.1, k_1), plane_wall(0.1, k_2)))
    assert computed == pytest.approx(oracle, rel=CLOSE)
