"""The ground asked for by a project: what is missing, what lies out of range, what counts.

Values by hand stand in ``projects/test_workshop.py``; here is what changes or refuses them.
"""

from __future__ import annotations

import re

import pytest

from envcheck.model.ground import Basement, Ground, Slab, Suspended
from envcheck.model.project import Assembly, Fill, Member
from envcheck.model.ruleset import Conventions, FilmRow
from envcheck.model.solved import Solved
from envcheck.read.coefficient_tables import built_in
from envcheck.solve.assembly import solve
from envcheck.solve.methods.iso13370_slab import slab_u
from tests.solve.samples import (
    STEEL,
    WOOD,
    WOOL,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
    setting,
    stated,
)

EPS = material("EPS", 0.036, "insulation")
CONCRETE = material("concrete", 2.3, "concrete")
GROUND = Ground(34.0, 72.0, 0.4, 2.0, "inside")
INSIDE = Conventions(dimensions_measured="inside")
FLOOR = (plane("EPS", EPS, 0.1), plane("slab", CONCRETE, 0.1))
WALLS = (plane("XPS", EPS, 0.08), plane("wall", CONCRETE, 0.25))


def run(of: Assembly, method: str, under: Conventions = INSIDE) -> Solved:
    by = setting("down", method, 0.17)
    solved = solve(of, by, under)
    assert_recomputes(solved.steps)
    return solved


def slab(ground: Ground = GROUND, **edge: object) -> Assembly:
    given = Slab("none", 0.0, 0.0, False, None, ground.wall_thickness, ground.soil_conductivity,
                 ground.perimeter, ground.area, None, ground.measured)  # fmt: skip
    return assembly(*FLOOR, kind="slab-on-grade", slab=given._replace(**edge))


def suspended(**changes: object) -> Assembly:
    below = Suspended(GROUND, 0.4, 1.5, 1500e-6, 4.0, "average")._replace(**changes)
    return assembly(plane("wool", WOOL, 0.15), kind="suspended-floor", suspended=below)


def basement(**changes: object) -> Assembly:
    of = Basement(GROUND, 2.0, WALLS)._replace(**changes)
    return assembly(*FLOOR, kind="heated-basement", basement=of)


def unheated(**changes: object) -> Assembly:
    of = Basement(GROUND, 2.0, WALLS, (), 0.5, 1.2)._replace(**changes)
    return assembly(*FLOOR, kind="unheated-basement", basement=of)


BY_KIND = {
    "iso13370_slab": slab,
    "iso13370_suspended": suspended,
    "iso13370_basement": basement,
    "iso13370_basement_floor": basement,
    "iso13370_basement_wall": basement,
    "iso13370_unheated": unheated,
}


@pytest.mark.parametrize("method", BY_KIND)
def test_perimeter_and_area_are_asked_for(method: str) -> None:
    bare = GROUND._replace(perimeter=None, area=None)
    of = slab(bare) if method == "iso13370_slab" else BY_KIND[method](ground=bare)
    solved = run(of, method)
    assert solved.value is None
    assert "perimeter" in solved.missing[0] and "(area)" in solved.missing[0]


@pytest.mark.parametrize("method", BY_KIND)
def test_dimensions_of_the_other_kind_decide_nothing(method: str) -> None:
    outside = Conventions(dimensions_measured="outside")
    solved = run(BY_KIND[method](), method, outside)
    assert solved.value is None
    assert "by outside dimensions, as the rule set measures" in solved.missing[0]
    assert run(BY_KIND[method](), method, Conventions()).missing == ()


def test_basis_that_nobody_states_is_said() -> None:
    open_ = GROUND._replace(measured="")
    assert any("taken as by inside" in s for s in run(slab(open_), "iso13370_slab").assumptions)
    said = run(slab(open_), "iso13370_slab", Conventions()).assumptions
    assert any("is not stated" in words for words in said)


EDGE = {"insulation": "vertical", "resistance": 2.2, "extent": 0.6, "thickness": 0.08}


def test_edge_insulation_lowers_u_and_horizontal_reaches_half_as_far() -> None:
    plain = run(slab(), "iso13370_slab").value
    upright = run(slab(**EDGE), "iso13370_slab").value
    level = run(slab(**EDGE | {"insulation": "horizontal"}), "iso13370_slab").value
    twice = run(slab(**EDGE | {"insulation": "horizontal", "extent": 1.2}), "iso13370_slab").value
    assert plain is not None and upright is not None and level is not None
    assert upright < level < plain
    assert twice == pytest.approx(upright)


def test_edge_insulation_without_thickness_is_said_not_to_count() -> None:
    solved = run(slab(**EDGE | {"thickness": None}), "iso13370_slab")
    assert solved.value == run(slab(), "iso13370_slab").value
    assert any("not counted" in said for said in solved.assumptions)


