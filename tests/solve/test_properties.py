"""Heat capacity, weight, framing and insulation of an assembly before any method."""

from __future__ import annotations

import pytest

from envcheck.model.project import (
    AirSpaceLayer,
    Bridge,
    Fill,
    Layer,
    MasonryLayer,
    Member,
    Profile,
    TaperedLayer,
)
from envcheck.model.solved import Properties
from envcheck.solve.mass import heat_capacity, mass_of, sheet_per_area
from envcheck.solve.properties import properties
from envcheck.units import convert, parse
from tests.changed import changed
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    WOOD,
    WOOL,
    XPS,
    assembly,
    framed,
    material,
    plane,
    stated,
)

LB_FT3 = parse("1 lb/ft3", "density")
BTU_LB = parse("1 Btu/(lb*degF)", "specific_heat")
BRICK = material("brick", 0.9, "masonry", 130 * LB_FT3, 0.20 * BTU_LB)
GYPSUM = material("gypsum", 0.16, "board", 50 * LB_FT3, 0.26 * BTU_LB)
STUD = Profile("c", 3.625 * INCH, 1.625 * INCH, 0.00114554, 0.0127)
STUDS = framed(
    "studs", 3.625 * INCH, Member(STEEL, 1.625 * INCH, 16 * INCH, STUD), Fill(label=13 * R_IP)
)
VENT = AirSpaceLayer("air-space", "vented space", 1, INCH, "well", (0.9, 0.9))


def veneer_wall(*changed: Layer) -> Properties:
    board = stated("gypsum", 0.56 * R_IP, 0.625 * INCH, GYPSUM)
    outer = changed or (plane("XPS", XPS, 1.5 * INCH),)
    return properties(
        assembly(plane("brick", BRICK, 3.625 * INCH), VENT, *outer, board, STUDS, board)
    )


def in_ip(value: float | None) -> float:
    assert value is not None
    return convert(value, "Btu/(ft2*degF)", "heat_capacity")


def test_brick_veneer_on_steel_studs_by_hand() -> None:
    # Hand sum: brick 39.3 lb/ft2 x .20 = 7.85 and two boards of 2.60 lb/ft2 x .26 = .68 each:
    # 9.2 Btu/(ft2 F) in all, 1.35 without steel indoors of the XPS.
    found = veneer_wall()
    xps, steel = mass_of(plane("XPS", XPS, 1.5 * INCH)), mass_of(STUDS)
    boards = 2 * 50 * 0.625 / 12 * 0.26
    brick = 130 * 3.625 / 12 * 0.20
    assert in_ip(found.heat_capacity_indoor) == pytest.approx(
        boards + in_ip(steel.heat_capacity), rel=1e-6
    )
    assert in_ip(found.heat_capacity) == pytest.approx(
        brick + boards + in_ip(steel.heat_capacity) + in_ip(xps.heat_capacity), rel=1e-6
    )
    assert in_ip(found.heat_capacity) == pytest.approx(9.3, abs=0.15)
    assert found.framing == "steel"
    assert found.cavity_resistance == pytest.approx(13 * R_IP)
    assert found.continuous_resistance == pytest.approx(7.5 * R_IP)
    assert found.label_sum == pytest.approx(20.5 * R_IP)
    assert found.combustible == ("XPS",)
    assert found.crossed == found.bracketed == found.missing == ()


def test_without_continuous_insulation_the_vented_space_ends_the_indoor_count() -> None:
    found = veneer_wall(stated("board", 0.1, 0.01, GYPSUM))
    assert in_ip(found.heat_capacity_indoor) < 3.0
    assert in_ip(found.heat_capacity) > 9.0
    assert found.continuous_resistance == 0.0


def test_girts_interrupt_the_insulation_they_cross() -> None:
    girts = framed(
        "wool between girts", 0.076, Member(STEEL, 0.04, 0.4), Fill(material=WOOL), None, True
    )
    found = veneer_wall(girts)
    assert found.continuous_resistance == 0.0
    assert found.crossed == ("wool between girts: crossed by steel",)
    assert found.cavity_resistance == pytest.approx(13 * R_IP)
    assert found.label_sum == pytest.approx(13 * R_IP + 0.076 / 0.037)
    assert found.framing == "steel"


def test_brackets_are_named_where_there_is_insulation_to_cross() -> None:
    bridge = Bridge("point", "brackets", 0.01, 4.0, True, "report", "test", 1)
    wall = assembly(plane("wool", WOOL, 0.1), STUDS, bridges=(bridge,))
    assert properties(wall).bracketed == ("brackets",)
    assert properties(wall).continuous_resistance == pytest.approx(0.1 / 0.037)
    bare = changed(wall, layers=(STUDS,))
    assert properties(bare).bracketed == ()


