"""The moisture check of whole assemblies: amounts by hand, and what it must not say."""

from __future__ import annotations

from math import exp

import pytest

from envcheck.model.layers import AirSpaceLayer, Fill, Member
from envcheck.model.moisture import DAYS, Month
from envcheck.model.project import Climate, Element, Layer, Site
from envcheck.model.ruleset import Conventions
from envcheck.model.vapour import IndoorAir
from envcheck.solve import moisture
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

COLD = (0.0,) * 4
AIR = IndoorAir("brief", (20.0,) * 12, (0.5,) * 12)
CONCRETE = material("concrete", 2.0, "concrete")._replace(mu=100.0, mu_source="table")
FOAM = material("foam", 0.04, "insulation")._replace(mu=60.0, mu_source="table")
FELT = material("felt", 0.2, "membrane")._replace(mu=50000.0, mu_source="table")
BRICK = material("brick", 0.8, "masonry")._replace(mu=10.0, mu_source="table")
PLASTER = material("plaster", 0.5, "plaster")._replace(mu=10.0, mu_source="table")
FIBRE = WOOL._replace(mu=1.0, mu_source="table")


def saturated(t: float) -> float:
    """ISO 13788 annex E, as on paper."""
    return 610.5 * (exp(17.269 * t / (237.3 + t)) if t >= 0 else exp(21.875 * t / (265.5 + t)))


def site(warm: float = 15.0, air: IndoorAir = AIR) -> Site:
    """Four months at 0 degC, eight warm ones, at 80 % outdoors."""
    temperatures = (*COLD, *(warm,) * 8)
    pressures = tuple(0.8 * saturated(t) for t in temperatures)
    climate = Climate("invented", temperatures, vapour_pressures=pressures)
    return Site("Nowhere", climate=climate, indoor_air=air, line=7)


def element(category: str = "wall.mass") -> Element:
    return Element(
        "E1", "T1", category, "A-1", "", 1, 10.0, None, None, None, "", "outdoors", "", 90.0, None,
        None, None, "outside", "", (), (),
    )  # fmt: skip


def checked(
    *layers: Layer, category: str = "wall.mass", at: Site | None = None
) -> moisture.Moisture:
    months = moisture.months_of(at or site())
    return moisture.check(assembly(*layers), (element(category),), setting(), Conventions(), months)


def test_months_by_hand() -> None:
    """50 % at 20 degC is 1168.5 Pa; 1460.6 Pa saturate at 12.6 degC; f = 12.6 / 20 = 0.631."""
    january, *_, december = moisture.months_of(site())
    assert january.indoor_pressure == pytest.approx(0.5 * saturated(20.0))
    assert january.least_surface == pytest.approx(12.6, abs=0.05)
    assert january.critical == pytest.approx(0.631, abs=0.0005)
    assert december.critical is not None and december.critical < 0.0
    by_class = site(air=IndoorAir("brief", (20.0,) * 12, (), 3, 810.0, "table"))
    first, *_, last = moisture.months_of(by_class)
    assert first.indoor_pressure == pytest.approx(0.8 * 610.5 + 810.0)
    assert last.indoor_pressure == pytest.approx(0.8 * saturated(15.0) + 810.0 / 4)
    assert moisture.worst_of((first, last)) == 0
    assert moisture.worst_of(()) is None


def test_flat_roof_by_hand() -> None:
    """Felt, foam, concrete: water gathers below the felt for four months and stays."""
    found = checked(
        plane("felt", FELT, 0.004), plane("foam", FOAM, 0.10), plane("deck", CONCRETE, 0.16),
        at=site(9.5),
    )  # fmt: skip
    assert found.missing == () and found.withheld == ()
    total = 0.04 + 0.02 + 2.5 + 0.08 + 0.13
    s_felt, s_rest = 50000 * 0.004, 60 * 0.10 + 100 * 0.16
    p_in = 0.5 * saturated(20.0)

    def gain(outdoors: float, days: float) -> float:
        at = saturated(outdoors + (20.0 - outdoors) * 0.06 / total)
        arriving, leaving = (p_in - at) / s_rest, (at - 0.8 * saturated(outdoors)) / s_felt
        return 2e-10 * 86400 * days * (arriving - leaving)

    assert found.year is not None
    (one,) = found.year.planes
    assert one.title == "felt / foam"
    assert found.year.start == 0
    most = sum(gain(0.0, days) for days in DAYS[:4])
    assert one.month == 3 and one.greatest == pytest.approx(most, rel=1e-9)
    left = most + sum(gain(9.5, days) for days in DAYS[4:])
    assert 0.0 < left < most
    assert one.left == pytest.approx(left, rel=1e-9)
    assert one.amounts[11] == pytest.approx(left, rel=1e-9)
    assert found.factor == pytest.approx(1 - 0.25 / (2.64 + 0.25))
    assert found.short == ()
    assert_recomputes(found.steps)


