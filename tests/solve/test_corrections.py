"""Air voids and rain on inverted roofs as a project states them, and when corrections count."""

from __future__ import annotations

import pytest

from envcheck.model.additions import Inverted, Voids
from envcheck.model.project import Assembly, Fasteners, Fill, Member, TaperedLayer
from envcheck.model.ruleset import Conventions
from envcheck.model.solved import Solved
from envcheck.solve.assembly import solve
from tests.solve.samples import (
    STEEL,
    WOOD,
    assembly,
    assert_recomputes,
    framed,
    material,
    plane,
    setting,
    stated,
)

XPS = material("XPS", 0.036, "insulation")
DECK = stated("deck", 0.1)
ISO = Conventions(fasteners="iso6946", air_voids="iso6946", inverted_roofs="iso6946")
RAIN = Inverted("XPS", 0.002, None, None, "weather record", 1)
BOARD = plane("XPS", XPS, 0.18)
R1, RT = 5.0, 5.0 + 0.1 + 0.04 + 0.10


def run(
    *layers: object, under: Conventions = ISO, method: str = "series", **more: object
) -> Solved:
    of: Assembly = assembly(*(layers or (BOARD, DECK)))._replace(**more)
    solved = solve(of, setting("up", method, 0.10), under)
    assert_recomputes(solved.steps)
    return solved


@pytest.mark.parametrize(("level", "added"), [(0, 0.0), (1, 0.01), (2, 0.04)])
def test_voids_by_hand(level: int, added: float) -> None:
    # ISO 6946 annex F, levels from memory: dU'' (R1/RT)^2.
    solved = run(voids=(Voids("XPS", level, 1),))
    assert solved.value == pytest.approx(1 / RT + added * (R1 / RT) ** 2)


def test_rain_by_hand() -> None:
    # 2 mm/d x 0.04 x (5.00/5.24)^2.
    solved = run(inverted=RAIN)
    assert solved.value == pytest.approx(1 / RT + 2 * 0.04 * (R1 / RT) ** 2)
    assert any("f x = 0.04" in said for said in solved.assumptions)
    own = run(inverted=RAIN._replace(drainage=0.75, heat_loss=0.03))
    assert own.value == pytest.approx(1 / RT + 2 * 0.75 * 0.03 * (R1 / RT) ** 2)
    assert not any("f x = 0.04" in said for said in own.assumptions)


def test_without_the_convention_they_are_said_not_to_count() -> None:
    plain = run(under=Conventions())
    solved = run(under=Conventions(), inverted=RAIN, voids=(Voids("XPS", 2, 1),))
    assert solved.value == plain.value
    assert [said for said in solved.assumptions if "not counted" in said] != []
    assert len([said for said in solved.assumptions if "not counted" in said]) == 2


def test_tapered_layers_are_corrected_at_their_mean() -> None:
    falls = TaperedLayer("tapered", "XPS", 1, XPS, 0.144, 0.216, "rectangle")
    solved = run(falls, DECK, inverted=RAIN)
    assert solved.added == pytest.approx(2 * 0.04 * (R1 / RT) ** 2)  # mean 0.18 m, as above
    assert any("rain correction taken at" in said for said in solved.assumptions)
    voids = run(falls, DECK, voids=(Voids("XPS", 2, 1),))
    assert voids.added == pytest.approx(0.04 * (R1 / RT) ** 2)
    assert any("void correction taken at" in said for said in voids.assumptions)


def test_several_layers_with_voids_add_up() -> None:
    other = plane("second", XPS, 0.036)
    both = run(BOARD, other, DECK, voids=(Voids("XPS", 1, 1), Voids("second", 2, 1)))
    total = RT + 1.0
    assert both.added == pytest.approx(0.01 * (R1 / total) ** 2 + 0.04 * (1 / total) ** 2)


def test_a_bridged_layer_has_no_resistance_by_itself() -> None:
    studs = framed("studs", 0.1, Member(WOOD, 0.045, 0.6), Fill(material=XPS))
    solved = run(studs, DECK, method="weighted", voids=(Voids("studs", 1, 1),))
    assert solved.value is None
    assert "resistance of 'studs' by itself" in solved.missing[0]
    rain = run(studs, DECK, method="weighted", inverted=RAIN._replace(layer="studs"))
    assert "resistance of 'studs' by itself" in rain.missing[0]


@pytest.mark.parametrize(("least", "counts"), [(None, True), (0.03, False), (0.02, True)])
def test_corrections_count_from_the_share_of_the_rule_set(
    least: float | None, counts: bool
) -> None:
    # Fasteners of thin wire alone: 0.8 k A n / d (R1/RT)^2 is 2.6 % of 1/RT.
    thin = Fasteners("XPS", STEEL, 0.0025, 5.0, None, 1)
    solved = run(fasteners=(thin,), under=ISO._replace(corrections_from=least))
    share = 0.8 * 50 * 4.9087e-6 * 5 / 0.18 * (R1 / RT) ** 2 * RT
    assert share == pytest.approx(0.026, abs=5e-4)
    assert solved.value == pytest.approx((1 + share) / RT if counts else 1 / RT, rel=1e-4)
    assert any("does not count them" in said for said in solved.assumptions) is not counts


def test_together_they_may_count_where_each_alone_would_not() -> None:
    thin = Fasteners("XPS", STEEL, 0.0025, 5.0, None, 1)
    under = ISO._replace(corrections_from=0.03)
    rain = RAIN._replace(precipitation=0.0001)
    both = run(fasteners=(thin,), inverted=rain, under=under)
    assert both.added > 0
    assert run(inverted=rain, under=under).added == 0
    assert run(fasteners=(thin,), under=under).added == 0
