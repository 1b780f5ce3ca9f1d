"""Slabs and walls against the ground: ISO 13370, F-factors looked up, C-factors summed."""

from __future__ import annotations

import numpy as np
import pytest

from envcheck.model.project import AirSpaceLayer, Fill, MasonryLayer, Member, Slab
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.solve.methods.ground_factors import f_factor, solve_c_factor, solve_f_factor
from envcheck.solve.methods.iso13370_slab import (
    characteristic_dimension,
    equivalent_thickness,
    slab_u,
    solve_slab,
)
from envcheck.solve.registry import NotDecided
from envcheck.units import convert, parse
from tests.changed import changed
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    U_IP,
    WOOD,
    XPS,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
    setting,
    stated,
)

SLAB = Slab("none", 0.0, 0.0, False, None, 0.5, 2.0, 46.0, 126.0)
EPS = material("EPS", 0.036, "insulation")
SCREED = material("screed", 1.4, "concrete")
FLOOR = (plane("EPS", EPS, 0.15), plane("screed", SCREED, 0.05))


def rows() -> tuple[TableRow, ...]:
    # Washington Administrative Code 51-11C-61061, Table A106.1 (unheated slabs).
    printed = [
        ("none", "0 in", "R-0", "no", 0.73),
        ("vertical", "24 in", "R-5", "no", 0.58),
        ("vertical", "24 in", "R-10", "no", 0.54),
        ("vertical", "24 in", "R-15", "no", 0.52),
        ("vertical", "48 in", "R-10", "no", 0.48),
        ("horizontal", "24 in", "R-10", "no", 0.70),
    ]
    unit = "Btu/(h*ft*degF)"
    return tuple(
        TableRow(
            "f_factors",
            {
                "position": position,
                "extent": parse(extent, "length"),
                "resistance": parse(resistance, "resistance"),
                "heated": heated,
            },
            parse(f"{value} {unit}", "linear_transmittance"),
            str(value),
            "WAC 51-11C-61061, Table A106.1",
        )
        for position, extent, resistance, heated, value in printed
    )


CONVENTIONS = Conventions(tables={"f_factors": rows()})


def test_well_insulated_slab_by_hand() -> None:
    # Hand sum: B' = 126/23 = 5.478; dt = .5 + 2 (.17 + 4.2024 + .04) = 9.325, above B';
    # U = 2 / (.457 x 5.478 + 9.325) = .169.
    slab = assembly(*FLOOR, kind="slab-on-grade", slab=SLAB)
    found = solve_slab(slab, setting("down", inside_film=0.17), Conventions())
    assert found.value == pytest.approx(0.169, abs=5e-4)
    assert_recomputes(found.steps)
    assert any("0.04" in said for said in found.assumptions)
    assert found.steps[: found.layer_steps][-1].title == "screed"


def test_uninsulated_slab_recomputes_by_the_other_branch() -> None:
    slab = assembly(plane("screed", SCREED, 0.05), kind="slab-on-grade", slab=SLAB)
    found = solve_slab(slab, setting("down", inside_film=0.17), Conventions())
    assert "ln(" in found.steps[-1].expression
    assert_recomputes(found.steps)


def test_both_branches_meet() -> None:
    # At dt = B' the two formulas of ISO 13370 agree within 1 %: 0.457 is a fit to the logarithm.
    below, above = slab_u(2.0, 5.0, 4.999999), slab_u(2.0, 5.0, 5.0)
    assert below == pytest.approx(above, rel=0.01)


def test_arrays_choose_the_branch_for_each_element() -> None:
    thickness = np.array([1.0, 9.0])
    found = slab_u(2.0, 5.0, thickness)
    assert list(found) == [slab_u(2.0, 5.0, 1.0), slab_u(2.0, 5.0, 9.0)]


def test_dimension_and_thickness() -> None:
    assert characteristic_dimension(100.0, 40.0) == 5.0
    assert equivalent_thickness(0.3, 1.5, 0.17, 1.0) == pytest.approx(2.115)
    # 2.115 m: the figure of the table for floors on clay with R 1.0 (UK guidance after ISO 13370).


def test_everything_missing_is_named_at_once() -> None:
    bare = changed(SLAB, perimeter=None, area=None, wall_thickness=None, soil_conductivity=None)
    with pytest.raises(NotDecided) as caught:
        solve_slab(assembly(*FLOOR, kind="slab-on-grade", slab=bare), setting(), Conventions())
    for word in ("perimeter", "area", "wall_thickness", "soil_conductivity"):
        assert word in str(caught.value)


