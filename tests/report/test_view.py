"""The view: several rule sets, wording of verdicts, cautions."""

from __future__ import annotations

import pytest

from envcheck.model.judged import VERDICTS
from envcheck.model.project import RuleSetChoice
from envcheck.report import cautions, registry, said, view, wording
from tests.report.fixture import (
    JUDGED,
    LINES,
    PROJECT,
    RULESET,
    RULESETS,
    STEEL,
    changed,
    compared,
    line,
)


def test_every_verdict_has_its_words() -> None:
    assert set(wording.VERDICTS) == set(VERDICTS)
    assert len(set(wording.VERDICTS.values())) == len(VERDICTS)


def test_a_least_value_is_fallen_short_of() -> None:
    short = compared(8.0, 8.0, 10.0, sense="min", within=False, decimals=0, margin=-2.0)
    made = line("N-1", "wall.mass", "fail", metric="R_insulation", comparison=short)
    assert said.verdict_text(made) == "short of its limit"
    assert said.limit_text(made) == ">= 10"


def test_a_member_of_a_mean_shows_the_means_verdict_and_its_own() -> None:
    own = compared(0.4980, 0.498, 0.022)
    mean = compared(0.0233, 0.023, 0.024)
    made = line("HATCH", "roof.attic", "pass", comparison=mean, own=own, group="attic")
    row = view.build(PROJECT, RULESETS, changed(JUDGED, lines=(made,))).rows[0]
    assert row.verdict_text == "within its limit (mean attic)"
    assert row.value.text == "0.4980"
    assert row.compared.text == "0.023"
    assert "alone it would be over: 0.498 against 0.022" in row.notes


def test_a_draft_decides_nothing_and_has_a_table_of_its_own() -> None:
    draft = changed(RULESET, id="anywhere-2027", title="Draft")
    lines = (*(changed(each, ruleset="anywhere-2027", decides=False) for each in LINES), *LINES)
    project = changed(
        PROJECT, rule_sets=(*PROJECT.rule_sets, RuleSetChoice("anywhere-2027", False, 9))
    )
    made = view.build(project, {**RULESETS, "anywhere-2027": draft}, changed(JUDGED, lines=lines))
    assert made.summary.startswith("8 lines: 1 over their limit, 5 open; 1 finding to be settled.")
    assert [row.rule_set for row in made.rows] == ["anywhere-2025"] * 8 + ["anywhere-2027"] * 8
    assert [each.decides for each in made.rule_sets] == [True, False]
    page = registry.format_named("text").render(made)
    assert "information only, decides nothing" in page
    assert page.index("Lines held against anywhere-2025") < page.index("against anywhere-2027")


def test_an_unanswered_stop_is_open_and_an_answered_one_is_not() -> None:
    answered = tuple(changed(each, answered="mended on A-501") for each in JUDGED.findings)
    made = view.build(PROJECT, RULESETS, changed(JUDGED, findings=answered))
    assert "to be settled" not in made.summary
    assert not [item for item in made.open_items if "finding" in item.what]


def test_open_items_of_a_clean_project_read_none() -> None:
    clean = changed(JUDGED, lines=LINES[:1], findings=())
    page = registry.format_named("text").render(view.build(PROJECT, RULESETS, clean))
    assert "Open items\n----------\n  - none\n" in page
    assert "Why over the limit\n------------------\n  - none\n" in page


def test_cautions_that_always_stand_and_those_that_are_triggered() -> None:
    bare = changed(JUDGED, lines=())
    new = changed(PROJECT, scope="new")
    always = [each.topic for each in cautions.gather(new, RULESETS, bare)]
    assert always == ["workmanship", "steady_state", "limits"]
    triggered = {each.topic: each for each in cautions.gather(PROJECT, RULESETS, JUDGED)}
    assert set(triggered) == {*always, "moisture", "fire", "electrical", "hazardous"}
    assert triggered["fire"].reasons == ("W2: combustible siding", "W1: combustible XPS")


def test_a_topic_without_words_of_its_own_is_still_printed() -> None:
    odd = changed(STEEL.cautions[0], topic="snow_load", reason="W1: roof")
    steel = changed(STEEL, cautions=(odd,))
    judged = changed(JUDGED, lines=(changed(LINES[1], solved=steel),))
    found = {each.topic: each for each in cautions.gather(PROJECT, RULESETS, judged)}
    assert found["snow_load"].heading == "Snow load"


@pytest.mark.parametrize(("units", "expected"), [("", "IP"), ("SI", "SI"), ("IP", "IP")])
def test_units_are_those_asked_for_or_the_rule_sets(units: str, expected: str) -> None:
    made = view.build(PROJECT, RULESETS, JUDGED, view.ViewOptions(units=units))
    assert made.units == expected
    preferred = changed(PROJECT, units="SI")
    assert view.build(preferred, RULESETS, JUDGED).units == "SI"


def test_the_mean_and_the_ratio_can_be_repeated() -> None:
    building = view.build(PROJECT, RULESETS, JUDGED).building
    # (3185 x 0.0211 + 15 x 0.498) / 3200 = 74.6735 / 3200 = 0.02334
    assert building.means[0].sum.endswith("/ 3200 = 0.0233 Btu/(h ft2 F)")
    assert building.ratios[0].sum == "2704 / 10720 ft2 = 25.22 %"
    assert building.closings[0].state == "81 ft2 (2.3 %) not accounted for"
