"""Printed walls built as whole assemblies and sent through the solver.

The same figures as in ``test_published.py``, but drawn layer by layer: films, boards, members with
their infill, headers, steel studs by the effective layer that the table prints.
"""

from __future__ import annotations

import re
from pathlib import Path
from typing import Any

import pytest
import yaml

from envcheck.model.additions import Curved
from envcheck.model.ground import Basement, Ground, Slab
from envcheck.model.project import (
    AirSpaceLayer,
    Extra,
    Fill,
    FramedLayer,
    Layer,
    MasonryLayer,
    Member,
    Profile,
)
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.solve.registry import methods
from tests.published.cases import COVERAGE, Figure, cases, figures, printed
from tests.published.test_published import SLACK
from tests.solve.drawn import solved, value
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    U_IP,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
    stated,
)

TESTS = Path(__file__).parents[1]


def of_case(name: str) -> list[Figure]:
    return [figure for figure in figures() if figure.case["id"] == name]


def agrees(figure: Figure, found: float) -> bool:
    return abs(found - figure.expected) <= figure.tolerance + SLACK * abs(figure.expected)


def around(figure: Figure) -> tuple[dict[str, float], list[Layer], list[Layer]]:
    """Films, the two outer layers and the inner one of the framed walls of both tables."""
    outside, *boards, inside = figure.inputs["in_series"][:5]
    layers: list[Layer] = [stated(f"board {n}", r * R_IP) for n, r in enumerate(boards)]
    films = {"outside_film": outside * R_IP, "inside_film": inside * R_IP}
    return films, layers[:2], layers[2:]


# ------------------------------------------------------------------------------ wood framing

LUMBER = material("lumber", INCH / (1.25 * R_IP), "wood")
HEADERS = Extra("headers", 0.04, LUMBER, 3.5 * INCH)


def wood_studs(inches: float, label: float) -> FramedLayer:
    """21 % studs of the whole depth, 4 % headers of 3-1/2 in wood, 75 % labelled insulation."""
    studs = Member(LUMBER, 1.5 * INCH, 16 * INCH)
    layer = framed("studs", inches * INCH, studs, Fill(label=label * R_IP), share=0.21)
    return layer._replace(extras=(HEADERS,))


@pytest.mark.parametrize("figure", of_case("wood_wall_16"), ids=lambda figure: figure.id)
def test_wood_wall(figure: Figure) -> None:
    films, outer, inner = around(figure)
    cavity, wood, _ = (path["resistance"] for path in figure.inputs["paths"])
    wall = [*outer, wood_studs(wood / 1.25, cavity), *inner]
    found = solved(wall, "parallel_path", **films)
    assert found.value is not None
    assert agrees(figure, found.value / U_IP)
    assert_recomputes(found.steps)


@pytest.mark.parametrize("figure", of_case("wood_wall_continuous"), ids=lambda figure: figure.id)
def test_wood_wall_with_continuous_insulation(figure: Figure) -> None:
    # The paths of the table hold R-13 or 3-1/2 in of wood and the continuous insulation.
    films, outer, inner = around(figure)
    continuous = figure.inputs["paths"][0]["resistance"] - 13
    board = stated("continuous insulation", continuous * R_IP)
    found = value([*outer, board, wood_studs(3.5, 13), *inner], "parallel_path", **films)
    assert agrees(figure, found / U_IP)


# ----------------------------------------------------------------------------- steel framing

EFFECTIVE = {figure.point: figure.inputs["added"] for figure in of_case("steel_wall_16")}
DEPTHS = {"R19": 6.0, "R21": 6.0, "R25": 8.0}
UNDER = Conventions(
    tables={
        "effective_layers": tuple(
            TableRow(
                "effective_layers",
                {
                    "label": float(label[1:]) * R_IP,
                    "depth": DEPTHS.get(label, 3.5) * INCH,
                    "spacing": 16 * INCH,
                },
                effective * R_IP,
                "",
                "ANSI/ASHRAE/IES 90.1 Appendix A, from memory",
            )
            for label, effective in EFFECTIVE.items()
        )
    }
)


def steel_studs(label: str) -> FramedLayer:
    depth = DEPTHS.get(label, 3.5) * INCH
    stud = Profile("C", depth, 1.625 * INCH, 0.0451 * INCH)
    air = AirSpaceLayer("air-space", "empty", 1, depth, "unventilated", (0.9, 0.9))
    fill = Fill(air=air) if label == "R0" else Fill(label=float(label[1:]) * R_IP)
    return framed("steel studs", depth, Member(STEEL, stud.flange, 16 * INCH, stud), fill)


@pytest.mark.parametrize("figure", of_case("steel_wall_16"), ids=lambda figure: figure.id)
def test_steel_wall(figure: Figure) -> None:
    films, outer, inner = around(figure)
    wall = [*outer, steel_studs(figure.point), *inner]
    found = solved(wall, "effective_layer", UNDER, **films)
    assert found.value is not None
    assert agrees(figure, found.value / U_IP)
    assert_recomputes(found.steps)


