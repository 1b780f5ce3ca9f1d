"""What must hold of every sum, whatever the building: order, splitting, scale, and what is open."""

from __future__ import annotations

from itertools import pairwise
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from envcheck.judge.groups import take_groups
from envcheck.model.judged import Group, Line
from envcheck.model.project import Project, RuleSetChoice
from envcheck.model.ruleset import RuleSet
from envcheck.pipeline import names, run
from envcheck.read.rulesets import read_ruleset
from tests.changed import changed

CASES = Path(__file__).parent.parent / "cases" / "building"
RULES = [CASES / "rules"]
ELECTED = RuleSetChoice("harbour-2025", True, 1, "trade_off")
AREAS = st.lists(st.floats(0.5, 5000.0), min_size=3, max_size=3)


def ruleset(name: str = "harbour-2025") -> RuleSet:
    return read_ruleset(name, RULES, None, names())


RULESET = ruleset()
DONE = run(str(CASES / "not-elected.yaml"), [str(RULES[0])])
LINES = [line for line in DONE.judged.lines if line.metric.startswith("U_")]


def sized(project: Project, areas: dict[str, float]) -> Project:
    elements = {
        tag: element._replace(net_area=areas.get(tag, element.net_area))
        for tag, element in project.elements.items()
    }
    return changed(project, elements=elements)


def total(lines: list[Line], project: Project, choice: RuleSetChoice = ELECTED) -> Group:
    _, (group,) = take_groups(lines, project, RULESET, choice, ())
    return group


def of(areas: list[float]) -> Project:
    return sized(DONE.project, dict(zip((line.element for line in LINES), areas, strict=True)))


@given(AREAS, st.permutations(range(3)))
def test_the_order_of_elements_changes_nothing(areas: list[float], order: list[int]) -> None:
    project = of(areas)
    one, other = total(LINES, project), total([LINES[i] for i in order], project)
    assert (one.drawn, one.table, one.state) == (other.drawn, other.table, other.state)


@given(AREAS, st.integers(0, 2))
def test_an_element_in_two_halves_changes_no_sum(areas: list[float], which: int) -> None:
    project, line = of(areas), LINES[which]
    whole = project.elements[line.element]
    half = whole._replace(net_area=areas[which] / 2)
    twin = line._replace(element="twin")
    elements = {**project.elements, line.element: half, "twin": half._replace(tag="twin")}
    one, two = total(LINES, project), total([*LINES, twin], changed(project, elements=elements))
    assert (one.drawn, one.table, one.state) == (two.drawn, two.table, two.state)


@given(AREAS, st.floats(0.01, 100.0))
def test_scaling_all_areas_scales_the_sums(areas: list[float], factor: float) -> None:
    one, other = total(LINES, of(areas)), total(LINES, of([a * factor for a in areas]))
    assert other.drawn == pytest.approx(one.drawn * factor, rel=1e-12)
    assert other.table == pytest.approx(one.table * factor, rel=1e-12)


@given(AREAS, st.integers(0, 2), st.sampled_from(["not_decided", "official_decides", "too_close"]))
def test_a_trade_off_never_passes_while_a_row_is_undecided(
    areas: list[float], which: int, verdict: str
) -> None:
    lines = [line._replace(verdict=verdict) if i == which else line for i, line in enumerate(LINES)]
    made, (group,) = take_groups(lines, of(areas), RULESET, ELECTED, ())
    assert group.state == "not_decided" and group.waits
    assert all(line.verdict not in ("pass", "fail") for line in made)


@given(AREAS)
def test_elected_or_not_the_sum_is_one(areas: list[float]) -> None:
    project = of(areas)
    elected = total(LINES, project)
    beside = total(LINES, project, ELECTED._replace(path="prescriptive"))
    assert elected == beside._replace(elected=True)
    made, _ = take_groups(LINES, project, RULESET, ELECTED._replace(path="prescriptive"), ())
    assert made == LINES


@settings(max_examples=25)
@given(st.integers(1, 60))
def test_at_the_limit_everywhere_the_sums_are_equal_and_within(count: int) -> None:
    first = LINES[0]
    assert first.solved is not None
    solved = changed(first.solved, value=0.30)
    lines, elements = [], dict(DONE.project.elements)
    for i in range(count):
        tag = f"W{i}"
        lines.append(first._replace(element=tag, solved=solved, verdict="pass"))
        elements[tag] = elements[first.element]._replace(tag=tag, net_area=0.1 + i / 7)
    group = total(lines, changed(DONE.project, elements=elements))
    assert group.state == "pass"


