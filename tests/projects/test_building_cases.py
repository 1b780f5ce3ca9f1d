"""Whole projects judged for the building: sums by hand, and what every line carries.

The projects and the arithmetic stand in ``tests/cases/building``. That heat flows of parallel
areas add, so that a trade-off is a sum of U A, C A and F P, is the rule of component performance
in model energy codes (from memory); the figures are invented.
"""

from __future__ import annotations

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
    lines = {x.element: x.verdict for x in done.judged.lines if x.metric not in ("SHGC", "VT")}
    assert lines == INDEX[name]["lines"]
    assert done.exit_status == INDEX[name]["status"]


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
