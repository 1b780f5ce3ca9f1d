"""Whole assemblies: cladding, corrections together, brackets, and what is missing."""

from __future__ import annotations

from math import log, pi

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.model.conversion import Conversion
from envcheck.model.project import (
    AirSpaceLayer,
    Bridge,
    Extra,
    Fasteners,
    Fill,
    Layer,
    Member,
    Profile,
    TaperedLayer,
)
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Solved
from envcheck.solve.assembly import NOT_DRAWN, TAPERED, solve
from envcheck.solve.network import interface_temperatures, leaves
from envcheck.solve.registry import prescribable
from tests.changed import changed
from tests.solve.drawn import few_walls, solved, value
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    U_IP,
    WOOD,
    WOOL,
    XPS,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
    setting,
    stated,
)

PIR = material("PIR", 0.023, "insulation")
CONCRETE = material("concrete", 2.3, "masonry")
VENTED = AirSpaceLayer("air-space", "vented space", 1, 0.03, "well", (0.9, 0.9))
TILES = plane("tiles", material("tiles", 1.0), 0.015)
BOARD = plane("board", material("board", 0.13), 0.018)
STUDS = framed("studs", 0.1, Member(WOOD, 0.045, 0.6), Fill(WOOL))
GIRT = Profile("C 100", 0.1, 0.05, 0.001)
STEEL_STUDS = framed("steel studs", 0.1, Member(STEEL, 0.05, 0.6, GIRT), Fill(WOOL))


# ------------------------------------------------------------------------ ventilated cladding


@pytest.mark.parametrize(("cladding", "film"), [("iso6946", 0.10), ("film_stays", 0.04)])
def test_well_ventilated_space_by_both_conventions(cladding: str, film: float) -> None:
    # ISO 6946:2017, 6.9.4, from memory: layers beyond are left out, still-air film instead;
    # North American practice: space and cladding count 0, the outside film stays.
    found = solved(
        [TILES, VENTED, BOARD], "series", Conventions(cladding=cladding), cladding_film=0.10
    )
    assert found.value == pytest.approx(1 / (film + 0.018 / 0.13 + 0.13))
    said = "outside a well-ventilated cavity: counts 0"
    assert [layer.note for layer in found.counted] == [said, said, ""]
    assert found.steps[1].symbol == "R3"
    assert_recomputes(found.steps)


def test_fasteners_outside_a_ventilated_space_add_nothing() -> None:
    foam = plane("foam", PIR, 0.1)
    layers = (foam, VENTED, plane("PIR", PIR, 0.04))
    by = Conventions(fasteners="iso6946")
    screws = SCREWS._replace(layer="foam")
    bare = solve(assembly(*layers), setting(), by)
    found = solve(assembly(*layers, fasteners=(screws,)), setting(), by)
    assert found.value == bare.value
    assert any("outside of what counts" in said for said in found.assumptions)


def test_two_tapered_layers_are_not_decided() -> None:
    found = solved([ROOF, ROOF._replace(title="second")], "series")
    assert found.value is None
    assert "one tapered layer: 'PIR' and 'second'" in found.missing[0]


def test_a_profile_takes_no_shares() -> None:
    """Tracks as a share beside drawn steel would count nothing: said, not dropped."""
    track = Extra("track", 0.1, STEEL, 0.003)
    found = solved([BOARD, STEEL_STUDS._replace(extras=(track,))], "isothermal_planes")
    assert found.value is None
    assert "linear bridges" in found.missing[0]


@pytest.mark.parametrize("method", ["parallel_path", "weighted"])
def test_metal_that_the_rule_set_counts_zero_stands_in_no_way(method: str) -> None:
    girts = STEEL_STUDS._replace(title="girts", crosses_insulation=True, orientation="horizontal")
    zero = Conventions(crossed_insulation="zero")
    found = solved([girts, BOARD, STUDS], method, zero, weight=None)
    alone = solved([BOARD, STUDS], method, weight=None)
    assert found.value == pytest.approx(alone.value)


def test_the_innermost_of_two_ventilated_spaces_counts() -> None:
    found = value([TILES, VENTED, BOARD, VENTED, BOARD], "series")
    assert found == pytest.approx(1 / (0.13 + 0.018 / 0.13 + 0.13))


