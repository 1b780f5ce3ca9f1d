"""What U hangs on: against theory, hand calculation and differences of two solutions."""

from __future__ import annotations

import math
from collections.abc import Callable

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck.formulas import compiled, evaluate, slopes
from envcheck.model.project import (
    Assembly,
    Bridge,
    Fill,
    FramedLayer,
    Material,
    MaterialLayer,
    Member,
    Profile,
    TaperedLayer,
)
from envcheck.model.ruleset import Conventions, TableRow
from envcheck.model.solved import Reasons, Solved
from envcheck.solve.assembly import solve
from envcheck.solve.bracket import narrow
from envcheck.solve.why import reasons
from tests.solve.samples import STEEL, WOOD, WOOL, XPS, assembly, framed, plane, setting, stated
from tests.solve.test_invariants import few

SENSE = {"conductivity": 1, "resistance": -1, "u_factor": 1, "linear_transmittance": 1}
"""U is homogeneous of the first degree in conductances, of degree -1 in resistances."""
TIMBER = assembly(
    plane("board", XPS, 0.04),
    framed("studs", 0.14, Member(WOOD, 0.038, 0.4), Fill(material=WOOL)),
    stated("lining", 0.08),
)
CROSSED = assembly(
    framed("studs", 0.14, Member(WOOD, 0.038, 0.4), Fill(material=WOOL)),
    framed("battens", 0.05, Member(WOOD, 0.05, 0.6), Fill(label=1.1))._replace(
        orientation="horizontal"
    ),
)
CHANNEL = Profile("c", 0.092, 0.041, 0.0011, 0.0)
STUDS = assembly(
    plane("outer", XPS, 0.038),
    framed("steel studs", 0.092, Member(STEEL, 0.041, 0.406, CHANNEL), Fill(material=WOOL)),
    plane("inner", WOOD, 0.0127),
)
FACTORS = Conventions(
    tables={"cavity_factors": (TableRow("cavity_factors", {}, 0.46, "0.46", "table"),)}
)
LABELLED = assembly(
    framed("steel studs", 0.092, Member(STEEL, 0.041, 0.406, CHANNEL), Fill(label=2.29))
)
SOLVED = [
    (TIMBER, "parallel_path", Conventions()),
    (TIMBER, "isothermal_planes", Conventions()),
    (TIMBER, "weighted", Conventions()),
    (CROSSED, "weighted", Conventions()),
    (CROSSED, "parallel_path", Conventions()),
    (STUDS, "zone", Conventions()),
    (STUDS, "isothermal_planes", Conventions()),
    (LABELLED, "cavity_factor", FACTORS),
]


def solved_by(of: Assembly, method: str, conventions: Conventions) -> Solved:
    return solve(of, setting(method=method), conventions)


def why(of: Assembly, method: str, conventions: Conventions) -> Reasons:
    found = reasons(solved_by(of, method, conventions))
    assert found is not None
    return found


# ------------------------------------------------------------------------ derivatives of formulas


@few
@given(st.floats(0.5, 3.0), st.floats(0.5, 3.0), st.floats(0.5, 3.0))
def test_slopes_are_those_of_calculus(a: float, b: float, c: float) -> None:
    # Derivatives written out by hand.
    expression = "ln({a} / {b}) ** 2 - sqrt({c}) * exp(-{b}) + max({a}, 5) + min({c}, {c} + 1)"
    value, found = slopes(expression)([{"a": a, "b": b, "c": c}[n] for n in names(expression)])
    by_name = dict.fromkeys("abc", 0.0)
    for place, slope in found.items():
        by_name[names(expression)[place]] += slope
    assert value == pytest.approx(evaluate(expression, {"a": a, "b": b, "c": c}), rel=1e-14)
    ratio = math.log(a / b)
    root = math.sqrt(c)
    assert by_name["a"] == pytest.approx(2 * ratio / a, abs=1e-12)
    assert by_name["b"] == pytest.approx(-2 * ratio / b + root * math.exp(-b), abs=1e-12)
    assert by_name["c"] == pytest.approx(-math.exp(-b) / (2 * root) + 1, abs=1e-12)


def names(expression: str) -> tuple[str, ...]:
    return compiled(expression).names


def test_slope_of_a_power_by_base_and_exponent() -> None:
    _, found = slopes("{x} ** {y}")([2.0, 3.0])
    assert found == pytest.approx({0: 12.0, 1: 8.0 * math.log(2.0)})


def test_what_is_no_formula_has_no_slope() -> None:
    with pytest.raises(ValueError, match="not allowed"):
        slopes("{a} if {a} else 1")


# ------------------------------------------------------------------------------------- one wall


