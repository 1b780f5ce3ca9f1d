"""The zone method: a sum by hand, its place between the wirings, and what it does not cover.

The walls are invented.
"""

from __future__ import annotations

import pytest
from hypothesis import given, settings

from envcheck.model.project import Extra, Fill, FramedLayer, Layer, Member, Profile, TaperedLayer
from envcheck.model.ruleset import Conventions
from envcheck.solve.methods.zone import zone_u, zone_width
from tests.solve.drawn import plain_layers, solved, steel_layers, value
from tests.solve.samples import (
    INCH,
    R_IP,
    STEEL,
    U_IP,
    WOOD,
    WOOL,
    assert_recomputes,
    framed,
    material,
    plane,
    stated,
)

DEPTH, SPACING = 3.5 * INCH, 16 * INCH
STUD = Profile("C", DEPTH, 1.625 * INCH, 0.0451 * INCH)
MEMBER = Member(STEEL, STUD.flange, SPACING, STUD)
STUDS = framed("studs", DEPTH, MEMBER, Fill(label=13 * R_IP))
GYPSUM = plane("gypsum", material("gypsum", 0.5 * INCH / (0.45 * R_IP)), 0.5 * INCH)
FILMS = {"outside_film": 0.17 * R_IP, "inside_film": 0.68 * R_IP}


def test_by_hand() -> None:
    # W = 1.625 + 2 x 0.5 = 2.625 in, share .16406. Steel k 50 W/(m K) = 346.7 Btu in/(h ft2 F).
    # Web row 3.4098 in: .0451/2.625 = .01718 of R-.009835 beside: R .5481; flanges .0004.
    # RA = .17 + .45 + .5485 + .45 + .68 = 2.2985; RB = 14.75; U = .07138 + .05667 = .12805.
    found = solved([GYPSUM, STUDS, GYPSUM], "zone", **FILMS)
    assert found.value is not None
    assert found.value / U_IP == pytest.approx(0.12805, abs=2e-5)
    assert_recomputes(found.steps)
    assert found.steps[-1].value == found.value
    assert found.tree is not None
    assert 1 / found.tree.value == pytest.approx(found.value)
    # The thicker side counts, whichever it is.
    board = plane("insulation", WOOL, 2 * INCH)
    sides: list[list[Layer]] = [[GYPSUM, board, STUDS, GYPSUM], [GYPSUM, STUDS, board, GYPSUM]]
    zones = [next(s.value for s in solved(w, "zone").steps if s.symbol == "W") for w in sides]
    assert zones == pytest.approx([(1.625 + 2 * 2.5) * INCH] * 2)


def test_bare_metal_counts_half_an_inch_of_film() -> None:
    # The least distance of 0.5 in is printed in the textbook page behind metal_zone.yaml.
    assert zone_width(0.04, 0.0) == pytest.approx(0.04 + 0.0254)
    assert zone_width(0.04, 0.02) == pytest.approx(0.08)


def test_a_zone_as_wide_as_the_bay_is_isothermal_planes() -> None:
    wall: list[Layer] = [plane("insulation", WOOL, 0.3), STUDS, GYPSUM]
    assert value(wall, "zone") == pytest.approx(value(wall, "isothermal_planes"))
    assert zone_u(0.9, 0.4, 2.0, 5.0) == pytest.approx(1 / 2.0)


@settings(max_examples=60)
@given(plain_layers(), steel_layers(), plain_layers())
def test_lies_between_the_wirings(outer: Layer, steel: FramedLayer, inner: Layer) -> None:
    # Rayleigh: cutting zone A into paths lowers U, joining both zones by planes raises it.
    if steel.member.profile is None or steel.member.profile.shape != "C":
        return
    found = solved([outer, steel, inner], "zone")
    assert found.value is not None
    assert found.low is not None
    assert found.high is not None
    assert found.low * (1 - 1e-9) <= found.value <= found.high * (1 + 1e-9)


def test_solid_bars_by_hand() -> None:
    # Bars 10 mm wide in 100 mm of wool k .037, steel k 50: R .002 beside R 2.7027. Gypsum .0793
    # each side, films .04 + .13. W = 10 + 2 x 12.7 = 35.4 mm, share .059; bar 10/35.4 = .28249:
    # R .0070755; RA = .3355865; RB = 3.0312; U = .059 / .33559 + .941 / 3.0312 = .48625.
    bars = framed("bars", 0.1, Member(STEEL, 0.01, 0.6), Fill(material=WOOL))
    found = solved([GYPSUM, bars, GYPSUM], "zone")
    assert found.value == pytest.approx(0.48625, abs=2e-4)
    assert_recomputes(found.steps)


def test_crossed_insulation_counts_by_the_rule_set_and_widens_the_zone() -> None:
    rail = Member(STEEL, 0.05, 0.6)
    girts = framed("girts", 0.075, rail, Fill(material=WOOL), crosses_insulation=True)
    under = Conventions(crossed_insulation="zero")
    found = solved([girts, GYPSUM, STUDS, GYPSUM], "zone", under)
    named = {step.symbol: step.value for step in found.steps}
    assert named["R1"] == 0.0
    assert named["W"] == pytest.approx(STUD.flange + 2 * (0.075 + 0.5 * INCH))
    assert_recomputes(found.steps)


HAT = STUD._replace(shape="hat", lip=0.02)
NOT_COVERED: list[tuple[list[Layer], str]] = [
    ([GYPSUM], "one framed layer"),
    ([STUDS, STUDS], "one framed layer"),
    ([framed("wood", 0.1, Member(WOOD, 0.04, 0.4), Fill(material=WOOL))], "metal framing"),
    ([STUDS._replace(member=MEMBER._replace(profile=HAT))], "C profile"),
    ([STUDS._replace(extras=(Extra("track", 0.05, STEEL, 0.1),))], "at a spacing"),
    ([stated("board of no thickness", 0.5), STUDS], "the thickness of"),
    ([TaperedLayer("tapered", "falls", 1, WOOL, 0.1, 0.2, "rectangle"), STUDS], "one thickness"),
]


@pytest.mark.parametrize(("layers", "need"), NOT_COVERED)
def test_what_it_does_not_cover_is_not_decided(layers: list[Layer], need: str) -> None:
    found = solved(layers, "zone")
    assert found.value is None
    assert any(need in words for words in found.missing), found.missing