@pytest.mark.parametrize("ventilation", ["unventilated", "slightly"])
def test_other_spaces_keep_what_lies_beyond(ventilation: str) -> None:
    space = VENTED._replace(ventilation=ventilation)
    without: list[Layer] = [space, BOARD]
    gained = 1 / value([TILES, *without], "series") - 1 / value(without, "series")
    assert gained == pytest.approx(0.015 / 1.0)


# -------------------------------------------------------------------- corrections together

ROOF = TaperedLayer("tapered", "PIR", 1, PIR, 0.1, 0.2, "rectangle")
SLAB = plane("slab", CONCRETE, 0.16)
SCREWS = Fasteners("PIR", STEEL, 0.0048, 5.0, 0.15, 1)
EDGE = Bridge("line", "edge", 0.1, 0.05, True, "catalogue", "calculation", 1)
FEET = Bridge("point", "feet", 0.01, 4.0, False, "report", "test", 1)
ISO = Conventions(fasteners="iso6946")


def porch(**more: object) -> Solved:
    roof = assembly(ROOF, SLAB, **more)
    return solve(roof, setting("up", inside_film=0.10), ISO, (FEET,), 20.0)


def test_taper_fasteners_and_bridges_add_up() -> None:
    # Invented porch roof by ISO 6946 (formulas from memory): R0 = .10 + .04 + .16/2.3 + .1/.023,
    # U = ln(1 + R1/R0) / R1; screws at the mean thickness; psi l + chi n / A.
    rest, rise = 0.14 + 0.16 / 2.3 + 0.1 / 0.023, 0.1 / 0.023
    clear = log(1 + rise / rest) / rise
    r1, area = 0.15 / 0.023, pi * 0.0048**2 / 4
    screws = 0.8 * 50 * area * 5 / 0.15 * (r1 / (rest + 0.05 / 0.023)) ** 2
    found = porch(fasteners=(SCREWS,), bridges=(EDGE,))
    assert found.clear == pytest.approx(clear)
    assert found.clear == pytest.approx(0.154, abs=5e-4)
    assert screws == pytest.approx(0.0226, abs=5e-5)
    assert found.value == pytest.approx(clear + screws + 0.1 * 0.05 + 0.01 * 4 / 20)
    assert found.steps[-1].symbol == "U_total"
    assert found.steps[-1].value == pytest.approx(found.value)
    assert_recomputes(found.steps)
    assert (found.low, found.high, found.bracket_note) == (None, None, TAPERED)


@pytest.mark.parametrize(
    ("more", "words"),
    [
        ({"fasteners": (SCREWS._replace(layer="nothing"),)}, "'nothing' that fasteners cross"),
        ({"bridges": (EDGE._replace(evidence="assumed"),)}, "a confirmed source of psi"),
    ],
)
def test_an_unknown_correction_leaves_the_clear_value(more: dict[str, object], words: str) -> None:
    found = porch(**more)
    assert found.value is None
    assert found.clear == pytest.approx(0.154, abs=5e-4)
    assert words in " ".join(found.missing)


def test_bracket_carries_the_corrections() -> None:
    wall = assembly(STUDS, plane("XPS", XPS, 0.05), fasteners=(SCREWS._replace(layer="XPS"),))
    bare = solve(wall, setting(method="weighted"), ISO)
    found = solve(wall, setting(method="weighted"), ISO, (EDGE,))
    for with_edge, without in (
        (found.value, bare.value), (found.low, bare.low), (found.high, bare.high),
    ):  # fmt: skip
        assert with_edge is not None
        assert without is not None
        assert with_edge - without == pytest.approx(0.1 * 0.05)
    assert bare.value is not None
    assert bare.clear is not None
    assert bare.value > bare.clear
    beside = {b.name: b.value for b in found.beside}
    assert beside["parallel_path"] == found.low
    assert beside["isothermal_planes"] == found.high


# ------------------------------------------------------------------------- who decides, how