def test_edge_insulation_no_better_than_soil_decides_nothing() -> None:
    solved = run(slab(**EDGE | {"resistance": 0.03}), "iso13370_slab")
    assert solved.value is None
    assert "resists more than the soil" in solved.missing[0]


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"height": None, "wind": None}, "(height).*(wind_speed)"),
        ({"openings": None, "shielding": ""}, "openings_per_length.*shielding"),
        ({"wall_u": None}, "wall_u_factor"),
        ({"depth": 0.6}, "at most 0.5 m below.*0.6 m are stated"),
    ],
)
def test_suspended_floor_says_what_it_lacks(changes: dict[str, object], words: str) -> None:
    solved = run(suspended(**changes), "iso13370_suspended")
    assert solved.value is None
    assert re.search(words, solved.missing[0])


def test_more_wind_or_less_insulation_on_the_ground_loses_more() -> None:
    def u(**changes: object) -> float:
        found = run(suspended(**changes), "iso13370_suspended").value
        assert found is not None
        return found

    assert u(shielding="sheltered") < u() < u(shielding="exposed")
    assert u(ground_resistance=1.0) < u()
    assert u(openings=0.0) < u(openings=3000e-6)


def test_metal_joists_have_no_value_by_iso_6946() -> None:
    joists = framed("joists", 0.15, Member(STEEL, 0.05, 0.6), Fill(material=WOOL))
    of = suspended()._replace(layers=(joists,))
    assert "metal members" in run(of, "iso13370_suspended").missing[0]
    timber = framed("joists", 0.15, Member(WOOD, 0.05, 0.6), Fill(material=WOOL))
    assert run(of._replace(layers=(timber,)), "iso13370_suspended").missing == ()


def test_smaller_equivalent_thickness_counts() -> None:
    # A bare wall beside an insulated floor: dw 0.3 + ... takes the place of dt.
    bare = basement(walls=(plane("wall", CONCRETE, 0.25),))
    steps = {s.symbol: s.value for s in run(bare, "iso13370_basement_wall").steps}
    assert steps["d_w"] < steps["d_t"]
    assert steps["d_s"] == steps["d_w"]
    other = {s.symbol: s.value for s in run(
        basement()._replace(layers=(plane("slab", CONCRETE, 0.1),)), "iso13370_basement_wall"
    ).steps}  # fmt: skip
    assert other["d_s"] == other["d_t"] < other["d_w"]


def test_films_of_floor_and_wall_are_those_of_their_directions() -> None:
    films = tuple(
        FilmRow(str(r.keys["side"]), str(r.keys["adjoins"]), str(r.keys["direction"]), r.value,
                r.text, r.source)
        for r in built_in("films", "iso6946")
    )  # fmt: skip
    under = INSIDE._replace(films=films)
    for way in ("down", "horizontal"):
        solved = solve(basement(), setting(way, "iso13370_basement"), under)
        found = {o.name: o.value for step in solved.steps for o in step.operands}
        assert (found["R_si"], found["R_siw"]) == (0.17, 0.13)


def test_bridged_layers_against_the_ground_have_no_value() -> None:
    timber = framed("battens", 0.05, Member(WOOD, 0.05, 0.6), Fill(material=WOOL))
    solved = run(basement(walls=(timber, *WALLS)), "iso13370_basement")
    assert "a wall of the basement without the bridged layer 'battens'" in solved.missing[0]


def test_unheated_basement_lies_between_its_limits() -> None:
    def u(**changes: object) -> float:
        found = run(unheated(**changes), "iso13370_unheated").value
        assert found is not None
        return found

    floor = 1 / (0.17 + 0.1 / 0.036 + 0.1 / 2.3 + 0.17)
    assert u(air_changes=0.0) < u() < u(air_changes=1.0) < floor
    assert u(volume=72.0 * 2.5) == pytest.approx(u())
    assert u(floor=(plane("slab", CONCRETE, 0.1),)) < u()
    lacking = run(unheated(height=None, wall_u=None), "iso13370_unheated")
    assert "(height)" in lacking.missing[0] and "(wall_u_factor)" in lacking.missing[0]


def test_insulated_depth_of_nothing_is_a_slab() -> None:
    # A heated basement of hardly any depth has the floor of a slab.
    shallow = run(basement(depth=1e-9), "iso13370_basement_floor").value
    assert shallow == pytest.approx(run(slab(), "iso13370_slab").value)
    assert shallow == pytest.approx(
        slab_u(2.0, 2 * 72 / 34, 0.4 + 2 * (0.21 + 0.1 / 0.036 + 0.1 / 2.3))
    )


def test_layers_of_no_resistance_are_allowed() -> None:
    of = assembly(stated("ground", 0.0), kind="slab-on-grade", slab=slab().slab)
    assert run(of, "iso13370_slab").value == pytest.approx(slab_u(2.0, 2 * 72 / 34, 0.4 + 0.42))
