"""Framed layers: sums by hand of invented walls, shares, drawn profiles.

Resistances of wood (R-1.25 per inch), boards and films in h ft2 degF/Btu are those of the
assemblies of ANSI/ASHRAE/IES 90.1 Appendix A, from memory; surface resistances in m2 K/W are those
of ISO 6946:2017, from memory. The walls are invented.
"""

from __future__ import annotations

import pytest

from envcheck.model.project import (
    AirSpaceLayer,
    Extra,
    Fill,
    FramedLayer,
    Layer,
    Member,
    Profile,
)
from envcheck.solve.methods.framed import area_shares, is_metal
from envcheck.solve.section import Piece, profile_pieces
from envcheck.solve.wiring import bounds, isothermal_planes, parallel_paths
from tests.solve.drawn import solved, value, wall_of
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

LUMBER = material("lumber", INCH / (1.25 * R_IP), "wood")
SOFTWOOD = material("softwood", 0.13, "wood")
GYPSUM = material("gypsum", 0.25)
WOOL_035 = material("wool", 0.035, "insulation")
HANDBOOK = {"outside_film": 0.17 * R_IP, "inside_film": 0.68 * R_IP}


def clerestory(polyiso: float, fill: Fill) -> list[Layer]:
    """Siding .59, polyiso R-6 per inch, plywood .62, 2x6 at 25 %, gypsum .45."""
    studs = Member(LUMBER, 1.5 * INCH, 16 * INCH)
    return [
        stated("siding", 0.59 * R_IP),
        stated("polyiso", 6 * polyiso * R_IP),
        stated("plywood", 0.62 * R_IP),
        framed("studs", 5.5 * INCH, studs, fill, share=0.25)._replace(share_from="S-301"),
        stated("gypsum", 0.45 * R_IP),
    ]


# Hand sums: .17 + .68 + .59 + .62 + .45 = 2.51 around polyiso, batt and wood 5.5 x 1.25 = 6.875;
# R-19 of 6-1/4 in acts as R-18 in 5-1/2 in.
@pytest.mark.parametrize(
    ("polyiso", "fill", "by_paths", "by_planes"),
    [
        (0.5, Fill(label=19 * R_IP, product_thickness=6.25 * INCH, installed_label=18 * R_IP),
         0.25 / (5.51 + 6.875) + 0.75 / (5.51 + 18),
         1 / (5.51 + 1 / (0.25 / 6.875 + 0.75 / 18))),
        (1.0, Fill(label=21 * R_IP),
         0.25 / (8.51 + 6.875) + 0.75 / (8.51 + 21),
         1 / (8.51 + 1 / (0.25 / 6.875 + 0.75 / 21))),
    ],
)  # fmt: skip
def test_wood_2x6(polyiso: float, fill: Fill, by_paths: float, by_planes: float) -> None:
    layers = clerestory(polyiso, fill)
    found = solved(layers, "parallel_path", **HANDBOOK)
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(by_paths, rel=1e-6)
    assert found.low == pytest.approx(found.value)
    beside = {b.name: b.value / U_IP for b in found.beside}
    assert beside["isothermal_planes"] == pytest.approx(by_planes, rel=1e-6)
    assert_recomputes(found.steps)


def test_share_is_named_with_its_source() -> None:
    said = solved(clerestory(1.0, Fill(label=21 * R_IP)), "parallel_path").assumptions
    assert "studs: framing share 25 % (from S-301), drawn as one member of share x spacing" in said