def test_two_dimensional_decides_by_the_bracket() -> None:
    found = solved([BOARD, STEEL_STUDS], "two_dimensional")
    assert found.decided_by_bracket
    assert found.low is not None
    assert found.low < found.high == pytest.approx(found.value)
    assert "parallel paths to isothermal planes" in found.bracket_note


def test_series_needs_no_bracket_and_refuses_members() -> None:
    found = solved([BOARD, plane("XPS", XPS, 0.05)], "series")
    assert found.low == found.high == pytest.approx(found.value)
    assert found.beside == ()
    assert found.bracket_note == "layers in series: both ends are one"
    (missing,) = solved([BOARD, STUDS], "series").missing
    assert missing == "a method for the bridged layer 'studs': 'series' cannot count it"


def test_method_that_the_clause_refuses() -> None:
    found = solved([STUDS], "parallel_path", refused=("parallel_path",), method_from="Table 5")
    assert found.value is None
    assert found.missing == (
        "another method: Table 5 does not accept parallel paths (adiabatic planes between them)",
    )
    assert found.low is not None


def test_no_method_is_said_in_the_setting_s_words() -> None:
    said = "the rule set names no method for steel framing, and none is assumed"
    found = solved([STEEL_STUDS], "", method_from=said)
    assert (found.value, found.missing) == (None, (said,))
    assert found.ratio is not None
    assert found.ratio > 1.3


@pytest.mark.parametrize(
    ("kind", "method", "words"),
    [
        ("window", "iso10077_window", "size, glass, frame and edge of the window"),
        ("curtain-wall", "iso12631_curtain_wall", "joints of the curtain wall module"),
        ("glazing", "en673_glazing", "panes and spaces of the glazing"),
        ("rated", "rated", "the U-factor of the whole product"),
        ("slab-on-grade", "f_factor", "insulation and heating of the slab"),
        ("slab-on-grade", "iso13370_slab", "perimeter, area, wall thickness and soil"),
        ("below-grade-wall", "c_factor", "the layers of the assembly"),
        ("window", "rated", "clause 1"),
        ("window", "", "clause 1"),
    ],
)
def test_nothing_is_raised_for_what_is_missing(kind: str, method: str, words: str) -> None:
    found = solve(assembly(kind=kind), setting(method=method), Conventions())
    assert found.value is None
    assert words in found.missing[0]
    assert found.bracket_note == NOT_DRAWN


TOO_DEEP = AirSpaceLayer("air-space", "attic", 1, 0.9, "unventilated", (0.9, 0.9))


@pytest.mark.parametrize("method", ["", *prescribable()])
@pytest.mark.parametrize(
    "layers",
    [
        (),
        (VENTED,),
        (ROOF,),
        (ROOF, STUDS),
        (TOO_DEEP,),
        (STEEL_STUDS, STUDS, STEEL_STUDS._replace(crosses_insulation=True)),
        (stated("deck", 0.0),),
    ],
)
@pytest.mark.parametrize("films", [0.1, 0.0])
def test_value_or_missing_by_every_method(
    method: str, layers: tuple[Layer, ...], films: float
) -> None:
    under = {"outside_film": films, "inside_film": films, "cladding_film": films}
    found = solved(layers, method, **under)
    assert (found.value is None) == bool(found.missing)
    assert all(found.missing)
    if found.decided_by_bracket and found.value is not None:
        assert found.low is not None
        assert found.high is not None
    assert_recomputes(found.steps)


def test_a_taper_has_no_drawn_section() -> None:
    (missing,) = solved([ROOF, SLAB], "two_dimensional").missing
    assert missing == "one thickness for 'PIR': a taper has no drawn section"


# ------------------------------------------------------------------------------ temperatures


def test_temperatures_at_the_interfaces_by_hand() -> None:
    # 20 K over .04 + .5 + 1.33 + .13 = 2 m2 K/W: .4, 5, 13.3 and 1.3 K.
    found = solved([stated("outer", 0.5), stated("inner", 1.33)], "series")
    assert found.tree is not None
    passed = interface_temperatures(found.tree, 0.0, 20.0)
    assert [title for title, _ in passed] == ["outside film", "outer", "inner", "inside film"]
    assert [t for _, t in passed] == pytest.approx([0.4, 5.4, 18.7, 20.0])
    assert [leaf.symbol for leaf in leaves(found.tree)] == ["Ro", "R1", "R2", "Ri"]


