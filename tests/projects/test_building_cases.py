"""Whole projects judged for the building: sums by hand, and what every line carries.

The projects and the arithmetic stand in ``tests/cases/building``. That heat flows of parallel
areas add, so that a trade-off is a sum of U A, C A and F P, is the rule of component performance
in model energy codes (from memory); the figures are invented.
"""

from __future__ import annotations

import csv
import io
from functools import cache
from pathlib import Path
from typing import Any

import pytest
import yaml

from envcheck.pipeline import Run, run

CASES = Path(__file__).parent.parent / "cases" / "building"
INDEX: dict[str, dict[str, Any]] = yaml.safe_load((CASES / "index.yaml").read_text("utf-8"))


@cache
def case(name: str) -> Run:
    return run(str(CASES / f"{name}.yaml"), [str(CASES / "rules")])


def test_every_project_is_in_the_index() -> None:
    assert {path.stem for path in CASES.glob("*.yaml")} == {*INDEX, "index"}


@pytest.mark.parametrize("name", INDEX)
def test_sums_are_those_by_hand(name: str) -> None:
    groups = case(name).judged.groups
    sums = {g.name: [g.state, g.drawn, g.table] for g in groups if g.kind == "trade_off"}
    expected = INDEX[name].get("sums", {})
    assert sums.keys() == expected.keys()
    for key, (state, drawn, table) in expected.items():
        assert sums[key] == [state, pytest.approx(drawn), pytest.approx(table)]
    means = {g.name: [g.state, g.value] for g in groups if g.kind == "mean"}
    for key, (state, value) in INDEX[name].get("means", {}).items():
        assert means[key] == [state, pytest.approx(value)]
    assert [why for g in groups for why in g.waits] == INDEX[name].get("waits", [])


@pytest.mark.parametrize("name", INDEX)
def test_lines_carry_what_follows(name: str) -> None:
    done = case(name)
    lines = {
        x.element + ("*" if x.limit is not None and x.limit.applies_to == "any_point" else ""): (
            x.verdict
        )
        for x in done.judged.lines
        if x.metric not in ("SHGC", "VT")
    }
    assert lines == INDEX[name]["lines"]
    assert done.exit_status == INDEX[name]["status"]


def reasons(name: str) -> dict[str, str]:
    return {line.element: " ".join(line.reasons) for line in case(name).judged.lines}


def test_alterations_say_what_they_lack_or_why_they_keep_their_value() -> None:
    trigger, threshold = reasons("trigger"), reasons("threshold")
    assert trigger["B"] == "25 % renewed, not more than 25 % (K3): reported only"
    assert trigger["C"].startswith("missing: the share of C that is renewed (K3), on A-2")
    assert threshold["B"].startswith("0.70 before the work, not worse than the threshold 0.70")
    assert threshold["D"].startswith("missing: the value of D before the work")


def test_the_old_value_stands_beside_the_new_one() -> None:
    from envcheck.report import rows

    done = case("trigger")
    made = rows.build(done.judged.lines, done.project, "SI")
    notes = {row.tag: row.notes for row in made}
    assert notes["A"] == ("before the work: U 1.43 W/(m2*K) (A-1)",)
    assert notes["C"] == ()


def test_a_weight_in_words_alone_is_for_the_official(tmp_path: Path) -> None:
    own = tmp_path / "rules" / "harbour-weights-2025"
    own.mkdir(parents=True)
    for file in (CASES / "rules" / "harbour-weights-2025").iterdir():
        text = file.read_text("utf-8").replace(", when: {adjoins: unheated}}]", "}]")
        (own / file.name).write_text(text, "utf-8")
    (tmp_path / "p.yaml").write_text((CASES / "weights.yaml").read_text("utf-8"), "utf-8")
    done = run(str(tmp_path / "p.yaml"), [str(tmp_path / "rules")])
    (mean,) = done.judged.groups
    assert mean.state == "not_decided"
    assert mean.waits == ("the official's word on the weight 0.5 of floors to unheated rooms",)


def test_an_exception_is_shown_with_and_without() -> None:
    lines = {line.element: line for line in case("exceptions").judged.lines}
    assert "evidence listing.txt" in lines["A"].reasons[0]
    assert "no evidence file" in lines["B"].reasons[0]
    assert lines["A"].with_exception.endswith("without it: over its limit")
    assert lines["B"].with_exception.endswith("without it: within its limit")


def test_a_member_keeps_its_own_comparison_beside() -> None:
    line = next(x for x in case("elected").judged.lines if x.element == "S-MW")
    assert (line.verdict, line.group_kind, line.group) == ("pass", "trade_off", "heated")
    assert line.own is not None and not line.own.within
    assert line.comparison is not None and line.comparison.within


def test_an_election_of_what_is_not_offered_is_open(tmp_path: Path) -> None:
    text = (CASES / "elected.yaml").read_text("utf-8")
    rules = CASES / "rules" / "harbour-2025"
    own = tmp_path / "rules" / "harbour-2025"
    own.mkdir(parents=True)
    for file in rules.iterdir():
        kept = file.read_text("utf-8").replace("  terms: [U_A, C_A, F_P]\n", "")
        (own / file.name).write_text(kept, "utf-8")
    (tmp_path / "p.yaml").write_text(text, "utf-8")
    done = run(str(tmp_path / "p.yaml"), [str(tmp_path / "rules")])
    assert {line.verdict for line in done.judged.lines} == {"not_decided"}
    assert done.exit_status == 3
    assert "is not computed here" in done.judged.lines[0].reasons[0]


def test_every_format_carries_the_same_sums() -> None:
    from envcheck.report import view
    from envcheck.report.formats import csv as csv_format
    from envcheck.report.formats import html, json, markdown, text

    done = case("each-class-apart")
    made = view.build(done.project, done.rulesets, done.judged)
    for each in (text, markdown, html, json):
        page = each.render(made)
        for figure in (
            "as drawn 78.00 / by the table 81.00",
            "as drawn 29.50 / by the table 28.00",
        ):
            assert figure in page, each.NAME
    added: dict[str, list[float]] = {}
    for row in csv.DictReader(io.StringIO(csv_format.render(made))):
        if row["sums"]:
            sums = added.setdefault(row["sums"], [0.0, 0.0])
            sums[0] += float(row["as drawn [W/K]"])
            sums[1] += float(row["by the table [W/K]"])
    assert added == {
        "trade-off heated": pytest.approx([78.0, 81.0]),
        "trade-off semiheated": pytest.approx([29.5, 28.0]),
    }
