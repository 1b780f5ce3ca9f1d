"""Fasteners and thermal bridges added to the clear field."""

from __future__ import annotations

import pytest

from envcheck.model.project import Bridge, Fasteners, Fill, Member, TaperedLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Operand
from envcheck.solve.methods.bridges import correct_for_bridges, total_step
from envcheck.solve.methods.fasteners import correct_for_fasteners, fastener_correction
from envcheck.units import parse
from tests.solve.samples import (
    STEEL,
    U_IP,
    WOOD,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
)

PIR = material("PIR", 0.023, "insulation")
ISO = Conventions(fasteners="iso6946")
ROOF = TaperedLayer("tapered", "PIR", 1, PIR, 0.1, 0.2, "rectangle")


def through(layer: str, penetration: float | None = None, of: object = STEEL) -> Fasteners:
    return Fasteners(layer, of, 0.0048, 5.0, penetration, 1)


def test_tapered_roof_by_hand() -> None:
    # Hand sum: .8 x 50 x 1.81e-5 x 5 / .15 x (6.522/6.731)^2 = .0226, R1 and RT at 150 mm.
    roof = assembly(ROOF, fasteners=(through("PIR"),))
    found = correct_for_fasteners(roof, 0.14 + 0.16 / 2.3 + 0.1 / 0.023, ISO)
    assert found.value == pytest.approx(0.0226, abs=5e-5)
    assert any("mean thickness" in said for said in found.assumptions)
    assert_recomputes(found.steps)
    assert [step.symbol for step in found.addends] == ["dU_f1"]


def test_recessed_fastener_counts_by_its_depth() -> None:
    layer = plane("PIR", PIR, 0.15)
    full = correct_for_fasteners(assembly(layer, fasteners=(through("PIR"),)), 7.0, ISO)
    part = correct_for_fasteners(assembly(layer, fasteners=(through("PIR", 0.1),)), 7.0, ISO)
    longer = correct_for_fasteners(assembly(layer, fasteners=(through("PIR", 0.2),)), 7.0, ISO)
    assert part.value == pytest.approx(full.value * 2 / 3)
    assert longer.value == pytest.approx(full.value)
    assert_recomputes(part.steps)


def test_recomputed_with_published_arguments() -> None:
    # ISO 6946:2017, annex F, formula from memory: .8 x 50 x 1.25e-5 x 2.5 / .1 x (2.632/3.2)^2.
    found = fastener_correction(0.8, 50.0, 1.25e-5, 2.5, 0.1, 2.632, 3.2)
    assert found == pytest.approx(0.008456, abs=1e-6)


@pytest.mark.parametrize(
    ("convention", "bridges", "assumed", "missing"),
    [
        ("ignored", (), "not counted", ""),
        ("chi", (), "point bridges", "chi"),
        ("chi", (Bridge("point", "screws", 0.001, 5.0, True, "test", "test", 1),), "point", ""),
    ],
)
def test_conventions(
    convention: str, bridges: tuple[Bridge, ...], assumed: str, missing: str
) -> None:
    roof = assembly(ROOF, fasteners=(through("PIR"),), bridges=bridges)
    found = correct_for_fasteners(roof, 5.0, Conventions(fasteners=convention))
    assert found.value == 0.0
    assert found.steps == ()
    assert assumed in found.assumptions[0]
    assert missing in " ".join(found.missing)
    assert bool(found.missing) == bool(missing)


def test_poor_conductors_need_no_correction() -> None:
    roof = assembly(plane("PIR", PIR, 0.1), fasteners=(through("PIR", of=WOOD),))
    found = correct_for_fasteners(roof, 5.0, ISO)
    assert found.value == 0.0
    assert "no correction" in found.assumptions[0]


def test_layer_without_a_thickness_of_its_own_is_missing() -> None:
    studs = framed("studs", 0.09, Member(WOOD, 0.04, 0.4), Fill(material=PIR))
    found = correct_for_fasteners(assembly(studs, fasteners=(through("studs"),)), 5.0, ISO)
    assert found.value == 0.0
    assert "'studs'" in found.missing[0]


def test_no_fasteners_no_word() -> None:
    assert correct_for_fasteners(assembly(ROOF), 5.0, ISO) == (0.0, (), (), (), 0.0)


def point(evidence: str = "test", per_area: bool = True, amount: float = 0.0) -> Bridge:
    chi = parse("0.020 Btu/(h*degF)", "point_transmittance")
    density = parse("0.375 /ft2", "per_area")
    return Bridge("point", "brackets", chi, amount or density, per_area, "report", evidence, 1)


def test_brackets_by_hand() -> None:
    # Hand sum: .375 per ft2 x .020 Btu/(h F) = .0075 Btu/(h ft2 F).
    found = correct_for_bridges([point()], None)
    assert found.value / U_IP == pytest.approx(0.0075)
    assert_recomputes(found.steps)


def test_amounts_of_an_element_are_spread_over_its_area() -> None:
    line = Bridge("line", "shelf angle", 0.3, 12.0, False, "catalogue", "calculation", 1)
    found = correct_for_bridges([line, point(per_area=False, amount=8.0)], 40.0, "dU_e")
    chi = parse("0.020 Btu/(h*degF)", "point_transmittance")
    assert found.value == pytest.approx(0.3 * 12 / 40 + 8 * chi / 40)
    assert [step.symbol for step in found.steps] == ["dU_e1", "dU_e2"]
    assert_recomputes(found.steps)


def test_line_per_area() -> None:
    line = Bridge("line", "edges", 0.3, 0.1, True, "catalogue", "calculation", 1)
    found = correct_for_bridges([line], None)
    assert found.value == pytest.approx(0.03)
    assert_recomputes(found.steps)


@pytest.mark.parametrize("evidence", ["assumed", ""])
def test_unconfirmed_source_never_decides(evidence: str) -> None:
    found = correct_for_bridges([point(evidence), point()], None)
    assert found.value / U_IP == pytest.approx(0.0075)
    assert found.missing == ("a confirmed source of chi for 'brackets'",)


def test_area_that_is_needed_is_named() -> None:
    found = correct_for_bridges([point(per_area=False, amount=8.0)], None)
    assert found.value == 0.0
    assert "area" in found.missing[0]


def test_total() -> None:
    steps = correct_for_bridges([point(), point()], None).steps
    total = total_step("U_total", Operand("U", 0.2, "u_factor"), steps)
    assert total.value == pytest.approx(0.2 + 2 * 0.0075 * U_IP)
    assert_recomputes([total])
