"""Selections worked by hand from printed public tables, against reader and selector.

Each case names site, element and facts, and the limit that a person finds in the printed table; a
second route reads the figure at its typed place (sheet, line, column), without the reader. Sources
of the figures stand in the rule sets of ``tests/cases/law``.
"""

from __future__ import annotations

import csv
from datetime import date
from pathlib import Path
from typing import Any

import pytest
import yaml

from envcheck import pipeline
from envcheck.judge.select import select, select_envelope
from envcheck.judge.selection import Outcome, Selection
from envcheck.model.project import Element, Fact, Options, Project, Site, ZoneStated
from envcheck.model.ruleset import Limit, RuleSet, Term
from envcheck.read.rulesets import read_ruleset

CASES = Path(__file__).parent.parent / "cases"
LAW = CASES / "law"


def read(path: Path) -> list[tuple[str, dict[str, Any]]]:
    stated = yaml.load(path.read_text(encoding="utf-8"), yaml.BaseLoader)  # text as typed
    cases = stated.pop("cases")
    facts = stated.pop("facts", {})
    return [
        (path.stem, {**stated, **case, "facts": facts | case.get("facts", {})}) for case in cases
    ]


BY_HAND = [case for path in sorted((CASES / "selections").glob("*.yaml")) for case in read(path)]


def names(case: Any) -> str:
    return case if isinstance(case, str) else f"{case['category']} {case.get('zone', '')}".strip()


def element(case: dict[str, Any]) -> Element:
    return Element(
        tag="E1", assembly="A1", category=case["category"], sheet="A-1", surface="", line=1,
        net_area=10.0, gross_area=None, perimeter=None, count=None, host="",
        adjoins=case.get("adjoins", "outdoors"), facing=case.get("facing", ""), tilt=90.0,
        depth_below_grade=None, insulated_depth=None, renewed=None, measured="outside",
        mean_with="", facts=(), bridges=(),
    )  # fmt: skip


def project(case: dict[str, Any]) -> Project:
    facts = {k: v for k, v in case["facts"].items() if k != case.get("without")}
    zones = (ZoneStated("", case["zone"], "map", 2),) if "zone" in case else ()
    return Project(
        file="p.yaml", title="", reference="", prepared_by="",
        permit_application_date=date.fromisoformat(case["date"]) if "date" in case else None,
        report_date=None, scope="new", invented="", units="", site=Site("", zones),
        facts=tuple(Fact(k, v, "", 1) for k, v in facts.items()), rule_sets=(), materials={},
        assemblies={}, surfaces={}, elements={}, exceptions=(), options=Options(),
    )  # fmt: skip


def selected(name: str, case: dict[str, Any]) -> tuple[RuleSet, Selection]:
    own = project(case)
    ruleset = read_ruleset(name, [LAW], own.permit_application_date, pipeline.names())
    if case["category"] == "envelope":
        return ruleset, select_envelope(ruleset, own)
    return ruleset, select(element(case), case["category"], ruleset, own)


def outcome_of(selection: Selection, case: dict[str, Any]) -> Outcome | None:
    wanted = case.get("applies_to")
    own = [o for o in selection.outcomes if o.metric == case["metric"]]
    return next((o for o in own if wanted in (None, o.applies_to)), None)


def figures(limit: Limit) -> list[str]:
    return [" + ".join(map(word, alternative)) for alternative in limit.alternatives]


def word(term: Term) -> str:
    if term.metric:
        return f"{term.metric} {term.text}"
    return trimmed(term.text) + term.role.replace("cavity", "")


def trimmed(text: str) -> str:
    return text.rstrip("0").rstrip(".") if text[-1].isdigit() and "." in text else text


@pytest.mark.parametrize(("name", "case"), BY_HAND, ids=names)
def test_limit_that_a_person_finds(name: str, case: dict[str, Any]) -> None:
    _, selection = selected(name, case)
    outcome = outcome_of(selection, case)
    state = case.get("state", "found")
    if state.startswith("zone"):
        assert selection.state == state
        return
    if outcome is None:
        assert state == "not_in_table", selection.why
        return
    assert outcome.state == state, outcome.why
    if state == "missing_fact":
        assert case["missing"] in [m.name for m in outcome.missing]
    if outcome.limit is None:
        return
    limit = outcome.limit
    assert limit.clause == case["clause"]
    assert limit.kind == case.get("kind", "number")
    if "limit" in case:
        assert limit.cell == case["limit"]
    if "figures" in case:
        assert figures(limit) == [trimmed(f) for f in case["figures"]]
    assert any(n.by_official for n in limit.notes) == (case.get("official") == "yes")
    assert limit.threshold_cell == case.get("threshold", "")
    if "extent_m" in case:
        assert limit.alternatives[0][0].extent == pytest.approx(float(case["extent_m"]))


PRINTED = [(name, case) for name, case in BY_HAND if "at" in case]


@pytest.mark.parametrize(("name", "case"), PRINTED, ids=names)
def test_the_figure_stands_in_the_sheet(name: str, case: dict[str, Any]) -> None:
    line, column = map(int, case["at"])
    text = (LAW / name / case["sheet"]).read_text(encoding="utf-8").splitlines()
    separator = ";" if ";" in text[0] else ","
    cells = next(csv.reader([text[line - 1]], delimiter=separator))
    assert cells[column - 1] == case["raw"]


def test_there_are_enough_by_hand() -> None:
    count: dict[str, int] = {}
    for name, _ in BY_HAND:
        count[name] = count.get(name, 0) + 1
    assert len(count) >= 6 and min(count.values()) >= 10
    assert set(count) == {folder.name for folder in LAW.iterdir() if folder.is_dir()}