def test_attic_roof() -> None:
    # Films .46 and .61, gypsum .56, 9-1/2 in of per inch over chords 3-1/2 in, 10 %.
    loose = material("loose fill", INCH / (3.6 * R_IP), "insulation")
    chords = framed(
        "chords", 3.5 * INCH, Member(LUMBER, 1.5 * INCH, 24 * INCH), Fill(loose), share=0.10
    )
    roof: list[Layer] = [
        plane("loose fill", loose, 9.5 * INCH),
        chords,
        stated("gypsum", 0.56 * R_IP),
    ]
    films = {"outside_film": 0.46 * R_IP, "inside_film": 0.61 * R_IP}
    common = 0.46 + 0.61 + 0.56 + 9.5 * 3.6
    by_hand = 0.10 / (common + 3.5 * 1.25) + 0.90 / (common + 3.5 * 3.6)
    assert value(roof, "parallel_path", **films) / U_IP == pytest.approx(by_hand)


def test_two_layers_of_crossing_battens() -> None:
    # Render 15/.8, brick 380/.77, plaster 15/.8, 2 x 60 of .040 with 7.5 % of .13, gypsum 12.5/.25.
    fibre = Fill(material("wood fibre", 0.040, "insulation"))
    battens = framed("upright", 0.06, Member(SOFTWOOD, 0.045, 0.6), fibre)
    level = battens._replace(title="level", orientation="horizontal")
    wall: list[Layer] = [
        plane("render", material("render", 0.8), 0.015),
        plane("brick", material("brick", 0.77, "masonry"), 0.38),
        plane("plaster", material("plaster", 0.8), 0.015),
        battens,
        level,
        plane("gypsum", GYPSUM, 0.0125),
    ]
    common = 0.13 + 0.04 + 0.015 / 0.8 + 0.38 / 0.77 + 0.015 / 0.8 + 0.0125 / 0.25
    wood, between, f = 0.06 / 0.13, 0.06 / 0.040, 0.075
    upper = 1 / (
        f * f / (common + 2 * wood)
        + 2 * f * (1 - f) / (common + wood + between)
        + (1 - f) ** 2 / (common + 2 * between)
    )
    lower = common + 2 / (f / wood + (1 - f) / between)
    found = solved(wall, "weighted")
    assert found.value == pytest.approx(2 / (upper + lower))
    assert found.value == pytest.approx(0.292, abs=5e-4)
    named = {step.symbol: step.value for step in found.steps}
    assert named["R_upper"] == pytest.approx(upper)
    assert named["R_lower"] == pytest.approx(lower)
    assert "layers of members that run differently are taken to cross each other" in (
        found.assumptions
    )
    assert_recomputes(found.steps)


def test_aligned_battens_stand_in_line() -> None:
    # The same two layers upright: two paths instead of four.
    fibre = Fill(material("wood fibre", 0.040, "insulation"))
    battens = framed("upright", 0.06, Member(SOFTWOOD, 0.045, 0.6), fibre)
    wall = wall_of(battens, battens._replace(title="again"))
    by_hand = 0.075 / (0.17 + 2 * 0.06 / 0.13) + 0.925 / (0.17 + 2 * 0.06 / 0.040)
    assert bounds(wall)[0] == pytest.approx(by_hand)
    assert len(getattr(parallel_paths(wall).tree, "branches", ())) == 2


def test_members_of_other_widths_at_one_spacing_are_cut_at_each_other() -> None:
    # 45 and 90 mm at 600 mm, centred: 45 mm of both, 45 mm of the wide one alone.
    wide = framed("wide", 0.1, Member(SOFTWOOD, 0.09, 0.6), Fill(WOOL_035))
    narrow = framed("narrow", 0.1, Member(SOFTWOOD, 0.045, 0.6), Fill(WOOL_035))
    wood, wool = 0.1 / 0.13, 0.1 / 0.035
    by_hand = (45 / (0.17 + 2 * wood) + 45 / (0.17 + wood + wool) + 510 / (0.17 + 2 * wool)) / 600
    assert bounds(wall_of(wide, narrow))[0] == pytest.approx(by_hand)


