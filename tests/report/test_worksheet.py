"""Worksheets against a pocket calculator, for which Python's own evaluation stands."""

from __future__ import annotations

import math
import re
from decimal import ROUND_HALF_UP, Decimal
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from envcheck import formulas
from envcheck.model.solved import Operand, Step
from envcheck.report import explain, hand_check, numbers, parts, worksheet
from envcheck.report.view import ViewOptions
from envcheck.units import to_si
from tests.report.fixture import STEEL, WOOD

PROJECTS = Path(__file__).parents[2] / "projects"
CALCULATOR = {"ln": math.log, "exp": math.exp, "sqrt": math.sqrt, "min": min, "max": max}


def six(value: float) -> str:
    """Six significant digits without an exponent, trailing zeros cut."""
    text = f"{value:.6g}"
    if "e" in text:
        text = f"{value:.{5 - math.floor(math.log10(abs(value)))}f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def calculated(written: str) -> str:
    return six(eval(written, {"__builtins__": {}}, CALCULATOR))  # a test's calculator


def assert_repeatable(lines: tuple[worksheet.Line, ...]) -> None:
    for line in lines:
        if line.sum:
            assert calculated(line.sum) == line.result, line.text


@pytest.mark.parametrize("system", ["SI", "IP"])
@pytest.mark.parametrize("solved", [STEEL, WOOD])
def test_every_step_of_the_fixture_can_be_repeated(solved: object, system: str) -> None:
    lines = worksheet.write(solved.steps, system)
    assert_repeatable(lines)
    value = numbers.in_system(solved.value, "u_factor", system)
    assert float(lines[-1].result) == pytest.approx(value, rel=1e-5)


@pytest.mark.parametrize("system", ["SI", "IP"])
@pytest.mark.parametrize("file", sorted(PROJECTS.glob("*/*.yaml")), ids=lambda path: path.stem)
def test_every_step_of_the_example_projects_can_be_repeated(file: Path, system: str) -> None:
    from envcheck import pipeline

    run = pipeline.run(str(file))
    solved = {id(x.solved): x.solved for x in run.judged.lines if x.solved and x.solved.steps}
    assert solved
    for each in solved.values():
        lines = worksheet.write(each.steps, system)
        assert_repeatable(lines)
        if each.value is not None and each.steps[-1].value == each.value:
            quantity = each.steps[-1].quantity
            expected = numbers.in_system(each.value, quantity, system)
            assert float(lines[-1].result) == pytest.approx(expected, rel=2e-5)


def sums_of(page: parts.Page) -> list[str]:
    """Every line of arithmetic of a page."""
    blocks = [block for section in page.sections for block in section.blocks]
    items = [block for block in blocks if isinstance(block, parts.Items)]
    return [line for block in items for entry in block.entries for line in entry.sums]


def assert_comparison(line: str) -> None:
    """A line of the comparison: rounding, order, difference."""
    if found := re.search(r"(\S+) rounded half-up to (\d+) decimals?: (\S+)", line):
        value, places, result = found.groups()
        quantum = Decimal(1).scaleb(-int(places))
        assert str(Decimal(value).quantize(quantum, ROUND_HALF_UP)) == result, line
    elif found := re.search(r"(\S+) (<=|>=) (\S+) .*(holds|does not hold)", line):
        first, sign, second, state = found.groups()
        within = float(first) <= float(second) if sign == "<=" else float(first) >= float(second)
        assert within == (state == "holds"), line
    elif found := re.search(r"unrounded: (\S+) - (\S+) = (\S+)", line):
        first, second, result = found.groups()
        assert six(float(Decimal(first) - Decimal(second))) == result, line
    else:
        assert "compared unrounded" in line or "with all digits carried" in line, line


@pytest.mark.parametrize("system", ["SI", "IP"])
@pytest.mark.parametrize("file", sorted(PROJECTS.glob("*/*.yaml")), ids=lambda path: path.stem)
def test_every_number_that_explain_prints_can_be_repeated(file: Path, system: str) -> None:
    """Each subject's page as printed: sums from printed operands to the last printed digit."""
    from envcheck import pipeline

    run = pipeline.run(str(file))
    counted = 0
    for subject in explain.subjects(run.project):
        options = ViewOptions(units=system)
        page = explain.build(run.project, run.rulesets, run.judged, subject, options).page
        for line in sums_of(page):
            if found := re.fullmatch(r"\w+ = (.+) = (-?[\d.]+)( \S.*)?", line):
                assert calculated(found[1]) == found[2], f"{subject}: {line}"
                counted += 1
            elif not re.fullmatch(r"\w+ = -?[\d.]+( .*)?", line):
                assert_comparison(line)
                counted += 1
    assert counted > 10