@pytest.mark.parametrize("figure", of_case("steel_wall_continuous"), ids=lambda figure: figure.id)
def test_steel_wall_with_continuous_insulation(figure: Figure) -> None:
    films, outer, inner = around(figure)
    board = stated("continuous insulation", figure.inputs["added"] * R_IP)
    found = solved([*outer, board, steel_studs("R13"), *inner], "effective_layer", UNDER, **films)
    assert found.value is not None
    assert agrees(figure, found.value / U_IP)


FACTORS = Conventions(
    tables={
        "cavity_factors": tuple(
            TableRow(
                "cavity_factors",
                {
                    "label": figure.inputs["label"] * R_IP,
                    "depth": figure.inputs["depth"] * INCH,
                    "spacing": figure.inputs["spacing"] * INCH,
                },
                figure.inputs["factor"],
                "",
                "model code, from memory",
            )
            for figure in of_case("steel_cavity_factors")
        )
    }
)


@pytest.mark.parametrize("figure", of_case("steel_cavity_factors"), ids=lambda figure: figure.id)
def test_steel_cavity(figure: Figure) -> None:
    depth, spacing = figure.inputs["depth"] * INCH, figure.inputs["spacing"] * INCH
    stud = Profile("C", depth, 1.625 * INCH, 0.0451 * INCH)
    member = Member(STEEL, stud.flange, spacing, stud)
    layer = framed("steel studs", depth, member, Fill(label=figure.inputs["label"] * R_IP))
    found = solved([layer], "cavity_factor", FACTORS)
    assert found.value is not None
    assert agrees(figure, (1 / found.value - 0.17) / R_IP)


# ------------------------------------------------------------------------- ISO 6946, combined


def combined_wall(inputs: dict[str, Any]) -> list[Layer]:
    """Brick, cavity, blocks with mortar joints, wool between studs, plasterboard."""
    brick, cavity, blocks, studs, board = inputs["layers"]
    block, mortar = ((s["share"], s["resistance"]) for s in blocks["sections"])
    wool, timber = ((s["share"], s["resistance"]) for s in studs["sections"])
    units = material("aerated block", 0.1 / block[1], "masonry")
    wood = Member(material("timber", 0.089 / timber[1], "wood"), 0.038, None)
    return [
        stated("brick", brick["resistance"]),
        stated("cavity", cavity["resistance"]),
        MasonryLayer(
            "masonry", "blocks", 1, 0.1, units, 0.05, 1.0, Fill(units),
            material("mortar", 0.1 / mortar[1]), mortar[0], 0.0, None, None,
        ),
        framed("studs", 0.089, wood, Fill(material("wool", 0.089 / wool[1])), share=timber[0]),
        stated("plasterboard", board["resistance"]),
    ]  # fmt: skip


def test_combined_method_on_masonry() -> None:
    checked = of_case("combined_masonry_wall")
    inputs = checked[0].inputs
    wall = combined_wall(inputs)
    films = {"outside_film": inputs["outside"], "inside_film": inputs["inside"]}
    found = solved(wall, "weighted", **films)
    assert found.value is not None
    assert found.low is not None
    assert found.high is not None
    upper, lower, total = 1 / found.low, 1 / found.high, 1 / found.value
    figures_found = {
        "R_upper": upper,
        "R_lower": lower,
        "R_total": total,
        "U": found.value,
        "error_percent": 100 * (upper - lower) / (2 * total),
    }
    assert [f.name for f in checked if not agrees(f, figures_found[f.name])] == []
    assert_recomputes(found.steps)
    # What the bracket says by another method of the same pieces is the same.
    ends = solved(wall, "two_dimensional", **films)
    assert (ends.low, ends.high) == (found.low, found.high)


def test_paths_of_a_timber_frame() -> None:
    by_point = {figure.point: figure for figure in of_case("timber_frame_paths")}
    outside, brick, cavity, ply, board, inside = by_point["wool"].inputs["in_series"]
    wool, stud = (by_point[name].inputs["added"] for name in ("wool", "stud"))
    wood = Member(material("timber", 0.14 / stud, "wood"), 0.038, 0.4)
    wall: list[Layer] = [
        stated("brick", brick),
        stated("cavity", cavity),
        stated("plywood", ply),
        framed("studs", 0.14, wood, Fill(material("wool", 0.14 / wool))),
        stated("plasterboard", board),
    ]
    assert wood.width / 0.4 == pytest.approx(0.095)  # 9.5 % as printed
    found = solved(wall, "weighted", outside_film=outside, inside_film=inside)
    named = {step.symbol: step.value for step in found.steps}
    assert agrees(by_point["wool"], named["R_upper_path1"])
    assert agrees(by_point["stud"], named["R_upper_path2"])
    assert named["R_upper"] == pytest.approx(1 / (0.905 / 3.971 + 0.095 / 1.715), abs=5e-4)
    assert named["R_lower"] == pytest.approx(0.638 + 1 / (0.905 / 3.333 + 0.095 / 1.077), abs=5e-4)