def test_a_line_carried_by_its_r_value_path_closes_the_sum() -> None:
    first = LINES[0]
    assert first.solved is not None
    unsolved = changed(first.solved, value=None)
    lines = [first._replace(solved=unsolved, comparison=None, verdict="pass"), *LINES[1:]]
    group = total(lines, DONE.project)
    assert (group.state, group.waits) == ("not_decided", (f"the value of {first.element}",))


def test_a_total_resistance_enters_by_one_over_it() -> None:
    first = LINES[0]
    limit, solved = first.limit, first.solved
    assert limit is not None and solved is not None
    # 1 / 0.36 = 2.78 m2 K/W drawn, 4.00 by the table: 100 m2 / 4.00 = 25 W/K in place of 30 W/K
    term = limit.alternatives[0][0]._replace(number=4.0, text="4.00")
    asked = limit._replace(
        metric="R_total", sense="min", unit="m2 K/W", cell="4.00", alternatives=((term,),)
    )
    lines = [first._replace(metric="R_total", limit=asked), *LINES[1:]]
    offered = RULESET.tradeoff
    assert offered is not None
    rules = RULESET._replace(tradeoff=offered._replace(terms=("U_A", "A_over_R")))
    _, (group,) = take_groups(lines, DONE.project, rules, ELECTED, ())
    assert (group.drawn, group.table) == (pytest.approx(78.0), pytest.approx(81.0 - 5.0))
    only_u = RULESET._replace(tradeoff=offered._replace(terms=("U_A",)))
    _, (without,) = take_groups(lines, DONE.project, only_u, ELECTED, ())
    assert without.left_out == (("S-MW", "R total is no term of the sum"),)


def test_a_mean_of_total_resistances_is_one_over_that_of_u_factors() -> None:
    from envcheck.judge.means import means
    from envcheck.model.ruleset import Averaging

    first = LINES[0]
    limit, solved = first.limit, first.solved
    assert limit is not None and solved is not None
    # half R 20, half R 10 (U 0.05 and 0.10): the mean is 1 / 0.075 = 13.3, never 15
    term = limit.alternatives[0][0]._replace(number=14.0, text="14.0")
    asked = limit._replace(
        metric="R_total", sense="min", unit="m2 K/W", cell="14.0", alternatives=((term,),)
    )
    lines = [
        first._replace(element=tag, metric="R_total", limit=asked, verdict="pass",
                       solved=changed(solved, value=value))
        for tag, value in (("S-MW", 0.05), ("S-WI", 0.10))
    ]  # fmt: skip
    elements = {
        tag: element._replace(net_area=50.0, mean_with="half")
        for tag, element in DONE.project.elements.items()
    }
    rules = RULESET._replace(averaging=(Averaging("H6", ("wall.*",), "R_total"),))
    (taken,) = means(lines, changed(DONE.project, elements=elements), rules, ELECTED, ())
    assert taken.comparison is not None
    assert taken.comparison.value == pytest.approx(13.333, abs=1e-3)
    assert taken.group.state == "fail"


def test_a_bracket_that_decides_enters_by_its_high_end() -> None:
    first = LINES[0]
    assert first.solved is not None
    between = changed(first.solved, value=0.31, low=0.30, high=0.32, decided_by_bracket=True)
    group = total([first._replace(solved=between), *LINES[1:]], DONE.project)
    assert group.parts[0].value == 0.32


def test_a_cap_at_any_point_stands_beside_the_sum() -> None:
    first = LINES[0]
    assert first.limit is not None
    point = first._replace(limit=first.limit._replace(applies_to="any_point"), verdict="fail")
    made, (group,) = take_groups([point, *LINES], DONE.project, RULESET, ELECTED, ())
    assert group == total(LINES, DONE.project)
    assert made[0] == point


def test_a_class_that_nobody_states_closes_every_sum() -> None:
    facts = changed(DONE.project, facts=())
    group = total(LINES, sized(facts, {}))
    assert "the space category of S-WI" in group.waits


def test_parts_are_listed_with_the_worst_first_in_the_report() -> None:
    from envcheck.report import groups

    (view,) = groups.build(DONE.judged.groups, DONE.project, "SI")
    shown = [float(part.difference.text) for part in view.parts]
    assert all(first >= second for first, second in pairwise(shown))
    assert [part.assembly for part in view.parts] == ["MW", "RF", "WI"]