def test_a_result_of_an_earlier_step_is_named_by_that_step() -> None:
    """Of several wirings the total names the step that it rests on, and prints its result."""
    from envcheck import pipeline

    run = pipeline.run(str(PROJECTS / "brannvik-warehouse" / "renovation.yaml"))
    totals = 0
    for line in run.judged.lines:
        steps = line.solved.steps if line.solved else ()
        written = {each.symbol: each for each in worksheet.write(steps, "SI")}
        total = written.get("U_total")
        if total is not None:
            totals += 1
            first = total.formula.split(" + ")[0]
            assert total.sum.split(" + ")[0] == written[first].result
    assert totals


def test_ip_steps_use_inches_and_btu_inches() -> None:
    foam = worksheet.write(STEEL.steps, "IP")[1]
    assert foam.text == "R1 = 1.5 / 0.2 = 7.5 h ft2 F/Btu"
    assert foam.operands == ("L = 1.5 in", "k = 0.2 Btu in/(h ft2 F)")


def test_an_earlier_result_stands_as_it_was_printed() -> None:
    lines = worksheet.write(STEEL.steps, "SI")
    total = next(line for line in lines if line.symbol == "R")
    assert lines[-1].sum == f"1 / {total.result}"


def test_a_formula_with_si_constants_stays_in_si_between_two_conversions() -> None:
    """ISO 6946:2017, 6.9: an air space's h_a = 0.025/d holds with d in m and h in W/(m2 K)."""
    d = Operand("d", 0.0127, "length")
    h = 0.025 / 0.0127 + 3.0
    steps = (
        Step("R1", "board", "", (), to_si(1.0, "h*ft2*degF/Btu"), "resistance", "label"),
        Step("R2", "space", "1 / (0.025 / {d} + 3)", (d,), 1 / h, "resistance", si_only=True),
        Step(
            "R3", "more", "{R1} + 0.1",
            (Operand("R1", to_si(1.0, "h*ft2*degF/Btu"), "resistance"),),
            to_si(1.0, "h*ft2*degF/Btu") + 0.1, "resistance",
        ),
    )  # fmt: skip
    lines = worksheet.write(steps, "IP")
    assert_repeatable(lines)
    assert [line.symbol for line in lines] == ["R1", "R2", "R2", "R1", "R3", "R3"]
    assert lines[1].operands == ("d = 0.0127 m",)
    assert lines[2].text.endswith("= 0.201268 * 5.67826334 = 1.14285 h ft2 F/Btu")
    assert lines[3].text == "R1 = 1 / 5.67826334 = 0.17611 m2 K/W"


def test_the_hand_check_takes_the_fewest_digits_that_give_the_value() -> None:
    line = hand_check.shortest(STEEL.hand_check, "IP", 4, "0.0647")
    assert line == "U = 1 / (0.17 + 7.5 + 0.56 + 5.98 + 0.56 + 0.68) = 0.0647"
    si = hand_check.shortest(STEEL.hand_check, "SI", 3, "0.368")
    written = re.fullmatch(r"U = (.*) = 0\.368", si)
    assert written
    assert f"{eval(written[1]):.3f}" == "0.368"
    assert hand_check.shortest((), "SI", 3, "1.000") == ""


def test_negative_operands_get_parentheses() -> None:
    step = Step("x", "", "{a} - {b}", (Operand("a", 1.0, "number"), Operand("b", -2.0, "number")),
                3.0, "number")  # fmt: skip
    assert worksheet.write((step,), "SI")[0].text == "x = 1 - (-2) = 3"


@pytest.mark.parametrize(
    "formula",
    [
        "__import__('os')",
        "{a}.real",
        "[1]",
        "{a} if 1 else 2",
        "f(1)",
        "'x'",
        "1 +",
        "True",
        "{a}[0]",
    ],
)
def test_what_is_no_formula_is_refused(formula: str) -> None:
    with pytest.raises(ValueError, match="formula"):
        formulas.compiled(formula)


positive = st.floats(0.01, 1000.0)


@given(positive, positive, positive)
def test_the_evaluator_agrees_with_python(a: float, b: float, c: float) -> None:
    formula = "ln(1 + {a}) * sqrt({b}) - max({a}, {c}) / (-{b} + 2 * {b}) ** 2 + {c} + exp(-{a})"
    truth = math.log(1 + a) * math.sqrt(b) - max(a, c) / b**2 + c + math.exp(-a)
    assert formulas.evaluate(formula, {"a": a, "b": b, "c": c}) == pytest.approx(truth)