def test_spacings_that_differ_by_less_than_a_micrometre_stand_in_line() -> None:
    near = [framed("a", 0.1, Member(SOFTWOOD, 0.045, s), Fill(WOOL_035)) for s in (0.4, 0.4000004)]
    same = [near[0], near[0]._replace(title="b")]
    for layers in (near, near[::-1]):
        assert bounds(wall_of(*layers)) == pytest.approx(bounds(wall_of(*same)), rel=1e-5)


def test_plates_take_their_share_first_and_members_the_rest() -> None:
    # 21 % studs, 4 % headers of 3-1/2 in wood, 75 % cavity.
    headers = Extra("headers", 0.04, LUMBER, 3.5 * INCH)
    studs = framed("studs", 5.5 * INCH, Member(LUMBER, 1.5 * INCH, 16 * INCH), Fill(label=3.2))
    shares = area_shares(studs._replace(extras=(headers,)))
    assert shares.member == pytest.approx(1.5 / 16 * 0.96)
    assert shares.extras == (0.04,)
    given = area_shares(studs._replace(extras=(headers,), share=0.21))
    assert (given.cavity, given.member) == pytest.approx((0.75, 0.21))
    wall = [studs._replace(extras=(headers,), share=0.21)]
    r = [0.17 + 5.5 * 1.25 * R_IP, 0.17 + 3.5 * 1.25 * R_IP, 0.17 + 3.2]
    by_hand = 0.21 / r[0] + 0.04 / r[1] + 0.75 / r[2]
    found = solved(wall, "parallel_path")
    assert found.value == pytest.approx(by_hand)
    assert found.counted[0].note == "members 21 % of the area, headers 4 %"
    assert_recomputes(found.steps)


def test_plates_leave_the_members_in_line() -> None:
    # 10 % plates beside the same members: wood stands behind wood as before, U only rises.
    bare = framed("bare", 0.1, Member(SOFTWOOD, 0.045, 0.6), Fill(WOOL_035))
    plates = Extra("plates", 0.10, SOFTWOOD, 0.1)
    plated = bare._replace(title="plated", share=0.075, extras=(plates,))
    wood, wool = 0.1 / 0.13, 0.1 / 0.035
    by_hand = 0.075 / (0.17 + 2 * wood) + 0.10 / (0.17 + wood + wool) + 0.825 / (0.17 + 2 * wool)
    assert bounds(wall_of(plated, bare))[0] == pytest.approx(by_hand)
    assert by_hand > bounds(wall_of(bare, bare._replace(title="again")))[0]


def test_share_without_a_spacing() -> None:
    studs = framed("studs", 0.1, Member(SOFTWOOD, 0.045, None), Fill(WOOL_035), share=0.15)
    by_hand = 0.15 / (0.17 + 0.1 / 0.13) + 0.85 / (0.17 + 0.1 / 0.035)
    assert value([studs], "parallel_path") == pytest.approx(by_hand)
    (block,) = wall_of(studs).blocks
    assert not block.repeat
    said = solved([studs], "parallel_path").assumptions[0]
    assert said == "studs: framing share 15 % (from the project)"


def test_air_between_members() -> None:
    # ISO 6946:2017, unventilated 25 mm and more, horizontal, emittance .9: R = .18 in its table.
    space = AirSpaceLayer("air-space", "air", 1, 0.1, "unventilated", (0.9, 0.9))
    battens = framed("battens", 0.1, Member(SOFTWOOD, 0.045, 0.6), Fill(air=space))
    by_hand = 0.075 / (0.17 + 0.1 / 0.13) + 0.925 / (0.17 + 0.18)
    assert value([battens], "parallel_path") == pytest.approx(by_hand, rel=0.01)


# ------------------------------------------------------------------------------ steel profiles

C_100 = Profile("C 100x50x1.0", 0.1, 0.05, 0.001)
CHEEK: list[Layer] = [
    plane("sheathing", material("wood fibre", 0.043, "insulation"), 0.06),
    plane("board", material("board", 0.13), 0.012),
    framed("studs", 0.1, Member(STEEL, 0.05, 0.6, C_100), Fill(WOOL_035)),
    plane("gypsum", GYPSUM, 0.0125),
]


