"""Declared values. The slips are arithmetic: 1/(13 + 7.5) = 0.0488, 7.95 + 7.5 = 15.45."""

from __future__ import annotations

import pytest

from envcheck.judge.figures import disagreement, figure
from envcheck.judge.readings import explain
from tests.judge import crosscheck_models as m

BRICK_WALL = (m.insulation(0.0381), m.board("R-0.56"), m.stud(material=m.STEEL))
BRICK_PROPERTIES = m.properties(
    cavity_resistance=m.r("R-13"), continuous_resistance=m.r("R-7.5"), label_sum=m.r("R-20.5")
)


def findings(declared, value, *, quantity="u_factor", layers=BRICK_WALL, made=None, **more):
    wall = m.assembly("W1", declared, quantity, layers=layers)
    answer = m.solved(value, **more)
    given = m.facts(
        (wall,), (m.element(),), solutions=(answer,), made_of={"W1": made or m.properties()}
    )
    return m.run("declared-differs", given)


def test_labels_added_up():
    # 0.17 + 0.56 + 0.56 + 0.68 + 0.46 x 13 + 7.5 = 15.45 (cavity factor 0.46, from memory)
    (found,) = findings("0.049 Btu/(h*ft2*degF)", m.u(1 / 15.45), made=BRICK_PROPERTIES)
    assert (found.severity, found.subject, found.sheet) == ("E", "W1", "A-501/1")
    assert found.seen == "0.049 Btu/(h*ft2*degF) on the drawing, 0.0647 computed (+32 %)"
    assert found.suggests.startswith(
        "the labels of cavity and outer insulation were added (R-20.5)"
    )
    assert found.suggests.endswith("0.0488")


@pytest.mark.parametrize(
    ("declared", "value"),
    [
        ("0.049 Btu/(h*ft2*degF)", 0.0489),
        ("0.020 Btu/(h*ft2*degF)", 0.0196),  # 2 % off, and yet the same figure when rounded
        ("0.0286 Btu/(h*ft2*degF)", 0.02869),  # one unit of the last digit and 0.3 %
    ],
)
def test_a_rounded_or_near_value_agrees(declared, value):
    assert not findings(declared, m.u(value))


@pytest.mark.parametrize(("resistance", "agrees"), [(20.4, True), (19.6, True), (21.6, False)])
def test_a_resistance_is_compared_as_a_resistance(resistance, agrees):
    found = findings("R-20", m.u(1 / resistance), quantity="resistance")
    assert (not found) is agrees


@pytest.mark.parametrize(
    ("declared", "value"), [("0.050", 0.0532), ("0.30", 0.312), ("0.30", 0.285)]
)
def test_more_than_a_unit_or_a_percent_differs(declared, value):
    (found,) = findings(f"{declared} Btu/(h*ft2*degF)", m.u(value))
    assert found.suggests == "no way of counting the layers in the file gives the drawn value"


def test_a_value_beside_explains():
    beside = (m.Beside("mean_thickness", m.u(0.0286), ""), m.Beside("parallel_path", m.u(0.04), ""))
    (found,) = findings("0.0286 Btu/(h*ft2*degF)", m.u(0.0313), beside=beside)
    assert found.suggests == "the tapered layer was taken at its mean thickness: that gives 0.0286"


def test_full_label_of_a_compressed_batt_explains():
    # 25 % wood 6.875; cavity R-18 in place of R-19; the rest: 0.0521 against 0.0508
    rest = ("R1", m.r("R-5.51"))
    tree = m.beside_each_other(
        (0.75, m.path("cavity", rest, ("R2_fill", m.r("R-18")))),
        (0.25, m.path("member", rest, ("R2_member", m.r("R-6.875")))),
    )
    layers = (m.board("R-4.66"), m.stud("R-19", "5.5 in", product="6.25 in", in_place="R-18"))
    (found,) = findings(
        "0.051 Btu/(h*ft2*degF)", 1 / tree.value, layers=layers, tree=tree,
        made=m.properties(framing="wood"),
    )  # fmt: skip
    assert found.seen.endswith("0.0521 computed (+2.1 %)")
    assert (
        found.suggests == "compressed insulation was counted at its full label: that gives 0.0508"
    )


