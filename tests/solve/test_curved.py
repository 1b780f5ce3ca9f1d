"""Cylinders and spheres as whole assemblies, against textbook shells and the ht library."""

from __future__ import annotations

from math import pi

import ht
import pytest

from envcheck.model.additions import Curved
from envcheck.model.layers import ContactLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Solved
from envcheck.solve import shells
from envcheck.solve.assembly import solve
from tests.solve.samples import WOOL, assembly, assert_recomputes, material, plane, setting, stated

PIPE = plane("pipe", material("steel", 50.0, "metal"), 0.005)
WRAP = plane("wrap", WOOL, 0.05)
INNER = 0.1
OUTER = 0.155


def run(*layers: object, face: str = "outer", shape: str = "cylinder", **films: float) -> Solved:
    total = sum(getattr(layer, "thickness", 0.0) for layer in layers)
    curved = Curved(shape, face, INNER, INNER + total, True)
    of = assembly(*layers, kind="curved", curved=curved)
    solved = solve(of, setting(method="curved")._replace(**films), Conventions())
    assert_recomputes(solved.steps)
    return solved


def by_symbol(solved: Solved) -> dict[str, float]:
    return {step.symbol: step.value for step in solved.steps}


@pytest.mark.parametrize("face", ["outer", "inner"])
def test_cylinder_is_the_textbook_network(face: str) -> None:
    metre = (
        0.04 / shells.cylinder_area(OUTER)
        + shells.cylinder_resistance(0.105, OUTER, WOOL.conductivity)
        + shells.contact_resistance(0.003, shells.cylinder_area(0.105))
        + shells.cylinder_resistance(INNER, 0.105, 50.0)
        + 0.13 / shells.cylinder_area(INNER)
    )
    joint = ContactLayer("contact", "joint", 1, 0.003, "invented")
    solved = run(WRAP, joint, PIPE, face=face)
    radius = OUTER if face == "outer" else INNER
    assert solved.value == pytest.approx(1 / metre / shells.cylinder_area(radius))
    assert by_symbol(solved)["U_length"] == pytest.approx(1 / metre)


def test_sphere_is_the_textbook_network() -> None:
    whole = (
        0.04 / (4 * pi * OUTER**2)
        + shells.sphere_resistance(0.105, OUTER, WOOL.conductivity)
        + shells.sphere_resistance(INNER, 0.105, 50.0)
        + 0.13 / (4 * pi * INNER**2)
    )
    solved = run(WRAP, PIPE, shape="sphere")
    assert solved.value == pytest.approx(1 / whole / (4 * pi * OUTER**2))
    assert by_symbol(solved)["U_sphere"] == pytest.approx(1 / whole)


def test_against_the_ht_library() -> None:
    # ht.cylindrical_heat_transfer: per length, films as coefficients; an independent library.
    found = ht.cylindrical_heat_transfer(
        Ti=1.0, To=0.0, hi=1 / 0.13, ho=1 / 0.04, Di=2 * INNER, ts=[0.005, 0.05],
        ks=[50.0, WOOL.conductivity],
    )  # fmt: skip
    assert by_symbol(run(WRAP, PIPE))["U_length"] == pytest.approx(found["Q"], rel=1e-9)


def test_large_radius_is_a_plane_wall() -> None:
    plane_u = 1 / (0.04 + 0.05 / WOOL.conductivity + 0.005 / 50.0 + 0.13)
    for shape in ("cylinder", "sphere"):
        curved = Curved(shape, "outer", 1e5, 1e5 + 0.055, True)
        of = assembly(WRAP, PIPE, kind="curved", curved=curved)
        solved = solve(of, setting(method="curved"), Conventions())
        assert solved.value == pytest.approx(plane_u, rel=2e-6)


def test_a_stated_outer_radius_gives_the_same() -> None:
    curved = Curved("cylinder", "outer", INNER, OUTER, False)
    of = assembly(WRAP, PIPE, kind="curved", curved=curved)
    solved = solve(of, setting(method="curved"), Conventions())
    assert_recomputes(solved.steps)
    assert solved.value == pytest.approx(run(WRAP, PIPE).value)


def test_critical_radius_is_where_the_heat_flow_is_greatest() -> None:
    # A poor wrap on a thin pipe under a thick film: k Rs = 0.2 x 0.7 = 0.14 m.
    poor = material("poor wrap", 0.2)
    flows = {
        thickness: by_symbol(run(plane("wrap", poor, thickness), outside_film=0.7))["U_length"]
        for thickness in (0.03, 0.04, 0.05)
    }
    assert max(flows, key=lambda t: flows[t]) == 0.04
    within = run(plane("wrap", poor, 0.02), outside_film=0.7)
    assert by_symbol(within)["r_cr"] == pytest.approx(0.14)
    assert any("critical radius" in said for said in within.assumptions)
    beyond = run(plane("wrap", poor, 0.06), outside_film=0.7)
    assert not any("critical radius" in said for said in beyond.assumptions)


def test_stated_resistances_bend_too() -> None:
    # With a thickness like a material of t/R; without one like a contact.
    of = stated("wrap", 0.05 / WOOL.conductivity, 0.05)
    assert run(of, PIPE).value == pytest.approx(run(WRAP, PIPE).value)
    thin = run(stated("coat", 0.1), PIPE)
    assert by_symbol(thin)["R1"] == pytest.approx(0.1)
    assert thin.counted[0].resistance == pytest.approx(0.1)


def test_nothing_at_all_is_no_value() -> None:
    solved = run(stated("nothing", 0.0), outside_film=0.0, inside_film=0.0)
    assert solved.value is None
    assert "a resistance" in solved.missing[0]