def test_steel_stud_with_flanges_both_wirings_by_hand() -> None:
    # 600 mm: web 1 mm, 49 mm of two flanges with 98 mm of wool between, 550 mm of wool.
    common = 0.13 + 0.13 + 0.06 / 0.043 + 0.012 / 0.13 + 0.0125 / 0.25
    web, wool = 0.1 / 50, 0.1 / 0.035
    flanges = 2 * 0.001 / 50 + 0.098 / 0.035
    paths = (1 / (common + web) + 49 / (common + flanges) + 550 / (common + wool)) / 600
    face = 1 / ((50 / (0.001 / 50) + 550 / (0.001 / 0.035)) / 600)
    middle = 1 / ((1 / (0.098 / 50) + 599 / (0.098 / 0.035)) / 600)
    planes = 1 / (common + 2 * face + middle)
    wall = wall_of(*CHEEK)
    wall = wall._replace(outside=wall.inside)
    assert bounds(wall) == pytest.approx((paths, planes), rel=1e-6)
    assert (paths, planes) == pytest.approx((0.2156, 0.3807), abs=5e-5)
    assert isothermal_planes(wall).u_factor == pytest.approx(planes, rel=1e-6)


def test_the_mean_of_both_says_where_iso_6946_excludes_it() -> None:
    found = solved(CHEEK, "weighted", outside_film=0.13)
    assert found.value == pytest.approx(0.2753, abs=5e-5)
    assert any("1.77" in said and "ISO 6946 excludes" in said for said in found.assumptions)
    assert found.ratio is not None
    assert found.ratio == pytest.approx(1.77, abs=0.005)
    # Without a weight of the rule set's own the rule is that of ISO 6946, which excludes metal.
    unstated = solved(CHEEK, "weighted", outside_film=0.13, weight=None)
    assert unstated.value is None
    assert "ISO 6946 excludes" in unstated.missing[0]


def test_profile_is_named_in_the_layer_list() -> None:
    found = solved(CHEEK, "two_dimensional").counted[2]
    assert found.note == "steel profile C 100x50x1.0"
    assert found.resistance is None


def test_pieces_of_each_shape() -> None:
    # Drawn by hand for web 80, flange 40, sheet 2, lip 10, in a layer of 100 at 200 on centre.
    def pieces(shape: str) -> set[Piece]:
        found = profile_pieces(Profile("p", 0.08, 0.04, 0.002, 0.01, shape), 0.1, 0.2)
        return {Piece(*(round(1000 * edge) for edge in piece)) for piece in found}

    web = Piece(80, 82, 20, 100)
    assert pieces("C") == {
        web, Piece(80, 120, 98, 100), Piece(80, 120, 20, 22),
        Piece(118, 120, 20, 30), Piece(118, 120, 90, 100),
    }  # fmt: skip
    assert pieces("Z") == {
        web, Piece(80, 120, 98, 100), Piece(42, 82, 20, 22),
        Piece(42, 44, 20, 30), Piece(118, 120, 90, 100),
    }  # fmt: skip
    assert pieces("hat") == {
        web, Piece(118, 120, 20, 100), Piece(80, 120, 20, 22),
        Piece(72, 82, 98, 100), Piece(118, 128, 98, 100),
    }  # fmt: skip


@pytest.mark.parametrize(
    ("member", "metal"),
    [
        (Member(STEEL, 0.05, 0.6, C_100), True),
        (Member(material("aluminium", 160.0), 0.05, 0.6), True),
        (Member(LUMBER, 0.05, 0.6), False),
    ],
)
def test_what_counts_as_metal(member: Member, metal: bool) -> None:
    layer: FramedLayer = framed("members", 0.1, member, Fill(WOOL_035))
    assert is_metal(layer) is metal
    said = solved(assembly(layer), "parallel_path").missing
    assert bool(said) is metal