def test_crossed_insulation_counted_in_full_explains():
    # 7.95 without the girts' insulation, 7.95 + 12.6 = 20.55 with it: 0.0487
    tree = m.path("film to film", ("Ro", m.r("R-7.95")), ("R1", 0.0))
    layers = (m.stud("R-12.6", "3 in", material=m.STEEL, crosses=True),)
    (found,) = findings("0.049 Btu/(h*ft2*degF)", 1 / tree.value, layers=layers, tree=tree)
    assert found.suggests == (
        "outer insulation that metal crosses was counted in full: that gives 0.0487"
    )


def test_framing_left_out_explains_a_resistance():
    # 0.85 films + 0.56 + 13 = 14.41
    layers = (m.board("R-0.56"), m.stud())
    rows = (m.Counted(m.r("R-0.56")), m.Counted(None))
    wall = m.assembly("W1", "R-14.4", "resistance", layers=layers)
    answer = m.solved(m.u(0.09), counted=rows)
    found = disagreement(wall, [answer])
    assert found is not None and found.computed == "R-11.11"
    reading = explain(found, wall, m.properties())
    assert reading is not None and reading.words == "framing was left out: all layers in series"


def test_films_and_corrections_left_out():
    # 1/0.1 - 0.85 = 9.15 -> 0.1093; and a clear field of 0.08 with 0.02 of bridges
    (films,) = findings("0.109 Btu/(h*ft2*degF)", m.u(0.1))
    (clear,) = findings("0.080 Btu/(h*ft2*degF)", m.u(0.1), clear=m.u(0.08))
    assert films.suggests.startswith("surface films were left out")
    assert clear.suggests.startswith("fasteners and bridges were left out")


def test_bounds_agree_with_anything_between_them_and_name_both_ends_else():
    bounds = {"decided_by_bracket": True, "low": 0.2730, "high": 0.2735}
    assert not findings("0.27 W/(m2*K)", None, **bounds)
    (found,) = findings("0.21 W/(m2*K)", None, **bounds)
    assert "between 0.273 and 0.274 computed (+30 %)" in found.seen


def test_another_metric_or_no_value_is_not_compared():
    assert not findings("0.30 Btu/(h*ft2*degF)", 0.9, setting=m.setting("f_factor", "F_factor"))
    assert not findings("0.30 Btu/(h*ft2*degF)", None)


def test_a_solution_of_any_deciding_line_may_agree():
    wall = m.assembly("W1", "0.060 Btu/(h*ft2*degF)", layers=BRICK_WALL)
    line = m.line(solved=m.solved(m.u(0.0601)))
    given = m.facts((wall,), (m.element(),), lines=(line,), solutions=(m.solved(m.u(0.07)),))
    assert not m.run("declared-differs", given)


@pytest.mark.parametrize(
    ("text", "quantity", "shown"),
    [("R-20", "resistance", "R-15.4"), ("RSI 3.5", "resistance", "RSI 2.71"),
     ("0.2 W/(m2*K)", "u_factor", "0.37"), ("0.049 Btu/(h*ft2*degF)", "u_factor", "0.0649")],
)  # fmt: skip
def test_values_are_shown_in_the_unit_typed(text, quantity, shown):
    wall = m.assembly("W1", text, quantity)
    typed = figure(wall.declared)
    assert typed is not None
    value = m.r("R-15.4") if quantity == "resistance" else 1 / m.r("R-15.4")
    assert typed.show(value) == shown


def test_the_label_of_the_cavity_is_a_finding_of_its_own():
    for declared, quantity in (("R-13", "resistance"), ("0.077 Btu/(h*ft2*degF)", "u_factor")):
        wall = m.assembly("W1", declared, quantity, layers=(m.stud(),))
        answer = m.solved(m.u(1 / 7.95))
        given = m.facts((wall,), (m.element(),), solutions=(answer,))
        (found,) = m.run("label-as-wall", given)
        assert (found.severity, found.subject) == ("E", "W1")
        assert "label of the insulation in 'Studs'" in found.suggests
        assert not m.run("declared-differs", given)


def test_a_wall_that_really_has_the_resistance_of_its_label_is_fine():
    wall = m.assembly("W1", "R-13", "resistance", layers=(m.insulation(0.03), m.stud()))
    given = m.facts((wall,), (m.element(),), solutions=(m.solved(m.u(1 / 13.1)),))
    assert not m.run("label-as-wall", given)
    assert not m.run("declared-differs", given)
