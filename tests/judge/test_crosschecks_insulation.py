"""Crossed and compressed insulation."""

from __future__ import annotations

import pytest

from envcheck.judge.crosschecks.continuous import left_between_planes
from envcheck.model.ruleset import Conventions
from tests.judge import crosscheck_models as m

GIRTS = m.stud("R-12.6", "3 in", material=m.STEEL, crosses=True, title="Wool between girts")


def crossed(layer=GIRTS, lines=(), **conventions):
    wall = m.assembly("W2", layers=(layer, m.stud(material=m.STEEL)))
    rules = m.ruleset(conventions=Conventions(**conventions))
    elements = tuple(m.element(line.element, "W2") for line in lines)
    return m.run("continuous-crossed", m.facts((wall,), elements, lines=tuple(lines), rules=rules))


def test_metal_through_insulation_that_the_line_relies_on():
    answer = m.solved(m.u(0.126), "W2", low=m.u(0.078), high=m.u(0.081))
    (found,) = crossed(
        lines=[m.line("S-W2", solved=answer)], where={"crossed_insulation": "Table 5"}
    )
    assert (found.severity, found.subject) == ("E", "W2")
    assert found.seen == (
        "Wool between girts (R-12.6) is crossed by metal members (Steel) every 16 in"
    )
    assert "it counts 0 (Table 5)" in found.suggests
    assert "between isothermal planes R-2.1 of it is left (17 %)" in found.suggests
    assert found.suggests.endswith("lies between 0.0780 and 0.0810")


def test_what_is_left_is_the_layer_between_planes():
    # 1.37 mm of steel (50 W/(m K)) in 406.4 mm, 76.2 mm deep, beside R-12.6 = 2.219 m2 K/W
    share = 1.37 / 406.4
    expected = 1 / (share * 50 / 0.0762 + (1 - share) / m.r("R-12.6"))
    assert left_between_planes(GIRTS, m.r("R-12.6")) == pytest.approx(expected, rel=1e-9)


def test_a_warning_where_every_line_passes_without_it():
    (found,) = crossed(lines=[m.line("S-W2", "pass")])
    assert found.severity == "W"
    (unused,) = crossed()
    assert unused.severity == "W"


@pytest.mark.parametrize(
    ("convention", "words"),
    [("counted", "it counts in full"), ("two_dimensional", "only by a test")],
)
def test_the_convention_is_said(convention, words):
    (found,) = crossed(lines=[m.line("S-W2")], crossed_insulation=convention)
    assert words in found.suggests


def test_wood_battens_and_main_studs_are_no_such_thing():
    assert not crossed(m.stud("R-12.6", "3 in", material=m.WOOD, crosses=True))
    assert not crossed(m.insulation(0.05))


def test_a_batt_thicker_than_its_cavity():
    batt = m.stud("R-19", "5.5 in", product="6.25 in", in_place="R-18")
    rest = ("R1", m.r("R-5.51"))
    tree = m.beside_each_other(
        (0.75, m.path("cavity", rest, ("R2_fill", m.r("R-18")))),
        (0.25, m.path("member", rest, ("R2_member", m.r("R-6.875")))),
    )
    wall = m.assembly("W4", layers=(m.board("R-4.66"), batt))
    answer = m.solved(1 / tree.value, "W4", tree=tree)
    (found,) = m.run("batt-compressed", m.facts((wall,), solutions=(answer,)))
    assert (found.severity, found.subject) == ("W", "W4")
    assert found.seen == "Studs: R-19 of 6.25 in in a cavity of 5.5 in"
    assert found.suggests == (
        "in place it counts R-18, not R-19; the assembly has 0.0521, with the full label it would "
        "have 0.0508"
    )


@pytest.mark.parametrize(
    "batt",
    [
        m.stud("R-21", "5.5 in", product="5.5 in"),
        m.stud("R-21", "5.5 in", product="140 mm"),
        m.stud("R-13", "5.5 in", product="3.5 in"),
        m.stud("R-13"),
    ],
)
def test_a_batt_that_fits(batt):
    assert not m.run("batt-compressed", m.facts((m.assembly("W4", layers=(batt,)),)))