def test_shares_of_a_wall_in_series_are_those_of_its_resistances() -> None:
    # R: 0.04 + 2 + 0.5 + 0.13 = 2.67 by hand.
    found = why(assembly(stated("a", 2.0), stated("b", 0.5)), "series", Conventions())
    shares = {weight.symbol: weight.share for weight in found.weights}
    by_hand = {"Ro": 0.04 / 2.67, "R1": 2 / 2.67, "R2": 0.5 / 2.67, "Ri": 0.13 / 2.67}
    assert shares == pytest.approx(by_hand)
    assert found.flows == ()


def test_heat_by_path_of_a_quarter_of_framing() -> None:
    # Paths of R 2 and R 1 beside each other, films 0: the quarter carries (.25/1) of
    # (.75/2 + .25/1) = 40 %.
    wool, wood = WOOL._replace(conductivity=0.05), WOOD._replace(conductivity=0.1)
    of = assembly(framed("studs", 0.1, Member(wood, 0.1, 0.4), Fill(material=wool)))
    bare = setting(method="parallel_path", inside_film=0.0)._replace(outside_film=0.0)
    found = reasons(solve(of, bare, Conventions()))
    assert found is not None
    framing = next(flow for flow in found.flows if flow.piece.startswith("members"))
    assert (framing.area, framing.heat) == pytest.approx((0.25, 0.4))


@pytest.mark.parametrize(("of", "method", "conventions"), SOLVED)
def test_shares_and_influences_sum_as_theory_says(
    of: Assembly, method: str, conventions: Conventions
) -> None:
    found = why(of, method, conventions)
    assert sum(weight.share for weight in found.weights) == pytest.approx(1.0, rel=1e-9)
    together = sum(SENSE.get(each.quantity, 0) * each.elasticity for each in found.influences)
    assert together == pytest.approx(1.0, rel=1e-9)
    for among in {flow.among for flow in found.flows}:
        assert sum(f.heat for f in found.flows if f.among == among) > 0.999


def thicker(of: Assembly, layer: int, factor: float) -> Assembly:
    old = of.layers[layer]
    assert isinstance(old, MaterialLayer)
    new = old._replace(thickness=old.thickness * factor)
    return of._replace(layers=(*of.layers[:layer], new, *of.layers[layer + 1 :]))


def conducting(of: Assembly, layer: int, part: str, factor: float) -> Assembly:
    old = of.layers[layer]
    if isinstance(old, MaterialLayer):
        new = old._replace(material=scaled(old.material, factor))
    else:
        assert isinstance(old, FramedLayer)
        if part == "member":
            member = old.member._replace(material=scaled(old.member.material, factor))
            new = old._replace(member=member)
        else:
            fill = old.fill._replace(material=scaled(old.fill.material, factor))
            new = old._replace(fill=fill)
    return of._replace(layers=(*of.layers[:layer], new, *of.layers[layer + 1 :]))


def scaled(material: Material, factor: float) -> Material:
    return material._replace(conductivity=material.conductivity * factor)


def measured(
    change: Callable[[float], Assembly], value_of: Callable[[Assembly], float], step: float = 1e-5
) -> float:
    """d ln U / d ln x by the difference of two solutions."""
    return (math.log(value_of(change(1 + step))) - math.log(value_of(change(1 - step)))) / (
        math.log1p(step) - math.log1p(-step)
    )


@pytest.mark.parametrize("method", ["parallel_path", "isothermal_planes", "weighted"])
def test_influences_are_those_of_two_solutions(method: str) -> None:
    found = why(TIMBER, method, Conventions())
    told = {(i.symbol, i.title, i.quantity): i.elasticity for i in found.influences}

    def value(of: Assembly) -> float:
        result = solved_by(of, method, Conventions()).value
        assert result is not None
        return result

    cases = {
        ("R1", "board", "conductivity"): lambda f: conducting(TIMBER, 0, "", f),
        ("R1", "", "length"): lambda f: thicker(TIMBER, 0, f),
        ("R2", "mineral wool", "conductivity"): lambda f: conducting(TIMBER, 1, "fill", f),
        ("R2", "members of studs", "conductivity"): lambda f: conducting(TIMBER, 1, "member", f),
    }
    for key, change in cases.items():
        assert told[key] == pytest.approx(measured(change, value), abs=1e-7), key


def test_corrections_have_their_part() -> None:
    # A line of 0.05 W/(m K) x 10 m on 20 m2 adds 0.025 to U = 1/(0.04 + 2 + 0.13).
    line = Bridge("line", "corner", 0.05, 10.0, False, "source", "table", 1)
    of = assembly(stated("a", 2.0))
    solved = solve(of, setting(), Conventions(), (line,), 20.0)
    found = reasons(solved)
    assert found is not None and solved.value == pytest.approx(1 / 2.17 + 0.025)
    share = 0.025 / solved.value
    influence = next(i for i in found.influences if i.quantity == "linear_transmittance")
    assert influence.elasticity == pytest.approx(share)
    assert sum(weight.share for weight in found.weights) == pytest.approx(1 - share)