def test_edge_insulation_is_said_not_to_count() -> None:
    slab = changed(SLAB, insulation="vertical", resistance=1.0, extent=0.6)
    solved = solve_slab(assembly(*FLOOR, kind="slab-on-grade", slab=slab), setting(), Conventions())
    assert any("edge insulation" in said for said in solved.assumptions)


def edge(**changes: object) -> Slab:
    slab = Slab("vertical", 10 * R_IP, 24 * INCH, False, True, None, None, None, None)
    return changed(slab, **changes)


def f_of(slab: Slab) -> float:
    found = solve_f_factor(assembly(kind="slab-on-grade", slab=slab), setting(), CONVENTIONS)
    assert found.value is not None
    return convert(found.value, "Btu/(h*ft*degF)")


def test_printed_rows() -> None:
    assert f_of(edge()) == pytest.approx(0.54)
    assert f_of(edge(extent=48 * INCH)) == pytest.approx(0.48)
    assert f_of(edge(insulation="horizontal")) == pytest.approx(0.70)
    assert f_of(edge(insulation="none", resistance=0.0)) == pytest.approx(0.73)


def test_rounded_si_figures_find_the_same_row() -> None:
    assert f_of(edge(resistance=1.76, extent=0.61)) == pytest.approx(0.54)


def test_uncovered_top_edge_counts_as_no_insulation() -> None:
    slab = edge(top_edge_covered=False)
    found = solve_f_factor(assembly(kind="slab-on-grade", slab=slab), setting(), CONVENTIONS)
    assert f_of(slab) == pytest.approx(0.73)
    assert "not covered" in found.assumptions[0]


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"heated": None}, "slab_heated"),
        ({"top_edge_covered": None}, "top_edge_covered"),
        ({"heated": True}, "heated slab"),
        ({"resistance": 12 * R_IP}, "R-12 for 24 in.*the table has.*R-10 for 24 in"),
        ({"extent": 36 * INCH}, "R-10 for 36 in"),
    ],
)
def test_no_row_is_invented(changes: dict[str, object], words: str) -> None:
    with pytest.raises(NotDecided, match=words):
        f_of(edge(**changes))


def test_missing_table() -> None:
    with pytest.raises(NotDecided, match="a table of F-factors"):
        f_factor((), "none", 0.0, 0.0, False)


def c_wall(*layers: object) -> float:
    wall = assembly(*layers, kind="below-grade-wall")
    found = solve_c_factor(wall, setting(), Conventions())
    assert found.value is not None
    assert_recomputes(found.steps)
    return found.value / U_IP


@pytest.mark.parametrize(("inches", "printed"), [(1.5, 0.1230), (2.0, 0.0941)])
def test_c_factor_by_hand(inches: float, printed: float) -> None:
    # Hand sum: 1 / (R-5 per inch x inches + .627), no films, no soil.
    concrete = stated("concrete", 0.627 * R_IP)
    assert c_wall(plane("XPS", XPS, inches * INCH), concrete) == pytest.approx(printed, abs=5e-5)


def test_c_factor_of_bare_concrete() -> None:
    assert c_wall(stated("concrete", 0.627 * R_IP)) == pytest.approx(1.595, abs=5e-4)


def test_c_factor_of_hollow_block_by_isothermal_planes() -> None:
    # Hand sum: shells .251 each, webs 20 % of 1.028 beside cells of .97 h ft2 F/Btu.
    block = material("block", 5.125 * INCH / (1.028 * R_IP), "masonry")
    layer = MasonryLayer(
        "masonry", "block", 1, 7.625 * INCH, block, 1.25 * INCH, 0.2, Fill(source="cells"),
        None, 0.0, 0.0, None, 0.97 * R_IP,
    )  # fmt: skip
    expected = 1 / (2 * 1.25 * 1.028 / 5.125 + 1 / (0.2 / 1.028 + 0.8 / 0.97))
    assert c_wall(layer) == pytest.approx(expected, rel=1e-9)


def test_c_factor_of_wood_furring_by_parallel_paths() -> None:
    furring = framed("furring", 0.05, Member(WOOD, 0.05, 0.5), Fill(material=EPS))
    expected = 1 / (0.1 / (0.05 / 0.13) + 0.9 / (0.05 / 0.036)) / R_IP
    assert c_wall(furring) == pytest.approx(1 / expected, rel=1e-9)


def test_metal_and_vented_layers_have_no_c_factor() -> None:
    studs = framed("studs", 0.09, Member(STEEL, 0.04, 0.4), Fill(label=2.3))
    with pytest.raises(NotDecided, match="metal-framed"):
        c_wall(studs)
    vent = AirSpaceLayer("air-space", "vent", 1, 0.02, "well", (0.9, 0.9))
    with pytest.raises(NotDecided, match="vented"):
        c_wall(vent, stated("concrete", 0.1))