def test_without_the_felt_it_dries() -> None:
    found = checked(
        plane("felt", FELT._replace(mu=3000.0), 0.004),
        plane("foam", FOAM, 0.10),
        plane("deck", CONCRETE, 0.04),
    )
    assert found.year is not None
    (one,) = found.year.planes
    assert one.greatest > 0.0 and one.left == 0.0
    assert_recomputes(found.steps)


def test_a_tight_inside_leaves_nothing() -> None:
    found = checked(
        plane("brick", BRICK, 0.12),
        plane("foam", FOAM, 0.10),
        stated("foil", 0.0)._replace(sd=500.0),
    )
    assert found.year is not None and found.year.planes == ()
    assert_recomputes(found.steps)


def test_a_bare_wall_is_short_in_the_cold_months_alone() -> None:
    found = checked(plane("brick", BRICK, 0.12))
    assert found.factor == pytest.approx(1 - 0.25 / (0.04 + 0.15 + 0.25))
    assert found.short == (0, 1, 2, 3)


def test_faces_within_a_thick_layer_are_seen() -> None:
    """Brick, mineral wool inside, open plaster: it condenses between, and within nothing else."""
    found = checked(
        plane("brick", BRICK, 0.24), plane("wool", FIBRE, 0.10), plane("in", PLASTER, 0.01)
    )
    assert found.year is not None
    assert [one.title for one in found.year.planes] == ["brick / wool"]


SPACE = AirSpaceLayer("air-space", "gap", 4, 0.03, "well", (0.9, 0.9))
STUDS = Member(WOOD, 0.045, 0.6)
STEEL_STUDS = Member(STEEL, 0.002, 0.6)


@pytest.mark.parametrize(
    ("layers", "category", "words"),
    [
        ((plane("brick", BRICK, 0.24), plane("foam", FOAM, 0.1)), "wall.mass", "inside solid"),
        (
            (framed("frame", 0.1, STUDS, Fill(material=FIBRE)), plane("in", PLASTER, 0.01)),
            "roof.rafter",
            "a timber roof",
        ),
        ((framed("frame", 0.1, STUDS, Fill(material=FIBRE)),), "wall.wood_frame", "timber members"),
        (
            (framed("frame", 0.1, STEEL_STUDS, Fill(material=FIBRE)),),
            "wall.steel_frame",
            "metal members",
        ),
        ((plane("brick", BRICK, 0.1), SPACE, plane("deck", CONCRETE, 0.2)), "wall.mass", "ventil"),
        (
            (plane("brick", BRICK, 0.1), SPACE._replace(ventilation="slightly"),
             plane("deck", CONCRETE, 0.2)),
            "wall.mass",
            "ventil",
        ),
    ],
)  # fmt: skip
def test_what_it_must_not_judge(layers: tuple[Layer, ...], category: str, words: str) -> None:
    found = checked(*layers, category=category)
    assert found.missing == ()
    assert any(words in reason for reason in found.withheld), found.withheld


def test_a_frame_is_seen_along_its_infill() -> None:
    found = checked(framed("frame", 0.1, STUDS, Fill(material=FIBRE)), category="wall.wood_frame")
    (sheet,) = found.sheets
    assert sheet.resistance == pytest.approx(0.1 / 0.037)
    assert sheet.diffusion == pytest.approx(0.1)


def test_what_has_no_vapour_resistance_is_named() -> None:
    bare = material("board", 0.2)
    found = checked(
        plane("face", bare, 0.01), stated("label", 2.0), framed("f", 0.1, STUDS, Fill(label=2.0))
    )
    assert found.year is None
    assert found.missing == (
        "mu of material 'board', or sd of layer 'face' (line 1)",
        "sd of layer 'label' (line 1)",
        "sd of layer 'f' (line 1)",
    )
    mended = checked(plane("face", bare, 0.01)._replace(sd=0.2), plane("in", PLASTER, 0.01))
    assert mended.missing == ()


def test_what_a_site_lacks_is_named_with_its_place() -> None:
    assert moisture.missing_of(site()) == ()
    told = moisture.missing_of(Site("Nowhere", line=7))
    assert len(told) == 3 and all("(section site, line 7)" in each for each in told)
    half = Site("Nowhere", climate=Climate("normals", (5.0,) * 12), indoor_air=AIR, line=9)
    assert [each.split(":")[0] for each in moisture.missing_of(half)] == ["outdoor humidity"]


def test_saturated_ends_do_not_break_it() -> None:
    """A damp cold room: the air inside is saturated at the inner surface."""
    month = Month(-10.0, saturated(-10.0), 20.0, saturated(20.0), 20.0, 1.0)
    found = moisture.check(
        assembly(plane("brick", BRICK, 0.12), plane("in", PLASTER, 0.01)), (element(),), setting(),
        Conventions(), (month,) * 12,
    )  # fmt: skip
    assert found.year is not None
    assert all(one.greatest >= 0.0 for one in found.year.planes)