def test_a_value_from_a_table_has_no_reasons_to_give() -> None:
    missing = solved_by(LABELLED, "cavity_factor", Conventions())
    assert missing.value is None
    assert reasons(missing) is None


# --------------------------------------------------------------------------------- drawn section


def drawn(of: Assembly, tolerance: float = 1e-4) -> Solved:
    wide = solved_by(of, "two_dimensional", Conventions())
    return narrow(of, wide.setting, Conventions(), wide, tolerance)


def test_influences_of_a_section_are_those_of_two_solutions() -> None:
    # Bounds 0.005 % apart, their middle some way closer; a step of 5 % each way.
    found = drawn(STUDS).drawn
    assert found is not None
    told = {(i.symbol, i.title, i.quantity): i.elasticity for i in found.influences}

    def value(of: Assembly) -> float:
        solved = drawn(of, 5e-5)
        assert solved.low and solved.high
        return (solved.low + solved.high) / 2

    cases = {
        ("R1", "outer", "conductivity"): lambda f: conducting(STUDS, 0, "", f),
        ("R1", "", "length"): lambda f: thicker(STUDS, 0, f),
        ("R2", "steel of steel studs", "conductivity"): lambda f: conducting(STUDS, 1, "member", f),
        ("R3", "", "length"): lambda f: thicker(STUDS, 2, f),
    }
    for key, change in cases.items():
        assert told[key] == pytest.approx(measured(change, value, 0.05), abs=2e-3), key


def test_energy_of_a_section_sums_to_the_whole() -> None:
    found = drawn(STUDS, 1e-3).drawn
    assert found is not None
    assert sum(weight.share for weight in found.weights) == pytest.approx(1.0, rel=1e-9)
    together = sum(SENSE.get(i.quantity, 0) * i.elasticity for i in found.influences)
    assert together == pytest.approx(1.0, rel=1e-9)
    assert sum(flow.heat for flow in found.flows) == pytest.approx(1.0, rel=1e-9)
    steel = next(flow for flow in found.flows if flow.piece.startswith("steel"))
    assert steel.area == pytest.approx(0.0011 / 0.406)
    assert steel.heat > 0.3  # a web of 1.1 mm carries more than a hundred times its area


def test_heat_of_a_section_of_layers_is_spread_evenly() -> None:
    same = WOOD._replace(conductivity=WOOL.conductivity * (1 + 1e-9))
    of = assembly(framed("studs", 0.1, Member(same, 0.1, 0.4), Fill(material=WOOL)))
    section = drawn(of._replace(layers=(*of.layers, plane("board", XPS, 0.02))), 1e-15)
    assert section.drawn is not None
    for flow in section.drawn.flows:
        assert flow.heat == pytest.approx(flow.area, rel=1e-6)


def test_faces_warm_up_from_outside_to_inside() -> None:
    found = drawn(STUDS, 1e-3).drawn
    assert found is not None
    assert [face.title for face in found.faces] == ["outside film", "outer", "steel studs", "inner"]
    for before, behind in zip(found.faces, found.faces[1:], strict=False):
        assert before.least <= before.greatest
        assert before.greatest < behind.greatest
    assert found.faces[0].least > 0 and found.faces[-1].greatest < 1


def test_a_taper_has_its_own_part_of_the_resistance() -> None:
    # U = ln(1 + R1/R0)/R1 with R0 = 0.17 + 0.1/0.025 and R1 = 0.1/0.025: by hand d ln U/d ln R0 =
    # -(R1/(R0 + R1))/ln(1 + R1/R0), and what is missing to -1 falls to R1.
    pir = XPS._replace(conductivity=0.025)
    of = assembly(TaperedLayer("tapered", "PIR", 1, pir, 0.1, 0.2, "rectangle"))
    found = why(of, "series", Conventions(tapered="integral"))
    rest, rise = 0.17 + 4.0, 4.0
    whole = rise / (rest + rise) / math.log1p(rise / rest)
    shares = {weight.symbol: weight.share for weight in found.weights}
    assert shares["R1"] == pytest.approx(whole * 4.0 / rest)
    assert shares["R_taper"] == pytest.approx(1.0 - whole)
    assert sum(shares.values()) == pytest.approx(1.0)


def test_the_drawn_section_is_told_with_equal_columns_as_one() -> None:
    told = drawn(STUDS, 1e-2).drawn.section
    assert sum(told.widths) == pytest.approx(0.406)
    assert len(told.widths) < 6  # bay, web, flange, bay
    assert [symbol for symbol, _, _ in told.rows] == ["R1", "R2", "R2", "R2", "R3"]
    assert sum(depth for _, depth, _ in told.rows) == pytest.approx(0.038 + 0.092 + 0.0127)
    assert told.rows[2][2] == pytest.approx((0.037, 50.0, 0.037, 0.037))
