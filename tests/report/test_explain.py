"""The page of one element or assembly."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from jsonschema import Draft202012Validator

from envcheck.report import explain, registry
from envcheck.report.view import ViewOptions
from envcheck.solve.why import reasons
from tests.changed import changed
from tests.report.fixture import JUDGED, PROJECT, RULESETS

EXPECTED = Path(__file__).parent / "expected"


def written(subject: str, name: str = "text", units: str = "") -> str:
    made = explain.build(PROJECT, RULESETS, JUDGED, subject, ViewOptions(units=units), reasons)
    lay_out = registry.format_named(name).answer
    assert lay_out is not None
    return lay_out(made, 100)


@pytest.mark.parametrize(
    ("subject", "name", "units", "file"),
    [
        ("N-1", "text", "", "explain-n-1.txt"),
        ("W2", "text", "SI", "explain-w2-si.txt"),
        ("N-2", "markdown", "", "explain-n-2.md"),
    ],
)
def test_exact_text(subject: str, name: str, units: str, file: str) -> None:
    expected = (EXPECTED / file).read_text(encoding="utf-8")
    assert written(subject, name, units) == expected


def test_an_assembly_that_nothing_uses_says_so() -> None:
    judged = changed(JUDGED, lines=())
    made = explain.build(PROJECT, RULESETS, judged, "W1")
    text = registry.format_named("text").answer(made, 100)
    assert "nothing is solved" in text


def test_every_tag_and_assembly_can_be_explained() -> None:
    assert set(explain.subjects(PROJECT)) == {*PROJECT.elements, *PROJECT.assemblies}
    for subject in explain.subjects(PROJECT):
        assert subject in written(subject)


def test_an_unknown_subject_is_refused() -> None:
    with pytest.raises(KeyError, match="W77"):
        explain.build(PROJECT, RULESETS, JUDGED, "W77")


def test_temperatures_run_from_the_outdoor_to_the_indoor_air() -> None:
    """The drop over a film of 0.17 in a path of 23.51 is 30 K x 0.17 / 23.51 = 0.22 K."""
    text = written("W2", units="SI")
    assert "behind outside film" in text
    assert "-9.8 degC" in text
    assert text.count("20.0 degC") == 3


def test_a_bracket_that_holds_the_limit_shows_both_ends() -> None:
    text = written("N-4")
    assert "low bound: 0.038 <= 0.060 Btu/(h ft2 F) holds" in text
    assert "high bound: 0.067 <= 0.060 Btu/(h ft2 F) does not hold" in text
    assert "Verdict: limit lies between the bounds" in text


def test_json_is_what_its_schema_says() -> None:
    path = Path(explain.__file__).parent / "schemas" / "explain.schema.json"
    schema = json.loads(path.read_text(encoding="utf-8"))
    Draft202012Validator.check_schema(schema)
    for subject in explain.subjects(PROJECT):
        found = json.loads(written(subject, "json"))
        assert list(Draft202012Validator(schema).iter_errors(found)) == []
    (wall,) = json.loads(written("W2", "json"))["assemblies"]
    assert wall["worksheet"][-1]["symbol"] == "U"
    heat = {flow["piece"]: flow["heat"] for flow in wall["reasons"]["flows"]}
    assert heat["studs"] == pytest.approx(0.25 / 2.18112462 / 0.295764, rel=1e-4)
    del wall["value"]
    broken = json.loads(written("W2", "json")) | {"assemblies": [wall]}
    assert len(list(Draft202012Validator(schema).iter_errors(broken))) == 1


def test_the_page_says_why_before_the_worksheet() -> None:
    text = written("W2")
    assert "studs, 25 % of the area, carries 38.8 % of the heat" in text
    assert text.index("Why it is what it is") < text.index("Worksheet")


def test_the_steps_are_a_table_for_spreadsheets() -> None:
    """A row for each step of the worksheet, its result a number of its own."""
    made = explain.build(PROJECT, RULESETS, JUDGED, "N-1")
    rows = [dict(zip(made.table.heads, row, strict=True)) for row in made.table.rows]
    text = written("N-1")
    assert len(rows) == 8
    for row in rows:
        assert float(row["result"]) and f"{row['symbol']} = " in text
    heads = ["assembly", "metric", "symbol", "step", "formula", "sum", "result", "unit", "source"]
    assert written("N-1", "csv").splitlines()[0] == ",".join(heads)
