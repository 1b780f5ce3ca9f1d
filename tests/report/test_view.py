"""The view: several rule sets, wording of verdicts, cautions."""

from __future__ import annotations

import pytest

from envcheck.model.judged import VERDICTS, PathResult
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
    limit,
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
    made = line(
        "HATCH", "roof.attic", "pass", comparison=mean, own=own, group="attic", group_kind="mean"
    )
    row = view.build(PROJECT, RULESETS, changed(JUDGED, lines=(made,))).rows[0]
    assert row.verdict_text == "within (mean attic)"
    assert row.value.text == "0.4980"
    assert row.compared.text == "0.498"
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
    differing = page.split("Verdicts that differ between the rule sets\n")[1]
    assert differing.splitlines()[1] == "none"


def test_verdicts_that_differ_between_rule_sets_have_a_table_and_decide_first() -> None:
    draft = changed(RULESET, id="anywhere-2027", title="Draft")
    other = {"N-2": "fail"}
    lines = (
        *(
            changed(each, ruleset="anywhere-2027", decides=False,
                    verdict=other.get(each.element, each.verdict))
            for each in LINES
        ),
        *LINES,
    )  # fmt: skip
    project = changed(
        PROJECT, rule_sets=(*PROJECT.rule_sets, RuleSetChoice("anywhere-2027", False, 9))
    )
    made = view.build(project, {"anywhere-2027": draft, **RULESETS}, changed(JUDGED, lines=lines))
    assert [each.id for each in made.rule_sets] == ["anywhere-2025", "anywhere-2027"]
    page = registry.format_named("text").render(made)
    differing = page.split("Verdicts that differ between the rule sets")[1].split("\n\n")[0]
    assert [row.split()[0] for row in differing.splitlines()[4:]] == ["N-2"]
    assert "within, by rounding  over its limit" in differing
    assert "Over or open under anywhere-2027, which decides nothing" in page
    assert len([item for item in made.open_items if item.subject == "N-3"]) == 1


def test_an_unanswered_stop_is_open_and_an_answered_one_is_not() -> None:
    answered = tuple(changed(each, answered="mended on A-501") for each in JUDGED.findings)
    made = view.build(PROJECT, RULESETS, changed(JUDGED, findings=answered))
    assert "to be settled" not in made.summary
    assert not [item for item in made.open_items if "finding" in item.what]
    unanswered = view.build(PROJECT, RULESETS, JUDGED)
    (item,) = [item for item in unanswered.open_items if "finding" in item.what]
    assert (item.subject, item.sheet, item.lines) == ("W1", "A-501", ())


def test_open_items_of_a_clean_project_read_none() -> None:
    clean = changed(JUDGED, lines=LINES[:1], findings=())
    page = registry.format_named("text").render(view.build(PROJECT, RULESETS, clean))
    assert "Open items\n----------\n  - none\n" in page
    assert "Why over the limit" not in page
    assert "Findings" not in page


@pytest.mark.parametrize(
    ("value", "bound", "more", "words"),
    [
        (0.0514, 0.052, {}, "within"),
        (0.0520, 0.052, {}, "within, at its limit"),
        (0.0517, 0.052, {"compared": 0.052}, "within, rounded to its limit"),
        (0.0521, 0.052, {"compared": 0.052, "by_rounding": True, "within": True},
         "within, by rounding"),
    ],
)  # fmt: skip
def test_a_narrow_pass_says_so_in_its_verdict(
    value: float, bound: float, more: dict[str, object], words: str
) -> None:
    made = changed(LINES[0], comparison=compared(value, value, bound, **more))
    assert said.verdict_text(made) == words


def test_a_pass_by_labels_alone_says_so() -> None:
    paths = (
        PathResult("assembly", "fail", "0.065", "0.060", ""),
        PathResult("insulation", "pass", "R-13 + 9ci", "13+9ci", "meets 13 + 9ci"),
    )
    over = compared(0.0647, 0.065, 0.060)
    made = changed(LINES[0], comparison=over, paths=paths, flags=())
    assert said.verdict_text(made) == "within, R-value path"
    unknown = changed(made, comparison=None)
    assert said.verdict_text(unknown) == "within, R-value path"


def test_the_table_shows_one_number_and_the_lines_the_printed_cell() -> None:
    single = limit("slab.edge", "Slab edge", "0.54", "F_factor")
    printed = changed(single, cell="F-0.54 / F-0.58")
    made = line("G-1", "slab.edge", "pass", metric="F_factor", limit=printed,
                comparison=compared(0.54, 0.54, 0.54, decimals=2))  # fmt: skip
    text = registry.format_named("text").render(
        view.build(PROJECT, RULESETS, changed(JUDGED, lines=(made,)))
    )
    table, by_line = text.split("Line by line")
    assert "F 0.5400  <= 0.54 " in table
    assert "F-0.58" not in table
    assert "F <= F-0.54 / F-0.58; Table 1" in by_line


def test_lines_that_read_the_same_are_said_once_with_their_areas() -> None:
    one = next(each for each in LINES if each.element == "N-1")
    elements = {**PROJECT.elements}
    for tag in ("S-1", "W-1"):
        elements[tag] = changed(elements["N-1"], tag=tag, sheet=f"A-2{tag}")
    project = changed(PROJECT, elements=elements)
    lines = (one, *(changed(one, element=tag) for tag in ("S-1", "W-1")))
    text = registry.format_named("text").render(
        view.build(project, RULESETS, changed(JUDGED, lines=lines))
    )
    assert "N-1, S-1, W-1 (1818 + 1818 + 1818 = 5454 ft2): U <= 0.060;" in text
    assert text.count("= 0.0647\n") == 1
    assert "N-1 (A-201), S-1 (A-2S-1), W-1 (A-2W-1): over its limit by 0.0047" in text


def test_what_decides_stands_before_how_it_was_judged() -> None:
    text = registry.format_named("text").render(view.build(PROJECT, RULESETS, JUDGED))
    order = [
        "8 lines: 1 over", "\nLines\n", "\nWhy over the limit\n", "\nOpen items\n",
        "\nFindings to be settled\n", "\nThe building\n", "\nHow it was judged\n",
        "\nBy rule set", "\nLine by line\n", "\nAssumed\n", "\nCautions\n",
        "\nNot judged on this page\n", "This report compares computed", "sha256 hall.yaml",
    ]  # fmt: skip
    places = [text.index(words) for words in order]
    assert places == sorted(places)
    assert text.splitlines()[3] == "Anywhere; Anywhere Ordinance; zone Z2; invented example"


@pytest.mark.parametrize("name", ["text", "markdown"])
def test_no_code_words_on_the_page(name: str) -> None:
    judged = changed(JUDGED, lines=LINES[:-1])  # the last one's reason is the fixture's own
    page = registry.format_named(name).render(view.build(PROJECT, RULESETS, judged))
    assert "_" not in page
    for category in ("wall.", "roof.", "fenestration.", "slab."):
        assert category not in page


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
    assert building.groups[0].sum.endswith("/ 3200 = 0.0233 Btu/(h ft2 F)")
    assert building.ratios[0].sum == "2704 / 10720 ft2 = 25.22 %"
    assert building.closings[0].state == "81 ft2 (2.3 %) not accounted for"