@given(few_walls, st.floats(-40.0, 20.0))
def test_temperatures_lie_between_the_airs(layers: list[Layer], outside: float) -> None:
    found = solved(layers, "isothermal_planes")
    assert found.tree is not None
    passed = [t for _, t in interface_temperatures(found.tree, outside, 21.0)]
    assert passed == sorted(passed)
    assert outside < passed[0]
    assert passed[-1] == pytest.approx(21.0)


# ---------------------------------------------------------------------------------- wording


def test_hand_check_is_the_shortest_sum() -> None:
    found = solved([BOARD, plane("XPS", XPS, 0.05)], "series")
    assert [step.symbol for step in found.hand_check] == ["R", "U"]
    assert found.hand_check[0].expression == "{Ro} + {R1} + {R2} + {Ri}"


def test_cautions_name_what_triggers_them() -> None:
    wall: list[Layer] = [plane("XPS", XPS, 2 * INCH), VENTED, plane("XPS", XPS, 2 * INCH), STUDS]
    topics = {(c.topic, c.reason) for c in solved(wall, "parallel_path").cautions}
    assert ("fire", "T1: ventilated cavity") in topics
    assert ("structure", "T1: attachment through XPS") in topics
    assert any(topic == "moisture" and "studs" in reason for topic, reason in topics)
    assert any(topic == "fire" and "XPS" in reason for topic, reason in topics)


def test_inner_insulation_on_solid_masonry() -> None:
    brick = plane("brick", material("brick", 0.77, "masonry"), 0.38)
    inside = {c.topic for c in solved([brick, plane("XPS", XPS, 0.05)], "series").cautions}
    outside = {c.topic for c in solved([plane("XPS", XPS, 0.05), brick], "series").cautions}
    assert "solid_masonry" in inside
    assert "solid_masonry" not in outside


def test_si_and_ip_of_one_wall() -> None:
    # R-1 wall between films of R-.17 and R-.68: 1/1.85 = .541 Btu/(h ft2 F) = 3.069 W/(m2 K).
    films = {"outside_film": 0.17 * R_IP, "inside_film": 0.68 * R_IP}
    found = value([stated("board", R_IP)], "series", **films)
    assert found / U_IP == pytest.approx(1 / 1.85)
    assert found == pytest.approx(3.069, abs=5e-4)


def test_a_declared_conductivity_is_converted_in_the_worksheet() -> None:
    wet = Conversion(0.034, 0.0043, 10.0, 20.0, 4.0, 0.0, 0.02, "a table")
    wool = changed(WOOL, conductivity=wet.conductivity, conversion=wet)
    studs = framed("studs", 0.14, Member(WOOD, 0.038, 0.4), Fill(material=wool))
    found = solved([plane("boards", wool, 0.05), studs], "parallel_path")
    assert_recomputes(found.steps)
    # Recomputed from the printed formula: 0.034 exp(0.043) exp(0.08) = 0.038450.
    step = next(step for step in found.steps if step.symbol == "R1_k")
    assert step.value == pytest.approx(0.038450, abs=5e-7)
    assert "ISO 10456:2007, 7; a table" in step.source
    assert sum(step.quantity == "conductivity" for step in found.steps) == 2


def test_a_mean_of_wirings_that_iso_6946_excludes_says_so() -> None:
    # ISO 6946:2017, 6.7.2.1: not for a ratio of the limits above 1.5 (from memory).
    steel = Profile("c", 0.092, 0.041, 0.0011, 0.0)
    for member, excluded in (
        (Member(STEEL, 0.041, 0.406, steel), True),
        (Member(WOOD, 0.038, 0.406), False),
    ):
        of = assembly(framed("studs", 0.092, member, Fill(material=WOOL)))
        solved = solve(of, setting(method="isothermal_planes"), Conventions())
        note = next(each.note for each in solved.beside if each.name == "combined")
        assert ("excludes" in note) is excluded
        assert (solved.ratio > 1.5) is excluded