def test_wood_frame_counts_members_by_their_share() -> None:
    # 25 % of 140 mm of wood and 75 % of wool: rho c d f of each.
    studs = framed("studs", 0.14, Member(WOOD, 0.038, 0.406), Fill(material=WOOL), 0.25)
    found = properties(assembly(studs))
    expected = 0.14 * (0.25 * 500 * 1600 + 0.75 * 40 * 1030)
    assert found.heat_capacity == pytest.approx(expected)
    assert found.weight == pytest.approx(0.14 * (0.25 * 500 + 0.75 * 40))
    assert found.framing == "wood"
    assert found.cavity_resistance == pytest.approx(0.14 / 0.037)
    assert found.combustible == ("studs",)


def test_cavity_resistance_is_that_in_place_and_the_label_sum_is_not() -> None:
    fill = Fill(label=19 * R_IP, product_thickness=6.25 * INCH, installed_label=18 * R_IP)
    studs = framed("studs", 5.5 * INCH, Member(WOOD, 0.038, 0.406), fill, 0.25)
    found = properties(assembly(studs))
    assert found.cavity_resistance == pytest.approx(18 * R_IP)
    assert found.label_sum == pytest.approx(19 * R_IP)


def test_tapered_insulation_counts_at_its_least_thickness() -> None:
    roof = TaperedLayer("tapered", "XPS", 1, XPS, 0.1, 0.2, "rectangle")
    found = properties(assembly(roof))
    assert found.continuous_resistance == pytest.approx(0.1 / XPS.conductivity)
    assert found.weight == pytest.approx(29.0 * 0.15)


def block(**changes: object) -> MasonryLayer:
    unit = material("block", 0.7, "masonry", 1840.0, 840.0)
    layer = MasonryLayer(
        "masonry", "block", 1, 0.19, unit, 0.03, 0.2, Fill(), None, 0.0, 0.0, None, 0.17
    )
    return changed(layer, **changes)


def test_masonry_counts_its_solid_share() -> None:
    # Two shells of 30 mm and 20 % webs over the 130 mm between them: 86 mm of solid.
    found = properties(assembly(block()))
    assert found.weight == pytest.approx(1840.0 * 0.086)
    assert found.heat_capacity == pytest.approx(heat_capacity(1840.0, 840.0, 0.086))
    assert found.framing == "none"


def test_fully_grouted_masonry_weighs_like_a_solid_wall() -> None:
    unit = block().material
    found = properties(assembly(block(grouted_share=1.0, grout=unit)))
    assert found.weight == pytest.approx(1840.0 * 0.19)


def test_what_has_no_density_is_named_and_nothing_is_summed() -> None:
    unknown = material("plaster", 0.8, "plaster")
    inside = properties(assembly(plane("brick", BRICK, 0.1), plane("coat", unknown, 0.015)))
    assert inside.heat_capacity is None
    assert inside.heat_capacity_indoor is None
    assert inside.missing == ("plaster",)
    outside = properties(
        assembly(plane("coat", unknown, 0.015), plane("XPS", XPS, 0.05), plane("b", BRICK, 0.1))
    )
    assert outside.heat_capacity is None
    assert outside.heat_capacity_indoor == pytest.approx(
        heat_capacity(130 * LB_FT3, 0.2 * BTU_LB, 0.1)
    )


def test_developed_width_of_a_stud() -> None:
    # Web 92.1, flanges 2 x 41.3, lips 2 x 12.7 mm of 1.146 mm sheet at 406.4 mm.
    found = sheet_per_area(STUD, 16 * INCH)
    expected = (0.092075 + 2 * 0.041275 + 2 * 0.0127) * 0.00114554 / 0.4064
    assert found == pytest.approx(expected)


def test_developed_width_of_a_hat() -> None:
    # Crown 65, webs 2 x 50, brims 2 x 12 mm of 1 mm sheet at 600 mm: 189 mm / 600.
    hat = Profile("hat", 0.05, 0.065, 0.001, 0.012, "hat")
    assert sheet_per_area(hat, 0.6) == pytest.approx(0.189 * 0.001 / 0.6)


def test_stated_resistance_without_a_material_has_no_known_weight() -> None:
    found = properties(assembly(stated("deck", 0.1)))
    assert found.weight is None
    assert found.missing == ("deck",)