def test_solid_brick_wall() -> None:
    checked = of_case("solid_brick_wall")
    outside, *middle, inside = checked[0].inputs["in_series"]
    wall = [plane(str(n), material(str(n), 0.1 / r), 0.1) for n, r in enumerate(middle)]
    u_factor = value(wall, "series", outside_film=outside, inside_film=inside)
    found = {"U": u_factor, "R": 1 / u_factor}
    assert [f.name for f in checked if not agrees(f, found[f.name])] == []


# ------------------------------------------------------------------------ ground and shells


@pytest.mark.parametrize("figure", of_case("basement_wall"), ids=lambda figure: figure.id)
def test_basement_wall(figure: Figure) -> None:
    # The floor's equivalent thickness is that of the case: w chosen for a floor of no resistance.
    given = figure.inputs
    soil, inside = given["soil_conductivity"], given["inside"]
    thickness = given["floor_thickness"] - soil * (inside + 0.04)
    around_it = Ground(40.0, 100.0, thickness, soil)
    walls = (stated("wall", given["wall_resistance"]),)
    of = assembly(
        stated("floor", 0.0), kind="heated-basement", inside_film=inside,
        basement=Basement(around_it, float(given["depth"]), walls),
    )  # fmt: skip
    found = solved(of, "iso13370_basement_wall")
    assert found.value is not None
    assert agrees(figure, found.value)


SLABS = [*of_case("slab_uninsulated"), *of_case("slab_insulated"), *of_case("slab_threshold")]


@pytest.mark.parametrize("figure", SLABS, ids=lambda figure: figure.id)
def test_slab(figure: Figure) -> None:
    given = figure.inputs
    area = 100.0
    slab = Slab("none", 0.0, 0.0, False, None, given["wall"], given["soil_conductivity"],
                given["perimeter_per_area"] * area, area)  # fmt: skip
    of = assembly(stated("floor", given["floor_resistance"]), kind="slab-on-grade", slab=slab)
    found = solved(of, "iso13370_slab", inside_film=given["inside"])
    assert found.value is not None
    assert agrees(figure, found.value)
    basement = Basement(slab.ground, 1e-9, (stated("wall", 0.0),))
    flush = assembly(
        *of.layers, kind="heated-basement", inside_film=given["inside"], basement=basement
    )
    assert agrees(figure, value(flush, "iso13370_basement_floor"))


@pytest.mark.parametrize(
    "case", ["insulated_steam_pipe", "thick_walled_tube", "insulated_pipe_library"]
)
def test_pipe(case: str) -> None:
    """Shells and films of a textbook pipe as one curved assembly, outside first."""
    (first, *_) = checked = of_case(case)
    shells_ = [e for e in first.inputs["elements"] if e["type"] == "cyl"]
    films = {e["r"]: 1 / e["h"] for e in first.inputs["elements"] if e["type"] == "conv_cyl"}
    inner, outer = shells_[0]["r1"], shells_[-1]["r2"]
    layers = [
        plane(f"shell {n}", material(f"shell {n}", e["conductivity"]), e["r2"] - e["r1"])
        for n, e in enumerate(shells_)
    ]
    of = assembly(
        *layers[::-1], kind="curved", curved=Curved("cylinder", "outer", inner, outer, True)
    )
    given = {"outside_film": films.get(outer, 0.0), "inside_film": films.get(inner, 0.0)}
    found = solved(of, "curved", **given)
    assert found.value is not None
    metre = next(step.value for step in found.steps if step.symbol == "U_length")
    figures_found = {"Q": metre * (first.inputs["t1"] - first.inputs["t2"]), "R": 1 / metre}
    held = [f for f in checked if f.name in figures_found]
    assert held
    assert [f.id for f in held if not agrees(f, figures_found[f.name])] == []
    assert_recomputes(found.steps)


# -------------------------------------------------------------------------- every method


COVERED: dict[str, dict[str, Any]] = yaml.safe_load(COVERAGE.read_text(encoding="utf-8"))


def test_every_method_says_what_stands_behind_it() -> None:
    assert set(COVERED) == set(methods())


@pytest.mark.parametrize("method", COVERED)
def test_what_stands_behind_a_method_exists(method: str) -> None:
    entry = COVERED[method]
    assert set(entry) <= {"cases", "tests", "why_fewer"}
    known = {case["id"] for case in cases()}
    named = entry.get("cases", [])
    assert [name for name in named if name not in known] == []
    for test in entry.get("tests", []):
        file, _, function = test.partition("::")
        text = (TESTS / file).read_text(encoding="utf-8")
        assert re.search(rf"^def {function}\(", text, re.MULTILINE), test
    figures_read = [f for f in figures() if f.case["id"] in named and printed(f)]
    if len(figures_read) < 2:
        assert entry.get("why_fewer"), f"{method}: fewer than two printed figures, and no reason"
        assert entry.get("tests"), f"{method}: no printed figure and no test"
    else:
        assert "why_fewer" not in entry, f"{method} has {len(figures_read)} printed figures"
